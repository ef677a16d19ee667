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

/* Everything a block needs, at the start of its scratch; notebooks, times and
 * the second polymer's results follow. */
struct block {
    struct truth_draws draws;
    struct draws_filling filling;
    struct bench bench[STUDY_MAX_FRACTIONS];
};

static size_t up(size_t bytes)
{
    return (bytes + 63) / 64 * 64;
}

static size_t other_size(const struct study_job *job)
{
    return job->measured ? up(job->analyses * sizeof(struct reduction_result)) : 0;
}

size_t study_scratch_size(const struct study_job *job)
{
    const struct notebook_layout *const layout = &job->design->layout;
    return up(sizeof(struct block)) + job->fractions * up(notebook_size(layout)) + up(reduction_size(layout)) + other_size(job);
}

/* A block as its parts lie in the scratch. */
struct parts {
    struct block *block;
    unsigned char *books;
    struct reduction_times times;
    struct reduction_result *other; /* of the second polymer */
};

static struct parts parts_of(const struct study_job *job, void *scratch)
{
    const struct notebook_layout *const layout = &job->design->layout;
    unsigned char *const books = (unsigned char *)scratch + up(sizeof(struct block));
    unsigned char *const times = books + job->fractions * up(notebook_size(layout));
    return (struct parts){scratch, books, reduction_place(layout, times), (void *)(times + up(reduction_size(layout)))};
}

/* One polymer's preparation being played: at how many of the fractions, the
 * first of which is number `first`. */
struct playing {
    const struct study_job *job;
    struct draws_key key;
    struct truth_where where;
    size_t first, fractions;
};

static struct streams_place place_of(const struct playing *now, const struct notebook_filling *f)
{
    struct streams_place place = {.polymer = now->where.polymer, .preparation = now->where.preparation, .filling = (unsigned)f->number};
    if (f->water || f->blank) {
        place.solution = f->water ? STREAMS_WATER : STREAMS_BLANK;
        place.level = (unsigned)f->day;
    } else {
        place.solution = f->series == INTACT ? STREAMS_INTACT : STREAMS_CLEAVED;
        place.level = (unsigned)f->level;
    }
    return place;
}

static void start(const struct playing *now, struct parts *parts)
{
    const struct design *const d = now->job->design;
    truth_draw(d, &now->key, now->where, &parts->block->draws);
    for (size_t i = 0; i < now->fractions; i++) {
        struct bench *const bench = &parts->block->bench[i];
        memset(bench, 0, sizeof *bench);
        bench->design = d;
        bench->book = notebook_place(&d->layout, parts->books + i * up(notebook_size(&d->layout)));
        truth_of(d, &parts->block->draws, now->job->fraction[now->first + i], &bench->truth);
    }
}

static void open_day(const struct playing *now, struct block *b, size_t day)
{
    const struct streams_place place = {.polymer = now->where.polymer, .preparation = now->where.preparation, .level = (unsigned)day};
    double draws[DRAWS_DAY][LANES];
    draws_normals(&now->key, STREAMS_DAY, place, DRAWS_DAY, draws);
    for (size_t i = 0; i < now->fractions; i++) bench_open_day(&b->bench[i], draws);
}

static void work(const struct playing *now, struct block *b)
{
    const struct design *const d = now->job->design;
    const bool in_tube = d->plan->dilution == DILUTION_IN_TUBE;
    for (size_t f = 0; f < d->layout.fillings; f++) {
        const struct notebook_filling *const filling = &d->filling[f];
        const struct streams_place place = place_of(now, filling);
        double delivery[DRAWS_LEVEL][LANES] = {{0}};
        if (f == 0 || filling->day != filling[-1].day) open_day(now, b, filling->day);
        draws_open_filling(&b->filling, &now->key, place, filling->runs);
        if (in_tube && !filling->water && !filling->blank) draws_normals(&now->key, STREAMS_LEVEL, place, DRAWS_LEVEL, delivery);
        for (size_t i = 0; i < now->fractions; i++) bench_fill(&b->bench[i], f, &b->filling, delivery[DRAWS_DELIVERY]);
    }
}

/* Add one preparation's result to the sums so far. */
static void add_result(struct reduction_result *sum, const struct reduction_result *one, double weight)
{
    FOR_LANES(l)
    {
        sum->delta[l] += weight * one->delta[l];
        for (size_t s = 0; s < SERIES; s++) {
            sum->intrinsic_m3_kg[s][l] += weight * one->intrinsic_m3_kg[s][l];
            sum->molar_mass_kg_mol[s][l] += weight * one->molar_mass_kg_mol[s][l];
        }
    }
}

/* Play all preparations of one polymer; benches[i] gets what is added by
 * fraction i of it, results[i * analyses + a] the means. */
static void play_polymer(struct playing *now, struct parts *parts, struct study_bench *benches, struct reduction_result *results)
{
    const struct study_job *const job = now->job;
    const struct assumed *const assumed = &job->design->assumed;
    const size_t preparations = job->design->plan->preparations;
    memset(results, 0, now->fractions * job->analyses * sizeof *results);
    for (now->where.preparation = 0; now->where.preparation < preparations; now->where.preparation++) {
        start(now, parts);
        work(now, parts->block);
        for (size_t i = 0; i < now->fractions; i++) {
            const struct bench *const bench = &parts->block->bench[i];
            FOR_LANES(l) benches[i].clock_s[l] += bench->done_s[l] + bench->clock_s[l];
            FOR_LANES(l) benches[i].spare_runs[l] += bench->spare_runs[l];
            reduction_combine(assumed, &bench->book, &parts->times);
            for (size_t a = 0; a < job->analyses; a++) {
                struct reduction_result one;
                reduction_run(assumed, &job->analysis[a], &bench->book, &parts->times, &one);
                add_result(&results[i * job->analyses + a], &one, 1.0 / (double)preparations);
            }
        }
    }
}

/* The second polymer, measured alongside: its work comes on top, its estimate
 * is taken away. */
static void play_second(struct playing *now, struct parts *parts, struct study_bench *benches, struct reduction_result *results)
{
    const struct study_job *const job = now->job;
    struct study_bench second;
    memset(&second, 0, sizeof second);
    now->where.polymer = 1;
    now->first = now->fractions = 1;
    play_polymer(now, parts, &second, parts->other);
    for (size_t i = 0; i < job->fractions; i++) {
        FOR_LANES(l) benches[i].clock_s[l] += second.clock_s[l];
        FOR_LANES(l) benches[i].spare_runs[l] += second.spare_runs[l];
        for (size_t a = 0; a < job->analyses; a++) FOR_LANES(l) results[i * job->analyses + a].delta[l] -= parts->other[a].delta[l];
    }
}

void study_play(size_t block, const void *context, void *slot, void *scratch)
{
    const struct study_job *const job = context;
    struct parts parts = parts_of(job, scratch);
    struct playing now = {.job = job, .key = draws_key(job->seed, (uint64_t)block * LANES, job->exchange), .fractions = job->fractions};
    struct study_bench *const benches = slot;
    struct reduction_result *const results = (void *)(benches + job->fractions);
    memset(benches, 0, job->fractions * sizeof *benches);
    play_polymer(&now, &parts, benches, results);
    if (job->measured) play_second(&now, &parts, benches, results);
}

void study_show(size_t block, const struct study_job *job, unsigned preparation, void *scratch, struct study_shown *out)
{
    struct parts parts = parts_of(job, scratch);
    const struct playing now = {.job = job, .key = draws_key(job->seed, (uint64_t)block * LANES, job->exchange), .where = {0, preparation}, .fractions = 1};
    start(&now, &parts);
    parts.block->bench[0].trace = &out->trace;
    work(&now, parts.block);
    out->book = parts.block->bench[0].book;
}
