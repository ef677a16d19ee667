/* Whole studies for the tests of bench and judge: a scenario read from a text,
 * a plan in which nothing spreads, a bench worked by hand with draws of the
 * test's own, and estimates of many studies. */
#ifndef VICINAL_TESTS_UNIT_STUDIES_H
#define VICINAL_TESTS_UNIT_STUDIES_H

#include "check.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

#include "sim/bench/study.h"
#include "sim/judge/play.h"
#include "sim/scenario/scenario.h"

/* A scenario from a file, with at most two --set; a mistake fails the test. */
static inline struct scenario *studies_read_file(const char *path, const char *set, const char *other_set)
{
    const char *const sets[2] = {set, other_set};
    struct complaints *const complaints = complain_new();
    struct scenario *const s = scenario_read(&(struct scenario_request){.path = path, .sets = sets, .sets_count = other_set ? 2 : set ? 1 : 0}, complaints);
    complain_print(complaints, stdout);
    complain_free(complaints);
    assert_non_null(s);
    return s;
}

/* The same from its text. */
static inline struct scenario *studies_read(const char *yaml)
{
    char path[] = "/tmp/vicinal-studies-XXXXXX";
    const int file = mkstemp(path);
    assert_true(file >= 0);
    assert_int_equal(write(file, yaml, strlen(yaml)), (long)strlen(yaml));
    close(file);
    struct scenario *const s = studies_read_file(path, NULL, NULL);
    unlink(path);
    return s;
}

/* Nothing spreads or lags and nothing is rounded: every standard uncertainty,
 * chance and resolution zero, room at the set temperature, complete hydrolysis
 * and conversion, no other cuts, no reagent, no carry-over. */
static inline void studies_still(struct plan *p)
{
    struct material *const m = &p->material;
    struct solutions *const so = &p->solutions;
    struct habits *const h = &p->habits;
    m->eta_u = m->a_u = m->hydrolysis_u = m->interaction_u = m->temperature_coefficient_1_K = 0.0;
    m->hydrolysis = p->cleavage.conversion = 1.0;
    p->cleavage.conversion_u = p->cleavage.nonspecific = p->cleavage.reagent_viscosity = p->cleavage.reagent_density = 0.0;
    so->dry_content_u = so->balance_u_kg = so->stock_tolerance_m3 = so->level_tolerance_m3 = so->delivery_tolerance_m3 = so->delivery_u_m3 = 0.0;
    h->room_K = h->temperature_K;
    h->carry_over = h->filling_u = h->charge_u_m3 = h->tilt_u_rad = h->kinetic_u = h->bubble_chance = 0.0;
    p->tube.solution_offset = p->tube.solution_offset_u = 0.0;
    p->bath.fluctuation_K = p->bath.drift_u_K_s = p->bath.day_u_K = p->bath.gradient_u_K = 0.0;
    p->thermometer.calibration_u_K = p->thermometer.reading_u_K = p->thermometer.resolution_K = 0.0;
    p->timer.hand_u_s = p->timer.meniscus_u_m = p->timer.resolution_s = 0.0;
}

/* The first plan of a text, still. The scenario is for scenario_free. */
static inline struct plan studies_plan(const char *yaml, struct scenario **s)
{
    struct plan p;
    *s = studies_read(yaml);
    scenario_plan(*s, 0, &p);
    studies_still(&p);
    return p;
}

static inline void studies_lay(struct design *d, const struct plan *p, const struct scenario *s)
{
    assert_true(design_make(d, p, scenario_cost(s), scenario_question(s)));
    if (d->why[0] != '\0') print_message("impossible: %s\n", d->why);
    assert_string_equal(d->why, "");
}

/* That a plan is impossible, and why. */
static inline void studies_impossible(const struct plan *p, const struct scenario *s, const char *why)
{
    struct design d;
    assert_true(design_make(&d, p, scenario_cost(s), scenario_question(s)));
    const char *const found = design_why(&d, &p->analysis);
    if (!found || !strstr(found, why)) print_message("%s: not \"%s\"\n", found ? found : "possible", why);
    assert_true(found && strstr(found, why));
    design_free(&d);
}

/* The order of the bench as a text: W water, B blank, i and c levels, each
 * with level (and number of the filling), + when solvent is added, | for a new
 * day. */
static inline void studies_order(const struct design *d, char *text, size_t size)
{
    text[0] = '\0';
    for (size_t f = 0; f < d->layout.fillings; f++) {
        const struct notebook_filling *const q = &d->filling[f];
        const size_t used = strlen(text);
        const char *const gap = f == 0 ? "" : q->day != q[-1].day ? " | " : " ";
        if (q->water || q->blank)
            snprintf(text + used, size - used, "%s%c%zu", gap, q->water ? 'W' : 'B', q->number);
        else
            snprintf(text + used, size - used, "%s%s%c%zu%zu", gap, q->added ? "+" : "", q->series == INTACT ? 'i' : 'c', q->level, q->number);
    }
}

static inline void studies_has_order(const struct plan *p, const struct scenario *s, const char *order)
{
    struct design d;
    char text[2000];
    studies_lay(&d, p, s);
    studies_order(&d, text, sizeof text);
    assert_string_equal(text, order);
    design_free(&d);
}

/* A design and room to play it, block by block. */
struct studies {
    struct design design;
    struct study_job job;
    struct study_shown shown; /* of the last block shown */
    void *scratch, *slot;
};

/* Under the fractions of the question; measured alongside where it says so. */
static inline void studies_open(struct studies *b, const struct plan *p, const struct scenario *s)
{
    const struct question *const q = scenario_question(s);
    memset(b, 0, sizeof *b);
    studies_lay(&b->design, p, s);
    b->job = (struct study_job){.design = &b->design, .seed = 20260101, .fractions = q->has_against ? 2 : 1, .fraction = {q->expect, q->against},
                                .measured = q->has_against && q->against_is == AGAINST_MEASURED, .analyses = 1, .analysis = &p->analysis};
    const struct notebook_layout *const l = &b->design.layout;
    b->scratch = calloc(study_scratch_size(&b->job), 1);
    b->slot = calloc(study_slot_size(&b->job), 1);
    b->shown.trace.started_s = calloc(l->fillings, sizeof *b->shown.trace.started_s);
    b->shown.trace.run = calloc(l->fillings * l->stride, sizeof *b->shown.trace.run);
    assert_true(b->scratch && b->slot && b->shown.trace.started_s && b->shown.trace.run);
}

static inline void studies_close(struct studies *b)
{
    free(b->scratch);
    free(b->slot);
    free(b->shown.trace.started_s);
    free(b->shown.trace.run);
    design_free(&b->design);
}

static inline void studies_show(struct studies *b, size_t block, unsigned preparation)
{
    study_show(block, &b->job, preparation, b->scratch, &b->shown);
}

static inline const struct reduction_result *studies_play(struct studies *b, size_t block, size_t fraction)
{
    study_play(block, &b->job, b->slot, b->scratch);
    return study_result_of(&b->job, b->slot, fraction, 0);
}

/* Reduce a notebook in a plan's way. */
static inline struct reduction_result studies_reduce(const struct design *d, const struct notebook *book)
{
    struct reduction_result result;
    void *const memory = calloc(reduction_size(&d->layout), 1);
    assert_non_null(memory);
    struct reduction_times times = reduction_place(&d->layout, memory);
    reduction_combine(&d->assumed, book, &times);
    reduction_run(&d->assumed, &d->plan->analysis, book, &times, &result);
    free(memory);
    return result;
}

/* A bench with draws of the test's own, all zero to begin with (no bubble: the
 * uniform that decides it is 1), alike in every lane; what was in the tube is
 * kept filling by filling. */
enum { STUDIES_FILLINGS = 64 };
struct studies_hand {
    struct design design;
    struct truth_draws draws;
    struct draws_filling drawn;
    double day[DRAWS_DAY], once[STUDIES_FILLINGS][DRAWS_FILLING], delivery[STUDIES_FILLINGS];
    struct bench bench;
    struct bench_filled filled[STUDIES_FILLINGS];
    struct bench_trace trace;
    void *book;
};

static inline struct studies_hand *studies_hand_open(const struct plan *p, const struct scenario *s)
{
    struct studies_hand *const h = calloc(1, sizeof *h);
    assert_non_null(h);
    studies_lay(&h->design, p, s);
    const struct notebook_layout *const l = &h->design.layout;
    assert_true(l->fillings <= STUDIES_FILLINGS);
    for (size_t r = 0; r < NOTEBOOK_MAX_RUNS; r++) FOR_LANES(i) h->drawn.run[r][DRAWS_BUBBLE][i] = 1.0;
    memset(h->drawn.drawn, NOTEBOOK_MAX_RUNS, sizeof h->drawn.drawn);
    h->book = calloc(notebook_size(l), 1);
    h->trace.started_s = calloc(l->fillings, sizeof *h->trace.started_s);
    h->trace.run = calloc(l->fillings * l->stride, sizeof *h->trace.run);
    assert_true(h->book && h->trace.started_s && h->trace.run);
    return h;
}

static inline void studies_hand_work(struct studies_hand *h, double fraction)
{
    const struct design *const d = &h->design;
    double day[DRAWS_DAY][LANES], delivery[LANES];
    h->bench = (struct bench){.design = d, .book = notebook_place(&d->layout, h->book), .trace = &h->trace};
    truth_of(d, &h->draws, fraction, &h->bench.truth);
    for (size_t i = 0; i < DRAWS_DAY; i++) FOR_LANES(l) day[i][l] = h->day[i];
    for (size_t f = 0; f < d->layout.fillings; f++) {
        if (f == 0 || d->filling[f].day != d->filling[f - 1].day) bench_open_day(&h->bench, day);
        for (size_t i = 0; i < DRAWS_FILLING; i++) FOR_LANES(l) h->drawn.once[i][l] = h->once[f][i];
        FOR_LANES(l) delivery[l] = h->delivery[f];
        bench_fill(&h->bench, f, &h->drawn, delivery);
        h->filled[f] = h->bench.filled;
    }
}

static inline double studies_hand_delta(const struct studies_hand *h)
{
    return studies_reduce(&h->design, &h->bench.book).delta[0];
}

/* The time of a run as read, in the first lane. */
static inline double studies_hand_time(const struct studies_hand *h, size_t filling, size_t run)
{
    return notebook_runs(&h->bench.book, filling)[run].time_s[0];
}

static inline void studies_hand_close(struct studies_hand *h)
{
    free(h->book);
    free(h->trace.started_s);
    free(h->trace.run);
    design_free(&h->design);
    free(h);
}

/* The first plan of a text is still, and nobody errs: what it estimates. */
static inline double studies_still_delta(const struct plan *p, const struct scenario *s)
{
    struct studies_hand *const h = studies_hand_open(p, s);
    studies_hand_work(h, scenario_question(s)->expect);
    const double delta = studies_hand_delta(h);
    studies_hand_close(h);
    return delta;
}

/* Mean, standard deviation, and its standard error for a normal sample, of n
 * estimates under the question's first fraction (or of the difference). */
struct studies_sample {
    size_t n;
    double mean, sd, sd_se, clock_s, spare_runs;
};
static inline struct studies_sample studies_sample(const struct plan *p, const struct scenario *s, size_t n)
{
    const struct question *const q = scenario_question(s);
    struct design d;
    struct play play;
    studies_lay(&d, p, s);
    play_start(&play, &d, scenario_seed(s));
    play.measured = q->has_against && q->against_is == AGAINST_MEASURED;
    play.fractions = play.measured ? 2 : 1;
    play.fraction[0] = q->expect;
    play.fraction[1] = q->against;
    play.analyses = 1;
    play.analysis[0] = p->analysis;
    play.active[0] = true;
    assert_true(play_until(&play, n));
    struct studies_sample out = {.n = n, .clock_s = play.clock_s.mean, .spare_runs = play.spare_runs.mean};
    double squares = 0.0;
    const double *const x = play.sample[0].delta[0];
    for (size_t i = 0; i < n; i++) out.mean += x[i] / (double)n;
    for (size_t i = 0; i < n; i++) squares += (x[i] - out.mean) * (x[i] - out.mean);
    out.sd = sqrt(squares / (double)(n - 1));
    out.sd_se = out.sd / sqrt(2.0 * (double)n);
    play_free(&play);
    design_free(&d);
    return out;
}

#endif
