/* What an engineer states for the restraint of one fitting. */
#include "kent_case_internal.h"

#include <math.h>

static void fill_slope(kent_filling *f, kent_record *record, kent_slope *slope)
{
    kent_record r;
    if (!kent_fill_group(f, record, "ground_slope", &r)) return;
    kent_vec3 downhill = kent_record_field(&r, "direction")->vector;
    downhill.z = 0.0; /* the angle says how steep */
    slope->direction = kent_vec3_unit(downhill);
    slope->angle = kent_record_number(&r, "angle");
    if (r.sound && !(kent_vec3_length(downhill) > 0.0)) {
        kent_record_complain(
            &f->reader, &r, "direction",
            "direction must point downhill in plan, as [ 1.0, 0.0, 0.0 "
            "]; angle says how steeply");
    }
    record->sound = record->sound && r.sound;
}

/* One pair (next point, length) of run_restrained. False after a complaint. */
static bool fill_run(kent_filling *f, kent_record *record, const kent_twig *pair,
                     size_t number, kent_stated_run *out)
{
    kent_reader *r = &f->reader;
    const char *key = "run_restrained";
    if (kent_twig_type_of(pair) != KENT_TWIG_LIST || kent_twig_count(pair) != 2) {
        kent_record_complain(r, record, key,
                             "element %zu of run_restrained must be a pair, as ( "
                             "\"B1\", \"%s\" )",
                             number, kent_kind_example(KENT_LENGTH, r->system));
        return false;
    }
    const int toward =
        kent_record_lookup(r, record, kent_twig_child(pair, 0), key, KENT_SHELF_POINTS);
    const double length =
        kent_record_item(r, record, kent_twig_child(pair, 1), key, true, KENT_LENGTH);
    if (toward < 0 || isnan(length)) return false;
    if (!(length >= 0.0 && length <= 1e5)) {
        kent_record_complain(r, record, key,
                             "pair %zu of run_restrained: the length is out of range; "
                             "it is 0 to 100000 m",
                             number);
        return false;
    }
    *out = (kent_stated_run){toward, length};
    return true;
}

static void fill_runs(kent_filling *f, kent_record *record, kent_fitting_note *n)
{
    const kent_twig *list = kent_record_field(record, "run_restrained")->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    if (count > 2) {
        kent_record_complain(&f->reader, record, "run_restrained",
                             "run_restrained has %zu pairs; a run has two sides",
                             count);
        return;
    }
    for (size_t i = 0; i < count; i++) {
        if (!fill_run(f, record, kent_twig_child(list, i), i + 1, &n->run[i])) return;
    }
    if (count == 2 && n->run[0].toward == n->run[1].toward) {
        kent_record_complain(&f->reader, record, "run_restrained",
                             "run_restrained names \"%s\" twice; keep one",
                             f->model->points[n->run[0].toward].id);
    }
}

static void fill_closes(kent_filling *f, kent_record *record, kent_fitting_note *n)
{
    kent_model *m = f->model;
    const kent_twig *list = kent_record_field(record, "can_close")->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    n->stated.closes_first = m->closes_count;
    n->stated.closes_stated = list != NULL;
    if (kent_grow((void **)&m->closes, &f->closes_capacity, m->closes_count + count,
                  sizeof *m->closes) != 0) {
        f->reader.failed = true;
        return;
    }
    for (size_t i = 0; i < count; i++) {
        const int point =
            kent_record_lookup(&f->reader, record, kent_twig_child(list, i),
                               "can_close", KENT_SHELF_POINTS);
        bool again = false;
        for (size_t k = 0; point >= 0 && k < n->stated.closes_count; k++) {
            again = again || m->closes[n->stated.closes_first + k] == point;
        }
        if (again) {
            kent_record_complain(&f->reader, record, "can_close",
                                 "can_close names \"%.60s\" twice; keep one",
                                 m->points[point].id);
        }
        if (point < 0 || again) return;
        m->closes[m->closes_count++] = point;
        n->stated.closes_count++;
    }
}

/* A share belongs to a block that has joints beside it. */
static void check_share(kent_filling *f, kent_record *record,
                        const kent_fitting_note *n)
{
    const bool both = n->restraint == KENT_BLOCK_AND_JOINTS;
    if (both && isnan(n->stated.block_share)) {
        kent_record_complain(&f->reader, record, "restraint",
                             "\"block-and-joints\" needs block_share, the share of the "
                             "thrust that the block takes, as block_share = 0.5");
    } else if (!both && !isnan(n->stated.block_share)) {
        kent_record_complain(&f->reader, record, "block_share",
                             "block_share is read by restraint = \"block-and-joints\" "
                             "alone; ask for that, or leave it out");
    }
}

void kent_fill_stated(kent_filling *f, kent_record *record, kent_fitting_note *n)
{
    kent_stated *s = &n->stated;
    const int backing = kent_record_field(record, "backing")->index;
    fill_slope(f, record, &s->slope);
    if (backing >= 0) s->backing = (kent_backing)backing;
    s->block_share = kent_record_number(record, "block_share");
    s->contact_area = kent_record_number(record, "contact_area");
    kent_record_copy(record, "reason", NULL, s->reason, sizeof s->reason);
    kent_record_copy(record, "sheet", NULL, s->sheet, sizeof s->sheet);
    if (kent_record_has(record, "run_restrained")) fill_runs(f, record, n);
    fill_closes(f, record, n);
    if (record->sound) check_share(f, record, n);
}
