#include "kent_csv.h"

#include <csv.h>
#include <stdlib.h>
#include <string.h>

typedef struct parsing {
    kent_csv *out;
    kent_csv_row row; /* the one being read */
    bool open;        /* it has begun and not ended */
    bool failed;      /* out of memory */
} parsing;

static void take_cell(void *bytes, size_t size, void *context)
{
    parsing *p = context;
    kent_csv *c = p->out;
    if (kent_grow((void **)&c->cells, &c->cell_capacity, c->cell_count + 1,
                  sizeof *c->cells) != 0) {
        p->failed = true;
        return;
    }
    char *text = c->texts + c->text_size;
    if (size > 0) memcpy(text, bytes, size);
    text[size] = '\0';
    c->text_size += size + 1;
    c->cells[c->cell_count++] = text;
}

static void end_row(int end, void *context)
{
    parsing *p = context;
    kent_csv *c = p->out;
    bool empty = true;
    (void)end;
    p->open = false;
    for (size_t i = p->row.first; i < c->cell_count; i++) {
        empty = empty && c->cells[i][0] == '\0';
    }
    p->row.count = c->cell_count - p->row.first;
    if (empty) { /* spreadsheets end in such rows */
        c->cell_count = p->row.first;
    } else if (kent_grow((void **)&c->rows, &c->row_capacity, c->row_count + 1,
                         sizeof *c->rows) != 0) {
        p->failed = true;
    } else {
        c->rows[c->row_count++] = p->row;
    }
}

/* Line by line, so that each row knows where it starts. False: a quote is wrong. */
static bool parse(struct csv_parser *csv, const kent_file_bytes *source, char separator,
                  parsing *p)
{
    const char *const blank = separator == '\t' ? " " : " \t";
    int line = 1;
    for (size_t at = 0; at < source->size && !p->failed; line++) {
        const char *start = source->bytes + at;
        const size_t length = strcspn(start, "\n");
        const size_t whole = at + length < source->size ? length + 1 : length;
        at += whole;
        if (!p->open) {
            if (strspn(start, blank) >= length) continue;
            p->row = (kent_csv_row){.line = line, .first = p->out->cell_count};
            p->open = true;
        }
        if (csv_parse(csv, start, whole, take_cell, end_row, p) != whole) return false;
    }
    return p->failed || csv_fini(csv, take_cell, end_row, p) == 0;
}

kent_status kent_csv_read(const kent_file_bytes *source, const char *name,
                          char separator, kent_csv *out, kent_complaints *complaints,
                          kent_error *err)
{
    struct csv_parser csv;
    parsing p = {.out = out};
    kent_status status = KENT_OK;
    if (csv_init(&csv, CSV_STRICT | CSV_STRICT_FINI) != 0) return kent_error_nomem(err);
    csv_set_delim(&csv, (unsigned char)separator);
    out->texts = kent_alloc(source->size + 2, 1); /* each cell ends in one byte more */
    if (!out->texts) {
        status = kent_error_nomem(err);
        goto done;
    }
    const bool sound = parse(&csv, source, separator, &p);
    if (p.failed || (!sound && csv_error(&csv) != CSV_EPARSE)) {
        status = kent_error_nomem(err);
    } else if (!sound) {
        kent_complain(
            complaints, name, p.row.line,
            "a quote \" in the row that starts here is never closed or stands "
            "within a cell; a cell with a quote in it is written in quotes, "
            "the quote in it twice, as \"6\"\" main\"");
        status = KENT_E_INPUT;
    }
done:
    csv_free(&csv);
    return status;
}

void kent_csv_clear(kent_csv *c)
{
    free(c->rows);
    free(c->cells);
    free(c->texts);
    *c = (kent_csv){0};
}
