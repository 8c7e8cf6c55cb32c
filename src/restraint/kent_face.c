#include "kent_restraint.h"
#include "kent_side_internal.h"

/* Two areas nearer than this, relative to the smaller, are a tie. */
static const double TIE = 1e-9;

double kent_face_height_limit(const kent_rules *rules, double axis_depth)
{
    const double ratio = rules->height_to_depth;
    return ratio * axis_depth / (1.0 - 0.5 * ratio);
}

/* source docs/theory/10-blocks.md, 10.28 */
double kent_curve_side_load(double thrust, double angle, double radius)
{
    return thrust / (2.0 * sin(0.5 * angle) * radius);
}

/* The narrowest width that gives area under this height, or a negative number where
 * the rules' width to height allow none. m */
static double face_width(const kent_rules *rules, double area, double height)
{
    const double step = rules->side_step;
    const double least = kent_side_up(rules->width_to_height[0] * height, step);
    const double most = kent_side_down(rules->width_to_height[1] * height, step);
    const double width = fmax(kent_side_up(area / height, step), least);

    return width <= most + KENT_SIDE_SLACK * step ? width : -1.0;
}

bool kent_face_choose(const kent_rules *rules, double area, double limit,
                      kent_face *out)
{
    const double step = rules->side_step;
    const long first = lround(kent_side_up(rules->least_height, step) / step);
    const long last = lround(kent_side_down(limit, step) / step);
    double best = INFINITY;

    for (long k = first > 0 ? first : 1; k <= last; k++) {
        const double height = kent_side_of((double)k, step);
        const double width = face_width(rules, area, height);
        if (width < 0.0) continue;
        if (width * height > best * (1.0 + TIE)) continue;
        best = width * height; /* a tie goes to this, the taller */
        *out = (kent_face){.width = width, .height = height};
    }
    return isfinite(best);
}
