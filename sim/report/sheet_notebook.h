/* The blank notebook of a bench sheet. */
#ifndef VICINAL_REPORT_SHEET_NOTEBOOK_H
#define VICINAL_REPORT_SHEET_NOTEBOOK_H

#include "sim/base/files.h"
#include "sim/report/sheet_work.h"

/* What stands at a path: nothing, or a notebook in which nobody wrote
 * anything; one that holds a time, a temperature, a concentration or a note,
 * or a file that is no such notebook; or what cannot be read (`failure` says
 * why). */
enum sheet_notebook_found { SHEET_NOTEBOOK_FREE, SHEET_NOTEBOOK_TAKEN, SHEET_NOTEBOOK_UNREADABLE };
enum sheet_notebook_found sheet_notebook_look(const char *path, struct files_failure *failure);

/* A row for each stock, then one for each planned run of one polymer in the
 * order of the bench, preparation by preparation; times, temperatures and
 * concentrations empty. Whole or not at all. */
bool sheet_notebook_write(const struct sheet_work *work, const char *path, struct files_failure *failure);

#endif
