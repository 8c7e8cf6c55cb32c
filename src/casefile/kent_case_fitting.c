/* What a case says of fittings. */
#include "kent_case_internal.h"

#include <math.h>

/* ---- ports ------------------------------------------------------------------------
 */

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

/* ---- what stands at it and near it ------------------------------------------------
 */

static void fill_branch(kent_filling *f, kent_record *record, kent_branch *b)
{
    kent_record r;
    if (!kent_fill_group(f, record, "branch", &r)) return;
    const int end = kent_record_field(&r, "end")->index;
    const int joint = kent_record_field(&r, "joint")->index;
    if (kent_record_has(&r, "direction")) {
        b->direction = kent_vec3_unit(kent_record_field(&r, "direction")->vector);
    }
    b->end = end >= 0 ? (kent_branch_end)(end + 1) : KENT_BRANCH_NONE;
    b->joint = joint >= 0 ? (kent_joint)joint : KENT_FLANGED;
    b->outside_diameter = kent_record_number(&r, "outside_diameter");
    b->inside_diameter = kent_record_number(&r, "inside_diameter");
    record->sound = record->sound && r.sound;
    if (!r.sound) return;
    if (b->inside_diameter >= b->outside_diameter) {
        kent_record_complain(&f->reader, &r, "inside_diameter",
                             "inside_diameter is not below outside_diameter");
        record->sound = false;
    }
    if (!kent_record_has(&r, "joint")) {
        kent_fill_assume(f, "joint of branches that name none",
                         kent_joint_word(b->joint), "the usual joint of a branch");
    }
    if (b->end == KENT_BRANCH_OPEN && isnan(b->inside_diameter)) {
        kent_fill_assume(f, "bore of open branches that state none",
                         "the outside diameter", "inside_diameter not given");
    }
}

static void fill_together(kent_filling *f, kent_record *record, kent_fitting_note *n)
{
    kent_model *m = f->model;
    kent_reader *r = &f->reader;
    const kent_twig *list = kent_record_field(record, "together_with")->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    n->together_first = m->together_count;
    if (list && count == 0) {
        kent_record_complain(r, record, "together_with",
                             "together_with is empty; name the points whose fittings "
                             "are held as one with this");
    }
    if (kent_grow((void **)&m->together, &f->together_capacity,
                  m->together_count + count, sizeof *m->together) != 0) {
        r->failed = true;
        return;
    }
    for (size_t i = 0; i < count; i++) {
        const kent_twig *item = kent_twig_child(list, i);
        const int point =
            kent_record_lookup(r, record, item, "together_with", KENT_SHELF_POINTS);
        bool again = point >= 0 && point == n->point;
        for (size_t k = 0; point >= 0 && k < n->together_count; k++) {
            again = again || m->together[n->together_first + k] == point;
        }
        if (again) {
            kent_record_complain(
                r, record, "together_with", "together_with names \"%.60s\" %s",
                m->points[point].id,
                point == n->point ? "itself; name the others" : "twice; keep one");
            return;
        }
        m->together[m->together_count++] = point;
        n->together_count++;
    }
}

static void fill_obstacle(kent_filling *f, kent_record *record, kent_obstacle *o)
{
    kent_vec3 direction = kent_record_field(record, "direction")->vector;
    direction.z = 0.0; /* its distance is level */
    *o = (kent_obstacle){.direction = kent_vec3_unit(direction),
                         .distance = kent_record_number(record, "distance"),
                         .depth = kent_record_number(record, "depth")};
    kent_record_copy(record, "what", NULL, o->what, sizeof o->what);
    if (record->sound && !(kent_vec3_length(direction) > 0.0)) {
        kent_record_complain(&f->reader, record, "direction",
                             "direction must point sideways: what lies above or below "
                             "is no obstacle to a block");
    }
}

static void fill_obstacles(kent_filling *f, kent_record *record, kent_fitting_note *n)
{
    kent_model *m = f->model;
    const kent_twig *list = kent_record_field(record, "obstacles")->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    n->obstacle_first = m->obstacle_count;
    if (kent_grow((void **)&m->obstacles, &f->obstacle_capacity,
                  m->obstacle_count + count, sizeof *m->obstacles) != 0) {
        f->reader.failed = true;
        return;
    }
    for (size_t i = 0; i < count; i++) {
        kent_record obstacle;
        const kent_twig *twig = kent_record_element(&f->reader, list, record->label, i);
        if (!twig) continue;
        kent_record_read(&f->reader, twig, "obstacle", record->label, i + 1, &obstacle);
        fill_obstacle(f, &obstacle, &m->obstacles[m->obstacle_count++]);
    }
    n->obstacle_count = m->obstacle_count - n->obstacle_first;
}

/* ---- a fitting --------------------------------------------------------------------
 */

/* What only a fitting found from geometry can have. */
static bool suits_ports(kent_filling *f, kent_record *record)
{
    static const char *const KEYS[] = {"branch",   "together_with", "apart",
                                       "angle",    "orientation",   "run_restrained",
                                       "can_close"};
    for (size_t i = 0; i < sizeof KEYS / sizeof KEYS[0]; i++) {
        if (!kent_record_has(record, KEYS[i])) continue;
        kent_record_complain(
            &f->reader, record, KEYS[i],
            "%s is of a fitting found from geometry; ports state every "
            "leg of this one",
            KEYS[i]);
        return false;
    }
    return true;
}

static void check_fitting(kent_filling *f, kent_record *record,
                          const kent_fitting_note *n)
{
    const bool at = kent_record_has(record, "at");
    const bool id = kent_record_has(record, "id");
    const bool has_ports = kent_record_has(record, "ports");
    if (!record->sound) return;
    if (at == id) {
        kent_record_complain(
            &f->reader, record, NULL,
            "give at, the point of a fitting found from geometry, or id "
            "and ports");
    } else if (has_ports != id) {
        kent_record_complain(&f->reader, record, NULL,
                             has_ports
                                 ? "a fitting with ports has an id of its own, no at"
                                 : "a fitting without a point needs ports");
    } else if (has_ports && n->port_count == 0) {
        kent_record_complain(&f->reader, record, "ports", "ports is empty");
    } else if (has_ports && !suits_ports(f, record)) {
        return;
    } else if (n->apart && n->together_count > 0) {
        kent_record_complain(&f->reader, record, "apart",
                             "apart and together_with contradict each other; keep one");
    }
}

static void fill_rating(kent_filling *f, kent_record *record, kent_fitting_note *n)
{
    static const char *const MORE[] = {"surge_rating", "test_rating", "standard"};
    n->rating = kent_record_number(record, "rating");
    n->surge_rating = kent_record_number_or(record, "surge_rating", n->rating);
    n->test_rating = kent_record_number_or(record, "test_rating", n->rating);
    kent_record_copy(record, "standard", NULL, n->standard, sizeof n->standard);
    for (size_t i = 0; i < sizeof MORE / sizeof MORE[0]; i++) {
        if (!kent_record_has(record, MORE[i]) || kent_record_has(record, "rating")) {
            continue;
        }
        kent_record_complain(&f->reader, record, MORE[i],
                             "%s needs rating, what its parts are rated for in service",
                             MORE[i]);
        return;
    }
}

void kent_fill_fitting(kent_filling *f, kent_record *record, size_t index)
{
    kent_fitting_note *n = &f->model->notes[index];
    *n = kent_note_blank();
    const kent_field *at = kent_record_field(record, "at");
    const kent_field *id = kent_record_field(record, "id");

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
    fill_rating(f, record, n);
    n->apart = kent_record_switch(record, "apart", false);
    n->place = record->place;
    kent_reader_shelve(&f->reader, KENT_SHELF_FITTINGS, id->twig ? id->text : at->text,
                       (int)index, record->place);
    if (kent_record_has(record, "ports")) fill_ports(f, record, n);
    fill_branch(f, record, &n->branch);
    fill_together(f, record, n);
    fill_obstacles(f, record, n);
    kent_fill_stated(f, record, n);
    check_fitting(f, record, n);
}
