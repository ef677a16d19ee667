/* A figure: a CSV, and SVG and PDF that draw it. */
#ifndef VICINAL_REPORT_FIGURES_H
#define VICINAL_REPORT_FIGURES_H

#include "sim/base/files.h"
#include "sim/report/gnuplot.h"

/* Draws one after the other; after the first that finds no gnuplot only the
 * CSV files are written. */
enum { FIGURES_MOST = 12 };
struct figures_pen {
    const char *folder;
    const char *name[FIGURES_MOST]; /* of those that were drawn */
    size_t count;
    enum gnuplot_result drawn;    /* GNUPLOT_DRAWN to begin with; the worst so far */
    struct files_failure failure; /* of a CSV that could not be written, or of gnuplot */
};

/* Open both texts of a figure; false without memory (neither is open then). */
bool figures_open(struct files_text *csv, struct files_text *variables);

/* One figure: the CSV's text and the variables' text, both still open, are
 * closed and freed. False: a file could not be written. */
bool figures_draw(struct figures_pen *pen, const char *name, const char *script, struct files_text *csv,
                  struct files_text *variables);

/* Whether the figure of this name was drawn. */
bool figures_drawn(const struct figures_pen *pen, const char *name);

#endif
