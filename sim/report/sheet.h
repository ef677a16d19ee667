/* `vicinal sheet`: one plan as a bench sheet, with a notebook to fill in. */
#ifndef VICINAL_REPORT_SHEET_H
#define VICINAL_REPORT_SHEET_H

#include "sim/report/report.h"

/* Write sheet.html, notebook.csv (and notebook-second.csv when a second polymer
 * is measured alongside), scenario.resolved.yaml and run.log of candidate
 * `index`, then answer. Returns 0; 1 after a message when something could not
 * be written; 2 after a message, with nothing written, when a notebook that
 * stands there holds something; 3, with nothing written, when the plan is
 * impossible: the answer says why. */
int sheet_write(const struct report_context *context, size_t index);

#endif
