#include "sim/bench/draws.h"

#include <gsl/gsl_randist.h>
#include <string.h>

struct draws_key draws_key(uint64_t seed, uint64_t first_study)
{
    struct draws_key key;
    FOR_LANES(l) key.study[l] = streams_study_key(seed, first_study + (uint64_t)l);
    return key;
}

void draws_deal(uint64_t seed, size_t count, size_t order[])
{
    struct streams_state state = streams_open(streams_study_key(seed, 0), STREAMS_ORDER, (struct streams_place){0});
    gsl_rng rng = {streams_type, &state};
    gsl_ran_shuffle(&rng, order, count, sizeof *order);
}

static double normal(gsl_rng *rng)
{
    return gsl_ran_gaussian_ziggurat(rng, 1.0);
}

/* One generator per lane, taken in turn: their chains of steps then overlap. */
static void open_lanes(const struct draws_key *key, enum streams_purpose purpose, struct streams_place place, struct streams_state state[LANES])
{
    FOR_LANES(l) state[l] = streams_open(key->study[l], purpose, place);
}

static void attach(gsl_rng rng[LANES], struct streams_state state[LANES])
{
    FOR_LANES(l) rng[l] = (gsl_rng){streams_type, &state[l]};
}

void draws_normals(const struct draws_key *key, enum streams_purpose purpose, struct streams_place place, size_t slots, double out[][LANES])
{
    struct streams_state state[LANES];
    gsl_rng rng[LANES];
    open_lanes(key, purpose, place, state);
    attach(rng, state);
    for (size_t i = 0; i < slots; i++) FOR_LANES(l) out[i][l] = normal(&rng[l]);
}

void draws_open_filling(struct draws_filling *d, const struct draws_key *key, struct streams_place place, size_t runs)
{
    gsl_rng rng[LANES];
    open_lanes(key, STREAMS_FILLING, place, d->stream);
    attach(rng, d->stream);
    for (size_t i = 0; i < DRAWS_FILLING; i++) FOR_LANES(l) d->once[i][l] = normal(&rng[l]);
    for (size_t r = 0; r < runs; r++) {
        for (size_t i = 0; i < DRAWS_BUBBLE; i++) FOR_LANES(l) d->run[r][i][l] = normal(&rng[l]);
        FOR_LANES(l) d->run[r][DRAWS_BUBBLE][l] = gsl_rng_uniform(&rng[l]);
    }
    memset(d->drawn, (int)runs, sizeof d->drawn);
}

void draws_spare(struct draws_filling *d, int lane, size_t run)
{
    gsl_rng rng = {streams_type, &d->stream[lane]};
    for (; d->drawn[lane] <= run; d->drawn[lane]++) {
        double(*const slot)[LANES] = d->run[d->drawn[lane]];
        for (size_t i = 0; i < DRAWS_BUBBLE; i++) slot[i][lane] = normal(&rng);
        slot[DRAWS_BUBBLE][lane] = gsl_rng_uniform(&rng);
    }
}
