/* Times the reading of a street grid of 100 800 pipes from tables, from the file to the
 * derived model, and prints the most memory the process ever had. */
#include "kent_casefile.h"
#include "kent_streets.h"

#include <stdio.h>
#include <stdlib.h>
#include <sys/resource.h>
#include <time.h>

enum { RUNS = 5 };

static double seconds(void)
{
    struct timespec t;
    (void)clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &t);
    return (double)t.tv_sec + 1e-9 * (double)t.tv_nsec;
}

static int by_size(const void *a, const void *b)
{
    const double x = *(const double *)a;
    const double y = *(const double *)b;
    return (x > y) - (x < y);
}

/* Seconds of processor time; negative: it could not be read. */
static double time_reading(const kent_catalogue *catalogue, const char *path)
{
    kent_complaints complaints = {0};
    kent_error err = {0};
    kent_model *m = NULL;
    const double start = seconds();
    const kent_status status =
        kent_case_read(path, catalogue, NULL, &m, &complaints, &err);
    const double took = seconds() - start;
    if (status != KENT_OK) {
        (void)fprintf(stderr, "%s\n",
                      complaints.count > 0 ? complaints.kept[0].what : err.what);
    }
    kent_model_free(m);
    return status == KENT_OK ? took : -1.0;
}

int main(void)
{
    char folder[] = "/tmp/kent-streets-XXXXXX";
    char path[256];
    double took[RUNS];
    struct rusage usage;
    kent_complaints complaints = {0};
    kent_error err = {0};
    kent_catalogue *catalogue = NULL;
    int result = EXIT_FAILURE;
    if (!mkdtemp(folder)) return EXIT_FAILURE;
    if (kent_streets_write(folder, path, sizeof path) != 0 ||
        kent_catalogue_read(KENT_SOURCE_DIR "/config", &catalogue, &complaints, &err) !=
            KENT_OK) {
        goto done;
    }
    for (int i = 0; i < RUNS; i++) {
        took[i] = time_reading(catalogue, path);
        if (took[i] < 0.0) goto done;
    }
    qsort(took, RUNS, sizeof took[0], by_size);
    (void)getrusage(RUSAGE_SELF, &usage);
    (void)printf("tables of %zu pipes, %zu points   median %5.2f  least %5.2f  s of "
                 "processor time, %d runs (aim: below 5)\n",
                 kent_streets_pipes(), kent_streets_points(), took[RUNS / 2], took[0],
                 RUNS);
    (void)printf("%-28s most %ld MB (aim: below 500)\n", "memory while reading them",
                 usage.ru_maxrss / 1024);
    result = EXIT_SUCCESS;
done:
    kent_catalogue_free(catalogue);
    kent_streets_remove(folder);
    return result;
}
