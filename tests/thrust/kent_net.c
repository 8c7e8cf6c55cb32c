#include "kent_net.h"

#include "kent_check.h"

#include <stdlib.h>
#include <string.h>

kent_net kent_net_of(kent_build build)
{
    kent_net n = {.build = build, .model = build.model};
    kent_error err = {0};

    kent_build_derive(&n.build);
    if (kent_steady_solve(n.model, &n.steady, &err)) fail_msg("%s", err.what);
    n.states = malloc(sizeof(kent_steady *));
    assert_non_null(n.states);
    n.states[0] = n.steady;
    if (kent_recorder_new(n.model, n.states, &n.recorder, &err)) {
        fail_msg("%s", err.what);
    }
    n.watches = kent_recorder_watches(n.recorder, &n.watch_count);
    assert_true(n.watch_count <= KENT_NET_WATCHES);
    return n;
}

void kent_net_clear(kent_net *n)
{
    kent_loads_free(n->loads);
    kent_recorder_free(n->recorder);
    free(n->states);
    kent_steady_free(n->steady);
    kent_build_clear(&n->build);
    *n = (kent_net){0};
}

void kent_net_finish(kent_net *n)
{
    kent_error err = {0};

    kent_loads_free(n->loads);
    n->loads = NULL;
    if (kent_recorder_finish(n->recorder, NULL, &n->loads, &err)) {
        fail_msg("%s", err.what);
    }
}

const kent_fitting *kent_net_fitting(const kent_net *n, const char *id)
{
    return &n->model->fittings[kent_build_fitting_of(&n->build, id)];
}

const kent_load_case *kent_net_case(const kent_net *n, const char *fitting,
                                    const char *name)
{
    const kent_fitting_loads *loads =
        &n->loads->fittings[kent_build_fitting_of(&n->build, fitting)];

    for (size_t i = 0; i < loads->count; i++) {
        if (strcmp(loads->cases[i].name, name) == 0) return &loads->cases[i];
    }
    fail_msg("fitting \"%s\" has no case \"%s\"", fitting, name);
    return NULL;
}

void kent_made_add(kent_made *t, const kent_net *n, double time, double head,
                   double flow)
{
    const size_t row = t->count++;

    assert_true(row < KENT_NET_ROWS);
    t->watch_count = n->watch_count;
    t->time[row] = time;
    for (size_t i = 0; i < n->watch_count; i++) {
        t->head[row * n->watch_count + i] = head;
        t->flow[row * n->watch_count + i] = flow;
    }
}

void kent_made_take(const kent_made *t, kent_net *n, int scenario, double step,
                    size_t block)
{
    kent_recorder_start(n->recorder, scenario, step);
    for (size_t row = 0; row < t->count; row += block) {
        const size_t left = t->count - row;
        const kent_trace trace = {.count = left < block ? left : block,
                                  .watch_count = t->watch_count,
                                  .time = t->time + row,
                                  .head = t->head + row * t->watch_count,
                                  .flow = t->flow + row * t->watch_count};
        kent_recorder_take(n->recorder, scenario, &trace);
    }
}
