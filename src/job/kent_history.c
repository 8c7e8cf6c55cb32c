#include "kent_history.h"

#include <stdlib.h>
#include <string.h>

/* A row of doubles: time, heads, flows, devices' rows. */
struct kent_history_keeper {
    size_t places, devices, width, stride;
    size_t seen;  /* instants so far */
    double *even; /* [capacity][width] */
    size_t even_count, capacity;
    double *extreme; /* [2 places][width]: highest then lowest of each place */
    double *row;     /* [width] the instant at hand */
};

enum { DEVICE_DOUBLES = sizeof(kent_device_row) / sizeof(double) };
_Static_assert(DEVICE_DOUBLES * sizeof(double) == sizeof(kent_device_row),
               "a device's row is doubles only");

kent_status kent_history_keeper_new(size_t steps, size_t rows, size_t places,
                                    size_t devices, kent_history_keeper **out,
                                    kent_error *err)
{
    kent_history_keeper *k = kent_alloc(1, sizeof *k);
    if (!k) return kent_error_nomem(err);
    if (rows < 2) rows = 2;
    k->places = places;
    k->devices = devices;
    k->width = 1 + 2 * places + DEVICE_DOUBLES * devices;
    k->stride = steps <= rows ? 1 : (steps + rows - 1) / rows;
    k->capacity = steps / k->stride + 2;
    k->even = kent_alloc(k->capacity, k->width * sizeof *k->even);
    k->extreme = kent_alloc(2 * places + 1, k->width * sizeof *k->extreme);
    k->row = kent_alloc(k->width, sizeof *k->row);
    if (!k->even || !k->extreme || !k->row) {
        kent_history_keeper_free(k);
        return kent_error_nomem(err);
    }
    *out = k;
    return KENT_OK;
}

void kent_history_keep(kent_history_keeper *k, double time, const double *head,
                       const double *flow, const kent_device_row *devices)
{
    const size_t places = k->places, bytes = k->width * sizeof *k->row;
    if (places + k->devices == 0) return;
    k->row[0] = time;
    memcpy(k->row + 1, head, places * sizeof *head);
    memcpy(k->row + 1 + places, flow, places * sizeof *flow);
    if (k->devices > 0) {
        memcpy(k->row + 1 + 2 * places, devices, k->devices * sizeof *devices);
    }
    if (k->seen % k->stride == 0 && k->even_count < k->capacity) {
        memcpy(k->even + k->even_count++ * k->width, k->row, bytes);
    }
    for (size_t i = 0; i < places; i++) {
        double *highest = k->extreme + 2 * i * k->width;
        double *lowest = highest + k->width;
        if (k->seen == 0 || head[i] > highest[1 + i]) memcpy(highest, k->row, bytes);
        if (k->seen == 0 || head[i] < lowest[1 + i]) memcpy(lowest, k->row, bytes);
    }
    k->seen++;
}

static int by_time(const void *a, const void *b)
{
    const double *x = *(const double *const *)a, *y = *(const double *const *)b;
    return (x[0] > y[0]) - (x[0] < y[0]);
}

kent_status kent_history_finish(const kent_history_keeper *k, kent_history *out,
                                kent_error *err)
{
    kent_status status = KENT_E_NOMEM;
    const size_t places = k->places;
    const size_t extremes = k->seen ? 2 * places : 0, most = k->even_count + extremes;
    const double **rows = kent_alloc(most, sizeof *rows);
    kent_history h = {.watch_count = places, .device_count = k->devices};
    h.time = kent_alloc(most, sizeof *h.time);
    h.head = kent_alloc(most, (places + 1) * sizeof *h.head);
    h.flow = kent_alloc(most, (places + 1) * sizeof *h.flow);
    h.devices = kent_alloc(most, (k->devices + 1) * sizeof *h.devices);
    if (!rows || !h.time || !h.head || !h.flow || !h.devices) goto done;

    for (size_t i = 0; i < k->even_count; i++) {
        rows[i] = k->even + i * k->width;
    }
    for (size_t i = 0; i < extremes; i++) {
        rows[k->even_count + i] = k->extreme + i * k->width;
    }
    if (most) qsort(rows, most, sizeof *rows, by_time);
    for (size_t i = 0; i < most; i++) {
        if (h.rows && !(rows[i][0] > h.time[h.rows - 1])) continue; /* kept already */
        h.time[h.rows] = rows[i][0];
        memcpy(h.head + h.rows * places, rows[i] + 1, places * sizeof *h.head);
        memcpy(h.flow + h.rows * places, rows[i] + 1 + places, places * sizeof *h.flow);
        memcpy(h.devices + h.rows * k->devices, rows[i] + 1 + 2 * places,
               k->devices * sizeof *h.devices);
        h.rows++;
    }
    *out = h;
    h = (kent_history){0};
    status = KENT_OK;
done:
    if (status) (void)kent_error_nomem(err);
    kent_history_clear(&h);
    free(rows);
    return status;
}

void kent_history_keeper_free(kent_history_keeper *k)
{
    if (!k) return;
    free(k->even);
    free(k->extreme);
    free(k->row);
    free(k);
}

void kent_history_clear(kent_history *h)
{
    free(h->time);
    free(h->head);
    free(h->flow);
    free(h->devices);
    *h = (kent_history){0};
}
