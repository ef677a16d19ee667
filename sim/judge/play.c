#include "sim/judge/play.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/spread.h"

/* Slots of that many bytes at most are held at once. */
enum { PLAY_SLOT_BYTES = 8 << 20 };

void play_start(struct play *p, const struct design *design, uint64_t seed)
{
    memset(p, 0, sizeof *p);
    p->design = design;
    p->seed = seed;
}

static void add(struct play_sum *s, double x)
{
    if (!isfinite(x)) return;
    s->n++;
    const double d = x - s->mean;
    s->mean += d / (double)s->n;
    s->m2 += d * (x - s->mean);
}

double play_sd(const struct play_sum *s)
{
    return s->n > 1 ? sqrt(s->m2 / (double)(s->n - 1)) : 0.0;
}

double play_se(const struct play_sum *s)
{
    return s->n > 0 ? play_sd(s) / sqrt((double)s->n) : 0.0;
}

static bool make_room(struct play *p, size_t n)
{
    for (size_t a = 0; a < p->analyses; a++)
        for (size_t f = 0; p->active[a] && f < p->fractions; f++) {
            double *const more = realloc(p->sample[a].delta[f], n * sizeof *more);
            if (!more) return false;
            p->sample[a].delta[f] = more;
        }
    return true;
}

/* What is being played: the job, and which of the play's analyses it reduces. */
struct playing {
    struct study_job job;
    struct analysis analysis[PLAY_MAX_ANALYSES];
    size_t which[PLAY_MAX_ANALYSES];
};

/* The studies of one block, number `at` on and below n, from its slot into the
 * samples. */
static void collect(struct play *p, const struct playing *now, const void *slot, size_t at, size_t n)
{
    const struct study_job *const job = &now->job;
    const struct study_bench *const bench = study_bench_of(job, slot, 0);
    for (size_t l = 0; l < LANES && at + l < n; l++) {
        add(&p->clock_s, bench->clock_s[l]);
        add(&p->spare_runs, bench->spare_runs[l]);
        for (size_t a = 0; a < job->analyses; a++) {
            struct play_sample *const s = &p->sample[now->which[a]];
            for (size_t f = 0; f < job->fractions; f++) s->delta[f][at + l] = study_result_of(job, slot, f, a)->delta[l];
            const struct reduction_result *const r = study_result_of(job, slot, 0, a);
            for (size_t k = 0; k < SERIES; k++) {
                add(&s->intrinsic[k], r->intrinsic_m3_kg[k][l]);
                add(&s->molar_mass[k], r->molar_mass_kg_mol[k][l]);
            }
        }
    }
}

static void choose(const struct play *p, struct playing *now)
{
    now->job = (struct study_job){.design = p->design, .seed = p->seed, .exchange = p->exchange, .measured = p->measured, .fractions = p->fractions, .analysis = now->analysis};
    memcpy(now->job.fraction, p->fraction, sizeof p->fraction);
    for (size_t a = 0; a < p->analyses; a++) {
        if (!p->active[a]) continue;
        now->analysis[now->job.analyses] = p->analysis[a];
        now->which[now->job.analyses++] = a;
    }
}

bool play_until(struct play *p, size_t n)
{
    struct playing now;
    choose(p, &now);
    if (n <= p->n || !make_room(p, n)) return n <= p->n;
    const struct spread_size size = {study_slot_size(&now.job), study_scratch_size(&now.job)};
    const size_t last = (n + LANES - 1) / LANES, at_once = PLAY_SLOT_BYTES / size.slot + 1;
    unsigned char *const slots = malloc((at_once < last ? at_once : last) * size.slot);
    bool ok = slots != NULL;
    for (size_t block = p->n / LANES; ok && block < last; block += at_once) {
        const size_t count = last - block < at_once ? last - block : at_once;
        ok = spread((struct spread_range){p->first_block + block, count}, study_play, &now.job, slots, size);
        for (size_t i = 0; ok && i < count; i++) collect(p, &now, slots + i * size.slot, (block + i) * LANES, n);
    }
    free(slots);
    if (ok) p->n = n;
    return ok;
}

void play_free(struct play *p)
{
    for (size_t a = 0; a < PLAY_MAX_ANALYSES; a++)
        for (size_t f = 0; f < STUDY_MAX_FRACTIONS; f++) {
            free(p->sample[a].delta[f]);
            p->sample[a].delta[f] = NULL;
        }
}
