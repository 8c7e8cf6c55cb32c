#include "kent_valve.h"

#include <math.h>

static const double PI = 3.14159265358979323846;

/* Sorted copy of the pairs by rising opening. Returns false where two openings are
 * equal or a value is out of range. */
static bool sort_pairs(const double *opening, const double *loss, size_t count,
                       double *sorted_opening, double *sorted_loss)
{
    for (size_t i = 0; i < count; i++) {
        if (!(opening[i] >= 0.0 && opening[i] <= 1.0 && loss[i] > 0.0)) return false;
        size_t j = i;
        while (j > 0 && sorted_opening[j - 1] > opening[i]) {
            sorted_opening[j] = sorted_opening[j - 1];
            sorted_loss[j] = sorted_loss[j - 1];
            j--;
        }
        if (j > 0 && !(sorted_opening[j - 1] < opening[i])) return false;
        sorted_opening[j] = opening[i];
        sorted_loss[j] = loss[i];
    }
    return true;
}

static void put_point(kent_valve_curve *curve, double opening, double capacity)
{
    curve->opening[curve->count] = opening;
    curve->capacity[curve->count] = capacity;
    curve->count++;
}

/* 4.2 */
bool kent_valve_curve_from_loss(const double *opening, const double *loss, size_t count,
                                kent_valve_curve *out)
{
    double o[KENT_VALVE_POINTS] = {0}, k[KENT_VALVE_POINTS] = {0};
    kent_valve_curve curve = {0};

    /* Two places are kept for the ends a table may lack. */
    if (count < 2 || count > KENT_VALVE_POINTS - 2) return false;
    if (!sort_pairs(opening, loss, count, o, k)) return false;
    const double k_open = k[count - 1];
    if (!isfinite(k_open)) return false;

    put_point(&curve, 0.0, 0.0); /* closed is closed, whatever a table has there */
    for (size_t i = 0; i < count; i++) {
        if (k[i] < k_open) return false; /* no valve passes more when partly closed */
        if (o[i] > 0.0) put_point(&curve, o[i], sqrt(k_open / k[i]));
    }
    if (o[count - 1] < 1.0) put_point(&curve, 1.0, 1.0);
    curve.lowest_given = o[0];
    *out = curve;
    return true;
}

kent_valve_curve kent_valve_curve_linear(void)
{
    return (kent_valve_curve){
        .count = 2, .opening = {0.0, 1.0}, .capacity = {0.0, 1.0}, .lowest_given = 0.0};
}

double kent_valve_relative_capacity(const kent_valve_curve *curve, double opening)
{
    const double *o = curve->opening, *c = curve->capacity;
    const size_t last = curve->count - 1;
    size_t i = 1;

    if (!(opening > o[0])) return c[0];
    if (opening >= o[last]) return c[last];
    while (o[i] < opening) {
        i++;
    }
    return c[i - 1] + (c[i] - c[i - 1]) * (opening - o[i - 1]) / (o[i] - o[i - 1]);
}

/* 4.1 */
double kent_valve_capacity_from_loss(double loss, double size, double gravity)
{
    return 0.25 * PI * size * size * sqrt(2.0 * gravity / loss);
}

/* 4.3: flow at a drop of `drop` Pa of water of 1000 kg/m3 */
static double capacity_from_test(double flow, double drop, double gravity)
{
    return flow / sqrt(drop / (1000.0 * gravity));
}

double kent_valve_capacity_from_kv(double kv, double gravity)
{
    const double hour = 3600.0, bar = 1e5;
    return capacity_from_test(kv / hour, bar, gravity);
}

double kent_valve_capacity_from_cv(double cv, double gravity)
{
    const double us_gallon = 3.785411784e-3;                /* m3 */
    const double psi = 4.4482216152605 / (0.0254 * 0.0254); /* Pa */
    return capacity_from_test(cv * us_gallon / 60.0, psi, gravity);
}
