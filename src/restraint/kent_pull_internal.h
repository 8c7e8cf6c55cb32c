/* Pull along pipes, on its way into results. Only restraint/ looks inside. */
#ifndef KENT_PULL_INTERNAL_H
#define KENT_PULL_INTERNAL_H

#include "kent_restraint.h"

/* Everything of a model: *out is the caller's to clear. holdings: [fitting_count],
 * whose cautions and derivations take in ratings and stresses. */
kent_status kent_pulls_find(const kent_model *m, const kent_loads_result *loads,
                            kent_holding *holdings, kent_pulls *out, kent_error *err);
void kent_pulls_clear(kent_pulls *p);

/* One end of a string. */
void kent_pull_end_find(const kent_model *m, const kent_loads_result *loads,
                        const kent_holding *holdings, size_t end, kent_pull_end *out);
/* Poisson's pull of pressure in a pipe's wall, and that of cooling in some case, N; the
 * modulus of it, Pa; the inside of the wall, m. What is not stated pulls nothing. */
double kent_pull_pressure_in(const kent_pipe *p, const kent_string_case *c);
double kent_pull_cooling_in(const kent_model *m, const kent_pipe *p,
                            const kent_string_case *c);
double kent_pull_modulus_in(const kent_pipe *p, const kent_string_case *c);
double kent_pull_inside(const kent_pipe *p);

/* Which keys a pipe lacks for its pull; "" none. */
const char *kent_pull_lacking(const kent_pipe *p);

/* N that the other pipes of a string add to the pull at one of its ends, >= 0. */
double kent_pull_of_string(const kent_model *m, const kent_strings *strings,
                           const kent_string_end *e, const kent_string_case *c);
/* N that a pipe kept from shortening leaves along a string that is free to slide: the
 * wall's pull less what the water pushes in its bore. source 23.17 */
double kent_pull_through(const kent_model *m, const kent_pipe *p,
                         const kent_string_case *c);

void kent_pull_end_derive(const kent_model *m, const kent_string_end *e,
                          double string_length, kent_pull_end *at);

/* Whether a restrained fitting's pipes and joints are rated for what comes. */
void kent_pull_ratings(const kent_model *m, const kent_fitting *f,
                       const kent_fitting_loads *loads, kent_holding *h);
/* Stress in the wall of its legs: adds them to legs, which has room. */
void kent_pull_legs(const kent_model *m, size_t fitting, kent_holding *h,
                    kent_pull_leg *legs, size_t *count);

/* Steep stretches of one pipe, at most one per leg of its route. */
void kent_steep_find(const kent_model *m, int pipe, kent_steep *out, size_t *count);

/* The ground's friction along a pipe from a place on, one way: how far it takes to make
 * up a demand (N), and the mean friction over that (N/m). False where a value of the
 * ground is missing, or it never does. */
bool kent_pull_friction(const kent_model *m, int span, double chainage, double sign,
                        double demand, double *length, double *friction);

double kent_pull_wall_area(const kent_pipe *p); /* m2; NAN: not known */
/* N per m of empty pipe; NAN: not known. source 11.1 */
double kent_pull_pipe_weight(const kent_pipe *p, double gravity);

#endif
