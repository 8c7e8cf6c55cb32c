/* Vectors in space: x east, y north, z up. */
#ifndef KENT_VEC3_H
#define KENT_VEC3_H

#include <math.h>

typedef struct kent_vec3 {
    double x, y, z;
} kent_vec3;

static inline kent_vec3 kent_vec3_add(kent_vec3 a, kent_vec3 b)
{
    return (kent_vec3){a.x + b.x, a.y + b.y, a.z + b.z};
}

static inline kent_vec3 kent_vec3_sub(kent_vec3 a, kent_vec3 b)
{
    return (kent_vec3){a.x - b.x, a.y - b.y, a.z - b.z};
}

static inline kent_vec3 kent_vec3_scale(double s, kent_vec3 a)
{
    return (kent_vec3){s * a.x, s * a.y, s * a.z};
}

static inline double kent_vec3_dot(kent_vec3 a, kent_vec3 b)
{
    return a.x * b.x + a.y * b.y + a.z * b.z;
}

static inline kent_vec3 kent_vec3_cross(kent_vec3 a, kent_vec3 b)
{
    return (kent_vec3){a.y * b.z - a.z * b.y, a.z * b.x - a.x * b.z,
                       a.x * b.y - a.y * b.x};
}

static inline double kent_vec3_length(kent_vec3 a) { return sqrt(kent_vec3_dot(a, a)); }

/* Unit vector along a; {0,0,0} stays so. */
static inline kent_vec3 kent_vec3_unit(kent_vec3 a)
{
    const double length = kent_vec3_length(a);
    return length > 0.0 ? kent_vec3_scale(1.0 / length, a) : a;
}

/* Angle between two directions, rad, 0 .. pi; exact near 0 and pi, where acos is not.
 */
static inline double kent_vec3_angle(kent_vec3 a, kent_vec3 b)
{
    return atan2(kent_vec3_length(kent_vec3_cross(a, b)), kent_vec3_dot(a, b));
}

#endif
