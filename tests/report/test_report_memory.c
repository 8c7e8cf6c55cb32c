/* Every allocation of every report refused once: each failure says so, nothing leaks
 * (ask the sanitizer), and what is written in the end is whole. */
#include "kent_alloc_fail.h"
#include "kent_check.h"
#include "kent_mixed.h"

#include <string.h>

typedef struct task {
    const kent_results *results;
    kent_status (*report)(const kent_results *r, kent_sink sink);
} task;

/* A sink that needs no memory of its own. */
static int swallow(void *to, const char *text, size_t length)
{
    (void)text;
    *(size_t *)to += length;
    return 0;
}

static int run(void *context)
{
    const task *t = context;
    size_t taken = 0;
    const kent_status status = t->report(t->results, (kent_sink){swallow, &taken});
    if (status) {
        assert_int_equal(status, KENT_E_NOMEM);
        return -1;
    }
    assert_true(taken > 0);
    return 0;
}

static const kent_report_options OPTIONS = {.units = KENT_SI};
static const kent_report_options WIDE = {.units = KENT_SI, .wide = true};

static kent_status tables(const kent_results *r, kent_sink sink)
{
    return kent_report_tables(r, &OPTIONS, sink);
}
static kent_status wide(const kent_results *r, kent_sink sink)
{
    return kent_report_tables(r, &WIDE, sink);
}
static kent_status summary(const kent_results *r, kent_sink sink)
{
    return kent_report_summary_csv(r, &OPTIONS, sink);
}
static kent_status json(const kent_results *r, kent_sink sink)
{
    return kent_report_json(r, sink);
}
static kent_status history(const kent_results *r, kent_sink sink)
{
    return kent_report_history_csv(r, 0, sink);
}
static kent_status profile(const kent_results *r, kent_sink sink)
{
    return kent_report_profile_csv(r, 0, sink);
}
static kent_status sensitivity(const kent_results *r, kent_sink sink)
{
    return kent_report_sensitivity_csv(r, sink);
}
static kent_status explain(const kent_results *r, kent_sink sink)
{
    return kent_report_explain(r, 0, &OPTIONS, sink);
}

static kent_status check(const kent_results *r, kent_sink sink)
{
    return kent_report_check(r->model, r->steadies, &OPTIONS, sink);
}
static kent_status keys(const kent_results *r, kent_sink sink)
{
    (void)r;
    return kent_report_keys(sink);
}

static void every_refused_allocation_is_said(void **state)
{
    (void)state;
    kent_status (*const REPORTS[])(const kent_results *r, kent_sink sink) = {
        tables,  wide,        summary, json,  history,
        profile, sensitivity, explain, check, keys};
    kent_mixed mixed = kent_mixed_new(false);
    kent_error err = {0};
    assert_int_equal(kent_sensitivity_run(mixed.build.model,
                                          &(kent_job_options){.threads = 1},
                                          &mixed.results->sensitivity, &err),
                     KENT_OK);
    for (size_t i = 0; i < sizeof REPORTS / sizeof REPORTS[0]; i++) {
        task t = {mixed.results, REPORTS[i]};
        assert_true(kent_allocations_needed(run, &t) > 0);
    }
    kent_mixed_clear(&mixed);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_refused_allocation_is_said),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
