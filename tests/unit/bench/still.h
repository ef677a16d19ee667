/* What the tests of the bench and of the judge start from: a scenario read
 * from a text, a still plan (nothing spreads, nothing lags, nothing is
 * rounded), and a bench worked by hand with draws of the test's own.
 * Functions are inline: some test programs bring a scenario of their own. */
#ifndef VICINAL_TESTS_UNIT_BENCH_STILL_H
#define VICINAL_TESTS_UNIT_BENCH_STILL_H

#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

#include "sim/bench/study.h"
#include "sim/scenario/scenario.h"

/* Read a scenario from its text; a mistake in it fails the test. */
static inline struct scenario *still_read(const char *yaml)
{
    char path[] = "/tmp/vicinal-test-XXXXXX";
    const int file = mkstemp(path);
    assert_true(file >= 0);
    assert_int_equal(write(file, yaml, strlen(yaml)), (long)strlen(yaml));
    close(file);
    struct complaints *const complaints = complain_new();
    struct scenario *const s = scenario_read(&(struct scenario_request){.path = path}, complaints);
    complain_print(complaints, stdout);
    complain_free(complaints);
    unlink(path);
    assert_non_null(s);
    return s;
}

/* Nothing spreads: every standard uncertainty, chance and resolution zero,
 * room at the set temperature, complete hydrolysis and conversion, no other
 * cuts, no reagent. What is nominal stays. */
static inline void still_make(struct plan *p)
{
    struct material *const m = &p->material;
    m->eta_u = m->a_u = m->hydrolysis_u = m->interaction_u = m->temperature_coefficient_1_K = 0.0;
    m->hydrolysis = 1.0;
    p->cleavage.conversion = 1.0;
    p->cleavage.conversion_u = p->cleavage.nonspecific = p->cleavage.reagent_viscosity = p->cleavage.reagent_density = 0.0;
    struct solutions *const so = &p->solutions;
    so->dry_content_u = so->balance_u_kg = so->stock_tolerance_m3 = so->level_tolerance_m3 = so->delivery_tolerance_m3 = so->delivery_u_m3 = 0.0;
    struct habits *const h = &p->habits;
    h->room_K = h->temperature_K;
    h->carry_over = h->filling_u = h->charge_u_m3 = h->tilt_u_rad = h->kinetic_u = h->bubble_chance = 0.0;
    p->tube.solution_offset = p->tube.solution_offset_u = 0.0;
    p->bath.fluctuation_K = p->bath.drift_u_K_s = p->bath.day_u_K = p->bath.gradient_u_K = 0.0;
    p->thermometer.calibration_u_K = p->thermometer.reading_u_K = p->thermometer.resolution_K = 0.0;
    p->timer.hand_u_s = p->timer.meniscus_u_m = p->timer.resolution_s = 0.0;
}

/* The default plan of the interface, still. The names in it belong to the
 * scenario, which is for scenario_free. */
static inline struct plan still_plan(struct scenario **s)
{
    struct plan p;
    *s = still_read("question: {expect: 1.5 %, against: 1.2 %}\nplan: {grade: middle}\n");
    scenario_plan(*s, 0, &p);
    still_make(&p);
    return p;
}

/* The same with as little bench work as there can be: one run of one filling
 * of water and of one level of each series, reduced by a single point. */
static inline struct plan still_short_plan(struct scenario **s)
{
    struct plan p = still_plan(s);
    p.levels[INTACT] = p.levels[CLEAVED] = p.fillings[INTACT] = p.fillings[CLEAVED] = 1;
    p.runs = p.water_fillings = p.water_runs = 1;
    p.habits.spare_runs = 0;
    p.analysis.extrapolation = SINGLE_POINT;
    return p;
}

/* A design and room to play it, block by block. */
struct still_bench {
    struct design design;
    struct study_job job;
    void *scratch, *slot;
    struct notebook book;        /* of the last block shown */
    double (*started_s)[LANES];
    struct study_shown shown;
};

static inline void still_open(struct still_bench *b, const struct plan *p, const struct scenario *s, double fraction)
{
    memset(b, 0, sizeof *b);
    assert_true(design_make(&b->design, p, scenario_cost(s), scenario_question(s)));
    assert_string_equal(b->design.why, "");
    b->job = (struct study_job){.design = &b->design, .seed = 20260101, .fractions = 1, .fraction = {fraction}, .analyses = 1, .analysis = &p->analysis};
    b->scratch = calloc(study_scratch_size(&b->job), 1);
    b->slot = calloc(study_slot_size(&b->job), 1);
    b->started_s = b->shown.trace.started_s = calloc(b->design.layout.fillings, sizeof *b->started_s);
    b->shown.trace.run = calloc(b->design.layout.fillings * b->design.layout.stride, sizeof *b->shown.trace.run);
    assert_true(b->scratch && b->slot && b->started_s && b->shown.trace.run);
}

static inline void still_close(struct still_bench *b)
{
    free(b->scratch);
    free(b->slot);
    free(b->started_s);
    free(b->shown.trace.run);
    design_free(&b->design);
}

/* Play a block and show its notebook. */
static inline void still_show(struct still_bench *b, size_t block)
{
    study_show(block, &b->job, 0, b->scratch, &b->shown);
    b->book = b->shown.book;
}

/* Estimate of lane 0 of the first block. */
static inline const struct reduction_result *still_reduce(struct still_bench *b)
{
    study_play(0, &b->job, b->slot, b->scratch);
    return study_result_of(&b->job, b->slot, 0, 0);
}

static inline struct notebook_run *still_run(struct still_bench *b, size_t filling, size_t run)
{
    return &notebook_runs(&b->book, filling)[run];
}

/* A bench with draws of the test's own, all zero to begin with (no bubble:
 * the uniform that decides it is 1). */
struct still_hand {
    struct truth_draws draws;
    struct draws_filling filling;
    struct bench bench;
    void *book, *times;
};

static inline struct still_hand *still_hand_open(const struct design *d)
{
    struct still_hand *const h = calloc(1, sizeof *h);
    assert_non_null(h);
    for (size_t r = 0; r < NOTEBOOK_MAX_RUNS; r++) FOR_LANES(l) h->filling.run[r][DRAWS_BUBBLE][l] = 1.0;
    memset(h->filling.drawn, NOTEBOOK_MAX_RUNS, sizeof h->filling.drawn);
    h->book = calloc(notebook_size(&d->layout), 1);
    h->times = calloc(reduction_size(&d->layout), 1);
    assert_true(h->book && h->times);
    h->bench.design = d;
    h->bench.book = notebook_place(&d->layout, h->book);
    return h;
}

/* Work every filling with these draws at a fraction. */
static inline void still_hand_work(struct still_hand *h, double fraction)
{
    const struct design *const d = h->bench.design;
    double day[DRAWS_DAY][LANES] = {{0}};
    truth_of(d, &h->draws, fraction, &h->bench.truth);
    for (size_t f = 0; f < d->layout.fillings; f++) {
        if (f == 0 || d->filling[f].day != d->filling[f - 1].day) bench_open_day(&h->bench, day);
        bench_fill(&h->bench, f, &h->filling, (const double[LANES]){0});
    }
}

/* Reduce what was worked, in the plan's way. */
static inline struct reduction_result still_hand_reduce(struct still_hand *h)
{
    const struct design *const d = h->bench.design;
    struct reduction_result result;
    struct reduction_times times = reduction_place(&d->layout, h->times);
    memset(&result, 0, sizeof result);
    reduction_combine(&d->assumed, &h->bench.book, &times);
    reduction_run(&d->assumed, &d->plan->analysis, &h->bench.book, &times, &result);
    return result;
}

static inline void still_hand_close(struct still_hand *h)
{
    free(h->book);
    free(h->times);
    free(h);
}

/* |x/expected - 1| <= tolerance, said in full when it is not. */
static inline void still_close_to(const char *what, double x, double expected, double tolerance)
{
    const double off = expected == 0.0 ? x : x / expected - 1.0;
    if (!(fabs(off) <= tolerance)) {
        print_message("%s: %.12g, not %.12g (off by %.3g, %.3g allowed)\n", what, x, expected, off, tolerance);
        fail();
    }
}

/* |x - expected| <= tolerance. */
static inline void still_near(const char *what, double x, double expected, double tolerance)
{
    if (!(fabs(x - expected) <= tolerance)) {
        print_message("%s: %.12g, not %.12g (off by %.3g, %.3g allowed)\n", what, x, expected, x - expected, tolerance);
        fail();
    }
}

#endif
