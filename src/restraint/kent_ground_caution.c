/* What is said of the ground that a face leans on: how its bearing is told, what slope
 * and fill take from it. */
#include "kent_earth.h"
#include "kent_holding_internal.h"
#include "kent_said.h"

/* A difference smaller than this, relative, is none. */
static const double SAME = 1e-9;

/* Another way that the soil states gives less than the one that decides. */
static void caution_lower_way(const kent_holding_work *w, kent_holding *h)
{
    const kent_bearing_view *view = &h->bearing;
    const kent_way decides = kent_soil_way(w->site.leans);

    for (kent_way k = KENT_WAY_CONSTANT; k < KENT_BEARING_WAYS; k++) {
        const kent_bearing_way *way = &view->ways[k];
        const double least = view->ways[decides].bearing * (1.0 - SAME);
        const bool twin = decides == KENT_WAY_COULOMB && k == KENT_WAY_RANKINE;
        if (!view->seen || !way->stated || twin || !(way->bearing < least)) continue;
        kent_notes_add(
            &h->cautions,
            "soil '%s' gives %s %s, and %s, which decides, %s: see which is right",
            w->site.leans->id, kent_said_of(KENT_STRESS, w->m->units, way->bearing).s,
            kent_way_word(k), kent_way_word(decides),
            kent_said_of(KENT_STRESS, w->m->units, view->ways[decides].bearing).s);
    }
}

/* A plane is not how ground fails where much rubs on the face; and what rubs on it
 * lifts the block. source docs/theory/21-ground.md, 21.3 */
static void caution_coulomb(const kent_holding_work *w, kent_holding *h)
{
    const kent_soil *s = w->site.leans;
    const kent_system units = w->m->units;

    if (kent_soil_way(s) != KENT_WAY_COULOMB || isnan(w->site.allowable)) return;
    const double lifts = w->use[KENT_SIDEWAYS] * w->site.allowable *
                         h->block.face.width * h->block.face.height *
                         tan(s->wall_friction);
    const double over = kent_way_passive(s, KENT_WAY_COULOMB, w->site.falls) /
                        kent_way_passive(s, KENT_WAY_RANKINE, w->site.falls);
    if (s->wall_friction > kent_coulomb_limit(s->friction_angle) * (1.0 + SAME)) {
        kent_notes_add(
            &h->cautions,
            "soil '%s' rubs on the face by %s, more than a third of its friction "
            "angle: "
            "there Coulomb's plane promises more than ground gives (it fails along a "
            "curve); %.2f of Rankine's is counted on: state no more than %s, or no "
            "wall_friction",
            s->id, kent_said_of(KENT_ANGLE, units, s->wall_friction).s, over,
            kent_said_of(KENT_ANGLE, units, kent_coulomb_limit(s->friction_angle)).s);
    }
    if (!(lifts > 0.0)) return; /* no face */
    kent_notes_add(&h->cautions,
                   "what rubs on the face lifts the block by up to %s, factored: its "
                   "weight and the soil on it must hold that, or Coulomb's pressure "
                   "does not come about",
                   kent_said_of(KENT_FORCE, units, lifts).s);
}

/* The pit's other side pushes with its active pressure: a share close to all of the
 * passive one counts on more than is left. source docs/theory/21-ground.md, 21.5 */
static void caution_net(const kent_holding_work *w, kent_holding *h)
{
    const kent_bearing_view *view = &h->bearing;
    const double area = h->block.face.width * h->block.face.height;
    const double counts = w->site.allowable * area;
    const bool rubs = kent_soil_way(w->site.leans) == KENT_WAY_COULOMB;
    const double passive = rubs ? counts / w->site.leans->passive_share : view->passive;
    const double net = passive - view->active;

    if (!view->seen || w->site.leans->route != KENT_BEARING_PASSIVE) return;
    if (!(counts > net * (1.0 + SAME))) return; /* NaN: not known */
    kent_notes_warn(
        &h->cautions,
        "of the passive pressure %s are counted on over this face, and less "
        "the active pressure behind the block the ground gives %s in all: "
        "state a smaller passive_share",
        kent_said_of(KENT_FORCE, w->m->units, counts).s,
        kent_said_of(KENT_FORCE, w->m->units, net).s);
}

static void caution_slope(const kent_holding_work *w, kent_holding *h)
{
    const kent_soil *s = w->site.leans;
    kent_bearing_place level = kent_site_place(&w->site, &w->m->rules);
    kent_bearing_gap gap = KENT_BEARING_KNOWN;

    if (!(w->site.falls > 0.0)) return;
    level.falls = 0.0;
    const double share = w->site.allowable / kent_soil_bearing(s, &level, &gap);
    if (isnan(share)) return; /* refused */
    kent_notes_warn(
        &h->cautions,
        "the ground before the face falls by %s along the thrust: %.2f of what soil "
        "'%s' gives on level ground is counted on, and the wedge that holds is short; "
        "whether the slope itself stays is not looked at",
        kent_said_of(KENT_ANGLE, w->m->units, w->site.falls).s, share, s->id);
}

static void caution_fill(const kent_holding_work *w, kent_holding *h)
{
    const kent_site *site = &w->site;

    if (w->fitting->stated.backing != KENT_BACKING_FILL || !site->fill) return;
    kent_notes_add(
        &h->cautions,
        "the face stands against fill, '%s', a weaker design than undisturbed ground: "
        "%s decides; it must be compacted in layers through the whole wedge, its "
        "density proved (90 to 95 %% of Proctor's is commonly asked)",
        site->fill->id,
        site->leans == site->fill ? "the fill" : "the ground behind it");
}

/* Next to a slope a footing bears less, for which no form is used here. */
void kent_footing_caution(const kent_holding_work *w, kent_holding *h)
{
    const double angle = w->fitting->stated.slope.angle;

    if (h->block.type == KENT_BLOCK_NONE || !(angle > 0.0)) return;
    if (!(w->demand.load[KENT_DOWNWARD] > 0.0)) return;
    kent_notes_warn(
        &h->cautions,
        "the ground falls by %s where this presses down: what the soil bears "
        "under a base is taken as on level ground; state a vertical_bearing "
        "that holds beside that slope",
        kent_said_of(KENT_ANGLE, w->m->units, angle).s);
}

void kent_ground_caution(const kent_holding_work *w, kent_holding *h)
{
    if (!w->site.leans) return;
    caution_lower_way(w, h);
    caution_coulomb(w, h);
    caution_net(w, h);
    caution_slope(w, h);
    caution_fill(w, h);
}

/* Common practice of trade details, no source. */
void kent_blocks_advise(kent_restraints *r)
{
    bool any = false;

    for (size_t i = 0; i < r->fitting_count; i++) {
        any = any || r->fittings[i].block.type != KENT_BLOCK_NONE;
    }
    if (!any) return;
    kent_notes_add(
        &r->cautions,
        "blocks: keep them clear of joints, bells, bolts and glands, with film or felt "
        "between concrete and fitting, which is not to be encased; build them as shown "
        "(10 %% larger at most), since extra "
        "height moves the face's centre off the pipe; and say on the drawing that the "
        "ground before a face must not be dug away later");
}
