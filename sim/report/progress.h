/* How far long work is, on a terminal. */
#ifndef VICINAL_REPORT_PROGRESS_H
#define VICINAL_REPORT_PROGRESS_H

#include <stdbool.h>
#include <stdio.h>

struct progress {
    FILE *to;
    bool shown; /* on a terminal and not asked to be quiet */
    bool drawn; /* a line stands there */
    double started_s, last_s;
};

/* Begin; nothing is ever written when `to` is no terminal or `quiet`. */
void progress_start(struct progress *progress, FILE *to, bool quiet);

/* The share that is done, 0 to 1; from one thread. Writes at most five times
 * a second. */
void progress_update(struct progress *progress, double done);

/* Clear the line. */
void progress_end(struct progress *progress);

/* The line's text for a share done after so many seconds: "42 %, about 1 min
 * 20 s left"; no time before 1 % or one second. */
void progress_text(char *text, size_t size, double done, double elapsed_s);

#endif
