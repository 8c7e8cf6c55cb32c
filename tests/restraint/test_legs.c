/* Restrained lengths in every configuration: forms side by side, backfill, slopes,
 * casings, a tee's run, and where a leg ends. Values by hand from the published forms
 * of docs/theory/11. */
#include "kent_hand.h"

#include <string.h>

static const double PI = 3.14159265358979323846;
static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

enum { ZONES = 8, TILL = 0, CLAY = 1, FILL = 2 };

static const kent_hand_case TEST[] = {{"test", KENT_CASE_TEST, 1.5, 1.0e6}};

static void full_soil(kent_soil *s, double phi, double cohesion)
{
    s->friction_angle = phi * DEGREE;
    s->cohesion = cohesion;
    s->friction_ratio = 0.75;
    s->adhesion_ratio = 0.5;
    s->passive_ratio = 0.6;
}

/* A to C to E, 200 m each, 620 mm outside, wall 10 mm; at C it turns left by `turn` and
 * has restrained joints. E lies `rise` higher than C. Cover 1.5 m, till all along. */
static kent_build main_with(double turn, double rise)
{
    kent_build b = kent_build_new();
    const double plan = sqrt(200.0 * 200.0 - rise * rise);
    (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "E", plan * cos(turn), plan * sin(turn), 50.0 + rise);
    const int p = kent_build_pipe(&b, "P", "A C E", 0.6, 1000.0);
    b.model->pipes[p].material_density = 7050.0;
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_outflow(&b, "E", 0.0);
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    (void)kent_build_soil(&b, "clay", 90e3, 17e3, 1.5);
    (void)kent_build_soil(&b, "sand", 100e3, 16e3, 1.5);
    full_soil(&b.model->soils[TILL], 30.0, 0.0);
    full_soil(&b.model->soils[CLAY], 18.0, 8e3);
    full_soil(&b.model->soils[FILL], 34.0, 0.0);
    b.model->ground.soil = TILL;
    b.model->ground.water_table = (double)INFINITY;
    b.model->loads.test_pressure = 1.0e6;
    const int note = kent_build_note(&b, "C");
    b.model->notes[note].restraint = KENT_RESTRAINED_JOINTS;
    return b;
}

static void ask_for_joints(kent_build *b, const char *at)
{
    const int note = kent_build_note(b, at);
    b->model->notes[note].restraint = KENT_RESTRAINED_JOINTS;
}

static kent_ground_zone *zoned(kent_build *b, double from, double to, int soil)
{
    kent_model *m = b->model;
    if (!m->ground_zones) {
        m->ground_zones = kent_alloc(ZONES, sizeof *m->ground_zones);
        assert_non_null(m->ground_zones);
    }
    assert_true(m->ground_zone_count < ZONES);
    kent_ground_zone *zone = &m->ground_zones[m->ground_zone_count++];
    *zone = (kent_ground_zone){.from = from,
                               .to = to,
                               .soil = soil,
                               .cover = (double)NAN,
                               .water_table = (double)NAN,
                               .trench = -1,
                               .backfill = -1};
    return zone;
}

static kent_restraints *sized(kent_build *b)
{
    kent_build_derive(b);
    return kent_hand_size(b, TEST, 1);
}

static const kent_holding *at(const kent_build *b, const kent_restraints *r,
                              const char *id)
{
    return &r->fittings[kent_build_fitting_of(b, id)];
}

static void finish(kent_build *b, kent_restraints *r)
{
    kent_restraints_free(r);
    kent_build_clear(b);
}

static const double IRON = 3.14159265358979323846 * 0.61 * 0.01 * 7050.0 * 9.80665;
static const double WATER = 1000.0 * 9.80665 * 0.25 * 3.14159265358979323846 * 0.36;
static const double FORCE = 1.0e6 * 0.25 * 3.14159265358979323846 * 0.62 * 0.62;

/* N/m of friction at bends (half) or ends (whole), by hand. */
static double rubs(const kent_soil *s, double slope, bool whole)
{
    const double weight = 2.0 * s->unit_weight * 1.5 * 0.62 + IRON + WATER;
    const double sticks = (whole ? 1.0 : 0.5) * PI * 0.62 * 0.5 * s->cohesion;
    return sticks + weight * cos(slope) * tan(0.75 * s->friction_angle);
}

/* N/m of the trench side, with cohesion or without. */
static double bears(const kent_soil *s, bool cohesive)
{
    const double root = tan(45.0 * DEGREE + 0.5 * s->friction_angle);
    const double pressure = s->unit_weight * (1.5 + 0.31) * root * root +
                            (cohesive ? 2.0 * s->cohesion * root : 0.0);
    return 0.6 * pressure * 0.62;
}

/* ---- two forms ------------------------------------------------------------------- */

/* USACE ETL 1110-3-446, 1992: L = FS P A tan(th/2)/(Ff + 0.5 R gamma Z Kp Do), in which
 * cohesion does not help the side of the trench. */
static void in_clay_the_form_of_the_etl_gives_the_longer_length(void **state)
{
    (void)state;
    for (int etl = 0; etl < 2; etl++) {
        kent_build b = main_with(22.5 * DEGREE, 0.0);
        b.model->ground.soil = CLAY;
        b.model->rules.length_form = etl ? KENT_FORM_ETL : KENT_FORM_HANDBOOK;
        kent_restraints *r = sized(&b);
        const kent_holding *h = at(&b, r, "C");
        const kent_soil *s = &b.model->soils[CLAY];
        const double demand = 1.5 * FORCE * tan(11.25 * DEGREE);
        const double handbook = demand / (rubs(s, 0.0, false) + 0.5 * bears(s, true));
        const double other = demand / (rubs(s, 0.0, false) + 0.5 * bears(s, false));
        assert_int_equal(h->leg_count, 2);
        assert_close(h->legs[0].by_form[KENT_FORM_HANDBOOK], handbook, 1e-9);
        assert_close(h->legs[0].by_form[KENT_FORM_ETL], other, 1e-9);
        assert_close(h->legs[0].length, etl ? other : handbook, 1e-9);
        assert_true(other > 1.05 * handbook);
        assert_true(kent_hand_says(h, "by the form of USACE ETL 1110-3-446 the "
                                      "restrained length towards A would be") ==
                    (etl == 0));
        assert_non_null(kent_derivation_find(&h->derivation, etl ? "L_hb" : "L_etl"));
        assert_true(kent_hand_lines(&h->derivation, KENT_SI) > 5);
        finish(&b, r);
    }
}

static void without_cohesion_both_forms_give_one_length(void **state)
{
    (void)state;
    kent_build b = main_with(22.5 * DEGREE, 0.0);
    kent_restraints *r = sized(&b);
    const kent_holding *h = at(&b, r, "C");
    assert_close(h->legs[0].by_form[0], h->legs[0].by_form[1], 1e-12);
    assert_null(kent_derivation_find(&h->derivation, "L_etl"));
    finish(&b, r);
}

static void the_etl_has_no_form_for_an_end(void **state)
{
    (void)state;
    kent_build b = main_with(22.5 * DEGREE, 0.0);
    b.model->rules.length_form = KENT_FORM_ETL;
    ask_for_joints(&b, "E");
    b.model->outflow_count = 0;
    kent_restraints *r = sized(&b);
    const kent_holding *h = at(&b, r, "E");
    assert_int_equal(h->leg_count, 1);
    assert_true(isnan(h->legs[0].by_form[KENT_FORM_ETL]) != 0);
    assert_int_equal(h->legs[0].form, KENT_FORM_HANDBOOK);
    assert_close(h->legs[0].length,
                 1.5 * FORCE / rubs(&b.model->soils[TILL], 0.0, true), 1e-9);
    kent_hand_expect(h, "has no form for this");
    finish(&b, r);
}

/* ---- backfill -------------------------------------------------------------------- */

static void backfill_rubs_and_native_ground_bears(void **state)
{
    (void)state;
    kent_build b = main_with(22.5 * DEGREE, 0.0);
    b.model->ground.soil = CLAY;
    b.model->ground.backfill = FILL;
    kent_restraints *r = sized(&b);
    const kent_holding *h = at(&b, r, "C");
    const double holds = rubs(&b.model->soils[FILL], 0.0, false) +
                         0.5 * bears(&b.model->soils[CLAY], true);
    assert_close(h->legs[0].length, 1.5 * FORCE * tan(11.25 * DEGREE) / holds, 1e-9);
    kent_hand_expect(h,
                     "friction on the pipe is that of the backfill, 'sand'; the side "
                     "of the trench bears as the native soil, 'clay'");
    assert_true(kent_hand_lines(&h->derivation, KENT_SI) > 5);
    assert_true(kent_hand_lines(&h->derivation, KENT_US) > 5);
    finish(&b, r);
}

static void backfill_of_a_zone_counts_in_it(void **state)
{
    (void)state;
    kent_build b = main_with(22.5 * DEGREE, 0.0);
    zoned(&b, 200.5, 300.0, TILL)->backfill = CLAY;
    kent_restraints *r = sized(&b);
    const kent_soil *till = &b.model->soils[TILL];
    const double first = rubs(till, 0.0, false) + 0.5 * bears(till, true);
    const double second =
        rubs(&b.model->soils[CLAY], 0.0, false) + 0.5 * bears(till, true);
    assert_close(at(&b, r, "C")->legs[1].length,
                 0.5 + (1.5 * FORCE * tan(11.25 * DEGREE) - 0.5 * first) / second,
                 1e-9);
    finish(&b, r);
}

static void nothing_holds_through_backfill_that_cannot_be_relied_on(void **state)
{
    (void)state;
    for (int loose = 0; loose < 2; loose++) {
        kent_build b = main_with(22.5 * DEGREE, 0.0);
        zoned(&b, 200.5, 205.5, TILL)->backfill = FILL;
        b.model->soils[FILL].nature = loose ? KENT_FILL : KENT_NATURAL;
        b.model->soils[FILL].unreliable = true;
        kent_restraints *r = sized(&b);
        const kent_holding *h = at(&b, r, "C");
        assert_close(h->legs[1].length, 5.0 + h->legs[0].length, 1e-9);
        kent_hand_expect(h, "passes through 5.00 m of backfill 'sand'");
        finish(&b, r);
    }
}

static void what_backfill_lacks_is_named(void **state)
{
    (void)state;
    kent_build b = main_with(22.5 * DEGREE, 0.0);
    b.model->ground.backfill = FILL;
    b.model->soils[FILL].friction_ratio = (double)NAN;
    b.model->soils[FILL].passive_ratio = (double)NAN; /* not asked of fill */
    kent_restraints *r = sized(&b);
    kent_hand_expect(at(&b, r, "C"), "soil 'sand' lacks friction_ratio;");
    finish(&b, r);

    b = main_with(22.5 * DEGREE, 0.0);
    b.model->ground.backfill = FILL;
    b.model->soils[TILL].friction_ratio = (double)NAN; /* not asked of native ground */
    b.model->soils[TILL].passive_ratio = (double)NAN;
    r = sized(&b);
    kent_hand_expect(at(&b, r, "C"), "soil 'till' lacks passive_ratio;");
    finish(&b, r);
}

/* ---- slopes, casings, above ground ----------------------------------------------- */

/* Statics of a body on an incline: W cos b presses, (Wp + Ww) sin b draws down. */
static void uphill_the_weight_of_pipe_and_water_asks_for_more(void **state)
{
    (void)state;
    kent_build b = main_with(22.5 * DEGREE, 20.0);
    ask_for_joints(&b, "E");
    b.model->outflow_count = 0;
    kent_restraints *r = sized(&b);
    const kent_soil *till = &b.model->soils[TILL];
    const kent_holding *c = at(&b, r, "C"), *e = at(&b, r, "E");
    const double slope = asin(0.1);
    const double turn = b.model->fittings[kent_build_fitting_of(&b, "C")].angle;
    const double draws = 1.5 * (IRON + WATER) * 0.1;
    const double demand = 1.5 * FORCE * tan(0.5 * turn);
    const double sloping = rubs(till, slope, false);
    assert_close(
        c->legs[1].length,
        demand / (sloping + (c->legs[1].bears ? 0.5 * bears(till, true) : 0.0) - draws),
        1e-9);
    /* E's leg runs downhill: the weight would help, and is not counted */
    assert_close(e->legs[0].length, 1.5 * FORCE / rubs(till, slope, true), 1e-9);
    assert_true(kent_hand_lines(&c->derivation, KENT_SI) > 5);
    assert_non_null(kent_derivation_find(&c->derivation, "Gs"));
    finish(&b, r);
}

static void a_casing_holds_nothing_and_is_passed_through(void **state)
{
    (void)state;
    kent_build b = main_with(22.5 * DEGREE, 0.0);
    zoned(&b, 200.5, 212.5, TILL)->casing = true;
    kent_restraints *r = sized(&b);
    const kent_holding *h = at(&b, r, "C");
    assert_close(h->legs[1].length, 12.0 + h->legs[0].length, 1e-9);
    assert_true(h->legs[1].fits);
    kent_hand_expect(h, "12.00 m of casing, which holds nothing: restrain every joint");
    assert_true(kent_hand_lines(&h->derivation, KENT_SI) > 5);
    finish(&b, r);
}

/* At 1:10 uphill through a casing the pipe there hangs on what follows. */
static void a_casing_uphill_draws_on_the_ground_beyond(void **state)
{
    (void)state;
    kent_build b = main_with(22.5 * DEGREE, 20.0);
    zoned(&b, 200.5, 212.5, TILL)->casing = true;
    kent_restraints *r = sized(&b);
    const kent_holding *h = at(&b, r, "C");
    const kent_soil *till = &b.model->soils[TILL];
    const double turn = b.model->fittings[kent_build_fitting_of(&b, "C")].angle;
    const double draws = 1.5 * (IRON + WATER) * 0.1;
    const double side = h->legs[1].bears ? 0.5 * bears(till, true) : 0.0;
    const double holds = rubs(till, asin(0.1), false) + side - draws;
    const double left = 1.5 * FORCE * tan(0.5 * turn) - 0.5 * holds + 12.0 * draws;
    assert_close(h->legs[1].length, 12.5 + left / holds, 1e-9);
    assert_true(kent_hand_lines(&h->derivation, KENT_SI) > 5);
    finish(&b, r);
}

/* P to J, then Q on to E, laid above ground or not, then R. */
static kent_build main_of_pipes(bool above)
{
    kent_build b = kent_build_new();
    (void)kent_build_point(&b, "A", -200.0, 0.0, 50.0);
    (void)kent_build_point(&b, "C", 0.0, 0.0, 50.0);
    (void)kent_build_point(&b, "J", 0.0, 1.0, 50.0);
    (void)kent_build_point(&b, "K", 0.0, 31.0, 50.0);
    (void)kent_build_point(&b, "E", 0.0, 231.0, 50.0);
    (void)kent_build_point(&b, "T", -10.0, 0.0, 50.0);
    int p = kent_build_pipe(&b, "P", "A T C J", 0.6, 1000.0);
    b.model->pipes[p].material_density = 7050.0;
    b.model->pipes[p].laying_length = 6.0;
    p = kent_build_pipe(&b, "Q", "K J", 0.6, 1000.0); /* laid the other way */
    b.model->pipes[p].material_density = 7050.0;
    b.model->pipes[p].above_ground = above;
    b.model->pipes[p].laying_length = 5.0;
    p = kent_build_pipe(&b, "R", "K E", 0.6, 1000.0);
    b.model->pipes[p].material_density = 7050.0;
    b.model->pipes[p].laying_length = 6.0;
    (void)kent_build_fixed_level(&b, "A", 150.0);
    (void)kent_build_outflow(&b, "E", 0.0);
    (void)kent_build_soil(&b, "till", 150e3, 19e3, 1.5);
    full_soil(&b.model->soils[TILL], 30.0, 0.0);
    b.model->ground.water_table = (double)INFINITY;
    b.model->loads.test_pressure = 1.0e6;
    ask_for_joints(&b, "C");
    return b;
}

/* The next pipe takes over where one ends; one above ground holds nothing. */
static void a_leg_goes_on_into_the_next_pipe(void **state)
{
    (void)state;
    for (int above = 0; above < 2; above++) {
        kent_build b = main_of_pipes(above != 0);
        kent_restraints *r = sized(&b);
        const kent_holding *h = at(&b, r, "C");
        const kent_soil *till = &b.model->soils[TILL];
        const double alone =
            1.5 * FORCE / (rubs(till, 0.0, false) + 0.5 * bears(till, true));
        const double length = alone + (above ? 30.0 : 0.0);
        assert_close(h->legs[1].length, length, 1e-9);
        assert_true(h->legs[1].fits);
        assert_int_equal(h->legs[1].end, KENT_LEG_IN_GROUND);
        /* one piece of P to J, then six of Q where it lies above, and R's */
        const int beyond =
            (int)ceil((length - (above ? 31.0 : 1.0)) / (above ? 6.0 : 5.0));
        assert_int_equal(h->legs[1].pipes, above ? 1 + 6 + beyond : 1 + beyond);
        assert_true(kent_hand_says(h, "30.00 m of Q, which lies above ground") ==
                    (above == 1));
        assert_true(kent_hand_lines(&h->derivation, KENT_SI) > 5);
        finish(&b, r);
    }
}

static void a_leg_ends_where_a_pipe_of_another_size_goes_on(void **state)
{
    (void)state;
    kent_build b = main_of_pipes(false);
    b.model->pipes[1].outside_diameter = 0.635;
    kent_restraints *r = sized(&b);
    const kent_holding *h = at(&b, r, "C");
    assert_false(h->legs[1].fits);
    assert_true(h->legs[0].fits);
    finish(&b, r);
}

/* ---- a tee's run ----------------------------------------------------------------- */

static kent_build main_with_branch(double before, double after, double share)
{
    kent_build b = main_with(0.0, 0.0);
    (void)kent_build_point(&b, "S", 0.0, -100.0, 50.0);
    const int q = kent_build_pipe(&b, "Q", "C S", 0.2, 1000.0);
    b.model->pipes[q].material_density = 7050.0;
    b.model->notes[0].stated.run_length[0] = before;
    b.model->notes[0].stated.run_length[1] = after;
    b.model->rules.run_share = share;
    return b;
}

static double branch_length(kent_build *b, const char *says, double *credit)
{
    kent_restraints *r = sized(b);
    const kent_holding *h = at(b, r, "C");
    assert_int_equal(h->leg_count, 1);
    const double length = h->legs[0].length;
    *credit = h->legs[0].credit;
    kent_hand_expect(h, says);
    assert_true(kent_hand_lines(&h->derivation, KENT_SI) > 5);
    assert_true(kent_hand_lines(&h->derivation, KENT_US) > 5);
    finish(b, r);
    return length;
}

/* L = (SF p A - kr Rs Lr)/Fs, from memory of iron-pipe handbooks; 220 mm branch. */
static void a_restrained_run_shortens_its_branch(void **state)
{
    (void)state;
    const double push = 1.5 * 1.0e6 * 0.25 * PI * 0.22 * 0.22;
    const kent_soil till = {.unit_weight = 19e3, .friction_angle = 30.0 * DEGREE};
    const double rs = bears(&till, false);
    double credit = 0.0;

    kent_build none = main_with_branch((double)NAN, (double)NAN, 0.5);
    const double plain = branch_length(&none, "takes no credit for the run", &credit);
    assert_true(!(fabs(credit) > 0.0));
    kent_build some = main_with_branch(0.4, 0.6, 0.5);
    const double less = branch_length(
        &some, "the tee's run, every joint of it restrained over 1.00 m", &credit);
    assert_close(credit, 0.5 * rs * 1.0, 1e-9);
    assert_close(less / plain, (push - 0.5 * rs) / push, 1e-9);
    kent_build whole = main_with_branch(0.4, 0.6, 1.0);
    assert_close(branch_length(&whole, "the tee's run", &credit) / plain,
                 (push - rs) / push, 1e-9);
    kent_build nothing = main_with_branch(0.4, 0.6, 0.0);
    assert_close(branch_length(&nothing, "count nothing of the bearing", &credit),
                 plain, 1e-12);
    kent_build all = main_with_branch(50.0, 50.0, 0.5);
    assert_true(!(fabs(branch_length(&all, "the tee's run", &credit)) > 0.0));
}

/* Of the 50 m ahead 40 m lie in a casing; behind, a structure ends the run. */
static void a_run_counts_where_the_ground_bears(void **state)
{
    (void)state;
    const kent_soil till = {.unit_weight = 19e3, .friction_angle = 30.0 * DEGREE};
    double credit = 0.0;
    kent_build b = main_with_branch((double)NAN, 50.0, 0.5);
    zoned(&b, 200.1, 249.9, TILL)->casing = true;
    (void)branch_length(&b, "the tee's run", &credit);
    assert_close(credit, 0.5 * 0.2 * bears(&till, false), 1e-6);
}

/* ---- where a leg ends ------------------------------------------------------------ */

/* A straight point of some role 1 m beyond the bend. */
static kent_build main_with_role(kent_role role)
{
    kent_build b = main_of_pipes(false);
    const int note = kent_build_note(&b, "J");
    b.model->notes[note].role = role;
    b.model->notes[note].type = KENT_STRAIGHT;
    return b;
}

static void a_structure_holds_what_is_left(void **state)
{
    (void)state;
    kent_build b = main_with_role(KENT_ROLE_WALL);
    kent_restraints *r = sized(&b);
    const kent_holding *h = at(&b, r, "C");
    assert_true(h->legs[1].length > 1.0);
    assert_true(h->legs[1].fits && h->held);
    assert_int_equal(h->legs[1].end, KENT_LEG_AT_STRUCTURE);
    assert_int_equal(h->legs[1].end_point, kent_model_point_index(b.model, "J"));
    assert_close(h->legs[1].reach, 1.0, 1e-9);
    assert_close(h->legs[1].structure_pull, 1.5 * FORCE, 1e-9);
    kent_hand_expect(h, "ends after 1.00 m at the structure at J, which must be made "
                        "for a pull of");
    finish(&b, r);
}

static void a_flange_adaptor_breaks_a_leg(void **state)
{
    (void)state;
    kent_build b = main_with_role(KENT_ROLE_FLANGE_ADAPTOR);
    kent_restraints *r = sized(&b);
    const kent_holding *h = at(&b, r, "C");
    assert_false(h->legs[1].fits || h->held);
    assert_int_equal(h->legs[1].end, KENT_LEG_AT_FITTING);
    kent_hand_expect(h, "reaches the flange adaptor at J, which slips");
    finish(&b, r);
}

static void a_leg_passes_a_point_that_only_cuts_its_pipe(void **state)
{
    (void)state;
    kent_build b = main_of_pipes(false);
    (void)kent_build_outflow(&b, "J", 0.001);
    kent_restraints *r = sized(&b);
    assert_true(at(&b, r, "C")->legs[1].fits);
    finish(&b, r);
}

/* A tee 10 m before the bend, its run restrained or not. */
static void a_leg_passes_a_tee_whose_run_is_restrained(void **state)
{
    (void)state;
    for (int run = 0; run < 2; run++) {
        kent_build b = main_of_pipes(false);
        (void)kent_build_point(&b, "S", -10.0, -50.0, 50.0);
        (void)kent_build_pipe(&b, "B", "T S", 0.3, 1000.0);
        const int note = kent_build_note(&b, "T");
        b.model->notes[note].restraint = KENT_THRUST_BLOCK;
        if (run) {
            b.model->notes[note].stated.run_length[0] = 40.0;
            b.model->notes[note].stated.run_length[1] = 40.0;
        }
        kent_restraints *r = sized(&b);
        const kent_holding *h = at(&b, r, "C");
        assert_true(h->legs[0].length > 10.0);
        assert_true(h->legs[0].fits == (run == 1));
        assert_true(kent_hand_says(h, "runs through T: restrain its joints too") ==
                    (run == 1));
        finish(&b, r);
    }
}

/* Iron-pipe handbooks, from memory: the large pipe is drawn, the small one pressed. */
static void of_a_reducer_one_pipe_is_drawn_and_one_pressed(void **state)
{
    (void)state;
    kent_build b = main_of_pipes(false);
    b.model->pipes[1].outside_diameter = b.model->pipes[2].outside_diameter = 0.52;
    b.model->pipes[1].inside_diameter = b.model->pipes[2].inside_diameter = 0.5;
    ask_for_joints(&b, "J");
    kent_restraints *r = sized(&b);
    const kent_holding *h = at(&b, r, "J");
    assert_int_equal(b.model->fittings[kent_build_fitting_of(&b, "J")].type,
                     KENT_REDUCER);
    assert_int_equal(h->leg_count, 2);
    kent_hand_expect(h, "the pipe towards C is drawn");
    kent_hand_expect(h, "the pipe towards K is pressed");
    finish(&b, r);
}

/* ---- properties ------------------------------------------------------------------ */

static unsigned long long seed = 88172645463325252ULL;

/* 0 .. 1; xorshift, the same every time. */
static double chance(void)
{
    seed ^= seed << 13;
    seed ^= seed >> 7;
    seed ^= seed << 17;
    return (double)(seed % 1000003ULL) / 1000003.0;
}

typedef struct drawn {
    double turn, rise, pressure, cover, table, from, to, phi, cohesion;
    bool casing, zone, sleeve, backfill;
    kent_length_form form;
} drawn;

static drawn draw(void)
{
    drawn d = {.turn = (3.0 + 100.0 * chance()) * DEGREE,
               .rise = 40.0 * (chance() - 0.5),
               .pressure = 1e5 + 2e6 * chance(),
               .cover = 0.8 + 3.0 * chance(),
               .table = 5.0 * chance(),
               .from = 200.0 + 30.0 * chance(),
               .phi = 20.0 + 18.0 * chance(),
               .cohesion = chance() < 0.5 ? 0.0 : 2e4 * chance(),
               .sleeve = chance() < 0.3,
               .backfill = chance() < 0.5};
    d.to = d.from + 30.0 * chance() + 0.1;
    d.form = chance() < 0.5 ? KENT_FORM_ETL : KENT_FORM_HANDBOOK;
    return d;
}

/* m of C's leg ahead; INFINITY where none can be given. */
static double length_of(const drawn *d)
{
    kent_build b = main_with(d->turn, d->rise);
    b.model->ground.cover = d->cover;
    b.model->ground.water_table = d->table;
    b.model->ground.wrapped = d->sleeve;
    if (d->backfill) b.model->ground.backfill = FILL;
    full_soil(&b.model->soils[TILL], d->phi, d->cohesion);
    b.model->rules.length_form = d->form;
    if (d->zone) {
        full_soil(&b.model->soils[CLAY], 0.7 * d->phi, 0.7 * d->cohesion);
        zoned(&b, d->from, d->to, CLAY)->casing = d->casing;
    }
    const kent_hand_case test[] = {{"test", KENT_CASE_TEST, 1.5, d->pressure}};
    kent_build_derive(&b);
    kent_restraints *r = kent_hand_size(&b, test, 1);
    const kent_holding *h = at(&b, r, "C");
    double length = (double)INFINITY;
    for (size_t i = 0; i < h->leg_count; i++) {
        if (h->legs[i].port == 1) length = h->legs[i].length;
    }
    finish(&b, r);
    return length;
}

static void expect_no_shorter(const drawn *d, double than, const char *what)
{
    const double length = length_of(d);
    if (length >= than * (1.0 - 1e-9)) return;
    fail_msg("%s: %.9g m after %.9g m", what, length, than);
}

static void what_makes_it_harder_never_shortens_a_length(void **state)
{
    (void)state;
    int finite = 0;
    for (int i = 0; i < 400; i++) {
        const drawn plain = draw();
        const double length = length_of(&plain);
        finite += isfinite(length) ? 1 : 0;
        drawn d = plain;
        d.pressure *= 1.0 + chance();
        expect_no_shorter(&d, length, "more pressure");
        d = plain;
        d.table *= chance();
        expect_no_shorter(&d, length, "wetter ground");
        d = plain;
        d.zone = true;
        expect_no_shorter(&d, length, "a weaker zone");
        d.casing = true;
        expect_no_shorter(&d, length, "a casing");
        d = plain;
        d.sleeve = true;
        expect_no_shorter(&d, length, "a sleeve");
    }
    assert_true(finite > 300); /* the draw makes lengths at all */
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(in_clay_the_form_of_the_etl_gives_the_longer_length),
        cmocka_unit_test(without_cohesion_both_forms_give_one_length),
        cmocka_unit_test(the_etl_has_no_form_for_an_end),
        cmocka_unit_test(backfill_rubs_and_native_ground_bears),
        cmocka_unit_test(backfill_of_a_zone_counts_in_it),
        cmocka_unit_test(nothing_holds_through_backfill_that_cannot_be_relied_on),
        cmocka_unit_test(what_backfill_lacks_is_named),
        cmocka_unit_test(uphill_the_weight_of_pipe_and_water_asks_for_more),
        cmocka_unit_test(a_casing_holds_nothing_and_is_passed_through),
        cmocka_unit_test(a_casing_uphill_draws_on_the_ground_beyond),
        cmocka_unit_test(a_leg_goes_on_into_the_next_pipe),
        cmocka_unit_test(a_leg_ends_where_a_pipe_of_another_size_goes_on),
        cmocka_unit_test(a_restrained_run_shortens_its_branch),
        cmocka_unit_test(a_run_counts_where_the_ground_bears),
        cmocka_unit_test(a_structure_holds_what_is_left),
        cmocka_unit_test(a_flange_adaptor_breaks_a_leg),
        cmocka_unit_test(a_leg_passes_a_point_that_only_cuts_its_pipe),
        cmocka_unit_test(a_leg_passes_a_tee_whose_run_is_restrained),
        cmocka_unit_test(of_a_reducer_one_pipe_is_drawn_and_one_pressed),
        cmocka_unit_test(what_makes_it_harder_never_shortens_a_length),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
