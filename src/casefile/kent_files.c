#include "kent_files.h"

#include <errno.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/stat.h>

enum {
    SIZE_MOST = 64 * 1024 * 1024, /* bytes of all files together */
    LINE_MOST = 65536             /* bytes */
};

static const char MARK[] = "\xEF\xBB\xBF"; /* byte-order mark */

static kent_status slurp(FILE *file, size_t most, kent_file_bytes *out, kent_error *err,
                         const char *name)
{
    size_t capacity = 0;
    for (;;) {
        if (kent_grow((void **)&out->bytes, &capacity, out->size + 65536 + 1, 1) != 0) {
            return kent_error_nomem(err);
        }
        const size_t got = fread(out->bytes + out->size, 1, 65536, file);
        out->size += got;
        if (ferror(file)) {
            return kent_error_set(err, KENT_E_IO, name, "cannot be read: %s",
                                  strerror(errno));
        }
        if (got == 0 || out->size > most) break;
    }
    out->bytes[out->size] = '\0';
    return KENT_OK;
}

/* What no line of a file may hold. */
static bool bytes_are_text(const kent_file_bytes *s, const char *name, bool marked,
                           kent_complaints *complaints)
{
    const unsigned char *p = (const unsigned char *)s->bytes;
    if (!marked && s->size >= 3 && memcmp(p, MARK, 3) == 0) {
        kent_complain(
            complaints, name, 1,
            "the file starts with a byte-order mark; save it as UTF-8 without one");
        return false;
    }
    if (s->size >= 2 &&
        (memcmp(p, "\xFF\xFE", 2) == 0 || memcmp(p, "\xFE\xFF", 2) == 0)) {
        kent_complain(complaints, name, 1, "the file is UTF-16; save it as UTF-8");
        return false;
    }
    int line = 1;
    size_t start = 0;
    for (size_t i = 0; i < s->size;) {
        if (p[i] == '\0') {
            kent_complain(complaints, name, line,
                          "the line holds a NUL byte; a case is plain text in UTF-8");
            return false;
        }
        const size_t n = kent_text_sequence(s->bytes + i);
        if (n == 0) {
            kent_complain(complaints, name, line,
                          "byte 0x%02X is not UTF-8; save the file as UTF-8",
                          (unsigned)p[i]);
            return false;
        }
        if (i - start > LINE_MOST) {
            kent_complain(complaints, name, line,
                          "the line is longer than %d bytes; break it", LINE_MOST);
            return false;
        }
        if (p[i] == '\n') {
            line++;
            start = i + 1;
        }
        i += n;
    }
    return true;
}

/* The byte-order mark goes; "\r\n" and lone "\r" become "\n". */
static void make_plain(kent_file_bytes *s)
{
    size_t to = 0;
    for (size_t i = strncmp(s->bytes, MARK, 3) == 0 ? 3 : 0; i < s->size; i++) {
        if (s->bytes[i] != '\r') {
            s->bytes[to++] = s->bytes[i];
        } else if (s->bytes[i + 1] != '\n') {
            s->bytes[to++] = '\n';
        }
    }
    s->bytes[to] = '\0';
    s->size = to;
}

static int add_name(kent_files *f, const char *name)
{
    if (kent_grow((void **)&f->names, &f->capacity, f->count + 1, sizeof *f->names) !=
        0) {
        return -1;
    }
    f->names[f->count] = kent_copy_text(name);
    if (!f->names[f->count]) return -1;
    return (int)f->count++;
}

/* Reads an open file; the caller closes it. */
static kent_status take(kent_files *f, FILE *file, const char *shown, bool marked,
                        kent_file_bytes *out, kent_complaints *complaints,
                        kent_error *err)
{
    kent_file_bytes s = {.file = add_name(f, shown)};
    kent_status status = s.file < 0 ? kent_error_nomem(err) : KENT_OK;
    if (status == KENT_OK) {
        const size_t room = f->total < SIZE_MOST ? SIZE_MOST - f->total : 0;
        status = slurp(file, room, &s, err, shown);
    }
    if (status != KENT_OK) goto done;
    f->total += s.size;
    for (size_t i = 0; i < s.size; i++) {
        f->checksum ^= (unsigned char)s.bytes[i];
        f->checksum *= 1099511628211ULL;
    }
    status = KENT_E_INPUT;
    if (f->total > SIZE_MOST) {
        kent_complain(complaints, shown, 1, "the case is larger than %d MB",
                      SIZE_MOST / (1024 * 1024));
    } else if (bytes_are_text(&s, shown, marked, complaints)) {
        make_plain(&s);
        *out = s;
        s.bytes = NULL; /* handed over */
        status = KENT_OK;
    }
done:
    free(s.bytes);
    return status;
}

kent_status kent_files_start(kent_files *f, const char *path, kent_file_bytes *out,
                             kent_complaints *complaints, kent_error *err)
{
    const bool standard_input = strcmp(path, "-") == 0;
    const char *slash = strrchr(path, '/');
    kent_status status = KENT_OK;
    FILE *file = standard_input ? stdin : fopen(path, "rb");
    if (!file) {
        return kent_error_set(err, KENT_E_IO, path, "cannot be opened: %s",
                              strerror(errno));
    }
    f->checksum = 14695981039346656037ULL;
    f->folder = kent_copy_text(path);
    if (f->folder) {
        f->folder[slash ? slash - path + 1 : 0] = '\0';
        status = take(f, file, standard_input ? "standard input" : path, false, out,
                      complaints, err);
    } else {
        status = kent_error_nomem(err);
    }
    if (!standard_input) (void)fclose(file);
    return status;
}

kent_status kent_files_beside(kent_files *f, const char *name, const char *says,
                              kent_place at, bool marked, kent_file_bytes *out,
                              kent_complaints *complaints, kent_error *err)
{
    const char *where = f->names[at.file];
    char path[1024];
    struct stat kind = {0};
    if (name[0] == '/' || name[0] == '\0' || strstr(name, "..") || strchr(name, '\\')) {
        kent_complain(complaints, where, at.line,
                      "%s leaves the folder of the case; only files of that folder or "
                      "below it are read",
                      says);
        return KENT_E_INPUT;
    }
    const int n = snprintf(path, sizeof path, "%s%s", f->folder, name);
    if (n < 0 || (size_t)n >= sizeof path) {
        kent_complain(complaints, where, at.line, "%s: the path is too long", says);
        return KENT_E_INPUT;
    }
    if (stat(path, &kind) == 0 && !S_ISREG(kind.st_mode)) {
        kent_complain(complaints, where, at.line, "%s is not a file", says);
        return KENT_E_INPUT;
    }
    FILE *file = fopen(path, "rb");
    if (!file) {
        kent_complain(complaints, where, at.line, "%s: %s; it is looked for as %s",
                      says, strerror(errno), path);
        return KENT_E_INPUT;
    }
    const kent_status status = take(f, file, path, marked, out, complaints, err);
    (void)fclose(file);
    return status;
}

void kent_files_clear(kent_files *f)
{
    for (size_t i = 0; i < f->count; i++) {
        free(f->names[i]);
    }
    free(f->names);
    free(f->folder);
    *f = (kent_files){0};
}
