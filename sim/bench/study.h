/* Whole studies, LANES at a time: draw, work the bench, reduce. */
#ifndef VICINAL_BENCH_STUDY_H
#define VICINAL_BENCH_STUDY_H

#include "sim/bench/bench.h"
#include "sim/reduce/reduction.h"

enum { STUDY_MAX_FRACTIONS = 2 };

/* What to play: one design at one or two fractions on the same draws, its
 * notebooks reduced in each of the given ways. `measured`: a second polymer,
 * which holds the second fraction, is measured alongside, and every estimate
 * is the difference of the first's and the second's. */
struct study_job {
    const struct design *design;
    uint64_t seed;
    struct draws_exchange exchange; /* groups drawn from another seed; mostly none */
    bool measured; /* takes two fractions */
    size_t fractions;
    double fraction[STUDY_MAX_FRACTIONS];
    size_t analyses;
    const struct analysis *analysis;
};

/* The bench work of LANES studies at one fraction: totals over preparations
 * and polymers. */
struct study_bench {
    double clock_s[LANES], spare_runs[LANES];
};

/* A block's slot: for each fraction a study_bench, then for each fraction and
 * analysis a reduction_result: the mean over preparations, [eta] and M those of
 * the first polymer. */
size_t study_slot_size(const struct study_job *job);
const struct study_bench *study_bench_of(const struct study_job *job, const void *slot, size_t fraction);
const struct reduction_result *study_result_of(const struct study_job *job, const void *slot, size_t fraction, size_t analysis);

/* Memory that playing one block needs. */
size_t study_scratch_size(const struct study_job *job);

/* Play block number `block` (studies block * LANES ...): a spread_item whose
 * context is a const struct study_job. */
void study_play(size_t block, const void *job, void *slot, void *scratch);

/* Play one block's first polymer at fraction number 0, one of its preparations,
 * and keep what the notebook of each lane says, and the trace into its arrays.
 * For the synthetic notebook and figures. */
struct study_shown {
    struct notebook book;
    struct bench_trace trace;
};
void study_show(size_t block, const struct study_job *job, unsigned preparation, void *scratch, struct study_shown *out);

#endif
