/* For tests that walk the key table: the text of a group within its case, and values
 * that a key takes or refuses. */
#ifndef KENT_KEY_TEXT_H
#define KENT_KEY_TEXT_H

#include "case_text.h"

#include <math.h>

/* The key that a group of a case stands under; NULL: the case itself, or no group of
 * it. */
static inline const kent_key *holder_of(const char *group)
{
    for (size_t i = 0; i < KENT_KEY_COUNT; i++) {
        const kent_key *k = &KENT_KEYS[i];
        const bool holds = k->value == KENT_VALUE_LIST || k->value == KENT_VALUE_GROUP;
        if (holds && strcmp(k->words, group) == 0) return k;
    }
    return NULL;
}

static inline bool is_of_a_case(const char *group)
{
    const kent_key *holder = holder_of(group);
    while (holder) {
        group = holder->group;
        holder = holder_of(group);
    }
    return strcmp(group, "case") == 0;
}

static inline int next_line(const kent_text *t)
{
    int line = 1;
    for (const char *p = kent_text_of(t); *p; p++) {
        line += *p == '\n';
    }
    return line;
}

/* Starts a text in which a group of the case is open; what follows it stands in it.
 * Returns the line where the group starts. */
static inline int open_group(kent_text *t, const char *group)
{
    const kent_key *chain[4];
    size_t depth = 0;
    int line = 1;
    for (const kent_key *h = holder_of(group); h; h = holder_of(h->group)) {
        assert_true(depth < 4);
        chain[depth++] = h;
    }
    if (depth > 0) kent_text_add(t, "format = 1;\n");
    while (depth > 0) {
        const kent_key *h = chain[--depth];
        kent_text_add(t, "%s = %s", h->key, h->value == KENT_VALUE_LIST ? "(\n" : "");
        line = next_line(t);
        kent_text_add(t, "{\n");
    }
    return line;
}

static inline void close_group(kent_text *t, const char *group)
{
    for (const kent_key *h = holder_of(group); h; h = holder_of(h->group)) {
        kent_text_add(t, "}%s;\n", h->value == KENT_VALUE_LIST ? " )" : "");
    }
}

/* The text of an SI value of a key, with its unit. */
static inline void value_text(const kent_key *k, double value, char *out, size_t size)
{
    if (k->value == KENT_VALUE_QUANTITY) {
        (void)snprintf(out, size, "\"%.17g %s\"", value, kent_kind_si(k->kind));
    } else if (k->value == KENT_VALUE_COUNT) {
        (void)snprintf(out, size, "%.0f", value);
    } else {
        (void)snprintf(out, size, "%.15f", value);
    }
}

/* The next key from *index on; NULL: no more. */
static inline const kent_key *next_now(size_t *index)
{
    return *index < KENT_KEY_COUNT ? &KENT_KEYS[(*index)++] : NULL;
}

/* A value of a type that the key does not take, and what its message says belongs. */
static inline const char *wrong_type_for(const kent_key *k)
{
    switch (k->value) {
    case KENT_VALUE_QUANTITY:
    case KENT_VALUE_EITHER:
    case KENT_VALUE_NUMBER:
    case KENT_VALUE_COUNT:
    case KENT_VALUE_TEXT:
    case KENT_VALUE_ID:
    case KENT_VALUE_REF:
    case KENT_VALUE_WORD:
    case KENT_VALUE_STATION:
    case KENT_VALUE_TURN:
        return "{ }";
    case KENT_VALUE_SWITCH:
        return "\"yes\"";
    case KENT_VALUE_LIST:
    case KENT_VALUE_GROUP:
        return "\"text\"";
    case KENT_VALUE_VECTOR:
        return "[ 1.0, 0.0 ]";
    }
    return "";
}

#endif
