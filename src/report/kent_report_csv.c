#include "kent_pressures.h"
#include "kent_sink.h"
#include "kent_summary.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

/* A further field: a number to ten digits, empty where there is none. */
static void add_field(kent_text *out, double value)
{
    kent_text_add(out, isfinite(value) ? ",%.10g" : ",", value);
}

static void add_column(kent_text *out, const char *of, const char *quantity)
{
    kent_text head = {0};
    kent_text_add(&head, "%s.%s", of, quantity);
    kent_text_add(out, ",");
    kent_summary_field(out, kent_text_of(&head));
    out->failed = out->failed || head.failed;
    kent_text_clear(&head);
}

/* What the columns of a device start with: never what those of a point do. */
static kent_name heading_of(const kent_model *m, size_t device)
{
    const kent_device *d = &m->devices[device];
    kent_name name = kent_device_name(m, device);
    if (d->kind == KENT_DEVICE_BURST || kent_model_point_index(m, d->id) < 0) {
        return name;
    }
    (void)snprintf(name.s, sizeof name.s, "%s.%s", d->id, kent_device_word(d->kind));
    for (char *c = name.s + strlen(d->id); *c; c++) {
        if (*c == ' ') *c = '-';
    }
    return name;
}

static void add_history_heading(const kent_results *r, kent_text *out)
{
    static const char *const COLUMNS[] = {"head_m", "pressure_Pa", "flow_m3s"};
    const kent_model *m = r->model;
    kent_text_add(out, "time_s");
    for (size_t w = 0; w < r->history_count; w++) {
        for (size_t c = 0; c < 3; c++) {
            add_column(out, m->points[r->history_points[w]].id, COLUMNS[c]);
        }
    }
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_name name = heading_of(m, i);
        const kent_device_quantity *q = kent_device_quantities(m->devices[i].kind);
        add_column(out, name.s, COLUMNS[2]);
        for (int j = 0; j < KENT_TOLD && q[j].name; j++) {
            add_column(out, name.s, q[j].name);
        }
    }
    kent_text_add(out, "\n");
}

static void add_device_fields(const kent_model *m, const kent_device_row *rows,
                              kent_text *out)
{
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device_quantity *q = kent_device_quantities(m->devices[i].kind);
        add_field(out, rows[i].flow);
        for (int j = 0; j < KENT_TOLD && q[j].name; j++) {
            add_field(out, rows[i].told[j]);
        }
    }
}

kent_status kent_report_history_csv(const kent_results *r, size_t scenario,
                                    kent_sink sink)
{
    const kent_model *m = r->model;
    const kent_history *h = &r->scenarios[scenario].history;
    kent_text out = {0};
    kent_status status = KENT_OK;
    add_history_heading(r, &out);
    for (size_t row = 0; !status && row < h->rows; row++) {
        kent_text_add(&out, "%.10g", h->time[row]);
        for (size_t w = 0; w < r->history_count; w++) {
            const double z = m->points[r->history_points[w]].at.z;
            const double head = h->head[row * h->watch_count + w];
            add_field(&out, head);
            add_field(&out, kent_model_pressure(m, head, z));
            add_field(&out, h->flow[row * h->watch_count + w]);
        }
        add_device_fields(m, h->devices + row * h->device_count, &out);
        kent_text_add(&out, "\n");
        status = kent_sink_flush(sink, &out);
    }
    if (!status) status = kent_sink_flush(sink, &out);
    kent_text_clear(&out);
    return status;
}

static void add_profile_rows(const kent_results *r, size_t scenario, size_t index,
                             kent_text *out)
{
    const kent_model *m = r->model;
    const kent_scenario_result *s = &r->scenarios[scenario];
    const kent_span *span = &m->spans[index];
    const int reaches = s->grid->reaches[index];
    for (int k = 0; k <= reaches; k++) {
        const double x = span->length * k / reaches;
        const double numbers[] = {
            m->chainage[span->route_first] + x,
            kent_span_level(m, span, x),
            kent_steady_head(m, r->steadies[s->state], (int)index, x),
            s->highest[index][k],
            s->lowest[index][k],
        };
        kent_summary_field(out, span->id);
        for (size_t c = 0; c < sizeof numbers / sizeof numbers[0]; c++) {
            add_field(out, numbers[c]);
        }
        kent_text_add(out, "\n");
    }
}

kent_status kent_report_profile_csv(const kent_results *r, size_t scenario,
                                    kent_sink sink)
{
    kent_text out = {0};
    kent_status status = KENT_OK;
    kent_text_add(&out, "pipe,chainage_m,z_m,steady_head_m,highest_head_m,"
                        "lowest_head_m\n");
    for (size_t i = 0; !status && i < r->model->span_count; i++) {
        add_profile_rows(r, scenario, i, &out);
        status = kent_sink_flush(sink, &out);
    }
    if (!status) status = kent_sink_flush(sink, &out);
    kent_text_clear(&out);
    return status;
}
