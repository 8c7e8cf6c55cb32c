/* Every allocation of the stage refused once: it says so, leaks nothing (the sanitizers
 * look) and leaves model and steady state as they were. */
#include "kent_alloc_fail.h"
#include "kent_check.h"
#include "kent_net.h"

#include <math.h>

/* Recorder, a scenario of two instants, load cases and one hand calculation. */
static int whole_stage(void *context)
{
    const kent_net *n = context;
    static const double TIME[2] = {0.0, 0.1}, HEAD[24] = {90.0}, FLOW[24] = {0.1};
    kent_error err = {0};
    kent_recorder *r = NULL;
    kent_loads_result *loads = NULL;
    kent_derivation d = {0};
    size_t watches = 0;

    kent_status status = kent_recorder_new(n->model, &n->steady, &r, &err);
    if (status) goto done;
    (void)kent_recorder_watches(r, &watches);
    const kent_trace trace = {
        .count = 2, .watch_count = watches, .time = TIME, .head = HEAD, .flow = FLOW};
    assert_true(2 * watches <= 24);
    kent_recorder_start(r, 0, 0.1);
    kent_recorder_take(r, 0, &trace);
    status = kent_recorder_finish(r, NULL, &loads, &err);
    if (status) goto done;
    kent_loads_derive(n->model, &n->model->fittings[0], &loads->fittings[0].cases[0],
                      KENT_RESULTANT, &d);
    if (d.failed) status = kent_error_nomem(&err);
done:
    kent_derivation_clear(&d);
    kent_loads_free(loads);
    kent_recorder_free(r);
    assert_int_equal(status, err.status);
    assert_true(status == KENT_OK || status == KENT_E_NOMEM);
    return status != KENT_OK;
}

static void every_refused_allocation_is_reported(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, 20.0);
    (void)kent_build_point(&b, "P", 600.0, 0.0, 20.0);
    (void)kent_build_point(&b, "Q", 600.0, 300.0, 20.0);
    (void)kent_build_point(&b, "E", 900.0, 300.0, 20.0);
    (void)kent_build_pipe(&b, "A", "R P Q E", 0.5, 1000.0);
    b.model->pipes[0].above_ground = true; /* runs, and ends of a string */
    b.model->pipes[0].joint = KENT_FUSED;
    (void)kent_build_fixed_level(&b, "R", 100.0);
    (void)kent_build_valve(&b, "VE", "E", 0.05, 20.0);
    (void)kent_build_scenario(&b, "shut", 2.5);
    const int note = kent_build_note(&b, "P");
    b.model->notes[note].face = 0.5;
    kent_net n = kent_net_of(b);
    const long needed = kent_allocations_needed(whole_stage, &n);
    assert_true(needed >= 8);
    kent_net_clear(&n);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_refused_allocation_is_reported),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
