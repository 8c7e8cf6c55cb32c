/* The ground of the main, its zones and soils, and what it is loaded with. */
#include "kent_view.h"

#include <math.h>
#include <string.h>

static const char *said(const kent_view *v, kent_kind kind, double si, kent_shown *room)
{
    *room = kent_shown_with_unit(kind, v->units, si);
    return room->text;
}

/* ---- ground ---------------------------------------------------------------------- */

static void add_water_table(const kent_view *v, double depth, kent_text *out)
{
    kent_shown s;
    if (isnan(depth)) return;
    if (isinf(depth)) {
        kent_text_add(out, ", no ground water");
    } else {
        kent_text_add(out, ", ground water %s down", said(v, KENT_LENGTH, depth, &s));
    }
}

static void say_default(const kent_view *v)
{
    const kent_model *m = v->model;
    const kent_ground *g = &m->ground;
    kent_text words = {0};
    kent_shown s;
    kent_text_add(&words, "Where nothing else is said: %s%s",
                  g->soil >= 0 ? "soil " : "no soil",
                  g->soil >= 0 ? m->soils[g->soil].id : "");
    if (isfinite(g->cover)) {
        kent_text_add(&words, ", cover %s", said(v, KENT_LENGTH, g->cover, &s));
    } else {
        kent_text_add(&words, ", no cover");
    }
    add_water_table(v, g->water_table, &words);
    if (g->wrapped) kent_text_add(&words, ", pipes in sleeves");
    if (g->trench >= 0) {
        kent_text_add(&words, ", trench %s", kent_trench_word(g->trench));
    }
    if (g->backfill >= 0) {
        kent_text_add(&words, ", filled with %s", m->soils[g->backfill].id);
    }
    kent_text_add(&words, ".");
    kent_view_say(v, "", &words);
    kent_text_clear(&words);
}

static void say_zone(const kent_view *v, const kent_ground_zone *z)
{
    const kent_model *m = v->model;
    kent_text words = {0};
    kent_shown s;
    kent_text_add(&words, "Pipe %s from %s", m->pipes[z->pipe].id,
                  kent_shown_station(v->units, z->from).text);
    kent_text_add(&words, " to %s: ", kent_shown_station(v->units, z->to).text);
    kent_text_add(&words, "%s", z->soil >= 0 ? m->soils[z->soil].id : "the same soil");
    if (isfinite(z->cover)) {
        kent_text_add(&words, ", cover %s", said(v, KENT_LENGTH, z->cover, &s));
    }
    add_water_table(v, z->water_table, &words);
    if (z->trench >= 0) {
        kent_text_add(&words, ", trench %s", kent_trench_word(z->trench));
    }
    if (z->backfill >= 0) {
        kent_text_add(&words, ", filled with %s", m->soils[z->backfill].id);
    }
    if (z->casing) kent_text_add(&words, ", in a casing, where nothing holds it");
    kent_text_add(&words, ".");
    kent_view_say(v, "-  ", &words);
    kent_text_clear(&words);
}

static void add_bearing(const kent_view *v, const kent_soil *s, kent_text *out)
{
    kent_shown a, b;
    switch (s->route) {
    case KENT_BEARING_CONSTANT:
        kent_text_add(out, "bears %s sideways at any depth",
                      said(v, KENT_STRESS, s->allowable_bearing, &a));
        break;
    case KENT_BEARING_BY_DEPTH:
        kent_text_add(out, "bears sideways by depth:");
        for (size_t i = 0; i < s->by_depth_count; i++) {
            kent_text_add(out, "%s %s at %s", i > 0 ? "," : "",
                          said(v, KENT_STRESS, s->by_depth[i].bearing, &a),
                          said(v, KENT_LENGTH, s->by_depth[i].depth, &b));
        }
        break;
    case KENT_BEARING_GRADIENT:
        kent_text_add(out, "bears %s times the depth sideways",
                      said(v, KENT_UNIT_WEIGHT, s->bearing_gradient, &a));
        break;
    case KENT_BEARING_PASSIVE:
        kent_text_add(out, "bears %.2f of its passive pressure sideways",
                      s->passive_share);
        break;
    }
    if (s->factor_inside > 1.0) {
        kent_text_add(out, ", with a factor of %.2f already inside", s->factor_inside);
    }
}

void kent_view_soil(const kent_view *v, const kent_soil *s)
{
    kent_text words = {0};
    kent_shown a;
    kent_text_add(&words, "%s: ", s->id);
    if (s->nature != KENT_NATURAL) {
        kent_text_add(&words, "%s, %s", kent_nature_word(s->nature),
                      s->unreliable ? "" : "made good, ");
    }
    if (s->unreliable) {
        kent_text_add(&words, "not to be relied on, holds nothing");
    } else {
        add_bearing(v, s, &words);
    }
    const struct {
        double value;
        kent_kind kind;
        const char *name;
    } values[] = {{s->unit_weight, KENT_UNIT_WEIGHT, "weighs"},
                  {s->friction_angle, KENT_ANGLE, "friction angle"},
                  {s->cohesion, KENT_STRESS, "cohesion"},
                  {s->wall_friction, KENT_ANGLE, "friction on a face"},
                  {s->base_cohesion, KENT_STRESS, "holds concrete by"},
                  {s->vertical_bearing, KENT_STRESS, "bears a base by"}};
    for (size_t i = 0; i < sizeof values / sizeof values[0]; i++) {
        if (isnan(values[i].value)) continue;
        kent_text_add(&words, "; %s %s", values[i].name,
                      said(v, values[i].kind, values[i].value, &a));
    }
    if (!isnan(s->base_friction)) {
        kent_text_add(&words, "; friction of concrete %.2f", s->base_friction);
    }
    if (s->source[0] != '\0') kent_text_add(&words, " (%s)", s->source);
    kent_view_say(v, "-  ", &words);
    kent_text_clear(&words);
}

void kent_view_ground(const kent_view *v)
{
    const kent_model *m = v->model;
    if (m->soil_count == 0 && m->ground.soil < 0) return;
    kent_text_add(v->out, "\nGround\n");
    say_default(v);
    for (size_t i = 0; i < m->ground_zone_count; i++) {
        say_zone(v, &m->ground_zones[i]);
    }
    for (size_t i = 0; i < m->soil_count; i++) {
        kent_view_soil(v, &m->soils[i]);
    }
}

/* ---- loads ----------------------------------------------------------------------- */

/* What the test comes to: by a rule its pressure, where steady flow was found; and the
 * water that the main may take up meanwhile. */
static void add_test_found(const kent_view *v, kent_text *out)
{
    const kent_model *m = v->model;
    kent_shown s;
    for (size_t i = 0; i < m->state_count; i++) {
        if (!v->steadies || !v->steadies[i]) return;
    }
    const kent_site_test t = kent_site_test_find(m, v->steadies, NULL);
    if (t.rule != KENT_TEST_FIXED && isfinite(t.pressure)) {
        kent_text_add(out, ": %s", said(v, KENT_PRESSURE, t.pressure, &s));
    }
    const double allowance = kent_site_test_main_allowance(m, &t);
    if (!isfinite(allowance)) return;
    const bool us = v->units == KENT_US;
    const double gallon = 3.785411784; /* L, of the US */
    kent_text_add(out,
                  "; testing allowance of all pipes together %.3g %s by AWWA C600, "
                  "where it holds",
                  3.6e6 * allowance / (us ? gallon : 1.0), us ? "US gal/h" : "L/h");
}

static void add_test(const kent_view *v, kent_text *out)
{
    const kent_loads *l = &v->model->loads;
    const char *at = kent_view_point(v->model, l->test_gauge);
    kent_shown s;
    switch (l->test_rule) {
    case KENT_TEST_FIXED:
        if (isnan(l->test_pressure)) {
            kent_text_add(out, "No site test is stated");
        } else {
            kent_text_add(out, "Site test at %s, as given, read at %s",
                          said(v, KENT_PRESSURE, l->test_pressure, &s), at);
        }
        break;
    case KENT_TEST_EN805_CALCULATED:
        kent_text_add(out, "Site test by EN 805 with the surge computed, read at %s",
                      at);
        break;
    case KENT_TEST_EN805_ASSUMED:
        kent_text_add(out, "Site test by EN 805 with %s assumed for surge, read at %s",
                      said(v, KENT_PRESSURE, l->surge_allowance, &s), at);
        break;
    case KENT_TEST_C600:
        kent_text_add(out, "Site test by AWWA C600, read at %s", at);
        break;
    case KENT_TEST_FACTOR:
        kent_text_add(out, "Site test at %.2f times the working pressure, read at %s",
                      l->test_factor, at);
        break;
    }
    add_test_found(v, out);
    kent_text_add(out, ". ");
}

/* Those that differ from the first are told one by one. */
static void add_factors(const kent_view *v, kent_text *out)
{
    static const char *const CASES[] = {"test",        "static",    "steady",
                                        "shut-off",    "recurring", "occasional",
                                        "exceptional", "suction"};
    enum { COUNT = sizeof CASES / sizeof CASES[0] };
    double factor[COUNT];
    bool same = true;
    for (size_t i = 0; i < COUNT; i++) {
        const double given = v->model->loads.factor[i];
        factor[i] = isnan(given) ? v->model->rules.safety_factor : given;
        const bool test = i == KENT_CASE_TEST && isnan(given);
        if (test && isfinite(v->model->rules.factor_test)) {
            factor[i] = v->model->rules.factor_test;
        }
        same = same && factor[i] == factor[0];
    }
    kent_text_add(out, "Safety factor%s %.2f%s", same ? "" : "s: test", factor[0],
                  same ? " in every load case" : "");
    for (size_t i = 1; !same && i < COUNT; i++) {
        kent_text_add(out, ", %s %.2f", CASES[i], factor[i]);
    }
    kent_text_add(out, ". Design rules: %s.", v->model->rules.id);
}

/* Nothing where the case says nothing of it: that is assumed, and told there. */
static void add_concrete(const kent_view *v, kent_text *out)
{
    static const char *const CEMENTS[] = {"normal", "rapid", "slow"};
    const kent_concrete *c = &v->model->concrete;
    if (!(c->strength > 0.0)) return;
    kent_text_add(out, " Concrete%s%s of %s, %s cement.", c->id[0] ? " " : "", c->id,
                  kent_shown_with_unit(KENT_STRENGTH, v->units, c->strength).text,
                  CEMENTS[c->cement]);
}

/* What the case decides of thrusts and soils, and does without. */
static void add_choices(const kent_view *v, kent_text *out)
{
    static const char *const CASES[] = {"test",        "static",    "steady",
                                        "shut-off",    "recurring", "occasional",
                                        "exceptional", "suction"};
    const kent_model *m = v->model;
    const kent_loads *l = &m->loads;
    for (size_t i = 0; i < sizeof CASES / sizeof CASES[0]; i++) {
        if (!(l->bearing_increase[i] > 1.0)) continue;
        kent_text_add(out, " Soil bears %.2f times as much, %s.",
                      l->bearing_increase[i], CASES[i]);
    }
    if (l->thrust_area != KENT_AREA_OUTSIDE) {
        kent_text_add(out, " Thrusts on the %s, not the outside diameter.",
                      l->thrust_area == KENT_AREA_INSIDE ? "bore" : "nominal size");
    }
    if (isfinite(l->cooling)) {
        kent_text_add(out, " Fused and welded mains cool by %s.",
                      kent_shown_with_unit(KENT_WARMING, v->units, l->cooling).text);
    }
    for (size_t i = 0; i < m->waiver_count; i++) {
        kent_text_add(out, " Done without %s: %s.", m->waivers[i].what,
                      m->waivers[i].reason);
    }
}

/* "Lowest pressure asked: steady 1.40 bar, ...; life 50 years." Nothing where nobody
 * asks. */
static void add_lowest(const kent_view *v, kent_text *out)
{
    static const double YEAR = 31557600.0; /* s */
    const kent_asked *a = &v->model->asked;
    bool any = false;
    kent_shown s;
    for (int i = -1; i < 3; i++) {
        const double lowest = i < 0 ? a->lowest_steady : a->lowest[i];
        if (isnan(lowest)) continue;
        kent_text_add(out, "%s%s %s", any ? ", " : " Lowest pressure asked: ",
                      i < 0 ? "steady" : kent_class_word((kent_class)i),
                      said(v, KENT_PRESSURE, lowest, &s));
        any = true;
    }
    if (any) kent_text_add(out, ".");
    if (isfinite(a->life)) kent_text_add(out, " It serves %.4g years.", a->life / YEAR);
}

/* What joints and fittings are rated for by the case. */
static void add_rated(const kent_view *v, kent_text *out)
{
    const kent_model *m = v->model;
    kent_shown s;
    for (size_t i = 0; i < m->pipe_count; i++) {
        if (isnan(m->pipes[i].joint_rating)) continue;
        kent_text_add(out, " Joints of %s are rated %s.", m->pipes[i].id,
                      said(v, KENT_PRESSURE, m->pipes[i].joint_rating, &s));
    }
    for (size_t i = 0; i < m->note_count; i++) {
        const kent_fitting_note *n = &m->notes[i];
        if (isnan(n->rating)) continue;
        kent_text_add(out, " Parts of %s are rated %s", n->id,
                      said(v, KENT_PRESSURE, n->rating, &s));
        if (n->surge_rating != n->rating) {
            kent_text_add(out, ", %s with surge",
                          said(v, KENT_PRESSURE, n->surge_rating, &s));
        }
        if (n->test_rating != n->rating) {
            kent_text_add(out, ", %s under test",
                          said(v, KENT_PRESSURE, n->test_rating, &s));
        }
        kent_text_add(out, "%s%s%s.", n->standard[0] ? " (" : "", n->standard,
                      n->standard[0] ? ")" : "");
    }
}

void kent_view_loads(const kent_view *v)
{
    const kent_loads *l = &v->model->loads;
    kent_text words = {0};
    kent_shown s;
    kent_text_add(v->out, "\nLoads\n");
    if (v->model->span_count > 0) add_test(v, &words);
    if (v->model->span_count == 0) {
        kent_text_add(&words, "As the ports state them. ");
    } else if (isnan(l->static_level)) {
        kent_text_add(&words,
                      "Still water at the highest fixed level that a fitting is "
                      "connected to. ");
    } else {
        kent_text_add(&words, "Still water at %s, as given. ",
                      said(v, KENT_LENGTH, l->static_level, &s));
    }
    if (v->model->pump_count > 0) {
        kent_text_add(&words, "Pumps at no flow, valves shut, as far as they reach. ");
    }
    if (isfinite(l->future_pressure)) {
        kent_text_add(&words, "Later %s at %s. ",
                      said(v, KENT_PRESSURE, l->future_pressure, &s),
                      kent_view_point(v->model, l->future_gauge));
    }
    add_factors(v, &words);
    add_choices(v, &words);
    add_concrete(v, &words);
    add_lowest(v, &words);
    add_rated(v, &words);
    kent_view_say(v, "", &words);
    kent_text_clear(&words);
}
