/* Pipes, alike ones together, with the wave speed of each and where it comes from; and
 * the spans that the solvers see. */
#include "kent_said.h"
#include "kent_view.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

/* ---- alike pipes ----------------------------------------------------------------- */

enum { TRAITS = 27 };

/* What two pipes must share to be told as one, numbers and words apart. */
typedef struct traits {
    const kent_pipe *pipe;
    double number[TRAITS];
} traits;

static traits traits_of(const kent_pipe *p)
{
    return (traits){p,
                    {p->inside_diameter,
                     p->outside_diameter,
                     p->wall,
                     p->wall_minimum,
                     p->lining,
                     p->lining_modulus,
                     p->modulus,
                     p->poisson,
                     (double)p->friction,
                     p->friction_coefficient,
                     p->loss,
                     p->wave_speed,
                     (double)p->axial_support,
                     (double)p->thin_wall,
                     (double)p->joint,
                     p->joint_deflection,
                     p->laying_length,
                     p->pressure_rating,
                     p->surge_rating,
                     p->recurring_rating,
                     p->test_rating,
                     p->derating,
                     (double)p->creep_count,
                     (double)p->creep_first,
                     p->material_density,
                     p->unit_mass}};
}

/* NAN equals itself and comes last: not given is alike too. */
static int compare_numbers(double x, double y)
{
    if (isnan(x) || isnan(y)) return (isnan(x) ? 1 : 0) - (isnan(y) ? 1 : 0);
    return (x > y) - (x < y);
}

static int compare_traits(const void *a, const void *b)
{
    const traits *x = a, *y = b;
    int order = strcmp(x->pipe->pipe_class, y->pipe->pipe_class);
    if (order == 0) order = strcmp(x->pipe->standard, y->pipe->standard);
    for (size_t i = 0; order == 0 && i < TRAITS; i++) {
        order = compare_numbers(x->number[i], y->number[i]);
    }
    return order;
}

/* Within a group in the pipes' own order. */
static int compare_places(const void *a, const void *b)
{
    const traits *x = a, *y = b;
    const int order = compare_traits(a, b);
    return order != 0 ? order : x->pipe < y->pipe ? -1 : x->pipe > y->pipe;
}

typedef struct kind_of_pipe {
    const traits *first; /* [count] alike */
    size_t count;
} kind_of_pipe;

static int compare_kinds(const void *a, const void *b)
{
    const kind_of_pipe *x = a, *y = b;
    return x->first->pipe < y->first->pipe ? -1 : x->first->pipe > y->first->pipe;
}

/* ---- one kind of pipe in words --------------------------------------------------- */

static const char *said(const kent_view *v, kent_kind kind, double si, kent_shown *room)
{
    *room = kent_shown_with_unit(kind, v->units, si);
    return room->text;
}

/* Walls want a decimal more than other diameters. */
static const char *said_wall(const kent_view *v, double si, kent_shown *room)
{
    const double value = kent_units_shown(KENT_DIAMETER, v->units, si);
    kent_shown number = kent_shown_number(value, v->units == KENT_SI ? 1 : 3);
    (void)snprintf(room->text, sizeof room->text, "%.40s %.40s", number.text,
                   kent_shown_unit(KENT_DIAMETER, v->units).text);
    return room->text;
}

/* "A, B, C and 9 more" */
static void add_names(const kind_of_pipe *k, kent_text *out)
{
    enum { NAMED = 6 };
    for (size_t i = 0; i < k->count && i < NAMED; i++) {
        kent_text_add(out, "%s%s", i > 0 ? ", " : "", k->first[i].pipe->id);
    }
    if (k->count > NAMED) kent_text_add(out, " and %zu more", k->count - NAMED);
}

static void add_sizes(const kent_view *v, const kent_pipe *p, kent_text *out)
{
    kent_shown s;
    kent_text_add(out, "bore %s", said(v, KENT_DIAMETER, p->inside_diameter, &s));
    if (isfinite(p->outside_diameter)) {
        kent_text_add(out, ", outside %s",
                      said(v, KENT_DIAMETER, p->outside_diameter, &s));
    }
    if (isfinite(p->wall)) {
        kent_text_add(out, ", wall %s (taken for the wave speed)",
                      said_wall(v, p->wall, &s));
    }
    if (isfinite(p->wall_minimum)) {
        kent_text_add(out, ", at least %s", said_wall(v, p->wall_minimum, &s));
    }
    if (p->lining > 0.0) {
        kent_text_add(out, ", lining %s", said_wall(v, p->lining, &s));
    }
    kent_text_add(out, ". ");
}

static kent_wall wall_of(const kent_pipe *p)
{
    return (kent_wall){.bore = p->inside_diameter,
                       .thickness = p->wall,
                       .modulus = p->modulus,
                       .poisson = p->poisson,
                       .lining = p->lining,
                       .lining_modulus = p->lining_modulus};
}

/* m/s, the slowest and fastest span of some pipes: free gas makes them differ. */
static void speeds_of(const kent_view *v, const kind_of_pipe *k, const size_t *span_at,
                      double *slowest, double *fastest)
{
    const kent_model *m = v->model;
    *slowest = INFINITY;
    *fastest = 0.0;
    for (size_t i = 0; i < k->count; i++) {
        const size_t pipe = (size_t)(k->first[i].pipe - m->pipes);
        for (size_t s = span_at[pipe]; s < span_at[pipe + 1]; s++) {
            *slowest = fmin(*slowest, m->spans[s].wave_speed);
            *fastest = fmax(*fastest, m->spans[s].wave_speed);
        }
    }
}

/* The form and the numbers put into it: 2.2 to 2.5. */
static void add_wave_form(const kent_view *v, const kent_pipe *p, kent_text *out)
{
    const kent_wall wall = wall_of(p);
    kent_shown s;
    kent_text_add(out, "%s-wall form, %s: c1 = %.3f, ", p->thin_wall ? "thin" : "thick",
                  kent_axial_support_word(p->axial_support),
                  kent_wave_support_factor(&wall, p->axial_support, p->thin_wall));
    kent_text_add(out, "K = %s, ",
                  said(v, KENT_MODULUS, v->model->water.bulk_modulus, &s));
    kent_text_add(out, "D = %s, ", said(v, KENT_DIAMETER, p->inside_diameter, &s));
    kent_text_add(out, "E = %s, ", said(v, KENT_MODULUS, p->modulus, &s));
    kent_text_add(out, "e = %s",
                  said_wall(v, kent_wave_equivalent_thickness(&wall), &s));
    if (p->lining > 0.0 && p->lining_modulus > 0.0) {
        kent_text_add(out, " with the lining as %.3f of its thickness",
                      p->lining_modulus / p->modulus);
    }
    if (v->model->gas_content > 0.0) {
        kent_text_add(out, "; slowed by %.3g of free gas by volume at one atmosphere",
                      v->model->gas_content);
    }
}

static void add_wave(const kent_view *v, const kind_of_pipe *k, const size_t *span_at,
                     kent_text *out)
{
    const kent_pipe *p = k->first->pipe;
    double slowest, fastest;
    kent_shown s;
    speeds_of(v, k, span_at, &slowest, &fastest);
    const double step = v->units == KENT_SI ? 1.0 : 0.3048; /* m/s */
    kent_text_add(out, "Wave speed %s",
                  kent_said_whole(KENT_SPEED, v->units, slowest).s);
    if (fastest - slowest > step) {
        kent_text_add(out, " to %s", kent_said_whole(KENT_SPEED, v->units, fastest).s);
    }
    if (isnan(p->wave_speed)) {
        kent_text_add(out, " by the ");
        add_wave_form(v, p, out);
    } else {
        const kent_wall wall = wall_of(p);
        const double own =
            kent_wave_speed(&wall, p->axial_support, p->thin_wall,
                            v->model->water.density, v->model->water.bulk_modulus);
        kent_text_add(out, " as given");
        if (isfinite(own)) {
            kent_text_add(out, "; its wall would make it %s",
                          said(v, KENT_SPEED, own, &s));
        }
    }
    kent_text_add(out, ". ");
}

static void add_friction(const kent_view *v, const kent_pipe *p, kent_text *out)
{
    kent_text_add(out, "Friction: %s", kent_friction_word(p->friction));
    switch (p->friction) {
    case KENT_FRICTIONLESS:
        break;
    case KENT_COLEBROOK_WHITE: {
        const double mm =
            p->friction_coefficient * (v->units == KENT_SI ? 1e3 : 1e3 / 25.4);
        kent_text_add(out, ", roughness %.3g %s", mm,
                      v->units == KENT_SI ? "mm" : "in");
        break;
    }
    case KENT_HAZEN_WILLIAMS:
    case KENT_MANNING:
    case KENT_DARCY_FIXED:
        kent_text_add(out, ", %.4g", p->friction_coefficient);
        break;
    }
    if (p->loss > 0.0) kent_text_add(out, ", minor losses K %.3g", p->loss);
    kent_text_add(out, ". ");
}

static void add_joints(const kent_view *v, const kent_pipe *p, kent_text *out)
{
    kent_shown s;
    kent_text_add(out, "Joints %s", kent_joint_word(p->joint));
    if (p->joint_deflection > 0.0) {
        kent_text_add(out, ", each taking up to %s",
                      said(v, KENT_ANGLE, p->joint_deflection, &s));
    }
    if (isfinite(p->laying_length)) {
        kent_text_add(out, ", one every %s",
                      said(v, KENT_LENGTH, p->laying_length, &s));
    }
    kent_text_add(out, ". ");
}

static void add_ratings(const kent_view *v, const kent_pipe *p, kent_text *out)
{
    const struct {
        double rating;
        const char *of;
    } ratings[] = {{p->pressure_rating, "in service"},
                   {p->surge_rating, "with surge"},
                   {p->recurring_rating, "with surge that recurs"},
                   {p->test_rating, "under test"}};
    const char *gap = "Rated ";
    kent_shown s;
    for (size_t i = 0; i < sizeof ratings / sizeof ratings[0]; i++) {
        if (isnan(ratings[i].rating)) continue;
        kent_text_add(out, "%s%s %s", gap,
                      said(v, KENT_PRESSURE, ratings[i].rating, &s), ratings[i].of);
        gap = ", ";
    }
    if (gap[0] == 'R') {
        kent_text_add(out, "No rating known");
    } else {
        if (p->standard[0] != '\0') kent_text_add(out, " (%s)", p->standard);
        if (p->derating < 1.0) {
            kent_text_add(out, ", of which the temperature leaves %.2f", p->derating);
        }
    }
    kent_text_add(out, ".");
}

static void say_kind(const kent_view *v, const kind_of_pipe *k, const size_t *span_at)
{
    const kent_pipe *p = k->first->pipe;
    kent_text words = {0};
    kent_shown s;
    double length = 0.0;
    for (size_t i = 0; i < k->count; i++) {
        const kent_pipe *a = k->first[i].pipe;
        length += v->model->chainage[a->route_first + a->route_count - 1] -
                  v->model->chainage[a->route_first];
    }
    add_names(k, &words);
    kent_text_add(&words, ": %s, ",
                  p->pipe_class[0] != '\0' ? p->pipe_class
                                           : "no class of the catalogue");
    if (k->count > 1) kent_text_add(&words, "%zu pipes, in all ", k->count);
    kent_text_add(&words, "%s", said(v, KENT_LENGTH, length, &s));
    kent_view_say(v, "", &words);
    add_sizes(v, p, &words);
    add_wave(v, k, span_at, &words);
    add_friction(v, p, &words);
    add_joints(v, p, &words);
    add_ratings(v, p, &words);
    kent_view_say(v, "   ", &words);
    kent_text_clear(&words);
}

/* [pipe_count + 1] the first span of each pipe: spans stand in the pipes' order. */
static size_t *first_spans(const kent_model *m)
{
    size_t *at = kent_alloc(m->pipe_count + 1, sizeof *at);
    if (!at) return NULL;
    size_t s = 0;
    for (size_t i = 0; i <= m->pipe_count; i++) {
        while (s < m->span_count && (size_t)m->spans[s].pipe < i) {
            s++;
        }
        at[i] = s;
    }
    return at;
}

void kent_view_pipes(const kent_view *v)
{
    enum { KINDS_SHOWN = 60 };
    const kent_model *m = v->model;
    size_t count = 0;
    traits *all = kent_alloc(m->pipe_count, sizeof *all);
    kind_of_pipe *kinds = kent_alloc(m->pipe_count, sizeof *kinds);
    size_t *span_at = first_spans(m);
    if (!all || !kinds || !span_at) {
        v->out->failed = true;
        goto done;
    }
    for (size_t i = 0; i < m->pipe_count; i++) {
        all[i] = traits_of(&m->pipes[i]);
    }
    if (m->pipe_count > 0) {
        qsort(all, m->pipe_count, sizeof *all, compare_places);
        kent_text_add(v->out, "\nPipes\n");
    }
    for (size_t i = 0; i < m->pipe_count; i++) {
        if (i > 0 && compare_traits(&all[i - 1], &all[i]) == 0) {
            kinds[count - 1].count++;
        } else {
            kinds[count++] = (kind_of_pipe){&all[i], 1};
        }
    }
    if (count > 0) qsort(kinds, count, sizeof *kinds, compare_kinds);
    for (size_t i = 0; i < count; i++) {
        if (!v->wide && i == KINDS_SHOWN) {
            kent_text_add(v->out, "and %zu more kinds of pipe: --wide tells all\n",
                          count - i);
            break;
        }
        say_kind(v, &kinds[i], span_at);
    }
done:
    free(span_at);
    free(kinds);
    free(all);
}

/* ---- spans ----------------------------------------------------------------------- */

/* Columns that do not depend on the states. */
enum { BEFORE = 4, AFTER = 3 };

static void add_span(const kent_view *v, size_t i, kent_table *t)
{
    const kent_model *m = v->model;
    const kent_span *s = &m->spans[i];
    const bool grid = v->grid != NULL;
    kent_view_word(t, s->id);
    kent_view_word(t, m->points[m->nodes[s->node[0]].point].id);
    kent_view_word(t, m->points[m->nodes[s->node[1]].point].id);
    kent_view_quantity(v, t, KENT_LENGTH, s->length);
    for (size_t k = 0; k < kent_view_states(v); k++) {
        const kent_steady *steady = kent_view_steady(v, k);
        const double q = steady ? steady->span_flow[i] : NAN;
        kent_view_quantity(v, t, KENT_FLOW, q);
        kent_view_quantity(v, t, KENT_SPEED, q / s->area);
    }
    kent_table_cell(
        t, "%s", kent_shown_number(grid ? (double)v->grid->reaches[i] : NAN, 0).text);
    kent_view_quantity(v, t, KENT_SPEED, grid ? v->grid->wave_speed_used[i] : NAN);
    kent_table_cell(t, "%s", grid && v->grid->misses[i] ? "beyond tolerance" : "");
}

static void fill_columns(const kent_view *v, kent_column *columns, kent_shown *names,
                         const kent_shown units[3])
{
    const char *metre = units[0].text, *flow = units[1].text, *speed = units[2].text;
    size_t c = 0;
    columns[c++] = (kent_column){"pipe", "", KENT_ALIGN_LEFT, true};
    columns[c++] = (kent_column){"from", "", KENT_ALIGN_LEFT, true};
    columns[c++] = (kent_column){"to", "", KENT_ALIGN_LEFT, true};
    columns[c++] = (kent_column){"length", metre, KENT_ALIGN_RIGHT, false};
    for (size_t k = 0; k < kent_view_states(v); k++) {
        names[k] = kent_view_in_state(v, "flow", k);
        columns[c++] = (kent_column){names[k].text, flow, KENT_ALIGN_RIGHT, true};
        columns[c++] = (kent_column){"velocity", speed, KENT_ALIGN_RIGHT, false};
    }
    columns[c++] = (kent_column){"reaches", "", KENT_ALIGN_RIGHT, false};
    columns[c++] = (kent_column){"wave used", speed, KENT_ALIGN_RIGHT, false};
    columns[c++] = (kent_column){"", "", KENT_ALIGN_LEFT, false};
}

static void say_solved(const kent_view *v, size_t state)
{
    const kent_model *m = v->model;
    const kent_steady *steady = kent_view_steady(v, state);
    kent_text words = {0};
    if (!steady) return;
    const kent_steady_report *s = &steady->report;
    const char *where = s->worst_node >= 0
                            ? kent_view_point(m, m->nodes[s->worst_node].point)
                            : "no free point";
    kent_text_add(&words,
                  "%s: %d iterations, worst imbalance %.2g %s at %s, worst head gap "
                  "%.2g %s.",
                  kent_view_in_state(v, "Steady state", state).text, s->iterations,
                  kent_units_shown(KENT_FLOW, v->units, s->worst_imbalance),
                  kent_shown_unit(KENT_FLOW, v->units).text, where,
                  kent_units_shown(KENT_LENGTH, v->units, s->worst_head_gap),
                  kent_shown_unit(KENT_LENGTH, v->units).text);
    kent_view_say(v, "", &words);
    kent_text_clear(&words);
}

static void say_grid(const kent_view *v)
{
    kent_text words = {0};
    if (!v->grid) return;
    kent_text_add(&words, "Time step %.6g s", v->grid->step);
    if (v->model->solver.grid_check) {
        kent_text_add(&words, ", and half of it: the figures printed are those of the "
                              "half, the grid band is the difference");
    }
    kent_text_add(&words, ". Wave speeds may be moved by %.3g of themselves to fit it",
                  v->model->solver.wave_speed_tolerance);
    if (v->grid->miss_count > 0) {
        kent_text_add(&words, "; %zu of %zu spans are moved further",
                      v->grid->miss_count, v->model->span_count);
    }
    kent_text_add(&words, ".");
    kent_view_say(v, "", &words);
    kent_text_clear(&words);
}

void kent_view_spans(const kent_view *v)
{
    const kent_model *m = v->model;
    const size_t states = kent_view_states(v);
    const size_t count = BEFORE + 2 * states + AFTER;
    const kent_shown units[3] = {kent_shown_unit(KENT_LENGTH, v->units),
                                 kent_shown_unit(KENT_FLOW, v->units),
                                 kent_shown_unit(KENT_SPEED, v->units)};
    kent_column *columns = kent_alloc(count, sizeof *columns);
    kent_shown *names = kent_alloc(states, sizeof *names);
    if (!columns || !names) {
        v->out->failed = true;
        goto done;
    }
    if (m->span_count == 0) goto done;
    fill_columns(v, columns, names, units);
    kent_table t = {.columns = columns, .column_count = count};
    const bool whole = kent_view_whole(v, m->span_count);
    for (size_t i = 0; i < m->span_count; i++) {
        if (whole || (v->grid && v->grid->misses[i])) add_span(v, i, &t);
    }
    kent_view_finish(v,
                     whole ? "Spans: pipes as cut at junctions and devices, steady "
                             "flow, grid"
                           : "Spans that do not fit the common step",
                     &t);
    if (!whole) {
        kent_text_add(v->out, "\n%zu spans in all; --wide lists them\n", m->span_count);
    }
    for (size_t k = 0; k < m->state_count; k++) {
        say_solved(v, k);
    }
    if (states < m->state_count) {
        kent_text_add(v->out, "Flows of the first %zu states; --wide has all.\n",
                      states);
    }
    say_grid(v);
done:
    free(names);
    free(columns);
}
