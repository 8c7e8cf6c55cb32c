/* One block from numbers alone: what it must hold, where it stands, what came out. */
#ifndef KENT_BLOCK_INTERNAL_H
#define KENT_BLOCK_INTERNAL_H

#include "kent_restraint.h"

/* A part of the thrust below this share of the whole is left to the ground's friction
 * and the block's own weight. */
#define KENT_BLOCK_NEGLIGIBLE 0.02

/* What the concrete of a block is made for. */
typedef struct kent_poured {
    double strength;          /* Pa, stated or assumed */
    kent_face contact;        /* what the fitting presses on; NAN: not known */
    double load[KENT_SENSES]; /* N, design loads of the code; 0: negligible */
    double test[KENT_SENSES]; /* the same of the site test, or without one of all */
} kent_poured;

typedef struct kent_site { /* what a block stands in; m, Pa */
    double diameter;       /* outside, of the largest pipe */
    double cover;          /* ground to crown; NAN: not stated */
    double water_table;    /* below ground; INFINITY: none */
    double allowable;      /* on a face at this depth; NAN: not known, as gap says */
    double vertical;       /* under a base; NAN: not stated */
    double hole;           /* m2 of a face that the pipe passes through; 0: none */
    bool all_round;        /* a face on every side: it is pushed to all of them */
    double falls;          /* rad, that the ground falls along the thrust; 0 */
    bool low; /* a gravity block here keeps as low as a face must, to be one itself */
    const kent_soil *soil;  /* NULL: not stated */
    const kent_soil *fill;  /* between face and ground; NULL: the face meets ground */
    const kent_soil *leans; /* whichever of them is weaker: what allowable is of */
    kent_bearing_gap gap;
    kent_poured concrete;
} kent_site;

/* Factored loads by sense, N; parts that are negligible are 0. */
typedef struct kent_demand {
    double load[KENT_SENSES];
} kent_demand;

typedef enum kent_fault {
    KENT_FAULT_NONE,
    KENT_FAULT_COVER_UNSTATED,
    KENT_FAULT_SHALLOW,   /* less cover than the rules' least */
    KENT_FAULT_BEARING,   /* the soil's bearing is not known at this depth */
    KENT_FAULT_FACE,      /* no face of the asked area at this depth */
    KENT_FAULT_OBSTACLE,  /* something stands in the ground that the face leans on */
    KENT_FAULT_CONCRETE,  /* the fitting would crush it on the contact that is stated */
    KENT_FAULT_VOLUME,    /* larger than the rules let be sized */
    KENT_FAULT_VERTICAL,  /* a base, and no bearing under one */
    KENT_FAULT_STABILITY, /* it slides, overturns, floats or presses too hard, up to the
                             largest that may be sized */
    KENT_FAULT_SOIL_UNSTATED,
    KENT_FAULT_ABOVE_GROUND, /* no soil is there to bear */
    KENT_FAULT_CASING,       /* nor is there in a casing */
    KENT_FAULT_SLOPE, /* the ground before the face falls more than the rules allow */
    KENT_FAULT_FILL,  /* fill before the face that is not stated, or bears nothing */
    KENT_FAULT_OTHER_WAY, /* a push that its face does not bear */
    KENT_FAULT_SHARE, /* of block and joints, which part is the block's is not stated */
    KENT_FAULT_SOIL   /* peat, fill: nothing may count on it */
} kent_fault;

kent_block kent_block_none(void); /* nothing: NAN, and no concrete */

double kent_site_axis(const kent_site *site); /* m below ground */

/* m: the least cover that the rules want over a pipe of a diameter (m). */
double kent_rules_cover(const kent_rules *rules, double diameter);

/* m: the least height of a face behind such a pipe. */
double kent_rules_height(const kent_rules *rules, double diameter);

/* Where a face centred on the pipe stands. */
kent_bearing_place kent_site_place(const kent_site *site, const kent_rules *rules);

/* Works out allowable, vertical, leans and gap from the site's soils and depth. */
void kent_site_bear(kent_site *site, const kent_rules *rules);

/* N/m3 of concrete whose base lies at depth (m): buoyed where any of it is under water.
 */
double kent_site_concrete(const kent_site *site, const kent_rules *rules, double depth);

/* m: thickness behind a face, or under a base, of that side: within 45 degrees, or as
 * the rules let plain concrete bend and shear. source 10.7, 19.11 */
double kent_site_thickness(const kent_rules *rules, const kent_site *site,
                           kent_face side, kent_sense sense);

/* m: height that a gravity block may have: it would reach the ground's surface, or of a
 * low one, be too tall for a face; NAN: no cover stated. */
double kent_gravity_most(const kent_rules *rules, const kent_site *site);

/* m: side that a gravity block of a volume (m3) needs to be no taller than that; 0
 * where no cover is stated. source 10.14 */
double kent_gravity_shallow(const kent_rules *rules, const kent_site *site,
                            double volume);

/* m: least height of a block here. source 10.34 */
double kent_block_least_height(const kent_rules *rules, const kent_site *site);

/* N: soil that counts above a gravity block of a plan (m2) and height (m); 0 where the
 * rules, or what is known of the soil, count none. source 20.4 */
double kent_gravity_prism(const kent_rules *rules, const kent_site *site, double plan,
                          double height);

/* A gravity block for what lifts, and presses, it; the next larger one. source 10.13 ..
 * 10.15, 20.14 */
void kent_gravity_size(const kent_rules *rules, const kent_site *site,
                       const kent_demand *demand, kent_block *out);
void kent_gravity_widen(const kent_rules *rules, const kent_site *site,
                        const kent_demand *demand, bool flatter, kent_block *b);

/* Whether those rules ask for soil above, and all of it is known here. */
bool kent_gravity_under_soil(const kent_rules *rules, const kent_site *site);

/* What would let a face bear sideways (N) here: the least cover (m; NAN: none within
 * reach), and the least allowable bearing (Pa; NAN: no face fits at all). */
double kent_face_cover_needed(const kent_rules *rules, const kent_site *site,
                              double sideways);
double kent_face_bearing_needed(const kent_rules *rules, const kent_site *site,
                                double sideways);

/* Sizes a block for every part of the demand. On a fault *out holds what was worked
 * out. */
kent_fault kent_block_size(const kent_rules *rules, const kent_site *site,
                           const kent_demand *demand, kent_block *out);

/* The next larger block of the same kind: a gravity block's side (flatter: no heavier
 * than it must be), both sides of a base, the thickness of a bearing block. Returns
 * false, and leaves it, where that is larger than the rules let be sized. */
bool kent_block_widen(const kent_rules *rules, const kent_site *site,
                      const kent_demand *demand, bool flatter, kent_block *block);

/* Factored load over resistance of each sense the block holds; 0 for the others. */
void kent_block_use(const kent_block *block, const kent_rules *rules,
                    const kent_site *site, const kent_demand *demand,
                    double use[KENT_SENSES]);

/* Makes the side of a gravity block its face, if that serves: in ground that bears, no
 * taller than a face may be, wide enough, and of bearing_area where that is known.
 * Leaves *out where not. source docs/theory/20-stability.md, 20.15 */
bool kent_block_side_bears(const kent_rules *rules, const kent_site *site,
                           kent_block *out);

#endif
