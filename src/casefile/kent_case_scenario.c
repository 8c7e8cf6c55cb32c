/* Scenarios: what is left out, what they repeat; their events are next door. */
#include "kent_case_internal.h"

#include <math.h>

/* A device named in `without`: it has to stand beside the main. */
static void fill_left_out(kent_filling *f, kent_record *record, const kent_twig *item,
                          kent_scenario *s)
{
    kent_model *m = f->model;
    kent_reader *r = &f->reader;
    const int found =
        kent_record_lookup(r, record, item, "without", KENT_SHELF_DEVICES);
    if (found < 0) return;
    const kent_left_out out = {(kent_device_kind)(found / KENT_DEVICES_OF_A_KIND),
                               found % KENT_DEVICES_OF_A_KIND};
    if (kent_device_in_line(out.kind)) {
        kent_record_complain(r, record, "without",
                             "without: %s \"%.60s\" stands in line, and without it "
                             "there is no main; only what stands beside may be left "
                             "out",
                             kent_device_word(out.kind), kent_twig_text(item));
        return;
    }
    for (size_t i = 0; i < s->without_count; i++) {
        const kent_left_out *other = &m->without[s->without_first + i];
        if (other->kind != out.kind || other->index != out.index) continue;
        kent_record_complain(r, record, "without",
                             "without names \"%.60s\" twice; keep one",
                             kent_twig_text(item));
        return;
    }
    if (kent_grow((void **)&m->without, &f->without_capacity, m->without_count + 1,
                  sizeof *m->without) != 0) {
        r->failed = true;
        return;
    }
    m->without[m->without_count++] = out;
    s->without_count++;
}

static void fill_without(kent_filling *f, kent_record *record, kent_scenario *s)
{
    const kent_twig *list = kent_record_field(record, "without")->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    s->without_first = f->model->without_count;
    for (size_t i = 0; i < count && !f->reader.failed; i++) {
        fill_left_out(f, record, kent_twig_child(list, i), s);
    }
}

static void fill_events(kent_filling *f, kent_record *record, kent_scenario *s)
{
    kent_model *m = f->model;
    const kent_twig *events = kent_record_field(record, "events")->twig;
    const size_t count = events ? kent_twig_count(events) : 0;
    s->event_first = m->event_count;
    for (size_t i = 0; i < count && !f->reader.failed; i++) {
        kent_record event;
        const kent_twig *twig =
            kent_record_element(&f->reader, events, record->label, i);
        if (!twig) continue;
        kent_record_read(&f->reader, twig, "event", record->label, i + 1, &event);
        kent_fill_event(f, &event, s);
    }
    s->event_count = m->event_count - s->event_first;
}

/* What another scenario, that stands before it, has and this does not say. */
static void repeat(kent_filling *f, kent_record *record, kent_scenario *s)
{
    const kent_model *m = f->model;
    const kent_scenario *other = &m->scenarios[s->same_as];
    if (other >= s) {
        kent_record_complain(&f->reader, record, "same_as",
                             "same_as = \"%.60s\": the scenario that is repeated has "
                             "to be listed before the one that repeats it",
                             kent_record_field(record, "same_as")->text);
        return;
    }
    s->event_first = other->event_first;
    s->event_count = other->event_count;
    if (!kent_record_has(record, "duration")) s->duration = other->duration;
    if (!kent_record_has(record, "class")) s->class_of = other->class_of;
    if (!kent_record_has(record, "states")) {
        s->state_first = other->state_first;
        s->state_count = other->state_count;
    }
}

void kent_fill_scenario(kent_filling *f, kent_record *record, size_t index)
{
    kent_scenario *s = &f->model->scenarios[index];
    const int class_of = kent_record_field(record, "class")->index;
    const bool repeats = kent_record_has(record, "same_as");

    kent_record_copy(record, "id", NULL, s->id, sizeof s->id);
    kent_record_copy(record, "title", s->id, s->title, sizeof s->title);
    s->duration = kent_record_number(record, "duration");
    s->class_of = class_of >= 0 ? (kent_class)class_of : KENT_OCCASIONAL;
    s->for_comparison = kent_record_switch(record, "for_comparison", false);
    s->cycles_per_day = kent_record_number(record, "cycles_per_day");
    s->same_as = kent_record_field(record, "same_as")->index;
    s->place = record->place;
    kent_fill_scenario_states(f, record, s);
    fill_without(f, record, s);
    if (repeats && kent_record_has(record, "events")) {
        kent_record_complain(&f->reader, record, "events",
                             "same_as takes over the events of another scenario; keep "
                             "one of them");
    } else if (repeats) {
        if (s->same_as >= 0) repeat(f, record, s);
    } else {
        if (!kent_record_has(record, "duration")) {
            kent_record_complain(&f->reader, record, NULL,
                                 "'duration' is missing (time simulated); write for "
                                 "instance duration = \"%s\"",
                                 kent_kind_example(KENT_TIME, f->reader.system));
        }
        if (!kent_record_has(record, "class")) {
            kent_fill_assume(f, "class of scenarios that name none",
                             kent_class_word(s->class_of), "not given");
        }
        fill_events(f, record, s);
    }
    if (record->sound && !isnan(s->cycles_per_day) && s->class_of != KENT_RECURRING) {
        kent_record_complain(&f->reader, record, "cycles_per_day",
                             "cycles_per_day is of a scenario of class \"recurring\", "
                             "and this one is %s",
                             kent_class_word(s->class_of));
    }
}
