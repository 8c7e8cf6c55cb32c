#include "kent_folder.h"

#include "kent_alloc.h"
#include "kent_text.h"

#include <dirent.h>
#include <errno.h>
#include <fcntl.h>
#include <fts.h>
#include <stdbool.h>
#include <stdlib.h>
#include <string.h>
#include <sys/file.h>
#include <sys/stat.h>
#include <unistd.h>

/* Names beside the final one. A folder being filled is "PATH.part-PID-N" and holds
 * UNFINISHED until just before the swap; its maker keeps it locked (flock), so that a
 * later run can tell a running neighbour from a dead one. "PATH.old-PID-N" is the old
 * folder between the two renames, where the file system knows no exchange. */
static const char UNFINISHED[] = ".unfinished";
enum { TRIES = 100 };

struct kent_folder {
    char *path;   /* final place, no slash at its end */
    char *marker; /* name of the file that makes a folder ours */
    char *part;   /* being filled; NULL once it is in place */
    int lock;     /* descriptor of the folder being filled, locked; -1: none */
    bool failed;  /* a write went wrong: never commit */
};

static kent_status io_error(kent_error *err, const char *path, const char *doing)
{
    return kent_error_set(err, KENT_E_IO, path, "%s: %s", doing, strerror(errno));
}

/* "a" + "b", NULL: no memory. */
static char *joined(const char *a, const char *between, const char *b)
{
    kent_text t = {0};
    kent_text_add(&t, "%s%s%s", a, between, b);
    if (t.failed) kent_text_clear(&t);
    return t.s;
}

static bool is_folder(const char *path)
{
    struct stat st;
    return lstat(path, &st) == 0 && S_ISDIR(st.st_mode);
}

/* Whether the folder at path holds a plain file of that name. */
static bool folder_holds(const char *path, const char *name)
{
    struct stat st;
    const int folder = open(path, O_RDONLY | O_DIRECTORY | O_NOFOLLOW | O_CLOEXEC);
    if (folder < 0) return false;
    const bool holds =
        fstatat(folder, name, &st, AT_SYMLINK_NOFOLLOW) == 0 && S_ISREG(st.st_mode);
    (void)close(folder);
    return holds;
}

/* Removes a folder with everything in it, the files `last` and UNFINISHED at the
 * very end: what an interruption leaves can still be known as ours. */
static int remove_tree(char *path, const char *last)
{
    char *const roots[] = {path, NULL}; /* fts wants it writable, and leaves it */
    FTS *walk = fts_open(roots, FTS_PHYSICAL | FTS_NOCHDIR, NULL);
    if (!walk) return -1;

    for (FTSENT *e = fts_read(walk); e != NULL; e = fts_read(walk)) {
        const bool is_known =
            strcmp(e->fts_name, last) == 0 || strcmp(e->fts_name, UNFINISHED) == 0;
        if (e->fts_info == FTS_D || e->fts_level == 0) continue;
        if (e->fts_level == 1 && is_known) continue;
        (void)(e->fts_info == FTS_DP ? rmdir(e->fts_path) : unlink(e->fts_path));
    }
    (void)fts_close(walk);

    const int folder = open(path, O_RDONLY | O_DIRECTORY | O_NOFOLLOW | O_CLOEXEC);
    if (folder < 0) return -1;
    (void)unlinkat(folder, last, 0);
    (void)unlinkat(folder, UNFINISHED, 0);
    (void)close(folder);
    return rmdir(path);
}

/* Whether name is base + tag + digits "-" digits. */
static bool is_beside(const char *name, const char *base, const char *tag)
{
    const size_t base_length = strlen(base), tag_length = strlen(tag);
    if (strncmp(name, base, base_length) != 0) return false;
    name += base_length;
    if (strncmp(name, tag, tag_length) != 0) return false;
    name += tag_length;
    const size_t pid = strspn(name, "0123456789");
    if (pid == 0 || name[pid] != '-') return false;
    const size_t number = strspn(name + pid + 1, "0123456789");
    return number > 0 && name[pid + 1 + number] == '\0';
}

/* One leftover of a run that died. */
static void repair_one(const kent_folder *f, char *leftover, bool is_old)
{
    const bool marked = folder_holds(leftover, f->marker);
    if (is_old && marked && !is_folder(f->path)) {
        (void)rename(leftover, f->path); /* died between the two renames */
        return;
    }
    if (!marked && !folder_holds(leftover, UNFINISHED)) {
        (void)rmdir(leftover); /* ours only if empty; a stranger's stays */
        return;
    }
    const int folder = open(leftover, O_RDONLY | O_DIRECTORY | O_NOFOLLOW | O_CLOEXEC);
    if (folder < 0) return;
    if (flock(folder, LOCK_EX | LOCK_NB) == 0) (void)remove_tree(leftover, f->marker);
    (void)close(folder);
}

/* Walks the parent folder for what interrupted runs left. Best effort: what cannot be
 * repaired shows as an error of the swap itself. */
static void repair(const kent_folder *f)
{
    const char *slash = strrchr(f->path, '/');
    const char *base = slash ? slash + 1 : f->path;
    char *parent = kent_copy_text(f->path);
    DIR *listing = NULL;

    if (!parent) goto done;
    if (slash) parent[slash - f->path + 1] = '\0'; /* keeps the slash: "/" stays */
    listing = opendir(slash ? parent : ".");
    if (!listing) goto done;
    for (const struct dirent *e = readdir(listing); e != NULL; e = readdir(listing)) {
        const bool is_old = is_beside(e->d_name, base, ".old-");
        if (!is_old && !is_beside(e->d_name, base, ".part-")) continue;
        char *leftover = joined(slash ? parent : "", "", e->d_name);
        if (leftover) repair_one(f, leftover, is_old);
        free(leftover);
    }
done:
    if (listing) (void)closedir(listing);
    free(parent);
}

/* A name beside path that nothing has yet; NULL: no memory. */
static char *beside(const char *path, const char *tag, int n)
{
    kent_text t = {0};
    kent_text_add(&t, "%s%s%ld-%d", path, tag, (long)getpid(), n);
    if (t.failed) kent_text_clear(&t);
    return t.s;
}

static kent_status make_part(kent_folder *f, kent_error *err)
{
    int made = -1;
    for (int n = 0; n < TRIES && made != 0; n++) {
        free(f->part);
        f->part = beside(f->path, ".part-", n);
        if (!f->part) return kent_error_nomem(err);
        made = mkdir(f->part, 0777);
        if (made != 0 && errno != EEXIST) break;
    }
    if (made != 0) {
        const int why = errno;
        free(f->part);
        f->part = NULL;
        errno = why;
        return io_error(err, f->path, "nothing can be written beside it");
    }

    f->lock = open(f->part, O_RDONLY | O_DIRECTORY | O_CLOEXEC);
    if (f->lock < 0) return io_error(err, f->part, "cannot be opened");
    (void)flock(f->lock, LOCK_EX | LOCK_NB); /* where locks are unknown: without */
    const int sign =
        openat(f->lock, UNFINISHED, O_WRONLY | O_CREAT | O_EXCL | O_CLOEXEC, 0666);
    if (sign < 0) return io_error(err, f->part, "cannot be written");
    (void)close(sign);
    return KENT_OK;
}

/* Nothing at path, or a folder of ours. */
static kent_status check_place(const kent_folder *f, kent_error *err)
{
    struct stat st;
    if (lstat(f->path, &st) != 0) {
        return errno == ENOENT ? KENT_OK
                               : io_error(err, f->path, "cannot be looked at");
    }
    if (!S_ISDIR(st.st_mode)) {
        return kent_error_set(err, KENT_E_IO, f->path,
                              "it exists and is no folder; name another place");
    }
    if (!folder_holds(f->path, f->marker)) {
        return kent_error_set(
            err, KENT_E_IO, f->path,
            "a folder without %s stands there and is left alone; name "
            "another place, or remove it",
            f->marker);
    }
    return KENT_OK;
}

kent_status kent_folder_open(const char *path, const char *marker, kent_folder **out,
                             kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    kent_folder *f = kent_alloc(1, sizeof *f);
    if (!f) goto done;
    f->lock = -1;
    f->path = kent_copy_text(path);
    f->marker = kent_copy_text(marker);
    if (!f->path || !f->marker) goto done;

    for (size_t n = strlen(f->path); n > 1 && f->path[n - 1] == '/'; n--) {
        f->path[n - 1] = '\0';
    }
    const char *slash = strrchr(f->path, '/');
    const char *base = slash ? slash + 1 : f->path;
    if (base[0] == '\0' || strcmp(base, ".") == 0 || strcmp(base, "..") == 0) {
        status = kent_error_set(err, KENT_E_IO, path,
                                "it names no folder that could be replaced");
        goto done;
    }
    repair(f);
    status = check_place(f, err);
    if (status == KENT_OK) status = make_part(f, err);
    if (status != KENT_OK) goto done;
    *out = f;
    f = NULL; /* handed over */
done:
    kent_folder_free(f);
    return status == KENT_E_NOMEM ? kent_error_nomem(err) : status;
}

/* A plain name, or one subfolder and a plain name; nothing that climbs out. */
static bool is_inside(const char *name)
{
    const char *slash = strchr(name, '/');
    if (name[0] == '\0' || name[0] == '/' || strstr(name, "..") != NULL) return false;
    return !slash || (slash[1] != '\0' && strchr(slash + 1, '/') == NULL);
}

FILE *kent_folder_create(kent_folder *f, const char *name, kent_error *err)
{
    FILE *file = NULL;
    char *sub = NULL;
    char *full = NULL;

    if (!f->part || !is_inside(name)) {
        (void)kent_error_set(err, KENT_E_IO, name, "it is no name inside the folder");
        goto done;
    }
    full = joined(f->part, "/", name);
    sub = full ? kent_copy_text(full) : NULL;
    if (!sub) {
        (void)kent_error_nomem(err);
        goto done;
    }
    if (strchr(name, '/')) {
        *strrchr(sub, '/') = '\0';
        if (mkdir(sub, 0777) != 0 && errno != EEXIST) {
            (void)io_error(err, sub, "cannot be made");
            goto done;
        }
    }
    file = fopen(full, "wxe");
    if (!file) (void)io_error(err, full, "cannot be written");
done:
    if (!file) f->failed = true;
    free(sub);
    free(full);
    return file;
}

kent_status kent_folder_close(kent_folder *f, FILE *file, const char *name,
                              kent_error *err)
{
    /* An earlier failed write left its mark on the stream; errno may be stale then. */
    errno = 0;
    const bool wrong = ferror(file) != 0 || fflush(file) != 0;
    const int why = errno;
    const bool closed = fclose(file) == 0;
    if (!wrong && closed) return KENT_OK;

    f->failed = true;
    if (wrong) errno = why;
    return kent_error_set(err, KENT_E_IO, name, "it could not be written in full%s%s",
                          errno ? ": " : "", errno ? strerror(errno) : "");
}

/* Two renames for a file system without an exchange. In between nothing stands at
 * path; repair() of a later run puts the old folder back. */
static kent_status swap_in_two_steps(kent_folder *f, kent_error *err)
{
    kent_status status = KENT_OK;
    char *old = NULL;
    int moved = -1;

    for (int n = 0; n < TRIES && moved != 0; n++) {
        free(old);
        old = beside(f->path, ".old-", n);
        if (!old) return kent_error_nomem(err);
        moved = rename(f->path, old);
        if (moved != 0 && errno != EEXIST && errno != ENOTEMPTY) break;
    }
    if (moved != 0) {
        status = io_error(err, f->path, "cannot be moved aside");
        goto done;
    }
    if (rename(f->part, f->path) != 0) {
        status = io_error(err, f->path, "cannot be put in place");
        (void)rename(old, f->path);
        goto done;
    }
    free(f->part);
    f->part = NULL;
    (void)remove_tree(old, f->marker);
done:
    free(old);
    return status;
}

kent_status kent_folder_commit(kent_folder *f, kent_error *err)
{
    if (f->failed || !f->part || !folder_holds(f->part, f->marker)) {
        return kent_error_set(err, KENT_E_IO, f->path,
                              "its files are not complete; nothing was replaced");
    }
    kent_status status = check_place(f, err); /* somebody may have come meanwhile */
    if (status != KENT_OK) return status;
    if (unlinkat(f->lock, UNFINISHED, 0) != 0) {
        return io_error(err, f->part, "cannot be finished");
    }

    if (!is_folder(f->path)) {
        if (rename(f->part, f->path) != 0) {
            return io_error(err, f->path, "cannot be put in place");
        }
    } else if (renameat2(AT_FDCWD, f->part, AT_FDCWD, f->path, RENAME_EXCHANGE) == 0) {
        (void)remove_tree(f->part, f->marker); /* holds the old one now */
    } else if (errno == EINVAL || errno == ENOSYS || errno == EOPNOTSUPP) {
        return swap_in_two_steps(f, err);
    } else {
        return io_error(err, f->path, "cannot be put in place");
    }
    free(f->part);
    f->part = NULL;
    return KENT_OK;
}

void kent_folder_free(kent_folder *f)
{
    if (!f) return;
    if (f->part) (void)remove_tree(f->part, f->marker);
    if (f->lock >= 0) (void)close(f->lock);
    free(f->part);
    free(f->marker);
    free(f->path);
    free(f);
}
