#include "kent_rows.h"
#include "kent_csv.h"

#include <ctype.h>
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <strings.h>

enum { NUMBER_MOST = 63, UNIT_MOST = 47 }; /* bytes */

typedef struct column {
    const kent_key *key;
    char unit[UNIT_MOST + 1];                    /* "": none in the heading */
    char value[NUMBER_MOST + 1 + UNIT_MOST + 1]; /* a number of the row, with it */
} column;

struct kent_rows {
    kent_csv csv;
    int file;
    const char *group;
    kent_rows_style style;
    column *columns; /* [column_count] */
    size_t column_count;
    size_t first; /* of csv.rows that is a point or a pipe */
    /* The row last asked for. */
    kent_twig row;
    kent_twig *members; /* [column_count] */
    char *route;        /* its ids, each ending in NUL */
    kent_twig *stops;
    size_t route_capacity, stop_capacity;
};

__attribute__((format(printf, 4, 5))) static void
complain(kent_reader *r, const kent_rows *t, int line, const char *fmt, ...)
{
    char what[400];
    va_list args;
    va_start(args, fmt);
    (void)vsnprintf(what, sizeof what, fmt, args);
    va_end(args);
    kent_complain(r->complaints, kent_tree_file(r->tree, (size_t)t->file), line, "%s",
                  what);
}

/* ---- headings -------------------------------------------------------------------- */

/* The kind that a unit at the key measures; KENT_RATIO: it takes none. */
static kent_kind kind_of(const kent_key *key)
{
    return key->value == KENT_VALUE_STATION ? KENT_LENGTH : key->kind;
}

/* "m", a unit that would be right. */
static const char *usual_unit(const kent_reader *r, kent_kind kind)
{
    const char *gap = strchr(kent_kind_example(kind, r->system), ' ');
    return gap ? gap + 1 : "";
}

static bool is_route(const kent_key *key) { return strcmp(key->key, "route") == 0; }

static void complain_unknown(kent_reader *r, const kent_rows *t, int line,
                             const char *name)
{
    const char *near = kent_key_nearest(t->group, name);
    const char *mark = strpbrk(name, ";\t,");
    if (mark) {
        complain(r, t, line,
                 "the headings seem to be separated by a %s; say so in the case file: "
                 "tables = { separator = \"%s\"; }",
                 *mark == ';'    ? "semicolon"
                 : *mark == '\t' ? "tab"
                                 : "comma",
                 *mark == ';'    ? "semicolon"
                 : *mark == '\t' ? "tab"
                                 : "comma");
    } else if (near) {
        complain(r, t, line, "heading '%.60s' is not a key of %s; did you mean '%s'?",
                 name, kent_key_group_word(t->group), near);
    } else {
        complain(r, t, line,
                 "heading '%.60s' is not a key of %s; 'kentledge check --keys' prints "
                 "those there are",
                 name, kent_key_group_word(t->group));
    }
}

/* Splits "z [m]" in place: the key's end is cut, the unit goes into the column. */
static bool split_heading(kent_reader *r, const kent_rows *t, int line, char *heading,
                          column *c)
{
    char *open = strpbrk(heading, "[(");
    if (!open) return true;
    const size_t length = strlen(open);
    const bool whole = open[0] == '[' && open[length - 1] == ']' && length > 2 &&
                       length - 2 <= UNIT_MOST && open > heading;
    if (!whole) {
        complain(
            r, t, line,
            "heading '%.60s' cannot be read; a unit stands in square brackets after "
            "its key, as 'z [m]'",
            heading);
        return false;
    }
    memcpy(c->unit, open + 1, length - 2);
    while (open > heading && isspace((unsigned char)open[-1])) {
        open--;
    }
    *open = '\0';
    return true;
}

static void check_unit(kent_reader *r, const kent_rows *t, int line, const column *c)
{
    const kent_kind kind = kind_of(c->key);
    char one[UNIT_MOST + 3];
    double si = NAN;
    kent_error err = {0};
    if (c->unit[0] == '\0') return;
    if (kind == KENT_RATIO) {
        complain(r, t, line, "heading '%s [%s]': %s takes no unit; write '%s'",
                 c->key->key, c->unit, c->key->key, c->key->key);
        return;
    }
    (void)snprintf(one, sizeof one, "1 %s", c->unit);
    const kent_status status = kent_units_read(r->units, one, kind, &si, &err);
    if (status == KENT_E_NOMEM) r->failed = true;
    if (status == KENT_E_INPUT) { /* its example is of a cell */
        const char *example = strrchr(err.what, ';');
        const int said = (int)(example ? example - err.what : 0);
        complain(r, t, line, "heading '%s [%s]': %.*s; write for instance '%s [%s]'",
                 c->key->key, c->unit, said, err.what, c->key->key,
                 usual_unit(r, kind));
    }
}

static void read_heading(kent_reader *r, kent_rows *t, int line, size_t index,
                         char *heading)
{
    column *c = &t->columns[index];
    if (heading[0] == '\0') {
        complain(r, t, line,
                 "column %zu has no heading; name it or take the column out",
                 index + 1);
        return;
    }
    if (!split_heading(r, t, line, heading, c)) return;
    c->key = kent_key_find(t->group, kent_spelling(heading));
    if (!c->key) {
        complain_unknown(r, t, line, heading);
        return;
    }
    for (size_t i = 0; i < index; i++) {
        if (t->columns[i].key != c->key) continue;
        complain(r, t, line, "'%s' heads two columns, %zu and %zu; keep one",
                 c->key->key, i + 1, index + 1);
    }
    const kent_value value = c->key->value;
    if ((value == KENT_VALUE_LIST && !is_route(c->key)) || value == KENT_VALUE_GROUP ||
        value == KENT_VALUE_VECTOR) {
        complain(r, t, line,
                 "'%s' is a list and cannot stand in a table; what has one is written "
                 "in the case file",
                 c->key->key);
    } else {
        check_unit(r, t, line, c);
    }
}

/* Some tables have their units in a row of their own below the headings. It is one
 * where something stands under a quantity, nothing under anything else, no digit
 * anywhere and no unit in any heading. */
static bool is_unit_row(const kent_rows *t, const kent_csv_row *row)
{
    bool some = false;
    for (size_t i = 0; i < row->count; i++) {
        const char *cell = t->csv.cells[row->first + i];
        if (cell[0] == '\0') continue;
        if (i >= t->column_count || t->columns[i].unit[0] != '\0' ||
            kind_of(t->columns[i].key) == KENT_RATIO || strlen(cell) > UNIT_MOST ||
            strpbrk(cell, "0123456789")) {
            return false;
        }
        some = true;
    }
    return some;
}

static void read_unit_row(kent_reader *r, kent_rows *t, const kent_csv_row *row)
{
    for (size_t i = 0; i < row->count && i < t->column_count; i++) {
        const char *cell = t->csv.cells[row->first + i];
        const size_t length = strlen(cell);
        const bool bracketed = length > 2 && cell[0] == '[' && cell[length - 1] == ']';
        (void)snprintf(t->columns[i].unit, sizeof t->columns[i].unit, "%.*s",
                       (int)(bracketed ? length - 2 : length),
                       bracketed ? cell + 1 : cell);
        check_unit(r, t, row->line, &t->columns[i]);
    }
}

static void check_required(kent_reader *r, const kent_rows *t, int line)
{
    size_t count = 0;
    const kent_key *keys = kent_key_group(t->group, &count);
    for (size_t k = 0; k < count; k++) {
        size_t i = 0;
        while (i < t->column_count && t->columns[i].key != &keys[k]) {
            i++;
        }
        if (i < t->column_count || !kent_key_is_required(&keys[k])) continue;
        if (keys[k].value == KENT_VALUE_QUANTITY) {
            complain(r, t, line,
                     "column '%s' is missing (%s); give it the heading '%s [%s]'",
                     keys[k].key, keys[k].says, keys[k].key,
                     usual_unit(r, keys[k].kind));
        } else {
            complain(r, t, line, "column '%s' is missing (%s)", keys[k].key,
                     keys[k].says);
        }
    }
}

/* ---- cells ----------------------------------------------------------------------- */

/* What people put between thousands, other than commas and points. */
static size_t thousands_mark(const char *p)
{
    static const char *const MARKS[] = {" ",
                                        "'",
                                        "_",
                                        "\xC2\xA0",
                                        "\xE2\x80\x87",
                                        "\xE2\x80\xAF",
                                        "\xE2\x80\x89",
                                        "\xE2\x80\x99"};
    for (size_t i = 0; i < sizeof MARKS / sizeof MARKS[0]; i++) {
        const size_t n = strlen(MARKS[i]);
        if (strncmp(p, MARKS[i], n) == 0) return n;
    }
    return 0;
}

static bool is_digit(char c) { return c >= '0' && c <= '9'; }

static bool are_thousands(const char *p) { return strspn(p, "0123456789") == 3; }

/* How a number is written; a decimal comma becomes a point. */
static void check_marks(kent_reader *r, const kent_rows *t, int line,
                        const kent_key *key, char *cell)
{
    char *comma = NULL;
    size_t commas = 0;
    size_t points = 0;
    bool marked = false;
    for (char *p = cell; *p; p++) {
        const size_t mark = p > cell && is_digit(p[-1]) ? thousands_mark(p) : 0;
        marked = marked || (mark > 0 && are_thousands(p + mark));
        if (*p == ',') {
            comma = p;
            commas++;
        }
        points += *p == '.' && is_digit(p[1]);
    }
    if (marked || commas > 1 || points > 1 || (commas > 0 && points > 0)) {
        complain(r, t, line,
                 "%s = \"%.60s\" has marks between thousands; write the number without "
                 "them",
                 key->key, cell);
    } else if (t->style.decimal_comma && points > 0) {
        complain(r, t, line,
                 "%s = \"%.60s\" has a decimal point, and tables.decimal says comma; "
                 "write all of the table in one way",
                 key->key, cell);
    } else if (commas > 0 && !t->style.decimal_comma && are_thousands(comma + 1)) {
        complain(r, t, line,
                 "%s = \"%.60s\" has a comma, between thousands or before decimals; "
                 "write a decimal point, and nothing between thousands",
                 key->key, cell);
    } else if (commas > 0 && !t->style.decimal_comma) {
        complain(
            r, t, line,
            "%s = \"%.60s\" has a comma; write a decimal point, or say in the case "
            "file: tables = { decimal = \"comma\"; separator = \"semicolon\"; }",
            key->key, cell);
    } else if (commas > 0) {
        *comma = '.';
    }
}

static bool is_bare_number(const char *cell)
{
    return cell[0] != '\0' && cell[kent_text_number(cell)] == '\0';
}

static void check_cell(kent_reader *r, const kent_rows *t, int line, const column *c,
                       char *cell)
{
    switch (c->key->value) {
    case KENT_VALUE_QUANTITY:
    case KENT_VALUE_STATION:
        check_marks(r, t, line, c->key, cell);
        if (is_bare_number(cell) && c->unit[0] == '\0') {
            const char *unit = usual_unit(r, kind_of(c->key));
            complain(
                r, t, line,
                "%s = \"%.60s\" has no unit; write it in the heading, as '%s [%s]', "
                "or in the cell, as '%.60s %s'",
                c->key->key, cell, c->key->key, unit, cell, unit);
        }
        return;
    case KENT_VALUE_NUMBER:
    case KENT_VALUE_COUNT:
    case KENT_VALUE_EITHER:
    case KENT_VALUE_TURN:
        check_marks(r, t, line, c->key, cell);
        return;
    case KENT_VALUE_LIST:
        if (strpbrk(cell, ",;")) {
            complain(r, t, line,
                     "%s = \"%.60s\": the ids of a route are separated by spaces",
                     c->key->key, cell);
        }
        return;
    case KENT_VALUE_SWITCH:
    case KENT_VALUE_TEXT:
    case KENT_VALUE_ID:
    case KENT_VALUE_REF:
    case KENT_VALUE_WORD:
    case KENT_VALUE_GROUP:
    case KENT_VALUE_VECTOR:
        return;
    }
}

static void check_row(kent_reader *r, const kent_rows *t, const kent_csv_row *row)
{
    size_t count = row->count;
    while (count > t->column_count && t->csv.cells[row->first + count - 1][0] == '\0') {
        count--; /* spreadsheets end rows in such cells */
    }
    if (count != t->column_count) {
        complain(
            r, t, row->line,
            "the row has %zu cell%s and the table %zu heading%s; leave no cell out, "
            "and write a cell that holds the separator in quotes",
            count, count == 1 ? "" : "s", t->column_count,
            t->column_count == 1 ? "" : "s");
        return;
    }
    for (size_t i = 0; i < count; i++) {
        check_cell(r, t, row->line, &t->columns[i], t->csv.cells[row->first + i]);
    }
}

/* ---- a table --------------------------------------------------------------------- */

static kent_status read_headings(kent_reader *r, kent_rows *t, kent_error *err)
{
    const kent_csv *csv = &t->csv;
    if (csv->row_count == 0) {
        complain(r, t, 1, "the table is empty; its first row holds the headings");
        return KENT_E_INPUT;
    }
    const kent_csv_row *head = &csv->rows[0];
    size_t count = head->count;
    while (csv->cells[head->first + count - 1][0] == '\0') {
        count--; /* no row is all empty */
    }
    t->column_count = count;
    t->columns = kent_alloc(count, sizeof *t->columns);
    t->members = kent_alloc(count, sizeof *t->members);
    if (!t->columns || !t->members) return kent_error_nomem(err);
    for (size_t i = 0; i < count; i++) {
        read_heading(r, t, head->line, i, csv->cells[head->first + i]);
    }
    return KENT_OK;
}

static kent_status read_all(kent_reader *r, kent_rows *t, kent_error *err)
{
    const size_t before = r->complaints->count;
    kent_status status = read_headings(r, t, err);
    if (status != KENT_OK) return status;
    if (r->failed) return kent_error_nomem(err);
    if (r->complaints->count > before) return KENT_E_INPUT;
    check_required(r, t, t->csv.rows[0].line);
    t->first = 1;
    if (t->csv.row_count > 1 && is_unit_row(t, &t->csv.rows[1])) {
        read_unit_row(r, t, &t->csv.rows[1]);
        t->first = 2;
        if (r->failed) return kent_error_nomem(err);
        if (r->complaints->count > before) return KENT_E_INPUT;
    }
    if (t->csv.row_count == t->first) {
        complain(r, t, t->csv.rows[0].line, "the table has headings and no rows");
    }
    for (size_t i = t->first; i < t->csv.row_count; i++) {
        check_row(r, t, &t->csv.rows[i]);
    }
    return r->complaints->count > before ? KENT_E_INPUT : KENT_OK;
}

kent_status kent_rows_read(kent_reader *r, const char *name, const char *says,
                           kent_place at, const char *group, kent_rows_style style,
                           kent_rows **out, kent_error *err)
{
    kent_file_bytes source = {0};
    kent_rows *t = kent_alloc(1, sizeof *t);
    if (!t) return kent_error_nomem(err);
    kent_status status = kent_files_beside(kent_tree_files(r->tree), name, says, at,
                                           true, &source, r->complaints, err);
    if (status != KENT_OK) goto done;
    t->file = source.file;
    t->group = group;
    t->style = style;
    status = kent_csv_read(&source, kent_tree_file(r->tree, (size_t)source.file),
                           style.separator, &t->csv, r->complaints, err);
    if (status == KENT_OK) status = read_all(r, t, err);
    if (status != KENT_OK) goto done;
    *out = t;
    t = NULL;
done:
    free(source.bytes);
    kent_rows_free(t);
    return status;
}

size_t kent_rows_count(const kent_rows *rows)
{
    return rows ? rows->csv.row_count - rows->first : 0;
}

void kent_rows_free(kent_rows *rows)
{
    if (!rows) return;
    kent_csv_clear(&rows->csv);
    free(rows->columns);
    free(rows->members);
    free(rows->route);
    free(rows->stops);
    free(rows);
}

/* ---- a row ----------------------------------------------------------------------- */

/* A number with the heading's unit; what has its own stays as it is. */
static void take_quantity(column *c, const char *cell, kent_twig *twig)
{
    twig->type = KENT_TWIG_TEXT;
    twig->text = cell;
    if (!is_bare_number(cell) || strlen(cell) > NUMBER_MOST) return;
    (void)snprintf(c->value, sizeof c->value, "%s %s", cell, c->unit);
    twig->text = c->value;
}

/* What is no number stays a text, which the record reader refuses. */
static void take_number(kent_reader *r, const char *cell, kent_twig *twig)
{
    kent_error err = {0};
    twig->type = KENT_TWIG_TEXT;
    twig->text = cell;
    if (!is_bare_number(cell)) return;
    const kent_status status =
        kent_units_read(r->units, cell, KENT_RATIO, &twig->number, &err);
    if (status == KENT_E_NOMEM) r->failed = true;
    if (status != KENT_OK) return;
    twig->type = strpbrk(cell, ".eE") ? KENT_TWIG_NUMBER : KENT_TWIG_WHOLE;
}

static void take_switch(const char *cell, kent_twig *twig)
{
    const bool yes = strcasecmp(cell, "true") == 0;
    const bool known = yes || strcasecmp(cell, "false") == 0;
    twig->type = known ? KENT_TWIG_SWITCH : KENT_TWIG_TEXT;
    twig->text = cell;
    twig->number = yes ? 1.0 : 0.0;
}

/* The ids of a route; false: no memory. */
static bool take_route(kent_rows *t, const char *cell, kent_twig *twig)
{
    const size_t size = strlen(cell) + 1;
    if (kent_grow((void **)&t->route, &t->route_capacity, size, 1) != 0 ||
        kent_grow((void **)&t->stops, &t->stop_capacity, size / 2 + 1,
                  sizeof *t->stops) != 0) {
        return false;
    }
    memcpy(t->route, cell, size);
    twig->type = KENT_TWIG_LIST;
    twig->children = t->stops;
    char *rest = t->route;
    for (const char *id; (id = strtok_r(rest, " \t\n", &rest)) != NULL;) {
        t->stops[twig->count++] = (kent_twig){
            .type = KENT_TWIG_TEXT, .place = twig->place, .name = "", .text = id};
    }
    return true;
}

static bool take_cell(kent_reader *r, kent_rows *t, column *c, const char *cell,
                      kent_twig *twig)
{
    *twig = (kent_twig){.type = KENT_TWIG_TEXT,
                        .place = t->row.place,
                        .name = c->key->key,
                        .text = cell,
                        .number = NAN};
    switch (c->key->value) {
    case KENT_VALUE_QUANTITY:
    case KENT_VALUE_STATION:
        take_quantity(c, cell, twig);
        return true;
    case KENT_VALUE_EITHER:
        if (c->unit[0] != '\0') {
            take_quantity(c, cell, twig);
        } else {
            take_number(r, cell, twig);
        }
        return true;
    case KENT_VALUE_NUMBER:
    case KENT_VALUE_COUNT:
        take_number(r, cell, twig);
        return true;
    case KENT_VALUE_SWITCH:
        take_switch(cell, twig);
        return true;
    case KENT_VALUE_LIST:
        return take_route(t, cell, twig);
    case KENT_VALUE_TEXT:
    case KENT_VALUE_ID:
    case KENT_VALUE_REF:
    case KENT_VALUE_WORD:
    case KENT_VALUE_TURN:
    case KENT_VALUE_GROUP:
    case KENT_VALUE_VECTOR:
        return true;
    }
    return true;
}

const kent_twig *kent_rows_group(kent_reader *r, kent_rows *rows, size_t index)
{
    const kent_csv_row *row = &rows->csv.rows[rows->first + index];
    rows->row = (kent_twig){.type = KENT_TWIG_GROUP,
                            .place = {rows->file, row->line},
                            .name = "",
                            .number = NAN,
                            .children = rows->members};
    for (size_t i = 0; i < rows->column_count; i++) {
        const char *cell = rows->csv.cells[row->first + i];
        if (cell[0] == '\0') continue;
        if (!take_cell(r, rows, &rows->columns[i], cell,
                       &rows->members[rows->row.count++])) {
            return NULL;
        }
    }
    return &rows->row;
}
