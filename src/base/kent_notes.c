#include "kent_notes.h"

#include "kent_alloc.h"

#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static bool stands_already(const kent_notes *n, const char *text)
{
    for (size_t i = 0; i < n->count; i++) {
        if (strcmp(n->text[i], text) == 0) return true;
    }
    return false;
}

void kent_notes_add(kent_notes *n, const char *fmt, ...)
{
    char *text = NULL;
    void *array = n->text;
    va_list measure, args;

    va_start(args, fmt);
    va_copy(measure, args);
    const int length = vsnprintf(NULL, 0, fmt, measure);
    va_end(measure);
    if (length < 0) goto lost;
    text = kent_alloc((size_t)length + 1, 1);
    if (!text) goto lost;
    (void)vsnprintf(text, (size_t)length + 1, fmt, args);

    if (stands_already(n, text)) goto done;
    if (kent_grow(&array, &n->capacity, n->count + 1, sizeof *n->text) != 0) goto lost;
    n->text = array;
    n->text[n->count++] = text;
    text = NULL; /* handed over */
    goto done;
lost:
    n->failed = true;
done:
    va_end(args);
    free(text);
}

void kent_notes_clear(kent_notes *n)
{
    for (size_t i = 0; i < n->count; i++) {
        free(n->text[i]);
    }
    free(n->text);
    *n = (kent_notes){0};
}
