/* Figures by the program gnuplot, a child process without a shell. */
#ifndef VICINAL_REPORT_GNUPLOT_H
#define VICINAL_REPORT_GNUPLOT_H

#include <stdio.h>

#include "sim/base/files.h"

enum gnuplot_result { GNUPLOT_DRAWN, GNUPLOT_MISSING, GNUPLOT_FAILED };

/* A figure: plots/NAME.gp reads FOLDER/NAME.csv and gives FOLDER/NAME.svg and
 * FOLDER/NAME.pdf. `variables`: lines of gnuplot, by gnuplot_text and
 * gnuplot_number, that stand before the script. */
struct gnuplot_figure {
    const char *folder, *name, *script; /* script: "cost.gp" */
    const char *variables;
};

/* Draw both formats. Drawn; missing: there is no gnuplot; failed: `failure`
 * says why, and no file was changed. */
enum gnuplot_result gnuplot_draw(const struct gnuplot_figure *figure, struct files_failure *failure);

/* One variable; a text is quoted so that nothing in it is ever a command. A
 * number that is not finite becomes NaN. */
void gnuplot_text(FILE *to, const char *name, const char *text);
void gnuplot_number(FILE *to, const char *name, double value);

#endif
