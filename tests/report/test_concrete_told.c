/* The concrete of blocks and what it takes to build, in results.json. */
#include "kent_check.h"
#include "kent_mixed.h"

#include <jansson.h>
#include <math.h>
#include <string.h>

static double number(const json_t *from, const char *key)
{
    const json_t *value = json_object_get(from, key);
    if (!value) fail_msg("no key '%s'", key);
    return json_is_null(value) ? (double)NAN : json_number_value(value);
}

static void same(const json_t *from, const char *key, double value)
{
    const double told = number(from, key);
    if (isnan(value)) {
        assert_true(isnan(told));
    } else {
        assert_close(told, value, 1e-12);
    }
}

static void check_one(const json_t *told, const kent_holding *h)
{
    const kent_concrete_check *c = &h->concrete;
    const json_t *concrete = json_object_get(told, "concrete");
    const json_t *contact = json_object_get(concrete, "contact");
    const json_t *quantities = json_object_get(told, "quantities");

    if (!c->made) {
        assert_true(json_is_null(concrete) && json_is_null(quantities));
        return;
    }
    same(concrete, "strength_Pa", c->strength);
    same(concrete, "strength_before_test_Pa", c->strength_needed);
    same(concrete, "days_before_test", c->age / 86400.0);
    same(contact, "along_m", c->contact.width);
    same(contact, "across_m", c->contact.height);
    same(contact, "needed_m2", c->contact_needed);
    same(contact, "design_load_N", c->load);
    same(contact, "stress_Pa", c->pressure);
    same(contact, "allowed_Pa", c->allowed);
    same(contact, "utilisation", c->use);
    same(quantities, "concrete_m3", h->quantities.concrete);
    same(quantities, "excavation_m3", h->quantities.excavation);
    same(quantities, "formed_m2", h->quantities.formed);
    const json_t *beyond = json_object_get(concrete, "beyond_45_degrees");
    if (!c->beyond_45) {
        assert_true(json_is_null(beyond));
        return;
    }
    same(beyond, "thickness_m", c->thick);
    same(beyond, "bending", c->wide.bending);
    same(beyond, "shear", c->wide.shear);
    same(beyond, "punching", c->wide.punching);
}

/* Of every fitting, and the totals; returns how many blocks there were. */
static size_t check_all(const kent_results *r)
{
    kent_text text = {0};
    size_t blocks = 0;

    assert_int_equal(kent_report_json(r, kent_mixed_sink(&text)), KENT_OK);
    json_t *all = json_loads(kent_text_of(&text), JSON_REJECT_DUPLICATES, NULL);
    assert_non_null(all);
    const json_t *fittings = json_object_get(all, "fittings");
    for (size_t i = 0; i < r->restraints->fitting_count; i++) {
        check_one(json_array_get(fittings, i), &r->restraints->fittings[i]);
        blocks += r->restraints->fittings[i].concrete.made;
    }
    const json_t *totals = json_object_get(all, "quantities");
    same(totals, "concrete_m3", r->restraints->quantities.concrete);
    same(totals, "excavation_m3", r->restraints->quantities.excavation);
    same(totals, "formed_m2", r->restraints->quantities.formed);
    json_decref(all);
    kent_text_clear(&text);
    return blocks;
}

static void concrete_and_quantities_stand_with_every_block(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    assert_true(check_all(mixed.results) >= 3);
    kent_mixed_clear(&mixed);
}

static void what_all_blocks_ask_is_a_caution_of_the_case(void **state)
{
    (void)state;
    kent_mixed mixed = kent_mixed_new(false);
    const kent_notes *all = &mixed.results->cautions;
    size_t ages = 0, clear = 0;
    for (size_t i = 0; i < all->count; i++) {
        ages += strstr(all->text[i], "no test before the concrete") != NULL;
        clear += strstr(all->text[i], "keep them clear of joints, bells") != NULL;
    }
    assert_int_equal(ages, 1);
    assert_int_equal(clear, 1);
    kent_mixed_clear(&mixed);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(concrete_and_quantities_stand_with_every_block),
        cmocka_unit_test(what_all_blocks_ask_is_a_caution_of_the_case),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
