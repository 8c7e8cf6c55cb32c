#include "kent_units.h"

#include "kent_alloc.h"
#include "kent_text.h"

#include <ctype.h>
#include <locale.h>
#include <math.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <udunits2.h>

enum { CACHE_LIMIT = 256 }; /* more spellings than that are no case file */

typedef struct known_unit {
    char *text; /* as written in the case */
    kent_kind kind;
    cv_converter *to_si;
} known_unit;

struct kent_units {
    ut_system *system;
    locale_t plain; /* numbers with a point, whatever the user's locale */
    ut_unit *si[KENT_KIND_COUNT];
    known_unit *known;
    size_t known_count, known_capacity;
};

/* One row of KENT_KIND_LIST. */
typedef struct kind_row {
    const char *word, *si, *shown[2];
    int decimals[2];
    const char *example[2];
} kind_row;

#define KENT_AS_ROW(name, word, si, si_unit, si_decimals, us_unit, us_decimals,        \
                    si_example, us_example)                                            \
    {word,                                                                             \
     si,                                                                               \
     {si_unit, us_unit},                                                               \
     {si_decimals, us_decimals},                                                       \
     {si_example, us_example}},
static const kind_row KINDS[KENT_KIND_COUNT] = {KENT_KIND_LIST(KENT_AS_ROW)};
#undef KENT_AS_ROW

/* What the trade writes and UDUNITS does not know, or takes for something else. Exact
 * by definition: foot 0.3048 m, pound 0.45359237 kg, US gallon 231 in3 = 3.785411784 L,
 * Imperial gallon 4.54609 L, standard gravity 9.80665 m/s2 (NIST SP 811, appendix B);
 * head of water at 1000 kg/m3. UDUNITS' own gallon, slug and horsepower are rounded,
 * and its gal is an acceleration. */
typedef struct short_form {
    const char *text, *meaning;
} short_form;

#define US_GALLON "3.785411784e-3 m^3"
#define POUND     "4.4482216152605 N"
static const short_form SHORT_FORMS[] = {
    {"gpm", "(" US_GALLON "/min)"},
    {"GPM", "(" US_GALLON "/min)"},
    {"igpm", "(4.54609e-3 m^3/min)"},
    {"mgd", "(3785.411784 m^3/day)"},
    {"MGD", "(3785.411784 m^3/day)"},
    {"MLD", "(1000 m^3/day)"},
    {"cfs", "(ft^3/s)"},
    {"CFS", "(ft^3/s)"},
    {"gal", "(" US_GALLON ")"},
    {"gallon", "(" US_GALLON ")"},
    {"gallons", "(" US_GALLON ")"},
    {"US_gallon", "(" US_GALLON ")"},
    {"imperial_gallon", "(4.54609e-3 m^3)"},
    {"lbf", "(" POUND ")"},
    {"kip", "(1000 " POUND ")"},
    {"psi", "(" POUND "/in^2)"},
    {"PSI", "(" POUND "/in^2)"},
    {"psig", "(" POUND "/in^2)"},
    {"ksi", "(1000 " POUND "/in^2)"},
    {"psf", "(" POUND "/ft^2)"},
    {"ksf", "(1000 " POUND "/ft^2)"},
    {"pcf", "(" POUND "/ft^3)"},
    {"barg", "bar"},
    {"mH2O", "(9806.65 Pa)"},
    {"ftH2O", "(2989.06692 Pa)"},
    {"ft_H2O", "(2989.06692 Pa)"},
    {"cP", "(0.001 Pa s)"},
    {"deg", "degree"},
    {"RPM", "rpm"},
    {"rev", "turn"},
    {"slug", "(" POUND " s^2/ft)"},
    {"hp", "(550 ft " POUND "/s)"},
};

/* What one display unit is in SI: si = shown x size + zero. */
typedef struct unit_size {
    const char *unit;
    double size, zero;
} unit_size;

static const unit_size UNIT_SIZES[] = {
    {"", 1.0, 0.0},
    {"m", 1.0, 0.0},
    {"mm", 0.001, 0.0},
    {"ft", 0.3048, 0.0},
    {"in", 0.0254, 0.0},
    {"m2", 1.0, 0.0},
    {"ft2", 0.09290304, 0.0},
    {"m3", 1.0, 0.0},
    {"yd3", 0.764554857984, 0.0},
    {"s", 1.0, 0.0},
    {"m/s", 1.0, 0.0},
    {"ft/s", 0.3048, 0.0},
    {"L/s", 0.001, 0.0},
    {"gpm", 3.785411784e-3 / 60.0, 0.0},
    {"bar", 1e5, 0.0},
    {"kPa", 1e3, 0.0},
    {"MPa", 1e6, 0.0},
    {"GPa", 1e9, 0.0},
    {"psi", 4.4482216152605 / (0.0254 * 0.0254), 0.0},
    {"ksi", 4448.2216152605 / (0.0254 * 0.0254), 0.0},
    {"psf", 4.4482216152605 / 0.09290304, 0.0},
    {"kN", 1e3, 0.0},
    {"kip", 4448.2216152605, 0.0},
    {"kN/m", 1e3, 0.0},
    {"lbf/ft", 4.4482216152605 / 0.3048, 0.0},
    {"kN m", 1e3, 0.0},
    {"kip ft", 4448.2216152605 * 0.3048, 0.0},
    {"kN/m3", 1e3, 0.0},
    {"pcf", 4.4482216152605 / 0.028316846592, 0.0},
    {"kg/m3", 1.0, 0.0},
    {"lb/ft3", 0.45359237 / 0.028316846592, 0.0},
    {"mPa s", 0.001, 0.0},
    {"cP", 0.001, 0.0},
    {"K", 1.0, 0.0},
    {"degR", 1.0 / 1.8, 0.0},
    {"1/MK", 1e-6, 0.0},
    {"degC", 1.0, 273.15},
    {"degF", 1.0 / 1.8, 459.67 / 1.8},
    {"deg", 0.017453292519943295, 0.0},
    {"rpm", 3.14159265358979323846 / 30.0, 0.0},
    {"kg m2", 1.0, 0.0},
    {"lb ft2", 0.45359237 * 0.09290304, 0.0},
    {"kW", 1e3, 0.0},
    {"hp", 550.0 * 4.4482216152605 * 0.3048, 0.0}, /* 550 ft lbf/s */
    {"m/s2", 1.0, 0.0},
    {"ft/s2", 0.3048, 0.0},
    {"1/GPa", 1e-9, 0.0},
    {"1/ksi", 0.0254 * 0.0254 / 4448.2216152605, 0.0},
};

/* ---- same kind ----------------------------------------------------------------- */

static ut_status saw_more(const ut_unit *unit, void *is_number)
{
    (void)unit;
    *(bool *)is_number = false;
    return UT_SUCCESS;
}

static ut_status saw_product(const ut_unit *unit, int count,
                             const ut_unit *const *basic, const int *powers,
                             void *is_number)
{
    (void)unit;
    (void)basic;
    for (int i = 0; i < count; i++) {
        if (powers[i] != 0) *(bool *)is_number = false;
    }
    return UT_SUCCESS;
}

static ut_status saw_scaled(const ut_unit *unit, double scale,
                            const ut_unit *underlying, double origin, void *is_number);
static ut_status saw_timestamp(const ut_unit *unit, const ut_unit *time_unit,
                               double origin, void *is_number)
{
    (void)time_unit;
    (void)origin;
    return saw_more(unit, is_number);
}

static ut_status saw_logarithm(const ut_unit *unit, double base,
                               const ut_unit *reference, void *is_number)
{
    (void)base;
    (void)reference;
    return saw_more(unit, is_number);
}

static const ut_visitor LOOK = {saw_more, saw_product, saw_scaled, saw_timestamp,
                                saw_logarithm};

static ut_status saw_scaled(const ut_unit *unit, double scale,
                            const ut_unit *underlying, double origin, void *is_number)
{
    (void)unit;
    (void)scale;
    (void)origin;
    return ut_accept_visitor(underlying, &LOOK, is_number);
}

/* Whether a/b is a number and nothing else. A radian counts as something else, which
 * ut_is_dimensionless() would not see. */
static bool same_kind(const ut_unit *a, const ut_unit *b)
{
    bool is_number = true;
    ut_unit *ratio = ut_divide(a, b);
    if (!ratio || ut_accept_visitor(ratio, &LOOK, &is_number) != UT_SUCCESS) {
        is_number = false;
    }
    ut_free(ratio);
    return is_number;
}

/* ---- lifecycle ------------------------------------------------------------------ */

kent_status kent_units_new(kent_units **out, kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    kent_units *u = kent_alloc(1, sizeof *u);
    if (!u) goto done;

    /* UDUNITS prints by itself unless told not to; a library of ours never prints. */
    (void)ut_set_error_message_handler(ut_ignore);
    u->plain = newlocale(LC_ALL_MASK, "C", (locale_t)0);
    if (u->plain == (locale_t)0) goto done;
    const locale_t before = uselocale(u->plain);
    u->system = ut_read_xml(NULL);
    bool complete = u->system != NULL;
    for (int k = 0; complete && k < KENT_KIND_COUNT; k++) {
        u->si[k] = ut_parse(u->system, KINDS[k].si, UT_UTF8);
        complete = u->si[k] != NULL;
    }
    (void)uselocale(before);
    if (!complete) {
        status =
            kent_error_set(err, KENT_E_IO, "",
                           "the unit database of UDUNITS-2 cannot be read; install "
                           "it, or say where it is in UDUNITS2_XML_PATH");
        goto done;
    }
    *out = u;
    u = NULL; /* handed over */
    status = KENT_OK;
done:
    kent_units_free(u);
    return status == KENT_E_NOMEM ? kent_error_nomem(err) : status;
}

static void forget_known(kent_units *u)
{
    for (size_t i = 0; i < u->known_count; i++) {
        free(u->known[i].text);
        cv_free(u->known[i].to_si);
    }
    u->known_count = 0;
}

void kent_units_free(kent_units *u)
{
    if (!u) return;
    forget_known(u);
    free(u->known);
    for (int k = 0; k < KENT_KIND_COUNT; k++) {
        ut_free(u->si[k]);
    }
    if (u->system) ut_free_system(u->system);
    if (u->plain != (locale_t)0) freelocale(u->plain);
    free(u);
}

/* ---- reading -------------------------------------------------------------------- */

/* '"300 L/s" or "4800 gpm"', one of them where both are alike. */
static void examples(kent_kind kind, char *out, size_t size)
{
    const char *si = KINDS[kind].example[KENT_SI], *us = KINDS[kind].example[KENT_US];
    if (strcmp(si, us) == 0) {
        (void)snprintf(out, size, "\"%s\"", si);
    } else {
        (void)snprintf(out, size, "\"%s\" or \"%s\"", si, us);
    }
}

/* Whether the text can be a unit: known marks, parentheses in pairs, and every digit is
 * an exponent or part of a name: UDUNITS would multiply by any other number, so that
 * "12 ft 6 in" became an area. A leading "1/" is right. */
static bool is_plain_unit(const char *unit)
{
    int open = 0; /* UDUNITS lets a closing parenthesis too many pass */
    if (strpbrk(unit, "@'\"+,;:&#!?=<>[]{}|\\~$`") != NULL) return false;
    for (size_t i = 0; unit[i] != '\0'; i++) {
        open += (unit[i] == '(') - (unit[i] == ')');
        if (open < 0) return false;
        if (!isdigit((unsigned char)unit[i])) continue;
        if (i == 0) {
            if (unit[0] == '1' && unit[1] == '/') continue;
            return false;
        }
        size_t before = i - 1;
        if (unit[before] == '-' && before > 0) before--;
        const unsigned char c = (unsigned char)unit[before];
        const bool is_power =
            c == '^' || (c == '*' && before > 0 && unit[before - 1] == '*');
        if (!isalnum(c) && !is_power && c != ')' && c != '_') return false;
    }
    return open == 0;
}

/* The unit with every short form written out, and "X head" as a pressure. */
static void write_out(const char *unit, kent_text *out)
{
    static const char HEAD[] = "head";
    size_t length = strlen(unit);
    const size_t head = sizeof HEAD - 1;
    const bool is_head = length > head + 1 && strcmp(unit + length - head, HEAD) == 0 &&
                         unit[length - head - 1] == ' ';
    if (is_head) {
        length -= head + 1;
        kent_text_add(out, "(");
    }
    for (size_t i = 0; i < length;) {
        size_t n = 0;
        const short_form *found = NULL;
        while (i + n < length &&
               (isalnum((unsigned char)unit[i + n]) || unit[i + n] == '_')) {
            n++;
        }
        for (size_t s = 0; n > 0 && s < sizeof SHORT_FORMS / sizeof SHORT_FORMS[0];
             s++) {
            const short_form *form = &SHORT_FORMS[s];
            if (strlen(form->text) == n && strncmp(form->text, unit + i, n) == 0) {
                found = form;
            }
        }
        if (n == 0) n = 1;
        if (found) {
            kent_text_add(out, "%s", found->meaning);
        } else {
            kent_text_add(out, "%.*s", (int)n, unit + i);
        }
        i += n;
    }
    if (is_head) kent_text_add(out, ") (9806.65 Pa/m)"); /* 1000 kg/m3 x 9.80665 m/s2 */
}

static kent_status complain_of_kind(const kent_units *u, const char *text,
                                    const ut_unit *unit, kent_kind kind,
                                    kent_error *err)
{
    char such_as[128];
    int other = 0;
    examples(kind, such_as, sizeof such_as);
    while (other < KENT_KIND_COUNT && !same_kind(unit, u->si[other])) {
        other++;
    }
    if (other < KENT_KIND_COUNT) {
        return kent_error_set(err, KENT_E_INPUT, "",
                              "'%.80s' is %s where %s belongs; for instance %s", text,
                              KINDS[other].word, KINDS[kind].word, such_as);
    }
    return kent_error_set(err, KENT_E_INPUT, "",
                          "'%.80s' is not %s; write for instance %s", text,
                          KINDS[kind].word, such_as);
}

/* The converter to SI of one unit text; kept by u. */
static kent_status learn(kent_units *u, const char *text, const char *unit,
                         kent_kind kind, cv_converter **out, kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    char such_as[128];
    kent_text full = {0};
    ut_unit *parsed = NULL;
    known_unit fresh = {.kind = kind};
    void *array = u->known;

    examples(kind, such_as, sizeof such_as);
    write_out(unit, &full);
    if (full.failed) goto done;
    if (is_plain_unit(unit)) {
        parsed = ut_parse(u->system, kent_text_of(&full), UT_UTF8);
        if (!parsed && ut_get_status() == UT_OS) goto done;
    }
    if (!parsed) {
        status =
            kent_error_set(err, KENT_E_INPUT, "",
                           "'%.60s' in '%.80s' is not a unit; write for instance %s",
                           unit, text, such_as);
        goto done;
    }
    if (!same_kind(parsed, u->si[kind])) {
        status = complain_of_kind(u, text, parsed, kind, err);
        goto done;
    }
    fresh.to_si = ut_get_converter(parsed, u->si[kind]);
    if (kind == KENT_WARMING && fresh.to_si &&
        fabs(cv_convert_double(fresh.to_si, 0.0)) > 0.0) {
        status = kent_error_set(err, KENT_E_INPUT, "",
                                "'%.80s' is a place on a scale of temperatures where a "
                                "change of temperature belongs; write for instance %s: "
                                "1 K is 1 degC of change, 1 degR 1 degF",
                                text, such_as);
        goto done;
    }
    fresh.text = kent_copy_text(unit);
    if (!fresh.to_si || !fresh.text ||
        kent_grow(&array, &u->known_capacity, u->known_count + 1, sizeof *u->known) !=
            0) {
        goto done;
    }
    u->known = array;
    u->known[u->known_count++] = fresh;
    *out = fresh.to_si;
    fresh = (known_unit){0}; /* handed over */
    status = KENT_OK;
done:
    free(fresh.text);
    cv_free(fresh.to_si);
    ut_free(parsed);
    kent_text_clear(&full);
    return status == KENT_E_NOMEM ? kent_error_nomem(err) : status;
}

static kent_status convert(kent_units *u, const char *text, double number,
                           const char *unit, kent_kind kind, double *si,
                           kent_error *err)
{
    cv_converter *to_si = NULL;
    for (size_t i = 0; i < u->known_count && !to_si; i++) {
        const known_unit *k = &u->known[i];
        if (k->kind == kind && strcmp(k->text, unit) == 0) to_si = k->to_si;
    }
    if (!to_si) {
        if (u->known_count >= CACHE_LIMIT) forget_known(u); /* rare, and still right */
        const kent_status status = learn(u, text, unit, kind, &to_si, err);
        if (status != KENT_OK) return status;
    }
    const double value = cv_convert_double(to_si, number);
    if (!isfinite(value)) {
        return kent_error_set(err, KENT_E_INPUT, "", "'%.80s' is too large a number",
                              text);
    }
    *si = value;
    return KENT_OK;
}

static bool is_absolute_pressure(const char *unit)
{
    static const char *const NAMES[] = {"psia", "bara", "ata", "PSIA"};
    static const char *const ENDS[] = {" a", "(a)", " abs", "(abs)"};
    const size_t length = strlen(unit);
    for (size_t i = 0; i < sizeof NAMES / sizeof NAMES[0]; i++) {
        if (strcmp(unit, NAMES[i]) == 0) return true;
    }
    for (size_t i = 0; i < sizeof ENDS / sizeof ENDS[0]; i++) {
        const size_t n = strlen(ENDS[i]);
        if (length > n && strcmp(unit + length - n, ENDS[i]) == 0) return true;
    }
    return false;
}

/* The text, its spaces at both ends gone, split into number and unit. */
static kent_status read_plain(kent_units *u, const char *text, kent_kind kind,
                              double *si, kent_error *err)
{
    char such_as[128];
    char *own = NULL;
    kent_status status = KENT_OK;

    examples(kind, such_as, sizeof such_as);
    while (isspace((unsigned char)*text)) {
        text++;
    }
    own = kent_copy_text(text);
    if (!own) return kent_error_nomem(err);
    for (char *p = own; (p = strstr(p, "\xC2\xA0")) != NULL;) {
        p[0] = p[1] = ' '; /* no-break spaces, as pasted from a document */
    }
    for (size_t n = strlen(own); n > 0 && isspace((unsigned char)own[n - 1]); n--) {
        own[n - 1] = '\0';
    }
    const size_t digits = kent_text_number(own);
    const char *unit = own + digits;
    const bool has_comma = unit[0] == ',';
    while (isspace((unsigned char)*unit)) {
        unit++;
    }

    if (digits == 0 && (strncmp(own, "\xE2\x88\x92", 3) == 0 || /* minus, dash */
                        strncmp(own, "\xE2\x80\x93", 3) == 0)) {
        status = kent_error_set(err, KENT_E_INPUT, "",
                                "'%.80s' starts with a dash that is no minus sign; "
                                "write '-' in its place",
                                own);
        goto done;
    }
    if (digits == 0) {
        status =
            kent_error_set(err, KENT_E_INPUT, "",
                           "'%.80s' does not start with a number; write for instance "
                           "%s",
                           own, such_as);
        goto done;
    }
    const double number = strtod(own, NULL);
    if (has_comma) {
        status = kent_error_set(err, KENT_E_INPUT, "",
                                "'%.80s' has a comma; write decimals with a point and "
                                "thousands without a mark, for instance %s",
                                own, such_as);
    } else if (!isfinite(number)) {
        status =
            kent_error_set(err, KENT_E_INPUT, "", "'%.80s' is too large a number", own);
    } else if (unit[0] == '\0' && kind == KENT_RATIO) {
        *si = number;
    } else if (unit[0] == '\0') {
        status =
            kent_error_set(err, KENT_E_INPUT, "",
                           "'%.80s' has no unit; write for instance %s", own, such_as);
    } else if (is_absolute_pressure(unit)) {
        status =
            kent_error_set(err, KENT_E_INPUT, "",
                           "'%s' in '%.80s' is an absolute pressure, and pressures are "
                           "gauge here; write for instance %s",
                           unit, own, such_as);
    } else {
        status = convert(u, own, number, unit, kind, si, err);
    }
done:
    free(own);
    return status;
}

kent_status kent_units_read(kent_units *u, const char *text, kent_kind kind, double *si,
                            kent_error *err)
{
    const locale_t before = uselocale(u->plain);
    const kent_status status = read_plain(u, text, kind, si, err);
    (void)uselocale(before);
    return status;
}

/* ---- words and display ---------------------------------------------------------- */

const char *kent_kind_word(kent_kind kind) { return KINDS[kind].word; }

const char *kent_kind_si(kent_kind kind) { return KINDS[kind].si; }

const char *kent_kind_example(kent_kind kind, kent_system system)
{
    return KINDS[kind].example[system];
}

kent_display kent_units_display(kent_kind kind, kent_system system)
{
    const char *unit = KINDS[kind].shown[system];
    kent_display display = {unit, KINDS[kind].decimals[system], NAN, NAN};
    for (size_t i = 0; i < sizeof UNIT_SIZES / sizeof UNIT_SIZES[0]; i++) {
        const unit_size *size = &UNIT_SIZES[i];
        if (strcmp(size->unit, unit) != 0) continue;
        display.factor = 1.0 / size->size;
        display.offset = -size->zero / size->size;
    }
    return display; /* NaN would show a row without a size; a test walks all rows */
}

double kent_units_shown(kent_kind kind, kent_system system, double si)
{
    const kent_display display = kent_units_display(kind, system);
    return si * display.factor + display.offset;
}
