#include "kent_listing.h"
#include "kent_shown.h"

#include <math.h>
#include <stdlib.h>

/* What a row is ordered by: the least first, ties as the model has them. */
typedef struct place {
    size_t fitting;
    double key;
} place;

static bool is_listed(const kent_holding *h, kent_only only)
{
    const bool refused = kent_shown_not_held(h);

    switch (only) {
    case KENT_ONLY_ALL:
        return true;
    case KENT_ONLY_NOT_HELD:
        return refused;
    case KENT_ONLY_BLOCKS:
        return h->held && h->block.type != KENT_BLOCK_NONE;
    case KENT_ONLY_JOINTS:
        return h->held && h->chosen == KENT_RESTRAINED_JOINTS;
    case KENT_ONLIES:
        break;
    }
    return true;
}

/* The most of a quantity comes first; a fitting that has none of it, last. */
static double most_first(double value) { return isnan(value) ? INFINITY : -value; }

static double key_of(const kent_results *r, size_t i, kent_sort sort,
                     bool refused_first)
{
    const kent_holding *h = &r->restraints->fittings[i];
    const bool refused = kent_shown_not_held(h);

    switch (sort) {
    case KENT_SORT_USUAL:
        return refused_first && !refused ? 1.0 : 0.0;
    case KENT_SORT_STATION:
        return isnan(r->model->fittings[i].station) ? INFINITY
                                                    : r->model->fittings[i].station;
    case KENT_SORT_USE: /* what cannot be held is used beyond any figure */
        return refused ? -INFINITY : most_first(h->utilisation);
    case KENT_SORT_THRUST:
        return most_first(h->design_thrust);
    case KENT_SORT_CONCRETE:
        return most_first(h->block.type == KENT_BLOCK_NONE
                              ? NAN
                              : h->block.volume + h->block.face_volume);
    case KENT_SORTS:
        break;
    }
    return 0.0;
}

static int place_compare(const void *left, const void *right)
{
    const place *a = left, *b = right;

    if (a->key != b->key) return a->key < b->key ? -1 : 1;
    return (a->fitting > b->fitting) - (a->fitting < b->fitting);
}

kent_status kent_listing_make(const kent_results *r, const kent_report_options *o,
                              bool refused_first, kent_listing *out)
{
    const size_t most = r->model->fitting_count;
    place *places = kent_alloc(most, sizeof *places);

    *out = (kent_listing){.fitting = kent_alloc(most, sizeof *out->fitting)};
    if (!places || !out->fitting) {
        free(places);
        return KENT_E_NOMEM;
    }
    for (size_t i = 0; i < most; i++) {
        if (!is_listed(&r->restraints->fittings[i], o->only)) continue;
        places[out->count++] = (place){i, key_of(r, i, o->sort, refused_first)};
    }
    if (out->count > 0) qsort(places, out->count, sizeof *places, place_compare);
    for (size_t i = 0; i < out->count; i++) {
        out->fitting[i] = places[i].fitting;
    }
    free(places);
    return KENT_OK;
}

void kent_listing_clear(kent_listing *l)
{
    free(l->fitting);
    *l = (kent_listing){0};
}
