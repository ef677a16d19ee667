#include "sim/base/spread.h"

#include <stdlib.h>
#ifdef _OPENMP
#include <omp.h>
#endif

void spread_set_threads(int threads)
{
#ifdef _OPENMP
    omp_set_num_threads(threads);
#else
    (void)threads;
#endif
}

int spread_threads(void)
{
#ifdef _OPENMP
    return omp_get_max_threads();
#else
    return 1;
#endif
}

static size_t thread_number(void)
{
#ifdef _OPENMP
    return (size_t)omp_get_thread_num();
#else
    return 0;
#endif
}

bool spread(struct spread_range range, spread_item *item, const void *context, void *slots, struct spread_size size)
{
    /* whole pages apart, so that no two threads write one cache line */
    const size_t stride = (size.scratch + 4095) / 4096 * 4096 + 4096;
    const size_t threads = (size_t)spread_threads();
    unsigned char *const scratch = aligned_alloc(4096, stride * threads);
    if (!scratch) return false;
    unsigned char *const out = slots;
    const long count = (long)range.count;
#ifdef _OPENMP
#pragma omp parallel for schedule(dynamic)
#endif
    for (long i = 0; i < count; i++)
        item(range.first + (size_t)i, context, out + (size_t)i * size.slot, scratch + thread_number() * stride);
    free(scratch);
    return true;
}
