/* What a fitting's restraint takes up of the ground, in plan. */
#include "kent_space_internal.h"

/* m from the axis in plan; without a thrust sideways along the x axis. */
static kent_vec3 direction_of(const kent_holding_work *w, const kent_holding *h)
{
    const int sideways = h->by_sense[KENT_SIDEWAYS];
    kent_vec3 along = {1.0, 0.0, 0.0};

    if (sideways < 0 || !(w->demand.load[KENT_SIDEWAYS] > 0.0)) return along;
    along = kent_instant_lasting(&w->loads->cases[sideways].worst[KENT_SIDEWAYS]);
    along.z = 0.0;
    return kent_vec3_unit(along);
}

static void footprint_block(const kent_holding_work *w, const kent_holding *h,
                            kent_footprint *at)
{
    const kent_block *b = &h->block;
    const bool bearing = b->type == KENT_BLOCK_BEARING;
    const double thick = b->has_face ? b->face_thickness : b->thickness;

    if (!bearing) {
        const double across = b->type == KENT_BLOCK_BASE ? b->height : b->width;
        at->behind = 0.5 * b->width;
        at->front = 0.5 * b->width;
        at->half_width = 0.5 * across;
    }
    if (!bearing && !b->has_face) return;
    at->leans = w->demand.load[KENT_SIDEWAYS] > 0.0;
    at->both_ways = kent_holding_leans_both_ways(w, h);
    at->front = fmax(at->front, 0.5 * w->site.diameter + thick);
    at->half_width = fmax(at->half_width, 0.5 * b->face.width);
    at->all_round = w->site.all_round;
    if (at->both_ways) at->behind = at->front;
    if (at->leans) at->wedge = kent_wedge_before(w, b);
}

/* Half the passive pressure of a bend with restrained joints is that of the trench's
 * side. */
static void footprint_joints(const kent_holding_work *w, kent_footprint *at)
{
    const double axis = kent_site_axis(&w->site);
    const bool told = w->soil && !isnan(w->soil->friction_angle);
    const kent_wedge side = {
        .base = axis + 0.5 * w->site.diameter,
        .friction_angle = told ? w->soil->friction_angle : KENT_WEDGE_ANGLE,
    };

    if (isnan(axis)) return;
    at->pipe_leans = true;
    at->side_from = 0.5 * w->site.diameter;
    at->side_reach = kent_wedge_reach(&side);
}

void kent_holding_footprint(const kent_holding_work *w, kent_holding *h)
{
    kent_footprint at = {.along = direction_of(w, h)};
    const bool joints =
        h->leg_count > 0 && kent_leg_bears(w->fitting, w->pull) &&
        (h->chosen == KENT_RESTRAINED_JOINTS || h->chosen == KENT_BLOCK_AND_JOINTS);

    if (!h->held || isnan(w->fitting->at.x + w->fitting->at.y)) return;
    if (h->block.type != KENT_BLOCK_NONE) footprint_block(w, h, &at);
    if (joints) footprint_joints(w, &at);
    at.placed = at.half_width > 0.0 || at.pipe_leans;
    h->footprint = at;
}
