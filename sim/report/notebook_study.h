/* The synthetic notebook of one simulated study, from the judge's rows. */
#ifndef VICINAL_REPORT_NOTEBOOK_STUDY_H
#define VICINAL_REPORT_NOTEBOOK_STUDY_H

#include "sim/base/files.h"
#include "sim/judge/show.h"
#include "sim/scenario/scenario.h"

/* Write `book`, made of the scenario's plan `index`, to `path`, whole or not
 * at all. */
bool notebook_study_write(const char *path, const struct scenario *scenario, size_t index,
                          const struct show_notebook *book, struct files_failure *failure);

#endif
