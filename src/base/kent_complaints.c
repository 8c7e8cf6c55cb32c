#include "kent_complaints.h"

#include "kent_text.h"

#include <stdarg.h>
#include <stdio.h>
#include <string.h>

/* A message is one line of UTF-8, whatever words of a file it repeats: control
 * characters become '?', and a letter cut in two is left out. */
static void make_plain(char *text)
{
    size_t to = 0;
    for (size_t i = 0, n; text[i] != '\0'; i += n) {
        const unsigned char c = (unsigned char)text[i];
        n = kent_text_sequence(text + i);
        if (n == 1 && (c < 0x20 || c == 0x7F)) text[i] = '?';
        memmove(text + to, text + i, n);
        to += n;
        if (n == 0) n = 1;
    }
    text[to] = '\0';
}

void kent_complain(kent_complaints *c, const char *file, int line, const char *fmt, ...)
{
    if (c->count < KENT_COMPLAINTS_KEPT) {
        kent_complaint *one = &c->kept[c->count];
        va_list args;
        va_start(args, fmt);
        (void)snprintf(one->file, sizeof one->file, "%s", file ? file : "");
        one->line = line;
        (void)vsnprintf(one->what, sizeof one->what, fmt, args);
        va_end(args);
        make_plain(one->what);
    }
    c->count++;
}

void kent_complaints_sort(kent_complaints *c)
{
    const size_t kept =
        c->count < KENT_COMPLAINTS_KEPT ? c->count : KENT_COMPLAINTS_KEPT;
    size_t rank[KENT_COMPLAINTS_KEPT] = {0}; /* of its file: where that was first met */

    for (size_t i = 0; i < kept; i++) {
        size_t first = 0;
        while (strcmp(c->kept[first].file, c->kept[i].file) != 0) {
            first++;
        }
        rank[i] = first;
    }
    /* Insertion sort: short, and equal lines keep their order. */
    for (size_t i = 1; i < kept; i++) {
        const kent_complaint one = c->kept[i];
        const size_t one_rank = rank[i];
        size_t j = i;
        while (j > 0 && (rank[j - 1] > one_rank ||
                         (rank[j - 1] == one_rank && c->kept[j - 1].line > one.line))) {
            c->kept[j] = c->kept[j - 1];
            rank[j] = rank[j - 1];
            j--;
        }
        c->kept[j] = one;
        rank[j] = one_rank;
    }
}
