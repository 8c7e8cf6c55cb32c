/* The commands: each reads, works and prints. */
#ifndef KENT_COMMANDS_H
#define KENT_COMMANDS_H

#include "kent_options.h"

kent_exit kent_commands_do(const kent_options *o);

#endif
