#include "kent_derivation.h"

#include "kent_alloc.h"

#include <assert.h>
#include <ctype.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum { NUMBER = 32 }; /* characters of one printed number, with room to spare */

static const double DEGREE = 3.14159265358979323846 / 180.0; /* rad */

/* ft, lbf and slug = lbf s2/ft in m, N and kg; exact by definition of ft and lbf. */
static const double FOOT = 0.3048;
static const double POUND = 4.4482216152605;

/* The coherent sets: name of the unit, and what one is worth in SI: for US as powers of
 * foot and pound, since the second is common to both. */
typedef struct coherent {
    kent_kind kind;
    const char *si;
    double si_worth; /* SI units in one of these */
    const char *us;
    int feet, pounds; /* US unit = ft^feet lbf^pounds, times seconds */
} coherent;

static const coherent COHERENT[] = {
    {KENT_LENGTH, "m", 1.0, "ft", 1, 0},
    {KENT_DIAMETER, "m", 1.0, "ft", 1, 0},
    {KENT_AREA, "m2", 1.0, "ft2", 2, 0},
    {KENT_VOLUME, "m3", 1.0, "ft3", 3, 0},
    {KENT_TIME, "s", 1.0, "s", 0, 0},
    {KENT_SPEED, "m/s", 1.0, "ft/s", 1, 0},
    {KENT_FLOW, "m3/s", 1.0, "ft3/s", 3, 0},
    {KENT_PRESSURE, "kPa", 1e3, "lbf/ft2", -2, 1},
    {KENT_STRESS, "kPa", 1e3, "lbf/ft2", -2, 1},
    {KENT_STRENGTH, "kPa", 1e3, "lbf/ft2", -2, 1},
    {KENT_MODULUS, "kPa", 1e3, "lbf/ft2", -2, 1},
    {KENT_FORCE, "kN", 1e3, "lbf", 0, 1},
    {KENT_FORCE_PER_LENGTH, "kN/m", 1e3, "lbf/ft", -1, 1},
    {KENT_MOMENT, "kN m", 1e3, "lbf ft", 1, 1},
    {KENT_UNIT_WEIGHT, "kN/m3", 1e3, "lbf/ft3", -3, 1},
    {KENT_DENSITY, "t/m3", 1e3, "slug/ft3", -4, 1},
    {KENT_VISCOSITY, "kPa s", 1e3, "lbf s/ft2", -2, 1},
    {KENT_ROTATION, "rad/s", 1.0, "rad/s", 0, 0},
    {KENT_INERTIA, "t m2", 1e3, "slug ft2", 1, 1},
    {KENT_POWER, "kW", 1e3, "ft lbf/s", 1, 1},
    {KENT_ACCELERATION, "m/s2", 1.0, "ft/s2", 1, 0},
    {KENT_COMPLIANCE, "1/kPa", 1e-3, "ft2/lbf", 2, -1},
    {KENT_RATIO, "", 1.0, "", 0, 0},
};

static const char *coherent_unit(kent_kind kind, kent_system system, double *worth)
{
    *worth = 1.0;
    if (kind == KENT_ANGLE) {
        *worth = DEGREE;
        return "deg";
    }
    if (kind == KENT_EXPANSION) {
        *worth = system == KENT_US ? 9.0 / 5.0 : 1.0;
        return system == KENT_US ? "1/degR" : "1/K";
    }
    if (kind == KENT_TEMPERATURE || kind == KENT_WARMING) { /* absolute: no offset */
        *worth = system == KENT_US ? 5.0 / 9.0 : 1.0;
        return system == KENT_US ? "degR" : "K";
    }
    for (size_t i = 0; i < sizeof COHERENT / sizeof COHERENT[0]; i++) {
        const coherent *c = &COHERENT[i];
        if (c->kind != kind) continue;
        if (system == KENT_SI) {
            *worth = c->si_worth;
            return c->si;
        }
        for (int k = 0; k < c->feet; k++) {
            *worth *= FOOT;
        }
        for (int k = 0; k > c->feet; k--) {
            *worth /= FOOT;
        }
        for (int k = 0; k < c->pounds; k++) {
            *worth *= POUND;
        }
        for (int k = 0; k > c->pounds; k--) {
            *worth /= POUND;
        }
        return c->us;
    }
    return "";
}

const char *kent_coherent_unit(kent_kind kind, kent_system system)
{
    double worth = 1.0;
    return coherent_unit(kind, system, &worth);
}

/* ---- filling --------------------------------------------------------------------- */

static void derivation_append(kent_derivation *d, const kent_line *line)
{
    if (kent_grow((void **)&d->lines, &d->capacity, d->count + 1, sizeof *d->lines)) {
        d->failed = true;
        return;
    }
    d->lines[d->count++] = *line;
}

static void line_copy(char *out, size_t size, const char *text)
{
    (void)snprintf(out, size, "%s", text ? text : "");
}

void kent_derivation_heading(kent_derivation *d, const char *words)
{
    kent_line line = {.kind = KENT_RATIO};

    line_copy(line.says, sizeof line.says, words);
    derivation_append(d, &line);
}

void kent_derivation_put(kent_derivation *d, const char *symbol, double value,
                         kent_kind kind, kent_source source, const char *says)
{
    kent_line line = {.value = value, .kind = kind, .source = source};

    assert(strlen(symbol) < sizeof line.symbol);
    line_copy(line.symbol, sizeof line.symbol, symbol);
    line_copy(line.says, sizeof line.says, says);
    derivation_append(d, &line);
}

void kent_derivation_work(kent_derivation *d, const char *symbol, double value,
                          kent_kind kind, const char *formula, const char *equation,
                          const char *says)
{
    kent_line line = {.value = value, .kind = kind, .source = KENT_COMPUTED};

    assert(strlen(symbol) < sizeof line.symbol);
    assert(strlen(formula) < sizeof line.formula);
    line_copy(line.symbol, sizeof line.symbol, symbol);
    line_copy(line.formula, sizeof line.formula, formula);
    line_copy(line.equation, sizeof line.equation, equation);
    line_copy(line.says, sizeof line.says, says);
    derivation_append(d, &line);
}

/* The last of the first `count` lines that defines the symbol; NULL: none does. */
static const kent_line *derivation_before(const kent_derivation *d, size_t count,
                                          const char *symbol, size_t length)
{
    while (count-- > 0) {
        const kent_line *line = &d->lines[count];
        if (line->symbol[0] == '\0') continue;
        if (strlen(line->symbol) != length) continue;
        if (memcmp(line->symbol, symbol, length) == 0) return line;
    }
    return NULL;
}

const kent_line *kent_derivation_find(const kent_derivation *d, const char *symbol)
{
    return derivation_before(d, d->count, symbol, strlen(symbol));
}

void kent_derivation_clear(kent_derivation *d)
{
    free(d->lines);
    *d = (kent_derivation){0};
}

/* ---- printing -------------------------------------------------------------------- */

/* Six significant digits: a reader of the digits then knows that they are rounded in
 * the sixth. Shorter numbers in a formula are exact, as is a plain "0". */
static void number_print(double value, char out[NUMBER])
{
    char digits[NUMBER];

    if (value == 0.0) {
        (void)snprintf(out, NUMBER, "0");
        return;
    }
    (void)snprintf(digits, sizeof digits, "%#.6g", value);
    char *power = strchr(digits, 'e');
    if (power) { /* 1.23457e+06 as 1.23457e6 */
        const long exponent = strtol(power + 1, NULL, 10);
        *power = '\0';
        (void)snprintf(out, NUMBER, "%.16se%ld", digits, exponent);
        return;
    }
    const size_t length = strlen(digits);
    if (length > 0 && digits[length - 1] == '.') digits[length - 1] = '\0';
    (void)snprintf(out, NUMBER, "%s", digits);
}

void kent_line_value(const kent_line *line, kent_system system, char *out, size_t size)
{
    char digits[NUMBER];
    double worth = 1.0;
    const char *unit = coherent_unit(line->kind, system, &worth);

    number_print(line->value / worth, digits);
    (void)snprintf(out, size, "%s%s%s", digits, unit[0] ? " " : "", unit);
}

/* The same as a term of a formula: no unit but an angle's, a minus in parentheses. */
static void line_term(const kent_line *line, kent_system system, char *out, size_t size)
{
    char digits[NUMBER];
    double worth = 1.0;
    (void)coherent_unit(line->kind, system, &worth);

    const double value = line->value / worth;
    const char *degrees = line->kind == KENT_ANGLE ? "deg" : "";
    number_print(value, digits);
    if (value < 0.0) {
        (void)snprintf(out, size, "(%s%s)", digits, degrees);
    } else {
        (void)snprintf(out, size, "%s%s", digits, degrees);
    }
}

/* Length of the symbol, number or single character that a formula goes on with. A
 * number swallows its exponent, so that the e of 1e3 is no symbol. */
static size_t token_length(const char *s, bool *is_symbol)
{
    size_t n = 0;

    *is_symbol = isalpha((unsigned char)s[0]) != 0;
    if (*is_symbol) {
        while (isalnum((unsigned char)s[n]) || s[n] == '_' || s[n] == '\'') {
            n++;
        }
        return n;
    }
    if (!isdigit((unsigned char)s[0]) && s[0] != '.') return 1;
    while (isdigit((unsigned char)s[n]) || s[n] == '.') {
        n++;
    }
    if (s[n] != 'e') return n;
    const size_t sign = s[n + 1] == '+' || s[n + 1] == '-' ? 1 : 0;
    if (!isdigit((unsigned char)s[n + 1 + sign])) return n;
    n += 1 + sign;
    while (isdigit((unsigned char)s[n])) {
        n++;
    }
    return n;
}

void kent_line_numbers(const kent_derivation *d, size_t index, kent_system system,
                       char *out, size_t size)
{
    size_t used = 0;

    if (size == 0) return;
    out[0] = '\0';
    for (const char *s = d->lines[index].formula; *s != '\0';) {
        char term[NUMBER + 8];
        bool is_symbol = false;
        const size_t length = token_length(s, &is_symbol);
        const kent_line *line =
            is_symbol ? derivation_before(d, index, s, length) : NULL;
        if (line) {
            line_term(line, system, term, sizeof term);
        } else { /* a number, an operator, or a function's name */
            (void)snprintf(term, sizeof term, "%.*s", (int)length, s);
        }
        const int added = snprintf(out + used, size - used, "%s", term);
        if (added < 0 || (size_t)added >= size - used) return; /* full: cut short */
        used += (size_t)added;
        s += length;
    }
}
