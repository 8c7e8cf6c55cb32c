#include "kent_hand.h"
#include "kent_arith.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>

static kent_instant hand_instant(const kent_model *m, const kent_fitting *f,
                                 double pressure, double time)
{
    kent_instant at = {.set = true, .time = time, .pressure = pressure};

    at.balance.port_count = f->port_count;
    for (size_t k = 0; k < f->port_count; k++) {
        at.balance.port[k].pressure = pressure;
        at.balance.port[k].momentum_factor = 1.0;
    }
    kent_balance_sum(&m->ports[f->port_first], f->port_count, m->water.density,
                     &at.balance);
    return at;
}

static kent_load_case hand_case(const kent_model *m, const kent_fitting *f,
                                const kent_hand_case *from)
{
    const bool surge = from->kind >= KENT_CASE_RECURRING;
    const kent_instant at =
        hand_instant(m, f, from->pressure, surge ? 12.5 : (double)NAN);
    kent_load_case c = {
        .kind = from->kind,
        .scenario = surge ? 0 : -1,
        .state = surge ? 0 : -1,
        .safety_factor = from->factor,
        .increase = 1.0,
        .above_90_percent = surge ? 3.0 : (double)NAN,
    };

    (void)snprintf(c.name, sizeof c.name, "%s", from->name);
    c.title = kent_name_in_state(m, c.name, c.state);
    c.worst[KENT_RESULTANT] = at;
    c.worst[KENT_SIDEWAYS] = at;
    if (at.balance.thrust.z > 0.0) c.worst[KENT_UPWARD] = at;
    if (at.balance.thrust.z < 0.0) c.worst[KENT_DOWNWARD] = at;
    return c;
}

/* The same cases on every fitting. */
kent_loads_result kent_hand_loads(const kent_model *m, const kent_hand_case *cases,
                                  size_t count)
{
    kent_loads_result loads = {.fitting_count = m->fitting_count};

    loads.fittings = calloc(m->fitting_count + 1, sizeof *loads.fittings);
    assert_non_null(loads.fittings);
    for (size_t i = 0; i < m->fitting_count; i++) {
        kent_fitting_loads *f = &loads.fittings[i];
        f->cases = calloc(count + 1, sizeof *f->cases);
        assert_non_null(f->cases);
        f->count = count;
        for (size_t k = 0; k < count; k++) {
            f->cases[k] = hand_case(m, &m->fittings[i], &cases[k]);
        }
    }
    return loads;
}

void kent_hand_clear(kent_loads_result *loads)
{
    for (size_t i = 0; i < loads->fitting_count; i++) {
        free(loads->fittings[i].cases);
    }
    free(loads->fittings);
}

kent_restraints *kent_hand_size(const kent_build *b, const kent_hand_case *cases,
                                size_t count)
{
    kent_loads_result loads = kent_hand_loads(b->model, cases, count);
    kent_restraints *r = NULL;
    kent_error err = {0};

    if (kent_restraint_size(b->model, &loads, &r, &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
    kent_hand_clear(&loads);
    return r;
}

static bool say(const kent_notes *notes, const char *words)
{
    for (size_t i = 0; i < notes->count; i++) {
        if (strstr(notes->text[i], words)) return true;
    }
    return false;
}

bool kent_hand_says(const kent_holding *h, const char *words)
{
    return say(&h->cautions, words);
}

bool kent_hand_remarks(const kent_holding *h, const char *words)
{
    return say(&h->remarks, words);
}

void kent_hand_expect(const kent_holding *h, const char *words)
{
    if (kent_hand_says(h, words)) return;
    for (size_t i = 0; i < h->cautions.count; i++) {
        print_error("caution: %s\n", h->cautions.text[i]);
    }
    fail_msg("no caution says \"%s\"", words);
}

size_t kent_hand_lines(const kent_derivation *d, kent_system system)
{
    size_t checked = 0;

    for (size_t i = 0; i < d->count; i++) {
        const kent_line *line = &d->lines[i];
        char digits[512], printed[64], why[1024];
        if (line->formula[0] == '\0') continue;
        kent_line_numbers(d, i, system, digits, sizeof digits);
        kent_line_value(line, system, printed, sizeof printed);
        if (!kent_arith_agrees(digits, printed, why, sizeof why)) {
            fail_msg("%s = %s: %s", line->symbol, line->formula, why);
        }
        checked++;
    }
    return checked;
}
