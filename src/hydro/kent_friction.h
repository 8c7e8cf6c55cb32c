/* Friction of steady flow in a full pipe, always handed over as a Darcy factor. */
#ifndef KENT_FRICTION_H
#define KENT_FRICTION_H

typedef enum kent_friction_law {
    KENT_FRICTIONLESS,
    KENT_COLEBROOK_WHITE, /* coefficient: roughness, m */
    KENT_HAZEN_WILLIAMS,  /* coefficient: C */
    KENT_MANNING,         /* coefficient: n, s/m^(1/3) */
    KENT_DARCY_FIXED      /* coefficient: f */
} kent_friction_law;

typedef struct kent_friction {
    kent_friction_law law;
    double coefficient;
    double bore;                /* m */
    double kinematic_viscosity; /* m2/s */
    double gravity;             /* m/s2 */
} kent_friction;

/* Darcy factor from Reynolds number and relative roughness: 64/Re to 2000, a straight
 * line in Re to 4000, Colebrook-White above, solved to 1e-12. Re below 1 counts as 1.
 */
double kent_colebrook(double reynolds, double relative_roughness);

/* Explicit approximation by Swamee and Jain (1976), for comparison. */
double kent_swamee_jain(double reynolds, double relative_roughness);

/* Darcy factor at a speed (m/s, either sign). Never below the laminar 64/Re, so that
 * the loss has the laminar slope at rest whatever the law; 0 for KENT_FRICTIONLESS.
 * At rest it is that of Re 1e-9: large, and finite.
 * Uses no libm but sqrt (kent_log, kent_pow), so that marching gives the same bits
 * everywhere. */
double kent_friction_factor(const kent_friction *friction, double speed);

/* Head loss per metre (m/m, sign of the flow) and its derivative with respect to flow
 * (s/m3 per m), at a flow in m3/s. */
double kent_friction_slope(const kent_friction *friction, double flow,
                           double *derivative);

#endif
