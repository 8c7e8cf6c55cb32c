#include "kent_stability_internal.h"

#include <stdio.h>

static const double PI = 3.14159265358979323846;

/* Cosine of 45 degrees: a thrust further from the way of the face is another way. */
static const double SAME_WAY = 0.70710678118654752;

static const double SLACK = 1e-5; /* as sides of steps may be short of an area */

/* ---- the body -------------------------------------------------------------------- */

/* N that the face may bear, its hole left out: what of it is centred on the axis.
 * source docs/theory/25-as-built.md, 25.2 */
static double face_bears(const kent_holding_work *w, const kent_block *b,
                         double axis_above)
{
    const bool face = b->type == KENT_BLOCK_BEARING || b->has_face;
    const double part = kent_built_share(b->face.height, axis_above);
    const double area = b->face.width * b->face.height * part - w->site.hole;
    return face && area > 0.0 && w->site.allowable > 0.0 ? area * w->site.allowable
                                                         : 0.0;
}

kent_body kent_body_of(const kent_holding_work *w, const kent_block *b,
                       double axis_above)
{
    const kent_site *site = &w->site;
    const kent_rules *rules = &w->m->rules;
    const bool base = b->type == KENT_BLOCK_BASE;
    const bool bearing = b->type == KENT_BLOCK_BEARING;
    kent_body body = {
        .length = base ? fmin(b->width, b->height) : b->thickness,
        .breadth = base ? fmax(b->width, b->height) : b->width,
        .height = base ? b->thickness : b->height,
        .concrete = b->volume - (bearing ? site->hole * b->thickness : 0.0),
        .face = face_bears(w, b, axis_above),
    };
    const bool own = bearing || b->own_side; /* the face is the body's own */

    body.axis = base ? body.height + 0.5 * site->diameter
                     : 0.5 * body.height + (own ? axis_above : 0.0);
    body.foot = kent_site_axis(site) + body.axis;
    body.upright = bearing && !(site->hole > 0.0) ? body.length : 0.5 * body.length;
    body.unit_weight = kent_site_concrete(site, rules, body.foot);
    body.prism =
        b->type == KENT_BLOCK_GRAVITY
            ? kent_gravity_prism(rules, site, body.length * body.breadth, body.height)
            : 0.0;
    return body;
}

/* source docs/theory/20-stability.md, 20.5 .. 20.10 */
kent_push kent_push_on(const kent_body *body, const kent_soil *soil, double sideways,
                       double up, double down, double increase)
{
    const double weight = body->concrete * body->unit_weight + body->prism;
    const double half = 0.5 * body->length;
    kent_push p = {.sideways = sideways, .up = up, .down = down};

    p.face = body->face * fmax(1.0, increase);
    p.normal = weight + down - up;
    p.steadies = weight * half + down * body->upright + p.face * body->axis;
    p.topples = sideways * body->axis + up * body->upright;
    p.moment = (sideways - fmin(sideways, p.face)) * body->axis +
               (down - up) * (half - body->upright);
    if (!(p.normal > 0.0)) return p;
    p.base = kent_base_pressure_of(p.normal, p.moment, body->length, body->breadth);
    p.area = p.base.pressed * body->breadth;
    if (soil) {
        p.friction = kent_base_friction(p.normal, soil->base_friction,
                                        soil->base_cohesion, p.area);
    }
    return p;
}

kent_push kent_push_of(const kent_holding_work *w, const kent_holding *h,
                       const kent_body *body, const kent_load_case *c, kent_sense sense)
{
    const double share = isnan(h->block_share) ? 1.0 : h->block_share;
    const kent_vec3 t = kent_vec3_scale(share, kent_instant_lasting(&c->worst[sense]));
    const double *load = w->demand.load; /* what is negligible is left out here too */

    return kent_push_on(body, w->soil,
                        load[KENT_SIDEWAYS] > 0.0 ? kent_thrust_horizontal(t) : 0.0,
                        load[KENT_UPWARD] > 0.0 ? fmax(0.0, t.z) : 0.0,
                        load[KENT_DOWNWARD] > 0.0 ? fmax(0.0, -t.z) : 0.0, c->increase);
}

/* ---- every case ------------------------------------------------------------------ */

/* Where a face stands: level, of length 1. */
typedef struct face_way {
    double x, y;
    bool both; /* another stands behind */
} face_way;

/* Whether an instant pushes the way that the face stands, or either way of two. */
static bool faces(const kent_holding_work *w, const face_way *side, kent_vec3 t)
{
    const double level = kent_thrust_horizontal(t);
    const double along = t.x * side->x + t.y * side->y;

    if (!(w->demand.load[KENT_SIDEWAYS] > 0.0) || !(level > 0.0)) return true;
    if (w->site.all_round) return true;
    return (side->both ? fabs(along) : along) >= SAME_WAY * level;
}

static kent_stand stand_none(void)
{
    return (kent_stand){.reached = NAN, .load_case = -1};
}

/* Whether b leaves less of what it is asked than a does. */
static bool leaves_less(const kent_stand *a, const kent_stand *b)
{
    const double unit_a = a->asked > 0.0 ? a->asked : 1.0;
    const double unit_b = b->asked > 0.0 ? b->asked : 1.0;

    if (isnan(a->reached)) return isfinite(b->reached);
    return b->reached / unit_b < a->reached / unit_a;
}

static bool take_least(kent_stand *least, kent_stand found)
{
    if (!leaves_less(least, &found)) return false;
    *least = found;
    return true;
}

/* source docs/theory/20-stability.md, 20.16 */
static double asked_of(const kent_rules *rules, const kent_load_case *c, double usual)
{
    const bool test = c->kind == KENT_CASE_TEST;
    const bool own = test && rules->factor_stability_test > 0.0;
    const double asked = own ? rules->factor_stability_test : usual;
    const double beside =
        test && !isnan(rules->factor_test) ? rules->factor_test : rules->safety_factor;
    return fmin(asked, c->safety_factor * fmax(1.0, asked / beside));
}

/* A bearing block weighs about what the ground did that it replaces: it is asked for
 * what more it carries alone. */
static double pressure_asked(const kent_holding_work *w, const kent_block *b)
{
    const kent_rules *rules = &w->m->rules;
    const bool carries =
        b->type != KENT_BLOCK_BEARING || w->demand.load[KENT_DOWNWARD] > 0.0;
    const bool asks = rules->factor_sliding > 0.0 || rules->factor_overturning > 0.0;
    return asks && carries ? 1.0 : 0.0;
}

static void judge_push(const kent_holding_work *w, const kent_block *b,
                       const kent_push *p, kent_stand at, kent_stability *out)
{
    const kent_rules *rules = &w->m->rules;
    const kent_load_case *c = &w->loads->cases[at.load_case];
    const kent_hour hour = c->kind == KENT_CASE_TEST ? KENT_AT_TEST : KENT_AT_WORK;
    kent_stand it = at;

    it.asked = asked_of(rules, c, rules->factor_sliding);
    it.reached = kent_sliding_factor(p->face, 0.0, p->friction, p->sideways);
    (void)take_least(&out->sliding[hour], it);
    it.asked = asked_of(rules, c, rules->factor_overturning);
    it.reached = kent_overturning_factor(p->steadies, p->topples);
    (void)take_least(&out->overturning[hour], it);
    if (!(p->normal > 0.0)) return;
    it.asked = pressure_asked(w, b);
    it.reached = w->site.vertical * fmax(1.0, c->increase) / p->base.largest;
    if (take_least(&out->pressure[hour], it)) out->base[hour] = p->base;
}

static void judge_cases(const kent_holding_work *w, const kent_holding *h,
                        const kent_block *b, const kent_body *body, kent_stability *out)
{
    const int governs = h->by_sense[KENT_SIDEWAYS];
    face_way side = {.both = w->site.hole > 0.0 || h->chosen == KENT_ANCHOR_BLOCK};

    if (governs >= 0) {
        const kent_vec3 t =
            kent_instant_lasting(&w->loads->cases[governs].worst[KENT_SIDEWAYS]);
        const double level = kent_thrust_horizontal(t);
        side.x = t.x / level;
        side.y = t.y / level;
        out->moment = level * out->eccentricity;
    }
    for (size_t i = 0; i < w->loads->count; i++) {
        const kent_load_case *c = &w->loads->cases[i];
        for (kent_sense s = KENT_RESULTANT; s < KENT_SENSES; s++) {
            if (!c->worst[s].set) continue;
            if (!faces(w, &side, kent_instant_lasting(&c->worst[s]))) continue;
            const kent_push p = kent_push_of(w, h, body, c, s);
            judge_push(w, b, &p, (kent_stand){.load_case = (int)i, .sense = s}, out);
        }
    }
}

/* The block before the main is filled: nothing pushes, and all of it presses. */
static void judge_rest(const kent_holding_work *w, const kent_block *b,
                       const kent_body *body, kent_stability *out)
{
    const kent_push p = kent_push_on(body, w->soil, 0.0, 0.0, 0.0, 1.0);
    const kent_stand rest = {
        .reached = w->site.vertical / p.base.largest,
        .asked = pressure_asked(w, b),
        .load_case = -1,
    };
    if (take_least(&out->pressure[KENT_AT_WORK], rest)) {
        out->base[KENT_AT_WORK] = p.base;
    }
}

/* ---- flotation ------------------------------------------------------------------- */

/* The widest pipe that meets here; NULL: none of the case's. */
static const kent_pipe *pipe_here(const kent_holding_work *w)
{
    const kent_pipe *widest = NULL;

    for (size_t k = 0; k < w->fitting->port_count; k++) {
        const kent_port *port = &w->m->ports[w->fitting->port_first + k];
        if (port->span < 0) continue;
        const kent_pipe *p = &w->m->pipes[w->m->spans[port->span].pipe];
        if (!widest || p->outside_diameter > widest->outside_diameter) widest = p;
    }
    return widest;
}

/* m3 of water that block and pipe displace. source 20.12 */
static double displaced(const kent_holding_work *w, const kent_body *body,
                        double pipe_length)
{
    const double table = w->site.water_table, od = w->site.diameter;
    const double invert = kent_site_axis(&w->site) + 0.5 * od;

    if (isinf(table)) return 0.0;
    double wet = fmin(fmax(body->foot - table, 0.0), body->height);
    if (isnan(body->foot)) wet = body->height; /* no cover: as if all of it were */
    const double pipe = table >= invert ? 0.0 : 0.25 * PI * od * od * pipe_length;
    return body->length * body->breadth * wet + pipe;
}

/* source docs/theory/20-stability.md, 20.11, 20.12 */
static void judge_flotation(const kent_holding_work *w, const kent_block *b,
                            const kent_body *body, kent_stability *out)
{
    const kent_rules *rules = &w->m->rules;
    const kent_pipe *pipe = pipe_here(w);
    const double own = pipe ? kent_leg_pipe_weight(pipe, w->m->gravity) : (double)NAN;

    out->pipe_length = b->width;
    out->pipe_weight_known = !isnan(own);
    out->flotation_asked =
        b->type == KENT_BLOCK_GRAVITY ? rules->factor_flotation : 0.0;
    const double volume = displaced(w, body, out->pipe_length);
    out->displaced = volume;
    if (!(volume > 0.0)) return;
    const double bore = pipe ? pipe->inside_diameter : 0.0;
    const double water = w->m->water.density * w->m->gravity * 0.25 * PI * bore * bore;
    const double empty = body->concrete * rules->concrete_unit_weight + body->prism +
                         (isnan(own) ? 0.0 : own * out->pipe_length);
    out->flotation[0] = kent_flotation_factor(empty, volume, rules->water_unit_weight);
    out->flotation[1] = kent_flotation_factor(empty + water * out->pipe_length, volume,
                                              rules->water_unit_weight);
}

/* ---- the whole ------------------------------------------------------------------- */

static bool falls_short(const kent_stand *s)
{
    return s->reached * (1.0 + SLACK) < s->asked; /* NaN: nothing of the kind */
}

static bool floats(const kent_stability *s)
{
    return s->flotation[0] * (1.0 + SLACK) < s->flotation_asked;
}

static bool presses_too_hard(const kent_stability *s)
{
    return falls_short(&s->pressure[KENT_AT_WORK]) ||
           falls_short(&s->pressure[KENT_AT_TEST]);
}

void kent_stability_find(const kent_holding_work *w, const kent_holding *h,
                         const kent_block *b, double axis_above, kent_stability *out)
{
    const kent_soil *soil = w->soil;

    *out = (kent_stability){.flotation = {NAN, NAN}, .eccentricity = axis_above};
    for (kent_hour k = KENT_AT_WORK; k < KENT_HOURS; k++) {
        out->sliding[k] = out->overturning[k] = out->pressure[k] = stand_none();
    }
    if (b->type == KENT_BLOCK_NONE) return;
    const kent_body body = kent_body_of(w, b, axis_above);
    out->judged = true;
    out->weight = body.concrete * body.unit_weight + body.prism;
    out->soil_above = body.prism;
    out->friction_known =
        soil && (!isnan(soil->base_friction) || !isnan(soil->base_cohesion));
    out->bearing_known = w->site.vertical > 0.0;
    judge_cases(w, h, b, &body, out);
    judge_rest(w, b, &body, out);
    judge_flotation(w, b, &body, out);
    out->stands = !floats(out) && !presses_too_hard(out);
    for (kent_hour k = KENT_AT_WORK; k < KENT_HOURS; k++) {
        if (falls_short(&out->sliding[k]) || falls_short(&out->overturning[k])) {
            out->stands = false;
        }
    }
}

kent_fault kent_stability_settle(const kent_holding_work *w, kent_holding *h)
{
    const kent_rules *rules = &w->m->rules;

    for (;;) {
        kent_stability_find(w, h, &h->block, 0.0, &h->stability);
        if (h->stability.stands) return KENT_FAULT_NONE;
        const bool flatter = h->block.flatter || presses_too_hard(&h->stability);
        if (!kent_block_widen(rules, &w->site, &w->demand, flatter, &h->block)) {
            return KENT_FAULT_STABILITY;
        }
    }
}

void kent_stability_tell(const kent_holding_work *w, kent_holding *h)
{
    if (h->block.type == KENT_BLOCK_NONE) return;
    const kent_body body = kent_body_of(w, &h->block, 0.0);
    kent_stability_find(w, h, &h->block, 0.0, &h->stability);
    h->straps = kent_straps_choose(&w->m->rules, w->demand.load[KENT_UPWARD],
                                   fmin(body.axis, body.height));
}

/* ---- in words -------------------------------------------------------------------- */

static bool say_short(const kent_stand *s, const char *what, char *out, size_t size)
{
    if (!falls_short(s)) return false;
    (void)snprintf(out, size, "%s %.2f where %.2f is asked", what, s->reached,
                   s->asked);
    return true;
}

void kent_stability_says(const kent_stability *s, char *out, size_t size)
{
    out[0] = '\0';
    for (kent_hour k = KENT_AT_WORK; k < KENT_HOURS; k++) {
        if (say_short(&s->sliding[k], "sliding", out, size)) return;
        if (say_short(&s->overturning[k], "overturning", out, size)) return;
        if (say_short(&s->pressure[k], "pressure under the base", out, size)) return;
    }
    if (!floats(s)) return;
    (void)snprintf(out, size, "flotation %.2f where %.2f is asked", s->flotation[0],
                   s->flotation_asked);
}
