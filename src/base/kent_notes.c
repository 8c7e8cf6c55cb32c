#include "kent_notes.h"

#include "kent_alloc.h"

#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* FNV-1a. */
static size_t hash(const char *text)
{
    unsigned long long sum = 14695981039346656037ULL;
    for (const char *p = text; *p; p++) {
        sum = (sum ^ (unsigned char)*p) * 1099511628211ULL;
    }
    return (size_t)sum;
}

/* The slot that holds the text, or the free one where it belongs. */
static size_t *slot_of(const kent_notes *n, const char *text)
{
    size_t at = hash(text) % n->slot_count;
    while (n->slots[at] != 0 && strcmp(n->text[n->slots[at] - 1], text) != 0) {
        at = (at + 1) % n->slot_count;
    }
    return &n->slots[at];
}

/* Keeps at least half of the slots free, so that looking for one is short. */
static int make_room(kent_notes *n)
{
    void *array = n->text;
    if (2 * (n->count + 1) > n->slot_count) {
        const size_t more = n->slot_count ? 2 * n->slot_count : 64;
        size_t *slots = kent_alloc(more, sizeof *slots);
        if (!slots) return -1;
        free(n->slots);
        n->slots = slots;
        n->slot_count = more;
        for (size_t i = 0; i < n->count; i++) {
            *slot_of(n, n->text[i]) = i + 1;
        }
    }
    if (kent_grow(&array, &n->capacity, n->count + 1, sizeof *n->text) != 0) return -1;
    n->text = array;
    array = n->grave;
    if (kent_grow(&array, &n->grave_capacity, n->count + 1, sizeof *n->grave) != 0) {
        return -1;
    }
    n->grave = array;
    return 0;
}

__attribute__((format(printf, 3, 0))) static void
notes_put(kent_notes *n, bool grave, const char *fmt, va_list args)
{
    char *text = NULL;
    va_list measure;

    va_copy(measure, args);
    const int length = vsnprintf(NULL, 0, fmt, measure);
    va_end(measure);
    if (length < 0) goto lost;
    text = kent_alloc((size_t)length + 1, 1);
    if (!text) goto lost;
    (void)vsnprintf(text, (size_t)length + 1, fmt, args);

    if (make_room(n) != 0) goto lost;
    size_t *slot = slot_of(n, text);
    if (*slot != 0) { /* it stands there already */
        n->grave[*slot - 1] |= grave;
        goto done;
    }
    n->grave[n->count] = grave;
    n->text[n->count++] = text;
    *slot = n->count;
    text = NULL; /* handed over */
    goto done;
lost:
    n->failed = true;
done:
    free(text);
}

void kent_notes_add(kent_notes *n, const char *fmt, ...)
{
    va_list args;

    va_start(args, fmt);
    notes_put(n, false, fmt, args);
    va_end(args);
}

void kent_notes_warn(kent_notes *n, const char *fmt, ...)
{
    va_list args;

    va_start(args, fmt);
    notes_put(n, true, fmt, args);
    va_end(args);
}

void kent_notes_clear(kent_notes *n)
{
    for (size_t i = 0; i < n->count; i++) {
        free(n->text[i]);
    }
    free(n->text);
    free(n->grave);
    free(n->slots);
    *n = (kent_notes){0};
}
