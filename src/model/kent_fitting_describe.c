/* What a fitting is said to be, once its legs are known. */
#include "kent_fitting_internal.h"

#include <math.h>

bool kent_fitting_type_fits(kent_fitting_type type, size_t count, size_t branches)
{
    switch (type) {
    case KENT_BEND:
    case KENT_REDUCER:
    case KENT_STRAIGHT:
    case KENT_CURVE:
        return count == 2 && branches == 0;
    case KENT_TEE:
    case KENT_WYE:
        return count + branches == 3;
    case KENT_CROSS:
        return count + branches >= 4;
    case KENT_GROUP:
        return count >= 1;
    case KENT_DEAD_END:
        return count == 1;
    case KENT_VALVE:
        return (count == 1 || count == 2) && branches == 0;
    }
    return false;
}

kent_restraint_choice kent_fitting_usual_restraint(const kent_fitting *f, bool rigid)
{
    if (f->within_deflection || f->type == KENT_STRAIGHT || f->type == KENT_CURVE) {
        return KENT_NO_RESTRAINT;
    }
    if (f->role == KENT_ROLE_WALL) return KENT_NO_RESTRAINT; /* its structure holds */
    if (rigid && f->role != KENT_ROLE_FLANGE_ADAPTOR) return KENT_RESTRAINED_JOINTS;
    return f->type == KENT_REDUCER || f->type == KENT_VALVE ? KENT_ANCHOR_BLOCK
                                                            : KENT_THRUST_BLOCK;
}

double kent_first_given(double a, double b, double c)
{
    return !isnan(a) ? a : !isnan(b) ? b : c;
}

void kent_fitting_describe_legs(kent_fitting *f, const kent_port *ports, size_t legs)
{
    const kent_port *largest = &ports[kent_ports_largest(ports, f->port_count)];
    f->size = largest->inside_diameter;
    f->outside_diameter = largest->outside_diameter;
    f->branch_size = (double)NAN;
    f->orientation = KENT_HORIZONTAL;
    if (f->type == KENT_BEND || f->type == KENT_CURVE) {
        f->angle = kent_ports_turn(ports);
        f->plan_turn = kent_ports_plan_turn(ports);
        f->orientation = kent_ports_orientation(ports);
    }
    if (f->type == KENT_REDUCER && kent_ports_turn(ports) > KENT_LEAST_TURN) {
        f->angle = kent_ports_turn(ports);
    }
    if (legs >= 3) {
        f->angle = kent_ports_branch_angle(ports);
        f->branch_size = ports[2].inside_diameter;
    } else if (f->branch.end != KENT_BRANCH_NONE) {
        f->branch_size = f->branch.inside_diameter;
    }
}

void kent_fitting_describe_ground(const kent_model *m, const kent_fitting_note *note,
                                  kent_fitting *f)
{
    const double nan = (double)NAN;
    const kent_point *point = f->point >= 0 ? &m->points[f->point] : NULL;
    const kent_ground_zone *zone = f->zone >= 0 ? &m->ground_zones[f->zone] : NULL;
    const double outside =
        isfinite(f->outside_diameter) ? f->outside_diameter : f->size;
    const double of_point = point ? kent_point_cover(point, outside) : nan;
    const double of_zone = zone ? zone->cover : nan;

    f->cover = kent_first_given(note ? note->cover : nan, of_point,
                                kent_first_given(of_zone, m->ground.cover, nan));
    f->water_table =
        kent_first_given(point ? point->water_table : nan,
                         zone ? zone->water_table : nan, m->ground.water_table);
    f->soil = m->ground.soil;
    f->trench = m->ground.trench;
    f->backfill = m->ground.backfill;
    if (zone && zone->soil >= 0) f->soil = zone->soil;
    if (zone && zone->trench >= 0) f->trench = zone->trench;
    if (zone && zone->backfill >= 0) f->backfill = zone->backfill;
    if (point && point->soil >= 0) f->soil = point->soil;
    if (note && note->soil >= 0) f->soil = note->soil;
    f->weight = note && isfinite(note->weight) ? note->weight : 0.0;
}
