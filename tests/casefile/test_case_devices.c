/* Pumps, valves, tanks, vessels and what moves them, from text to model: values in SI,
 * what is assumed, what a scenario takes over. What is refused: cases/bad. */
#include "case_text.h"

#include <math.h>

static const double PI = 3.14159265358979323846;

static void pumps_arrive(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, DEVICE_CASE);
    assert_int_equal(m->pump_count, 2);
    const kent_pump *p = &m->pumps[0];
    assert_string_equal(p->id, "PS");
    assert_close(p->suction_level, 41.0, 1e-15);
    assert_int_equal(p->flow_to, -1);
    assert_int_equal(p->in_parallel, 3);
    assert_int_equal(p->running, 2);
    assert_int_equal(p->curve.count, 3);
    assert_close(p->curve.flow[1], 0.137, 1e-12);
    assert_close(p->curve.head[2], 81.3, 1e-12);
    assert_close(p->curve.rated_speed, 1480.0 * PI / 30.0, 1e-12);
    assert_close(p->curve.rated_efficiency, 0.84, 1e-15);
    assert_true(isnan(p->curve.efficiency[1]));
    assert_int_equal(p->curve.stages, 2);
    assert_int_equal(p->curve.suctions, 1);
    assert_close(p->inertia, 7.6, 1e-15);
    assert_false(p->inertia_estimated);
    assert_int_equal(p->check_valve, KENT_CHECK_DELAYED);
    assert_close(p->check_delay, 0.4, 1e-15);
    /* K V2/2g with V = Q/A, A = pi 0.25^2/4, K = 1.5, g = 9.80665 m/s2 */
    const double area = 0.25 * PI * 0.25 * 0.25;
    assert_close(p->check_loss, 1.5 / (2.0 * 9.80665 * area * area), 1e-12);
    kent_model_free(m);
    kent_catalogue_free(c);
}

/* By pairs of its own flows: straight lines between them. */
static void efficiencies_are_read_off_their_pairs(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, DEVICE_CASE);
    const kent_pump *p = &m->pumps[1];
    assert_string_equal(p->id, "PB");
    assert_true(isnan(p->suction_level));
    assert_int_equal(p->flow_to, kent_model_point_index(m, "K2"));
    assert_close(p->curve.efficiency[1], 0.7 * 40.0 / 50.0, 1e-12);
    assert_close(p->curve.efficiency[2], 0.7 + (0.8 - 0.7) * 30.0 / 50.0, 1e-12);
    assert_close(p->curve.rated_efficiency, 0.7 + (0.8 - 0.7) * 10.0 / 50.0, 1e-12);
    assert_int_equal(p->check_valve, KENT_CHECK_IDEAL);
    assert_non_null(strstr(assumed(m, "check_valve of pump PB"), "ideal"));
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void an_inertia_nobody_gave_is_estimated_and_told(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, DEVICE_CASE);
    const kent_pump *p = &m->pumps[1];
    const kent_pump_curve *k = &p->curve;
    const double power = m->water.density * m->gravity * k->rated_flow * k->rated_head /
                         k->rated_efficiency;
    assert_true(p->inertia_estimated);
    assert_close(p->inertia, kent_pump_inertia_estimate(power, k->rated_speed), 1e-13);
    assert_non_null(strstr(assumed(m, "inertia of pump PB"), "+-50 %"));
    assert_null(assumed(m, "inertia of pump PS"));
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void valves_arrive(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, DEVICE_CASE);
    const kent_check_valve *n = &m->check_valves[0];
    assert_close(n->size, 0.3, 1e-15);
    assert_close(n->loss, 1.2, 1e-15);
    assert_close(n->delay, 0.0, 0.0);
    assert_non_null(assumed(m, "delay of check valve NR"));
    const kent_control_valve *v = &m->control_valves[0];
    assert_int_equal(v->holds, KENT_HOLDS_UPSTREAM);
    assert_close(v->set_pressure, 4e5, 1e-12);
    /* Kv in m3/h at 1 bar of water of 1000 kg/m3 (IEC 60534-1): E = Q/sqrt(h) */
    assert_close(v->capacity, 600.0 / 3600.0 / sqrt(1e5 / (1000.0 * 9.80665)), 1e-12);
    assert_close(v->opening_time, 8.0, 1e-15);
    assert_close(v->closure_time, 9.0, 1e-15);
    const kent_relief_valve *r = &m->relief_valves[0];
    assert_close(r->full_open_pressure, 16.5e5, 1e-12);
    assert_close(r->low_set_pressure, 3e5, 1e-12);
    assert_close(r->hold_time, 5.0, 1e-15);
    assert_close(r->discharge_level, 60.0, 1e-15); /* its point's */
    assert_close(r->opening_time, 0.0, 0.0);
    assert_close(r->closure_time, 20.0, 1e-15);
    const kent_air_valve *a = &m->air_valves[0];
    assert_int_equal(a->in_parallel, 2);
    assert_close(a->admission_orifice, 0.15, 1e-15);
    assert_close(a->release_coefficient, 0.6, 1e-15);
    assert_close(a->switch_pressure, 5e3, 1e-12);
    assert_close(a->switched_orifice, 0.005, 1e-15);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void tanks_and_vessels_arrive(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, DEVICE_CASE);
    const kent_surge_tank *t = &m->surge_tanks[0];
    assert_close(t->area, 20.0, 1e-15);
    assert_true(isinf(t->overflow_level));
    assert_close(t->loss_in, 0.5, 1e-15);
    assert_close(t->loss_out, 0.0, 0.0);
    assert_non_null(assumed(m, "overflow_level of surge tank ST"));
    assert_non_null(assumed(m, "loss_out of surge tank ST"));
    assert_null(assumed(m, "loss_in of surge tank ST"));
    const kent_one_way_tank *o = &m->one_way_tanks[0];
    assert_close(o->level, 98.0, 1e-15);
    assert_true(isinf(o->bottom_level) && o->bottom_level < 0.0);
    const kent_air_vessel *v = &m->air_vessels[0];
    assert_close(v->gas_volume, 4.5, 1e-15);
    assert_close(v->polytropic_exponent, 1.2, 1e-15);
    assert_close(v->water_level, 42.0, 1e-15); /* its point's */
    assert_true(isinf(v->area));
    assert_int_equal(v->next_to, kent_model_point_index(m, "PH"));
    kent_model_free(m);
    kent_catalogue_free(c);
}

static const kent_event *event(const kent_model *m, size_t scenario, size_t k)
{
    assert_true(k < m->scenarios[scenario].event_count);
    return &m->events[m->scenarios[scenario].event_first + k];
}

static void events_arrive(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, DEVICE_CASE);
    const kent_event *trip = event(m, 0, 0);
    assert_int_equal(trip->kind, KENT_EVENT_PUMP);
    assert_int_equal(trip->action, KENT_TRIP);
    assert_int_equal(trip->how_many, 2);
    assert_true(isnan(trip->ramp_time));
    const kent_event *ramp = event(m, 0, 1);
    assert_int_equal(ramp->action, KENT_RAMP);
    assert_int_equal(ramp->target, 1);
    assert_int_equal(ramp->how_many, 0); /* all */
    assert_close(ramp->to, 0.8, 1e-15);
    const kent_event *tide = event(m, 2, 0);
    assert_int_equal(tide->kind, KENT_EVENT_FIXED_LEVEL);
    assert_int_equal(tide->law_count, 2);
    assert_close(m->law[tide->law_first + 1].value, 99.0, 1e-15);
    assert_close(tide->period, 30.0, 1e-15);
    const kent_event *burst = event(m, 2, 1), *again = event(m, 2, 2);
    assert_int_equal(m->burst_count, 1); /* one hole, opened twice */
    assert_int_equal(burst->target, 0);
    assert_int_equal(again->target, 0);
    assert_int_equal(m->bursts[0].point, kent_model_point_index(m, "K3"));
    assert_close(burst->to, 0.01, 1e-15);
    assert_close(burst->coefficient, 0.6, 1e-15);
    assert_close(again->coefficient, 0.8, 1e-15);
    assert_close(burst->ramp_time, 0.0, 0.0);
    assert_non_null(assumed(m, "coefficient of bursts"));
    const kent_event *draw = event(m, 2, 3);
    assert_int_equal(draw->kind, KENT_EVENT_OUTFLOW);
    assert_int_equal(draw->law_count, 2);
    assert_close(m->law[draw->law_first + 1].value, 0.001, 1e-15);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void a_scenario_takes_over_what_it_does_not_say(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, DEVICE_CASE);
    const kent_scenario *first = &m->scenarios[0], *bare = &m->scenarios[1];
    assert_int_equal(first->same_as, -1);
    assert_false(first->for_comparison);
    assert_int_equal(bare->same_as, 0);
    assert_true(bare->for_comparison);
    assert_int_equal(bare->event_first, first->event_first);
    assert_int_equal(bare->event_count, 2);
    assert_close(bare->duration, 60.0, 1e-15);
    assert_int_equal(bare->class_of, KENT_RECURRING);
    assert_int_equal(bare->state_count, 1);
    assert_int_equal(m->scenario_states[bare->state_first], 0);
    assert_int_equal(bare->without_count, 2);
    const kent_left_out *out = &m->without[bare->without_first];
    assert_int_equal(out[0].kind, KENT_DEVICE_AIR_VESSEL);
    assert_int_equal(out[0].index, 0);
    assert_int_equal(out[1].kind, KENT_DEVICE_SURGE_TANK);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void a_state_says_which_units_run(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, DEVICE_CASE);
    assert_int_equal(m->states[0].running_count, 0);
    assert_int_equal(m->states[1].running_count, 2);
    const kent_state_running *r = &m->state_running[m->states[1].running_first];
    assert_int_equal(r[0].pump, 0);
    assert_int_equal(r[0].running, 1);
    assert_int_equal(r[1].running, 0);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void choices_of_the_solver_arrive(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, SOUND_CASE);
    assert_int_equal(m->solver.column_separation, KENT_SEPARATION_GAS);
    assert_int_equal(m->solver.friction, KENT_SURGE_QUASI_STEADY);
    assert_false(m->solver.creep);
    kent_model_free(m);
    m = read_sound(c, DEVICE_CASE);
    assert_int_equal(m->solver.column_separation, KENT_SEPARATION_VAPOUR);
    assert_int_equal(m->solver.friction, KENT_SURGE_UNSTEADY);
    assert_true(m->solver.creep);
    kent_model_free(m);
    kent_catalogue_free(c);
}

static void an_efficiency_below_all_published_ones_is_cautioned(void **state)
{
    (void)state;
    const char *given[] = {"efficiency = 0.65;", "efficiency = 0.64;"};
    kent_catalogue *c = read_catalogue();
    for (int i = 0; i < 2; i++) {
        char *text = replaced(DEVICE_CASE, "efficiency = 0.84;", given[i]);
        kent_model *m = read_sound(c, text);
        assert_int_equal(cautions_with(m, "pump PS: a rated efficiency of 0.64"), i);
        kent_model_free(m);
        free(text);
    }
    kent_catalogue_free(c);
}

static void starting_pumps_is_cautioned_once(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    kent_model *m = read_sound(c, DEVICE_CASE);
    assert_int_equal(cautions_with(m, "filling an empty line"), 0);
    kent_model_free(m);
    char *text = replaced(DEVICE_CASE, "action = \"trip\";",
                          "action = \"start\"; ramp_time = \"5 s\";");
    m = read_sound(c, text);
    assert_int_equal(cautions_with(m, "filling an empty line"), 1);
    kent_model_free(m);
    free(text);
    kent_catalogue_free(c);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(pumps_arrive),
        cmocka_unit_test(efficiencies_are_read_off_their_pairs),
        cmocka_unit_test(an_inertia_nobody_gave_is_estimated_and_told),
        cmocka_unit_test(valves_arrive),
        cmocka_unit_test(tanks_and_vessels_arrive),
        cmocka_unit_test(events_arrive),
        cmocka_unit_test(a_scenario_takes_over_what_it_does_not_say),
        cmocka_unit_test(a_state_says_which_units_run),
        cmocka_unit_test(choices_of_the_solver_arrive),
        cmocka_unit_test(an_efficiency_below_all_published_ones_is_cautioned),
        cmocka_unit_test(starting_pumps_is_cautioned_once),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
