/* Mains on steep ground. */
#include "kent_hand.h"

#include <math.h>
#include <string.h>

static const double PI = 3.14159265358979323846;

/* R - P - Q - E: level, then falling by `fall` over 120 m in plan, then level. */
static kent_build falling(double fall)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "R", 0.0, 0.0, fall);
    (void)kent_build_point(&b, "P", 100.0, 0.0, fall);
    (void)kent_build_point(&b, "Q", 220.0, 0.0, 0.0);
    (void)kent_build_point(&b, "E", 300.0, 0.0, 0.0);
    const int p = kent_build_pipe(&b, "A", "R P Q E", 0.3, 1000.0);
    b.model->pipes[p].unit_mass = 70.0;
    b.model->pipes[p].laying_length = 6.0;
    (void)kent_build_fixed_level(&b, "R", 200.0);
    return b;
}

static kent_restraints *sized(kent_build *b)
{
    const kent_hand_case at_rest = {"static", KENT_CASE_STATIC, 1.5, 10e5};
    kent_build_derive(b);
    return kent_hand_size(b, &at_rest, 1);
}

static void done(kent_build *b, kent_restraints *r)
{
    kent_restraints_free(r);
    kent_build_clear(b);
}

/* Spacing by slope of the Recommended Standards for Wastewater Facilities (from
 * memory): 36 ft from 20 to 35 %, 24 ft to 50 %, 16 ft beyond; here of whole pipes of 6
 * m. */
static void anchors_stand_closer_the_steeper_it_falls(void **state)
{
    (void)state;
    const struct {
        double fall, laying, spacing;
        int pipes;
    } rows[] = {
        {36.0, 5.0, 10.0, 2}, /* 30 %: two pipes within 10.97 m */
        {48.0, 6.0, 6.0, 1},  /* 40 %: one within 7.32 m */
        {72.0, 6.0, 3.0, 0},  /* 60 %: 4.88 m: two to a pipe */
        {72.0, NAN, 16 * 0.3048, 0},
    };
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        kent_build b = falling(rows[i].fall);
        b.model->pipes[0].laying_length = rows[i].laying;
        kent_restraints *r = sized(&b);
        assert_int_equal(r->pulls.steep_count, 1);
        const kent_steep *s = &r->pulls.steeps[0];
        const double length = hypot(120.0, rows[i].fall);
        assert_close(s->slope, -rows[i].fall / 120.0, 1e-9);
        assert_close(s->end - s->start, length, 1e-9);
        assert_close(s->from, 100.0, 1e-9);
        assert_close(s->spacing, rows[i].spacing, 1e-9);
        assert_int_equal(s->pipes, rows[i].pipes);
        assert_int_equal(s->anchors, (int)ceil(length / rows[i].spacing));
        done(&b, r);
    }
}

/* (70 kg/m + water) g sin, times 1.5 and the spacing. */
static void an_anchor_holds_what_slides_between_two(void **state)
{
    (void)state;
    kent_build b = falling(48.0);
    kent_restraints *r = sized(&b);
    const kent_steep *s = &r->pulls.steeps[0];
    const double weight = (70.0 + 1000.0 * 0.25 * PI * 0.09) * 9.80665;
    const double sine = 48.0 / hypot(120.0, 48.0);
    assert_close(s->weight, weight, 1e-9);
    assert_close(s->along, weight * sine, 1e-9);
    assert_close(s->anchor_force, 1.5 * weight * sine * 6.0, 1e-9);
    assert_true(isnan(s->friction)); /* no soil stated */
    assert_true(strstr(s->cautions.text[0], "falls 1 in 2.5"));
    assert_true(strstr(s->cautions.text[0], "water-stop"));
    assert_true(kent_hand_lines(&s->derivation, KENT_SI) >= 3);
    assert_true(kent_hand_lines(&s->derivation, KENT_US) >= 3);
    done(&b, r);
}

/* 1 in 6 where the rules say nothing; what they say otherwise. */
static void rules_say_from_what_slope_on(void **state)
{
    (void)state;
    kent_build b = falling(19.0);
    kent_restraints *r = sized(&b);
    assert_int_equal(r->pulls.steep_count, 0);
    done(&b, r);
    b = falling(21.0);
    r = sized(&b);
    assert_int_equal(r->pulls.steep_count, 1);
    assert_true(strstr(r->pulls.steeps[0].cautions.text[0], "common practice"));
    done(&b, r);
    b = falling(21.0);
    b.model->rules.steepest_pipe = 0.2;
    r = sized(&b);
    assert_int_equal(r->pulls.steep_count, 0);
    done(&b, r);
    b = falling(21.0);
    b.model->rules.steepest_pipe = 0.1;
    r = sized(&b);
    assert_true(strstr(r->pulls.steeps[0].cautions.text[0], "steepest_pipe"));
    done(&b, r);
}

/* Sound ground holds far more than slides, and says so; anchors stay. */
static void friction_is_told_beside_and_not_counted(void **state)
{
    (void)state;
    kent_build b = falling(48.0);
    const int soil = kent_build_soil(&b, "sand", 100e3, 19e3, 1.0);
    b.model->soils[soil].friction_angle = 30.0 * PI / 180.0;
    b.model->soils[soil].cohesion = 0.0;
    b.model->soils[soil].friction_ratio = 0.7;
    kent_restraints *r = sized(&b);
    const kent_steep *s = &r->pulls.steeps[0];
    const double weight = 2.0 * 19e3 * 1.0 * 0.32 + s->weight;
    const double friction = weight * tan(21.0 * PI / 180.0) * cos(atan(0.4));
    assert_close(s->friction, friction, 1e-6);
    assert_within(s->net, 0.0, 0.0);
    assert_true(s->anchor_force > 0.0);
    assert_true(kent_hand_lines(&s->derivation, KENT_SI) >= 4);
    done(&b, r);
}

/* Welded or restrained pipe hangs on its upper end with all that friction leaves. */
static void joints_that_hold_hang_on_the_upper_end(void **state)
{
    (void)state;
    kent_build b = falling(48.0);
    b.model->pipes[0].joint = KENT_RESTRAINED;
    b.model->pipes[0].above_ground = true;
    kent_restraints *r = sized(&b);
    const kent_steep *s = &r->pulls.steeps[0];
    assert_int_equal(s->anchors, 0);
    assert_within(s->friction, 0.0, 0.0);
    assert_close(s->hangs, 1.5 * s->along * hypot(120.0, 48.0), 1e-9);
    assert_true(strstr(s->cautions.text[0], "hangs on its upper end"));
    assert_true(kent_hand_lines(&s->derivation, KENT_SI) >= 3);
    done(&b, r);
}

/* Friction that water may take away is not told as if nothing hung. */
static void what_would_hang_without_friction_is_told(void **state)
{
    (void)state;
    kent_build b = falling(48.0);
    const int soil = kent_build_soil(&b, "sand", 100e3, 19e3, 1.0);
    b.model->soils[soil].friction_angle = 30.0 * PI / 180.0;
    b.model->soils[soil].cohesion = 0.0;
    b.model->soils[soil].friction_ratio = 0.7;
    b.model->pipes[0].joint = KENT_RESTRAINED;
    kent_restraints *r = sized(&b);
    const kent_steep *s = &r->pulls.steeps[0];
    char force[48];
    (void)snprintf(force, sizeof force, "with %.1f kN factored",
                   1.5 * s->along * hypot(120.0, 48.0) / 1000.0);
    assert_within(s->hangs, 0.0, 0.0);
    assert_true(strstr(s->cautions.text[0], force));
    assert_true(strstr(s->cautions.text[0], "as long as no water loosens"));
    done(&b, r);
}

/* A case that states its factor means it for these anchors too. */
static void the_factor_is_the_case_s_where_it_states_one(void **state)
{
    (void)state;
    kent_build b = falling(48.0);
    b.model->loads.factor[KENT_CASE_STATIC] = 2.0;
    kent_restraints *r = sized(&b);
    const kent_steep *s = &r->pulls.steeps[0];
    assert_close(s->factor, 2.0, 1e-12);
    assert_close(s->anchor_force, 2.0 * s->along * s->spacing, 1e-9);
    done(&b, r);
}

static void a_pipe_of_unknown_mass_is_said_to_be(void **state)
{
    (void)state;
    kent_build b = falling(48.0);
    b.model->pipes[0].unit_mass = NAN;
    b.model->pipes[0].material_density = NAN;
    kent_restraints *r = sized(&b);
    assert_true(strstr(r->pulls.steeps[0].cautions.text[0], "mass of the pipe"));
    done(&b, r);
}

/* A riser of one pipe between two bends is their affair. */
static void a_short_riser_is_left_to_its_fittings(void **state)
{
    (void)state;
    kent_build b = falling(3.0);
    b.model->points[2].at.x = 104.0;
    kent_restraints *r = sized(&b);
    assert_int_equal(r->pulls.steep_count, 0);
    done(&b, r);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(anchors_stand_closer_the_steeper_it_falls),
        cmocka_unit_test(an_anchor_holds_what_slides_between_two),
        cmocka_unit_test(rules_say_from_what_slope_on),
        cmocka_unit_test(friction_is_told_beside_and_not_counted),
        cmocka_unit_test(joints_that_hold_hang_on_the_upper_end),
        cmocka_unit_test(what_would_hang_without_friction_is_told),
        cmocka_unit_test(the_factor_is_the_case_s_where_it_states_one),
        cmocka_unit_test(a_pipe_of_unknown_mass_is_said_to_be),
        cmocka_unit_test(a_short_riser_is_left_to_its_fittings),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
