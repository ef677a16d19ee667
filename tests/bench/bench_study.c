/* What one simulated study costs, against the bare cost of its random numbers:
 * 600 calls of gsl_ran_gaussian_ziggurat on the same generator, one thread.
 * Ratios of one run; each time is the best of several. With the word `one` as
 * argument only the time of a study is printed, for bench_program.py. */
#include <gsl/gsl_randist.h>
#include <malloc.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/resource.h>
#include <time.h>

#include "sim/base/complain.h"
#include "sim/base/spread.h"
#include "sim/bench/study.h"
#include "sim/scenario/scenario.h"

enum { FLOOR_CALLS = 600, STUDIES = 8192, REPEATS = 15 };

static double clock_s(void)
{
    struct timespec now;
    clock_gettime(CLOCK_MONOTONIC, &now);
    return (double)now.tv_sec + 1e-9 * (double)now.tv_nsec;
}

/* One of the calls that make up the floor's sum, so that none is left out. */
static volatile double sink;

static double floor_s(gsl_rng *rng)
{
    double sum = 0.0;
    const double before = clock_s();
    for (int i = 0; i < STUDIES; i++)
        for (int k = 0; k < FLOOR_CALLS; k++) sum += gsl_ran_gaussian_ziggurat(rng, 1.0);
    sink = sum;
    return (clock_s() - before) / STUDIES;
}

/* Time of one study, all its fractions, on so many threads. */
static double study_s(const struct study_job *job, void *slots, int threads)
{
    const struct spread_size size = {study_slot_size(job), study_scratch_size(job)};
    spread_set_threads(threads);
    const double before = clock_s();
    if (!spread((struct spread_range){0, STUDIES / LANES}, study_play, job, slots, size)) abort();
    return (clock_s() - before) / STUDIES;
}

static double least(double a, double b)
{
    return a < b ? a : b;
}

/* The best ratio of one thread's time over two threads', pair by pair. */
static double two_threads(const struct study_job *job, void *slots)
{
    double best = 0.0;
    for (int i = 0; i < 5; i++) {
        const double one = study_s(job, slots, 1), two = study_s(job, slots, 2);
        if (one / two > best) best = one / two;
    }
    spread_set_threads(1);
    return best;
}

static void report(const struct study_job *one, const struct study_job *pair, void *slots)
{
    gsl_rng *const rng = gsl_rng_alloc(streams_type);
    double bare = 1.0, single = 1.0, both = 1.0;
    for (int i = 0; i < REPEATS; i++) {
        bare = least(bare, floor_s(rng));
        single = least(single, study_s(one, slots, 1));
        both = least(both, study_s(pair, slots, 1));
    }
    gsl_rng_free(rng);
    printf("floor: %d normals                %8.3f us\n", FLOOR_CALLS, bare * 1e6);
    printf("one study at one fraction        %8.3f us   %.2f times the floor (asked: at most 3)\n", single * 1e6, single / bare);
    printf("one study at two fractions       %8.3f us   %.2f times the floor for each\n", both * 1e6, both / bare / 2.0);
    printf("two threads over one             %8.2f      (asked: at least 1.85; best of five pairs)\n", two_threads(one, slots));
}

/* Memory in use before and after a thousand studies on one thread's scratch. */
static int allocations(const struct study_job *job, void *slots)
{
    void *const scratch = aligned_alloc(4096, (study_scratch_size(job) / 4096 + 1) * 4096);
    if (!scratch) abort();
    study_play(0, job, slots, scratch);
    const struct mallinfo2 before = mallinfo2();
    for (size_t block = 0; block < 125; block++) study_play(block, job, slots, scratch);
    const struct mallinfo2 after = mallinfo2();
    free(scratch);
    printf("memory taken by 1,000 studies    %8zu bytes\n", after.uordblks - before.uordblks + after.hblkhd - before.hblkhd);
    return after.uordblks != before.uordblks;
}

int main(int argc, char **argv)
{
    const struct scenario_request request = {.path = "tests/bench/reference.yaml"};
    struct complaints *const complaints = complain_new();
    struct scenario *const s = scenario_read(&request, complaints);
    struct plan plan;
    struct design design;
    complain_print(complaints, stderr);
    if (!s) return 1;
    scenario_plan(s, 0, &plan);
    if (!design_make(&design, &plan, scenario_cost(s), scenario_question(s))) return 1;
    const struct study_job one = {.design = &design, .seed = 1, .fractions = 1, .fraction = {0.015}, .analyses = 1, .analysis = &plan.analysis};
    struct study_job pair = one;
    pair.fractions = 2;
    pair.fraction[1] = 0.012;
    void *const slots = malloc(study_slot_size(&pair) * (STUDIES / LANES));
    if (!slots) return 1;
    int status = 0;
    if (argc > 1 && strcmp(argv[1], "one") == 0) {
        double single = 1.0;
        for (int i = 0; i < REPEATS; i++) single = least(single, study_s(&one, slots, 1));
        printf("%.6f\n", single * 1e6);
    } else {
        report(&one, &pair, slots);
        status = allocations(&one, slots);
    }
    free(slots);
    design_free(&design);
    scenario_free(s);
    complain_free(complaints);
    return status;
}
