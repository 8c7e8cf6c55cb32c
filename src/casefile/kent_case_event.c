/* Events: what moves in a scenario, and when. */
#include "kent_case_internal.h"

#include <math.h>
#include <string.h>

enum { LAW_MOST = 1000 }; /* points of one law */

static const double USUAL_DISCHARGE = 0.6; /* of a hole in a wall */

/* What an event may be about, in the order of kent_event_kind. */
static const struct {
    const char *key, *word;
    const char *law;    /* its pairs; NULL: it has none */
    kent_kind law_kind; /* of their values */
} TARGETS[] = {
    [KENT_EVENT_VALVE] = {"valve", "a valve", "opening_law", KENT_RATIO},
    [KENT_EVENT_OUTFLOW] = {"outflow", "an outflow", "flow_law", KENT_FLOW},
    [KENT_EVENT_PUMP] = {"pump", "a pump", NULL, KENT_RATIO},
    [KENT_EVENT_FIXED_LEVEL] = {"fixed_level", "a fixed level", "level_law",
                                KENT_LENGTH},
    [KENT_EVENT_BURST] = {"burst", "a burst", NULL, KENT_AREA},
};

enum { TARGET_COUNT = sizeof TARGETS / sizeof TARGETS[0] };

/* ---- laws ------------------------------------------------------------------------ */

/* A law's value as its target can have it. */
static bool is_in_range(const kent_event *e, double value)
{
    if (e->kind == KENT_EVENT_VALVE) return value >= 0.0 && value <= 1.0;
    const kent_key *key = e->kind == KENT_EVENT_OUTFLOW
                              ? kent_key_find("outflow", "flow")
                              : kent_key_find("fixed_level", "level");
    return value >= key->least && value <= key->most;
}

static void fill_law(kent_filling *f, kent_record *record, kent_event *e)
{
    kent_model *m = f->model;
    double time[LAW_MOST];
    double value[LAW_MOST];
    const char *key = TARGETS[e->kind].law;
    const size_t count =
        kent_record_pairs(&f->reader, record, key, KENT_TIME, TARGETS[e->kind].law_kind,
                          LAW_MOST, time, value);
    if (kent_grow((void **)&m->law, &f->law_capacity, m->law_count + count,
                  sizeof *m->law) != 0) {
        f->reader.failed = true;
        return;
    }
    e->law_first = m->law_count;
    for (size_t i = 0; i < count; i++) {
        const bool rises = i == 0 ? time[i] >= 0.0 : time[i] > time[i - 1];
        if (!rises || !is_in_range(e, value[i])) {
            kent_record_complain(
                &f->reader, record, key,
                "pair %zu of %s: times must rise from 0 s on and %s", i + 1, key,
                e->kind == KENT_EVENT_VALVE ? "openings be within 0 to 1"
                                            : "values be within their range");
            return;
        }
        m->law[m->law_count++] = (kent_law_point){time[i], value[i]};
    }
    e->law_count = count;
    if (!record->sound) return;
    if (count == 0) {
        kent_record_complain(&f->reader, record, key, "%s is empty", key);
    } else if (e->period < time[count - 1]) {
        kent_record_complain(&f->reader, record, "period",
                             "period ends before the last pair of %s, at %.6g s; give "
                             "a longer one",
                             key, time[count - 1]);
    }
}

/* ---- what belongs to what -------------------------------------------------------- */

/* The one target of the event; -1 with a complaint. */
static int kind_of(kent_filling *f, kent_record *record)
{
    int kind = -1;
    for (int k = 0; k < TARGET_COUNT; k++) {
        if (!kent_record_has(record, TARGETS[k].key)) continue;
        if (kind >= 0) {
            kent_record_complain(&f->reader, record, TARGETS[k].key,
                                 "%s and %s are both given; an event has one of them",
                                 TARGETS[kind].key, TARGETS[k].key);
            return -1;
        }
        kind = k;
    }
    if (kind < 0) {
        kent_record_complain(&f->reader, record, NULL,
                             "give one of valve, outflow, pump, fixed_level and burst");
    }
    return kind;
}

/* Keys that stand for one kind of event only. */
static const struct {
    const char *key;
    kent_event_kind kind;
} BELONGS[] = {
    {"opening_law", KENT_EVENT_VALVE},     {"flow_law", KENT_EVENT_OUTFLOW},
    {"level_law", KENT_EVENT_FIXED_LEVEL}, {"action", KENT_EVENT_PUMP},
    {"how_many", KENT_EVENT_PUMP},         {"area", KENT_EVENT_BURST},
    {"coefficient", KENT_EVENT_BURST},
};

static bool check_keys(kent_filling *f, kent_record *record, kent_event_kind kind)
{
    for (size_t i = 0; i < sizeof BELONGS / sizeof BELONGS[0]; i++) {
        if (BELONGS[i].kind == kind || !kent_record_has(record, BELONGS[i].key)) {
            continue;
        }
        kent_record_complain(&f->reader, record, BELONGS[i].key,
                             "%s is of %s; leave it out", BELONGS[i].key,
                             TARGETS[BELONGS[i].kind].word);
        return false;
    }
    return true;
}

/* ---- one of each kind ------------------------------------------------------------ */

/* A valve or outflow: by a ramp or a law; a fixed level by a law. */
static void check_change(kent_filling *f, kent_record *record, const kent_event *e)
{
    kent_reader *r = &f->reader;
    const char *key = TARGETS[e->kind].law;
    const bool law = kent_record_has(record, key);
    const bool ramp = kent_record_has(record, "ramp_time");
    const kent_field *to = kent_record_field(record, "to");
    if (law && (to->twig || ramp)) {
        kent_record_complain(r, record, key,
                             "%s stands in place of ramp_time and to; keep one", key);
    } else if (!law && kent_record_has(record, "period")) {
        kent_record_complain(r, record, "period",
                             "period is of a law that begins again; give %s", key);
    } else if (!law && e->kind == KENT_EVENT_FIXED_LEVEL) {
        kent_record_complain(r, record, NULL,
                             "say how the level changes by level_law, as ( ( \"0 s\", "
                             "\"92 m\" ), ( \"600 s\", \"88 m\" ) )");
    } else if (!law && (!to->twig || !ramp)) {
        kent_record_complain(r, record, NULL,
                             "say what happens by ramp_time and to, or by %s", key);
    } else if (!law && e->kind == KENT_EVENT_VALVE && !to->bare) {
        kent_record_complain(r, record, "to",
                             "to is a flow where an opening from 0.0 to 1.0 belongs");
    } else if (!law && e->kind == KENT_EVENT_VALVE && to->number > 1.0) {
        kent_record_complain(r, record, "to",
                             "to = %.9g is out of range; the range is 0 to 1",
                             to->number);
    } else if (!law && e->kind == KENT_EVENT_OUTFLOW && to->bare) {
        kent_record_complain(r, record, "to",
                             "to = %.9g has no unit; an outflow changes to a flow, for "
                             "instance \"%s\" or \"%s\"",
                             to->number, kent_kind_example(KENT_FLOW, KENT_SI),
                             kent_kind_example(KENT_FLOW, KENT_US));
    }
}

static void fill_pump_event(kent_filling *f, kent_record *record, kent_event *e)
{
    static const char *const WORDS[] = {"trip", "start", "stop", "ramp"};
    kent_reader *r = &f->reader;
    const kent_field *to = kent_record_field(record, "to");
    const int action = kent_record_field(record, "action")->index;
    const bool timed = kent_record_has(record, "ramp_time");
    const double units = kent_record_number_or(record, "how_many", 0.0);
    if (!record->sound) return;
    if (action < 0) {
        kent_record_complain(r, record, NULL,
                             "say what the pump does: action = \"trip\", \"start\", "
                             "\"stop\" or \"ramp\"");
        return;
    }
    e->action = (kent_action)action;
    e->how_many = (int)units;
    if (kent_record_has(record, "period")) {
        kent_record_complain(r, record, "period",
                             "period is of a law that begins again; a pump has none");
    } else if (e->action == KENT_TRIP && timed) {
        kent_record_complain(r, record, "ramp_time",
                             "a trip has no ramp_time: the speed follows from inertia "
                             "and torque; leave it out, or say \"stop\"");
    } else if (e->action != KENT_TRIP && !timed) {
        kent_record_complain(r, record, "action", "\"%s\" needs ramp_time",
                             WORDS[action]);
    } else if ((e->action == KENT_RAMP) != (to->twig != NULL)) {
        kent_record_complain(r, record, to->twig ? "to" : "action",
                             to->twig ? "to is of action \"ramp\"; leave it out"
                                      : "\"ramp\" needs to, the share of the rated "
                                        "speed at its end");
    } else if (to->twig && !to->bare) {
        kent_record_complain(r, record, "to",
                             "to is a flow where a share of the rated speed from 0.0 "
                             "to 1.5 belongs");
    } else if (e->target >= 0 && f->model->pumps[e->target].in_parallel > 0 &&
               e->how_many > f->model->pumps[e->target].in_parallel) {
        kent_record_complain(r, record, "how_many",
                             "how_many = %d is more than the %d in_parallel",
                             e->how_many, f->model->pumps[e->target].in_parallel);
    }
    if (e->action == KENT_START) e->to = 1.0;
    if (e->action == KENT_STOP) e->to = 0.0;
}

/* The burst at a point, that other events may open too. */
static int burst_at(kent_filling *f, int point, kent_place place)
{
    kent_model *m = f->model;
    for (size_t i = 0; i < m->burst_count; i++) {
        if (m->bursts[i].point == point) return (int)i;
    }
    if (kent_grow((void **)&m->bursts, &f->burst_capacity, m->burst_count + 1,
                  sizeof *m->bursts) != 0) {
        f->reader.failed = true;
        return -1;
    }
    m->bursts[m->burst_count] =
        (kent_burst){.point = point, .node = -1, .place = place};
    return (int)m->burst_count++;
}

static void fill_burst_event(kent_filling *f, kent_record *record, kent_event *e)
{
    const int point = e->target;
    e->to = kent_record_number(record, "area");
    e->coefficient = kent_record_number_or(record, "coefficient", USUAL_DISCHARGE);
    e->ramp_time = kent_record_number_or(record, "ramp_time", 0.0);
    if (!record->sound) return;
    if (kent_record_has(record, "to") || kent_record_has(record, "period")) {
        kent_record_complain(&f->reader, record, NULL,
                             "a burst opens to its area in ramp_time, and stays so; "
                             "leave to and period out");
    } else if (isnan(e->to)) {
        kent_record_complain(&f->reader, record, "burst",
                             "a burst needs area, that of the hole");
    } else {
        if (!kent_record_has(record, "coefficient")) {
            kent_fill_assume_value(f, "coefficient of bursts", e->coefficient,
                                   KENT_RATIO, "not given: usual of a sharp hole");
        }
        if (!kent_record_has(record, "ramp_time")) {
            kent_fill_assume_value(f, "ramp_time of bursts", e->ramp_time, KENT_TIME,
                                   "not given: the pipe breaks at once");
        }
        e->target = burst_at(f, point, record->place);
    }
}

/* An event has to start within its scenario, and should end there. */
static void check_duration(kent_filling *f, kent_record *record, const kent_event *e,
                           const kent_scenario *s)
{
    const kent_model *m = f->model;
    double lasts = isnan(e->ramp_time) ? 0.0 : e->ramp_time;
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

void kent_fill_event(kent_filling *f, kent_record *record, const kent_scenario *s)
{
    kent_model *m = f->model;
    const int kind = kind_of(f, record);
    if (kind < 0 || !check_keys(f, record, (kent_event_kind)kind)) return;
    if (kent_grow((void **)&m->events, &f->event_capacity, m->event_count + 1,
                  sizeof *m->events) != 0) {
        f->reader.failed = true;
        return;
    }
    kent_event *e = &m->events[m->event_count++];
    *e = (kent_event){.kind = (kent_event_kind)kind,
                      .target = kent_record_field(record, TARGETS[kind].key)->index,
                      .start_time = kent_record_number_or(record, "start_time", 0.0),
                      .ramp_time = kent_record_number(record, "ramp_time"),
                      .to = kent_record_number(record, "to"),
                      .coefficient = NAN,
                      .period = kent_record_number(record, "period"),
                      .place = record->place};
    switch (e->kind) {
    case KENT_EVENT_VALVE:
    case KENT_EVENT_OUTFLOW:
    case KENT_EVENT_FIXED_LEVEL:
        if (record->sound) check_change(f, record, e);
        if (kent_record_has(record, TARGETS[kind].law)) fill_law(f, record, e);
        break;
    case KENT_EVENT_PUMP:
        fill_pump_event(f, record, e);
        break;
    case KENT_EVENT_BURST:
        fill_burst_event(f, record, e);
        break;
    }
    check_duration(f, record, e, s);
}
