/* The reduction sees the notebook and what an analyst assumes, nothing else:
 * with the truth gone from memory it says the same. TEXT: exact bytes. */
#include "check.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/bench/study.h"
#include "sim/scenario/scenario.h"

static const struct analysis ways[] = {
    {.extrapolation = MARTIN, .density_corrected = true, .kinetic_corrected = true},
    {.extrapolation = COMMON_INTERCEPT, .weighting = WEIGHT_C_SQUARED, .chain_statistics = CHAIN_CONTINUOUS},
};
enum { WAYS = sizeof ways / sizeof *ways };

/* A scenario's first plan, laid out. */
struct laid {
    struct complaints *complaints;
    struct scenario *scenario;
    struct plan plan;
    struct design design;
};

static void lay(struct laid *l)
{
    const struct scenario_request request = {.path = "scenarios/smallest.yaml"};
    l->complaints = complain_new();
    l->scenario = scenario_read(&request, l->complaints);
    assert_non_null(l->scenario);
    scenario_plan(l->scenario, 0, &l->plan);
    assert_true(design_make(&l->design, &l->plan, scenario_cost(l->scenario), scenario_question(l->scenario)));
}

static void clear(struct laid *l)
{
    design_free(&l->design);
    scenario_free(l->scenario);
    complain_free(l->complaints);
}

static void reduce(const struct assumed *a, const struct notebook *book, struct reduction_result out[WAYS])
{
    void *const memory = calloc(1, reduction_size(book->layout));
    struct reduction_times times = reduction_place(book->layout, memory);
    memset(out, 0, WAYS * sizeof *out);
    reduction_combine(a, book, &times);
    for (size_t i = 0; i < WAYS; i++)
        reduction_run(a, &ways[i], book, &times, &out[i]);
    free(memory);
}

/* What stays on the analyst's side: copies, in memory of their own. */
struct desk {
    struct polymer_sums sums;
    struct assumed assumed;
    struct notebook_layout layout;
    struct notebook book;
    void *memory;
    struct notebook_filling *filling;
};

static void carry(struct desk *desk, const struct design *d, const struct notebook *book)
{
    const size_t bytes = d->layout.fillings * sizeof *desk->filling, size = notebook_size(&d->layout);
    desk->sums = d->lengths.sums;
    desk->assumed = d->assumed;
    desk->assumed.sums = &desk->sums;
    desk->filling = malloc(bytes);
    memcpy(desk->filling, d->layout.filling, bytes);
    desk->layout = d->layout;
    desk->layout.filling = desk->filling;
    desk->memory = malloc(size);
    desk->book = notebook_place(&desk->layout, desk->memory);
    memcpy(desk->memory, book->run, size);
}

static void played(const struct laid *l, uint64_t seed, double fraction, struct reduction_result out[WAYS])
{
    const struct study_job job = {
        .design = &l->design, .seed = seed, .fractions = 1, .fraction = {fraction}, .analyses = WAYS, .analysis = ways};
    void *const slot = calloc(1, study_slot_size(&job)), *const scratch = calloc(1, study_scratch_size(&job));
    study_play(0, &job, slot, scratch);
    for (size_t i = 0; i < WAYS; i++)
        out[i] = *study_result_of(&job, slot, 0, i);
    free(slot);
    free(scratch);
}

static void truth_is_not_needed(void **state)
{
    (void)state;
    struct laid l;
    struct reduction_result whole[WAYS], other[WAYS], after[WAYS];
    lay(&l);
    const double expect = scenario_question(l.scenario)->expect;
    played(&l, 1, expect, whole);
    played(&l, 1, 1.5 * expect, other); /* the truth counts: another fraction, another answer */
    for (size_t i = 0; i < WAYS; i++)
        for (int k = 0; k < LANES; k++)
            assert_true(isfinite(whole[i].delta[k]) && whole[i].delta[k] != other[i].delta[k]);

    const struct study_job job = {
        .design = &l.design, .seed = 1, .fractions = 1, .fraction = {expect}, .analyses = WAYS, .analysis = ways};
    const size_t scratch_size = study_scratch_size(&job);
    void *const scratch = calloc(1, scratch_size);
    const struct notebook_layout *const layout = &l.design.layout;
    struct study_shown shown = {.trace = {calloc(layout->fillings, sizeof(double[LANES])),
                                          calloc(layout->fillings * layout->stride, sizeof(struct bench_traced_run))}};
    struct desk desk;
    study_show(0, &job, 0, scratch, &shown);
    carry(&desk, &l.design, &shown.book);
    memset(scratch, 0, scratch_size); /* truth, bench and draws */
    clear(&l);                        /* the scenario */
    memset(&l, 0xff, sizeof l);       /* the plan and its design */
    reduce(&desk.assumed, &desk.book, after);
    for (size_t i = 0; i < WAYS; i++) {
        assert_memory_equal(after[i].delta, whole[i].delta, sizeof after[i].delta);
        assert_memory_equal(after[i].intrinsic_m3_kg, whole[i].intrinsic_m3_kg, sizeof after[i].intrinsic_m3_kg);
        assert_memory_equal(after[i].molar_mass_kg_mol, whole[i].molar_mass_kg_mol, sizeof after[i].molar_mass_kg_mol);
    }
    free(desk.memory);
    free(desk.filling);
    free(scratch);
    free(shown.trace.started_s);
    free(shown.trace.run);
}

/* What an analyst assumes is that of the expected fraction, whatever the world
 * holds: one design serves both, and its bytes do not change in play. */
static void the_design_is_only_read(void **state)
{
    (void)state;
    struct laid l;
    struct reduction_result out[WAYS];
    lay(&l);
    struct design *const before = malloc(sizeof *before);
    memcpy(before, &l.design, sizeof *before);
    played(&l, 3, 0.02, out);
    assert_memory_equal(before, &l.design, sizeof *before);
    free(before);
    clear(&l);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(truth_is_not_needed),
        cmocka_unit_test(the_design_is_only_read),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
