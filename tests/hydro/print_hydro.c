/* Prints what hydro works out over a grid, for the Python scripts beside it:
 *   water   T_K rho_kgm3 mu_Pas pv_Pa c_ms
 *   factor  Re roughness_ratio Colebrook-White Swamee-Jain */
#include "kent_friction.h"
#include "kent_water.h"

#include <math.h>
#include <stdio.h>

int main(void)
{
    for (int i = 0; i <= 80; i++) {
        const double t = KENT_WATER_COLDEST + 1.25 * i;
        const kent_water w = kent_water_at(t);
        printf("water %.17g %.17g %.17g %.17g %.17g\n", w.temperature, w.density,
               w.viscosity, w.vapour_pressure, w.sound_speed);
    }
    for (int i = 0; i <= 44; i++) {
        for (int j = 0; j <= 30; j++) {
            const double re = 4000.0 * pow(10.0, 0.1 * i);
            const double rough = j == 0 ? 0.0 : 1e-7 * pow(10.0, 0.2 * (j - 1));
            printf("factor %.17g %.17g %.17g %.17g\n", re, rough,
                   kent_colebrook(re, rough), kent_swamee_jain(re, rough));
        }
    }
    return 0;
}
