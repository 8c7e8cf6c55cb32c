#include "kent_worked.h"

#include "kent_arith.h"
#include "kent_check.h"

#include <ctype.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { SYMBOLS = 512, LONG = 4096 };

/* A line put together again: "SYMBOL = ... = ...". */
typedef struct worked_line {
    char text[LONG];
} worked_line;

typedef struct worked_symbol {
    char name[32];
    char digits[64]; /* as a term of a formula shows it */
} worked_symbol;

typedef struct worked {
    worked_symbol symbols[SYMBOLS];
    size_t symbol_count;
    size_t computed;
} worked;

static bool starts(const char *s, const char *with)
{
    return strncmp(s, with, strlen(with)) == 0;
}

/* Whether a line of text begins one of a derivation: two blanks, a symbol, " = ". */
static bool begins(const char *s)
{
    if (!starts(s, "  ") || !isalpha((unsigned char)s[2])) return false;
    s += 2;
    while (isalnum((unsigned char)*s) || *s == '_' || *s == '\'') {
        s++;
    }
    return starts(s, " = ");
}

static void add(worked_line *line, const char *s, size_t length)
{
    const size_t used = strlen(line->text);
    assert_true(used + length < sizeof line->text);
    memcpy(line->text + used, s, length);
    line->text[used + length] = '\0';
}

/* The line at s with what goes on below it; returns where the next one starts. */
static const char *take(const char *s, worked_line *line)
{
    line->text[0] = '\0';
    size_t length = strcspn(s, "\n");
    add(line, s + 2, length - 2);
    for (s += length; *s == '\n'; s += length) {
        s++;
        length = strcspn(s, "\n");
        if (starts(s, "        ")) {
            add(line, s + 8, length - 8);
        } else if (starts(s, "      = ")) {
            add(line, " ", 1);
            add(line, s + 6, length - 6);
        } else if (!starts(s, "      ")) {
            break;
        } /* else: words only */
    }
    return s;
}

/* Cuts at " = "; returns the number of parts. */
static size_t split(char *s, char *parts[4])
{
    size_t count = 0;
    while (s && count < 4) {
        parts[count++] = s;
        s = strstr(s, " = ");
        if (!s) break;
        *s = '\0';
        s += 3;
    }
    return count;
}

/* The value without words and equation: three blanks end it. */
static void cut_words(char *value)
{
    char *end = strstr(value, "   ");
    if (end) *end = '\0';
}

static void remember(worked *w, const char *name, const char *value)
{
    assert_true(w->symbol_count < SYMBOLS);
    worked_symbol *s = &w->symbols[w->symbol_count++];
    const size_t digits = strcspn(value, " ");
    const bool angle = strcmp(value + digits, " deg") == 0;
    (void)snprintf(s->name, sizeof s->name, "%s", name);
    (void)snprintf(s->digits, sizeof s->digits, value[0] == '-' ? "(%.*s%s)" : "%.*s%s",
                   (int)digits, value, angle ? "deg" : "");
}

/* The formula with the digits of the lines above in place of its symbols. */
static void put_in(const worked *w, const char *formula, worked_line *out)
{
    out->text[0] = '\0';
    while (*formula != '\0') {
        size_t length = 1;
        const char *piece = formula;
        if (isdigit((unsigned char)*formula)) { /* 1e-6 is one number */
            length = strspn(formula, "0123456789.");
            if (formula[length] == 'e') {
                length += 1 + strspn(formula + length + 1, "+-0123456789");
            }
        } else if (isalpha((unsigned char)*formula)) {
            while (isalnum((unsigned char)formula[length]) || formula[length] == '_' ||
                   formula[length] == '\'') {
                length++;
            }
            for (size_t i = w->symbol_count; i-- > 0;) {
                const worked_symbol *s = &w->symbols[i];
                if (strlen(s->name) != length || !starts(formula, s->name)) continue;
                piece = s->digits;
                break;
            }
        }
        add(out, piece, piece == formula ? length : strlen(piece));
        formula += length;
    }
}

static void check(worked *w, const char *symbol, const char *formula,
                  const char *numbers, const char *value)
{
    char error[256] = "";
    worked_line expected;
    put_in(w, formula, &expected);
    if (strcmp(expected.text, numbers) != 0) {
        fail_msg("%s = %s: printed %s, the lines above give %s", symbol, formula,
                 numbers, expected.text);
    }
    if (!kent_arith_agrees(numbers, value, error, sizeof error)) {
        fail_msg("%s = %s = %s = %s: %s", symbol, formula, numbers, value, error);
    }
    w->computed++;
}

size_t kent_worked_check(const char *text)
{
    worked *w = calloc(1, sizeof *w);
    assert_non_null(w);
    for (const char *s = text; *s != '\0';) {
        worked_line line;
        char *parts[4];
        if (!begins(s)) {
            s += strcspn(s, "\n");
            s += *s == '\n';
            continue;
        }
        s = take(s, &line);
        const size_t count = split(line.text, parts);
        if (count != 2 && count != 4) fail_msg("'%s' is no regular line", parts[0]);
        cut_words(parts[count - 1]);
        if (count == 4) check(w, parts[0], parts[1], parts[2], parts[3]);
        remember(w, parts[0], parts[count - 1]);
    }
    const size_t computed = w->computed;
    free(w);
    return computed;
}
