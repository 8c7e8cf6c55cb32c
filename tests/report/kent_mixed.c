#include "kent_mixed.h"

#include "kent_check.h"

#include <math.h>
#include <stdio.h>

static int gather(void *to, const char *piece, size_t length)
{
    kent_text_add(to, "%.*s", (int)length, piece);
    return 0;
}

kent_sink kent_mixed_sink(kent_text *text) { return (kent_sink){gather, text}; }

static const char *const IDS[] = {"R",  "PÍ \"1\"", "B2", "T, 1", "CR",
                                  "PT", "RD",       "V8", "VC",   "DE"};
enum { ID_COUNT = sizeof IDS / sizeof IDS[0] };

/* Points under their own ids; renamed once the routes are laid. */
static void lay(kent_build *b)
{
    kent_build_point(b, "R", 0.0, 0.0, 61.0);
    kent_build_point(b, "P1", 640.0, 0.0, 48.2);
    kent_build_point(b, "B2", 900.0, 107.0, 44.9);
    kent_build_point(b, "T1", 1150.0, 218.0, 41.7);
    kent_build_point(b, "CR", 1400.0, 313.0, 52.0);
    kent_build_point(b, "PT", 1600.0, 495.6, 45.0);
    kent_build_point(b, "RD", 1750.0, 495.6, 41.0);
    kent_build_point(b, "V8", 1900.0, 495.6, 37.0);
    kent_build_point(b, "VC", 2000.0, 495.6, 35.0);
    kent_build_point(b, "DE", 1230.0, 16.0, 40.1);
    int p = kent_build_pipe(b, "A", "R P1 B2 T1", 0.6, 1050.0);
    b->model->pipes[p].joint_deflection = 0.06;
    b->model->pipes[p].pressure_rating = 25e5;
    p = kent_build_pipe(b, "B", "T1 CR PT RD", 0.6, 1050.0);
    b->model->pipes[p].pressure_rating = 25e5;
    kent_build_pipe(b, "D", "RD V8 VC", 0.4, 1100.0);
    kent_build_pipe(b, "C", "T1 DE", 0.15, 1180.0);
    kent_build_fixed_level(b, "R", 92.0);
}

static void operate(kent_build *b)
{
    const int in_line = kent_build_valve(b, "V-in", "V8", 0.6, NAN);
    b->model->valves[in_line].size = 0.4;
    const int end = kent_build_valve(b, "V-end", "VC", 0.02, 36.0);
    b->model->valves[end].size = 0.4;
    const int fast = kent_build_scenario(b, "fast/1", 20.0);
    kent_build_ramp(b, fast, KENT_EVENT_VALVE, end, 0.5, 6.0, 0.0);
    const int slow = kent_build_scenario(b, "slow", 30.0);
    kent_build_ramp(b, slow, KENT_EVENT_VALVE, end, 0.5, 25.0, 0.0);
    (void)snprintf(b->model->scenarios[fast].title,
                   sizeof b->model->scenarios[fast].title, "Outlet shut\nin 6 s");
}

static void bury(kent_build *b)
{
    kent_model *m = b->model;
    const int peat = kent_build_soil(b, "peat", 0.0, 11e3, 1.6);
    m->soils[peat].unreliable = true;
    const int till = kent_build_soil(b, "till", 150e3, 19e3, 1.6);
    m->soils[till].friction_angle = 0.5;
    m->soils[till].cohesion = 0.0;
    m->soils[till].friction_ratio = 0.7;
    m->soils[till].adhesion_ratio = 0.0;
    m->soils[till].passive_ratio = 0.4;
    m->points[kent_model_point_index(m, "PT")].soil = peat;
    m->loads.test_pressure = 9e5;
    m->loads.test_gauge = kent_model_point_index(m, "VC");
    const int note = kent_build_note(b, "DE");
    m->notes[note].restraint = KENT_RESTRAINED_JOINTS;
    kent_notes_add(&m->assumed, "gravity\t9.80665 m/s2\tnothing was said of it");
    kent_notes_add(&m->cautions, "two surveys disagree, says the case");
    const kent_port ports[] = {
        kent_build_port((kent_vec3){-1.0, 0.0, 0.0}, 140e3, -0.425, 0.6),
        kent_build_port((kent_vec3){0.7071, 0.7071, 0.0}, 123e3, 0.425, 0.3)};
    kent_build_ports(b, "B7", KENT_BEND, ports, 2);
}

/* A letter behind it keeps names apart that are otherwise the same. */
static void rename_one(char id[KENT_ID], const char *name, bool letter, size_t index)
{
    static const char *const TAILS[] = {"a", "b", "c", "d", "e", "f",
                                        "g", "h", "i", "j", "k", "l"};
    const size_t count = sizeof TAILS / sizeof TAILS[0];
    (void)snprintf(id, KENT_ID, "%s%s", name, letter ? TAILS[index % count] : "");
}

static void rename_all(kent_model *m, bool long_names)
{
    static const char LONG[] = "a-name-that-somebody-thought-was-short-№";
    for (size_t i = 0; i < m->point_count && i < ID_COUNT; i++) {
        rename_one(m->points[i].id, long_names ? LONG : IDS[i], long_names, i);
    }
    for (size_t i = 0; long_names && i < m->scenario_count; i++) {
        rename_one(m->scenarios[i].id, LONG, true, i);
        rename_one(m->soils[i].id, LONG, true, i);
    }
    (void)snprintf(m->title, sizeof m->title, "Tarnhöllow trunk main, “mixed”");
}

kent_mixed kent_mixed_new(bool long_names)
{
    kent_mixed mixed = {.build = kent_build_new()};
    kent_error err = {0};
    lay(&mixed.build);
    operate(&mixed.build);
    bury(&mixed.build);
    rename_all(mixed.build.model, long_names);
    kent_build_derive(&mixed.build);
    const kent_job_options job = {.threads = 1};
    if (kent_job_run(mixed.build.model, &job, &mixed.results, &err)) {
        fail_msg("%s: %s", err.where, err.what);
    }
    return mixed;
}

void kent_mixed_clear(kent_mixed *m)
{
    kent_results_free(m->results);
    kent_build_clear(&m->build);
    m->results = NULL;
}
