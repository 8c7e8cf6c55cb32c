/* A main of 100 800 pipes from tables: that it is read, and has what the grid has. */
#include "kent_casefile.h"
#include "kent_check.h"
#include "kent_streets.h"

#include <stdlib.h>

static size_t count_of(const kent_model *m, kent_fitting_type type)
{
    size_t count = 0;
    for (size_t i = 0; i < m->fitting_count; i++) {
        count += m->fittings[i].type == type;
    }
    return count;
}

static void a_grid_of_streets_is_read_whole(void **state)
{
    (void)state;
    enum { N = KENT_STREETS_CROSSINGS };
    char folder[] = "/tmp/kent-streets-XXXXXX";
    char path[256];
    kent_complaints complaints = {0};
    kent_error err = {0};
    kent_catalogue *catalogue = NULL;
    kent_model *m = NULL;
    assert_non_null(mkdtemp(folder));
    assert_int_equal(kent_streets_write(folder, path, sizeof path), 0);
    assert_int_equal(
        kent_catalogue_read(KENT_SOURCE_DIR "/config", &catalogue, &complaints, &err),
        KENT_OK);
    const kent_status status =
        kent_case_read(path, catalogue, NULL, &m, &complaints, &err);
    kent_streets_remove(folder);
    if (complaints.count > 0) print_error("%s\n", complaints.kept[0].what);
    assert_int_equal(status, KENT_OK);
    assert_int_equal(m->point_count, kent_streets_points());
    assert_int_equal(m->pipe_count, kent_streets_pipes());
    assert_int_equal(m->route_count, 2 * kent_streets_pipes());
    assert_int_equal(m->node_count, kent_streets_points());
    assert_int_equal(m->file_count, 3);
    /* Bends at three corners (the reservoir stands in the fourth), tees along the
     * edges, crosses within. */
    assert_int_equal(count_of(m, KENT_BEND), 3);
    assert_int_equal(count_of(m, KENT_TEE), 4 * (N - 2));
    assert_int_equal(count_of(m, KENT_CROSS), (N - 2) * (N - 2));
    kent_model_free(m);
    kent_catalogue_free(catalogue);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(a_grid_of_streets_is_read_whole),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
