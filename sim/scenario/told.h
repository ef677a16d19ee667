/* Every value that one plan rests on, with what it means and where it comes
 * from; for a reader, not for computing. */
#ifndef VICINAL_SCENARIO_TOLD_H
#define VICINAL_SCENARIO_TOLD_H

#include "sim/scenario/scenario.h"

struct told {
    const char
        *section; /* "polymer", "cleavage", "solutions", "bench", "grade", "tube", "bath", "thermometer", "timer" */
    const char *entry; /* name of the entry of the kit, else "" */
    const char *key, *text, *help;
    const char *source; /* NULL: given in the scenario or on the command line */
};

/* Calls `tell` for each, section by section. What has no value is left out. */
void told_plan(const struct scenario *s, size_t index, void (*tell)(void *context, const struct told *value),
               void *context);

#endif
