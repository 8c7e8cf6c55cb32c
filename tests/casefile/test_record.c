/* The reader walked along its own table: what one row allows and refuses, every row
 * does.
 */
#include "kent_record.h"
#include "key_text.h"

/* What is complained of a group that holds just `text`. */
static void read_group(kent_reader *r, const char *group, const char *text,
                       kent_record *record, kent_complaints *complaints)
{
    char path[64];
    kent_error err = {0};
    kent_tree *tree = NULL;
    write_bytes(path, text, strlen(text));
    *complaints = (kent_complaints){0};
    assert_int_equal(kent_tree_read(path, &tree, complaints, &err), KENT_OK);
    r->tree = tree;
    r->complaints = complaints;
    kent_record_read(r, kent_tree_root(tree), group, "", 0, record);
    for (size_t i = 0; i < record->count; i++) {
        record->fields[i].text = NULL; /* they end with the tree */
    }
    kent_tree_free(tree);
    r->tree = NULL;
    (void)unlink(path);
}

static bool complained(const kent_complaints *c, const char *part)
{
    for (size_t i = 0; i < c->count && i < KENT_COMPLAINTS_KEPT; i++) {
        if (strstr(c->kept[i].what, part)) return true;
    }
    return false;
}

/* Whether "key = value;" in its group draws a complaint with that part in it. */
static bool refused(kent_reader *r, const kent_key *k, const char *value,
                    const char *part)
{
    char text[400];
    kent_record record;
    kent_complaints complaints;
    (void)snprintf(text, sizeof text, "%s = %s;\n", k->key, value);
    read_group(r, k->group, text, &record, &complaints);
    const bool found = complained(&complaints, part);
    if (!found) {
        print_error("%s.%s = %s: no \"%s\"; first \"%s\"\n", k->group, k->key, value,
                    part, complaints.count ? complaints.kept[0].what : "");
    }
    return found;
}

/* Whether the value draws a complaint about that key. */
static bool accepted(kent_reader *r, const kent_key *k, const char *value)
{
    char text[400];
    char about[80];
    kent_record record;
    kent_complaints complaints;
    (void)snprintf(text, sizeof text, "%s = %s;\n", k->key, value);
    read_group(r, k->group, text, &record, &complaints);
    (void)snprintf(about, sizeof about, "%s = %s", k->key, value);
    const bool bad = complained(&complaints, about) ||
                     complained(&complaints, "belongs") ||
                     complained(&complaints, "out of range");
    if (bad) print_error("%s.%s = %s: refused\n", k->group, k->key, value);
    return !bad;
}

static kent_reader reader(void)
{
    kent_reader r = {0};
    kent_error err = {0};
    assert_int_equal(kent_units_new(&r.units, &err), KENT_OK);
    return r;
}

static void reader_end(kent_reader *r)
{
    kent_reader_clear(r);
    kent_units_free(r->units);
}

/* Pressures, stresses and moduli are all Pa: a length is the wrong kind for them, as it
 * is for all that is no length itself. */
static void every_quantity_refuses_a_unit_of_another_kind(void **state)
{
    (void)state;
    kent_reader r = reader();
    size_t quantities = 0;
    size_t next = 0;
    for (const kent_key *k; (k = next_now(&next)) != NULL;) {
        const bool length = k->kind == KENT_LENGTH || k->kind == KENT_DIAMETER;
        if (k->value != KENT_VALUE_QUANTITY) continue;
        assert_true(refused(&r, k, length ? "\"3 kg/m^3\"" : "\"3 m\"",
                            kent_kind_word(k->kind)));
        quantities++;
    }
    assert_true(quantities > 60);
    reader_end(&r);
}

static void every_quantity_refuses_a_number_without_unit(void **state)
{
    (void)state;
    kent_reader r = reader();
    size_t next = 0;
    for (const kent_key *k; (k = next_now(&next)) != NULL;) {
        if (k->value != KENT_VALUE_QUANTITY) continue;
        assert_true(refused(&r, k, "1.5", "has no unit; write for instance"));
        assert_true(refused(&r, k, "\"1.5\"", "has no unit"));
        assert_true(refused(&r, k, "true", "belongs"));
    }
    reader_end(&r);
}

static void limits_are_accepted_and_what_is_beyond_is_refused(void **state)
{
    (void)state;
    kent_reader r = reader();
    size_t limits = 0;
    size_t next = 0;
    for (const kent_key *k; (k = next_now(&next)) != NULL;) {
        const bool has_range = k->value == KENT_VALUE_QUANTITY ||
                               k->value == KENT_VALUE_NUMBER ||
                               k->value == KENT_VALUE_COUNT;
        char text[80];
        if (!has_range) continue;
        const double below = k->least - fmax(1.0, 0.01 * fabs(k->least));
        const double above = k->most + fmax(1.0, 0.01 * fabs(k->most));
        value_text(k, k->most, text, sizeof text);
        assert_true(accepted(&r, k, text));
        value_text(k, above, text, sizeof text);
        assert_true(refused(&r, k, text, "out of range; the range is"));
        value_text(k, below, text, sizeof text);
        assert_true(refused(&r, k, text, "out of range; the range is"));
        value_text(k, k->least, text, sizeof text);
        assert_true(k->above_least ? refused(&r, k, text, "out of range; the range is")
                                   : accepted(&r, k, text));
        limits += 4;
    }
    assert_true(limits > 300);
    reader_end(&r);
}

static void every_key_refuses_a_value_of_another_type(void **state)
{
    (void)state;
    kent_reader r = reader();
    size_t next = 0;
    for (const kent_key *k; (k = next_now(&next)) != NULL;) {
        const bool vector = k->value == KENT_VALUE_VECTOR;
        assert_true(
            refused(&r, k, wrong_type_for(k), vector ? "three numbers" : "belongs"));
    }
    reader_end(&r);
}

static void what_stands_in_quotes_by_mistake_is_told_so(void **state)
{
    (void)state;
    kent_reader r = reader();
    size_t next = 0;
    for (const kent_key *k; (k = next_now(&next)) != NULL;) {
        char part[80];
        (void)snprintf(part, sizeof part, "write %s = ", k->key);
        if (k->value == KENT_VALUE_SWITCH) {
            assert_true(refused(&r, k, "\"true\"", part));
        } else if (k->value == KENT_VALUE_NUMBER || k->value == KENT_VALUE_COUNT) {
            assert_true(refused(&r, k, "\"1.5\"", part));
        }
    }
    reader_end(&r);
}

static void every_reference_to_nothing_is_refused(void **state)
{
    (void)state;
    kent_reader r = reader();
    size_t next = 0;
    for (const kent_key *k; (k = next_now(&next)) != NULL;) {
        if (k->value != KENT_VALUE_REF) continue;
        assert_true(refused(&r, k, "\"no-such-thing\"", "there is no"));
    }
    reader_end(&r);
}

static void every_word_is_accepted_and_no_other(void **state)
{
    (void)state;
    kent_reader r = reader();
    size_t next = 0;
    for (const kent_key *k; (k = next_now(&next)) != NULL;) {
        if (k->value != KENT_VALUE_WORD) continue;
        assert_true(refused(&r, k, "\"zzzzzzzzzz\"", "is not known"));
        for (const char *p = k->words; p;) {
            const size_t length = strcspn(p, "|");
            char text[80];
            (void)snprintf(text, sizeof text, "\"%.*s\"", (int)length, p);
            assert_true(accepted(&r, k, text));
            p = p[length] == '|' ? p + length + 1 : NULL;
        }
    }
    reader_end(&r);
}

static void every_required_key_is_missed(void **state)
{
    (void)state;
    kent_reader r = reader();
    size_t next = 0;
    for (const kent_key *k; (k = next_now(&next)) != NULL;) {
        kent_record record;
        kent_complaints complaints;
        char part[80];
        if (!kent_key_is_required(k)) continue;
        read_group(&r, k->group, "# nothing\n", &record, &complaints);
        (void)snprintf(part, sizeof part, "'%s' is missing", k->key);
        assert_true(complained(&complaints, part));
        assert_false(record.sound);
    }
    reader_end(&r);
}

static void every_key_with_a_letter_lost_is_refused(void **state)
{
    (void)state;
    kent_reader r = reader();
    size_t next = 0;
    for (const kent_key *k; (k = next_now(&next)) != NULL;) {
        char name[64];
        char text[100];
        kent_record record;
        kent_complaints complaints;
        const size_t length = strlen(k->key);
        (void)snprintf(name, sizeof name, "%.*s", (int)length - 1, k->key);
        if (length < 3 || kent_key_find(k->group, name)) continue;
        (void)snprintf(text, sizeof text, "%s = 1;\n", name);
        read_group(&r, k->group, text, &record, &complaints);
        assert_true(complained(&complaints, "is not a key of"));
        assert_true(complained(&complaints, "did you mean"));
    }
    reader_end(&r);
}

static double station_of(kent_reader *r, const char *text)
{
    kent_record record;
    kent_complaints complaints;
    read_group(r, "point", text, &record, &complaints);
    return kent_record_number(&record, "station");
}

static void a_station_counts_by_its_style(void **state)
{
    (void)state;
    kent_reader r = reader();
    assert_close(station_of(&r, "station = \"1+198\";\n"), 1198.0, 1e-15);
    assert_close(station_of(&r, "station = \"0+012.5\";\n"), 12.5, 1e-15);
    assert_close(station_of(&r, "station = \"350 m\";\n"), 350.0, 1e-15);
    assert_close(station_of(&r, "station = \"km 1+198\";\n"), 1198.0, 1e-15);
    assert_close(station_of(&r, "station = \"Ch. 0+350\";\n"), 350.0, 1e-15);
    r.station_style = KENT_100M_M;
    assert_close(station_of(&r, "station = \"11+98.5\";\n"), 1198.5, 1e-15);
    r.station_style = KENT_100FT_FT; /* 100 international feet of 0.3048 m */
    assert_close(station_of(&r, "station = \"12+34.5\";\n"), 1234.5 * 0.3048, 1e-15);
    assert_close(station_of(&r, "station = \"STA 12+34.5\";\n"), 1234.5 * 0.3048,
                 1e-15);
    reader_end(&r);
}

/* What follows the + tells a station of one style from one of another. */
static void a_station_of_another_style_is_refused(void **state)
{
    (void)state;
    kent_reader r = reader();
    const kent_key *k = kent_key_find("point", "station");
    static const char *const BAD[] = {"1+",  "1+19x", "1+1e2",  "1 + 5",
                                      "a+5", "1+2+3", "1+1.2.3"};
    for (size_t i = 0; i < sizeof BAD / sizeof BAD[0]; i++) {
        char value[40];
        (void)snprintf(value, sizeof value, "\"%s\"", BAD[i]);
        assert_true(refused(&r, k, value, "is no station; write"));
    }
    assert_true(refused(&r, k, "\"1+1000\"", "stays below 1000"));
    r.station_style = KENT_100FT_FT;
    assert_true(refused(&r, k, "\"km 1+98\"", "counts kilometres"));
    assert_true(refused(&r, k, "\"at 1+98\"", "is no station; write"));
    assert_true(refused(&r, k, "\"1+198\"", "stays below 100; site.station_style"));
    reader_end(&r);
}

static void spelling_variants_are_the_same_key(void **state)
{
    (void)state;
    kent_reader r = reader();
    kent_record record;
    kent_complaints complaints;
    read_group(&r, "water", "vapor_pressure = \"2 kPa\";\n", &record, &complaints);
    assert_int_equal(complaints.count, 0);
    assert_close(kent_record_number(&record, "vapour_pressure"), 2000.0, 1e-12);
    read_group(&r, "fitting", "type = \"taper\";\n", &record, &complaints);
    assert_int_equal(kent_record_field(&record, "type")->index, KENT_REDUCER);
    reader_end(&r);
}

static void names_that_cannot_stand_in_files_are_refused(void **state)
{
    (void)state;
    kent_reader r = reader();
    /* U+202E, byte by byte: in a text the linter takes it for a trick */
    static const char turns_back[] = {'"', 'a', '\xE2', '\x80', '\xAE', 'b', '"', '\0'};
    const kent_key *k = kent_key_find("point", "id");
    assert_true(refused(&r, k, "\"\"", "cannot be a name"));
    assert_true(refused(&r, k, "\"a b\"", "cannot be a name"));
    assert_true(refused(&r, k, "\"a/b\"", "cannot be a name"));
    assert_true(refused(&r, k, "\"..\"", "cannot be a name"));
    assert_true(refused(&r, k, "\"a,b\"", "cannot be a name"));
    assert_true(refused(&r, k, "\"a\\nb\"", "cannot be a name"));
    assert_true(refused(&r, k, "\"a\xC2\xA0\"", "cannot be a name"));
    assert_true(refused(&r, k, turns_back, "cannot be a name"));
    assert_true(refused(&r, k,
                        "\"\xEF\xBB\xBF"
                        "b\"",
                        "cannot be a name"));
    assert_false(refused(&r, k, "\"K\xC3\xA4rn\"", "cannot be a name"));
    assert_true(refused(&r, k, "\"012345678901234567890123456789012345678901234567\"",
                        "cannot be a name"));
    reader_end(&r);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_quantity_refuses_a_unit_of_another_kind),
        cmocka_unit_test(every_quantity_refuses_a_number_without_unit),
        cmocka_unit_test(limits_are_accepted_and_what_is_beyond_is_refused),
        cmocka_unit_test(every_key_refuses_a_value_of_another_type),
        cmocka_unit_test(what_stands_in_quotes_by_mistake_is_told_so),
        cmocka_unit_test(every_reference_to_nothing_is_refused),
        cmocka_unit_test(every_word_is_accepted_and_no_other),
        cmocka_unit_test(every_required_key_is_missed),
        cmocka_unit_test(every_key_with_a_letter_lost_is_refused),
        cmocka_unit_test(a_station_counts_by_its_style),
        cmocka_unit_test(a_station_of_another_style_is_refused),
        cmocka_unit_test(spelling_variants_are_the_same_key),
        cmocka_unit_test(names_that_cannot_stand_in_files_are_refused),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
