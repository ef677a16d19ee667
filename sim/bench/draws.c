#include "sim/bench/draws.h"

#include <gsl/gsl_randist.h>

struct draws_key draws_key(uint64_t seed, uint64_t first_study)
{
    struct draws_key key;
    FOR_LANES(l) key.study[l] = streams_study_key(seed, first_study + (uint64_t)l);
    return key;
}

static double normal(gsl_rng *rng)
{
    return gsl_ran_gaussian_ziggurat(rng, 1.0);
}

void draws_normals(const struct draws_key *key, enum streams_purpose purpose, struct streams_place place, size_t slots, double out[][LANES])
{
    FOR_LANES(l)
    {
        struct streams_state state = streams_open(key->study[l], purpose, place);
        gsl_rng rng = {streams_type, &state};
        for (size_t i = 0; i < slots; i++) out[i][l] = normal(&rng);
    }
}

static void draw_run(struct draws_filling *d, gsl_rng *rng, int lane, size_t run)
{
    for (size_t i = 0; i < DRAWS_BUBBLE; i++) d->run[run][i][lane] = normal(rng);
    d->run[run][DRAWS_BUBBLE][lane] = gsl_rng_uniform(rng);
}

void draws_open_filling(struct draws_filling *d, const struct draws_key *key, struct streams_place place, size_t runs)
{
    FOR_LANES(l)
    {
        d->stream[l] = streams_open(key->study[l], STREAMS_FILLING, place);
        gsl_rng rng = {streams_type, &d->stream[l]};
        for (size_t i = 0; i < DRAWS_FILLING; i++) d->once[i][l] = normal(&rng);
        for (size_t r = 0; r < runs; r++) draw_run(d, &rng, l, r);
        d->drawn[l] = (unsigned char)runs;
    }
}

void draws_spare(struct draws_filling *d, int lane, size_t run)
{
    gsl_rng rng = {streams_type, &d->stream[lane]};
    for (; d->drawn[lane] <= run; d->drawn[lane]++) draw_run(d, &rng, lane, d->drawn[lane]);
}
