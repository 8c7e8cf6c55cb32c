/* What geometry or network make impossible is said with its place. */
#include "kent_build.h"
#include "kent_check.h"

#include <math.h>
#include <stddef.h>
#include <string.h>

/* R - P - E along x and a branch P - D. */
static kent_build sound(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "P", 100.0, 0.0, 0.0);
    kent_build_point(&b, "E", 200.0, 0.0, 0.0);
    kent_build_point(&b, "D", 100.0, 50.0, 0.0);
    kent_build_pipe(&b, "A", "R P E", 0.3, 1000.0);
    kent_build_pipe(&b, "C", "P D", 0.1, 1000.0);
    return b;
}

/* A new note on the point's fitting, to be filled in. */
static kent_fitting_note *noted(kent_build *b, const char *at)
{
    const int note = kent_build_note(b, at);
    return &b->model->notes[note];
}

static void pipes_without_a_fixed_level_are_refused(void **state)
{
    (void)state;
    kent_build b = sound();
    kent_build_refused(&b, "no fixed level", 100);
}

/* What only a model made by hand can hold: a case's reader says it earlier. */
static void a_pipe_that_cannot_be_is_refused(void **state)
{
    (void)state;
    static const struct {
        const char *what;
        size_t field; /* of kent_pipe */
        double value;
    } BAD[] = {
        {"has no inside diameter", offsetof(kent_pipe, inside_diameter), 0.0},
        {"length must be above zero", offsetof(kent_pipe, length), 0.0},
        {"its wave speed is not known", offsetof(kent_pipe, wave_speed), (double)NAN},
    };
    for (size_t i = 0; i < sizeof BAD / sizeof BAD[0]; i++) {
        kent_build b = sound();
        kent_pipe *pipe = &b.model->pipes[0];
        kent_build_fixed_level(&b, "R", 50.0);
        pipe->wall = 0.0;
        memcpy((char *)pipe + BAD[i].field, &BAD[i].value, sizeof BAD[i].value);
        kent_build_refused(&b, BAD[i].what, 100);
    }
    kent_build b = sound();
    kent_build_fixed_level(&b, "R", 50.0);
    b.model->pipes[1].route_count = 1;
    kent_build_refused(&b, "a route needs at least two points", 101);
}

static void a_note_of_neither_place_nor_ports_is_refused(void **state)
{
    (void)state;
    kent_build b = sound();
    kent_build_fixed_level(&b, "R", 50.0);
    noted(&b, "P")->point = -1;
    kent_build_refused(&b, "has neither at nor ports", 800);
}

static void ports_beside_a_place_or_too_many_are_refused(void **state)
{
    (void)state;
    kent_port ports[9];
    for (int i = 0; i < 9; i++) {
        const double angle = 0.6 * i; /* rad */
        ports[i] =
            kent_build_port((kent_vec3){cos(angle), sin(angle), 0.0}, 1e5, 0.0, 0.3);
    }
    kent_build b = kent_build_new();
    kent_build_ports(&b, "B7", -1, ports, 9);
    kent_build_refused(&b, "has 9 ports; at most 8 are known", 800);

    b = sound();
    kent_build_fixed_level(&b, "R", 50.0);
    const int note = kent_build_ports(&b, "B7", -1, ports, 2);
    b.model->notes[note].point = 1;
    kent_build_refused(&b, "has both at and ports", 800);
}

static void a_part_cut_off_is_named(void **state)
{
    (void)state;
    kent_build b = sound();
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_point(&b, "F", 500.0, 0.0, 0.0);
    kent_build_point(&b, "G", 600.0, 0.0, 0.0);
    kent_build_pipe(&b, "F", "F G", 0.3, 1000.0);
    kent_build_refused(&b, "no fixed level reaches 2 points: \"F\", \"G\";", 102);
}

static void a_long_list_of_points_cut_off_is_shortened(void **state)
{
    (void)state;
    kent_build b = sound();
    kent_build_fixed_level(&b, "R", 50.0);
    const char *ids[] = {"a", "b", "c", "d", "e", "f", "g"};
    for (int i = 0; i < 7; i++) {
        kent_build_point(&b, ids[i], 10.0 * i, 900.0, 0.0);
    }
    for (int i = 0; i + 1 < 7; i++) {
        const char route[] = {ids[i][0], ' ', ids[i + 1][0], '\0'};
        kent_build_pipe(&b, ids[i], route, 0.3, 1000.0);
    }
    kent_build_refused(&b, "7 points: \"a\", \"b\", \"c\", \"d\", \"e\" ...", 102);
}

static void a_shut_valve_cuts_off_what_lies_beyond(void **state)
{
    (void)state;
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "V", 100.0, 0.0, 0.0);
    kent_build_point(&b, "E", 200.0, 0.0, 0.0);
    kent_build_pipe(&b, "A", "R V E", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    const int v = kent_build_valve(&b, "V1", "V", 0.1, (double)NAN);
    kent_build_derive(&b); /* open: connected */
    b.model->valves[v].opening = 0.0;
    kent_build_refused(&b, "open the valve", 100);
}

static void a_valve_stands_where_two_pipes_meet(void **state)
{
    (void)state;
    kent_build three = sound();
    kent_build_fixed_level(&three, "R", 50.0);
    kent_build_valve(&three, "V1", "P", 0.1, (double)NAN);
    kent_build_refused(&three, "3 pipes meet at \"P\"", 400);

    kent_build one = sound();
    kent_build_fixed_level(&one, "R", 50.0);
    kent_build_valve(&one, "V1", "E", 0.1, (double)NAN);
    kent_build_refused(&one, "give discharge_level", 400);

    kent_build middle = sound();
    kent_build_fixed_level(&middle, "R", 50.0);
    kent_build_valve(&middle, "V1", "P", 0.1, 3.0);
    kent_build_refused(&middle, "stands at the end of one pipe", 400);
}

static void one_device_stands_at_a_point(void **state)
{
    (void)state;
    kent_build b = sound();
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_outflow(&b, "R", 0.1);
    kent_build_refused(&b, "another device stands there", 300);
}

static void a_device_stands_on_a_pipe(void **state)
{
    (void)state;
    kent_build b = sound();
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_point(&b, "X", 7.0, 7.0, 7.0);
    kent_build_outflow(&b, "X", 0.1);
    kent_build_refused(&b, "no pipe runs through", 300);
}

static void a_pipe_needs_a_length(void **state)
{
    (void)state;
    kent_build b = sound();
    kent_build_fixed_level(&b, "R", 50.0);
    b.model->points[3].at.x = (double)NAN;
    kent_build_refused(&b, "has no length", 101);

    kent_build many = sound();
    kent_build_fixed_level(&many, "R", 50.0);
    many.model->points[2].at.y = (double)NAN;
    many.model->pipes[0].length = 200.0;
    kent_build_refused(&many, "write one pipe with its length between each two", 100);

    kent_build twice = sound();
    kent_build_fixed_level(&twice, "R", 50.0);
    twice.model->points[1].at.x = 200.0;
    kent_build_refused(&twice, "lie at the same place", 100);
}

static void a_note_needs_something_to_speak_of(void **state)
{
    (void)state;
    kent_build straight = sound();
    kent_build_fixed_level(&straight, "R", 50.0);
    kent_build_note(&straight, "R");
    kent_build_refused(&straight, "state its type", 800);

    kent_build wrong = sound();
    kent_build_fixed_level(&wrong, "R", 50.0);
    noted(&wrong, "P")->type = KENT_BEND;
    kent_build_refused(&wrong, "3 legs there cannot be a bend", 800);

    kent_build valve = sound();
    kent_build_fixed_level(&valve, "R", 50.0);
    noted(&valve, "E")->type = KENT_VALVE;
    kent_build_refused(&valve, "add one to valves", 800);

    kent_build angle = sound();
    kent_build_fixed_level(&angle, "R", 50.0);
    noted(&angle, "P")->angle = 1.0;
    kent_build_refused(&angle, "coordinates give it", 800);

    kent_build again = sound();
    kent_build_fixed_level(&again, "R", 50.0);
    kent_build_note(&again, "P");
    kent_build_note(&again, "P");
    kent_build_refused(&again, "twice", 801);
}

static void given_ports_must_be_possible(void **state)
{
    (void)state;
    const kent_vec3 west = {-1.0, 0.0, 0.0}, east = {1.0, 0.0, 0.0};
    kent_build leak = kent_build_new();
    const kent_port ports[] = {kent_build_port(west, 1e5, -0.4, 0.3),
                               kent_build_port(east, 1e5, 0.400001, 0.3)};
    kent_build_ports(&leak, "F", -1, ports, 2);
    kent_build_refused(&leak, "add up to 1e-06 m3/s", 800);

    kent_build nowhere = kent_build_new();
    const kent_port lost = kent_build_port((kent_vec3){0.0, 0.0, 0.0}, 1e5, 0.0, 0.3);
    kent_build_ports(&nowhere, "F", -1, &lost, 1);
    kent_build_refused(&nowhere, "port 1 has no direction", 800);

    kent_build type = kent_build_new();
    const kent_port end = kent_build_port(west, 1e5, 0.0, 0.3);
    kent_build_ports(&type, "F", KENT_TEE, &end, 1);
    kent_build_refused(&type, "a tee does not have 1 port", 800);
}

static void every_fault_is_counted(void **state)
{
    (void)state;
    kent_build b = sound();
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_outflow(&b, "R", 0.1);
    kent_build_valve(&b, "V1", "P", 0.1, (double)NAN);
    (void)kent_build_complaint(&b);
    assert_int_equal(b.complaints.count, 2);
    assert_int_equal(b.model->span_count, 0); /* nothing half-made is left */
    kent_build_clear(&b);
}

static void a_point_on_no_pipe_is_only_cautioned(void **state)
{
    (void)state;
    kent_build b = sound();
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_point(&b, "X", 7.0, 7.0, 7.0);
    kent_build_derive(&b);
    assert_int_equal(b.model->cautions.count, 1);
    assert_non_null(strstr(b.model->cautions.text[0], "\"X\""));
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(pipes_without_a_fixed_level_are_refused),
        cmocka_unit_test(a_pipe_that_cannot_be_is_refused),
        cmocka_unit_test(a_note_of_neither_place_nor_ports_is_refused),
        cmocka_unit_test(ports_beside_a_place_or_too_many_are_refused),
        cmocka_unit_test(a_part_cut_off_is_named),
        cmocka_unit_test(a_long_list_of_points_cut_off_is_shortened),
        cmocka_unit_test(a_shut_valve_cuts_off_what_lies_beyond),
        cmocka_unit_test(a_valve_stands_where_two_pipes_meet),
        cmocka_unit_test(one_device_stands_at_a_point),
        cmocka_unit_test(a_device_stands_on_a_pipe),
        cmocka_unit_test(a_pipe_needs_a_length),
        cmocka_unit_test(a_note_needs_something_to_speak_of),
        cmocka_unit_test(given_ports_must_be_possible),
        cmocka_unit_test(every_fault_is_counted),
        cmocka_unit_test(a_point_on_no_pipe_is_only_cautioned),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
