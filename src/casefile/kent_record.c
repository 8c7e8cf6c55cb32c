#include "kent_record.h"

#include <assert.h>
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>
#include <strings.h>

static const struct {
    const char *group; /* kent_key.words of a reference */
    const char *word;  /* "there is no ... " */
} SHELVES[KENT_SHELF_COUNT] = {
    [KENT_SHELF_POINTS] = {"point", "point"},
    [KENT_SHELF_SOILS] = {"soil", "soil"},
    [KENT_SHELF_VALVES] = {"valve", "valve"},
    [KENT_SHELF_PUMPS] = {"pump", "pump"},
    [KENT_SHELF_DEVICES] = {"device", "device"},
    [KENT_SHELF_FIXED_LEVELS] = {"fixed_level", "fixed level at"},
    [KENT_SHELF_OUTFLOWS] = {"outflow", "outflow at"},
    [KENT_SHELF_PIPES] = {"pipe", "pipe"},
    [KENT_SHELF_SCENARIOS] = {"scenario", "scenario"},
    [KENT_SHELF_FITTINGS] = {"fitting", "fitting"},
    [KENT_SHELF_STATES] = {"state", "state"},
    [KENT_SHELF_PIPE_CLASSES] = {"pipe_class", "pipe class"},
    [KENT_SHELF_MATERIALS] = {"material", "material"},
    [KENT_SHELF_VALVE_TYPES] = {"valve_type", "valve type"},
    [KENT_SHELF_SOIL_ROWS] = {"soil_row", "soil of the catalogue"},
    [KENT_SHELF_CONCRETES] = {"concrete_row", "class of concrete"},
    [KENT_SHELF_RULES] = {"rule", "set of rules"},
};

/* ---- complaints ------------------------------------------------------------------ */

static void complain_at(kent_reader *r, kent_record *record, const kent_twig *twig,
                        const char *what)
{
    const kent_place place = kent_tree_place(r->tree, twig);
    record->sound = false;
    kent_complain(r->complaints, kent_tree_file(r->tree, (size_t)place.file),
                  place.line, "%s%s", record->label, what);
}

__attribute__((format(printf, 4, 5))) static void complain(kent_reader *r,
                                                           kent_record *record,
                                                           const kent_twig *twig,
                                                           const char *fmt, ...)
{
    char what[400];
    va_list args;
    va_start(args, fmt);
    (void)vsnprintf(what, sizeof what, fmt, args);
    va_end(args);
    complain_at(r, record, twig, what);
}

void kent_record_complain(kent_reader *r, kent_record *record, const char *key,
                          const char *fmt, ...)
{
    char what[400];
    const kent_twig *twig = key ? kent_record_field(record, key)->twig : NULL;
    va_list args;
    va_start(args, fmt);
    (void)vsnprintf(what, sizeof what, fmt, args);
    va_end(args);
    complain_at(r, record, twig ? twig : record->twig, what);
}

/* ---- one value ------------------------------------------------------------------- */

/* The value as the file has it, for messages. */
static void show(const kent_twig *twig, char *out, size_t size)
{
    const char *text = kent_twig_text(twig);
    if (text) {
        (void)snprintf(out, size, "\"%.60s\"", text);
    } else {
        (void)snprintf(out, size, "%.9g", kent_twig_number(twig));
    }
}

static bool in_range(const kent_key *key, double value)
{
    const double slack = 1e-12 * fabs(value); /* a limit converted both ways */
    if (isnan(value)) return false;
    return (key->above_least ? value > key->least : value >= key->least - slack) &&
           value <= key->most + slack;
}

static void check_range(kent_reader *r, kent_record *record, const kent_key *key,
                        const kent_twig *twig, double value)
{
    char range[80];
    char shown[80];
    if (in_range(key, value)) return;
    kent_key_range(key, r->system, range, sizeof range);
    show(twig, shown, sizeof shown);
    complain(r, record, twig, "%s = %s is out of range; the range is %s", key->key,
             shown, range);
}

static void complain_type(kent_reader *r, kent_record *record, const kent_twig *twig,
                          const char *key, const char *belongs)
{
    char shown[80] = "";
    if (kent_twig_text(twig) || !isnan(kent_twig_number(twig))) {
        show(twig, shown, sizeof shown);
    }
    complain(r, record, twig, "%s%s%s is %s where %s belongs", key,
             shown[0] ? " = " : "", shown, kent_twig_type_word(twig), belongs);
}

static double read_quantity(kent_reader *r, kent_record *record, const char *key,
                            const kent_twig *twig, kent_kind kind)
{
    const char *text = kent_twig_text(twig);
    kent_error err = {0};
    double si = NAN;
    if (text) {
        const kent_status status = kent_units_read(r->units, text, kind, &si, &err);
        if (status == KENT_OK) return si;
        if (status == KENT_E_NOMEM) {
            r->failed = true;
        } else {
            complain(r, record, twig, "%s: %s", key, err.what);
        }
    } else if (!isnan(kent_twig_number(twig))) {
        complain(r, record, twig,
                 "%s = %.9g has no unit; write for instance \"%s\" or \"%s\"", key,
                 kent_twig_number(twig), kent_kind_example(kind, KENT_SI),
                 kent_kind_example(kind, KENT_US));
    } else {
        char belongs[120];
        (void)snprintf(belongs, sizeof belongs, "%s, for instance \"%s\",",
                       kent_kind_word(kind), kent_kind_example(kind, KENT_SI));
        complain_type(r, record, twig, key, belongs);
    }
    return NAN;
}

static void quantity(kent_reader *r, kent_record *record, const kent_key *key,
                     kent_field *f)
{
    const char *text = kent_twig_text(f->twig);
    if (text && key->words && strcmp(text, key->words) == 0) {
        f->number = INFINITY;
        return;
    }
    f->number = read_quantity(r, record, key->key, f->twig, key->kind);
    if (!isnan(f->number)) check_range(r, record, key, f->twig, f->number);
}

static void number(kent_reader *r, kent_record *record, const kent_key *key,
                   kent_field *f)
{
    const char *text = kent_twig_text(f->twig);
    f->number = kent_twig_number(f->twig);
    if (text && text[0] != '\0' && text[kent_text_number(text)] == '\0') {
        complain(r, record, f->twig,
                 "%s = \"%.60s\" stands in quotes, and %s is a number without unit; "
                 "write %s = %.60s",
                 key->key, text, key->key, key->key, text);
    } else if (isnan(f->number)) {
        complain_type(r, record, f->twig, key->key, "a number without unit");
    } else if (key->value == KENT_VALUE_COUNT &&
               kent_twig_type_of(f->twig) != KENT_TWIG_WHOLE) {
        complain(r, record, f->twig,
                 "%s = %.9g must be a whole number, written without a decimal point",
                 key->key, f->number);
    } else {
        check_range(r, record, key, f->twig, f->number);
    }
}

static void either(kent_reader *r, kent_record *record, const kent_key *key,
                   kent_field *f)
{
    f->bare = !isnan(kent_twig_number(f->twig));
    if (f->bare) {
        number(r, record, key, f);
    } else {
        f->number = read_quantity(r, record, key->key, f->twig, key->kind);
    }
}

static bool has_control(const char *text)
{
    for (const unsigned char *p = (const unsigned char *)text; *p; p++) {
        if (*p < 0x20 || *p == 0x7F) return true;
    }
    return false;
}

static void text(kent_reader *r, kent_record *record, const kent_key *key,
                 kent_field *f)
{
    f->text = kent_twig_text(f->twig);
    if (!f->text) {
        complain_type(r, record, f->twig, key->key, "a text in quotes");
    } else if ((double)strlen(f->text) > key->most) {
        complain(r, record, f->twig, "%s is longer than %g bytes; shorten it", key->key,
                 key->most);
    } else if (has_control(f->text)) {
        complain(
            r, record, f->twig,
            "%s holds a line end or another control character; write it in one line",
            key->key);
    }
}

/* Whether it holds a space or mark of Unicode that nobody sees: two ids that look the
 * same would differ. */
static bool has_unseen(const char *text)
{
    static const struct {
        const char *start;
        unsigned char from, to; /* of the byte after it */
    } UNSEEN[] = {
        {"\xC2", 0x80, 0xA0},     /* controls, no-break space */
        {"\xE2\x80", 0x80, 0x8F}, /* spaces, joiners, direction */
        {"\xE2\x80", 0xA8, 0xAF}, /* line ends, direction */
        {"\xE2\x81", 0x9F, 0xAF}, /* more of these */
        {"\xE3\x80", 0x80, 0x80}, /* wide space */
        {"\xEF\xBB", 0xBF, 0xBF}, /* no-break of no width */
    };
    for (size_t i = 0; i < sizeof UNSEEN / sizeof UNSEEN[0]; i++) {
        const size_t n = strlen(UNSEEN[i].start);
        for (const char *p = text; (p = strstr(p, UNSEEN[i].start)) != NULL; p += n) {
            const unsigned char next = (unsigned char)p[n];
            if (next >= UNSEEN[i].from && next <= UNSEEN[i].to) return true;
        }
    }
    return false;
}

/* Ids become parts of file names and of column headings. */
static bool id_is_usable(const char *id)
{
    const size_t length = strlen(id);
    return length > 0 && length < KENT_ID && id[0] != '.' && !has_control(id) &&
           !has_unseen(id) && strcspn(id, " /\\\"'`,;:*?<>|$") == length;
}

static void id(kent_reader *r, kent_record *record, const kent_key *key, kent_field *f)
{
    f->text = kent_twig_text(f->twig);
    if (!f->text) {
        complain_type(r, record, f->twig, key->key, "a name in quotes");
    } else if (!id_is_usable(f->text)) {
        complain(
            r, record, f->twig,
            "%s = \"%.60s\" cannot be a name; use 1 to %d letters, digits and - _ . "
            "+, no spaces",
            key->key, f->text, KENT_ID - 1);
    }
}

static kent_shelf shelf_of(const char *group)
{
    int i = 0;
    while (i < KENT_SHELF_COUNT && strcmp(SHELVES[i].group, group) != 0) {
        i++;
    }
    assert(i < KENT_SHELF_COUNT);
    return (kent_shelf)i;
}

/* Where nothing has a name like the one that is looked for. */
static const char *where_to_look(const kent_reader *r, kent_shelf shelf)
{
    switch (shelf) {
    case KENT_SHELF_PIPE_CLASSES:
    case KENT_SHELF_MATERIALS:
    case KENT_SHELF_VALVE_TYPES:
    case KENT_SHELF_SOIL_ROWS:
    case KENT_SHELF_CONCRETES:
    case KENT_SHELF_RULES:
        return "; 'kentledge catalogue' prints those there are";
    case KENT_SHELF_SOILS:
        return "; give it in soils, or name one that 'kentledge catalogue' prints";
    case KENT_SHELF_POINTS:
    case KENT_SHELF_FIXED_LEVELS:
    case KENT_SHELF_VALVES:
    case KENT_SHELF_PUMPS:
    case KENT_SHELF_DEVICES:
    case KENT_SHELF_OUTFLOWS:
    case KENT_SHELF_PIPES:
    case KENT_SHELF_SCENARIOS:
    case KENT_SHELF_FITTINGS:
    case KENT_SHELF_STATES:
    case KENT_SHELF_COUNT:
        return r->shelves[shelf].count == 0 ? "; the case has none"
                                            : ", nor one with a name like it";
    }
    return "";
}

int kent_record_lookup(kent_reader *r, kent_record *record, const kent_twig *item,
                       const char *key, kent_shelf shelf)
{
    const char *name = kent_twig_text(item);
    if (!name) {
        complain_type(r, record, item, key, "a name in quotes");
        return -1;
    }
    int index = kent_directory_find(&r->shelves[shelf], name);
    if (index < 0) index = kent_directory_find(&r->shelves[shelf], kent_spelling(name));
    if (index >= 0) return index;

    const char *near = r->complaints->count < KENT_COMPLAINTS_KEPT
                           ? kent_directory_nearest(&r->shelves[shelf], name)
                           : NULL;
    if (!near && shelf == KENT_SHELF_SOILS) {
        near = kent_directory_nearest(&r->shelves[KENT_SHELF_SOIL_ROWS], name);
    }
    if (near) {
        complain(r, record, item, "%s: there is no %s \"%.60s\"; did you mean \"%s\"?",
                 key, SHELVES[shelf].word, name, near);
    } else {
        complain(r, record, item, "%s: there is no %s \"%.60s\"%s", key,
                 SHELVES[shelf].word, name, where_to_look(r, shelf));
    }
    return -1;
}

static void reference(kent_reader *r, kent_record *record, const kent_key *key,
                      kent_field *f)
{
    const kent_shelf shelf = shelf_of(key->words);
    f->text = kent_twig_text(f->twig);
    if (f->text && shelf == KENT_SHELF_SOILS &&
        kent_directory_find(&r->shelves[shelf], f->text) < 0) {
        f->index = kent_directory_find(&r->shelves[KENT_SHELF_SOIL_ROWS], f->text);
        f->from_catalogue = f->index >= 0;
        if (f->from_catalogue) return;
    }
    f->index = kent_record_lookup(r, record, f->twig, key->key, shelf);
}

/* Index of a word in "a|b", -1: not there. */
static int word_index(const char *words, const char *word)
{
    int index = 0;
    for (const char *p = words; p; index++) {
        const size_t length = strcspn(p, "|");
        if (strlen(word) == length && strncmp(p, word, length) == 0) return index;
        p = p[length] == '|' ? p + length + 1 : NULL;
    }
    return -1;
}

/* The word nearest to a misspelt one, into out; "": none is, or
 * several are alike. */
static void nearest_word(const char *words, const char *word, char *out, size_t size)
{
    size_t least = SIZE_MAX;
    out[0] = '\0';
    for (const char *p = words; p;) {
        const size_t length = strcspn(p, "|");
        char candidate[40];
        (void)snprintf(candidate, sizeof candidate, "%.*s", (int)length, p);
        const size_t distance = kent_text_misspelling(candidate, word);
        if (distance == least) out[0] = '\0';
        if (distance < least) {
            least = distance;
            (void)snprintf(out, size, "%s", candidate);
        }
        p = p[length] == '|' ? p + length + 1 : NULL;
    }
}

/* "push-on", "mechanical" ... : the words, for people. */
static void list_words(const char *words, char *out, size_t size)
{
    size_t used = 0;
    out[0] = '\0';
    for (const char *p = words; p;) {
        const size_t length = strcspn(p, "|");
        const int n = snprintf(out + used, size - used, "%s\"%.*s\"",
                               used > 0 ? ", " : "", (int)length, p);
        if (n < 0 || (size_t)n >= size - used) return;
        used += (size_t)n;
        p = p[length] == '|' ? p + length + 1 : NULL;
    }
}

static void word(kent_reader *r, kent_record *record, const kent_key *key,
                 kent_field *f)
{
    char known[240];
    f->text = kent_twig_text(f->twig);
    list_words(key->words, known, sizeof known);
    if (!f->text) {
        char belongs[280];
        (void)snprintf(belongs, sizeof belongs, "one of %s", known);
        complain_type(r, record, f->twig, key->key, belongs);
        return;
    }
    f->text = kent_spelling(f->text);
    f->index = word_index(key->words, f->text);
    if (f->index < 0) {
        char near[40];
        nearest_word(key->words, f->text, near, sizeof near);
        if (near[0] != '\0') {
            complain(r, record, f->twig,
                     "%s = \"%.60s\" is not known; did you mean \"%s\"?", key->key,
                     f->text, near);
        } else {
            complain(r, record, f->twig, "%s = \"%.60s\" is not known; it is one of %s",
                     key->key, f->text, known);
        }
    }
}

static void vector(kent_reader *r, kent_record *record, const kent_key *key,
                   kent_field *f)
{
    double v[3] = {NAN, NAN, NAN};
    const bool list = kent_twig_type_of(f->twig) == KENT_TWIG_LIST;
    const size_t count = list ? kent_twig_count(f->twig) : 0;
    for (size_t i = 0; i < count && i < 3; i++) {
        v[i] = kent_twig_number(kent_twig_child(f->twig, i));
    }
    f->vector = (kent_vec3){v[0], v[1], v[2]};
    const double length = kent_vec3_length(f->vector);
    if (count != 3 || !(length > 0.0) || !isfinite(length)) {
        complain(r, record, f->twig,
                 "%s must be three numbers, not all nil, as [ 1.0, 0.0, 0.0 ]",
                 key->key);
    }
}

/* Of each kent_station_style: what the numbers before and after the + count. */
static const struct {
    double large;                         /* m, what the number before the + counts */
    double small;                         /* m, what the number after it counts */
    double most;                          /* the number after it stays below that */
    const char *style, *example, *length; /* for people */
} STATIONS[] = {
    [KENT_KM_M] = {1000.0, 1.0, 1000.0, "km+m", "1+198", "1198 m"},
    [KENT_100M_M] = {100.0, 1.0, 100.0, "100m+m", "11+98.5", "1198.5 m"},
    [KENT_100FT_FT] = {30.48, 0.3048, 100.0, "100ft+ft", "12+34.5", "1234.5 ft"},
};

/* What people write before a station, without regard to capitals. */
static const char *after_station_word(const char *s)
{
    static const char *const WORDS[] = {"km", "sta", "station", "ch", "chainage"};
    for (size_t i = 0; i < sizeof WORDS / sizeof WORDS[0]; i++) {
        const size_t n = strlen(WORDS[i]);
        if (strncasecmp(s, WORDS[i], n) != 0) continue;
        const char *rest = s + n + (s[n] == '.' ? 1 : 0);
        const size_t gap = strspn(rest, " ");
        if (gap > 0) return rest + gap;
    }
    return s;
}

/* "1+198" by the reader's station_style, or a length; "km 1+198" is never of hundreds.
 */
static void station(kent_reader *r, kent_record *record, const kent_key *key,
                    kent_field *f)
{
    static const char DIGITS[] = "0123456789";
    const char *whole = kent_twig_text(f->twig);
    const char *s = whole ? after_station_word(whole) : NULL;
    const size_t before = s ? strspn(s, DIGITS) : 0;
    const bool kilometres = s != whole && strncasecmp(whole, "km", 2) == 0;
    double part = NAN;
    kent_error err = {0};
    if (!s || !strchr(s, '+') || s[0] == '+') {
        f->number = read_quantity(r, record, key->key, f->twig, KENT_LENGTH);
        return;
    }
    const char *after = s + before + 1;
    if (before == 0 || before > 6 || s[before] != '+' ||
        strspn(after, "0123456789.") != strlen(after) ||
        kent_units_read(r->units, after, KENT_RATIO, &part, &err) != KENT_OK) {
        if (err.status == KENT_E_NOMEM) r->failed = true;
        complain(r, record, f->twig,
                 "%s = \"%.40s\" is no station; write \"%s\" or a length, as \"%s\"",
                 key->key, whole, STATIONS[r->station_style].example,
                 STATIONS[r->station_style].length);
    } else if (kilometres && r->station_style != KENT_KM_M) {
        complain(r, record, f->twig,
                 "%s = \"%.40s\" counts kilometres, and stations here are of style %s, "
                 "as \"%s\"; site.station_style says how stations are written",
                 key->key, whole, STATIONS[r->station_style].style,
                 STATIONS[r->station_style].example);
    } else if (part >= STATIONS[r->station_style].most) {
        complain(
            r, record, f->twig,
            "%s = \"%.40s\" is no station of style %s, as \"%s\": what follows the "
            "+ stays below %g; site.station_style says how stations are written",
            key->key, whole, STATIONS[r->station_style].style,
            STATIONS[r->station_style].example, STATIONS[r->station_style].most);
    } else {
        f->number = STATIONS[r->station_style].large * (double)strtol(s, NULL, 10) +
                    STATIONS[r->station_style].small * part;
    }
}

/* "45 deg right": rad, positive to the left. */
static void turn(kent_reader *r, kent_record *record, const kent_key *key,
                 kent_field *f)
{
    static const struct {
        const char *word;
        double sign;
    } WAYS[] = {{" left", 1.0}, {" right", -1.0}};
    const char *s = kent_twig_text(f->twig);
    char angle[80];
    for (size_t i = 0; s && i < sizeof WAYS / sizeof WAYS[0]; i++) {
        const size_t n = strlen(s);
        const size_t tail = strlen(WAYS[i].word);
        if (n <= tail || n >= sizeof angle || strcmp(s + n - tail, WAYS[i].word) != 0) {
            continue;
        }
        kent_error err = {0};
        double size = NAN;
        (void)snprintf(angle, sizeof angle, "%.*s", (int)(n - tail), s);
        const kent_status status =
            kent_units_read(r->units, angle, KENT_ANGLE, &size, &err);
        if (status == KENT_E_NOMEM) r->failed = true;
        if (status == KENT_OK && size >= 0.0 && size < 3.14159265358979323846) {
            f->number = WAYS[i].sign * size;
            return;
        }
        break;
    }
    if (s) {
        complain(
            r, record, f->twig,
            "%s = \"%.40s\" is no turn; write an angle below 180 deg and which way, "
            "for instance \"45 deg right\"",
            key->key, s);
    } else {
        complain_type(r, record, f->twig, key->key,
                      "a turn, for instance \"45 deg right\",");
    }
}

static void compound(kent_reader *r, kent_record *record, const kent_key *key,
                     kent_field *f)
{
    const bool group = key->value == KENT_VALUE_GROUP;
    const kent_twig_type wanted = group ? KENT_TWIG_GROUP : KENT_TWIG_LIST;
    if (kent_twig_type_of(f->twig) != wanted) {
        complain_type(r, record, f->twig, key->key,
                      group ? "a group { }" : "a list ( )");
        f->twig = NULL;
    }
}

static void boolean(kent_reader *r, kent_record *record, const kent_key *key,
                    kent_field *f)
{
    const char *text = kent_twig_text(f->twig);
    if (text && (strcmp(text, "true") == 0 || strcmp(text, "false") == 0)) {
        complain(r, record, f->twig,
                 "%s = \"%s\" stands in quotes; write %s = %s without them", key->key,
                 text, key->key, text);
    } else if (kent_twig_type_of(f->twig) != KENT_TWIG_SWITCH) {
        complain_type(r, record, f->twig, key->key, "true or false");
    }
}

/* What to do with a value of each kind; indexed by kent_value. */
typedef void read_value(kent_reader *, kent_record *, const kent_key *, kent_field *);
static read_value *const READ[] = {
    [KENT_VALUE_QUANTITY] = quantity, [KENT_VALUE_NUMBER] = number,
    [KENT_VALUE_COUNT] = number,      [KENT_VALUE_SWITCH] = boolean,
    [KENT_VALUE_TEXT] = text,         [KENT_VALUE_ID] = id,
    [KENT_VALUE_REF] = reference,     [KENT_VALUE_WORD] = word,
    [KENT_VALUE_LIST] = compound,     [KENT_VALUE_GROUP] = compound,
    [KENT_VALUE_STATION] = station,   [KENT_VALUE_VECTOR] = vector,
    [KENT_VALUE_TURN] = turn,         [KENT_VALUE_EITHER] = either,
};

/* ---- one record ------------------------------------------------------------------ */

static const char *member_text(const kent_twig *twig, const char *name)
{
    const kent_twig *member = kent_twig_member(twig, name);
    return member ? kent_twig_text(member) : NULL;
}

static void make_label(kent_record *record, const char *group, const char *owner,
                       size_t position)
{
    char kind[32];
    const char *name = member_text(record->twig, "id");
    const char *at = member_text(record->twig, "at");
    (void)snprintf(kind, sizeof kind, "%s", group);
    for (char *p = kind; *p; p++) {
        if (*p == '_' && strcmp(group, "design_rules") != 0) *p = ' ';
    }
    char *out = record->label;
    const size_t size = sizeof record->label;
    if (strcmp(group, "case") == 0 || strcmp(group, "catalogue") == 0 ||
        strcmp(group, "standard_table") == 0) {
        out[0] = '\0';
    } else if (position > 0 && name) {
        (void)snprintf(out, size, "%.100s%s \"%.40s\": ", owner, kind, name);
    } else if (position > 0 && at) {
        (void)snprintf(out, size, "%.100s%s at \"%.40s\": ", owner, kind, at);
    } else if (position > 0) {
        (void)snprintf(out, size, "%.100s%s %zu: ", owner, kind, position);
    } else {
        (void)snprintf(out, size, "%.100s%s: ", owner, kind);
    }
}

static void read_member(kent_reader *r, kent_record *record, const char *group,
                        const kent_twig *twig)
{
    const char *name = kent_spelling(kent_twig_name(twig));
    size_t i = 0;
    while (i < record->count && strcmp(record->keys[i].key, name) != 0) {
        i++;
    }
    if (i == record->count) {
        const char *near = kent_key_nearest(group, name);
        if (near) {
            complain(r, record, twig, "'%.60s' is not a key of %s; did you mean '%s'?",
                     kent_twig_name(twig), kent_key_group_word(group), near);
        } else {
            complain(
                r, record, twig,
                "'%.60s' is not a key of %s; 'kentledge check --keys' prints those "
                "there are",
                kent_twig_name(twig), kent_key_group_word(group));
        }
        return;
    }
    kent_field *f = &record->fields[i];
    if (f->twig) {
        complain(r, record, twig, "'%s' is given twice, spelt two ways; keep one",
                 name);
    } else {
        f->twig = twig;
        READ[record->keys[i].value](r, record, &record->keys[i], f);
    }
}

static void complain_missing(kent_reader *r, kent_record *record, const kent_key *key)
{
    if (key->value == KENT_VALUE_QUANTITY) {
        complain(r, record, record->twig,
                 "'%s' is missing (%s); write for instance %s = \"%s\"", key->key,
                 key->says, key->key, kent_kind_example(key->kind, r->system));
    } else {
        complain(r, record, record->twig, "'%s' is missing (%s)", key->key, key->says);
    }
}

void kent_record_read(kent_reader *r, const kent_twig *twig, const char *group,
                      const char *owner, size_t position, kent_record *out)
{
    *out = (kent_record){
        .twig = twig, .place = kent_tree_place(r->tree, twig), .sound = true};
    out->keys = kent_key_group(group, &out->count);
    assert(out->keys && out->count <= KENT_RECORD_FIELDS);
    make_label(out, group, owner, position);
    for (size_t i = 0; i < out->count; i++) {
        out->fields[i].number = NAN;
        out->fields[i].index = -1;
    }
    const size_t members = kent_twig_count(twig);
    for (size_t i = 0; i < members; i++) {
        read_member(r, out, group, kent_twig_child(twig, i));
    }
    for (size_t i = 0; i < out->count; i++) {
        if (kent_key_is_required(&out->keys[i]) && !out->fields[i].twig &&
            !kent_twig_member(twig, out->keys[i].key)) {
            complain_missing(r, out, &out->keys[i]);
        }
    }
}

const kent_twig *kent_record_element(kent_reader *r, const kent_twig *list,
                                     const char *owner, size_t index)
{
    const kent_twig *element = kent_twig_child(list, index);
    if (kent_twig_type_of(element) == KENT_TWIG_GROUP) return element;
    const kent_place place = kent_tree_place(r->tree, element);
    kent_complain(r->complaints, kent_tree_file(r->tree, (size_t)place.file),
                  place.line, "%selement %zu of '%s' is %s where a group { } belongs",
                  owner, index + 1, kent_twig_name(list), kent_twig_type_word(element));
    return NULL;
}

const kent_field *kent_record_field(const kent_record *record, const char *key)
{
    size_t i = 0;
    while (i < record->count && strcmp(record->keys[i].key, key) != 0) {
        i++;
    }
    assert(i < record->count);
    return &record->fields[i];
}

bool kent_record_has(const kent_record *record, const char *key)
{
    return kent_record_field(record, key)->twig != NULL;
}

double kent_record_number(const kent_record *record, const char *key)
{
    return kent_record_field(record, key)->number;
}

double kent_record_number_or(const kent_record *record, const char *key, double other)
{
    const kent_field *f = kent_record_field(record, key);
    return f->twig ? f->number : other;
}

bool kent_record_switch(const kent_record *record, const char *key, bool other)
{
    const kent_field *f = kent_record_field(record, key);
    return f->twig ? kent_twig_is_true(f->twig) : other;
}

void kent_record_copy(const kent_record *record, const char *key, const char *other,
                      char *out, size_t size)
{
    const kent_field *f = kent_record_field(record, key);
    const char *from = f->text ? f->text : other ? other : "";
    (void)snprintf(out, size, "%s", from);
}

double kent_record_item(kent_reader *r, kent_record *record, const kent_twig *item,
                        const char *key, bool is_quantity, kent_kind kind)
{
    if (is_quantity) return read_quantity(r, record, key, item, kind);
    const double value = kent_twig_number(item);
    if (isnan(value)) complain_type(r, record, item, key, "a number without unit");
    return value;
}

void kent_reader_shelve(kent_reader *r, kent_shelf shelf, const char *id, int index,
                        kent_place place)
{
    if (!id || id[0] == '\0') return; /* refused already */
    if (kent_directory_add(&r->shelves[shelf], id, index, place) != 0) r->failed = true;
}

static void complain_twice(kent_reader *r, kent_shelf shelf, const kent_entry *first,
                           const kent_entry *second)
{
    const char *file = kent_tree_file(r->tree, (size_t)second->place.file);
    char at[320];
    assert(first->place.file >= 0); /* no shelf has rows of the catalogue and others */
    if (first->place.file == second->place.file) {
        (void)snprintf(at, sizeof at, "at line %d", first->place.line);
    } else {
        (void)snprintf(at, sizeof at, "at %s:%d",
                       kent_tree_file(r->tree, (size_t)first->place.file),
                       first->place.line);
    }
    kent_complain(r->complaints, file, second->place.line,
                  "%s \"%.60s\" is given twice, first %s", SHELVES[shelf].word,
                  second->id, at);
}

void kent_reader_close_shelf(kent_reader *r, kent_shelf shelf)
{
    kent_directory *d = &r->shelves[shelf];
    kent_directory_sort(d);
    for (size_t i = 1; i < d->count; i++) {
        const kent_entry *first = &d->entries[i - 1];
        const kent_entry *second = &d->entries[i];
        if (strcmp(first->id, second->id) != 0 || second->place.file < 0) continue;
        complain_twice(r, shelf, first, second);
    }
}

void kent_reader_clear(kent_reader *r)
{
    for (int i = 0; i < KENT_SHELF_COUNT; i++) {
        kent_directory_clear(&r->shelves[i]);
    }
}
