/* The answer of `plan`. */
#ifndef VICINAL_REPORT_TERMINAL_PLAN_H
#define VICINAL_REPORT_TERMINAL_PLAN_H

#include "sim/report/terminal.h"

/* The answer first, then the plan, what each choice costs, warnings, counts,
 * and in the last line what to run next; or the nearest miss and the way out. */
void terminal_plan(const struct page *page, const struct report_context *context, const struct report_planned *planned,
                   const struct warnings *warnings);

#endif
