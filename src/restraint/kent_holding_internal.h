/* One fitting on its way from load cases to what holds it. */
#ifndef KENT_HOLDING_INTERNAL_H
#define KENT_HOLDING_INTERNAL_H

#include "kent_block_internal.h"
#include "kent_leg_internal.h"

/* N: a smaller thrust, unfactored, needs no holding. Common practice, no source: the
 * weight of half a metre of small pipe. */
#define KENT_HOLDING_LEAST 500.0

typedef struct kent_couple { /* of a group's pushes, before any factor (8.15) */
    double largest;          /* N m, over all cases; NAN: no coordinates tell it */
    size_t governing;        /* whose largest it is */
    bool apart; /* in some case the line of the force runs past the fittings, or
                   there is a couple and no force */
} kent_couple;

typedef struct kent_holding_work { /* borrowed, for one fitting */
    const kent_model *m;
    const kent_fitting *fitting;
    size_t index;
    const kent_fitting_loads *loads;
    const kent_standings *standings;
    const kent_soil *soil; /* NULL: not stated */
    kent_site site;
    double factored[KENT_SENSES]; /* N, greatest over the cases */
    kent_demand demand;           /* the same without what is negligible */
    kent_fault fault;
    double use[KENT_SENSES];  /* of the block */
    unsigned lack;            /* kent_lack, over all legs */
    const kent_soil *lacking; /* whose values are missing; NULL */
    kent_vec3 pull;           /* N, the thrust that the legs are worked out for */
    double pull_factor;
    bool blocks_forbidden;         /* by the rules: joints stand in for one */
    const kent_obstacle *obstacle; /* in the wedge before the face; NULL */
    const kent_other_way *barred;  /* that nothing takes, of h's; NULL */
    bool tested;                   /* a site test is among its load cases */
    kent_couple couple;            /* nil but of a group */
    double alone;                  /* N, see kent_couple_alone */
    double side_load;              /* N/m, factored, of a curve; NAN */
    double reach;                  /* m, of that wedge at the ground's surface */
    kent_notes clear;              /* obstacles outside it; owned */
    kent_notes met;                /* what the legs meet; owned */
} kent_holding_work;

/* N, unfactored and not negative: the part of a case's thrust in one sense, without the
 * force of the changing flow. */
double kent_holding_part(const kent_load_case *c, kent_sense sense);

/* N: the same with its factor, over what soil may bear more in such cases where soil
 * bears it. source docs/theory/09-load-cases.md, 9.18 */
double kent_holding_load(const kent_load_case *c, kent_sense sense);
/* Whether all its pipes lie above ground, on supports. */
bool kent_holding_above_ground(const kent_holding_work *w);

/* Whether it stands in a casing, which keeps the ground off it. */
bool kent_holding_in_casing(const kent_holding_work *w);

void kent_holding_find(kent_holding_work *w, kent_holding *h); /* what governs */

/* Whether two cases push one way, sideways: one face bears both. */
bool kent_one_way(const kent_load_case *a, const kent_load_case *b);

/* What pushes other ways than what governs sideways, before anything is sized; what of
 * that which holds takes them, after; and saying so. */
void kent_other_ways_find(kent_holding_work *w, kent_holding *h);
void kent_other_ways_take(const kent_holding_work *w, kent_holding *h);
/* Not held, where nothing takes one of them that something must; why, for a block. */
void kent_other_ways_judge(kent_holding_work *w, kent_holding *h);
void kent_other_way_refuse(const kent_holding_work *w, const kent_holding *h,
                           kent_text *t);
void kent_other_ways_caution(const kent_holding_work *w, kent_holding *h);
/* The area taken, an end that is opened, straight pieces that pass a pull on. */
void kent_loads_caution(const kent_holding_work *w, kent_holding *h);
/* What couple the pushes of a group leave, and whether a block on it could hold it.
 * source docs/theory/10-blocks.md, 10.30 */
kent_couple kent_couple_find(const kent_model *m, const kent_fitting *group,
                             const kent_fitting_loads *loads);
/* N, factored: the largest thrust of one member by itself, of a group that is parted;
 * else 0. source docs/theory/10-blocks.md, 10.31 */
double kent_couple_alone(const kent_model *m, const kent_fitting *group,
                         const kent_fitting_loads *loads);
/* Where it stands, once what pushes it is known: the fill behind it, the fall of the
 * ground along the thrust, and what may be leant on. */
void kent_holding_site(kent_holding_work *w, kent_holding *h);
bool kent_holding_leans_both_ways(const kent_holding_work *w, const kent_holding *h);
/* What of slope or fill keeps a face from being sized. */
kent_fault kent_holding_ground_fault(const kent_holding_work *w, const kent_holding *h);
/* What the rules make of the restraint that is chosen, and which part of the thrust a
 * block is for. */
void kent_holding_policy(kent_holding_work *w, kent_holding *h);
void kent_holding_size(kent_holding_work *w, kent_holding *h);   /* what holds */
void kent_holding_routes(kent_holding_work *w, kent_holding *h); /* bearing by each */
void kent_holding_legs(kent_holding_work *w, kent_holding *h);   /* side by side */
/* Block and joints side by side, once both were looked at. */
void kent_holding_either(const kent_holding_work *w, kent_holding *h);
/* One leg of the fitting in whole pipes; what it meets goes to w's met. */
kent_leg kent_leg_of(kent_holding_work *w, size_t port, const kent_leg_work *work);
void kent_holding_refuse(kent_holding_work *w, kent_holding *h); /* what would help */
/* The wedge of ground before a block's face. */
kent_wedge kent_wedge_before(const kent_holding_work *w, const kent_block *b);
/* Whether nothing stands in the ground that h's face leans on; else sets obstacle. Says
 * by how much the others are clear. */
bool kent_obstacle_clear(kent_holding_work *w, const kent_holding *h);

void kent_holding_caution(kent_holding_work *w, kent_holding *h);
/* Of slope, fill, and how the bearing is told. */
void kent_ground_caution(const kent_holding_work *w, kent_holding *h);
/* Of what presses down on ground that falls. */
void kent_footing_caution(const kent_holding_work *w, kent_holding *h);
/* What holds for every block alike, said once; nothing where there is none. */
void kent_blocks_advise(kent_restraints *r);
void kent_holding_derive(const kent_holding_work *w, kent_holding *h);

/* Parts of the hand calculation; all add to h's derivation. */
/* Puts q. */
void kent_bearing_derive(const kent_holding_work *w, const kent_holding *h,
                         kent_derivation *d);
void kent_block_derive(const kent_holding_work *w, kent_holding *h);
void kent_curve_derive(const kent_holding_work *w, kent_holding *h);
void kent_leg_derive(const kent_holding_work *w, kent_holding *h, const kent_leg *leg);

/* "given" or "catalogue": where the values of a soil, or the factor of a case, come
 * from. */
kent_source kent_soil_source(const kent_soil *soil);
kent_source kent_factor_source(const kent_model *m, const kent_load_case *c);
const char *kent_factor_says(const kent_model *m, const kent_load_case *c);

#endif
