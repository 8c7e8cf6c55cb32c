#include "kent_parts.h"

/* Shortens the way for the next question. */
int kent_parts_root(int *part, int n)
{
    while (part[n] != n) {
        part[n] = part[part[n]];
        n = part[n];
    }
    return n;
}

void kent_parts_join(int *part, int a, int b)
{
    const int ra = kent_parts_root(part, a);
    const int rb = kent_parts_root(part, b);
    if (ra < rb) {
        part[rb] = ra;
    } else {
        part[ra] = rb;
    }
}

void kent_parts_find(const kent_model *m, const bool *passes, int *part)
{
    for (size_t n = 0; n < m->node_count; n++) {
        part[n] = (int)n;
    }
    for (size_t e = 0; e < m->span_count; e++) {
        kent_parts_join(part, m->spans[e].node[0], m->spans[e].node[1]);
    }
    for (size_t i = 0; i < m->valve_count; i++) {
        const kent_valve *v = &m->valves[i];
        if (v->node[1] >= 0 && (!passes || passes[i])) {
            kent_parts_join(part, v->node[0], v->node[1]);
        }
    }
    for (size_t i = 0; i < m->device_count; i++) {
        const kent_device *d = &m->devices[i];
        if (d->node[0] < 0 || d->node[1] < 0) continue;
        kent_parts_join(part, d->node[0], d->node[1]);
    }
    for (size_t n = 0; n < m->node_count; n++) {
        part[n] = kent_parts_root(part, (int)n);
    }
}
