#include "kent_folder.h"
#include "kent_alloc_fail.h"
#include "kent_check.h"

#include <dirent.h>
#include <errno.h>
#include <signal.h>
#include <stdbool.h>
#include <stdlib.h>
#include <string.h>
#include <sys/resource.h>
#include <sys/stat.h>
#include <sys/wait.h>
#include <unistd.h>

/* ---- the two calls that swap, stood in for -------------------------------------- */

int __real_rename(const char *from, const char *to);                   /* NOLINT */
int __wrap_rename(const char *from, const char *to);                   /* NOLINT */
int __real_renameat2(int from_folder, const char *from, int to_folder, /* NOLINT */
                     const char *to, unsigned flags);
int __wrap_renameat2(int from_folder, const char *from, int to_folder, /* NOLINT */
                     const char *to, unsigned flags);

enum { DIED = 77 }; /* exit status of a child that "lost power" */

static bool no_exchange;   /* a file system that cannot */
static int die_at_rename;  /* before the n-th rename, counted from 1; 0: never */
static int fail_at_rename; /* likewise, but the call fails */
static int renames;

int __wrap_rename(const char *from, const char *to) /* NOLINT */
{
    renames++;
    if (renames == die_at_rename) _exit(DIED);
    if (renames == fail_at_rename) {
        errno = EIO;
        return -1;
    }
    return __real_rename(from, to);
}

int __wrap_renameat2(int from_folder, const char *from, int to_folder, /* NOLINT */
                     const char *to, unsigned flags)
{
    if (no_exchange) {
        errno = EINVAL;
        return -1;
    }
    return __real_renameat2(from_folder, from, to_folder, to, flags);
}

/* ---- a place to work in ---------------------------------------------------------- */

static char place[] = "kent-folder-XXXXXX"; /* mkdtemp fills it in */
static const char MARKER[] = "results.json";

static int enter(void **state)
{
    (void)state;
    memcpy(place + strlen(place) - 6, "XXXXXX", 6);
    no_exchange = false;
    die_at_rename = fail_at_rename = renames = 0;
    return chdir("/tmp") != 0 || !mkdtemp(place) || chdir(place) != 0;
}

static int leave(void **state)
{
    (void)state;
    char command[64];
    if (chdir("/tmp") != 0) return -1;
    (void)snprintf(command, sizeof command, "rm -rf '%s'", place);
    return system(command); /* NOLINT: a test's own folder */
}

/* Entries of a folder, "." and ".." not counted; -1: no such folder. */
static int entries(const char *path)
{
    DIR *listing = opendir(path);
    int count = 0;
    if (!listing) return -1;
    while (readdir(listing)) {
        count++;
    }
    (void)closedir(listing);
    return count - 2;
}

static void put(kent_folder *f, const char *name, const char *text)
{
    kent_error err = {0};
    FILE *file = kent_folder_create(f, name, &err);
    assert_non_null(file);
    (void)fputs(text, file);
    assert_int_equal(kent_folder_close(f, file, name, &err), KENT_OK);
}

static void write_whole(const char *path, const char *text)
{
    kent_error err = {0};
    kent_folder *f = NULL;
    assert_int_equal(kent_folder_open(path, MARKER, &f, &err), KENT_OK);
    put(f, MARKER, text);
    put(f, "plots/a.svg", text);
    assert_int_equal(kent_folder_commit(f, &err), KENT_OK);
    kent_folder_free(f);
}

static void assert_holds(const char *path, const char *text)
{
    char name[128], got[64] = "";
    (void)snprintf(name, sizeof name, "%s/%s", path, MARKER);
    FILE *file = fopen(name, "r");
    assert_non_null(file);
    assert_non_null(fgets(got, sizeof got, file));
    (void)fclose(file);
    assert_string_equal(got, text);
}

/* ---- facts ----------------------------------------------------------------------- */

static void a_committed_folder_stands_whole_and_alone(void **state)
{
    (void)state;
    write_whole("out", "one");
    assert_holds("out", "one");
    assert_int_equal(entries("out"), 2);
    assert_int_equal(entries("out/plots"), 1);
    assert_int_equal(entries("."), 1);
}

static void nothing_shows_before_the_commit_and_nothing_is_left_without(void **state)
{
    (void)state;
    kent_error err = {0};
    kent_folder *f = NULL;
    write_whole("out", "old");
    assert_int_equal(kent_folder_open("out", MARKER, &f, &err), KENT_OK);
    put(f, MARKER, "new");
    put(f, "plots/b.svg", "new");
    assert_holds("out", "old");
    kent_folder_free(f);
    assert_holds("out", "old");
    assert_int_equal(entries("."), 1);
}

static void a_new_folder_replaces_ours_with_all_that_is_in_it(void **state)
{
    (void)state;
    write_whole("out", "old");
    assert_int_equal(mkdir("out/deep", 0777), 0);
    assert_int_equal(mkdir("out/deep/er", 0777), 0);
    write_whole("out/", "new");
    assert_holds("out", "new");
    assert_int_equal(entries("out"), 2);
    assert_int_equal(entries("."), 1);
}

static void a_strangers_folder_or_file_is_left_alone(void **state)
{
    (void)state;
    kent_error err = {0};
    kent_folder *f = NULL;
    assert_int_equal(mkdir("theirs", 0777), 0);
    assert_int_equal(mkdir("theirs/precious", 0777), 0);
    assert_int_equal(kent_folder_open("theirs", MARKER, &f, &err), KENT_E_IO);
    assert_null(f);
    assert_string_equal(err.where, "theirs");
    assert_non_null(strstr(err.what, MARKER));

    FILE *file = fopen("plain", "w");
    assert_non_null(file);
    (void)fclose(file);
    err = (kent_error){0};
    assert_int_equal(kent_folder_open("plain", MARKER, &f, &err), KENT_E_IO);

    assert_int_equal(symlink("theirs", "link"), 0);
    err = (kent_error){0};
    assert_int_equal(kent_folder_open("link", MARKER, &f, &err), KENT_E_IO);
    assert_int_equal(entries("."), 3);
    assert_int_equal(entries("theirs"), 1);
}

static void a_stranger_who_comes_meanwhile_is_left_alone(void **state)
{
    (void)state;
    kent_error err = {0};
    kent_folder *f = NULL;
    assert_int_equal(kent_folder_open("out", MARKER, &f, &err), KENT_OK);
    put(f, MARKER, "ours");
    assert_int_equal(mkdir("out", 0777), 0);
    assert_int_equal(mkdir("out/precious", 0777), 0);
    assert_int_equal(kent_folder_commit(f, &err), KENT_E_IO);
    kent_folder_free(f);
    assert_int_equal(entries("out"), 1);
    assert_int_equal(entries("."), 1);
}

static void a_place_that_cannot_be_written_is_an_error(void **state)
{
    (void)state;
    const char *const paths[] = {"missing/out", "", ".", "..", "/", "a/.."};
    for (size_t i = 0; i < sizeof paths / sizeof paths[0]; i++) {
        kent_error err = {0};
        kent_folder *f = NULL;
        assert_int_equal(kent_folder_open(paths[i], MARKER, &f, &err), KENT_E_IO);
        assert_null(f);
        assert_true(strlen(err.what) > 0);
    }
    assert_int_equal(entries("."), 0);
}

static void names_that_climb_out_are_refused(void **state)
{
    (void)state;
    const char *const names[] = {"../a", "/tmp/a", "a/b/c", "", "a/", "x/../../y"};
    for (size_t i = 0; i < sizeof names / sizeof names[0]; i++) {
        kent_error err = {0};
        kent_folder *f = NULL;
        assert_int_equal(kent_folder_open("out", MARKER, &f, &err), KENT_OK);
        assert_null(kent_folder_create(f, names[i], &err));
        assert_int_equal(err.status, KENT_E_IO);
        kent_folder_free(f);
    }
    assert_int_equal(entries("."), 0);
}

static void a_folder_without_its_marker_is_not_committed(void **state)
{
    (void)state;
    kent_error err = {0};
    kent_folder *f = NULL;
    assert_int_equal(kent_folder_open("out", MARKER, &f, &err), KENT_OK);
    put(f, "summary.csv", "a,b\n");
    assert_int_equal(kent_folder_commit(f, &err), KENT_E_IO);
    kent_folder_free(f);
    assert_int_equal(entries("."), 0);
}

/* The limit on file size makes write() fail as a full disk does. */
static void a_failed_write_is_reported_and_leaves_the_old_folder(void **state)
{
    (void)state;
    kent_error err = {0};
    kent_folder *f = NULL;
    write_whole("out", "old");
    assert_int_equal(kent_folder_open("out", MARKER, &f, &err), KENT_OK);
    put(f, MARKER, "new");
    FILE *file = kent_folder_create(f, "history.csv", &err);
    assert_non_null(file);

    struct rlimit before;
    assert_int_equal(getrlimit(RLIMIT_FSIZE, &before), 0);
    const struct rlimit small = {.rlim_cur = 4096, .rlim_max = before.rlim_max};
    (void)signal(SIGXFSZ, SIG_IGN);
    assert_int_equal(setrlimit(RLIMIT_FSIZE, &small), 0);
    for (int i = 0; i < 5000; i++) {
        (void)fputs("0.125,92.000\n", file);
    }
    const kent_status closed = kent_folder_close(f, file, "history.csv", &err);
    assert_int_equal(setrlimit(RLIMIT_FSIZE, &before), 0);

    assert_int_equal(closed, KENT_E_IO);
    assert_string_equal(err.where, "history.csv");
    kent_error again = {0};
    assert_int_equal(kent_folder_commit(f, &again), KENT_E_IO);
    kent_folder_free(f);
    assert_holds("out", "old");
    assert_int_equal(entries("."), 1);
}

static void without_an_exchange_two_renames_do_it(void **state)
{
    (void)state;
    write_whole("out", "old");
    no_exchange = true;
    write_whole("out", "new");
    assert_holds("out", "new");
    assert_int_equal(entries("."), 1);
}

static void a_second_rename_that_fails_puts_the_old_one_back(void **state)
{
    (void)state;
    kent_error err = {0};
    kent_folder *f = NULL;
    write_whole("out", "old");
    no_exchange = true;
    assert_int_equal(kent_folder_open("out", MARKER, &f, &err), KENT_OK);
    put(f, MARKER, "new");
    fail_at_rename = renames + 2;
    assert_int_equal(kent_folder_commit(f, &err), KENT_E_IO);
    kent_folder_free(f);
    assert_holds("out", "old");
    assert_int_equal(entries("."), 1);
}

/* Runs write_whole("out", "new") in a process that dies before its n-th rename. */
static void die_while_writing(int n)
{
    const pid_t child = fork();
    assert_true(child >= 0);
    if (child == 0) {
        die_at_rename = renames + n;
        write_whole("out", "new");
        _exit(0);
    }
    int status = 0;
    assert_int_equal(waitpid(child, &status, 0), child);
    assert_true(WIFEXITED(status) && WEXITSTATUS(status) == DIED);
}

static void a_later_run_repairs_an_interrupted_swap(void **state)
{
    (void)state;
    kent_error err = {0};
    for (int n = 1; n <= 2; n++) {
        kent_folder *f = NULL;
        no_exchange = true;
        write_whole("out", "old");
        die_while_writing(n);
        assert_true(entries(".") > 1);
        assert_int_equal(entries("out"), n == 1 ? 2 : -1); /* 2: nothing stands there */

        assert_int_equal(kent_folder_open("out", MARKER, &f, &err), KENT_OK);
        assert_holds("out", "old");
        kent_folder_free(f);
        assert_int_equal(entries("."), 1);
        write_whole("out", "new");
        assert_holds("out", "new");
    }
}

static void leftovers_of_the_dead_go_and_those_of_the_living_stay(void **state)
{
    (void)state;
    kent_error err = {0};
    kent_folder *mine = NULL, *other = NULL;
    assert_int_equal(kent_folder_open("out", MARKER, &mine, &err), KENT_OK);
    put(mine, MARKER, "mine");
    assert_int_equal(mkdir("out.part-1-0", 0777), 0); /* a dead run's, just begun */
    assert_int_equal(mkdir("out.part-2-0", 0777), 0); /* a dead run's */
    FILE *sign = fopen("out.part-2-0/.unfinished", "w");
    assert_non_null(sign);
    (void)fclose(sign);
    assert_int_equal(mkdir("out.part-x", 0777), 0);   /* nobody's */
    assert_int_equal(mkdir("out.part-3-0", 0777), 0); /* a stranger's */
    assert_int_equal(mkdir("out.part-3-0/precious", 0777), 0);

    assert_int_equal(kent_folder_open("out", MARKER, &other, &err), KENT_OK);
    assert_int_equal(entries("."), 4); /* mine, other, out.part-x, out.part-3-0 */
    kent_folder_free(other);
    assert_int_equal(entries("out.part-3-0"), 1);
    assert_int_equal(kent_folder_commit(mine, &err), KENT_OK);
    kent_folder_free(mine);
    assert_holds("out", "mine");
}

static int write_for_want_of_memory(void *context)
{
    kent_error err = {0};
    kent_folder *f = NULL;
    int failed = 1;
    (void)context;

    if (kent_folder_open("out", MARKER, &f, &err) != KENT_OK) goto done;
    FILE *file = kent_folder_create(f, MARKER, &err);
    if (!file) goto done;
    (void)fputs("new", file);
    if (kent_folder_close(f, file, MARKER, &err) != KENT_OK) goto done;
    if (kent_folder_commit(f, &err) != KENT_OK) goto done;
    failed = 0;
done:
    kent_folder_free(f);
    if (failed) assert_int_equal(err.status, KENT_E_NOMEM);
    if (failed) assert_holds("out", "old");
    assert_int_equal(entries("."), 1);
    return failed;
}

static void without_memory_the_old_folder_stands(void **state)
{
    (void)state;
    for (int i = 0; i < 2; i++) {
        no_exchange = i == 1;
        write_whole("out", "old");
        assert_true(kent_allocations_needed(write_for_want_of_memory, NULL) > 3);
        assert_holds("out", "new");
    }
}

#define IN_PLACE(f) cmocka_unit_test_setup_teardown(f, enter, leave)

int main(void)
{
    const struct CMUnitTest tests[] = {
        IN_PLACE(a_committed_folder_stands_whole_and_alone),
        IN_PLACE(nothing_shows_before_the_commit_and_nothing_is_left_without),
        IN_PLACE(a_new_folder_replaces_ours_with_all_that_is_in_it),
        IN_PLACE(a_strangers_folder_or_file_is_left_alone),
        IN_PLACE(a_stranger_who_comes_meanwhile_is_left_alone),
        IN_PLACE(a_place_that_cannot_be_written_is_an_error),
        IN_PLACE(names_that_climb_out_are_refused),
        IN_PLACE(a_folder_without_its_marker_is_not_committed),
        IN_PLACE(a_failed_write_is_reported_and_leaves_the_old_folder),
        IN_PLACE(without_an_exchange_two_renames_do_it),
        IN_PLACE(a_second_rename_that_fails_puts_the_old_one_back),
        IN_PLACE(a_later_run_repairs_an_interrupted_swap),
        IN_PLACE(leftovers_of_the_dead_go_and_those_of_the_living_stay),
        IN_PLACE(without_memory_the_old_folder_stands),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
