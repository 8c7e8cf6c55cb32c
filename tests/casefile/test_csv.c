/* Cells of a table. The rules are those of RFC 4180 (Shafranovich, Common Format and
 * MIME Type for Comma-Separated Values (CSV) Files, 2005), section 2, whose examples
 * are used. */
#include "kent_check.h"
#include "kent_csv.h"

#include <stdlib.h>
#include <string.h>

static kent_status read_cells(const char *text, char separator, kent_csv *out,
                              kent_complaints *complaints)
{
    kent_error err = {0};
    char *copy = kent_copy_text(text);
    const kent_file_bytes source = {.bytes = copy, .size = strlen(text)};
    *out = (kent_csv){0};
    *complaints = (kent_complaints){0};
    const kent_status status =
        kent_csv_read(&source, "t.csv", separator, out, complaints, &err);
    free(copy);
    return status;
}

static const char *cell(const kent_csv *c, size_t row, size_t column)
{
    assert_true(row < c->row_count && column < c->rows[row].count);
    return c->cells[c->rows[row].first + column];
}

static void the_examples_of_the_rfc_are_read(void **state)
{
    (void)state;
    kent_csv c;
    kent_complaints complaints;
    /* 1 and 2: with and without an end of the last line */
    assert_int_equal(read_cells("aaa,bbb,ccc\nzzz,yyy,xxx", ',', &c, &complaints), 0);
    assert_int_equal(c.row_count, 2);
    assert_int_equal(c.rows[1].count, 3);
    assert_string_equal(cell(&c, 1, 2), "xxx");
    kent_csv_clear(&c);
    /* 5 and 6: quotes, a line end within them */
    assert_int_equal(
        read_cells("\"aaa\",\"b\nbb\",\"ccc\"\nzzz,yyy,xxx\n", ',', &c, &complaints),
        0);
    assert_int_equal(c.row_count, 2);
    assert_string_equal(cell(&c, 0, 1), "b\nbb");
    assert_int_equal(c.rows[0].line, 1);
    assert_int_equal(c.rows[1].line, 3);
    kent_csv_clear(&c);
    /* 7: a quote within quotes */
    assert_int_equal(read_cells("\"aaa\",\"b\"\"bb\",\"ccc\"\n", ',', &c, &complaints),
                     0);
    assert_string_equal(cell(&c, 0, 1), "b\"bb");
    kent_csv_clear(&c);
}

static void rows_of_nothing_are_passed_over_and_lines_are_counted(void **state)
{
    (void)state;
    kent_csv c;
    kent_complaints complaints;
    assert_int_equal(
        read_cells("\n  \na,b\n\n,\n \t\n c , \"d,e\" \n,,\n", ',', &c, &complaints),
        0);
    assert_int_equal(c.row_count, 2);
    assert_int_equal(c.cell_count, 4);
    assert_int_equal(c.rows[0].line, 3);
    assert_int_equal(c.rows[1].line, 7);
    assert_string_equal(cell(&c, 1, 0), "c");
    assert_string_equal(cell(&c, 1, 1), "d,e");
    kent_csv_clear(&c);
}

static void an_empty_cell_is_a_cell(void **state)
{
    (void)state;
    kent_csv c;
    kent_complaints complaints;
    assert_int_equal(read_cells("a,,\n\t,b,", ',', &c, &complaints), 0);
    assert_int_equal(c.row_count, 2);
    assert_int_equal(c.rows[0].count, 3);
    assert_int_equal(c.rows[1].count, 3);
    assert_string_equal(cell(&c, 0, 2), "");
    assert_string_equal(cell(&c, 1, 1), "b");
    kent_csv_clear(&c);
    assert_int_equal(read_cells("a\t\tb\n\t1\t\n", '\t', &c, &complaints), 0);
    assert_int_equal(c.rows[0].count, 3);
    assert_int_equal(c.rows[1].count, 3);
    assert_string_equal(cell(&c, 1, 1), "1");
    kent_csv_clear(&c);
    assert_int_equal(read_cells("", ',', &c, &complaints), 0);
    assert_int_equal(c.row_count, 0);
    kent_csv_clear(&c);
}

static void a_quote_in_the_wrong_place_is_refused_at_its_row(void **state)
{
    (void)state;
    static const struct {
        const char *text;
        int line;
    } BAD[] = {
        {"a,b\nx,\"y\n", 2},        /* never closed */
        {"a,b\n\nx,6\" main\n", 3}, /* within a cell */
        {"a,b\nx,\"y\"z\n", 2},     /* a cell goes on after it */
        {"a,\"b\nc,d\ne\" f\n", 1}, /* found two lines later */
    };
    for (size_t i = 0; i < sizeof BAD / sizeof BAD[0]; i++) {
        kent_csv c;
        kent_complaints complaints;
        assert_int_equal(read_cells(BAD[i].text, ',', &c, &complaints), KENT_E_INPUT);
        assert_int_equal(complaints.count, 1);
        assert_int_equal(complaints.kept[0].line, BAD[i].line);
        assert_string_equal(complaints.kept[0].file, "t.csv");
        assert_non_null(strstr(complaints.kept[0].what, "never closed"));
        kent_csv_clear(&c);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(the_examples_of_the_rfc_are_read),
        cmocka_unit_test(rows_of_nothing_are_passed_over_and_lines_are_counted),
        cmocka_unit_test(an_empty_cell_is_a_cell),
        cmocka_unit_test(a_quote_in_the_wrong_place_is_refused_at_its_row),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
