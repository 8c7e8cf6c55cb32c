/* A block that holds by its weight: square in plan, no taller than wide. */
#include "kent_block_internal.h"
#include "kent_leg_internal.h"
#include "kent_side_internal.h"
#include "kent_stability.h"

/* source docs/theory/10-blocks.md, 10.13 */
double kent_gravity_volume(double upward, double factor, double unit_weight)
{
    return factor * upward / unit_weight;
}

/* source docs/theory/10-blocks.md, 10.15; 20-stability.md, 20.15 */
double kent_gravity_most(const kent_rules *rules, const kent_site *site)
{
    const double axis = kent_site_axis(site);
    const double most = site->low ? kent_face_height_limit(rules, axis) : 2.0 * axis;
    return kent_side_down(most, rules->side_step);
}

double kent_gravity_shallow(const kent_rules *rules, const kent_site *site,
                            double volume)
{
    const double most = kent_gravity_most(rules, site);
    return most > 0.0 ? sqrt(volume / most) : 0.0; /* NaN: no depth is stated */
}

bool kent_gravity_under_soil(const kent_rules *rules, const kent_site *site)
{
    return rules->soil_above && site->soil && kent_soil_counts(site->soil) &&
           !isnan(site->soil->unit_weight) && !isnan(kent_site_axis(site));
}

double kent_gravity_prism(const kent_rules *rules, const kent_site *site, double plan,
                          double height)
{
    if (!kent_gravity_under_soil(rules, site)) return 0.0;
    const double top = fmax(0.0, kent_site_axis(site) - 0.5 * height);
    return kent_soil_prism(plan, top, site->soil->unit_weight, site->water_table,
                           rules->water_unit_weight);
}

/* m2 of plan that carries what presses down. */
static double gravity_footing(const kent_site *site, const kent_demand *demand)
{
    const double down = demand->load[KENT_DOWNWARD];
    return down > 0.0 ? down / site->vertical : 0.0;
}

static void gravity_sides(double side, double height, kent_block *out)
{
    out->width = side;
    out->thickness = side;
    out->height = height;
    out->volume = out->width * out->height * out->thickness;
}

/* The least height of a block with this side that weighs enough, no taller than wide
 * and below the ground's surface; negative: none. source 20.14 */
static double height_under_soil(const kent_rules *rules, const kent_site *site,
                                double upward, double unit_weight, double side)
{
    const double step = rules->side_step, plan = side * side;
    const double most = fmin(side, kent_gravity_most(rules, site));
    long k = lround(kent_side_up(kent_block_least_height(rules, site), step) / step);

    for (;; k++) {
        const double height = kent_side_of((double)k, step);
        if (height > most + KENT_SIDE_SLACK * step) return -1.0;
        const double weight =
            plan * height * unit_weight + kent_gravity_prism(rules, site, plan, height);
        if (weight * (1.0 + KENT_SIDE_SLACK) >= upward) return height;
    }
}

/* source docs/theory/20-stability.md, 20.14 */
static void gravity_beneath(const kent_rules *rules, const kent_site *site,
                            const kent_demand *demand, double unit_weight,
                            kent_block *out)
{
    const double up = demand->load[KENT_UPWARD], step = rules->side_step;
    const double least =
        fmax(kent_block_least_height(rules, site), sqrt(gravity_footing(site, demand)));
    double height = -1.0, side = 0.0;

    for (long k = lround(kent_side_up(least, step) / step); height < 0.0; k++) {
        side = kent_side_of((double)k, step);
        height = height_under_soil(rules, site, up, unit_weight, side);
    }
    gravity_sides(side, height, out);
}

/* Square in plan and no taller than wide; wide enough for what pulls it down.
 * source docs/theory/10-blocks.md, 10.13 .. 10.15 */
static void gravity_shape(const kent_rules *rules, const kent_site *site,
                          const kent_demand *demand, double unit_weight,
                          kent_block *out)
{
    const double step = rules->side_step;
    const double volume =
        kent_gravity_volume(demand->load[KENT_UPWARD], 1.0, unit_weight);
    const double tall = kent_block_least_height(rules, site);
    const double asked = rules->height_over_diameter > 0.0 ? tall : 0.0;

    const bool fits = kent_gravity_most(rules, site) >= tall;
    if (kent_gravity_under_soil(rules, site) && volume > 0.0 && fits) {
        gravity_beneath(rules, site, demand, unit_weight, out);
        return;
    }
    const double plan = sqrt(gravity_footing(site, demand));
    const double side = kent_side_up(fmax(fmax(fmax(cbrt(volume), plan), asked),
                                          kent_gravity_shallow(rules, site, volume)),
                                     step);
    gravity_sides(side, kent_side_up(fmax(volume / (side * side), tall), step), out);
}

void kent_gravity_size(const kent_rules *rules, const kent_site *site,
                       const kent_demand *demand, kent_block *out)
{
    const double dry = rules->concrete_unit_weight;

    out->type = KENT_BLOCK_GRAVITY;
    out->low = site->low;
    gravity_shape(rules, site, demand, dry, out);
    const double base = kent_site_axis(site) + 0.5 * out->height;
    const double weight = kent_site_concrete(site, rules, base);
    out->submerged = weight < dry;
    if (out->submerged) gravity_shape(rules, site, demand, weight, out);
}

/* A gravity block whose side grows. Flatter: as high as it then must be. */
void kent_gravity_widen(const kent_rules *rules, const kent_site *site,
                        const kent_demand *demand, bool flatter, kent_block *b)
{
    const double up = demand->load[KENT_UPWARD], step = rules->side_step;
    const double side = kent_side_up(b->width + step, step);
    const double base = kent_site_axis(site) + 0.5 * b->height;
    const double weight = b->submerged ? kent_site_concrete(site, rules, base)
                                       : rules->concrete_unit_weight;
    double height = b->height;

    if (flatter && kent_gravity_under_soil(rules, site)) {
        const double least = height_under_soil(rules, site, up, weight, side);
        if (least > 0.0) height = least;
    } else if (flatter) {
        const double volume = kent_gravity_volume(up, 1.0, weight);
        height = fmax(volume / (side * side), kent_block_least_height(rules, site));
        height = kent_side_up(height, step);
    }
    gravity_sides(side, height, b);
    b->flatter = flatter;
}
