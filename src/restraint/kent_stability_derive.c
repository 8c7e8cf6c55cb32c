/* The hand calculation of a block as a body, and what is said of it. */
#include "kent_said.h"
#include "kent_side_internal.h"
#include "kent_stability_internal.h"

#include <stdio.h>

static void found(kent_derivation *d, const char *symbol, double value, kent_kind kind,
                  const char *says)
{
    kent_derivation_put(d, symbol, value, kind, KENT_COMPUTED, says);
}

/* ---- straps ---------------------------------------------------------------------- */

static void derive_straps(const kent_holding_work *w, kent_holding *h)
{
    kent_derivation *d = &h->derivation;
    const kent_rules *r = &w->m->rules;
    const kent_straps *s = &h->straps;

    if (s->legs == 0) return;
    kent_derivation_heading(d, "Straps or rods from pipe to block");
    kent_derivation_put(d, "fs", r->strap_stress, KENT_STRESS, KENT_CATALOGUE,
                        "stress that they may be pulled to");
    found(d, "nl", s->legs, KENT_RATIO, "legs, the fewest, an even number");
    found(d, "dr", s->diameter, KENT_DIAMETER,
          "diameter, of the standard ones the least");
    kent_derivation_work(d, "Fc",
                         kent_straps_carry(s->legs, s->diameter, r->strap_stress),
                         KENT_FORCE, "nl*pi*dr^2/4*fs", "20.1", "what they carry");
    kent_derivation_work(d, "fr", s->stress, KENT_STRESS, "Fup/(nl*pi*dr^2/4)", "20.1",
                         "stress reached");
    if (isnan(s->anchorage)) return;
    kent_derivation_put(d, "fb", r->strap_bond, KENT_STRESS, KENT_CATALOGUE,
                        "bond between rod and concrete");
    kent_derivation_work(d, "lb", s->anchorage, KENT_LENGTH, "fr*dr/(4*fb)", "20.2",
                         "length in the concrete, by bond");
    kent_derivation_work(d, "le", s->embedment, KENT_LENGTH,
                         "ceil(lb/step - " KENT_SIDE_SLACK_TEXT ")*step", "20.3",
                         s->hooked ? "embedment: more than there is below the axis, so "
                                     "that legs end in hooks or a plate"
                                   : "embedment");
}

/* ---- body ------------------------------------------------------------------------ */

static void derive_body(const kent_holding_work *w, kent_holding *h,
                        const kent_body *body)
{
    kent_derivation *d = &h->derivation;
    const kent_rules *r = &w->m->rules;
    const bool wet = body->unit_weight < r->concrete_unit_weight;

    kent_derivation_heading(d, "Whether the block stays in place");
    found(d, "L", body->length, KENT_LENGTH, "length of the block along the thrust");
    found(d, "B", body->breadth, KENT_LENGTH, "across it");
    found(d, "Vc", body->concrete, KENT_VOLUME, "concrete");
    kent_derivation_put(d, "gc", r->concrete_unit_weight, KENT_UNIT_WEIGHT,
                        KENT_CATALOGUE, "unit weight of concrete");
    kent_derivation_put(d, "gw", r->water_unit_weight, KENT_UNIT_WEIGHT, KENT_CATALOGUE,
                        "unit weight of ground water");
    found(d, "S", body->prism, KENT_FORCE, "soil above that counts");
    kent_derivation_work(d, "W", body->concrete * body->unit_weight + body->prism,
                         KENT_FORCE, wet ? "Vc*(gc - gw) + S" : "Vc*gc + S", "20.7",
                         wet ? "weight, less the water's" : "weight");
    found(d, "ha", body->axis, KENT_LENGTH, "pipe axis above the foot");
    found(d, "x", body->upright, KENT_LENGTH,
          "from the toe to where what lifts or presses acts");
}

/* Thrust of a stand's instant and what it leaves on the base. */
static kent_push derive_push(const kent_holding_work *w, kent_holding *h,
                             const kent_body *body, const kent_stand *at,
                             const char *what)
{
    kent_derivation *d = &h->derivation;
    const bool rest = at->load_case < 0;
    const kent_load_case *c = rest ? NULL : &w->loads->cases[at->load_case];
    const kent_push p = rest ? kent_push_on(body, w->soil, 0.0, 0.0, 0.0, 1.0)
                             : kent_push_of(w, h, body, c, at->sense);
    char says[160];

    (void)snprintf(says, sizeof says,
                   rest ? "%s, main without pressure" : "%s, case '%s'", what,
                   rest ? "" : c->title.s);
    kent_derivation_heading(d, says);
    found(d, "H", p.sideways, KENT_FORCE,
          h->block_share < 1.0 ? "sideways, before any factor: the block's share"
                               : "sideways, before any factor");
    found(d, "U", p.up, KENT_FORCE, "upward");
    found(d, "D", p.down, KENT_FORCE, "downward");
    found(d, "P", p.face, KENT_FORCE, "what the face may bear");
    kent_derivation_work(d, "N", p.normal, KENT_FORCE, "W + D - U", "20.7",
                         "on the base");
    return p;
}

static void derive_asked(kent_derivation *d, const kent_stand *at)
{
    if (!(at->asked > 0.0)) return;
    kent_derivation_put(d, "SFa", at->asked, KENT_RATIO, KENT_CATALOGUE,
                        "asked, of a case with its factor (20.16)");
}

static void derive_sliding(const kent_holding_work *w, kent_holding *h,
                           const kent_body *body, const kent_stand *at)
{
    kent_derivation *d = &h->derivation;
    const kent_push p = derive_push(w, h, body, at, "Sliding");
    const kent_soil *soil = w->soil;
    const bool coheres = soil && !isnan(soil->base_cohesion);

    if (coheres && p.normal > 0.0) {
        kent_derivation_put(d, "cb", soil->base_cohesion, KENT_STRESS,
                            kent_soil_source(soil), "cohesion of concrete on soil");
        found(d, "Ab", p.area, KENT_AREA, "of the base that presses");
        kent_derivation_work(d, "R", p.friction, KENT_FORCE, "min(cb*Ab, N/2)", "20.5",
                             "friction under the base");
    } else if (soil && !isnan(soil->base_friction) && p.normal > 0.0) {
        kent_derivation_put(d, "mu", soil->base_friction, KENT_RATIO,
                            kent_soil_source(soil), "friction of concrete on soil");
        kent_derivation_work(d, "R", p.friction, KENT_FORCE, "mu*N", "20.5",
                             "friction under the base");
    } else {
        kent_derivation_put(d, "R", 0.0, KENT_FORCE, KENT_ASSUMED,
                            "friction under the base, not stated or lifted");
    }
    kent_derivation_work(d, "SFs", at->reached, KENT_RATIO, "(P + R)/H", "20.6",
                         "factor against sliding");
    derive_asked(d, at);
}

static void derive_overturning(const kent_holding_work *w, kent_holding *h,
                               const kent_body *body, const kent_stand *at)
{
    kent_derivation *d = &h->derivation;

    (void)derive_push(w, h, body, at, "Overturning");
    kent_derivation_work(d, "SFo", at->reached, KENT_RATIO,
                         "(W*L/2 + D*x + P*ha)/(H*ha + U*x)", "20.8",
                         "factor against overturning about the toe");
    derive_asked(d, at);
}

static void derive_pressure(const kent_holding_work *w, kent_holding *h,
                            const kent_body *body, const kent_stand *at)
{
    kent_derivation *d = &h->derivation;
    const kent_push p = derive_push(w, h, body, at, "Pressure under the base");

    kent_derivation_put(d, "qv", w->site.vertical, KENT_STRESS,
                        kent_soil_source(w->soil), "bearing under a base");
    kent_derivation_work(d, "M", p.moment, KENT_MOMENT,
                         "(H - min(H, P))*ha + (D - U)*(L/2 - x)", "20.8",
                         "about the middle of the base");
    kent_derivation_work(d, "e", p.base.eccentricity, KENT_LENGTH, "M/N", "20.9",
                         "eccentricity");
    kent_derivation_work(d, "pb", p.base.largest, KENT_STRESS,
                         p.base.outside_third ? "2*N/(3*B*(L/2 - abs(e)))"
                                              : "N/(B*L)*(1 + 6*abs(e)/L)",
                         p.base.outside_third ? "20.10" : "20.9",
                         p.base.outside_third ? "largest pressure; part of it lifts"
                                              : "largest pressure");
    if (at->load_case >= 0 && w->loads->cases[at->load_case].increase > 1.0) return;
    kent_derivation_work(d, "SFp", at->reached, KENT_RATIO, "qv/pb", "20.10",
                         "bearing over pressure, at least 1");
}

static void derive_flotation(const kent_holding_work *w, kent_holding *h,
                             const kent_body *body)
{
    kent_derivation *d = &h->derivation;
    const kent_stability *s = &h->stability;
    const double gw = w->m->rules.water_unit_weight;
    const double air = body->concrete * w->m->rules.concrete_unit_weight + body->prism;

    if (isnan(s->flotation[0])) return;
    const double empty = s->displaced * gw * s->flotation[0];
    const double full = s->displaced * gw * s->flotation[1];
    kent_derivation_heading(d, "Flotation of the block and the main it carries");
    found(d, "Lp", s->pipe_length, KENT_LENGTH, "length of main, the block's own");
    found(d, "Vd", s->displaced, KENT_VOLUME, "water that both displace (20.12)");
    found(d, "wp", (empty - air) / s->pipe_length, KENT_FORCE_PER_LENGTH,
          s->pipe_weight_known ? "a metre of pipe, empty"
                               : "a metre of pipe, not known and counted as nothing");
    found(d, "ww", (full - empty) / s->pipe_length, KENT_FORCE_PER_LENGTH,
          "water in a metre of it");
    kent_derivation_work(d, "SFe", s->flotation[0], KENT_RATIO,
                         "(Vc*gc + S + wp*Lp)/(gw*Vd)", "20.11", "factor, main empty");
    kent_derivation_work(d, "SFf", s->flotation[1], KENT_RATIO,
                         "(Vc*gc + S + (wp + ww)*Lp)/(gw*Vd)", "20.11",
                         "factor, main full");
    if (s->flotation_asked > 0.0) {
        kent_derivation_put(d, "SFa", s->flotation_asked, KENT_RATIO, KENT_CATALOGUE,
                            "asked");
    }
}

typedef void derive_stand(const kent_holding_work *w, kent_holding *h,
                          const kent_body *body, const kent_stand *at);

/* Both hours: each has cases and a factor of its own. */
static void derive_hours(const kent_holding_work *w, kent_holding *h,
                         const kent_body *body, const kent_stand at[KENT_HOURS],
                         derive_stand *derive)
{
    for (kent_hour k = KENT_AT_WORK; k < KENT_HOURS; k++) {
        if (isfinite(at[k].reached) && at[k].reached > 0.0) derive(w, h, body, &at[k]);
    }
}

void kent_stability_derive(const kent_holding_work *w, kent_holding *h)
{
    const kent_stability *s = &h->stability;

    derive_straps(w, h);
    if (!s->judged) return;
    const kent_body body = kent_body_of(w, &h->block, s->eccentricity);
    derive_body(w, h, &body);
    derive_hours(w, h, &body, s->sliding, derive_sliding);
    derive_hours(w, h, &body, s->overturning, derive_overturning);
    derive_hours(w, h, &body, s->pressure, derive_pressure);
    derive_flotation(w, h, &body);
}

/* ---- in words -------------------------------------------------------------------- */

static void caution_straps(const kent_holding_work *w, kent_holding *h)
{
    const kent_system units = w->m->units;
    const kent_straps *s = &h->straps;
    kent_text t = {0};

    if (!(s->force > 0.0)) return;
    kent_text_add(&t, "straps or rods from pipe to block must carry %s upwards",
                  kent_said_of(KENT_FORCE, units, s->force).s);
    if (s->legs > 0) {
        kent_text_add(&t, ": %d legs of %s", s->legs,
                      kent_said_of(KENT_DIAMETER, units, s->diameter).s);
        if (!isnan(s->embedment)) {
            kent_text_add(&t, ", %s in the concrete",
                          kent_said_of(KENT_LENGTH, units, s->embedment).s);
        }
        if (s->hooked) {
            kent_text_add(&t, " and so hooked or on a plate (%s lie below the axis)",
                          kent_said_of(KENT_LENGTH, units, s->room).s);
        }
        kent_text_add(&t, ", coated against corrosion");
    }
    kent_notes_add(&h->cautions, "%s", kent_text_of(&t));
    h->cautions.failed = h->cautions.failed || t.failed;
    kent_text_clear(&t);
}

static void caution_soil_above(const kent_holding_work *w, kent_holding *h)
{
    if (!w->m->rules.soil_above || h->block.type != KENT_BLOCK_GRAVITY) return;
    if (h->stability.soil_above > 0.0) {
        kent_notes_add(
            &h->cautions,
            "%s of soil straight above the block are counted on: nobody may "
            "dig there",
            kent_said_of(KENT_FORCE, w->m->units, h->stability.soil_above).s);
    } else {
        kent_notes_add(&h->cautions,
                       "soil_above asks for the soil above the block, and %s: none is "
                       "counted",
                       w->soil ? "the soil lacks unit_weight, or no cover is stated"
                               : "the soil is not stated");
    }
}

static void caution_floats(const kent_holding_work *w, kent_holding *h)
{
    const kent_stability *s = &h->stability;

    if (h->block.type != KENT_BLOCK_BASE) return;
    if (!(s->flotation[0] < w->m->rules.factor_flotation)) return;
    kent_notes_warn(&h->cautions,
                    "empty, the main would lift off its base or take it along "
                    "(flotation %.2f): what covers it must hold it down",
                    s->flotation[0]);
}

/* What could not be judged although it is asked, and which key would tell. */
static void caution_unknown(const kent_holding_work *w, kent_holding *h)
{
    const kent_stability *s = &h->stability;
    const bool asks = w->m->rules.factor_sliding > 0.0;
    const bool pushed = w->demand.load[KENT_SIDEWAYS] > 0.0;

    if (!w->soil) return; /* said elsewhere */
    if (!s->bearing_known && h->block.type != KENT_BLOCK_BEARING) {
        kent_notes_warn(
            &h->cautions,
            "soil '%s' has no vertical_bearing: whether it carries the block "
            "is not judged",
            w->soil->id);
    }
    if (asks && pushed && !s->friction_known) {
        kent_notes_add(&h->remarks,
                       "soil '%s' has neither base_friction nor base_cohesion: no "
                       "friction under the block is counted",
                       w->soil->id);
    }
}

/* What hands the thrust of a pipe that passes through over to the block, and how much
 * of its concrete that must press on, where no contact_area is stated. */
static void caution_collar(const kent_holding_work *w, kent_holding *h)
{
    const kent_concrete_check *c = &h->concrete;
    const kent_system units = w->m->units;
    const double sideways = w->demand.load[KENT_SIDEWAYS];
    kent_text t = {0};

    if (!(w->site.hole > 0.0) || !(sideways > 0.0)) return;
    kent_text_add(&t,
                  "the block embraces the pipe and bears on both ends of the trench: a "
                  "collar or flange cast into it must hand over %s, either way",
                  kent_said_of(KENT_FORCE, units, sideways).s);
    if (!c->pressed && c->contact_needed > 0.0) {
        kent_text_add(&t,
                      ", and press on %s of its concrete, or more, which is to be "
                      "stated as contact_area",
                      kent_said_of(KENT_AREA, units, c->contact_needed).s);
    }
    kent_notes_add(&h->cautions, "%s", kent_text_of(&t));
    h->cautions.failed = h->cautions.failed || t.failed;
    kent_text_clear(&t);
}

void kent_stability_caution(const kent_holding_work *w, kent_holding *h)
{
    const kent_stability *s = &h->stability;

    if (!s->judged || h->block.type == KENT_BLOCK_NONE) return;
    caution_straps(w, h);
    caution_soil_above(w, h);
    caution_floats(w, h);
    caution_unknown(w, h);
    if (h->block.widened > 0) {
        kent_notes_add(&h->cautions,
                       "enlarged by %d steps until it stays in place: without them it "
                       "would slide, turn over, float or press too hard on its base",
                       h->block.widened);
    }
    if (s->base[KENT_AT_WORK].outside_third || s->base[KENT_AT_TEST].outside_third) {
        kent_notes_add(&h->cautions, "part of the block's base lifts off the ground");
    }
    if (h->block.type == KENT_BLOCK_GRAVITY) {
        kent_notes_add(&h->cautions, "the weight is of concrete alone: where the block "
                                     "encloses the pipe, it grows by the pipe's room");
    }
    caution_collar(w, h);
}
