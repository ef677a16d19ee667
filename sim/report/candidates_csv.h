/* candidates.csv: every candidate, one a line. */
#ifndef VICINAL_REPORT_CANDIDATES_CSV_H
#define VICINAL_REPORT_CANDIDATES_CSV_H

#include "sim/judge/search.h"

/* index, one column for each key of the plan, status, why, then figures and
 * their standard errors (column name with " se"), units in the headings:
 * fractions and shares are plain numbers. Empty: not asked or not played. */
void candidates_csv_print(FILE *to, const struct scenario *scenario, const struct search_result *search);

/* One field, quoted when it holds a comma, a quote or a line end. */
void candidates_csv_field(FILE *to, const char *text);

#endif
