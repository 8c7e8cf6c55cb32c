#include "nets.h"

kent_steady *nets_steady(kent_build *b)
{
    kent_steady *s = NULL;
    kent_error err = {0};
    kent_build_derive(b);
    if (kent_steady_solve(b->model, &s, &err) != KENT_OK) fail_msg("%s", err.what);
    return s;
}

static void rough(kent_build *b, int pipe)
{
    b->model->pipes[pipe].friction = KENT_COLEBROOK_WHITE;
    b->model->pipes[pipe].friction_coefficient = 0.2e-3; /* m */
}

kent_build nets_loop(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 10.0);
    kent_build_point(&b, "A", 400.0, 0.0, 5.0);
    kent_build_point(&b, "B", 800.0, 300.0, 2.0);
    kent_build_point(&b, "C", 800.0, -300.0, 0.0);
    kent_build_point(&b, "M", 800.0, 0.0, 1.0);
    kent_build_point(&b, "E", 1100.0, -300.0, 0.0);
    kent_build_point(&b, "T", 800.0, 700.0, 3.0);
    rough(&b, kent_build_pipe(&b, "feed", "R A", 0.4, 1000.0));
    rough(&b, kent_build_pipe(&b, "north", "A B", 0.3, 1100.0));
    rough(&b, kent_build_pipe(&b, "south", "A C", 0.3, 950.0));
    rough(&b, kent_build_pipe(&b, "cross", "B M C", 0.25, 1050.0));
    rough(&b, kent_build_pipe(&b, "end", "C E", 0.3, 1000.0));
    rough(&b, kent_build_pipe(&b, "top", "B T", 0.3, 1000.0));
    b.model->pipes[1].loss = 3.0;
    kent_build_fixed_level(&b, "R", 60.0);
    kent_build_fixed_level(&b, "T", 55.0);
    const int out = kent_build_outflow(&b, "C", 0.02);
    kent_build_outflow(&b, "A", 0.015);
    b.model->outflows[1].pressure_dependent = true;
    b.model->outflows[1].full_pressure = 8e5;
    kent_build_valve(&b, "line", "M", 0.05, (double)NAN);
    const int valve = kent_build_valve(&b, "gate", "E", 0.012, 0.0);
    const int s = kent_build_scenario(&b, "shut", 4.0);
    kent_build_ramp(&b, s, KENT_EVENT_VALVE, valve, 0.5, 2.0, 0.0);
    kent_build_ramp(&b, s, KENT_EVENT_OUTFLOW, out, 1.0, 0.0, 0.0);
    return b;
}

kent_second_report nets_run(const kent_build *b, const kent_steady *s, int scenario,
                            double duration, kent_mesh mesh, kent_second_peak *peaks)
{
    kent_second_report report = {0};
    kent_error err = {0};
    if (kent_second_solve(b->model, s, scenario, duration, &mesh, peaks, &report,
                          &err) != KENT_OK) {
        fail_msg("%s", err.what);
    }
    return report;
}
