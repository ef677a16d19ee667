/* The generator against NumPy's numbers, and its keys. */
#include "check.h"
#include "reference.h"

#include <gsl/gsl_cdf.h>
#include <gsl/gsl_randist.h>
#include <math.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/streams.h"

enum { ROOM = 4 };

static streams_u128 hexadecimal(const char *digits)
{
    streams_u128 value = 0;
    for (; *digits; digits++)
        value = value << 4 | (unsigned)(*digits <= '9' ? *digits - '0' : *digits - 'a' + 10);
    return value;
}

static struct streams_state state_of(const struct reference_row *row)
{
    char word[64];
    const size_t length = strcspn(row->arguments, " ");
    memcpy(word, row->arguments, length);
    word[length] = '\0';
    return (struct streams_state){hexadecimal(word), hexadecimal(row->arguments + length + 1)};
}

/* The published output of PCG64: the state's halves, one over the other, turned. */
static uint64_t xsl_rr(streams_u128 state)
{
    const uint64_t folded = (uint64_t)(state >> 64) ^ (uint64_t)state;
    const unsigned turn = (unsigned)(state >> 122);
    return folded >> turn | folded << (-turn & 63U);
}

static void say(char *to, const uint64_t output[6], streams_u128 state)
{
    for (int i = 0; i < 6; i++)
        to += sprintf(to, "%016llx ", (unsigned long long)output[i]);
    sprintf(to, "%016llx%016llx", (unsigned long long)(state >> 64), (unsigned long long)(uint64_t)state);
}

/* TEXT: every bit. */
static void step_is_that_of_pcg64(void **state)
{
    (void)state;
    const streams_u128 multiplier = (streams_u128)UINT64_C(0x2360ed051fc65da4) << 64 | UINT64_C(0x4385df649fccf645);
    struct reference_row row[ROOM];
    const size_t n = reference_read("pcg.tsv", "xsl-rr", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        struct streams_state s = state_of(&row[i]);
        uint64_t output[6];
        char said[160];
        for (int k = 0; k < 6; k++) {
            s.state = streams_step(s.state, multiplier, s.increment);
            output[k] = xsl_rr(s.state);
        }
        say(said, output, s.state);
        assert_string_equal(said, row[i].value);
    }
}

/* The reference seeding: a step from 0, the seed added, a step. */
static void step_seeds_as_published(void **state)
{
    (void)state;
    const streams_u128 multiplier = (streams_u128)UINT64_C(0x2360ed051fc65da4) << 64 | UINT64_C(0x4385df649fccf645);
    struct reference_row row[ROOM];
    assert_int_equal(reference_read("pcg.tsv", "xsl-rr", row, ROOM), 2);
    const streams_u128 increment = 54 << 1 | 1;
    const struct streams_state published = state_of(&row[1]);
    assert_true(increment == published.increment);
    assert_true(streams_step(streams_step(0, multiplier, increment) + 42, multiplier, increment) == published.state);
}

static void outputs_are_those_of_pcg64_dxsm(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    const size_t n = reference_read("pcg.tsv", "dxsm", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        struct streams_state s = state_of(&row[i]);
        uint64_t output[6];
        char said[160];
        for (int k = 0; k < 6; k++)
            output[k] = streams_next(&s);
        say(said, output, s.state);
        assert_string_equal(said, row[i].value);
    }
}

static void doubles_are_those_of_numpy(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    const size_t n = reference_read("pcg.tsv", "dxsm.double", row, ROOM);
    for (size_t i = 0; i < n; i++) {
        struct streams_state s = state_of(&row[i]);
        char *at = row[i].value;
        for (int k = 0; k < 3; k++)
            assert_true(streams_uniform(&s) == strtod(at, &at));
    }
}

/* A state whose first output is `wanted`: the output function undone, with a
 * low half of 1. */
static struct streams_state about_to_give(uint64_t wanted)
{
    const uint64_t multiplier = UINT64_C(0xda942042e4dd58b5);
    uint64_t inverse = multiplier; /* Newton's iteration modulo 2^64 */
    for (int i = 0; i < 6; i++)
        inverse *= 2 - multiplier * inverse;
    uint64_t high = wanted ^ wanted >> 48;
    high *= inverse;
    high ^= high >> 32;
    return (struct streams_state){(streams_u128)high << 64 | 1, 1};
}

/* (u64 >> 11) 2^-53: from 0 to 1 - 2^-53, never 1. */
static void doubles_lie_in_the_half_open_unit(void **state)
{
    (void)state;
    static const struct {
        uint64_t output;
        double uniform;
    } pair[] = {{0, 0.0},
                {0x7ff, 0.0},
                {0x800, 0x1p-53},
                {UINT64_C(1) << 63, 0.5},
                {UINT64_MAX, 1.0 - 0x1p-53},
                {UINT64_MAX - 0x800, 1.0 - 0x1p-52}};
    for (size_t i = 0; i < sizeof pair / sizeof *pair; i++) {
        struct streams_state a = about_to_give(pair[i].output), b = a;
        assert_true(streams_next(&a) == pair[i].output);
        assert_true(streams_uniform(&b) == pair[i].uniform);
        assert_true(a.state == b.state);
    }
}

static void gsl_knows_it(void **state)
{
    (void)state;
    gsl_rng *const a = gsl_rng_alloc(streams_type);
    assert_string_equal(gsl_rng_name(a), "pcg64-dxsm");
    assert_true(gsl_rng_min(a) == 0 && gsl_rng_max(a) == UINT64_MAX);
    assert_int_equal(gsl_rng_size(a), sizeof(struct streams_state));
    struct streams_state s = streams_open(streams_study_key(3, 1), STREAMS_DAY, (struct streams_place){.level = 4});
    memcpy(gsl_rng_state(a), &s, sizeof s);
    for (int i = 0; i < 1000; i++) {
        if (i % 2)
            assert_true(gsl_rng_get(a) == streams_next(&s));
        else
            assert_true(gsl_rng_uniform(a) == streams_uniform(&s));
    }
    assert_memory_equal(gsl_rng_state(a), &s, sizeof s);
    gsl_rng_free(a);
}

static void gsl_seeds_it(void **state)
{
    (void)state;
    gsl_rng *const a = gsl_rng_alloc(streams_type), *const b = gsl_rng_alloc(streams_type);
    for (unsigned long seed = 0; seed < 200; seed++) {
        gsl_rng_set(a, seed);
        gsl_rng_set(b, seed);
        const unsigned long first = gsl_rng_get(a);
        assert_true(first == gsl_rng_get(b));
        gsl_rng_set(b, seed + 1);
        assert_false(first == gsl_rng_get(b));
    }
    gsl_rng_free(a);
    gsl_rng_free(b);
}

/* ---- keys ---- */

/* A stream as the numbers that tell it from another. */
struct mark {
    uint64_t high, low, step_high, step_low, first;
};

static struct mark mark_of(uint64_t key, enum streams_purpose purpose, struct streams_place place)
{
    struct streams_state s = streams_open(key, purpose, place);
    assert_true((uint64_t)s.increment & 1U); /* or the period is short */
    const struct mark m = {(uint64_t)(s.state >> 64), (uint64_t)s.state, (uint64_t)(s.increment >> 64),
                           (uint64_t)s.increment, 0};
    struct mark out = m;
    out.first = streams_next(&s);
    return out;
}

static int by_first(const void *a, const void *b)
{
    const uint64_t x = ((const struct mark *)a)->first, y = ((const struct mark *)b)->first;
    return x < y ? -1 : x > y;
}

static int by_state(const void *a, const void *b)
{
    return memcmp(a, b, 2 * sizeof(uint64_t));
}

static int by_increment(const void *a, const void *b)
{
    return memcmp((const unsigned char *)a + 16, (const unsigned char *)b + 16, 2 * sizeof(uint64_t));
}

static size_t twins(struct mark *marks, size_t n, int (*order)(const void *, const void *))
{
    size_t found = 0;
    qsort(marks, n, sizeof *marks, order);
    for (size_t i = 1; i < n; i++)
        found += order(&marks[i - 1], &marks[i]) == 0;
    return found;
}

/* No two keys share a state, a sequence or a first output. By chance two of
 * 6e5 would share 64 bits with probability 1e-8. */
static void hold_apart(struct mark *marks, size_t n)
{
    assert_int_equal(twins(marks, n, by_state), 0);
    assert_int_equal(twins(marks, n, by_increment), 0);
    assert_int_equal(twins(marks, n, by_first), 0);
}

/* Every part of the key at its ends and near them, every combination. */
static void places_have_streams_of_their_own(void **state)
{
    (void)state;
    static const unsigned byte[] = {0, 1, 2, 255}, two_bytes[] = {0, 1, 2, 255, 256, 65535};
    const size_t n = (size_t)2 * STREAMS_PURPOSES * 4 * 4 * 4 * 6 * 4;
    struct mark *const marks = calloc(n, sizeof *marks);
    assert_non_null(marks);
    size_t m = 0;
    for (uint64_t study = 0; study < 2; study++)
        for (int purpose = 0; purpose < STREAMS_PURPOSES; purpose++)
            for (size_t i = 0; i < 4 * 4 * 4 * 6 * 4; i++) {
                const struct streams_place place = {byte[i % 4], byte[i / 4 % 4], byte[i / 16 % 4],
                                                    two_bytes[i / 64 % 6], byte[i / 384]};
                marks[m++] = mark_of(streams_study_key(1, study), (enum streams_purpose)purpose, place);
            }
    assert_int_equal(m, n);
    hold_apart(marks, n);
    free(marks);
}

/* Many seeds and studies, neighbours and far apart. */
static void studies_have_streams_of_their_own(void **state)
{
    (void)state;
    static const uint64_t seed[] = {0, 1, 2, 3, 12345, UINT64_C(1) << 32, UINT64_MAX - 1, UINT64_MAX};
    enum { STUDIES = 10000 };
    const size_t n = (size_t)8 * STUDIES * STREAMS_PURPOSES;
    struct mark *const marks = calloc(n, sizeof *marks);
    assert_non_null(marks);
    size_t m = 0;
    for (int s = 0; s < 8; s++)
        for (uint64_t study = 0; study < STUDIES; study++)
            for (int purpose = 0; purpose < STREAMS_PURPOSES; purpose++)
                marks[m++] = mark_of(streams_study_key(seed[s], study), (enum streams_purpose)purpose,
                                     (struct streams_place){0});
    hold_apart(marks, n);
    free(marks);
}

/* ---- statistics: fixed seed, each with its false-alarm chance ---- */

/* Chi squared over 256 cells of the first byte, and of the last that a double
 * keeps; false alarm 2e-6 each. */
struct cells {
    double count[2][256];
};

static void add(struct cells *c, double uniform)
{
    c->count[0][(int)(uniform * 256.0)] += 1.0;
    c->count[1][(unsigned)(uint64_t)(uniform * 0x1p53) & 255U] += 1.0;
}

static void hold_even(const struct cells *c, double n)
{
    for (int k = 0; k < 2; k++) {
        double chi_squared = 0.0;
        for (int i = 0; i < 256; i++)
            chi_squared += pow(c->count[k][i] - n / 256.0, 2) / (n / 256.0);
        const double above = gsl_cdf_chisq_Q(chi_squared, 255.0);
        if (!(above > 1e-6 && above < 1.0 - 1e-6))
            fail_msg("STAT chi squared %g of 255", chi_squared);
    }
}

static void uniforms_are_even(void **state)
{
    (void)state;
    enum { N = 1000000 };
    struct cells along = {{{0}}}, across = {{{0}}}, fillings = {{{0}}};
    struct streams_state s = streams_open(streams_study_key(1, 0), STREAMS_STUDY, (struct streams_place){0});
    for (unsigned i = 0; i < N; i++) {
        add(&along, streams_uniform(&s));
        struct streams_state other = streams_open(streams_study_key(1, i), STREAMS_STUDY, (struct streams_place){0});
        add(&across, streams_uniform(&other));
        struct streams_state place = streams_open(streams_study_key(1, i / 1000), STREAMS_FILLING,
                                                  (struct streams_place){0, 0, 2, i % 1000 / 10, i % 10});
        add(&fillings, streams_uniform(&place));
    }
    hold_even(&along, N);
    hold_even(&across, N);
    hold_even(&fillings, N);
}

static double first(uint64_t seed, uint64_t study, enum streams_purpose purpose, struct streams_place place)
{
    struct streams_state s = streams_open(streams_study_key(seed, study), purpose, place);
    return streams_uniform(&s) - 0.5;
}

/* 5 standard errors of a correlation over 200,000 pairs, 1/sqrt(n) each; false
 * alarm 6e-7 each, 5e-6 in all. */
static void neighbours_are_strangers(void **state)
{
    (void)state;
    enum { N = 200000, KINDS = 9 };
    double product[KINDS] = {0};
    for (uint64_t i = 0; i < N; i++) {
        const struct streams_place p = {0, 0, STREAMS_INTACT, 3, 1};
        const double here = first(1, i, STREAMS_FILLING, p);
        product[0] += here * first(2, i, STREAMS_FILLING, p);
        product[1] += here * first(1, i + 1, STREAMS_FILLING, p);
        product[2] += here * first(1, i, STREAMS_DAY, p);
        product[3] += here * first(1, i, STREAMS_FILLING, (struct streams_place){1, 0, STREAMS_INTACT, 3, 1});
        product[4] += here * first(1, i, STREAMS_FILLING, (struct streams_place){0, 1, STREAMS_INTACT, 3, 1});
        product[5] += here * first(1, i, STREAMS_FILLING, (struct streams_place){0, 0, STREAMS_CLEAVED, 3, 1});
        product[6] += here * first(1, i, STREAMS_FILLING, (struct streams_place){0, 0, STREAMS_INTACT, 4, 1});
        product[7] += here * first(1, i, STREAMS_FILLING, (struct streams_place){0, 0, STREAMS_INTACT, 3, 2});
        struct streams_state s = streams_open(streams_study_key(1, i), STREAMS_FILLING, p);
        streams_next(&s);
        product[8] += here * (streams_uniform(&s) - 0.5); /* the next of the same stream */
    }
    for (int k = 0; k < KINDS; k++)
        check_close(12.0 * product[k] / N, 0.0, 5.0 / sqrt(N), "STAT 5 standard errors, false alarm 6e-7");
}

/* GSL's normals on a stream: mean, variance, fourth moment, 5 standard errors
 * each (1, sqrt 2, sqrt 96 over sqrt n); false alarm 6e-7 each. */
static void normals_are_normal(void **state)
{
    (void)state;
    enum { N = 1000000 };
    gsl_rng *const dice = gsl_rng_alloc(streams_type);
    gsl_rng_set(dice, 11);
    double moment[3] = {0};
    for (int i = 0; i < N; i++) {
        const double z = gsl_ran_gaussian_ziggurat(dice, 1.0);
        moment[0] += z / N;
        moment[1] += z * z / N;
        moment[2] += z * z * z * z / N;
    }
    gsl_rng_free(dice);
    check_close(moment[0], 0.0, 5.0 / sqrt(N), "STAT 5 standard errors, false alarm 6e-7");
    check_close(moment[1], 1.0, 5.0 * sqrt(2.0 / N), "STAT 5 standard errors, false alarm 6e-7");
    check_close(moment[2], 3.0, 5.0 * sqrt(96.0 / N), "STAT 5 standard errors, false alarm 6e-7");
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(step_is_that_of_pcg64),
        cmocka_unit_test(step_seeds_as_published),
        cmocka_unit_test(outputs_are_those_of_pcg64_dxsm),
        cmocka_unit_test(doubles_are_those_of_numpy),
        cmocka_unit_test(doubles_lie_in_the_half_open_unit),
        cmocka_unit_test(gsl_knows_it),
        cmocka_unit_test(gsl_seeds_it),
        cmocka_unit_test(places_have_streams_of_their_own),
        cmocka_unit_test(studies_have_streams_of_their_own),
        cmocka_unit_test(uniforms_are_even),
        cmocka_unit_test(neighbours_are_strangers),
        cmocka_unit_test(normals_are_normal),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
