#include "kent_duty_alarm.h"

#include "kent_said.h"

/* Share beyond the last flow of a curve from which that is worth saying. */
static const double BEYOND = 1.001;

/* m: a smaller head pushes no water through a pump. */
static const double PUSHED = 1e-3;

/* Quantities in words, in the units that are shown. */
static kent_said flow(const kent_model *m, double si)
{
    return kent_said_of(KENT_FLOW, m->units, si);
}

static kent_said length(const kent_model *m, double si)
{
    return kent_said_of(KENT_LENGTH, m->units, si);
}

static void look_at_pump(const kent_steady *s, size_t device, const char *name,
                         kent_notes *cautions)
{
    const kent_model *m = s->model;
    const kent_pump *p = &m->pumps[m->devices[device].index];
    const kent_pump_curve *c = &p->curve;
    const kent_pump_duty duty = kent_steady_pump(s, device);
    const double last = c->flow[c->count - 1];

    const bool one_way = p->check_valve != KENT_CHECK_NONE;
    if (one_way && duty.running < p->in_parallel && duty.lift < -PUSHED) {
        kent_notes_add(
            cautions,
            "pump %s: units stand, and the head before them is %s higher than "
            "behind them: water would run on through them; they are taken to "
            "be shut off, so let them run, or give water its way past them by "
            "a pipe with a check valve",
            name, length(m, -duty.lift).s);
    }
    if (duty.running == 0) {
        if (duty.flow == 0.0) return;
        kent_notes_add(cautions,
                       "pump %s: it stands still and %s pass through it %s; without a "
                       "check valve it is an open pipe",
                       name, flow(m, duty.flow < 0.0 ? -duty.flow : duty.flow).s,
                       duty.flow < 0.0 ? "backwards" : "forwards");
        return;
    }
    if (duty.of_one == 0.0) {
        kent_notes_add(
            cautions,
            "pump %s: it runs without delivering: it lifts %s at no flow and "
            "%s are needed, so that its check valve is shut",
            name, length(m, c->head[0]).s, length(m, duty.lift).s);
    } else if (duty.of_one > BEYOND * last) {
        kent_notes_add(cautions,
                       "pump %s: each unit passes %s, beyond the end of its curve at "
                       "%s, where its head is only assumed; give more of the curve, or "
                       "the main more resistance",
                       name, flow(m, duty.of_one).s, flow(m, last).s);
    }
    if (duty.running < p->in_parallel && !one_way) {
        kent_notes_add(cautions,
                       "pump %s: %d of %d units stand and have no check valve, so that "
                       "water runs back through them; count only those that are not "
                       "shut off, or give it check_valve",
                       name, p->in_parallel - duty.running, p->in_parallel);
    }
}

static void look_at_device(const kent_steady *s, size_t device, const char *name,
                           kent_notes *cautions)
{
    const kent_model *m = s->model;
    const kent_device_kind kind = m->devices[device].kind;
    if (kind == KENT_DEVICE_PUMP) look_at_pump(s, device, name, cautions);
    if (kind == KENT_DEVICE_RELIEF_VALVE && s->device_flow[device] > 0.0) {
        kent_notes_add(cautions,
                       "relief valve %s: it passes %s in the steady state already; is "
                       "its set_pressure right?",
                       name, flow(m, s->device_flow[device]).s);
    }
}

/* What a scenario leaves out passes nothing from its first instant on. */
static void look_at_march(const kent_steady *s, size_t device, const char *name,
                          int scenario, kent_notes *cautions)
{
    const kent_model *m = s->model;
    const double q = s->device_flow[device];
    if (q == 0.0 || !kent_device_is_left_out(m, device, scenario)) return;
    kent_notes_add(cautions,
                   "scenario %s: it leaves out %s %s, which passes %s in the steady "
                   "state: that stream stops as it begins, a surge of its own; let the "
                   "device be at rest then, or leave it in",
                   m->scenarios[scenario].id, kent_device_word(m->devices[device].kind),
                   name, flow(m, q).s);
}

void kent_duty_alarms_raise(const kent_model *m, kent_steady *const *steadies,
                            size_t count, kent_notes *cautions)
{
    for (size_t i = 0; i < m->device_count; i++) {
        for (size_t k = 0; k < count; k++) {
            if (!steadies[k]) continue;
            const kent_name name = kent_name_in_state(m, m->devices[i].id, (int)k);
            look_at_device(steadies[k], i, name.s, cautions);
            for (size_t j = 0; j < m->march_count; j++) {
                const kent_march *march = &m->marches[j];
                if (march->state != (int)k) continue;
                look_at_march(steadies[k], i, name.s, march->scenario, cautions);
            }
        }
    }
}
