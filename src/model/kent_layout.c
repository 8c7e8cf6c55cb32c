#include "kent_model_internal.h"

#include <stdio.h>
#include <stdlib.h>

static bool is_first_stop(const kent_model *m, const kent_layout *l, size_t stop)
{
    return stop == m->pipes[l->pipe[stop]].route_first;
}

static bool is_last_stop(const kent_model *m, const kent_layout *l, size_t stop)
{
    const kent_pipe *pipe = &m->pipes[l->pipe[stop]];
    return stop + 1 == pipe->route_first + pipe->route_count;
}

bool kent_layout_runs_through(const kent_model *m, const kent_layout *l, size_t stop)
{
    return !is_first_stop(m, l, stop) && !is_last_stop(m, l, stop);
}

static void find_owners(const kent_model *m, kent_layout *l)
{
    for (size_t p = 0; p < m->point_count; p++) {
        const size_t end = l->first[p + 1];
        size_t i = l->first[p];
        while (i < end && !kent_layout_runs_through(m, l, l->stop[i])) {
            i++;
        }
        if (i == end) i = l->first[p];
        if (i < end) l->owner[p] = l->stop[i];
    }
}

/* Stops sorted by point, by counting: those of one point stay in the order of pipes. */
static void group_stops(const kent_model *m, kent_layout *l)
{
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *pipe = &m->pipes[i];
        for (size_t k = 0; k < pipe->route_count; k++) {
            l->pipe[pipe->route_first + k] = (int)i;
        }
    }
    for (size_t s = 0; s < m->route_count; s++) {
        l->first[m->route[s] + 1]++;
    }
    for (size_t p = 0; p < m->point_count; p++) {
        l->first[p + 1] += l->first[p];
    }
    /* Filled from the back, so that first[] ends where it began. */
    for (size_t s = 0; s < m->route_count; s++) {
        l->stop[l->first[m->route[s]]++] = s;
    }
    for (size_t p = m->point_count; p > 0; p--) {
        l->first[p] = l->first[p - 1];
    }
    l->first[0] = 0;
}

kent_status kent_layout_make(const kent_model *m, kent_layout *l)
{
    l->first = kent_alloc(m->point_count + 1, sizeof *l->first);
    l->stop = kent_alloc(m->route_count, sizeof *l->stop);
    l->pipe = kent_alloc(m->route_count, sizeof *l->pipe);
    l->owner = kent_alloc(m->point_count, sizeof *l->owner);
    l->note = kent_alloc(m->point_count, sizeof *l->note);
    l->device = kent_alloc(m->point_count, sizeof *l->device);
    l->beside = kent_alloc(m->point_count, sizeof *l->beside);
    l->station = kent_alloc(m->point_count, sizeof *l->station);
    l->arm_node = kent_alloc(m->route_count, 2 * sizeof *l->arm_node);
    l->arc = kent_alloc(m->route_count, sizeof *l->arc);
    l->arm_span = kent_alloc(m->route_count, 2 * sizeof *l->arm_span);
    if (!l->first || !l->stop || !l->pipe || !l->owner || !l->note || !l->device ||
        !l->beside || !l->station || !l->arm_node || !l->arm_span || !l->arc) {
        return KENT_E_NOMEM; /* the caller clears */
    }
    for (size_t a = 0; a < 2 * m->route_count; a++) {
        l->arm_node[a] = l->arm_span[a] = -1;
    }
    group_stops(m, l);
    find_owners(m, l);
    return KENT_OK;
}

void kent_layout_clear(kent_layout *l)
{
    free(l->first);
    free(l->stop);
    free(l->pipe);
    free(l->owner);
    free(l->note);
    free(l->device);
    free(l->beside);
    free(l->station);
    free(l->arm_node);
    free(l->arm_span);
    free(l->arc);
    *l = (kent_layout){0};
}

size_t kent_layout_arms(const kent_model *m, const kent_layout *l, int point,
                        kent_arm arms[KENT_ARMS])
{
    size_t count = 0;
    for (size_t i = l->first[point]; i < l->first[point + 1]; i++) {
        const size_t stop = l->stop[i];
        const bool has[2] = {!is_first_stop(m, l, stop), !is_last_stop(m, l, stop)};
        for (int leaves = 0; leaves < 2; leaves++) {
            if (!has[leaves]) continue;
            if (count < KENT_ARMS) arms[count] = (kent_arm){stop, leaves == 1};
            count++;
        }
    }
    if (count == 2 && arms[0].leaves && !arms[1].leaves) {
        const kent_arm arriving = arms[1];
        arms[1] = arms[0];
        arms[0] = arriving;
    }
    return count;
}

bool kent_layout_is_cut(const kent_model *m, const kent_layout *l, size_t stop)
{
    const int point = m->route[stop];
    return is_first_stop(m, l, stop) || is_last_stop(m, l, stop) ||
           l->first[point + 1] - l->first[point] > 1 ||
           l->device[point].kind != KENT_SEAT_FREE || l->beside[point];
}

int kent_arm_toward(const kent_model *m, kent_arm arm)
{
    return m->route[arm.leaves ? arm.stop + 1 : arm.stop - 1];
}

bool kent_layout_on_route(const kent_model *m, const kent_layout *l, int point,
                          kent_place place, const char *name,
                          kent_complaints *complaints)
{
    if (l->first[point + 1] > l->first[point]) return true;
    kent_place_complain(m, place, complaints,
                        "%s at \"%s\": no pipe runs through this point; name a point "
                        "of a pipe's route",
                        name, m->points[point].id);
    return false;
}

bool kent_layout_stand(const kent_model *m, kent_layout *l, kent_seat device, int point,
                       kent_place place, const char *name, kent_complaints *complaints)
{
    const char *id = m->points[point].id;
    if (!kent_layout_on_route(m, l, point, place, name, complaints)) return false;
    if (l->device[point].kind != KENT_SEAT_FREE) {
        kent_place_complain(m, place, complaints,
                            "%s at \"%s\": another device stands there; one stands "
                            "in line or at an end, so give each a point of its own",
                            name, id);
        return false;
    }
    l->device[point] = device;
    return true;
}

static void check_valve(const kent_model *m, const kent_layout *l,
                        const kent_valve *valve, kent_complaints *complaints)
{
    kent_arm arms[KENT_ARMS];
    const size_t count = kent_layout_arms(m, l, valve->point, arms);
    const char *at = m->points[valve->point].id;
    const bool in_line = isnan(valve->discharge_level);

    if (in_line && count == 1) {
        kent_place_complain(m, valve->place, complaints,
                            "valve \"%s\": only one pipe ends at \"%s\"; give "
                            "discharge_level, or lead a pipe on from there",
                            valve->id, at);
    } else if (in_line && count > 2) {
        kent_place_complain(m, valve->place, complaints,
                            "valve \"%s\": %zu pipes meet at \"%s\"; a valve stands in "
                            "line between two, so give it a point of its own on one of "
                            "them",
                            valve->id, count, at);
    } else if (!in_line && count != 1) {
        kent_place_complain(m, valve->place, complaints,
                            "valve \"%s\": a valve with discharge_level stands at the "
                            "end of one pipe; at \"%s\" there are %zu legs",
                            valve->id, at, count);
    }
}

void kent_layout_place_devices(const kent_model *m, kent_layout *l,
                               kent_complaints *complaints)
{
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        const kent_fixed_level *level = &m->fixed_levels[i];
        (void)kent_layout_stand(m, l, (kent_seat){KENT_SEAT_LEVEL, (int)i},
                                level->point, level->place, "fixed level", complaints);
    }
    for (size_t i = 0; i < m->outflow_count; i++) {
        const kent_outflow *outflow = &m->outflows[i];
        (void)kent_layout_stand(m, l, (kent_seat){KENT_SEAT_OUTFLOW, (int)i},
                                outflow->point, outflow->place, "outflow", complaints);
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        const kent_valve *valve = &m->valves[i];
        char name[KENT_ID + 16];
        (void)snprintf(name, sizeof name, "valve \"%s\"", valve->id);
        if (kent_layout_stand(m, l, (kent_seat){KENT_SEAT_VALVE, (int)i}, valve->point,
                              valve->place, name, complaints)) {
            check_valve(m, l, valve, complaints);
        }
    }
    kent_devices_place(m, l, complaints);
}
