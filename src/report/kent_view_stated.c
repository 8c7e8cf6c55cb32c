/* What an engineer stated for the restraint of one fitting. */
#include "kent_loads.h"
#include "kent_view.h"

#include <math.h>

static void add_slope(const kent_view *v, const kent_slope *slope, kent_text *out)
{
    if (isnan(slope->angle)) return;
    const double azimuth = kent_thrust_azimuth(slope->direction);
    kent_text_add(out, " The ground falls by %s towards %s.",
                  kent_shown_with_unit(KENT_ANGLE, v->units, slope->angle).text,
                  kent_shown_azimuth(v->units, azimuth, KENT_ROOMY).text);
}

static void add_runs(const kent_view *v, const kent_fitting *f, kent_text *out)
{
    const kent_model *m = v->model;
    for (size_t k = 0; k < 2 && k < f->port_count; k++) {
        const double length = f->stated.run_length[k];
        const int toward = m->ports[f->port_first + k].toward;
        if (isnan(length)) continue;
        kent_text_add(out, " Its run is restrained for %s towards %s.",
                      kent_shown_with_unit(KENT_LENGTH, v->units, length).text,
                      kent_view_point(m, toward));
    }
}

static void add_closes(const kent_view *v, const kent_stated *s, kent_text *out)
{
    if (!s->closes_stated) return;
    kent_text_add(out, s->closes_count > 0 ? " Legs that can be shut: towards"
                                           : " None of its legs can be shut");
    for (size_t i = 0; i < s->closes_count; i++) {
        kent_text_add(out, "%s %s", i > 0 ? "," : "",
                      kent_view_point(v->model, v->model->closes[s->closes_first + i]));
    }
    kent_text_add(out, ".");
}

void kent_view_add_stated(const kent_view *v, const kent_fitting *f, kent_text *out)
{
    const kent_stated *s = &f->stated;
    add_slope(v, &s->slope, out);
    if (s->backing == KENT_BACKING_FILL) {
        kent_text_add(out, " A block stands against compacted fill.");
    }
    if (!isnan(s->block_share)) {
        kent_text_add(out, " The block takes %.2f of the thrust, joints the rest.",
                      s->block_share);
    }
    if (!isnan(s->contact_area)) {
        kent_text_add(out, " It presses on its block over %s.",
                      kent_shown_with_unit(KENT_AREA, v->units, s->contact_area).text);
    }
    add_runs(v, f, out);
    add_closes(v, s, out);
    if (s->reason[0] != '\0') kent_text_add(out, " Reason: %s.", s->reason);
}
