/* What a person reads of a plan's error budget. */
#ifndef VICINAL_REPORT_TERMINAL_BUDGET_H
#define VICINAL_REPORT_TERMINAL_BUDGET_H

#include "sim/judge/budget.h"
#include "sim/judge/margin.h"
#include "sim/report/terminal.h"

/* The whole answer of budget: sentences, shares, shifts, warnings. */
void terminal_budget(const struct page *page, const struct report_context *context, size_t index,
                     const struct budget *budget, const struct warnings *warnings);

/* For plan: the sentences of both under the heading "Why"; either may be
 * NULL. */
void terminal_budget_why(const struct page *page, const struct budget *budget, const struct margins *margins,
                         const char *currency);

#endif
