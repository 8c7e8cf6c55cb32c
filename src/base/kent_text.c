#include "kent_text.h"

#include "kent_alloc.h"

#include <stdarg.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <strings.h>

void kent_text_add(kent_text *t, const char *fmt, ...)
{
    if (t->failed) return; /* no text with a hole in it */

    va_list measure, args;
    va_start(args, fmt);
    va_copy(measure, args);
    const int more = vsnprintf(NULL, 0, fmt, measure);
    va_end(measure);

    void *array = t->s;
    if (more < 0 ||
        kent_grow(&array, &t->capacity, t->length + (size_t)more + 1, 1) != 0) {
        t->failed = true;
    } else {
        t->s = array;
        (void)vsnprintf(t->s + t->length, (size_t)more + 1, fmt, args);
        t->length += (size_t)more;
    }
    va_end(args);
}

const char *kent_text_of(const kent_text *t) { return t->s ? t->s : ""; }

void kent_text_reset(kent_text *t)
{
    t->length = 0;
    t->failed = false;
    if (t->s) t->s[0] = '\0';
}

void kent_text_clear(kent_text *t)
{
    free(t->s);
    *t = (kent_text){0};
}

size_t kent_text_sequence(const char *utf8)
{
    const unsigned char *p = (const unsigned char *)utf8;
    const size_t n = p[0] < 0x80                    ? 1
                     : p[0] >= 0xC2 && p[0] <= 0xDF ? 2
                     : p[0] >= 0xE0 && p[0] <= 0xEF ? 3
                     : p[0] >= 0xF0 && p[0] <= 0xF4 ? 4
                                                    : 0;
    for (size_t i = 1; i < n; i++) { /* stops at a NUL */
        if ((p[i] & 0xC0u) != 0x80u) return 0;
    }
    const bool is_other_spelling =
        (p[0] == 0xE0 && p[1] < 0xA0) || (p[0] == 0xF0 && p[1] < 0x90);
    const bool is_no_letter = (p[0] == 0xED && p[1] > 0x9F) || /* half of a pair */
                              (p[0] == 0xF4 && p[1] > 0x8F);   /* above U+10FFFF */
    return is_other_spelling || is_no_letter ? 0 : n;
}

/* The code point that starts at *s; *s moves behind it. A byte that starts nothing
 * valid stands for itself. */
static unsigned long next_code_point(const unsigned char **s)
{
    const unsigned char *p = *s;
    const size_t n = kent_text_sequence((const char *)p);
    unsigned long point = n > 1 ? p[0] & (0xFFu >> (n + 1)) : p[0];
    for (size_t i = 1; i < n; i++) {
        point = point << 6 | (p[i] & 0x3Fu);
    }
    *s = p + (n > 1 ? n : 1);
    return point;
}

static bool is_combining(unsigned long point)
{
    return (point >= 0x0300 && point <= 0x036F) ||
           (point >= 0x1AB0 && point <= 0x1AFF) ||
           (point >= 0x1DC0 && point <= 0x1DFF) ||
           (point >= 0x20D0 && point <= 0x20FF) || (point >= 0xFE20 && point <= 0xFE2F);
}

size_t kent_text_columns(const char *utf8)
{
    const unsigned char *s = (const unsigned char *)utf8;
    size_t columns = 0;
    while (*s != '\0') {
        if (!is_combining(next_code_point(&s))) columns++;
    }
    return columns;
}

size_t kent_text_number(const char *text)
{
    static const char DIGITS[] = "0123456789";
    size_t n = text[0] == '+' || text[0] == '-' ? 1 : 0;
    const size_t whole = strspn(text + n, DIGITS);
    n += whole;
    size_t part = 0;
    if (text[n] == '.') {
        part = strspn(text + n + 1, DIGITS);
        n += 1 + part;
    }
    if (whole + part == 0) return 0;
    if (text[n] == 'e' || text[n] == 'E') {
        const size_t sign = text[n + 1] == '+' || text[n + 1] == '-' ? 1 : 0;
        const size_t power = strspn(text + n + 1 + sign, DIGITS);
        if (power > 0) n += 1 + sign + power;
    }
    return n;
}

size_t kent_text_distance(const char *a, const char *b)
{
    enum { LONGEST = 128 }; /* names; what lies beyond counts as all different */
    size_t row[LONGEST + 1];
    const size_t a_full = strlen(a), b_full = strlen(b);
    const size_t a_count = a_full < LONGEST ? a_full : LONGEST;
    const size_t b_count = b_full < LONGEST ? b_full : LONGEST;
    const size_t a_beyond = a_full - a_count, b_beyond = b_full - b_count;

    /* Levenshtein's recurrence, one row at a time: row[j] is the distance between
     * the first i letters of a and the first j of b. */
    for (size_t j = 0; j <= b_count; j++) {
        row[j] = j;
    }
    for (size_t i = 1; i <= a_count; i++) {
        size_t diagonal = row[0];
        row[0] = i;
        for (size_t j = 1; j <= b_count; j++) {
            const size_t above = row[j];
            size_t best = diagonal + (a[i - 1] != b[j - 1]);
            if (above + 1 < best) best = above + 1;
            if (row[j - 1] + 1 < best) best = row[j - 1] + 1;
            row[j] = best;
            diagonal = above;
        }
    }
    return row[b_count] + (a_beyond > b_beyond ? a_beyond : b_beyond);
}

size_t kent_text_misspelling(const char *known, const char *word)
{
    const size_t length = strlen(word), other = strlen(known);
    const size_t longest = length > other ? length : other;
    if (strcasecmp(known, word) == 0) return 0;
    const size_t edits = kent_text_distance(known, word);
    return edits < length / 3 + 2 && edits < longest ? edits : SIZE_MAX;
}
