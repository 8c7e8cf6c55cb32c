#include "kent_steps.h"

#include <stdio.h>
#include <string.h>

enum { VALUE_COLUMN = 30 }; /* what a value is stands from here on */

static const char *source_words(kent_source source)
{
    switch (source) {
    case KENT_GIVEN:
        return "given";
    case KENT_CATALOGUE:
        return "catalogue";
    case KENT_COMPUTED:
        return "computed";
    case KENT_ASSUMED:
        break;
    }
    return "assumed";
}

/* Bytes of arithmetic that fit in room columns, up to a place where it may be broken.
 */
static size_t piece_of(const char *s, size_t room)
{
    const size_t length = strlen(s);
    size_t cut = 0;
    if (length <= room) return length;
    for (size_t i = 1; i < room; i++) {
        const bool power = (s[i] == '+' || s[i] == '-') && s[i - 1] == 'e';
        if (strchr(" +*/", s[i]) && !power) cut = i + 1;
    }
    return cut > 0 ? cut : length; /* nowhere: rather long than broken wrongly */
}

/* Arithmetic after a lead, going on below where it is too long. All of it is ASCII. */
static void add_arithmetic(const char *lead, const char *s, size_t limit,
                           kent_text *out)
{
    size_t used = strlen(lead);
    kent_text_add(out, "%s", lead);
    while (*s != '\0') {
        const size_t room = limit > used + 20 ? limit - used
                            : limit > 0       ? 20
                                              : strlen(s);
        const size_t bytes = piece_of(s, room);
        kent_text_add(out, "%.*s", (int)bytes, s);
        s += bytes;
        used = 8;
        if (*s != '\0') kent_text_add(out, "\n%8s", "");
    }
}

/* Words after a line of so many columns, or below it where they do not fit. */
static void add_words(size_t used, size_t limit, const char *words, kent_text *out)
{
    const bool fits = limit == 0 || used + 3 + kent_text_columns(words) <= limit;
    if (words[0] != '\0') kent_text_add(out, "%s%s", fits ? "   " : "\n      ", words);
    kent_text_add(out, "\n");
}

static void print_input(const kent_line *line, kent_system system, size_t limit,
                        kent_text *out)
{
    char value[64];
    kent_text left = {0}, right = {0};
    kent_line_value(line, system, value, sizeof value);
    kent_text_add(&left, "  %s = %s", line->symbol, value);
    kent_text_add(&right, "%s%s(%s)", line->says, line->says[0] != '\0' ? " " : "",
                  source_words(line->source));
    const size_t columns = kent_text_columns(kent_text_of(&left));
    const size_t pad = columns + 3 < VALUE_COLUMN ? VALUE_COLUMN - 3 - columns : 0;
    const size_t words = kent_text_columns(kent_text_of(&right));
    kent_text_add(out, "%s", kent_text_of(&left));
    if (limit == 0 || columns + pad + 3 + words <= limit) {
        kent_text_add(out, "%*s", (int)pad, "");
    }
    add_words(columns + pad, limit, kent_text_of(&right), out);
    out->failed = out->failed || left.failed || right.failed;
    kent_text_clear(&right);
    kent_text_clear(&left);
}

static void print_computed(const kent_derivation *d, size_t index, kent_system system,
                           size_t limit, kent_text *out)
{
    const kent_line *line = &d->lines[index];
    char numbers[2048], value[64];
    kent_text lead = {0}, tail = {0};
    kent_line_numbers(d, index, system, numbers, sizeof numbers);
    kent_line_value(line, system, value, sizeof value);
    kent_text_add(&lead, "  %s = ", line->symbol);
    kent_text_add(&tail, "= %s", value);
    if (line->equation[0] != '\0') kent_text_add(&tail, "   (eq. %s)", line->equation);

    const size_t end = kent_text_columns(kent_text_of(&tail));
    const size_t columns =
        lead.length + strlen(line->formula) + 3 + strlen(numbers) + 1 + end;
    if (limit == 0 || columns <= limit) {
        kent_text_add(out, "%s%s = %s %s", kent_text_of(&lead), line->formula, numbers,
                      kent_text_of(&tail));
        add_words(columns, limit, line->says, out);
    } else {
        add_arithmetic(kent_text_of(&lead), line->formula, limit, out);
        add_arithmetic("\n      = ", numbers, limit, out);
        kent_text_add(out, "\n      %s", kent_text_of(&tail));
        add_words(6 + end, limit, line->says, out);
    }
    out->failed = out->failed || lead.failed || tail.failed;
    kent_text_clear(&tail);
    kent_text_clear(&lead);
}

void kent_steps_print(const kent_derivation *d, kent_system system, size_t limit,
                      kent_text *out)
{
    for (size_t i = 0; i < d->count; i++) {
        const kent_line *line = &d->lines[i];
        if (line->symbol[0] == '\0') {
            kent_text_add(out, "%s%s\n", i > 0 ? "\n" : "", line->says);
        } else if (line->formula[0] == '\0') {
            print_input(line, system, limit, out);
        } else {
            print_computed(d, i, system, limit, out);
        }
    }
    out->failed = out->failed || d->failed;
}
