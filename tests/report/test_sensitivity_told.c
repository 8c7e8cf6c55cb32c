/* What `run --sensitivity` prints and writes against the numbers behind it. */
#include "kent_check.h"
#include "kent_mixed.h"

#include <jansson.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const double BAR = 1e5, PSI = 6894.757293168361; /* Pa */

/* The main with something of everything, varied; its closures with more time "stopped".
 */
static kent_mixed varied_main(void)
{
    kent_mixed mixed = kent_mixed_new(false);
    kent_error err = {0};
    kent_sensitivity **s = &mixed.results->sensitivity;
    const kent_job_options o = {.threads = 2};
    assert_int_equal(kent_sensitivity_run(mixed.build.model, &o, s, &err), KENT_OK);
    free((*s)->varied[KENT_VARY_EVENT_TIME][KENT_MORE]);
    (*s)->varied[KENT_VARY_EVENT_TIME][KENT_MORE] = NULL;
    (void)kent_error_set(&(*s)->stopped[KENT_VARY_EVENT_TIME][KENT_MORE], KENT_E_SOLVE,
                         "", "the tank ST ran dry");
    return mixed;
}

static void assert_says(const kent_text *text, const char *words)
{
    if (!strstr(kent_text_of(text), words)) {
        fail_msg("no \"%s\" in:\n%s", words, kent_text_of(text));
    }
}

/* "-0.12 / +0.34" as the table writes it. */
static void add_pair(char *out, size_t size, double less, double more, int decimals)
{
    char a[32], b[32];
    (void)snprintf(a, sizeof a, "%+.*f", decimals, less);
    (void)snprintf(b, sizeof b, "%+.*f", decimals, more);
    const bool no_a = strspn(a, "+-0.") == strlen(a),
               no_b = strspn(b, "+-0.") == strlen(b);
    (void)snprintf(out, size, "%s / %s", a + (no_a ? 1 : 0), b + (no_b ? 1 : 0));
}

static void tables_tell_changes_in_their_units(void **state)
{
    (void)state;
    kent_mixed mixed = varied_main();
    const kent_sensitivity *s = mixed.results->sensitivity;
    for (int us = 0; us < 2; us++) {
        const kent_report_options o = {.units = us ? KENT_US : KENT_SI, .wide = true};
        kent_text text = {0};
        assert_int_equal(kent_report_tables(mixed.results, &o, kent_mixed_sink(&text)),
                         KENT_OK);
        size_t moving = 0;
        for (size_t i = 0; i < s->fitting_count; i++) {
            char pair[80];
            const double unit = us ? PSI : BAR;
            const kent_gauge *const *w =
                (const kent_gauge *const *)s->varied[KENT_VARY_WAVE_SPEED];
            if (isnan(s->base[i].highest)) continue;
            add_pair(pair, sizeof pair,
                     (w[KENT_LESS][i].highest - s->base[i].highest) / unit,
                     (w[KENT_MORE][i].highest - s->base[i].highest) / unit, us ? 1 : 2);
            assert_says(&text, pair);
            moving += strchr(pair, '+') != NULL;
        }
        assert_true(moving > 0);
        assert_says(&text, "wave speed -10/+10 %");
        assert_says(&text, "/ stopped");
        assert_says(&text, "event times, more: the march stopped: the tank ST ran dry");
        assert_says(&text,
                    "Not run, since nothing here hangs on it: pump inertia, check "
                    "valves, air valves.");
        kent_text_clear(&text);
    }
    kent_mixed_clear(&mixed);
}

static void json_has_a_row_for_each(void **state)
{
    (void)state;
    kent_mixed mixed = varied_main();
    const kent_sensitivity *s = mixed.results->sensitivity;
    const char *const WHAT[] = {"nothing", "wave speed", "wave speed", "event times",
                                "event times"};
    const double FACTOR[] = {1.0, 0.9, 1.1, 0.8, 1.2};
    const kent_gauge *from[] = {s->base, s->varied[KENT_VARY_WAVE_SPEED][KENT_LESS],
                                s->varied[KENT_VARY_WAVE_SPEED][KENT_MORE],
                                s->varied[KENT_VARY_EVENT_TIME][KENT_LESS], NULL};
    enum { EACH = sizeof WHAT / sizeof WHAT[0] };
    kent_text text = {0};
    json_error_t error;
    assert_int_equal(kent_report_json(mixed.results, kent_mixed_sink(&text)), KENT_OK);
    json_t *root = json_loads(kent_text_of(&text), 0, &error);
    assert_non_null(root);
    const json_t *rows = json_object_get(root, "sensitivity");
    assert_int_equal(json_array_size(rows), EACH * s->fitting_count);
    for (size_t k = 0; k < EACH * s->fitting_count; k++) {
        const json_t *row = json_array_get(rows, k);
        const kent_gauge *g = from[k % EACH] ? &from[k % EACH][k / EACH] : NULL;
        const json_t *high = json_object_get(row, "highest_Pa");
        assert_string_equal(json_string_value(json_object_get(row, "moved")),
                            WHAT[k % EACH]);
        assert_close(json_real_value(json_object_get(row, "factor")), FACTOR[k % EACH],
                     1e-15);
        assert_int_equal(json_is_true(json_object_get(row, "stopped")), !g);
        if (g && isfinite(g->highest)) {
            assert_close(json_real_value(high), g->highest, 1e-15);
        } else {
            assert_true(json_is_null(high));
        }
    }
    json_decref(root);
    kent_text_clear(&text);
    kent_mixed_clear(&mixed);
}

static void csv_has_a_row_for_each(void **state)
{
    (void)state;
    kent_mixed mixed = varied_main();
    kent_text text = {0};
    size_t lines = 0, stopped = 0;
    assert_int_equal(kent_report_sensitivity_csv(mixed.results, kent_mixed_sink(&text)),
                     KENT_OK);
    for (const char *at = kent_text_of(&text); *at != '\0'; at++) {
        lines += *at == '\n';
        stopped += strncmp(at, "event times,1.2,stopped,,,,,,,,\n", 32) == 0;
    }
    assert_int_equal(lines, 1 + 5 * mixed.results->sensitivity->fitting_count);
    assert_int_equal(stopped, mixed.results->sensitivity->fitting_count);
    kent_text_clear(&text);
    kent_mixed_clear(&mixed);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(tables_tell_changes_in_their_units),
        cmocka_unit_test(json_has_a_row_for_each),
        cmocka_unit_test(csv_has_a_row_for_each),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
