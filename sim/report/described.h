/* A plan in words, line by line: grade, glass, solutions, replicates,
 * reduction, time and money. */
#ifndef VICINAL_REPORT_DESCRIBED_H
#define VICINAL_REPORT_DESCRIBED_H

#include "sim/report/terminal.h"

/* Calls `tell` for each line; an empty label goes on with the line before. */
void described_plan(const struct terminal_subject *subject,
                    void (*tell)(void *context, const char *label, const char *text), void *context);

#endif
