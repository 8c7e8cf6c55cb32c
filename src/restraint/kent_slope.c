/* Ground that falls away before a face, and fill between a face and the ground. */
#include "kent_holding_internal.h"

/* A smaller part of a slope is rounding of a thrust that runs along the contour. */
static const double LEAST_PART = 1e-9;

/* rad: how the ground falls along a thrust; 0 where it is level that way or rises. A
 * block that leans both ways leans downhill too. source docs/theory/21-ground.md, 21.9
 */
static double slope_along(const kent_slope *slope, kent_vec3 thrust, bool both_ways)
{
    const double size = kent_thrust_horizontal(thrust);
    const kent_vec3 down = slope->direction;

    if (!(size > 0.0)) return 0.0;
    const double share = (thrust.x * down.x + thrust.y * down.y) / size;
    const double along = both_ways ? fabs(share) : share;
    return along > LEAST_PART ? atan(tan(slope->angle) * along) : 0.0;
}

bool kent_holding_leans_both_ways(const kent_holding_work *w, const kent_holding *h)
{
    return w->site.hole > 0.0 || h->chosen == KENT_ANCHOR_BLOCK;
}

/* The steepest fall along what pushes sideways, in any case. */
static double slope_worst(const kent_holding_work *w, const kent_holding *h)
{
    const kent_slope *slope = &w->fitting->stated.slope;
    double worst = 0.0;

    if (!(slope->angle > 0.0)) return 0.0; /* NaN: nothing is said */
    for (size_t i = 0; i < w->loads->count; i++) {
        const kent_load_case *c = &w->loads->cases[i];
        if (!(kent_holding_part(c, KENT_SIDEWAYS) >= KENT_HOLDING_LEAST)) continue;
        const kent_vec3 thrust = kent_instant_lasting(&c->worst[KENT_SIDEWAYS]);
        worst =
            fmax(worst, slope_along(slope, thrust, kent_holding_leans_both_ways(w, h)));
    }
    return worst;
}

/* A curve has the fill of its trench beside it, whatever else is said. */
static bool leans_on_fill(const kent_fitting *f, const kent_holding *h)
{
    return f->stated.backing == KENT_BACKING_FILL ||
           (h->soil_beside && f->backfill >= 0);
}

void kent_holding_site(kent_holding_work *w, kent_holding *h)
{
    const kent_fitting *f = w->fitting;
    const kent_soil *fill = f->backfill >= 0 ? &w->m->soils[f->backfill] : NULL;

    w->site.falls = slope_worst(w, h);
    if (leans_on_fill(f, h) && kent_soil_counts(fill)) w->site.fill = fill;
    kent_site_bear(&w->site, &w->m->rules);
    if (kent_soil_counts(w->soil)) h->allowable_bearing = w->site.allowable;
}

kent_fault kent_holding_ground_fault(const kent_holding_work *w, const kent_holding *h)
{
    const double steepest = w->m->rules.steepest_ground;

    if (!(w->demand.load[KENT_SIDEWAYS] > 0.0)) return KENT_FAULT_NONE;
    if (steepest > 0.0 && w->site.falls > steepest) return KENT_FAULT_SLOPE;
    if (leans_on_fill(w->fitting, h) && !w->site.fill) return KENT_FAULT_FILL;
    return KENT_FAULT_NONE;
}
