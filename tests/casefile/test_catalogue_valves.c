/* config/valves.cfg against published tables of losses. */
#include "case_text.h"

#include <math.h>

static const kent_valve_type *sure_valve(const kent_catalogue *c, const char *id)
{
    const kent_valve_type *v = kent_catalogue_valve(c, id);
    if (!v) print_error("no %s\n", id);
    assert_non_null(v);
    return v;
}

/* Every point of the published tables, and no more points in the catalogue. */
static void valves_lose_what_the_published_tables_say(void **state)
{
    (void)state;
    char path[300];
    char line[200];
    size_t points = 0;
    size_t wanted = 0;
    kent_catalogue *c = read_catalogue();
    (void)snprintf(path, sizeof path, "%s/tests/casefile/published/valve_losses.csv",
                   KENT_SOURCE_DIR);
    FILE *file = fopen(path, "r");
    assert_non_null(file);
    while (fgets(line, sizeof line, file)) {
        char *rest = line;
        const char *id = strsep(&rest, ",");
        if (line[0] == '#' || strcmp(id, "type") == 0) continue;
        const char *opening = strsep(&rest, ",");
        assert_non_null(rest);
        const kent_valve_type *v = sure_valve(c, id);
        const double want = sqrt(v->loss / strtod(rest, NULL));
        assert_close(kent_valve_relative_capacity(&v->curve, strtod(opening, NULL)),
                     want, 1e-12);
        points++;
    }
    assert_int_equal(fclose(file), 0);
    for (size_t i = 0; i < c->valve_count; i++) {
        const kent_valve_curve *curve = &c->valves[i].curve;
        if (curve->count == 0) continue;
        wanted += curve->count - 1; /* closed is the reader's */
        if (strcmp(c->valves[i].id, "butterfly") == 0 ||
            strcmp(c->valves[i].id, "plug") == 0) {
            wanted--; /* full opening too: the tables end at 5 degrees */
        }
    }
    assert_int_equal(points, 54);
    assert_int_equal(points, wanted);
    kent_catalogue_free(c);
}

/* K fully open: the tables above at their last opening; table B-7 of a pumping station
 * handbook, flanged valves (seen), lower ends of its ranges. */
static void open_valves_lose_what_the_published_tables_say(void **state)
{
    (void)state;
    static const struct {
        const char *id;
        double loss;
        bool curve;
    } ROWS[] = {{"butterfly", 0.24, true},
                {"plug", 0.05, true},
                {"gate", 0.17, true},
                {"gate-circular", 0.15, true},
                {"gate-wedge", 0.2, true},
                {"globe", 9.0, true},
                {"globe-bevel", 6.0, true},
                {"globe-composition", 6.0, true},
                {"diaphragm", 2.3, true},
                {"angle", 1.8, false},
                {"ball", 0.04, false},
                {"cone", 0.04, false},
                {"butterfly-25-lb", 0.16, false},
                {"butterfly-75-lb", 0.27, false},
                {"butterfly-150-lb", 0.35, false},
                {"pinch", 0.2, false},
                {"gate-double-disc", 0.1, false},
                {"gate-resilient-seat", 0.3, false},
                {"knife-gate", 0.2, false},
                {"globe-flanged", 4.0, false},
                {"plug-lubricated", 0.5, false},
                {"plug-eccentric-80", 1.0, false},
                {"plug-eccentric", 0.5, false},
                {"check-ball", 0.9, false},
                {"check-globe", 2.6, false},
                {"check-double-door", 1.2, false},
                {"check-flapper", 1.1, false},
                {"check-slanting-disc", 0.25, false},
                {"check-swing", 0.6, false}};
    kent_catalogue *c = read_catalogue();
    assert_int_equal(c->valve_count, sizeof ROWS / sizeof ROWS[0]);
    for (size_t i = 0; i < c->valve_count; i++) {
        const kent_valve_type *v = sure_valve(c, ROWS[i].id);
        assert_close(v->loss, ROWS[i].loss, 1e-12);
        assert_int_equal(v->curve.count > 0, ROWS[i].curve);
        assert_true(v->from.source[0] != '\0' && v->from.status[0] != '\0');
    }
    kent_catalogue_free(c);
}

static void valves_pass_less_the_less_they_are_open(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < c->valve_count; i++) {
        const kent_valve_type *v = &c->valves[i];
        double before = 0.0;
        if (v->curve.count == 0) continue;
        for (int k = 0; k <= 100; k++) {
            const double now = kent_valve_relative_capacity(&v->curve, 0.01 * k);
            assert_true(k == 0 ? now <= 0.0 : now >= before);
            assert_true(k == 0 || k > 94 || now > before); /* 5 degrees: open */
            before = now;
        }
        assert_close(before, 1.0, 1e-12);
    }
    kent_catalogue_free(c);
}

/* Two published tables of one thing. A wedge gate: 0.9, 4.5 and 24 against 1.15, 5.6
 * and 24 at three quarters, half and a quarter. A water engineers' examination text
 * (seen): a butterfly valve at 40 and 70 degrees has K 10 and 320, where the table here
 * has 10.8 and 751: near closed a curve is a guess. */
static void how_far_published_tables_agree(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    const kent_valve_curve *one = &sure_valve(c, "gate")->curve;
    const kent_valve_curve *other = &sure_valve(c, "gate-wedge")->curve;
    const kent_valve_type *b = sure_valve(c, "butterfly");
    for (int k = 1; k <= 3; k++) {
        assert_close(kent_valve_relative_capacity(one, 0.25 * k),
                     kent_valve_relative_capacity(other, 0.25 * k), 0.1);
    }
    assert_close(kent_valve_relative_capacity(&b->curve, 1.0 - 40.0 / 90.0),
                 sqrt(b->loss / 10.0), 0.05);
    const double near_closed =
        kent_valve_relative_capacity(&b->curve, 1.0 - 70.0 / 90.0);
    assert_close(near_closed / sqrt(b->loss / 320.0), sqrt(320.0 / 751.0), 0.01);
    kent_catalogue_free(c);
}

/* Relative capacities worked out apart from the program, sqrt(K open/K), from the same
 * tables (derived, to four digits). Those of the butterfly valve take 0.30 for the open
 * valve, which no row of its table has, in place of 0.24 at 5 degrees. */
static void capacities_are_those_worked_out_apart(void **state)
{
    (void)state;
    static const struct {
        const char *id;
        double opening, capacity, open; /* K of the open valve; 0: the catalogue's */
    } ROWS[] = {{"butterfly", 0.8889, 0.7596, 0.30},
                {"butterfly", 0.5, 0.1267, 0.30},
                {"butterfly", 0.2222, 0.0200, 0.30},
                {"plug", 0.8889, 0.4152, 0.0},
                {"plug", 0.5, 0.0400, 0.0},
                {"plug", 0.2778, 0.0101, 0.0},
                {"gate-circular", 0.75, 0.7596, 0.0},
                {"gate-circular", 0.5, 0.2698, 0.0},
                {"gate-circular", 0.125, 0.0392, 0.0},
                {"gate", 0.75, 0.4346, 0.0},
                {"gate", 0.25, 0.0842, 0.0},
                {"gate-wedge", 0.75, 0.4170, 0.0},
                {"gate-wedge", 0.25, 0.0913, 0.0},
                {"globe", 0.75, 0.8321, 0.0},
                {"globe", 0.25, 0.2835, 0.0},
                {"diaphragm", 0.75, 0.9405, 0.0},
                {"diaphragm", 0.25, 0.3309, 0.0}};
    kent_catalogue *c = read_catalogue();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        const kent_valve_type *v = sure_valve(c, ROWS[i].id);
        const double open = ROWS[i].open > 0.0 ? ROWS[i].open : v->loss;
        assert_within(kent_valve_relative_capacity(&v->curve, ROWS[i].opening) *
                          sqrt(open / v->loss),
                      ROWS[i].capacity, 6e-5);
    }
    kent_catalogue_free(c);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(valves_lose_what_the_published_tables_say),
        cmocka_unit_test(open_valves_lose_what_the_published_tables_say),
        cmocka_unit_test(valves_pass_less_the_less_they_are_open),
        cmocka_unit_test(how_far_published_tables_agree),
        cmocka_unit_test(capacities_are_those_worked_out_apart),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
