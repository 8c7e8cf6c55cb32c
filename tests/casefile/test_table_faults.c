/* Every key of a point and of a pipe as a column of a table, each fault that the key
 * table lets one make of its heading or its cell: the message names the table and the
 * line and says what would be right. */
#include "key_text.h"
#include "table_folder.h"

static kent_catalogue *catalogue;

static int read_it(void **state)
{
    (void)state;
    catalogue = read_catalogue();
    return 0;
}

static int free_it(void **state)
{
    (void)state;
    kent_catalogue_free(catalogue);
    return 0;
}

/* What a row needs whatever else it has. */
static const struct {
    const char *group, *key, *heading, *cell;
} NEEDED[] = {
    {"point", "id", "id", "R1"},
    {"point", "x", "x [m]", "0"},
    {"point", "y", "y [m]", "0"},
    {"point", "z", "z [m]", "50"},
    {"pipe", "id", "id", "A"},
    {"pipe", "route", "route", "R1 B1"},
    {"pipe", "pipe_class", "pipe_class", "DI-EN545-C40-DN300"},
};

/* Whether a table with that column draws a message with both parts at that line. */
static bool is_told(const kent_key *k, const char *heading, const char *cell, int line,
                    const char *wrong, const char *right)
{
    const bool point = strcmp(k->group, "point") == 0;
    const char *name = point ? "/points.csv" : "/pipes.csv";
    kent_text head = {0};
    kent_text row = {0};
    kent_model *m = NULL;
    kent_complaints complaints;
    bool found = false;
    for (size_t i = 0; i < sizeof NEEDED / sizeof NEEDED[0]; i++) {
        if (strcmp(NEEDED[i].group, k->group) != 0) continue;
        if (strcmp(NEEDED[i].key, k->key) == 0) continue;
        kent_text_add(&head, "%s,", NEEDED[i].heading);
        kent_text_add(&row, "%s,", NEEDED[i].cell);
    }
    kent_text_add(&head, "%s\n%s%s\n", heading, kent_text_of(&row), cell);
    const char *table = kent_text_of(&head);
    const kent_status status =
        read_folder(catalogue, TABLE_CASE, point ? table : POINTS_TABLE, 0,
                    point ? PIPES_TABLE : table, &m, &complaints);
    for (size_t i = 0; i < complaints.count && i < KENT_COMPLAINTS_KEPT; i++) {
        const kent_complaint *c = &complaints.kept[i];
        found = found || (c->line == line && strstr(c->file, name) &&
                          strstr(c->what, wrong) && strstr(c->what, right));
    }
    if (!found) {
        print_error("no \"%s\" with \"%s\" at line %d of\n%sfirst \"%s\"\n", wrong,
                    right, line, table,
                    complaints.count > 0 ? complaints.kept[0].what : "");
    }
    kent_model_free(m);
    kent_text_clear(&head);
    kent_text_clear(&row);
    return found && status == KENT_E_INPUT;
}

/* The next key that a column can have. */
static const kent_key *next_column(size_t *index)
{
    const kent_key *k = next_now(index);
    while (k && ((strcmp(k->group, "point") != 0 && strcmp(k->group, "pipe") != 0) ||
                 strcmp(k->key, "creep") == 0)) {
        k = next_now(index);
    }
    return k;
}

static bool takes_unit(const kent_key *k)
{
    return k->value == KENT_VALUE_QUANTITY || k->value == KENT_VALUE_STATION;
}

static kent_kind kind_of(const kent_key *k)
{
    return k->value == KENT_VALUE_STATION ? KENT_LENGTH : k->kind;
}

static void headings_are_held_to_the_key_table(void **state)
{
    (void)state;
    size_t columns = 0;
    size_t missed = 0;
    size_t next = 0;
    for (const kent_key *k; (k = next_column(&next)) != NULL; columns++) {
        char heading[160];
        char wrong[240];
        char right[80];
        const int half = (int)strlen(k->key) / 2;
        (void)snprintf(heading, sizeof heading, "%.*s%s", half + 1, k->key,
                       k->key + half);
        (void)snprintf(wrong, sizeof wrong, "heading '%s' is not a key of", heading);
        (void)snprintf(right, sizeof right, "did you mean '%s'?", k->key);
        if (half > 0) missed += !is_told(k, heading, "", 1, wrong, right);

        (void)snprintf(heading, sizeof heading, "%s,%s", k->key, k->key);
        (void)snprintf(wrong, sizeof wrong, "'%s' heads two columns", k->key);
        missed += !is_told(k, heading, ",", 1, wrong, "keep one");

        const bool length = kind_of(k) == KENT_LENGTH || kind_of(k) == KENT_DIAMETER;
        (void)snprintf(heading, sizeof heading, "%s [%s]", k->key,
                       length ? "bar" : "ft");
        (void)snprintf(wrong, sizeof wrong, "heading '%s'", heading);
        if (takes_unit(k)) {
            (void)snprintf(right, sizeof right, "; write for instance '%s [", k->key);
        } else {
            (void)snprintf(right, sizeof right, "takes no unit; write '%s'", k->key);
        }
        missed += !is_told(k, heading, "1", 1, wrong, right);
    }
    assert_int_equal(missed, 0);
    assert_true(columns > 30);
}

/* A cell that its column does not take, and the end of what is said of it. */
static const char *wrong_cell_for(const kent_key *k, char *right, size_t size)
{
    switch (k->value) {
    case KENT_VALUE_QUANTITY:
    case KENT_VALUE_STATION:
        (void)snprintf(right, size, "for instance \"%s\"",
                       kent_kind_example(kind_of(k), KENT_SI));
        return "much";
    case KENT_VALUE_NUMBER:
        (void)snprintf(right, size, "a number without unit belongs");
        return "much";
    case KENT_VALUE_SWITCH:
        (void)snprintf(right, size, "true or false belongs");
        return "yes";
    case KENT_VALUE_TEXT:
        (void)snprintf(right, size, "longer than %g bytes", k->most);
        return "0123456789012345678901234567890123456789012345678901234567890123456789"
               "012345678901234567890123456789";
    case KENT_VALUE_ID:
        (void)snprintf(right, size, "no spaces");
        return "a b";
    case KENT_VALUE_REF:
        (void)snprintf(right, size, "there is no");
        return "no-such-thing";
    case KENT_VALUE_WORD:
        (void)snprintf(right, size, "it is one of \"%.*s\"",
                       (int)strcspn(k->words, "|"), k->words);
        return "no-such-thing";
    case KENT_VALUE_LIST:
        (void)snprintf(right, size, "did you mean \"B1\"?");
        return "R1 B2";
    case KENT_VALUE_TURN:
        (void)snprintf(right, size, "for instance \"45 deg right\"");
        return "45 deg";
    case KENT_VALUE_COUNT:
    case KENT_VALUE_EITHER:
    case KENT_VALUE_GROUP:
    case KENT_VALUE_VECTOR:
        fail_msg("%s: no column has such a key", k->key);
    }
    return "";
}

static void cells_are_held_to_the_key_table(void **state)
{
    (void)state;
    size_t missed = 0;
    size_t next = 0;
    for (const kent_key *k; (k = next_column(&next)) != NULL;) {
        char right[120];
        char heading[80];
        const char *cell = wrong_cell_for(k, right, sizeof right);
        missed += !is_told(k, k->key, cell, 2, k->key, right);
        if (kent_key_is_required(k)) {
            (void)snprintf(right, sizeof right, "'%s' is missing", k->key);
            missed += !is_told(k, k->key, "", 2, right, k->says);
        }
        if (!takes_unit(k)) continue;
        (void)snprintf(right, sizeof right, "write it in the heading, as '%s [",
                       k->key);
        missed += !is_told(k, k->key, "1.5", 2, "has no unit", right);
        (void)snprintf(heading, sizeof heading, "%s [%s]", k->key,
                       kent_kind_si(kind_of(k)));
        (void)snprintf(right, sizeof right, "for instance \"%s\"",
                       kent_kind_example(kind_of(k), KENT_SI));
        missed += !is_told(k, heading, "3 J", 2, kent_kind_word(kind_of(k)), right);
        missed +=
            !is_told(k, heading, "\"1,5\"", 2, "has a comma", "decimal = \"comma\"");
    }
    assert_int_equal(missed, 0);
}

static void cells_out_of_range_are_told_the_range(void **state)
{
    (void)state;
    size_t missed = 0;
    size_t next = 0;
    for (const kent_key *k; (k = next_column(&next)) != NULL;) {
        char range[80];
        char right[120];
        char heading[80];
        char cell[60];
        if (k->value != KENT_VALUE_QUANTITY && k->value != KENT_VALUE_NUMBER) continue;
        const bool unit = k->value == KENT_VALUE_QUANTITY;
        kent_key_range(k, KENT_SI, range, sizeof range);
        (void)snprintf(right, sizeof right, "out of range; the range is %s", range);
        (void)snprintf(heading, sizeof heading, "%s%s%s%s", k->key, unit ? " [" : "",
                       unit ? kent_kind_si(k->kind) : "", unit ? "]" : "");
        (void)snprintf(cell, sizeof cell, "%.17g",
                       k->most + fmax(1.0, 0.01 * fabs(k->most)));
        missed += !is_told(k, heading, cell, 2, k->key, right);
    }
    assert_int_equal(missed, 0);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(headings_are_held_to_the_key_table),
        cmocka_unit_test(cells_are_held_to_the_key_table),
        cmocka_unit_test(cells_out_of_range_are_told_the_range),
    };
    return cmocka_run_group_tests(tests, read_it, free_it);
}
