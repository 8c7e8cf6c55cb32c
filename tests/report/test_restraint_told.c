/* What is printed and kept of blocks, joints, systems and cautions. The mixed main is
 * invented; what is expected of it comes from the results themselves, not from what was
 * printed. */
#include "kent_check.h"
#include "kent_mixed.h"
#include "kent_shown.h"

#include <jansson.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static kent_text printed(const kent_results *r, bool wide)
{
    const kent_report_options o = {.units = KENT_SI, .wide = wide};
    kent_text out = {0};
    assert_int_equal(kent_report_tables(r, &o, kent_mixed_sink(&out)), KENT_OK);
    return out;
}

static const char *find(const char *text, const char *words)
{
    const char *at = strstr(text, words);
    if (!at) fail_msg("'%s' is not in:\n%s", words, text);
    return at;
}

static size_t times(const char *text, const char *words)
{
    size_t count = 0;
    for (const char *s = text; (s = strstr(s, words)) != NULL; s += strlen(words)) {
        count++;
    }
    return count;
}

static size_t index_of(const kent_model *m, const char *id)
{
    for (size_t i = 0; i < m->fitting_count; i++) {
        if (strcmp(m->fittings[i].id, id) == 0) return i;
    }
    fail_msg("no fitting %s", id);
    return 0;
}

static kent_holding *holding(kent_results *r, const char *id)
{
    return &r->restraints->fittings[index_of(r->model, id)];
}

/* ---- cautions -------------------------------------------------------------------- */

static void the_unsafe_is_said_first_and_alike_ones_as_one(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    kent_results *r = mixed.results;
    kent_notes_add(&holding(r, "CR")->cautions, "'till' is told lightly of 7 kPa.");
    kent_notes_add(&holding(r, "B7")->cautions, "'till' is told lightly of 3.5 kPa.");
    kent_notes_warn(&holding(r, "CR")->cautions, "pushed by 12.5 kN in 'fast/1'");
    kent_notes_warn(&holding(r, "V8")->cautions, "pushed by -4 kN in 'slow'");
    kent_notes_warn(&holding(r, "B7")->cautions, "pushed by 12.5 kN in 'slow'");
    kent_notes_warn(&r->cautions, "7 pipes break in 'fast/1'");
    kent_notes_warn(&r->cautions, "8 pipes break in 'fast/1'");
    kent_notes_warn(&r->cautions, "8 pipes break in 'slow'");
    kent_text out = printed(r, false);
    const char *text = kent_text_of(&out);
    const char *grave = find(text, "pushed by -4 to 12.5 kN in ");
    const char *light = find(text, ": 'till' is told lightly of 3.5 to 7 kPa.\n");
    assert_true(grave < light);
    assert_int_equal(times(text, "pushed by"), 1);
    find(text, "B7"); /* named */
    /* of the case before fittings, and told apart by its figures */
    assert_true(find(text, "!  7 pipes break in 'fast/1'\n") < grave);
    assert_true(find(text, "!  8 pipes break in 'fast/1', 'slow'\n") < grave);
    assert_true(light < find(text, "-  two surveys disagree, says the case"));
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

/* Whatever a fitting or the case is cautioned of stands in the table, in full or with
 * its figures put together: of a text's words none is lost. */
static void no_caution_is_dropped(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    kent_text out = printed(mixed.results, true);
    const kent_restraints *all = mixed.results->restraints;
    size_t looked_at = 0;
    for (size_t i = 0; i < all->fitting_count; i++) {
        const kent_notes *notes = &all->fittings[i].cautions;
        for (size_t k = 0; k < notes->count; k++) {
            /* up to the first figure or quoted name, its words are the same */
            char words[200];
            const size_t length = strcspn(notes->text[k], "0123456789'\"");
            if (length < 12 || length >= sizeof words) continue;
            (void)snprintf(words, sizeof words, "%.*s", (int)length - 1,
                           notes->text[k]);
            find(kent_text_of(&out), words);
            looked_at++;
        }
    }
    assert_true(looked_at > 5);
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

static void what_is_unsafe_stands_by_itself_in_the_results(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    kent_text out = {0};
    kent_notes_warn(&holding(mixed.results, "CR")->cautions, "gives way");
    kent_notes_warn(&mixed.results->cautions, "bursts");
    assert_int_equal(kent_report_json(mixed.results, kent_mixed_sink(&out)), KENT_OK);
    json_t *all = json_loads(kent_text_of(&out), JSON_REJECT_DUPLICATES, NULL);
    assert_non_null(all);
    const json_t *unsafe = json_object_get(all, "unsafe");
    const size_t last = json_array_size(unsafe) - 1;
    assert_string_equal(json_string_value(json_array_get(unsafe, last)), "bursts");
    const json_t *one = json_array_get(json_object_get(all, "fittings"),
                                       index_of(mixed.build.model, "CR"));
    const json_t *own = json_object_get(one, "unsafe");
    assert_true(json_array_size(own) > 0);
    assert_true(json_array_size(own) <
                json_array_size(json_object_get(one, "cautions")));
    json_decref(all);
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

/* ---- totals ---------------------------------------------------------------------- */

static void the_totals_add_up(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_restraints *all = mixed.results->restraints;
    double dug = 0.0, formed = 0.0, length = 0.0;
    for (size_t i = 0; i < all->fitting_count; i++) {
        dug += all->fittings[i].quantities.excavation;
        formed += all->fittings[i].quantities.formed;
    }
    for (size_t i = 0; i < all->systems.stretch_count; i++) {
        length += all->systems.stretches[i].to - all->systems.stretches[i].from;
    }
    assert_true(dug > 0.0 && formed > 0.0 && length > 0.0);
    kent_text out = printed(mixed.results, true);
    char words[80];
    (void)snprintf(words, sizeof words, "excavation %.1f m³, forms %.1f m²", dug,
                   formed);
    find(kent_text_of(&out), words);
    (void)snprintf(words, sizeof words, "no test before %.0f days", all->age / 86400.0);
    find(kent_text_of(&out), words);
    (void)snprintf(words, sizeof words, "over %.2f m. ", length);
    find(kent_text_of(&out), words);
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

/* ---- block and joints ------------------------------------------------------------ */

static void a_block_is_looked_at_in_place_of_joints(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_holding *end = holding(mixed.results, "DE"); /* by joints, as asked */
    assert_int_equal(end->chosen, KENT_RESTRAINED_JOINTS);
    assert_int_equal(end->block.type, KENT_BLOCK_NONE);
    assert_true(end->either.joints && !end->either.no_block);
    /* the least face: thrust with its factor over what the soil bears */
    const kent_block *b = &end->either.block;
    assert_int_equal(b->type, KENT_BLOCK_BEARING);
    const double area =
        end->factor_asked *
        kent_vec3_length(
            mixed.results->loads->fittings[index_of(mixed.results->model, "DE")]
                .cases[end->governing]
                .worst[KENT_RESULTANT]
                .balance.thrust) /
        150e3;
    assert_true(b->width * b->height >= 0.99 * area);
    assert_true(b->width * b->height <= 1.3 * area);
    assert_close(end->either.quantities.concrete, b->volume, 1e-9);
    /* the same block is built where it is asked for */
    const kent_holding *bend = holding(mixed.results, "VC");
    assert_true(bend->held);
    assert_close(bend->either.block.volume, bend->block.volume, 1e-12);
    assert_close(bend->either.quantities.excavation, bend->quantities.excavation,
                 1e-12);
    /* peat bears neither */
    const kent_holding *peat = holding(mixed.results, "PT");
    assert_int_equal(peat->either.block.type, KENT_BLOCK_NONE);
    assert_string_equal(peat->either.no_block, "ground holds nothing");
    assert_false(peat->either.joints);
    kent_mixed_clear(&mixed);
}

static void block_and_joints_stand_side_by_side(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    kent_text out = printed(mixed.results, false);
    const char *table = find(kent_text_of(&out), "\nBlock, or restrained joints\n");
    const kent_holding *end = holding(mixed.results, "DE");
    const char *row = find(table, "\nDE ");
    char words[80];
    (void)snprintf(words, sizeof words, "block %.2f×%.2f×%.2f", end->either.block.width,
                   end->either.block.height, end->either.block.thickness);
    assert_true(find(row, words) < strchr(row + 1, '\n'));
    (void)snprintf(words, sizeof words, " %.1f ", end->legs[0].length);
    assert_true(find(row, words) < strchr(row + 1, '\n'));
    find(find(table, "\nPT "), "block: ground holds nothing");
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

static void the_hand_calculation_tells_of_a_block_instead(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_report_options o = {.units = KENT_SI};
    const int end = (int)index_of(mixed.results->model, "DE");
    kent_holding *h = holding(mixed.results, "DE");
    char words[80];
    kent_text out = {0};
    assert_int_equal(kent_report_explain(mixed.results, end, &o, kent_mixed_sink(&out)),
                     KENT_OK);
    (void)snprintf(words, sizeof words, "A block instead: block %.2f × %.2f × %.2f m, ",
                   h->either.block.width, h->either.block.height,
                   h->either.block.thickness);
    find(kent_text_of(&out), words);
    kent_text_reset(&out);
    h->either.block.type = KENT_BLOCK_NONE;
    h->either.no_block = "too large";
    assert_int_equal(kent_report_explain(mixed.results, end, &o, kent_mixed_sink(&out)),
                     KENT_OK);
    find(kent_text_of(&out), "A block instead: none: too large.");
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

static void both_parts_have_a_row_where_two_hold_a_fitting(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    kent_holding *h = holding(mixed.results, "VC");
    kent_part parts[KENT_PARTS];
    const kent_fitting_loads *loads =
        &mixed.results->loads->fittings[index_of(mixed.results->model, "VC")];
    assert_int_equal(kent_shown_parts(loads, h, parts), 1);
    h->chosen = KENT_BLOCK_AND_JOINTS;
    h->joints_use = 0.8;
    assert_int_equal(kent_shown_parts(loads, h, parts), 2);
    assert_false(parts[0].joints);
    assert_true(parts[1].joints);
    assert_close(parts[0].utilisation, h->block.utilisation, 1e-12);
    assert_close(parts[1].factor_reached, h->factor_asked / 0.8, 1e-9);
    kent_text out = printed(mixed.results, false);
    char words[80];
    (void)snprintf(words, sizeof words, "joints %.1f m", h->restrained_length);
    find(kent_text_of(&out), words);
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

static void straps_are_told_by_number_and_diameter(void **state)
{
    (void)state;
    const kent_straps metric = {.legs = 4, .diameter = 0.016};
    const kent_straps inches = {.legs = 2, .diameter = 0.625 * 0.0254};
    assert_string_equal(kent_shown_straps(&metric, KENT_SI).text, "4ø16");
    assert_string_equal(kent_shown_straps(&inches, KENT_US).text, "2ø0.625");
    assert_string_equal(kent_shown_straps(&(kent_straps){0}, KENT_SI).text, "–");
    kent_mixed mixed = kent_mixed_new(false);
    kent_holding *crest = holding(mixed.results, "CR");
    assert_int_equal(crest->block.type, KENT_BLOCK_GRAVITY);
    crest->straps = metric;
    kent_text out = printed(mixed.results, false);
    find(kent_text_of(&out), " m³, 4ø16 ");
    find(kent_text_of(&out), "w × h × t m, ø mm");
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

/* ---- the schedule ---------------------------------------------------------------- */

static void restrained_pipe_is_listed_by_stations(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_systems *all = &mixed.results->restraints->systems;
    assert_true(all->count > 0);
    kent_text out = printed(mixed.results, false);
    const char *table = find(kent_text_of(&out), "\nRestrained pipe: every joint from");
    for (size_t i = 0; i < all->stretch_count; i++) {
        const kent_stretch *s = &all->stretches[i];
        find(table, kent_shown_station(KENT_SI, s->station_from).text);
        find(table, kent_shown_station(KENT_SI, s->station_to).text);
    }
    find(table, "S1 ");
    find(kent_text_of(&out), ", S1 "); /* in the table of fittings */
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

static void neighbours_are_listed(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    kent_space *space = &mixed.results->restraints->space;
    const kent_neighbour met = {.fitting = index_of(mixed.results->model, "VC"),
                                .other = (int)index_of(mixed.results->model, "CR"),
                                .pipe = -1,
                                .how = KENT_MEETS_SHARED,
                                .clear = 1.25,
                                .share = 0.31};
    kent_space_clear(space);
    kent_text out = printed(mixed.results, false);
    assert_null(strstr(kent_text_of(&out), "Neighbours"));
    kent_text_clear(&out);
    space->met = kent_alloc(2, sizeof *space->met);
    assert_non_null(space->met);
    space->met[0] = space->met[1] = met;
    space->met[1].how = KENT_MEETS_MAIN;
    space->met[1].other = -1;
    space->met[1].pipe = 2;
    space->count = 2;
    out = printed(mixed.results, false);
    const char *table = find(kent_text_of(&out), "\nNeighbours that share ground\n");
    find(table, "both lean on the same ground      1.25             31");
    find(table, "a main runs through this ground");
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

/* ---- summary.csv ----------------------------------------------------------------- */

/* Field `column` (from 0) of a line without quotes in it before. */
static double field(const char *csv, const char *head, const char *id)
{
    size_t column = 0;
    const char *at = find(csv, head);
    assert_true(at < strchr(csv, '\n'));
    for (const char *s = csv; s < at; s++) {
        column += *s == ',';
    }
    char line[64];
    (void)snprintf(line, sizeof line, ",%s,", id);
    const char *row = find(csv, line);
    while (row > csv && row[-1] != '\n') {
        row--;
    }
    bool quoted = false;
    for (size_t commas = 0; commas < column; row++) {
        assert_true(*row != '\0');
        quoted ^= *row == '"';
        commas += *row == ',' && !quoted;
    }
    return *row == ',' || *row == '\n' ? (double)NAN : strtod(row, NULL);
}

static void the_summary_holds_what_holds_a_fitting(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_report_options o = {.units = KENT_SI};
    kent_text out = {0};
    kent_holding *crest = holding(mixed.results, "CR");
    crest->straps =
        (kent_straps){.force = 60e3, .legs = 4, .diameter = 0.016, .embedment = 0.7};
    assert_int_equal(kent_report_summary_csv(mixed.results, &o, kent_mixed_sink(&out)),
                     KENT_OK);
    const char *csv = kent_text_of(&out);
    const kent_holding *bend = holding(mixed.results, "VC");
    const kent_holding *end = holding(mixed.results, "DE");
    assert_close(field(csv, "margin over runner-up", "VC"), bend->runner_up_margin,
                 1e-6);
    assert_close(field(csv, "excavation [m3]", "VC"), bend->quantities.excavation,
                 1e-6);
    assert_close(field(csv, "formed [m2]", "VC"), bend->quantities.formed, 1e-6);
    assert_close(field(csv, "sliding,", "VC"),
                 bend->stability.sliding[KENT_AT_WORK].reached, 1e-6);
    assert_close(field(csv, "base pressure [kPa]", "VC"),
                 1e-3 * bend->stability.base[KENT_AT_WORK].largest, 1e-6);
    assert_close(field(csv, "days before test", "VC"), bend->concrete.age / 86400.0,
                 1e-6);
    assert_close(field(csv, "straps,", "CR"), 4.0, 1e-12);
    assert_close(field(csv, "strap diameter [mm]", "CR"), 16.0, 1e-9);
    assert_close(field(csv, "strap embedment [m]", "CR"), 0.7, 1e-9);
    assert_close(field(csv, "strap force [kN]", "CR"), 60.0, 1e-9);
    assert_close(field(csv, "concrete if a block [m3]", "DE"),
                 end->either.quantities.concrete, 1e-6);
    assert_close(field(csv, "by iron-pipe handbooks [m]", "DE"),
                 end->legs[0].by_form[KENT_FORM_HANDBOOK], 1e-6);
    assert_close(field(csv, "largest pull [kN]", "DE"), 1e-3 * end->legs[0].pull, 1e-6);
    assert_true(isnan(field(csv, "excavation [m3]", "DE")));
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

static void wide_prints_what_belongs_together(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    kent_text out = printed(mixed.results, true);
    static const char *const HEADS[] = {"\nLoads\n",
                                        "\nThrust, and what is pressed\n",
                                        "\nGround, and what leans on it\n",
                                        "\nWhether blocks stay in place\n",
                                        "\nConcrete, and what it takes to build\n",
                                        "\nRestrained joints\n"};
    const char *text = kent_text_of(&out);
    for (size_t i = 0; i < sizeof HEADS / sizeof HEADS[0]; i++) {
        text = find(text, HEADS[i]);
        assert_int_equal(strncmp(text + strlen(HEADS[i]), "point", 5), 0);
    }
    /* nobody has a waived, empty column */
    assert_null(strstr(kent_text_of(&out), "block's share"));
    kent_text_clear(&out);
    kent_mixed_clear(&mixed);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_unsafe_is_said_first_and_alike_ones_as_one),
        cmocka_unit_test(no_caution_is_dropped),
        cmocka_unit_test(what_is_unsafe_stands_by_itself_in_the_results),
        cmocka_unit_test(the_totals_add_up),
        cmocka_unit_test(a_block_is_looked_at_in_place_of_joints),
        cmocka_unit_test(block_and_joints_stand_side_by_side),
        cmocka_unit_test(the_hand_calculation_tells_of_a_block_instead),
        cmocka_unit_test(both_parts_have_a_row_where_two_hold_a_fitting),
        cmocka_unit_test(straps_are_told_by_number_and_diameter),
        cmocka_unit_test(restrained_pipe_is_listed_by_stations),
        cmocka_unit_test(neighbours_are_listed),
        cmocka_unit_test(the_summary_holds_what_holds_a_fitting),
        cmocka_unit_test(wide_prints_what_belongs_together),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
