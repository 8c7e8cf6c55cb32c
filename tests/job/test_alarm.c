/* Every alarm once raised and once silent, on either side of its limit. */
#include "kent_alarm.h"
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>
#include <string.h>

static const double PI = 3.14159265358979323846;

/* 300 mm from a tank through a right angle to a dead end; raises nothing. */
static kent_build quiet_main(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    kent_build_point(&b, "P", 100.0, 0.0, 10.0);
    kent_build_point(&b, "E", 100.0, 200.0, 10.0);
    kent_build_pipe(&b, "A", "R P E", 0.3, NAN);
    kent_build_fixed_level(&b, "R", 40.0);
    kent_build_soil(&b, "sand", 100e3, 19e3, 1.5);
    return b;
}

/* Alarms of a derived model in a steady flow; the caller clears them. */
static kent_notes raised_in(const kent_build *b, kent_alarm_reader reader)
{
    kent_notes notes = {0};
    kent_error err = {0};
    kent_steady *steady = NULL;
    if (b->model->span_count > 0 && kent_steady_solve(b->model, &steady, &err)) {
        fail_msg("%s: %s", err.where, err.what);
    }
    kent_alarms_raise(b->model, &steady, 1, reader, &notes);
    kent_steady_free(steady);
    return notes;
}

static void assert_raised(kent_build *b, const char *words)
{
    kent_notes notes = raised_in(b, KENT_ALARM_CHECK);
    if (notes.count != 1) fail_msg("%zu alarms, wanted '%s'", notes.count, words);
    if (!strstr(notes.text[0], words)) fail_msg("no '%s' in: %s", words, notes.text[0]);
    kent_notes_clear(&notes);
}

static void assert_quiet(kent_build *b)
{
    kent_notes notes = raised_in(b, KENT_ALARM_CHECK);
    if (notes.count > 0) fail_msg("alarm: %s", notes.text[0]);
    kent_notes_clear(&notes);
}

/* ---- streams --------------------------------------------------------------------- */

/* The main with what an outflow at its end makes of its velocity, m/s. */
static kent_build flowing(double speed)
{
    kent_build b = quiet_main();
    kent_build_outflow(&b, "E", speed * PI * 0.09 / 4.0);
    b.model->fixed_levels[0].level = 4000.0; /* so that any flow can be drawn */
    kent_build_derive(&b);
    return b;
}

static void a_stream_is_slow_below_five_centimetres_a_second(void **state)
{
    (void)state;
    kent_build b = flowing(0.051);
    assert_quiet(&b);
    kent_build_clear(&b);
    b = flowing(0.049);
    assert_raised(&b, "pipe A: steady flow is almost at rest, at most 0.049 m/s");
    kent_build_clear(&b);
    b = quiet_main(); /* at rest on purpose */
    kent_build_derive(&b);
    assert_quiet(&b);
    kent_build_clear(&b);
}

static void a_stream_is_fast_above_five_metres_a_second(void **state)
{
    (void)state;
    kent_build b = flowing(4.99);
    assert_quiet(&b);
    kent_build_clear(&b);
    b = flowing(5.01);
    assert_raised(&b,
                  "pipe A: steady flow is faster than most mains stand, at most 5.01");
    kent_build_clear(&b);
}

/* Steel's 207 GPa on polyethylene makes its wave three to five times too fast. */
static void a_modulus_that_is_not_the_materials_is_told(void **state)
{
    (void)state;
    static const struct {
        double density, modulus; /* kg/m3, Pa */
        const char *words;       /* NULL: none */
    } rows[] = {{950.0, 207e9, "modulus is that of metal, the material is plastic"},
                {1400.0, 3e9, NULL},
                {7050.0, 170e9, NULL},
                {2400.0, 30e9, NULL}, /* concrete */
                {7850.0, 1e9, "modulus is that of plastic, the material is metal"}};
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        kent_build b = quiet_main();
        b.model->pipes[0].material_density = rows[i].density;
        b.model->pipes[0].modulus = rows[i].modulus;
        kent_build_derive(&b);
        if (rows[i].words) {
            assert_raised(&b, rows[i].words);
        } else {
            assert_quiet(&b);
        }
        kent_build_clear(&b);
    }
}

/* Cubic metres written for litres: what arrives looks ordinary, and no speed tells. An
 * outflow by pressure draws less on purpose, but not next to nothing. */
static void an_outflow_that_gets_less_than_it_asks_is_told(void **state)
{
    (void)state;
    for (int kind = 0; kind < 4; kind++) {
        static const double asked[] = {0.05, 60.0, 60.0, 60.0}; /* m3/s */
        kent_build b = quiet_main();
        kent_build_outflow(&b, "E", asked[kind]);
        b.model->pipes[0].friction_coefficient =
            0.02; /* fixed factor, for a slow one */
        b.model->pipes[0].friction = KENT_DARCY_FIXED;
        if (kind >= 2) {
            b.model->outflows[0].pressure_dependent = true;
            b.model->outflows[0].full_pressure = kind == 2 ? 100e9 : 100e6;
            b.model->outflows[0].flow = kind == 2 ? 60.0 : 0.2;
        }
        b.model->fixed_levels[0].level = kind == 3 ? 1000.0 : 20.0;
        kent_build_derive(&b);
        kent_notes notes = raised_in(&b, KENT_ALARM_CHECK);
        bool told = false;
        for (size_t i = 0; i < notes.count; i++) {
            told = told || strstr(notes.text[i], "of the 60000");
        }
        assert_true(told == (kind == 1 || kind == 2));
        kent_notes_clear(&notes);
        kent_build_clear(&b);
    }
}

/* A published surge calculation took 225.99 Ml in 23 h as 0.00273 m3/s, where it is
 * 2.73: in a main of 1.5 m that is 1.5 mm/s in place of 1.5 m/s. */
static void a_slip_of_a_thousand_is_named_where_it_would_explain_the_speed(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    kent_build_point(&b, "E", 1000.0, 0.0, 10.0);
    kent_build_pipe(&b, "A", "R E", 1.5, 1000.0);
    kent_build_fixed_level(&b, "R", 40.0);
    kent_build_outflow(&b, "E", 225.99e3 / (23.0 * 3600.0) / 1000.0);
    kent_build_derive(&b);
    assert_raised(&b, "a thousand times it would be ordinary");
    kent_build_clear(&b);
    b = flowing(0.04); /* a thousand times it would be 40 m/s */
    kent_notes notes = raised_in(&b, KENT_ALARM_CHECK);
    assert_null(strstr(notes.text[0], "a thousand"));
    kent_notes_clear(&notes);
    kent_build_clear(&b);
    b = flowing(60.0);
    notes = raised_in(&b, KENT_ALARM_CHECK);
    assert_non_null(strstr(notes.text[0], "a thousandth of it would be ordinary"));
    kent_notes_clear(&notes);
    kent_build_clear(&b);
}

/* ---- pipes ----------------------------------------------------------------------- */

/* PVC of DR 18 (OD 18 walls) has about 380 m/s: sqrt(2.2e9/1000) / sqrt(1 + 2.2/2.76 x
 * 16) = 400 by the thin form. Steel's 1100 m/s is the classic slip. */
static void a_wave_speed_of_another_material_is_seen(void **state)
{
    (void)state;
    kent_build b = quiet_main();
    kent_pipe *p = &b.model->pipes[0];
    p->modulus = 2.76e9; /* PVC */
    p->material_density = 1400.0;
    p->wall = 0.3 / 16.0;
    p->outside_diameter = 0.3 * 18.0 / 16.0;
    p->wave_speed = 1100.0;
    kent_build_derive(&b);
    assert_raised(&b, "pipe A: the wave speed given, 1100 m/s at A, does not suit");
    kent_build_clear(&b);
    b = quiet_main();
    p = &b.model->pipes[0];
    p->modulus = 2.76e9; /* PVC */
    p->material_density = 1400.0;
    p->wall = 0.3 / 16.0;
    p->outside_diameter = 0.3 * 18.0 / 16.0;
    p->wave_speed = 400.0;
    kent_build_derive(&b);
    assert_quiet(&b);
    kent_build_clear(&b);
}

static void a_wave_speed_without_a_wall_is_held_against_the_modulus(void **state)
{
    (void)state;
    static const struct {
        double modulus, speed; /* Pa, m/s */
        const char *words;
    } CASES[] = {{170e9, 1000.0, NULL},
                 {1e9, 300.0, NULL},
                 {1e9, 1000.0, "is that of metal, the modulus is not"},
                 {170e9, 300.0, "is that of plastic, the modulus is not"}};
    for (size_t i = 0; i < sizeof CASES / sizeof CASES[0]; i++) {
        kent_build b = quiet_main();
        b.model->pipes[0].wall = NAN;
        b.model->pipes[0].modulus = CASES[i].modulus;
        b.model->pipes[0].material_density = (double)NAN; /* of no named material */
        b.model->pipes[0].wave_speed = CASES[i].speed;
        kent_build_derive(&b);
        if (CASES[i].words) {
            assert_raised(&b, CASES[i].words);
        } else {
            assert_quiet(&b);
        }
        kent_build_clear(&b);
    }
}

/* Sets one number of the pipe before it is derived, and looks. */
static void with_pipe(size_t offset, double value, kent_friction_law law,
                      const char *words)
{
    kent_build b = quiet_main();
    kent_pipe *p = &b.model->pipes[0];
    p->friction = law;
    memcpy((char *)p + offset, &value, sizeof value);
    kent_build_derive(&b);
    if (words) {
        assert_raised(&b, words);
    } else {
        assert_quiet(&b);
    }
    kent_build_clear(&b);
}

/* Moody's chart (1944) ends at a relative roughness of 0.05: 15 mm of 300. */
static void a_roughness_of_a_twentieth_of_the_bore_is_seen(void **state)
{
    (void)state;
    const size_t at = offsetof(kent_pipe, friction_coefficient);
    with_pipe(at, 0.0149, KENT_COLEBROOK_WHITE, NULL);
    with_pipe(at, 0.0151, KENT_COLEBROOK_WHITE,
              "pipe A: the roughness is more than a twentieth of the bore");
}

/* Outside diameter 320 mm. */
static void a_wall_of_a_quarter_of_the_diameter_is_seen(void **state)
{
    (void)state;
    const size_t at = offsetof(kent_pipe, wall);
    with_pipe(at, 0.0799, KENT_FRICTIONLESS, NULL);
    with_pipe(at, 0.0801, KENT_FRICTIONLESS,
              "pipe A: the wall is thicker than a quarter");
}

static void a_hazen_williams_coefficient_is_between_sixty_and_160(void **state)
{
    (void)state;
    const size_t at = offsetof(kent_pipe, friction_coefficient);
    with_pipe(at, 60.0, KENT_HAZEN_WILLIAMS, NULL);
    with_pipe(at, 160.0, KENT_HAZEN_WILLIAMS, NULL);
    with_pipe(at, 59.0, KENT_HAZEN_WILLIAMS, "pipe A: hazen_williams_c lies outside");
    with_pipe(at, 161.0, KENT_HAZEN_WILLIAMS, "pipe A: hazen_williams_c lies outside");
}

/* ---- pressures and levels -------------------------------------------------------- */

static void a_vapour_pressure_near_the_air_s_is_seen(void **state)
{
    (void)state;
    kent_build b = quiet_main();
    b.model->water.vapour_pressure = 0.49 * b.model->barometric;
    kent_build_derive(&b);
    assert_quiet(&b);
    b.model->water.vapour_pressure = 0.51 * b.model->barometric;
    assert_raised(&b, "the vapour pressure, 51.7 kPa, is near the barometric pressure");
    kent_build_clear(&b);
}

static void a_port_cannot_have_less_than_no_pressure_at_all(void **state)
{
    (void)state;
    for (int below = 0; below < 2; below++) {
        kent_build b = kent_build_new();
        const double p = below ? -1.02e5 : -1.01e5; /* barometric 1.01325e5 */
        const kent_port ports[] = {
            kent_build_port((kent_vec3){-1.0, 0.0, 0.0}, p, -0.1, 0.3),
            kent_build_port((kent_vec3){0.0, 1.0, 0.0}, 1e5, 0.1, 0.3)};
        kent_build_ports(&b, "B", KENT_BEND, ports, 2);
        kent_build_derive(&b);
        if (below) {
            assert_raised(&b, "fitting B: a port's pressure, gauge, lies more than");
        } else {
            assert_quiet(&b);
        }
        kent_build_clear(&b);
    }
}

static void a_main_above_its_own_water_is_seen(void **state)
{
    (void)state;
    kent_build b = quiet_main(); /* all of it at 10 m */
    b.model->fixed_levels[0].level = 10.1;
    kent_build_derive(&b);
    assert_quiet(&b);
    kent_build_clear(&b);
    b = quiet_main();
    b.model->fixed_levels[0].level = 9.9;
    kent_build_derive(&b);
    assert_raised(&b, "still water, at most at 9.90 m, lies below the whole main");
    kent_build_clear(&b);
}

/* 30 m of water of 1000 kg/m3: 294.2 kPa. */
static void a_test_below_still_water_is_seen(void **state)
{
    (void)state;
    kent_build b = quiet_main();
    b.model->loads.test_gauge = kent_model_point_index(b.model, "E");
    b.model->loads.test_pressure = 295e3;
    kent_build_derive(&b);
    assert_quiet(&b);
    b.model->loads.test_pressure = 293e3;
    assert_raised(&b, "the site test, 2.93 bar at E, is below the pressure of still");
    b.model->loads.test_gauge = kent_model_point_index(b.model, "P"); /* in mid-run */
    assert_raised(&b, "the site test, 2.93 bar at P, is below the pressure of still");
    b.model->loads.static_level = 39.0; /* 284 kPa: stated, it holds, and is named */
    assert_raised(&b, "static_level, 39.00 m, is below");
    kent_build_clear(&b);
}

static void a_level_of_still_water_below_a_reservoir_is_seen(void **state)
{
    (void)state;
    kent_build b = quiet_main(); /* its tank stands at 40 m */
    kent_build_derive(&b);
    b.model->loads.static_level = 40.0;
    assert_quiet(&b);
    b.model->loads.static_level = 39.0;
    assert_raised(&b, "static_level, 39.00 m, is below the highest water level of the "
                      "case, 40.00 m");
    kent_build_clear(&b);
}

/* P is 100 m from R, E 200 m from P; stations may be off by 1 % and 0.1 m. */
static void stations_off_the_ground_are_seen(void **state)
{
    (void)state;
    static const struct {
        double p, e; /* m */
        const char *words;
    } ROWS[] = {
        {101.05, 301.05, NULL},
        {101.2, 301.2,
         "point P: stations do not fit coordinates or lengths: \"P\" is "
         "counted 101.20 m on from \"R\" and lies 100.00 m from it"},
        {98.8, 298.8, "\"P\" is counted 98.80 m on"},
        {100.0, 400.0, "point E: stations do not fit"},
        {150.0, 450.0,
         "points P, E: stations do not fit coordinates or lengths: \"E\" "
         "is counted 300.00 m on from \"P\" and lies 200.00 m from it"},
    };
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        kent_build b = quiet_main();
        b.model->points[0].station = 0.0;
        b.model->points[1].station = ROWS[i].p;
        b.model->points[2].station = ROWS[i].e;
        kent_build_derive(&b);
        if (ROWS[i].words) {
            assert_raised(&b, ROWS[i].words);
        } else {
            assert_quiet(&b);
        }
        kent_build_clear(&b);
    }
}

/* Counting goes on from 50 m at P, which is reached at 100 m. */
static void a_zone_whose_stations_are_counted_twice_is_seen(void **state)
{
    (void)state;
    static const struct {
        double from, to; /* m */
        bool twice;
    } ROWS[] = {{0.0, 50.0, false},
                {0.0, 51.0, true},
                {99.0, 250.0, true},
                {100.0, 250.0, false}};
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        kent_build b = quiet_main();
        b.model->points[0].station = 0.0;
        b.model->points[1].station = 100.0;
        b.model->points[1].station_ahead = 50.0;
        b.model->ground_zones = kent_alloc(1, sizeof *b.model->ground_zones);
        assert_non_null(b.model->ground_zones);
        b.model->ground_zones[b.model->ground_zone_count++] =
            (kent_ground_zone){.from = ROWS[i].from,
                               .to = ROWS[i].to,
                               .soil = -1,
                               .cover = 2.0,
                               .water_table = (double)NAN,
                               .trench = -1,
                               .backfill = -1};
        kent_build_derive(&b);
        if (ROWS[i].twice) {
            assert_raised(&b, "counted before \"P\" and again after it");
        } else {
            assert_quiet(&b);
        }
        kent_build_clear(&b);
    }
}

/* By rule it is 1.5 times the 294 kPa at E, 441 kPa; still water in another main, not
 * joined to this one, stands 60 m over E: 588 kPa. */
static void a_test_by_rule_below_the_still_water_of_another_main_is_seen(void **state)
{
    (void)state;
    for (int other = 0; other < 2; other++) {
        kent_build b = quiet_main();
        kent_build_point(&b, "R2", 0.0, 900.0, 10.0);
        kent_build_point(&b, "E2", 500.0, 900.0, 10.0);
        (void)kent_build_pipe(&b, "B", "R2 E2", 0.3, 1000.0);
        kent_build_fixed_level(&b, "R2", other ? 70.0 : 40.0);
        kent_build_outflow(&b, "E2", 0.05);
        b.model->loads.test_gauge = kent_model_point_index(b.model, "E");
        b.model->loads.test_rule = KENT_TEST_C600;
        kent_build_derive(&b);
        if (other) {
            assert_raised(&b, "the site test, 4.41 bar at E, is below the pressure of");
        } else {
            assert_quiet(&b);
        }
        kent_build_clear(&b);
    }
}

static void more_than_a_hundredth_of_free_gas_is_seen(void **state)
{
    (void)state;
    kent_build b = quiet_main();
    kent_build_derive(&b);
    b.model->gas_content = 0.01;
    assert_quiet(&b);
    b.model->gas_content = 0.011;
    assert_raised(&b, "gas_content is 0.011");
    kent_build_clear(&b);
}

/* ---- pumps ----------------------------------------------------------------------- */

/* A pump of the quiet main; times: its inertia over that of the regression. */
static kent_build with_inertia(double times)
{
    kent_build b = quiet_main();
    kent_model *m = b.model;
    kent_build_point(&b, "S", -500.0, 0.0, m->points[0].at.z);
    kent_build_pipe(&b, "C", "S R", 0.3, 1000.0);
    const int p = kent_build_pump(&b, "PS", "S", NULL, 40.0, 0.05, 30.0);
    m->pumps[p].suction_level = m->fixed_levels[0].level - 25.0;
    const kent_pump_curve *c = &m->pumps[p].curve;
    const double power =
        m->water.density * m->gravity * c->rated_flow * c->rated_head / 0.8;
    m->pumps[p].inertia = times * kent_pump_inertia_estimate(power, c->rated_speed);
    kent_build_derive(&b);
    return b;
}

/* GD2, in kg m2 as well, is four times the moment of inertia. */
static void a_moment_of_inertia_that_may_be_gd2_is_seen(void **state)
{
    (void)state;
    static const double FINE[] = {0.5, 1.0, 2.7}, SUSPECT[] = {2.9, 4.0, 40.0};
    for (size_t i = 0; i < 3; i++) {
        kent_build b = with_inertia(FINE[i]);
        assert_quiet(&b);
        kent_build_clear(&b);
        b = with_inertia(SUSPECT[i]);
        assert_raised(&b, "GD2 is four times");
        b.model->pumps[0].inertia_estimated = true; /* nobody's slip */
        assert_quiet(&b);
        kent_build_clear(&b);
    }
}

/* ---- ground ---------------------------------------------------------------------- */

static void a_cover_of_decimetres_or_of_ten_metres_is_seen(void **state)
{
    (void)state;
    static const struct {
        double cover; /* m */
        bool raised;
    } CASES[] = {{0.29, true}, {0.31, false}, {9.9, false}, {10.1, true}};
    for (size_t i = 0; i < sizeof CASES / sizeof CASES[0]; i++) {
        kent_build b = quiet_main();
        b.model->soils[0].allowable_bearing = 10e3; /* so that depth alone matters */
        b.model->ground.cover = CASES[i].cover;
        kent_build_derive(&b);
        if (CASES[i].raised) {
            assert_raised(&b, "fittings P, E: cover below 0.3 m or above 10 m");
        } else {
            assert_quiet(&b);
        }
        kent_build_clear(&b);
    }
}

/* 3000 psf at 5 ft in soil of 120 pcf takes Kp = 3000 / (120 x 5) = 5.0; the limit is
 * that of 40 degrees, 4.6 (Rankine). */
static void a_bearing_beyond_the_ground_s_own_is_seen(void **state)
{
    (void)state;
    const double psf = 47.880259, pcf = 157.087464, ft = 0.3048; /* Pa, N/m3, m */
    kent_build b = quiet_main();
    kent_soil *s = &b.model->soils[0];
    s->unit_weight = 120.0 * pcf;
    s->allowable_bearing = 2700.0 * psf; /* 4.5 */
    b.model->ground.cover = 5.0 * ft - 0.16;
    kent_build_derive(&b);
    assert_quiet(&b);
    b.model->soils[0].allowable_bearing = 3000.0 * psf;
    assert_raised(&b, "fittings P, E: the bearing asks for a passive coefficient of up "
                      "to 5.0");
    kent_notes notes = raised_in(&b, KENT_ALARM_RUN); /* the fittings say it */
    assert_int_equal(notes.count, 0);
    kent_build_clear(&b);
}

/* ---- many ------------------------------------------------------------------------ */

static void many_of_a_kind_are_one_alarm(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "P0", 0.0, 0.0, 10.0);
    kent_build_fixed_level(&b, "P0", 40.0);
    for (int i = 1; i <= 9; i++) {
        char id[16], from_to[32];
        (void)snprintf(id, sizeof id, "P%d", i);
        (void)snprintf(from_to, sizeof from_to, "P%d P%d", i - 1, i);
        kent_build_point(&b, id, 100.0 * i, 0.0, 10.0);
        const int pipe = kent_build_pipe(&b, id, from_to, 0.3, 1000.0);
        b.model->pipes[pipe].friction = KENT_HAZEN_WILLIAMS;
        b.model->pipes[pipe].friction_coefficient = 15.0;
    }
    kent_build_derive(&b);
    assert_raised(&b, "pipes P1, P2, P3, P4, P5, P6 and 3 more: hazen_williams_c");
    kent_build_clear(&b);
}

/* 300 000 psi are 2.07 GPa; a published answer turns them into 6.07 (from memory). */
static void a_modulus_that_no_water_has_is_seen(void **state)
{
    (void)state;
    static const double QUIET[] = {1.8e9, 2.07e9, 2.5e9}, LOUD[] = {1.79e9, 6.07e9};
    for (size_t i = 0; i < 3; i++) {
        kent_build b = quiet_main();
        kent_build_derive(&b);
        b.model->water.bulk_modulus = QUIET[i];
        assert_quiet(&b);
        kent_build_clear(&b);
    }
    for (size_t i = 0; i < 2; i++) {
        kent_build b = quiet_main();
        kent_build_derive(&b);
        b.model->water.bulk_modulus = LOUD[i];
        assert_raised(&b, i == 0 ? "1.79 GPa (260 ksi)" : "6.07 GPa (880 ksi)");
        kent_build_clear(&b);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_modulus_that_is_not_the_materials_is_told),
        cmocka_unit_test(a_stream_is_slow_below_five_centimetres_a_second),
        cmocka_unit_test(an_outflow_that_gets_less_than_it_asks_is_told),
        cmocka_unit_test(a_stream_is_fast_above_five_metres_a_second),
        cmocka_unit_test(
            a_slip_of_a_thousand_is_named_where_it_would_explain_the_speed),
        cmocka_unit_test(a_wave_speed_of_another_material_is_seen),
        cmocka_unit_test(a_wave_speed_without_a_wall_is_held_against_the_modulus),
        cmocka_unit_test(a_roughness_of_a_twentieth_of_the_bore_is_seen),
        cmocka_unit_test(a_wall_of_a_quarter_of_the_diameter_is_seen),
        cmocka_unit_test(a_hazen_williams_coefficient_is_between_sixty_and_160),
        cmocka_unit_test(a_vapour_pressure_near_the_air_s_is_seen),
        cmocka_unit_test(a_port_cannot_have_less_than_no_pressure_at_all),
        cmocka_unit_test(a_main_above_its_own_water_is_seen),
        cmocka_unit_test(a_test_below_still_water_is_seen),
        cmocka_unit_test(a_level_of_still_water_below_a_reservoir_is_seen),
        cmocka_unit_test(stations_off_the_ground_are_seen),
        cmocka_unit_test(a_zone_whose_stations_are_counted_twice_is_seen),
        cmocka_unit_test(a_test_by_rule_below_the_still_water_of_another_main_is_seen),
        cmocka_unit_test(more_than_a_hundredth_of_free_gas_is_seen),
        cmocka_unit_test(a_modulus_that_no_water_has_is_seen),
        cmocka_unit_test(a_moment_of_inertia_that_may_be_gd2_is_seen),
        cmocka_unit_test(a_cover_of_decimetres_or_of_ten_metres_is_seen),
        cmocka_unit_test(a_bearing_beyond_the_ground_s_own_is_seen),
        cmocka_unit_test(many_of_a_kind_are_one_alarm),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
