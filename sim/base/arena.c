#include "sim/base/arena.h"

#include <stdalign.h>
#include <stdint.h>
#include <stdlib.h>
#include <string.h>

enum { ARENA_BLOCK = 16384 };

struct arena_block {
    struct arena_block *next;
    size_t used, size;
    alignas(max_align_t) unsigned char bytes[];
};

struct arena {
    struct arena_block *blocks;
};

struct arena *arena_new(void)
{
    return calloc(1, sizeof(struct arena));
}

void arena_free(struct arena *a)
{
    if (!a)
        return;
    for (struct arena_block *b = a->blocks, *next; b; b = next) {
        next = b->next;
        free(b);
    }
    free(a);
}

static struct arena_block *arena_block_with(struct arena *a, size_t size)
{
    struct arena_block *b = a->blocks;
    if (b && b->size - b->used >= size)
        return b;
    const size_t room = size > ARENA_BLOCK ? size : ARENA_BLOCK;
    if (room > SIZE_MAX - sizeof *b)
        return NULL;
    b = calloc(1, sizeof *b + room);
    if (!b)
        return NULL;
    b->size = room;
    b->next = a->blocks;
    a->blocks = b;
    return b;
}

void *arena_take(struct arena *a, size_t count, size_t size)
{
    if (size && count > (SIZE_MAX - alignof(max_align_t)) / size)
        return NULL;
    const size_t step = alignof(max_align_t), need = (count * size + step - 1) / step * step;
    struct arena_block *b = arena_block_with(a, need ? need : step);
    if (!b)
        return NULL;
    void *piece = b->bytes + b->used;
    b->used += need ? need : step;
    return piece;
}

char *arena_copy(struct arena *a, const char *bytes, size_t size)
{
    char *copy = arena_take(a, size + 1, 1);
    if (copy && size)
        memcpy(copy, bytes, size);
    return copy;
}
