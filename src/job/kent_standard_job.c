#include "kent_standard_job.h"

#include <assert.h>
#include <math.h>
#include <stdlib.h>

static bool asks_block(const kent_standard *t)
{
    return t->what != KENT_STANDARD_JOINTS;
}
static bool asks_joints(const kent_standard *t)
{
    return t->what != KENT_STANDARD_BLOCKS;
}

/* Whether the main's pipe is pressed above its rating in still water. */
static bool is_over_rating(const kent_results *r)
{
    for (size_t i = 0; i < r->limit_count; i++) {
        if (r->limits[i].kind == KENT_LIMIT_PIPE && r->limits[i].exceeded) return true;
    }
    return false;
}

/* Takes over what one job found; its notes change hands. */
static void take(const kent_standard *t, kent_results *r, kent_standard_cell_result *c)
{
    const kent_model *m = r->model;
    c->fitting = kent_model_fitting_of(m, KENT_STANDARD_POINT);
    assert(c->fitting >= 0);
    kent_holding *h = &r->restraints->fittings[c->fitting];
    const kent_fitting_loads *loads = &r->loads->fittings[c->fitting];
    c->holding = *h;
    c->holding.derivation = (kent_derivation){0};
    c->holding.as_built = (kent_as_built){0};
    h->cautions = h->remarks = (kent_notes){0};
    c->thrust = NAN;
    if (h->governing >= 0) {
        const kent_instant *at = &loads->cases[h->governing].worst[h->sense];
        c->thrust = kent_vec3_length(at->balance.thrust);
    }
    c->sized = !asks_block(t) || h->needs_nothing ||
               (h->held && h->block.type != KENT_BLOCK_NONE);
    c->has_length = !asks_joints(t) || h->needs_nothing || h->leg_count > 0;
    for (size_t i = 0; i < h->leg_count; i++) {
        c->has_length = c->has_length && h->legs[i].fits;
    }
    c->rating = kent_pipe_rating(&m->pipes[0], KENT_RATING_SERVICE);
    c->over_rating = is_over_rating(r);
}

static kent_status work_out_cell(const kent_standard *t, size_t index, unsigned threads,
                                 kent_standard_cell_result *out, kent_error *err)
{
    const kent_job_options options = {.threads = threads, .one_grid = true};
    kent_results *r = NULL;
    out->model = t->cells[index];
    const kent_status status = kent_job_run(out->model, &options, &r, err);
    if (!status) take(t, r, out);
    kent_results_free(r);
    return status;
}

kent_status kent_standard_work_out(const kent_standard *table, unsigned threads,
                                   kent_standard_result **out, kent_error *err)
{
    const size_t count = table->size_count * table->fitting_count * table->soil_count;
    kent_status status = KENT_OK;
    kent_standard_result *r = kent_alloc(1, sizeof *r);
    if (r) r->cells = kent_alloc(count, sizeof *r->cells);
    if (!r || !r->cells) {
        status = kent_error_nomem(err);
        goto done;
    }
    r->table = table;
    for (; !status && r->cell_count < count; r->cell_count++) {
        kent_standard_cell_result *c = &r->cells[r->cell_count];
        status = work_out_cell(table, r->cell_count, threads, c, err);
        if (!status && !(c->sized && c->has_length)) r->not_sized++;
    }
    if (status) goto done;
    *out = r;
    r = NULL; /* handed over */
done:
    kent_standard_result_free(r);
    return status;
}

void kent_standard_result_free(kent_standard_result *r)
{
    if (!r) return;
    for (size_t i = 0; i < r->cell_count; i++) {
        kent_notes_clear(&r->cells[i].holding.cautions);
        kent_notes_clear(&r->cells[i].holding.remarks);
    }
    free(r->cells);
    free(r);
}
