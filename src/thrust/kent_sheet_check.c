#include "kent_sheet_internal.h"

#include <math.h>

static const double PI = 3.14159265358979323846;

static bool same(double a, double b)
{
    return fabs(a - b) <= 1e-9 * fmax(fabs(a), fabs(b));
}

/* Whether two ports face away from each other on one axis. */
static bool in_line(const kent_port *a, const kent_port *b)
{
    return kent_vec3_length(kent_vec3_add(a->direction, b->direction)) < 1e-6;
}

static void check_along_axis(const kent_sheet *s)
{
    const kent_port_state *p = s->instant->balance.port;

    if (s->count != 2 || !in_line(&s->ports[0], &s->ports[1])) {
        kent_sheet_heading(s, kent_say("Check: no short form, the axis turns"));
        return;
    }
    kent_derivation_work(s->d, "C", fabs(p[0].push - p[1].push), KENT_FORCE,
                         "abs(F_1-F_2)", "8.11",
                         "check: the resultant, along the axis");
}

static void check_bend(const kent_sheet *s)
{
    const kent_port_state *p = s->instant->balance.port;
    const double half = sin(0.5 * s->fitting->angle);

    if (s->count != 2 || !same(p[0].push, p[1].push)) {
        kent_sheet_heading(
            s, kent_say("Check: no short form, the two ports push differently"));
        return;
    }
    kent_derivation_put(s->d, "theta", s->fitting->angle, KENT_ANGLE, s->geometry,
                        "turn of the bend in space");
    if (s->moving) {
        kent_derivation_work(s->d, "C", 2.0 * p[0].push * half, KENT_FORCE,
                             "2*F_1*sin(theta/2)", "8.9",
                             "check: the resultant, without weight");
    } else {
        kent_derivation_work(s->d, "C", 2.0 * p[0].pressure_force * half, KENT_FORCE,
                             "2*p_1*A_1*sin(theta/2)", "8.9",
                             "check: the resultant, without weight");
    }
}

/* An open branch has no pressure: its stream alone pushes. */
static void check_outlet(const kent_sheet *s)
{
    kent_derivation_work(s->d, "C", s->instant->balance.port[2].momentum_flux,
                         KENT_FORCE, "J_3", "8.13",
                         "check: the reaction of the jet alone, away from it; the "
                         "streams of the run add the rest");
}

static void check_branch(const kent_sheet *s)
{
    if (s->count == 2) { /* as built: the branch is no port */
        check_along_axis(s);
        return;
    }
    const bool even = s->count == 3 && in_line(&s->ports[0], &s->ports[1]) &&
                      same(s->ports[0].seal_diameter, s->ports[1].seal_diameter);

    if (!even) {
        kent_sheet_heading(
            s, kent_say("Check: no short form, the run turns or changes size"));
        return;
    }
    if (s->ports[2].kind == KENT_PORT_OUTLET && !s->load->extended) {
        check_outlet(s);
        return;
    }
    kent_derivation_work(s->d, "C", s->instant->balance.port[2].pressure_force,
                         KENT_FORCE, "p_3*A_3", "8.10",
                         s->moving
                             ? "check: the branch's pressure alone, away from it; "
                               "the streams add the rest"
                             : "check: the resultant over a straight run of one "
                               "size, away from the branch");
}

static void check_reducer(const kent_sheet *s)
{
    const kent_port_state *p = s->instant->balance.port;

    if (s->moving || s->count != 2 || !in_line(&s->ports[0], &s->ports[1])) {
        check_along_axis(s);
    } else {
        const double first = s->ports[0].seal_diameter,
                     second = s->ports[1].seal_diameter;
        const double areas = 0.25 * PI * fabs(first * first - second * second);
        kent_derivation_work(s->d, "C", p[0].pressure * areas, KENT_FORCE,
                             "p_1*abs(A_1-A_2)", "8.11",
                             "check: the resultant, towards the small end");
    }
}

static void check_end(const kent_sheet *s)
{
    const kent_port_state *p = s->instant->balance.port;

    if (s->count != 1) { /* a hydrant's open end beside the pipe */
        check_along_axis(s);
        return;
    }
    kent_derivation_work(s->d, "C", p[0].push, KENT_FORCE,
                         s->moving ? "p_1*A_1+J_1" : "p_1*A_1", "8.12",
                         "check: the resultant, away from the pipe");
}

static void check_closed(const kent_sheet *s)
{
    const kent_port_state *p = s->instant->balance.port;
    const size_t n = s->load->pressed + 1;

    kent_sheet_work(s, kent_say("C"), p[s->load->pressed].pressure_force, KENT_FORCE,
                    kent_say("p_%zu*A_%zu", n, n), "9.4",
                    "check: the resultant, away from the pressed side");
}

static void check_valve(const kent_sheet *s)
{
    if (s->count == 2) {
        check_along_axis(s);
    } else {
        kent_sheet_heading(
            s, kent_say("The jet behind the valve is left out: it would lessen "
                        "the thrust"));
        check_end(s);
    }
}

/* A curve is a bend of its whole turn, spread along it. */
static void check_curve(const kent_sheet *s)
{
    const double radius = s->fitting->curve_radius;

    check_bend(s);
    if (isnan(radius)) return;
    kent_derivation_put(s->d, "R", radius, KENT_LENGTH, s->geometry,
                        "radius of the curve");
    kent_derivation_work(s->d, "q", s->instant->balance.port[0].push / radius,
                         KENT_FORCE_PER_LENGTH, "F_1/R", "8.16",
                         "side load on each length of the curve, outwards");
}

/* Two equal pushes face to face but out of line leave a couple alone. */
static void check_offset(const kent_sheet *s, kent_vec3 couple)
{
    const double push = fabs(s->instant->balance.port[0].push);
    const double offset = push > 0.0 ? kent_vec3_length(couple) / push : 0.0;

    kent_sheet_heading(s, kent_say("Check: two equal pushes face to face, so no thrust "
                                   "is left, but their couple is"));
    kent_derivation_put(s->d, "e", offset, KENT_LENGTH, s->geometry,
                        "distance between the two axes");
    kent_derivation_work(s->d, "M", kent_vec3_length(couple), KENT_MOMENT, "abs(F_1)*e",
                         "8.15", "couple that the offset leaves");
}

static void check_group(const kent_sheet *s)
{
    const kent_port_state *p = s->instant->balance.port;
    const bool pair = s->count == 2 && same(p[0].push, p[1].push);
    const kent_vec3 couple =
        s->load->extended ? (kent_vec3){NAN, NAN, NAN}
                          : kent_instant_couple(s->model, s->fitting, s->instant);
    const bool placed = isfinite(couple.x + couple.y + couple.z);
    const double theta =
        s->count == 2 ? kent_vec3_angle(kent_vec3_scale(-1.0, s->ports[0].direction),
                                        s->ports[1].direction)
                      : 0.0;

    if (placed) {
        kent_derivation_put(s->d, "M_plan", fabs(couple.z), KENT_MOMENT, KENT_COMPUTED,
                            "couple of the pushes in plan, about the centre (8.15)");
        kent_derivation_put(s->d, "M_up", hypot(couple.x, couple.y), KENT_MOMENT,
                            KENT_COMPUTED, "the same upright");
    }
    if (pair && placed && theta < 1e-6) {
        check_offset(s, couple);
    } else if (pair) {
        kent_derivation_put(s->d, "theta", theta, KENT_ANGLE, s->geometry,
                            "whole turn from the first leg to the last");
        kent_derivation_work(s->d, "C", 2.0 * p[0].push * sin(0.5 * theta), KENT_FORCE,
                             "2*F_1*sin(theta/2)", "8.9",
                             "check: the resultant, without weight");
    } else {
        kent_sheet_heading(s, kent_say("Check: no short form, the legs of the group "
                                       "push differently"));
    }
}

void kent_sheet_check(const kent_sheet *s)
{
    if (s->load->closed) {
        check_closed(s);
        return;
    }
    if (s->load->emptied) return; /* the sum above is all there is */
    switch (s->fitting->type) {
    case KENT_BEND:
        check_bend(s);
        break;
    case KENT_TEE:
    case KENT_WYE:
        check_branch(s);
        break;
    case KENT_REDUCER:
        check_reducer(s);
        break;
    case KENT_DEAD_END:
        check_end(s);
        break;
    case KENT_VALVE:
        check_valve(s);
        break;
    case KENT_CURVE:
        check_curve(s);
        break;
    case KENT_GROUP:
        check_group(s);
        break;
    case KENT_CROSS:
    case KENT_STRAIGHT:
        break;
    }
}
