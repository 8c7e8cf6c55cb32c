/* What a pipe is rated for, and by which standard. */
#include "kent_case_internal.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

static void assume_share(kent_filling *f, const kent_material *material, double share)
{
    static const double COLD = 288.15; /* K, what the model takes where nobody says */
    const double temperature = f->model->water.temperature;
    char what[96];
    char value[64];
    char shown[64];
    char why[340];
    if (!f->knows_temperature) {
        kent_fill_assume_value(f, "water temperature", COLD, KENT_TEMPERATURE,
                               "no temperature given");
    }
    if (!(share < 1.0)) return;
    kent_fill_show(f, temperature, KENT_TEMPERATURE, shown, sizeof shown);
    (void)snprintf(what, sizeof what, "share of its ratings that %s keeps",
                   material->id);
    (void)snprintf(value, sizeof value, "%.3g", share);
    (void)snprintf(why, sizeof why, "water at %s; catalogue (%s): %s", shown,
                   material->from.status, material->from.source);
    kent_fill_assume(f, what, value, why);
}

/* Warmer than its ratings go: what the case states itself may hold, nothing else. */
static void say_warmth(kent_filling *f, kent_record *record,
                       const kent_material *material)
{
    const kent_derating *last = &material->derating[material->derating_count - 1];
    char water[64];
    char limit[64];
    kent_fill_show(f, f->model->water.temperature, KENT_TEMPERATURE, water,
                   sizeof water);
    kent_fill_show(f, last->temperature, KENT_TEMPERATURE, limit, sizeof limit);
    if (kent_record_has(record, "pressure_rating")) {
        kent_notes_add(&f->model->cautions,
                       "%sthe water, %s, is warmer than the ratings of %s go, %s: only "
                       "ratings that the case states are held against",
                       record->label, water, material->id, limit);
        return;
    }
    kent_record_complain(&f->reader, record, NULL,
                         "the water is too warm for %s: %s, and its ratings end at %s; "
                         "give the pressure_rating that holds at this temperature, or "
                         "take another material",
                         material->id, water, limit);
}

/* Pipe is marked with what it is rated for when cold, and so may the case be. */
static void say_taken_warm(kent_filling *f, const kent_record *record,
                           const kent_material *material, double share)
{
    char water[64];
    kent_fill_show(f, f->model->water.temperature, KENT_TEMPERATURE, water,
                   sizeof water);
    kent_notes_add(&f->model->cautions,
                   "%sthe ratings that the case states are taken to hold at the "
                   "water's %s; of what is rated cold %s keeps a share of %.3g there",
                   record->label, water, material->id, share);
}

/* Ratings of the case hold at the water's temperature; those of the class are for cold
 * water, and a warm plastic keeps a share of them. A rating in service that the case
 * states means that the class's do not hold: not with surge and under test either. */
void kent_fill_ratings(kent_filling *f, kent_record *record, const kent_pipe_class *row,
                       const kent_material *material, kent_pipe *p)
{
    const kent_pipe_class *holds =
        kent_record_has(record, "pressure_rating") ? NULL : row;
    const struct {
        const char *key;
        double of_class; /* Pa */
        double *rating;
    } rows[] = {
        {"pressure_rating", holds ? holds->pressure_rating : NAN, &p->pressure_rating},
        {"surge_rating", holds ? holds->surge_rating : NAN, &p->surge_rating},
        {"recurring_rating", holds ? holds->recurring_rating : NAN,
         &p->recurring_rating},
        {"test_rating", holds ? holds->test_rating : NAN, &p->test_rating},
    };
    const double share =
        material ? kent_material_derating(material, f->model->water.temperature) : 1.0;
    p->joint_rating = kent_record_number(record, "joint_rating");
    p->plastic = material && material->plastic;
    bool own = false;
    bool of_class = false;
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        const bool given = kent_record_has(record, rows[i].key);
        own = own || given;
        of_class = of_class || (!given && !isnan(rows[i].of_class));
    }
    if (material && isnan(share)) say_warmth(f, record, material);
    if (material && own && share < 1.0) say_taken_warm(f, record, material, share);
    const bool reduced = of_class && material && material->derating_count > 0;
    if (reduced) assume_share(f, material, share);
    /* One share serves all: where the case gives some, the others are reduced here. */
    const double here = own ? share : 1.0;
    p->derating = own || isnan(share) ? 1.0 : share;
    for (size_t i = 0; i < sizeof rows / sizeof rows[0]; i++) {
        *rows[i].rating =
            kent_record_number_or(record, rows[i].key, here * rows[i].of_class);
    }
    /* A plastic tires: a surge rating that says nothing of surges that recur is not
     * taken to hold for them. */
    if (material && material->plastic && !isnan(p->surge_rating) &&
        isnan(p->recurring_rating)) {
        p->recurring_rating = p->pressure_rating;
    }
}

/* "EN 545" of "EN 545:2010": the standard without an edition. */
static bool is_without_edition(const char *name, const char *standard)
{
    const size_t n = strlen(name);
    return strncmp(name, standard, n) == 0 && strchr(":- ", standard[n]) != NULL;
}

void kent_fill_standard(kent_filling *f, kent_record *record,
                        const kent_pipe_class *row, kent_pipe *p)
{
    const char *own = kent_record_field(record, "standard")->text;
    const char *of_class = row ? row->standard : "";
    const char *holds =
        !own || (row && is_without_edition(own, of_class)) ? of_class : own;
    (void)snprintf(p->standard, sizeof p->standard, "%s", holds);
    if (row && strcmp(holds, of_class) != 0) {
        kent_notes_add(&f->model->cautions,
                       "pipe \"%s\": its standard is \"%s\", but class %s is of "
                       "\"%s\": walls and ratings of two editions do not mix",
                       p->id, own, row->id, of_class);
    }
}
