/* Every deviate of a study: normal, independent, and keyed by what it is for,
 * so that spare runs, other shapes of a plan and other studies move nothing.
 * Source: model.md section 5. */
#include "bench/still.h"

#include "sim/bench/draws.h"

static const struct streams_place somewhere = {.solution = STREAMS_CLEAVED, .level = 3, .filling = 1};

/* TEXT: spare runs continue the stream of a filling, whatever the lane and
 * however many at a time. */
static void spare_runs_come_behind(void **state)
{
    (void)state;
    static struct draws_filling few, many;
    const struct draws_key key = draws_key(5, 160, (struct draws_exchange){0});
    draws_open_filling(&few, &key, somewhere, 2);
    draws_open_filling(&many, &key, somewhere, 9);
    assert_memory_equal(few.once, many.once, sizeof few.once);
    assert_memory_equal(few.run, many.run, 2 * sizeof few.run[0]);
    draws_spare(&few, 5, 2);
    draws_spare(&few, 1, 8); /* jumps */
    draws_spare(&few, 5, 4);
    draws_spare(&few, 5, 3); /* is there already */
    for (size_t r = 2; r < 9; r++)
        for (size_t i = 0; i < DRAWS_RUN; i++) {
            assert_true(few.run[r][i][1] == many.run[r][i][1]);
            if (r <= 4) assert_true(few.run[r][i][5] == many.run[r][i][5]);
        }
    assert_int_equal(few.drawn[1], 9);
    assert_int_equal(few.drawn[5], 5);
    assert_int_equal(few.drawn[0], 2);
}

/* The first two numbers of a stream; one alone has too few bits. */
struct opening {
    double first, second;
};

static int rising(const void *a, const void *b)
{
    const struct opening *const x = a, *const y = b;
    if (x->first != y->first) return x->first < y->first ? -1 : 1;
    return x->second < y->second ? -1 : x->second > y->second;
}

/* TEXT: no two purposes, places, studies or seeds open with the same numbers. */
static void no_place_is_used_twice(void **state)
{
    (void)state;
    enum { MOST = 40000 };
    static struct opening list[MOST];
    size_t n = 0;
    for (uint64_t seed = 1; seed <= 2; seed++)
        for (uint64_t block = 0; block < 2; block++)
            for (unsigned purpose = 0; purpose < STREAMS_PURPOSES; purpose++)
                for (unsigned solution = STREAMS_NONE; solution <= STREAMS_CLEAVED; solution++)
                    for (unsigned level = 0; level < 12; level++)
                        for (unsigned filling = 0; filling < 3; filling++) {
                            const struct draws_key key = draws_key(seed, block * LANES, (struct draws_exchange){0});
                            double out[2][LANES];
                            const struct streams_place place = {.solution = solution, .level = level, .filling = filling};
                            draws_normals(&key, (enum streams_purpose)purpose, place, 2, out);
                            FOR_LANES(l) if (n < MOST) list[n++] = (struct opening){out[0][l], out[1][l]};
                        }
    assert_int_equal(n, 2 * 2 * STREAMS_PURPOSES * 4 * 12 * 3 * LANES);
    qsort(list, n, sizeof *list, rising);
    for (size_t i = 1; i < n; i++) assert_true(rising(&list[i - 1], &list[i]) < 0);
}

/* A filling with two runs and the draws of its study and day, as one row of
 * SLOTS numbers per study; the bubble's uniform is made one of unit variance. */
enum { ROW_RUNS = 2, SLOTS = DRAWS_STUDY + DRAWS_DAY + DRAWS_FILLING + ROW_RUNS * DRAWS_RUN, STUDIES = 16000 };

static void row_of(const struct draws_key *key, double out[SLOTS][LANES])
{
    static struct draws_filling d;
    size_t n = 0;
    draws_normals(key, STREAMS_STUDY, (struct streams_place){0}, DRAWS_STUDY, out);
    n += DRAWS_STUDY;
    draws_normals(key, STREAMS_DAY, (struct streams_place){.level = 1}, DRAWS_DAY, out + n);
    n += DRAWS_DAY;
    draws_open_filling(&d, key, somewhere, ROW_RUNS);
    memcpy(out[n], d.once, sizeof d.once);
    n += DRAWS_FILLING;
    memcpy(out[n], d.run, ROW_RUNS * sizeof d.run[0]);
    for (size_t r = 0; r < ROW_RUNS; r++)
        FOR_LANES(l) out[n + r * DRAWS_RUN + DRAWS_BUBBLE][l] = sqrt(12.0) * (d.run[r][DRAWS_BUBBLE][l] - 0.5);
}

/* STAT: means within 5/sqrt(n), variances within 5 sqrt(2/n), correlations
 * within 5/sqrt(n); 34 slots and 561 pairs at 5.7e-7 each: chance of a false
 * alarm 4e-4 for one seed, which is fixed. */
static void independent_standard_normals(void **state)
{
    (void)state;
    static double sum[SLOTS], product[SLOTS][SLOTS];
    memset(sum, 0, sizeof sum);
    memset(product, 0, sizeof product);
    for (uint64_t study = 0; study < STUDIES; study += LANES) {
        const struct draws_key key = draws_key(3, study, (struct draws_exchange){0});
        double row[SLOTS][LANES];
        row_of(&key, row);
        for (size_t i = 0; i < SLOTS; i++) {
            FOR_LANES(l) sum[i] += row[i][l];
            for (size_t j = 0; j <= i; j++) FOR_LANES(l) product[i][j] += row[i][l] * row[j][l];
        }
    }
    const double n = STUDIES, z = 5.0;
    for (size_t i = 0; i < SLOTS; i++) {
        still_near("mean", sum[i] / n, 0.0, z / sqrt(n));
        still_near("variance", product[i][i] / n, 1.0, z * sqrt(2.0 / n));
        for (size_t j = 0; j < i; j++) still_near("correlation", product[i][j] / n, 0.0, z / sqrt(n));
    }
}

/* The uniform that decides on a bubble lies in [0, 1). STAT: share below 1 %
 * within 5 binomial standard errors; chance of a false alarm 6e-7. */
static void bubble_uniform(void **state)
{
    (void)state;
    static struct draws_filling d;
    size_t below = 0, n = 0;
    for (uint64_t study = 0; study < 40000; study += LANES) {
        const struct draws_key key = draws_key(11, study, (struct draws_exchange){0});
        draws_open_filling(&d, &key, somewhere, 3);
        for (size_t r = 0; r < 3; r++)
            FOR_LANES(l)
            {
                const double u = d.run[r][DRAWS_BUBBLE][l];
                assert_true(u >= 0.0 && u < 1.0);
                below += u < 0.01;
                n++;
            }
    }
    still_near("share", (double)below / (double)n, 0.01, 5.0 * sqrt(0.01 * 0.99 / (double)n));
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(spare_runs_come_behind), cmocka_unit_test(no_place_is_used_twice),
                                       cmocka_unit_test(independent_standard_normals), cmocka_unit_test(bubble_uniform)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
