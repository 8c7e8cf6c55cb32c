/* What stands once in a case: its head, water, site, solver and design rules. */
#include "kent_case_internal.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

static double given(const kent_record *record, bool there, const char *key,
                    double other)
{
    return there ? kent_record_number_or(record, key, other) : other;
}

void kent_fill_head(kent_filling *f, const char *path)
{
    kent_model *m = f->model;
    kent_record project;
    const char *slash = strrchr(path, '/');
    char name[160];
    (void)snprintf(name, sizeof name, "%s",
                   strcmp(path, "-") == 0 ? "standard input"
                   : slash                ? slash + 1
                                          : path);
    const size_t length = strlen(name);
    if (length > 4 && strcmp(name + length - 4, ".cfg") == 0) name[length - 4] = '\0';

    kent_record_copy(&f->root, "title", name, m->title, sizeof m->title);
    m->units = f->shown ? *f->shown : f->reader.system;
    if (!kent_fill_group(f, &f->root, "project", &project)) return;
    kent_project *p = &m->project;
    kent_record_copy(&project, "number", NULL, p->number, sizeof p->number);
    kent_record_copy(&project, "drawing", NULL, p->drawing, sizeof p->drawing);
    kent_record_copy(&project, "revision", NULL, p->revision, sizeof p->revision);
    kent_record_copy(&project, "designer", NULL, p->designer, sizeof p->designer);
    kent_record_copy(&project, "checker", NULL, p->checker, sizeof p->checker);
    kent_record_copy(&project, "utility", NULL, p->utility, sizeof p->utility);
    kent_record_copy(&project, "codes", NULL, p->codes, sizeof p->codes);
    kent_record_copy(&project, "date", NULL, p->date, sizeof p->date);
}

void kent_fill_water(kent_filling *f)
{
    static const double USUAL = 288.15; /* K, 15 degC */
    kent_record r;
    const bool there = kent_fill_group(f, &f->root, "water", &r);
    const bool warm = there && kent_record_has(&r, "temperature");
    const bool all = there && kent_record_has(&r, "density") &&
                     kent_record_has(&r, "bulk_modulus") &&
                     kent_record_has(&r, "viscosity") &&
                     kent_record_has(&r, "vapour_pressure");
    kent_water water = kent_water_at(given(&r, there, "temperature", USUAL));
    if (!warm && !all) {
        kent_fill_assume_value(f, "water temperature", USUAL, KENT_TEMPERATURE,
                               "no temperature given");
    }
    water.density = given(&r, there, "density", water.density);
    water.bulk_modulus = given(&r, there, "bulk_modulus", water.bulk_modulus);
    water.viscosity = given(&r, there, "viscosity", water.viscosity);
    water.vapour_pressure = given(&r, there, "vapour_pressure", water.vapour_pressure);
    water.sound_speed = sqrt(water.bulk_modulus / water.density);
    f->model->water = water;
    f->knows_temperature = warm;
    f->model->gas_content = given(&r, there, "gas_content", 0.0);
}

/* Stations are shown as usual in the units shown, whatever style the case has. */
static void say_station_style(kent_filling *f)
{
    const bool us = f->model->units == KENT_US;
    const kent_station_style style = f->reader.station_style;
    if (style == (us ? KENT_100FT_FT : KENT_KM_M)) return;
    kent_notes_add(&f->model->cautions,
                   "stations of the case are %s, and are shown as %s",
                   style == KENT_100M_M ? "100m+m"
                   : style == KENT_KM_M ? "km+m"
                                        : "100ft+ft",
                   us ? "100ft+ft" : "km+m");
}

void kent_fill_site(kent_filling *f)
{
    kent_record r;
    const bool there = kent_fill_group(f, &f->root, "site", &r);
    kent_model *m = f->model;
    m->barometric = kent_barometric_pressure(given(&r, there, "altitude", 0.0));
    m->gravity = given(&r, there, "gravity", m->gravity);
    if (there && kent_record_has(&r, "station_style")) {
        const int style = kent_record_field(&r, "station_style")->index;
        if (style >= 0) f->reader.station_style = (kent_station_style)style;
        say_station_style(f);
    }
    /* Only the vapour limit of a surge knows the weather. */
    const bool pipes =
        kent_record_has(&f->root, "pipes") || kent_record_has(&f->root, "pipes_file");
    if (pipes && !(there && kent_record_has(&r, "altitude"))) {
        kent_fill_assume_value(f, "barometric pressure", m->barometric, KENT_PRESSURE,
                               "no altitude given: sea level");
    }
}

void kent_fill_solver(kent_filling *f)
{
    kent_record r;
    kent_solver *s = &f->model->solver;
    if (!kent_fill_group(f, &f->root, "solver", &r)) return;
    if (kent_record_has(&r, "friction")) {
        s->friction = (kent_surge_friction)kent_record_field(&r, "friction")->index;
    }
    if (kent_record_has(&r, "column_separation")) {
        s->column_separation =
            (kent_separation)kent_record_field(&r, "column_separation")->index;
    }
    s->creep = kent_record_switch(&r, "creep", s->creep);
    s->grid_check = kent_record_switch(&r, "grid_check", s->grid_check);
    s->wave_speed_tolerance =
        kent_record_number_or(&r, "wave_speed_tolerance", s->wave_speed_tolerance);
    s->time_step = kent_record_number(&r, "time_step");
    if (kent_record_has(&r, "time_step")) {
        s->place =
            kent_tree_place(f->reader.tree, kent_record_field(&r, "time_step")->twig);
    }
    if (s->friction == KENT_SURGE_UNSTEADY) {
        kent_fill_assume(f, "friction of past accelerations",
                         "Zielke where laminar, else Vardy and Brown 2003",
                         "by the steady flow of each span, or 1 m/s where it is slower "
                         "than 0.05 m/s: theory 16.13");
    }
    const double reaches = kent_record_number_or(&r, "min_reaches", s->min_reaches);
    const double rows = kent_record_number_or(&r, "history_rows", s->history_rows);
    if (!r.sound) return;
    s->min_reaches = (int)reaches;
    s->history_rows = (int)rows;
}

/* A rule that the case states, as it is shown. */
static void own_rule_text(const kent_filling *f, const kent_key *key,
                          const kent_field *field, char *out, size_t size)
{
    if (key->value == KENT_VALUE_WORD) {
        (void)snprintf(out, size, "%s", field->twig->text);
    } else if (key->value == KENT_VALUE_SWITCH) {
        (void)snprintf(out, size, "%s", field->twig->number > 0.0 ? "true" : "false");
    } else {
        kent_fill_show(f, field->number, key->kind, out, size);
    }
}

void kent_fill_rules(kent_filling *f)
{
    static const char *const USUAL[] = {
        [KENT_SI] = "common-practice", [KENT_US] = "common-practice-US"};
    const char *usual = USUAL[f->reader.system]; /* the case's, however it is shown */
    kent_record r;
    const bool there = kent_fill_group(f, &f->root, "design_rules", &r);
    int set = there ? kent_record_field(&r, "set")->index : -1;
    if (set < 0) {
        set = kent_directory_find(&f->reader.shelves[KENT_SHELF_RULES], usual);
        kent_fill_assume(f, "design rules", usual, "no set of rules named");
    }
    if (set < 0 || (size_t)set >= f->catalogue->rule_count) {
        kent_complain(
            f->reader.complaints, kent_tree_file(f->reader.tree, 0), 1,
            "the catalogue has no set of rules \"%s\"; name one in design_rules",
            usual);
        return;
    }
    kent_rules *rules = &f->model->rules;
    *rules = f->catalogue->rules[set];
    if (!there) return;
    kent_record_rules(&r, rules);
    if (kent_record_has(&r, "safety_factor")) rules->soils[0] = '\0';
    for (size_t i = 0; i < r.count; i++) {
        if (!r.fields[i].twig || strcmp(r.keys[i].key, "set") == 0) continue;
        char value[64];
        own_rule_text(f, &r.keys[i], &r.fields[i], value, sizeof value);
        kent_notes_add(&f->model->cautions,
                       "design rule %s = %s is the case's own, not that of \"%s\"",
                       r.keys[i].key, value, rules->id);
    }
    kent_record_rules_check(&f->reader, &r, rules);
}

/* Whether an id ends in "-WORD". */
static bool ends_in(const char *id, const char *word)
{
    const size_t length = strlen(id);
    const size_t n = strlen(word);
    return length > n && id[length - n - 1] == '-' &&
           strcmp(id + length - n, word) == 0;
}

static bool is_same_bearing(const kent_soil *a, const kent_soil *b)
{
    bool same = a->route == b->route && a->by_depth_count == b->by_depth_count &&
                !(fabs(a->allowable_bearing - b->allowable_bearing) > 0.0) &&
                !(fabs(a->bearing_gradient - b->bearing_gradient) > 0.0);
    for (size_t i = 0; same && i < a->by_depth_count; i++) {
        same = !(fabs(a->by_depth[i].depth - b->by_depth[i].depth) > 0.0) &&
               !(fabs(a->by_depth[i].bearing - b->by_depth[i].bearing) > 0.0);
    }
    return same;
}

/* A soil of the case counts where it has kept the bearing of its row. */
static bool has_bearing_of(const kent_filling *f, const kent_soil *soil,
                           const char *table)
{
    for (size_t i = 0; i < f->catalogue->soil_count; i++) {
        const kent_soil *row = &f->catalogue->soils[i];
        if (ends_in(row->id, table) && is_same_bearing(row, soil)) return true;
    }
    return false;
}

/* Factor on the thrust in load cases of a kind. */
static double factor_in(const kent_model *m, kent_case_kind kind)
{
    const kent_rules *rules = &m->rules;
    const bool test = kind == KENT_CASE_TEST && !isnan(rules->factor_test);
    if (!isnan(m->loads.factor[kind])) return m->loads.factor[kind];
    return test ? rules->factor_test : rules->safety_factor;
}

/* Rules of the case's own that what it says of loads leaves without effect. */
static void tell_unasked(kent_filling *f, bool all_stated)
{
    const kent_model *m = f->model;
    const kent_rules *rules = &m->rules;
    const kent_twig *own = kent_record_field(&f->root, "design_rules")->twig;
    const double tested = factor_in(m, KENT_CASE_TEST);
    double most = tested;
    for (int i = 0; i <= KENT_CASE_SUCTION; i++) {
        most = fmax(most, factor_in(m, (kent_case_kind)i));
    }
    const struct {
        const char *key;
        double asked, up_to;
    } stands[] = {{"factor_sliding", rules->factor_sliding, most},
                  {"factor_overturning", rules->factor_overturning, most},
                  {"factor_stability_test", rules->factor_stability_test, tested}};
    for (size_t i = 0; i < sizeof stands / sizeof stands[0]; i++) {
        if (!kent_twig_member(own, stands[i].key)) continue;
        if (stands[i].asked <= stands[i].up_to) continue;
        kent_notes_add(&f->model->cautions,
                       "design rule %s, %.2f, is asked only up to the factor on the "
                       "thrust, %.2f: raise that in loads to have it asked in full",
                       stands[i].key, stands[i].asked, stands[i].up_to);
    }
    if (all_stated && kent_twig_member(own, "safety_factor")) {
        kent_notes_add(&f->model->cautions,
                       "design rule safety_factor, %.2f, is not asked: loads states "
                       "the factor; leave out one of them",
                       rules->safety_factor);
    }
    if (!isnan(m->loads.factor[KENT_CASE_TEST]) &&
        kent_twig_member(own, "factor_test")) {
        kent_notes_add(&f->model->cautions,
                       "design rule factor_test, %.2f, is not asked: loads states the "
                       "factor of the test, %.2f; say it there, as factors = { test = "
                       "%.2f; }",
                       rules->factor_test, tested, rules->factor_test);
    }
}

void kent_fill_rules_check(kent_filling *f)
{
    const kent_rules *rules = &f->model->rules;
    const kent_loads *l = &f->model->loads;
    bool asked = false; /* of any load case is the set's factor */
    for (size_t i = 0; i < sizeof l->factor / sizeof l->factor[0]; i++) {
        asked = asked || isnan(l->factor[i]);
    }
    if (kent_record_has(&f->root, "design_rules")) tell_unasked(f, !asked);
    if (!asked || rules->soils[0] == '\0') return;
    for (size_t i = 0; i < f->model->soil_count; i++) {
        const kent_soil *soil = &f->model->soils[i];
        if (has_bearing_of(f, soil, rules->soils)) continue;
        kent_notes_add(&f->model->cautions,
                       "the safety factor %.2f of design rules \"%s\" is meant for the "
                       "bearings of its own table, and that of soil \"%s\" is not one "
                       "of them; give loads.safety_factor, name another set, or a "
                       "soil whose id ends in %s",
                       rules->safety_factor, rules->id, soil->id, rules->soils);
    }
}

/* Of a class of the catalogue place.line stays 0: the strength is not the case's own.
 */
void kent_fill_concrete(kent_filling *f)
{
    kent_record r;
    kent_concrete *c = &f->model->concrete;
    if (!kent_fill_group(f, &f->root, "concrete", &r) || !r.sound) return;
    const int row = kent_record_field(&r, "class")->index;
    const int cement = kent_record_field(&r, "cement")->index;
    if (row >= 0 && kent_record_has(&r, "strength")) {
        kent_record_complain(&f->reader, &r, "strength",
                             "class and strength are both given; keep one");
        return;
    }
    if (row >= 0) {
        *c = f->catalogue->concretes[row];
        kent_fill_assume_value(f, "strength of concrete", c->strength, KENT_STRENGTH,
                               c->source);
    } else if (kent_record_has(&r, "strength")) {
        c->strength = kent_record_number(&r, "strength");
        c->place = r.place;
    }
    if (cement >= 0) {
        c->cement = (kent_cement)cement;
    } else {
        kent_fill_assume(f, "cement of concrete", "normal", "not given");
    }
}

void kent_fill_concrete_check(kent_filling *f)
{
    const kent_model *m = f->model;

    if (m->rules.blocks == KENT_BLOCKS_FORBIDDEN) return;
    if (isnan(m->concrete.strength)) {
        kent_fill_assume_value(f, "strength of concrete",
                               kent_concrete_usual(m->rules.concrete_code),
                               KENT_STRENGTH, "a low class; no concrete stated");
    }
    kent_fill_assume(
        f, "contact of fittings",
        "0.71 diameters across; along the pipe 0.25, of a bend 1.5 sin(half its turn), "
        "of a tee its branch, of a cap 0.71",
        "what they surely press on, where no contact_area is stated");
}
