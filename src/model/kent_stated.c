/* What an engineer states for the restraint of a fitting, held against its legs. */
#include "kent_fitting_internal.h"

#include <math.h>

/* The port of a leg towards a point; count: none. */
static size_t port_toward(const kent_port *ports, size_t count, int point)
{
    size_t k = 0;
    while (k < count && ports[k].toward != point) {
        k++;
    }
    return k;
}

/* "\"B1\" and \"B2\"": the next points of legs of pipe. */
static void name_next(const kent_model *m, const kent_port *ports, size_t count,
                      kent_text *out)
{
    size_t named = 0;
    for (size_t k = 0; k < count; k++) {
        if (ports[k].toward < 0) continue;
        kent_text_add(out, "%s\"%s\"", named++ > 0 ? ", " : "",
                      m->points[ports[k].toward].id);
    }
}

static bool complain_of_point(const kent_model *m, const kent_fitting_note *note,
                              const char *key, int point, const kent_port *ports,
                              size_t count, kent_complaints *complaints)
{
    kent_text names = {0};
    name_next(m, ports, count, &names);
    kent_place_complain(m, note->place, complaints,
                        "fitting at \"%s\": %s names \"%s\", which is no next point "
                        "along %s; there are %s",
                        m->points[note->point].id, key, m->points[point].id,
                        key[0] == 'r' ? "its run" : "a leg of it",
                        kent_text_of(&names));
    kent_text_clear(&names);
    return false;
}

static bool settle_run(const kent_model *m, const kent_fitting_note *note,
                       kent_fitting *f, const kent_port *ports,
                       kent_complaints *complaints)
{
    const bool tee = f->type == KENT_TEE || f->type == KENT_WYE;
    for (size_t i = 0; i < 2; i++) {
        if (note->run[i].toward < 0) continue;
        if (!tee) {
            kent_place_complain(m, note->place, complaints,
                                "fitting at \"%s\": run_restrained is of the run of a "
                                "tee, and a %s stands there; leave it out",
                                m->points[note->point].id,
                                kent_fitting_type_word(f->type));
            return false;
        }
        const size_t k = port_toward(ports, 2, note->run[i].toward);
        if (k == 2) {
            return complain_of_point(m, note, "run_restrained", note->run[i].toward,
                                     ports, 2, complaints);
        }
        f->stated.run_length[k] = note->run[i].length;
    }
    return true;
}

static bool settle_closes(const kent_model *m, const kent_fitting_note *note,
                          const kent_fitting *f, const kent_port *ports,
                          kent_complaints *complaints)
{
    const bool branches =
        f->type == KENT_TEE || f->type == KENT_WYE || f->type == KENT_CROSS;
    if (f->stated.closes_stated && !branches) {
        kent_place_complain(m, note->place, complaints,
                            "fitting at \"%s\": can_close is of the legs of a tee, wye "
                            "or cross, and a %s stands there; leave it out",
                            m->points[note->point].id, kent_fitting_type_word(f->type));
        return false;
    }
    for (size_t i = 0; i < f->stated.closes_count; i++) {
        const int point = m->closes[f->stated.closes_first + i];
        if (port_toward(ports, f->port_count, point) < f->port_count) continue;
        return complain_of_point(m, note, "can_close", point, ports, f->port_count,
                                 complaints);
    }
    return true;
}

bool kent_stated_settle(const kent_model *m, const kent_fitting_note *note,
                        kent_fitting *f, const kent_port *ports,
                        kent_complaints *complaints)
{
    f->stated = note ? note->stated : kent_stated_blank();
    return !note || (settle_run(m, note, f, ports, complaints) &&
                     settle_closes(m, note, f, ports, complaints));
}
