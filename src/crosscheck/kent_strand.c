#include "kent_strand_internal.h"

#include <math.h>

/* m: differences between cells below this are smooth, whatever their signs. */
static const double SMOOTH = 0.2;

/* How much of a slope is left, 0 .. 1, where differences behind and ahead of a cell
 * are b and f, and its derivatives: 17.5. */
typedef struct share {
    double value, by_b, by_f;
} share;

static share limited(double b, double f)
{
    const double product = b * f > 0.0 ? b * f : 0.0;
    const double above = 2.0 * (product + SMOOTH * SMOOTH);
    const double below = b * b + f * f + 2.0 * SMOOTH * SMOOTH;
    const double value = above / below;
    const double on = product > 0.0 ? 2.0 : 0.0;
    return (share){value, (on * f - 2.0 * b * value) / below,
                   (on * b - 2.0 * f * value) / below};
}

/* 17.4 */
kent_face kent_strand_face(const kent_strand *s, const double *y, double in,
                           size_t cell)
{
    const double here = y[kent_strand_at(s, cell)];
    const double ahead = y[kent_strand_at(s, cell + 1)];
    /* what comes in lies half a cell away */
    const double scale = cell == 0 ? 2.0 : 1.0;
    const double before = cell == 0 ? in : y[kent_strand_at(s, cell - 1)];
    const double b = scale * (here - before), f = ahead - here;
    const share phi = limited(b, f);
    const double sum = (b + 2.0 * f) / 6.0;
    const double by_b = phi.value / 6.0 + phi.by_b * sum;
    const double by_f = phi.value / 3.0 + phi.by_f * sum;
    return (kent_face){here + phi.value * sum,
                       {-scale * by_b, 1.0 + scale * by_b - by_f, by_f}};
}

/* 17.6 */
kent_face kent_strand_out(const kent_strand *s, const double *y)
{
    const double last = y[kent_strand_at(s, s->count - 1)];
    const double middle = y[kent_strand_at(s, s->count - 2)];
    const double first = y[kent_strand_at(s, s->count - 3)];
    const double b = middle - first, f = last - middle;
    const share phi = limited(b, f);
    const double by_b = 0.5 * f * phi.by_b;
    const double by_f = 0.5 * (phi.value + f * phi.by_f);
    return (kent_face){last + 0.5 * phi.value * f, {-by_b, by_b - by_f, 1.0 + by_f}};
}
