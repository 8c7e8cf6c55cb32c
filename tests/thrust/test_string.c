/* Strings of fused and welded pipe: where they end, and under which pressures. */
#include "kent_check.h"
#include "kent_net.h"

#include <math.h>
#include <string.h>

/* R - P - Q - E - D in a line, 100 m each; joints by pipe, one pipe per leg. */
static kent_build line_of(const kent_joint joint[4])
{
    static const char *const POINTS[] = {"R", "P", "Q", "E", "D"};
    static const char *const PIPES[] = {"A", "B", "C", "F"};
    static const char *const ROUTES[] = {"R P", "P Q", "Q E", "E D"};
    kent_build b = kent_build_new();

    for (int i = 0; i < 5; i++) {
        (void)kent_build_point(&b, POINTS[i], 100.0 * i, 0.0, i == 2 ? 5.0 : 0.0);
    }
    for (int i = 0; i < 4; i++) {
        const int p = kent_build_pipe(&b, PIPES[i], ROUTES[i], 0.3, 1000.0);
        b.model->pipes[p].joint = joint[i];
    }
    (void)kent_build_fixed_level(&b, "R", 50.0);
    return b;
}

static const kent_string_end *end_at(const kent_net *n, const char *point)
{
    for (size_t i = 0; i < n->loads->strings.end_count; i++) {
        const kent_string_end *e = &n->loads->strings.ends[i];
        if (strcmp(n->model->points[e->point].id, point) == 0) return e;
    }
    fail_msg("no string ends at %s", point);
    return NULL;
}

static kent_net net_of(kent_build b)
{
    kent_net n = kent_net_of(b);
    kent_net_finish(&n);
    return n;
}

static void a_string_ends_where_joints_can_slip(void **state)
{
    (void)state;
    const kent_joint joints[] = {KENT_PUSH_ON, KENT_FUSED, KENT_FUSED, KENT_PUSH_ON};
    kent_net n = net_of(line_of(joints));
    assert_int_equal(n.loads->strings.string_count, 1);
    assert_int_equal(n.loads->strings.end_count, 2);
    assert_close(n.loads->strings.length[0], 2.0 * hypot(100.0, 5.0), 1e-9);
    const kent_string_end *e = end_at(&n, "P");
    assert_int_equal(e->kind, KENT_STRING_TO_JOINTS);
    assert_string_equal(n.model->spans[e->span].id, "B");
    assert_string_equal(n.model->spans[e->beyond].id, "A");
    assert_close(e->beyond_chainage, 100.0, 1e-12);
    assert_true(e->sign > 0.0 && e->beyond_sign < 0.0);
    assert_true(end_at(&n, "E")->sign < 0.0);
    kent_net_clear(&n);
}

static void walls_pumps_and_dead_ends_end_it_each_in_its_way(void **state)
{
    (void)state;
    const kent_joint joints[] = {KENT_FUSED, KENT_FUSED, KENT_RESTRAINED, KENT_WELDED};
    kent_net n = net_of(line_of(joints));
    assert_int_equal(n.loads->strings.string_count, 2);
    assert_int_equal(n.loads->strings.end_count, 4);
    assert_int_equal(end_at(&n, "R")->kind, KENT_STRING_TO_WALL);
    assert_int_equal(end_at(&n, "Q")->kind, KENT_STRING_TO_RESTRAINED);
    assert_int_equal(end_at(&n, "E")->kind, KENT_STRING_TO_RESTRAINED);
    assert_int_equal(end_at(&n, "D")->kind, KENT_STRING_CLOSED);
    kent_net_clear(&n);
}

static void flanged_pipes_alone_are_no_string(void **state)
{
    (void)state;
    const kent_joint joints[] = {KENT_FLANGED, KENT_FLANGED, KENT_PUSH_ON,
                                 KENT_PUSH_ON};
    kent_net n = net_of(line_of(joints));
    assert_int_equal(n.loads->strings.string_count, 0);
    assert_int_equal(n.loads->strings.end_count, 0);
    kent_net_clear(&n);
}

static void flanged_pipes_carry_a_string_on(void **state)
{
    (void)state;
    const kent_joint joints[] = {KENT_FLANGED, KENT_FUSED, KENT_PUSH_ON, KENT_PUSH_ON};
    kent_net n = net_of(line_of(joints));
    assert_int_equal(n.loads->strings.string_count, 1);
    assert_int_equal(end_at(&n, "R")->kind, KENT_STRING_TO_WALL);
    assert_int_equal(end_at(&n, "Q")->kind, KENT_STRING_TO_JOINTS);
    kent_net_clear(&n);
}

/* An adaptor, or a wall, in the middle of a pipe parts it. */
static void an_adaptor_parts_a_string(void **state)
{
    (void)state;
    const kent_role roles[] = {KENT_ROLE_FLANGE_ADAPTOR, KENT_ROLE_WALL};
    const kent_string_end_kind kinds[] = {KENT_STRING_TO_JOINTS, KENT_STRING_TO_WALL};
    for (int i = 0; i < 2; i++) {
        kent_build b = kent_build_new();
        (void)kent_build_point(&b, "R", 0.0, 0.0, 0.0);
        (void)kent_build_point(&b, "P", 100.0, 0.0, 0.0);
        (void)kent_build_point(&b, "E", 300.0, 0.0, 0.0);
        const int p = kent_build_pipe(&b, "A", "R P E", 0.3, 1000.0);
        b.model->pipes[p].joint = KENT_FUSED;
        (void)kent_build_fixed_level(&b, "R", 50.0);
        const int note = kent_build_note(&b, "P");
        b.model->notes[note].role = roles[i];
        kent_net n = net_of(b);
        assert_int_equal(n.loads->strings.string_count, 2);
        assert_int_equal(n.loads->strings.end_count, 4);
        assert_close(n.loads->strings.length[0], 100.0, 1e-12);
        assert_close(n.loads->strings.length[1], 200.0, 1e-12);
        assert_int_equal(end_at(&n, "P")->kind, kinds[i]);
        assert_close(end_at(&n, "P")->chainage, 100.0, 1e-12);
        kent_net_clear(&n);
    }
}

/* rho g (50 - z) at rest; the site test as stated; lasting or not. */
static void an_end_has_the_pressures_of_every_case(void **state)
{
    (void)state;
    const kent_joint joints[] = {KENT_PUSH_ON, KENT_FUSED, KENT_PUSH_ON, KENT_PUSH_ON};
    kent_build b = line_of(joints);
    b.model->loads.test_pressure = 12e5;
    (void)kent_build_scenario(&b, "knock", 1.0);
    kent_net n = kent_net_of(b);
    kent_made made = {0};
    kent_made_add(&made, &n, 0.0, 50.0, 0.0);
    kent_made_add(&made, &n, 0.5, 80.0, 0.0);
    kent_made_add(&made, &n, 1.0, 20.0, 0.0);
    kent_made_take(&made, &n, 0, 0.5, 2);
    kent_net_finish(&n);
    const kent_string_end *e = end_at(&n, "Q"); /* 5 m up */
    const double rho_g = n.model->water.density * n.model->gravity;
    size_t seen = 0;
    for (size_t i = 0; i < e->case_count; i++) {
        const kent_string_case *c = &e->cases[i];
        if (strcmp(c->name, "test") == 0) {
            assert_close(c->pressure, 12e5, 1e-12);
            assert_false(c->lasts);
            seen |= 1;
        } else if (strcmp(c->name, "static") == 0) {
            assert_close(c->pressure, rho_g * 45.0, 1e-12);
            assert_true(c->lasts);
            seen |= 2;
        } else if (strcmp(c->name, "knock") == 0) {
            assert_close(c->pressure, rho_g * 75.0, 1e-12);
            assert_close(c->time, 0.5, 1e-12);
            assert_false(c->lasts);
            seen |= 4;
        }
        assert_true(c->safety_factor >= 1.0);
    }
    assert_int_equal(seen, 7);
    kent_net_clear(&n);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_string_ends_where_joints_can_slip),
        cmocka_unit_test(walls_pumps_and_dead_ends_end_it_each_in_its_way),
        cmocka_unit_test(flanged_pipes_alone_are_no_string),
        cmocka_unit_test(flanged_pipes_carry_a_string_on),
        cmocka_unit_test(an_adaptor_parts_a_string),
        cmocka_unit_test(an_end_has_the_pressures_of_every_case),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
