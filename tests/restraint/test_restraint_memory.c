/* Memory that runs out anywhere is an error and leaves nothing behind. */
#include "kent_hand.h"
#include "kent_alloc_fail.h"

typedef struct job {
    const kent_model *model;
    const kent_loads_result *loads;
} job;

static int size_once(void *context)
{
    const job *j = context;
    kent_restraints *r = NULL;
    kent_error err = {0};
    const kent_status status = kent_restraint_size(j->model, j->loads, &r, &err);

    if (status == KENT_OK) {
        kent_restraints_free(r);
        return 0;
    }
    assert_int_equal(status, KENT_E_NOMEM);
    assert_int_equal(err.status, KENT_E_NOMEM);
    assert_null(r);
    return -1;
}

static void any_allocation_may_fail_and_nothing_leaks(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6},
                                           {"shut", KENT_CASE_OCCASIONAL, 1.5, 1.1e6}};
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "B", 100.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 200.0, 30.0, 55.0);
    (void)kent_build_point(&b, "D", 300.0, 60.0, 50.0);
    (void)kent_build_pipe(&b, "P", "A B C D", 0.4, 1000.0);
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_scenario(&b, "shut", 60.0);
    (void)kent_build_soil(&b, "till", 40e3, 19e3, 1.2); /* some held, some refused */
    b.model->ground.water_table = (double)INFINITY;
    kent_build_derive(&b);
    kent_loads_result loads = kent_hand_loads(b.model, cases, 2);
    job j = {b.model, &loads};

    assert_true(kent_allocations_needed(size_once, &j) > 10);
    kent_hand_clear(&loads);
    kent_build_clear(&b);
}

/* The same through zones, past a weak stop, beside a sewer and in wet ground. */
static void nothing_leaks_of_what_is_said_of_ground_and_obstacles(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 0.3e6}};
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "B", 100.0, 0.0, 50.0);
    (void)kent_build_point(&b, "S", 100.0, 0.5, 50.0);
    (void)kent_build_point(&b, "D", 100.0, 200.0, 50.0);
    const int p = kent_build_pipe(&b, "P", "A B S D", 0.4, 1000.0);
    b.model->pipes[p].material_density = 7050.0;
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_soil(&b, "till", 100e3, 19e3, 1.2);
    (void)kent_build_soil(&b, "peat", 0.0, 12e3, 1.2);
    kent_soil *till = &b.model->soils[0];
    till->friction_angle = 0.5;
    till->cohesion = 0.0;
    till->friction_ratio = till->passive_ratio = 0.6;
    b.model->soils[1].unreliable = true;
    b.model->ground.soil = 0;
    b.model->ground.water_table = 0.0;
    b.model->points[2].cover = 0.5;
    b.model->ground_zones = kent_alloc(1, sizeof *b.model->ground_zones);
    b.model->obstacles = kent_alloc(1, sizeof *b.model->obstacles);
    assert_non_null(b.model->ground_zones);
    assert_non_null(b.model->obstacles);
    b.model->ground_zones[0] = (kent_ground_zone){.from = 101.0,
                                                  .to = 102.0,
                                                  .soil = 1,
                                                  .cover = (double)NAN,
                                                  .water_table = (double)NAN,
                                                  .trench = -1,
                                                  .backfill = -1};
    b.model->ground_zone_count = 1;
    b.model->obstacles[0] = (kent_obstacle){
        .what = "sewer", .distance = 3.0, .depth = 2.0, .direction = {1.0, 0.0, 0.0}};
    b.model->obstacle_count = 1;
    const int turn = kent_build_note(&b, "B");
    b.model->notes[turn].restraint = KENT_RESTRAINED_JOINTS;
    b.model->notes[turn].obstacle_count = 1;
    const int end = kent_build_note(&b, "D");
    b.model->notes[end].obstacle_count = 1;
    kent_build_derive(&b);
    kent_loads_result loads = kent_hand_loads(b.model, cases, 1);
    job j = {b.model, &loads};

    kent_restraints *r = kent_hand_size(&b, cases, 1);
    const kent_holding *at_b = &r->fittings[kent_build_fitting_of(&b, "B")];
    const kent_holding *at_d = &r->fittings[kent_build_fitting_of(&b, "D")];
    kent_hand_expect(at_b, "passes through 1.00 m of peat");
    kent_hand_expect(at_b, "the ground at S is the weakest");
    kent_hand_expect(at_b, "'sewer' stands near");
    kent_hand_expect(at_d, "'sewer' is clear");
    kent_hand_expect(at_d, "leans on ground under water");
    kent_restraints_free(r);
    assert_true(kent_allocations_needed(size_once, &j) > 20);
    kent_hand_clear(&loads);
    kent_build_clear(&b);
}

/* Two bends whose lengths meet, and whose legs out the system makes longer. */
static void nothing_leaks_of_systems(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6}};
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "B", 100.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 102.0, 2.0, 50.0);
    (void)kent_build_point(&b, "D", 102.0, 100.0, 50.0);
    const int p = kent_build_pipe(&b, "P", "A B C D", 0.4, 1000.0);
    b.model->pipes[p].material_density = 7050.0;
    b.model->pipes[p].laying_length = 6.0;
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_outflow(&b, "D", 0.0);
    (void)kent_build_soil(&b, "till", 100e3, 19e3, 1.2);
    kent_soil *till = &b.model->soils[0];
    till->friction_angle = 0.5;
    till->cohesion = 0.0;
    till->friction_ratio = till->passive_ratio = 0.6;
    b.model->ground.water_table = (double)INFINITY;
    for (int i = 0; i < 2; i++) {
        const int note = kent_build_note(&b, i == 0 ? "B" : "C");
        b.model->notes[note].restraint = KENT_RESTRAINED_JOINTS;
        b.model->notes[note].apart = true;
    }
    kent_build_derive(&b);
    kent_loads_result loads = kent_hand_loads(b.model, cases, 1);
    job j = {b.model, &loads};

    kent_restraints *r = kent_hand_size(&b, cases, 1);
    assert_int_equal(r->systems.count, 1);
    assert_true(r->systems.at[0].lengthened);
    kent_restraints_free(r);
    assert_true(kent_allocations_needed(size_once, &j) > 20);
    kent_hand_clear(&loads);
    kent_build_clear(&b);
}

/* Blocks that stand in each other's ground, with a share each, in falling ground and
 * against fill. */
static void nothing_leaks_of_what_is_said_of_neighbours(void **state)
{
    (void)state;
    static const kent_hand_case cases[] = {{"test", KENT_CASE_TEST, 1.5, 0.2e6}};
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", -300.0, 0.0, 50.0);
    (void)kent_build_point(&b, "E", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "G", 4.0, 0.0, 50.0);
    (void)kent_build_point(&b, "Z", 300.0, 0.0, 50.0);
    const int p = kent_build_pipe(&b, "P", "A E", 0.4, 1000.0);
    const int q = kent_build_pipe(&b, "Q", "Z G", 0.4, 1000.0);
    b.model->pipes[p].unit_mass = b.model->pipes[q].unit_mass = 100.0;
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_fixed_level(&b, "Z", 150.0);
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    kent_soil *s = &b.model->soils[0];
    s->friction_angle = 0.5;
    s->cohesion = 0.0;
    s->friction_ratio = s->passive_ratio = 0.6;
    s->bearing_gradient = 40e3;
    b.model->ground.backfill = 0;
    b.model->ground.water_table = (double)INFINITY;
    static const char *const ends[] = {"E", "G"};
    for (int i = 0; i < 2; i++) {
        const int note = kent_build_note(&b, ends[i]);
        b.model->notes[note].restraint = KENT_BLOCK_AND_JOINTS;
        b.model->notes[note].stated.block_share = 0.5;
        b.model->notes[note].stated.backing = KENT_BACKING_FILL;
        b.model->notes[note].stated.slope = (kent_slope){{1.0, 0.0, 0.0}, 0.1};
    }
    kent_build_derive(&b);
    kent_loads_result loads = kent_hand_loads(b.model, cases, 1);
    job j = {b.model, &loads};

    kent_restraints *r = kent_hand_size(&b, cases, 1);
    assert_int_equal(r->space.count, 2);
    kent_restraints_free(r);
    assert_true(kent_allocations_needed(size_once, &j) > 20);
    kent_hand_clear(&loads);
    kent_build_clear(&b);
}

static void freeing_nothing_is_safe(void **state)
{
    (void)state;
    kent_restraints_free(NULL);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(any_allocation_may_fail_and_nothing_leaks),
        cmocka_unit_test(nothing_leaks_of_what_is_said_of_ground_and_obstacles),
        cmocka_unit_test(nothing_leaks_of_systems),
        cmocka_unit_test(nothing_leaks_of_what_is_said_of_neighbours),
        cmocka_unit_test(freeing_nothing_is_safe),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
