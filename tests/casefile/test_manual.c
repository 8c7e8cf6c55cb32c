/* The key table against docs/case-format.md: every key of this version stands there
 * with what it takes, its range, its default and what it says. `test_manual --print`
 * prints the tables, to be put into the document after a change. */
#include "case_text.h"

static void list_words(const char *words, char *out, size_t size)
{
    size_t used = 0;
    out[0] = '\0';
    for (const char *p = words; p;) {
        const size_t length = strcspn(p, "|");
        if (p[0] != '~' && used < size) {
            used += (size_t)snprintf(out + used, size - used, "%s`\"%.*s\"`",
                                     used > 0 ? ", " : "", (int)length, p);
        }
        p = p[length] == '|' ? p + length + 1 : NULL;
    }
}

static void takes(const kent_key *k, char *out, size_t size)
{
    const char *example = kent_kind_example(k->kind, KENT_SI);
    switch (k->value) {
    case KENT_VALUE_QUANTITY:
        (void)snprintf(out, size, "%s, `\"%s\"`%s%s%s", kent_kind_word(k->kind),
                       example, k->words ? ", or `\"" : "", k->words ? k->words : "",
                       k->words ? "\"`" : "");
        return;
    case KENT_VALUE_EITHER:
        (void)snprintf(out, size, "a number, or %s, `\"%s\"`", kent_kind_word(k->kind),
                       example);
        return;
    case KENT_VALUE_NUMBER:
        (void)snprintf(out, size, "a number");
        return;
    case KENT_VALUE_COUNT:
        (void)snprintf(out, size, "a whole number");
        return;
    case KENT_VALUE_SWITCH:
        (void)snprintf(out, size, "`true` or `false`");
        return;
    case KENT_VALUE_TEXT:
        (void)snprintf(out, size, "a text");
        return;
    case KENT_VALUE_ID:
        (void)snprintf(out, size, "a name");
        return;
    case KENT_VALUE_REF:
        (void)snprintf(out, size, "the name of %s", kent_key_group_word(k->words));
        return;
    case KENT_VALUE_WORD:
        list_words(k->words, out, size);
        return;
    case KENT_VALUE_LIST:
        (void)snprintf(out, size,
                       k->words[0] ? "a list of groups, each %s" : "a list%s",
                       k->words[0] ? kent_key_group_word(k->words) : "");
        return;
    case KENT_VALUE_GROUP:
        (void)snprintf(out, size, "a group");
        return;
    case KENT_VALUE_STATION:
        (void)snprintf(out, size, "a station, `\"1+198\"`, or a length");
        return;
    case KENT_VALUE_TURN:
        (void)snprintf(out, size, "a turn, `\"45 deg right\"`");
        return;
    case KENT_VALUE_VECTOR:
        (void)snprintf(out, size, "three numbers, `[ 1.0, 0.0, 0.0 ]`");
        return;
    }
}

/* One row of the document. */
static void row_of(const kent_key *k, char *out, size_t size)
{
    char what[400];
    char range[80];
    takes(k, what, sizeof what);
    kent_key_range(k, range, sizeof range);
    (void)snprintf(out, size, "| `%s` | %s | %s | %s | %s | %s |", k->key, what, range,
                   k->fallback[0] ? k->fallback : "empty", k->since, k->says);
}

static void heading_of(const char *group, char *out, size_t size)
{
    (void)snprintf(out, size, "### `%s`: %s", group, kent_key_group_word(group));
}

static void print_tables(void)
{
    const char *group = "";
    char line[1000];
    for (size_t i = 0; i < KENT_KEY_COUNT; i++) {
        const kent_key *k = &KENT_KEYS[i];
        if (!kent_key_is_now(k)) continue;
        if (strcmp(k->group, group) != 0) {
            group = k->group;
            heading_of(group, line, sizeof line);
            (void)printf("\n%s\n\n| key | takes | range | default | since | says |\n"
                         "| --- | --- | --- | --- | --- | --- |\n",
                         line);
        }
        row_of(k, line, sizeof line);
        (void)printf("%s\n", line);
    }
    (void)printf(
        "\n## Keys of later versions\n\nNamed here so that nobody uses them for "
        "something else; refused with \"not in this version\".\n\n");
    for (size_t i = 0; i < KENT_KEY_COUNT; i++) {
        const kent_key *k = &KENT_KEYS[i];
        if (kent_key_is_now(k)) continue;
        (void)printf("- `%s` of `%s`: %s\n", k->key, k->group, k->says);
    }
}

static char *read_manual(void)
{
    const char *path = KENT_SOURCE_DIR "/docs/case-format.md";
    FILE *file = fopen(path, "rb");
    assert_non_null(file);
    const size_t room = 1 << 20;
    char *text = kent_alloc(room, 1);
    assert_non_null(text);
    const size_t size = fread(text, 1, room - 1, file);
    assert_true(size > 1000 && size < room - 1);
    assert_int_equal(fclose(file), 0);
    return text;
}

static void every_key_of_this_version_stands_in_the_manual_as_it_is_read(void **state)
{
    (void)state;
    char *manual = read_manual();
    char wanted[1000];
    size_t missing = 0;
    for (size_t i = 0; i < KENT_KEY_COUNT; i++) {
        const kent_key *k = &KENT_KEYS[i];
        if (!kent_key_is_now(k)) continue;
        heading_of(k->group, wanted, sizeof wanted);
        const char *section = strstr(manual, wanted);
        const char *end = section ? strstr(section + 4, "\n#") : NULL;
        row_of(k, wanted, sizeof wanted);
        const char *row = section ? strstr(section, wanted) : NULL;
        if (row && (!end || row < end)) continue;
        print_error("not in docs/case-format.md: %s\n", wanted);
        missing++;
    }
    free(manual);
    assert_int_equal(missing, 0);
}

static void every_key_of_a_later_version_is_named_in_the_manual(void **state)
{
    (void)state;
    char *manual = read_manual();
    char wanted[400];
    size_t seen = 0;
    for (size_t i = 0; i < KENT_KEY_COUNT; i++) {
        const kent_key *k = &KENT_KEYS[i];
        if (kent_key_is_now(k)) continue;
        (void)snprintf(wanted, sizeof wanted, "- `%s` of `%s`: %s\n", k->key, k->group,
                       k->says);
        if (!strstr(manual, wanted)) print_error("missing: %s", wanted);
        assert_non_null(strstr(manual, wanted));
        seen++;
    }
    free(manual);
    assert_true(seen > 50);
}

/* A row that the table does not know would promise what the reader refuses. */
static void the_manual_has_no_row_that_the_table_does_not_know(void **state)
{
    (void)state;
    char *manual = read_manual();
    size_t rows = 0;
    size_t keys = 0;
    for (const char *p = manual; (p = strstr(p, "\n| `")) != NULL; p++) {
        rows++;
    }
    for (size_t i = 0; i < KENT_KEY_COUNT; i++) {
        if (kent_key_is_now(&KENT_KEYS[i])) keys++;
    }
    free(manual);
    assert_int_equal(rows, keys);
}

static void the_example_of_the_manual_is_a_case(void **state)
{
    (void)state;
    char *manual = read_manual();
    char *first = strstr(manual, "```\n");
    assert_non_null(first);
    char *end = strstr(first + 4, "\n```");
    assert_non_null(end);
    end[1] = '\0';
    kent_catalogue *c = read_catalogue();
    kent_complaints complaints;
    kent_model *m = NULL;
    const kent_status status =
        read_bytes(c, first + 4, strlen(first + 4), &m, &complaints);
    if (complaints.count > 0) print_error("%s\n", complaints.kept[0].what);
    assert_int_equal(status, KENT_OK);
    assert_int_equal(m->fitting_count, 2);
    kent_model_free(m);
    kent_catalogue_free(c);
    free(manual);
}

int main(int argc, char **argv)
{
    if (argc > 1 && strcmp(argv[1], "--print") == 0) {
        print_tables();
        return EXIT_SUCCESS;
    }
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_key_of_this_version_stands_in_the_manual_as_it_is_read),
        cmocka_unit_test(every_key_of_a_later_version_is_named_in_the_manual),
        cmocka_unit_test(the_manual_has_no_row_that_the_table_does_not_know),
        cmocka_unit_test(the_example_of_the_manual_is_a_case),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
