/* The gnuplot scripts of plots/, linked into the program. */
#ifndef VICINAL_REPORT_PLOTS_H
#define VICINAL_REPORT_PLOTS_H

#include <stddef.h>

struct plots_file {
    const char *name; /* "style.gp" */
    const unsigned char *bytes;
    size_t size;
};

extern const struct plots_file vicinal_plots[];
extern const size_t vicinal_plots_count;

#endif
