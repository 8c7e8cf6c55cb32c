/* Mains on steep ground: what slides down them, and the anchors that hold it. */
#include "kent_pull_internal.h"
#include "kent_said.h"

#include <limits.h>
#include <math.h>
#include <stdio.h>

static const double PI = 3.14159265358979323846;

/* Rise over run beyond which mains are anchored where the rules say nothing. Common
 * practice, no source: between 1 in 5 and 1 in 6. */
static const double USUAL_STEEPEST = 1.0 / 6.0;

/* m: a shorter stretch, of pipes whose length is not known, is held by what stands at
 * its ends. Common practice, no source. */
static const double SHORT = 6.0;

/* Spacing of anchors by slope, of Recommended Standards for Wastewater Facilities
 * (Great Lakes - Upper Mississippi River Board), chapter 30, "Steep Slope Protection";
 * from memory: 36 ft up to 35 %, 24 ft up to 50 %, 16 ft beyond. source 23.14 */
static double usual_spacing(double slope)
{
    const double foot = 0.3048; /* m */

    if (slope < 0.35) return 36.0 * foot;
    return slope < 0.50 ? 24.0 * foot : 16.0 * foot;
}

/* Rise over run from one stop of a route to the next. */
static double slope_after(const kent_model *m, size_t stop)
{
    const double length = m->chainage[stop + 1] - m->chainage[stop];
    const double rise =
        m->points[m->route[stop + 1]].at.z - m->points[m->route[stop]].at.z;
    const double run = sqrt(fmax(0.0, length * length - rise * rise));

    if (run > 0.0) return rise / run;
    return rise > 0.0 ? INFINITY : rise < 0.0 ? -INFINITY : 0.0;
}

/* ---- one stretch ----------------------------------------------------------------- */

static void find_friction(const kent_model *m, kent_steep *s)
{
    const double middle = 0.5 * (s->start + s->end);
    double length = NAN, friction = NAN;

    s->friction = m->pipes[s->pipe].above_ground ? 0.0 : NAN;
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *span = &m->spans[i];
        const double start =
            m->chainage[span->route_first] - m->chainage[m->pipes[s->pipe].route_first];
        const double at = middle - start;
        if (span->pipe != s->pipe || at < 0.0 || at > span->length) continue;
        /* downhill, so that its weight is not taken off already */
        const double down = s->slope > 0.0 ? -1.0 : 1.0;
        if (kent_pull_friction(m, (int)i, at, down, 1.0, &length, &friction)) {
            s->friction = friction; /* across the slope: chapter 11 */
        }
        return;
    }
}

/* Whole pipes between two anchors, or several anchors to a pipe. */
static void find_anchors(const kent_pipe *p, kent_steep *s)
{
    const double laying = p->laying_length, length = s->end - s->start;
    const double most = usual_spacing(fabs(s->slope));

    s->spacing = most;
    if (laying > 0.0 && laying <= most) {
        s->pipes = (int)fmin(floor(most / laying + 1e-9), INT_MAX);
        s->spacing = s->pipes * laying;
    } else if (laying > most) {
        s->spacing = laying / ceil(laying / most - 1e-9);
    }
    s->anchors = (int)fmin(ceil(length / s->spacing - 1e-9), INT_MAX);
    s->anchor_force = s->factor * s->along * s->spacing; /* 23.15 */
}

static void find_forces(const kent_model *m, kent_steep *s)
{
    const kent_pipe *p = &m->pipes[s->pipe];
    const double bore = p->inside_diameter;
    const double stated = m->loads.factor[KENT_CASE_STATIC]; /* weight lasts as that */
    const double water = m->water.density * m->gravity * 0.25 * PI * bore * bore;
    const double pipe = kent_pull_pipe_weight(p, m->gravity);

    s->weight = pipe + water;
    s->along = s->weight * sin(s->angle); /* 23.12 */
    s->factor = isnan(stated) ? m->rules.safety_factor : stated;
    find_friction(m, s);
    s->net = s->factor * s->along - s->friction; /* 23.13 */
    if (s->net < 0.0) s->net = 0.0;              /* not NAN */
    s->spacing = s->hangs = NAN;
    if (kent_joint_slips(p->joint)) {
        find_anchors(p, s);
    } else {
        const double left = isnan(s->net) ? s->factor * s->along : s->net;
        s->hangs = left * (s->end - s->start); /* 23.16 */
    }
}

/* ---- what must be told ----------------------------------------------------------- */

static void say_where(const kent_model *m, const kent_steep *s, kent_text *t)
{
    const bool asked = m->rules.steepest_pipe > 0.0;
    const double limit = asked ? m->rules.steepest_pipe : USUAL_STEEPEST;

    kent_text_add(t, "pipe \"%s\" %s ", m->pipes[s->pipe].id,
                  s->slope > 0.0 ? "rises" : "falls");
    if (isinf(s->slope)) {
        kent_text_add(t, "upright");
    } else {
        kent_text_add(t, "1 in %.1f", 1.0 / fabs(s->slope));
    }
    kent_text_add(t, " from %s to %s, steeper than 1 in %.3g (%s): ",
                  kent_said_station(m->units, s->from).s,
                  kent_said_station(m->units, s->to).s, 1.0 / limit,
                  asked ? "steepest_pipe" : "common practice, the rules state none");
}

static void caution_steep(const kent_model *m, kent_steep *s)
{
    const kent_pipe *p = &m->pipes[s->pipe];
    const kent_system units = m->units;
    kent_text t = {0};

    say_where(m, s, &t);
    if (isnan(s->weight)) {
        kent_text_add(&t, "anchor it; for how much is not known without the mass of "
                          "the pipe: give its pipe_class, or its material and "
                          "wall_thickness");
    } else if (s->anchors > 0) {
        kent_text_add(
            &t,
            "anchor it every %s (%d in all) for %s each, factored, no "
            "friction counted, as water may loosen the trench%s",
            kent_said_of(KENT_LENGTH, units, s->spacing).s, s->anchors,
            kent_said_of(KENT_FORCE, units, s->anchor_force).s,
            p->above_ground ? "" : "; with a water-stop across the trench at each");
    } else if (s->hangs <= 0.0) {
        kent_text_add(
            &t,
            "its joints hold, and friction holds it as long as no water "
            "loosens the trench: put water-stops across it; without "
            "friction it hangs on its upper end with %s factored: anchor it "
            "there for that",
            kent_said_of(KENT_FORCE, units, s->factor * s->along * (s->end - s->start))
                .s);
    } else {
        kent_text_add(&t,
                      "its joints hold, so that it hangs on its upper end with %s "
                      "factored%s; anchor it there%s",
                      kent_said_of(KENT_FORCE, units, s->hangs).s,
                      isnan(s->friction) ? ", no friction counted" : "",
                      p->above_ground ? "" : ", and put water-stops across the trench");
    }
    kent_notes_warn(&s->cautions, "%s", kent_text_of(&t));
    s->cautions.failed = s->cautions.failed || t.failed;
    kent_text_clear(&t);
}

static void derive_weight(const kent_model *m, const kent_steep *s, kent_derivation *d)
{
    const kent_pipe *p = &m->pipes[s->pipe];

    kent_derivation_put(d, "Wp", kent_pull_pipe_weight(p, m->gravity),
                        KENT_FORCE_PER_LENGTH, KENT_COMPUTED,
                        "weight of the pipe, by 11.1");
    kent_derivation_put(d, "ID", p->inside_diameter, KENT_DIAMETER, KENT_GIVEN, "bore");
    kent_derivation_put(d, "rho", m->water.density, KENT_DENSITY, KENT_COMPUTED,
                        "density of the water");
    kent_derivation_put(d, "g", m->gravity, KENT_ACCELERATION, KENT_GIVEN, "gravity");
    kent_derivation_work(d, "Ww", s->weight - kent_pull_pipe_weight(p, m->gravity),
                         KENT_FORCE_PER_LENGTH, "rho*g*pi*ID^2/4", "11.2",
                         "weight of the water in it");
    kent_derivation_put(d, "b", s->angle, KENT_ANGLE, KENT_COMPUTED, "its slope");
    kent_derivation_work(d, "Wb", s->along, KENT_FORCE_PER_LENGTH, "(Wp + Ww)*sin(b)",
                         "23.12", "what slides");
    kent_derivation_put(d, "SF", s->factor, KENT_RATIO,
                        isnan(m->loads.factor[KENT_CASE_STATIC]) ? KENT_CATALOGUE
                                                                 : KENT_GIVEN,
                        "factor");
}

static void derive_steep(const kent_model *m, kent_steep *s)
{
    kent_derivation *d = &s->derivation;
    char says[160];

    if (isnan(s->weight)) return;
    (void)snprintf(says, sizeof says, "Pipe \"%s\" on steep ground from %.30s to %.30s",
                   m->pipes[s->pipe].id, kent_said_station(m->units, s->from).s,
                   kent_said_station(m->units, s->to).s);
    kent_derivation_heading(d, says);
    derive_weight(m, s, d);
    if (!isnan(s->friction)) {
        kent_derivation_put(d, "fb", s->friction, KENT_FORCE_PER_LENGTH, KENT_COMPUTED,
                            "friction of sound ground across that slope, chapter 11");
        kent_derivation_work(d, "Nb", s->net, KENT_FORCE_PER_LENGTH,
                             "max(0, SF*Wb - fb)", "23.13", "what is left of it then");
    }
    if (s->anchors > 0) {
        kent_derivation_put(d, "sp", s->spacing, KENT_LENGTH, KENT_COMPUTED,
                            "between two anchors: whole pipes within 23.14");
        kent_derivation_work(d, "A", s->anchor_force, KENT_FORCE, "SF*Wb*sp", "23.15",
                             "one anchor, no friction counted");
        return;
    }
    kent_derivation_put(d, "Lb", s->end - s->start, KENT_LENGTH, KENT_COMPUTED,
                        "length of the steep stretch");
    kent_derivation_work(d, "H", s->hangs, KENT_FORCE,
                         isnan(s->friction) ? "SF*Wb*Lb" : "Nb*Lb", "23.16",
                         "on its upper end");
}

/* ---- stretches of a pipe --------------------------------------------------------- */

static kent_steep stretch(const kent_model *m, int pipe, size_t first, size_t last,
                          double slope)
{
    const size_t start = m->pipes[pipe].route_first;

    return (kent_steep){
        .pipe = pipe,
        .start = m->chainage[first] - m->chainage[start],
        .end = m->chainage[last] - m->chainage[start],
        .from = m->station_on[first],
        .to = m->station[last],
        .slope = slope,
        .angle = atan(fabs(slope)),
    };
}

void kent_steep_find(const kent_model *m, int pipe, kent_steep *out, size_t *count)
{
    const kent_pipe *p = &m->pipes[pipe];
    const double limit =
        m->rules.steepest_pipe > 0.0 ? m->rules.steepest_pipe : USUAL_STEEPEST;
    const double least = p->laying_length > 0.0 ? p->laying_length : SHORT;
    const size_t last = p->route_first + p->route_count - 1;

    for (size_t k = p->route_first; k < last;) {
        const double slope = slope_after(m, k);
        double steepest = slope;
        size_t end = k + 1;
        if (!(fabs(slope) > limit * (1.0 + 1e-9))) {
            k++;
            continue;
        }
        while (end < last && fabs(slope_after(m, end)) > limit * (1.0 + 1e-9) &&
               (slope_after(m, end) > 0.0) == (slope > 0.0)) {
            const double next = slope_after(m, end);
            if (fabs(next) > fabs(steepest)) steepest = next;
            end++;
        }
        kent_steep s = stretch(m, pipe, k, end, steepest);
        k = end;
        if (!(s.end - s.start > least)) continue;
        find_forces(m, &s);
        caution_steep(m, &s);
        derive_steep(m, &s);
        out[(*count)++] = s;
    }
}
