#include "kent_build.h"
#include "kent_check.h"

#include <assert.h>
#include <math.h>
#include <stdio.h>
#include <string.h>

enum {
    POINTS,
    PIPES,
    ROUTE,
    FIXED_LEVELS,
    OUTFLOWS,
    VALVES,
    SCENARIOS,
    EVENTS,
    LAW,
    SOILS,
    NOTES,
    PORTS,
    STATES,
    STATE_LEVELS,
    SCENARIO_STATES,
    PUMPS,
    CHECK_VALVES,
    CONTROL_VALVES,
    SURGE_TANKS,
    ONE_WAY_TANKS,
    AIR_VESSELS,
    RELIEF_VALVES,
    AIR_VALVES,
    BURSTS,
    LISTS
};

static_assert((int)LISTS == (int)KENT_BUILD_LISTS, "one capacity for each list");

/* The list with room for one more of the model's things. */
static void *one_more(kent_build *b, int list, void *array, size_t *count, size_t size)
{
    if (kent_grow(&array, &b->capacity[list], *count + 1, size) != 0) {
        fail_msg("no memory for the model under test");
    }
    ++*count;
    return array;
}

static void name(char id[KENT_ID], const char *text)
{
    (void)snprintf(id, KENT_ID, "%s", text);
}

static int point_named(const kent_build *b, const char *id)
{
    const int point = kent_model_point_index(b->model, id);
    if (point < 0) fail_msg("the model under test has no point \"%s\"", id);
    return point;
}

kent_build kent_build_new(void)
{
    kent_build b = {.model = kent_model_new()};
    kent_model *m = b.model;
    if (!m) {
        fail_msg("no memory for the model under test");
        return b; /* never reached: the line above leaves the test */
    }
    m->files = kent_alloc(1, sizeof *m->files);
    if (m->files) m->files[0] = kent_copy_text("built.cfg");
    if (!m->files || !m->files[0]) fail_msg("no memory for the model under test");
    m->file_count = 1;
    m->water = (kent_water){.temperature = 288.15,
                            .density = 1000.0,
                            .bulk_modulus = 2.2e9,
                            .viscosity = 1.0e-3,
                            .vapour_pressure = 1705.0,
                            .sound_speed = sqrt(2.2e6)};
    m->barometric = 101325.0;
    m->gravity = 9.80665;
    m->solver.column_separation = KENT_SEPARATION_NONE;
    m->rules = (kent_rules){.id = "built",
                            .factor_test = (double)NAN,
                            .source = "common practice, no source",
                            .safety_factor = 1.5,
                            .height_to_depth = 0.5,
                            .width_to_height = {1.0, 2.0},
                            .least_thickness = 0.3,
                            .least_height = 0.3,
                            .side_step = 0.05,
                            .least_cover = 0.6,
                            .concrete_unit_weight = 23.0e3,
                            .water_unit_weight = 9806.65,
                            .wrapped_ratio = 0.7,
                            .largest_volume = 30.0};
    return b;
}

void kent_build_clear(kent_build *b)
{
    kent_model_free(b->model);
    *b = (kent_build){0};
}

int kent_build_point(kent_build *b, const char *id, double x, double y, double z)
{
    kent_model *m = b->model;
    m->points = one_more(b, POINTS, m->points, &m->point_count, sizeof *m->points);
    const int i = (int)m->point_count - 1;
    m->points[i] = kent_point_blank();
    m->points[i].at = (kent_vec3){x, y, z};
    m->points[i].place = (kent_place){0, i + 1};
    name(m->points[i].id, id);
    return i;
}

/* Appends the points named in route ("R P1 E") and returns how many there are. */
static size_t add_route(kent_build *b, const char *route)
{
    kent_model *m = b->model;
    size_t count = 0;
    for (const char *at = route + strspn(route, " "); *at; at += strspn(at, " ")) {
        char id[KENT_ID];
        const size_t length = strcspn(at, " ");
        (void)snprintf(id, sizeof id, "%.*s", (int)length, at);
        const int point = point_named(b, id);
        m->route = one_more(b, ROUTE, m->route, &m->route_count, sizeof *m->route);
        const int i = (int)m->route_count - 1;
        m->route[i] = point;
        count++;
        at += length;
    }
    return count;
}

int kent_build_pipe(kent_build *b, const char *id, const char *route, double bore,
                    double wave_speed)
{
    kent_model *m = b->model;
    const double wall = 0.01; /* m */
    const size_t first = m->route_count;
    const size_t count = add_route(b, route);
    m->pipes = one_more(b, PIPES, m->pipes, &m->pipe_count, sizeof *m->pipes);
    const int i = (int)m->pipe_count - 1;
    kent_pipe *p = &m->pipes[i];
    *p = kent_pipe_blank();
    p->route_first = first;
    p->route_count = count;
    p->inside_diameter = bore;
    p->outside_diameter = bore + 2.0 * wall;
    p->wall = wall;
    p->modulus = 170.0e9;
    p->poisson = 0.28;
    p->material_density = 7050.0;
    p->friction = KENT_FRICTIONLESS;
    p->wave_speed = wave_speed;
    p->axial_support = KENT_FLEXIBLE_JOINTS;
    p->joint = KENT_PUSH_ON;
    p->place = (kent_place){0, 100 + i};
    name(m->pipes[i].id, id);
    return i;
}

int kent_build_fixed_level(kent_build *b, const char *at, double level)
{
    kent_model *m = b->model;
    m->fixed_levels = one_more(b, FIXED_LEVELS, m->fixed_levels, &m->fixed_level_count,
                               sizeof *m->fixed_levels);
    const int i = (int)m->fixed_level_count - 1;
    m->fixed_levels[i] = (kent_fixed_level){
        .point = point_named(b, at), .level = level, .node = -1, .place = {0, 200 + i}};
    return i;
}

int kent_build_outflow(kent_build *b, const char *at, double flow)
{
    kent_model *m = b->model;
    m->outflows =
        one_more(b, OUTFLOWS, m->outflows, &m->outflow_count, sizeof *m->outflows);
    const int i = (int)m->outflow_count - 1;
    m->outflows[i] = (kent_outflow){
        .point = point_named(b, at), .flow = flow, .node = -1, .place = {0, 300 + i}};
    return i;
}

int kent_build_valve(kent_build *b, const char *id, const char *at, double capacity,
                     double discharge_level)
{
    kent_model *m = b->model;
    m->valves = one_more(b, VALVES, m->valves, &m->valve_count, sizeof *m->valves);
    const int i = (int)m->valve_count - 1;
    m->valves[i] = (kent_valve){.point = point_named(b, at),
                                .type = "linear",
                                .curve = kent_valve_curve_linear(),
                                .size = 1.0,
                                .capacity = capacity,
                                .flow = (double)NAN,
                                .opening = 1.0,
                                .discharge_level = discharge_level,
                                .node = {-1, -1},
                                .place = {0, 400 + i}};
    name(m->valves[i].id, id);
    return i;
}

/* ---- devices --------------------------------------------------------------------- */

static int point_or_none(const kent_build *b, const char *id)
{
    return id ? point_named(b, id) : -1;
}

static kent_place device_place(size_t count)
{
    return (kent_place){0, 699 + (int)count};
}

int kent_build_pump(kent_build *b, const char *id, const char *at, const char *flow_to,
                    double head_at_no_flow, double rated_flow, double rated_head)
{
    const double pi = 3.14159265358979323846;
    kent_model *m = b->model;
    m->pumps = one_more(b, PUMPS, m->pumps, &m->pump_count, sizeof *m->pumps);
    kent_pump *p = &m->pumps[m->pump_count - 1];
    *p = (kent_pump){.point = point_named(b, at),
                     .flow_to = point_or_none(b, flow_to),
                     .suction_level = (double)NAN,
                     .in_parallel = 1,
                     .running = 1,
                     .inertia = 5.0,
                     .check_delay = (double)NAN,
                     .check_size = (double)NAN,
                     .node = {-1, -1},
                     .place = device_place(m->pump_count)};
    const double fall = head_at_no_flow - rated_head; /* m, to the rated flow */
    const double last = fmin(1.5, sqrt(0.9 * head_at_no_flow / fall));
    p->curve = (kent_pump_curve){
        .count = 3,
        .flow = {0.0, rated_flow, last * rated_flow},
        .head = {head_at_no_flow, rated_head, head_at_no_flow - fall * last * last},
        .efficiency = {(double)NAN, (double)NAN, (double)NAN},
        .rated_flow = rated_flow,
        .rated_head = rated_head,
        .rated_efficiency = 0.8,
        .rated_speed = 1480.0 * pi / 30.0,
        .stages = 1,
        .suctions = 1};
    name(p->id, id);
    const char *wrong =
        kent_pump_curve_complete(&p->curve, m->water.density, m->gravity);
    if (wrong) fail_msg("pump \"%s\": %s", id, wrong);
    return (int)m->pump_count - 1;
}

int kent_build_check_valve(kent_build *b, const char *id, const char *at,
                           const char *flow_to)
{
    kent_model *m = b->model;
    m->check_valves = one_more(b, CHECK_VALVES, m->check_valves, &m->check_valve_count,
                               sizeof *m->check_valves);
    kent_check_valve *v = &m->check_valves[m->check_valve_count - 1];
    *v = (kent_check_valve){.point = point_named(b, at),
                            .flow_to = point_or_none(b, flow_to),
                            .size = 0.3,
                            .loss = 1.0,
                            .place = device_place(m->check_valve_count)};
    name(v->id, id);
    return (int)m->check_valve_count - 1;
}

int kent_build_control_valve(kent_build *b, const char *id, const char *at,
                             const char *flow_to, kent_holds holds, double set_pressure)
{
    kent_model *m = b->model;
    m->control_valves = one_more(b, CONTROL_VALVES, m->control_valves,
                                 &m->control_valve_count, sizeof *m->control_valves);
    kent_control_valve *v = &m->control_valves[m->control_valve_count - 1];
    *v = (kent_control_valve){.point = point_named(b, at),
                              .flow_to = point_or_none(b, flow_to),
                              .holds = holds,
                              .set_pressure = set_pressure,
                              .size = 0.3,
                              .capacity = 0.1,
                              .opening_time = 10.0,
                              .closure_time = 10.0,
                              .place = device_place(m->control_valve_count)};
    name(v->id, id);
    return (int)m->control_valve_count - 1;
}

int kent_build_surge_tank(kent_build *b, const char *id, const char *at, double area)
{
    kent_model *m = b->model;
    m->surge_tanks = one_more(b, SURGE_TANKS, m->surge_tanks, &m->surge_tank_count,
                              sizeof *m->surge_tanks);
    kent_surge_tank *t = &m->surge_tanks[m->surge_tank_count - 1];
    *t = (kent_surge_tank){.point = point_named(b, at),
                           .next_to = -1,
                           .area = area,
                           .overflow_level = (double)INFINITY,
                           .connection_diameter = 1.0,
                           .node = -1,
                           .place = device_place(m->surge_tank_count)};
    name(t->id, id);
    return (int)m->surge_tank_count - 1;
}

int kent_build_one_way_tank(kent_build *b, const char *id, const char *at, double area,
                            double level)
{
    kent_model *m = b->model;
    m->one_way_tanks = one_more(b, ONE_WAY_TANKS, m->one_way_tanks,
                                &m->one_way_tank_count, sizeof *m->one_way_tanks);
    kent_one_way_tank *t = &m->one_way_tanks[m->one_way_tank_count - 1];
    *t = (kent_one_way_tank){.point = point_named(b, at),
                             .next_to = -1,
                             .area = area,
                             .level = level,
                             .bottom_level = -(double)INFINITY,
                             .connection_diameter = 0.3,
                             .loss_out = 4.0,
                             .node = -1,
                             .place = device_place(m->one_way_tank_count)};
    name(t->id, id);
    return (int)m->one_way_tank_count - 1;
}

int kent_build_air_vessel(kent_build *b, const char *id, const char *at,
                          double total_volume, double gas_volume)
{
    kent_model *m = b->model;
    m->air_vessels = one_more(b, AIR_VESSELS, m->air_vessels, &m->air_vessel_count,
                              sizeof *m->air_vessels);
    kent_air_vessel *v = &m->air_vessels[m->air_vessel_count - 1];
    *v = (kent_air_vessel){.point = point_named(b, at),
                           .next_to = -1,
                           .total_volume = total_volume,
                           .gas_volume = gas_volume,
                           .polytropic_exponent = 1.2,
                           .water_level = (double)NAN,
                           .area = (double)INFINITY,
                           .connection_diameter = 0.3,
                           .loss_in = 12.0,
                           .loss_out = 5.0,
                           .node = -1,
                           .place = device_place(m->air_vessel_count)};
    name(v->id, id);
    return (int)m->air_vessel_count - 1;
}

int kent_build_relief_valve(kent_build *b, const char *id, const char *at,
                            double set_pressure, double capacity)
{
    kent_model *m = b->model;
    const int point = point_named(b, at);
    m->relief_valves = one_more(b, RELIEF_VALVES, m->relief_valves,
                                &m->relief_valve_count, sizeof *m->relief_valves);
    kent_relief_valve *v = &m->relief_valves[m->relief_valve_count - 1];
    *v = (kent_relief_valve){.point = point,
                             .next_to = -1,
                             .set_pressure = set_pressure,
                             .full_open_pressure = 1.1 * set_pressure,
                             .low_set_pressure = (double)NAN,
                             .hold_time = (double)NAN,
                             .size = 0.2,
                             .capacity = capacity,
                             .closure_time = 20.0,
                             .discharge_level = m->points[point].at.z,
                             .node = -1,
                             .place = device_place(m->relief_valve_count)};
    name(v->id, id);
    return (int)m->relief_valve_count - 1;
}

int kent_build_air_valve(kent_build *b, const char *id, const char *at,
                         double admission_orifice, double release_orifice)
{
    kent_model *m = b->model;
    m->air_valves = one_more(b, AIR_VALVES, m->air_valves, &m->air_valve_count,
                             sizeof *m->air_valves);
    kent_air_valve *v = &m->air_valves[m->air_valve_count - 1];
    *v = (kent_air_valve){.point = point_named(b, at),
                          .next_to = -1,
                          .in_parallel = 1,
                          .admission_orifice = admission_orifice,
                          .release_orifice = release_orifice,
                          .admission_coefficient = 0.6,
                          .release_coefficient = 0.6,
                          .switch_pressure = (double)NAN,
                          .switched_orifice = (double)NAN,
                          .node = -1,
                          .place = device_place(m->air_valve_count)};
    name(v->id, id);
    return (int)m->air_valve_count - 1;
}

int kent_build_burst(kent_build *b, const char *at)
{
    kent_model *m = b->model;
    m->bursts = one_more(b, BURSTS, m->bursts, &m->burst_count, sizeof *m->bursts);
    m->bursts[m->burst_count - 1] =
        (kent_burst){point_named(b, at), -1, device_place(m->burst_count)};
    return (int)m->burst_count - 1;
}

/* ---- scenarios ------------------------------------------------------------------- */

int kent_build_scenario(kent_build *b, const char *id, double duration)
{
    kent_model *m = b->model;
    m->scenarios =
        one_more(b, SCENARIOS, m->scenarios, &m->scenario_count, sizeof *m->scenarios);
    const int i = (int)m->scenario_count - 1;
    m->scenarios[i] = (kent_scenario){.duration = duration,
                                      .class_of = KENT_OCCASIONAL,
                                      .event_first = m->event_count,
                                      .same_as = -1,
                                      .cycles_per_day = (double)NAN,
                                      .place = {0, 500 + i}};
    name(m->scenarios[i].id, id);
    return i;
}

int kent_build_state(kent_build *b, const char *id)
{
    kent_model *m = b->model;
    m->states = one_more(b, STATES, m->states, &m->state_count, sizeof *m->states);
    const int i = (int)m->state_count - 1;
    m->states[i] = (kent_state){.level_first = m->state_level_count,
                                .outflow_factor = 1.0,
                                .roughness_factor = 1.0,
                                .place = {0, 700 + i}};
    name(m->states[i].id, id);
    return i;
}

void kent_build_state_level(kent_build *b, int state, int fixed_level, double level)
{
    kent_model *m = b->model;
    if (state + 1 != (int)m->state_count) {
        fail_msg("levels belong to the state added last");
    }
    m->state_levels = one_more(b, STATE_LEVELS, m->state_levels, &m->state_level_count,
                               sizeof *m->state_levels);
    m->state_levels[m->state_level_count - 1] = (kent_state_level){fixed_level, level};
    m->states[state].level_count++;
}

void kent_build_starts_from(kent_build *b, int scenario, int state)
{
    kent_model *m = b->model;
    kent_scenario *s = &m->scenarios[scenario];
    if (scenario + 1 != (int)m->scenario_count) {
        fail_msg("states belong to the scenario added last");
    }
    if (s->state_count == 0) s->state_first = m->scenario_state_count;
    m->scenario_states = one_more(b, SCENARIO_STATES, m->scenario_states,
                                  &m->scenario_state_count, sizeof *m->scenario_states);
    m->scenario_states[m->scenario_state_count - 1] = state;
    s->state_count++;
}

static int add_event(kent_build *b, int scenario, kent_event event)
{
    kent_model *m = b->model;
    if (scenario + 1 != (int)m->scenario_count) {
        fail_msg("events belong to the scenario added last");
    }
    m->events = one_more(b, EVENTS, m->events, &m->event_count, sizeof *m->events);
    const int i = (int)m->event_count - 1;
    m->events[i] = event;
    m->events[i].period = (double)NAN;
    m->events[i].place = (kent_place){0, 600 + i};
    m->scenarios[scenario].event_count++;
    return i;
}

int kent_build_ramp(kent_build *b, int scenario, kent_event_kind kind, int target,
                    double start_time, double ramp_time, double to)
{
    return add_event(b, scenario,
                     (kent_event){.kind = kind,
                                  .target = target,
                                  .start_time = start_time,
                                  .ramp_time = ramp_time,
                                  .to = to,
                                  .coefficient = 0.6});
}

int kent_build_law(kent_build *b, int scenario, kent_event_kind kind, int target,
                   double start_time, const kent_law_point *law, size_t count)
{
    kent_model *m = b->model;
    const size_t first = m->law_count;
    for (size_t k = 0; k < count; k++) {
        m->law = one_more(b, LAW, m->law, &m->law_count, sizeof *m->law);
        const int i = (int)m->law_count - 1;
        m->law[i] = law[k];
    }
    return add_event(b, scenario,
                     (kent_event){.kind = kind,
                                  .target = target,
                                  .start_time = start_time,
                                  .ramp_time = (double)NAN,
                                  .to = (double)NAN,
                                  .law_first = first,
                                  .law_count = count});
}

int kent_build_soil(kent_build *b, const char *id, double allowable_bearing,
                    double unit_weight, double cover)
{
    kent_model *m = b->model;
    m->soils = one_more(b, SOILS, m->soils, &m->soil_count, sizeof *m->soils);
    const int i = (int)m->soil_count - 1;
    m->soils[i] = kent_soil_blank();
    (void)snprintf(m->soils[i].source, sizeof m->soils[i].source, "given in the case");
    m->soils[i].allowable_bearing = allowable_bearing;
    m->soils[i].unit_weight = unit_weight;
    m->soils[i].place = (kent_place){0, 700 + i};
    name(m->soils[i].id, id);
    m->ground.soil = i;
    m->ground.cover = cover;
    return i;
}

static int add_note(kent_build *b, const char *id, int point)
{
    kent_model *m = b->model;
    m->notes = one_more(b, NOTES, m->notes, &m->note_count, sizeof *m->notes);
    const int i = (int)m->note_count - 1;
    m->notes[i] = kent_note_blank();
    m->notes[i].point = point;
    m->notes[i].place = (kent_place){0, 800 + i};
    name(m->notes[i].id, id);
    return i;
}

int kent_build_note(kent_build *b, const char *at)
{
    return add_note(b, at, point_named(b, at));
}

int kent_build_ports(kent_build *b, const char *id, int type, const kent_port *ports,
                     size_t count)
{
    kent_model *m = b->model;
    const int note = add_note(b, id, -1);
    m->notes[note].type = type;
    m->notes[note].port_first = m->given_port_count;
    m->notes[note].port_count = count;
    for (size_t k = 0; k < count; k++) {
        m->given_ports = one_more(b, PORTS, m->given_ports, &m->given_port_count,
                                  sizeof *m->given_ports);
        const int i = (int)m->given_port_count - 1;
        m->given_ports[i] = ports[k];
    }
    return note;
}

kent_port kent_build_port(kent_vec3 direction, double pressure, double flow,
                          double inside_diameter)
{
    return (kent_port){.kind = KENT_PORT_GIVEN,
                       .direction = direction,
                       .inside_diameter = inside_diameter,
                       .seal_diameter = inside_diameter,
                       .outside_diameter = (double)NAN,
                       .level = (double)NAN,
                       .momentum_factor = 1.0,
                       .span = -1,
                       .toward = -1,
                       .pressure = pressure,
                       .flow = flow};
}

void kent_build_derive(kent_build *b)
{
    b->complaints = (kent_complaints){0};
    const kent_status status = kent_model_derive(b->model, &b->complaints);
    for (size_t i = 0; i < b->complaints.count && i < KENT_COMPLAINTS_KEPT; i++) {
        const kent_complaint *c = &b->complaints.kept[i];
        print_error("%s:%d: %s\n", c->file, c->line, c->what);
    }
    if (status != KENT_OK) {
        fail_msg("the model under test: %s", kent_status_text(status));
    }
    if (!kent_model_is_valid(b->model)) fail_msg("the model under test is not valid");
}

const char *kent_build_complaint(kent_build *b)
{
    b->complaints = (kent_complaints){0};
    if (kent_model_derive(b->model, &b->complaints) != KENT_E_INPUT) {
        fail_msg("the model under test was expected to be refused");
    }
    return b->complaints.kept[0].what;
}

void kent_build_refused(kent_build *b, const char *text, int line)
{
    const char *what = kent_build_complaint(b);
    if (!strstr(what, text)) fail_msg("\"%s\" is not in \"%s\"", text, what);
    assert_int_equal(b->complaints.count, 1);
    assert_string_equal(b->complaints.kept[0].file, "built.cfg");
    assert_int_equal(b->complaints.kept[0].line, line);
    kent_build_clear(b);
}

int kent_build_span_of(const kent_build *b, const char *id)
{
    for (size_t i = 0; i < b->model->span_count; i++) {
        if (strcmp(b->model->spans[i].id, id) == 0) return (int)i;
    }
    fail_msg("the model under test has no span \"%s\"", id);
    return -1;
}

int kent_build_fitting_of(const kent_build *b, const char *id)
{
    for (size_t i = 0; i < b->model->fitting_count; i++) {
        if (strcmp(b->model->fittings[i].id, id) == 0) return (int)i;
    }
    fail_msg("the model under test has no fitting \"%s\"", id);
    return -1;
}

int kent_build_node_of(const kent_build *b, const char *point)
{
    const int wanted = point_named(b, point);
    for (size_t i = 0; i < b->model->node_count; i++) {
        if (b->model->nodes[i].point == wanted) return (int)i;
    }
    fail_msg("the model under test has no node at \"%s\"", point);
    return -1;
}
