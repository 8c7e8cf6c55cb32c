#include "kent_model_internal.h"

enum { NAMED = 6 }; /* ends told of by name; the rest are counted */

/* The note on each point; complains of notes that belong nowhere. */
static void sort_notes(const kent_model *m, kent_layout *l, kent_complaints *complaints)
{
    int *note_of = l->note;
    for (size_t p = 0; p < m->point_count; p++) {
        note_of[p] = -1;
    }
    for (size_t i = 0; i < m->note_count; i++) {
        const kent_fitting_note *note = &m->notes[i];
        if (note->port_count > 0) continue;
        if (note->point < 0) {
            kent_place_complain(m, note->place, complaints,
                                "fitting \"%s\" has neither at nor ports; name its "
                                "point, or state its ports",
                                note->id);
        } else if (l->first[note->point + 1] == l->first[note->point]) {
            kent_place_complain(m, note->place, complaints,
                                "fitting at \"%s\": no pipe runs through this point; "
                                "name a point of a pipe's route",
                                m->points[note->point].id);
        } else if (note_of[note->point] >= 0) {
            kent_place_complain(m, note->place, complaints,
                                "fitting at \"%s\" stands in the list twice; one "
                                "fitting per point",
                                m->points[note->point].id);
        } else {
            note_of[note->point] = (int)i;
        }
    }
}

/* Room for one more fitting with as many ports as one can have. */
static kent_status make_room(kent_model *m, size_t *fittings, size_t *ports)
{
    void *grown = m->fittings;
    if (kent_grow(&grown, fittings, m->fitting_count + 1, sizeof *m->fittings) != 0) {
        return KENT_E_NOMEM;
    }
    m->fittings = grown;
    grown = m->ports;
    if (kent_grow(&grown, ports, m->port_count + KENT_ARMS, sizeof *m->ports) != 0) {
        return KENT_E_NOMEM;
    }
    m->ports = grown;
    return KENT_OK;
}

static void keep_last(kent_model *m)
{
    kent_fitting *f = &m->fittings[m->fitting_count++];
    f->port_first = m->port_count;
    m->port_count += f->port_count;
}

/* Whether a pipe ends at the point in an outflow, of which nothing more is said. */
static bool ends_unsaid(const kent_model *m, const kent_layout *l, int point)
{
    return l->device[point].kind == KENT_SEAT_OUTFLOW && l->note[point] < 0 &&
           l->first[point + 1] - l->first[point] == 1 &&
           !kent_layout_runs_through(m, l, l->stop[l->first[point]]);
}

/* A main that goes on there makes no thrust; a blank, a shut valve or a hydrant does.
 */
static void caution_ends(kent_model *m, const kent_layout *l)
{
    kent_text names = {0};
    size_t count = 0;
    const char *first = "";

    for (size_t i = 0; i < m->outflow_count; i++) {
        const int point = m->outflows[i].point;
        if (!ends_unsaid(m, l, point)) continue;
        if (count == 0) first = m->points[point].id;
        if (count < NAMED) {
            kent_text_add(&names, count ? ", %s" : "%s", m->points[point].id);
        }
        count++;
    }
    if (count > NAMED) kent_text_add(&names, " and %zu more", count - NAMED);
    if (count > 0) {
        kent_notes_add(&m->cautions,
                       "%s at %s: the pipe is taken to go on, so no thrust is worked "
                       "out there; where it ends, write fittings = ( { at = \"%s\"; "
                       "type = \"dead-end\"; } ), or type = \"hydrant\"",
                       count > 1 ? "outflows" : "outflow", kent_text_of(&names), first);
    }
    m->cautions.failed = m->cautions.failed || names.failed;
    kent_text_clear(&names);
}

kent_status kent_fitting_list(kent_model *m, kent_layout *l,
                              kent_complaints *complaints)
{
    size_t fittings = 0, ports = 0; /* capacities */

    sort_notes(m, l, complaints);
    for (size_t stop = 0; stop < m->route_count; stop++) {
        const int point = m->route[stop];
        if (l->stop[l->first[point]] != stop) continue; /* seen already */
        if (make_room(m, &fittings, &ports) != KENT_OK) return KENT_E_NOMEM;
        const kent_fitting_note *note =
            l->note[point] >= 0 ? &m->notes[l->note[point]] : NULL;
        if (kent_fitting_at(m, l, point, note, &m->fittings[m->fitting_count],
                            &m->ports[m->port_count], complaints)) {
            keep_last(m);
        }
    }
    for (size_t i = 0; i < m->note_count; i++) {
        if (m->notes[i].port_count == 0) continue;
        if (make_room(m, &fittings, &ports) != KENT_OK) return KENT_E_NOMEM;
        if (kent_fitting_from_ports(m, &m->notes[i], &m->fittings[m->fitting_count],
                                    &m->ports[m->port_count], complaints)) {
            keep_last(m);
        }
    }
    caution_ends(m, l);
    return KENT_OK;
}
