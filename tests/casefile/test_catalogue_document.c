/* docs/catalogue.md is what config/ holds. --print writes it. */
#include "case_text.h"
#include "kent_text.h"

#include <math.h>

static const double MM = 0.001;                                /* m */
static const double IN = 0.0254;                               /* m */
static const double BAR = 1e5;                                 /* Pa */
static const double PSI = 4.4482216152605 / (0.0254 * 0.0254); /* Pa */

/* A number without zeros that say nothing; a dash where there is none. */
static void add_number(kent_text *out, double value, int digits)
{
    if (isnan(value)) {
        kent_text_add(out, " – |");
    } else {
        kent_text_add(out, " %.*g |", digits, value);
    }
}

/* ---- pipes ----------------------------------------------------------------------- */

enum { CLASSES_MOST = 16 };

/* A run of pipes of one table: those that share their source. */
typedef struct table {
    const kent_pipe_class *pipes; /* [count] */
    size_t count;
    size_t lead; /* letters of every id before the class */
    char classes[CLASSES_MOST][16];
    const kent_pipe_class *examples[CLASSES_MOST];
    size_t class_count;
    bool inches;
} table;

static void class_of(const table *t, const kent_pipe_class *p, char out[16])
{
    const char *from = p->id + t->lead;
    (void)snprintf(out, 16, "%.*s", (int)strcspn(from, "-"), from);
}

static const char *size_of(const table *t, const kent_pipe_class *p)
{
    const char *from = p->id + t->lead;
    return from + strcspn(from, "-") + 1;
}

static size_t class_index(const table *t, const char *word)
{
    size_t i = 0;
    while (i < t->class_count && strcmp(t->classes[i], word) != 0) {
        i++;
    }
    return i;
}

/* "DR32.5" as 32.5; 0 without a number. */
static double class_number(const char *word)
{
    return strtod(word + strcspn(word, "0123456789"), NULL);
}

/* Adds the class of a pipe, unless it is there, in the order of the numbers. */
static void add_class(table *t, const kent_pipe_class *p)
{
    char word[16];
    class_of(t, p, word);
    if (class_index(t, word) < t->class_count) return;
    assert_true(t->class_count < CLASSES_MOST);
    size_t i = t->class_count++;
    while (i > 0 && class_number(t->classes[i - 1]) > class_number(word)) {
        memcpy(t->classes[i], t->classes[i - 1], sizeof t->classes[i]);
        t->examples[i] = t->examples[i - 1];
        i--;
    }
    memcpy(t->classes[i], word, sizeof word);
    t->examples[i] = p;
}

static void find_table(const kent_catalogue *c, size_t first, table *t)
{
    *t = (table){.pipes = &c->pipes[first]};
    const kent_pipe_class *p = t->pipes;
    size_t same = strlen(p[0].id);
    while (first + t->count < c->pipe_count &&
           strcmp(p[t->count].from.source, p[0].from.source) == 0) {
        size_t k = 0;
        while (k < same && p[t->count].id[k] == p[0].id[k]) {
            k++;
        }
        same = k;
        t->count++;
    }
    while (same > 0 && p[0].id[same - 1] != '-') {
        same--;
    }
    t->lead = same;
    t->inches = strstr(size_of(t, p), "in") != NULL;
    for (size_t i = 0; i < t->count; i++) {
        add_class(t, &p[i]);
    }
}

static void add_ratings(kent_text *out, const table *t)
{
    const double unit = t->inches ? PSI : BAR;
    bool rated = false;
    for (size_t i = 0; i < t->class_count; i++) {
        rated = rated || !isnan(t->examples[i]->pressure_rating);
    }
    if (!rated) {
        kent_text_add(out, "\nNo rating.\n");
        return;
    }
    kent_text_add(out,
                  "\n| class | in service, %s | with surge | that recurs | under "
                  "test |\n",
                  t->inches ? "psi" : "bar");
    kent_text_add(out, "| --- | --- | --- | --- | --- |\n");
    for (size_t i = 0; i < t->class_count; i++) {
        kent_text_add(out, "| %s |", t->classes[i]);
        add_number(out, t->examples[i]->pressure_rating / unit, 6);
        add_number(out, t->examples[i]->surge_rating / unit, 6);
        add_number(out, t->examples[i]->recurring_rating / unit, 6);
        add_number(out, t->examples[i]->test_rating / unit, 6);
        kent_text_add(out, "\n");
    }
}

/* One size: its pipes stand together; returns how many they are. */
static size_t add_size(kent_text *out, const table *t, size_t first)
{
    const double unit = t->inches ? IN : MM;
    const char *size = size_of(t, &t->pipes[first]);
    size_t next = first;
    kent_text_add(out, "| %s |", size);
    add_number(out, t->pipes[first].outside_diameter / unit, 6);
    add_number(out, t->pipes[first].lining / unit, 6);
    for (size_t i = 0; i < t->class_count; i++) {
        char word[16] = "";
        const kent_pipe_class *p = &t->pipes[next];
        if (next < t->count && strcmp(size_of(t, p), size) == 0) class_of(t, p, word);
        if (strcmp(word, t->classes[i]) != 0) {
            kent_text_add(out, "  |");
            continue;
        }
        kent_text_add(out, " %.*f", t->inches ? 3 : 1, p->wall / unit);
        if (!isnan(p->wall_minimum)) {
            kent_text_add(out, " / %.*f", t->inches ? 3 : 1, p->wall_minimum / unit);
        }
        kent_text_add(out, " |");
        next++;
    }
    kent_text_add(out, "\n");
    return next - first;
}

static void add_pipes(kent_text *out, const kent_catalogue *c)
{
    table t;
    kent_text_add(out, "\n## Pipes\n\nA pipe's id is the first word of its table, its "
                       "class and its size: `DI-EN545-C40-DN300`.\nWalls: nominal / "
                       "least; one number: nominal, the least is not known. Blank: not "
                       "made.\n");
    for (size_t first = 0; first < c->pipe_count; first += t.count) {
        find_table(c, first, &t);
        const kent_pipe_class *p = t.pipes;
        kent_text_add(out, "\n### `%.*s` · %s\n\n", (int)t.lead - 1, p->id,
                      p->standard);
        kent_text_add(out, "%s. Status: %s. Material: `%s`.\n", p->from.source,
                      p->from.status, p->material);
        add_ratings(out, &t);
        kent_text_add(out, "\n| size | outside, %s | lining |", t.inches ? "in" : "mm");
        for (size_t i = 0; i < t.class_count; i++) {
            kent_text_add(out, " %s |", t.classes[i]);
        }
        kent_text_add(out, "\n| --- | --- | --- |");
        for (size_t i = 0; i < t.class_count; i++) {
            kent_text_add(out, " --- |");
        }
        kent_text_add(out, "\n");
        for (size_t i = 0; i < t.count;) {
            const size_t added = add_size(out, &t, i);
            assert_true(added > 0); /* classes of a size stand in one order */
            i += added;
        }
    }
}

/* ---- the other parts ------------------------------------------------------------- */

static void add_materials(kent_text *out, const kent_catalogue *c)
{
    kent_text_add(out,
                  "\n## Materials\n\n| id | modulus, GPa | Poisson | density, "
                  "kg/m³ | roughness, mm | lining's modulus, GPa | expansion, 1e-6/K | "
                  "lasting modulus, GPa | source | status |\n| --- | --- | --- | --- "
                  "| --- | --- | --- | --- | --- | --- |\n");
    for (size_t i = 0; i < c->material_count; i++) {
        const kent_material *m = &c->materials[i];
        kent_text_add(out, "| `%s` |", m->id);
        add_number(out, m->modulus / 1e9, 4);
        add_number(out, m->poisson, 4);
        add_number(out, m->density, 6);
        add_number(out, m->roughness / MM, 4);
        add_number(out, m->lining_modulus > 0.0 ? m->lining_modulus / 1e9 : (double)NAN,
                   4);
        add_number(out, m->expansion / 1e-6, 4);
        add_number(out, m->long_modulus / 1e9, 3);
        kent_text_add(out, " %s | %s |\n", m->from.source, m->from.status);
    }
    kent_text_add(out,
                  "\nShare of the ratings that a plastic keeps (linear between, not "
                  "for use above the last), and its\ncreep, elements of retardation "
                  "time and compliance in 1e-10/Pa:\n\n");
    for (size_t i = 0; i < c->material_count; i++) {
        const kent_material *m = &c->materials[i];
        if (!m->plastic) continue;
        kent_text_add(out, "- `%s`:", m->id);
        for (size_t k = 0; k < m->derating_count; k++) {
            kent_text_add(out, "%s %.3g at %.1f °C", k > 0 ? "," : "",
                          m->derating[k].factor, m->derating[k].temperature - 273.15);
        }
        kent_text_add(out, "; creep");
        for (size_t k = 0; k < m->creep_count; k++) {
            kent_text_add(out, "%s %g s: %.4g", k > 0 ? "," : "", m->creep[k].time,
                          m->creep[k].compliance / 1e-10);
        }
        kent_text_add(out, ".\n");
    }
    kent_text_add(
        out,
        "\nNo measured creep of PVC is at hand. Its elements are derived: between the "
        "short-term modulus of\n3.0 GPa, taken at 0.01 s, and 1.5 GPa after 50 years "
        "(1.58e9 s) compliance is taken to grow with the\nlogarithm of time, (1/1.5 - "
        "1/3.0) 1e-9/log10(1.58e9/0.01) = 0.298e-10 1/Pa in each decade, and one\n"
        "element of that compliance stands in each decade that a surge lasts.\n\n"
        "Wave speeds of PVC: AWWA M23 computes with 4660 ft/s in water, AWWA C900 with "
        "4720; the two differ by\n1.3 %%. kentledge takes the water's own speed of "
        "sound and the nominal wall, which of a plastic is the\nmean one: its waves "
        "are 3.0 to 3.8 %% faster than on the least wall, which handbooks use, most "
        "where the wall is thickest.\n");
}

static void add_valves(kent_text *out, const kent_catalogue *c)
{
    kent_text_add(out,
                  "\n## Valves\n\nCapacity relative to full opening at each tabulated "
                  "opening, √(K open/K); straight lines between, and to\nzero below "
                  "the first. Without: known fully open only, a case gives the "
                  "characteristic itself.\n`linear` is built in.\n\n"
                  "| id | K open | opening: capacity | source | status |\n"
                  "| --- | --- | --- | --- | --- |\n");
    for (size_t i = 0; i < c->valve_count; i++) {
        const kent_valve_type *v = &c->valves[i];
        kent_text_add(out, "| `%s` |", v->id);
        add_number(out, v->loss, 4);
        for (size_t k = 1; k < v->curve.count; k++) {
            kent_text_add(out, "%s %.4g: %.3g", k > 1 ? "," : "", v->curve.opening[k],
                          v->curve.capacity[k]);
        }
        kent_text_add(out, " | %s | %s |\n", v->from.source, v->from.status);
    }
}

static void add_bearing(kent_text *out, const kent_soil *s)
{
    switch (s->route) {
    case KENT_BEARING_CONSTANT:
        kent_text_add(out, " %.1f |", s->allowable_bearing / 1e3);
        return;
    case KENT_BEARING_BY_DEPTH:
        for (size_t k = 0; k < s->by_depth_count; k++) {
            kent_text_add(out, "%s %.1f at %.2f m", k > 0 ? "," : "",
                          s->by_depth[k].bearing / 1e3, s->by_depth[k].depth);
        }
        kent_text_add(out, " |");
        return;
    case KENT_BEARING_GRADIENT:
        kent_text_add(out, " %.1f per m |", s->bearing_gradient / 1e3);
        return;
    case KENT_BEARING_PASSIVE:
        kent_text_add(out, " %.2f of the passive |", s->passive_share);
        return;
    }
}

static void add_soils(kent_text *out, const kent_catalogue *c)
{
    kent_text_add(
        out,
        "\n## Soils\n\nAllowable horizontal bearing. Published tables differ by four "
        "to "
        "eight times for the same words: an id\nnames its table, and every value has "
        "to be confirmed on site. Parameters of restrained length are not\ngiven: a "
        "case states them.\n\n"
        "| id | bearing, kPa | factor inside | friction of concrete | its adhesion, "
        "kPa | "
        "nature | relied on | source (status) |\n"
        "| --- | --- | --- | --- | --- | --- | --- | --- |\n");
    for (size_t i = 0; i < c->soil_count; i++) {
        const kent_soil *s = &c->soils[i];
        kent_text_add(out, "| `%s` |", s->id);
        add_bearing(out, s);
        add_number(out, s->factor_inside, 3);
        add_number(out, s->base_friction, 3);
        add_number(out, s->base_cohesion / 1e3, 3);
        kent_text_add(out, " %s |", kent_nature_word(s->nature));
        kent_text_add(out, " %s | %s |\n", s->unreliable ? "no" : "yes", s->source);
    }
}

static void add_concretes(kent_text *out, const kent_catalogue *c)
{
    kent_text_add(out,
                  "\n## Concretes\n\nStrength of a cylinder after 28 days, "
                  "characteristic (EN) or specified (psi).\n\n"
                  "| id | strength, MPa | source (status) |\n| --- | --- | --- |\n");
    for (size_t i = 0; i < c->concrete_count; i++) {
        const kent_concrete *row = &c->concretes[i];
        kent_text_add(out, "| `%s` |", row->id);
        add_number(out, row->strength / 1e6, 4);
        kent_text_add(out, " %s |\n", row->source);
    }
}

static void add_rules(kent_text *out, const kent_catalogue *c)
{
    kent_text_add(
        out, "\n## Rules\n\n| id | factor | under test | height/depth | width/height | "
             "least thickness, height, cover, m | step, m | concrete, water, kN/m³ | "
             "sleeved | largest, m³ | source (status) |\n"
             "| --- | --- | --- | --- | --- | --- | --- | --- | --- | --- | --- |\n");
    for (size_t i = 0; i < c->rule_count; i++) {
        const kent_rules *r = &c->rules[i];
        kent_text_add(out, "| `%s` |", r->id);
        add_number(out, r->safety_factor, 4);
        add_number(out, r->factor_test, 4);
        add_number(out, r->height_to_depth, 4);
        kent_text_add(out, " %g to %g | %.2f, %.2f, %.2f |", r->width_to_height[0],
                      r->width_to_height[1], r->least_thickness, r->least_height,
                      r->least_cover);
        add_number(out, r->side_step, 3);
        kent_text_add(out, " %.2f, %.2f |", r->concrete_unit_weight / 1e3,
                      r->water_unit_weight / 1e3);
        add_number(out, r->wrapped_ratio, 4);
        add_number(out, r->largest_volume, 4);
        kent_text_add(out, " %s |\n", r->source);
    }
}

/* 0 asks for nothing. */
static void add_asked(kent_text *out, double value, int digits)
{
    add_number(out, value > 0.0 ? value : (double)NAN, digits);
}

static void add_asked_by_rules(kent_text *out, const kent_catalogue *c)
{
    kent_text_add(
        out,
        "\nWhat the same sets ask of blocks and joints beyond their shape; a dash "
        "asks for nothing.\n\n| id | blocks, under upward thrust | thrust without "
        "design of the concrete, kN | over the pipe's diameter, behind a fitting, "
        "m | cover, m, from diameter, mm | ground falls at most, ° | pipe rises at "
        "most | before the test, MPa, days | sliding, overturning, floating, under "
        "test | soil above | spread, code | straps, MPa, bond, MPa, mm | "
        "restrained length, share of a run |\n"
        "| --- | --- | --- | --- | --- | --- | --- | --- | --- | --- | --- | --- | "
        "--- |\n");
    for (size_t i = 0; i < c->rule_count; i++) {
        const kent_rules *r = &c->rules[i];
        kent_text_add(out, "| `%s` | %s, %s |", r->id,
                      kent_block_policy_word(r->blocks),
                      kent_block_policy_word(r->vertical_blocks));
        add_asked(out, r->largest_thrust / 1e3, 5);
        kent_text_add(out, " %.2f, %.2f |", r->height_over_diameter,
                      r->concrete_behind);
        kent_text_add(out, " %.2f, %.0f |", r->large_least_cover,
                      r->large_diameter / MM);
        add_asked(out, r->steepest_ground * 180.0 / acos(-1.0), 4);
        add_asked(out, r->steepest_pipe, 4);
        kent_text_add(out, " %.1f, %.3g |", r->strength_before_test / 1e6,
                      r->least_age / 86400.0);
        kent_text_add(out, " %g, %g, %g, %g |", r->factor_sliding,
                      r->factor_overturning, r->factor_flotation,
                      r->factor_stability_test);
        kent_text_add(out, " %s | %s, %s |", r->soil_above ? "yes" : "no",
                      kent_spread_word(r->spread),
                      kent_concrete_code_word(r->concrete_code));
        kent_text_add(out, " %.0f, %.2f, %.0f |", r->strap_stress / 1e6,
                      r->strap_bond / 1e6, r->strap_diameter / MM);
        kent_text_add(out, " %s, %g |\n", kent_length_form_word(r->length_form),
                      r->run_share);
    }
}

static void add_document(kent_text *out)
{
    kent_catalogue *c = read_catalogue();
    kent_text_add(
        out, "# The catalogue\n\nWhat `config/` holds, written by "
             "`test_catalogue_document --print`; `kentledge catalogue` lists the "
             "same.\nStatus: `seen` in print or in reproduction, from `memory`, "
             "`derived` by a formula, or `common practice`\nwithout a source. What "
             "is from memory has to be compared with the standard before it is "
             "relied on.\n");
    add_pipes(out, c);
    add_materials(out, c);
    add_valves(out, c);
    add_soils(out, c);
    add_concretes(out, c);
    add_rules(out, c);
    add_asked_by_rules(out, c);
    kent_catalogue_free(c);
}

static void the_document_is_what_the_catalogue_holds(void **state)
{
    (void)state;
    kent_text wanted = {0};
    char line[2048];
    const char *at = NULL;
    size_t number = 0;
    add_document(&wanted);
    FILE *file = fopen(KENT_SOURCE_DIR "/docs/catalogue.md", "r");
    assert_non_null(file);
    at = kent_text_of(&wanted);
    while (fgets(line, sizeof line, file)) {
        number++;
        if (strncmp(at, line, strlen(line)) != 0) {
            fail_msg("docs/catalogue.md:%zu is not what config/ holds; write it anew "
                     "with test_catalogue_document --print",
                     number);
        }
        at += strlen(line);
    }
    assert_int_equal(fclose(file), 0);
    assert_true(number > 0);
    assert_string_equal(at, ""); /* nothing is missing at its end */
    kent_text_clear(&wanted);
}

static void every_pipe_stands_in_the_document(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    table t;
    size_t count = 0;
    for (size_t first = 0; first < c->pipe_count; first += t.count) {
        kent_text out = {0};
        find_table(c, first, &t);
        for (size_t i = 0; i < t.count;) {
            const size_t added = add_size(&out, &t, i);
            assert_true(added > 0);
            i += added;
            count += added;
        }
        kent_text_clear(&out);
    }
    assert_int_equal(count, c->pipe_count);
    kent_catalogue_free(c);
}

int main(int argc, char **argv)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_document_is_what_the_catalogue_holds),
        cmocka_unit_test(every_pipe_stands_in_the_document),
    };
    if (argc > 1 && strcmp(argv[1], "--print") == 0) {
        kent_text out = {0};
        add_document(&out);
        (void)fputs(kent_text_of(&out), stdout);
        kent_text_clear(&out);
        return 0;
    }
    return cmocka_run_group_tests(tests, NULL, NULL);
}
