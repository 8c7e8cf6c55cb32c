/* Momentum on a control volume: one fitting, one instant.
 *
 * T = - sum (p A_seal + beta rho Q^2/A_bore) n + W - rho sum (dQ/dt) r (docs/theory)
 *
 * T is the force of the water on the fitting: what the ground must resist. p gauge, n
 * the unit vector out through a port, Q positive out of the fitting, r = face x n from
 * the fitting's centre to the port. */
#ifndef KENT_BALANCE_H
#define KENT_BALANCE_H

#include "kent_model.h"

/* Most ports of one balance: eight legs, and a branch extended. */
enum { KENT_PORTS = 9 };

typedef struct kent_port_state {
    double pressure;  /* Pa gauge, at the port */
    double flow;      /* m3/s out of the fitting */
    double flow_rate; /* m3/s2, dQ/dt */
    double momentum_factor;
    double pressure_force; /* N, p A_seal */
    double momentum_flux;  /* N, beta rho Q^2/A_bore; never negative */
    double push;           /* N, the sum of both: acts along -direction */
} kent_port_state;

typedef struct kent_balance {
    size_t port_count;
    kent_port_state port[KENT_PORTS];
    kent_vec3 weight;   /* N */
    kent_vec3 unsteady; /* N, - rho sum (dQ/dt) r: on its own row, never what governs */
    kent_vec3 thrust;   /* N, the whole sum */
} kent_balance;

/* Fills the forces and sums of b from its ports' pressure, flow, flow_rate and
 * momentum_factor, which the caller has set, with b->weight. density kg/m3. */
void kent_balance_sum(const kent_port *ports, size_t count, double density,
                      kent_balance *b);

/* Momentum factor of a port's stream at a flow (m3/s, either sign): the port's own
 * where given, else by profile (docs/theory 8.6) with the friction of its pipe; of a
 * smooth pipe where the port belongs to none. */
double kent_port_momentum_factor(const kent_model *m, const kent_port *port,
                                 double flow);

/* The port whose velocity the piezometric head belongs to: the first of the widest with
 * a pipe, or with a pressure stated. */
size_t kent_port_widest(const kent_port *ports, size_t count);

/* m: where the pressure of a port is told: its own level in a group, else that of the
 * fitting's centre. */
double kent_port_level(const kent_fitting *f, const kent_port *port);

/* The point that a leg leaves from: of a group's leg its member's, else the fitting's.
 */
int kent_port_point(const kent_model *m, const kent_fitting *f, const kent_port *port);

/* Worst imbalance of flow over the largest flow of a ports-only fitting, 0 .. 1. */
double kent_balance_flow_gap(const kent_port *ports, size_t count);

#endif
