#include "kent_water.h"

#include <math.h>
#include <stddef.h>

const double KENT_WATER_COLDEST = 273.15;
const double KENT_WATER_HOTTEST = 373.15;

/* Coefficients of IAPWS SR6-08(2011). Temperatures enter as 10 K/(593 K - T) and
 * 10 K/(T - 232 K); pressures are about p0 = 0.1 MPa. */
static const double GAS_CONSTANT = 461.51805; /* J/(kg K) */
static const double REFERENCE = 10.0;         /* K */
static const double PRESSURE = 1e5;           /* Pa */

typedef struct term {
    double factor;
    int power;
} term;

/* Gibbs energy, for its heat capacity: a1 .. a3, b1 .. b4, c3. */
static const term GIBBS_HOT[] = {
    {-1.661470539e5, 4}, {2.708781640e6, 5}, {-1.557191544e8, 7}};
static const term GIBBS_COLD[] = {
    {-8.237426256e-1, 2}, {1.908956353, 3}, {-2.017597384, 4}, {8.546361348e-1, 5}};
static const double GIBBS_LOGARITHM = -8.983025854;
/* Specific volume: a5, then a6 .. a10, b5 .. b10. */
static const double VOLUME_CONSTANT = 1.93763157e-2;
static const term VOLUME_HOT[] = {{6.74458446e3, 4},
                                  {-2.22521604e5, 5},
                                  {1.00231247e8, 7},
                                  {-1.63552118e9, 8},
                                  {8.32299658e9, 9}};
static const term VOLUME_COLD[] = {{5.78545292e-3, 1}, {-1.53195665e-2, 2},
                                   {3.11337859e-2, 3}, {-4.23546241e-2, 4},
                                   {3.38713507e-2, 5}, {-1.19946761e-2, 6}};
/* Change of volume with pressure: a11 .. a15, b11 .. b17. */
static const term SQUEEZE_HOT[] = {{-7.5245878e-6, 1},
                                   {-1.3767418e-2, 3},
                                   {1.0627293e1, 5},
                                   {-2.0457795e2, 6},
                                   {1.2037414e3, 7}};
static const term SQUEEZE_COLD[] = {
    {-3.1091470e-6, 1}, {2.8964919e-5, 3}, {-1.3112763e-4, 4}, {3.0410453e-4, 5},
    {-3.9034594e-4, 6}, {2.3403117e-4, 7}, {-4.8510101e-5, 9}};

#define COUNT(table) (sizeof(table) / sizeof(table)[0])

/* Sum of factor x^power. */
static double series(const term *terms, size_t count, double x)
{
    double sum = 0.0;
    for (size_t i = 0; i < count; i++) {
        sum += terms[i].factor * pow(x, terms[i].power);
    }
    return sum;
}

/* Sum of power factor x^(power + 1): its derivative, up to the sign of dx/dT. */
static double series_slope(const term *terms, size_t count, double x)
{
    double sum = 0.0;
    for (size_t i = 0; i < count; i++) {
        sum += terms[i].power * terms[i].factor * pow(x, terms[i].power + 1);
    }
    return sum;
}

/* Sum of power (power + 1) factor x^(power + 2): the second derivative. */
static double series_bend(const term *terms, size_t count, double x)
{
    double sum = 0.0;
    for (size_t i = 0; i < count; i++) {
        const int n = terms[i].power;
        sum += n * (n + 1) * terms[i].factor * pow(x, n + 2);
    }
    return sum;
}

/* Pa. source IAPWS R7-97(2012), region 4, eq. 30: 1.6 */
static double saturation_pressure(double temperature)
{
    const double t =
        temperature - 0.23855557567849 / (temperature - 0.65017534844798e3);
    const double a = (t + 0.11670521452767e4) * t - 0.72421316703206e6;
    const double b =
        (-0.17073846940092e2 * t + 0.12020824702470e5) * t - 0.32325550322333e7;
    const double c =
        (0.14915108613530e2 * t - 0.48232657361591e4) * t + 0.40511340542057e6;
    const double root = 2.0 * c / (-b + sqrt(b * b - 4.0 * a * c));
    return 1e6 * root * root * root * root;
}

/* Pa s. source IAPWS SR6-08(2011): 1.5 */
static double viscosity_at(double temperature)
{
    const double t = temperature / 300.0;
    return 1e-6 * (280.68 * pow(t, -1.9) + 511.45 * pow(t, -7.7) +
                   61.131 * pow(t, -19.6) + 0.45903 * pow(t, -40.0));
}

kent_water kent_water_at(double temperature)
{
    if (!(temperature >= KENT_WATER_COLDEST && temperature <= KENT_WATER_HOTTEST)) {
        return (kent_water){NAN, NAN, NAN, NAN, NAN, NAN};
    }
    const double tau = temperature / REFERENCE;
    const double hot = REFERENCE / (593.0 - temperature);
    const double cold = REFERENCE / (temperature - 232.0);

    /* 1.1: specific volume, m3/kg */
    const double v = GAS_CONSTANT * REFERENCE / PRESSURE *
                     (VOLUME_CONSTANT + series(VOLUME_HOT, COUNT(VOLUME_HOT), hot) +
                      series(VOLUME_COLD, COUNT(VOLUME_COLD), cold));
    /* 1.2: its changes with temperature, m3/(kg K), and pressure, m3/(kg Pa) */
    const double v_t = GAS_CONSTANT / PRESSURE *
                       (series_slope(VOLUME_HOT, COUNT(VOLUME_HOT), hot) -
                        series_slope(VOLUME_COLD, COUNT(VOLUME_COLD), cold));
    const double v_p = GAS_CONSTANT * REFERENCE / (PRESSURE * PRESSURE) *
                       (series(SQUEEZE_HOT, COUNT(SQUEEZE_HOT), hot) +
                        series(SQUEEZE_COLD, COUNT(SQUEEZE_COLD), cold));
    /* 1.3: heat capacity at constant pressure, J/(kg K) */
    const double c_p =
        -GAS_CONSTANT *
        (GIBBS_LOGARITHM + tau * series_bend(GIBBS_HOT, COUNT(GIBBS_HOT), hot) +
         tau * series_bend(GIBBS_COLD, COUNT(GIBBS_COLD), cold));
    /* 1.4: speed of sound; the modulus that goes with it is the adiabatic one */
    const double c = sqrt(-v * v / (v_p + temperature * v_t * v_t / c_p));

    return (kent_water){
        .temperature = temperature,
        .density = 1.0 / v,
        .bulk_modulus = c * c / v,
        .viscosity = viscosity_at(temperature),
        .vapour_pressure = saturation_pressure(temperature),
        .sound_speed = c,
    };
}

/* 1.7, 1.8 */
double kent_barometric_pressure(double altitude)
{
    if (!(altitude >= -500.0 && altitude <= 11000.0)) return NAN;

    const double earth_radius = 6356766.0; /* m */
    const double level = earth_radius * altitude / (earth_radius + altitude);
    const double lapse = 0.0065;                        /* K/m */
    const double power = 9.80665 / (lapse * 287.05287); /* g/(lapse R), dry air */
    return 101325.0 * pow(1.0 - lapse * level / 288.15, power);
}

/* 1.9 */
double kent_vapour_head(const kent_water *water, double z, double barometric,
                        double gravity)
{
    return z + (water->vapour_pressure - barometric) / (water->density * gravity);
}
