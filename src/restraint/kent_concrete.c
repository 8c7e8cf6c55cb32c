/* Concrete of one block: what it is made for, how thick it must be, what the fitting
 * presses on it, when it is strong enough. */
#include "kent_concrete_internal.h"
#include "kent_said.h"
#include "kent_side_internal.h"

static const double DAY = 86400.0;            /* s */
static const double ACI_THIN = 8.0 * 0.0254;  /* m: no plain footing is thinner */
static const double RING_AGE = 7.0 * 86400.0; /* s: where the rules ask for none */
static const double FULL_USE = 1.0 + 1e-9;

/* ---- what it is made for --------------------------------------------------------- */

/* N: the greatest thrust of a sense, under the test alone or in any case, each with its
 * factor and no less than the code's. source docs/theory 19.3 */
static double design_load(const kent_holding_work *w, kent_sense sense, bool test,
                          double share)
{
    const double least = kent_concrete_least_factor(w->m->rules.concrete_code);
    double load = 0.0;

    if (!(w->demand.load[sense] > 0.0)) return 0.0;
    for (size_t i = 0; i < w->loads->count; i++) {
        const kent_load_case *c = &w->loads->cases[i];
        if (test && c->kind != KENT_CASE_TEST) continue;
        load = fmax(load, fmax(c->safety_factor, least) * kent_holding_part(c, sense));
    }
    return load * share;
}

static bool is_tested(const kent_fitting_loads *loads)
{
    for (size_t i = 0; i < loads->count; i++) {
        if (loads->cases[i].kind == KENT_CASE_TEST) return true;
    }
    return false;
}

double kent_concrete_body(const kent_holding_work *w)
{
    const kent_fitting *f = w->fitting;
    const double od = w->site.diameter;

    switch (f->type) {
    case KENT_BEND:
        return 1.5 * sin(0.5 * f->angle) * od;
    case KENT_TEE:
    case KENT_WYE:
        return f->branch_size > 0.0 ? fmin(f->branch_size, od) : 0.0;
    case KENT_DEAD_END:
        return sqrt(0.5) * od;
    case KENT_CROSS:
    case KENT_REDUCER:
    case KENT_VALVE:
    case KENT_STRAIGHT:
    case KENT_CURVE:
    case KENT_GROUP:
        break;
    }
    return 0.0;
}

/* A valve, and what the pipe passes through, press by a flange, feet or a ring. */
static kent_face contact_of(const kent_holding_work *w)
{
    const double area = w->fitting->stated.contact_area;

    if (area > 0.0) return kent_contact_of(area, w->site.diameter);
    if (w->site.hole > 0.0 || w->fitting->type == KENT_VALVE) {
        return (kent_face){NAN, NAN};
    }
    return kent_contact_usual(w->site.diameter, kent_concrete_body(w));
}

void kent_concrete_prepare(kent_holding_work *w, const kent_holding *h)
{
    const kent_model *m = w->m;
    const bool stated = m->concrete.strength > 0.0;
    const double share = isnan(h->block_share) ? 1.0 : h->block_share;
    kent_poured *c = &w->site.concrete;

    w->tested = is_tested(w->loads);
    c->strength =
        stated ? m->concrete.strength : kent_concrete_usual(m->rules.concrete_code);
    c->contact = contact_of(w);
    for (kent_sense s = KENT_SIDEWAYS; s < KENT_SENSES; s++) {
        c->load[s] = design_load(w, s, false, share);
        c->test[s] = design_load(w, s, w->tested, share);
    }
}

/* ---- how thick ------------------------------------------------------------------- */

/* Use of a plain footing of that side. The ground does not press where the pipe passes
 * through. */
static kent_plain_use bent(const kent_rules *rules, const kent_site *site,
                           kent_face side, double thickness, double load)
{
    const double gross = side.width * side.height;
    const double net = gross - site->hole;

    return kent_concrete_footing(rules->concrete_code, site->concrete.strength,
                                 site->concrete.contact, side, thickness,
                                 load * gross / net);
}

/* source docs/theory/19-concrete.md, 19.11 */
double kent_site_thickness(const kent_rules *rules, const kent_site *site,
                           kent_face side, kent_sense sense)
{
    const double spread = kent_block_thickness(rules, side, site->diameter);
    const double least = fmax(rules->least_thickness, rules->concrete_behind);
    const double thin = rules->concrete_code == KENT_ACI_318 ? ACI_THIN : 0.0;
    const double step = rules->side_step;
    const double first = kent_side_up(fmax(least, thin), step);

    if (rules->spread != KENT_SPREAD_CONCRETE) return spread;
    if (isnan(site->concrete.contact.width)) return spread;
    for (int k = 0; first + k * step < spread - 0.5 * step; k++) {
        const double thickness = kent_side_up(first + k * step, step);
        const kent_plain_use use =
            bent(rules, site, side, thickness, site->concrete.load[sense]);
        if (kent_concrete_carries(&use)) return thickness;
    }
    return spread;
}

/* ---- what presses ---------------------------------------------------------------- */

typedef struct pressing {
    kent_sense sense; /* KENT_RESULTANT: sideways and down on one body */
    double load, test;
    kent_face side;
    double thickness; /* of the concrete behind the contact */
} pressing;

static pressing pressing_of(const kent_holding_work *w, kent_sense sense,
                            kent_face side, double thickness)
{
    const kent_poured *c = &w->site.concrete;
    return (pressing){sense, c->load[sense], c->test[sense], side, thickness};
}

/* On the face, or on the body beside it; both where there are both. Returns how many.
 */
static size_t pressings(const kent_holding_work *w, const kent_block *b,
                        pressing out[2])
{
    const kent_poured *c = &w->site.concrete;
    const bool down = c->load[KENT_DOWNWARD] > 0.0;
    size_t count = 0;

    out[0] = pressing_of(w, KENT_SIDEWAYS, b->face,
                         b->has_face ? b->face_thickness : b->thickness);
    if (c->load[KENT_SIDEWAYS] > 0.0) count = 1;
    if (!down) return count;
    switch (b->type) {
    case KENT_BLOCK_NONE:
        return 0;
    case KENT_BLOCK_BEARING:
        out[0].sense = KENT_RESULTANT;
        out[0].load = hypot(out[0].load, c->load[KENT_DOWNWARD]);
        out[0].test = hypot(out[0].test, c->test[KENT_DOWNWARD]);
        return count;
    case KENT_BLOCK_BASE:
        out[count] = pressing_of(w, KENT_DOWNWARD, (kent_face){b->width, b->height},
                                 b->thickness);
        break;
    case KENT_BLOCK_GRAVITY:
        out[count] = pressing_of(w, KENT_DOWNWARD, (kent_face){b->width, b->thickness},
                                 fmax(0.0, 0.5 * (b->height - w->site.diameter)));
        break;
    }
    return count + 1;
}

/* Pa that the concrete beside the contact may be pressed with. */
static double allowed_at(const kent_holding_work *w, const pressing *p, double strength)
{
    const kent_concrete_code code = w->m->rules.concrete_code;
    return kent_concrete_pressed(code, strength) *
           kent_concrete_widening(code, w->site.concrete.contact, p->side,
                                  p->thickness);
}

static void press(const kent_holding_work *w, const pressing *p, kent_concrete_check *c)
{
    const double area = c->contact.width * c->contact.height;
    const double allowed = allowed_at(w, p, c->strength);
    const double use = p->load / (area * allowed); /* NaN: the contact is not known */

    const double needed = c->strength * p->test / (area * allowed);
    const bool milder = isnan(use) ? p->load <= c->load : use <= c->use;

    c->strength_needed = fmax(c->strength_needed, needed);
    if (milder) return; /* than the other body's */
    c->sense = p->sense;
    c->load = p->load;
    c->test_load = p->test;
    c->contact_needed = p->load / kent_concrete_pressed(c->code, c->strength);
    if (isnan(use)) return;
    c->pressed = true;
    c->pressure = p->load / area;
    c->allowed = allowed;
    c->use = use;
    c->splits = c->pressure > kent_concrete_pressed(c->code, c->strength) * FULL_USE;
    c->into = p->side;
    c->behind = p->thickness;
    c->needed_pressed = needed;
}

static kent_concrete_check check_of(const kent_holding_work *w)
{
    return (kent_concrete_check){
        .code = w->m->rules.concrete_code,
        .strength = w->site.concrete.strength,
        .strength_assumed = !(w->m->concrete.strength > 0.0),
        .sense = KENT_SIDEWAYS,
        .load = NAN,
        .test_load = NAN,
        .contact = w->site.concrete.contact,
        .contact_assumed = !(w->fitting->stated.contact_area > 0.0),
        .contact_needed = NAN,
        .pressure = NAN,
        .allowed = NAN,
        .use = NAN,
        .into = {NAN, NAN},
        .behind = NAN,
        .bent = {NAN, NAN},
        .thick = NAN,
        .needed_pressed = NAN,
        .needed_wide = NAN,
        .wide = {NAN, NAN, NAN},
        .strength_needed = w->m->rules.strength_before_test,
        .age = NAN,
    };
}

static kent_concrete_check pressed_check(const kent_holding_work *w,
                                         const kent_block *b)
{
    kent_concrete_check c = check_of(w);
    pressing on[2];
    const size_t count = pressings(w, b, on);

    for (size_t i = 0; i < count; i++) {
        press(w, &on[i], &c);
    }
    return c;
}

bool kent_concrete_bears(const kent_holding_work *w, kent_holding *h)
{
    h->concrete = pressed_check(w, &h->block);
    return h->concrete.contact_assumed || !(h->concrete.use > FULL_USE);
}

static double whole_days(double age) { return DAY * ceil(age / DAY - 1e-9); }

/* ---- beyond 45 degrees, and when ------------------------------------------------- */

/* Pa of strength that bends as far as a use of the present one asks.
 * source docs/theory 19.22 */
static double strength_for(const kent_holding_work *w, const kent_plain_use *use)
{
    const double strength = w->site.concrete.strength;
    const double over = 8e6; /* mean over characteristic */
    const double punching = isnan(use->punching) ? 0.0 : use->punching;
    double pull;

    switch (w->m->rules.concrete_code) {
    case KENT_EN_1992: /* its bending use goes by the root of the tension */
        pull = fmax(use->bending * use->bending, use->shear);
        return pull * (strength + over) - over;
    case KENT_ACI_318:
        break;
    }
    pull = fmax(fmax(use->bending, use->shear), punching);
    return pull * pull * strength;
}

/* A face, or a base, that is thinner than a spread within 45 degrees. */
static void check_width(const kent_holding_work *w, kent_sense sense, kent_face side,
                        double thickness, kent_concrete_check *c)
{
    const kent_rules *rules = &w->m->rules;
    const double spread = kent_block_thickness(rules, side, w->site.diameter);
    const kent_poured *made = &w->site.concrete;

    if (!(made->load[sense] > 0.0)) return;
    if (!(thickness < spread - 0.5 * rules->side_step)) return;
    const kent_plain_use use =
        bent(rules, &w->site, side, thickness, made->load[sense]);
    const kent_plain_use test =
        bent(rules, &w->site, side, thickness, made->test[sense]);
    c->needed_wide = fmax(c->needed_wide, strength_for(w, &test));
    const bool milder = c->beyond_45 && use.bending <= c->wide.bending;
    if (milder) return; /* than the other body's */
    c->beyond_45 = true;
    c->bends = sense;
    c->bent = side;
    c->thick = thickness;
    c->wide = use;
}

/* s: the age that the design rules ask for; NAN: their strength is never there. */
static double asked_age(const kent_holding_work *w, const kent_concrete_check *c)
{
    const kent_rules *rules = &w->m->rules;
    const double age = kent_concrete_age(c->code, w->m->concrete.cement, c->strength,
                                         rules->strength_before_test);
    const bool none = !(rules->strength_before_test > 0.0) && !(rules->least_age > 0.0);

    if (none) return RING_AGE;
    return isnan(age) ? age : fmax(age, whole_days(rules->least_age));
}

/* A ring that nobody states is to be wide enough for concrete of the age that is asked
 * for anyway. */
static void check_ring(const kent_holding_work *w, kent_concrete_check *c)
{
    const double age = asked_age(w, c);
    const double young =
        kent_concrete_strength_at(c->code, w->m->concrete.cement, c->strength, age);

    if (isnan(age)) return;
    c->contact_needed =
        fmax(c->contact_needed, c->test_load / kent_concrete_pressed(c->code, young));
    c->strength_needed = fmax(c->strength_needed, young);
}

static void check_age(const kent_holding_work *w, kent_concrete_check *c)
{
    const kent_model *m = w->m;

    c->strength_needed =
        fmax(c->strength_needed, fmax(c->needed_pressed, c->needed_wide));
    if (!c->pressed && c->load > 0.0) check_ring(w, c);
    c->age =
        kent_concrete_age(c->code, m->concrete.cement, c->strength, c->strength_needed);
    c->age_asked = m->rules.least_age > c->age;
    if (c->age_asked) c->age = whole_days(m->rules.least_age);
}

static kent_quantities quantities_of(const kent_holding_work *w, const kent_block *b)
{
    const double axis = kent_site_axis(&w->site);
    const bool through = w->site.hole > 0.0;
    kent_quantities all = {0};

    if (b->has_face && !b->own_side) {
        all = kent_quantity_face(b->face, b->face_thickness, axis, through);
    }
    switch (b->type) {
    case KENT_BLOCK_NONE:
        break;
    case KENT_BLOCK_BEARING:
        return kent_quantity_face(b->face, b->thickness, axis, through);
    case KENT_BLOCK_GRAVITY:
        return kent_quantity_sum(all,
                                 kent_quantity_body((kent_face){b->width, b->thickness},
                                                    b->height, axis + 0.5 * b->height));
    case KENT_BLOCK_BASE:
        return kent_quantity_sum(
            all, kent_quantity_body((kent_face){b->width, b->height}, b->thickness,
                                    axis + 0.5 * w->site.diameter + b->thickness));
    }
    return all;
}

void kent_concrete_finish(const kent_holding_work *w, kent_holding *h)
{
    const kent_block *b = &h->block;
    kent_concrete_check *c = &h->concrete;

    if (b->type == KENT_BLOCK_NONE) return;
    const kent_face plan = {b->width, b->height};
    *c = pressed_check(w, b);
    c->made = true;
    if (b->type == KENT_BLOCK_BASE) {
        check_width(w, KENT_DOWNWARD, plan, b->thickness, c);
    }
    if (b->type == KENT_BLOCK_BEARING || (b->has_face && !b->own_side)) {
        check_width(w, KENT_SIDEWAYS, b->face,
                    b->has_face ? b->face_thickness : b->thickness, c);
    }
    check_age(w, c);
    h->quantities = quantities_of(w, b);
}
