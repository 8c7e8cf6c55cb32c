#include "kent_convex.h"

#include <assert.h>
#include <math.h>
#include <stdbool.h>

kent_convex kent_convex_taper(const kent_taper *t)
{
    const double along[] = {t->near, t->far, t->far, t->near};
    const double across[] = {-t->near_half, -t->far_half, t->far_half, t->near_half};
    kent_convex c = {.count = 4};

    assert(t->near < t->far);
    for (size_t i = 0; i < 4; i++) {
        c.x[i] = t->x + along[i] * t->ux - across[i] * t->uy;
        c.y[i] = t->y + along[i] * t->uy + across[i] * t->ux;
    }
    return c;
}

double kent_convex_area(const kent_convex *c)
{
    double twice = 0.0;

    for (size_t i = 0; i < c->count; i++) {
        const size_t k = i + 1 < c->count ? i + 1 : 0;
        /* from the first corner, so that far coordinates do not blur it */
        twice += (c->x[i] - c->x[0]) * (c->y[k] - c->y[0]) -
                 (c->x[k] - c->x[0]) * (c->y[i] - c->y[0]);
    }
    return 0.5 * twice;
}

/* m2: twice the area of corner k of `by`, its next, and a place; > 0: to the left. */
static double left_of(const kent_convex *by, size_t k, double x, double y)
{
    const size_t next = k + 1 < by->count ? k + 1 : 0;
    return (by->x[next] - by->x[k]) * (y - by->y[k]) -
           (by->y[next] - by->y[k]) * (x - by->x[k]);
}

/* Keeps what lies left of one side. */
static void clip(kent_convex *c, const kent_convex *by, size_t side)
{
    kent_convex kept = {.count = 0};

    for (size_t i = 0; i < c->count; i++) {
        const size_t k = i + 1 < c->count ? i + 1 : 0;
        const double from = left_of(by, side, c->x[i], c->y[i]);
        const double to = left_of(by, side, c->x[k], c->y[k]);
        assert(kept.count + 2 <= KENT_CORNERS); /* one more corner by each of 4 sides */
        if (from >= 0.0) {
            kept.x[kept.count] = c->x[i];
            kept.y[kept.count++] = c->y[i];
        }
        if ((from >= 0.0) != (to >= 0.0)) {
            const double share = from / (from - to);
            kept.x[kept.count] = c->x[i] + share * (c->x[k] - c->x[i]);
            kept.y[kept.count++] = c->y[i] + share * (c->y[k] - c->y[i]);
        }
    }
    *c = kept;
}

double kent_convex_shared(const kent_convex *a, const kent_convex *b)
{
    kent_convex rest = *a;

    for (size_t side = 0; side < b->count && rest.count > 0; side++) {
        clip(&rest, b, side);
    }
    return rest.count < 3 ? 0.0 : fmax(0.0, kent_convex_area(&rest));
}

/* m from a place to a side. */
static double to_side(const kent_convex *c, size_t k, double x, double y)
{
    const size_t next = k + 1 < c->count ? k + 1 : 0;
    const double dx = c->x[next] - c->x[k], dy = c->y[next] - c->y[k];
    const double square = dx * dx + dy * dy;
    double share = 0.0;

    if (square > 0.0) share = ((x - c->x[k]) * dx + (y - c->y[k]) * dy) / square;
    share = fmin(1.0, fmax(0.0, share));
    return hypot(x - c->x[k] - share * dx, y - c->y[k] - share * dy);
}

static double corners_to_sides(const kent_convex *a, const kent_convex *b)
{
    double least = INFINITY;

    for (size_t i = 0; i < a->count; i++) {
        for (size_t k = 0; k < b->count; k++) {
            least = fmin(least, to_side(b, k, a->x[i], a->y[i]));
        }
    }
    return least;
}

double kent_convex_gap(const kent_convex *a, const kent_convex *b)
{
    if (kent_convex_shared(a, b) > 0.0) return 0.0;
    return fmin(corners_to_sides(a, b), corners_to_sides(b, a));
}
