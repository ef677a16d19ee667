/* Memory that is taken piece by piece and given back all at once. */
#ifndef VICINAL_BASE_ARENA_H
#define VICINAL_BASE_ARENA_H

#include <stddef.h>

struct arena;

struct arena *arena_new(void);    /* NULL: out of memory */
void arena_free(struct arena *a); /* with everything taken from it */

/* `count` pieces of `size` bytes, all zero, aligned for anything. NULL: out
 * of memory. */
void *arena_take(struct arena *a, size_t count, size_t size);
/* A copy of `size` bytes with a zero behind. NULL: out of memory. */
char *arena_copy(struct arena *a, const char *bytes, size_t size);

#endif
