/* What a case says of fittings. */
#include "kent_case_internal.h"

#include <math.h>

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
