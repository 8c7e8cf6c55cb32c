/* A pipe: its route, diameters, material, friction and joints. */
#include "kent_case_internal.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

static void fill_route(kent_filling *f, kent_record *record, kent_pipe *p)
{
    kent_model *m = f->model;
    const kent_twig *list = kent_record_field(record, "route")->twig;
    const size_t count = list ? kent_twig_count(list) : 0;
    p->route_first = m->route_count;
    if (list && count < 2) {
        kent_record_complain(&f->reader, record, "route",
                             "route has %zu point%s; it needs at least two", count,
                             count == 1 ? "" : "s");
    }
    if (kent_grow((void **)&m->route, &f->route_capacity, m->route_count + count,
                  sizeof *m->route) != 0) {
        f->reader.failed = true;
        return;
    }
    for (size_t i = 0; i < count; i++) {
        m->route[m->route_count++] = kent_record_lookup(
            &f->reader, record, kent_twig_child(list, i), "route", KENT_SHELF_POINTS);
    }
    p->route_count = count;
}

static void fill_diameters(kent_filling *f, kent_record *record,
                           const kent_pipe_class *row, kent_pipe *p)
{
    double outside = kent_record_number_or(record, "outside_diameter",
                                           row ? row->outside_diameter : NAN);
    double inside = kent_record_number(record, "inside_diameter");
    double wall =
        kent_record_number_or(record, "wall_thickness", row ? row->wall : NAN);
    const double lining =
        kent_record_number_or(record, "lining_thickness", row ? row->lining : 0.0);
    const bool own_wall = kent_record_has(record, "wall_thickness");

    if (isnan(outside)) outside = inside + 2.0 * (wall + lining);
    if (isnan(inside)) inside = outside - 2.0 * (wall + lining);
    if (isnan(wall) && isnan(p->wave_speed)) wall = 0.5 * (outside - inside) - lining;
    p->outside_diameter = outside;
    p->inside_diameter = inside;
    p->wall = wall;
    p->wall_minimum = row && !own_wall ? row->wall_minimum : NAN;
    p->lining = lining;
    if (!record->sound) return;
    if (isnan(outside) || isnan(inside)) {
        kent_record_complain(&f->reader, record, NULL,
                             "its diameters are not known; give pipe_class, or "
                             "outside_diameter with wall_thickness or inside_diameter");
    } else if (!(inside > 0.0 && inside < outside) || wall <= 0.0) {
        kent_record_complain(
            &f->reader, record, NULL,
            "its diameters do not fit: %.4g mm outside, %.4g mm inside, "
            "lining %.4g mm leave no wall",
            1e3 * outside, 1e3 * inside, 1e3 * lining);
    }
    if (row && !own_wall) {
        char what[96];
        char why[260];
        (void)snprintf(what, sizeof what, "wall of %s", row->id);
        (void)snprintf(why, sizeof why, "nominal, catalogue (%s): %s", row->from.status,
                       row->from.source);
        kent_fill_assume_value(f, what, row->wall, KENT_DIAMETER, why);
    }
}

static void fill_material(kent_filling *f, kent_record *record,
                          const kent_material *row, kent_pipe *p)
{
    const bool own = kent_record_has(record, "elastic_modulus");
    p->modulus =
        kent_record_number_or(record, "elastic_modulus", row ? row->modulus : NAN);
    p->poisson =
        kent_record_number_or(record, "poisson_ratio", row ? row->poisson : NAN);
    p->material_density = row ? row->density : NAN;
    p->lining_modulus = row && p->lining > 0.0 ? row->lining_modulus : 0.0;
    p->expansion =
        kent_record_number_or(record, "expansion", row ? row->expansion : NAN);
    p->long_modulus =
        kent_record_number_or(record, "long_modulus", row ? row->long_modulus : NAN);
    if (!record->sound || !isnan(p->wave_speed)) return;
    if (isnan(p->modulus) || isnan(p->poisson)) {
        kent_record_complain(&f->reader, record, NULL,
                             "its wave speed cannot be computed; give material, or "
                             "elastic_modulus and poisson_ratio, or wave_speed");
    } else if (row && !own) {
        char what[96];
        char why[260];
        (void)snprintf(what, sizeof what, "modulus of %s", row->id);
        (void)snprintf(why, sizeof why, "catalogue (%s): %s", row->from.status,
                       row->from.source);
        kent_fill_assume_value(f, what, row->modulus, KENT_MODULUS, why);
    }
}

static void fill_friction(kent_filling *f, kent_record *record,
                          const kent_material *row, kent_pipe *p)
{
    static const struct {
        const char *key;
        kent_friction_law law;
    } LAWS[] = {
        {"roughness", KENT_COLEBROOK_WHITE},
        {"hazen_williams_c", KENT_HAZEN_WILLIAMS},
        {"manning_n", KENT_MANNING},
        {"friction_factor", KENT_DARCY_FIXED},
    };
    const char *first = NULL;
    for (size_t i = 0; i < sizeof LAWS / sizeof LAWS[0]; i++) {
        if (!kent_record_has(record, LAWS[i].key)) continue;
        if (first) {
            kent_record_complain(&f->reader, record, LAWS[i].key,
                                 "%s and %s are both given; keep one", first,
                                 LAWS[i].key);
            return;
        }
        first = LAWS[i].key;
        p->friction = LAWS[i].law;
        p->friction_coefficient = kent_record_number(record, first);
    }
    if (first || !record->sound) return;
    if (!row) {
        kent_record_complain(
            &f->reader, record, NULL,
            "its friction is not known; give roughness, "
            "hazen_williams_c, manning_n, friction_factor, or material");
        return;
    }
    char what[96];
    p->friction = KENT_COLEBROOK_WHITE;
    p->friction_coefficient = row->roughness;
    (void)snprintf(what, sizeof what, "roughness of %s", row->id);
    kent_fill_assume_value(f, what, row->roughness, KENT_DIAMETER,
                           "catalogue, no friction given");
}

static void fill_joint(kent_filling *f, kent_record *record, kent_pipe *p)
{
    const int joint = kent_record_field(record, "joint")->index;
    const int support = kent_record_field(record, "axial_support")->index;
    p->joint = joint >= 0 ? (kent_joint)joint : KENT_PUSH_ON;
    p->joint_deflection = kent_record_number_or(record, "joint_deflection", 0.0);
    p->laying_length = kent_record_number(record, "pipe_length");
    if (!kent_record_has(record, "joint")) {
        kent_fill_assume(f, "joint of pipes that name none", kent_joint_word(p->joint),
                         "the usual joint of a buried main");
    }
    if (support >= 0) {
        p->axial_support = (kent_axial_support)support;
        return;
    }
    const bool stiff =
        p->joint == KENT_FLANGED || p->joint == KENT_WELDED || p->joint == KENT_FUSED;
    p->axial_support = stiff ? KENT_FIXED_THROUGHOUT : KENT_FLEXIBLE_JOINTS;
    if (isnan(p->wave_speed)) {
        char what[96];
        (void)snprintf(what, sizeof what, "axial support of pipes with %s joints",
                       kent_joint_word(p->joint));
        kent_fill_assume(f, what, kent_axial_support_word(p->axial_support),
                         "by the joint");
    }
}

static void add_creep(kent_filling *f, const kent_creep *rows, size_t count,
                      kent_pipe *p)
{
    kent_model *m = f->model;
    if (kent_grow((void **)&m->creep, &f->creep_capacity, m->creep_count + count,
                  sizeof *m->creep) != 0) {
        f->reader.failed = true;
        return;
    }
    p->creep_first = m->creep_count;
    p->creep_count = count;
    for (size_t i = 0; i < count; i++) {
        m->creep[m->creep_count++] = rows[i];
    }
}

/* K: water that differs by less from where creep was found is as warm. */
static const double CREEP_WARMTH = 5.0;

static void assume_creep(kent_filling *f, const kent_material *material)
{
    const double warmth = f->model->water.temperature; /* K */
    const size_t count = material->creep_count;
    char what[96];
    char value[96];
    char why[260];
    char found[64];
    char water[64];
    (void)snprintf(what, sizeof what, "creep of %s", material->id);
    (void)snprintf(value, sizeof value, "%zu element%s, %.3g to %.3g s", count,
                   count == 1 ? "" : "s", material->creep[0].time,
                   material->creep[count - 1].time);
    (void)snprintf(why, sizeof why, "catalogue (%s): %s", material->from.status,
                   material->from.source);
    kent_fill_assume(f, what, value, why);
    kent_notes_add(&f->model->cautions,
                   "walls of %s creep by elements that were not measured on this pipe "
                   "(catalogue, %s): they lower peaks; see what the main reaches with "
                   "creep = false too",
                   material->id, material->from.status);
    if (!(fabs(warmth - material->creep_temperature) > CREEP_WARMTH)) return;
    kent_fill_show(f, material->creep_temperature, KENT_TEMPERATURE, found,
                   sizeof found);
    kent_fill_show(f, warmth, KENT_TEMPERATURE, water, sizeof water);
    kent_notes_add(
        &f->model->cautions,
        "creep of %s was found at %s, and the water has %s: a colder wall "
        "creeps less and damps a surge less than is shown, a warmer one more",
        material->id, found, water);
}

/* Elements of a plastic wall: the case's, else the material's. */
static void fill_creep(kent_filling *f, kent_record *record,
                       const kent_material *material, kent_pipe *p)
{
    kent_creep own[KENT_CREEP_ROWS];
    const size_t count = kent_record_creep(&f->reader, record, own);
    if (kent_record_has(record, "creep")) {
        add_creep(f, own, count, p);
        if (!f->model->solver.creep) {
            kent_notes_add(&f->model->cautions,
                           "creep of pipe walls is read, but creep = true is not said "
                           "in solver: surges are worked out with elastic walls, and a "
                           "plastic pipe damps them more than is shown");
        }
        if (record->sound && material && !material->plastic) {
            kent_record_complain(&f->reader, record, "creep",
                                 "creep is of plastic walls, and %s is none; leave it "
                                 "out, or name the material",
                                 material->id);
        }
    } else if (material && material->creep_count > 0) {
        if (f->creeping != material) {
            add_creep(f, material->creep, material->creep_count, p);
            f->creep_first = p->creep_first;
            f->creeping = material;
        }
        p->creep_first = f->creep_first;
        p->creep_count = material->creep_count;
        if (f->model->solver.creep) assume_creep(f, material);
    }
}

/* How far a wall creeps hangs on Poisson's ratio, which nobody needs to give beside a
 * wave speed. */
static void check_creep(kent_filling *f, kent_record *record, const kent_pipe *p)
{
    if (!record->sound || !f->model->solver.creep || p->creep_count == 0) return;
    if (!isnan(p->poisson)) return;
    kent_record_complain(&f->reader, record, NULL,
                         "how far its wall creeps hangs on poisson_ratio; give it, or "
                         "material, or leave creep out of solver");
}

/* A turn against the pipe at its start is for a layout without coordinates. */
static void check_branch_turn(kent_filling *f, kent_record *record, const kent_pipe *p)
{
    const kent_model *m = f->model;
    if (!record->sound || isnan(p->branch_turn) || p->route_count < 2) return;
    for (size_t i = 0; i < 2; i++) {
        if (isnan(m->points[m->route[p->route_first + i]].at.x)) return;
    }
    kent_record_complain(
        &f->reader, record, "branch_turn",
        "branch_turn stands where there are no coordinates; x and y of "
        "its points say which way it starts, so leave it out");
}

void kent_fill_pipe(kent_filling *f, kent_record *record, size_t index)
{
    const kent_catalogue *c = f->catalogue;
    kent_pipe *p = &f->model->pipes[index];
    *p = kent_pipe_blank();
    const int class_index = kent_record_field(record, "pipe_class")->index;
    const kent_pipe_class *row = class_index >= 0 ? &c->pipes[class_index] : NULL;
    const int own = kent_record_field(record, "material")->index;
    const kent_material *material = own >= 0 ? &c->materials[own]
                                    : row    ? kent_catalogue_material(c, row->material)
                                             : NULL;

    kent_record_copy(record, "id", NULL, p->id, sizeof p->id);
    if (row) memcpy(p->pipe_class, row->id, sizeof p->pipe_class);
    if (material) memcpy(p->material, material->id, sizeof p->material);
    p->place = record->place;
    p->length = kent_record_number(record, "length");
    p->wave_speed = kent_record_number(record, "wave_speed");
    p->unit_mass = NAN;
    p->loss = kent_record_number_or(record, "loss", 0.0);
    p->thin_wall = kent_record_field(record, "wall_theory")->index == 1;
    p->branch_turn = kent_record_number(record, "branch_turn");
    p->above_ground = kent_record_switch(record, "above_ground", false);
    p->nominal_size =
        kent_record_number_or(record, "nominal_size", row ? row->nominal_size : NAN);
    kent_fill_ratings(f, record, row, material, p);
    fill_creep(f, record, material, p);
    kent_fill_standard(f, record, row, p);
    fill_route(f, record, p);
    fill_diameters(f, record, row, p);
    fill_material(f, record, material, p);
    fill_friction(f, record, material, p);
    fill_joint(f, record, p);
    check_creep(f, record, p);
    check_branch_turn(f, record, p);
}

void kent_fill_creep(kent_filling *f)
{
    const kent_model *m = f->model;
    if (!m->solver.creep || m->pipe_count == 0 || m->creep_count > 0) return;
    kent_notes_add(&f->model->cautions,
                   "creep = true in solver, but no pipe has elements of creep, nor a "
                   "material that has: all walls are elastic");
}
