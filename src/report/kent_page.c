#include "kent_page.h"

void kent_page_finish(kent_page *page, const char *heading, kent_table *t)
{
    if (t->cell_count > 0) {
        kent_text_add(page->out, "\n%s\n", heading);
        if (kent_table_print(t, page->limit, page->out)) page->cut = true;
    }
    kent_table_clear(t);
}

void kent_page_say(kent_page *page, const char *lead, kent_text *words)
{
    kent_table_paragraph(page->out, page->limit, lead, kent_text_of(words));
    page->out->failed = page->out->failed || words->failed;
    kent_text_clear(words);
}
