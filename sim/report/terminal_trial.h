/* The answer of `trial`. */
#ifndef VICINAL_REPORT_TERMINAL_TRIAL_H
#define VICINAL_REPORT_TERMINAL_TRIAL_H

#include "sim/report/terminal.h"

/* The answer first, then the plan, all figures with their Monte Carlo errors,
 * what is measured on the way, expected times, warnings. */
void terminal_trial(const struct page *page, const struct report_context *context, const struct report_tried *tried,
                    const struct warnings *warnings);

/* Whether one plan resolves what is asked, as one sentence. */
void terminal_trial_verdict(const struct page *page, const struct terminal_subject *subject);

#endif
