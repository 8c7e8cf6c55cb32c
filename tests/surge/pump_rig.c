#include "pump_rig.h"

#include "kent_check.h"

#include <math.h>
#include <string.h>

static const double PI = 3.14159265358979323846;
static const double GRAVITY = 9.81, DENSITY = 1000.0;

static kent_pump_curve curve_of(double specific_speed)
{
    const double share[] = {0.0, 0.5, 1.0, 1.25, 1.5};
    const double head[] = {62.5, 59.0, 50.0, 42.5, 31.0};
    const double efficiency[] = {0.0, 0.68, 0.84, 0.80, 0.66};
    kent_pump_curve c = {.count = 5,
                         .rated_flow = 0.2,
                         .rated_head = 50.0,
                         .rated_efficiency = 0.84,
                         .stages = 1,
                         .suctions = 1};
    for (size_t i = 0; i < c.count; i++) {
        c.flow[i] = share[i] * c.rated_flow;
        c.head[i] = head[i];
        c.efficiency[i] = efficiency[i];
    }
    c.rated_speed =
        specific_speed * pow(c.rated_head, 0.75) / sqrt(c.rated_flow) * PI / 30.0;
    assert_null(kent_pump_curve_complete(&c, DENSITY, GRAVITY));
    return c;
}

void rig_pump(rig *r, double specific_speed, int in_parallel, int running)
{
    memset(r, 0, sizeof *r);
    r->ops = &KENT_AT_PUMP;
    r->pump = (kent_pump){.id = "PS",
                          .in_parallel = in_parallel,
                          .running = running,
                          .curve = curve_of(specific_speed),
                          .inertia = 12.0,
                          .check_size = NAN,
                          .node = {-1, 1}};
}

void rig_event(rig *r, kent_action action, double start_time, double ramp_time,
               int how_many, double to)
{
    assert_true(r->scenario.event_count < RIG_EVENTS);
    r->events[r->scenario.event_count++] = (kent_event){.kind = KENT_EVENT_PUMP,
                                                        .action = action,
                                                        .how_many = how_many,
                                                        .start_time = start_time,
                                                        .ramp_time = ramp_time,
                                                        .to = to,
                                                        .period = NAN};
}

void rig_start(rig *r, double area, double wave_speed, double unit_flow, double step,
               size_t delay)
{
    kent_error err = {0};
    r->spans[0].area = area;
    r->nodes[1].end_count = 1;
    r->model = (kent_model){.water = {.density = DENSITY},
                            .gravity = GRAVITY,
                            .pumps = &r->pump,
                            .pump_count = 1,
                            .check_valves = &r->valve,
                            .check_valve_count = 1,
                            .scenarios = &r->scenario,
                            .scenario_count = 1,
                            .events = r->events,
                            .event_count = r->scenario.event_count,
                            .nodes = r->nodes,
                            .node_count = 2,
                            .ends = r->ends,
                            .spans = r->spans,
                            .span_count = 1};
    r->y = GRAVITY * area / wave_speed;
    r->step = step;
    r->delay = delay;
    r->flow = r->pump.running * unit_flow;
    r->head[0] = r->pump.suction_level;
    if (r->ops == &KENT_AT_PUMP && r->pump.running > 0) {
        const kent_pump_point p =
            kent_pump_at(&r->pump.curve, unit_flow, r->pump.curve.rated_speed);
        r->far_level = r->pump.suction_level + p.head -
                       r->pump.check_loss * unit_flow * fabs(unit_flow);
    }
    r->head[1] = r->far_level;
    r->sent[0] = r->head[1] + r->flow / r->y;
    assert_int_equal(kent_schedule_new(&r->model, 0, &r->schedule, &err), KENT_OK);
    assert_int_equal(r->ops->start(&r->state, &r->model, 0, r->flow, r->head, &err),
                     KENT_OK);
}

/* The wave that arrives: what was sent, turned round at the level of the far end. */
static double arriving(const rig *r)
{
    const size_t then = r->delay > 0 && r->steps >= r->delay ? r->steps - r->delay : 0;
    return 2.0 * r->far_level - r->sent[then];
}

kent_device_law rig_law(const rig *r, double flow)
{
    const double head[2] = {r->head[0], arriving(r) + flow / r->y};
    kent_device_law l = r->ops->law(&r->state, flow, head);
    l.by_flow += l.by_head[1] / r->y;
    return l;
}

/* By halving alone: nothing is assumed of the law but that it rises. */
static double flow_where_it_holds(const rig *r)
{
    if (rig_law(r, 0.0).f == 0.0) return 0.0;          /* shut */
    double low = r->flow, high = r->flow, wide = 1e-4; /* m3/s */
    while (rig_law(r, low).f > 0.0) {
        low -= wide *= 4.0;
    }
    while (rig_law(r, high).f < 0.0) {
        high += wide *= 4.0;
    }
    while (high - low > 1e-17 + 1e-16 * fabs(low)) {
        const double middle = 0.5 * (low + high), f = rig_law(r, middle).f;
        if (f == 0.0 || middle == low || middle == high) return middle;
        if (f < 0.0) {
            low = middle;
        } else {
            high = middle;
        }
    }
    return 0.5 * (low + high);
}

void rig_advance(rig *r)
{
    assert_true(r->steps < RIG_STEPS);
    r->steps++;
    r->time = (double)r->steps * r->step;
    r->ops->move(&r->state, r->schedule, r->time, r->step);
    r->flow = flow_where_it_holds(r);
    r->head[1] = arriving(r) + r->flow / r->y;
    r->sent[r->steps] = r->head[1] + r->flow / r->y;
    r->ops->settle(&r->state, r->flow, r->head);
}

void rig_clear(rig *r) { kent_schedule_free(r->schedule); }

double rig_told(const rig *r, int which)
{
    double told[KENT_TOLD] = {0};
    r->ops->tell(&r->state, told);
    return told[which];
}
