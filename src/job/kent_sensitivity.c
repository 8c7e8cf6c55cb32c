#include "kent_job.h"

#include <math.h>
#include <stdlib.h>

/* What two figures of one fitting are compared by. */
static kent_gauge gauge_of(const kent_results *r, size_t index)
{
    const kent_model *m = r->model;
    const kent_fitting *f = &m->fittings[index];
    const kent_holding *h = &r->restraints->fittings[index];
    const kent_block *b = &h->block;
    kent_gauge g = {.highest = NAN,
                    .lowest = NAN,
                    .held = h->held || h->needs_nothing || h->soil_beside,
                    .type = b->type,
                    .area = NAN,
                    .volume = NAN,
                    .length = h->restrained_length};
    for (size_t i = 0; f->point >= 0 && i < r->scenario_count; i++) {
        const kent_peak *peak = &r->scenarios[i].points[f->point];
        if (m->scenarios[r->scenarios[i].scenario].for_comparison) continue;
        g.highest =
            fmax(g.highest, kent_model_pressure(m, peak->highest_head, f->at.z));
        g.lowest = fmin(g.lowest, kent_model_pressure(m, peak->lowest_head, f->at.z));
    }
    if (b->type != KENT_BLOCK_NONE) g.volume = b->volume + b->face_volume;
    if (b->type == KENT_BLOCK_BEARING) g.area = b->bearing_area;
    if (h->governing >= 0) {
        g.governing = r->loads->fittings[index].cases[h->governing].title;
    }
    return g;
}

/* One whole run, of which a few numbers stay. */
static kent_status take(const kent_model *m, const kent_job_options *options,
                        kent_gauge **out, kent_error *err)
{
    kent_job_options once = *options;
    kent_results *r = NULL;
    once.one_grid = true;
    const kent_status status = kent_job_run(m, &once, &r, err);
    if (status) return status;
    *out = kent_alloc(m->fitting_count, sizeof **out);
    for (size_t i = 0; *out && i < m->fitting_count; i++) {
        (*out)[i] = gauge_of(r, i);
    }
    kent_results_free(r);
    return *out ? KENT_OK : kent_error_nomem(err);
}

static kent_status take_varied(const kent_model *m, const kent_job_options *options,
                               kent_variation v, kent_sensitivity *s, kent_error *err)
{
    const int way = v.more ? KENT_MORE : KENT_LESS;
    if (!kent_variation_tells(m, v)) return KENT_OK;
    kent_model *view = kent_model_varied(m, v);
    if (!view) return kent_error_nomem(err);
    kent_error *stopped = &s->stopped[v.what][way];
    const kent_status status = take(view, options, &s->varied[v.what][way], stopped);
    kent_model_varied_free(view);
    if (status && status != KENT_E_SOLVE) {
        *err = *stopped;
        return status;
    }
    return KENT_OK;
}

kent_status kent_sensitivity_run(const kent_model *m, const kent_job_options *options,
                                 kent_sensitivity **out, kent_error *err)
{
    kent_sensitivity *s = kent_alloc(1, sizeof *s);
    if (!s) return kent_error_nomem(err);
    s->fitting_count = m->fitting_count;
    kent_status status = take(m, options, &s->base, err);
    for (int what = 0; !status && what < KENT_VARIES; what++) {
        for (int way = 0; !status && way < KENT_WAYS; way++) {
            const kent_variation v =
                kent_variation_of((kent_vary)what, way == KENT_MORE);
            status = take_varied(m, options, v, s, err);
        }
    }
    if (status) {
        kent_sensitivity_free(s);
        return status;
    }
    *out = s;
    return KENT_OK;
}

void kent_sensitivity_free(kent_sensitivity *s)
{
    if (!s) return;
    free(s->base);
    for (int what = 0; what < KENT_VARIES; what++) {
        for (int way = 0; way < KENT_WAYS; way++) {
            free(s->varied[what][way]);
        }
    }
    free(s);
}
