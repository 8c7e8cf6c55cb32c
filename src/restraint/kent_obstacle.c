/* What stands in the ground that a face leans on. */
#include "kent_holding_internal.h"
#include "kent_said.h"
#include "kent_wedge.h"

kent_wedge kent_wedge_before(const kent_holding_work *w, const kent_block *b)
{
    const double phi = w->soil->friction_angle;
    const bool rubs = kent_soil_way(w->soil) == KENT_WAY_COULOMB && !isnan(phi);
    return (kent_wedge){
        .front =
            0.5 * w->site.diameter + (b->has_face ? b->face_thickness : b->thickness),
        .half_width = 0.5 * b->face.width,
        .base = kent_site_axis(&w->site) + 0.5 * b->face.height,
        .friction_angle = isnan(phi) ? KENT_WEDGE_ANGLE : phi,
        .wall_friction = rubs ? w->soil->wall_friction : 0.0,
    };
}

/* How an obstacle lies to the wedge. */
typedef struct lying {
    double clear;   /* m, of its near side */
    bool runs_past; /* a long one, square to its direction, would cross the wedge */
} lying;

/* Along a thrust (N): side 1, or -1 against it. */
static lying lying_along(const kent_wedge *wedge, const kent_obstacle *o,
                         kent_vec3 thrust, double side)
{
    const double size = side * kent_thrust_horizontal(thrust);
    const double x = thrust.x / size, y = thrust.y / size;
    const double along = o->direction.x * x + o->direction.y * y;
    const double across = o->direction.x * y - o->direction.y * x;

    return (lying){
        .clear = kent_wedge_clearance(wedge, o->distance * along, o->distance * across),
        .runs_past = o->distance < kent_wedge_farthest(wedge, along, across),
    };
}

static lying nearer(lying a, lying b)
{
    return (lying){fmin(a.clear, b.clear), a.runs_past || b.runs_past};
}

/* Along every way that the block leans. */
static lying lying_of(const kent_holding_work *w, const kent_holding *h,
                      const kent_wedge *wedge, const kent_obstacle *o)
{
    const kent_load_case *c = &w->loads->cases[h->by_sense[KENT_SIDEWAYS]];
    const kent_vec3 thrust = kent_instant_lasting(&c->worst[KENT_SIDEWAYS]);
    lying it = lying_along(wedge, o, thrust, 1.0);

    if (kent_holding_leans_both_ways(w, h)) {
        it = nearer(it, lying_along(wedge, o, thrust, -1.0));
    }
    for (size_t i = 0; i < h->other_way_count && w->site.all_round; i++) {
        it = nearer(it, lying_along(wedge, o, h->other_ways[i].thrust, 1.0));
    }
    return it;
}

bool kent_obstacle_clear(kent_holding_work *w, const kent_holding *h)
{
    const kent_wedge wedge = kent_wedge_before(w, &h->block);
    const size_t first = w->fitting->obstacle_first;

    if (!(w->demand.load[KENT_SIDEWAYS] > 0.0)) return true;
    w->reach = kent_wedge_reach(&wedge);
    for (size_t i = 0; i < w->fitting->obstacle_count; i++) {
        const kent_obstacle *o = &w->m->obstacles[first + i];
        const lying it = lying_of(w, h, &wedge, o);
        if (!(it.clear > 0.0)) {
            w->obstacle = o;
            return false;
        }
        kent_notes_add(
            &w->clear, "'%s' is clear of the ground that the face leans on by %s%s",
            o->what, kent_said_of(KENT_LENGTH, w->m->units, it.clear).s,
            it.runs_past ? " where it is nearest; if it runs on, as a trench "
                           "does, it crosses that ground: a place farther "
                           "along it would tell"
                         : "");
    }
    return true;
}
