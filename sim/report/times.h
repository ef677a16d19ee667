/* `--times`: synthetic notebooks as files. */
#ifndef VICINAL_REPORT_TIMES_H
#define VICINAL_REPORT_TIMES_H

#include "sim/report/report.h"

/* Write the notebooks of the first `count` studies of candidate `index` to
 * `path`; more than one are numbered before the ending (times.csv becomes
 * times-1.csv, times-2.csv ...). 0, or 1 after a message. */
int times_write(const struct report_context *context, size_t index, const char *path, size_t count);

#endif
