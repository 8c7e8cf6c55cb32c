/* Earth pressure beyond Rankine's on level ground: Coulomb's plane with friction on the
 * face, ground that falls away before it, and what a whole face finds. */
#ifndef KENT_EARTH_H
#define KENT_EARTH_H

/* -: Coulomb's coefficient of passive earth pressure on an upright face in level
 * ground; friction_angle and wall_friction rad, 0 <= wall_friction <= friction_angle.
 * The force it goes with leans on the face at wall_friction from square. NAN where no
 * plane gives one. fails never. source docs/theory/21-ground.md, 21.1 */
double kent_coulomb_passive(double friction_angle, double wall_friction);

/* -: the part of it square to the face, where the ground before the face falls by an
 * angle (rad, 0 <= falls). NAN where it falls as steeply as friction_angle, or more.
 * fails never. source docs/theory/21-ground.md, 21.2 */
double kent_falling_passive(double friction_angle, double wall_friction, double falls);

/* The wall friction (rad) beyond which Coulomb's plane promises more than ground gives:
 * a third of the friction angle. source docs/theory/21-ground.md, 21.3 */
double kent_coulomb_limit(double friction_angle);

/* rad above the level: the plane that such a wedge slides up along, which is the
 * flatter the more rubs on the face; 0 <= wall_friction <= friction_angle. fails never.
 * source docs/theory/21-ground.md, 21.13 */
double kent_passive_plane(double friction_angle, double wall_friction);

/* An upright face in ground of one soil. */
typedef struct kent_earth {
    double unit_weight;              /* N/m3, in place */
    double friction_angle, cohesion; /* rad, Pa */
    double water_table;              /* m below ground; INFINITY: none */
    double water;                    /* N/m3, unit weight of ground water */
} kent_earth;

/* N per metre of its width: passive and active force on a face from a depth down to
 * another (m, 0 <= top <= base), by Rankine, by the area under the pressure, which
 * bends at the water table. Active pressure counts from where it is not tension. fails
 * never. source docs/theory/21-ground.md, 21.4, 21.5 */
double kent_face_passive(const kent_earth *earth, double top, double base);
double kent_face_active(const kent_earth *earth, double top, double base);

/* m: how much the mean of max(0, z - table) over a face of a height (m) exceeds its
 * value at the centre (m below ground); 0 where the water does not cut the face. fails
 * never. source docs/theory/21-ground.md, 21.6 */
double kent_face_cut(double centre, double height, double table);

#endif
