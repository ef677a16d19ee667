/* When nothing resolves: what stands in the way, and what could be done. */
#ifndef VICINAL_REPORT_WAYS_OUT_H
#define VICINAL_REPORT_WAYS_OUT_H

#include "sim/judge/search.h"

/* Whether the bench or the constants are the limit of the nearest miss, as one
 * sentence. */
const char *ways_out_limit(const struct question *question, const struct search_result *search);

/* What could be done instead. */
enum { WAYS_OUT_MOST = 6, WAYS_OUT_SIZE = 160 };
struct ways_out {
    size_t count;
    char text[WAYS_OUT_MOST][WAYS_OUT_SIZE];
};
void ways_out_list(const struct question *question, const struct search_result *search, struct ways_out *out);

/* Why nothing was possible: the reasons that were found, each once, with the
 * number of plans that it strikes out. Gives back how many. */
enum { WAYS_OUT_REASONS = 5 };
struct ways_out_reason {
    size_t plans;
    enum status status;
    const char *why;
};
size_t ways_out_reasons(const struct search_result *search, struct ways_out_reason out[WAYS_OUT_REASONS]);

#endif
