/* How the derived part of a model is worked out: known to model/ alone.
 *
 * A *stop* is one entry of kent_model.route, by its index: a point as one pipe passes
 * or ends there. An *arm* is a stop seen in one direction along its route; at a point,
 * arms are what legs of a fitting and ends of spans are made from. Arm 2s looks back
 * from stop s, arm 2s + 1 looks on. */
#ifndef KENT_MODEL_INTERNAL_H
#define KENT_MODEL_INTERNAL_H

#include "kent_model.h"

enum { KENT_ARMS = 8 }; /* most legs of one fitting */

typedef enum kent_seat_kind {
    KENT_SEAT_FREE,
    KENT_SEAT_LEVEL,
    KENT_SEAT_OUTFLOW,
    KENT_SEAT_VALVE,
    KENT_SEAT_DEVICE /* in line, or a pump that draws from a level */
} kent_seat_kind;

typedef struct kent_seat {
    kent_seat_kind kind;
    int index; /* into the model's list of its kind; of a device, into devices */
} kent_seat;

typedef struct kent_arm {
    size_t stop;
    bool leaves; /* looks on along the route: flow along the pipe goes away here */
} kent_arm;

/* Who meets where. kent_layout l = {0}; is a valid, empty one. */
typedef struct kent_layout {
    size_t *first;     /* [point_count + 1] into stop */
    size_t *stop;      /* [route_count] stops grouped by point, rising */
    int *pipe;         /* [route_count] of each stop */
    size_t *owner;     /* [point_count] the stop whose stations a point's are: the
                          first that a route runs through, else the first; any number
                          where there is none */
    int *note;         /* [point_count] what the case says of its fitting; -1 */
    kent_seat *device; /* [point_count] */
    bool *beside;      /* [point_count] some device stands beside it */
    double *station;   /* [point_count] m; NAN: on no route */
    int *arm_node;     /* [2 route_count] -1: the pipe isn't cut there */
    int *arm_span;     /* [2 route_count] -1: no such arm */
    double *arc;       /* [route_count] m along the curve at a stop; 0: none */
} kent_layout;

/* kent_layout.c */
kent_status kent_layout_make(const kent_model *m, kent_layout *l);
void kent_layout_clear(kent_layout *l);
/* Writes the first KENT_ARMS arms of a point and returns how many it has. Two arms come
 * as flow along the routes would: the arriving one first, where just one arrives. */
size_t kent_layout_arms(const kent_model *m, const kent_layout *l, int point,
                        kent_arm arms[KENT_ARMS]);
/* It is neither end of its route. */
bool kent_layout_runs_through(const kent_model *m, const kent_layout *l, size_t stop);
bool kent_layout_is_cut(const kent_model *m, const kent_layout *l, size_t stop);
/* Notes which device stands at each point; complains where one cannot. */
void kent_layout_place_devices(const kent_model *m, kent_layout *l,
                               kent_complaints *complaints);
/* Whether a pipe runs through a point; then, whether nothing stands there, and the
 * device takes its place. Each complains where not. name: "fixed level" or "valve
 * \"V1\"". */
bool kent_layout_on_route(const kent_model *m, const kent_layout *l, int point,
                          kent_place place, const char *name,
                          kent_complaints *complaints);
bool kent_layout_stand(const kent_model *m, kent_layout *l, kent_seat device, int point,
                       kent_place place, const char *name, kent_complaints *complaints);
int kent_arm_toward(const kent_model *m, kent_arm arm); /* the next point that way */

static inline size_t kent_arm_number(kent_arm arm)
{
    return 2 * arm.stop + (arm.leaves ? 1U : 0U);
}

/* kent_alignment.c: x and y of routes that have stations and turns instead. */
kent_status kent_alignment_lay(kent_model *m, const kent_layout *l,
                               kent_complaints *complaints);
void kent_alignment_forget(kent_model *m); /* as the case was given */

/* kent_route.c: the second needs the first. */
kent_status kent_route_measure(kent_model *m, const kent_layout *l,
                               kent_complaints *complaints);
kent_status kent_route_stations(kent_model *m, const kent_layout *l,
                                kent_complaints *complaints);

/* 1: a pipe goes on from one listed before it that ends at its first point; -1: it is a
 * branch there, which has stations of its own; else 0. */
int kent_route_follows(const kent_model *m, const kent_layout *l,
                       const kent_pipe *pipe);
/* Of a stop of a pipe reached at the station `here`, m, after `before`. */
void kent_route_complain_falling(const kent_model *m, const kent_pipe *pipe,
                                 size_t stop, double before, double here,
                                 kent_complaints *complaints);

/* kent_ground.c: zones sorted, and held against their pipes; levels of the ground
 * against those of the pipes. Needs stations. */
kent_status kent_ground_settle(kent_model *m, const kent_layout *l,
                               kent_complaints *complaints);
/* The zone of a pipe at a station; -1. */
int kent_zone_at(const kent_model *m, int pipe, double station);

/* kent_devices.c: devices of every kind in one list; then where each stands, with
 * complaints where one cannot; the arm that it delivers to or stands beside; then
 * their nodes, once those are made, and kent_model.stands. */
kent_status kent_devices_list(kent_model *m);
void kent_devices_place(const kent_model *m, kent_layout *l,
                        kent_complaints *complaints);
kent_arm kent_device_delivery(const kent_model *m, const kent_layout *l,
                              const kent_device *d);
void kent_devices_stand(kent_model *m, const kent_layout *l);
/* kent_devices_caution.c: once fittings and marches are listed. */
void kent_devices_caution(kent_model *m);

/* kent_devices_valid.c: as kent_model_is_valid, of devices and what moves them. */
bool kent_devices_are_valid(const kent_model *m);
bool kent_event_is_valid(const kent_model *m, const kent_event *e);

/* kent_network.c: spans, nodes, ends; then what no fixed level reaches. */
kent_status kent_network_cut(kent_model *m, kent_layout *l,
                             kent_complaints *complaints);
kent_status kent_network_check_connected(const kent_model *m,
                                         kent_complaints *complaints);

/* kent_state.c: the one state of a case that names none, and what is marched; then
 * kent_model.highest_level. */
kent_status kent_state_marches(kent_model *m, kent_complaints *complaints);
kent_status kent_state_levels(kent_model *m);

/* kent_shut_off.c: kent_model.shut_off_level, after highest_level. */
kent_status kent_shut_off_levels(kent_model *m);

/* kent_span.c: bore, friction, wave speed and share of losses from its pipe. */
void kent_span_fill(const kent_model *m, kent_span *span);

/* kent_port.c: geometry of legs, by their directions and diameters alone. */
double kent_ports_turn(const kent_port ports[2]);      /* rad, 0: straight on */
double kent_ports_plan_turn(const kent_port ports[2]); /* rad, + to the left */
kent_orientation kent_ports_orientation(const kent_port ports[2]);
/* By the way equal pressures on all seals push. */
kent_orientation kent_ports_push(const kent_port *ports, size_t count);
double kent_ports_branch_angle(const kent_port ports[3]); /* rad, to the nearer run */
/* Brings the two most nearly opposite legs to the front, keeping the order otherwise.
 */
void kent_ports_run_first(kent_port *ports, size_t count);
bool kent_ports_same_size(const kent_port *a, const kent_port *b);
size_t kent_ports_largest(const kent_port *ports, size_t count);
/* Directions where there are no coordinates: flow arrives along +x through port 0. */
void kent_ports_schematic(kent_port *ports, size_t count, double angle,
                          kent_orientation orientation);

/* Turns below this are how a survey was rounded, not a fitting. rad: 0.5 degrees */
static const double KENT_LEAST_TURN = 0.5 * 3.14159265358979323846 / 180.0;

/* kent_fitting.c, kent_fitting_given.c: one fitting. Returns false where the point
 * carries none; fitting and ports (at most KENT_ARMS, out->port_count) are then not
 * written. */
bool kent_fitting_at(kent_model *m, const kent_layout *l, int point,
                     const kent_fitting_note *note, kent_fitting *out, kent_port *ports,
                     kent_complaints *complaints);
bool kent_fitting_from_ports(const kent_model *m, const kent_fitting_note *note,
                             kent_fitting *out, kent_port *ports,
                             kent_complaints *complaints);

/* kent_branch.c: what branches off without a pipe, and what a fitting serves. legs:
 * of pipes; each returns false with a complaint. */
bool kent_branch_stands(const kent_model *m, const kent_fitting_note *note,
                        kent_seat device, size_t legs, kent_complaints *complaints);
/* Unit, out of the fitting; ports [legs] have their directions. surveyed: x and y are
 * the case's own, so that the branch's direction can be stated in them. */
bool kent_branch_direct(const kent_model *m, const kent_fitting_note *note,
                        const kent_port *ports, size_t legs, bool surveyed,
                        kent_vec3 *out, kent_complaints *complaints);
/* Its port. False: as built it has none, since its end is one body with the fitting. */
bool kent_branch_port(const kent_model *m, const kent_branch *branch, kent_port *out);

/* kent_fitting_list.c: all of them, in the order of kent_model.fittings; notes go to
 * their points. */
kent_status kent_fitting_list(kent_model *m, kent_layout *l,
                              kent_complaints *complaints);

/* kent_curve.c: where a curve cannot be; the chainages of a surveyed pipe, along its
 * tangents, made those along its arcs (false with a complaint); what a curve asks of
 * the joints; then turns within joint deflection summed. */
void kent_curve_check(const kent_model *m, const kent_layout *l,
                      kent_complaints *complaints);
bool kent_curve_follow(const kent_model *m, const kent_layout *l, const kent_pipe *pipe,
                       kent_complaints *complaints);
void kent_curve_caution(kent_model *m, const kent_fitting *f, const kent_pipe *pipe);
kent_status kent_curve_joints(kent_model *m, const kent_layout *l,
                              kent_complaints *complaints);

/* kent_group.c: fittings held as one, because the case says so or because they stand
 * close together on joints that hold. */
kent_status kent_group_fittings(kent_model *m, const kent_layout *l,
                                kent_complaints *complaints);

/* A complaint about what stands at place. */
__attribute__((format(printf, 4, 5))) void
kent_place_complain(const kent_model *m, kent_place place, kent_complaints *complaints,
                    const char *fmt, ...);

#endif
