/* The one parallel loop. */
#ifndef VICINAL_BASE_SPREAD_H
#define VICINAL_BASE_SPREAD_H

#include <stdbool.h>
#include <stddef.h>

/* An item writes plain bytes to its slot and nothing else leaves it; `scratch`
 * is its thread's own. */
typedef void spread_item(size_t index, const void *context, void *slot, void *scratch);

struct spread_size {
    size_t slot, scratch; /* bytes */
};

/* Do the items of a range; item i writes slots + (i - first) *
 * size.slot. False when memory for the scratch ran out; nothing is done then. */
struct spread_range {
    size_t first, count;
};
bool spread(struct spread_range range, spread_item *item, const void *context, void *slots, struct spread_size size);

/* How many threads it uses: all cores unless set; 1 without OpenMP. */
void spread_set_threads(int threads);
int spread_threads(void);

#endif
