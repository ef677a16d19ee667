/* A figure of gnuplot as part of a page. */
#ifndef VICINAL_REPORT_SVG_H
#define VICINAL_REPORT_SVG_H

#include <stdbool.h>
#include <stddef.h>
#include <stdio.h>

/* Write the <svg> element of a file: without what stands before it and its
 * title and description, with `name` before each id and each use of one, as one
 * image that is read out as `shows`. False: it is no such file, or holds what
 * gnuplot does not draw (a script, say); nothing was written then. */
struct svg {
    const char *bytes;
    size_t size;
    const char *name, *shows;
};
bool svg_inline(FILE *to, const struct svg *svg);

#endif
