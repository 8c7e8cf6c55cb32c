#include "kent_straps.h"
#include "kent_side_internal.h"

static const double PI = 3.14159265358979323846;

/* m of concrete under the foot of a rod, cast against earth. source 20.3 */
static const double FOOT = 0.075;

/* m: round bars as they are sold. EN 10060 and ASME B18.31.3, from memory. */
static const double METRIC[] = {0.012, 0.016, 0.020, 0.025, 0.032};
static const double INCHES[] = {0.5 * 0.0254,   0.625 * 0.0254, 0.75 * 0.0254,
                                0.875 * 0.0254, 1.0 * 0.0254,   1.125 * 0.0254,
                                1.25 * 0.0254};

enum { MOST_LEGS = 1000 };

double kent_straps_carry(int legs, double diameter, double stress)
{
    return (double)legs * 0.25 * PI * diameter * diameter * stress;
}

double kent_straps_anchorage(double diameter, double stress, double bond)
{
    return stress * diameter / (4.0 * bond);
}

/* Sides in steps of which a metre is a whole number are metric. */
static const double *bars_of(const kent_rules *rules, size_t *count)
{
    const double per_metre = round(1.0 / rules->side_step);
    const bool metric = fabs(per_metre * rules->side_step - 1.0) < 1e-9;

    *count =
        metric ? sizeof METRIC / sizeof METRIC[0] : sizeof INCHES / sizeof INCHES[0];
    return metric ? METRIC : INCHES;
}

/* The least bar of which so many legs carry the force; NAN: none. */
static double bar_for(const kent_rules *rules, double force, int legs)
{
    const double slack = 1.0 + KENT_SIDE_SLACK;
    size_t count = 0;
    const double *bars = bars_of(rules, &count);
    const double widest = fmax(bars[count - 1], rules->strap_diameter);

    for (size_t i = 0; i < count; i++) {
        if (bars[i] * slack < rules->strap_diameter) continue;
        if (kent_straps_carry(legs, bars[i], rules->strap_stress) * slack >= force) {
            return bars[i];
        }
    }
    return kent_straps_carry(legs, widest, rules->strap_stress) >= force ? widest : NAN;
}

kent_straps kent_straps_choose(const kent_rules *rules, double force, double below)
{
    kent_straps s = {.force = force,
                     .diameter = NAN,
                     .stress = NAN,
                     .anchorage = NAN,
                     .embedment = NAN,
                     .room = below - FOOT};

    if (!(force > 0.0) || !(rules->strap_stress > 0.0)) return s;
    s.legs = 2;
    s.diameter = bar_for(rules, force, s.legs);
    while (isnan(s.diameter) && s.legs < MOST_LEGS) {
        s.legs += 2;
        s.diameter = bar_for(rules, force, s.legs);
    }
    if (isnan(s.diameter)) {
        s.legs = 0;
        return s;
    }
    s.stress = force / kent_straps_carry(s.legs, s.diameter, 1.0);
    if (!(rules->strap_bond > 0.0)) return s;
    s.anchorage = kent_straps_anchorage(s.diameter, s.stress, rules->strap_bond);
    s.embedment = kent_side_up(s.anchorage, rules->side_step);
    s.hooked = s.embedment > s.room;
    return s;
}
