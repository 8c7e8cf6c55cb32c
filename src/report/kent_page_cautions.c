/* Cautions under the table of fittings: what is unsafe as it stands first, and such as
 * differ in figures and quoted names alone as one. */
#include "kent_page.h"

#include <stdlib.h>
#include <string.h>

enum {
    SLOTS = 8,  /* figures and names of one caution that may differ; the rest is text */
    NAMED = 8,  /* fittings named */
    LISTED = 6, /* names that one slot lists */
    OF_CASE = -1 /* no fitting's */
};

/* A figure, a quoted name or a scenario within a caution. */
typedef struct slot {
    size_t at, length; /* bytes */
    bool name;
    double value;
} slot;

typedef struct caution {
    const char *text; /* borrowed */
    char *pattern;    /* the text without what is in its slots; owned */
    int fitting;      /* OF_CASE */
    bool grave;
    size_t order;
} caution;

/* Alike ones, neighbours among the sorted. */
typedef struct alike {
    size_t first, count, order;
    bool grave, of_case;
} alike;

/* ---- what may differ ------------------------------------------------------------- */

static bool ends_word(const char *s)
{
    return *s == '\0' || strchr(" ),;:%", *s) || strncmp(s, "°", strlen("°")) == 0 ||
           (*s == '.' && (s[1] == '\0' || s[1] == ' '));
}

/* A quoted name at s, with its quotes; 0: none. */
static size_t name_length(const char *s)
{
    if (*s != '\'' && *s != '"') return 0;
    for (const char *end = s + 1; *end != '\0'; end++) {
        if (*end == *s && ends_word(end + 1)) return (size_t)(end + 1 - s);
    }
    return 0;
}

static size_t figure_length(const char *s)
{
    size_t length = kent_text_number(s);
    if (length > 0 && s[length - 1] == '.') length--; /* the end of a sentence */
    return length > 0 && ends_word(s + length) ? length : 0;
}

/* "(full)" behind a scenario's id: of one of the model's states; else 0. */
static size_t state_length(const kent_model *m, const char *s)
{
    for (size_t i = 0; i < m->state_count && strncmp(s, " (", 2) == 0; i++) {
        const size_t length = strlen(m->states[i].id);
        if (strncmp(s + 2, m->states[i].id, length) == 0 && s[2 + length] == ')') {
            return length + 3;
        }
    }
    return 0;
}

/* A scenario as it is printed, without quotes. */
static size_t scenario_length(const kent_model *m, const char *s)
{
    size_t longest = 0;
    for (size_t i = 0; i < m->scenario_count; i++) {
        size_t length = strlen(m->scenarios[i].id);
        if (strncmp(s, m->scenarios[i].id, length) != 0) continue;
        length += state_length(m, s + length);
        if (length > longest && ends_word(s + length)) longest = length;
    }
    return longest;
}

/* names_only: cautions of the case are told apart by their figures. */
static size_t find_slots(const kent_model *m, const char *text, bool names_only,
                         slot slots[SLOTS])
{
    size_t count = 0;
    for (size_t i = 0; text[i] != '\0' && count < SLOTS; i++) {
        if (i > 0 && text[i - 1] != ' ' && text[i - 1] != '(') continue;
        const size_t quoted = name_length(text + i);
        const size_t name = quoted > 0 ? quoted : scenario_length(m, text + i);
        const size_t figure = name > 0 || names_only ? 0 : figure_length(text + i);
        if (name + figure == 0) continue;
        slots[count++] = (slot){i, name + figure, name > 0,
                                figure > 0 ? strtod(text + i, NULL) : 0.0};
        i += name + figure - 1;
    }
    return count;
}

/* NULL: no memory. */
static char *pattern_of(const kent_model *m, const char *text, bool names_only)
{
    slot slots[SLOTS];
    const size_t count = find_slots(m, text, names_only, slots);
    char *pattern = kent_alloc(strlen(text) + 1, 1);
    size_t from = 0, to = 0;
    if (!pattern) return NULL;
    for (size_t i = 0; i <= count; i++) {
        const size_t end = i < count ? slots[i].at : strlen(text);
        memcpy(pattern + to, text + from, end - from);
        to += end - from;
        if (i == count) break;
        pattern[to++] = slots[i].name ? '\1' : '\2'; /* a slot is a byte at least */
        from = end + slots[i].length;
    }
    return pattern;
}

/* ---- gathering ------------------------------------------------------------------- */

static size_t count_all(const kent_page *page)
{
    size_t count = page->results->cautions.count;
    for (size_t i = 0; i < page->listing.count; i++) {
        const size_t f = page->listing.fitting[i];
        count += page->results->restraints->fittings[f].cautions.count;
    }
    return count;
}

static bool take(const kent_model *m, const kent_notes *notes, int fitting,
                 caution *all, size_t *count)
{
    for (size_t i = 0; i < notes->count; i++) {
        char *pattern = pattern_of(m, notes->text[i], fitting == OF_CASE);
        if (!pattern) return false;
        all[*count] =
            (caution){notes->text[i], pattern, fitting, notes->grave[i], *count};
        (*count)++;
    }
    return true;
}

/* Of the case first; those of fittings with a letter stand there. */
static bool take_all(const kent_page *page, caution *all, size_t *count)
{
    bool ok = take(page->model, &page->results->cautions, OF_CASE, all, count);
    for (size_t i = 0; ok && i < page->listing.count; i++) {
        const size_t f = page->listing.fitting[i];
        if (page->letter[f][0] != '\0') continue;
        ok = take(page->model, &page->results->restraints->fittings[f].cautions, (int)f,
                  all, count);
    }
    return ok;
}

static int by_pattern(const void *left, const void *right)
{
    const caution *a = left, *b = right;
    const bool a_case = a->fitting == OF_CASE, b_case = b->fitting == OF_CASE;
    if (a_case != b_case) return a_case ? -1 : 1;
    const int way = strcmp(a->pattern, b->pattern);
    if (way != 0) return way;
    return (a->order > b->order) - (a->order < b->order);
}

static bool is_alike(const caution *a, const caution *b)
{
    return (a->fitting == OF_CASE) == (b->fitting == OF_CASE) &&
           strcmp(a->pattern, b->pattern) == 0;
}

static size_t gather(const caution *all, size_t count, alike *groups)
{
    size_t groups_count = 0;
    for (size_t i = 0; i < count; i++) {
        if (i == 0 || !is_alike(&all[i - 1], &all[i])) {
            groups[groups_count++] = (alike){.first = i,
                                             .order = all[i].order,
                                             .of_case = all[i].fitting == OF_CASE};
        }
        alike *g = &groups[groups_count - 1];
        g->count++;
        g->grave |= all[i].grave;
    }
    return groups_count;
}

/* The gravest first, of them what holds of the whole case; what weighs less of a
 * fitting before what holds of all. */
static int by_weight(const void *left, const void *right)
{
    const alike *a = left, *b = right;
    if (a->grave != b->grave) return a->grave ? -1 : 1;
    if (a->of_case != b->of_case) return a->of_case == a->grave ? -1 : 1;
    return (a->order > b->order) - (a->order < b->order);
}

/* ---- saying ---------------------------------------------------------------------- */

static void add_names(const kent_page *page, const caution *some, size_t count,
                      kent_text *words)
{
    const size_t most = page->wide ? count : NAMED;
    size_t named = 0;
    for (size_t i = 0; i < count; i++) {
        if (i > 0 && some[i].fitting == some[i - 1].fitting) continue;
        if (named < most) {
            kent_text_add(words, "%s%s", named > 0 ? ", " : "",
                          page->model->fittings[some[i].fitting].id);
        }
        named++;
    }
    if (named > most) kent_text_add(words, " and %zu more", named - most);
    kent_text_add(words, ": ");
}

static bool same_bytes(const caution *a, slot x, const caution *b, slot y)
{
    return x.length == y.length &&
           memcmp(a->text + x.at, b->text + y.at, x.length) == 0;
}

static slot slot_of(const kent_model *m, const caution *c, size_t which)
{
    slot slots[SLOTS];
    (void)find_slots(m, c->text, c->fitting == OF_CASE, slots);
    return slots[which];
}

/* "'test', 'static'": every name once. */
static void add_listed(const kent_model *m, const caution *some, size_t count,
                       size_t which, kent_text *words)
{
    size_t listed[LISTED] = {0}, names = 0;
    for (size_t i = 0; i < count; i++) {
        const slot here = slot_of(m, &some[i], which);
        bool again = false;
        for (size_t k = 0; k < names; k++) {
            const caution *other = &some[listed[k]];
            again =
                again || same_bytes(&some[i], here, other, slot_of(m, other, which));
        }
        if (again) continue;
        if (names == LISTED) {
            kent_text_add(words, " and more");
            return;
        }
        kent_text_add(words, "%s%.*s", names > 0 ? ", " : "", (int)here.length,
                      some[i].text + here.at);
        listed[names++] = i;
    }
}

/* "11.92 to 14.90" */
static void add_range(const kent_model *m, const caution *some, size_t count,
                      size_t which, kent_text *words)
{
    size_t least = 0, most = 0;
    for (size_t i = 1; i < count; i++) {
        const double value = slot_of(m, &some[i], which).value;
        if (value < slot_of(m, &some[least], which).value) least = i;
        if (value > slot_of(m, &some[most], which).value) most = i;
    }
    const slot low = slot_of(m, &some[least], which),
               high = slot_of(m, &some[most], which);
    kent_text_add(words, "%.*s", (int)low.length, some[least].text + low.at);
    if (same_bytes(&some[least], low, &some[most], high)) return;
    kent_text_add(words, " to %.*s", (int)high.length, some[most].text + high.at);
}

static void print_alike(kent_page *page, const alike *g, const caution *all)
{
    const caution *some = &all[g->first];
    slot slots[SLOTS];
    const size_t count = find_slots(page->model, some->text, g->of_case, slots);
    kent_text words = {0};
    size_t from = 0;
    if (!g->of_case) add_names(page, some, g->count, &words);
    for (size_t i = 0; i < count; i++) {
        kent_text_add(&words, "%.*s", (int)(slots[i].at - from), some->text + from);
        if (slots[i].name) {
            add_listed(page->model, some, g->count, i, &words);
        } else {
            add_range(page->model, some, g->count, i, &words);
        }
        from = slots[i].at + slots[i].length;
    }
    kent_text_add(&words, "%s", some->text + from);
    kent_page_say(page, g->grave ? "!  " : "-  ", &words);
}

void kent_page_cautions(kent_page *page)
{
    const size_t most = count_all(page);
    caution *all = kent_alloc(most, sizeof *all);
    alike *groups = kent_alloc(most, sizeof *groups);
    size_t count = 0, groups_count = 0;
    if (!all || !groups || !take_all(page, all, &count)) {
        page->out->failed = true;
        goto done;
    }
    if (count > 0) qsort(all, count, sizeof *all, by_pattern);
    groups_count = gather(all, count, groups);
    if (groups_count > 0) qsort(groups, groups_count, sizeof *groups, by_weight);
    for (size_t i = 0; i < groups_count; i++) {
        print_alike(page, &groups[i], all);
    }
done:
    for (size_t i = 0; all && i < count; i++) {
        free(all[i].pattern);
    }
    free(groups);
    free(all);
}
