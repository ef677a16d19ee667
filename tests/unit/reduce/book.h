/* Notebooks written by hand, and what an analyst assumes about the base case. */
#ifndef VICINAL_TESTS_UNIT_REDUCE_BOOK_H
#define VICINAL_TESTS_UNIT_REDUCE_BOOK_H

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "check.h"
#include "models/water.h"
#include "sim/reduce/reduction.h"

enum { BOOK_FILLINGS = 40, BOOK_STRIDE = NOTEBOOK_MAX_RUNS };

struct book {
    struct notebook_filling filling[BOOK_FILLINGS];
    struct notebook_layout layout;
    struct notebook book;
    struct reduction_times times;
    double seconds[BOOK_FILLINGS + 8][LANES];
    struct notebook_run runs[BOOK_FILLINGS * BOOK_STRIDE + BOOK_FILLINGS]; /* room for the counts behind the runs */
};

/* An empty notebook over so many days; free() it. */
static inline struct book *book_open(size_t days)
{
    struct book *const b = calloc(1, sizeof *b);
    assert_non_null(b);
    b->layout = (struct notebook_layout){.days = days, .stride = BOOK_STRIDE, .filling = b->filling};
    return b;
}

/* One more filling; its number. */
static inline size_t book_add(struct book *b, struct notebook_filling filling)
{
    assert_true(b->layout.fillings < BOOK_FILLINGS);
    b->filling[b->layout.fillings] = filling;
    return b->layout.fillings++;
}

/* All fillings are there: lay the notebook into its memory. */
static inline void book_lay(struct book *b)
{
    assert_true(notebook_size(&b->layout) <= sizeof b->runs && reduction_size(&b->layout) <= sizeof b->seconds);
    b->book = notebook_place(&b->layout, b->runs);
    b->times = reduction_place(&b->layout, b->seconds);
}

/* The next run of a filling in one lane. */
static inline void book_enter(struct book *b, size_t filling, int lane, double time_s, double read_K)
{
    struct notebook_run *const run = &notebook_runs(&b->book, filling)[b->book.made[filling][lane]++];
    run->time_s[lane] = time_s;
    run->read_K[lane] = read_K;
}

/* Bring every run to the set temperature. */
static inline void book_bring(struct book *b, const struct assumed *a)
{
    for (size_t i = 0; i < b->layout.fillings * b->layout.stride; i++)
        notebook_bring_to_set(a, &b->book.run[i]);
}

/* Steps 1 to 5. */
static inline struct reduction_result book_reduce(struct book *b, const struct assumed *a, const struct analysis *how)
{
    struct reduction_result out;
    book_bring(b, a);
    reduction_combine(a, &b->book, &b->times);
    reduction_run(a, how, &b->book, &b->times, &out);
    return out;
}

/* The base case of checks.md: K 2e-4 dL/g, a 0.76, M0 44.05 g/mol, 25 degC;
 * no record, the runs agree whatever they say. */
static inline struct assumed book_base_case(struct polymer_sums *sums)
{
    struct assumed a = {.set_K = 298.15,
                        .water = water_fit_make(),
                        .agreement = 1.0,
                        .ends = TUBE_FLARED,
                        .K_m3_kg = 2e-5,
                        .a = 0.76,
                        .unit_kg_mol = 0.04405,
                        .r = polymer_r(0.76),
                        .neighbours = NEIGHBOURS_EXCLUDED,
                        .head_to_head_chance = 1.0,
                        .sums = sums};
    a.water_m2_s = water_fit_kinematic(&a.water, a.set_K);
    polymer_sums_make(sums, a.a);
    return a;
}

#endif
