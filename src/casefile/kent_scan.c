/* A small lexer for libconfig's syntax: strings, comments, numbers, names, brackets. */
#include "kent_scan.h"

#include <errno.h>
#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

enum {
    STRING_MOST = 4096, /* bytes; libconfig takes quadratic time in it */
    NEST_MOST = 32,
    INCLUDE_MOST = 8,
    LEXEME_SHOWN = 40 /* bytes of an offending word that a message repeats */
};

typedef enum token {
    TOKEN_START, /* of a file, a group or a list; after a ';' */
    TOKEN_NAME,
    TOKEN_EQUALS,
    TOKEN_TEXT,
    TOKEN_NUMBER,
    TOKEN_VALUE, /* any other */
    TOKEN_COMMA
} token;

typedef struct source {
    char *bytes; /* owned, NUL-terminated */
    size_t size, at;
    int file, line;
} source;

typedef struct bracket {
    char open;
    int file, line;
    bool whole, fraction; /* kinds of number seen directly inside */
} bracket;

typedef struct scanner {
    kent_files *files;
    kent_scan *out;
    kent_complaints *complaints;
    kent_error *err;
    source stack[INCLUDE_MOST];
    int depth;
    bracket brackets[NEST_MOST];
    int nest;
    token last, last_but_one;
    char last_name[LEXEME_SHOWN + 1];
    bool stopped; /* out of memory, or nothing sensible can follow */
} scanner;

static source *top(scanner *s) { return &s->stack[s->depth - 1]; }

__attribute__((format(printf, 3, 4))) static void complain(scanner *s, int line,
                                                           const char *fmt, ...)
{
    char what[400];
    va_list args;
    va_start(args, fmt);
    (void)vsnprintf(what, sizeof what, fmt, args);
    va_end(args);
    kent_complain(s->complaints, s->files->names[top(s)->file], line, "%s", what);
}

/* Appends bytes of the top source; notes where each new line of text comes from. */
static void emit(scanner *s, const char *bytes, size_t count)
{
    kent_scan *out = s->out;
    const source *from = top(s);
    if (kent_grow((void **)&out->text, &out->text_capacity, out->length + count + 1,
                  1) != 0) {
        s->stopped = true;
        (void)kent_error_nomem(s->err);
        return;
    }
    const bool fresh = out->length == 0 || out->text[out->length - 1] == '\n';
    if (fresh && count > 0) {
        if (kent_grow((void **)&out->lines, &out->line_capacity, out->line_count + 1,
                      sizeof *out->lines) != 0) {
            s->stopped = true;
            (void)kent_error_nomem(s->err);
            return;
        }
        out->lines[out->line_count++] = (kent_place){from->file, from->line};
    }
    memcpy(out->text + out->length, bytes, count);
    out->length += count;
    out->text[out->length] = '\0';
}

/* ---- files ----------------------------------------------------------------------- */

static void push(scanner *s, const kent_file_bytes *from)
{
    s->stack[s->depth++] = (source){
        .bytes = from->bytes, .size = from->size, .file = from->file, .line = 1};
}

static void pop(scanner *s)
{
    const kent_scan *out = s->out;
    if (out->length > 0 && out->text[out->length - 1] != '\n') emit(s, "\n", 1);
    free(top(s)->bytes);
    s->depth--;
}

/* ---- lexemes --------------------------------------------------------------------- */

static bool is_name_start(char c)
{
    return (c >= 'A' && c <= 'Z') || (c >= 'a' && c <= 'z') || c == '*';
}

static bool is_digit(char c) { return c >= '0' && c <= '9'; }

static bool is_name_part(char c)
{
    return is_name_start(c) || is_digit(c) || c == '_' || c == '-';
}

static const char *open_word(char open)
{
    return open == '{' ? "}" : open == '(' ? ")" : "]";
}

static void see(scanner *s, token now)
{
    s->last_but_one = s->last;
    s->last = now;
}

static bool was_value(const scanner *s)
{
    return s->last == TOKEN_TEXT || s->last == TOKEN_NUMBER || s->last == TOKEN_VALUE;
}

static bool in_list(const scanner *s)
{
    return s->nest > 0 && s->brackets[s->nest - 1].open != '{';
}

/* A name or a '=' that nothing follows. */
static void complain_unfinished(scanner *s)
{
    if (s->last == TOKEN_NAME) {
        complain(s, top(s)->line, "'=' is missing after '%s'", s->last_name);
    } else if (s->last == TOKEN_EQUALS) {
        complain(s, top(s)->line, "a value is missing after '%s ='", s->last_name);
    }
}

/* A value without its name is complained of here: libconfig leaks what it had read. */
static void see_value(scanner *s, token kind)
{
    const int line = top(s)->line;
    const bool joins =
        kind == TOKEN_TEXT && s->last == TOKEN_TEXT; /* "a" "b" is "ab" */
    if (s->last == TOKEN_NAME) {
        complain_unfinished(s);
    } else if (in_list(s)) {
        if (was_value(s)) {
            complain(s, line, "a ',' is missing before this element of the list");
        }
    } else if (kind == TOKEN_NUMBER && s->last == TOKEN_COMMA &&
               s->last_but_one == TOKEN_NUMBER) {
        complain(s, line, "a comma stands in a number; decimals have a point, as 1.5");
    } else if (s->last != TOKEN_EQUALS && !joins) {
        complain(s, line, "a value stands here without a name; write name = value");
    }
    see(s, kind);
}

static size_t lex_string(scanner *s, const char *p)
{
    const int line = top(s)->line;
    size_t n = 1;
    while (p[n] != '"' && p[n] != '\n' && p[n] != '\0') {
        if (p[n] == '\\' && p[n + 1] == 'x') {
            complain(s, line, "\\x in a text is not read; write the character itself");
        }
        n += p[n] == '\\' && p[n + 1] != '\0' && p[n + 1] != '\n' ? 2 : 1;
    }
    if (p[n] != '"') {
        complain(s, line, "the text that starts here with \" does not end on its line");
        s->stopped = true;
    } else {
        n++;
    }
    if (n > STRING_MOST) {
        complain(s, line, "a text is longer than %d bytes", STRING_MOST);
        s->stopped = true;
    }
    see_value(s, TOKEN_TEXT);
    return n;
}

static size_t lex_comment(scanner *s, const char *p)
{
    size_t n = 0;
    if (p[1] == '*' && p[0] == '/') {
        const char *end = strstr(p + 2, "*/");
        if (end) return (size_t)(end - p) + 2;
        complain(s, top(s)->line, "the comment that starts here with /* does not end");
        s->stopped = true;
        return strlen(p);
    }
    while (p[n] != '\n' && p[n] != '\0') {
        n++;
    }
    return n;
}

static size_t number_length(const char *p)
{
    size_t n = 1;
    const bool hex = p[0] == '0' && (p[1] == 'x' || p[1] == 'X');
    while (is_name_part(p[n]) || p[n] == '.' || p[n] == '+') {
        const bool sign = p[n] == '+' || p[n] == '-';
        if (sign && (hex || (p[n - 1] != 'e' && p[n - 1] != 'E'))) break;
        n++;
    }
    return n;
}

static void note_number(scanner *s, bool whole, int line)
{
    bracket *in = s->nest > 0 ? &s->brackets[s->nest - 1] : NULL;
    if (!in || in->open != '[') return;
    const bool mixed = in->whole && in->fraction;
    in->whole = in->whole || whole;
    in->fraction = in->fraction || !whole;
    if (in->whole && in->fraction && !mixed) {
        complain(s, line,
                 "a list in [ ] mixes whole numbers and fractions; write every "
                 "number with a decimal point, or use ( )");
    }
}

static size_t lex_number(scanner *s, const char *p)
{
    const int line = top(s)->line;
    const size_t n = number_length(p);
    const size_t shown = n < LEXEME_SHOWN ? n : LEXEME_SHOWN;
    char text[LEXEME_SHOWN + 1];
    char *end = NULL;
    memcpy(text, p, shown);
    text[shown] = '\0';
    const bool hex = text[0] == '0' && (text[1] == 'x' || text[1] == 'X');
    const bool whole = hex || strcspn(text, ".eE") == shown;

    errno = 0;
    const double value = strtod(text, &end);
    if (whole && *end == 'L') end += end[1] == 'L' ? 2 : 1;
    if (*end != '\0' || n > LEXEME_SHOWN) {
        complain(s, line,
                 "'%s' is not a number; a value with a unit stands in quotes, as \"1.4 "
                 "m\"",
                 text);
    } else if (whole && !(fabs(value) <= 2147483647.0)) {
        complain(s, line, "%s is out of range; whole numbers go to 2147483647", text);
    } else if (errno == ERANGE || !isfinite(value)) {
        complain(s, line, "%s is out of range of any number", text);
    }
    note_number(s, whole, line);
    see_value(s, TOKEN_NUMBER);
    return n;
}

static size_t lex_name(scanner *s, const char *p)
{
    size_t n = 1;
    while (is_name_part(p[n])) {
        n++;
    }
    const int shown = (int)(n < LEXEME_SHOWN ? n : LEXEME_SHOWN);
    const bool truth = (n == 4 && strncasecmp(p, "true", 4) == 0) ||
                       (n == 5 && strncasecmp(p, "false", 5) == 0);
    const bool inside = in_list(s);
    const char next = p[n + strspn(p + n, " \t")];
    if (s->last == TOKEN_NUMBER && next != '=' && next != ':') {
        complain(s, top(s)->line,
                 "'%.*s' follows a number; a value and its unit stand in quotes "
                 "together, as \"1.4 m\"",
                 shown, p);
        see(s, TOKEN_VALUE);
        return n + strcspn(p + n, ";,)]}#\n"); /* the rest of the unit */
    }
    if (inside && !truth && next == '=') {
        const bracket *in = &s->brackets[s->nest - 1];
        complain(s, top(s)->line,
                 "'%.*s =' stands inside the '%c' of line %d, whose '%s' "
                 "seems to be missing",
                 shown, p, in->open, in->line, open_word(in->open));
        s->stopped = true;
    } else if (truth && (s->last == TOKEN_EQUALS || inside)) {
        see_value(s, TOKEN_VALUE);
    } else if (s->last == TOKEN_EQUALS || inside) {
        complain(s, top(s)->line, "'%.*s' is text and must stand in quotes: \"%.*s\"",
                 shown, p, shown, p);
        see(s, TOKEN_VALUE);
    } else {
        complain_unfinished(s);
        (void)snprintf(s->last_name, sizeof s->last_name, "%.*s", shown, p);
        see(s, TOKEN_NAME);
    }
    return n;
}

static void open_bracket(scanner *s, char open)
{
    const source *src = top(s);
    if (s->nest == NEST_MOST) {
        complain(s, src->line, "groups and lists are nested more than %d deep",
                 NEST_MOST);
        s->stopped = true;
        return;
    }
    see_value(s, TOKEN_VALUE);
    if (s->nest > 0 && s->brackets[s->nest - 1].open == '[') {
        complain(s, src->line,
                 "'%c' stands in [ ], which holds numbers and texts only; a "
                 "list of groups or lists stands in ( )",
                 open);
        s->stopped = true;
    }
    see(s, TOKEN_START);
    s->brackets[s->nest++] =
        (bracket){.open = open, .file = src->file, .line = src->line};
}

static void close_bracket(scanner *s, char close)
{
    const int line = top(s)->line;
    if (s->nest == 0) {
        complain(s, line, "'%c' closes nothing", close);
        s->stopped = true;
        return;
    }
    complain_unfinished(s);
    const bracket *in = &s->brackets[--s->nest];
    if (*open_word(in->open) != close) {
        complain(s, line, "'%c' stands where '%s' should close the '%c' of line %d",
                 close, open_word(in->open), in->open, in->line);
        s->stopped = true;
    } else if (close != '}' && s->last == TOKEN_COMMA) {
        complain(s, line, "a comma before '%c' leaves an empty place; take it out",
                 close);
    }
    see(s, TOKEN_VALUE);
}

/* The ',' or ';' at p. */
static void end_value(scanner *s, const char *p)
{
    const int line = top(s)->line;
    const char next = p[1 + strspn(p + 1, " \t\n")];
    complain_unfinished(s);
    if (in_list(s) && *p == ';' && (next == '"' || next == '{' || is_digit(next))) {
        const bracket *in = &s->brackets[s->nest - 1];
        complain(s, line,
                 "';' stands inside the '%c' of line %d; a ',' separates the elements "
                 "of a list",
                 in->open, in->line);
    } else if (s->last == TOKEN_START || s->last == TOKEN_COMMA) {
        complain(s, line, "'%c' follows nothing; take it out", *p);
    }
    see(s, *p == ',' ? TOKEN_COMMA : TOKEN_START);
}

static size_t lex_sign(scanner *s, const char *p)
{
    switch (*p) {
    case '{':
    case '(':
    case '[':
        open_bracket(s, *p);
        return 1;
    case '}':
    case ')':
    case ']':
        close_bracket(s, *p);
        return 1;
    case '=':
    case ':':
        if (s->last != TOKEN_NAME) {
            complain(s, top(s)->line, "'%c' stands here without a name before it", *p);
        }
        see(s, TOKEN_EQUALS);
        return 1;
    case ',':
    case ';':
        end_value(s, p);
        return 1;
    default: {
        const size_t n = kent_text_sequence(p);
        complain(s, top(s)->line,
                 "'%.*s' cannot stand here; texts stand between straight quotes \" \"",
                 (int)n, p);
        return n > 0 ? n : 1;
    }
    }
}

/* ---- @include -------------------------------------------------------------------- */

static void include(scanner *s, const char *name, int line)
{
    char says[100];
    kent_file_bytes found = {0};
    const kent_place at = {top(s)->file, line};
    (void)snprintf(says, sizeof says, "@include \"%.60s\"", name);
    if (s->depth == INCLUDE_MOST) {
        complain(s, line, "%s: files include each other more than %d deep", says,
                 INCLUDE_MOST);
        s->stopped = true;
        return;
    }
    const kent_status status = kent_files_beside(s->files, name, says, at, false,
                                                 &found, s->complaints, s->err);
    if (status == KENT_OK) {
        push(s, &found);
    } else if (status != KENT_E_INPUT) {
        s->stopped = true;
    }
}

/* A line that starts with '@'; it is replaced by the file it names. */
static void lex_include(scanner *s)
{
    source *src = top(s);
    const char *p = src->bytes + src->at;
    const int line = src->line;
    const size_t length = strcspn(p, "\n");
    char name[256];
    size_t from = strlen("@include");

    src->at += length;
    if (strncmp(p, "@include", from) != 0) {
        complain(s, line,
                 "'@' cannot stand here; to take in a file write @include \"...\"");
        return;
    }
    while (p[from] == ' ' || p[from] == '\t') {
        from++;
    }
    const size_t end = p[from] == '"' ? from + 1 + strcspn(p + from + 1, "\"\n") : from;
    if (p[from] != '"' || p[end] != '"' || end - from > sizeof name) {
        complain(s, line, "@include needs a file name in quotes, alone on its line");
        return;
    }
    const size_t rest = end + 1 + strspn(p + end + 1, " \t;");
    if (rest != length && p[rest] != '#') {
        complain(s, line, "@include needs a file name in quotes, alone on its line");
        return;
    }
    memcpy(name, p + from + 1, end - from - 1);
    name[end - from - 1] = '\0';
    include(s, name, line);
}

/* ---- all ------------------------------------------------------------------------- */

static void step(scanner *s)
{
    source *src = top(s);
    const char *p = src->bytes + src->at;
    size_t n = 1;

    if (*p == '@') {
        lex_include(s);
        return;
    }
    if (*p == '"') {
        n = lex_string(s, p);
    } else if (*p == '#' || (*p == '/' && (p[1] == '/' || p[1] == '*'))) {
        n = lex_comment(s, p);
    } else if (is_digit(*p) || ((*p == '-' || *p == '+' || *p == '.') &&
                                (is_digit(p[1]) || p[1] == '.'))) {
        n = lex_number(s, p);
    } else if (is_name_start(*p)) {
        n = lex_name(s, p);
    } else if (!strchr(" \t\n\f\v", *p)) {
        n = lex_sign(s, p);
    }
    emit(s, p, n);
    for (size_t i = 0; i < n; i++) {
        if (p[i] == '\n') src->line++;
    }
    src->at += n;
    /* A comment over several lines is emitted whole: map its later lines too. */
    for (size_t i = 0, line = 0; i + 1 < n && !s->stopped; i++) {
        if (p[i] != '\n') continue;
        line++;
        kent_scan *out = s->out;
        if (kent_grow((void **)&out->lines, &out->line_capacity, out->line_count + 1,
                      sizeof *out->lines) != 0) {
            (void)kent_error_nomem(s->err);
            s->stopped = true;
            return;
        }
        out->lines[out->line_count] = out->lines[out->line_count - 1];
        out->lines[out->line_count].line++;
        out->line_count++;
    }
}

static void scan_all(scanner *s)
{
    while (s->depth > 0 && !s->stopped) {
        const source *src = top(s);
        if (src->at < src->size) {
            step(s);
        } else if (s->depth > 1) {
            pop(s);
        } else {
            break; /* the last one stays, so that complaints have a file */
        }
    }
    if (s->depth > 0 && !s->stopped && s->nest > 0) {
        const bracket *in = &s->brackets[s->nest - 1];
        kent_complain(s->complaints, s->files->names[in->file], in->line,
                      "the '%c' of this line is never closed by '%s'", in->open,
                      open_word(in->open));
    }
    while (s->depth > 0) {
        pop(s);
    }
}

kent_status kent_scan_read(const char *path, kent_files *files, kent_scan *out,
                           kent_complaints *complaints, kent_error *err)
{
    const size_t before = complaints->count;
    kent_file_bytes first = {0};
    kent_status status = kent_files_start(files, path, &first, complaints, err);
    if (status != KENT_OK) return status;
    scanner *s = kent_alloc(1, sizeof *s);
    if (!s) {
        free(first.bytes);
        return kent_error_nomem(err);
    }
    *s = (scanner){.files = files, .out = out, .complaints = complaints, .err = err};
    push(s, &first);
    scan_all(s);
    free(s);
    if (err->status != KENT_OK) return err->status;
    if (complaints->count == before && !out->text) {
        kent_complain(complaints, files->names[0], 1, "the file is empty");
    }
    return complaints->count > before ? KENT_E_INPUT : KENT_OK;
}

void kent_scan_clear(kent_scan *s)
{
    free(s->lines);
    free(s->text);
    *s = (kent_scan){0};
}
