#include "kent_pressures.h"
#include "kent_shown.h"
#include "kent_sink.h"
#include "kent_table.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

/* What the parts of one `check` share. */
typedef struct kent_view {
    const kent_model *model;
    const kent_steady *steady; /* NULL: none was found */
    kent_grid *grid;           /* NULL: no scenario, or it could not be planned */
    kent_system units;
    size_t limit; /* columns of a line; 0: none */
    kent_text *out;
} kent_view;

static void quantity(const kent_view *v, kent_table *t, kent_kind kind, double si)
{
    kent_table_cell(t, "%s", kent_shown_quantity(kind, v->units, si).text);
}

static void word(kent_table *t, const char *text)
{
    kent_table_cell(t, "%s", text[0] != '\0' ? text : KENT_SHOWN_NONE);
}

/* A heading, the table under it, and the table is let go. Nothing where it is empty. */
static void finish(const kent_view *v, const char *heading, kent_table *t)
{
    if (t->cell_count > 0 || t->failed) {
        kent_text_add(v->out, "\n%s\n", heading);
        if (kent_table_print(t, v->limit, v->out)) {
            kent_text_add(v->out, "%s\n", KENT_TABLE_CUT);
        }
    }
    kent_table_clear(t);
}

static const char *point_id(const kent_model *m, int point)
{
    return point >= 0 ? m->points[point].id : KENT_SHOWN_NONE;
}

/* ---- what was given -------------------------------------------------------------- */

static void print_head(const kent_view *v)
{
    const kent_model *m = v->model;
    const kent_water *w = &m->water;
    kent_text words = {0};
    kent_table_paragraph(v->out, v->limit, "",
                         m->title[0] != '\0' ? m->title : "(untitled)");
    if (m->file_count > 0) {
        kent_text_add(&words, "%s · checksum %016llx", m->files[0], m->checksum);
        kent_table_paragraph(v->out, v->limit, "", kent_text_of(&words));
        kent_text_reset(&words);
    }
    kent_text_add(&words, "Water");
    if (isfinite(w->temperature)) {
        kent_text_add(
            &words, " at %s",
            kent_shown_with_unit(KENT_TEMPERATURE, v->units, w->temperature).text);
    }
    kent_text_add(&words, ": density %s, sound %s, viscosity %s, vapour pressure %s. ",
                  kent_shown_with_unit(KENT_DENSITY, v->units, w->density).text,
                  kent_shown_with_unit(KENT_SPEED, v->units, w->sound_speed).text,
                  kent_shown_with_unit(KENT_VISCOSITY, v->units, w->viscosity).text,
                  kent_shown_with_unit(KENT_STRESS, v->units, w->vapour_pressure).text);
    kent_text_add(&words, "Air %s absolute, gravity %s.",
                  kent_shown_with_unit(KENT_STRESS, v->units, m->barometric).text,
                  kent_shown_with_unit(KENT_ACCELERATION, v->units, m->gravity).text);
    kent_table_paragraph(v->out, v->limit, "", kent_text_of(&words));
    v->out->failed = v->out->failed || words.failed;
    kent_text_clear(&words);
}

static void print_points(const kent_view *v)
{
    const kent_model *m = v->model;
    const kent_shown unit = kent_shown_unit(KENT_LENGTH, v->units);
    const char *metre = unit.text;
    const kent_column columns[] = {
        {"point", "", KENT_ALIGN_LEFT, true},
        {"x", metre, KENT_ALIGN_RIGHT, false},
        {"y", metre, KENT_ALIGN_RIGHT, false},
        {"z", metre, KENT_ALIGN_RIGHT, false},
        {"cover", metre, KENT_ALIGN_RIGHT, false},
        {"soil", "", KENT_ALIGN_LEFT, true},
        {"steady head", metre, KENT_ALIGN_RIGHT, false},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    double *head = kent_alloc(m->point_count, sizeof *head);
    if (!head) {
        v->out->failed = true;
        return;
    }
    for (size_t i = 0; i < m->point_count; i++) {
        head[i] = NAN;
    }
    if (v->steady) kent_point_steady_heads(m, v->steady, head);
    for (size_t i = 0; i < m->point_count; i++) {
        const kent_point *p = &m->points[i];
        const int soil = p->soil >= 0 ? p->soil : m->ground.soil;
        word(&t, p->id);
        quantity(v, &t, KENT_LENGTH, p->at.x);
        quantity(v, &t, KENT_LENGTH, p->at.y);
        quantity(v, &t, KENT_LENGTH, p->at.z);
        quantity(v, &t, KENT_LENGTH, isnan(p->cover) ? m->ground.cover : p->cover);
        word(&t, soil >= 0 ? m->soils[soil].id : "");
        quantity(v, &t, KENT_LENGTH, head[i]);
    }
    finish(v, "Points", &t);
    free(head);
}

/* Where the wave speed of a pipe comes from. */
static kent_shown wave_form(const kent_pipe *p)
{
    kent_shown s;
    if (isfinite(p->wave_speed)) {
        (void)snprintf(s.text, sizeof s.text, "given");
    } else {
        (void)snprintf(s.text, sizeof s.text, "%s, %s", p->thin_wall ? "thin" : "thick",
                       kent_axial_support_word(p->axial_support));
    }
    return s;
}

static void print_pipes(const kent_view *v)
{
    const kent_model *m = v->model;
    const kent_shown mm = kent_shown_unit(KENT_DIAMETER, v->units);
    const kent_shown speed = kent_shown_unit(KENT_SPEED, v->units);
    const kent_shown bar = kent_shown_unit(KENT_PRESSURE, v->units);
    const kent_column columns[] = {
        {"pipe", "", KENT_ALIGN_LEFT, true},
        {"class", "", KENT_ALIGN_LEFT, true},
        {"bore", mm.text, KENT_ALIGN_RIGHT, false},
        {"outside", mm.text, KENT_ALIGN_RIGHT, false},
        {"wall", mm.text, KENT_ALIGN_RIGHT, false},
        {"wave", speed.text, KENT_ALIGN_RIGHT, false},
        {"wall theory", "", KENT_ALIGN_LEFT, true},
        {"friction", "", KENT_ALIGN_LEFT, true},
        {"joint", "", KENT_ALIGN_LEFT, true},
        {"rating", bar.text, KENT_ALIGN_RIGHT, false},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    const kent_span *span = m->spans; /* the first of its pipe: all have one speed */
    for (size_t i = 0; i < m->pipe_count; i++) {
        const kent_pipe *p = &m->pipes[i];
        const int tenths = v->units == KENT_SI ? 1 : 3; /* mm, in: walls are thin */
        word(&t, p->id);
        word(&t, p->pipe_class);
        quantity(v, &t, KENT_DIAMETER, p->inside_diameter);
        quantity(v, &t, KENT_DIAMETER, p->outside_diameter);
        kent_table_cell(&t, "%s",
                        kent_shown_number(
                            kent_units_shown(KENT_DIAMETER, v->units, p->wall), tenths)
                            .text);
        while (span->pipe < (int)i) { /* every pipe has a span, in the pipes' order */
            span++;
        }
        kent_table_cell(&t, "%s",
                        kent_shown_number(
                            kent_units_shown(KENT_SPEED, v->units, span->wave_speed), 0)
                            .text);
        word(&t, wave_form(p).text);
        word(&t, kent_friction_word(p->friction));
        word(&t, kent_joint_word(p->joint));
        quantity(v, &t, KENT_PRESSURE, p->pressure_rating);
    }
    finish(v, "Pipes", &t);
}

/* ---- what became of it ----------------------------------------------------------- */

static void print_spans(const kent_view *v)
{
    const kent_model *m = v->model;
    const kent_shown metre = kent_shown_unit(KENT_LENGTH, v->units);
    const kent_shown flow = kent_shown_unit(KENT_FLOW, v->units);
    const kent_shown speed = kent_shown_unit(KENT_SPEED, v->units);
    const kent_column columns[] = {
        {"pipe", "", KENT_ALIGN_LEFT, true},
        {"from", "", KENT_ALIGN_LEFT, true},
        {"to", "", KENT_ALIGN_LEFT, true},
        {"length", metre.text, KENT_ALIGN_RIGHT, false},
        {"flow", flow.text, KENT_ALIGN_RIGHT, false},
        {"velocity", speed.text, KENT_ALIGN_RIGHT, false},
        {"reaches", "", KENT_ALIGN_RIGHT, false},
        {"wave used", speed.text, KENT_ALIGN_RIGHT, false},
        {"", "", KENT_ALIGN_LEFT, false},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < m->span_count; i++) {
        const kent_span *s = &m->spans[i];
        const double q = v->steady ? v->steady->span_flow[i] : NAN;
        const bool grid = v->grid != NULL;
        word(&t, s->id);
        word(&t, m->points[m->nodes[s->node[0]].point].id);
        word(&t, m->points[m->nodes[s->node[1]].point].id);
        quantity(v, &t, KENT_LENGTH, s->length);
        quantity(v, &t, KENT_FLOW, q);
        quantity(v, &t, KENT_SPEED, q / s->area);
        kent_table_cell(
            &t, "%s",
            kent_shown_number(grid ? (double)v->grid->reaches[i] : NAN, 0).text);
        quantity(v, &t, KENT_SPEED, grid ? v->grid->wave_speed_used[i] : NAN);
        kent_table_cell(&t, "%s", grid && v->grid->misses[i] ? "beyond tolerance" : "");
    }
    finish(v, "Spans: pipes as cut at junctions and devices, steady flow, grid", &t);
}

/* m3/s that leaves a node into the spans that end there. */
static double flow_out_of(const kent_view *v, int node)
{
    const kent_model *m = v->model;
    const kent_node *n = &m->nodes[node];
    double flow = 0.0;
    for (size_t i = 0; i < n->end_count; i++) {
        const kent_end *e = &m->ends[n->end_first + i];
        const double along = v->steady->span_flow[e->span];
        flow += e->side == 0 ? along : -along;
    }
    return flow;
}

static void print_ends(const kent_view *v)
{
    const kent_model *m = v->model;
    const kent_column columns[] = {
        {"at", "", KENT_ALIGN_LEFT, true},
        {"what", "", KENT_ALIGN_LEFT, true},
        {"value", "", KENT_ALIGN_RIGHT, false},
        {"steady flow", "", KENT_ALIGN_RIGHT, false},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < m->fixed_level_count; i++) {
        const kent_fixed_level *f = &m->fixed_levels[i];
        word(&t, point_id(m, f->point));
        word(&t, "fixed level");
        word(&t, kent_shown_with_unit(KENT_LENGTH, v->units, f->level).text);
        const double gives = v->steady ? flow_out_of(v, f->node) : NAN;
        word(&t, kent_shown_with_unit(KENT_FLOW, v->units, gives).text);
    }
    for (size_t i = 0; i < m->outflow_count; i++) {
        const kent_outflow *o = &m->outflows[i];
        word(&t, point_id(m, o->point));
        word(&t, o->pressure_dependent ? "outflow, by pressure" : "outflow");
        word(&t, kent_shown_with_unit(KENT_FLOW, v->units, o->flow).text);
        const double drawn = v->steady ? v->steady->outflow[i] : NAN;
        word(&t, kent_shown_with_unit(KENT_FLOW, v->units, drawn).text);
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        const kent_valve *a = &m->valves[i];
        word(&t, point_id(m, a->point));
        kent_table_cell(&t, "valve %s, %s, %s", a->id, a->type,
                        a->node[1] < 0 ? "discharging" : "in line");
        kent_table_cell(&t, "%s open", kent_shown_number(a->opening, 2).text);
        const double passes = v->steady ? v->steady->valve_flow[i] : NAN;
        word(&t, kent_shown_with_unit(KENT_FLOW, v->units, passes).text);
    }
    finish(v, "Levels, outflows and valves", &t);
}

/* "V1 to 0.00 in 12.0 s from 1.0 s" */
static void add_event(const kent_view *v, const kent_event *e, kent_text *out)
{
    const kent_model *m = v->model;
    const bool valve = e->kind == KENT_EVENT_VALVE;
    kent_text_add(out, "%s",
                  valve ? m->valves[e->target].id
                        : point_id(m, m->outflows[e->target].point));
    if (e->law_count > 0) {
        kent_text_add(out, " by a law of %zu points", e->law_count);
    } else {
        kent_text_add(out, " to %s in %.4g s",
                      valve ? kent_shown_number(e->to, 2).text
                            : kent_shown_with_unit(KENT_FLOW, v->units, e->to).text,
                      e->ramp_time);
    }
    kent_text_add(out, " from %.4g s", e->start_time);
}

static void print_scenarios(const kent_view *v)
{
    const kent_model *m = v->model;
    kent_text words = {0};
    if (m->scenario_count > 0) kent_text_add(v->out, "\nScenarios\n");
    for (size_t i = 0; i < m->scenario_count; i++) {
        const kent_scenario *s = &m->scenarios[i];
        kent_text_reset(&words);
        const bool titled = s->title[0] != '\0' && strcmp(s->title, s->id) != 0;
        kent_text_add(&words, "%s: %s%s%s, %.4g s", s->id, titled ? s->title : "",
                      titled ? "; " : "", kent_class_word(s->class_of), s->duration);
        for (size_t k = 0; k < s->event_count; k++) {
            kent_text_add(&words, "; ");
            add_event(v, &m->events[s->event_first + k], &words);
        }
        kent_table_paragraph(v->out, v->limit, "", kent_text_of(&words));
    }
    v->out->failed = v->out->failed || words.failed;
    kent_text_clear(&words);
}

static void print_fittings(const kent_view *v)
{
    const kent_model *m = v->model;
    const kent_shown mm = kent_shown_unit(KENT_DIAMETER, v->units);
    const kent_shown metre = kent_shown_unit(KENT_LENGTH, v->units);
    const kent_column columns[] = {
        {"station", "", KENT_ALIGN_LEFT, false},
        {"point", "", KENT_ALIGN_LEFT, true},
        {"fitting", "", KENT_ALIGN_LEFT, true},
        {"size", mm.text, KENT_ALIGN_RIGHT, false},
        {"turn in plan", "°, + left", KENT_ALIGN_RIGHT, false},
        {"soil", "", KENT_ALIGN_LEFT, true},
        {"cover", metre.text, KENT_ALIGN_RIGHT, false},
        {"restraint asked", "", KENT_ALIGN_LEFT, true},
    };
    kent_table t = {.columns = columns,
                    .column_count = sizeof columns / sizeof columns[0]};
    for (size_t i = 0; i < m->fitting_count; i++) {
        const kent_fitting *f = &m->fittings[i];
        word(&t, kent_shown_station(v->units, f->station).text);
        word(&t, f->id);
        word(&t, kent_shown_fitting(m, f, v->units, KENT_ROOMY).text);
        word(&t, kent_shown_size(m, f, v->units).text);
        quantity(v, &t, KENT_ANGLE, f->type == KENT_BEND ? f->plan_turn : NAN);
        word(&t, f->soil >= 0 ? m->soils[f->soil].id : "");
        quantity(v, &t, KENT_LENGTH, f->cover);
        word(&t, f->within_deflection ? "none: within joint deflection"
                                      : kent_restraint_word(f->restraint));
    }
    finish(v, "Fittings found", &t);
}

static void print_assumed(const kent_view *v)
{
    const kent_model *m = v->model;
    if (m->assumed.count == 0) {
        kent_text_add(v->out, "\nNothing was assumed.\n");
        return;
    }
    kent_text_add(v->out, "\nAssumed, because nothing was said of it\n");
    for (size_t i = 0; i < m->assumed.count; i++) {
        kent_text words = {0};
        kent_shown_assumption(m->assumed.text[i], &words);
        kent_table_paragraph(v->out, v->limit, "-  ", kent_text_of(&words));
        v->out->failed = v->out->failed || words.failed;
        kent_text_clear(&words);
    }
}

static void print_cautions(const kent_view *v)
{
    const kent_notes *cautions = &v->model->cautions;
    if (cautions->count > 0) kent_text_add(v->out, "\nCautions\n");
    for (size_t i = 0; i < cautions->count; i++) {
        kent_table_paragraph(v->out, v->limit, "!  ", cautions->text[i]);
    }
}

static void print_steady_report(const kent_view *v)
{
    const kent_steady_report *s = v->steady ? &v->steady->report : NULL;
    kent_text words = {0};
    if (!s || v->model->span_count == 0) return;
    const char *where = s->worst_node >= 0
                            ? point_id(v->model, v->model->nodes[s->worst_node].point)
                            : "no free point";
    kent_text_add(&words,
                  "Steady state: %d iterations, worst imbalance %.2g %s at %s, worst "
                  "head gap %.2g %s.",
                  s->iterations,
                  kent_units_shown(KENT_FLOW, v->units, s->worst_imbalance),
                  kent_shown_unit(KENT_FLOW, v->units).text, where,
                  kent_units_shown(KENT_LENGTH, v->units, s->worst_head_gap),
                  kent_shown_unit(KENT_LENGTH, v->units).text);
    if (v->grid) kent_text_add(&words, " Time step %.6g s", v->grid->step);
    if (v->grid && v->model->solver.grid_check) {
        kent_text_add(&words, ", and half of it: the figures printed are those of the "
                              "half, the grid band is the difference");
    }
    if (v->grid) kent_text_add(&words, ".");
    kent_table_paragraph(v->out, v->limit, "", kent_text_of(&words));
    v->out->failed = v->out->failed || words.failed;
    kent_text_clear(&words);
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

kent_status kent_report_check(const kent_model *m, const kent_steady *s,
                              const kent_report_options *o, kent_sink sink)
{
    kent_text out = {0};
    const kent_view v = {.model = m,
                         .steady = s,
                         .grid = plan_grid(m),
                         .units = o->units,
                         .limit = o->wide ? 0 : KENT_TABLE_LIMIT,
                         .out = &out};
    print_head(&v);
    print_points(&v);
    print_pipes(&v);
    print_spans(&v);
    print_steady_report(&v);
    print_ends(&v);
    print_scenarios(&v);
    print_fittings(&v);
    print_assumed(&v);
    print_cautions(&v);
    const kent_status status = kent_sink_flush(sink, &out);
    kent_grid_free(v.grid);
    kent_text_clear(&out);
    return status;
}
