/* No allocation inside a study: every call of the allocator is counted while
 * whole studies are played. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>

#include <cmocka.h>

#include "sim/base/complain.h"
#include "sim/bench/study.h"
#include "sim/scenario/scenario.h"

static size_t calls;

#ifdef __SANITIZE_ADDRESS__
/* The sanitizer's own hooks; gcc ships no header for them. */
int __sanitizer_install_malloc_and_free_hooks(void (*on_malloc)(const volatile void *, size_t), void (*on_free)(const volatile void *));

static void on_malloc(const volatile void *at, size_t size)
{
    (void)at;
    (void)size;
    calls++;
}

static void on_free(const volatile void *at)
{
    (void)at;
}

static void count_calls(void)
{
    assert_true(__sanitizer_install_malloc_and_free_hooks(on_malloc, on_free) != 0);
}
#else
/* glibc's own names of the allocator, behind the ones counted here. */
void *__libc_malloc(size_t size);
void *__libc_calloc(size_t count, size_t size);
void *__libc_realloc(void *at, size_t size);
void *__libc_memalign(size_t alignment, size_t size);

void *malloc(size_t size)
{
    calls++;
    return __libc_malloc(size);
}

void *calloc(size_t count, size_t size)
{
    calls++;
    return __libc_calloc(count, size);
}

void *realloc(void *at, size_t size)
{
    calls++;
    return __libc_realloc(at, size);
}

void *aligned_alloc(size_t alignment, size_t size)
{
    calls++;
    return __libc_memalign(alignment, size);
}

static void count_calls(void)
{
}
#endif

static void test_a_study_allocates_nothing(void **state)
{
    (void)state;
    const struct scenario_request request = {.path = "tests/bench/reference.yaml"};
    struct complaints *const complaints = complain_new();
    struct scenario *const s = scenario_read(&request, complaints);
    struct plan plan;
    struct design design;
    assert_non_null(s);
    scenario_plan(s, 0, &plan);
    assert_true(design_make(&design, &plan, scenario_cost(s), scenario_question(s)));
    const struct study_job job = {.design = &design, .seed = 1, .fractions = 2, .fraction = {0.015, 0.012}, .analyses = 1, .analysis = &plan.analysis};
    count_calls();
    calls = 0;
    void *const slot = malloc(study_slot_size(&job));
    void *const scratch = aligned_alloc(64, (study_scratch_size(&job) + 63) / 64 * 64);
    assert_non_null(slot);
    assert_non_null(scratch);
    assert_int_equal(calls, 2); /* the counter sees what is taken */
    for (size_t block = 0; block < 100; block++) study_play(block, &job, slot, scratch);
    assert_int_equal(calls, 2);
    free(scratch);
    free(slot);
    design_free(&design);
    scenario_free(s);
    complain_free(complaints);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(test_a_study_allocates_nothing)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
