/* The files that every command writes into its folder. Each function: false
 * when one could not be written, and `failure` says why. */
#ifndef VICINAL_REPORT_REPORT_FILES_H
#define VICINAL_REPORT_REPORT_FILES_H

#include <jansson.h>

#include "sim/base/files.h"
#include "sim/report/figures.h"
#include "sim/report/report.h"

/* "out of memory"; always false. */
bool report_files_memory(struct files_failure *failure);

/* The exit status 1, after a message. */
int report_files_failed(const struct report_context *context, const struct files_failure *failure);

/* The scenario with all its lists (`index` SIZE_MAX), or cut to one plan. */
bool report_files_scenario(const struct report_context *context, const char *name, size_t index,
                           struct files_failure *failure);

/* `object` NULL: memory ran out when it was made. */
bool report_files_json(const struct report_context *context, const char *name, json_t *object,
                       struct files_failure *failure);
bool report_files_log(const struct report_context *context, struct files_failure *failure);

/* What came of the figures: without gnuplot their numbers are there, and a
 * figure that failed is no reason to throw the run away; one line says so. */
void report_files_drawn(const struct report_context *context, const struct figures_pen *pen);

/* The answer on `out`, flushed. */
bool report_files_flushed(const struct report_context *context, struct files_failure *failure);

#endif
