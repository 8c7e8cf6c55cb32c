#include "kent_gas.h"

#include "kent_math.h"

const double KENT_GAS_LEAST = 1e-3;

/* 14.5 */
kent_gas_point kent_gas_in(const kent_gas *gas, double volume)
{
    const double least = KENT_GAS_LEAST * gas->volume;
    const double at = volume > least ? volume : least;
    const double pressure = gas->pressure * kent_pow(gas->volume / at, gas->exponent);
    const double slope = -gas->exponent * pressure / at;
    return (kent_gas_point){pressure + slope * (volume - at), slope};
}
