/* What a person reads of the margins of a plan's conditions. */
#ifndef VICINAL_REPORT_TERMINAL_MARGINS_H
#define VICINAL_REPORT_TERMINAL_MARGINS_H

#include "sim/judge/margin.h"
#include "sim/report/terminal.h"

/* The whole answer of margin: sentences, a line for each condition, warnings. */
void terminal_margins(const struct page *page, const struct report_context *context, size_t index,
                      const struct margins *margins, const struct warnings *warnings);

#endif
