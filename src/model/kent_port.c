#include "kent_model_internal.h"

#include <math.h>

/* Diameters closer than this are one size: 0.1 mm. */
static const double SAME_DIAMETER = 1.0e-4;
/* A push whose vertical part is below this share of it counts as level. */
static const double LEVEL_SHARE = 0.02;

static const double RIGHT_ANGLE = 0.5 * 3.14159265358979323846;

static double plan_length(kent_vec3 a) { return hypot(a.x, a.y); }

/* Equation 5.4: flow comes in against the first direction, goes out along the second.
 */
double kent_ports_turn(const kent_port ports[2])
{
    return kent_vec3_angle(kent_vec3_scale(-1.0, ports[0].direction),
                           ports[1].direction);
}

/* Equation 5.5. */
double kent_ports_plan_turn(const kent_port ports[2])
{
    const kent_vec3 in = kent_vec3_scale(-1.0, ports[0].direction);
    const kent_vec3 out = ports[1].direction;
    const double least = sin(KENT_LEAST_TURN); /* a riser has no direction in plan */
    if (plan_length(in) < least || plan_length(out) < least) return 0.0;
    return atan2(in.x * out.y - in.y * out.x, in.x * out.x + in.y * out.y);
}

/* By equation 5.6, the way the bend pushes. */
kent_orientation kent_ports_orientation(const kent_port ports[2])
{
    const kent_vec3 push =
        kent_vec3_scale(-1.0, kent_vec3_add(ports[0].direction, ports[1].direction));
    if (fabs(push.z) <= LEVEL_SHARE * kent_vec3_length(push)) return KENT_HORIZONTAL;
    if (fabs(kent_ports_plan_turn(ports)) >= KENT_LEAST_TURN) return KENT_COMBINED;
    return push.z > 0.0 ? KENT_CREST : KENT_SAG;
}

kent_orientation kent_ports_push(const kent_port *ports, size_t count)
{
    kent_vec3 push = {0.0, 0.0, 0.0};
    for (size_t i = 0; i < count; i++) {
        const double seal = ports[i].seal_diameter * ports[i].seal_diameter;
        push = kent_vec3_sub(push, kent_vec3_scale(seal, ports[i].direction));
    }
    const double all = kent_vec3_length(push);
    if (fabs(push.z) <= LEVEL_SHARE * all) return KENT_HORIZONTAL;
    if (plan_length(push) > LEVEL_SHARE * all) return KENT_COMBINED;
    return push.z > 0.0 ? KENT_CREST : KENT_SAG;
}

double kent_ports_branch_angle(const kent_port ports[3])
{
    return fmin(kent_vec3_angle(ports[2].direction, ports[0].direction),
                kent_vec3_angle(ports[2].direction, ports[1].direction));
}

void kent_ports_run_first(kent_port *ports, size_t count)
{
    const double tie = 1.0e-9; /* rad: the first pair listed wins */
    size_t run[2] = {0, 1};
    double widest = -1.0;
    for (size_t i = 0; i < count; i++) {
        for (size_t j = i + 1; j < count; j++) {
            const double angle =
                kent_vec3_angle(ports[i].direction, ports[j].direction);
            if (angle <= widest + tie) continue;
            widest = angle;
            run[0] = i;
            run[1] = j;
        }
    }
    for (size_t to = 0; to < 2; to++) {
        const kent_port leg = ports[run[to]];
        for (size_t i = run[to]; i > to; i--) {
            ports[i] = ports[i - 1];
        }
        ports[to] = leg; /* run[1] > run[0], so the second stays where it was */
    }
}

double kent_seal_diameter(const kent_model *m, double outside, double inside,
                          double nominal)
{
    const double usual = isfinite(outside) ? outside : inside;

    switch (m->loads.thrust_area) {
    case KENT_AREA_OUTSIDE:
        break;
    case KENT_AREA_INSIDE:
        return inside;
    case KENT_AREA_NOMINAL:
        return isfinite(nominal) ? nominal : usual;
    }
    return usual;
}

bool kent_ports_same_size(const kent_port *a, const kent_port *b)
{
    const bool outside = isfinite(a->outside_diameter + b->outside_diameter);
    const double gap = outside ? a->outside_diameter - b->outside_diameter
                               : a->inside_diameter - b->inside_diameter;
    return fabs(gap) <= SAME_DIAMETER;
}

size_t kent_ports_largest(const kent_port *ports, size_t count)
{
    size_t largest = 0;
    for (size_t i = 1; i < count; i++) {
        if (ports[i].inside_diameter > ports[largest].inside_diameter) largest = i;
    }
    return largest;
}

void kent_ports_schematic(kent_port *ports, size_t count, double angle,
                          kent_orientation orientation)
{
    const double side = sin(angle);
    kent_vec3 turned = {cos(angle), 0.0, 0.0};
    switch (orientation) {
    case KENT_HORIZONTAL:
    case KENT_COMBINED: /* refused before: an angle alone doesn't say how */
        turned.y = side;
        break;
    case KENT_CREST:
        turned.z = -side;
        break;
    case KENT_SAG:
        turned.z = side;
        break;
    }
    const kent_vec3 arriving = {-1.0, 0.0, 0.0}, leaving = {1.0, 0.0, 0.0};
    ports[0].direction = arriving;
    if (count == 2) ports[1].direction = turned;
    if (count > 2) ports[1].direction = leaving;
    for (size_t i = 2; i < count; i++) {
        const double branch = isnan(angle) ? RIGHT_ANGLE : angle;
        const double left = i % 2 == 0 ? 1.0 : -1.0;
        ports[i].direction = (kent_vec3){cos(branch), left * sin(branch), 0.0};
    }
}
