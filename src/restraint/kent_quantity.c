#include "kent_quantity.h"

kent_quantities kent_quantity_face(kent_face face, double thickness, double axis,
                                   bool through)
{
    const double area = face.width * face.height;
    return (kent_quantities){
        .concrete = area * thickness,
        .excavation = face.width * thickness * (axis + 0.5 * face.height),
        .formed = 2.0 * face.height * thickness + (through ? 0.0 : area),
    };
}

kent_quantities kent_quantity_body(kent_face plan, double height, double base)
{
    const double area = plan.width * plan.height;
    return (kent_quantities){
        .concrete = area * height,
        .excavation = area * base,
        .formed = 2.0 * (plan.width + plan.height) * height,
    };
}

kent_quantities kent_quantity_sum(kent_quantities a, kent_quantities b)
{
    return (kent_quantities){
        .concrete = a.concrete + b.concrete,
        .excavation = a.excavation + b.excavation,
        .formed = a.formed + b.formed,
    };
}
