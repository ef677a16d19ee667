/* What the rest of the model costs, per run, against the reference study, and
 * how long a chain distribution takes to work out. Best of several. */
#include <stdio.h>
#include <stdlib.h>
#include <time.h>

#include "models/chains.h"
#include "sim/base/complain.h"
#include "sim/base/spread.h"
#include "sim/bench/study.h"
#include "sim/scenario/scenario.h"

enum { STUDIES = 8192, REPEATS = 9, MOST_SETS = 3 };

static double clock_s(void)
{
    struct timespec now;
    clock_gettime(CLOCK_MONOTONIC, &now);
    return (double)now.tv_sec + 1e-9 * (double)now.tv_nsec;
}

/* Time of one run, of its share of everything [s], at one fraction on one thread. */
static double run_s(const char *const *sets, size_t count)
{
    const struct scenario_request request = {.path = "tests/bench/reference.yaml", .sets = sets, .sets_count = count};
    struct complaints *const complaints = complain_new();
    struct scenario *const s = scenario_read(&request, complaints);
    struct plan plan;
    struct design design;
    complain_print(complaints, stderr);
    if (!s) abort();
    scenario_plan(s, 0, &plan);
    if (!design_make(&design, &plan, scenario_cost(s), scenario_question(s)) || design.why[0]) abort();
    const struct study_job job = {.design = &design, .seed = 1, .fractions = 1, .fraction = {0.015}, .analyses = 1, .analysis = &plan.analysis};
    const struct spread_size size = {study_slot_size(&job), study_scratch_size(&job)};
    void *const slots = malloc(size.slot * (STUDIES / LANES));
    double best = 1e9, runs = 0.0;
    for (size_t f = 0; f < design.layout.fillings; f++) runs += (double)design.filling[f].runs;
    for (int i = 0; i < REPEATS; i++) {
        const double before = clock_s();
        if (!slots || !spread((struct spread_range){0, STUDIES / LANES}, study_play, &job, slots, size)) abort();
        const double now = (clock_s() - before) / STUDIES / runs;
        best = now < best ? now : best;
    }
    free(slots);
    design_free(&design);
    scenario_free(s);
    complain_free(complaints);
    return best;
}

static void table(const char *name, struct chains_shape shape)
{
    struct chains chains;
    const double before = clock_s();
    if (!chains_make(&chains, shape, 0.76)) abort();
    printf("table of %-24s%8.3f s    (asked: under 0.2)\n", name, clock_s() - before);
}

int main(void)
{
    static const struct {
        const char *name, *set[MOST_SETS];
        size_t count;
    } variants[] = {
        {"dilution in the tube", {"plan.dilution=in-tube"}, 1},
        {"blank", {"cleavage.reference=blank", "cleavage.diluent=blank"}, 2},
        {"log-normal chains", {"kit.grades=[{name: middle, distribution: log-normal, dispersity: 2}]"}, 1},
        {"Schulz-Zimm chains", {"kit.grades=[{name: middle, distribution: schulz-zimm, dispersity: 1.5}]"}, 1},
    };
    spread_set_threads(1);
    const double reference = run_s(NULL, 0);
    for (size_t i = 0; i < sizeof variants / sizeof *variants; i++)
        printf("%-30s %8.2f times the reference study, per run (asked: at most 1.3)\n", variants[i].name,
               run_s(variants[i].set, variants[i].count) / reference);
    table("log-normal, D 2", (struct chains_shape){CHAINS_LOG_NORMAL, 2.0, AVERAGE_NUMBER, 2000.0});
    table("Schulz-Zimm, D 1.5", (struct chains_shape){CHAINS_SCHULZ_ZIMM, 1.5, AVERAGE_NUMBER, 2000.0});
    return 0;
}
