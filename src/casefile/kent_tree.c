#include "kent_tree.h"
#include "kent_scan.h"

#include <libconfig.h>
#include <locale.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>

struct kent_tree {
    kent_scan scan;
    config_t config;
    bool parsed; /* config is initialised */
};

/* A twig is libconfig's setting under a name of ours. */
static const config_setting_t *setting_of(const kent_twig *twig)
{
    return (const config_setting_t *)twig;
}

static const kent_twig *twig_of(const config_setting_t *setting)
{
    return (const kent_twig *)setting;
}

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
static void complain_of_syntax(const kent_tree *t, kent_complaints *complaints)
{
    const int line = config_error_line(&t->config);
    const kent_place place = place_of_line(&t->scan, line);
    const char *file = t->scan.files[place.file];
    const char *why = config_error_text(&t->config);
    const char *text = line_text(&t->scan, line);
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

kent_status kent_tree_read(const char *path, kent_tree **out,
                           kent_complaints *complaints, kent_error *err)
{
    kent_status status = KENT_OK;
    kent_tree *t = kent_alloc(1, sizeof *t);
    if (!t) return kent_error_nomem(err);

    /* Numbers have a decimal point whatever the caller's locale says. */
    const locale_t plain = newlocale(LC_NUMERIC_MASK, "C", (locale_t)0);
    const locale_t before = plain ? uselocale(plain) : (locale_t)0;

    status = kent_scan_read(path, &t->scan, complaints, err);
    if (status != KENT_OK) goto done;
    config_init(&t->config);
    t->parsed = true;
    if (config_read_string(&t->config, t->scan.text) != CONFIG_TRUE) {
        complain_of_syntax(t, complaints);
        status = KENT_E_INPUT;
        goto done;
    }
    *out = t;
    t = NULL;
done:
    if (plain) {
        (void)uselocale(before);
        freelocale(plain);
    }
    kent_tree_free(t);
    return status;
}

void kent_tree_free(kent_tree *t)
{
    if (!t) return;
    if (t->parsed) config_destroy(&t->config);
    kent_scan_clear(&t->scan);
    free(t);
}

const kent_twig *kent_tree_root(const kent_tree *t)
{
    return twig_of(config_root_setting(&t->config));
}

size_t kent_tree_file_count(const kent_tree *t) { return t->scan.file_count; }

const char *kent_tree_file(const kent_tree *t, size_t index)
{
    return t->scan.files[index];
}

unsigned long long kent_tree_checksum(const kent_tree *t) { return t->scan.checksum; }

kent_place kent_tree_place(const kent_tree *t, const kent_twig *twig)
{
    return place_of_line(&t->scan, (int)config_setting_source_line(setting_of(twig)));
}

kent_twig_type kent_twig_type_of(const kent_twig *twig)
{
    switch (config_setting_type(setting_of(twig))) {
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

const char *kent_twig_type_word(const kent_twig *twig)
{
    switch (kent_twig_type_of(twig)) {
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

const char *kent_twig_name(const kent_twig *twig)
{
    const char *name = config_setting_name(setting_of(twig));
    return name ? name : "";
}

size_t kent_twig_count(const kent_twig *twig)
{
    const kent_twig_type type = kent_twig_type_of(twig);
    if (type != KENT_TWIG_GROUP && type != KENT_TWIG_LIST) return 0;
    return (size_t)config_setting_length(setting_of(twig));
}

const kent_twig *kent_twig_child(const kent_twig *twig, size_t index)
{
    return twig_of(config_setting_get_elem(setting_of(twig), (unsigned)index));
}

const kent_twig *kent_twig_member(const kent_twig *twig, const char *name)
{
    if (kent_twig_type_of(twig) != KENT_TWIG_GROUP) return NULL;
    return twig_of(config_setting_get_member(setting_of(twig), name));
}

const char *kent_twig_text(const kent_twig *twig)
{
    return kent_twig_type_of(twig) == KENT_TWIG_TEXT
               ? config_setting_get_string(setting_of(twig))
               : NULL;
}

double kent_twig_number(const kent_twig *twig)
{
    const config_setting_t *s = setting_of(twig);
    switch (config_setting_type(s)) {
    case CONFIG_TYPE_INT:
        return (double)config_setting_get_int(s);
    case CONFIG_TYPE_INT64:
        return (double)config_setting_get_int64(s);
    case CONFIG_TYPE_FLOAT:
        return config_setting_get_float(s);
    default:
        return NAN;
    }
}

bool kent_twig_is_true(const kent_twig *twig)
{
    return kent_twig_type_of(twig) == KENT_TWIG_SWITCH &&
           config_setting_get_bool(setting_of(twig)) == CONFIG_TRUE;
}
