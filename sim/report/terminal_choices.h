/* What each option of the plan costs, under the decision it belongs to. */
#ifndef VICINAL_REPORT_TERMINAL_CHOICES_H
#define VICINAL_REPORT_TERMINAL_CHOICES_H

#include "sim/judge/search.h"
#include "sim/report/page.h"

/* For every key with more than one option: the cheapest plan that resolves
 * with each, and how much more it takes than the recommended one. Nothing when
 * nothing resolves. */
void terminal_choices(const struct page *page, const struct scenario *scenario, const struct search_result *search);

#endif
