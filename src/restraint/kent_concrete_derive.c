/* The concrete's part of a hand calculation. Strengths go into formulas as multiples of
 * the unit that the code's constants are for. */
#include "kent_concrete_internal.h"
#include "kent_side_internal.h"

#include <stdio.h>

#define UP(x) "ceil((" x ")/step - " KENT_SIDE_SLACK_TEXT ")*step"

static const double DAY = 86400.0;                             /* s */
static const double PSI = 4.4482216152605 / (0.0254 * 0.0254); /* Pa */
static const double MPA = 1e6;                                 /* Pa */
static const double ROUGH = 2.0 * 0.0254;                      /* m */

/* ---- thickness ------------------------------------------------------------------- */

void kent_concrete_derive_thickness(const kent_holding_work *w, kent_derivation *d,
                                    kent_face side, double thickness,
                                    const char *longer, const char *says)
{
    const kent_rules *r = &w->m->rules;
    const double spread = kent_block_thickness(r, side, w->site.diameter);
    const bool thinner = thickness < spread - 0.5 * r->side_step;
    char formula[160];

    kent_derivation_put(d, "tmin", fmax(r->least_thickness, r->concrete_behind),
                        KENT_LENGTH, KENT_CATALOGUE, "least thickness");
    (void)snprintf(formula, sizeof formula, UP("max(tmin, (%s - OD)/2)"), longer);
    kent_derivation_work(d, thinner ? "t45" : "t", spread, KENT_LENGTH, formula, "10.7",
                         says);
    if (!thinner) return;
    kent_derivation_put(d, "t", thickness, KENT_LENGTH, KENT_COMPUTED,
                        "thickness: the least at which plain concrete bends and shears "
                        "so far (19.11)");
}

/* ---- what is shared -------------------------------------------------------------- */

static bool is_aci(const kent_holding_work *w)
{
    return w->m->rules.concrete_code == KENT_ACI_318;
}

static void derive_unit(const kent_holding_work *w, kent_derivation *d)
{
    const bool aci = is_aci(w);
    kent_derivation_put(d, aci ? "psi" : "MPa", aci ? PSI : MPA, KENT_STRENGTH,
                        KENT_COMPUTED, "the unit of the code's constants");
}

static void derive_strength(const kent_holding_work *w, const kent_concrete_check *c,
                            kent_derivation *d)
{
    const bool own = w->m->concrete.place.line > 0;
    const kent_source stated = own ? KENT_GIVEN : KENT_CATALOGUE;

    kent_derivation_put(d, "fc", c->strength, KENT_STRENGTH,
                        c->strength_assumed ? KENT_ASSUMED : stated,
                        is_aci(w) ? "specified strength of the concrete"
                                  : "characteristic strength of the concrete");
}

/* The case whose thrust of a sense, factored for the concrete, is the design load. */
static const kent_load_case *designing(const kent_holding_work *w, kent_sense sense,
                                       bool test)
{
    const double least = kent_concrete_least_factor(w->m->rules.concrete_code);
    const kent_load_case *worst = NULL;
    double greatest = 0.0;

    for (size_t i = 0; i < w->loads->count; i++) {
        const kent_load_case *c = &w->loads->cases[i];
        const double load = fmax(c->safety_factor, least) * kent_holding_part(c, sense);
        if (test && c->kind != KENT_CASE_TEST) continue;
        if (!(load > greatest)) continue;
        greatest = load;
        worst = c;
    }
    return worst;
}

/* Puts symbol, the design load of one sense. */
static void derive_load(const kent_holding_work *w, kent_holding *h, kent_sense sense,
                        bool test, const char *symbol)
{
    kent_derivation *d = &h->derivation;
    const kent_load_case *c = designing(w, sense, test);
    const double least = kent_concrete_least_factor(w->m->rules.concrete_code);
    const double *load = test ? w->site.concrete.test : w->site.concrete.load;
    const bool shared = h->block_share < 1.0; /* NaN: not shared */
    char says[160];

    if (!c) return;
    (void)snprintf(says, sizeof says, "%s thrust of case '%s'",
                   sense == KENT_DOWNWARD ? "downward" : "sideways", c->title.s);
    kent_derivation_put(d, "Tc", kent_holding_part(c, sense), KENT_FORCE, KENT_COMPUTED,
                        says);
    kent_derivation_put(d, "SFc", c->safety_factor, KENT_RATIO,
                        kent_factor_source(w->m, c), kent_factor_says(w->m, c));
    kent_derivation_put(d, "kF", least, KENT_RATIO, KENT_COMPUTED,
                        "the code's own factor on a variable load");
    if (shared) {
        kent_derivation_put(d, "bs", h->block_share, KENT_RATIO, KENT_GIVEN,
                            "share of the thrust that the block takes");
    }
    kent_derivation_work(d, symbol, load[sense], KENT_FORCE,
                         shared ? "bs*max(SFc, kF)*Tc" : "max(SFc, kF)*Tc", "19.3",
                         "design load of the concrete");
}

/* Puts symbol, the load of what presses: one sense, or both on one body. */
static void derive_pressing(const kent_holding_work *w, kent_holding *h, bool test,
                            const char *symbol)
{
    const kent_concrete_check *c = &h->concrete;
    kent_derivation *d = &h->derivation;
    const double *load = test ? w->site.concrete.test : w->site.concrete.load;

    if (c->sense != KENT_RESULTANT) {
        derive_load(w, h, c->sense, test, symbol);
        return;
    }
    derive_load(w, h, KENT_SIDEWAYS, test, "Fcs");
    derive_load(w, h, KENT_DOWNWARD, test, "Fcd");
    kent_derivation_work(d, symbol, hypot(load[KENT_SIDEWAYS], load[KENT_DOWNWARD]),
                         KENT_FORCE, "sqrt(Fcs^2 + Fcd^2)", "19.3", "both together");
}

/* ---- what the fitting presses on ------------------------------------------------- */

/* How long the contact surely is: b1. */
static void derive_body(const kent_holding_work *w, double along, kent_derivation *d)
{
    const kent_fitting *f = w->fitting;
    const char *formula = "OD/4";

    if (f->type == KENT_BEND) {
        kent_derivation_put(d, "theta", f->angle, KENT_ANGLE, KENT_COMPUTED,
                            "turn of the bend");
        formula = "max(OD/4, 1.5*OD*sin(theta/2))";
    } else if ((f->type == KENT_TEE || f->type == KENT_WYE) && f->branch_size > 0.0) {
        kent_derivation_put(d, "db", f->branch_size, KENT_DIAMETER, KENT_COMPUTED,
                            "bore of the branch");
        formula = "max(OD/4, min(db, OD))";
    } else if (f->type == KENT_DEAD_END) {
        formula = "sqrt(0.5)*OD";
    }
    kent_derivation_work(d, "b1", along, KENT_LENGTH, formula, "19.4",
                         "contact along the pipe, as nobody states it");
}

static void derive_contact(const kent_holding_work *w, const kent_concrete_check *c,
                           kent_derivation *d)
{
    const kent_face *a = &c->contact;

    kent_derivation_put(d, "OD", w->site.diameter, KENT_DIAMETER, KENT_COMPUTED,
                        "outside diameter of the fitting");
    if (c->contact_assumed) {
        derive_body(w, a->width, d);
        kent_derivation_work(d, "d1", a->height, KENT_LENGTH, "sqrt(0.5)*OD", "19.4",
                             "contact across it: a quarter of the way round");
    } else {
        kent_derivation_put(d, "Ac", w->fitting->stated.contact_area, KENT_AREA,
                            KENT_GIVEN, "what the fitting presses on");
        kent_derivation_work(d, "d1", a->height, KENT_LENGTH, "min(sqrt(Ac), OD)",
                             "19.5", "contact across the pipe");
        kent_derivation_work(d, "b1", a->width, KENT_LENGTH, "Ac/d1", "19.5",
                             "contact along it");
    }
}

static void derive_pressed_strength(const kent_holding_work *w,
                                    const kent_concrete_check *c, kent_derivation *d)
{
    const bool aci = is_aci(w);

    kent_derivation_work(
        d, "fp", kent_concrete_pressed(c->code, c->strength), KENT_STRENGTH,
        aci ? "0.60*0.85*fc" : "0.8*fc/1.5", aci ? "19.7" : "19.6",
        aci ? "bearing of plain concrete (ACI 318-19, 14.5.6, phi 0.60)"
            : "design strength of plain concrete (EN 1992-1-1, 12.3.1)");
}

static void derive_pressed(const kent_holding_work *w, kent_holding *h)
{
    const kent_concrete_check *c = &h->concrete;
    kent_derivation *d = &h->derivation;
    const bool aci = is_aci(w);
    const double widening =
        kent_concrete_widening(c->code, c->contact, c->into, c->behind);

    derive_pressing(w, h, false, "Fc");
    derive_contact(w, c, d);
    derive_pressed_strength(w, c, d);
    kent_derivation_put(d, "wc", c->into.width, KENT_LENGTH, KENT_COMPUTED,
                        "side of the block that it presses into, along the pipe");
    kent_derivation_put(d, "hc", c->into.height, KENT_LENGTH, KENT_COMPUTED, "across");
    kent_derivation_put(d, "tc", c->behind, KENT_LENGTH, KENT_COMPUTED,
                        "concrete behind it");
    kent_derivation_work(
        d, "kw", widening, KENT_RATIO,
        aci ? "max(1, min(min(2, min(wc/b1, hc/d1)), 1 + 4*tc/max(b1, d1)))"
            : "max(1, min(min(3, min(wc/b1, hc/d1)), 1 + tc/max(b1, d1)))",
        aci ? "19.9" : "19.8", "for the thrust widens inside the block");
    kent_derivation_work(d, "sc", c->pressure, KENT_STRENGTH, "Fc/(b1*d1)", "19.10",
                         "the fitting presses with");
    kent_derivation_work(d, "uc", c->use, KENT_RATIO, "sc/(kw*fp)", "19.10",
                         "of what the concrete may be pressed with");
}

/* ---- beyond 45 degrees ----------------------------------------------------------- */

static void derive_bent_en(const kent_concrete_check *c, kent_derivation *d)
{
    const double pulled = kent_concrete_pulled(c->code, c->strength);

    if (c->strength <= 50.0 * MPA) {
        kent_derivation_work(d, "fctm", pulled * 1.5 / (0.8 * 0.7), KENT_STRENGTH,
                             "0.30*(fc/MPa)^(2/3)*MPa", "19.12",
                             "mean tensile strength (EN 1992-1-1, table 3.1)");
    } else {
        kent_derivation_put(d, "fctm", pulled * 1.5 / (0.8 * 0.7), KENT_STRENGTH,
                            KENT_COMPUTED,
                            "mean tensile strength (EN 1992-1-1, table 3.1)");
    }
    kent_derivation_work(d, "ft", pulled, KENT_STRENGTH, "0.8*0.7*fctm/1.5", "19.12",
                         "design tensile strength (12.3.1)");
    kent_derivation_work(d, "ub", c->wide.bending, KENT_RATIO,
                         "sqrt(3*sg/ft)*ao/(0.85*tb)", "19.14",
                         "of what it may bend (12.9.3)");
    kent_derivation_work(d, "us", c->wide.shear, KENT_RATIO, "1.5*sg*ao/(ft*tb)",
                         "19.15", "of what it may shear (12.6.3)");
}

static void derive_bent_aci(const kent_concrete_check *c, kent_derivation *d)
{
    kent_derivation_work(d, "ft", kent_concrete_pulled(c->code, c->strength),
                         KENT_STRENGTH, "0.60*5*sqrt(fc/psi)*psi", "19.13",
                         "in bending (ACI 318-19, 14.5.2.1)");
    kent_derivation_work(d, "fv", kent_concrete_sheared(c->code, c->strength),
                         KENT_STRENGTH, "0.60*4/3*sqrt(fc/psi)*psi", "19.13",
                         "in shear (14.5.5.1)");
    kent_derivation_put(d, "tr", ROUGH, KENT_LENGTH, KENT_COMPUTED,
                        "lost where cast against soil (14.5.1.7)");
    kent_derivation_work(d, "hd", c->thick - ROUGH, KENT_LENGTH, "tb - tr", "19.16",
                         "thickness that counts");
    kent_derivation_work(d, "ub", c->wide.bending, KENT_RATIO, "3*sg*ao^2/(ft*hd^2)",
                         "19.17", "of what it may bend");
    kent_derivation_work(d, "us", c->wide.shear, KENT_RATIO,
                         "sg*max(0, ao - hd)/(fv*hd)", "19.18",
                         "of what it may shear, one way");
    if (c->wide.punching <= 0.0) return; /* no ground outside the cut */
    kent_derivation_work(
        d, "up", c->wide.punching, KENT_RATIO,
        "sg*(wb*hb - (b1 + hd)*(d1 + hd))/"
        "(min(2, 1 + 2*min(b1, d1)/max(b1, d1))*fv*2*(b1 + d1 + 2*hd)*hd)",
        "19.19", "of what it may shear, all round the contact");
}

static void derive_bent(const kent_holding_work *w, kent_holding *h)
{
    const kent_concrete_check *c = &h->concrete;
    kent_derivation *d = &h->derivation;
    const double net = c->bent.width * c->bent.height - w->site.hole;
    const double out = fmax(0.0, 0.5 * fmax(c->bent.width - c->contact.width,
                                            c->bent.height - c->contact.height));
    const double load = w->site.concrete.load[c->bends];

    kent_derivation_heading(d, "Plain concrete beyond 45 degrees");
    derive_load(w, h, c->bends, false, "Fb");
    kent_derivation_put(d, "wb", c->bent.width, KENT_LENGTH, KENT_COMPUTED,
                        "side that the ground presses on");
    kent_derivation_put(d, "hb", c->bent.height, KENT_LENGTH, KENT_COMPUTED,
                        "its other");
    kent_derivation_put(d, "tb", c->thick, KENT_LENGTH, KENT_COMPUTED, "thickness");
    if (w->site.hole > 0.0) {
        kent_derivation_work(d, "sg", load / net, KENT_STRESS, "Fb/(wb*hb - pi*OD^2/4)",
                             "19.20", "pressure of the ground");
    } else {
        kent_derivation_work(d, "sg", load / net, KENT_STRESS, "Fb/(wb*hb)", "19.20",
                             "pressure of the ground");
    }
    kent_derivation_work(d, "ao", out, KENT_LENGTH, "max(0, max(wb - b1, hb - d1)/2)",
                         "19.20", "it stands out beyond the contact by");
    if (is_aci(w)) {
        derive_bent_aci(c, d);
    } else {
        derive_bent_en(c, d);
    }
}

/* ---- age ------------------------------------------------------------------------- */

static void derive_gain(const kent_holding_work *w, const kent_concrete_check *c,
                        kent_derivation *d)
{
    const kent_cement cement = w->m->concrete.cement;
    const kent_pace pace = kent_concrete_pace(c->code, cement);
    const double gained =
        kent_concrete_strength_at(c->code, cement, c->strength, c->age);

    if (c->age >= 28.0 * DAY) return; /* all of it */
    if (pace.hyperbola) {
        kent_derivation_put(d, "ka", pace.a, KENT_RATIO, KENT_COMPUTED,
                            "days, by the kind of cement (ACI 209R-92)");
        kent_derivation_put(d, "kb", pace.b, KENT_RATIO, KENT_COMPUTED, "the same");
        kent_derivation_work(d, "fa", gained, KENT_STRENGTH,
                             "min(1, days/(ka + kb*days))*fc", "19.22",
                             "strength at that age");
        return;
    }
    kent_derivation_put(d, "ks", pace.s, KENT_RATIO, KENT_COMPUTED,
                        "by the kind of cement (EN 1992-1-1, 3.1.2(6))");
    if (is_aci(w)) {
        kent_derivation_work(d, "fa", gained, KENT_STRENGTH,
                             "2.7182818285^(ks*(1 - sqrt(28/days)))*fc", "19.22",
                             "strength at that age");
    } else {
        kent_derivation_work(
            d, "fa", gained, KENT_STRENGTH,
            "max(0, 2.7182818285^(ks*(1 - sqrt(28/days)))*(fc + 8*MPa) - 8*MPa)",
            "19.21", "strength at that age");
    }
}

static void derive_age(const kent_holding_work *w, kent_holding *h)
{
    const kent_concrete_check *c = &h->concrete;
    kent_derivation *d = &h->derivation;
    kent_derivation_heading(d, "Concrete before the test");
    if (c->needed_pressed > 0.0) {
        derive_pressing(w, h, w->tested, "Ft");
        kent_derivation_work(d, "fn", c->needed_pressed, KENT_STRENGTH,
                             "fc*Ft/(b1*d1*kw*fp)", "19.23",
                             "strength that what presses needs then");
    }
    if (c->beyond_45) {
        kent_derivation_put(d, "fw", c->needed_wide, KENT_STRENGTH, KENT_COMPUTED,
                            "strength that bending and shear need then (19.23)");
    }
    if (w->m->rules.strength_before_test > 0.0) {
        kent_derivation_put(d, "fr", w->m->rules.strength_before_test, KENT_STRENGTH,
                            KENT_CATALOGUE, "strength that the design rules ask for");
    }
    kent_derivation_put(
        d, "fneed", c->strength_needed, KENT_STRENGTH, KENT_COMPUTED,
        c->pressed || !(c->load > 0.0)
            ? "strength needed before the test: the greatest of these"
            : "strength that the flange or ring is made for under test");
    if (w->m->rules.least_age > 0.0) {
        kent_derivation_put(d, "dr", w->m->rules.least_age / DAY, KENT_RATIO,
                            KENT_CATALOGUE, "days that the design rules ask for");
    }
    if (isnan(c->age)) return; /* never: a caution says so */
    kent_derivation_put(d, "days", c->age / DAY, KENT_RATIO, KENT_COMPUTED,
                        "least age before the test, in whole days from 3 on (19.24)");
    derive_gain(w, c, d);
}

void kent_concrete_derive(const kent_holding_work *w, kent_holding *h)
{
    const kent_concrete_check *c = &h->concrete;
    kent_derivation *d = &h->derivation;

    if (!c->made) return;
    kent_derivation_heading(d, "Concrete where the fitting presses on it");
    derive_unit(w, d);
    derive_strength(w, c, d);
    if (c->pressed) {
        derive_pressed(w, h);
    } else if (c->load > 0.0) {
        derive_pressing(w, h, false, "Fc");
        derive_pressed_strength(w, c, d);
        kent_derivation_work(
            d, "A28", c->load / kent_concrete_pressed(c->code, c->strength), KENT_AREA,
            "Fc/fp", "19.10", "area of a flange or ring that would do at 28 days");
        kent_derivation_put(d, "An", c->contact_needed, KENT_AREA, KENT_COMPUTED,
                            "and that does under the test too");
    }
    if (c->beyond_45) derive_bent(w, h);
    derive_age(w, h);
}
