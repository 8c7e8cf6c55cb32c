#include "kent_block_internal.h"
#include "kent_side_internal.h"
#include "kent_stability.h"

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

/* source docs/theory/10-blocks.md, 10.34 */
double kent_block_least_height(const kent_rules *rules, const kent_site *site)
{
    return kent_rules_height(rules, site->diameter);
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

/* Thick enough for what lifts it. source docs/theory/10-blocks.md, 10.13 */
static void base_weigh(const kent_rules *rules, const kent_site *site,
                       const kent_demand *demand, kent_block *out)
{
    const double step = rules->side_step;

    if (!(demand->load[KENT_UPWARD] > 0.0)) return;
    const double dry = rules->concrete_unit_weight;
    const double lift = demand->load[KENT_UPWARD] / (out->width * out->height);
    const double deep = fmax(out->thickness, kent_side_up(lift / dry, step));
    const double under = site->cover + site->diameter + deep;
    const double weight = kent_site_concrete(site, rules, under);
    out->submerged = weight < dry;
    out->thickness = fmax(out->thickness, kent_side_up(lift / weight, step));
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
    base_weigh(rules, site, demand, out);
    out->volume = out->width * out->height * out->thickness;
}

bool kent_block_side_bears(const kent_rules *rules, const kent_site *site,
                           kent_block *out)
{
    const double step = rules->side_step, slack = KENT_SIDE_SLACK * step;
    const double limit = kent_face_height_limit(rules, kent_site_axis(site));
    const kent_face side = {
        .width = fmin(out->width,
                      kent_side_down(rules->width_to_height[1] * out->height, step)),
        .height = out->height,
    };

    const double before = 0.5 * (out->thickness - site->diameter);

    if (before < rules->concrete_behind - slack) return false;
    if (site->fill || side.height > limit + slack) return false;
    if (side.width < rules->width_to_height[0] * side.height - slack) return false;
    if (side.width * side.height < out->bearing_area + site->hole) return false;
    out->face = side;
    out->face_thickness = before;
    return true;
}

/* A face of its own beside the body. */
static void face_beside(kent_block *out)
{
    out->has_face = true;
    out->own_side = false;
    out->face_volume = out->face.width * out->face.height * out->face_thickness;
}

/* A gravity block kept low enough for its own side to be the face. Returns false, and
 * leaves *out, where that side does not serve. */
static bool gravity_as_face(const kent_rules *rules, const kent_site *site,
                            const kent_demand *demand, kent_block *out)
{
    kent_site low = *site;
    kent_block b = *out;

    low.low = true;
    if (!(kent_gravity_most(rules, &low) >= site->diameter)) return false;
    kent_gravity_size(rules, &low, demand, &b);
    if (!kent_block_side_bears(rules, site, &b)) return false;
    b.has_face = true;
    b.own_side = true;
    b.face_volume = 0.0;
    *out = b;
    return true;
}

static bool too_large(const kent_rules *rules, const kent_block *b)
{
    return b->volume + b->face_volume > rules->largest_volume;
}

/* The concrete behind the face, without the pipe that passes through. m3 */
static double bearing_concrete(const kent_block *b, const kent_site *site)
{
    return (b->width * b->height - site->hole) * b->thickness;
}

/* Whether the ground under a bearing block bears its weight (N) and what presses down,
 * which rests on its back edge, or in its middle where the pipe passes through.
 * source docs/theory/20-stability.md, 20.9, 20.10 */
static bool footing_bears(const kent_site *site, const kent_block *b, double weight,
                          double down)
{
    const double lever = site->hole > 0.0 ? 0.0 : 0.5 * b->thickness;
    const kent_base_pressure p =
        kent_base_pressure_of(weight + down, -lever * down, b->thickness, b->width);
    return p.largest <= site->vertical;
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
    const double down = demand->load[KENT_DOWNWARD];
    const double heavy = bearing_concrete(&b, site) * weight;
    b.submerged =
        demand->load[KENT_UPWARD] > 0.0 && weight < rules->concrete_unit_weight;
    if (demand->load[KENT_UPWARD] > heavy) return false;
    if (down > 0.0 && !footing_bears(site, &b, heavy, down)) return false;
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
        const bool weight = up >= down || out->thickness > out->width;
        const bool own =
            weight && sideways > 0.0 && gravity_as_face(rules, site, demand, out);
        if (weight && !own) kent_gravity_size(rules, site, demand, out);
        if (sideways > 0.0 && !own) face_beside(out);
    }
    return too_large(rules, out) ? KENT_FAULT_VOLUME : fault;
}

bool kent_block_widen(const kent_rules *rules, const kent_site *site,
                      const kent_demand *demand, bool flatter, kent_block *block)
{
    const double step = rules->side_step;
    kent_block b = *block;

    b.widened++;
    switch (b.type) {
    case KENT_BLOCK_NONE:
        return false;
    case KENT_BLOCK_BEARING:
        b.thickness = kent_side_up(b.thickness + step, step);
        b.face_thickness = b.thickness;
        break;
    case KENT_BLOCK_GRAVITY:
        kent_gravity_widen(rules, site, demand, flatter, &b);
        break;
    case KENT_BLOCK_BASE: {
        b.width = kent_side_up(b.width + step, step);
        b.height = kent_side_up(b.height + step, step);
        const kent_face plan = {.width = b.width, .height = b.height};
        b.thickness = kent_site_thickness(rules, site, plan, KENT_DOWNWARD);
        base_weigh(rules, site, demand, &b);
        break;
    }
    }
    b.volume = b.width * b.height * b.thickness;
    if (b.own_side && !kent_block_side_bears(rules, site, &b)) { /* too flat by now */
        (void)face_size(rules, site, demand->load[KENT_SIDEWAYS], &b);
        face_beside(&b);
    }
    if (too_large(rules, &b)) return false;
    *block = b;
    return true;
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
    const double soil = block->type == KENT_BLOCK_GRAVITY
                            ? kent_gravity_prism(rules, site, plan, block->height)
                            : 0.0;

    for (int s = 0; s < KENT_SENSES; s++) {
        use[s] = 0.0;
    }
    if (demand->load[KENT_SIDEWAYS] > 0.0) {
        const double face = block->face.width * block->face.height - site->hole;
        use[KENT_SIDEWAYS] =
            demand->load[KENT_SIDEWAYS] / (fmax(0.0, face) * site->allowable);
    }
    if (demand->load[KENT_UPWARD] > 0.0) {
        use[KENT_UPWARD] = demand->load[KENT_UPWARD] / (volume * weight + soil);
    }
    if (demand->load[KENT_DOWNWARD] > 0.0) {
        use[KENT_DOWNWARD] = demand->load[KENT_DOWNWARD] / (plan * site->vertical);
    }
}
