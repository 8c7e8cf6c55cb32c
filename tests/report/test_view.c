/* What `check` says, section by section, of small models. */
#include "kent_build.h"
#include "kent_check.h"
#include "kent_view.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

static int gather(void *to, const char *piece, size_t length)
{
    kent_text_add(to, "%.*s", (int)length, piece);
    return 0;
}

/* What is printed of a derived model without a steady state, on one line each; the
 * caller clears it. */
static kent_text printed(const kent_build *b, kent_system units, bool wide)
{
    kent_text out = {0};
    const kent_report_options o = {.units = units, .wide = wide};
    const kent_sink sink = {gather, &out};
    assert_int_equal(kent_report_check(b->model, NULL, &o, sink), KENT_OK);
    return out;
}

static void assert_says(const kent_build *b, kent_system units, const char *words)
{
    kent_text out = printed(b, units, true);
    if (!strstr(kent_text_of(&out), words)) {
        fail_msg("'%s' is not in:\n%s", words, kent_text_of(&out));
    }
    kent_text_clear(&out);
}

static void assert_silent(const kent_build *b, const char *words)
{
    kent_text out = printed(b, KENT_SI, true);
    if (strstr(kent_text_of(&out), words)) {
        fail_msg("'%s' is in:\n%s", words, kent_text_of(&out));
    }
    kent_text_clear(&out);
}

/* A level main from a tank, through a bend of so many degrees to the left, to a dead
 * end. */
static kent_build bent_main(double degrees)
{
    kent_build b = kent_build_new();
    const double turn = degrees * 3.14159265358979323846 / 180.0;
    kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    kent_build_point(&b, "P", 100.0, 0.0, 10.0);
    kent_build_point(&b, "E", 100.0 + 200.0 * cos(turn), 200.0 * sin(turn), 10.0);
    kent_build_pipe(&b, "A", "R P E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 40.0);
    return b;
}

/* ---- turns ----------------------------------------------------------------------- */

/* 90, 45, 22.5, 11.25 degrees (leaflets of ductile iron fittings; NFPA 24's thrust
 * table, whose 5 1/8 is from memory and of US measures only). */
static void a_turn_is_named_by_the_standard_bend_within_half_a_degree(void **state)
{
    (void)state;
    static const struct {
        double turn;
        const char *si, *us;
    } TURNS[] = {{90.0, "a standard bend, 90°", "a standard bend, 90°"},
                 {44.6, "a standard bend, 45°", "a standard bend, 45°"},
                 {45.6, "no standard bend", "no standard bend"},
                 {22.9, "a standard bend, 22.5°", "a standard bend, 22.5°"},
                 {11.7, "a standard bend, 11.25°", "a standard bend, 11.25°"},
                 {5.2, "no standard bend", "a standard bend, 5.125°"}};
    for (size_t i = 0; i < sizeof TURNS / sizeof TURNS[0]; i++) {
        kent_build b = bent_main(TURNS[i].turn);
        kent_build_derive(&b);
        assert_says(&b, KENT_SI, TURNS[i].si);
        assert_says(&b, KENT_US, TURNS[i].us);
        kent_build_clear(&b);
    }
}

static void a_level_turn_goes_to_its_side(void **state)
{
    (void)state;
    kent_build left = bent_main(45.0), right = bent_main(-45.0);
    kent_build_derive(&left);
    kent_build_derive(&right);
    assert_says(&left, KENT_SI, "bend 45.0° to the left: a standard bend");
    assert_says(&right, KENT_SI, "bend 45.0° to the right: a standard bend");
    kent_build_clear(&left);
    kent_build_clear(&right);
}

/* 100 m east falling 10 m, then 100 m north level: in profile atan(0.1) = 5.7° up. */
static void a_turn_in_space_is_told_by_its_two_parts(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 20.0);
    kent_build_point(&b, "P", 100.0, 0.0, 10.0);
    kent_build_point(&b, "E", 100.0, 100.0, 10.0);
    kent_build_pipe(&b, "A", "R P E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 40.0);
    kent_build_derive(&b);
    assert_says(&b, KENT_SI, ", 90.0° to the left in plan and 5.7° up in profile:");
    kent_build_clear(&b);
}

static void a_turn_that_joints_take_is_no_fitting(void **state)
{
    (void)state;
    kent_build b = bent_main(2.0);
    b.model->pipes[0].joint_deflection = 0.05;
    kent_build_derive(&b);
    assert_says(&b, KENT_SI, "the joint takes it, no fitting");
    assert_says(&b, KENT_SI, "Restraint: none, since the joint takes the turn.");
    kent_build_clear(&b);
}

static void a_branch_without_a_pipe_is_told_with_its_end(void **state)
{
    (void)state;
    kent_build b = bent_main(0.0);
    const int note = kent_build_note(&b, "P");
    b.model->notes[note].role = KENT_ROLE_HYDRANT;
    b.model->notes[note].branch = (kent_branch){.end = KENT_BRANCH_VALVE,
                                                .direction = {0.0, 1.0, 0.0},
                                                .outside_diameter = 0.118,
                                                .inside_diameter = 0.1,
                                                .joint = KENT_FLANGED};
    kent_build_derive(&b);
    assert_says(&b, KENT_SI,
                "hydrant tee, branch 100; a branch of 118 mm outside diameter with "
                "flanged joints, behind a closed valve.");
    kent_build_clear(&b);
}

static void fittings_held_as_one_are_told_with_their_members(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    b.model->pipes[0].joint = KENT_FLANGED;
    const int note = kent_build_note(&b, "P");
    int *together = kent_alloc(1, sizeof *together);
    assert_non_null(together);
    *together = kent_model_point_index(b.model, "E");
    b.model->together = together;
    b.model->together_count = 1;
    b.model->notes[note].together_count = 1;
    kent_build_derive(&b);
    assert_says(&b, KENT_SI, " P  group of 2: P, E.");
    assert_says(&b, KENT_SI, " E  part of P.");
    kent_build_clear(&b);
}

/* ---- ground and restraint -------------------------------------------------------- */

static void a_value_of_the_ground_says_whose_it_is(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    kent_build_soil(&b, "clay", 100e3, 18e3, 1.0);
    kent_build_soil(&b, "sand", 150e3, 19e3, 1.5);
    const int note = kent_build_note(&b, "E");
    b.model->notes[note].cover = 2.0;
    b.model->points[kent_model_point_index(b.model, "P")].soil = 0;
    b.model->points[kent_model_point_index(b.model, "P")].water_table = 0.5;
    kent_build_derive(&b);
    assert_says(&b, KENT_SI,
                "In clay (its point), cover 1.50 m, ground water 0.50 m down (its "
                "point).");
    assert_says(&b, KENT_SI, "In sand, cover 2.00 m (fittings), ");
    kent_build_clear(&b);
}

static void the_sheets_numbers_and_names_are_said(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    kent_build_derive(&b);
    assert_silent(&b, "For the sheets");
    (void)snprintf(b.model->project.drawing, sizeof b.model->project.drawing, "C-201");
    (void)snprintf(b.model->project.checker, sizeof b.model->project.checker, "M. Roe");
    assert_says(&b, KENT_SI, "For the sheets: drawing C-201, checked by M. Roe\n");
    (void)snprintf(b.model->project.codes, sizeof b.model->project.codes,
                   "EN 805:2025");
    assert_says(&b, KENT_SI,
                "checked by M. Roe; named as prevailing, not checked: EN 805:2025\n");
    kent_build_clear(&b);
}

/* 2.147 GPa at 15 degC (IAPWS); 1 GPa is 145.04 ksi. */
static void the_modulus_of_water_is_said_in_both_systems(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    kent_build_derive(&b);
    b.model->water.bulk_modulus = 2.147e9;
    assert_says(&b, KENT_SI, "bulk modulus 2.1 GPa (311 ksi)");
    assert_says(&b, KENT_US, "bulk modulus 311 ksi (2.1 GPa)");
    kent_build_clear(&b);
}

static void what_was_not_stated_is_said(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    kent_build_derive(&b);
    assert_says(&b, KENT_SI, "No soil stated, no cover stated, no ground water.");
    kent_build_clear(&b);
}

static void a_restraint_says_why(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    const int note = kent_build_note(&b, "E");
    b.model->notes[note].restraint = KENT_RESTRAINED_JOINTS;
    kent_build_derive(&b);
    assert_says(&b, KENT_SI, "Restraint: thrust-block, since its joints may slip.");
    assert_says(&b, KENT_SI, "Restraint: restrained-joints, as asked for.");
    kent_build_clear(&b);
    b = bent_main(45.0);
    b.model->pipes[0].joint = KENT_WELDED;
    kent_build_derive(&b);
    assert_says(&b, KENT_SI, "Restraint: restrained-joints, since its joints cannot");
    kent_build_clear(&b);
}

static void every_route_of_bearing_is_told_with_its_numbers(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    const int soil = kent_build_soil(&b, "loam", 100e3, 18e3, 1.0);
    kent_build_derive(&b);
    kent_soil *s = &b.model->soils[soil];
    assert_says(&b, KENT_SI,
                "loam: bears 100.0 kPa sideways at any depth; weighs 18.0");
    s->factor_inside = 2.0;
    assert_says(&b, KENT_SI, "with a factor of 2.00 already inside");
    s->route = KENT_BEARING_GRADIENT;
    s->bearing_gradient = 47e3;
    assert_says(&b, KENT_SI, "bears 47.0 kN/m³ times the depth sideways");
    s->route = KENT_BEARING_PASSIVE;
    s->passive_share = 0.5;
    assert_says(&b, KENT_SI, "bears 0.50 of its passive pressure sideways");
    s->route = KENT_BEARING_BY_DEPTH;
    s->by_depth[0] = (kent_depth_row){0.6, 30e3};
    s->by_depth[1] = (kent_depth_row){1.2, 60e3};
    s->by_depth_count = 2;
    assert_says(&b, KENT_SI, "by depth: 30.0 kPa at 0.60 m, 60.0 kPa at 1.20 m");
    s->nature = KENT_FILL;
    s->base_cohesion = 6e3;
    s->wall_friction = 0.25 * acos(-1.0) / 3.0;
    assert_says(&b, KENT_SI, "loam: fill, made good, bears");
    assert_says(&b, KENT_SI, "friction on a face 15.0°; holds concrete by 6.0 kPa");
    s->unreliable = true;
    assert_says(&b, KENT_SI, "loam: fill, not to be relied on, holds nothing");
    s->nature = KENT_NATURAL;
    assert_says(&b, KENT_SI, "loam: not to be relied on, holds nothing");
    b.model->ground.backfill = soil;
    assert_says(&b, KENT_SI, "filled with loam");
    kent_build_clear(&b);
}

static void what_is_stated_for_a_restraint_is_told(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    kent_build_derive(&b);
    size_t bend = 0;
    while (b.model->fittings[bend].type != KENT_BEND) {
        bend++;
    }
    int next = b.model->ports[b.model->fittings[bend].port_first].toward;
    kent_stated *s = &b.model->fittings[bend].stated;
    s->slope = (kent_slope){{0.0, -1.0, 0.0}, acos(-1.0) / 18.0};
    s->backing = KENT_BACKING_FILL;
    s->block_share = 0.4;
    s->contact_area = 0.12;
    s->run_length[0] = 12.0;
    s->closes_stated = true;
    (void)snprintf(s->reason, sizeof s->reason, "bank of the canal");
    assert_says(&b, KENT_SI, "The ground falls by 10.0° towards 180°.");
    assert_says(&b, KENT_SI, "A block stands against compacted fill.");
    assert_says(&b, KENT_SI, "The block takes 0.40 of the thrust, joints the rest.");
    assert_says(&b, KENT_SI, "It presses on its block over 0.120 m².");
    assert_says(&b, KENT_SI, "Its run is restrained for 12.00 m towards");
    assert_says(&b, KENT_SI, "None of its legs can be shut.");
    assert_says(&b, KENT_SI, "Reason: bank of the canal.");
    b.model->closes = &next;
    b.model->closes_count = s->closes_count = 1;
    assert_says(&b, KENT_SI, "Legs that can be shut: towards ");
    b.model->closes = NULL;
    b.model->closes_count = 0;
    kent_build_clear(&b);
}

/* ---- pipes ----------------------------------------------------------------------- */

/* c1 = 2 e/D (1 + mu) + D/(D + e): 2 x 10/300 x 1.28 + 300/310 = 1.053. */
static void a_wave_speed_says_its_form_and_its_numbers(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    b.model->pipes[0].wave_speed = NAN;
    kent_build_derive(&b);
    assert_says(&b, KENT_SI,
                "by the thick-wall form, flexible-joints: c1 = 1.053, K = 2.2 GPa, "
                "D = 300 mm, E = 170.0 GPa, e = 10.0 mm.");
    kent_build_clear(&b);
}

/* sqrt(2.2e9/1000) / sqrt(1 + 1.0531 x 2.2e9 x 0.3 / (170e9 x 0.01)) = 1249.6 m/s. */
static void a_given_wave_speed_stands_beside_what_the_wall_makes(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    kent_build_derive(&b);
    assert_says(&b, KENT_SI,
                "Wave speed 1000 m/s as given; its wall would make it 1249.");
    kent_build_clear(&b);
}

static void alike_pipes_are_told_as_one(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    kent_build_fixed_level(&b, "R", 40.0);
    for (int i = 1; i <= 8; i++) {
        char id[16], route[32];
        (void)snprintf(id, sizeof id, "P%d", i);
        (void)snprintf(route, sizeof route, i == 1 ? "R P1" : "P%d P%d", i - 1, i);
        kent_build_point(&b, id, 100.0 * i, 0.0, 10.0);
        kent_build_pipe(&b, id, route, i == 5 ? 0.2 : 0.3, 1000.0);
    }
    kent_build_derive(&b);
    assert_says(&b, KENT_SI,
                "\nP1, P2, P3, P4, P6, P7 and 1 more: no class of the catalogue, 7 "
                "pipes, in all 700.00 m\n");
    assert_says(&b, KENT_SI, "\nP5: no class of the catalogue, 100.00 m\n");
    kent_build_clear(&b);
}

static void ratings_are_told_with_what_they_are_for(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    kent_pipe *p = &b.model->pipes[0];
    kent_build_derive(&b);
    assert_says(&b, KENT_SI, "No rating known.");
    p->pressure_rating = 16e5;
    p->surge_rating = 20e5;
    p->test_rating = 25e5;
    p->derating = 0.87;
    (void)snprintf(p->standard, sizeof p->standard, "a standard of 2010");
    assert_says(
        &b, KENT_SI,
        "Rated 16.00 bar in service, 20.00 bar with surge, 25.00 bar under test "
        "(a standard of 2010), of which the temperature leaves 0.87.");
    kent_build_clear(&b);
}

/* ---- states, scenarios, loads ---------------------------------------------------- */

static void events_are_told_from_where_to_where(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    const int drawn = kent_build_outflow(&b, "E", 0.05);
    const int shut = kent_build_scenario(&b, "shut", 20.0);
    kent_build_ramp(&b, shut, KENT_EVENT_OUTFLOW, drawn, 1.0, 5.0, 0.0);
    kent_build_derive(&b);
    assert_says(&b, KENT_SI,
                "the outflow at E goes from 50.0 L/s to 0.0 L/s in 5 s, from 1 s on.");
    assert_says(&b, KENT_SI, "outflow 50.0 L/s; no fitting.");
    assert_silent(&b, "Steady states that scenarios start from");
    kent_build_clear(&b);
}

/* Each of two events on one thing starts where the one before it ended. */
static void an_event_starts_from_where_the_last_one_ended(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    const int drawn = kent_build_outflow(&b, "E", 0.0);
    const int fire = kent_build_scenario(&b, "fire", 60.0);
    kent_build_ramp(&b, fire, KENT_EVENT_OUTFLOW, drawn, 1.0, 5.0, 0.06);
    const kent_law_point law[] = {{0.0, 0.06}, {2.0, 0.03}};
    kent_build_law(&b, fire, KENT_EVENT_OUTFLOW, drawn, 20.0, law, 2);
    kent_build_ramp(&b, fire, KENT_EVENT_OUTFLOW, drawn, 40.0, 2.0, 0.0);
    kent_build_derive(&b);
    assert_says(&b, KENT_SI, "E goes from 0.0 L/s to 60.0 L/s in 5 s, from 1 s on; ");
    assert_says(&b, KENT_SI, "E goes from 60.0 L/s to 30.0 L/s by a law of 2 points, ");
    assert_says(&b, KENT_SI, "E goes from 30.0 L/s to 0.0 L/s in 2 s, from 40 s on.");
    kent_build_clear(&b);
}

static void a_valve_goes_from_its_opening_to_another(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    const int valve = kent_build_valve(&b, "V", "E", 0.05, 5.0);
    b.model->valves[valve].opening = 0.4;
    const int shut = kent_build_scenario(&b, "shut", 20.0);
    kent_build_ramp(&b, shut, KENT_EVENT_VALVE, valve, 1.0, 5.0, 0.0);
    kent_build_derive(&b);
    assert_says(&b, KENT_SI,
                "valve V goes from 0.40 open to closed in 5 s, from 1 s on");
    assert_says(
        &b, KENT_SI,
        "open to 0.40, discharging to 5.00 m; pushed along the pipe when shut.");
    kent_build_clear(&b);
}

static void factors_are_told_one_by_one_only_where_they_differ(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    kent_build_derive(&b);
    assert_says(&b, KENT_SI, "Safety factor 1.50 in every load case.");
    b.model->loads.factor[KENT_CASE_OCCASIONAL] = 1.2;
    assert_says(&b, KENT_SI, "Safety factors: test 1.50, static 1.50, ");
    assert_says(&b, KENT_SI, "occasional 1.20, exceptional 1.50");
    kent_build_clear(&b);
}

static void what_is_asked_of_pressures_is_told(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    kent_build_derive(&b);
    b.model->asked.lowest_steady = 1.4e5;
    b.model->asked.lowest[KENT_EXCEPTIONAL] = -0.4e5;
    b.model->asked.life = 50.0 * 365.25 * 86400.0;
    b.model->pipes[0].joint_rating = 16e5;
    assert_says(&b, KENT_SI, "Lowest pressure asked: steady 1.40 bar, exceptional ");
    assert_says(&b, KENT_SI, "It serves 50 years.");
    assert_says(&b, KENT_SI, "are rated 16.00 bar.");
    kent_build_clear(&b);
}

static void what_a_case_decides_of_loads_and_concrete_is_told(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    kent_build_derive(&b);
    assert_silent(&b, "Soil bears");
    assert_silent(&b, "Thrusts on the");
    assert_silent(&b, "Concrete");
    b.model->loads.bearing_increase[KENT_CASE_OCCASIONAL] = 1.33;
    b.model->loads.thrust_area = KENT_AREA_NOMINAL;
    b.model->loads.cooling = 12.0;
    b.model->concrete.strength = 25e6;
    b.model->concrete.cement = KENT_CEMENT_SLOW;
    assert_says(&b, KENT_SI, "Soil bears 1.33 times as much, occasional.");
    assert_says(&b, KENT_SI, "Thrusts on the nominal size, not the outside diameter.");
    assert_says(&b, KENT_SI, "Fused and welded mains cool by 12");
    assert_says(&b, KENT_SI, "Concrete of 25.0 MPa, slow cement.");
    (void)snprintf(b.model->concrete.id, sizeof b.model->concrete.id, "C25/30");
    b.model->loads.thrust_area = KENT_AREA_INSIDE;
    assert_says(&b, KENT_SI, "Concrete C25/30 of 25.0 MPa, slow cement.");
    assert_says(&b, KENT_SI, "Thrusts on the bore, not the outside diameter.");
    kent_build_clear(&b);
}

static void a_test_is_told_by_its_rule(void **state)
{
    (void)state;
    kent_build b = bent_main(45.0);
    kent_build_derive(&b);
    kent_loads *l = &b.model->loads;
    assert_says(&b, KENT_SI, "No site test is stated.");
    l->test_gauge = kent_model_point_index(b.model, "E");
    l->test_pressure = 9e5;
    assert_says(&b, KENT_SI, "Site test at 9.00 bar, as given, read at E.");
    l->test_rule = KENT_TEST_FACTOR;
    l->test_factor = 1.5;
    assert_says(&b, KENT_SI,
                "Site test at 1.50 times the working pressure, read at E.");
    l->test_rule = KENT_TEST_EN805_ASSUMED;
    l->surge_allowance = 2e5;
    assert_says(&b, KENT_SI, "by EN 805 with 2.00 bar assumed for surge, read at E.");
    kent_build_clear(&b);
}

/* ---- large mains ----------------------------------------------------------------- */

/* A zigzag of 45 degree bends, one of which is made (30 degrees). */
static kent_build long_main(int points)
{
    kent_build b = kent_build_new();
    kent_text route = {0};
    double x = 0.0, y = 0.0, way = 0.0;
    for (int i = 0; i < points; i++) {
        char id[16];
        (void)snprintf(id, sizeof id, "P%d", i);
        kent_text_add(&route, "%s%s", i > 0 ? " " : "", id);
        kent_build_point(&b, id, x, y, 10.0);
        const double turn = i == 100 ? 30.0 : 45.0;
        way += (i % 2 == 0 ? turn : -turn) * 3.14159265358979323846 / 180.0;
        x += 50.0 * cos(way);
        y += 50.0 * sin(way);
    }
    kent_build_pipe(&b, "A", kent_text_of(&route), 0.3, 1000.0);
    kent_text_clear(&route);
    kent_build_fixed_level(&b, "P0", 40.0);
    kent_build_soil(&b, "sand", 150e3, 19e3, 1.5);
    return b;
}

static void a_large_main_is_counted_and_only_what_is_unusual_is_told(void **state)
{
    (void)state;
    kent_build b = long_main(300);
    kent_build_derive(&b);
    kent_text out = printed(&b, KENT_SI, false);
    const char *text = kent_text_of(&out);
    assert_non_null(strstr(text, "300 points, 1 pipe, 299 fittings: 298 × bend, 1 × "
                                 "dead-end."));
    assert_non_null(strstr(text, " P100  bend 30.0°"));
    assert_null(strstr(text, " P99  "));
    assert_null(strstr(text, "\nPoints, as given\n"));
    assert_true(out.length < 4000);
    kent_text_clear(&out);
    assert_says(&b, KENT_SI, "  P99 ");
    assert_says(&b, KENT_SI, "\nPoints, as given\n");
    kent_build_clear(&b);
}

static void a_main_of_two_hundred_points_is_told_whole(void **state)
{
    (void)state;
    kent_build b = long_main(200);
    kent_build_derive(&b);
    kent_text out = printed(&b, KENT_SI, false);
    assert_non_null(strstr(kent_text_of(&out), "  P99 "));
    assert_non_null(strstr(kent_text_of(&out), "\nPoints, as given\n"));
    kent_text_clear(&out);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_turn_is_named_by_the_standard_bend_within_half_a_degree),
        cmocka_unit_test(a_level_turn_goes_to_its_side),
        cmocka_unit_test(a_turn_in_space_is_told_by_its_two_parts),
        cmocka_unit_test(a_turn_that_joints_take_is_no_fitting),
        cmocka_unit_test(a_branch_without_a_pipe_is_told_with_its_end),
        cmocka_unit_test(fittings_held_as_one_are_told_with_their_members),
        cmocka_unit_test(a_value_of_the_ground_says_whose_it_is),
        cmocka_unit_test(the_sheets_numbers_and_names_are_said),
        cmocka_unit_test(the_modulus_of_water_is_said_in_both_systems),
        cmocka_unit_test(what_was_not_stated_is_said),
        cmocka_unit_test(a_restraint_says_why),
        cmocka_unit_test(every_route_of_bearing_is_told_with_its_numbers),
        cmocka_unit_test(what_is_stated_for_a_restraint_is_told),
        cmocka_unit_test(a_wave_speed_says_its_form_and_its_numbers),
        cmocka_unit_test(a_given_wave_speed_stands_beside_what_the_wall_makes),
        cmocka_unit_test(alike_pipes_are_told_as_one),
        cmocka_unit_test(ratings_are_told_with_what_they_are_for),
        cmocka_unit_test(events_are_told_from_where_to_where),
        cmocka_unit_test(an_event_starts_from_where_the_last_one_ended),
        cmocka_unit_test(a_valve_goes_from_its_opening_to_another),
        cmocka_unit_test(factors_are_told_one_by_one_only_where_they_differ),
        cmocka_unit_test(what_is_asked_of_pressures_is_told),
        cmocka_unit_test(what_a_case_decides_of_loads_and_concrete_is_told),
        cmocka_unit_test(a_test_is_told_by_its_rule),
        cmocka_unit_test(a_large_main_is_counted_and_only_what_is_unusual_is_told),
        cmocka_unit_test(a_main_of_two_hundred_points_is_told_whole),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
