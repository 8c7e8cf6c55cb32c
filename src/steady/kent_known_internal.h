/* Which heads something fixes, with the laws that links obey now. */
#ifndef KENT_KNOWN_INTERNAL_H
#define KENT_KNOWN_INTERNAL_H

#include "kent_equations_internal.h"

/* Whether every node is joined to a known head by spans and by links that lose or gain
 * head, before anything is solved. KENT_E_INPUT says which device or valve leaves which
 * point without one; KENT_E_NOMEM. */
kent_status kent_known_check(const kent_equations *eq, kent_error *err);

/* The same after laws have changed, and sees to it. Where shut devices have cut a part
 * off, one that leads there is opened: if nothing flows it only passes on a head. Where
 * a valve that holds the head before it leaves none to what lies behind it, outflows
 * there draw what the pressure allows. opened: [links] how often that was done, 0 to
 * start with. */
kent_status kent_known_restore(kent_equations *eq, unsigned char *opened,
                               kent_error *err);

#endif
