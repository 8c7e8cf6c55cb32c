/* Inside report/ only: one value as a person reads it. Every function writes a
 * NUL-terminated text of at most KENT_SHOWN bytes; a value that is not there (NAN) is
 * shown as a dash. */
#ifndef KENT_SHOWN_H
#define KENT_SHOWN_H

#include "kent_job.h"

enum { KENT_SHOWN = 160 };

typedef struct kent_shown {
    char text[KENT_SHOWN];
} kent_shown;

#define KENT_SHOWN_NONE "–"

/* Which part of a thrust: "whole", "sideways", "upward", "downward". */
const char *kent_shown_sense(kent_sense sense);

/* With so many decimals, never "-0.0"; infinity is a dash too. */
kent_shown kent_shown_number(double value, int decimals);

/* SI value in the display unit of its kind, with the kind's decimals, without the unit;
 * kent_shown_with_unit adds it ("12.10 bar"). */
kent_shown kent_shown_quantity(kent_kind kind, kent_system system, double si);
kent_shown kent_shown_with_unit(kent_kind kind, kent_system system, double si);

/* "bar", "m³", "°C": the display unit with raised digits. */
kent_shown kent_shown_unit(kent_kind kind, kent_system system);

/* "0+640" (km+m) in SI, "12+34.5" (hundreds of feet + feet) in US. m. */
kent_shown kent_shown_station(kent_system system, double station);

/* How much room there is: each step says the same in fewer columns, until the instant
 * of a load case goes, and at last the word "bend" where a bend says how it turns. */
typedef enum kent_room { KENT_ROOMY, KENT_TIGHT, KENT_TIGHTEST, KENT_BRIEF } kent_room;

/* Clock direction of a horizontal thrust, rad clockwise from north: "280°" in SI, the
 * quadrant "S 23° E" in US. */
kent_shown kent_shown_azimuth(kent_system system, double azimuth, kent_room room);

/* Where a thrust points: its azimuth, and its vertical part with an arrow where that is
 * at least a tenth of it. A schematic fitting has no azimuth: words relative to its
 * pipe stand there ("outward": away from the inside of the bend). */
kent_shown kent_shown_push(const kent_model *m, const kent_fitting *fitting,
                           kent_vec3 thrust, kent_system system, kent_room room);

/* "bend 22.5° crest", "tee, branch 150", "hydrant tee, branch 150", "reducer to 300",
 * "curve 12.0°", "group of 2". */
kent_shown kent_shown_fitting(const kent_model *m, const kent_fitting *fitting,
                              kent_system system, kent_room room);

/* The largest port's nominal size by its pipe's class ("600", "24"), else by that of a
 * pipe with the same outside diameter, else its bore in mm or in. */
kent_shown kent_shown_size(const kent_model *m, const kent_fitting *fitting,
                           kent_system system);

/* One thing that holds a fitting, or the statement that none does: a block has one, a
 * gravity block or base that leans on a face of its own has two, and restrained joints
 * beside a block are one more. */
typedef struct kent_part {
    kent_sense sense;
    int governing; /* its load case; -1: none */
    bool face;     /* the face beside a gravity block or base */
    bool joints;   /* restrained joints, chosen alone or beside a block */
    double factor_reached, utilisation;
} kent_part;

enum { KENT_PARTS = 3 };

/* Fills parts, of a block what governs first, and returns how many there are: 1 to 3.
 */
size_t kent_shown_parts(const kent_fitting_loads *loads, const kent_holding *holding,
                        kent_part parts[KENT_PARTS]);

/* The instant that a part is held against; NULL where nothing pushes. */
const kent_instant *kent_part_instant(const kent_fitting_loads *loads,
                                      const kent_part *part);

/* Its load case and instant: "shut-12s at 13.0 s", "test"; a dash. */
kent_shown kent_shown_governing(const kent_fitting_loads *loads, const kent_part *part,
                                kent_room room);

/* What it is: "block 2.10 × 1.10 × 0.75", "gravity 8.9 m³, 4ø16" (legs of straps and
 * their diameter, mm or in), "face 1.35 × 1.25 × 0.45", "joints 24.0 m", "none: peat".
 */
kent_shown kent_shown_part(const kent_model *m, const kent_fitting *fitting,
                           const kent_holding *holding, const kent_part *part,
                           kent_system system, kent_room room);

/* A block, without a face of its own: "block 2.10 × 1.10 × 0.75", "gravity 8.9 m³". */
kent_shown kent_shown_block(const kent_block *b, kent_system system, kent_room room);

/* Legs and diameter of straps or rods, mm or in: "4ø16"; a dash where none are sized.
 */
kent_shown kent_shown_straps(const kent_straps *straps, kent_system system);

/* Adds "friction = 0.1 mm: why" for a model's "friction\t0.1 mm\twhy". */
void kent_shown_assumption(const char *note, kent_text *out);

/* Whether a fitting was to be held and is not. */
bool kent_shown_not_held(const kent_holding *holding);

/* The instant that governs a fitting; NULL where nothing does. */
const kent_instant *kent_shown_instant(const kent_fitting_loads *loads,
                                       const kent_holding *holding);

#endif
