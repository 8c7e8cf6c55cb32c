#include "kent_imprint.h"
#include "kent_pressures.h"
#include "kent_shown.h"
#include "kent_sink.h"
#include "kent_steps.h"
#include "kent_table.h"

#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static const double STANDARD_GRAVITY = 9.80665; /* m/s2: what nobody states */

/* What the parts of one hand calculation share. */
typedef struct kent_sheet {
    const kent_results *results;
    const kent_model *model;
    const kent_fitting *fitting;
    const kent_fitting_loads *loads;
    const kent_holding *holding;
    kent_system units;
    size_t limit; /* columns of a line; 0: none */
    kent_text *out;
} kent_sheet;

static void print_title(const kent_sheet *s)
{
    const kent_fitting *f = s->fitting;
    kent_text words = {0};
    kent_text_add(&words, "%s: %s, size %s %s", f->id,
                  kent_shown_fitting(s->model, f, s->units, KENT_ROOMY).text,
                  kent_shown_size(s->model, f, s->units).text,
                  kent_shown_unit(KENT_DIAMETER, s->units).text);
    if (isfinite(f->station)) {
        kent_text_add(&words, ", station %s",
                      kent_shown_station(s->units, f->station).text);
    }
    kent_table_paragraph(s->out, s->limit, "", kent_text_of(&words));
    if (s->model->title[0] != '\0') {
        kent_table_paragraph(s->out, s->limit, "", s->model->title);
    }
    kent_imprint_top(s->model, s->limit, s->out);
    kent_text_add(s->out, "\n");
    s->out->failed = s->out->failed || words.failed;
    kent_text_clear(&words);
}

/* ---- geometry -------------------------------------------------------------------- */

typedef struct kent_symbol {
    char text[24];
} kent_symbol;

__attribute__((format(printf, 1, 2))) static kent_symbol symbol(const char *fmt, ...)
{
    kent_symbol s;
    va_list args;
    va_start(args, fmt);
    (void)vsnprintf(s.text, sizeof s.text, fmt, args);
    va_end(args);
    return s;
}

static double axis_of(kent_vec3 v, int axis)
{
    return axis == 0 ? v.x : axis == 1 ? v.y : v.z;
}

/* Whether legs leave from points of their own: several fittings held as one. */
static bool spread(const kent_sheet *s) { return s->fitting->member_count > 1; }

/* A leg without a pipe has the direction that the case states. */
static void derive_stated_leg(const kent_port *p, int n, kent_derivation *d)
{
    static const char AXES[] = "xyz";
    char says[160];

    (void)snprintf(says, sizeof says, "Leg %d, %s", n,
                   p->kind == KENT_PORT_OUTLET ? "open to the air" : "the dead branch");
    kent_derivation_heading(d, says);
    for (int a = 0; a < 3; a++) {
        kent_derivation_put(d, symbol("n_%d%c", n, AXES[a]).text,
                            axis_of(p->direction, a), KENT_RATIO, KENT_GIVEN,
                            "direction out of the fitting");
    }
}

static void derive_start(const kent_point *from, kent_derivation *d)
{
    static const char AXES[] = "xyz";
    char says[160];

    for (int a = 0; a < 3; a++) {
        (void)snprintf(says, sizeof says, "%c of %s", AXES[a], from->id);
        kent_derivation_put(d, symbol("%c0", AXES[a]).text, axis_of(from->at, a),
                            KENT_LENGTH, KENT_GIVEN, says);
    }
}

/* Direction of one leg out of the coordinates of its two points. */
static void derive_leg(const kent_sheet *s, size_t port, kent_derivation *d)
{
    static const char AXES[] = "xyz";
    const kent_port *p = &s->model->ports[s->fitting->port_first + port];
    const int n = (int)port + 1, start = kent_port_point(s->model, s->fitting, p);
    char formula[160], says[160];

    if (p->kind != KENT_PORT_SPAN) {
        derive_stated_leg(p, n, d);
        return;
    }
    const kent_point *to = &s->model->points[p->toward];
    const kent_point *from = &s->model->points[start];
    const kent_vec3 step = kent_vec3_sub(to->at, from->at);

    (void)snprintf(says, sizeof says, "Leg %d, towards %s", n, to->id);
    kent_derivation_heading(d, says);
    for (int a = 0; a < 3; a++) {
        (void)snprintf(says, sizeof says, "%c of %s", AXES[a], to->id);
        kent_derivation_put(d, symbol("%c%d", AXES[a], n).text, axis_of(to->at, a),
                            KENT_LENGTH, KENT_GIVEN, says);
    }
    if (spread(s)) derive_start(from, d);
    (void)snprintf(formula, sizeof formula, "sqrt((x%d-x0)^2+(y%d-y0)^2+(z%d-z0)^2)", n,
                   n, n);
    kent_derivation_work(d, symbol("L%d", n).text, kent_vec3_length(step), KENT_LENGTH,
                         formula, "", "length in space");
    for (int a = 0; a < 3; a++) {
        const double share = axis_of(step, a) / kent_vec3_length(step);
        (void)snprintf(formula, sizeof formula, "(%c%d-%c0)/L%d", AXES[a], n, AXES[a],
                       n);
        kent_derivation_work(d, symbol("n_%d%c", n, AXES[a]).text, share, KENT_RATIO,
                             formula, "", "direction out of the fitting");
    }
}

/* The angle between two legs, with the cosine that both give. */
static void derive_angle(const kent_sheet *s, size_t i, size_t j, const char *says,
                         kent_derivation *d)
{
    const kent_port *ports = &s->model->ports[s->fitting->port_first];
    const bool bend = s->fitting->type == KENT_BEND;
    const double sign = bend ? -1.0 : 1.0; /* flow enters against the first leg */
    const double cosine = sign * kent_vec3_dot(ports[i].direction, ports[j].direction);
    const double angle =
        kent_vec3_angle(kent_vec3_scale(sign, ports[i].direction), ports[j].direction);
    char formula[160];
    const int a = (int)i + 1, b = (int)j + 1;

    (void)snprintf(formula, sizeof formula, "%s(n_%dx*n_%dx+n_%dy*n_%dy+n_%dz*n_%dz)",
                   bend ? "-" : "", a, b, a, b, a, b);
    kent_derivation_work(d, "cosine", cosine, KENT_RATIO, formula, bend ? "5.4" : "5.7",
                         "cosine of the angle, by the two directions");
    kent_derivation_put(d, "angle", angle, KENT_ANGLE, KENT_COMPUTED, says);
    kent_derivation_work(d, "cosine'", cos(angle), KENT_RATIO, "cos(angle)", "",
                         "check: the same cosine");
}

static void print_geometry(const kent_sheet *s)
{
    const kent_fitting *f = s->fitting;
    const kent_port *ports = &s->model->ports[f->port_first];
    kent_derivation d = {0};
    bool drawn = f->point >= 0 && isfinite(f->at.x);
    for (size_t i = 0; i < f->port_count; i++) {
        drawn = drawn && (ports[i].toward >= 0 || ports[i].kind != KENT_PORT_SPAN);
    }
    if (!drawn) {
        kent_text_add(s->out, "Geometry: as stated in the case, no coordinates.\n");
        return;
    }
    char says[160];
    (void)snprintf(says, sizeof says, "Geometry of %s, x east, y north, z up", f->id);
    kent_derivation_heading(&d, says);
    if (!spread(s)) {
        kent_derivation_put(&d, "x0", f->at.x, KENT_LENGTH, KENT_GIVEN,
                            "x of the fitting");
        kent_derivation_put(&d, "y0", f->at.y, KENT_LENGTH, KENT_GIVEN,
                            "y of the fitting");
        kent_derivation_put(&d, "z0", f->at.z, KENT_LENGTH, KENT_GIVEN,
                            "z of the fitting");
    }
    for (size_t i = 0; i < f->port_count; i++) {
        derive_leg(s, i, &d);
    }
    if (f->type == KENT_BEND && f->port_count == 2) {
        kent_derivation_heading(&d, "Turn in space");
        derive_angle(s, 0, 1, "turn of the bend in space", &d);
    }
    if ((f->type == KENT_TEE || f->type == KENT_WYE) && f->port_count == 3) {
        const kent_vec3 branch = ports[2].direction;
        const bool first = kent_vec3_angle(branch, ports[0].direction) <=
                           kent_vec3_angle(branch, ports[1].direction);
        kent_derivation_heading(&d, "Branch");
        derive_angle(s, first ? 0 : 1, 2,
                     first ? "of the branch, with leg 1" : "of the branch, with leg 2",
                     &d);
    }
    kent_steps_print(&d, s->units, s->limit, s->out);
    kent_derivation_clear(&d);
}

/* ---- load cases ------------------------------------------------------------------ */

static void case_row(const kent_sheet *s, size_t i, kent_table *t)
{
    const kent_load_case *c = &s->loads->cases[i];
    const bool governs = s->holding->governing == (int)i;
    const kent_sense sense = governs ? s->holding->sense : KENT_RESULTANT;
    const kent_instant *at = &c->worst[sense];
    const kent_vec3 thrust =
        at->set ? kent_instant_lasting(at) : (kent_vec3){NAN, NAN, NAN};
    const double whole = kent_vec3_length(thrust);
    const double numbers[] = {thrust.x, thrust.y, thrust.z, whole};
    kent_table_cell(t, "%s%s", c->title.s, governs ? " *" : "");
    kent_table_cell(t, "%s", kent_shown_number(at->set ? at->time : NAN, 2).text);
    kent_table_cell(
        t, "%s",
        kent_shown_quantity(KENT_PRESSURE, s->units, at->set ? at->pressure : NAN)
            .text);
    for (size_t k = 0; k < sizeof numbers / sizeof numbers[0]; k++) {
        kent_table_cell(t, "%s",
                        kent_shown_quantity(KENT_FORCE, s->units, numbers[k]).text);
    }
    kent_table_cell(t, "%s", kent_shown_number(c->safety_factor, 2).text);
    kent_table_cell(
        t, "%s",
        kent_shown_quantity(KENT_FORCE, s->units, c->safety_factor * whole).text);
}

static void print_cases(const kent_sheet *s)
{
    const kent_shown bar = kent_shown_unit(KENT_PRESSURE, s->units);
    const kent_shown kn = kent_shown_unit(KENT_FORCE, s->units);
    const kent_column columns[] = {
        {"load case", "", KENT_ALIGN_LEFT, true},
        {"at", "s", KENT_ALIGN_RIGHT, false},
        {"pressure", bar.text, KENT_ALIGN_RIGHT, false},
        {"east", kn.text, KENT_ALIGN_RIGHT, false},
        {"north", kn.text, KENT_ALIGN_RIGHT, false},
        {"up", kn.text, KENT_ALIGN_RIGHT, false},
        {"thrust", kn.text, KENT_ALIGN_RIGHT, false},
        {"factor", "", KENT_ALIGN_RIGHT, false},
        {"factored", kn.text, KENT_ALIGN_RIGHT, false},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    kent_text_add(s->out, "\nLoad cases, each at the instant of its largest thrust\n");
    for (size_t i = 0; i < s->loads->count; i++) {
        case_row(s, i, &t);
    }
    (void)kent_table_print(&t, s->limit, s->out);
    kent_table_clear(&t);
    if (s->holding->governing >= 0) {
        kent_text_add(s->out, "*  governs, by its %s thrust\n",
                      kent_shown_sense(s->holding->sense));
    }
}

static bool is_static(const kent_load_case *c)
{
    return c->scenario < 0 && c->kind == KENT_CASE_STATIC;
}

static const char *equation_of(const kent_load_case *c)
{
    if (c->scenario < 0 && c->kind == KENT_CASE_SHUT_OFF) return "9.15";
    return is_static(c) ? "9.2" : "9.3";
}

static const char *head_words(const kent_model *m, const kent_load_case *c)
{
    if (c->scenario >= 0) return "head at that instant";
    if (c->kind == KENT_CASE_SHUT_OFF) return "level of pumps at no flow";
    if (!is_static(c)) return "head of the steady state";
    return isnan(m->loads.static_level) ? "highest level connected"
                                        : "static level stated";
}

/* A symbol of one case: "p_B" of the second, so that it is no port's p_2. */
static kent_symbol case_symbol(const char *what, size_t index)
{
    const char letter = (char)('A' + index % 26);
    return index < 26 ? symbol("%s_%c", what, letter)
                      : symbol("%s_%c%zu", what, letter, index / 26);
}

/* The pressure of one case out of a level, a head or the test gauge. */
static void derive_case_pressure(const kent_sheet *s, const kent_load_case *c,
                                 size_t index, kent_derivation *d)
{
    const kent_model *m = s->model;
    const double p = c->worst[KENT_RESULTANT].pressure;
    const double head = p / (m->water.density * m->gravity) + s->fitting->at.z;
    char formula[64];
    if (c->scenario < 0 && c->kind == KENT_CASE_TEST) {
        kent_derivation_work(d, case_symbol("p", index).text, p, KENT_PRESSURE,
                             "p_test+rho*g*(z_gauge-z)", "9.1",
                             "test pressure, by elevation");
        return;
    }
    if (c->later) {
        kent_derivation_work(d, case_symbol("p", index).text, p, KENT_PRESSURE,
                             "p_later+rho*g*(z_later-z)", "9.12",
                             "later pressure, by elevation");
        return;
    }
    kent_derivation_put(d, case_symbol("H", index).text, head, KENT_LENGTH,
                        KENT_COMPUTED, head_words(m, c));
    (void)snprintf(formula, sizeof formula, "rho*g*(%s-z)",
                   case_symbol("H", index).text);
    kent_derivation_work(d, case_symbol("p", index).text, p, KENT_PRESSURE, formula,
                         equation_of(c), "pressure at the centre");
}

/* Each case of a fitting in a network by arithmetic: pressure, thrust, factored. */
static void print_case_arithmetic(const kent_sheet *s)
{
    const kent_model *m = s->model;
    const kent_site_test *test = s->loads->count > 0 ? s->loads->cases[0].test : NULL;
    kent_derivation d = {0};
    if (s->fitting->point < 0) return;
    kent_derivation_heading(&d, "Each case by arithmetic");
    kent_derivation_put(&d, "rho", m->water.density, KENT_DENSITY, KENT_COMPUTED,
                        "density of the water");
    kent_derivation_put(&d, "g", m->gravity, KENT_ACCELERATION,
                        m->gravity == STANDARD_GRAVITY ? KENT_ASSUMED : KENT_GIVEN,
                        "gravity");
    kent_derivation_put(&d, "z", s->fitting->at.z, KENT_LENGTH, KENT_GIVEN,
                        "level of the fitting's centre");
    if (test && isfinite(test->pressure)) {
        kent_site_test_derive(m, test, s->fitting->at.z, &d);
    }
    if (isfinite(m->loads.future_pressure)) {
        kent_loads_derive_later(m, s->fitting, &d);
    }
    for (size_t i = 0; i < s->loads->count; i++) {
        const kent_load_case *c = &s->loads->cases[i];
        const kent_instant *at = &c->worst[KENT_RESULTANT];
        const kent_symbol factor = case_symbol("SF", i), force = case_symbol("T", i);
        char words[160];
        if (!at->set) continue;
        (void)snprintf(words, sizeof words, "Case %s: %s", case_symbol("", i).text + 1,
                       c->title.s);
        kent_derivation_heading(&d, words);
        derive_case_pressure(s, c, i, &d);
        const double thrust = kent_vec3_length(kent_instant_lasting(at));
        kent_derivation_put(&d, force.text, thrust, KENT_FORCE, KENT_COMPUTED,
                            "thrust, by the balance of its ports");
        kent_derivation_put(&d, factor.text, c->safety_factor, KENT_RATIO, KENT_GIVEN,
                            "factor of this case");
        (void)snprintf(words, sizeof words, "%s*%s", factor.text, force.text);
        kent_derivation_work(&d, case_symbol("F", i).text, c->safety_factor * thrust,
                             KENT_FORCE, words, "10.11", "factored");
    }
    kent_text_add(s->out, "\n");
    kent_steps_print(&d, s->units, s->limit, s->out);
    kent_derivation_clear(&d);
}

/* ---- the calculation, and what stands beside it ---------------------------------- */

static void print_runner_up(const kent_sheet *s)
{
    const kent_holding *h = s->holding;
    kent_text words = {0};
    if (h->governing < 0 || h->runner_up < 0) return;
    kent_text_add(&words, "Runner-up: %s, %s factored",
                  s->loads->cases[h->runner_up].title.s,
                  kent_shown_with_unit(KENT_FORCE, s->units, h->runner_up_load).text);
    if (h->design_thrust > 0.0) {
        kent_text_add(&words, ", %.0f %% of what governs (which is %.1f %% more)",
                      100.0 * h->runner_up_load / h->design_thrust,
                      100.0 * h->runner_up_margin);
    }
    kent_text_add(&words, ".");
    kent_table_paragraph(s->out, s->limit, "", kent_text_of(&words));
    s->out->failed = s->out->failed || words.failed;
    kent_text_clear(&words);
}

static void add_leg(const kent_sheet *s, const kent_leg *leg, kent_text *words)
{
    const kent_port *p = &s->model->ports[s->fitting->port_first + leg->port];
    kent_text_add(words, "%s",
                  kent_shown_with_unit(KENT_LENGTH, s->units, leg->length).text);
    if (p->toward >= 0) {
        kent_text_add(words, " towards %s", s->model->points[p->toward].id);
    }
    if (leg->pipes > 0) {
        kent_text_add(words, ", %d whole pipe%s", leg->pipes,
                      leg->pipes == 1 ? "" : "s");
    }
    if (!leg->fits) kent_text_add(words, " (does not fit before the next fitting)");
}

/* "block 1.05 × 0.70 × 0.45 m", "gravity 2.5 m³, 4ø16 mm"; a volume or a length has its
 * unit already. */
static void add_part(const kent_sheet *s, const kent_part *part, kent_text *words)
{
    const kent_block *b = &s->holding->block;
    const bool block = s->holding->held && b->type != KENT_BLOCK_NONE;
    const bool sides =
        block && !part->joints && (part->face || b->type != KENT_BLOCK_GRAVITY);
    const bool tied =
        block && !part->joints && !part->face && s->holding->straps.legs > 0;
    kent_text_add(
        words, "%s",
        kent_shown_part(s->model, s->fitting, s->holding, part, s->units, KENT_ROOMY)
            .text);
    if (sides) {
        kent_text_add(words, " %s", kent_shown_unit(KENT_LENGTH, s->units).text);
    } else if (tied) {
        kent_text_add(words, " %s", kent_shown_unit(KENT_DIAMETER, s->units).text);
    }
}

/* "A block instead: block 1.05 × 0.70 × 0.45 m, 0.39 m³ of concrete." */
static void print_block_instead(const kent_sheet *s)
{
    const kent_either *e = &s->holding->either;
    kent_text words = {0};
    if (!e->looked_at || s->holding->chosen != KENT_RESTRAINED_JOINTS) return;
    kent_text_add(&words, "A block instead: ");
    if (e->block.type == KENT_BLOCK_NONE) {
        kent_text_add(&words, "none%s%s.", e->no_block ? ": " : "",
                      e->no_block ? e->no_block : "");
    } else {
        const bool sides = e->block.type != KENT_BLOCK_GRAVITY;
        kent_text_add(
            &words, "%s%s%s, ", kent_shown_block(&e->block, s->units, KENT_ROOMY).text,
            sides ? " " : "", sides ? kent_shown_unit(KENT_LENGTH, s->units).text : "");
        kent_text_add(
            &words, "%s of concrete in all.",
            kent_shown_with_unit(KENT_VOLUME, s->units, e->quantities.concrete).text);
    }
    kent_table_paragraph(s->out, s->limit, "", kent_text_of(&words));
    s->out->failed = s->out->failed || words.failed;
    kent_text_clear(&words);
}

/* What holds it, and the restrained length beside it. */
static void print_outcome(const kent_sheet *s)
{
    const kent_holding *h = s->holding;
    const bool alone = h->chosen == KENT_RESTRAINED_JOINTS;
    const bool both = h->chosen == KENT_BLOCK_AND_JOINTS;
    kent_part parts[KENT_PARTS];
    kent_text words = {0};
    const size_t count = kent_shown_parts(s->loads, h, parts);
    for (size_t i = 0; i < count; i++) {
        const kent_part *p = &parts[i];
        kent_text_reset(&words);
        kent_text_add(&words, i > 0 ? "and by " : "Held by ");
        add_part(s, p, &words);
        if (isfinite(p->factor_reached) && p->governing >= 0) {
            kent_text_add(&words, ", against %s; factor reached %.2f, asked %.2f; ",
                          s->loads->cases[p->governing].title.s, p->factor_reached,
                          s->loads->cases[p->governing].safety_factor);
            kent_text_add(&words, "load over resistance %.2f", p->utilisation);
        }
        kent_text_add(&words, ".");
        kent_table_paragraph(s->out, s->limit, "", kent_text_of(&words));
    }
    kent_text_reset(&words);
    kent_text_add(&words, "Restrained length%s: ", alone || both ? "" : " instead");
    for (size_t i = 0; i < h->leg_count; i++) {
        if (i > 0) kent_text_add(&words, "; ");
        add_leg(s, &h->legs[i], &words);
    }
    if (h->leg_count == 0) {
        kent_text_add(&words, "none can be given%s",
                      h->needs_nothing ? "; none is needed" : "");
    }
    kent_text_add(&words, ".");
    kent_table_paragraph(s->out, s->limit, "", kent_text_of(&words));
    s->out->failed = s->out->failed || words.failed;
    kent_text_clear(&words);
    print_block_instead(s);
}

/* What strings of fused or welded pipe pull at it with. */
static void print_pulls(const kent_sheet *s)
{
    const kent_pulls *pulls = &s->results->restraints->pulls;
    const int fitting = (int)(s->fitting - s->model->fittings);
    for (size_t i = 0; i < pulls->end_count; i++) {
        const kent_pull_end *p = &pulls->ends[i];
        if (s->results->loads->strings.ends[p->end].fitting != fitting) continue;
        kent_text_add(s->out, "\n");
        kent_steps_print(&p->derivation, s->units, s->limit, s->out);
        for (size_t k = 0; k < p->cautions.count; k++) {
            kent_table_paragraph(s->out, s->limit, p->cautions.grave[k] ? "!  " : "-  ",
                                 p->cautions.text[k]);
        }
    }
}

static void print_those(const kent_sheet *s, const kent_notes *notes, bool grave)
{
    for (size_t i = 0; i < notes->count; i++) {
        if (notes->grave[i] != grave) continue;
        kent_table_paragraph(s->out, s->limit, grave ? "!  " : "-  ", notes->text[i]);
    }
}

/* As under the table: what is unsafe first, of the whole case before its own. */
static void print_cautions(const kent_sheet *s)
{
    const kent_notes *notes[] = {&s->results->cautions, &s->holding->cautions,
                                 &s->holding->remarks};
    const size_t count = sizeof notes / sizeof notes[0];
    size_t said = 0;
    for (size_t k = 0; k < count; k++) {
        said += notes[k]->count;
    }
    if (said == 0) return;
    kent_text_add(s->out, "\nCautions\n");
    for (size_t k = 0; k < count; k++) {
        print_those(s, notes[k], true);
    }
    for (size_t k = 0; k < count; k++) {
        print_those(s, notes[(k + 1) % count], false); /* its own first */
    }
}

/* Whether an assumed line above says the same ("weight: not asked for" of x, y, z). */
static bool said_before(const kent_derivation *d, size_t index)
{
    for (size_t i = 0; i < index; i++) {
        const kent_line *line = &d->lines[i];
        if (line->symbol[0] == '\0' || line->source != KENT_ASSUMED) continue;
        if (strcmp(line->says, d->lines[index].says) == 0) return true;
    }
    return false;
}

/* Assumed lines of this calculation, then those of the whole case. */
static void print_needs(const kent_sheet *s)
{
    const kent_derivation *d = &s->holding->derivation;
    const kent_notes *assumed = &s->model->assumed;
    size_t count = assumed->count;
    kent_text_add(s->out, "\nWhat it needs from you: a value in place of each assumed "
                          "one\n");
    for (size_t i = 0; i < d->count; i++) {
        const kent_line *line = &d->lines[i];
        char value[64];
        kent_text words = {0};
        if (line->symbol[0] == '\0' || line->source != KENT_ASSUMED) continue;
        if (said_before(d, i)) continue;
        kent_line_value(line, s->units, value, sizeof value);
        kent_text_add(&words, "%s = %s: %s", line->symbol, value, line->says);
        kent_table_paragraph(s->out, s->limit, "-  ", kent_text_of(&words));
        s->out->failed = s->out->failed || words.failed;
        kent_text_clear(&words);
        count++;
    }
    for (size_t i = 0; i < assumed->count; i++) {
        kent_text words = {0};
        kent_shown_assumption(assumed->text[i], &words);
        kent_table_paragraph(s->out, s->limit, "-  ", kent_text_of(&words));
        s->out->failed = s->out->failed || words.failed;
        kent_text_clear(&words);
    }
    if (count == 0) kent_text_add(s->out, "-  nothing: no value was assumed\n");
}

kent_status kent_report_explain(const kent_results *r, int fitting,
                                const kent_report_options *o, kent_sink sink)
{
    kent_text out = {0};
    const kent_sheet s = {.results = r,
                          .model = r->model,
                          .fitting = &r->model->fittings[fitting],
                          .loads = &r->loads->fittings[fitting],
                          .holding = &r->restraints->fittings[fitting],
                          .units = o->units,
                          .limit = o->wide ? 0 : KENT_TABLE_LIMIT,
                          .out = &out};
    print_title(&s);
    print_geometry(&s);
    print_cases(&s);
    print_case_arithmetic(&s);
    kent_text_add(&out, "\n");
    kent_steps_print(&s.holding->derivation, s.units, s.limit, &out);
    kent_text_add(&out, "\n");
    print_runner_up(&s);
    print_outcome(&s);
    print_pulls(&s);
    print_cautions(&s);
    print_needs(&s);
    kent_text_add(&out, "\n");
    kent_imprint_end(s.model, s.limit, &out);
    const kent_status status = kent_sink_flush(sink, &out);
    kent_text_clear(&out);
    return status;
}
