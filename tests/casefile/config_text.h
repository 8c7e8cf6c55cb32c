/* For tests of the catalogue's reader: config/ with one file replaced by a text. */
#ifndef KENT_CONFIG_TEXT_H
#define KENT_CONFIG_TEXT_H

#include "case_text.h"

/* A folder of its own, to be removed with remove_config. */
typedef struct config_text {
    char folder[64];
    char path[128]; /* of the replaced file */
} config_text;

static inline void write_config(config_text *config, const char *file, const char *text)
{
    char command[300];
    (void)snprintf(config->folder, sizeof config->folder, "/tmp/kent-config-XXXXXX");
    assert_non_null(mkdtemp(config->folder));
    (void)snprintf(command, sizeof command, "cp %s/config/*.cfg %s", KENT_SOURCE_DIR,
                   config->folder);
    assert_int_equal(system(command), 0); /* NOLINT: both paths are ours */
    (void)snprintf(config->path, sizeof config->path, "%s/%s", config->folder, file);
    FILE *out = fopen(config->path, "w");
    assert_non_null(out);
    assert_true(fputs(text, out) >= 0);
    assert_int_equal(fclose(out), 0);
}

static inline void remove_config(const config_text *config)
{
    char command[100];
    (void)snprintf(command, sizeof command, "rm -r %s", config->folder);
    assert_int_equal(system(command), 0); /* NOLINT: our own folder */
}

/* config/ with one file replaced, read; *out NULL where it was refused. */
static inline kent_status read_config(const char *file, const char *text,
                                      kent_catalogue **out, kent_complaints *complaints)
{
    config_text config;
    kent_error err = {0};
    *out = NULL;
    *complaints = (kent_complaints){0};
    write_config(&config, file, text);
    const kent_status status =
        kent_catalogue_read(config.folder, out, complaints, &err);
    remove_config(&config);
    return status;
}

/* The one complaint of a replaced file holds these words. */
static inline void assert_config_refused(const char *file, const char *text,
                                         const char *words)
{
    kent_catalogue *catalogue = NULL;
    kent_complaints c;
    assert_int_equal(read_config(file, text, &catalogue, &c), KENT_E_INPUT);
    assert_null(catalogue);
    if (c.count != 1 || !strstr(c.kept[0].what, words)) {
        print_error("%zu complaints, first: %s\n", c.count, c.kept[0].what);
    }
    assert_int_equal(c.count, 1);
    assert_non_null(strstr(c.kept[0].what, words));
    assert_true(c.kept[0].line > 0);
}

#endif
