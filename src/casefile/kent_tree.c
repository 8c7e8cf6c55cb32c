#include "kent_tree.h"
#include "kent_scan.h"

#include <libconfig.h>
#include <locale.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>

struct kent_tree {
    kent_files files;
    kent_twig *twigs; /* the root first, children of one together */
    char *texts;      /* [text_size] of names and texts, each ending in NUL */
    size_t text_size;
};

static kent_place place_of_line(const kent_scan *scan, int line)
{
    if (line < 1) line = 1;
    if ((size_t)line > scan->line_count) line = (int)scan->line_count;
    return scan->line_count > 0 ? scan->lines[line - 1] : (kent_place){0, 0};
}

/* The start of a line of the joined text. */
static const char *line_text(const kent_scan *scan, int line)
{
    const char *p = scan->text;
    for (int i = 1; i < line && p; i++) {
        p = strchr(p, '\n');
        if (p) p++;
    }
    return p ? p : "";
}

/* The name of the last "name =" of a line that stands there twice, or its only one. */
static const char *repeated_name(const char *line, int *length)
{
    const size_t end = strcspn(line, "\n");
    const char *found = NULL;
    const char *last = NULL;
    size_t last_length = 0;
    size_t names = 0;
    for (size_t i = 0; i < end; i++) {
        const bool starts = (line[i] >= 'a' && line[i] <= 'z') &&
                            (i == 0 || strchr(" \t;,{", line[i - 1]));
        const size_t n = starts ? strspn(line + i, "abcdefghijklmnopqrstuvwxyz_") : 0;
        const size_t after = i + n + strspn(line + i + n, " \t");
        if (n == 0 || line[after] != '=') continue;
        for (const char *q = line; q < line + i; q++) { /* the same one before it */
            const bool same = strncmp(q, line + i, n) == 0 &&
                              (q == line || strchr(" \t;,{", q[-1])) &&
                              strchr(" \t=", q[n]);
            if (!same) continue;
            found = line + i;
            *length = (int)n;
        }
        last = line + i;
        last_length = n;
        names++;
    }
    if (!found && names == 1) {
        found = last;
        *length = (int)last_length;
    }
    return found;
}

/* libconfig's bare reasons in our words. */
static void complain_of_syntax(const kent_files *files, const kent_scan *scan,
                               const config_t *config, kent_complaints *complaints)
{
    const int line = config_error_line(config);
    const kent_place place = place_of_line(scan, line);
    const char *file = files->names[place.file];
    const char *why = config_error_text(config);
    const char *text = line_text(scan, line);
    int length = 0;

    text += strspn(text, " \t");
    if (why && strstr(why, "duplicate")) {
        const char *name = repeated_name(text, &length);
        kent_complain(
            complaints, file, place.line,
            name ? "'%.*s' is given twice in its group; keep one"
                 : "a key of this line is given twice in its group; keep one%.*s",
            name ? length : 0, name ? name : "");
    } else if (why && strstr(why, "mismatched")) {
        kent_complain(complaints, file, place.line,
                      "a list in [ ] mixes kinds of values; use ( ) for that");
    } else {
        length = (int)strcspn(text, "\n");
        kent_complain(complaints, file, place.line,
                      "cannot be read from '%.*s' on; look here and at the line before "
                      "for a missing ',', ';', '=' or value",
                      length < 40 ? length : 40, text);
    }
}

/* ---- from settings to twigs ------------------------------------------------------ */

static size_t child_count(const config_setting_t *setting)
{
    return config_setting_is_aggregate(setting) ? (size_t)config_setting_length(setting)
                                                : 0;
}

static const char *keep_text(kent_tree *t, const char *text)
{
    char *copy = t->texts + t->text_size;
    const size_t size = strlen(text) + 1;
    memcpy(copy, text, size);
    t->text_size += size;
    return copy;
}

static kent_twig_type type_of(const config_setting_t *setting)
{
    switch (config_setting_type(setting)) {
    case CONFIG_TYPE_GROUP:
        return KENT_TWIG_GROUP;
    case CONFIG_TYPE_STRING:
        return KENT_TWIG_TEXT;
    case CONFIG_TYPE_INT:
    case CONFIG_TYPE_INT64:
        return KENT_TWIG_WHOLE;
    case CONFIG_TYPE_FLOAT:
        return KENT_TWIG_NUMBER;
    case CONFIG_TYPE_BOOL:
        return KENT_TWIG_SWITCH;
    default: /* lists, arrays: libconfig's numbers, not an enum of ours */
        return KENT_TWIG_LIST;
    }
}

static double number_of(const config_setting_t *setting)
{
    switch (config_setting_type(setting)) {
    case CONFIG_TYPE_INT:
        return (double)config_setting_get_int(setting);
    case CONFIG_TYPE_INT64:
        return (double)config_setting_get_int64(setting);
    case CONFIG_TYPE_FLOAT:
        return config_setting_get_float(setting);
    case CONFIG_TYPE_BOOL:
        return (double)config_setting_get_bool(setting);
    default:
        return NAN;
    }
}

/* All settings, level by level from the root: the children of one stand together, in
 * the order of their parents. */
typedef struct levels {
    const config_setting_t **settings; /* [count] */
    size_t count, capacity;
    size_t text_size; /* of their names and texts */
} levels;

static kent_status list_levels(const config_setting_t *root, levels *l, kent_error *err)
{
    const config_setting_t *next = root;
    for (size_t parent = 0, child = 0;;) {
        const char *name = config_setting_name(next);
        if (kent_grow((void **)&l->settings, &l->capacity, l->count + 1,
                      sizeof(void *)) != 0) {
            return kent_error_nomem(err);
        }
        l->settings[l->count++] = next;
        l->text_size += name ? strlen(name) + 1 : 0;
        if (config_setting_type(next) == CONFIG_TYPE_STRING) {
            l->text_size += strlen(config_setting_get_string(next)) + 1;
        }
        while (parent < l->count && child == child_count(l->settings[parent])) {
            parent++;
            child = 0;
        }
        if (parent == l->count) return KENT_OK;
        next = config_setting_get_elem(l->settings[parent], (unsigned)child++);
    }
}

static kent_status take_all(kent_tree *t, const kent_scan *scan, const config_t *config,
                            kent_error *err)
{
    levels l = {0};
    kent_status status = list_levels(config_root_setting(config), &l, err);
    if (status != KENT_OK) goto done;
    t->twigs = kent_alloc(l.count, sizeof *t->twigs);
    t->texts = kent_alloc(l.text_size, 1);
    if (!t->twigs || !t->texts) {
        status = kent_error_nomem(err);
        goto done;
    }
    const kent_twig *children = &t->twigs[1];
    for (size_t i = 0; i < l.count; i++) {
        const config_setting_t *s = l.settings[i];
        const char *name = config_setting_name(s);
        t->twigs[i] = (kent_twig){
            .type = type_of(s),
            .place = place_of_line(scan, (int)config_setting_source_line(s)),
            .name = name ? keep_text(t, name) : "",
            .number = number_of(s),
            .children = children,
            .count = child_count(s)};
        if (t->twigs[i].type == KENT_TWIG_TEXT) {
            t->twigs[i].text = keep_text(t, config_setting_get_string(s));
        }
        children += child_count(s);
    }
done:
    free((void *)l.settings);
    return status;
}

kent_status kent_tree_read(const char *path, kent_tree **out,
                           kent_complaints *complaints, kent_error *err)
{
    kent_scan scan = {0};
    config_t config;
    kent_tree *t = kent_alloc(1, sizeof *t);
    if (!t) return kent_error_nomem(err);

    /* Numbers have a decimal point whatever the caller's locale says. */
    const locale_t plain = newlocale(LC_NUMERIC_MASK, "C", (locale_t)0);
    const locale_t before = plain ? uselocale(plain) : (locale_t)0;

    config_init(&config);
    kent_status status = kent_scan_read(path, &t->files, &scan, complaints, err);
    if (status != KENT_OK) goto done;
    if (config_read_string(&config, scan.text) != CONFIG_TRUE) {
        complain_of_syntax(&t->files, &scan, &config, complaints);
        status = KENT_E_INPUT;
        goto done;
    }
    status = take_all(t, &scan, &config, err);
    if (status != KENT_OK) goto done;
    *out = t;
    t = NULL;
done:
    if (plain) {
        (void)uselocale(before);
        freelocale(plain);
    }
    config_destroy(&config);
    kent_scan_clear(&scan);
    kent_tree_free(t);
    return status;
}

void kent_tree_free(kent_tree *t)
{
    if (!t) return;
    kent_files_clear(&t->files);
    free(t->twigs);
    free(t->texts);
    free(t);
}

/* ---- looking at them ------------------------------------------------------------- */

const kent_twig *kent_tree_root(const kent_tree *t) { return &t->twigs[0]; }

kent_files *kent_tree_files(kent_tree *t) { return &t->files; }

size_t kent_tree_file_count(const kent_tree *t) { return t->files.count; }

const char *kent_tree_file(const kent_tree *t, size_t index)
{
    return t->files.names[index];
}

unsigned long long kent_tree_checksum(const kent_tree *t) { return t->files.checksum; }

kent_place kent_tree_place(const kent_tree *t, const kent_twig *twig)
{
    (void)t;
    return twig->place;
}

kent_twig_type kent_twig_type_of(const kent_twig *twig) { return twig->type; }

const char *kent_twig_type_word(const kent_twig *twig)
{
    switch (twig->type) {
    case KENT_TWIG_GROUP:
        return "a group { }";
    case KENT_TWIG_LIST:
        return "a list ( )";
    case KENT_TWIG_TEXT:
        return "a text";
    case KENT_TWIG_WHOLE:
    case KENT_TWIG_NUMBER:
        return "a number";
    case KENT_TWIG_SWITCH:
        return "true or false";
    }
    return "";
}

const char *kent_twig_name(const kent_twig *twig) { return twig->name; }

size_t kent_twig_count(const kent_twig *twig) { return twig->count; }

const kent_twig *kent_twig_child(const kent_twig *twig, size_t index)
{
    return &twig->children[index];
}

const kent_twig *kent_twig_member(const kent_twig *twig, const char *name)
{
    if (twig->type != KENT_TWIG_GROUP) return NULL;
    for (size_t i = 0; i < twig->count; i++) {
        if (strcmp(twig->children[i].name, name) == 0) return &twig->children[i];
    }
    return NULL;
}

const char *kent_twig_text(const kent_twig *twig)
{
    return twig->type == KENT_TWIG_TEXT ? twig->text : NULL;
}

double kent_twig_number(const kent_twig *twig)
{
    return twig->type == KENT_TWIG_WHOLE || twig->type == KENT_TWIG_NUMBER
               ? twig->number
               : NAN;
}

bool kent_twig_is_true(const kent_twig *twig)
{
    return twig->type == KENT_TWIG_SWITCH && twig->number != 0.0;
}
