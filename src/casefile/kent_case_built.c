/* What was built of a fitting, and how long its joints were restrained. */
#include "kent_case_internal.h"

#include <math.h>
#include <string.h>

static const char *const SIDES[] = {"width", "height", "thickness"};
static const char *const FACE[] = {"face_width", "face_height", "face_thickness"};

static bool has_any(const kent_record *record, const char *const keys[3])
{
    return kent_record_has(record, keys[0]) || kent_record_has(record, keys[1]) ||
           kent_record_has(record, keys[2]);
}

/* Width and height come together; what lies between them is not guessed at. */
static void check_sides(kent_filling *f, kent_record *record, const char *const keys[3])
{
    if (!record->sound || !has_any(record, keys)) return;
    for (size_t i = 0; i < 2; i++) {
        if (kent_record_has(record, keys[i])) continue;
        kent_record_complain(&f->reader, record, NULL,
                             "%s is missing; give both %s and %s as measured", keys[i],
                             keys[0], keys[1]);
        return;
    }
}

static void fill_leg(const kent_record *record, kent_built_leg *leg)
{
    *leg = (kent_built_leg){.toward = kent_record_field(record, "towards")->index,
                            .length = kent_record_number(record, "length")};
}

static void fill_legs(kent_filling *f, kent_record *record, kent_built *b)
{
    kent_model *m = f->model;
    const kent_twig *list = kent_record_field(record, "restrained")->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    b->leg_first = m->built_leg_count;
    if (kent_grow((void **)&m->built_legs, &f->built_leg_capacity,
                  m->built_leg_count + count, sizeof *m->built_legs) != 0) {
        f->reader.failed = true;
        return;
    }
    for (size_t i = 0; i < count; i++) {
        kent_record leg;
        const kent_twig *twig = kent_record_element(&f->reader, list, record->label, i);
        if (!twig) {
            record->sound = false;
            continue;
        }
        kent_record_read(&f->reader, twig, "built_leg", record->label, i + 1, &leg);
        record->sound = record->sound && leg.sound;
        fill_leg(&leg, &m->built_legs[m->built_leg_count++]);
    }
    b->leg_count = m->built_leg_count - b->leg_first;
}

static bool is_twice(const kent_filling *f, size_t index)
{
    const kent_built *all = f->model->built;
    for (size_t i = 0; i < index; i++) {
        if (strcmp(all[i].fitting, all[index].fitting) == 0) return true;
    }
    return false;
}

static void check_built(kent_filling *f, kent_record *record, const kent_built *b,
                        size_t index)
{
    const bool body = has_any(record, SIDES), face = has_any(record, FACE);
    const bool bearing = b->body == 0;
    check_sides(f, record, SIDES);
    check_sides(f, record, FACE);
    if (!record->sound) return;
    if (!body && b->leg_count == 0) {
        kent_record_complain(&f->reader, record, NULL,
                             "nothing of it is stated as built; give width and height "
                             "of its block, or restrained");
    } else if (face && (!body || bearing)) {
        kent_record_complain(
            &f->reader, record, FACE[0],
            "face_width is of a face beside a gravity block or base; a "
            "bearing block's own sides are width and height");
    } else if (b->body > 0 && isnan(b->thickness)) {
        kent_record_complain(&f->reader, record, NULL,
                             "thickness is missing: what a gravity block weighs, or a "
                             "base bears, hangs on it");
    } else if (is_twice(f, index)) {
        kent_record_complain(&f->reader, record, "fitting",
                             "\"%s\" is given as built twice; keep one", b->fitting);
    }
}

void kent_fill_built(kent_filling *f, kent_record *record, size_t index)
{
    kent_built *b = &f->model->built[index];
    *b = kent_built_blank();
    kent_record_copy(record, "fitting", NULL, b->fitting, sizeof b->fitting);
    b->width = kent_record_number(record, "width");
    b->height = kent_record_number(record, "height");
    b->thickness = kent_record_number(record, "thickness");
    b->face_width = kent_record_number(record, "face_width");
    b->face_height = kent_record_number(record, "face_height");
    b->face_thickness = kent_record_number(record, "face_thickness");
    b->axis_above = kent_record_number_or(record, "axis_above", 0.0);
    b->body = kent_record_field(record, "block")->index; /* as said below: from 0 */
    b->place = record->place;
    fill_legs(f, record, b);
    check_built(f, record, b, index);
    if (b->body >= 0) b->body++; /* kent_block_type, which starts with none */
}

/* ---- once fittings are known ----------------------------------------------------- */

static void complain_of(const kent_filling *f, const kent_built *b, const char *what,
                        const char *name)
{
    kent_complain(f->reader.complaints, f->model->files[b->place.file], b->place.line,
                  "as built \"%s\": %s\"%s\"", b->fitting, what, name);
}

static bool has_leg_towards(const kent_model *m, const kent_fitting *fitting, int point)
{
    for (size_t k = 0; k < fitting->port_count; k++) {
        const kent_port *p = &m->ports[fitting->port_first + k];
        if (p->span >= 0 && p->toward == point) return true;
    }
    return false;
}

static void check_fitting(kent_filling *f, kent_built *b)
{
    kent_model *m = f->model;
    const int at = kent_model_fitting_of(m, b->fitting);
    if (at < 0) {
        complain_of(f, b, "no fitting of the case is called ", b->fitting);
        return;
    }
    const kent_fitting *fitting = &m->fittings[at];
    for (size_t i = 0; i < b->leg_count; i++) {
        const int toward = m->built_legs[b->leg_first + i].toward;
        if (has_leg_towards(m, fitting, toward)) continue;
        complain_of(f, b, "no pipe leads from it to the next point ",
                    m->points[toward].id);
    }
    memcpy(b->fitting, fitting->id, sizeof b->fitting); /* a member is its group's */
}

kent_status kent_fill_built_check(kent_filling *f)
{
    kent_complaints *c = f->reader.complaints;
    const size_t before = c->count;
    for (size_t i = 0; i < f->model->built_count; i++) {
        check_fitting(f, &f->model->built[i]);
    }
    return c->count > before ? KENT_E_INPUT : KENT_OK;
}
