#include "kent_alarm.h"

#include "kent_bearing.h"
#include "kent_duty_alarm.h"
#include "kent_said.h"
#include "kent_site_test.h"

#include <math.h>

/* What one alarm looks at and where it speaks. */
typedef struct watch {
    const kent_model *m;
    kent_steady *const *steadies; /* [count] */
    size_t count;
    kent_notes *cautions;
} watch;

/* Things of one kind that an alarm found: the first by name, all by number. */
typedef struct found {
    kent_text names;
    size_t count;
    size_t worst;     /* index of the one that is furthest off */
    double worst_off; /* how far, in whatever measure */
} found;

enum { NAMED = 6 };

static void find(found *f, const char *id, size_t index, double off)
{
    if (f->count < NAMED) {
        kent_text_add(&f->names, "%s%s", f->count > 0 ? ", " : "", id);
    }
    if (f->count == 0 || off > f->worst_off) {
        f->worst = index;
        f->worst_off = off;
    }
    f->count++;
}

/* Says "NAMES: WHAT", if anything was found, and lets go. */
static void tell(const watch *w, found *f, const char *kind, const char *what)
{
    if (f->count > NAMED) {
        kent_text_add(&f->names, " and %zu more", f->count - NAMED);
    }
    if (f->count > 0) {
        kent_notes_add(w->cautions, "%s%s %s: %s", kind, f->count > 1 ? "s" : "",
                       kent_text_of(&f->names), what);
    }
    w->cautions->failed = w->cautions->failed || f->names.failed;
    kent_text_clear(&f->names);
    *f = (found){0};
}

/* ---- streams --------------------------------------------------------------------- */

/* m/s: a main that flows seldom does so slower or faster. Common practice, no source.
 */
static const double SLOWEST = 0.05, FASTEST = 5.0;

/* m/s: slower is at rest. */
static const double AT_REST = 1e-5;

/* What a slip of a factor of 1000 would have to be; "": it would not be ordinary. */
static const char *slip_of(double speed)
{
    if (speed > FASTEST && speed / 1000.0 >= SLOWEST && speed / 1000.0 <= FASTEST) {
        return "; a thousandth of it would be ordinary: cubic metres written where "
               "litres were meant, or mega for milli?";
    }
    if (speed < SLOWEST && speed * 1000.0 >= SLOWEST && speed * 1000.0 <= FASTEST) {
        return "; a thousand times it would be ordinary: litres written where cubic "
               "metres were meant, or milli for mega?";
    }
    return "";
}

static void tell_speed(const watch *w, found *f, double speed, const char *what)
{
    kent_text words = {0};
    kent_text_add(&words, "steady flow is %s, at most %.3g %s%s", what,
                  kent_units_shown(KENT_SPEED, w->m->units, speed),
                  kent_said_unit(KENT_SPEED, w->m->units).s, slip_of(speed));
    tell(w, f, "pipe", kent_text_of(&words));
    kent_text_clear(&words);
}

/* m/s, the largest of a span in any state. */
static double speed_of(const watch *w, size_t span)
{
    double most = 0.0;
    for (size_t i = 0; i < w->count; i++) {
        if (!w->steadies[i]) continue;
        most = fmax(most, fabs(w->steadies[i]->span_flow[span]));
    }
    return most / w->m->spans[span].area;
}

static void too_fast(const watch *w)
{
    found f = {0};
    for (size_t i = 0; i < w->m->span_count; i++) {
        const double speed = speed_of(w, i);
        if (speed > FASTEST) find(&f, w->m->spans[i].id, i, speed);
    }
    const double worst = f.worst_off;
    tell_speed(w, &f, worst, "faster than most mains stand");
}

/* A pipe that flows in no state is at rest on purpose. */
static void too_slow(const watch *w)
{
    found f = {0};
    double most = 0.0;
    for (size_t i = 0; i < w->m->span_count; i++) {
        const double speed = speed_of(w, i);
        if (!(speed > AT_REST) || speed >= SLOWEST) continue;
        find(&f, w->m->spans[i].id, i, speed);
        most = fmax(most, speed);
    }
    tell_speed(w, &f, most, "almost at rest");
}

/* Share of its flow below which an outflow that goes by pressure hardly runs. Common
 * practice, no source. One that does not go by pressure should have all. */
static const double HARDLY_RUNS = 0.1, NEARLY_ALL = 0.999;

/* -: the least share of what is asked that an outflow gets in any state; in *asked,
 * m3/s, what that state asks. */
static double share_of(const watch *w, size_t outflow, double *asked)
{
    double least = 1.0;
    *asked = 0.0;
    for (size_t i = 0; i < w->count; i++) {
        const kent_steady *s = w->steadies[i];
        if (!s) continue;
        const kent_model *m = s->view ? s->view : w->m;
        const double flow = m->outflows[outflow].flow;
        if (!(flow > 0.0) || s->outflow[outflow] / flow >= least) continue;
        least = s->outflow[outflow] / flow;
        *asked = flow;
    }
    return least;
}

/* The steady flow then looks ordinary, and is not what the case asks. */
static void less_than_asked(const watch *w)
{
    const kent_model *m = w->m;
    found f = {0};
    double asked = 0.0, worst = 0.0;
    for (size_t i = 0; i < m->outflow_count; i++) {
        const bool by_pressure = m->outflows[i].pressure_dependent;
        const double share = share_of(w, i, &asked);
        if (!(share < (by_pressure ? HARDLY_RUNS : NEARLY_ALL))) continue;
        if (f.count == 0 || 1.0 - share > f.worst_off) worst = asked;
        find(&f, m->points[m->outflows[i].point].id, i, 1.0 - share);
    }
    if (f.count == 0) return;
    kent_text words = {0};
    kent_text_add(&words,
                  "the main brings %s of the %s asked at %s, and the pressure there is "
                  "used up: a flow in a wrong unit, or a main too small?",
                  kent_said_of(KENT_FLOW, m->units, (1.0 - f.worst_off) * worst).s,
                  kent_said_of(KENT_FLOW, m->units, worst).s,
                  m->points[m->outflows[f.worst].point].id);
    tell(w, &f, "outflow", kent_text_of(&words));
    kent_text_clear(&words);
}

/* ---- pipes ----------------------------------------------------------------------- */

/* Share of the computed wave speed outside of which a given one suits another wall.
 * Common practice, no source: free gas may slow a wave, nothing makes it much faster.
 */
static const double WAVE_LEAST = 0.6, WAVE_MOST = 1.25;

/* Without a wall to compute with: m/s between plastics (PE 200 .. 400, PVC 300 .. 500)
 * and metals (900 .. 1300), usual textbook values; Pa between their moduli. */
static const double WAVE_BETWEEN = 600.0, MODULUS_BETWEEN = 20e9;

/* m/s by the pipe's own wall; NAN: not known well enough. */
static double own_wave(const kent_model *m, const kent_pipe *p)
{
    const kent_wall wall = {.bore = p->inside_diameter,
                            .thickness = p->wall,
                            .modulus = p->modulus,
                            .poisson = p->poisson,
                            .lining = p->lining,
                            .lining_modulus = p->lining_modulus};
    return kent_wave_speed(&wall, p->axial_support, p->thin_wall, m->water.density,
                           m->water.bulk_modulus);
}

static void wave_of_another_wall(const watch *w)
{
    const kent_model *m = w->m;
    found f = {0};
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *p = &m->pipes[i];
        const double share = p->wave_speed / own_wave(m, p);
        if (!(share < WAVE_LEAST) && !(share > WAVE_MOST)) continue; /* NaN: none */
        find(&f, p->id, i, fabs(log(share)));
    }
    if (f.count == 0) return;
    const kent_pipe *worst = &m->pipes[f.worst];
    kent_text words = {0};
    kent_text_add(&words,
                  "the wave speed given, %s at %s, does not suit its wall, which makes "
                  "it %s: that of another material?",
                  kent_said_whole(KENT_SPEED, m->units, worst->wave_speed).s, worst->id,
                  kent_said_whole(KENT_SPEED, m->units, own_wave(m, worst)).s);
    tell(w, &f, "pipe", kent_text_of(&words));
    kent_text_clear(&words);
}

static void wave_of_another_material(const watch *w)
{
    const kent_model *m = w->m;
    found plastic = {0}, metal = {0};
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *p = &m->pipes[i];
        const bool slow = p->wave_speed < WAVE_BETWEEN;
        if (isnan(p->wave_speed) || !isnan(own_wave(m, p))) continue;
        if (!(p->modulus > 0.0) || (p->modulus < MODULUS_BETWEEN) == slow) continue;
        find(slow ? &plastic : &metal, p->id, i, p->wave_speed);
    }
    tell(w, &plastic, "pipe",
         "the wave speed given is that of plastic, the modulus is not");
    tell(w, &metal, "pipe",
         "the wave speed given is that of metal, the modulus is not");
}

/* kg/m3 between plastics (950 to 1450) and metals (7000 to 7900), usual textbook
 * values.
 */
static const double LIGHT = 1700.0, HEAVY = 5000.0;

/* A modulus given in place of the material's makes the wave speed of another. */
static void modulus_of_another_material(const watch *w)
{
    const kent_model *m = w->m;
    found plastic = {0}, metal = {0};
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *p = &m->pipes[i];
        const bool stiff = p->modulus >= MODULUS_BETWEEN;
        if (stiff && p->material_density < LIGHT) find(&plastic, p->id, i, p->modulus);
        if (p->modulus < MODULUS_BETWEEN && p->material_density > HEAVY) {
            find(&metal, p->id, i, p->modulus);
        }
    }
    tell(w, &plastic, "pipe", "the modulus is that of metal, the material is plastic");
    tell(w, &metal, "pipe", "the modulus is that of plastic, the material is metal");
}

/* Relative roughness at which Colebrook-White's chart ends. source Moody (1944) */
static const double ROUGHEST = 0.05;

static void roughness_in_a_wrong_unit(const watch *w)
{
    found f = {0};
    for (size_t i = 0; i < w->m->pipe_count; i++) {
        const kent_pipe *p = &w->m->pipes[i];
        const double relative = p->friction_coefficient / p->inside_diameter;
        if (p->friction != KENT_COLEBROOK_WHITE || !(relative > ROUGHEST)) continue;
        find(&f, p->id, i, relative);
    }
    tell(w, &f, "pipe",
         "the roughness is more than a twentieth of the bore: in a wrong unit?");
}

static void wall_in_a_wrong_unit(const watch *w)
{
    found f = {0};
    for (size_t i = 0; i < w->m->pipe_count; i++) {
        const kent_pipe *p = &w->m->pipes[i];
        const double share = p->wall / p->outside_diameter;
        if (share > 0.25) find(&f, p->id, i, share);
    }
    tell(
        w, &f, "pipe",
        "the wall is thicker than a quarter of the outside diameter: in a wrong unit?");
}

/* Hazen and Williams (1905) and handbooks list 60 (badly corroded) to 150. */
static void an_unlikely_hazen_williams(const watch *w)
{
    found f = {0};
    for (size_t i = 0; i < w->m->pipe_count; i++) {
        const kent_pipe *p = &w->m->pipes[i];
        const double c = p->friction_coefficient;
        if (p->friction != KENT_HAZEN_WILLIAMS || (c >= 60.0 && c <= 160.0)) continue;
        find(&f, p->id, i, fabs(c - 110.0));
    }
    tell(w, &f, "pipe", "hazen_williams_c lies outside 60 to 160, where pipes are");
}

/* ---- pressures and levels -------------------------------------------------------- */

static void water_about_to_boil(const watch *w)
{
    const kent_model *m = w->m;
    if (!(m->water.vapour_pressure > 0.5 * m->barometric)) return;
    kent_notes_add(w->cautions,
                   "the vapour pressure, %s, is near the barometric pressure of %s, "
                   "both absolute: water that is about to boil, or a gauge pressure?",
                   kent_said_of(KENT_STRESS, m->units, m->water.vapour_pressure).s,
                   kent_said_of(KENT_STRESS, m->units, m->barometric).s);
}

static void less_than_nothing(const watch *w)
{
    const kent_model *m = w->m;
    found f = {0};
    for (size_t i = 0; i < m->fitting_count; i++) {
        const kent_fitting *a = &m->fittings[i];
        for (size_t k = 0; k < a->port_count; k++) {
            const kent_port *port = &m->ports[a->port_first + k];
            if (port->kind != KENT_PORT_GIVEN) continue;
            if (port->pressure >= -m->barometric) continue;
            find(&f, a->id, i, -port->pressure);
            break;
        }
    }
    tell(w, &f, "fitting",
         "a port's pressure, gauge, lies more than an atmosphere below none: no water "
         "stands that");
}

/* m, the highest fixed level in any state; -INFINITY: none. */
static double highest_level(const kent_model *m)
{
    double highest = -INFINITY;
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        highest = fmax(highest, m->fixed_levels[i].level);
    }
    for (size_t i = 0; i < m->state_level_count; i++) {
        highest = fmax(highest, m->state_levels[i].level);
    }
    return highest;
}

static void main_above_its_water(const watch *w)
{
    const kent_model *m = w->m;
    const double level = highest_level(m);
    double lowest = INFINITY;
    for (size_t i = 0; i < m->route_count; i++) {
        lowest = fmin(lowest, m->points[m->route[i]].at.z);
    }
    if (isinf(level) || isinf(lowest) || level >= lowest) return;
    kent_notes_add(
        w->cautions,
        "still water, at most at %s, lies below the whole main, whose lowest "
        "point is at %s: levels of two datums, or depths for levels?",
        kent_said_of(KENT_LENGTH, m->units, level).s,
        kent_said_of(KENT_LENGTH, m->units, lowest).s);
}

/* m, of still water, where it stands highest; NAN: none is known. */
static double still_level(const kent_model *m)
{
    double level = NAN;
    for (size_t i = 0; i < m->span_count; i++) {
        level = fmax(level, kent_static_level(m, m->spans[i].node[0]));
    }
    return level;
}

/* Test and still water fall alike with height, so that one place tells for all; the
 * highest level tells for mains that are parted. Computed surge asks for more than
 * still water by its rule, and is not known yet. */
static void test_below_still_water(const watch *w)
{
    const kent_model *m = w->m;
    const int gauge = m->loads.test_gauge;
    if (gauge < 0 || (m->loads.test_rule != KENT_TEST_FIXED && w->count == 0)) return;
    const double test = kent_site_test_find(m, w->steadies, NULL).pressure;
    const double still = kent_model_pressure(m, still_level(m), m->points[gauge].at.z);
    if (!(test < still)) return; /* NaN: no test, or no still water */
    kent_notes_warn(w->cautions,
                    "the site test, %s at %s, is below the pressure of still water, "
                    "which brought to that level is %s: a gauge elsewhere, or a wrong "
                    "unit?",
                    kent_said_of(KENT_PRESSURE, m->units, test).s, m->points[gauge].id,
                    kent_said_of(KENT_PRESSURE, m->units, still).s);
}

/* A level of still water of the case's own presses less than its reservoirs do. */
static void still_water_below_its_levels(const watch *w)
{
    const kent_model *m = w->m;
    const double level = highest_level(m);
    if (!(m->loads.static_level < level)) return; /* NAN: none is given */
    kent_notes_warn(
        w->cautions,
        "static_level, %s, is below the highest water level of the case, %s: "
        "a main at rest is pressed harder than the case 'static' says",
        kent_said_of(KENT_LENGTH, m->units, m->loads.static_level).s,
        kent_said_of(KENT_LENGTH, m->units, level).s);
}

/* By volume at one atmosphere; sewage and aerated water hold less than 1 %. From
 * memory. */
static void much_free_gas(const watch *w)
{
    if (!(w->m->gas_content > 0.01)) return;
    kent_notes_add(
        w->cautions,
        "gas_content is %.3g: more than a hundredth of free gas by volume is "
        "no longer a full pipe",
        w->m->gas_content);
}

/* ---- stations -------------------------------------------------------------------- */

/* A leg may be counted in plan or in space, along its arc or its tangents; beyond that
 * 1 %, as a length may be off, and 0.1 m, as stations are rounded. */
static const double STATION_SHARE = 0.01, STATION_ROUNDING = 0.1;

/* m, by how much the stations of the leg that ends at a stop are off the ground. */
static double station_gap(const kent_model *m, size_t stop)
{
    const kent_vec3 leg =
        kent_vec3_sub(m->points[m->route[stop]].at, m->points[m->route[stop - 1]].at);
    const double along = m->chainage[stop] - m->chainage[stop - 1];
    const double least = fmin(along, hypot(leg.x, leg.y)); /* NAN: no x and y */
    const double most = fmax(along, kent_vec3_length(leg));
    const double counted = m->station[stop] - m->station_on[stop - 1];
    return fmax(least - counted, counted - most) - STATION_SHARE * most -
           STATION_ROUNDING;
}

static void stations_off_the_ground(const watch *w)
{
    const kent_model *m = w->m;
    found f = {0};
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *p = &m->pipes[i];
        for (size_t k = 1; k < p->route_count; k++) {
            const size_t stop = p->route_first + k;
            const double gap = station_gap(m, stop);
            if (gap > 0.0) find(&f, m->points[m->route[stop]].id, stop, gap);
        }
    }
    if (f.count == 0) return;
    const size_t off = f.worst;
    kent_text words = {0};
    kent_text_add(
        &words,
        "stations do not fit coordinates or lengths: \"%s\" is counted %s on from "
        "\"%s\" "
        "and lies %s from it; a misread station, or a station_ahead left out?",
        m->points[m->route[off]].id,
        kent_said_of(KENT_LENGTH, m->units, m->station[off] - m->station_on[off - 1]).s,
        m->points[m->route[off - 1]].id,
        kent_said_of(KENT_LENGTH, m->units, m->chainage[off] - m->chainage[off - 1]).s);
    tell(w, &f, "point", kent_text_of(&words));
    kent_text_clear(&words);
}

/* A station equation that counts back makes two places of one station. */
static void zones_at_two_places(const watch *w)
{
    const kent_model *m = w->m;
    for (size_t i = 0; i < m->ground_zone_count; i++) {
        const kent_ground_zone *z = &m->ground_zones[i];
        const kent_pipe *p = &m->pipes[z->pipe];
        for (size_t k = 1; k + 1 < p->route_count; k++) {
            const size_t stop = p->route_first + k;
            const bool twice =
                fmax(z->from, m->station_on[stop]) < fmin(z->to, m->station[stop]);
            if (!twice) continue;
            kent_notes_add(
                w->cautions,
                "ground_zone on \"%s\" from %s to %s: stations there are "
                "counted before \"%s\" and again after it, and the zone holds "
                "at both places",
                p->id, kent_said_station(m->units, z->from).s,
                kent_said_station(m->units, z->to).s, m->points[m->route[stop]].id);
        }
    }
}

/* ---- ground ---------------------------------------------------------------------- */

static void unlikely_cover(const watch *w)
{
    found f = {0};
    for (size_t i = 0; i < w->m->fitting_count; i++) {
        const kent_fitting *a = &w->m->fittings[i];
        if (!(a->cover < 0.3) && !(a->cover > 10.0)) continue; /* NaN: not stated */
        find(&f, a->id, i, a->cover);
    }
    tell(w, &f, "fitting",
         w->m->units == KENT_SI
             ? "cover below 0.3 m or above 10 m: ground to crown, in the right unit?"
             : "cover below 1 ft or above 33 ft: ground to crown, in the right unit?");
}

/* At the fittings that lean on it; a run says it of each. */
static void bearing_beyond_the_ground(const watch *w)
{
    const kent_model *m = w->m;
    found f = {0};
    kent_bearing_claim worst = {0};
    for (size_t i = 0; i < m->fitting_count; i++) {
        const kent_fitting *a = &m->fittings[i];
        const kent_bearing_place at = {.depth = a->cover + 0.5 * a->outside_diameter,
                                       .water_table = a->water_table,
                                       .water = m->rules.water_unit_weight};
        kent_bearing_claim claim;
        if (a->soil < 0 || a->within_deflection) continue;
        if (m->soils[a->soil].unreliable) continue;
        if (a->restraint != KENT_THRUST_BLOCK && a->restraint != KENT_ANCHOR_BLOCK) {
            continue;
        }
        if (!kent_bearing_claims(&m->soils[a->soil], &at, &claim)) continue;
        if (!(claim.passive > KENT_PASSIVE_UNLIKELY)) continue;
        if (f.count == 0 || claim.passive > worst.passive) worst = claim;
        find(&f, a->id, i, claim.passive);
    }
    if (f.count == 0) return;
    kent_text words = {0};
    kent_text_add(&words,
                  "the bearing asks for a passive coefficient of up to %.1f (%s, soil "
                  "%s, at %s), which is unlikely: 40 degrees of friction give %.1f",
                  worst.passive, kent_said_of(KENT_STRESS, m->units, worst.bearing).s,
                  m->soils[m->fittings[f.worst].soil].id, m->fittings[f.worst].id,
                  KENT_PASSIVE_UNLIKELY);
    tell(w, &f, "fitting", kent_text_of(&words));
    kent_text_clear(&words);
}

/* ---- pumps ----------------------------------------------------------------------- */

/* GD2 is four times the moment of inertia; about forty times where the weight in it was
 * taken for newtons (4 g). The estimate itself is good to half and twice. */
static void inertia_of_another_notation(const watch *w)
{
    static const double SUSPECT = 2.8; /* between twice and four times */
    const kent_model *m = w->m;
    found f = {0};
    for (size_t i = 0; i < m->pump_count; i++) {
        const kent_pump *p = &m->pumps[i];
        const kent_pump_curve *c = &p->curve;
        if (p->inertia_estimated) continue;
        const double usual = kent_pump_inertia_estimate(
            c->rated_torque * c->rated_speed, c->rated_speed);
        const double times = p->inertia / usual;
        if (times >= SUSPECT) find(&f, p->id, i, times);
    }
    if (f.count == 0) return;
    kent_text words = {0};
    kent_text_add(&words,
                  "moment of inertia up to %.2g times what pumps of that power and "
                  "speed usually have; GD2 is four times the moment of inertia: is it "
                  "that, or is there a flywheel? Too much of it makes a trip look "
                  "harmless",
                  f.worst_off);
    tell(w, &f, "pump", kent_text_of(&words));
    kent_text_clear(&words);
}

/* Pa: water between 0 and 100 degC lies well within (theory chapter 1). */
static const double SOFTEST_WATER = 1.8e9, HARDEST_WATER = 2.5e9;

static void modulus_of_no_water(const watch *w)
{
    const double k = w->m->water.bulk_modulus;

    if (k >= SOFTEST_WATER && k <= HARDEST_WATER) return;
    kent_notes_add(
        w->cautions,
        "bulk_modulus of the water is %.2f GPa (%.0f ksi): water has 2.0 to "
        "2.4 GPa (285 to 340 ksi); was it turned from one unit into another?",
        k / 1e9, k / 6.894757e6);
}

/* ---- the list -------------------------------------------------------------------- */

static const struct {
    void (*look)(const watch *w);
    bool in_run; /* else the fittings' own cautions say it */
} ALARMS[] = {
    {too_fast, true},
    {too_slow, true},
    {less_than_asked, true},
    {wave_of_another_wall, true},
    {wave_of_another_material, true},
    {modulus_of_another_material, true},
    {roughness_in_a_wrong_unit, true},
    {wall_in_a_wrong_unit, true},
    {an_unlikely_hazen_williams, true},
    {water_about_to_boil, true},
    {less_than_nothing, true},
    {main_above_its_water, true},
    {test_below_still_water, true},
    {still_water_below_its_levels, true},
    {stations_off_the_ground, true},
    {zones_at_two_places, true},
    {much_free_gas, true},
    {modulus_of_no_water, true},
    {unlikely_cover, true},
    {inertia_of_another_notation, true},
    {bearing_beyond_the_ground, false},
};

void kent_alarms_raise(const kent_model *m, kent_steady *const *steadies, size_t count,
                       kent_alarm_reader reader, kent_notes *cautions)
{
    const watch w = {m, steadies, count, cautions};
    for (size_t i = 0; i < sizeof ALARMS / sizeof ALARMS[0]; i++) {
        if (ALARMS[i].in_run || reader == KENT_ALARM_CHECK) {
            ALARMS[i].look(&w);
        }
    }
    kent_duty_alarms_raise(m, steadies, count, cautions);
}
