#include "kent_shown.h"
#include "kent_said.h"

#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <string.h>

static const double DEGREES = 57.29577951308232; /* per radian */

__attribute__((format(printf, 1, 2))) static kent_shown shown(const char *fmt, ...)
{
    kent_shown s;
    va_list args;
    va_start(args, fmt);
    (void)vsnprintf(s.text, sizeof s.text, fmt, args);
    va_end(args);
    return s;
}

const char *kent_shown_sense(kent_sense sense)
{
    switch (sense) {
    case KENT_RESULTANT:
        return "whole";
    case KENT_SIDEWAYS:
        return "sideways";
    case KENT_UPWARD:
        return "upward";
    case KENT_DOWNWARD:
        return "downward";
    case KENT_SENSES:
        break;
    }
    return "";
}

kent_shown kent_shown_number(double value, int decimals)
{
    if (!isfinite(value)) return shown(KENT_SHOWN_NONE);
    const double half = 0.5 * pow(10.0, -decimals);
    return shown("%.*f", decimals, fabs(value) < half ? 0.0 : value);
}

kent_shown kent_shown_quantity(kent_kind kind, kent_system system, double si)
{
    const kent_display display = kent_units_display(kind, system);
    return kent_shown_number(kent_units_shown(kind, system, si), display.decimals);
}

kent_shown kent_shown_unit(kent_kind kind, kent_system system)
{
    return shown("%s", kent_said_unit(kind, system).s);
}

kent_shown kent_shown_with_unit(kent_kind kind, kent_system system, double si)
{
    if (!isfinite(si)) return shown(KENT_SHOWN_NONE);
    return shown("%s", kent_said_of(kind, system, si).s);
}

kent_shown kent_shown_station(kent_system system, double station)
{
    if (!isfinite(station)) return shown(KENT_SHOWN_NONE);
    /* rounded first, so that 999.7 m is 1+000 and not 0+1000 */
    if (system == KENT_SI) {
        const long metres = lround(station);
        const long size = metres < 0 ? -metres : metres;
        return shown("%s%ld+%03ld", metres < 0 ? "-" : "", size / 1000, size % 1000);
    }
    const long tenths = lround(kent_units_shown(KENT_LENGTH, KENT_US, station) * 10.0);
    const long size = tenths < 0 ? -tenths : tenths;
    return shown("%s%ld+%02ld.%ld", tenths < 0 ? "-" : "", size / 1000,
                 size % 1000 / 10, size % 10);
}

kent_shown kent_shown_azimuth(kent_system system, double azimuth, kent_room room)
{
    if (!isfinite(azimuth)) return shown(KENT_SHOWN_NONE);
    const long turn = (lround(azimuth * DEGREES) % 360 + 360) % 360;
    if (system == KENT_SI) return shown("%ld°", turn);
    if (turn % 90 == 0) {
        static const char *const MAIN[] = {"due N", "due E", "due S", "due W"};
        return shown("%s", MAIN[turn / 90]);
    }
    const bool south = turn > 90 && turn < 270;
    const long off = turn < 90    ? turn
                     : turn < 180 ? 180 - turn
                     : turn < 270 ? turn - 180
                                  : 360 - turn;
    const char *gap = room == KENT_ROOMY ? " " : "";
    return shown("%s%s%ld°%s%s", south ? "S" : "N", gap, off, gap,
                 turn < 180 ? "E" : "W");
}

/* Words for the horizontal part of a thrust without coordinates. */
static const char *schematic_push(const kent_fitting *fitting)
{
    switch (fitting->type) {
    case KENT_BEND:
    case KENT_CURVE:
        return "outward";
    case KENT_TEE:
    case KENT_WYE:
    case KENT_CROSS:
        return "off branch";
    case KENT_REDUCER:
    case KENT_DEAD_END:
    case KENT_VALVE:
    case KENT_STRAIGHT:
    case KENT_GROUP:
        break;
    }
    return "along pipe";
}

kent_shown kent_shown_push(const kent_model *m, const kent_fitting *fitting,
                           kent_vec3 thrust, kent_system system, kent_room room)
{
    const double whole = kent_vec3_length(thrust);
    const double across = kent_thrust_horizontal(thrust);
    if (!isfinite(whole) || whole <= 0.0) return shown(KENT_SHOWN_NONE);

    kent_shown up = {{0}}, way = {{0}};
    if (fabs(thrust.z) >= 0.1 * whole) {
        const kent_shown size = kent_shown_quantity(KENT_FORCE, system, fabs(thrust.z));
        up = shown("%s%s%.60s", thrust.z > 0.0 ? "↑" : "↓",
                   room == KENT_ROOMY ? " " : "", size.text);
    }
    if (across >= 0.1 * whole) {
        const bool schematic =
            fitting->point >= 0 && isnan(m->points[fitting->point].at.x);
        way = schematic ? shown("%s", schematic_push(fitting))
                        : kent_shown_azimuth(system, kent_thrust_azimuth(thrust), room);
    }
    const bool both = up.text[0] != '\0' && way.text[0] != '\0';
    return shown("%.60s%s%.60s", way.text, both ? " " : "", up.text);
}

/* A bore: whole millimetres, inches without needless decimals. */
static kent_shown bore(double size, kent_system system)
{
    const double value = kent_units_shown(KENT_DIAMETER, system, size);
    if (!isfinite(value)) return shown(KENT_SHOWN_NONE);
    return system == KENT_SI ? shown("%.0f", value) : shown("%.3g", value);
}

enum { LOOKED_AT = 1000 };                 /* pipes, for one of the same outside */
static const double SAME_OUTSIDE = 0.5e-3; /* m */

/* The size in a class's id: "600" of "DI-EN545-C30-DN600" in SI, "24" of
 * "DI-C151-PC200-24in" in US. False: its id has none of this system. */
static bool nominal_of(const char *pipe_class, kent_system system, kent_shown *out)
{
    const char *mark = system == KENT_SI ? "DN" : "";
    const char *end = system == KENT_SI ? "" : "in";
    const char *last = strrchr(pipe_class, '-');
    if (!last || strncmp(last + 1, mark, strlen(mark)) != 0) return false;
    const char *digits = last + 1 + strlen(mark);
    const size_t length = strspn(digits, "0123456789.");
    if (length == 0 || strcmp(digits + length, end) != 0) return false;
    *out = shown("%.*s", (int)length, digits);
    return true;
}

/* The size of a pipe of the case with a class and this outside diameter (m), on which
 * the same castings fit. */
static bool nominal_like(const kent_model *m, double outside, kent_system system,
                         kent_shown *out)
{
    for (size_t i = 0; i < m->pipe_count && i < LOOKED_AT; i++) {
        const kent_pipe *pipe = &m->pipes[i];
        if (!(fabs(pipe->outside_diameter - outside) < SAME_OUTSIDE)) continue;
        if (nominal_of(pipe->pipe_class, system, out)) return true;
    }
    return false;
}

/* Size of the first port with this bore, or of the branch without a pipe. */
static kent_shown size_of(const kent_model *m, const kent_fitting *fitting,
                          double inside, kent_system system)
{
    kent_shown nominal;
    double outside = fitting->branch.end != KENT_BRANCH_NONE &&
                             fabs(fitting->branch.inside_diameter - inside) < 1e-9
                         ? fitting->branch.outside_diameter
                         : (double)NAN;
    for (size_t i = 0; i < fitting->port_count; i++) {
        const kent_port *port = &m->ports[fitting->port_first + i];
        if (port->span < 0 || fabs(port->inside_diameter - inside) > 1e-9) continue;
        const kent_pipe *pipe = &m->pipes[m->spans[port->span].pipe];
        if (nominal_of(pipe->pipe_class, system, &nominal)) return nominal;
        outside = pipe->outside_diameter;
    }
    if (nominal_like(m, outside, system, &nominal)) return nominal;
    return bore(inside, system);
}

/* m */
static double smallest_bore(const kent_model *m, const kent_fitting *fitting)
{
    double least = fitting->size;
    for (size_t i = 0; i < fitting->port_count; i++) {
        least = fmin(least, m->ports[fitting->port_first + i].inside_diameter);
    }
    return least;
}

kent_shown kent_shown_size(const kent_model *m, const kent_fitting *fitting,
                           kent_system system)
{
    return size_of(m, fitting, fitting->size, system);
}

static kent_shown bend_words(const kent_fitting *fitting, kent_room room)
{
    const char *word = "";
    switch (fitting->orientation) {
    case KENT_HORIZONTAL:
        break;
    case KENT_CREST:
    case KENT_SAG:
        word = kent_orientation_word(fitting->orientation);
        break;
    case KENT_COMBINED:
        word =
            room > KENT_ROOMY ? "comb." : kent_orientation_word(fitting->orientation);
        break;
    }
    /* where room is shortest the way it turns says that it is a bend */
    const bool steep = word[0] != '\0';
    return shown("%s%.1f°%s%s", room == KENT_BRIEF && steep ? "" : "bend ",
                 fitting->angle * DEGREES, steep ? " " : "", word);
}

/* What it is for, where that says more than its type. */
static const char *role_or_type(const kent_fitting *fitting)
{
    const bool end = fitting->type == KENT_DEAD_END;
    if (fitting->type == KENT_GROUP) return kent_fitting_type_word(fitting->type);
    switch (fitting->role) {
    case KENT_ROLE_NONE:
        break;
    case KENT_ROLE_TAPPING:
        return "tapping tee";
    case KENT_ROLE_HYDRANT:
        return end ? "hydrant end" : "hydrant tee";
    case KENT_ROLE_AIR_VALVE:
        return "air valve tee";
    case KENT_ROLE_WASHOUT:
        return end ? "washout end" : "washout tee";
    case KENT_ROLE_MANHOLE:
        return end ? "manhole end" : "manhole tee";
    case KENT_ROLE_WALL:
        if (fitting->type == KENT_STRAIGHT) return "wall piece";
        if (end) return "end in a wall";
        break;
    case KENT_ROLE_FLANGE_ADAPTOR:
        if (fitting->type == KENT_STRAIGHT) return "flange adaptor";
        break;
    }
    return end ? "dead end" : kent_fitting_type_word(fitting->type);
}

kent_shown kent_shown_fitting(const kent_model *m, const kent_fitting *fitting,
                              kent_system system, kent_room room)
{
    const char *word = role_or_type(fitting);
    const kent_shown branch = size_of(m, fitting, fitting->branch_size, system);
    switch (fitting->type) {
    case KENT_BEND:
        return bend_words(fitting, room);
    case KENT_TEE:
    case KENT_CROSS:
        if (isnan(fitting->branch_size)) break;
        return shown(room > KENT_ROOMY ? "%s × %.40s" : "%s, branch %.40s", word,
                     branch.text);
    case KENT_WYE:
        if (isnan(fitting->branch_size)) break;
        return shown("%s %.0f° × %.40s", word, fitting->angle * DEGREES, branch.text);
    case KENT_REDUCER:
        return shown("%s to %.40s", word,
                     size_of(m, fitting, smallest_bore(m, fitting), system).text);
    case KENT_CURVE:
        return shown("%s %.1f°", word, fitting->angle * DEGREES);
    case KENT_GROUP:
        return shown("%s of %zu", word, fitting->member_count);
    case KENT_DEAD_END:
    case KENT_VALVE:
    case KENT_STRAIGHT:
        break;
    }
    return shown("%s", word);
}

static double asked_of(const kent_fitting_loads *loads, int governing)
{
    return governing >= 0 ? loads->cases[governing].safety_factor : (double)NAN;
}

/* The block, and its face. */
static size_t block_parts(const kent_fitting_loads *loads, const kent_holding *holding,
                          kent_part parts[KENT_PARTS])
{
    const kent_block *b = &holding->block;
    const kent_sense own = b->sense;
    const int sideways = holding->by_sense[KENT_SIDEWAYS];
    const kent_part body = {.sense = own,
                            .governing = holding->by_sense[own],
                            .factor_reached = b->factor_reached,
                            .utilisation = b->utilisation};
    const kent_part face = {.sense = KENT_SIDEWAYS,
                            .governing = sideways,
                            .face = true,
                            .factor_reached =
                                asked_of(loads, sideways) / b->face_utilisation,
                            .utilisation = b->face_utilisation};
    /* joints beside both may govern the whole */
    const bool face_first = b->has_face && (holding->sense == KENT_RESULTANT
                                                ? b->face_utilisation > b->utilisation
                                                : holding->sense != own);
    parts[0] = face_first ? face : body;
    parts[1] = face_first ? body : face;
    return b->has_face ? 2 : 1;
}

size_t kent_shown_parts(const kent_fitting_loads *loads, const kent_holding *holding,
                        kent_part parts[KENT_PARTS])
{
    const int whole = holding->by_sense[KENT_RESULTANT];
    const bool block = holding->held && holding->block.type != KENT_BLOCK_NONE;
    const bool both = block && holding->chosen == KENT_BLOCK_AND_JOINTS;
    size_t count = 1;

    parts[0] = (kent_part){.sense = holding->sense,
                           .governing = holding->governing,
                           .joints = holding->held && !block && !holding->soil_beside,
                           .factor_reached = holding->factor_reached,
                           .utilisation = holding->utilisation};
    if (both || (block && holding->block.has_face)) {
        count = block_parts(loads, holding, parts);
    }
    if (!both) return count;
    parts[count++] =
        (kent_part){.sense = KENT_RESULTANT,
                    .governing = whole,
                    .joints = true,
                    .factor_reached = asked_of(loads, whole) / holding->joints_use,
                    .utilisation = holding->joints_use};
    return count;
}

const kent_instant *kent_part_instant(const kent_fitting_loads *loads,
                                      const kent_part *part)
{
    if (part->governing < 0 || (size_t)part->governing >= loads->count) return NULL;
    const kent_instant *at = &loads->cases[part->governing].worst[part->sense];
    return at->set ? at : NULL;
}

const kent_instant *kent_shown_instant(const kent_fitting_loads *loads,
                                       const kent_holding *holding)
{
    const kent_part whole = {.sense = holding->sense, .governing = holding->governing};
    return kent_part_instant(loads, &whole);
}

kent_shown kent_shown_governing(const kent_fitting_loads *loads, const kent_part *part,
                                kent_room room)
{
    const kent_instant *at = kent_part_instant(loads, part);
    if (!at) return shown(KENT_SHOWN_NONE);
    const char *name = loads->cases[part->governing].title.s;
    if (isnan(at->time) || room >= KENT_TIGHTEST) return shown("%s", name);
    return shown(room == KENT_ROOMY ? "%s at %.1f s" : "%s %.1f s", name, at->time);
}

bool kent_shown_not_held(const kent_holding *holding)
{
    return !holding->held && !holding->needs_nothing &&
           (holding->chosen != KENT_NO_RESTRAINT || holding->soil_beside);
}

/* In a word or two, why nothing holds it; the note under the table says the rest. A
 * soil's name that is too long for a narrow table is left to the note. */
static kent_shown refusal(const kent_model *m, const kent_fitting *fitting,
                          const kent_holding *holding, kent_room room)
{
    enum { SHORT = 12 };
    if (holding->unbalanced) return shown("none as a group");
    if (fitting->soil < 0) return shown("none: no soil");
    const kent_soil *soil = &m->soils[fitting->soil];
    if (soil->unreliable) {
        const bool fits = room == KENT_ROOMY || kent_text_columns(soil->id) <= SHORT;
        return shown("none%s%s", fits ? ": " : "", fits ? soil->id : "");
    }
    if (isnan(fitting->cover)) return shown("none: no cover");
    return shown("none");
}

/* "block 2.10 × 1.10 × 0.75": three lengths in m or ft. */
static kent_shown three_sides(const char *word, const double sides[3],
                              kent_system system, kent_room room)
{
    const char *by = room == KENT_ROOMY ? " × " : "×";
    const kent_shown a = kent_shown_quantity(KENT_LENGTH, system, sides[0]);
    const kent_shown b = kent_shown_quantity(KENT_LENGTH, system, sides[1]);
    const kent_shown c = kent_shown_quantity(KENT_LENGTH, system, sides[2]);
    return shown("%s%.20s%s%.20s%s%.20s", word, a.text, by, b.text, by, c.text);
}

kent_shown kent_shown_block(const kent_block *b, kent_system system, kent_room room)
{
    const double sides[3] = {b->width, b->height, b->thickness};
    if (b->type == KENT_BLOCK_GRAVITY) {
        const double volume = kent_units_shown(KENT_VOLUME, system, b->volume);
        const int decimals = volume < 0.095 ? 3 : volume < 0.95 ? 2 : 1;
        return shown("gravity %.20s %.20s", kent_shown_number(volume, decimals).text,
                     kent_shown_unit(KENT_VOLUME, system).text);
    }
    return three_sides(b->type == KENT_BLOCK_BASE ? "base " : "block ", sides, system,
                       room);
}

kent_shown kent_shown_straps(const kent_straps *straps, kent_system system)
{
    if (straps->legs == 0) return shown(KENT_SHOWN_NONE);
    const double size = kent_units_shown(KENT_DIAMETER, system, straps->diameter);
    if (system == KENT_SI) return shown("%dø%.0f", straps->legs, size);
    return shown("%dø%.4g", straps->legs, size);
}

kent_shown kent_shown_part(const kent_model *m, const kent_fitting *fitting,
                           const kent_holding *holding, const kent_part *part,
                           kent_system system, kent_room room)
{
    const kent_block *b = &holding->block;
    if (holding->needs_nothing) {
        return shown(fitting->within_deflection ? "joint takes it" : "not needed");
    }
    const bool left = holding->chosen == KENT_NO_RESTRAINT && !holding->soil_beside;
    if (left) return shown("none asked");
    if (!holding->held) return refusal(m, fitting, holding, room);
    if (holding->soil_beside) return shown("soil beside");
    if (part->face && b->own_side) return shown("its own side");
    if (part->face) {
        const double sides[3] = {b->face.width, b->face.height, b->face_thickness};
        return three_sides("face ", sides, system, room);
    }
    if (!part->joints) {
        const kent_shown block = kent_shown_block(b, system, room);
        const kent_shown straps = kent_shown_straps(&holding->straps, system);
        const bool tied = holding->straps.legs > 0;
        return shown("%.100s%s%.40s", block.text, tied ? ", " : "",
                     tied ? straps.text : "");
    }
    const double length =
        kent_units_shown(KENT_LENGTH, system, holding->restrained_length);
    return shown("joints %.20s %.20s", kent_shown_number(length, 1).text,
                 kent_shown_unit(KENT_LENGTH, system).text);
}

void kent_shown_assumption(const char *note, kent_text *out)
{
    static const char *const BETWEEN[] = {" = ", ": "};
    for (size_t part = 0; note[0] != '\0'; part++) {
        const size_t length = strcspn(note, "\t");
        kent_text_add(out, "%.*s", (int)length, note);
        if (note[length] == '\0') return;
        kent_text_add(out, "%s", BETWEEN[part > 0]);
        note += length + 1;
    }
}
