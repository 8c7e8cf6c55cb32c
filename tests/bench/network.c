#include "network.h"

#include <math.h>
#include <stdio.h>

enum { JUNCTIONS = 567, STUBS = 34, DEGREE_MOST = 7 };
static const double STEP = 0.01; /* s */

typedef struct plan {
    unsigned long long random;
    int degree[JUNCTIONS];
    int pipes;
} plan;

/* 0 .. 1, the same on every machine: xorshift64* (S. Vigna, 2016). */
static double draw(plan *p)
{
    p->random ^= p->random >> 12;
    p->random ^= p->random << 25;
    p->random ^= p->random >> 27;
    return (double)((p->random * 2685821657736338717ULL) >> 11) / 9007199254740992.0;
}

/* A junction among the first `below` that still has room. */
static int draw_junction(plan *p, int below)
{
    int j = 0;
    do {
        j = (int)(draw(p) * below);
    } while (p->degree[j] >= DEGREE_MOST);
    return j;
}

static void add_pipe(kent_build *b, plan *p, const char *route, double parts)
{
    char id[KENT_ID];
    (void)snprintf(id, sizeof id, "p%d", p->pipes++);
    const double bore = 0.1 + 0.5 * draw(p), speed = 900.0 + 400.0 * draw(p);
    const int i = kent_build_pipe(b, id, route, bore, speed);
    b->model->pipes[i].length = speed * STEP * NETWORK_REACHES * parts;
    b->model->pipes[i].friction = KENT_DARCY_FIXED;
    b->model->pipes[i].friction_coefficient = 0.015 + 0.015 * draw(p);
    b->model->pipes[i].loss = 0.3 * parts;
}

static void connect(kent_build *b, plan *p, int from, int to)
{
    char route[2 * KENT_ID];
    (void)snprintf(route, sizeof route, "j%d j%d", from, to);
    p->degree[from]++;
    p->degree[to]++;
    add_pipe(b, p, route, 1.0);
}

/* A stub from junction to a valve that discharges. */
static void add_stub(kent_build *b, plan *p, int number)
{
    char id[KENT_ID], route[2 * KENT_ID];
    const int from = draw_junction(p, JUNCTIONS);
    (void)snprintf(id, sizeof id, "d%d", number);
    (void)snprintf(route, sizeof route, "j%d d%d", from, number);
    kent_build_point(b, id, (double)NAN, (double)NAN, 10.0);
    p->degree[from]++;
    add_pipe(b, p, route, 1.0);
    kent_build_valve(b, id, id, 0.001 + 0.004 * draw(p), 12.0);
}

/* A pipe cut in two by a valve in line. */
static void add_cut(kent_build *b, plan *p, int number)
{
    char id[KENT_ID], route[3 * KENT_ID];
    const int from = draw_junction(p, JUNCTIONS);
    int to = from;
    while (to == from) {
        to = draw_junction(p, JUNCTIONS);
    }
    (void)snprintf(id, sizeof id, "v%d", number);
    kent_build_point(b, id, (double)NAN, (double)NAN, 10.0);
    (void)snprintf(route, sizeof route, "j%d v%d", from, number);
    p->degree[from]++;
    add_pipe(b, p, route, 1.0);
    (void)snprintf(route, sizeof route, "v%d j%d", number, to);
    p->degree[to]++;
    add_pipe(b, p, route, 1.0);
    kent_build_valve(b, id, id, 0.02 + 0.1 * draw(p), (double)NAN);
}

static void add_events(kent_build *b, plan *p)
{
    const int scenario = kent_build_scenario(b, "all", 50.0);
    for (size_t v = 0; v < b->model->valve_count; v++) {
        b->model->valves[v].opening = 0.3 + 0.7 * draw(p);
        const double start = 0.05 + 2.0 * draw(p), ramp = 0.5 + 4.0 * draw(p); /* s */
        kent_build_ramp(b, scenario, KENT_EVENT_VALVE, (int)v, start, ramp,
                        v % 3 == 0 ? 1.0 : 0.1 * (double)(v % 3));
    }
}

kent_build network_build(void)
{
    kent_build b = kent_build_new();
    plan p = {.random = 88172645463325252ULL};
    char id[KENT_ID];

    for (int i = 0; i < JUNCTIONS; i++) {
        (void)snprintf(id, sizeof id, "j%d", i);
        kent_build_point(&b, id, (double)NAN, (double)NAN, 10.0 * draw(&p));
    }
    for (int i = 1; i < JUNCTIONS; i++) {
        connect(&b, &p, draw_junction(&p, i), i);
    }
    for (int i = 0; i < STUBS; i++) {
        add_stub(&b, &p, i);
    }
    for (int i = 0; i < STUBS - 1; i++) {
        add_cut(&b, &p, i);
    }
    while (p.pipes < NETWORK_SPANS) {
        const int from = draw_junction(&p, JUNCTIONS),
                  to = draw_junction(&p, JUNCTIONS);
        if (from != to) connect(&b, &p, from, to);
    }
    kent_build_fixed_level(&b, "j0", 200.0);
    kent_build_fixed_level(&b, "j1", 198.0);
    for (int i = 5; i < JUNCTIONS; i += 6) {
        (void)snprintf(id, sizeof id, "j%d", i);
        kent_build_outflow(&b, id, 0.0005 + 0.001 * draw(&p));
    }
    add_events(&b, &p);
    b.model->solver.friction = KENT_SURGE_CONSTANT;
    b.model->solver.time_step = STEP;
    kent_build_derive(&b);
    return b;
}
