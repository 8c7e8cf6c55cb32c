/* Devices of every kind as one list, where they stand, and which nodes they have. */
#include "kent_model_internal.h"

#include <assert.h>
#include <math.h>
#include <stdint.h>
#include <stdio.h>
#include <string.h>

/* Where kent_model and the struct of each kind keep what all kinds have. */
typedef struct device_shape {
    size_t array, count, size;             /* offsets in kent_model; bytes of one */
    size_t id, point, toward, node, place; /* offsets in one; NOWHERE */
    bool in_line;
} device_shape;

#define NOWHERE SIZE_MAX
#define SHAPE(type, array, count, id, toward, in_line)                                 \
    {                                                                                  \
        offsetof(kent_model, array), offsetof(kent_model, count), sizeof(type), id,    \
            offsetof(type, point), toward, offsetof(type, node),                       \
            offsetof(type, place), in_line                                             \
    }
#define IN_LINE(type, array, count)                                                    \
    SHAPE(type, array, count, offsetof(type, id), offsetof(type, flow_to), true)
#define BESIDE(type, array, count)                                                     \
    SHAPE(type, array, count, offsetof(type, id), offsetof(type, next_to), false)

static const device_shape SHAPES[KENT_DEVICE_KINDS] = {
    [KENT_DEVICE_PUMP] = IN_LINE(kent_pump, pumps, pump_count),
    [KENT_DEVICE_CHECK_VALVE] =
        IN_LINE(kent_check_valve, check_valves, check_valve_count),
    [KENT_DEVICE_CONTROL_VALVE] =
        IN_LINE(kent_control_valve, control_valves, control_valve_count),
    [KENT_DEVICE_SURGE_TANK] = BESIDE(kent_surge_tank, surge_tanks, surge_tank_count),
    [KENT_DEVICE_ONE_WAY_TANK] =
        BESIDE(kent_one_way_tank, one_way_tanks, one_way_tank_count),
    [KENT_DEVICE_AIR_VESSEL] = BESIDE(kent_air_vessel, air_vessels, air_vessel_count),
    [KENT_DEVICE_RELIEF_VALVE] =
        BESIDE(kent_relief_valve, relief_valves, relief_valve_count),
    [KENT_DEVICE_AIR_VALVE] = BESIDE(kent_air_valve, air_valves, air_valve_count),
    [KENT_DEVICE_BURST] =
        SHAPE(kent_burst, bursts, burst_count, NOWHERE, NOWHERE, false),
};

static size_t count_of(const kent_model *m, kent_device_kind kind)
{
    size_t count = 0;
    memcpy(&count, (const char *)m + SHAPES[kind].count, sizeof count);
    return count;
}

/* The struct of its own kind. */
static char *own(const kent_model *m, kent_device_kind kind, size_t index)
{
    char *array = NULL;
    memcpy(&array, (const char *)m + SHAPES[kind].array, sizeof array);
    return array + index * SHAPES[kind].size;
}

static int number_at(const char *one, size_t offset)
{
    int number = -1;
    if (offset != NOWHERE) memcpy(&number, one + offset, sizeof number);
    return number;
}

static const char *own_of(const kent_model *m, const kent_device *d)
{
    return own(m, d->kind, (size_t)d->index);
}

/* The point that its flow goes to, or beside whose leg it stands; -1: not said. */
static int toward_of(const kent_model *m, const kent_device *d)
{
    return number_at(own_of(m, d), SHAPES[d->kind].toward);
}

kent_place kent_device_place(const kent_model *m, const kent_device *d)
{
    kent_place place = {-1, 0};
    memcpy(&place, own_of(m, d) + SHAPES[d->kind].place, sizeof place);
    return place;
}

bool kent_device_in_line(kent_device_kind kind) { return SHAPES[kind].in_line; }

static bool draws_from_a_level(const kent_model *m, const kent_device *d)
{
    return d->kind == KENT_DEVICE_PUMP && isfinite(m->pumps[d->index].suction_level);
}

kent_status kent_devices_list(kent_model *m)
{
    size_t count = 0;
    for (int k = 0; k < KENT_DEVICE_KINDS; k++) {
        count += count_of(m, (kent_device_kind)k);
    }
    m->devices = kent_alloc(count, sizeof *m->devices);
    m->stands = kent_alloc(count, 2 * sizeof *m->stands);
    if (!m->devices || !m->stands) return KENT_E_NOMEM;
    for (int k = 0; k < KENT_DEVICE_KINDS; k++) {
        const kent_device_kind kind = (kent_device_kind)k;
        for (size_t i = 0; i < count_of(m, kind); i++) {
            const char *one = own(m, kind, i);
            const int point = number_at(one, SHAPES[kind].point);
            const bool burst = SHAPES[kind].id == NOWHERE;
            m->devices[m->device_count++] = (kent_device){
                .kind = kind,
                .index = (int)i,
                .point = point,
                .node = {-1, -1},
                .id = burst ? m->points[point].id : one + SHAPES[kind].id};
        }
    }
    return KENT_OK;
}

/* ---- where they stand ------------------------------------------------------------ */

/* How many arms of a point lead straight to another; *arm: the last that does. */
static size_t arms_toward(const kent_model *m, const kent_arm *arms, size_t count,
                          int toward, kent_arm *arm)
{
    size_t found = 0;
    for (size_t i = 0; i < count && i < KENT_ARMS; i++) {
        if (kent_arm_toward(m, arms[i]) != toward) continue;
        *arm = arms[i];
        found++;
    }
    return found;
}

/* flow_to or next_to has to say one leg of the point. */
static bool check_toward(const kent_model *m, const kent_layout *l,
                         const kent_device *d, const char *key,
                         kent_complaints *complaints)
{
    kent_arm arms[KENT_ARMS];
    kent_arm arm;
    const size_t count = kent_layout_arms(m, l, d->point, arms);
    const int toward = toward_of(m, d);
    const size_t found = arms_toward(m, arms, count, toward, &arm);
    if (found == 1) return true;
    kent_place_complain(m, kent_device_place(m, d), complaints,
                        found == 0
                            ? "%s \"%s\": %s = \"%s\" is not the next point of a pipe "
                              "from \"%s\"; name the one that follows there on a route"
                            : "%s \"%s\": %s = \"%s\" does not say which, since more "
                              "than one pipe leads there from \"%s\"; put a point "
                              "between on one of them",
                        kent_device_word(d->kind), d->id, key, m->points[toward].id,
                        m->points[d->point].id);
    return false;
}

static void check_in_line(const kent_model *m, const kent_layout *l,
                          const kent_device *d, kent_complaints *complaints)
{
    kent_arm arms[KENT_ARMS];
    const size_t count = kent_layout_arms(m, l, d->point, arms);
    const bool at_end = draws_from_a_level(m, d);
    const char *what = kent_device_word(d->kind);
    const char *at = m->points[d->point].id;
    const kent_place place = kent_device_place(m, d);

    if (at_end && count != 1) {
        kent_place_complain(m, place, complaints,
                            "%s \"%s\": with suction_level it stands where one pipe "
                            "starts, and at \"%s\" there are %zu legs; leave it out "
                            "for a pump in line",
                            what, d->id, at, count);
    } else if (!at_end && count != 2) {
        kent_place_complain(m, place, complaints,
                            "%s \"%s\": it stands in line between two pipes, and at "
                            "\"%s\" there %s %zu leg%s%s",
                            what, d->id, at, count == 1 ? "is" : "are", count,
                            count == 1 ? "" : "s",
                            d->kind == KENT_DEVICE_PUMP && count == 1
                                ? "; give suction_level, or lead a pipe to it"
                                : "; give it a point of its own on one of them");
    } else if (!at_end) {
        (void)check_toward(m, l, d, "flow_to", complaints);
    }
}

/* A point with two nodes; no leg of it goes without saying. */
static bool has_two_sides(const kent_model *m, kent_seat seat)
{
    switch (seat.kind) {
    case KENT_SEAT_FREE:
    case KENT_SEAT_LEVEL:
    case KENT_SEAT_OUTFLOW:
        return false;
    case KENT_SEAT_VALVE:
        return isnan(m->valves[seat.index].discharge_level);
    case KENT_SEAT_DEVICE:
        return !draws_from_a_level(m, &m->devices[seat.index]);
    }
    return false;
}

static void check_beside(const kent_model *m, const kent_layout *l,
                         const kent_device *d, kent_complaints *complaints)
{
    const kent_seat seat = l->device[d->point];
    const kent_place place = kent_device_place(m, d);
    const char *what = kent_device_word(d->kind);
    const char *at = m->points[d->point].id;
    const int toward = toward_of(m, d);

    if (seat.kind == KENT_SEAT_LEVEL) {
        kent_place_complain(m, place, complaints,
                            "%s \"%s\": at \"%s\" a fixed level holds the head, so "
                            "nothing happens there; give it a point of its own",
                            what, d->id, at);
    } else if (!has_two_sides(m, seat)) {
        if (toward < 0) return;
        kent_place_complain(m, place, complaints,
                            "%s \"%s\": next_to says on which side of a device in "
                            "line it stands, and there is none at \"%s\"; leave it "
                            "out",
                            what, d->id, at);
    } else if (d->kind == KENT_DEVICE_BURST) {
        kent_place_complain(m, place, complaints,
                            "burst at \"%s\": a device stands in line there, and a "
                            "burst is on one side of it; name a point beside it",
                            at);
    } else if (toward >= 0) {
        (void)check_toward(m, l, d, "next_to", complaints);
    } else if (seat.kind == KENT_SEAT_VALVE) {
        kent_place_complain(m, place, complaints,
                            "%s \"%s\": at \"%s\" a valve stands in line; say by "
                            "next_to, the next point on its side, where it is",
                            what, d->id, at);
    }
}

void kent_devices_place(const kent_model *m, kent_layout *l,
                        kent_complaints *complaints)
{
    char name[2 * KENT_ID];
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        if (!SHAPES[d->kind].in_line) continue;
        (void)snprintf(name, sizeof name, "%s \"%s\"", kent_device_word(d->kind),
                       d->id);
        if (kent_layout_stand(m, l, (kent_seat){KENT_SEAT_DEVICE, (int)i}, d->point,
                              kent_device_place(m, d), name, complaints)) {
            check_in_line(m, l, d, complaints);
        }
    }
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        if (SHAPES[d->kind].in_line) continue;
        (void)snprintf(name, sizeof name, "%s \"%s\"", kent_device_word(d->kind),
                       d->id);
        if (kent_layout_on_route(m, l, d->point, kent_device_place(m, d), name,
                                 complaints)) {
            l->beside[d->point] = true;
            check_beside(m, l, d, complaints);
        }
    }
}

/* ---- nodes ----------------------------------------------------------------------- */

kent_arm kent_device_delivery(const kent_model *m, const kent_layout *l,
                              const kent_device *d)
{
    kent_arm arms[KENT_ARMS];
    kent_arm arm = {0};
    const size_t count = kent_layout_arms(m, l, d->point, arms);
    const size_t found = arms_toward(m, arms, count, toward_of(m, d), &arm);
    assert(found == 1); /* kent_devices_place saw to it */
    (void)found;
    return arm;
}

static int node_beside(const kent_model *m, const kent_layout *l, const kent_device *d)
{
    const kent_seat seat = l->device[d->point];
    if (toward_of(m, d) >= 0) {
        return l->arm_node[kent_arm_number(kent_device_delivery(m, l, d))];
    }
    if (seat.kind == KENT_SEAT_DEVICE) return m->devices[seat.index].node[1];
    kent_arm arms[KENT_ARMS];
    (void)kent_layout_arms(m, l, d->point, arms);
    return l->arm_node[kent_arm_number(arms[0])];
}

/* Both lists by node: counted, then filled in the order of devices. */
static void group_stands(kent_model *m)
{
    for (size_t i = 0; i < m->device_count; i++) {
        for (int side = 0; side < 2; side++) {
            const int node = m->devices[i].node[side];
            if (node >= 0) m->nodes[node].stand_count++;
        }
    }
    for (size_t n = 0; n < m->node_count; n++) {
        m->nodes[n].stand_first = m->stand_count;
        m->stand_count += m->nodes[n].stand_count;
        m->nodes[n].stand_count = 0;
    }
    for (size_t i = 0; i < m->device_count; i++) {
        for (int side = 0; side < 2; side++) {
            const int at = m->devices[i].node[side];
            if (at < 0) continue;
            kent_node *node = &m->nodes[at];
            m->stands[node->stand_first + node->stand_count++] = (int)i;
        }
    }
}

void kent_devices_stand(kent_model *m, const kent_layout *l)
{
    for (size_t i = 0; i < m->device_count; i++) {
        kent_device *d = &m->devices[i];
        const bool in_line = SHAPES[d->kind].in_line;
        if (!in_line) d->node[0] = node_beside(m, l, d);
        memcpy(own(m, d->kind, (size_t)d->index) + SHAPES[d->kind].node, d->node,
               (in_line ? 2 : 1) * sizeof d->node[0]);
    }
    group_stands(m);
}

bool kent_fitting_shuts(const kent_model *m, const kent_fitting *f, size_t port)
{
    const kent_device *d = f->device >= 0 ? &m->devices[f->device] : NULL;
    if (!d || d->kind == KENT_DEVICE_CONTROL_VALVE) return true;
    const kent_port *p = &m->ports[f->port_first + port];
    return m->spans[p->span].node[p->sign > 0.0 ? 0 : 1] == d->node[1];
}

int kent_model_device_index(const kent_model *m, const char *id)
{
    for (size_t i = 0; i < m->device_count; i++) {
        if (strcmp(m->devices[i].id, id) == 0) return (int)i;
    }
    return -1;
}

kent_name kent_device_name(const kent_model *m, size_t device)
{
    const kent_device *d = &m->devices[device];
    kent_name out;
    (void)snprintf(out.s, sizeof out.s, "%s%s", d->id,
                   d->kind == KENT_DEVICE_BURST ? ".burst" : "");
    return out;
}

bool kent_device_is_left_out(const kent_model *m, size_t device, int scenario)
{
    if (scenario < 0) return false;
    const kent_scenario *of = &m->scenarios[scenario];
    for (size_t i = 0; i < of->without_count; i++) {
        const kent_left_out *out = &m->without[of->without_first + i];
        if (out->kind != m->devices[device].kind) continue;
        if (out->index == m->devices[device].index) return true;
    }
    return false;
}
