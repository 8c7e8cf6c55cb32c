#include "kent_twins.h"

#include <math.h>

bool kent_twins_of(const kent_results *r, size_t march, kent_twins *out)
{
    const kent_scenario_result *run = &r->scenarios[march];
    const int other = r->model->scenarios[run->scenario].same_as;
    for (size_t i = 0; other >= 0 && i < r->scenario_count; i++) {
        const kent_scenario_result *s = &r->scenarios[i];
        if (s->scenario != other || s->state != run->state) continue;
        *out = (kent_twins){{(int)march, (int)i}};
        return true;
    }
    return false;
}

static bool has_place(const kent_model *m, int point)
{
    for (size_t i = 0; i < m->fitting_count; i++) {
        if (m->fittings[i].point == point) return true;
    }
    for (size_t i = 0; i < m->device_count; i++) {
        if (m->devices[i].point == point) return true;
    }
    return false;
}

size_t kent_twins_places(const kent_results *r, const kent_twins *t,
                         kent_twin_place *out)
{
    const kent_model *m = r->model;
    size_t count = 0;
    for (size_t p = 0; p < m->point_count; p++) {
        if (!has_place(m, (int)p)) continue;
        kent_twin_place *place = &out[count++];
        place->point = (int)p;
        for (int k = 0; k < KENT_TWINS; k++) {
            const kent_peak *peak = &r->scenarios[t->march[k]].points[p];
            const double z = m->points[p].at.z;
            place->highest[k] = kent_model_pressure(m, peak->highest_head, z);
            place->lowest[k] = kent_model_pressure(m, peak->lowest_head, z);
        }
    }
    return count;
}

double kent_twins_cavity(const kent_scenario_result *run)
{
    double largest = 0.0;
    for (size_t i = 0; i < run->cavity_count; i++) {
        largest = fmax(largest, run->cavities[i].largest);
    }
    return largest;
}
