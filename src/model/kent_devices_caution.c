/* What is told of devices before anything is worked out. */
#include "kent_model_internal.h"

#include <string.h>

/* ---- how many units -------------------------------------------------------------- */

static int running_in(const kent_model *m, const kent_state *s, int pump)
{
    for (size_t i = 0; i < s->running_count; i++) {
        const kent_state_running *r = &m->state_running[s->running_first + i];
        if (r->pump == pump) return r->running;
    }
    return m->pumps[pump].running;
}

/* Whether other events of a scenario change how many units of its pump run, the other
 * way. */
static bool is_countered(const kent_model *m, const kent_scenario *s,
                         const kent_event *e)
{
    for (size_t i = 0; i < s->event_count; i++) {
        const kent_event *other = &m->events[s->event_first + i];
        if (other->kind != KENT_EVENT_PUMP || other->target != e->target) continue;
        if ((other->action == KENT_START) != (e->action == KENT_START)) return true;
    }
    return false;
}

/* The most units that an event may find, in any state that its scenario starts from:
 * such as run, or to be started such as stand. */
static int units_found(const kent_model *m, int scenario, const kent_event *e)
{
    int most = 0;
    for (size_t i = 0; i < m->march_count; i++) {
        if (m->marches[i].scenario != scenario) continue;
        const int run = running_in(m, &m->states[m->marches[i].state], e->target);
        const int stand = m->pumps[e->target].in_parallel - run;
        const int found = e->action == KENT_START ? stand : run;
        if (found > most) most = found;
    }
    return most;
}

static void caution_units(kent_model *m)
{
    for (size_t i = 0; i < m->scenario_count; i++) {
        const kent_scenario *s = &m->scenarios[i];
        for (size_t k = 0; k < s->event_count; k++) {
            const kent_event *e = &m->events[s->event_first + k];
            if (e->kind != KENT_EVENT_PUMP || is_countered(m, s, e)) continue;
            const int found = units_found(m, (int)i, e);
            const int asked = e->how_many > 0 ? e->how_many : 1;
            if (asked <= found) continue;
            kent_notes_add(
                &m->cautions,
                "scenario '%s': an event is of %d unit%s of pump %s, and in no "
                "state that it starts from do more than %d %s",
                s->id, asked, asked == 1 ? "" : "s", m->pumps[e->target].id, found,
                e->action == KENT_START ? "stand still" : "run");
        }
    }
}

/* ---- pumps and branches ---------------------------------------------------------- */

static bool has_fitting(const kent_model *m, int point)
{
    for (size_t f = 0; f < m->fitting_count; f++) {
        if (m->fittings[f].point == point) return true;
    }
    return false;
}

static bool starts_pumps(const kent_model *m)
{
    for (size_t i = 0; i < m->event_count; i++) {
        const kent_event *e = &m->events[i];
        if (e->kind == KENT_EVENT_PUMP && e->action == KENT_START) return true;
    }
    return false;
}

/* Whether the case says of a point that something branches off it. */
static bool has_branch(const kent_model *m, int point)
{
    for (size_t f = 0; f < m->fitting_count; f++) {
        if (m->fittings[f].point != point) continue;
        return m->fittings[f].branch.end != KENT_BRANCH_NONE;
    }
    return false;
}

/* Tees that lead to what stands beside the main: whether they push hangs on their
 * joints, of which nothing is said. */
static void caution_branches(kent_model *m)
{
    kent_text names = {0};
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        if (kent_device_in_line(d->kind) || d->kind == KENT_DEVICE_BURST) continue;
        if (has_branch(m, d->point)) continue;
        kent_text_add(&names, "%s%s at %s", names.length > 0 ? ", " : "", d->id,
                      m->points[d->point].id);
    }
    if (names.length > 0) {
        kent_notes_add(
            &m->cautions,
            "the branches that lead to %s push on nothing here: one with a "
            "joint that can slip pushes its tee away; say what it is by a "
            "note in fittings with branch = { outside_diameter; joint; end = "
            "\"valve\"; direction; }, at a point of its own beside a device "
            "in line",
            kent_text_of(&names));
    }
    m->cautions.failed = m->cautions.failed || names.failed;
    kent_text_clear(&names);
}

void kent_devices_caution(kent_model *m)
{
    kent_text names = {0};
    caution_branches(m);
    caution_units(m);
    if (starts_pumps(m)) {
        kent_notes_add(&m->cautions,
                       "pumps start: the main is taken to be full of water; filling an "
                       "empty line and starting on one that has partly drained are "
                       "outside the method");
    }
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        if (d->kind != KENT_DEVICE_PUMP || has_fitting(m, d->point)) continue;
        kent_text_add(&names, "%s%s", names.length > 0 ? ", " : "", d->id);
    }
    if (names.length > 0) {
        kent_notes_add(&m->cautions,
                       "pumps (%s) are no fittings: what the water pushes them with is "
                       "for their own foundation; a note in fittings of type "
                       "\"dead-end\" at the start of a pipe, or \"valve\" in line, "
                       "gives it",
                       kent_text_of(&names));
    }
    m->cautions.failed = m->cautions.failed || names.failed;
    kent_text_clear(&names);
}
