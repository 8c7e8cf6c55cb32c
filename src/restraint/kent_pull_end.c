/* What a string of fused or welded pipe pulls at one of its ends, and what holds it. */
#include "kent_pull_internal.h"
#include "kent_said.h"

#include <math.h>
#include <limits.h>

static const double PI = 3.14159265358979323846;

/* Pulls nearer than this, relative, are a tie: the case listed first governs. */
static const double TIE = 1e-12;

typedef struct pull_parts {
    double of_pressure, of_end_face, of_cooling, of_string, pull; /* N */
} pull_parts;

static pull_parts parts_of(const kent_model *m, const kent_strings *strings,
                           const kent_string_end *e, const kent_string_case *c)
{
    const kent_pipe *p = &m->pipes[m->spans[e->span].pipe];
    const double inside = kent_pull_inside(p);
    const bool bolted = e->kind == KENT_STRING_TO_DEVICE;
    pull_parts parts = {
        .of_pressure = kent_pull_pressure_in(p, c),
        .of_cooling = kent_pull_cooling_in(m, p, c),
        /* nothing holds a closed end against the rest of its string */
        .of_string =
            e->kind == KENT_STRING_CLOSED ? 0.0 : kent_pull_of_string(m, strings, e, c),
    };

    if (e->kind == KENT_STRING_CLOSED) { /* 23.9: its own thrust stretches it */
        parts.of_end_face = -c->pressure * 0.25 * PI * inside * inside;
    } else if (!bolted) {
        parts.of_end_face =
            kent_pull_of_end_face(c->pressure, p->outside_diameter, inside);
    }
    parts.pull = fmax(0.0, parts.of_pressure + parts.of_end_face + parts.of_cooling +
                               parts.of_string); /* 23.5 */
    return parts;
}

/* ---- which case ------------------------------------------------------------------ */

static void find_governing(const kent_model *m, const kent_strings *strings,
                           const kent_string_end *e, kent_pull_end *out)
{
    const kent_pipe *p = &m->pipes[m->spans[e->span].pipe];

    for (size_t i = 0; i < e->case_count; i++) {
        const kent_string_case *c = &e->cases[i];
        const pull_parts parts = parts_of(m, strings, e, c);
        const double factored = c->safety_factor * parts.pull;
        if (i > 0 && !(factored > out->factored * (1.0 + TIE))) continue;
        out->governing = i;
        out->modulus = kent_pull_modulus_in(p, c);
        out->of_pressure = parts.of_pressure;
        out->of_end_face = parts.of_end_face;
        out->of_cooling = parts.of_cooling;
        out->of_string = parts.of_string;
        out->pull = parts.pull;
        out->factored = factored;
    }
}

/* The case that moves it most, as if the whole string were of one of its pipes. */
static void moved_by(const kent_model *m, const kent_strings *strings,
                     const kent_string_end *e, int pipe, kent_pull_end *out)
{
    const kent_pipe *own = &m->pipes[m->spans[e->span].pipe], *p = &m->pipes[pipe];
    const double length = strings->length[e->string];
    const double area = kent_pull_wall_area(p);

    if (kent_pull_lacking(p)[0] != '\0') return;
    for (size_t i = 0; i < e->case_count; i++) {
        const kent_string_case *c = &e->cases[i];
        const pull_parts at = parts_of(m, strings, e, c);
        const double outside = at.of_pressure + at.of_end_face + at.of_cooling -
                               kent_pull_through(m, own, c);
        const double pull = outside + kent_pull_through(m, p, c);
        const double modulus = kent_pull_modulus_in(p, c);
        if (!(pull > 0.0)) continue;
        const double moves =
            kent_pull_movement(pull, out->friction, modulus * area, length);
        if (!isnan(out->movement) && !(moves > out->movement * (1.0 + TIE))) continue;
        out->movement = moves;
        out->moves = i;
        out->moving_pull = pull;
        out->moving_modulus = modulus;
        out->moving_pipe = pipe;
        out->moving_area = area;
    }
}

/* How far it moves where nothing holds it: as if the whole string were of that of its
 * pipes that moves it most. */
static void find_movement(const kent_model *m, const kent_strings *strings,
                          const kent_string_end *e, kent_pull_end *out)
{
    double reach = NAN, friction = NAN;

    if (!kent_pull_friction(m, e->span, e->chainage, e->sign, out->pull, &reach,
                            &friction)) {
        return;
    }
    out->friction = friction;
    out->development = kent_pull_development(out->pull, friction);
    out->bounded = strings->length[e->string] >= 2.0 * out->development;
    moved_by(m, strings, e, m->spans[e->span].pipe, out);
    for (size_t i = 0; i < strings->part_count; i++) {
        const kent_string_part *part = &strings->parts[i];
        if (part->string == e->string) moved_by(m, strings, e, part->pipe, out);
    }
}

/* ---- what holds it --------------------------------------------------------------- */

/* The restrained pipe beyond, to hold the pull in place of an anchor. source 23.10 */
static void find_beyond(const kent_model *m, const kent_string_end *e,
                        kent_pull_end *out)
{
    double friction = NAN;

    if (e->beyond < 0) return;
    const double laying = m->pipes[m->spans[e->beyond].pipe].laying_length;
    if (!kent_pull_friction(m, e->beyond, e->beyond_chainage, e->beyond_sign,
                            out->factored, &out->beyond_length, &friction)) {
        return;
    }
    const double whole = ceil(out->beyond_length / laying - 1e-9);
    if (laying > 0.0) out->beyond_pipes = whole < INT_MAX ? (int)whole : INT_MAX;
}

/* m of the pipe beyond whose joints hold. */
static double joints_beyond(const kent_model *m, const kent_string_end *e,
                            const kent_holding *h)
{
    const kent_span *span = &m->spans[e->beyond];
    double restrained = 0.0;

    if (e->kind == KENT_STRING_TO_RESTRAINED) return span->length;
    if (!h || !h->held || h->chosen != KENT_RESTRAINED_JOINTS) return 0.0;
    const kent_fitting *f = &m->fittings[e->fitting];
    for (size_t i = 0; i < h->leg_count; i++) {
        const kent_port *port = &m->ports[f->port_first + h->legs[i].port];
        if (port->span == e->beyond && port->sign * e->beyond_sign > 0.0) {
            restrained = h->legs[i].length;
        }
    }
    return restrained;
}

static kent_pull_holder holder_of(const kent_model *m, const kent_string_end *e,
                                  const kent_holding *h, const kent_pull_end *p)
{
    switch (e->kind) {
    case KENT_STRING_TO_WALL:
        return KENT_PULL_WALL;
    case KENT_STRING_CLOSED:
        return KENT_PULL_ITSELF;
    case KENT_STRING_TO_DEVICE:
    case KENT_STRING_TO_OPEN:
        return KENT_PULL_NOTHING;
    case KENT_STRING_TO_JOINTS:
    case KENT_STRING_TO_RESTRAINED:
        break;
    }
    if (h && h->held && h->chosen == KENT_ANCHOR_BLOCK) return KENT_PULL_ANCHOR;
    if (e->beyond >= 0 && joints_beyond(m, e, h) >= p->beyond_length) { /* not NAN */
        return KENT_PULL_JOINTS;
    }
    return KENT_PULL_NOTHING;
}

/* ---- what must be told ----------------------------------------------------------- */

static void caution_missing(const kent_model *m, const kent_string_end *e,
                            kent_notes *cautions)
{
    const kent_pipe *p = &m->pipes[m->spans[e->span].pipe];
    const char *at = m->points[e->point].id;
    const bool cooled = m->loads.cooling > 0.0;

    if (isnan(m->loads.cooling)) {
        kent_notes_add(cautions,
                       "at %s the pull of pipe \"%s\" is that of pressure alone: how "
                       "far it may cool is not stated; give loads.cooling",
                       at, p->id);
    } else if (cooled && isnan(p->expansion)) {
        kent_notes_add(cautions,
                       "at %s the pull of pipe \"%s\" is that of pressure alone: its "
                       "expansion by heat is not known; give its expansion",
                       at, p->id);
    } else if (cooled && p->plastic && isnan(p->long_modulus)) {
        kent_notes_warn(cautions,
                        "pipe \"%s\" has no long_modulus: its short-term modulus is "
                        "taken for lasting cold as well, which overstates the pull and "
                        "understates the movement",
                        p->id);
    }
}

static void say_alternatives(const kent_model *m, const kent_string_end *e,
                             const kent_pull_end *p, kent_text *t)
{
    const kent_system units = m->units;

    kent_text_add(t, "an anchor for %s factored",
                  kent_said_of(KENT_FORCE, units, p->factored).s);
    if (!isnan(p->beyond_length)) {
        kent_text_add(t, ", or restrained joints over %s of pipe \"%s\"",
                      kent_said_of(KENT_LENGTH, units, p->beyond_length).s,
                      m->pipes[m->spans[e->beyond].pipe].id);
        if (p->beyond_pipes > 0) {
            kent_text_add(t, " (%d pipe%s)", p->beyond_pipes,
                          p->beyond_pipes == 1 ? "" : "s");
        }
    }
    if (!isnan(p->movement)) {
        kent_text_add(t, "; free, the end moves in by %s",
                      kent_said_of(KENT_DIAMETER, units, p->movement).s);
    } else {
        kent_text_add(t, "; how far a free end would move cannot be worked out: the "
                         "ground's friction on it is not known");
    }
}

static void caution_holder(const kent_model *m, const kent_string_end *e,
                           kent_pull_end *p)
{
    const char *at = m->points[e->point].id;
    const char *pipe = m->pipes[m->spans[e->span].pipe].id;
    const kent_said pull = kent_said_of(KENT_FORCE, m->units, p->pull);
    const kent_said factored = kent_said_of(KENT_FORCE, m->units, p->factored);
    kent_text t = {0};

    if (!(p->pull > 0.0)) return;
    switch (p->holder) {
    case KENT_PULL_ITSELF:
        break;
    case KENT_PULL_WALL:
        kent_notes_add(&p->cautions,
                       "at %s pipe \"%s\" pulls with %s: the wall there must be made "
                       "for %s factored, with a flange cast in",
                       at, pipe, pull.s, factored.s);
        break;
    case KENT_PULL_ANCHOR:
        kent_notes_add(&p->cautions,
                       "at %s pipe \"%s\" pulls with %s: the anchor block there is "
                       "sized for its fitting's own thrust, and must be made for %s "
                       "factored besides",
                       at, pipe, pull.s, factored.s);
        break;
    case KENT_PULL_JOINTS:
        kent_notes_add(&p->cautions,
                       "at %s pipe \"%s\" pulls with %s: the restrained joints beyond "
                       "hold it, and must be rated for that pull",
                       at, pipe, pull.s);
        break;
    case KENT_PULL_NOTHING:
        say_alternatives(m, e, p, &t);
        kent_notes_warn(
            &p->cautions,
            "at %s pipe \"%s\" pulls with %s, and nothing in the case holds "
            "it%s: it takes %s",
            at, pipe, pull.s,
            e->kind == KENT_STRING_TO_DEVICE
                ? " but what stands there, which is not made to be pulled"
                : "",
            kent_text_of(&t));
        p->cautions.failed = p->cautions.failed || t.failed;
        kent_text_clear(&t);
        break;
    }
}

/* Pipes of the string that pull nobody knows how much. */
static void caution_parts(const kent_model *m, const kent_strings *strings,
                          const kent_string_end *e, kent_notes *cautions)
{
    for (size_t i = 0; i < strings->part_count; i++) {
        const kent_string_part *part = &strings->parts[i];
        const kent_pipe *p = &m->pipes[part->pipe];
        const char *lacking = kent_pull_lacking(p);
        if (part->string != e->string || lacking[0] == '\0') continue;
        kent_notes_warn(
            cautions,
            "at %s the pull leaves out pipe \"%s\" of the same string: give "
            "its %s",
            m->points[e->point].id, p->id, lacking);
    }
}

void kent_pull_end_find(const kent_model *m, const kent_loads_result *loads,
                        const kent_holding *holdings, size_t end, kent_pull_end *out)
{
    const kent_string_end *e = &loads->strings.ends[end];
    const kent_pipe *p = &m->pipes[m->spans[e->span].pipe];
    const kent_holding *h = e->fitting >= 0 ? &holdings[e->fitting] : NULL;
    const kent_strings *strings = &loads->strings;
    const char *lacking = kent_pull_lacking(p);

    *out = (kent_pull_end){
        .end = end,
        .wall_area = kent_pull_wall_area(p),
        .friction = NAN,
        .development = NAN,
        .movement = NAN,
        .beyond_length = NAN,
    };
    if (lacking[0] != '\0') {
        kent_notes_warn(
            &out->cautions,
            "at %s pipe \"%s\" pulls on whatever holds its end, and how much "
            "cannot be worked out: give its %s",
            m->points[e->point].id, p->id, lacking);
        return;
    }
    out->known = true;
    find_governing(m, strings, e, out);
    if (e->case_count > 0) {
        out->of_pressure_mean =
            kent_pull_of_pressure_mean(e->cases[out->governing].pressure, p->poisson,
                                       p->outside_diameter, p->wall);
    }
    find_movement(m, strings, e, out);
    find_beyond(m, e, out);
    out->holder = holder_of(m, e, h, out);
    caution_missing(m, e, &out->cautions);
    caution_parts(m, strings, e, &out->cautions);
    caution_holder(m, e, out);
}
