#include "lone.h"

#include <math.h>
#include <string.h>

void lone_new(lone *l, const kent_device_ops *ops, double z)
{
    *l = (lone){.build = kent_build_new(), .ops = ops};
    kent_build *b = &l->build;
    b->model->gravity = 9.81;
    kent_build_point(b, "P", 0.0, 0.0, z);
    kent_build_point(b, "Q", 100.0, 0.0, z);
    kent_build_pipe(b, "1", "P Q", 0.5, 1000.0);
    kent_build_fixed_level(b, "Q", z + 20.0);
    kent_build_derive(b);
    l->model = *b->model;
}

static void take_model(lone *l)
{
    /* what a scenario of the test's has added since */
    l->model.scenarios = l->build.model->scenarios;
    l->model.scenario_count = l->build.model->scenario_count;
    l->model.events = l->build.model->events;
    l->model.event_count = l->build.model->event_count;
    l->model.law = l->build.model->law;
}

void lone_start(lone *l, double flow, double head0, double head1, double step)
{
    kent_error err = {0};
    take_model(l);
    l->flow = flow;
    l->head[0] = head0;
    l->head[1] = head1;
    l->step = step;
    const int scenario = l->model.scenario_count > 0 ? 0 : -1;
    assert_int_equal(kent_schedule_new(&l->model, scenario, &l->schedule, &err),
                     KENT_OK);
    if (l->ops->start(&l->state, &l->model, 0, flow, l->head, &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
}

void lone_refused(lone *l, double head0, const char *text)
{
    kent_error err = {0};
    const double head[2] = {head0, 0.0};
    assert_int_equal(l->ops->start(&l->state, &l->model, 0, 0.0, head, &err),
                     KENT_E_INPUT);
    if (!strstr(err.what, text)) fail_msg("%s", err.what);
    assert_string_equal(err.where, "built.cfg:7");
}

void lone_clear(lone *l)
{
    kent_schedule_free(l->schedule);
    kent_build_clear(&l->build);
}

static void heads_at(double flow, lone_line first, lone_line second, double head[2])
{
    head[0] = first.y > 0.0 ? first.c - flow / first.y : first.c;
    if (isnan(second.y)) return;
    head[1] = second.y > 0.0 ? second.c + flow / second.y : second.c;
}

static double left_open(const lone *l, double flow, lone_line first, lone_line second)
{
    double head[2] = {l->head[0], l->head[1]};
    heads_at(flow, first, second, head);
    return l->ops->law(&l->state, flow, head).f;
}

void lone_step(lone *l, lone_line first, lone_line second)
{
    double low = -1e-3, high = 1e-3;
    const double before = l->flow;

    l->time += l->step;
    l->ops->move(&l->state, l->schedule, l->time, l->step);
    while (left_open(l, low, first, second) > 0.0 && low > -1e6) {
        low *= 2.0;
    }
    while (left_open(l, high, first, second) < 0.0 && high < 1e6) {
        high *= 2.0;
    }
    if (!(low > -1e6 && high < 1e6)) fail_msg("no answer at %g s", l->time);
    double flow = 0.0; /* exactly, where that is it */
    if (left_open(l, 0.0, first, second) != 0.0) {
        for (int i = 0; i < 200; i++) {
            flow = 0.5 * (low + high);
            *(left_open(l, flow, first, second) > 0.0 ? &high : &low) = flow;
        }
    }
    l->flow = flow;
    heads_at(flow, first, second, l->head);
    l->ops->settle(&l->state, flow, l->head);
    l->through += 0.5 * l->step * (before + flow);
    if (l->ops->beyond && l->ops->beyond(&l->state)) {
        fail_msg("at %g s it %s", l->time, l->ops->beyond(&l->state));
    }
}

void lone_beside(lone *l, double c, double y)
{
    lone_step(l, (lone_line){c, y}, (lone_line){NAN, NAN});
}

void lone_column(lone *l, double inertia, double reservoir)
{
    /* (L/gA) (Q - Q0)/dt = reservoir - (H + H0)/2 */
    const double y = 0.5 * l->step / inertia;
    lone_beside(l, 2.0 * reservoir - l->head[0] + l->flow / y, y);
}

double lone_told(const lone *l, int which)
{
    double told[KENT_TOLD] = {NAN, NAN, NAN};
    l->ops->tell(&l->state, told);
    return told[which];
}

/* ---- a law's shape --------------------------------------------------------------- */

typedef struct place {
    double flow, head[2];
} place;

static double f_at(const lone *l, place p, int along, double by)
{
    if (along == 0) p.flow += by;
    if (along > 0) p.head[along - 1] += by;
    return l->ops->law(&l->state, p.flow, p.head).f;
}

/* Slope along flow (0), head[0] (1) or head[1] (2). Returns whether there is a kink. */
static bool check_slope(const lone *l, place p, int along, double sign)
{
    const kent_device_law law = l->ops->law(&l->state, p.flow, p.head);
    const double by = along == 0 ? 1e-7 : 1e-5;
    const double here = f_at(l, p, along, 0.0);
    const double up = (f_at(l, p, along, by) - here) / by;
    const double down = (here - f_at(l, p, along, -by)) / by;
    const double told = along == 0 ? law.by_flow : law.by_head[along - 1];
    const double scale = 1.0 + fabs(here) + fabs(told);
    if (sign * told < 0.0) fail_msg("slope %d is %g", along, told);
    if (sign * up < -1e-7 * scale || sign * down < -1e-7 * scale) {
        fail_msg("along %d it turns: %g, %g at %g m3/s", along, down, up, p.flow);
    }
    if (fabs(up - down) > 1e-3 * scale) return true;
    assert_within(told, 0.5 * (up + down), 1e-4 * scale);
    return false;
}

void lone_check_law(const lone *l, double flow, double head, bool in_line)
{
    enum { STEPS = 21 };
    int kinks = 0, places = 0;
    for (int i = 0; i < STEPS; i++) {
        for (int j = 0; j < STEPS; j++) {
            for (int k = 0; k < (in_line ? STEPS : 1); k++) {
                const place p = {
                    flow * (0.1031 * i - 1.0),
                    {l->head[0] + head * (0.1029 * j - 1.0),
                     in_line ? l->head[1] + head * (0.1027 * k - 1.0) : l->head[1]}};
                kinks += check_slope(l, p, 0, 1.0);
                kinks += check_slope(l, p, 1, -1.0);
                if (in_line) kinks += check_slope(l, p, 2, 1.0);
                places++;
            }
        }
    }
    if (kinks > places / 20) fail_msg("%d kinks in %d places", kinks, places);
}
