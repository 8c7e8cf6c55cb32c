/* A standard table on paper: what it stands on, thrusts, a table for each soil, and why
 * some cells are empty. */
#include "kent_imprint.h"
#include "kent_page.h"
#include "kent_shown.h"
#include "kent_sink.h"
#include "kent_standard_told.h"
#include "kent_view.h"

#include <ctype.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* What a row of a size shows. */
typedef enum line_kind {
    LINE_THRUST,
    LINE_AREA,
    LINE_BODY,
    LINE_FACE,
    LINE_VOLUME,
    LINE_LENGTH
} line_kind;

/* A sentence about some cells: alike but for the numbers in it. */
typedef struct remark {
    const char *text; /* of the first cell; borrowed */
    size_t soil, size, fitting;
    size_t cells;
    bool differs; /* the numbers of some of the others */
} remark;

typedef struct sheet {
    const kent_standard_result *r;
    const kent_standard *t;
    kent_system units;
    size_t limit; /* columns; 0: none */
    kent_text *out;
    remark *reasons; /* [reason_count] why cells are empty; lettered */
    size_t reason_count, reason_capacity;
    remark *cautions; /* [caution_count] of cells that are sized */
    size_t caution_count, caution_capacity;
    bool failed;
} sheet;

static const kent_standard_cell_result *cell_of(const sheet *s, size_t soil,
                                                size_t size, size_t fitting)
{
    return &s->r->cells[kent_standard_cell_index(s->t, soil, size, fitting)];
}

/* ---- remarks --------------------------------------------------------------------- */

static bool is_of_number(char c) { return isdigit((unsigned char)c) || c == '.'; }

/* Whether two sentences differ in their numbers alone. */
static bool same_words(const char *a, const char *b)
{
    for (;;) {
        while (is_of_number(*a)) {
            a++;
        }
        while (is_of_number(*b)) {
            b++;
        }
        if (*a != *b) return false;
        if (*a == '\0') return true;
        a++;
        b++;
    }
}

/* Adds a remark, or counts the one that says the same of another cell. */
static void remember(sheet *s, remark **list, size_t *count, size_t *capacity,
                     const remark *one)
{
    void *grown = *list;
    for (size_t i = 0; i < *count; i++) {
        remark *r = &(*list)[i];
        if (r->soil != one->soil || !same_words(r->text, one->text)) continue;
        r->cells++;
        r->differs = r->differs || strcmp(r->text, one->text) != 0;
        return;
    }
    if (kent_grow(&grown, capacity, *count + 1, sizeof **list) != 0) {
        s->failed = true;
        return;
    }
    *list = grown;
    (*list)[*count] = *one;
    (*list)[(*count)++].cells = 1;
}

/* "a" .. "z", "aa" ... */
static kent_name letter_of(size_t index)
{
    kent_name name;
    char tens[2] = {0};
    if (index >= 26) tens[0] = (char)('a' + index / 26 - 1);
    (void)snprintf(name.s, sizeof name.s, "%s%c", tens, (char)('a' + index % 26));
    return name;
}

/* The letter of why a cell is empty. */
static kent_name reason_letter(const sheet *s, size_t soil, const char *why)
{
    size_t i = 0;
    while (i < s->reason_count &&
           !(s->reasons[i].soil == soil && same_words(s->reasons[i].text, why))) {
        i++;
    }
    return letter_of(i);
}

/* Whether a caution of a cell says again why it is empty, or is of lengths that nobody
 * asked for. */
static bool is_said(const sheet *s, const kent_standard_cell_result *c,
                    const remark *one, const char *const empty[2])
{
    static const char LENGTH[] = "no restrained length";
    if (s->t->what == KENT_STANDARD_BLOCKS &&
        strncmp(one->text, LENGTH, sizeof LENGTH - 1) == 0) {
        return true;
    }
    const bool first = one->text == c->holding.cautions.text[0];
    return one->text == empty[0] || one->text == empty[1] || (first && empty[0]);
}

/* Sorts what is said of every cell into why it is empty and what else to mind. */
static void gather_remarks(sheet *s)
{
    const size_t sizes = s->t->size_count, fittings = s->t->fitting_count;
    for (size_t i = 0; i < s->r->cell_count; i++) {
        const kent_standard_cell_result *c = &s->r->cells[i];
        const char *empty[] = {kent_standard_no_block(c), kent_standard_no_length(c)};
        remark one = {.soil = i / fittings / sizes,
                      .size = i / fittings % sizes,
                      .fitting = i % fittings};
        for (size_t k = 0; k < 2; k++) {
            one.text = empty[k];
            if (!one.text) continue;
            remember(s, &s->reasons, &s->reason_count, &s->reason_capacity, &one);
        }
        for (size_t k = 0; k < c->holding.cautions.count; k++) {
            one.text = c->holding.cautions.text[k];
            if (is_said(s, c, &one, empty)) continue;
            remember(s, &s->cautions, &s->caution_count, &s->caution_capacity, &one);
        }
    }
}

static void print_remark(const sheet *s, const char *lead, const remark *one)
{
    kent_text words = {0};
    kent_text_add(&words, "%s, %s %s", s->t->soils[one->soil], s->t->sizes[one->size],
                  kent_standard_fitting_name(s->t, one->fitting).s);
    if (one->cells > 1) {
        kent_text_add(&words, " and %zu more%s", one->cells - 1,
                      one->differs ? ", with numbers of their own (--format csv)" : "");
    }
    kent_text_add(&words, ": %s", one->text);
    kent_table_paragraph(s->out, s->limit, lead, kent_text_of(&words));
    s->out->failed = s->out->failed || words.failed;
    kent_text_clear(&words);
}

static void print_remarks(sheet *s)
{
    if (s->reason_count + s->caution_count > 0) kent_text_add(s->out, "\n");
    for (size_t i = 0; i < s->reason_count; i++) {
        char lead[sizeof(kent_name) + 4];
        (void)snprintf(lead, sizeof lead, "%-3s", letter_of(i).s);
        print_remark(s, lead, &s->reasons[i]);
    }
    for (size_t i = 0; i < s->caution_count; i++) {
        print_remark(s, "-  ", &s->cautions[i]);
    }
}

/* ---- cells ----------------------------------------------------------------------- */

static void add_sides(const sheet *s, kent_table *t, const char *mark, double a,
                      double b, double c)
{
    kent_table_cell(t, "%s%s×%s×%s", mark,
                    kent_shown_quantity(KENT_LENGTH, s->units, a).text,
                    kent_shown_quantity(KENT_LENGTH, s->units, b).text,
                    kent_shown_quantity(KENT_LENGTH, s->units, c).text);
}

static void add_quantity(const sheet *s, kent_table *t, kent_kind kind, double si)
{
    kent_table_cell(t, "%s", kent_shown_quantity(kind, s->units, si).text);
}

/* Width, height, thickness; of a weight or a base width, length, height. */
static void add_body(sheet *s, kent_table *t, size_t soil, size_t size, size_t fitting)
{
    const kent_standard_cell_result *c = cell_of(s, soil, size, fitting);
    const kent_block *b = &c->holding.block;
    const char *why = kent_standard_no_block(c);
    if (why) {
        kent_table_cell(t, "%s", reason_letter(s, soil, why).s);
        return;
    }
    switch (b->type) {
    case KENT_BLOCK_NONE:
        kent_table_cell(t, KENT_SHOWN_NONE);
        return;
    case KENT_BLOCK_BEARING:
        add_sides(s, t, "", b->width, b->height, b->thickness);
        return;
    case KENT_BLOCK_GRAVITY:
        add_sides(s, t, "W ", b->width, b->thickness, b->height);
        return;
    case KENT_BLOCK_BASE:
        add_sides(s, t, "B ", b->width, b->height, b->thickness);
        return;
    }
}

static void add_cell(sheet *s, kent_table *t, line_kind line, size_t soil, size_t size,
                     size_t fitting)
{
    const kent_standard_cell_result *c = cell_of(s, soil, size, fitting);
    const kent_holding *h = &c->holding;
    const char *why = NULL;
    switch (line) {
    case LINE_THRUST:
        add_quantity(s, t, KENT_FORCE, c->thrust);
        return;
    case LINE_AREA:
        add_quantity(s, t, KENT_AREA, h->block.bearing_area);
        return;
    case LINE_BODY:
        add_body(s, t, soil, size, fitting);
        return;
    case LINE_FACE:
        if (!h->block.has_face) {
            kent_table_cell(t, KENT_SHOWN_NONE);
            return;
        }
        if (h->block.own_side) {
            kent_table_cell(t, "own side");
            return;
        }
        add_sides(s, t, "", h->block.face.width, h->block.face.height,
                  h->block.face_thickness);
        return;
    case LINE_VOLUME:
        add_quantity(s, t, KENT_VOLUME,
                     c->sized && h->block.type != KENT_BLOCK_NONE
                         ? h->block.volume + h->block.face_volume
                         : (double)NAN);
        return;
    case LINE_LENGTH:
        why = kent_standard_no_length(c);
        if (why) {
            kent_table_cell(t, "%s", reason_letter(s, soil, why).s);
            return;
        }
        add_quantity(s, t, KENT_LENGTH, h->restrained_length);
        return;
    }
}

/* ---- tables ---------------------------------------------------------------------- */

/* What all names of sizes start with, up to a hyphen: it need not stand in every row.
 */
static size_t common_start(const kent_standard *t)
{
    size_t same = strlen(t->sizes[0]), cut = 0;
    for (size_t i = 1; i < t->size_count; i++) {
        size_t k = 0;
        while (k < same && t->sizes[i][k] == t->sizes[0][k]) {
            k++;
        }
        same = k;
    }
    for (size_t k = 0; k < same && t->size_count > 1; k++) {
        if (t->sizes[0][k] == '-') cut = k + 1;
    }
    return cut;
}

static bool has_face(const sheet *s, size_t soil, size_t size)
{
    for (size_t i = 0; i < s->t->fitting_count; i++) {
        const kent_standard_cell_result *c = cell_of(s, soil, size, i);
        if (c->holding.block.has_face) return true;
    }
    return false;
}

static void add_line(sheet *s, kent_table *t, line_kind line, size_t soil, size_t size,
                     size_t first, size_t count)
{
    static const struct {
        const char *word;
        kent_kind kind;
    } LINES[] = {
        [LINE_THRUST] = {"thrust", KENT_FORCE}, [LINE_AREA] = {"area", KENT_AREA},
        [LINE_BODY] = {"block", KENT_LENGTH},   [LINE_FACE] = {"face", KENT_LENGTH},
        [LINE_VOLUME] = {"conc.", KENT_VOLUME}, [LINE_LENGTH] = {"joints", KENT_LENGTH},
    };
    const bool starts = line == LINE_THRUST || line == LINE_AREA ||
                        (line == LINE_LENGTH && s->t->what == KENT_STANDARD_JOINTS);
    kent_table_cell(t, "%s", starts ? s->t->sizes[size] + common_start(s->t) : "");
    kent_table_cell(t, "%s %s", LINES[line].word,
                    kent_shown_unit(LINES[line].kind, s->units).text);
    for (size_t i = 0; i < count; i++) {
        add_cell(s, t, line, soil, size, first + i);
    }
}

static void add_lines(sheet *s, kent_table *t, bool thrusts, size_t soil, size_t first,
                      size_t count)
{
    for (size_t i = 0; i < s->t->size_count; i++) {
        if (thrusts) {
            add_line(s, t, LINE_THRUST, soil, i, first, count);
            continue;
        }
        if (s->t->what != KENT_STANDARD_JOINTS) {
            add_line(s, t, LINE_AREA, soil, i, first, count);
            add_line(s, t, LINE_BODY, soil, i, first, count);
            if (has_face(s, soil, i)) add_line(s, t, LINE_FACE, soil, i, first, count);
            add_line(s, t, LINE_VOLUME, soil, i, first, count);
        }
        if (s->t->what != KENT_STANDARD_BLOCKS) {
            add_line(s, t, LINE_LENGTH, soil, i, first, count);
        }
    }
}

/* As many fittings side by side as a line takes, then the rest below. */
static void print_table(sheet *s, bool thrusts, size_t soil)
{
    kent_name heads[KENT_STANDARD_FITTINGS];
    kent_column columns[KENT_STANDARD_FITTINGS + 2] = {{.head = "size", .unit = ""},
                                                       {.head = "", .unit = ""}};
    for (size_t first = 0; first < s->t->fitting_count;) {
        size_t count = s->t->fitting_count - first;
        for (;; count--) {
            for (size_t i = 0; i < count; i++) {
                heads[i] = kent_standard_fitting_name(s->t, first + i);
                columns[i + 2] = (kent_column){
                    .head = heads[i].s, .unit = "", .align = KENT_ALIGN_RIGHT};
            }
            kent_table t = {.columns = columns, .column_count = count + 2};
            add_lines(s, &t, thrusts, soil, first, count);
            const bool fits =
                s->limit == 0 || count == 1 || kent_table_width(&t) <= s->limit;
            if (fits) {
                if (first > 0) kent_text_add(s->out, "\n");
                (void)kent_table_print(&t, s->limit, s->out);
            }
            kent_table_clear(&t);
            if (fits) break;
        }
        first += count;
    }
}

static void print_soil(sheet *s, size_t soil)
{
    const kent_model *m = cell_of(s, soil, 0, 0)->model;
    const kent_view view = {
        .model = m, .units = s->units, .limit = s->limit, .out = s->out};
    kent_text_add(s->out, "\nIn %s\n", s->t->soils[soil]);
    kent_view_soil(&view, &m->soils[m->ground.soil]);
    print_table(s, false, soil);
}

/* ---- all ------------------------------------------------------------------------- */

static void print_head(sheet *s)
{
    const kent_model *m = s->r->cells[0].model;
    kent_notes notes = {0};
    kent_text words = {0};
    kent_text_add(s->out, "%s\nStandard table: %s\n", m->title,
                  s->t->what == KENT_STANDARD_BLOCKS ? "thrust blocks"
                  : s->t->what == KENT_STANDARD_JOINTS
                      ? "restrained joints"
                      : "thrust blocks, and restrained "
                        "joints in their place");
    kent_imprint_top(m, s->limit, s->out);
    kent_text_add(s->out, "\nIt stands on\n");
    kent_standard_assumptions(s->r, s->units, &notes);
    for (size_t i = 0; i < notes.count; i++) {
        const bool last = i + 1 == notes.count;
        if (!last) {
            kent_table_paragraph(s->out, s->limit, "-  ", notes.text[i]);
            continue;
        }
        kent_text_add(&words, "It %s.", notes.text[i]);
        kent_text_add(s->out, "\n");
        kent_table_paragraph(s->out, s->limit, "", kent_text_of(&words));
    }
    s->failed = s->failed || notes.failed || words.failed;
    kent_text_clear(&words);
    kent_notes_clear(&notes);
}

static void print_key(sheet *s)
{
    if (s->t->what == KENT_STANDARD_JOINTS) return;
    kent_text_add(s->out, "\n");
    kent_table_paragraph(
        s->out, s->limit, "",
        "Area: of the face, or of the base, that is asked for, without what a pipe "
        "passing through takes off. Block: width × height × thickness; W, a weight "
        "that "
        "the fitting is strapped down to, and B, a base under it: width × length × "
        "height, with a face of its own beside it where the thrust also pushes along. "
        "Conc.: concrete of both.");
}

static void print_end(sheet *s)
{
    if (s->t->what != KENT_STANDARD_BLOCKS) {
        kent_table_paragraph(s->out, s->limit, "",
                             "Joints: restrained length on each leg of a bend, behind "
                             "a dead end, on the branch of a tee or wye, on both sides "
                             "of a valve.");
    }
    kent_text_add(s->out, "\n");
    kent_imprint_end(s->r->cells[0].model, s->limit, s->out);
}

kent_status kent_report_standard(const kent_standard_result *r,
                                 const kent_report_options *o, kent_sink sink)
{
    kent_text out = {0};
    sheet s = {.r = r,
               .t = r->table,
               .units = o->units,
               .limit = o->wide ? 0 : KENT_TABLE_LIMIT,
               .out = &out};
    gather_remarks(&s);
    print_head(&s);
    kent_text_add(&out, "\nThrust before any factor\n");
    print_table(&s, true, 0);
    for (size_t i = 0; i < r->table->soil_count; i++) {
        print_soil(&s, i);
    }
    print_key(&s);
    print_remarks(&s);
    print_end(&s);
    out.failed = out.failed || s.failed;
    const kent_status status = kent_sink_flush(sink, &out);
    free(s.reasons);
    free(s.cautions);
    kent_text_clear(&out);
    return status;
}
