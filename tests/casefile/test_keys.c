#include "kent_keys.h"
#include "kent_check.h"
#include "kent_model.h"

#include <math.h>
#include <string.h>

static void every_row_of_the_table_can_be_read_and_explained(void **state)
{
    (void)state;
    for (size_t i = 0; i < KENT_KEY_COUNT; i++) {
        const kent_key *k = &KENT_KEYS[i];
        assert_true(k->least <= k->most);
        assert_true(strlen(k->key) > 0 && strlen(k->says) > 0);
        assert_non_null(k->fallback);
        assert_string_equal(k->since, "0.1");
        assert_ptr_equal(kent_key_find(k->group, k->key), k);
        if (k->value == KENT_VALUE_WORD || k->value == KENT_VALUE_REF) {
            assert_non_null(k->words);
        }
    }
}

static void keys_of_a_group_stand_together(void **state)
{
    (void)state;
    size_t seen = 0;
    while (seen < KENT_KEY_COUNT) {
        size_t count = 0;
        assert_ptr_equal(kent_key_group(KENT_KEYS[seen].group, &count),
                         &KENT_KEYS[seen]);
        assert_true(count > 0);
        seen += count;
    }
    assert_int_equal(seen, KENT_KEY_COUNT);
}

static void every_list_and_group_has_keys_of_its_own(void **state)
{
    (void)state;
    for (size_t i = 0; i < KENT_KEY_COUNT; i++) {
        const kent_key *k = &KENT_KEYS[i];
        const bool compound =
            k->value == KENT_VALUE_LIST || k->value == KENT_VALUE_GROUP;
        size_t count = 0;
        if (!compound || k->words[0] == '\0') continue;
        assert_non_null(kent_key_group(k->words, &count));
    }
}

static void a_misspelt_key_is_offered_its_nearest(void **state)
{
    (void)state;
    assert_string_equal(kent_key_nearest("pipe", "roughnes"), "roughness");
    assert_string_equal(kent_key_nearest("valve", "discharge_lvl"), "discharge_level");
    assert_null(kent_key_nearest("pipe", "colour_of_the_sky"));
    assert_string_equal(kent_key_nearest("point", "Y"), "y");
    assert_string_equal(kent_key_nearest("point", "ID"), "id");
    assert_null(kent_key_nearest("point", "h")); /* as far from x as from any other */
}

static void spellings_of_both_sides_of_the_ocean_are_one(void **state)
{
    (void)state;
    assert_string_equal(kent_spelling("vapor_pressure"), "vapour_pressure");
    assert_string_equal(kent_spelling("catalog"), "catalogue");
    assert_string_equal(kent_spelling("non-return"), "check");
    assert_string_equal(kent_spelling("taper"), "reducer");
    assert_string_equal(kent_spelling("roughness"), "roughness");
}

/* The words of the table in the order of the model's enumerations: the reader uses the
 * index of a word as the value. */
#define WORDS_AGREE(group, key, count, word_of, type)                                  \
    do {                                                                               \
        const char *p = kent_key_find(group, key)->words;                              \
        for (int i = 0; i < (count); i++) {                                            \
            const size_t length = strcspn(p, "|");                                     \
            const char *word = word_of((type)i);                                       \
            assert_int_equal(length, strlen(word));                                    \
            assert_memory_equal(p, word, length);                                      \
            p += length + (p[length] == '|' ? 1 : 0);                                  \
        }                                                                              \
        assert_int_equal(*p, '\0');                                                    \
    } while (0)

/* Types first, then what a tee or an end serves. */
static const char *note_type_word(int i)
{
    return i <= KENT_STRAIGHT ? kent_fitting_type_word((kent_fitting_type)i)
                              : kent_role_word((kent_role)(i - KENT_STRAIGHT));
}

static void words_stand_in_the_order_of_the_models_enumerations(void **state)
{
    (void)state;
    WORDS_AGREE("pipe", "joint", 6, kent_joint_word, kent_joint);
    WORDS_AGREE("pipe", "axial_support", 3, kent_axial_support_word,
                kent_axial_support);
    WORDS_AGREE("scenario", "class", 3, kent_class_word, kent_class);
    WORDS_AGREE("fitting", "type", 15, note_type_word, int);
    WORDS_AGREE("branch", "joint", 6, kent_joint_word, kent_joint);
    WORDS_AGREE("ground", "trench", KENT_TRENCHES, kent_trench_word, int);
    WORDS_AGREE("fitting", "orientation", 3, kent_orientation_word, kent_orientation);
    WORDS_AGREE("fitting", "backing", 2, kent_backing_word, kent_backing);
    WORDS_AGREE("soil", "nature", 6, kent_nature_word, kent_nature);
    WORDS_AGREE("design_rules", "blocks", 4, kent_block_policy_word, kent_block_policy);
    WORDS_AGREE("design_rules", "vertical_blocks", 4, kent_block_policy_word,
                kent_block_policy);
    WORDS_AGREE("design_rules", "spread", 2, kent_spread_word, kent_spread);
    WORDS_AGREE("design_rules", "concrete_code", 2, kent_concrete_code_word,
                kent_concrete_code);
    WORDS_AGREE("design_rules", "length_form", 2, kent_length_form_word,
                kent_length_form);
    WORDS_AGREE("fitting", "restraint", 5, kent_restraint_word, kent_restraint_choice);
}

static void ranges_are_told_in_units_of_display(void **state)
{
    (void)state;
    char range[80];
    kent_key_range(kent_key_find("water", "temperature"), KENT_SI, range, sizeof range);
    assert_string_equal(range, "0 to 100 degC");
    kent_key_range(kent_key_find("pipe", "outside_diameter"), KENT_SI, range,
                   sizeof range);
    assert_string_equal(range, "above 0 to 20000 mm");
    kent_key_range(kent_key_find("ground", "cover"), KENT_US, range, sizeof range);
    assert_string_equal(range, "0 to 328.084 ft"); /* 100 m / 0.3048 m */
    kent_key_range(kent_key_find("pipe", "joint"), KENT_SI, range, sizeof range);
    assert_string_equal(range, "any");
}

static void the_range_of_water_is_that_of_its_formulas(void **state)
{
    (void)state;
    const kent_key *k = kent_key_find("water", "temperature");
    assert_close(k->least, KENT_WATER_COLDEST, 1e-12);
    assert_close(k->most, KENT_WATER_HOTTEST, 1e-12);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_row_of_the_table_can_be_read_and_explained),
        cmocka_unit_test(keys_of_a_group_stand_together),
        cmocka_unit_test(every_list_and_group_has_keys_of_its_own),
        cmocka_unit_test(a_misspelt_key_is_offered_its_nearest),
        cmocka_unit_test(spellings_of_both_sides_of_the_ocean_are_one),
        cmocka_unit_test(words_stand_in_the_order_of_the_models_enumerations),
        cmocka_unit_test(ranges_are_told_in_units_of_display),
        cmocka_unit_test(the_range_of_water_is_that_of_its_formulas),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
