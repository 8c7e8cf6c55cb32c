/* A town's grid of streets with a pipe in each, written as a case with tables: the
 * largest main a reader has to bear. Invented. */
#ifndef KENT_STREETS_H
#define KENT_STREETS_H

#include <stddef.h>

enum { KENT_STREETS_CROSSINGS = 225 }; /* along each side */

size_t kent_streets_points(void);
size_t kent_streets_pipes(void);

/* Writes case.cfg, points.csv and pipes.csv into a folder that is there; the path of
 * the case into path. Returns 0, or -1 where a file could not be written. */
int kent_streets_write(const char *folder, char *path, size_t size);
void kent_streets_remove(const char *folder); /* with the folder */

#endif
