/* run.log: how and where a run was made. It is no result and differs from run
 * to run. */
#ifndef VICINAL_REPORT_RUN_LOG_H
#define VICINAL_REPORT_RUN_LOG_H

#include "sim/report/report.h"

/* Version, command line, system, processors, memory, threads, when it ended
 * and how long it took. */
void run_log_print(FILE *to, const struct report_context *context);

/* An argument as a shell would take it back. */
void run_log_argument(FILE *to, const char *text);

#endif
