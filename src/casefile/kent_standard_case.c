#include "kent_standard_internal.h"

#include <assert.h>
#include <stdio.h>
#include <string.h>

/* Of the water that a case has unless it says otherwise: it only turns the table's
 * pressure into a level, and the case turns it back. */
static const double TEMPERATURE = 288.15; /* K */
static const double GRAVITY = 9.80665;    /* m/s2, told to the case */

/* Of an outside diameter, where the wall is not known: of joints whose seal is the
 * outside, nothing that is worked out goes by it. */
static const double BORE = 0.9;

/* Legs so long that no restrained length comes to their end. */
#define LEG "20 km"

#define AT       KENT_STANDARD_POINT
#define MAIN     "main"
#define ONWARD   "onward"
#define BRANCH   "branch"
#define INLET    "inlet"
#define OUTLET   "outlet"
#define SIDE_END "branch-end"

/* ---- twigs that stand in no file ------------------------------------------------- */

/* Room for `most` children in one row. */
static kent_twig *take(kent_standard_cell *c, size_t most)
{
    kent_twig *row = &c->twigs[c->used];
    assert(c->used + most <= KENT_STANDARD_TWIGS);
    c->used += most;
    return row;
}

static kent_twig text(const kent_twig *from, const char *name, const char *says)
{
    return (kent_twig){
        .type = KENT_TWIG_TEXT, .place = from->place, .name = name, .text = says};
}

static kent_twig number(const kent_twig *from, const char *name, double value)
{
    return (kent_twig){
        .type = KENT_TWIG_NUMBER, .place = from->place, .name = name, .number = value};
}

static kent_twig parent(const kent_twig *from, kent_twig_type type, const char *name,
                        const kent_twig *children, size_t count)
{
    return (kent_twig){.type = type,
                       .place = from->place,
                       .name = name,
                       .children = children,
                       .count = count};
}

static kent_twig renamed(const kent_twig *twig, const char *name)
{
    kent_twig other = *twig;
    other.name = name;
    return other;
}

/* ---- the parts of a case --------------------------------------------------------- */

/* Legs of the main beyond the fitting: 0 of a dead end. */
static bool goes_on(const kent_standard_cell *c)
{
    return c->fitting.type != KENT_DEAD_END;
}

static bool branches(const kent_standard_cell *c)
{
    return c->fitting.type == KENT_TEE || c->fitting.type == KENT_WYE;
}

static kent_twig point_of(kent_standard_cell *c, const char *id)
{
    kent_twig *row = take(c, 2);
    row[0] = text(c->root, "id", id);
    row[1] = text(c->root, "z", "0 m");
    return parent(c->root, KENT_TWIG_GROUP, "", row, 2);
}

static kent_twig points_of(kent_standard_cell *c)
{
    kent_twig *row = take(c, 4);
    size_t count = 0;
    row[count++] = point_of(c, INLET);
    row[count++] = point_of(c, AT);
    if (goes_on(c)) row[count++] = point_of(c, OUTLET);
    if (branches(c)) row[count++] = point_of(c, SIDE_END);
    return parent(c->root, KENT_TWIG_LIST, "points", row, count);
}

/* What a size need not say: nothing flows and no wave runs. Without a wall nothing of
 * the pipe but its outside is known, so that it has no weight and no restrained length.
 */
static size_t fill_unsaid(kent_standard_cell *c, kent_twig *row)
{
    const kent_twig *size = c->size;
    const bool known = kent_twig_type_of(size) != KENT_TWIG_GROUP ||
                       kent_twig_member(size, "pipe_class") ||
                       kent_twig_member(size, "wall_thickness");
    size_t count = 0;
    row[count++] = text(size, "wave_speed", "1000 m/s");
    row[count++] = number(size, "friction_factor", 0.02);
    if (!known) row[count++] = text(size, "inside_diameter", c->bore);
    return count;
}

/* A pipe of the cell's size between two points. */
static kent_twig pipe_of(kent_standard_cell *c, const char *id, const char *from,
                         const char *to)
{
    const kent_twig *size = c->size;
    const kent_twig *joint = kent_twig_member(c->root, "joint");
    const bool group = kent_twig_type_of(size) == KENT_TWIG_GROUP;
    const size_t said = kent_twig_count(size);
    kent_twig *way = take(c, 2);
    kent_twig *row = take(c, said + 8);
    size_t count = 0;
    way[0] = text(size, "", from);
    way[1] = text(size, "", to);
    row[count++] = text(size, "id", id);
    row[count++] = parent(size, KENT_TWIG_LIST, "route", way, 2);
    row[count++] = text(size, "length", LEG);
    if (joint) row[count++] = *joint;
    if (!group) row[count++] = renamed(size, "pipe_class");
    for (size_t i = 0; i < said; i++) {
        const kent_twig *one = kent_twig_child(size, i);
        if (strcmp(kent_twig_name(one), "name") != 0) row[count++] = *one;
    }
    count += fill_unsaid(c, &row[count]);
    return parent(size, KENT_TWIG_GROUP, "", row, count);
}

static kent_twig pipes_of(kent_standard_cell *c)
{
    kent_twig *row = take(c, 3);
    size_t count = 0;
    row[count++] = pipe_of(c, MAIN, INLET, AT);
    if (goes_on(c)) row[count++] = pipe_of(c, ONWARD, AT, OUTLET);
    if (branches(c)) row[count++] = pipe_of(c, BRANCH, AT, SIDE_END);
    return parent(c->root, KENT_TWIG_LIST, "pipes", row, count);
}

static kent_twig level_of(kent_standard_cell *c, const char *at)
{
    kent_twig *row = take(c, 2);
    row[0] = text(c->root, "at", at);
    row[1] = text(c->root, "level", c->level);
    return parent(c->root, KENT_TWIG_GROUP, "", row, 2);
}

/* The water stands still: every end has the level that the pressure comes to. */
static kent_twig levels_of(kent_standard_cell *c)
{
    kent_twig *row = take(c, 3);
    size_t count = 0;
    row[count++] = level_of(c, INLET);
    if (goes_on(c)) row[count++] = level_of(c, OUTLET);
    if (branches(c)) row[count++] = level_of(c, SIDE_END);
    return parent(c->root, KENT_TWIG_LIST, "fixed_levels", row, count);
}

static kent_twig valves_of(kent_standard_cell *c)
{
    kent_twig *row = take(c, 5), *list = take(c, 1);
    row[0] = text(c->root, "id", "line-valve");
    row[1] = text(c->root, "at", AT);
    row[2] = text(c->root, "size", c->bore);
    row[3] = text(c->root, "type", "linear");
    row[4] = number(c->root, "loss", 0.2);
    list[0] = parent(c->root, KENT_TWIG_GROUP, "", row, 5);
    return parent(c->root, KENT_TWIG_LIST, "valves", list, 1);
}

/* Copies what the table says under a key, if anything. */
static size_t fill_as_said(const kent_standard_cell *c, const char *key, kent_twig *to)
{
    const kent_twig *said = kent_twig_member(c->root, key);
    if (!said) return 0;
    *to = *said;
    return 1;
}

static kent_twig ground_of(kent_standard_cell *c)
{
    static const char *const KEYS[] = {"cover", "water_table", "trench", "wrapped"};
    const size_t keys = sizeof KEYS / sizeof KEYS[0];
    kent_twig *row = take(c, keys + 1);
    size_t count = 0;
    row[count++] = text(c->soil, "soil", c->soil_id);
    for (size_t i = 0; i < keys; i++) {
        count += fill_as_said(c, KEYS[i], &row[count]);
    }
    return parent(c->root, KENT_TWIG_GROUP, "ground", row, count);
}

/* A restraint is named only where joints are wanted alone: a block is the usual one. */
static kent_twig fittings_of(kent_standard_cell *c)
{
    kent_twig *row = take(c, 4), *list = take(c, 1);
    size_t count = 0;
    row[count++] = text(c->root, "at", AT);
    if (c->fitting.angle) row[count++] = text(c->root, "angle", c->fitting.angle);
    if (c->fitting.orientation) {
        row[count++] = text(c->root, "orientation", c->fitting.orientation);
    }
    if (c->what == KENT_STANDARD_JOINTS) {
        row[count++] = text(c->root, "restraint", "restrained-joints");
    }
    list[0] = parent(c->root, KENT_TWIG_GROUP, "", row, count);
    return parent(c->root, KENT_TWIG_LIST, "fittings", list, 1);
}

static kent_twig loads_of(kent_standard_cell *c)
{
    kent_twig *row = take(c, 3);
    size_t count = 0;
    row[count++] = text(c->root, "static_level", c->level);
    count += fill_as_said(c, "safety_factor", &row[count]);
    count += fill_as_said(c, "thrust_area", &row[count]);
    return parent(c->root, KENT_TWIG_GROUP, "loads", row, count);
}

static kent_twig site_of(kent_standard_cell *c)
{
    kent_twig *row = take(c, 2);
    row[0] = text(c->root, "altitude", "0 m"); /* nothing boils here */
    row[1] = text(c->root, "gravity", "9.80665 m/s^2");
    return parent(c->root, KENT_TWIG_GROUP, "site", row, 2);
}

const kent_twig *kent_standard_case(kent_standard_cell *c)
{
    static const char *const KEYS[] = {"format",  "title",    "units",
                                       "project", "concrete", "design_rules"};
    const size_t keys = sizeof KEYS / sizeof KEYS[0];
    const double density = kent_water_at(TEMPERATURE).density;
    (void)snprintf(c->level, sizeof c->level, "%.17g m",
                   c->pressure / (density * GRAVITY));
    (void)snprintf(c->bore, sizeof c->bore, "%.17g m", BORE * c->outside);
    kent_twig *root = take(c, 1), *row = take(c, keys + 9);
    size_t count = 0;
    for (size_t i = 0; i < keys; i++) {
        count += fill_as_said(c, KEYS[i], &row[count]);
    }
    row[count++] = site_of(c);
    row[count++] = points_of(c);
    row[count++] = pipes_of(c);
    row[count++] = levels_of(c);
    if (c->fitting.type == KENT_VALVE) row[count++] = valves_of(c);
    if (kent_twig_type_of(c->soil) == KENT_TWIG_GROUP) {
        row[count++] = parent(c->soil, KENT_TWIG_LIST, "soils", c->soil, 1);
    }
    row[count++] = ground_of(c);
    row[count++] = fittings_of(c);
    row[count++] = loads_of(c);
    *root = parent(c->root, KENT_TWIG_GROUP, "", row, count);
    return root;
}
