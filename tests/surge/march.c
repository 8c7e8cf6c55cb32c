#include "march.h"

march march_new(kent_build *b, double duration, int scenario, const kent_watch *watches,
                size_t watch_count, size_t block)
{
    march m = {.build = b};
    kent_error err = {0};
    kent_build_derive(b);
    if (kent_steady_solve(b->model, &m.steady, &err) != KENT_OK ||
        kent_grid_plan(b->model, duration, &m.grid, &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
    m.marcher = march_marcher(&m, scenario, watches, watch_count, block);
    return m;
}

kent_marcher *march_marcher(const march *m, int scenario, const kent_watch *watches,
                            size_t watch_count, size_t block)
{
    kent_marcher *k = NULL;
    kent_error err = {0};
    if (kent_marcher_new(m->build->model, m->steady, m->grid, scenario, watches,
                         watch_count, block, &k, &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
    return k;
}

void march_clear(march *m)
{
    kent_marcher_free(m->marcher);
    kent_grid_free(m->grid);
    kent_steady_free(m->steady);
    *m = (march){0};
}

void march_until(march *m, double time, double *head, double *flow)
{
    kent_trace trace = {0};
    kent_error err = {0};
    do {
        if (kent_marcher_advance(m->marcher, 1, &trace, &err) != 1) {
            fail_msg("%s", err.what);
        }
    } while (trace.time[0] < time - 1e-9);
    *head = trace.head[0];
    *flow = trace.flow[0];
}
