/* Restrained lengths of a fitting's legs, and how far each may run. */
#ifndef KENT_LEG_INTERNAL_H
#define KENT_LEG_INTERNAL_H

#include "kent_restraint.h"
#include "kent_along.h"

/* Where fittings stand along spans: by span, then chainage, then fitting. */
typedef struct kent_standing {
    int span, fitting;
    double chainage; /* m */
} kent_standing;

typedef struct kent_standings {
    kent_standing *at; /* [count] */
    size_t count;
} kent_standings;

kent_status kent_standings_find(const kent_model *m, kent_standings *out,
                                kent_error *err);
void kent_standings_clear(kent_standings *s);

/* Which keys are missing for a length; several may be. */
typedef enum kent_lack {
    KENT_LACK_UNIT_WEIGHT = 1,
    KENT_LACK_FRICTION_ANGLE = 2,
    KENT_LACK_COHESION = 4,
    KENT_LACK_FRICTION_RATIO = 8,
    KENT_LACK_ADHESION_RATIO = 16,
    KENT_LACK_PASSIVE_RATIO = 32,
    KENT_LACK_COVER = 64,
    KENT_LACK_PIPE_MASS = 128,
    KENT_LACK_SOIL = 256,      /* not stated, or cannot be relied on */
    KENT_LACK_PIPE = 512,      /* the leg is no pipe of the network */
    KENT_LACK_GRIP = 1024,     /* the values given make no friction at all */
    KENT_LACK_SOUND = 2048,    /* from somewhere on, no ground along the leg counts */
    KENT_LACK_OLD_MAIN = 8192, /* a sleeve on a main whose joints slip */
    KENT_LACK_PIECES = 4096    /* more changes of ground than KENT_LEG_PIECES */
} kent_lack;

enum { KENT_LEG_PIECES = 8 }; /* most stretches of different ground along one leg */

/* Why the ground of a piece holds nothing. */
typedef enum kent_free {
    KENT_FREE_NOT,
    KENT_FREE_SOIL,   /* native ground that can't be relied on */
    KENT_FREE_FILL,   /* backfill that can't be */
    KENT_FREE_CASING, /* the pipe runs in a casing */
    KENT_FREE_ABOVE   /* or above ground, on supports */
} kent_free;

/* A leg's stretch in one kind of ground: to the edge of a zone, or to its end. */
typedef struct kent_leg_piece {
    const kent_soil *soil; /* native, which bears; NULL: not stated, nor needed */
    const kent_soil *fill; /* that rubs on the pipe; the same where none is stated */
    const kent_pipe *pipe;
    int pipe_index;
    double pipe_weight; /* N/m, before the water displaced is taken off */
    int trench_kind;    /* -1: not stated */
    kent_free free;
    bool counts; /* false: passed through, it holds nothing */
    int weakest; /* point whose ground this is, the least along; -1: none of them */
    kent_trench trench; /* in the fill: friction */
    kent_trench side;   /* in the native soil: bearing */
    kent_soil_grip grip;
    double rise;              /* m per metre along the leg, + uphill */
    double slope_load;        /* N/m, factored, that the slope asks for */
    double displaced;         /* N/m, 0 above the water table */
    double friction, bearing; /* N/m, as used */
    double resistance;        /* N/m, of both, less slope_load */
    double length;            /* m */
} kent_leg_piece;

/* Everything that gives one leg's length, kept for the hand calculation. */
typedef struct kent_leg_work {
    const kent_pipe *pipe; /* that it begins with */
    double sleeve;         /* factor on friction: 1 for a bare pipe */
    bool bend;             /* half the perimeter; else the whole */
    bool bears;            /* half the passive resistance counts */
    bool turns_back;       /* a bend beyond a right angle: each leg by friction alone */
    bool side_alone;       /* the whole bearing and no friction: of a tee's run */
    double force;          /* N, pressure x area of a bend's leg, or the whole thrust */
    double angle;          /* rad */
    double factor;
    double run[2], run_bearing[2]; /* m, N: of a tee's run, restrained and credited */
    double credit;                 /* N, of them */
    bool run_unknown;              /* no credit could be worked out for a run stated */
    double demand; /* N, that friction and bearing along the leg must make up */
    double limit;  /* m at which the leg ends, its demand made up or not */
    kent_length_form form;
    kent_leg_piece piece[KENT_LEG_PIECES];
    size_t piece_count;
    double own; /* m of it in the ground of the fitting itself; INFINITY: all of it */
    const kent_soil *lacking; /* whose values are missing; NULL */
    double length;            /* m, of all pieces */
    double gives;             /* N, of all pieces */
    double by_form[2];        /* m, by kent_length_form; NAN: that form has none */
} kent_leg_work;

/* Ground, pipe and slope at a place along a leg. */
typedef struct kent_leg_place {
    kent_ground_here ground;
    int pipe;
    double rise; /* m per metre of pipe, + uphill */
} kent_leg_place;

/* A piece there, without its length. Returns 0, or what is missing. */
unsigned kent_piece_fill(const kent_model *m, const kent_leg_place *place,
                         kent_leg_work *w, kent_leg_piece *out);
/* Ground that holds less takes the piece's place; point: whose it is, -1. */
unsigned kent_piece_weaken(const kent_model *m, const kent_leg_place *place, int point,
                           kent_leg_work *w, kent_leg_piece *piece);

/* How the legs of a fitting are restrained. */
typedef struct kent_leg_rule {
    size_t first, count; /* ports that are legs; count is an upper bound */
    const char *says;    /* where, as the end of a sentence */
    kent_fitting_type type;
    bool bend;
    bool either; /* one leg alone is enough */
} kent_leg_rule;

/* By its type; a reducer that also turns pulls on both legs, as a bend does, and where
 * legs can be shut (9.16) each pulls in its turn. */
const kent_leg_rule *kent_leg_rule_of(const kent_model *m, const kent_fitting *fitting);

/* Whether fitting and thrust (N) let the passive resistance of the trench side count.
 */
bool kent_leg_bears(const kent_fitting *fitting, kent_vec3 thrust);

/* One leg under a thrust (N). Returns 0, or the keys that are missing as a sum of
 * kent_lack: then no length is given. */
unsigned kent_leg_prepare(const kent_model *m, const kent_standings *standings,
                          size_t index, size_t port, kent_vec3 thrust, double factor,
                          kent_leg_work *out);

/* Fills what follows from the demand (N): pieces and length, by the form of the rules
 * and beside it by the other. Returns 0, or what is missing. */
unsigned kent_leg_measure(const kent_model *m, const kent_fitting *fitting,
                          const kent_port *port, kent_leg_work *w);

/* N that the ground gives over the first `length` (m) of a leg as it was worked out;
 * NAN: not known. */
double kent_leg_gives(const kent_model *m, const kent_fitting *fitting,
                      const kent_leg *leg, double length);
/* Its demand over what the ground gives along all of it that is restrained, at most 1;
 * 1 where it ends otherwise than in plain pipe, or is nil. */
double kent_leg_use(const kent_model *m, const kent_fitting *fitting,
                    const kent_leg *leg);

/* ---- how far it may run ---------------------------------------------------------- */

enum { KENT_LEG_RUNS = 8, KENT_LEG_PASSED = 8 };

typedef struct kent_leg_run { /* along one pipe */
    int pipe;
    double from, to; /* m from the pipe's start, from < to */
} kent_leg_run;

/* Where a leg of some length leads. */
typedef struct kent_leg_walk {
    kent_leg_end end;
    int point;    /* at which it ends; -1: in plain pipe */
    int fitting;  /* that ends it; -1 */
    double reach; /* m up to there */
    kent_leg_run run[KENT_LEG_RUNS];
    size_t run_count;
    int passed[KENT_LEG_PASSED]; /* bends and tees that it runs through */
    size_t passed_count;
} kent_leg_walk;

/* own: m of it in the ground of the fitting itself. */
kent_leg_walk kent_leg_walk_of(const kent_model *m, const kent_standings *standings,
                               size_t fitting, const kent_port *port, double length,
                               double own);

/* Whether it may end like that. */
bool kent_leg_end_fits(kent_leg_end end);

/* Pipes and m of a leg as walked, where it ends in plain pipe rounded up to whole ones
 * of the last pipe. Returns 0 where some pipe length is not known. */
int kent_leg_whole(const kent_model *m, const kent_leg_walk *walk, double *length);

/* A worked-out leg in whole pipes, and where it leads. */
kent_leg_walk kent_leg_lay(const kent_model *m, const kent_standings *standings,
                           size_t fitting, size_t port, const kent_leg_work *work,
                           kent_leg *leg);

/* Where ground that counts begins along a pipe. */
typedef struct kent_sound {
    double distance;       /* m, or to the end of the pipe where there is none */
    const kent_soil *soil; /* NULL: none to the end of the pipe */
    int point;             /* where it begins; -1: at the edge of a zone */
} kent_sound;

/* The nearest, along the port's pipe, going out of the fitting. */
kent_sound kent_leg_sound(const kent_model *m, const kent_port *port);

/* N per m of empty pipe; NAN: not known. source 11.1 */
double kent_leg_pipe_weight(const kent_pipe *p, double gravity);

/* Fills the pieces of a leg from its demand, first in the ground of the fitting, then
 * in that of the zones its pipe passes, each as weak as the weakest ground along it.
 * Returns 0, or what is missing. */
unsigned kent_leg_pieces(const kent_model *m, const kent_fitting *fitting,
                         const kent_port *port, kent_leg_work *w);

/* m: the next edge of a zone along a pipe from a chainage, one way; INFINITY (ahead) or
 * -INFINITY (back): none. */
double kent_zone_edge(const kent_model *m, int pipe, double from, bool ahead);

/* The soil of a point: its own or the ground's; NULL: not stated. */
const kent_soil *kent_point_soil(const kent_model *m, int point);
bool kent_soil_counts(const kent_soil *soil); /* stated, reliable, some bearing */
bool kent_fill_counts(const kent_soil *soil); /* placed and reliable */

#endif
