#include "sim/bench/draws.h"

#include <gsl/gsl_randist.h>
#include <string.h>

struct draws_key draws_key(uint64_t seed, uint64_t first_study, struct draws_exchange exchange)
{
    struct draws_key key = {.exchange = exchange.groups};
    FOR_LANES(l) key.study[l] = streams_study_key(seed, first_study + (uint64_t)l);
    FOR_LANES(l) key.other[l] = streams_study_key(exchange.other_seed, first_study + (uint64_t)l);
    return key;
}

/* The group of every slot, stream by stream in the order of their enums. */
static const unsigned char study_group[DRAWS_STUDY] = {
    [DRAWS_PAIR_MIDDLE] = DRAWS_GROUP_PAIR, [DRAWS_PAIR_SLOPE] = DRAWS_GROUP_PAIR, [DRAWS_CALIBRATION] = DRAWS_GROUP_CALIBRATION,
    [DRAWS_KINETIC] = DRAWS_GROUP_KINETIC, [DRAWS_SOLUTION_OFFSET] = DRAWS_GROUP_OFFSET, [DRAWS_PIPETTE] = DRAWS_GROUP_DILUTION,
    [DRAWS_HYDROLYSIS] = DRAWS_GROUP_HYDROLYSIS, [DRAWS_INTERACTION] = DRAWS_GROUP_INTERACTION, [DRAWS_INTERACTION_CLEAVED] = DRAWS_GROUP_INTERACTION};
static const unsigned char polymer_group[DRAWS_POLYMER] = {[DRAWS_DRY_CONTENT] = DRAWS_GROUP_DRY_CONTENT};
static const unsigned char preparation_group[DRAWS_PREPARATION] = {[DRAWS_CONVERSION] = DRAWS_GROUP_CONVERSION};
static const unsigned char stock_group[DRAWS_STOCK] = {[DRAWS_WEIGHING] = DRAWS_GROUP_WEIGHING};
static const unsigned char level_group[DRAWS_LEVEL] = {[DRAWS_DELIVERY] = DRAWS_GROUP_DILUTION, [DRAWS_FLASK] = DRAWS_GROUP_DILUTION};
static const unsigned char day_group[DRAWS_DAY] = {
    [DRAWS_DAY_OFFSET] = DRAWS_GROUP_DAYS, [DRAWS_DRIFT] = DRAWS_GROUP_DAYS, [DRAWS_BATH_START] = DRAWS_GROUP_FLUCTUATION};
static const unsigned char filling_group[DRAWS_FILLING] = {
    [DRAWS_TILT] = DRAWS_GROUP_TILT, [DRAWS_CHARGE] = DRAWS_GROUP_CHARGE, [DRAWS_FILLING_TIME] = DRAWS_GROUP_FILLING,
    [DRAWS_GRADIENT] = DRAWS_GROUP_GRADIENT, [DRAWS_IDLE_X] = DRAWS_GROUP_FLUCTUATION, [DRAWS_IDLE_L] = DRAWS_GROUP_FLUCTUATION};
static const unsigned char run_group[DRAWS_RUN] = {
    [DRAWS_BATH] = DRAWS_GROUP_FLUCTUATION, [DRAWS_BATH + 1] = DRAWS_GROUP_FLUCTUATION, [DRAWS_BATH + 2] = DRAWS_GROUP_FLUCTUATION,
    [DRAWS_BATH + 3] = DRAWS_GROUP_FLUCTUATION, [DRAWS_READING] = DRAWS_GROUP_READING, [DRAWS_HAND] = DRAWS_GROUP_HAND,
    [DRAWS_MENISCUS] = DRAWS_GROUP_MARKS, [DRAWS_BUBBLE] = DRAWS_GROUP_BUBBLES};

static const unsigned char *const group_of[STREAMS_PURPOSES] = {
    [STREAMS_STUDY] = study_group, [STREAMS_POLYMER] = polymer_group, [STREAMS_PREPARATION] = preparation_group, [STREAMS_STOCK] = stock_group,
    [STREAMS_LEVEL] = level_group, [STREAMS_DAY] = day_group, [STREAMS_FILLING] = filling_group};

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
static void open_lanes(const uint64_t study[LANES], enum streams_purpose purpose, struct streams_place place, struct streams_state state[LANES])
{
    FOR_LANES(l) state[l] = streams_open(study[l], purpose, place);
}

static void attach(gsl_rng rng[LANES], struct streams_state state[LANES])
{
    FOR_LANES(l) rng[l] = (gsl_rng){streams_type, &state[l]};
}

static bool exchanged(uint32_t exchange, unsigned char group)
{
    return (exchange >> group & 1U) != 0;
}

void draws_normals(const struct draws_key *key, enum streams_purpose purpose, struct streams_place place, size_t slots, double out[][LANES])
{
    struct streams_state state[LANES];
    gsl_rng rng[LANES];
    open_lanes(key->study, purpose, place, state);
    attach(rng, state);
    for (size_t i = 0; i < slots; i++) FOR_LANES(l) out[i][l] = normal(&rng[l]);
    if (key->exchange == 0) return;
    open_lanes(key->other, purpose, place, state);
    for (size_t i = 0; i < slots; i++)
        FOR_LANES(l)
        {
            const double other = normal(&rng[l]);
            if (exchanged(key->exchange, group_of[purpose][i])) out[i][l] = other;
        }
}

/* One run's slots of one lane; `exchange` UINT32_MAX takes all of them. */
static void draw_run(double slot[][LANES], gsl_rng *rng, int lane, uint32_t exchange)
{
    for (size_t i = 0; i < DRAWS_RUN; i++) {
        const double value = i == DRAWS_BUBBLE ? gsl_rng_uniform(rng) : normal(rng);
        if (exchanged(exchange, run_group[i])) slot[i][lane] = value;
    }
}

void draws_open_filling(struct draws_filling *d, const struct draws_key *key, struct streams_place place, size_t runs)
{
    gsl_rng rng[LANES];
    open_lanes(key->study, STREAMS_FILLING, place, d->stream);
    attach(rng, d->stream);
    for (size_t i = 0; i < DRAWS_FILLING; i++) FOR_LANES(l) d->once[i][l] = normal(&rng[l]);
    for (size_t r = 0; r < runs; r++) {
        for (size_t i = 0; i < DRAWS_BUBBLE; i++) FOR_LANES(l) d->run[r][i][l] = normal(&rng[l]);
        FOR_LANES(l) d->run[r][DRAWS_BUBBLE][l] = gsl_rng_uniform(&rng[l]);
    }
    memset(d->drawn, (int)runs, sizeof d->drawn);
    d->exchange = key->exchange;
    if (d->exchange == 0) return;
    open_lanes(key->other, STREAMS_FILLING, place, d->other);
    attach(rng, d->other);
    for (size_t i = 0; i < DRAWS_FILLING; i++)
        FOR_LANES(l)
        {
            const double other = normal(&rng[l]);
            if (exchanged(d->exchange, filling_group[i])) d->once[i][l] = other;
        }
    for (size_t r = 0; r < runs; r++) FOR_LANES(l) draw_run(d->run[r], &rng[l], l, d->exchange);
}

void draws_spare(struct draws_filling *d, int lane, size_t run)
{
    gsl_rng rng = {streams_type, &d->stream[lane]}, other = {streams_type, &d->other[lane]};
    for (; d->drawn[lane] <= run; d->drawn[lane]++) {
        double(*const slot)[LANES] = d->run[d->drawn[lane]];
        draw_run(slot, &rng, lane, UINT32_MAX);
        if (d->exchange != 0) draw_run(slot, &other, lane, d->exchange);
    }
}
