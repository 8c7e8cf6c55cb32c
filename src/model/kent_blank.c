#include "kent_model.h"

#include <math.h>

static const double NONE = (double)NAN;

kent_point kent_point_blank(void)
{
    return (kent_point){.at = {NONE, NONE, NONE},
                        .cover = NONE,
                        .ground_level = NONE,
                        .water_table = NONE,
                        .station = NONE,
                        .station_ahead = NONE,
                        .turn = NONE,
                        .curve_radius = NONE,
                        .soil = -1,
                        .place = {-1, 0}};
}

kent_pipe kent_pipe_blank(void)
{
    return (kent_pipe){.length = NONE,
                       .inside_diameter = NONE,
                       .outside_diameter = NONE,
                       .wall = NONE,
                       .wall_minimum = NONE,
                       .modulus = NONE,
                       .poisson = NONE,
                       .unit_mass = NONE,
                       .material_density = NONE,
                       .wave_speed = NONE,
                       .laying_length = NONE,
                       .branch_turn = NONE,
                       .pressure_rating = NONE,
                       .surge_rating = NONE,
                       .recurring_rating = NONE,
                       .test_rating = NONE,
                       .joint_rating = NONE,
                       .nominal_size = NONE,
                       .expansion = NONE,
                       .long_modulus = NONE,
                       .derating = 1.0,
                       .place = {-1, 0}};
}

kent_soil kent_soil_blank(void)
{
    kent_soil soil = {.route = KENT_BEARING_CONSTANT,
                      .allowable_bearing = NONE,
                      .bearing_gradient = NONE,
                      .passive_share = NONE,
                      .factor_inside = 1.0,
                      .vertical_bearing = NONE,
                      .base_friction = NONE,
                      .base_cohesion = NONE,
                      .wall_friction = NONE,
                      .unit_weight = NONE,
                      .friction_angle = NONE,
                      .cohesion = NONE,
                      .friction_ratio = NONE,
                      .adhesion_ratio = NONE,
                      .passive_ratio = NONE,
                      .place = {-1, 0}};
    for (size_t i = 0; i < KENT_TRENCHES; i++) {
        soil.passive_by_trench[i] = NONE;
    }
    return soil;
}

kent_stated kent_stated_blank(void)
{
    return (kent_stated){.slope = {.angle = NONE},
                         .block_share = NONE,
                         .run_length = {NONE, NONE},
                         .contact_area = NONE};
}

kent_built kent_built_blank(void)
{
    return (kent_built){.width = NONE,
                        .height = NONE,
                        .thickness = NONE,
                        .face_width = NONE,
                        .face_height = NONE,
                        .face_thickness = NONE,
                        .body = -1,
                        .place = {-1, 0}};
}

kent_fitting_note kent_note_blank(void)
{
    return (kent_fitting_note){.point = -1,
                               .type = -1,
                               .angle = NONE,
                               .orientation = -1,
                               .restraint = -1,
                               .soil = -1,
                               .cover = NONE,
                               .weight = NONE,
                               .face = NONE,
                               .rating = NONE,
                               .surge_rating = NONE,
                               .test_rating = NONE,
                               .branch = {.direction = {NONE, NONE, NONE},
                                          .outside_diameter = NONE,
                                          .inside_diameter = NONE},
                               .stated = kent_stated_blank(),
                               .run = {{-1, NONE}, {-1, NONE}},
                               .place = {-1, 0}};
}

kent_port kent_port_blank(void)
{
    return (kent_port){.inside_diameter = NONE,
                       .seal_diameter = NONE,
                       .outside_diameter = NONE,
                       .level = NONE,
                       .momentum_factor = NONE,
                       .span = -1,
                       .toward = -1};
}

double kent_concrete_usual(kent_concrete_code code)
{
    switch (code) {
    case KENT_EN_1992:
        return 16e6;
    case KENT_ACI_318:
        break;
    }
    return 2500.0 * 4.4482216152605 / (0.0254 * 0.0254);
}
