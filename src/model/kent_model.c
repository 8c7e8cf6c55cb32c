#include "kent_model_internal.h"

#include <assert.h>
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const double STANDARD_GRAVITY = 9.80665;   /* m/s2 */
static const double USUAL_TEMPERATURE = 288.15;   /* K: 15 degC where none is given */
static const double USUAL_SPEED_TOLERANCE = 0.02; /* - */
static const double USUAL_TEST_FACTOR = 1.5;      /* of "working-factor" */
static const double USUAL_SURGE_ALLOWANCE = 2e5;  /* Pa: the least of EN 805, 11.3.2 */

kent_model *kent_model_new(void)
{
    kent_model *m = kent_alloc(1, sizeof *m);
    if (!m) return NULL;
    m->units = KENT_SI;
    m->water = kent_water_at(USUAL_TEMPERATURE);
    m->barometric = kent_barometric_pressure(0.0);
    m->gravity = STANDARD_GRAVITY;
    m->ground = (kent_ground){.soil = -1,
                              .cover = (double)NAN,
                              .water_table = (double)INFINITY,
                              .trench = -1,
                              .backfill = -1};
    m->loads.test_pressure = (double)NAN;
    m->loads.test_gauge = m->loads.future_gauge = -1;
    m->loads.test_factor = USUAL_TEST_FACTOR;
    m->loads.surge_allowance = USUAL_SURGE_ALLOWANCE;
    m->loads.future_pressure = (double)NAN;
    m->loads.static_level = (double)NAN;
    m->loads.cooling = (double)NAN;
    m->concrete.strength = (double)NAN;
    m->asked = (kent_asked){NAN, {NAN, NAN, NAN}, NAN};
    m->loads.place = (kent_place){-1, 0};
    for (size_t i = 0; i < sizeof m->loads.factor / sizeof m->loads.factor[0]; i++) {
        m->loads.factor[i] = (double)NAN;
        m->loads.bearing_increase[i] = 1.0;
    }
    m->solver = (kent_solver){.friction = KENT_SURGE_QUASI_STEADY,
                              .column_separation = KENT_SEPARATION_GAS,
                              .grid_check = true,
                              .wave_speed_tolerance = USUAL_SPEED_TOLERANCE,
                              .min_reaches = 20,
                              .time_step = (double)NAN,
                              .place = {-1, 0},
                              .history_rows = 20000};
    return m;
}

static void clear_derived(kent_model *m)
{
    kent_alignment_forget(m);
    free(m->chainage);
    free(m->station);
    free(m->station_on);
    free(m->zone_first);
    free(m->zone_order);
    free(m->spans);
    free(m->nodes);
    free(m->ends);
    free(m->devices);
    free(m->stands);
    free(m->ports);
    free(m->fittings);
    free(m->members);
    free(m->marches);
    free(m->highest_level);
    free(m->shut_off_level);
    m->chainage = m->station = m->station_on = NULL;
    m->zone_first = NULL;
    m->zone_order = NULL;
    m->spans = NULL;
    m->nodes = NULL;
    m->ends = NULL;
    m->devices = NULL;
    m->stands = NULL;
    m->ports = NULL;
    m->fittings = NULL;
    m->members = NULL;
    m->marches = NULL;
    m->highest_level = m->shut_off_level = NULL;
    m->span_count = m->node_count = m->port_count = m->fitting_count = 0;
    m->member_count = m->march_count = m->device_count = m->stand_count = 0;
}

void kent_model_free(kent_model *m)
{
    if (!m) return;
    clear_derived(m);
    for (size_t i = 0; i < m->file_count; i++) {
        free(m->files[i]);
    }
    free((void *)m->files);
    free(m->points);
    free(m->pipes);
    free(m->route);
    free(m->fixed_levels);
    free(m->outflows);
    free(m->valves);
    free(m->pumps);
    free(m->check_valves);
    free(m->control_valves);
    free(m->surge_tanks);
    free(m->one_way_tanks);
    free(m->air_vessels);
    free(m->relief_valves);
    free(m->air_valves);
    free(m->bursts);
    free(m->scenarios);
    free(m->events);
    free(m->law);
    free(m->soils);
    free(m->notes);
    free(m->given_ports);
    free(m->creep);
    free(m->states);
    free(m->state_levels);
    free(m->state_running);
    free(m->without);
    free(m->scenario_states);
    free(m->ground_zones);
    free(m->obstacles);
    free(m->together);
    free(m->closes);
    free(m->built);
    free(m->built_legs);
    free(m->waivers);
    kent_notes_clear(&m->assumed);
    kent_notes_clear(&m->cautions);
    free(m);
}

void kent_place_complain(const kent_model *m, kent_place place,
                         kent_complaints *complaints, const char *fmt, ...)
{
    char what[480];
    va_list args;
    va_start(args, fmt);
    (void)vsnprintf(what, sizeof what, fmt, args);
    va_end(args);
    const bool known = place.file >= 0 && (size_t)place.file < m->file_count;
    kent_complain(complaints, known ? m->files[place.file] : "case",
                  known ? place.line : 0, "%s", what);
}

/* Points that no pipe runs through: allowed, since a survey lists more than is built;
 * the first few by name. */
static void caution_unused_points(kent_model *m, const kent_layout *l)
{
    enum { NAMED = 10 };
    size_t unused = 0;
    if (m->pipe_count == 0) return;
    for (size_t p = 0; p < m->point_count; p++) {
        if (l->first[p + 1] > l->first[p]) continue;
        if (unused++ >= NAMED) continue;
        kent_notes_add(&m->cautions, "point \"%s\" is on no pipe's route",
                       m->points[p].id);
    }
    if (unused > NAMED) {
        kent_notes_add(&m->cautions, "%zu more points are on no pipe's route",
                       unused - NAMED);
    }
}

kent_status kent_model_derive(kent_model *m, kent_complaints *complaints)
{
    assert(m != NULL && complaints != NULL);
    const size_t before = complaints->count;
    kent_layout layout = {0};

    clear_derived(m);
    kent_status status = kent_layout_make(m, &layout);
    if (status != KENT_OK) goto done;
    status = kent_alignment_lay(m, &layout, complaints);
    if (status != KENT_OK || complaints->count > before) goto done;
    status = kent_devices_list(m);
    if (status != KENT_OK) goto done;
    status = kent_route_measure(m, &layout, complaints);
    if (status != KENT_OK) goto done;
    kent_layout_place_devices(m, &layout, complaints);
    kent_curve_check(m, &layout, complaints);
    if (complaints->count > before) goto done; /* nothing beyond would make sense */
    status = kent_route_stations(m, &layout, complaints);
    if (status != KENT_OK) goto done;
    status = kent_ground_settle(m, &layout, complaints);
    if (status != KENT_OK) goto done;
    caution_unused_points(m, &layout);
    status = kent_network_cut(m, &layout, complaints);
    if (status != KENT_OK) goto done;
    status = kent_network_check_connected(m, complaints);
    if (status != KENT_OK) goto done;
    status = kent_fitting_list(m, &layout, complaints);
    if (status != KENT_OK) goto done;
    status = kent_curve_joints(m, &layout, complaints);
    if (status != KENT_OK) goto done;
    status = kent_group_fittings(m, &layout, complaints);
    if (status != KENT_OK) goto done;
    status = kent_state_marches(m, complaints);
    if (status == KENT_OK) kent_devices_caution(m);
    if (status == KENT_OK) status = kent_state_levels(m);
    if (status == KENT_OK) status = kent_shut_off_levels(m);
    if (status == KENT_OK && m->cautions.failed) status = KENT_E_NOMEM;
done:
    if (status == KENT_OK && complaints->count > before) status = KENT_E_INPUT;
    if (status != KENT_OK) clear_derived(m);
    kent_layout_clear(&layout);
    assert(status != KENT_OK || kent_model_is_valid(m));
    return status;
}

double kent_static_level(const kent_model *m, int node)
{
    return isnan(m->loads.static_level) ? m->highest_level[node]
                                        : m->loads.static_level;
}

double kent_model_pressure(const kent_model *m, double head, double level)
{
    return m->water.density * m->gravity * (head - level);
}

void kent_model_place_text(const kent_model *m, kent_place place, char *out,
                           size_t size)
{
    out[0] = '\0';
    if (place.file < 0 || (size_t)place.file >= m->file_count) return;
    (void)snprintf(out, size, "%s:%d", m->files[place.file], place.line);
}

/* A list of structs whose first member is the id, so that one search serves all. */
static int index_of(const void *list, size_t count, size_t size, const char *id)
{
    for (size_t i = 0; i < count; i++) {
        if (strcmp((const char *)list + i * size, id) == 0) return (int)i;
    }
    return -1;
}

static_assert(offsetof(kent_point, id) == 0 && offsetof(kent_pipe, id) == 0 &&
                  offsetof(kent_valve, id) == 0,
              "index_of reads the id at the front");

int kent_model_point_index(const kent_model *m, const char *id)
{
    return index_of(m->points, m->point_count, sizeof *m->points, id);
}

int kent_model_pipe_index(const kent_model *m, const char *id)
{
    return index_of(m->pipes, m->pipe_count, sizeof *m->pipes, id);
}

int kent_model_fitting_of(const kent_model *m, const char *id)
{
    for (size_t f = 0; f < m->fitting_count; f++) {
        if (strcmp(m->fittings[f].id, id) == 0) return (int)f;
    }
    for (size_t f = 0; f < m->fitting_count; f++) {
        const kent_fitting *fitting = &m->fittings[f];
        for (size_t k = 0; k < fitting->member_count; k++) {
            const int point = m->members[fitting->member_first + k];
            if (strcmp(m->points[point].id, id) == 0) return (int)f;
        }
    }
    return -1;
}

int kent_model_valve_index(const kent_model *m, const char *id)
{
    return index_of(m->valves, m->valve_count, sizeof *m->valves, id);
}
