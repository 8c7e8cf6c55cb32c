/* Scanning and parsing: what libconfig takes wrongly, and where things stand. */
#include "case_text.h"

#include <math.h>

static kent_status read_text(const char *text, kent_tree **tree, kent_complaints *c)
{
    char path[64];
    kent_error err = {0};
    *tree = NULL;
    *c = (kent_complaints){0};
    write_bytes(path, text, strlen(text));
    const kent_status status = kent_tree_read(path, tree, c, &err);
    (void)unlink(path);
    return status;
}

static void refuses(const char *text, const char *part, int line)
{
    kent_tree *tree = NULL;
    kent_complaints c;
    assert_int_equal(read_text(text, &tree, &c), KENT_E_INPUT);
    assert_null(tree);
    assert_true(c.count > 0);
    if (!strstr(c.kept[0].what, part)) print_error("%s\n", c.kept[0].what);
    assert_non_null(strstr(c.kept[0].what, part));
    assert_int_equal(c.kept[0].line, line);
}

static void every_setting_knows_its_line(void **state)
{
    (void)state;
    kent_tree *tree = NULL;
    kent_complaints c;
    const char *text =
        "a = 1;\n/* two\nlines */\nb = { c = \"x\";\n  d = ( 1.5,\n  { e = "
        "true; } ); };\n";
    assert_int_equal(read_text(text, &tree, &c), KENT_OK);
    const kent_twig *root = kent_tree_root(tree);
    const kent_twig *b = kent_twig_member(root, "b");
    const kent_twig *d = kent_twig_member(b, "d");
    assert_int_equal(kent_tree_place(tree, kent_twig_member(root, "a")).line, 1);
    assert_int_equal(kent_tree_place(tree, b).line, 4);
    assert_int_equal(kent_tree_place(tree, d).line, 5);
    assert_int_equal(kent_tree_place(tree, kent_twig_child(d, 1)).line, 6);
    assert_int_equal(kent_twig_type_of(d), KENT_TWIG_LIST);
    assert_close(kent_twig_number(kent_twig_child(d, 0)), 1.5, 0.0);
    assert_true(kent_twig_is_true(kent_twig_member(kent_twig_child(d, 1), "e")));
    assert_string_equal(kent_twig_text(kent_twig_member(b, "c")), "x");
    assert_null(kent_twig_text(d));
    kent_tree_free(tree);
}

static void carriage_returns_change_neither_values_nor_lines(void **state)
{
    (void)state;
    kent_tree *tree = NULL;
    kent_complaints c;
    assert_int_equal(read_text("a = 1;\r\nb = \"x y\";\r\n", &tree, &c), KENT_OK);
    const kent_twig *b = kent_twig_member(kent_tree_root(tree), "b");
    assert_string_equal(kent_twig_text(b), "x y");
    assert_int_equal(kent_tree_place(tree, b).line, 2);
    kent_tree_free(tree);
}

static void the_checksum_is_fnv_1a_of_the_bytes(void **state)
{
    (void)state;
    kent_tree *tree = NULL;
    kent_complaints c;
    const char *text = "a = 1;\r\n";
    unsigned long long want = 14695981039346656037ULL;
    for (const char *p = text; *p; p++) {
        want = (want ^ (unsigned char)*p) * 1099511628211ULL;
    }
    assert_int_equal(read_text(text, &tree, &c), KENT_OK);
    assert_true(kent_tree_checksum(tree) == want);
    kent_tree_free(tree);
}

static void what_libconfig_reads_wrongly_is_refused_with_reason(void **state)
{
    (void)state;
    refuses("a = 99999999999;\n", "whole numbers go to 2147483647", 1);
    refuses("b = 1;\na = 1e999;\n", "out of range of any number", 2);
    refuses("a = [ -1.0, 0, 0.5 ];\n", "mixes whole numbers and fractions", 1);
    refuses("a = ( 1, );\n", "a comma before ')'", 1);
    refuses("a = 1;\na = 2;\n", "'a' is given twice", 2);
    refuses("a = [ 1, \"x\" ];\n", "mixes kinds of values", 1);
    refuses("a = 1.4 m;\n", "'m' follows a number", 1);
    refuses("b = 1;\na = 3 L/s;\n", "'L' follows a number", 2);
    refuses("a = 1.4m;\n", "stands in quotes", 1);
    refuses("a = \xE2\x80\x9Cx\xE2\x80\x9D;\n", "straight quotes", 1);
    refuses("a = 1;\n}\n", "'}' closes nothing", 2);
    refuses("a = (\n{ b = 1; };\n", "never closed by ')'", 1);
    refuses("/* a = 1;\n", "does not end", 1);
    refuses("\xFF\xFE", "UTF-16", 1);
    refuses("@import \"x\"\n", "'@' cannot stand here", 1);
    refuses("@include x\n", "needs a file name in quotes", 1);
    refuses("@include \"x\" a = 1;\n", "alone on its line", 1);
    refuses("@include \"/etc/passwd\"\n", "leaves the folder", 1);
    refuses("@include \"a/../../b\"\n", "leaves the folder", 1);
}

static void what_lacks_a_name_a_sign_or_a_value_is_said_so(void **state)
{
    (void)state;
    refuses("\"x\";\n", "a value stands here without a name", 1);
    refuses("a = ( { \"x\"; b = 1; } );\n", "a value stands here without a name", 1);
    refuses("a = 1,5;\n", "decimals have a point", 1);
    refuses("a = ;\n", "a value is missing after 'a ='", 1);
    refuses("a = { b = };\n", "a value is missing after 'b ='", 1);
    refuses("a;\n", "'=' is missing after 'a'", 1);
    refuses("a = = 1;\n", "'=' stands here without a name", 1);
    refuses("a = ( , 1 );\n", "',' follows nothing", 1);
    refuses("a = 1;;\n", "';' follows nothing", 1);
    refuses("a = ( 1; 2 );\n", "a ',' separates the elements of a list", 1);
}

static void texts_side_by_side_are_one(void **state)
{
    (void)state;
    kent_tree *tree = NULL;
    kent_complaints c;
    assert_int_equal(read_text("a = \"x\"\n \"y\"\nb = 1\n", &tree, &c), KENT_OK);
    const kent_twig *a = kent_twig_member(kent_tree_root(tree), "a");
    assert_string_equal(kent_twig_text(a), "xy");
    kent_tree_free(tree);
}

static void only_files_are_included(void **state)
{
    (void)state;
    refuses("@include \".\"\n", "is not a file", 1);
}

static void lengths_and_depths_have_limits(void **state)
{
    (void)state;
    char *text = kent_alloc(100000, 1);
    assert_non_null(text);
    (void)snprintf(text, 100000, "a = \"%05000d\";\n", 0);
    refuses(text, "longer than 4096 bytes", 1);
    (void)snprintf(text, 100000, "# %070000d\n", 0);
    refuses(text, "longer than 65536 bytes", 1);
    (void)snprintf(text, 100000, "a = ");
    memset(text + 4, '(', 40);
    text[44] = '\0';
    refuses(text, "nested more than 32 deep", 1);
    free(text);
}

static void an_included_file_keeps_its_own_name_and_lines(void **state)
{
    (void)state;
    char folder[] = "/tmp/kent-include-XXXXXX";
    char path[128];
    assert_non_null(mkdtemp(folder));
    kent_complaints c = {0};
    kent_error err = {0};
    kent_tree *tree = NULL;
    (void)snprintf(path, sizeof path, "%s/part.inc", folder);
    FILE *part = fopen(path, "w");
    assert_non_null(part);
    (void)fputs("# a part\nb = 2;\n", part);
    assert_int_equal(fclose(part), 0);
    (void)snprintf(path, sizeof path, "%s/main.cfg", folder);
    FILE *whole = fopen(path, "w");
    assert_non_null(whole);
    (void)fputs("a = 1;\n@include \"part.inc\"   # taken in\nc = 3;\n", whole);
    assert_int_equal(fclose(whole), 0);

    assert_int_equal(kent_tree_read(path, &tree, &c, &err), KENT_OK);
    const kent_twig *root = kent_tree_root(tree);
    const kent_place b = kent_tree_place(tree, kent_twig_member(root, "b"));
    const kent_place last = kent_tree_place(tree, kent_twig_member(root, "c"));
    assert_int_equal(kent_tree_file_count(tree), 2);
    assert_int_equal(b.file, 1);
    assert_int_equal(b.line, 2);
    assert_non_null(strstr(kent_tree_file(tree, 1), "/part.inc"));
    assert_int_equal(last.file, 0);
    assert_int_equal(last.line, 3);
    kent_tree_free(tree);
    (void)unlink(path);
    (void)snprintf(path, sizeof path, "%s/part.inc", folder);
    (void)unlink(path);
    (void)rmdir(folder);
}

static void a_file_that_is_not_there_is_no_input_error(void **state)
{
    (void)state;
    kent_complaints c = {0};
    kent_error err = {0};
    kent_tree *tree = NULL;
    assert_int_equal(kent_tree_read("/nowhere/x.cfg", &tree, &c, &err), KENT_E_IO);
    assert_string_equal(err.where, "/nowhere/x.cfg");
    assert_int_equal(c.count, 0);
    err = (kent_error){0};
    assert_int_equal(kent_tree_read("/tmp", &tree, &c, &err), KENT_E_IO);
}

/* 64 MB is the most that docs/case-format.md allows; the file is a hole. */
static void a_case_too_large_is_refused_before_it_is_read(void **state)
{
    (void)state;
    char path[64];
    kent_tree *tree = NULL;
    kent_complaints c = {0};
    kent_error err = {0};
    write_bytes(path, "a = 1;\n", 7);
    assert_int_equal(truncate(path, 65L * 1024 * 1024), 0);
    assert_int_equal(kent_tree_read(path, &tree, &c, &err), KENT_E_INPUT);
    assert_string_equal(c.kept[0].what, "the case is larger than 64 MB");
    (void)unlink(path);
}

static void an_include_of_a_path_too_long_is_refused(void **state)
{
    (void)state;
    char path[64];
    char far[1200] = "/tmp/";
    kent_tree *tree = NULL;
    kent_complaints c = {0};
    kent_error err = {0};
    write_bytes(path, "@include \"part.inc\"\n", 20);
    for (int i = 0; i < 510; i++) {
        (void)strcat(far, "./"); /* NOLINT: 5 + 1020 + 16 bytes */
    }
    (void)strcat(far, path + strlen("/tmp/")); /* NOLINT: as above */
    assert_int_equal(kent_tree_read(far, &tree, &c, &err), KENT_E_INPUT);
    assert_string_equal(c.kept[0].what, "@include \"part.inc\": the path is too long");
    (void)unlink(path);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(every_setting_knows_its_line),
        cmocka_unit_test(carriage_returns_change_neither_values_nor_lines),
        cmocka_unit_test(the_checksum_is_fnv_1a_of_the_bytes),
        cmocka_unit_test(what_libconfig_reads_wrongly_is_refused_with_reason),
        cmocka_unit_test(what_lacks_a_name_a_sign_or_a_value_is_said_so),
        cmocka_unit_test(texts_side_by_side_are_one),
        cmocka_unit_test(only_files_are_included),
        cmocka_unit_test(lengths_and_depths_have_limits),
        cmocka_unit_test(an_included_file_keeps_its_own_name_and_lines),
        cmocka_unit_test(a_file_that_is_not_there_is_no_input_error),
        cmocka_unit_test(a_case_too_large_is_refused_before_it_is_read),
        cmocka_unit_test(an_include_of_a_path_too_long_is_refused),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
