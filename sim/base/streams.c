#include "sim/base/streams.h"

static void set(void *state, unsigned long seed)
{
    struct streams_state *s = state;
    *s = streams_open(streams_study_key(seed, 0), STREAMS_STUDY, (struct streams_place){0});
}

static unsigned long get(void *state)
{
    return streams_next(state);
}

static double get_double(void *state)
{
    return streams_uniform(state);
}

static const gsl_rng_type type = {"pcg64-dxsm", UINT64_MAX, 0, sizeof(struct streams_state), set, get, get_double};
const gsl_rng_type *const streams_type = &type;

/* A bijection of 64 bits that spreads every input bit over all outputs: the
 * finaliser of SplitMix64 (Steele, Lea and Flood, OOPSLA 2014), variant 13 of
 * Stafford. */
static uint64_t mix(uint64_t z)
{
    z = (z ^ (z >> 30)) * UINT64_C(0xbf58476d1ce4e5b9);
    z = (z ^ (z >> 27)) * UINT64_C(0x94d049bb133111eb);
    return z ^ (z >> 31);
}

static const uint64_t golden = UINT64_C(0x9e3779b97f4a7c15);

uint64_t streams_study_key(uint64_t seed, uint64_t study)
{
    return mix(mix(seed + golden) + golden * (study + 1));
}

struct streams_state streams_open(uint64_t study_key, enum streams_purpose purpose, struct streams_place place)
{
    const uint64_t where = (uint64_t)purpose << 48 | (uint64_t)place.polymer << 40 | (uint64_t)place.preparation << 32 |
                           (uint64_t)place.solution << 24 | (uint64_t)place.level << 8 | (uint64_t)place.filling;
    const uint64_t key = mix(study_key ^ mix(where + golden));
    const streams_u128 state = (streams_u128)mix(key + golden) << 64 | mix(key + 2 * golden);
    const streams_u128 increment = (streams_u128)mix(key + 3 * golden) << 64 | mix(key + 4 * golden) | 1U;
    return (struct streams_state){state, increment};
}
