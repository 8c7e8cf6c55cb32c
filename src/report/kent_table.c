#include "kent_table.h"
#include "kent_alloc.h"

#include <assert.h>
#include <stdarg.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { LEAST_ELASTIC = 6 }; /* columns; an elastic column is never cut below */

/* Bytes of the code point that s starts with; a stray byte counts as one. */
static size_t code_point_bytes(const char *s)
{
    const unsigned char lead = (unsigned char)s[0];
    const size_t want = lead < 0xC0 ? 1 : lead < 0xE0 ? 2 : lead < 0xF0 ? 3 : 4;
    for (size_t i = 1; i < want; i++) {
        if (((unsigned char)s[i] & 0xC0) != 0x80) return i;
    }
    return want;
}

/* Bytes of the longest part of s, from its start, that fills at most `columns`. */
static size_t prefix_bytes(const char *s, size_t columns)
{
    size_t bytes = 0, filled = 0;
    while (s[bytes] != '\0') {
        char one[5] = {0};
        const size_t step = code_point_bytes(s + bytes);
        memcpy(one, s + bytes, step);
        filled += kent_text_columns(one);
        if (filled > columns) break;
        bytes += step;
    }
    return bytes;
}

static void hide_controls(char *s)
{
    for (; *s != '\0'; s++) {
        const unsigned char c = (unsigned char)*s;
        if (c < 0x20 || c == 0x7F) *s = '?';
    }
}

/* The formatted text in memory of its own; NULL: no memory. */
__attribute__((format(printf, 1, 0))) static char *format_words(const char *fmt,
                                                                va_list args)
{
    char *words = NULL;
    va_list again;
    va_copy(again, args);
    const int length = vsnprintf(NULL, 0, fmt, args);
    if (length >= 0) words = kent_alloc((size_t)length + 1, 1);
    if (words) (void)vsnprintf(words, (size_t)length + 1, fmt, again);
    va_end(again);
    return words;
}

void kent_table_cell(kent_table *t, const char *fmt, ...)
{
    void *cells = t->cells;
    va_list args;
    va_start(args, fmt);
    char *words = format_words(fmt, args);
    va_end(args);

    if (!words ||
        kent_grow(&cells, &t->capacity, t->cell_count + 1, sizeof *t->cells) != 0) {
        t->failed = true;
        free(words);
        return;
    }
    t->cells = cells;
    hide_controls(words);
    t->cells[t->cell_count++] = words;
}

/* Natural width of every column; NULL: no memory. */
static size_t *widths_of(const kent_table *t)
{
    assert(t->column_count > 0);
    size_t *width = kent_alloc(t->column_count, sizeof *width);
    if (!width) return NULL;
    for (size_t c = 0; c < t->column_count; c++) {
        const size_t head = kent_text_columns(t->columns[c].head);
        const size_t unit = kent_text_columns(t->columns[c].unit);
        width[c] = head > unit ? head : unit;
    }
    for (size_t i = 0, c = 0; i < t->cell_count; i++) {
        const size_t columns = kent_text_columns(t->cells[i]);
        if (columns > width[c]) width[c] = columns;
        c = c + 1 < t->column_count ? c + 1 : 0;
    }
    return width;
}

static size_t total_of(const size_t *width, size_t count, size_t gap)
{
    size_t total = count > 0 ? gap * (count - 1) : 0;
    for (size_t c = 0; c < count; c++) {
        total += width[c];
    }
    return total;
}

size_t kent_table_width(const kent_table *t)
{
    size_t *width = widths_of(t);
    const size_t total = width ? total_of(width, t->column_count, 2) : 0;
    free(width);
    return total;
}

/* Narrows elastic columns, always the widest, until the line fits. Returns whether any
 * had to be. */
static bool narrow(const kent_table *t, size_t *width, size_t gap, size_t limit)
{
    bool cut = false;
    while (total_of(width, t->column_count, gap) > limit) {
        size_t widest = SIZE_MAX;
        for (size_t c = 0; c < t->column_count; c++) {
            if (!t->columns[c].elastic || width[c] <= LEAST_ELASTIC) continue;
            if (widest == SIZE_MAX || width[c] > width[widest]) widest = c;
        }
        if (widest == SIZE_MAX) break; /* nothing left to give */
        width[widest]--;
        cut = true;
    }
    return cut;
}

static void add_blanks(kent_text *line, size_t count)
{
    kent_text_add(line, "%*s", (int)count, "");
}

static void add_cell(kent_text *line, const char *words, size_t width, kent_align align)
{
    const size_t columns = kent_text_columns(words);
    if (columns > width) {
        const size_t bytes = prefix_bytes(words, width - 1);
        kent_text_add(line, "%.*s…", (int)bytes, words);
        return;
    }
    if (align == KENT_ALIGN_RIGHT) add_blanks(line, width - columns);
    kent_text_add(line, "%s", words);
    if (align == KENT_ALIGN_LEFT) add_blanks(line, width - columns);
}

/* The line without blanks at its end. */
static void end_line(kent_text *line, kent_text *out)
{
    size_t length = line->length;
    while (length > 0 && line->s[length - 1] == ' ') {
        length--;
    }
    kent_text_add(out, "%.*s\n", (int)length, kent_text_of(line));
    out->failed = out->failed || line->failed;
    kent_text_reset(line);
}

bool kent_table_print(const kent_table *t, size_t limit, kent_text *out)
{
    bool cut = false, units = false;
    kent_text line = {0};
    size_t gap = 2;
    assert(t->column_count > 0);
    size_t *width = widths_of(t);
    if (!width || t->failed) {
        out->failed = true;
        goto done;
    }
    if (limit > 0 && total_of(width, t->column_count, gap) > limit) gap = 1;
    if (limit > 0) cut = narrow(t, width, gap, limit);

    for (size_t c = 0; c < t->column_count; c++) {
        if (t->columns[c].unit[0] != '\0') units = true;
    }
    for (int row = 0; row < (units ? 2 : 1); row++) {
        for (size_t c = 0; c < t->column_count; c++) {
            const kent_column *column = &t->columns[c];
            if (c > 0) add_blanks(&line, gap);
            add_cell(&line, row == 0 ? column->head : column->unit, width[c],
                     column->align);
        }
        end_line(&line, out);
    }
    size_t c = 0;
    for (size_t i = 0; i < t->cell_count; i++) {
        if (c > 0) add_blanks(&line, gap);
        add_cell(&line, t->cells[i], width[c], t->columns[c].align);
        if (++c < t->column_count) continue;
        end_line(&line, out);
        c = 0;
    }
done:
    kent_text_clear(&line);
    free(width);
    return cut;
}

void kent_table_clear(kent_table *t)
{
    for (size_t i = 0; i < t->cell_count; i++) {
        free(t->cells[i]);
    }
    free(t->cells);
    *t = (kent_table){.columns = t->columns, .column_count = t->column_count};
}

/* Whether a line may end at this blank: a number keeps the unit behind it. */
static bool may_break(const char *s, size_t blank)
{
    return blank > 0 && s[blank] == ' ' &&
           !(s[blank - 1] >= '0' && s[blank - 1] <= '9');
}

/* Bytes of s to put on a line of `room` columns: to the last blank that fits and may
 * end a line, else to the last that fits, else as much of a long word as does. */
static size_t line_bytes(const char *s, size_t room)
{
    const size_t fits = prefix_bytes(s, room);
    size_t blank = fits, any = 0;
    if (s[fits] == '\0') return fits;
    for (; blank > 0; blank--) {
        if (s[blank] != ' ') continue;
        if (may_break(s, blank)) return blank;
        if (any == 0) any = blank;
    }
    return any > 0 ? any : fits > 0 ? fits : code_point_bytes(s);
}

void kent_table_paragraph(kent_text *out, size_t limit, const char *lead,
                          const char *words)
{
    const size_t indent = kent_text_columns(lead);
    const size_t room = limit > indent + 20 ? limit - indent
                        : limit > 0         ? 20
                                            : SIZE_MAX;
    char *copy = kent_copy_text(words);
    if (!copy) {
        out->failed = true;
        return;
    }
    hide_controls(copy);
    kent_text_add(out, "%s", lead);
    for (const char *s = copy; *s != '\0';) {
        const size_t bytes = line_bytes(s, room);
        if (s != copy) add_blanks(out, indent);
        kent_text_add(out, "%.*s\n", (int)bytes, s);
        s += bytes;
        while (*s == ' ') {
            s++;
        }
    }
    if (words[0] == '\0') kent_text_add(out, "\n");
    free(copy);
}
