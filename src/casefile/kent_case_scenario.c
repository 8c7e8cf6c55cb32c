/* Scenarios and their events. */
#include "kent_case_internal.h"

#include <math.h>

enum { LAW_MOST = 1000 }; /* points of one opening law */

static void fill_law(kent_filling *f, kent_record *record, kent_event *e)
{
    kent_model *m = f->model;
    double time[LAW_MOST];
    double value[LAW_MOST];
    const size_t count = kent_record_pairs(&f->reader, record, "opening_law", KENT_TIME,
                                           KENT_RATIO, LAW_MOST, time, value);
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
    kent_fill_scenario_states(f, record, s);
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
