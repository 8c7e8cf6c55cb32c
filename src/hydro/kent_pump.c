#include "kent_base.h"
#include "kent_math.h"
#include "kent_suter.h"

#include <math.h>
#include <stdio.h>

static const double PI = 3.14159265358979323846;

/* Suter's angle over which what the own curve differs by dies away below shut-off. */
static const double BELOW = 0.25 * 3.14159265358979323846;

/* And beyond its last point: this share of the angle from there to standstill. */
static const double BEYOND = 0.75;

/* How far the rated head may lie off the own curve. */
static const double OFF_CURVE = 0.05;

/* A function of one variable with its derivative. */
typedef struct curve_value {
    double value, slope;
} curve_value;

/* ---- curves through points ------------------------------------------------------- */

/* Cubic from value and slope at both ends of an interval of some width, at share t of
 * it. */
static curve_value cubic(double width, double t, const double *y, const double *dy)
{
    const double rise = y[1] - y[0];
    const double a = width * dy[0] - rise, b = rise - width * dy[1];
    const double u = 1.0 - t;
    return (curve_value){y[0] + t * rise + t * u * (a * u + b * t),
                         (rise + (1.0 - 2.0 * t) * (a * u + b * t) + t * u * (b - a)) /
                             width};
}

/* Slope at a point between two intervals of widths w and secants s that never
 * overshoots: F. N. Fritsch and J. Butland (1984). 13.5 */
static double slope_between(const double w[2], const double s[2])
{
    if (!(s[0] * s[1] > 0.0)) return 0.0;
    const double a = w[0] + 2.0 * w[1], b = 2.0 * w[0] + w[1];
    return (a + b) * s[0] * s[1] / (a * s[1] + b * s[0]);
}

/* At an end: of the parabola through three points, held within what keeps the order of
 * values. w, s: from the end inwards. */
static double slope_at_end(const double w[2], const double s[2])
{
    const double slope = ((2.0 * w[0] + w[1]) * s[0] - w[0] * s[1]) / (w[0] + w[1]);
    if (!(slope * s[0] > 0.0)) return 0.0;
    if (s[0] * s[1] <= 0.0 && fabs(slope) > fabs(3.0 * s[0])) return 3.0 * s[0];
    return slope;
}

static void slopes_of(const double *x, const double *y, size_t count, double *slope)
{
    double width[KENT_PUMP_POINTS] = {0}, secant[KENT_PUMP_POINTS] = {0};
    const size_t n = count - 1; /* intervals */
    for (size_t i = 0; i < n; i++) {
        width[i] = x[i + 1] - x[i];
        secant[i] = (y[i + 1] - y[i]) / width[i];
    }
    if (n == 1) {
        slope[0] = slope[1] = secant[0];
        return;
    }
    slope[0] = slope_at_end(width, secant);
    slope[n] = slope_at_end((double[]){width[n - 1], width[n - 2]},
                            (double[]){secant[n - 1], secant[n - 2]});
    for (size_t i = 1; i < n; i++) {
        slope[i] = slope_between(width + i - 1, secant + i - 1);
    }
}

static curve_value through(const double *x, const double *y, const double *slope,
                           size_t count, double at)
{
    size_t i = 0;
    while (i + 2 < count && x[i + 1] < at) {
        i++;
    }
    const double width = x[i + 1] - x[i];
    return cubic(width, (at - x[i]) / width, y + i, slope + i);
}

/* ---- complete characteristics ---------------------------------------------------- */

static const double STEP = 3.14159265358979323846 / 44.0; /* rad, of Suter's tables */

/* x within 0 .. 2 pi */
static curve_value suter(const double *w, const double *slope, double x)
{
    const double place = x / STEP;
    size_t i = place > 0.0 ? (size_t)place : 0;
    if (i > KENT_SUTER_POINTS - 2) i = KENT_SUTER_POINTS - 2;
    return cubic(STEP, place - (double)i, w + i, slope + i);
}

/* The table goes round: its last point is its first. */
static void suter_slopes(const double *w, double *slope)
{
    const double width[2] = {STEP, STEP};
    const size_t last = KENT_SUTER_POINTS - 1;
    for (size_t i = 0; i < last; i++) {
        const double before = i > 0 ? w[i - 1] : w[last - 1];
        const double secant[2] = {(w[i] - before) / STEP, (w[i + 1] - w[i]) / STEP};
        slope[i] = slope_between(width, secant);
    }
    slope[last] = slope[0];
}

/* 13.4: straight lines in specific speed between the published curves */
static void interpolate_suter(kent_pump_curve *c)
{
    const double ns = c->specific_speed;
    const double lowest = KENT_SUTER[0].specific_speed;
    const double highest = KENT_SUTER[KENT_SUTER_CURVES - 1].specific_speed;
    const double held = fmin(fmax(ns, lowest), highest);
    size_t i = 0;

    c->outside = held != ns;
    while (i + 2 < KENT_SUTER_CURVES && KENT_SUTER[i + 1].specific_speed < held) {
        i++;
    }
    const kent_suter *a = &KENT_SUTER[i], *b = a + 1;
    const double share =
        (held - a->specific_speed) / (b->specific_speed - a->specific_speed);
    for (size_t k = 0; k < KENT_SUTER_POINTS; k++) {
        c->wh[k] = (1.0 - share) * a->wh[k] + share * b->wh[k];
        c->wb[k] = (1.0 - share) * a->wb[k] + share * b->wb[k];
    }
    suter_slopes(c->wh, c->wh_slope);
    suter_slopes(c->wb, c->wb_slope);
}

/* 13.7: what is added to Suter's curve at an angle. It dies away over BELOW on the side
 * of reverse flow, and well before the pump would stand still on the other. */
static curve_value added(const kent_pump_join join[2], double last_angle, double x)
{
    if (x > PI - BELOW && x <= PI) {
        return cubic(BELOW, (x - (PI - BELOW)) / BELOW, (double[]){0.0, join[0].value},
                     (double[]){0.0, join[0].slope});
    }
    const double width = BEYOND * (1.5 * PI - last_angle);
    if (x >= last_angle && x < last_angle + width) {
        return cubic(width, (x - last_angle) / width, (double[]){join[1].value, 0.0},
                     (double[]){join[1].slope, 0.0});
    }
    return (curve_value){0.0, 0.0};
}

/* ---- completing ------------------------------------------------------------------ */

static const char *wrong_efficiency(const kent_pump_curve *c)
{
    size_t given = 0;
    for (size_t i = 1; i < c->count; i++) {
        if (isnan(c->efficiency[i])) continue;
        if (!(c->efficiency[i] > 0.0 && c->efficiency[i] <= 1.0)) {
            return "an efficiency of its curve is not above 0 and at most 1";
        }
        given++;
    }
    return given > 0 && given < c->count - 1
               ? "its efficiency is given at some flows of its curve only"
               : NULL;
}

static const char *wrong_curve(const kent_pump_curve *c)
{
    if (c->count < 2) return "its curve needs at least two pairs";
    if (c->flow[0] != 0.0) return "its curve does not start at no flow";
    if (!(c->head[0] > 0.0)) return "its head is not above nil at no flow";
    for (size_t i = 1; i < c->count; i++) {
        if (!(c->flow[i] > c->flow[i - 1])) return "its flows do not rise";
        if (!(c->head[i] <= c->head[i - 1])) return "its head rises with flow";
    }
    return wrong_efficiency(c);
}

static const char *wrong_rated(const kent_pump_curve *c)
{
    if (!(c->rated_flow > 0.0 && c->rated_head > 0.0 && c->rated_speed > 0.0)) {
        return "its rated flow, head and speed are not all above nil";
    }
    if (!(c->rated_efficiency > 0.0 && c->rated_efficiency <= 1.0)) {
        return "its rated efficiency is not above 0 and at most 1";
    }
    if (c->rated_flow > c->flow[c->count - 1]) {
        return "its rated flow is beyond the end of its curve";
    }
    return NULL;
}

/* 13.2 */
static double specific_speed(const kent_pump_curve *c)
{
    const double rpm = c->rated_speed * 30.0 / PI;
    const double head = c->rated_head / c->stages;
    return rpm * sqrt(c->rated_flow / c->suctions) / (sqrt(head) * sqrt(sqrt(head)));
}

/* Two points alone lie on a parabola with its top at no flow: 13.5. */
static void head_slopes(kent_pump_curve *c)
{
    slopes_of(c->flow, c->head, c->count, c->head_slope);
    if (c->count > 2) return;
    c->head_slope[0] = 0.0;
    c->head_slope[1] *= 2.0;
}

/* 13.6: at no flow, where no efficiency can tell, the torque is Suter's */
static void own_torque(kent_pump_curve *c, double density, double gravity)
{
    c->own_torque = !isnan(c->efficiency[1]);
    if (!c->own_torque) return;
    c->torque[0] = c->rated_torque * suter(c->wb, c->wb_slope, PI).value;
    for (size_t i = 1; i < c->count; i++) {
        c->torque[i] = density * gravity * c->flow[i] * c->head[i] /
                       (c->efficiency[i] * c->rated_speed);
    }
    slopes_of(c->flow, c->torque, c->count, c->torque_slope);
}

/* A quantity in the form of 13.3, and its derivative by the angle whose tangent is t:
 * 13.8. y: m or N m at the own curve's point i; scale: its rated value. */
static curve_value form_of(const kent_pump_curve *c, const double *y,
                           const double *slope, size_t i, double scale)
{
    const double t = c->flow[i] / c->rated_flow;
    const double f = y[i] / scale, df = slope[i] * c->rated_flow / scale;
    return (curve_value){f / (1.0 + t * t), df - 2.0 * f * t / (1.0 + t * t)};
}

/* Own curve less Suter's where the own one ends: of the head, and of the torque that
 * is lost in the pump. */
static void join(kent_pump_curve *c)
{
    const size_t last = c->count - 1;
    c->last = c->flow[last] / c->rated_flow;
    c->last_angle = PI + kent_atan2(c->last, 1.0);
    for (size_t k = 0; k < 2; k++) {
        const size_t i = k == 0 ? 0 : last;
        const double at = k == 0 ? PI : c->last_angle, t = k == 0 ? 0.0 : c->last;
        const curve_value h = form_of(c, c->head, c->head_slope, i, c->rated_head);
        const curve_value hs = suter(c->wh, c->wh_slope, at);
        const kent_pump_join d = {h.value - hs.value, h.slope - hs.slope};
        c->wh_join[k] = d;
        c->wb_join[k] = (kent_pump_join){0};
        if (!c->own_torque) continue;
        const curve_value b =
            form_of(c, c->torque, c->torque_slope, i, c->rated_torque);
        const curve_value bs = suter(c->wb, c->wb_slope, at);
        const double e = c->rated_efficiency;
        c->wb_join[k].value = b.value - bs.value - e * t * d.value;
        c->wb_join[k].slope =
            b.slope - bs.slope - e * (t * d.slope + (1.0 + t * t) * d.value);
    }
}

const char *kent_pump_curve_complete(kent_pump_curve *c, double density, double gravity)
{
    const char *wrong = wrong_curve(c);
    if (!wrong) wrong = wrong_rated(c);
    if (wrong) return wrong;

    head_slopes(c);
    const double on_curve =
        through(c->flow, c->head, c->head_slope, c->count, c->rated_flow).value;
    if (fabs(on_curve - c->rated_head) > OFF_CURVE * c->rated_head) {
        return "its rated point is not on its curve";
    }
    /* 13.1 */
    c->rated_torque = density * gravity * c->rated_flow * c->rated_head /
                      (c->rated_efficiency * c->rated_speed);
    c->specific_speed = specific_speed(c);
    interpolate_suter(c);
    own_torque(c, density, gravity);
    join(c);
    return NULL;
}

void kent_pump_caution(const kent_pump_curve *c, char *out, size_t size)
{
    const double lowest = KENT_SUTER[0].specific_speed;
    const double highest = KENT_SUTER[KENT_SUTER_CURVES - 1].specific_speed;
    snprintf(out, size,
             "its specific speed of %.4g (rpm, m3/s, m; per stage and suction side) is "
             "outside the published range of %.0f to %.0f: what it does beyond its own "
             "curve, turning backwards or without power, is that of a pump of %.0f",
             c->specific_speed, lowest, highest,
             c->specific_speed < lowest ? lowest : highest);
}

/* ---- asking ---------------------------------------------------------------------- */

/* A quantity that grows with the square of its size, of alpha and v. */
typedef struct affine {
    double value, by_v, by_alpha;
} affine;

/* 13.3: (alpha2 + v2) W(x) */
static affine by_angle(double v, double alpha, curve_value w)
{
    return (affine){(alpha * alpha + v * v) * w.value,
                    2.0 * v * w.value + alpha * w.slope,
                    2.0 * alpha * w.value - v * w.slope};
}

/* 13.5: alpha2 F(flow/alpha); scale: rated value, of which the result is a share */
static affine by_affinity(const kent_pump_curve *c, const double *y,
                          const double *slope, double scale, double v, double alpha)
{
    const double flow = fmin(v / alpha, c->last) * c->rated_flow;
    const curve_value f = through(c->flow, y, slope, c->count, flow);
    const double value = f.value / scale, by_flow = f.slope * c->rated_flow / scale;
    return (affine){alpha * alpha * value, alpha * by_flow,
                    2.0 * alpha * value - v * by_flow};
}

/* 13.16: Suter's torque, and what the power of a head besides Suter's adds to it. more:
 * that head, over the rated one; lost: torque of other losses than Suter's. */
static affine torque_of(const kent_pump_curve *c, double v, double alpha, double x,
                        const affine *more)
{
    curve_value w = suter(c->wb, c->wb_slope, x);
    const curve_value lost = added(c->wb_join, c->last_angle, x);
    w.value += lost.value;
    w.slope += lost.slope;
    affine b = by_angle(v, alpha, w);
    if (more->value == 0.0 && more->by_v == 0.0 && more->by_alpha == 0.0) return b;
    const double e = c->rated_efficiency, t = v / alpha;
    b.value += e * t * more->value;
    b.by_v += e * (t * more->by_v + more->value / alpha);
    b.by_alpha += e * (t * more->by_alpha - t * (more->value / alpha));
    return b;
}

kent_pump_point kent_pump_at(const kent_pump_curve *c, double flow, double speed)
{
    const double v = flow / c->rated_flow, alpha = speed / c->rated_speed;
    const double x = PI + kent_atan2(v, alpha);
    const bool own = alpha > 0.0 && v >= 0.0 && v <= c->last * alpha;
    affine h = by_angle(v, alpha, suter(c->wh, c->wh_slope, x)), more, b;

    if (own) {
        const affine suters = h;
        h = by_affinity(c, c->head, c->head_slope, c->rated_head, v, alpha);
        more = (affine){h.value - suters.value, h.by_v - suters.by_v,
                        h.by_alpha - suters.by_alpha};
    } else {
        more = by_angle(v, alpha, added(c->wh_join, c->last_angle, x));
        h = (affine){h.value + more.value, h.by_v + more.by_v,
                     h.by_alpha + more.by_alpha};
    }
    if (own && c->own_torque) {
        b = by_affinity(c, c->torque, c->torque_slope, c->rated_torque, v, alpha);
    } else {
        b = torque_of(c, v, alpha, x, &more);
    }
    return (kent_pump_point){c->rated_head * h.value,
                             c->rated_head * h.by_v / c->rated_flow,
                             c->rated_head * h.by_alpha / c->rated_speed,
                             c->rated_torque * b.value,
                             c->rated_torque * b.by_v / c->rated_flow,
                             c->rated_torque * b.by_alpha / c->rated_speed};
}

/* 13.9 */
double kent_pump_inertia_estimate(double power, double speed)
{
    const double kw = 1e-3 * power, rpm = speed * 30.0 / PI;
    const double pump = 1.5e7 * kent_pow(kw / (rpm * rpm * rpm), 0.9556);
    const double motor = 118.0 * kent_pow(kw / rpm, 1.48);
    return pump + motor;
}
