/* States: the steady flows that scenarios start from. */
#include "kent_case_internal.h"

#include "kent_said.h"

#include <math.h>
#include <stdio.h>

static bool level_in_range(kent_filling *f, kent_record *record, double level)
{
    char range[80];
    const kent_key *key = kent_key_find("fixed_level", "level");
    if (level >= key->least && level <= key->most) return true;
    kent_key_range(key, f->reader.system, range, sizeof range);
    kent_record_complain(&f->reader, record, "levels",
                         "levels: %s is out of range; the range is %s",
                         kent_said_of(KENT_LENGTH, f->reader.system, level).s, range);
    return false;
}

/* The pair ( "R1", "88 m" ): which fixed level, and where it stands. */
static void fill_level(kent_filling *f, kent_record *record, const kent_twig *pair,
                       kent_state *s)
{
    kent_model *m = f->model;
    kent_reader *r = &f->reader;
    const bool whole =
        kent_twig_type_of(pair) == KENT_TWIG_LIST && kent_twig_count(pair) == 2;
    if (!whole) {
        kent_record_complain(r, record, "levels",
                             "element %zu of levels must be a pair, as ( \"R1\", "
                             "\"%s\" )",
                             s->level_count + 1,
                             kent_kind_example(KENT_LENGTH, r->system));
        return;
    }
    const kent_twig *point = kent_twig_child(pair, 0);
    const int at =
        kent_record_lookup(r, record, point, "levels", KENT_SHELF_FIXED_LEVELS);
    const double level = kent_record_item(r, record, kent_twig_child(pair, 1), "levels",
                                          true, KENT_LENGTH);
    if (at < 0 || isnan(level) || !level_in_range(f, record, level)) return;
    for (size_t i = 0; i < s->level_count; i++) {
        if (m->state_levels[s->level_first + i].fixed_level != at) continue;
        kent_record_complain(r, record, "levels",
                             "levels names \"%.60s\" twice; keep one",
                             kent_twig_text(point));
        return;
    }
    if (kent_grow((void **)&m->state_levels, &f->level_capacity,
                  m->state_level_count + 1, sizeof *m->state_levels) != 0) {
        r->failed = true;
        return;
    }
    m->state_levels[m->state_level_count++] = (kent_state_level){at, level};
    s->level_count++;
}

/* The pair ( "PS", 1 ): which pump, and how many of its units run. */
static void fill_running(kent_filling *f, kent_record *record, const kent_twig *pair,
                         kent_state *s)
{
    kent_model *m = f->model;
    kent_reader *r = &f->reader;
    const bool whole = kent_twig_type_of(pair) == KENT_TWIG_LIST &&
                       kent_twig_count(pair) == 2 &&
                       kent_twig_type_of(kent_twig_child(pair, 1)) == KENT_TWIG_WHOLE;
    if (!whole) {
        kent_record_complain(r, record, "running",
                             "element %zu of running must be a pair, as ( \"PS\", 1 )",
                             s->running_count + 1);
        return;
    }
    const kent_twig *name = kent_twig_child(pair, 0);
    const int pump = kent_record_lookup(r, record, name, "running", KENT_SHELF_PUMPS);
    const double units = kent_twig_number(kent_twig_child(pair, 1));
    if (pump < 0) return;
    if (m->pumps[pump].in_parallel < 1) return; /* of a pump that is at fault itself */
    if (units < 0.0 || units > m->pumps[pump].in_parallel) {
        kent_record_complain(r, record, "running",
                             "running: %.9g of \"%s\" is out of range; it has %d "
                             "in_parallel",
                             units, m->pumps[pump].id, m->pumps[pump].in_parallel);
        return;
    }
    for (size_t i = 0; i < s->running_count; i++) {
        if (m->state_running[s->running_first + i].pump != pump) continue;
        kent_record_complain(r, record, "running",
                             "running names \"%.60s\" twice; keep one",
                             kent_twig_text(name));
        return;
    }
    if (kent_grow((void **)&m->state_running, &f->running_capacity,
                  m->state_running_count + 1, sizeof *m->state_running) != 0) {
        r->failed = true;
        return;
    }
    m->state_running[m->state_running_count++] = (kent_state_running){pump, (int)units};
    s->running_count++;
}

void kent_fill_state(kent_filling *f, kent_record *record, size_t index)
{
    kent_state *s = &f->model->states[index];
    const kent_twig *levels = kent_record_field(record, "levels")->twig;
    const kent_twig *running = kent_record_field(record, "running")->twig;
    const size_t count = levels ? kent_twig_count(levels) : 0;
    const size_t units = running ? kent_twig_count(running) : 0;
    *s = (kent_state){
        .level_first = f->model->state_level_count,
        .running_first = f->model->state_running_count,
        .outflow_factor = kent_record_number_or(record, "outflow_factor", 1.0),
        .roughness_factor = kent_record_number_or(record, "roughness_factor", 1.0),
        .place = record->place};
    kent_record_copy(record, "id", NULL, s->id, sizeof s->id);
    for (size_t i = 0; i < count && !f->reader.failed; i++) {
        fill_level(f, record, kent_twig_child(levels, i), s);
    }
    for (size_t i = 0; i < units && !f->reader.failed; i++) {
        fill_running(f, record, kent_twig_child(running, i), s);
    }
}

void kent_fill_scenario_states(kent_filling *f, kent_record *record, kent_scenario *s)
{
    kent_model *m = f->model;
    kent_reader *r = &f->reader;
    const kent_twig *list = kent_record_field(record, "states")->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    s->state_first = m->scenario_state_count;
    if (!kent_record_has(record, "states")) {
        char all[40];
        (void)snprintf(all, sizeof all, "all %zu", m->state_count);
        if (m->state_count > 1 && !kent_record_has(record, "same_as")) {
            kent_fill_assume(f, "states of scenarios that name none", all, "not given");
        }
        return;
    }
    if (list && count == 0) {
        kent_record_complain(r, record, "states",
                             "states is empty; leave it out to start from every state");
        return;
    }
    if (kent_grow((void **)&m->scenario_states, &f->scenario_state_capacity,
                  m->scenario_state_count + count, sizeof *m->scenario_states) != 0) {
        r->failed = true;
        return;
    }
    for (size_t i = 0; i < count; i++) {
        const kent_twig *item = kent_twig_child(list, i);
        const int state =
            kent_record_lookup(r, record, item, "states", KENT_SHELF_STATES);
        for (size_t k = 0; state >= 0 && k < s->state_count; k++) {
            if (m->scenario_states[s->state_first + k] != state) continue;
            kent_record_complain(r, record, "states",
                                 "states names \"%.60s\" twice; keep one",
                                 m->states[state].id);
            return;
        }
        m->scenario_states[m->scenario_state_count++] = state;
        s->state_count++;
    }
}
