#include "kent_output.h"

#include <errno.h>
#include <stdio_ext.h>
#include <stdlib.h>
#include <string.h>

const char KENT_OUTPUT_MARKER[] = "results.json";

/* ---- standard output ------------------------------------------------------------- */

static int gather(void *to, const char *piece, size_t length)
{
    kent_text *text = to;
    kent_text_add(text, "%.*s", (int)length, piece);
    return text->failed ? -1 : 0;
}

kent_sink kent_output_gather(kent_text *text)
{
    return (kent_sink){.write = gather, .to = text};
}

kent_status kent_output_print(const kent_text *text, kent_error *err)
{
    if (text->failed) return kent_error_nomem(err);
    errno = 0;
    const size_t written = fwrite(kent_text_of(text), 1, text->length, stdout);
    if (written == text->length && fflush(stdout) == 0) return KENT_OK;
    const int cause = errno;
    __fpurge(stdout); /* said once: closing it must not fail a second time */
    return kent_error_set(err, KENT_E_IO, "standard output", "%s",
                          cause != 0 ? strerror(cause) : "write error");
}

/* ---- the folder ------------------------------------------------------------------ */

char *kent_output_folder_name(const char *case_path)
{
    const char *slash = strrchr(case_path, '/');
    const char *name = slash ? slash + 1 : case_path;
    size_t length = strlen(name);
    kent_text out = {0};
    if (strcmp(case_path, "-") == 0) return kent_copy_text("standard-input-results");
    if (length > 4 && strcmp(name + length - 4, ".cfg") == 0) length -= 4;
    kent_text_add(&out, "%.*s-results", (int)length, name);
    if (out.failed) kent_text_clear(&out);
    return out.s;
}

/* One file of the folder. */
typedef struct output_file {
    const kent_results *results;
    const kent_report_options *options;
    size_t scenario; /* index into results' scenarios */
    kent_status (*write)(const struct output_file *f, kent_sink sink);
} output_file;

/* The file has every fitting in its usual place, whatever the table lists. */
static kent_status write_summary(const output_file *f, kent_sink sink)
{
    const kent_report_options all = {.units = f->options->units};
    return kent_report_summary_csv(f->results, &all, sink);
}

static kent_status write_json(const output_file *f, kent_sink sink)
{
    return kent_report_json(f->results, sink);
}

static kent_status write_sensitivity(const output_file *f, kent_sink sink)
{
    return kent_report_sensitivity_csv(f->results, sink);
}

static kent_status write_history(const output_file *f, kent_sink sink)
{
    return kent_report_history_csv(f->results, f->scenario, sink);
}

static kent_status write_profile(const output_file *f, kent_sink sink)
{
    return kent_report_profile_csv(f->results, f->scenario, sink);
}

static kent_status write_file(const output_file *f, const char *name,
                              kent_folder *folder, kent_error *err)
{
    FILE *stream = kent_folder_create(folder, name, err);
    if (!stream) return err->status ? err->status : KENT_E_IO;
    const kent_status written = f->write(f, kent_sink_stream(stream));
    const kent_status closed = kent_folder_close(folder, stream, name, err);
    if (written == KENT_E_NOMEM) return kent_error_nomem(err);
    if (written && !closed) {
        /* unreached: what a full disk breaks, closing the stream tells first */
        return kent_error_set(err, written, name, "%s", kent_status_text(written));
    }
    return closed;
}

kent_status kent_output_fill(const kent_results *r, const kent_report_options *o,
                             kent_folder *folder, kent_error *err)
{
    static const struct {
        const char *word;
        kent_status (*write)(const output_file *f, kent_sink sink);
    } EACH[] = {{"history", write_history}, {"profile", write_profile}};
    output_file f = {.results = r, .options = o, .write = write_summary};
    kent_text name = {0};
    kent_status status = write_file(&f, "summary.csv", folder, err);
    f.write = write_json;
    if (!status) status = write_file(&f, KENT_OUTPUT_MARKER, folder, err);
    f.write = write_sensitivity;
    if (!status && r->sensitivity) {
        status = write_file(&f, "sensitivity.csv", folder, err);
    }
    for (size_t i = 0; !status && i < r->scenario_count; i++) {
        const kent_scenario_result *s = &r->scenarios[i];
        const kent_march march = {s->scenario, s->state};
        f.scenario = i;
        for (size_t k = 0; !status && k < sizeof EACH / sizeof EACH[0]; k++) {
            kent_text_reset(&name);
            /* an id has nothing that a file's name could not: the reader sees to it */
            kent_text_add(&name, "%s-%s.csv", EACH[k].word,
                          kent_march_file_name(r->model, march).s);
            f.write = EACH[k].write;
            status = name.failed ? kent_error_nomem(err)
                                 : write_file(&f, kent_text_of(&name), folder, err);
        }
    }
    kent_text_clear(&name);
    return status;
}
