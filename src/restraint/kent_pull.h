/* Pull along pipes: of fused and welded strings at their ends, in the wall of pipes
 * behind restrained joints, and down steep ground. */
#ifndef KENT_PULL_H
#define KENT_PULL_H

#include "kent_derivation.h"
#include "kent_string.h"

/* ---- plain functions; forces N, positive where they pull the end into the string --
 */

/* Of a wall that is kept from shortening: pressure Pa, poisson -, inside the bore of
 * the wall itself, m. source docs/theory/23-pull.md, 23.1 */
double kent_pull_of_pressure(double pressure, double poisson, double inside);
/* The same as handbooks have it, by the mean diameter. source 23.2 */
double kent_pull_of_pressure_mean(double pressure, double poisson, double outside,
                                  double wall);
/* Of pressure on the end of the wall within a joint that seals outside. source 23.3 */
double kent_pull_of_end_face(double pressure, double outside, double inside);
/* Of cooling by some K: modulus Pa, expansion 1/K, area m2 of wall. source 23.4 */
double kent_pull_of_cooling(double modulus, double expansion, double cooling,
                            double area);
/* m from the end over which friction (N/m) takes up a pull. source 23.6 */
double kent_pull_development(double pull, double friction);
/* m by which an end that nothing holds moves into a string of a length (m) that is free
 * at both ends: beyond twice the development it no longer counts. stiffness N: modulus
 * x area. source 23.7, 23.8 */
double kent_pull_movement(double pull, double friction, double stiffness,
                          double length);

/* ---- ends of strings ------------------------------------------------------------- */

typedef enum kent_pull_holder {
    KENT_PULL_NOTHING, /* that the case tells of */
    KENT_PULL_WALL,    /* a structure, which must be made for it */
    KENT_PULL_ANCHOR,  /* an anchor block of the case, which must be made for it */
    KENT_PULL_JOINTS,  /* restrained joints beyond, over what is needed or more */
    KENT_PULL_ITSELF   /* a closed end: the string carries its thrust */
} kent_pull_holder;

typedef struct kent_pull_end {
    size_t end;       /* into kent_loads_result.strings.ends */
    bool known;       /* false: a value is missing, cautions say which */
    size_t governing; /* into the end's cases: greatest factored pull */
    double modulus;   /* Pa, of the cooling: lasting or short by the case */
    double wall_area; /* m2 */
    double of_pressure, of_end_face, of_cooling, pull; /* N, before any factor */
    double
        of_string; /* N of it, that other pipes of the string add to the last one's */
    double of_pressure_mean; /* N, the handbooks' */
    double factored;         /* N: what an anchor takes */
    double friction;         /* N/m, of the ground along the string, mean; NAN: none */
    double development;      /* m; NAN */
    double movement; /* m, of an end that nothing holds, the most of all cases; NAN */
    size_t moves;    /* the case of that, */
    double moving_pull, moving_modulus; /* N, Pa in it */
    int moving_pipe;      /* of the string, which moves it most in that case, */
    double moving_area;   /* m2 of its wall */
    bool bounded;         /* the string is longer than twice the development */
    double beyond_length; /* m of the pipe beyond to be restrained; NAN */
    int beyond_pipes;     /* whole ones; 0: no pipe length known */
    kent_pull_holder holder;
    kent_notes cautions;
    kent_derivation derivation;
} kent_pull_end;

/* ---- pipes behind restrained joints ---------------------------------------------- */

typedef struct kent_pull_leg {
    size_t fitting, port;
    double pull;   /* N, of the governing case, before any factor */
    double stress; /* Pa in the wall; NAN: no wall known */
} kent_pull_leg;

/* ---- steep mains ----------------------------------------------------------------- */

typedef struct kent_steep {
    int pipe;
    double start, end;   /* m, chainage of the pipe */
    double from, to;     /* m, stations */
    double slope;        /* rise over run, the steepest on it; positive: it rises */
    double angle;        /* rad, of that */
    double weight;       /* N/m, of pipe and water */
    double along;        /* N/m, its part down the slope */
    double friction;     /* N/m that the ground gives; NAN: not known; 0: above it */
    double net;          /* N/m, along times the factor less friction, >= 0; NAN */
    double factor;       /* asked for */
    double spacing;      /* m between anchors; NAN where joints hold: it hangs */
    int pipes, anchors;  /* between two; in all. 0: not known, none */
    double anchor_force; /* N, factored, no friction counted */
    double hangs;        /* N at the upper end, factored, of joints that hold; NAN */
    kent_notes cautions;
    kent_derivation derivation;
} kent_steep;

typedef struct kent_pulls {
    kent_pull_end *ends; /* [end_count] */
    size_t end_count;
    kent_pull_leg *legs; /* [leg_count] by fitting and port */
    size_t leg_count;
    kent_steep *steeps; /* [steep_count] by pipe and station */
    size_t steep_count;
} kent_pulls;

const char *kent_pull_holder_word(kent_pull_holder holder);

#endif
