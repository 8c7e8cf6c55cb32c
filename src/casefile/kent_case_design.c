/* Scenarios, soils, and what a case says of fittings. */
#include "kent_case_internal.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

/* ---- scenarios ------------------------------------------------------------------- */

enum { LAW_MOST = 1000 }; /* points of one opening law */

static void fill_law(kent_filling *f, kent_record *record, kent_event *e)
{
    kent_model *m = f->model;
    const kent_kind kind = KENT_TIME;
    double time[LAW_MOST];
    double value[LAW_MOST];
    const size_t count = kent_record_pairs(&f->reader, record, "opening_law", &kind,
                                           LAW_MOST, time, value);
    if (kent_grow((void **)&m->law, &f->law_capacity, m->law_count + count,
                  sizeof *m->law) != 0) {
        f->reader.failed = true;
        return;
    }
    e->law_first = m->law_count;
    for (size_t i = 0; i < count; i++) {
        const bool rises = i == 0 ? time[i] >= 0.0 : time[i] > time[i - 1];
        if (!rises || !(value[i] >= 0.0 && value[i] <= 1.0)) {
            kent_record_complain(
                &f->reader, record, "opening_law",
                "pair %zu of opening_law: times must rise from 0 s on and "
                "openings be within 0 to 1",
                i + 1);
            return;
        }
        m->law[m->law_count++] = (kent_law_point){time[i], value[i]};
    }
    e->law_count = count;
    if (count == 0 && record->sound) {
        kent_record_complain(&f->reader, record, "opening_law", "opening_law is empty");
    }
}

static void check_event(kent_filling *f, kent_record *record, const kent_event *e)
{
    kent_reader *r = &f->reader;
    const bool law = kent_record_has(record, "opening_law");
    const kent_field *to = kent_record_field(record, "to");
    if (!record->sound) return;
    if (kent_record_has(record, "valve") == kent_record_has(record, "outflow")) {
        kent_record_complain(r, record, NULL, "give one of valve and outflow");
    } else if (law && (to->twig || kent_record_has(record, "ramp_time"))) {
        kent_record_complain(
            r, record, "opening_law",
            "opening_law stands in place of ramp_time and to; keep one");
    } else if (law && e->kind != KENT_EVENT_VALVE) {
        kent_record_complain(r, record, "opening_law", "opening_law is of a valve");
    } else if (!law && (!to->twig || !kent_record_has(record, "ramp_time"))) {
        kent_record_complain(r, record, NULL,
                             "say what happens by ramp_time and to, or by opening_law");
    } else if (!law && e->kind == KENT_EVENT_VALVE && !to->bare) {
        kent_record_complain(r, record, "to",
                             "to is a flow where an opening from 0.0 to 1.0 belongs");
    } else if (!law && e->kind == KENT_EVENT_OUTFLOW && to->bare) {
        kent_record_complain(r, record, "to",
                             "to = %.9g has no unit; an outflow changes to a flow, for "
                             "instance \"%s\" or \"%s\"",
                             to->number, kent_kind_example(KENT_FLOW, KENT_SI),
                             kent_kind_example(KENT_FLOW, KENT_US));
    }
}

/* An event has to start within its scenario, and should end there. */
static void check_duration(kent_filling *f, kent_record *record, const kent_event *e,
                           const kent_scenario *s)
{
    const kent_model *m = f->model;
    double lasts = e->ramp_time;
    if (!record->sound || isnan(s->duration)) return;
    if (e->law_count > 0) lasts = m->law[e->law_first + e->law_count - 1].time;
    if (e->start_time >= s->duration) {
        kent_record_complain(&f->reader, record, "start_time",
                             "start_time is not within the %.6g s that the scenario "
                             "lasts; start it earlier, or give a longer duration",
                             s->duration);
    } else if (e->start_time + lasts > s->duration) {
        kent_notes_add(&f->model->cautions,
                       "scenario '%s' ends at %.6g s, before its events have ended",
                       s->id, s->duration);
    }
}

static void fill_event(kent_filling *f, kent_record *record, const kent_scenario *s)
{
    kent_model *m = f->model;
    if (kent_grow((void **)&m->events, &f->event_capacity, m->event_count + 1,
                  sizeof *m->events) != 0) {
        f->reader.failed = true;
        return;
    }
    kent_event *e = &m->events[m->event_count++];
    const bool outflow = kent_record_has(record, "outflow");
    *e = (kent_event){
        .kind = outflow ? KENT_EVENT_OUTFLOW : KENT_EVENT_VALVE,
        .target = kent_record_field(record, outflow ? "outflow" : "valve")->index,
        .start_time = kent_record_number_or(record, "start_time", 0.0),
        .ramp_time = kent_record_number(record, "ramp_time"),
        .to = kent_record_number(record, "to"),
        .place = record->place};
    check_event(f, record, e);
    if (kent_record_has(record, "opening_law")) fill_law(f, record, e);
    check_duration(f, record, e, s);
}

void kent_fill_scenario(kent_filling *f, kent_record *record, size_t index)
{
    kent_model *m = f->model;
    kent_scenario *s = &m->scenarios[index];
    const int class_of = kent_record_field(record, "class")->index;
    const kent_twig *events = kent_record_field(record, "events")->twig;
    const size_t count = events ? kent_twig_count(events) : 0;

    kent_record_copy(record, "id", NULL, s->id, sizeof s->id);
    kent_record_copy(record, "title", s->id, s->title, sizeof s->title);
    s->duration = kent_record_number(record, "duration");
    s->class_of = class_of >= 0 ? (kent_class)class_of : KENT_OCCASIONAL;
    s->place = record->place;
    s->event_first = m->event_count;
    if (!kent_record_has(record, "class")) {
        kent_fill_assume(f, "class of scenarios that name none",
                         kent_class_word(s->class_of), "not given");
    }
    for (size_t i = 0; i < count; i++) {
        kent_record event;
        const kent_twig *twig =
            kent_record_element(&f->reader, events, record->label, i);
        if (!twig) continue;
        kent_record_read(&f->reader, twig, "event", record->label, i + 1, &event);
        fill_event(f, &event, s);
        if (f->reader.failed) return;
    }
    s->event_count = m->event_count - s->event_first;
}

/* ---- soils ----------------------------------------------------------------------- */

static void assume_bearing(kent_filling *f, const kent_soil *row)
{
    char what[96];
    (void)snprintf(what, sizeof what, "allowable bearing of %s", row->id);
    kent_fill_assume_value(f, what, row->allowable_bearing, KENT_STRESS, row->source);
}

void kent_fill_soil(kent_filling *f, kent_record *record, size_t index)
{
    kent_soil *s = &f->model->soils[index];
    const int row = kent_record_field(record, "from")->index;
    *s = kent_soil_blank();
    (void)snprintf(s->source, sizeof s->source, "given in the case");
    if (row >= 0) {
        const kent_soil *from = &f->catalogue->soils[row];
        *s = *from;
        (void)snprintf(s->source, sizeof s->source, "given in the case, else %.150s",
                       from->source);
        if (!kent_record_has(record, "allowable_bearing")) assume_bearing(f, from);
    }
    if (kent_record_has(record, "source")) {
        kent_record_copy(record, "source", NULL, s->source, sizeof s->source);
    }
    kent_record_copy(record, "id", NULL, s->id, sizeof s->id);
    kent_record_soil(record, s);
    s->place = record->place;
    if (!record->sound) return;
    if (isnan(s->allowable_bearing)) {
        kent_record_complain(
            &f->reader, record, NULL,
            "allowable_bearing is missing; give it, or name a soil of the "
            "catalogue by from");
    } else if (row < 0 && !kent_record_has(record, "factor_inside") &&
               s->allowable_bearing > 0.0) {
        char what[96];
        (void)snprintf(what, sizeof what, "factor inside the bearing of %s", s->id);
        kent_fill_assume(f, what, "1.0", "factor_inside not given");
    }
}

int kent_fill_soil_index(kent_filling *f, const kent_record *record, const char *key)
{
    kent_model *m = f->model;
    const kent_field *field = kent_record_field(record, key);
    if (!field->from_catalogue) return field->index;

    const kent_soil *row = &f->catalogue->soils[field->index];
    for (size_t i = 0; i < m->soil_count; i++) {
        if (strcmp(m->soils[i].id, row->id) == 0) return (int)i;
    }
    m->soils[m->soil_count] = *row; /* room was made for every row */
    assume_bearing(f, row);
    return (int)m->soil_count++;
}

/* ---- fittings -------------------------------------------------------------------- */

static void fill_port(const kent_record *record, double face, kent_port *p)
{
    const double inside = kent_record_number(record, "inside_diameter");
    const double outside = kent_record_number(record, "outside_diameter");
    *p = (kent_port){
        .direction = kent_vec3_unit(kent_record_field(record, "direction")->vector),
        .inside_diameter = inside,
        .outside_diameter = outside,
        .seal_diameter = kent_record_number_or(record, "seal_diameter",
                                               isnan(outside) ? inside : outside),
        .face = kent_record_number_or(record, "face", isnan(face) ? 0.0 : face),
        .momentum_factor = kent_record_number(record, "momentum_factor"),
        .kind = KENT_PORT_GIVEN,
        .level = NAN,
        .span = -1,
        .toward = -1,
        .pressure = kent_record_number(record, "pressure"),
        .flow = kent_record_number_or(record, "flow", 0.0)};
}

/* Water neither gathers in a fitting nor comes out of nothing. */
static void check_flows(kent_filling *f, kent_record *record,
                        const kent_fitting_note *n)
{
    static const double TOLERANCE = 1e-6; /* of the largest, as the model has it */
    double sum = 0.0;
    double most = 0.0;
    for (size_t i = 0; i < n->port_count; i++) {
        const double flow = f->model->given_ports[n->port_first + i].flow;
        sum += flow;
        most = fmax(most, fabs(flow));
    }
    if (fabs(sum) > TOLERANCE * most) {
        kent_record_complain(
            &f->reader, record, "ports",
            "the flows of its ports do not balance: %.6g m3/s more leave "
            "than arrive",
            sum);
    }
}

static void fill_ports(kent_filling *f, kent_record *record, kent_fitting_note *n)
{
    kent_model *m = f->model;
    const kent_twig *list = kent_record_field(record, "ports")->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    n->port_first = m->given_port_count;
    n->port_count = count;
    if (kent_grow((void **)&m->given_ports, &f->port_capacity,
                  m->given_port_count + count, sizeof *m->given_ports) != 0) {
        f->reader.failed = true;
        return;
    }
    m->given_port_count += count;
    for (size_t i = 0; i < count; i++) {
        kent_record port;
        const kent_twig *twig = kent_record_element(&f->reader, list, record->label, i);
        if (!twig) {
            record->sound = false;
            continue;
        }
        kent_record_read(&f->reader, twig, "port", record->label, i + 1, &port);
        record->sound = record->sound && port.sound;
        fill_port(&port, n->face, &m->given_ports[n->port_first + i]);
    }
    if (record->sound) check_flows(f, record, n);
}

void kent_fill_fitting(kent_filling *f, kent_record *record, size_t index)
{
    kent_fitting_note *n = &f->model->notes[index];
    *n = kent_note_blank();
    const kent_field *at = kent_record_field(record, "at");
    const kent_field *id = kent_record_field(record, "id");
    const bool has_ports = kent_record_has(record, "ports");

    kent_record_copy(record, id->twig ? "id" : "at", NULL, n->id, sizeof n->id);
    n->point = at->index;
    const int type = kent_record_field(record, "type")->index;
    n->type = type > KENT_STRAIGHT ? -1 : type;
    if (type > KENT_STRAIGHT) n->role = (kent_role)(type - KENT_STRAIGHT);
    n->angle = kent_record_number(record, "angle");
    n->orientation = kent_record_field(record, "orientation")->index;
    n->restraint = kent_record_field(record, "restraint")->index;
    n->soil = kent_fill_soil_index(f, record, "soil");
    n->cover = kent_record_number(record, "cover");
    n->weight = kent_record_number(record, "weight");
    n->face = kent_record_number(record, "face");
    n->place = record->place;
    kent_reader_shelve(&f->reader, KENT_SHELF_FITTINGS, id->twig ? id->text : at->text,
                       (int)index, record->place);
    if (has_ports) {
        fill_ports(f, record, n);
    }
    if (!record->sound) return;
    if ((at->twig != NULL) == (id->twig != NULL)) {
        kent_record_complain(
            &f->reader, record, NULL,
            "give at, the point of a fitting found from geometry, or id "
            "and ports");
    } else if (has_ports != (id->twig != NULL)) {
        kent_record_complain(&f->reader, record, NULL,
                             has_ports
                                 ? "a fitting with ports has an id of its own, no at"
                                 : "a fitting without a point needs ports");
    } else if (has_ports && n->port_count == 0) {
        kent_record_complain(&f->reader, record, "ports", "ports is empty");
    }
}
