#include "kent_queue.h"
#include "kent_alloc_fail.h"
#include "kent_check.h"

#include <stdatomic.h>
#include <string.h>

enum { JOBS = 500 };

typedef struct tally {
    atomic_int times[JOBS];
    double result[JOBS];
} tally;

static void do_one(void *context, size_t index)
{
    tally *t = context;
    atomic_fetch_add(&t->times[index], 1);
    double sum = 0.0;
    for (size_t i = 1; i <= index; i++) {
        sum += 1.0 / (double)i;
    }
    t->result[index] = sum;
}

static void every_job_runs_once_whatever_the_threads(void **state)
{
    (void)state;
    static tally alone, many;
    memset(&alone, 0, sizeof alone);
    kent_queue_run(JOBS, 1, do_one, &alone);
    const unsigned threads[] = {0, 2, 7, JOBS + 100};
    for (size_t k = 0; k < sizeof threads / sizeof threads[0]; k++) {
        memset(&many, 0, sizeof many);
        kent_queue_run(JOBS, threads[k], do_one, &many);
        for (size_t i = 0; i < JOBS; i++) {
            assert_int_equal(atomic_load(&many.times[i]), 1);
            assert_memory_equal(&many.result[i], &alone.result[i], sizeof(double));
        }
    }
}

static void no_jobs_are_done_at_once(void **state)
{
    (void)state;
    static tally t;
    memset(&t, 0, sizeof t);
    kent_queue_run(0, 4, do_one, &t);
    assert_int_equal(atomic_load(&t.times[0]), 0);
}

static void without_memory_for_threads_the_caller_does_it_all(void **state)
{
    (void)state;
    static tally t;
    memset(&t, 0, sizeof t);
    kent_allocations_grant(0);
    kent_queue_run(JOBS, 4, do_one, &t);
    kent_allocations_grant(-1);
    for (size_t i = 0; i < JOBS; i++) {
        assert_int_equal(atomic_load(&t.times[i]), 1);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_job_runs_once_whatever_the_threads),
        cmocka_unit_test(no_jobs_are_done_at_once),
        cmocka_unit_test(without_memory_for_threads_the_caller_does_it_all),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
