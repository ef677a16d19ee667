/* The bench sheet as one page: self-contained HTML without scripts, for a
 * phone and for paper, in the order of the work. */
#ifndef VICINAL_REPORT_SHEET_PAGE_H
#define VICINAL_REPORT_SHEET_PAGE_H

#include "sim/report/report.h"
#include "sim/report/sheet_work.h"
#include "sim/report/warnings.h"

void sheet_page_print(FILE *to, const struct report_context *context, const struct sheet_work *work,
                      const struct warnings *warnings);

#endif
