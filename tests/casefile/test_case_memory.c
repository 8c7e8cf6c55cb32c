/* Every allocation of a reading refused once: "out of memory", nothing half-made, and
 * (with the sanitizer) nothing lost. */
#include "kent_alloc_fail.h"
#include "table_folder.h"

typedef struct reading {
    const kent_catalogue *catalogue;
    char path[64];
} reading;

static int read_the_case(void *context)
{
    const reading *r = context;
    kent_complaints complaints = {0};
    kent_error err = {0};
    kent_model *m = NULL;
    const kent_status status =
        kent_case_read(r->path, r->catalogue, NULL, &m, &complaints, &err);
    if (status == KENT_OK) {
        assert_non_null(m);
        kent_model_free(m);
        return 0;
    }
    assert_int_equal(status, KENT_E_NOMEM);
    assert_int_equal(err.status, KENT_E_NOMEM);
    assert_null(m);
    return -1;
}

static int read_the_standard_table(void *context)
{
    const reading *r = context;
    kent_complaints complaints = {0};
    kent_error err = {0};
    kent_standard *t = NULL;
    const kent_status status =
        kent_standard_read(r->path, r->catalogue, NULL, &t, &complaints, &err);
    if (status == KENT_OK) {
        assert_non_null(t);
        kent_standard_free(t);
        return 0;
    }
    assert_int_equal(status, KENT_E_NOMEM);
    assert_int_equal(err.status, KENT_E_NOMEM);
    assert_null(t);
    return -1;
}

static int read_the_catalogue(void *context)
{
    kent_complaints complaints = {0};
    kent_error err = {0};
    kent_catalogue *c = NULL;
    const kent_status status = kent_catalogue_read(context, &c, &complaints, &err);
    if (status == KENT_OK) {
        kent_catalogue_free(c);
        return 0;
    }
    assert_int_equal(status, KENT_E_NOMEM);
    assert_null(c);
    return -1;
}

static void each_refused_allocation_of_a_case_is_out_of_memory(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    char *creeping =
        replaced(MAIN_CASE, "surge_rating",
                 "creep = ( ( \"0.05 s\", \"1.06e-10 1/Pa\" ) ); surge_rating");
    char *together = replaced(DESIGN_CASE, "at = \"B1\";",
                              "at = \"T1\"; branch = { direction = [ 0.0, 1.0, 0.0 ]; "
                              "outside_diameter = \"118 mm\"; end = \"blank\"; }; }, "
                              "{ at = \"B1\"; together_with = [ \"T1\" ];");
    for (size_t i = 0; i < c->material_count; i++) {
        c->materials[i].plastic = true; /* may creep */
    }
    const char *const texts[] = {SOUND_CASE, creeping, together, DEVICE_CASE};
    for (size_t i = 0; i < sizeof texts / sizeof texts[0]; i++) {
        reading r = {.catalogue = c};
        write_bytes(r.path, texts[i], strlen(texts[i]));
        assert_true(kent_allocations_needed(read_the_case, &r) > 20);
        (void)unlink(r.path);
    }
    free(creeping);
    free(together);
    kent_catalogue_free(c);
}

static void each_refused_allocation_of_tables_is_out_of_memory(void **state)
{
    (void)state;
    kent_catalogue *c = read_catalogue();
    reading r = {.catalogue = c};
    char folder[] = "/tmp/kent-table-XXXXXX";
    assert_non_null(mkdtemp(folder));
    write_into(folder, "case.cfg", TABLE_CASE, strlen(TABLE_CASE));
    write_into(folder, "points.csv", POINTS_TABLE, strlen(POINTS_TABLE));
    write_into(folder, "pipes.csv", PIPES_TABLE, strlen(PIPES_TABLE));
    (void)snprintf(r.path, sizeof r.path, "%s/case.cfg", folder);
    assert_true(kent_allocations_needed(read_the_case, &r) > 40);
    write_into(folder, "case.cfg", NULL, 0);
    write_into(folder, "points.csv", NULL, 0);
    write_into(folder, "pipes.csv", NULL, 0);
    assert_int_equal(rmdir(folder), 0);
    kent_catalogue_free(c);
}

static void each_refused_allocation_of_a_standard_table_is_out_of_memory(void **state)
{
    (void)state;
    static const char TABLE[] =
        "format = 1;\npressure = \"10 bar\"; cover = \"1 m\";\n"
        "sizes = ( \"DI-EN545-C40-DN100\" );\n"
        "fittings = ( \"dead-end\" );\n"
        "soils = ( { id = \"bank\"; allowable_bearing = \"50 kPa\"; } );\n";
    kent_catalogue *c = read_catalogue();
    reading r = {.catalogue = c};
    write_bytes(r.path, TABLE, strlen(TABLE));
    assert_true(kent_allocations_needed(read_the_standard_table, &r) > 40);
    (void)unlink(r.path);
    kent_catalogue_free(c);
}

static void each_refused_allocation_of_the_catalogue_is_out_of_memory(void **state)
{
    (void)state;
    char folder[] = KENT_SOURCE_DIR "/config";
    assert_true(kent_allocations_needed(read_the_catalogue, folder) > 20);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(each_refused_allocation_of_a_case_is_out_of_memory),
        cmocka_unit_test(each_refused_allocation_of_tables_is_out_of_memory),
        cmocka_unit_test(each_refused_allocation_of_a_standard_table_is_out_of_memory),
        cmocka_unit_test(each_refused_allocation_of_the_catalogue_is_out_of_memory),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
