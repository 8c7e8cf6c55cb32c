/* The hand calculations that stand at no fitting: of string ends there, and of steep
 * stretches. */
#include "kent_report.h"
#include "kent_sink.h"
#include "kent_steps.h"
#include "kent_table.h"

static void print_one(const kent_derivation *d, const kent_notes *cautions,
                      const kent_report_options *o, kent_text *out)
{
    const size_t limit = o->wide ? 0 : KENT_TABLE_LIMIT;

    kent_text_add(out, "\n");
    kent_steps_print(d, o->units, limit, out);
    for (size_t k = 0; k < cautions->count; k++) {
        kent_table_paragraph(out, limit, "-  ", cautions->text[k]);
    }
}

kent_status kent_report_explain_along(const kent_results *r,
                                      const kent_report_options *o, kent_sink sink)
{
    const kent_pulls *pulls = &r->restraints->pulls;
    kent_text out = {0};

    for (size_t i = 0; i < pulls->end_count; i++) {
        const kent_pull_end *p = &pulls->ends[i];
        if (r->loads->strings.ends[p->end].fitting >= 0) continue;
        print_one(&p->derivation, &p->cautions, o, &out);
    }
    for (size_t i = 0; i < pulls->steep_count; i++) {
        print_one(&pulls->steeps[i].derivation, &pulls->steeps[i].cautions, o, &out);
    }
    const kent_status status = kent_sink_flush(sink, &out);
    kent_text_clear(&out);
    return status;
}
