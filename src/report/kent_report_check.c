#include "kent_alarm.h"
#include "kent_imprint.h"
#include "kent_sink.h"
#include "kent_view.h"

#include <math.h>
#include <stdlib.h>

/* ---- the project ----------------------------------------------------------------- */

static void say_project(const kent_view *v)
{
    const kent_project *p = &v->model->project;
    kent_text words = {0}, told = {0};

    kent_imprint_words(p, &told);
    if (p->codes[0] != '\0') {
        kent_text_add(&told, "%snamed as prevailing, not checked: %s",
                      told.length > 0 ? "; " : "", p->codes);
    }
    if (told.length > 0 || told.failed) {
        kent_text_add(&words, "For the sheets: %s", kent_text_of(&told));
        words.failed = words.failed || told.failed;
        kent_view_say(v, "", &words);
    }
    kent_text_clear(&words);
    kent_text_clear(&told);
}

/* ---- the water ------------------------------------------------------------------- */

static void say_head(const kent_view *v)
{
    const kent_model *m = v->model;
    const kent_water *w = &m->water;
    kent_text words = {0};
    kent_text_add(&words, "%s", m->title[0] != '\0' ? m->title : "(untitled)");
    kent_view_say(v, "", &words);
    if (m->file_count > 0) {
        kent_text_add(&words, "%s · checksum %016llx", m->files[0], m->checksum);
        kent_view_say(v, "", &words);
    }
    say_project(v);
    kent_text_add(&words, "Water");
    if (isfinite(w->temperature)) {
        kent_text_add(
            &words, " at %s",
            kent_shown_with_unit(KENT_TEMPERATURE, v->units, w->temperature).text);
    }
    kent_text_add(&words, ": density %s, sound %s, ",
                  kent_shown_with_unit(KENT_DENSITY, v->units, w->density).text,
                  kent_shown_with_unit(KENT_SPEED, v->units, w->sound_speed).text);
    /* In both systems: a slip between them goes unseen in one. */
    kent_text_add(&words, "bulk modulus %s (%s), ",
                  kent_shown_with_unit(KENT_MODULUS, v->units, w->bulk_modulus).text,
                  kent_shown_with_unit(KENT_MODULUS,
                                       v->units == KENT_SI ? KENT_US : KENT_SI,
                                       w->bulk_modulus)
                      .text);
    kent_text_add(&words, "viscosity %s, vapour pressure %s. ",
                  kent_shown_with_unit(KENT_VISCOSITY, v->units, w->viscosity).text,
                  kent_shown_with_unit(KENT_STRESS, v->units, w->vapour_pressure).text);
    if (m->gas_content > 0.0) {
        kent_text_add(&words, "Free gas %.3g by volume at one atmosphere. ",
                      m->gas_content);
    }
    kent_text_add(&words, "Air %s absolute, gravity %s.",
                  kent_shown_with_unit(KENT_STRESS, v->units, m->barometric).text,
                  kent_shown_with_unit(KENT_ACCELERATION, v->units, m->gravity).text);
    kent_view_say(v, "", &words);
    kent_text_clear(&words);
}

/* ---- levels, outflows, valves ---------------------------------------------------- */

/* m3/s that leaves a node into the spans that end there. */
static double flow_out_of(const kent_model *m, const kent_steady *s, int node)
{
    const kent_node *n = &m->nodes[node];
    double flow = 0.0;
    for (size_t i = 0; i < n->end_count; i++) {
        const kent_end *e = &m->ends[n->end_first + i];
        const double along = s->span_flow[e->span];
        flow += e->side == 0 ? along : -along;
    }
    return flow;
}

/* Steady flow of one device in every state shown: by its place in its list. */
typedef enum device { LEVEL, OUTFLOW, VALVE, OTHER } device;

static void add_flows(const kent_view *v, kent_table *t, device what, size_t i)
{
    const kent_model *m = v->model;
    for (size_t k = 0; k < kent_view_states(v); k++) {
        const kent_steady *s = kent_view_steady(v, k);
        double flow = NAN;
        if (s) {
            switch (what) {
            case LEVEL:
                flow = flow_out_of(m, s, m->fixed_levels[i].node);
                break;
            case OUTFLOW:
                flow = s->outflow[i];
                break;
            case VALVE:
                flow = s->valve_flow[i];
                break;
            case OTHER:
                if (s->device_flow) flow = s->device_flow[i];
                break;
            }
        }
        kent_view_word(t, kent_shown_with_unit(KENT_FLOW, v->units, flow).text);
    }
}

static void fill_devices(const kent_view *v, kent_table *t)
{
    const kent_model *m = v->model;
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        const kent_fixed_level *f = &m->fixed_levels[i];
        kent_view_word(t, kent_view_point(m, f->point));
        kent_view_word(t, "fixed level");
        kent_view_word(t, kent_shown_with_unit(KENT_LENGTH, v->units, f->level).text);
        add_flows(v, t, LEVEL, i);
    }
    for (size_t i = 0; i < m->outflow_count; i++) {
        const kent_outflow *o = &m->outflows[i];
        kent_view_word(t, kent_view_point(m, o->point));
        kent_view_word(t, o->pressure_dependent ? "outflow, by pressure" : "outflow");
        kent_view_word(t, kent_shown_with_unit(KENT_FLOW, v->units, o->flow).text);
        add_flows(v, t, OUTFLOW, i);
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        const kent_valve *a = &m->valves[i];
        kent_view_word(t, kent_view_point(m, a->point));
        kent_table_cell(t, "valve %s, %s, %s", a->id, a->type,
                        a->node[1] < 0 ? "discharging" : "in line");
        kent_table_cell(t, "%s open", kent_shown_number(a->opening, 2).text);
        add_flows(v, t, VALVE, i);
    }
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        kent_view_word(t, kent_view_point(m, d->point));
        kent_table_cell(t, "%s %s", kent_device_word(d->kind), d->id);
        kent_view_word(t, "");
        add_flows(v, t, OTHER, i);
    }
}

static void say_devices(const kent_view *v)
{
    const kent_model *m = v->model;
    enum { FIXED = 3 };
    const size_t states = kent_view_states(v);
    const size_t rows =
        m->fixed_level_count + m->outflow_count + m->valve_count + m->device_count;
    kent_column *columns = kent_alloc(FIXED + states, sizeof *columns);
    kent_shown *names = kent_alloc(states, sizeof *names);
    if (!columns || !names) {
        v->out->failed = true;
        goto done;
    }
    if (!kent_view_whole(v, rows)) {
        kent_text_add(
            v->out,
            "\n%zu fixed levels, %zu outflows, %zu valves, %zu other devices; --wide "
            "lists them\n",
            m->fixed_level_count, m->outflow_count, m->valve_count, m->device_count);
        goto done;
    }
    columns[0] = (kent_column){"at", "", KENT_ALIGN_LEFT, true};
    columns[1] = (kent_column){"what", "", KENT_ALIGN_LEFT, true};
    columns[2] = (kent_column){"value", "", KENT_ALIGN_RIGHT, false};
    for (size_t k = 0; k < states; k++) {
        names[k] = kent_view_in_state(v, "steady flow", k);
        columns[FIXED + k] = (kent_column){names[k].text, "", KENT_ALIGN_RIGHT, true};
    }
    kent_table t = {.columns = columns, .column_count = FIXED + states};
    fill_devices(v, &t);
    kent_view_finish(v,
                     m->device_count > 0 ? "Levels, outflows, valves and devices"
                                         : "Levels, outflows and valves",
                     &t);
done:
    free(names);
    free(columns);
}

/* ---- what nobody said, and what to beware of ------------------------------------- */

static void say_assumed(const kent_view *v)
{
    const kent_notes *assumed = &v->model->assumed;
    kent_text words = {0};
    kent_text_add(v->out, assumed->count == 0
                              ? "\nNothing was assumed.\n"
                              : "\nAssumed, because nothing was said of it\n");
    for (size_t i = 0; i < assumed->count; i++) {
        kent_shown_assumption(assumed->text[i], &words);
        kent_view_say(v, "-  ", &words);
    }
    kent_text_clear(&words);
}

/* Those of the case, then the alarms. */
static void say_cautions(const kent_view *v)
{
    const kent_model *m = v->model;
    const kent_notes *cautions = &m->cautions;
    kent_notes alarms = {0};
    kent_alarms_raise(m, v->steadies, v->steadies ? m->state_count : 0,
                      KENT_ALARM_CHECK, &alarms);
    if (cautions->count + alarms.count > 0) kent_text_add(v->out, "\nCautions\n");
    for (size_t i = 0; i < cautions->count; i++) {
        kent_table_paragraph(v->out, v->limit, "!  ", cautions->text[i]);
    }
    for (size_t i = 0; i < alarms.count; i++) {
        kent_table_paragraph(v->out, v->limit, "!  ", alarms.text[i]);
    }
    v->out->failed = v->out->failed || alarms.failed;
    kent_notes_clear(&alarms);
}

/* The grid a run would march on; one that cannot be planned is the run's to complain
 * of. */
static kent_grid *plan_grid(const kent_model *m)
{
    kent_grid *grid = NULL;
    kent_error unsaid = {0};
    double longest = 0.0;
    for (size_t i = 0; i < m->scenario_count; i++) {
        longest = fmax(longest, m->scenarios[i].duration);
    }
    if (m->scenario_count == 0 || m->span_count == 0) return NULL;
    return kent_grid_plan(m, longest, &grid, &unsaid) ? NULL : grid;
}

kent_status kent_report_check(const kent_model *m, kent_steady *const *steadies,
                              const kent_report_options *o, kent_sink sink)
{
    kent_text out = {0};
    const kent_view v = {.model = m,
                         .steadies = steadies,
                         .grid = plan_grid(m),
                         .units = o->units,
                         .wide = o->wide,
                         .limit = o->wide ? 0 : KENT_TABLE_LIMIT,
                         .out = &out};
    say_head(&v);
    kent_view_plan(&v);
    kent_view_ground(&v);
    kent_view_points(&v);
    kent_view_pipes(&v);
    kent_view_states_said(&v);
    kent_view_spans(&v);
    say_devices(&v);
    kent_view_scenarios(&v);
    kent_view_loads(&v);
    say_assumed(&v);
    say_cautions(&v);
    const kent_status status = kent_sink_flush(sink, &out);
    kent_grid_free(v.grid);
    kent_text_clear(&out);
    return status;
}
