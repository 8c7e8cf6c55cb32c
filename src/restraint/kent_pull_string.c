/* What the pipes of a string pull with, each by itself and one through another. */
#include "kent_pull_internal.h"

#include <math.h>

static const double PI = 3.14159265358979323846;

double kent_pull_inside(const kent_pipe *p)
{
    return p->outside_diameter - 2.0 * p->wall;
}

const char *kent_pull_lacking(const kent_pipe *p)
{
    if (!(p->outside_diameter > 0.0) || !(p->wall > 0.0)) {
        return "outside_diameter and wall_thickness";
    }
    if (isnan(p->poisson)) return "poisson_ratio";
    return isnan(p->modulus) ? "modulus" : "";
}

/* Of cooling: what lasts for months relaxes in a plastic. A main that is filled and
 * tested may have cooled within the day, and a surge adds to that. source 23.4 */
double kent_pull_modulus_in(const kent_pipe *p, const kent_string_case *c)
{
    return c->lasts && !isnan(p->long_modulus) ? p->long_modulus : p->modulus;
}

double kent_pull_pressure_in(const kent_pipe *p, const kent_string_case *c)
{
    return kent_pull_of_pressure(c->pressure, p->poisson, kent_pull_inside(p));
}

double kent_pull_cooling_in(const kent_model *m, const kent_pipe *p,
                            const kent_string_case *c)
{
    const double pull = kent_pull_of_cooling(kent_pull_modulus_in(p, c), p->expansion,
                                             m->loads.cooling, kent_pull_wall_area(p));
    return isnan(pull) ? 0.0 : pull;
}

/* ---- one pipe through another ---------------------------------------------------- */

double kent_pull_through(const kent_model *m, const kent_pipe *p,
                         const kent_string_case *c)
{
    const double inside = kent_pull_inside(p);
    return kent_pull_pressure_in(p, c) + kent_pull_cooling_in(m, p, c) -
           c->pressure * 0.25 * PI * inside * inside;
}

static double stiffness_of(const kent_pipe *p, const kent_string_case *c)
{
    return kent_pull_modulus_in(p, c) * kent_pull_wall_area(p);
}

/* source 23.17, 23.18 */
double kent_pull_of_string(const kent_model *m, const kent_strings *strings,
                           const kent_string_end *e, const kent_string_case *c)
{
    const kent_pipe *own = &m->pipes[m->spans[e->span].pipe];
    const double last = kent_pull_through(m, own, c), stiff = stiffness_of(own, c);
    double most = last, sum = 0.0, yielding = 0.0;

    for (size_t i = 0; i < strings->part_count; i++) {
        const kent_string_part *part = &strings->parts[i];
        const kent_pipe *p = &m->pipes[part->pipe];
        if (part->string != e->string || kent_pull_lacking(p)[0] != '\0') continue;
        const double pull = kent_pull_through(m, p, c),
                     yields = part->length / stiffness_of(p, c);
        if (stiffness_of(p, c) < stiff) most = fmax(most, pull);
        sum += pull * yields;
        yielding += yields;
    }
    if (yielding > 0.0) most = fmax(most, sum / yielding);
    return most > last + 1e-9 * fabs(last) ? most - last : 0.0;
}
