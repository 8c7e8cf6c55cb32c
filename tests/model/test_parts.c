#include "kent_build.h"
#include "kent_check.h"
#include "kent_parts.h"

/* R - V - E with an in-line valve at V, and an island S - T. */
static kent_build two_parts(void)
{
    kent_build b = kent_build_new();
    kent_build_point(&b, "R", 0.0, 0.0, 0.0);
    kent_build_point(&b, "V", 100.0, 0.0, 0.0);
    kent_build_point(&b, "E", 200.0, 0.0, 0.0);
    kent_build_point(&b, "S", 0.0, 50.0, 0.0);
    kent_build_point(&b, "T", 100.0, 50.0, 0.0);
    kent_build_pipe(&b, "A", "R V", 0.3, 1000.0);
    kent_build_pipe(&b, "B", "V E", 0.3, 1000.0);
    kent_build_pipe(&b, "C", "S T", 0.3, 1000.0);
    kent_build_fixed_level(&b, "R", 50.0);
    kent_build_fixed_level(&b, "E", 40.0);
    kent_build_fixed_level(&b, "S", 60.0);
    kent_build_valve(&b, "V1", "V", 0.2, (double)NAN);
    kent_build_derive(&b);
    return b;
}

static void spans_and_passing_valves_join_nodes(void **state)
{
    (void)state;
    kent_build b = two_parts();
    int part[8];
    const bool shut[1] = {false};
    const int r = kent_build_node_of(&b, "R");
    const int e = kent_build_node_of(&b, "E");
    const int s = kent_build_node_of(&b, "S");
    const int t = kent_build_node_of(&b, "T");

    assert_true(b.model->node_count <= 8);
    kent_parts_find(b.model, NULL, part);
    assert_int_equal(part[r], part[e]);
    assert_int_equal(part[s], part[t]);
    assert_int_not_equal(part[r], part[s]);

    kent_parts_find(b.model, shut, part);
    assert_int_not_equal(part[r], part[e]);
    assert_int_equal(part[r], part[b.model->valves[0].node[0]]);
    assert_int_equal(part[e], part[b.model->valves[0].node[1]]);
    kent_build_clear(&b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(spans_and_passing_valves_join_nodes),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
