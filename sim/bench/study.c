#include "sim/bench/study.h"

#include <string.h>

size_t study_slot_size(const struct study_job *job)
{
    return job->fractions * (sizeof(struct study_bench) + job->analyses * sizeof(struct reduction_result));
}

const struct study_bench *study_bench_of(const struct study_job *job, const void *slot, size_t fraction)
{
    (void)job;
    return (const struct study_bench *)slot + fraction;
}

const struct reduction_result *study_result_of(const struct study_job *job, const void *slot, size_t fraction, size_t analysis)
{
    const struct study_bench *const benches = slot;
    const struct reduction_result *const results = (const void *)(benches + job->fractions);
    return results + fraction * job->analyses + analysis;
}

/* Everything a block needs, at the start of its scratch; notebooks and times
 * follow. */
struct block {
    struct truth_draws draws;
    struct draws_filling filling;
    struct bench bench[STUDY_MAX_FRACTIONS];
};

static size_t up(size_t bytes)
{
    return (bytes + 63) / 64 * 64;
}

size_t study_scratch_size(const struct study_job *job)
{
    const struct notebook_layout *const layout = &job->design->layout;
    return up(sizeof(struct block)) + job->fractions * up(notebook_size(layout)) + up(reduction_size(layout));
}

static struct streams_place place_of(const struct notebook_filling *f)
{
    const unsigned number = (unsigned)f->number;
    if (f->water) return (struct streams_place){.solution = STREAMS_WATER, .level = (unsigned)f->day, .filling = number};
    return (struct streams_place){.solution = f->series == INTACT ? STREAMS_INTACT : STREAMS_CLEAVED, .level = (unsigned)f->level, .filling = number};
}

static void start(const struct study_job *job, const struct draws_key *key, struct block *b, unsigned char *memory)
{
    truth_draw(job->design, key, &b->draws);
    for (size_t i = 0; i < job->fractions; i++) {
        struct bench *const bench = &b->bench[i];
        memset(bench, 0, sizeof *bench);
        bench->design = job->design;
        bench->book = notebook_place(&job->design->layout, memory + i * up(notebook_size(&job->design->layout)));
        truth_of(job->design, &b->draws, job->fraction[i], &bench->truth);
    }
}

static void work(const struct study_job *job, const struct draws_key *key, struct block *b)
{
    const struct design *const d = job->design;
    for (size_t f = 0; f < d->layout.fillings; f++) {
        const struct notebook_filling *const filling = &d->filling[f];
        if (f == 0 || filling->day != filling[-1].day) {
            double day[DRAWS_DAY][LANES];
            draws_normals(key, STREAMS_DAY, (struct streams_place){.level = (unsigned)filling->day}, DRAWS_DAY, day);
            for (size_t i = 0; i < job->fractions; i++) bench_open_day(&b->bench[i], day);
        }
        draws_open_filling(&b->filling, key, place_of(filling), filling->runs);
        for (size_t i = 0; i < job->fractions; i++) bench_fill(&b->bench[i], f, &b->filling);
    }
}

void study_play(size_t block, const void *context, void *slot, void *scratch)
{
    const struct study_job *const job = context;
    const struct notebook_layout *const layout = &job->design->layout;
    struct block *const b = scratch;
    unsigned char *const books = (unsigned char *)scratch + up(sizeof *b);
    struct reduction_times times = reduction_place(layout, books + job->fractions * up(notebook_size(layout)));
    const struct draws_key key = draws_key(job->seed, (uint64_t)block * LANES);
    start(job, &key, b, books);
    work(job, &key, b);
    struct study_bench *const benches = slot;
    struct reduction_result *result = (void *)(benches + job->fractions);
    for (size_t i = 0; i < job->fractions; i++) {
        const struct bench *const bench = &b->bench[i];
        FOR_LANES(l) benches[i].clock_s[l] = bench->done_s[l] + bench->clock_s[l];
        memcpy(benches[i].spare_runs, bench->spare_runs, sizeof bench->spare_runs);
        reduction_combine(&job->design->assumed, &bench->book, &times);
        for (size_t a = 0; a < job->analyses; a++) reduction_run(&job->design->assumed, &job->analysis[a], &bench->book, &times, result++);
    }
}

void study_show(size_t block, const struct study_job *job, void *scratch, struct notebook *book, double (*started_s)[LANES])
{
    struct block *const b = scratch;
    const struct draws_key key = draws_key(job->seed, (uint64_t)block * LANES);
    start(job, &key, b, (unsigned char *)scratch + up(sizeof *b));
    b->bench[0].started_s = started_s;
    work(job, &key, b);
    *book = b->bench[0].book;
}
