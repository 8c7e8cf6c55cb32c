/* Every key of a case, each fault that the key table lets one make of it, through the
 * whole reader: the message stands at the line of the fault and says what would be
 * right. */
#include "key_text.h"

enum {
    AT_ONCE = 6
}; /* faults of one text, so that the kept complaints hold them all */

typedef struct wish {
    int line;
    char wrong[160]; /* parts of the message */
    char right[160];
} wish;

typedef struct trial {
    const kent_catalogue *catalogue;
    const char *group; /* of the text being made; NULL: none */
    kent_text text;
    wish wishes[AT_ONCE];
    size_t count, all;
    size_t missed;
} trial;

static const kent_complaint *find(const kent_complaints *c, const wish *w)
{
    for (size_t i = 0; i < c->count && i < KENT_COMPLAINTS_KEPT; i++) {
        const kent_complaint *one = &c->kept[i];
        if (one->line == w->line && strstr(one->what, w->wrong) &&
            strstr(one->what, w->right) && one->file[0] == '/') {
            return one;
        }
    }
    return NULL;
}

/* Reads the text made so far and looks for every message it should draw. */
static void read_trial(trial *t)
{
    kent_model *m = NULL;
    kent_complaints complaints;
    if (!t->group) return;
    close_group(&t->text, t->group);
    const char *text = kent_text_of(&t->text);
    assert_int_equal(read_bytes(t->catalogue, text, strlen(text), &m, &complaints),
                     KENT_E_INPUT);
    assert_null(m);
    for (size_t i = 0; i < t->count; i++) {
        if (find(&complaints, &t->wishes[i])) continue;
        print_error("no \"%s\" with \"%s\" at line %d of\n%s", t->wishes[i].wrong,
                    t->wishes[i].right, t->wishes[i].line, text);
        for (size_t k = 0; k < complaints.count && k < KENT_COMPLAINTS_KEPT; k++) {
            print_error("  %d: %s\n", complaints.kept[k].line, complaints.kept[k].what);
        }
        t->missed++;
    }
    t->all += t->count;
    t->count = 0;
    t->group = NULL;
    kent_text_reset(&t->text);
}

static void end_trial(trial *t, size_t at_least)
{
    read_trial(t);
    kent_text_clear(&t->text);
    assert_int_equal(t->missed, 0);
    if (t->all < at_least) print_error("only %zu faults\n", t->all);
    assert_true(t->all >= at_least);
}

/* Room for one fault more in the group. */
static wish *next_wish(trial *t, const char *group)
{
    if (t->count == AT_ONCE || (t->group && strcmp(t->group, group) != 0)) {
        read_trial(t);
    }
    if (!t->group) {
        t->group = group;
        (void)open_group(&t->text, group);
    }
    wish *w = &t->wishes[t->count++];
    w->line = next_line(&t->text);
    return w;
}

/* "name = value;" in the group draws a message with both parts in it. */
static void faulty(trial *t, const char *group, const char *name, const char *value,
                   const char *wrong, const char *right)
{
    wish *w = next_wish(t, group);
    kent_text_add(&t->text, "%s = %s;\n", name, value);
    (void)snprintf(w->wrong, sizeof w->wrong, "%s", wrong);
    (void)snprintf(w->right, sizeof w->right, "%s", right);
}

/* The next key of a case. */
static const kent_key *next_of_case(size_t *index)
{
    const kent_key *k = next_now(index);
    while (k && !is_of_a_case(k->group)) {
        k = next_now(index);
    }
    return k;
}

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

/* A key's letter written twice is one letter from it, and no other key is nearer. */
static void a_key_with_a_letter_too_many_is_told_from_its_like(void **state)
{
    (void)state;
    trial t = {.catalogue = catalogue};
    size_t next = 0;
    for (const kent_key *k; (k = next_of_case(&next)) != NULL;) {
        char name[64];
        char wrong[160];
        char right[160];
        const size_t n = strlen(k->key);
        (void)snprintf(name, sizeof name, "%.*s%s", (int)(n / 2 + 1), k->key,
                       k->key + n / 2);
        if (n < 3) continue; /* too short to guess: "x" */
        (void)snprintf(wrong, sizeof wrong, "'%s' is not a key of %s", name,
                       kent_key_group_word(k->group));
        (void)snprintf(right, sizeof right, "did you mean '%s'?", k->key);
        faulty(&t, k->group, name, "1", wrong, right);
    }
    end_trial(&t, 190);
}

static void a_value_of_another_type_is_told_what_belongs(void **state)
{
    (void)state;
    trial t = {.catalogue = catalogue};
    size_t next = 0;
    for (const kent_key *k; (k = next_of_case(&next)) != NULL;) {
        const bool vector = k->value == KENT_VALUE_VECTOR;
        faulty(&t, k->group, k->key, wrong_type_for(k), k->key,
               vector ? "must be three numbers" : " belongs");
    }
    end_trial(&t, 190);
}

static bool is_quantity(const kent_key *k)
{
    return k->value == KENT_VALUE_QUANTITY || k->value == KENT_VALUE_STATION;
}

static void a_quantity_wants_a_unit_of_its_kind(void **state)
{
    (void)state;
    trial t = {.catalogue = catalogue};
    size_t next = 0;
    for (const kent_key *k; (k = next_of_case(&next)) != NULL;) {
        char such_as[80];
        const kent_kind kind = k->value == KENT_VALUE_STATION ? KENT_LENGTH : k->kind;
        const bool length = kind == KENT_LENGTH || kind == KENT_DIAMETER;
        if (!is_quantity(k)) continue;
        (void)snprintf(such_as, sizeof such_as, "for instance \"%s\"",
                       kent_kind_example(kind, KENT_SI));
        faulty(&t, k->group, k->key, length ? "\"3 kg/m^3\"" : "\"3 m\"",
               kent_kind_word(kind), such_as);
    }
    end_trial(&t, 70);
    t = (trial){.catalogue = catalogue};
    next = 0;
    for (const kent_key *k; (k = next_of_case(&next)) != NULL;) {
        char such_as[80];
        const kent_kind kind = k->value == KENT_VALUE_STATION ? KENT_LENGTH : k->kind;
        if (!is_quantity(k)) continue;
        (void)snprintf(such_as, sizeof such_as, "write for instance \"%s\"",
                       kent_kind_example(kind, KENT_SI));
        faulty(&t, k->group, k->key, "1.5", "has no unit", such_as);
    }
    end_trial(&t, 70);
}

static void a_value_out_of_range_is_told_the_range(void **state)
{
    (void)state;
    trial t = {.catalogue = catalogue};
    size_t next = 0;
    for (const kent_key *k; (k = next_of_case(&next)) != NULL;) {
        const bool has_range = k->value == KENT_VALUE_QUANTITY ||
                               k->value == KENT_VALUE_NUMBER ||
                               k->value == KENT_VALUE_COUNT;
        char value[80];
        char range[80];
        char right[120];
        if (!has_range) continue;
        kent_key_range(k, KENT_SI, range, sizeof range);
        (void)snprintf(right, sizeof right, "out of range; the range is %s", range);
        value_text(k, k->most + fmax(1.0, 0.01 * fabs(k->most)), value, sizeof value);
        faulty(&t, k->group, k->key, value, k->key, right);
    }
    end_trial(&t, 100);
}

static void a_text_too_long_is_told_the_length(void **state)
{
    (void)state;
    trial t = {.catalogue = catalogue};
    size_t next = 0;
    for (const kent_key *k; (k = next_of_case(&next)) != NULL;) {
        char value[400];
        char right[80];
        const int length = (int)k->most + 1;
        if (k->value != KENT_VALUE_TEXT) continue;
        (void)snprintf(value, sizeof value, "\"%0*d\"", length, 0);
        (void)snprintf(right, sizeof right, "longer than %d bytes", length - 1);
        faulty(&t, k->group, k->key, value, k->key, right);
    }
    end_trial(&t, 8);
}

static void a_key_left_out_is_told_what_it_is(void **state)
{
    (void)state;
    trial t = {.catalogue = catalogue};
    size_t next = 0;
    for (const kent_key *k; (k = next_of_case(&next)) != NULL;) {
        wish *w = NULL;
        if (!kent_key_is_required(k)) continue;
        read_trial(&t); /* the group holds nothing */
        w = next_wish(&t, k->group);
        if (strcmp(k->group, "case") == 0) {
            kent_text_add(&t.text, "title = \"x\";\n");
        }
        w->line = strcmp(k->group, "case") == 0 ? 1 : w->line - 1; /* its own */
        (void)snprintf(w->wrong, sizeof w->wrong, "'%s' is missing (%s)", k->key,
                       k->says);
        if (k->value == KENT_VALUE_QUANTITY) {
            (void)snprintf(w->right, sizeof w->right, "write for instance %s = \"%s\"",
                           k->key, kent_kind_example(k->kind, KENT_SI));
        } else {
            w->right[0] = '\0';
        }
    }
    end_trial(&t, 25);
}

/* A sound value, as far as the table knows. */
static void sound_value(const kent_key *k, char *out, size_t size)
{
    switch (k->value) {
    case KENT_VALUE_QUANTITY:
    case KENT_VALUE_NUMBER:
    case KENT_VALUE_COUNT:
        value_text(k, k->most, out, size);
        return;
    case KENT_VALUE_EITHER:
        (void)snprintf(out, size, "0.5");
        return;
    case KENT_VALUE_SWITCH:
        (void)snprintf(out, size, "true");
        return;
    case KENT_VALUE_WORD:
        (void)snprintf(out, size, "\"%.*s\"", (int)strcspn(k->words, "|"), k->words);
        return;
    case KENT_VALUE_LIST:
        (void)snprintf(out, size, "( )");
        return;
    case KENT_VALUE_GROUP:
        (void)snprintf(out, size, "{ }");
        return;
    case KENT_VALUE_VECTOR:
        (void)snprintf(out, size, "[ 1.0, 0.0, 0.0 ]");
        return;
    case KENT_VALUE_STATION:
    case KENT_VALUE_TURN:
    case KENT_VALUE_TEXT:
    case KENT_VALUE_ID:
    case KENT_VALUE_REF:
        (void)snprintf(out, size, "\"9 m\"");
        return;
    }
}

static void a_key_given_twice_is_told_at_its_second_line(void **state)
{
    (void)state;
    trial t = {.catalogue = catalogue};
    size_t next = 0;
    for (const kent_key *k; (k = next_of_case(&next)) != NULL;) {
        char value[80];
        char wrong[120];
        sound_value(k, value, sizeof value);
        read_trial(&t); /* one for each text: parsing ends there */
        wish *w = next_wish(&t, k->group);
        kent_text_add(&t.text, "%s = %s;\n", k->key, value);
        w->line = next_line(&t.text);
        kent_text_add(&t.text, "%s = %s;\n", k->key, value);
        (void)snprintf(wrong, sizeof wrong, "'%s' is given twice in its group", k->key);
        (void)snprintf(w->wrong, sizeof w->wrong, "%s", wrong);
        (void)snprintf(w->right, sizeof w->right, "keep one");
    }
    end_trial(&t, 190);
}

static void a_word_with_a_letter_too_many_is_told_from_its_like(void **state)
{
    (void)state;
    trial t = {.catalogue = catalogue};
    size_t next = 0;
    for (const kent_key *k; (k = next_of_case(&next)) != NULL;) {
        if (k->value != KENT_VALUE_WORD) continue;
        for (const char *p = k->words; p;) {
            const int n = (int)strcspn(p, "|");
            char value[80];
            char wrong[160];
            char right[80];
            (void)snprintf(value, sizeof value, "\"%.*s%.*s\"", n / 2 + 1, p, n - n / 2,
                           p + n / 2);
            (void)snprintf(wrong, sizeof wrong, "%s = %s is not known", k->key, value);
            (void)snprintf(right, sizeof right, "did you mean \"%.*s\"?", n, p);
            read_trial(&t); /* a key stands once in a group */
            faulty(&t, k->group, k->key, value, wrong, right);
            p = p[n] == '|' ? p + n + 1 : NULL;
        }
    }
    end_trial(&t, 40);
}

/* An id that is there, for references of each group to miss by a letter. */
static const struct {
    const char *group, *id, *text; /* text: one that has it; NULL: the catalogue has */
} KNOWN[] = {
    {"point", "Knoll", "points = ( { id = \"Knoll\"; z = \"9 m\"; } );\n"},
    {"soil", "silt-ML", NULL},
    {"valve", "Sluice",
     "valves = ( { id = \"Sluice\"; at = \"Knoll\"; size = \"1 m\"; loss = 1.0; } "
     ");\n"},
    {"outflow", "Knoll", "outflows = ( { at = \"Knoll\"; flow = \"1 L/s\"; } );\n"},
    {"pipe", "Lane",
     "pipes = ( { id = \"Lane\"; route = [ \"Knoll\", \"Knoll\" ]; } );\n"},
    {"pump", "Lift",
     "pumps = ( { id = \"Lift\"; at = \"Knoll\"; suction_level = \"1 m\"; } );\n"},
    {"fixed_level", "Knoll",
     "fixed_levels = ( { at = \"Knoll\"; level = \"9 m\"; } );\n"},
    {"scenario", "Rush", NULL}, /* itself is */
    {"pipe_class", "DI-EN545-C40-DN300", NULL},
    {"material", "steel", NULL},
    {"valve_type", "butterfly", NULL},
    {"soil_row", "silt-ML", NULL},
    {"concrete_row", "C25/30", NULL},
    {"rule", "common-practice", NULL},
};

static void a_reference_to_nothing_is_told_what_is_near(void **state)
{
    (void)state;
    trial t = {.catalogue = catalogue};
    size_t next = 0;
    for (const kent_key *k; (k = next_of_case(&next)) != NULL;) {
        char value[80];
        char wrong[120];
        char right[120];
        size_t i = 0;
        if (k->value != KENT_VALUE_REF) continue;
        while (strcmp(KNOWN[i].group, k->words) != 0) {
            i++;
            assert_true(i < sizeof KNOWN / sizeof KNOWN[0]);
        }
        const char *id = KNOWN[i].id;
        (void)snprintf(value, sizeof value, "\"%c%s\"", id[0], id);
        (void)snprintf(wrong, sizeof wrong, "%s: there is no ", k->key);
        (void)snprintf(right, sizeof right, "\"%c%s\"; did you mean \"%s\"?", id[0], id,
                       id);
        read_trial(&t);
        faulty(&t, k->group, k->key, value, wrong, right);
        if (strcmp(k->words, k->group) == 0) kent_text_add(&t.text, "id = \"%s\";", id);
        close_group(&t.text, k->group);
        t.group = "case"; /* which has nothing to close */
        if (KNOWN[i].text) kent_text_add(&t.text, "%s", KNOWN[i].text);
    }
    end_trial(&t, 15);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_key_with_a_letter_too_many_is_told_from_its_like),
        cmocka_unit_test(a_value_of_another_type_is_told_what_belongs),
        cmocka_unit_test(a_quantity_wants_a_unit_of_its_kind),
        cmocka_unit_test(a_value_out_of_range_is_told_the_range),
        cmocka_unit_test(a_text_too_long_is_told_the_length),
        cmocka_unit_test(a_key_left_out_is_told_what_it_is),
        cmocka_unit_test(a_key_given_twice_is_told_at_its_second_line),
        cmocka_unit_test(a_word_with_a_letter_too_many_is_told_from_its_like),
        cmocka_unit_test(a_reference_to_nothing_is_told_what_is_near),
    };
    return cmocka_run_group_tests(tests, read_it, free_it);
}
