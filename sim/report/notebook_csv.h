/* A notebook as a file: of one simulated study, or blank for the bench. */
#ifndef VICINAL_REPORT_NOTEBOOK_CSV_H
#define VICINAL_REPORT_NOTEBOOK_CSV_H

#include "sim/base/files.h"

/* One run at the bench. Fillings, levels, runs and days count from 1; level 0
 * and concentration NaN for water. What is 0 or NaN is left empty. */
struct notebook_row {
    size_t preparation; /* from 1 */
    size_t day;
    double started_s;     /* the day's clock when the run begins */
    const char *solution; /* "water", "blank", "intact", "cleaved", "intact-stock", "cleaved-stock" */
    size_t level;
    double concentration_kg_m3; /* nominal; NaN: left empty */
    size_t filling, run;
    double time_s;        /* as read */
    double temperature_K; /* as read; NaN: not read */
};

struct notebook_csv {
    const char *title, *plan; /* for the comment on top: the scenario's title, the plan in words */
    double timer_resolution_s, thermometer_resolution_K; /* 0: none */
    const struct notebook_row *rows;
    size_t count;
    bool preparations; /* there are several: a column of their own comes first */
    const char *const *remarks; /* comment lines, NULL behind the last; NULL: that the times are invented */
};

/* Comment lines, a heading with units, a line per run. Times and temperatures
 * have the decimals of their resolutions, nine where there is none. */
void notebook_csv_print(FILE *to, const struct notebook_csv *notebook);

/* The same into a file, whole or not at all. */
bool notebook_csv_write(const char *path, const struct notebook_csv *notebook, struct files_failure *failure);

#endif
