#include "kent_options.h"

#include "kent_alloc.h"
#include "kent_text.h"

#include <argp.h>
#include <errno.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

/* ---- the commands ---------------------------------------------------------------- */

/* Bits of what was given, to refuse an option that a command does not have. */
enum {
    GAVE_OUT = 1 << 0,
    GAVE_SCENARIO = 1 << 1,
    GAVE_UNITS = 1 << 2,
    GAVE_THREADS = 1 << 3,
    GAVE_FORMAT = 1 << 4,
    GAVE_WIDE = 1 << 5,
    GAVE_QUIET = 1 << 6,
    GAVE_STRICT = 1 << 7,
    GAVE_NO_FILES = 1 << 8,
    GAVE_SENSITIVITY = 1 << 9,
    GAVE_SORT = 1 << 10,
    GAVE_ONLY = 1 << 11,
    GAVE_ALL = (1 << 12) - 1, /* of run */
    GAVE_KEYS = 1 << 12
};

typedef struct command_row {
    const char *word, *wants;
    size_t least, most; /* words after it */
    kent_command command;
    unsigned options;
} command_row;

static const command_row COMMANDS[] = {
    {"run", "one CASE", 1, 1, KENT_RUN, GAVE_ALL},
    {"check", "one CASE", 1, 1, KENT_CHECK,
     GAVE_UNITS | GAVE_WIDE | GAVE_QUIET | GAVE_KEYS},
    {"explain", "a CASE and at most 8 FITTINGs", 1, 1 + KENT_OPTIONS_WORDS,
     KENT_EXPLAIN, GAVE_SCENARIO | GAVE_UNITS | GAVE_THREADS | GAVE_WIDE | GAVE_QUIET},
    {"cross-check", "one CASE", 1, 1, KENT_CROSS_CHECK,
     GAVE_SCENARIO | GAVE_UNITS | GAVE_THREADS | GAVE_WIDE | GAVE_QUIET},
    {"as-built", "a CASE and at most 8 FITTINGs", 1, 1 + KENT_OPTIONS_WORDS,
     KENT_AS_BUILT,
     GAVE_SCENARIO | GAVE_UNITS | GAVE_THREADS | GAVE_FORMAT | GAVE_WIDE | GAVE_QUIET |
         GAVE_STRICT},
    {"standard-table", "one FILE", 1, 1, KENT_STANDARD_TABLE,
     GAVE_UNITS | GAVE_THREADS | GAVE_FORMAT | GAVE_WIDE | GAVE_QUIET | GAVE_STRICT},
    {"catalogue", "a part and at most 8 words", 0, 1 + KENT_OPTIONS_WORDS,
     KENT_CATALOGUE_LIST, GAVE_UNITS | GAVE_WIDE | GAVE_QUIET},
};
enum { COMMAND_COUNT = sizeof COMMANDS / sizeof COMMANDS[0] };

static const char *const LATER[] = {"draw",        "vary",        "find-limit",
                                    "probability", "from-survey", "serve"};
enum { LATER_COUNT = sizeof LATER / sizeof LATER[0] };

static const char *const PARTS[] = {"pipes",     "soils", "valves",   "rules",
                                    "materials", "pumps", "concretes"};
enum { PART_COUNT = sizeof PARTS / sizeof PARTS[0] };

static const char ARGUMENTS[] =
    "run CASE\n"
    "check CASE\n"
    "check --keys\n"
    "explain CASE [FITTING...]\n"
    "cross-check CASE\n"
    "as-built CASE [FITTING...]\n"
    "standard-table FILE\n"
    "catalogue [pipes|materials|valves|pumps|soils|concretes|rules [WORD...]]";

static const char DOCUMENT[] =
    "Restraint of buried pressure mains: thrust blocks and restrained lengths, from "
    "the "
    "surge that loads them.\v"
    "run        steady state, every scenario, thrust, restraint: two tables and a "
    "folder "
    "of results\n"
    "check      what was understood of a case: points, pipes, fittings, values "
    "assumed\n"
    "explain    the numbers of every FITTING named, else of all, as a hand "
    "calculation\n"
    "cross-check  peaks by a second, independent method beside those of the run\n"
    "as-built   the factor that blocks and joints reach by the dimensions that were "
    "built\n"
    "standard-table  sizes x fittings x soils of FILE at one pressure, with all that "
    "the "
    "table stands on\n"
    "catalogue  what config/ offers, each row with its source; of one part the rows "
    "that "
    "have every WORD\n"
    "\n"
    "CASE is a case file, - standard input. Results go to standard output, everything "
    "else to standard error. Exit status: 0 done; 1 could not be done; 2 bad input or "
    "usage, nothing was written; 3 done, but with --strict a limit is exceeded.";

enum {
    KEY_NO_FILES = 0x100,
    KEY_STRICT,
    KEY_WIDE,
    KEY_THREADS,
    KEY_UNITS,
    KEY_FORMAT,
    KEY_KEYS,
    KEY_SENSITIVITY,
    KEY_SORT,
    KEY_ONLY
};

static const struct argp_option OPTIONS[] = {
    {"out", 'o', "DIR", 0,
     "Folder of results; default: the case's name with -results, here", 0},
    {"scenario", 's', "ID", 0, "Run this scenario only; may be given several times", 0},
    {"units", KEY_UNITS, "SI|US", 0, "Units shown; default: the case's", 0},
    {"threads", KEY_THREADS, "N", 0, "Default: as many as there are processors", 0},
    {"format", KEY_FORMAT, "table|csv|json", 0, "What goes to standard output", 0},
    {"wide", KEY_WIDE, NULL, 0, "Lines beyond 100 columns, and more of them", 0},
    {"quiet", 'q', NULL, 0, "Nothing but errors on standard error", 0},
    {"strict", KEY_STRICT, NULL, 0, "Status 3 where a limit is exceeded", 0},
    {"no-files", KEY_NO_FILES, NULL, 0, "Write no folder of results", 0},
    {"sensitivity", KEY_SENSITIVITY, NULL, 0,
     "How peaks and blocks move with wave speed, inertia, check and air valves, times",
     0},
    {"sort", KEY_SORT, "station|use|thrust|concrete", 0,
     "Order of the fittings listed; default: what cannot be held, then along the main",
     0},
    {"only", KEY_ONLY, "not-held|blocks|joints", 0, "List these fittings alone", 0},
    {"keys", KEY_KEYS, NULL, 0, "Print every key that a case may hold, without a CASE",
     0},
    {"version", 'V', NULL, 0, "Print the version", -1},
    {0}};

/* ---- reading --------------------------------------------------------------------- */

typedef struct reading {
    kent_options *options;
    const char *words[2 + KENT_OPTIONS_WORDS]; /* command and what follows it */
    size_t word_count;
    unsigned gave;
    bool failed; /* no memory */
} reading;

const char *kent_options_nearest(const char *word, const char *const *words,
                                 size_t count)
{
    const char *nearest = NULL;
    size_t least = SIZE_MAX;
    for (size_t i = 0; i < count; i++) {
        if (strcasecmp(word, words[i]) == 0) return words[i];
        const size_t distance = kent_text_distance(word, words[i]);
        const size_t near = 1 + strlen(words[i]) / 3;
        if (distance > near || distance >= least) continue;
        nearest = words[i];
        least = distance;
    }
    return nearest;
}

/* One of some words, or a usage error that offers the nearest. */
static size_t choose(struct argp_state *state, const char *what, const char *given,
                     const char *const *words, size_t count)
{
    kent_text all = {0};
    for (size_t i = 0; i < count; i++) {
        if (strcasecmp(given, words[i]) == 0) return i;
    }
    for (size_t i = 0; i < count; i++) {
        kent_text_add(&all, "%s%s", i > 0 ? ", " : "", words[i]);
    }
    argp_error(state, "'%s' is not %s; one of %s", given, what, kent_text_of(&all));
    kent_text_clear(&all); /* not reached: argp_error ends the program */
    return 0;
}

static void read_threads(struct argp_state *state, const char *text, kent_options *o)
{
    char *end = NULL;
    errno = 0;
    const unsigned long n = strtoul(text, &end, 10);
    if (text[0] < '0' || text[0] > '9' || *end != '\0' || errno != 0 || n < 1 ||
        n > 1024) {
        argp_error(state, "--threads: '%s' is not a number from 1 to 1024", text);
    }
    o->threads = (unsigned)n;
}

static void add_scenario(reading *r, const char *id)
{
    kent_options *o = r->options;
    void *scenarios = o->scenarios;
    if (kent_grow(&scenarios, &o->scenario_capacity, o->scenario_count + 1,
                  sizeof *o->scenarios) != 0) {
        r->failed = true;
        return;
    }
    o->scenarios = scenarios;
    o->scenarios[o->scenario_count++] = id;
}

static const command_row *find_command(struct argp_state *state, const reading *r)
{
    const char *given = r->words[0];
    const char *word = strcmp(given, "catalog") == 0 ? "catalogue" : given;
    const char *words[COMMAND_COUNT];
    for (size_t i = 0; i < COMMAND_COUNT; i++) {
        if (strcmp(word, COMMANDS[i].word) == 0) return &COMMANDS[i];
        words[i] = COMMANDS[i].word;
    }
    for (size_t i = 0; i < LATER_COUNT; i++) {
        if (strcmp(word, LATER[i]) == 0) {
            argp_error(state, "'%s' is not in this version", word);
        }
    }
    const char *near = kent_options_nearest(word, words, COMMAND_COUNT);
    const char *dot = strrchr(word, '.');
    if (near) {
        argp_error(state, "'%s' is not a command; did you mean '%s'?", word, near);
    } else if (dot && strcmp(dot, ".cfg") == 0) {
        argp_error(state, "'%s' is not a command; for a case write 'run %s'", word,
                   word);
    } else {
        argp_error(state,
                   "'%s' is not a command; one of run, check, explain, "
                   "cross-check, as-built, standard-table, "
                   "catalogue",
                   word);
    }
    return NULL; /* not reached: argp_error ends the program */
}

static void check_options(struct argp_state *state, const command_row *c, unsigned gave)
{
    static const struct {
        unsigned bit;
        const char *name;
    } NAMES[] = {{GAVE_OUT, "--out"},
                 {GAVE_SCENARIO, "--scenario"},
                 {GAVE_THREADS, "--threads"},
                 {GAVE_FORMAT, "--format"},
                 {GAVE_STRICT, "--strict"},
                 {GAVE_NO_FILES, "--no-files"},
                 {GAVE_SENSITIVITY, "--sensitivity"},
                 {GAVE_SORT, "--sort"},
                 {GAVE_ONLY, "--only"},
                 {GAVE_KEYS, "--keys"}};
    for (size_t i = 0; i < sizeof NAMES / sizeof NAMES[0]; i++) {
        if ((gave & NAMES[i].bit) && !(c->options & NAMES[i].bit)) {
            argp_error(state, "'%s' has no option %s", c->word, NAMES[i].name);
        }
    }
    if ((gave & GAVE_OUT) && (gave & GAVE_NO_FILES)) {
        argp_error(state, "--out and --no-files exclude each other");
    }
}

static void finish(struct argp_state *state, reading *r)
{
    if (r->word_count == 0) {
        argp_error(state, "no command; one of run, check, explain, cross-check, "
                          "as-built, standard-table, catalogue");
    }
    const command_row *c = find_command(state, r);
    if (!c) return;
    const size_t after = r->word_count - 1;
    check_options(state, c, r->gave);
    if (r->options->keys) {
        if (after > 0) argp_error(state, "'check --keys' takes no CASE");
    } else if (after < c->least || after > c->most) {
        argp_error(state, "'%s' takes %s", c->word, c->wants);
    }
    r->options->command = c->command;
    if (after > 0) r->options->subject = r->words[1];
    for (size_t i = 2; i < r->word_count; i++) {
        r->options->words[r->options->word_count++] = r->words[i];
    }
    if (c->command != KENT_CATALOGUE_LIST || after == 0) return;
    r->options->subject =
        PARTS[choose(state, "a part of the catalogue", r->words[1], PARTS, PART_COUNT)];
}

/* An option that is a switch; false: it is none. */
static bool read_switch(int key, reading *r)
{
    kent_options *o = r->options;
    switch (key) {
    case 'q':
        o->quiet = true;
        r->gave |= GAVE_QUIET;
        return true;
    case KEY_WIDE:
        o->wide = true;
        r->gave |= GAVE_WIDE;
        return true;
    case KEY_STRICT:
        o->strict = true;
        r->gave |= GAVE_STRICT;
        return true;
    case KEY_SENSITIVITY:
        o->sensitivity = true;
        r->gave |= GAVE_SENSITIVITY;
        return true;
    case KEY_KEYS:
        o->keys = true;
        r->gave |= GAVE_KEYS;
        return true;
    case KEY_NO_FILES:
        o->no_files = true;
        r->gave |= GAVE_NO_FILES;
        return true;
    default:
        return false;
    }
}

static error_t read_key(int key, char *text, struct argp_state *state)
{
    static const char *const SYSTEMS[] = {"SI", "US"};
    static const char *const FORMATS[] = {"table", "csv", "json"};
    static const char *const SORTS[] = {"station", "use", "thrust", "concrete"};
    static const char *const ONLIES[] = {"not-held", "blocks", "joints"};
    reading *r = state->input;
    kent_options *o = r->options;
    if (read_switch(key, r)) return 0;
    switch (key) {
    case 'o':
        if (text[0] == '\0') argp_error(state, "--out: a folder's name is empty");
        o->out = text;
        r->gave |= GAVE_OUT;
        return 0;
    case 's':
        add_scenario(r, text);
        r->gave |= GAVE_SCENARIO;
        return 0;
    case KEY_UNITS:
        o->units = (kent_system)choose(state, "a system of units", text, SYSTEMS, 2);
        o->units_given = true;
        r->gave |= GAVE_UNITS;
        return 0;
    case KEY_THREADS:
        read_threads(state, text, o);
        r->gave |= GAVE_THREADS;
        return 0;
    case KEY_FORMAT:
        o->format = (kent_format)choose(state, "a format", text, FORMATS, 3);
        r->gave |= GAVE_FORMAT;
        return 0;
    case KEY_SORT:
        o->sort = (kent_sort)(1 + choose(state, "an order", text, SORTS, 4));
        r->gave |= GAVE_SORT;
        return 0;
    case KEY_ONLY:
        o->only =
            (kent_only)(1 + choose(state, "a choice of fittings", text, ONLIES, 3));
        r->gave |= GAVE_ONLY;
        return 0;
    case 'V':
        (void)printf("kentledge %s\n", KENT_VERSION);
        exit(KENT_EXIT_DONE);
    case ARGP_KEY_ARG:
        if (r->word_count == 2 + KENT_OPTIONS_WORDS) {
            argp_error(state, "'%s' is one word too many", text);
        }
        r->words[r->word_count++] = text;
        return 0;
    case ARGP_KEY_END:
        finish(state, r);
        return 0;
    default:
        return ARGP_ERR_UNKNOWN;
    }
}

int kent_options_read(int argc, char **argv, kent_options *o)
{
    static const struct argp PARSER = {OPTIONS, read_key, ARGUMENTS, DOCUMENT,
                                       NULL,    NULL,     NULL};
    reading r = {.options = o};
    argp_err_exit_status = KENT_EXIT_INPUT;
    const error_t failed = argp_parse(&PARSER, argc, argv, 0, NULL, &r);
    return failed != 0 || r.failed ? -1 : 0;
}

void kent_options_clear(kent_options *o)
{
    free(o->scenarios);
    *o = (kent_options){0};
}
