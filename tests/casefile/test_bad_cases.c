/* cases/bad: each NAME.cfg is refused with exactly the messages of NAME.txt, as a case,
 * or where its name starts with "standard-" as a standard table. With
 * --print NAME.cfg ... the messages of those cases are printed instead. */
#include "case_text.h"

#include <dirent.h>

/* The messages as the program prints them: FILE:LINE: what, or FILE: what. */
static void messages_of(const kent_catalogue *catalogue, const char *name,
                        kent_text *out)
{
    kent_complaints complaints = {0};
    kent_error err = {0};
    kent_model *model = NULL;
    kent_standard *table = NULL;
    const kent_status status =
        strncmp(name, "standard-", strlen("standard-")) == 0
            ? kent_standard_read(name, catalogue, NULL, &table, &complaints, &err)
            : kent_case_read(name, catalogue, NULL, &model, &complaints, &err);
    if (status != KENT_E_INPUT) {
        kent_text_add(out, "%s: %s\n", name, kent_status_text(status));
    }
    for (size_t i = 0; i < complaints.count && i < KENT_COMPLAINTS_KEPT; i++) {
        const kent_complaint *c = &complaints.kept[i];
        if (c->line > 0) {
            kent_text_add(out, "%s:%d: %s\n", c->file, c->line, c->what);
        } else {
            kent_text_add(out, "%s: %s\n", c->file, c->what);
        }
    }
    kent_model_free(model);
    kent_standard_free(table);
}

static void read_whole(const char *path, char *out, size_t size)
{
    FILE *file = fopen(path, "rb");
    if (!file) print_error("%s is missing\n", path);
    assert_non_null(file);
    const size_t got = fread(out, 1, size - 1, file);
    out[got] = '\0';
    assert_int_equal(fclose(file), 0);
}

static bool ends_with(const char *text, const char *end)
{
    const size_t n = strlen(text);
    return n > strlen(end) && strcmp(text + n - strlen(end), end) == 0;
}

static void every_bad_case_gets_exactly_its_messages(void **state)
{
    (void)state;
    kent_catalogue *catalogue = read_catalogue();
    size_t cases = 0;
    size_t wrong = 0;
    DIR *folder = opendir(".");
    assert_non_null(folder);
    for (const struct dirent *entry; (entry = readdir(folder)) != NULL;) {
        char wanted[8192];
        char path[300];
        kent_text got = {0};
        if (!ends_with(entry->d_name, ".cfg")) continue;
        cases++;
        (void)snprintf(path, sizeof path, "%.*s.txt", (int)(strlen(entry->d_name) - 4),
                       entry->d_name);
        read_whole(path, wanted, sizeof wanted);
        messages_of(catalogue, entry->d_name, &got);
        if (strcmp(kent_text_of(&got), wanted) != 0) {
            print_error("%s\ngot:\n%swanted:\n%s", entry->d_name, kent_text_of(&got),
                        wanted);
            wrong++;
        }
        kent_text_clear(&got);
    }
    (void)closedir(folder);
    kent_catalogue_free(catalogue);
    assert_true(cases >= 100);
    assert_int_equal(wrong, 0);
}

int main(int argc, char **argv)
{
    if (chdir(KENT_SOURCE_DIR "/cases/bad") != 0) return EXIT_FAILURE;
    if (argc > 2 && strcmp(argv[1], "--print") == 0) {
        kent_catalogue *catalogue = read_catalogue();
        for (int i = 2; i < argc; i++) {
            kent_text got = {0};
            messages_of(catalogue, argv[i], &got);
            (void)fputs(kent_text_of(&got), stdout);
            kent_text_clear(&got);
        }
        kent_catalogue_free(catalogue);
        return EXIT_SUCCESS;
    }
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_bad_case_gets_exactly_its_messages),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
