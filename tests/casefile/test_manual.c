/* docs/case-format.md against the key table that the reader walks: its tables are what
 * `kentledge check --keys` prints. `test_manual --print` prints them too, to be put
 * into the document after a change. */
#include "case_text.h"
#include "kent_report.h"

/* What `kentledge check --keys` prints; the caller clears it. */
static int gather(void *to, const char *piece, size_t length)
{
    kent_text *text = to;
    kent_text_add(text, "%.*s", (int)length, piece);
    return text->failed ? -1 : 0;
}

static kent_text printed_keys(void)
{
    kent_text text = {0};
    const kent_sink sink = {.write = gather, .to = &text};
    assert_int_equal(kent_report_keys(sink), KENT_OK);
    return text;
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

/* Fails with the first line in which two texts differ. */
static void assert_same_lines(const char *got, const char *want)
{
    while (*got != '\0' || *want != '\0') {
        const size_t here = strcspn(got, "\n");
        const size_t there = strcspn(want, "\n");
        if (here != there || strncmp(got, want, here) != 0) {
            fail_msg("docs/case-format.md has\n%.*s\nwhere the key table gives\n%.*s",
                     (int)here, got, (int)there, want);
        }
        got += here + (got[here] == '\n');
        want += there + (want[there] == '\n');
    }
}

static void the_tables_of_the_manual_are_those_that_the_program_prints(void **state)
{
    (void)state;
    char *manual = read_manual();
    kent_text printed = printed_keys();
    const char *tables = strstr(manual, "\n### `case`");
    assert_non_null(tables);
    assert_same_lines(tables, kent_text_of(&printed));
    kent_text_clear(&printed);
    free(manual);
}

/* As a line of its own, with its default. */
static void every_key_is_printed_once(void **state)
{
    (void)state;
    kent_text printed = printed_keys();
    size_t rows = 0;
    for (const char *p = kent_text_of(&printed); *p != '\0'; p++) {
        if (strncmp(p, "\n| `", 4) == 0) rows++;
    }
    assert_int_equal(rows, KENT_KEY_COUNT);
    kent_text_clear(&printed);
}

static void a_row_says_what_a_key_takes(void **state)
{
    (void)state;
    static const char *const ROWS[] = {
        "\n### `pipe`: a pipe\n",
        "\n| `cover` | a length, `\"1.4 m\"` | 0 to 100 m | ",
        "\n| `units` | `\"SI\"`, `\"US\"` | any | SI | ",
        "\n| `to` | a number, or a flow, `\"300 L/s\"` | ",
        "\n| `water_table` | a length, `\"1.4 m\"`, or `\"none\"` | ",
        "\n| `pipes` | a list of groups, each a pipe | ",
        "\n| `route` | a list | ",
        "\n| `inertia` | a moment of inertia, `\"7.6 kg m^2\"` | ",
    };
    kent_text printed = printed_keys();
    for (size_t i = 0; i < sizeof ROWS / sizeof ROWS[0]; i++) {
        if (!strstr(kent_text_of(&printed), ROWS[i])) fail_msg("no row%s", ROWS[i]);
    }
    kent_text_clear(&printed);
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
        return kent_report_keys(kent_sink_stream(stdout)) ? EXIT_FAILURE : EXIT_SUCCESS;
    }
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_tables_of_the_manual_are_those_that_the_program_prints),
        cmocka_unit_test(every_key_is_printed_once),
        cmocka_unit_test(a_row_says_what_a_key_takes),
        cmocka_unit_test(the_example_of_the_manual_is_a_case),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
