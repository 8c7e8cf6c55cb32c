#include "kent_imprint.h"
#include "kent_page.h"

void kent_imprint_words(const kent_project *p, kent_text *words)
{
    const struct {
        const char *word, *value;
    } rows[] = {{"for", p->utility},
                {"project", p->number},
                {"drawing", p->drawing},
                {"revision", p->revision},
                {"designed by", p->designer},
                {"checked by", p->checker},
                {"date", p->date}};

    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        if (rows[i].value[0] == '\0') continue;
        kent_text_add(words, "%s%s %s", words->length > 0 ? ", " : "", rows[i].word,
                      rows[i].value);
    }
}

void kent_imprint_top(const kent_model *m, size_t limit, kent_text *out)
{
    kent_text words = {0};

    kent_imprint_words(&m->project, &words);
    if (words.length > 0) {
        kent_table_paragraph(out, limit, "", kent_text_of(&words));
    }
    out->failed = out->failed || words.failed;
    kent_text_clear(&words);
}

/* Room for two hands and a seal, on sheets that are somebody's. */
static void signatures(const kent_project *p, kent_text *out)
{
    kent_text words = {0};

    kent_imprint_words(p, &words);
    if (words.length > 0) {
        kent_text_add(out, "Designed ____________________   Checked "
                           "____________________   Seal ____________________\n");
    }
    out->failed = out->failed || words.failed;
    kent_text_clear(&words);
}

void kent_imprint_end(const kent_model *m, size_t limit, kent_text *out)
{
    kent_text words = {0};

    kent_table_paragraph(out, limit, "", KENT_PAGE_JUDGE);
    if (m->project.codes[0] != '\0') {
        kent_text_add(&words,
                      "The case names as prevailing: %s. Nothing here says that any of "
                      "them is met.",
                      m->project.codes);
        kent_table_paragraph(out, limit, "", kent_text_of(&words));
        kent_text_reset(&words);
    }
    signatures(&m->project, out);
    kent_text_add(&words, "kentledge %s", KENT_VERSION);
    if (m->file_count > 0) {
        kent_text_add(&words, " · %s · checksum %016llx", m->files[0], m->checksum);
    }
    kent_table_paragraph(out, limit, "", kent_text_of(&words));
    out->failed = out->failed || words.failed;
    kent_text_clear(&words);
}
