/* The parallel loop: the same bytes from any number of threads. */
#include "check.h"

#include <stdlib.h>
#include <string.h>
#include <time.h>

#include "sim/base/spread.h"

enum { ITEMS = 300, SLOT = 24, SCRATCH = 5000 };

static const int crowd[] = {1, 2, 3, 8};
enum { CROWDS = sizeof crowd / sizeof *crowd };

/* What the items are told: how long to stay, so that others come in between. */
struct task {
    long stay_ns;
    uint64_t salt;
};

static void stay(long ns)
{
    const struct timespec moment = {0, ns};
    nanosleep(&moment, NULL);
}

/* Fills all of its scratch, waits, and puts a digest of it into its slot, whose
 * last eight bytes it leaves alone. */
static void digest(size_t index, const void *context, void *slot, void *scratch)
{
    const struct task *const task = context;
    unsigned char *const bytes = scratch, *const out = slot;
    for (size_t i = 0; i < SCRATCH; i++)
        bytes[i] = (unsigned char)(index * 131 + i * 7 + task->salt);
    stay(task->stay_ns);
    uint64_t sum = task->salt ^ index;
    for (size_t i = 0; i < SCRATCH; i++)
        sum = (sum ^ bytes[i]) * UINT64_C(0x100000001b3);
    memcpy(out, &index, sizeof index);
    memcpy(out + sizeof index, &sum, sizeof sum);
}

static void run(unsigned char *slots, int threads, struct spread_range range)
{
    const struct task task = {20000, 99};
    memset(slots, 0xee, (ITEMS + 2) * SLOT);
    spread_set_threads(threads);
    assert_true(spread(range, digest, &task, slots + SLOT, (struct spread_size){SLOT, SCRATCH}));
}

static void any_number_of_threads(void **state)
{
    (void)state;
    static unsigned char alone[(ITEMS + 2) * SLOT], many[(ITEMS + 2) * SLOT];
    run(alone, 1, (struct spread_range){0, ITEMS});
    for (int i = 0; i < CROWDS; i++) {
        run(many, crowd[i], (struct spread_range){0, ITEMS});
        assert_memory_equal(many, alone, sizeof many); /* TEXT: exact bytes */
    }
}

/* Item first + i writes slot i, once, and nothing outside the slots is touched. */
static void range_begins_anywhere(void **state)
{
    (void)state;
    static unsigned char slots[(ITEMS + 2) * SLOT], blank[SLOT];
    memset(blank, 0xee, sizeof blank);
    for (int i = 0; i < CROWDS; i++) {
        const struct spread_range range = {70000, ITEMS - 1};
        run(slots, crowd[i], range);
        for (size_t j = 0; j < range.count; j++) {
            size_t index;
            memcpy(&index, slots + (j + 1) * SLOT, sizeof index);
            assert_int_equal(index, range.first + j);
            assert_memory_equal(slots + (j + 1) * SLOT + 16, blank, SLOT - 16);
        }
        assert_memory_equal(slots, blank, SLOT);
        assert_memory_equal(slots + (range.count + 1) * SLOT, blank, SLOT);
    }
}

/* Whether the scratch still was the item's own after a while, and where it lay. */
struct seen {
    size_t spoilt;
    uintptr_t at;
};

static void linger(size_t index, const void *context, void *slot, void *scratch)
{
    const struct task *const task = context;
    struct seen *const seen = slot;
    unsigned char *const bytes = scratch;
    memset(bytes, (int)(index & 255U), SCRATCH);
    stay(task->stay_ns);
    seen->spoilt = 0;
    for (size_t i = 0; i < SCRATCH; i++)
        seen->spoilt += bytes[i] != (index & 255U);
    seen->at = (uintptr_t)scratch;
}

static void scratch_is_private(void **state)
{
    (void)state;
    static struct seen seen[ITEMS];
    const struct task task = {200000, 0};
    spread_set_threads(8);
    assert_true(
        spread((struct spread_range){0, ITEMS}, linger, &task, seen, (struct spread_size){sizeof *seen, SCRATCH}));
    size_t apart = 0;
    for (size_t i = 0; i < ITEMS; i++) {
        assert_int_equal(seen[i].spoilt, 0);
        for (size_t j = 0; j < i; j++) {
            const uintptr_t way = seen[i].at > seen[j].at ? seen[i].at - seen[j].at : seen[j].at - seen[i].at;
            assert_true(way == 0 || way >= SCRATCH + 64); /* a cache line between two at least */
            apart += way != 0;
        }
    }
#ifdef _OPENMP
    assert_true(apart > 0); /* else there was no one to keep out */
#else
    assert_int_equal(apart, 0);
#endif
}

static void never(size_t index, const void *context, void *slot, void *scratch)
{
    (void)index, (void)context, (void)slot, (void)scratch;
    fail_msg("an item of an empty range");
}

static void nothing_to_do(void **state)
{
    (void)state;
    unsigned char slot[4] = {1, 2, 3, 4};
    for (int i = 0; i < CROWDS; i++) {
        spread_set_threads(crowd[i]);
        assert_true(spread((struct spread_range){5, 0}, never, NULL, slot, (struct spread_size){sizeof slot, 16}));
        assert_true(spread((struct spread_range){0, 0}, never, NULL, NULL, (struct spread_size){0, 0}));
    }
    assert_memory_equal(slot, ((unsigned char[]){1, 2, 3, 4}), sizeof slot);
}

static void count_only(size_t index, const void *context, void *slot, void *scratch)
{
    (void)context, (void)scratch;
    *(size_t *)slot = index + 1;
}

static void no_scratch_is_fine(void **state)
{
    (void)state;
    size_t slots[ITEMS] = {0};
    spread_set_threads(3);
    assert_true(
        spread((struct spread_range){0, ITEMS}, count_only, NULL, slots, (struct spread_size){sizeof *slots, 0}));
    for (size_t i = 0; i < ITEMS; i++)
        assert_int_equal(slots[i], i + 1);
}

/* Memory that there is not: said, and nothing is done. (A sanitizer ends the
 * program when that much is asked for.) */
static void no_memory_is_said(void **state)
{
    (void)state;
#ifdef __SANITIZE_ADDRESS__
    assert_true(spread((struct spread_range){0, 0}, never, NULL, NULL, (struct spread_size){0, SCRATCH}));
#else
    spread_set_threads(1);
    assert_false(spread((struct spread_range){0, ITEMS}, never, NULL, NULL, (struct spread_size){0, PTRDIFF_MAX / 2}));
#endif
}

static void threads_are_what_was_set(void **state)
{
    (void)state;
    for (int i = 0; i < CROWDS; i++) {
        spread_set_threads(crowd[i]);
#ifdef _OPENMP
        assert_int_equal(spread_threads(), crowd[i]);
#else
        assert_int_equal(spread_threads(), 1);
#endif
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(any_number_of_threads),    cmocka_unit_test(range_begins_anywhere),
        cmocka_unit_test(scratch_is_private),       cmocka_unit_test(nothing_to_do),
        cmocka_unit_test(no_scratch_is_fine),       cmocka_unit_test(no_memory_is_said),
        cmocka_unit_test(threads_are_what_was_set),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
