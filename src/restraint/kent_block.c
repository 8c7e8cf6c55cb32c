#include "kent_block_internal.h"
#include "kent_side_internal.h"

static const double DEEPEST = 6.0; /* m more of cover that anybody would dig */

static const double COVER_SLACK = 1e-9; /* m: rounding of a cover worked out */

const char *kent_block_word(kent_block_type type)
{
    switch (type) {
    case KENT_BLOCK_NONE:
        return "none";
    case KENT_BLOCK_BEARING:
        return "bearing";
    case KENT_BLOCK_GRAVITY:
        return "gravity";
    case KENT_BLOCK_BASE:
        return "base";
    }
    return "none";
}

kent_block kent_block_none(void)
{
    return (kent_block){
        .bearing_area = NAN,
        .width = NAN,
        .height = NAN,
        .thickness = NAN,
        .bearing_pressure = NAN,
        .utilisation = NAN,
        .factor_reached = NAN,
        .face_thickness = NAN,
        .face_utilisation = NAN,
    };
}

/* source docs/theory/10-blocks.md, 10.7 */
double kent_block_thickness(const kent_rules *rules, kent_face face, double diameter)
{
    const double spread = 0.5 * (fmax(face.width, face.height) - diameter);
    const double least = fmax(rules->least_thickness, rules->concrete_behind);
    return kent_side_up(fmax(least, spread), rules->side_step);
}

/* source docs/theory/10-blocks.md, 10.13 */
double kent_gravity_volume(double upward, double factor, double unit_weight)
{
    return factor * upward / unit_weight;
}

/* ---- parts ----------------------------------------------------------------------- */

/* A face no lower than the rules want it over this pipe. */
static bool face_fits(const kent_rules *rules, const kent_site *site, double area,
                      double limit, kent_face *out)
{
    kent_rules own = *rules;

    own.least_height = kent_rules_height(rules, site->diameter);
    return kent_face_choose(&own, area, limit, out);
}

static kent_fault face_size(const kent_rules *rules, const kent_site *site,
                            double sideways, kent_block *out)
{
    const double limit = kent_face_height_limit(rules, kent_site_axis(site));

    out->bearing_area = sideways / site->allowable;
    if (isnan(site->cover)) return KENT_FAULT_COVER_UNSTATED;
    if (site->cover < kent_rules_cover(rules, site->diameter) - COVER_SLACK) {
        return KENT_FAULT_SHALLOW;
    }
    if (!(site->allowable > 0.0)) return KENT_FAULT_BEARING;
    if (!face_fits(rules, site, out->bearing_area + site->hole, limit, &out->face)) {
        return KENT_FAULT_FACE;
    }
    out->face_thickness = kent_site_thickness(rules, site, out->face, KENT_SIDEWAYS);
    if (site->all_round) {
        out->face_thickness = fmax(out->face_thickness, out->face.width);
    }
    return KENT_FAULT_NONE;
}

double kent_face_cover_needed(const kent_rules *rules, const kent_site *site,
                              double sideways)
{
    const int tries = (int)(DEEPEST / rules->side_step);
    kent_site deeper = *site;
    kent_face face = {0};

    for (int k = 1; k <= tries; k++) { /* up to a multiple of a step */
        deeper.cover = kent_side_up(site->cover, rules->side_step) +
                       (double)(k - 1) * rules->side_step;
        kent_site_bear(&deeper, rules);
        const double area = sideways / deeper.allowable + deeper.hole;
        const double limit = kent_face_height_limit(rules, kent_site_axis(&deeper));
        const double least = kent_rules_cover(rules, deeper.diameter);
        if (deeper.cover < least - COVER_SLACK) continue;
        if (!(deeper.allowable > 0.0)) continue;
        if (face_fits(rules, &deeper, area, limit, &face)) return deeper.cover;
    }
    return NAN;
}

double kent_face_bearing_needed(const kent_rules *rules, const kent_site *site,
                                double sideways)
{
    const double step = rules->side_step;
    const double limit = kent_face_height_limit(rules, kent_site_axis(site));
    const double height = kent_side_down(limit, step);
    const double width = kent_side_down(rules->width_to_height[1] * height, step);
    const double net = width * height - site->hole;

    const double least = kent_rules_height(rules, site->diameter);

    if (!(height >= least - KENT_SIDE_SLACK * step)) return NAN;
    return net > 0.0 ? sideways / net : NAN;
}

/* source docs/theory/10-blocks.md, 10.15 */
double kent_gravity_most(const kent_rules *rules, const kent_site *site)
{
    return kent_side_down(2.0 * kent_site_axis(site), rules->side_step);
}

double kent_gravity_shallow(const kent_rules *rules, const kent_site *site,
                            double volume)
{
    const double most = kent_gravity_most(rules, site);
    return most > 0.0 ? sqrt(volume / most) : 0.0; /* NaN: no depth is stated */
}

/* Square in plan and no taller than wide; wide enough for what pulls it down.
 * source docs/theory/10-blocks.md, 10.13 .. 10.15 */
static void gravity_shape(const kent_rules *rules, const kent_site *site,
                          const kent_demand *demand, double unit_weight,
                          kent_block *out)
{
    const double volume =
        kent_gravity_volume(demand->load[KENT_UPWARD], 1.0, unit_weight);
    const double footing = demand->load[KENT_DOWNWARD] > 0.0
                               ? demand->load[KENT_DOWNWARD] / site->vertical
                               : 0.0;
    const double side = kent_side_up(fmax(fmax(cbrt(volume), sqrt(footing)),
                                          kent_gravity_shallow(rules, site, volume)),
                                     rules->side_step);

    out->width = side;
    out->thickness = side;
    out->height = kent_side_up(fmax(volume / (side * side), rules->least_height),
                               rules->side_step);
    out->volume = out->width * out->height * out->thickness;
}

static void gravity_size(const kent_rules *rules, const kent_site *site,
                         const kent_demand *demand, kent_block *out)
{
    const double dry = rules->concrete_unit_weight;

    out->type = KENT_BLOCK_GRAVITY;
    gravity_shape(rules, site, demand, dry, out);
    const double base = kent_site_axis(site) + 0.5 * out->height;
    const double weight = kent_site_concrete(site, rules, base);
    out->submerged = weight < dry;
    if (out->submerged) gravity_shape(rules, site, demand, weight, out);
}

/* As square as steps allow and no narrower than the pipe; heavy enough for what lifts
 * it. source docs/theory/10-blocks.md, 10.16, 10.17 */
static void base_size(const kent_rules *rules, const kent_site *site,
                      const kent_demand *demand, kent_block *out)
{
    const double area = demand->load[KENT_DOWNWARD] / site->vertical;
    const double step = rules->side_step;

    out->type = KENT_BLOCK_BASE;
    out->bearing_area = area;
    out->width = kent_side_up(fmax(sqrt(area), site->diameter), step);
    out->height = kent_side_up(fmax(area / out->width, site->diameter), step);
    const kent_face plan = {.width = out->width, .height = out->height};
    out->thickness = kent_site_thickness(rules, site, plan, KENT_DOWNWARD);
    if (demand->load[KENT_UPWARD] > 0.0) {
        const double dry = rules->concrete_unit_weight;
        const double lift = demand->load[KENT_UPWARD] / (out->width * out->height);
        const double deep = fmax(out->thickness, kent_side_up(lift / dry, step));
        const double under = site->cover + site->diameter + deep;
        const double weight = kent_site_concrete(site, rules, under);
        out->submerged = weight < dry;
        out->thickness = fmax(out->thickness, kent_side_up(lift / weight, step));
    }
    out->volume = out->width * out->height * out->thickness;
}

/* The concrete behind the face, without the pipe that passes through. m3 */
static double bearing_concrete(const kent_block *b, const kent_site *site)
{
    return (b->width * b->height - site->hole) * b->thickness;
}

/* Makes a bearing block of the face, if the block's own weight and footing do for what
 * little lifts or presses it. */
static bool bearing_carries(const kent_rules *rules, const kent_site *site,
                            const kent_demand *demand, kent_block *out)
{
    kent_block b = *out;

    b.type = KENT_BLOCK_BEARING;
    b.width = b.face.width;
    b.height = b.face.height;
    b.thickness = b.face_thickness;
    b.volume = b.width * b.height * b.thickness;
    const double base = kent_site_axis(site) + 0.5 * b.height;
    const double weight = kent_site_concrete(site, rules, base);
    const double footing = b.width * b.thickness * site->vertical;
    b.submerged =
        demand->load[KENT_UPWARD] > 0.0 && weight < rules->concrete_unit_weight;
    if (demand->load[KENT_UPWARD] > bearing_concrete(&b, site) * weight) return false;
    if (demand->load[KENT_DOWNWARD] > footing) return false;
    *out = b;
    return true;
}

/* ---- a block --------------------------------------------------------------------- */

kent_fault kent_block_size(const kent_rules *rules, const kent_site *site,
                           const kent_demand *demand, kent_block *out)
{
    const double up = demand->load[KENT_UPWARD], down = demand->load[KENT_DOWNWARD];
    const double sideways = demand->load[KENT_SIDEWAYS];
    kent_fault fault = KENT_FAULT_NONE;

    *out = kent_block_none();
    if (down > 0.0 && isnan(site->vertical)) return KENT_FAULT_VERTICAL;
    if (sideways > 0.0) {
        fault = face_size(rules, site, sideways, out);
        if (fault != KENT_FAULT_NONE) return fault;
    }
    const bool carries = sideways > 0.0 && bearing_carries(rules, site, demand, out);
    if (!carries) {
        if (up < down) base_size(rules, site, demand, out);
        /* a base that its weight makes taller than wide is a pillar */
        if (up >= down || out->thickness > out->width) {
            gravity_size(rules, site, demand, out);
        }
        out->has_face = sideways > 0.0;
        if (out->has_face) {
            out->face_volume = out->face.width * out->face.height * out->face_thickness;
        }
    }
    if (out->volume + out->face_volume > rules->largest_volume) {
        return KENT_FAULT_VOLUME;
    }
    return fault;
}

/* source docs/theory/10-blocks.md, 10.9 and 10.10 */
void kent_block_use(const kent_block *block, const kent_rules *rules,
                    const kent_site *site, const kent_demand *demand,
                    double use[KENT_SENSES])
{
    const double weight = rules->concrete_unit_weight -
                          (block->submerged ? rules->water_unit_weight : 0.0);
    const bool base = block->type == KENT_BLOCK_BASE;
    const bool bearing = block->type == KENT_BLOCK_BEARING;
    const double plan = block->width * (base ? block->height : block->thickness);
    const double volume = bearing ? bearing_concrete(block, site) : block->volume;

    for (int s = 0; s < KENT_SENSES; s++) {
        use[s] = 0.0;
    }
    if (demand->load[KENT_SIDEWAYS] > 0.0) {
        const double face = block->face.width * block->face.height - site->hole;
        use[KENT_SIDEWAYS] = demand->load[KENT_SIDEWAYS] / (face * site->allowable);
    }
    if (demand->load[KENT_UPWARD] > 0.0) {
        use[KENT_UPWARD] = demand->load[KENT_UPWARD] / (volume * weight);
    }
    if (demand->load[KENT_DOWNWARD] > 0.0) {
        use[KENT_DOWNWARD] = demand->load[KENT_DOWNWARD] / (plan * site->vertical);
    }
}
