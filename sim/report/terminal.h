/* What a person reads on the terminal, in the trade's words. */
#ifndef VICINAL_REPORT_TERMINAL_H
#define VICINAL_REPORT_TERMINAL_H

#include "sim/report/page.h"
#include "sim/report/report.h"
#include "sim/report/warnings.h"

/* One plan and what is said of it. */
struct terminal_subject {
    const struct scenario *scenario;
    const struct plan *plan;
    const struct outcome *outcome;
    size_t index;
};

/* What is asked, as the end of a sentence: "tells 1.5 % head-to-head apart
 * from 1.3 % ..., and comes within 0.15 points of the truth ...". For free(). */
char *terminal_question(const struct question *question);

/* Power and share against what was asked, the value to decide at, and the
 * smallest difference and half-width that the plan reaches. */
void terminal_figures(const struct page *page, const struct terminal_subject *subject);

/* Grade, glass, solutions, replicates, reduction, time and money. */
void terminal_bench(const struct page *page, const struct terminal_subject *subject);

void terminal_warnings(const struct page *page, const struct warnings *warnings);

/* How the answer about one plan ends: the warnings, and where the numbers lie
 * (`file` in the folder) with the figures, if any study was played. */
void terminal_end(const struct page *page, const struct report_context *context, const char *file,
                  const struct outcome *outcome, const struct warnings *warnings);

/* The whole answer of check. */
void terminal_check(const struct page *page, const struct report_context *context, double seconds,
                    const struct warnings *warnings);

/* Whether money means anything: wages or prices were given. */
bool terminal_paid(const struct outcome *outcome);

#endif
