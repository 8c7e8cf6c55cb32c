#include "kent_restraint.h"
#include "kent_as_built_internal.h"
#include "kent_concrete_internal.h"
#include "kent_pull_internal.h"
#include "kent_space_internal.h"
#include "kent_system_internal.h"
#include "kent_stability_internal.h"

#include <assert.h>
#include <stdlib.h>

static const double PI = 3.14159265358979323846;
static const double SAME = 1.0 + 1e-9; /* forces that differ by less are one */

static kent_site site_of(const kent_fitting *f, const kent_soil *soil,
                         const kent_rules *rules)
{
    const bool through =
        f->type == KENT_REDUCER || (f->type == KENT_VALVE && f->port_count >= 2);
    const double od = f->outside_diameter;
    kent_site site = {
        .diameter = od,
        .cover = f->cover,
        .water_table = isnan(f->water_table) ? INFINITY : f->water_table,
        .hole = through ? 0.25 * PI * od * od : 0.0,
        .soil = soil,
    };

    kent_site_bear(&site, rules);
    return site;
}

/* The outside of the pipe, or where nobody knows it what the joint seals on. */
static double fitting_diameter(const kent_model *m, const kent_fitting *f)
{
    double widest = f->outside_diameter;

    for (size_t k = 0; k < f->port_count && !(widest > 0.0); k++) {
        widest = m->ports[f->port_first + k].seal_diameter;
    }
    return widest;
}

static void holding_start(kent_holding *h, const kent_fitting *f)
{
    *h = (kent_holding){
        .governing = -1,
        .sense = KENT_RESULTANT,
        .runner_up = -1,
        .runner_up_load = NAN,
        .runner_up_margin = NAN,
        .by_sense = {-1, -1, -1, -1},
        .chosen = f->restraint,
        .soil_beside = f->type == KENT_CURVE && f->restraint == KENT_NO_RESTRAINT,
        .block_share = NAN,
        .joints_share = NAN,
        .design_thrust = NAN,
        .factor_asked = NAN,
        .block = kent_block_none(),
        .allowable_bearing = NAN,
        .factor_reached = NAN,
        .utilisation = NAN,
        .restrained_length = NAN,
        .joints_use = NAN,
        .either.block = kent_block_none(),
    };
}

static kent_status holding_work_out(kent_holding_work *w, kent_holding *h,
                                    kent_error *err)
{
    kent_holding_find(w, h);
    kent_holding_site(w, h);
    w->couple = kent_couple_find(w->m, w->fitting, w->loads);
    w->alone = kent_couple_alone(w->m, w->fitting, w->loads);
    h->unbalanced = w->couple.apart || w->alone > SAME * w->factored[KENT_RESULTANT];
    if (h->unbalanced) {
        h->needs_nothing = false;
        kent_holding_refuse(w, h);
    } else if (!h->needs_nothing) {
        kent_holding_policy(w, h);
        kent_concrete_prepare(w, h);
        kent_holding_size(w, h);
        kent_stability_tell(w, h);
        kent_holding_routes(w, h);
        kent_holding_legs(w, h);
        kent_other_ways_take(w, h);
        kent_other_ways_judge(w, h);
        kent_holding_footprint(w, h);
        kent_holding_refuse(w, h);
        kent_concrete_finish(w, h);
        kent_holding_either(w, h);
    }
    kent_as_built_find(w, h);
    kent_holding_caution(w, h);
    kent_holding_derive(w, h);
    const bool lost = h->cautions.failed || h->remarks.failed || h->derivation.failed ||
                      w->met.failed || w->clear.failed || h->as_built.broken.failed;
    kent_notes_clear(&w->met);
    kent_notes_clear(&w->clear);
    return lost ? kent_error_nomem(err) : KENT_OK;
}

kent_status kent_restraint_size(const kent_model *m, const kent_loads_result *loads,
                                kent_restraints **out, kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    kent_restraints *r = kent_alloc(1, sizeof *r);
    kent_standings standings = {0};

    assert(loads->fitting_count == m->fitting_count);
    if (r) r->fittings = kent_alloc(m->fitting_count, sizeof *r->fittings);
    if (!r || !r->fittings) {
        status = kent_error_nomem(err);
        goto done;
    }
    status = kent_standings_find(m, &standings, err);
    if (status != KENT_OK) goto done;

    for (; r->fitting_count < m->fitting_count; r->fitting_count++) {
        const size_t i = r->fitting_count;
        kent_fitting fitting = m->fittings[i];
        kent_holding *h = &r->fittings[i];
        fitting.outside_diameter = fitting_diameter(m, &fitting);
        const kent_soil *soil = fitting.soil >= 0 ? &m->soils[fitting.soil] : NULL;
        kent_holding_work work = {
            .m = m,
            .fitting = &fitting,
            .index = i,
            .loads = &loads->fittings[i],
            .standings = &standings,
            .soil = soil,
            .side_load = NAN,
            .site = site_of(&fitting, soil, &m->rules),
        };
        holding_start(h, &fitting);
        status = holding_work_out(&work, h, err);
        if (status != KENT_OK) {
            r->fitting_count++; /* this one holds notes too */
            goto done;
        }
        r->concrete += h->block.volume + h->block.face_volume;
        const bool asked = h->chosen != KENT_NO_RESTRAINT || h->soil_beside;
        if (!h->held && !h->needs_nothing && asked) {
            r->not_held++;
        }
    }
    status = kent_systems_find(m, &standings, r, err);
    if (status != KENT_OK) goto done;
    status = kent_space_find(m, r, err);
    if (status != KENT_OK) goto done;
    kent_blocks_advise(r);
    if (!kent_concrete_conclude(m, r)) {
        status = kent_error_nomem(err);
        goto done;
    }
    status = kent_pulls_find(m, loads, r->fittings, &r->pulls, err);
    if (status != KENT_OK) goto done;
    *out = r;
    r = NULL; /* handed over */
done:
    kent_standings_clear(&standings);
    kent_restraints_free(r);
    return status;
}

void kent_restraints_free(kent_restraints *r)
{
    if (!r) return;
    for (size_t i = 0; i < r->fitting_count; i++) {
        kent_notes_clear(&r->fittings[i].cautions);
        kent_notes_clear(&r->fittings[i].remarks);
        kent_derivation_clear(&r->fittings[i].derivation);
        kent_as_built_clear(&r->fittings[i].as_built);
    }
    kent_space_clear(&r->space);
    kent_systems_clear(&r->systems);
    kent_notes_clear(&r->cautions);
    kent_pulls_clear(&r->pulls);
    free(r->fittings);
    free(r);
}
