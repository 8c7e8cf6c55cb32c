#include "kent_plain_concrete.h"

#include <math.h>

static const double MPA = 1e6;                                 /* Pa */
static const double PSI = 4.4482216152605 / (0.0254 * 0.0254); /* Pa */
static const double EN_MEAN_OVER = 8e6; /* Pa: mean over characteristic strength */
static const double EN_PARTIAL = 1.5;   /* on concrete's strength */
static const double EN_PLAIN = 0.8;     /* alpha_cc,pl and alpha_ct,pl */
static const double EN_SHEAR = 1.5;     /* k of 12.6.3: greatest over mean */
static const double EN_FOOTING = 0.85;  /* of 12.9.3 */
static const double ACI_PLAIN = 0.60;   /* strength reduction factor */
static const double ACI_PRESSED = 0.85; /* of the strength */
static const double ACI_ROUGH = 2.0 * 0.0254; /* m lost against soil */

double kent_concrete_least_factor(kent_concrete_code code)
{
    switch (code) {
    case KENT_EN_1992:
        return 1.5;
    case KENT_ACI_318:
        break;
    }
    return 1.6;
}

/* ---- a fitting on its block ------------------------------------------------------ */

kent_face kent_contact_usual(double diameter, double body)
{
    return (kent_face){.width = fmax(0.25 * diameter, body),
                       .height = sqrt(0.5) * diameter};
}

kent_face kent_contact_of(double area, double diameter)
{
    const double height = fmin(sqrt(area), diameter);
    return (kent_face){.width = area / height, .height = height};
}

double kent_concrete_pressed(kent_concrete_code code, double strength)
{
    switch (code) {
    case KENT_EN_1992:
        return EN_PLAIN * strength / EN_PARTIAL;
    case KENT_ACI_318:
        break;
    }
    return ACI_PLAIN * ACI_PRESSED * strength;
}

double kent_concrete_widening(kent_concrete_code code, kent_face contact,
                              kent_face side, double thickness)
{
    const double longer = fmax(contact.width, contact.height);
    const double within =
        fmin(side.width / contact.width, side.height / contact.height);
    double most = 2.0, slope = 4.0; /* ACI: both ways, 2 across for 1 in depth */

    switch (code) {
    case KENT_EN_1992:
        most = 3.0;
        slope = 1.0;
        break;
    case KENT_ACI_318:
        break;
    }
    return fmax(1.0, fmin(fmin(most, within), 1.0 + slope * thickness / longer));
}

/* ---- beyond 45 degrees ----------------------------------------------------------- */

/* Pa: mean tensile strength, EN 1992-1-1 table 3.1. */
static double en_mean_tension(double strength)
{
    const double mean = strength + EN_MEAN_OVER;
    if (strength <= 50.0 * MPA) return 0.30 * cbrt(pow(strength / MPA, 2.0)) * MPA;
    return 2.12 * log(1.0 + mean / (10.0 * MPA)) * MPA;
}

double kent_concrete_pulled(kent_concrete_code code, double strength)
{
    switch (code) {
    case KENT_EN_1992: /* 0.7: that 95 of 100 samples reach */
        return EN_PLAIN * 0.7 * en_mean_tension(strength) / EN_PARTIAL;
    case KENT_ACI_318:
        break;
    }
    return ACI_PLAIN * 5.0 * sqrt(strength / PSI) * PSI;
}

double kent_concrete_sheared(kent_concrete_code code, double strength)
{
    switch (code) {
    case KENT_EN_1992:
        return kent_concrete_pulled(code, strength) / EN_SHEAR;
    case KENT_ACI_318:
        break;
    }
    return ACI_PLAIN * (4.0 / 3.0) * sqrt(strength / PSI) * PSI;
}

/* m that the plan stands out beyond the contact, where it does so furthest. */
static double overhang(kent_face contact, kent_face plan)
{
    return fmax(0.0,
                0.5 * fmax(plan.width - contact.width, plan.height - contact.height));
}

static double aci_punching(double strength, kent_face contact, kent_face plan,
                           double depth, double pressure)
{
    const double width = contact.width + depth, height = contact.height + depth;
    const double longer = fmax(contact.width, contact.height);
    const double shape = 1.0 + 2.0 * fmin(contact.width, contact.height) / longer;
    const double outside = plan.width * plan.height - width * height;

    if (width >= plan.width || height >= plan.height) return 0.0;
    return pressure * outside /
           (fmin(shape, 2.0) * kent_concrete_sheared(KENT_ACI_318, strength) * 2.0 *
            (width + height) * depth);
}

kent_plain_use kent_concrete_footing(kent_concrete_code code, double strength,
                                     kent_face contact, kent_face plan,
                                     double thickness, double load)
{
    const double pressure = load / (plan.width * plan.height);
    const double out = overhang(contact, plan);
    const double pulled = kent_concrete_pulled(code, strength);
    const double sheared = kent_concrete_sheared(code, strength);
    const double depth = thickness - ACI_ROUGH;

    switch (code) {
    case KENT_EN_1992:
        return (kent_plain_use){
            .bending = sqrt(3.0 * pressure / pulled) * out / (EN_FOOTING * thickness),
            .shear = pressure * out / (sheared * thickness),
            .punching = NAN,
        };
    case KENT_ACI_318:
        break;
    }
    if (depth <= 0.0) return (kent_plain_use){INFINITY, INFINITY, INFINITY};
    return (kent_plain_use){
        .bending = 3.0 * pressure * out * out / (pulled * depth * depth),
        .shear = pressure * fmax(0.0, out - depth) / (sheared * depth),
        .punching = aci_punching(strength, contact, plan, depth, pressure),
    };
}

bool kent_concrete_carries(const kent_plain_use *use)
{
    return use->bending <= 1.0 && use->shear <= 1.0 && !(use->punching > 1.0);
}

/* ---- age ------------------------------------------------------------------------- */

static const double DAY = 86400.0;    /* s */
static const double LEAST = 3.0;      /* days: neither rule reaches further back */
static const double WHOLE = 28.0;     /* days */
static const double DAY_SLACK = 1e-9; /* of a day, forgiven when rounding up */

/* s of EN 1992-1-1, 3.1.2(6). */
static double en_pace(kent_cement cement)
{
    switch (cement) {
    case KENT_CEMENT_RAPID:
        return 0.20;
    case KENT_CEMENT_NORMAL:
        return 0.25;
    case KENT_CEMENT_SLOW:
        break;
    }
    return 0.38;
}

/* a and b of ACI 209R-92, moist cured: type I, type III. It knows no slow cement. */
kent_pace kent_concrete_pace(kent_concrete_code code, kent_cement cement)
{
    const bool rapid = cement == KENT_CEMENT_RAPID;
    return (kent_pace){
        .hyperbola = code == KENT_ACI_318 && cement != KENT_CEMENT_SLOW,
        .s = en_pace(cement),
        .a = rapid ? 2.3 : 4.0,
        .b = rapid ? 0.92 : 0.85,
    };
}

double kent_concrete_strength_at(kent_concrete_code code, kent_cement cement,
                                 double strength, double age)
{
    const kent_pace pace = kent_concrete_pace(code, cement);
    const double over = code == KENT_EN_1992 ? EN_MEAN_OVER : 0.0;
    const double days = age / DAY;

    if (days >= WHOLE) return strength;
    if (pace.hyperbola) return fmin(1.0, days / (pace.a + pace.b * days)) * strength;
    const double gained = exp(pace.s * (1.0 - sqrt(WHOLE / days)));
    return fmax(0.0, gained * (strength + over) - over);
}

double kent_concrete_age(kent_concrete_code code, kent_cement cement, double strength,
                         double wanted)
{
    const kent_pace pace = kent_concrete_pace(code, cement);
    const double over = code == KENT_EN_1992 ? EN_MEAN_OVER : 0.0;
    const double share = (wanted + over) / (strength + over);
    const double root = 1.0 - log(fmin(share, 1.0)) / pace.s;
    const double days = pace.hyperbola ? pace.a * share / (1.0 - pace.b * share)
                                       : WHOLE / (root * root);

    if (!(share <= 1.0 + DAY_SLACK)) return NAN;
    return DAY * fmax(LEAST, ceil(fmin(WHOLE, days) - DAY_SLACK));
}
