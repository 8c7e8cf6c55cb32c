#include "kent_summary.h"

#include "kent_pressures.h"
#include "kent_shown.h"
#include "kent_sink.h"
#include "kent_table.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

/* One fitting with everything known of it. */
typedef struct kent_row {
    const kent_results *results;
    const kent_model *model;
    kent_system units;
    size_t index; /* of the fitting */
    const kent_fitting *fitting;
    const kent_fitting_loads *loads;
    const kent_holding *holding;
    const kent_load_case *governing; /* NULL: none */
    const kent_instant *at;          /* NULL: none */
    kent_pressures pressures;
} kent_row;

static kent_row row_of(const kent_results *r, kent_system units, size_t fitting)
{
    kent_row row = {.results = r,
                    .model = r->model,
                    .units = units,
                    .index = fitting,
                    .fitting = &r->model->fittings[fitting],
                    .loads = &r->loads->fittings[fitting],
                    .holding = &r->restraints->fittings[fitting],
                    .pressures = kent_pressures_of(r, fitting)};
    row.at = kent_shown_instant(row.loads, row.holding);
    if (row.at) row.governing = &row.loads->cases[row.holding->governing];
    return row;
}

/* ---- columns of numbers: SI ------------------------------------------------------ */

static double station(const kent_row *r) { return r->fitting->station; }
static double angle(const kent_row *r) { return r->fitting->angle; }
static double size(const kent_row *r) { return r->fitting->size; }
static double branch(const kent_row *r) { return r->fitting->branch_size; }
static double time_at(const kent_row *r) { return r->at ? r->at->time : NAN; }
static double pressure(const kent_row *r) { return r->at ? r->at->pressure : NAN; }
static double design(const kent_row *r) { return r->holding->design_thrust; }
static double asked(const kent_row *r) { return r->holding->factor_asked; }
static double reached(const kent_row *r) { return r->holding->factor_reached; }
static double used(const kent_row *r) { return r->holding->utilisation; }
static double runner_up(const kent_row *r) { return r->holding->runner_up_load; }
static double joints(const kent_row *r) { return r->holding->restrained_length; }
static double curve_radius(const kent_row *r) { return r->fitting->curve_radius; }
static double curve_length(const kent_row *r) { return r->fitting->curve_length; }
static double cover(const kent_row *r) { return r->fitting->cover; }
static double rating(const kent_row *r)
{
    return r->pressures.rating[KENT_RATING_SERVICE];
}

static double surge_rating(const kent_row *r)
{
    return r->pressures.rating[KENT_RATING_SURGE];
}

static double test_rating(const kent_row *r)
{
    return r->pressures.rating[KENT_RATING_TEST];
}

static kent_vec3 thrust(const kent_row *r)
{
    return r->at ? r->at->balance.thrust : (kent_vec3){NAN, NAN, NAN};
}

static double thrust_x(const kent_row *r) { return thrust(r).x; }
static double thrust_y(const kent_row *r) { return thrust(r).y; }
static double thrust_z(const kent_row *r) { return thrust(r).z; }
static double whole(const kent_row *r) { return kent_vec3_length(thrust(r)); }
static double across(const kent_row *r)
{
    return r->at ? kent_thrust_horizontal(thrust(r)) : NAN;
}

static double azimuth(const kent_row *r)
{
    const kent_fitting *f = r->fitting;
    const bool schematic = f->point >= 0 && isnan(r->model->points[f->point].at.x);
    if (!r->at || schematic || across(r) <= 0.0) return NAN;
    return kent_thrust_azimuth(thrust(r));
}

/* rad above the level; downward it is negative. */
static double inclination(const kent_row *r)
{
    return r->at ? atan2(thrust(r).z, across(r)) : NAN;
}

static double highest_seal(const kent_row *r)
{
    double most = NAN;
    for (size_t i = 0; i < r->fitting->port_count; i++) {
        most = fmax(most, r->model->ports[r->fitting->port_first + i].seal_diameter);
    }
    return most;
}

static double of_block(const kent_row *r, double value)
{
    return r->holding->held && r->holding->block.type != KENT_BLOCK_NONE ? value : NAN;
}

static double block_width(const kent_row *r)
{
    return of_block(r, r->holding->block.width);
}
static double block_height(const kent_row *r)
{
    return of_block(r, r->holding->block.height);
}
static double block_thickness(const kent_row *r)
{
    return of_block(r, r->holding->block.thickness);
}
static double block_volume(const kent_row *r)
{
    return of_block(r, r->holding->block.volume);
}
static double block_area(const kent_row *r)
{
    return of_block(r, r->holding->block.bearing_area);
}
static double block_bearing(const kent_row *r)
{
    return of_block(r, r->holding->block.bearing_pressure);
}

static double of_face(const kent_row *r, double value)
{
    return r->holding->block.has_face ? of_block(r, value) : NAN;
}

static double face_width(const kent_row *r)
{
    return of_face(r, r->holding->block.face.width);
}
static double face_height(const kent_row *r)
{
    return of_face(r, r->holding->block.face.height);
}
static double face_thickness(const kent_row *r)
{
    return of_face(r, r->holding->block.face_thickness);
}
static double face_volume(const kent_row *r)
{
    return of_face(r, r->holding->block.face_volume);
}

static double steady(const kent_row *r)
{
    return r->pressures.at[KENT_PRESSURE_STEADY];
}
static double static_of(const kent_row *r)
{
    return r->pressures.at[KENT_PRESSURE_STATIC];
}
static double test(const kent_row *r) { return r->pressures.at[KENT_PRESSURE_TEST]; }
static double highest(const kent_row *r)
{
    return r->pressures.at[KENT_PRESSURE_HIGHEST];
}
static double lowest(const kent_row *r)
{
    return r->pressures.at[KENT_PRESSURE_LOWEST];
}

/* ---- columns of words ------------------------------------------------------------ */

static void point(const kent_row *r, kent_text *out)
{
    kent_text_add(out, "%s", r->fitting->id);
}

static void type(const kent_row *r, kent_text *out)
{
    kent_text_add(out, "%s", kent_fitting_type_word(r->fitting->type));
}

static void orientation(const kent_row *r, kent_text *out)
{
    if (r->fitting->type != KENT_BEND) return;
    kent_text_add(out, "%s", kent_orientation_word(r->fitting->orientation));
}

/* Of the drawings: its own, else the project's. */
static void sheet(const kent_row *r, kent_text *out)
{
    const char *own = r->fitting->stated.sheet;
    kent_text_add(out, "%s", own[0] != '\0' ? own : r->model->project.drawing);
}

static void role(const kent_row *r, kent_text *out)
{
    kent_text_add(out, "%s", kent_role_word(r->fitting->role));
}

/* How a branch without a pipe ends. */
static void branch_end(const kent_row *r, kent_text *out)
{
    const kent_branch_end end = r->fitting->branch.end;
    if (end != KENT_BRANCH_NONE) kent_text_add(out, "%s", kent_branch_end_word(end));
}

/* Points whose fittings are told as this one. */
static void members(const kent_row *r, kent_text *out)
{
    for (size_t i = 0; i < r->fitting->member_count; i++) {
        const int point = r->model->members[r->fitting->member_first + i];
        kent_text_add(out, "%s%s", i > 0 ? "; " : "", r->model->points[point].id);
    }
}

static void soil(const kent_row *r, kent_text *out)
{
    if (r->fitting->soil < 0) return;
    kent_text_add(out, "%s", r->model->soils[r->fitting->soil].id);
}

static void load_case(const kent_row *r, kent_text *out)
{
    if (r->governing) kent_text_add(out, "%s", r->governing->title.s);
}

static void sense(const kent_row *r, kent_text *out)
{
    if (r->governing) kent_text_add(out, "%s", kent_shown_sense(r->holding->sense));
}

static void march_name(const kent_model *m, kent_march march, kent_text *out)
{
    if (march.scenario < 0) return;
    const char *id = m->scenarios[march.scenario].id;
    kent_text_add(out, "%s", kent_name_in_state(m, id, march.state).s);
}

static void result_name(const kent_results *r, int index, kent_text *out)
{
    if (index < 0) return;
    const kent_scenario_result *s = &r->scenarios[index];
    march_name(r->model, (kent_march){s->scenario, s->state}, out);
}

static void scenario(const kent_row *r, kent_text *out)
{
    const kent_load_case *c = r->governing;
    if (c) march_name(r->results->model, (kent_march){c->scenario, c->state}, out);
}

static void highest_in(const kent_row *r, kent_text *out)
{
    result_name(r->results, r->pressures.highest_in, out);
}

static void lowest_in(const kent_row *r, kent_text *out)
{
    result_name(r->results, r->pressures.lowest_in, out);
}

static void pushes(const kent_row *r, kent_text *out)
{
    if (!r->at) return;
    kent_text_add(
        out, "%s",
        kent_shown_push(r->model, r->fitting, thrust(r), r->units, KENT_ROOMY).text);
}

static void restraint(const kent_row *r, kent_text *out)
{
    kent_text_add(out, "%s", kent_restraint_word(r->holding->chosen));
}

static void block_type(const kent_row *r, kent_text *out)
{
    const bool block = r->holding->held && r->holding->block.type != KENT_BLOCK_NONE;
    kent_text_add(out, "%s",
                  kent_block_word(block ? r->holding->block.type : KENT_BLOCK_NONE));
}

static void held(const kent_row *r, kent_text *out)
{
    kent_text_add(out, "%s",
                  r->holding->needs_nothing ? "not needed"
                  : r->holding->held        ? "yes"
                                            : "no");
}

static void runner_up_case(const kent_row *r, kent_text *out)
{
    const int i = r->holding->runner_up;
    if (i < 0 || (size_t)i >= r->loads->count) return;
    kent_text_add(out, "%s", r->loads->cases[i].title.s);
}

/* What the pressure acts on at each port, in port order. */
static void seals(const kent_row *r, kent_text *out)
{
    for (size_t i = 0; i < r->fitting->port_count; i++) {
        const kent_port *port = &r->model->ports[r->fitting->port_first + i];
        kent_text_add(out, "%s%.6g", i > 0 ? "; " : "",
                      kent_units_shown(KENT_DIAMETER, r->units, port->seal_diameter));
    }
}

static void cautions(const kent_row *r, kent_text *out)
{
    for (size_t i = 0; i < r->holding->cautions.count; i++) {
        kent_text_add(out, "%s%s", i > 0 ? "; " : "", r->holding->cautions.text[i]);
    }
}

/* ---- more of what holds it ------------------------------------------------------- */

static double margin(const kent_row *r) { return r->holding->runner_up_margin; }

static double other_way(const kent_row *r)
{
    return r->holding->other_way_count > 0 ? r->holding->other_ways[0].load : NAN;
}

static double block_share(const kent_row *r) { return r->holding->block_share; }
static double allowable(const kent_row *r) { return r->holding->allowable_bearing; }

static double passive(const kent_row *r)
{
    const kent_bearing_view *view = &r->holding->bearing;
    for (int k = 0; view->seen && k < KENT_BEARING_WAYS; k++) {
        if (view->ways[k].decides) return view->ways[k].passive;
    }
    return NAN;
}

/* NAN without a block, or where nothing drives (infinite). */
static double standing(const kent_row *r, double value)
{
    const kent_holding *h = r->holding;
    return h->held && h->stability.judged && isfinite(value) ? value : NAN;
}

static double sliding_work(const kent_row *r)
{
    return standing(r, r->holding->stability.sliding[KENT_AT_WORK].reached);
}
static double sliding_test(const kent_row *r)
{
    return standing(r, r->holding->stability.sliding[KENT_AT_TEST].reached);
}
static double overturning_work(const kent_row *r)
{
    return standing(r, r->holding->stability.overturning[KENT_AT_WORK].reached);
}
static double overturning_test(const kent_row *r)
{
    return standing(r, r->holding->stability.overturning[KENT_AT_TEST].reached);
}
static double base_work(const kent_row *r)
{
    return standing(r, r->holding->stability.base[KENT_AT_WORK].largest);
}
static double base_test(const kent_row *r)
{
    return standing(r, r->holding->stability.base[KENT_AT_TEST].largest);
}
static double off_work(const kent_row *r)
{
    return standing(r, r->holding->stability.base[KENT_AT_WORK].eccentricity);
}
static double off_test(const kent_row *r)
{
    return standing(r, r->holding->stability.base[KENT_AT_TEST].eccentricity);
}
static double eccentricity(const kent_row *r)
{
    return standing(r, r->holding->stability.eccentricity);
}
static double flotation_empty(const kent_row *r)
{
    return standing(r, r->holding->stability.flotation[0]);
}
static double flotation_full(const kent_row *r)
{
    return standing(r, r->holding->stability.flotation[1]);
}

static double of_straps(const kent_row *r, double value)
{
    return r->holding->held && r->holding->straps.legs > 0 ? value : NAN;
}

static double straps_number(const kent_row *r)
{
    return of_straps(r, r->holding->straps.legs);
}
static double straps_diameter(const kent_row *r)
{
    return of_straps(r, r->holding->straps.diameter);
}
static double straps_embedment(const kent_row *r)
{
    return of_straps(r, r->holding->straps.embedment);
}
static double straps_force(const kent_row *r)
{
    const kent_straps *s = &r->holding->straps;
    return r->holding->held && s->force > 0.0 ? s->force : NAN;
}

static double of_concrete(const kent_row *r, double value)
{
    return r->holding->held && r->holding->concrete.made ? value : NAN;
}

static double pressed(const kent_row *r)
{
    return of_concrete(r, r->holding->concrete.pressure);
}
static double strength(const kent_row *r)
{
    return of_concrete(r, r->holding->concrete.strength);
}
static double strength_needed(const kent_row *r)
{
    return of_concrete(r, r->holding->concrete.strength_needed);
}
static double days(const kent_row *r)
{
    return of_concrete(r, r->holding->concrete.age / 86400.0);
}
static double concrete(const kent_row *r)
{
    return of_concrete(r, r->holding->quantities.concrete);
}
static double excavation(const kent_row *r)
{
    return of_concrete(r, r->holding->quantities.excavation);
}
static double formed(const kent_row *r)
{
    return of_concrete(r, r->holding->quantities.formed);
}

static double block_instead(const kent_row *r)
{
    const kent_either *e = &r->holding->either;
    const bool instead = r->holding->chosen == KENT_RESTRAINED_JOINTS &&
                         e->block.type != KENT_BLOCK_NONE;
    return instead ? e->quantities.concrete : NAN;
}

/* The longest leg by a form. */
static double by_form(const kent_row *r, kent_length_form form)
{
    double longest = NAN;
    for (size_t i = 0; i < r->holding->leg_count; i++) {
        longest = fmax(longest, r->holding->legs[i].by_form[form]);
    }
    return longest;
}

static double handbook(const kent_row *r) { return by_form(r, KENT_FORM_HANDBOOK); }
static double etl(const kent_row *r) { return by_form(r, KENT_FORM_ETL); }

/* Of all legs; NAN where the length of one pipe is not known. */
static double joint_count(const kent_row *r)
{
    double count = 0.0;
    for (size_t i = 0; i < r->holding->leg_count; i++) {
        if (r->holding->legs[i].pipes == 0) return NAN;
        count += r->holding->legs[i].pipes;
    }
    return count > 0.0 ? count : NAN;
}

static double largest_pull(const kent_row *r)
{
    double largest = NAN;
    for (size_t i = 0; i < r->holding->leg_count; i++) {
        largest = fmax(largest, fabs(r->holding->legs[i].pull));
    }
    return largest;
}

/* The greatest of its restrained legs, as far as walls are known. */
static double wall_stress(const kent_row *r)
{
    const kent_pulls *pulls = &r->results->restraints->pulls;
    double greatest = NAN;
    for (size_t i = 0; i < pulls->leg_count; i++) {
        if (pulls->legs[i].fitting != r->index) continue;
        greatest = fmax(greatest, fabs(pulls->legs[i].stress));
    }
    return greatest;
}

static void area_basis(const kent_row *r, kent_text *out)
{
    static const char *const WORDS[] = {[KENT_AREA_OUTSIDE] = "outside",
                                        [KENT_AREA_INSIDE] = "bore",
                                        [KENT_AREA_NOMINAL] = "nominal"};
    kent_text_add(out, "%s", WORDS[r->model->loads.thrust_area]);
}

static void other_taken(const kent_row *r, kent_text *out)
{
    if (r->holding->other_way_count == 0) return;
    switch (r->holding->other_ways[0].taken) {
    case KENT_TAKEN_BY_NOTHING:
        kent_text_add(out, "nothing");
        return;
    case KENT_TAKEN_BY_FACE:
        kent_text_add(out, "face");
        return;
    case KENT_TAKEN_BY_FRICTION:
        kent_text_add(out, "friction");
        return;
    case KENT_TAKEN_BY_JOINTS:
        kent_text_add(out, "joints");
        return;
    }
}

static void bearing_way(const kent_row *r, kent_text *out)
{
    const kent_bearing_view *view = &r->holding->bearing;
    for (kent_way k = KENT_WAY_CONSTANT; view->seen && k < KENT_BEARING_WAYS; k++) {
        if (view->ways[k].decides) kent_text_add(out, "%s", kent_way_word(k));
    }
}

static void no_block(const kent_row *r, kent_text *out)
{
    const char *why = r->holding->either.no_block;
    if (why) kent_text_add(out, "%s", why);
}

/* Of each leg, in port order. */
static void lengths(const kent_row *r, kent_text *out)
{
    for (size_t i = 0; i < r->holding->leg_count; i++) {
        const double length =
            kent_units_shown(KENT_LENGTH, r->units, r->holding->legs[i].length);
        kent_text_add(out, "%s%.6g", i > 0 ? "; " : "", length);
    }
}

static void joints_hold(const kent_row *r, kent_text *out)
{
    const kent_either *e = &r->holding->either;
    if (!e->looked_at) return;
    kent_text_add(out, "%s", e->joints ? "yes" : e->no_length ? e->no_length : "no");
}

/* As the printed schedule numbers it. */
static void system_of(const kent_row *r, kent_text *out)
{
    const kent_systems *all = &r->results->restraints->systems;
    for (size_t i = 0; i < all->count; i++) {
        const size_t *fittings = &all->fittings[all->at[i].fitting_first];
        for (size_t k = 0; k < all->at[i].fitting_count; k++) {
            if (fittings[k] == r->index) kent_text_add(out, "S%zu", i + 1);
        }
    }
}

/* ---- the list -------------------------------------------------------------------- */

enum {
    NARROW = 1, /* the narrow table shows it already */
    UNITED = 2, /* words, but with the unit of `kind` in the heading */
    WHOLE = 4   /* a count */
};

/* What --wide prints together; each table begins with the point. */
typedef enum column_group {
    OF_LOADS,
    OF_THRUST,
    OF_GROUND,
    OF_STANDING,
    OF_CONCRETE,
    OF_JOINTS,
    OF_DRAWING,
    COLUMN_GROUPS
} column_group;

static const char *const GROUP_SAYS[COLUMN_GROUPS] = {
    [OF_LOADS] = "Loads",
    [OF_THRUST] = "Thrust, and what is pressed",
    [OF_GROUND] = "Ground, and what leans on it",
    [OF_STANDING] = "Whether blocks stay in place",
    [OF_CONCRETE] = "Concrete, and what it takes to build",
    [OF_JOINTS] = "Restrained joints",
    [OF_DRAWING] = "Drawing",
};

typedef struct kent_summary_column {
    const char *head;
    double (*number)(const kent_row *row); /* SI; NULL: words */
    void (*words)(const kent_row *row, kent_text *out);
    kent_kind kind;
    unsigned flags;
    column_group group;
} kent_summary_column;

static const kent_summary_column COLUMNS[] = {
    {"station", station, NULL, KENT_LENGTH, NARROW, OF_LOADS},
    {"point", NULL, point, KENT_RATIO, 0, OF_LOADS},
    {"fitting", NULL, type, KENT_RATIO, NARROW, OF_LOADS},
    {"angle", angle, NULL, KENT_ANGLE, NARROW, OF_LOADS},
    {"orientation", NULL, orientation, KENT_RATIO, NARROW, OF_LOADS},
    {"bore", size, NULL, KENT_DIAMETER, NARROW, OF_LOADS},
    {"other bore", branch, NULL, KENT_DIAMETER, NARROW, OF_LOADS},
    {"load case", NULL, load_case, KENT_RATIO, NARROW, OF_LOADS},
    {"scenario", NULL, scenario, KENT_RATIO, NARROW, OF_LOADS},
    {"time", time_at, NULL, KENT_TIME, NARROW, OF_LOADS},
    {"pressure", pressure, NULL, KENT_PRESSURE, NARROW, OF_LOADS},
    {"thrust", whole, NULL, KENT_FORCE, NARROW, OF_LOADS},
    {"pushes", NULL, pushes, KENT_RATIO, NARROW, OF_LOADS},
    {"restraint", NULL, restraint, KENT_RATIO, NARROW, OF_LOADS},
    {"held", NULL, held, KENT_RATIO, NARROW, OF_LOADS},
    {"block", NULL, block_type, KENT_RATIO, NARROW, OF_LOADS},
    {"width", block_width, NULL, KENT_LENGTH, NARROW, OF_LOADS},
    {"height", block_height, NULL, KENT_LENGTH, NARROW, OF_LOADS},
    {"thickness", block_thickness, NULL, KENT_LENGTH, NARROW, OF_LOADS},
    {"volume", block_volume, NULL, KENT_VOLUME, NARROW, OF_LOADS},
    {"factor reached", reached, NULL, KENT_RATIO, NARROW, OF_LOADS},
    {"load over resistance", used, NULL, KENT_RATIO, NARROW, OF_LOADS},
    {"factor asked", asked, NULL, KENT_RATIO, 0, OF_LOADS},
    {"sense", NULL, sense, KENT_RATIO, 0, OF_LOADS},
    {"factored thrust", design, NULL, KENT_FORCE, 0, OF_LOADS},
    {"thrust east", thrust_x, NULL, KENT_FORCE, 0, OF_THRUST},
    {"thrust north", thrust_y, NULL, KENT_FORCE, 0, OF_THRUST},
    {"thrust up", thrust_z, NULL, KENT_FORCE, 0, OF_THRUST},
    {"horizontal", across, NULL, KENT_FORCE, 0, OF_THRUST},
    {"azimuth", azimuth, NULL, KENT_ANGLE, 0, OF_THRUST},
    {"inclination", inclination, NULL, KENT_ANGLE, 0, OF_THRUST},
    {"largest seal diameter", highest_seal, NULL, KENT_DIAMETER, 0, OF_THRUST},
    {"seal diameters", NULL, seals, KENT_DIAMETER, UNITED, OF_THRUST},
    {"steady pressure", steady, NULL, KENT_PRESSURE, NARROW, OF_LOADS},
    {"static pressure", static_of, NULL, KENT_PRESSURE, NARROW, OF_LOADS},
    {"test pressure", test, NULL, KENT_PRESSURE, NARROW, OF_LOADS},
    {"highest pressure", highest, NULL, KENT_PRESSURE, NARROW, OF_LOADS},
    {"highest in", NULL, highest_in, KENT_RATIO, 0, OF_THRUST},
    {"lowest pressure", lowest, NULL, KENT_PRESSURE, NARROW, OF_LOADS},
    {"lowest in", NULL, lowest_in, KENT_RATIO, 0, OF_THRUST},
    {"rating", rating, NULL, KENT_PRESSURE, NARROW, OF_LOADS},
    {"rating with surge", surge_rating, NULL, KENT_PRESSURE, 0, OF_THRUST},
    {"rating under test", test_rating, NULL, KENT_PRESSURE, 0, OF_THRUST},
    {"runner-up", NULL, runner_up_case, KENT_RATIO, 0, OF_LOADS},
    {"runner-up factored thrust", runner_up, NULL, KENT_FORCE, 0, OF_LOADS},
    {"soil", NULL, soil, KENT_RATIO, 0, OF_GROUND},
    {"cover", cover, NULL, KENT_LENGTH, 0, OF_GROUND},
    {"area asked for", block_area, NULL, KENT_AREA, 0, OF_GROUND},
    {"bearing pressure", block_bearing, NULL, KENT_STRESS, 0, OF_GROUND},
    {"face width", face_width, NULL, KENT_LENGTH, 0, OF_GROUND},
    {"face height", face_height, NULL, KENT_LENGTH, 0, OF_GROUND},
    {"face thickness", face_thickness, NULL, KENT_LENGTH, 0, OF_GROUND},
    {"face volume", face_volume, NULL, KENT_VOLUME, 0, OF_GROUND},
    {"restrained length", joints, NULL, KENT_LENGTH, 0, OF_JOINTS},
    {"cautions", NULL, cautions, KENT_RATIO, NARROW, OF_LOADS},
    {"sheet", NULL, sheet, KENT_RATIO, 0, OF_DRAWING},
    {"role", NULL, role, KENT_RATIO, 0, OF_DRAWING},
    {"branch end", NULL, branch_end, KENT_RATIO, 0, OF_DRAWING},
    {"members", NULL, members, KENT_RATIO, 0, OF_DRAWING},
    {"curve radius", curve_radius, NULL, KENT_LENGTH, 0, OF_DRAWING},
    {"curve length", curve_length, NULL, KENT_LENGTH, 0, OF_DRAWING},
    {"margin over runner-up", margin, NULL, KENT_RATIO, 0, OF_LOADS},
    {"pressed on", NULL, area_basis, KENT_RATIO, 0, OF_THRUST},
    {"pushes another way", other_way, NULL, KENT_FORCE, 0, OF_LOADS},
    {"which is taken by", NULL, other_taken, KENT_RATIO, 0, OF_LOADS},
    {"block's share", block_share, NULL, KENT_RATIO, 0, OF_GROUND},
    {"bearing told by", NULL, bearing_way, KENT_RATIO, 0, OF_GROUND},
    {"allowable bearing", allowable, NULL, KENT_STRESS, 0, OF_GROUND},
    {"passive coefficient taken", passive, NULL, KENT_RATIO, 0, OF_GROUND},
    {"sliding", sliding_work, NULL, KENT_RATIO, 0, OF_STANDING},
    {"sliding under test", sliding_test, NULL, KENT_RATIO, 0, OF_STANDING},
    {"overturning", overturning_work, NULL, KENT_RATIO, 0, OF_STANDING},
    {"overturning under test", overturning_test, NULL, KENT_RATIO, 0, OF_STANDING},
    {"base pressure", base_work, NULL, KENT_STRESS, 0, OF_STANDING},
    {"base pressure under test", base_test, NULL, KENT_STRESS, 0, OF_STANDING},
    {"base off centre", off_work, NULL, KENT_LENGTH, 0, OF_STANDING},
    {"base off centre under test", off_test, NULL, KENT_LENGTH, 0, OF_STANDING},
    {"axis above face's middle", eccentricity, NULL, KENT_LENGTH, 0, OF_STANDING},
    {"flotation empty", flotation_empty, NULL, KENT_RATIO, 0, OF_STANDING},
    {"flotation full", flotation_full, NULL, KENT_RATIO, 0, OF_STANDING},
    {"straps", straps_number, NULL, KENT_RATIO, WHOLE, OF_STANDING},
    {"strap diameter", straps_diameter, NULL, KENT_DIAMETER, 0, OF_STANDING},
    {"strap embedment", straps_embedment, NULL, KENT_LENGTH, 0, OF_STANDING},
    {"strap force", straps_force, NULL, KENT_FORCE, 0, OF_STANDING},
    {"pressed by the fitting", pressed, NULL, KENT_STRENGTH, 0, OF_CONCRETE},
    {"strength at 28 days", strength, NULL, KENT_STRENGTH, 0, OF_CONCRETE},
    {"strength before test", strength_needed, NULL, KENT_STRENGTH, 0, OF_CONCRETE},
    {"days before test", days, NULL, KENT_RATIO, WHOLE, OF_CONCRETE},
    {"concrete", concrete, NULL, KENT_VOLUME, 0, OF_CONCRETE},
    {"excavation", excavation, NULL, KENT_VOLUME, 0, OF_CONCRETE},
    {"formed", formed, NULL, KENT_AREA, 0, OF_CONCRETE},
    {"concrete if a block", block_instead, NULL, KENT_VOLUME, 0, OF_CONCRETE},
    {"why no block", NULL, no_block, KENT_RATIO, 0, OF_CONCRETE},
    {"restrained lengths", NULL, lengths, KENT_LENGTH, UNITED, OF_JOINTS},
    {"by iron-pipe handbooks", handbook, NULL, KENT_LENGTH, 0, OF_JOINTS},
    {"by ETL 1110-3-446", etl, NULL, KENT_LENGTH, 0, OF_JOINTS},
    {"joints", joint_count, NULL, KENT_RATIO, WHOLE, OF_JOINTS},
    {"joints hold", NULL, joints_hold, KENT_RATIO, 0, OF_JOINTS},
    {"system", NULL, system_of, KENT_RATIO, 0, OF_JOINTS},
    {"largest pull", largest_pull, NULL, KENT_FORCE, 0, OF_JOINTS},
    {"stress in the wall", wall_stress, NULL, KENT_STRENGTH, 0, OF_JOINTS},
};
enum { COLUMN_COUNT = sizeof COLUMNS / sizeof COLUMNS[0] };

static bool has_unit(const kent_summary_column *c, kent_system units)
{
    return (c->number || (c->flags & UNITED)) &&
           kent_units_display(c->kind, units).unit[0] != '\0';
}

/* ---- as CSV ---------------------------------------------------------------------- */

void kent_summary_field(kent_text *out, const char *text)
{
    if (!strpbrk(text, ",\"\r\n")) {
        kent_text_add(out, "%s", text);
        return;
    }
    kent_text_add(out, "\"");
    for (const char *s = text; *s != '\0'; s++) {
        kent_text_add(out, *s == '"' ? "\"\"" : "%c", *s);
    }
    kent_text_add(out, "\"");
}

static void add_heading(const kent_summary_column *c, kent_system units, kent_text *out)
{
    kent_text_add(out, "%s", c->head);
    if (has_unit(c, units)) {
        kent_text_add(out, " [%s]", kent_units_display(c->kind, units).unit);
    }
}

static void add_field(const kent_row *row, const kent_summary_column *c,
                      kent_text *words, kent_text *out)
{
    if (!c->number) {
        kent_text_reset(words);
        c->words(row, words);
        kent_summary_field(out, kent_text_of(words));
        return;
    }
    const double value = kent_units_shown(c->kind, row->units, c->number(row));
    if (isfinite(value)) kent_text_add(out, "%.8g", value);
}

kent_status kent_report_summary_csv(const kent_results *r, const kent_report_options *o,
                                    kent_sink sink)
{
    kent_text out = {0}, words = {0};
    kent_listing listing;
    kent_status status = kent_listing_make(r, o, false, &listing);
    for (size_t c = 0; c < COLUMN_COUNT; c++) {
        if (c > 0) kent_text_add(&out, ",");
        add_heading(&COLUMNS[c], o->units, &out);
    }
    kent_text_add(&out, "\n");
    for (size_t i = 0; !status && i < listing.count; i++) {
        const kent_row row = row_of(r, o->units, listing.fitting[i]);
        for (size_t c = 0; c < COLUMN_COUNT; c++) {
            if (c > 0) kent_text_add(&out, ",");
            add_field(&row, &COLUMNS[c], &words, &out);
        }
        kent_text_add(&out, "\n");
        status = words.failed ? KENT_E_NOMEM : kent_sink_flush(sink, &out);
    }
    if (!status) status = kent_sink_flush(sink, &out);
    kent_listing_clear(&listing);
    kent_text_clear(&words);
    kent_text_clear(&out);
    return status;
}

/* ---- as the last tables of --wide ------------------------------------------------ */

static void add_cell(const kent_row *row, const kent_summary_column *c,
                     kent_text *words, kent_table *t)
{
    if (c->number) {
        const double value = c->number(row);
        kent_table_cell(t, "%s",
                        c->flags & WHOLE
                            ? kent_shown_number(value, 0).text
                            : kent_shown_quantity(c->kind, row->units, value).text);
        return;
    }
    kent_text_reset(words);
    c->words(row, words);
    const char *said = kent_text_of(words);
    kent_table_cell(t, "%s", said[0] != '\0' ? said : KENT_SHOWN_NONE);
}

/* Whether any of the fittings listed has something to say there. */
static bool says_anything(const kent_results *r, const kent_report_options *o,
                          const kent_listing *listing, const kent_summary_column *c,
                          kent_text *words)
{
    for (size_t i = 0; i < listing->count; i++) {
        const kent_row row = row_of(r, o->units, listing->fitting[i]);
        if (c->number && isfinite(c->number(&row))) return true;
        if (c->number) continue;
        kent_text_reset(words);
        c->words(&row, words);
        if (words->length > 0) return true;
    }
    return false;
}

static void group_table(const kent_results *r, const kent_report_options *o,
                        const kent_listing *listing, column_group group, kent_text *out)
{
    const kent_summary_column *chosen[COLUMN_COUNT];
    kent_column columns[COLUMN_COUNT];
    kent_shown units[COLUMN_COUNT];
    size_t count = 0;
    kent_text words = {0};
    for (size_t c = 0; c < COLUMN_COUNT; c++) {
        const bool first = COLUMNS[c].words == point;
        if (COLUMNS[c].flags & NARROW) continue;
        if (!first && (COLUMNS[c].group != group ||
                       !says_anything(r, o, listing, &COLUMNS[c], &words))) {
            continue;
        }
        const bool unit = has_unit(&COLUMNS[c], o->units);
        if (unit) units[count] = kent_shown_unit(COLUMNS[c].kind, o->units);
        columns[count] = (kent_column){.head = COLUMNS[c].head,
                                       .unit = unit ? units[count].text : "",
                                       .align = COLUMNS[c].number ? KENT_ALIGN_RIGHT
                                                                  : KENT_ALIGN_LEFT};
        chosen[count++] = &COLUMNS[c];
    }
    kent_table t = {.columns = columns, .column_count = count};
    for (size_t i = 0; count > 1 && i < listing->count; i++) {
        const kent_row row = row_of(r, o->units, listing->fitting[i]);
        for (size_t c = 0; c < count; c++) {
            add_cell(&row, chosen[c], &words, &t);
        }
    }
    if (t.cell_count > 0) {
        kent_text_add(out, "\n%s\n", GROUP_SAYS[group]);
        (void)kent_table_print(&t, 0, out);
    }
    out->failed = out->failed || words.failed;
    kent_table_clear(&t);
    kent_text_clear(&words);
}

void kent_summary_table(const kent_results *r, const kent_report_options *o,
                        const kent_listing *listing, kent_text *out)
{
    for (int group = 0; group < COLUMN_GROUPS; group++) {
        group_table(r, o, listing, (column_group)group, out);
    }
}
