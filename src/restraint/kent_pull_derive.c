/* The hand calculation of a string's pull at one of its ends. */
#include "kent_pull_internal.h"

#include <math.h>
#include <stdio.h>

static void derive_pipe(const kent_pipe *p, kent_derivation *d)
{
    const kent_source listed = p->pipe_class[0] ? KENT_CATALOGUE : KENT_GIVEN;
    const double inside = p->outside_diameter - 2.0 * p->wall;

    kent_derivation_put(d, "OD", p->outside_diameter, KENT_DIAMETER, listed,
                        "outside diameter of the string's pipe");
    kent_derivation_put(d, "e", p->wall, KENT_DIAMETER, listed, "wall, nominal");
    kent_derivation_put(d, "nu", p->poisson, KENT_RATIO, KENT_CATALOGUE,
                        "Poisson's ratio");
    kent_derivation_work(d, "di", inside, KENT_DIAMETER, "OD - 2*e", "",
                         "inside of the wall itself");
    kent_derivation_work(d, "Aw", kent_pull_wall_area(p), KENT_AREA, "pi*(OD - e)*e",
                         "", "area of the wall");
}

static void derive_cooling(const kent_model *m, const kent_pipe *p,
                           const kent_string_case *c, const kent_pull_end *at,
                           kent_derivation *d)
{
    if (isnan(m->loads.cooling) || isnan(p->expansion)) {
        kent_derivation_put(d, "Pt", 0.0, KENT_FORCE, KENT_ASSUMED,
                            "pull of cooling: not stated how far, or how it shortens");
        return;
    }
    kent_derivation_put(d, "E", at->modulus, KENT_STRESS, KENT_CATALOGUE,
                        c->lasts ? "modulus under lasting load"
                                 : "short-term modulus: it may have cooled today");
    kent_derivation_put(d, "al", p->expansion, KENT_RATIO, KENT_CATALOGUE,
                        "expansion per kelvin");
    kent_derivation_put(d, "dT", m->loads.cooling, KENT_RATIO, KENT_GIVEN,
                        "kelvin that it may cool");
    kent_derivation_work(d, "Pt", at->of_cooling, KENT_FORCE, "E*al*dT*Aw", "23.4",
                         "pull of cooling");
}

static void derive_face(const kent_string_end *e, const kent_pull_end *at,
                        kent_derivation *d)
{
    switch (e->kind) {
    case KENT_STRING_CLOSED:
        kent_derivation_work(d, "Pe", at->of_end_face, KENT_FORCE, "0 - p*pi*di^2/4",
                             "23.9",
                             "thrust of its own closed end, which stretches it");
        return;
    case KENT_STRING_TO_DEVICE:
        kent_derivation_put(d, "Pe", 0.0, KENT_FORCE, KENT_COMPUTED,
                            "nothing presses on the end of a wall that is bolted on");
        return;
    case KENT_STRING_TO_JOINTS:
    case KENT_STRING_TO_RESTRAINED:
    case KENT_STRING_TO_WALL:
    case KENT_STRING_TO_OPEN:
        break;
    }
    kent_derivation_work(d, "Pe", at->of_end_face, KENT_FORCE, "p*pi*(OD^2 - di^2)/4",
                         "23.3", "pressure on the end of the wall, within the seal");
}

static void derive_free(const kent_model *m, const kent_string_end *e,
                        double string_length, const kent_pull_end *at,
                        kent_derivation *d)
{
    const bool other = at->moving_pipe != m->spans[e->span].pipe;
    const kent_string_case *moves = &e->cases[at->moves];
    char says[160];

    if (isnan(at->development)) return;
    kent_derivation_heading(d, "Held by nothing, the end would move in until the "
                               "ground's friction has taken up the pull");
    kent_derivation_put(d, "f", at->friction, KENT_FORCE_PER_LENGTH, KENT_COMPUTED,
                        "friction along the string, by 11.5, mean over that length");
    kent_derivation_work(d, "Ld", at->development, KENT_LENGTH, "P/f", "23.6",
                         "development length");
    kent_derivation_put(
        d, "Ls", string_length, KENT_LENGTH, KENT_COMPUTED,
        at->bounded ? "length of the string: beyond 2 Ld more of it adds nothing"
                    : "length of the string, less than 2 Ld: its other end "
                      "moves too");
    if (at->moves != at->governing) {
        (void)snprintf(says, sizeof says, "pull in '%.90s', which moves it most",
                       moves->title.s);
    } else {
        (void)snprintf(says, sizeof says, "the same pull moves it most");
    }
    const bool bounded = string_length >= 2.0 * at->moving_pull / at->friction;
    kent_derivation_put(d, "Pm", at->moving_pull, KENT_FORCE, KENT_COMPUTED, says);
    kent_derivation_put(d, "Em", at->moving_modulus, KENT_STRESS, KENT_CATALOGUE,
                        "modulus in that case");
    if (other) {
        (void)snprintf(says, sizeof says,
                       "wall of pipe \"%.60s\", which moves it most of the string's",
                       m->pipes[at->moving_pipe].id);
        kent_derivation_put(d, "Am", at->moving_area, KENT_AREA, KENT_COMPUTED, says);
    }
    kent_derivation_work(d, "dm", at->movement, KENT_DIAMETER,
                         bounded ? other ? "Pm^2/(2*f*Em*Am)" : "Pm^2/(2*f*Em*Aw)"
                         : other ? "(Pm*Ls/2 - f*Ls^2/8)/(Em*Am)"
                                 : "(Pm*Ls/2 - f*Ls^2/8)/(Em*Aw)",
                         bounded ? "23.7" : "23.8", "movement of a free end");
}

void kent_pull_end_derive(const kent_model *m, const kent_string_end *e,
                          double string_length, kent_pull_end *at)
{
    const kent_pipe *p = &m->pipes[m->spans[e->span].pipe];
    kent_derivation *d = &at->derivation;
    char says[160];

    if (!at->known || e->case_count == 0) return;
    const kent_string_case *c = &e->cases[at->governing];
    (void)snprintf(says, sizeof says, "Pull of string \"%s\" at its end at %s", p->id,
                   m->points[e->point].id);
    kent_derivation_heading(d, says);
    derive_pipe(p, d);
    (void)snprintf(says, sizeof says, "pressure there in '%.90s', which asks for most",
                   c->title.s);
    kent_derivation_put(d, "p", c->pressure, KENT_STRESS, KENT_COMPUTED, says);
    kent_derivation_work(d, "Pp", at->of_pressure, KENT_FORCE, "2*nu*p*pi*di^2/4",
                         "23.1", "pull of pressure on a wall kept from shortening");
    kent_derivation_work(d, "Pmean", at->of_pressure_mean, KENT_FORCE,
                         "nu*p*(OD - e)/(2*e)*Aw", "23.2",
                         "the same by the mean diameter, as in handbooks");
    derive_face(e, at, d);
    derive_cooling(m, p, c, at, d);
    if (at->of_string > 0.0) {
        kent_derivation_put(d, "Ps", at->of_string, KENT_FORCE, KENT_COMPUTED,
                            "what other pipes of the string add (23.17, 23.18)");
    }
    kent_derivation_work(d, "P", at->pull, KENT_FORCE,
                         at->of_string > 0.0 ? "max(0, Pp + Pe + Pt + Ps)"
                                             : "max(0, Pp + Pe + Pt)",
                         "23.5", "pull of an end that is held");
    kent_derivation_put(d, "SF", c->safety_factor, KENT_RATIO, KENT_GIVEN, "factor");
    kent_derivation_work(d, "PF", at->factored, KENT_FORCE, "SF*P", "",
                         "factored: what an anchor takes, however long the string and "
                         "whatever the friction, for a held end does not move");
    derive_free(m, e, string_length, at, d);
    if (!isnan(at->beyond_length)) {
        kent_derivation_heading(d, "Held by joints beyond instead");
        kent_derivation_put(d, "fb", at->factored / at->beyond_length,
                            KENT_FORCE_PER_LENGTH, KENT_COMPUTED,
                            "friction along the pipe beyond, by 11.5");
        kent_derivation_work(d, "Lb", at->beyond_length, KENT_LENGTH, "PF/fb", "23.10",
                             "of it to be restrained");
    }
}
