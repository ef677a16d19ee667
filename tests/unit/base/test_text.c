/* Words, growing strings, and memory by the piece. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <stdalign.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/arena.h"
#include "sim/base/text.h"

static void grows(void **state)
{
    (void)state;
    struct text t = {0};
    for (int i = 0; i < 1000; i++)
        text_add(&t, "%d,", i % 10);
    assert_false(t.failed);
    assert_int_equal(t.size, 2000);
    assert_int_equal(strlen(t.bytes), 2000);
    free(t.bytes);
}

/* Edits counted by hand. */
static void counts_edits(void **state)
{
    (void)state;
    assert_int_equal(text_distance("stock", "stock"), 0);
    assert_int_equal(text_distance("stok", "stock"), 1);
    assert_int_equal(text_distance("question", "questoin"), 1);
    assert_int_equal(text_distance("Grade", "grade"), 0);
    assert_int_equal(text_distance("", "abc"), 3);
    assert_int_equal(text_distance("kitten", "sitting"), 3);
    char word[200];
    memset(word, 'a', sizeof word - 1);
    word[sizeof word - 1] = 0;
    assert_int_equal(text_distance(word, ""), TEXT_WORD);
}

static const char *nearest(const char *word)
{
    static const char *const known[] = {"stock", "stock_volume", "balance_u", "glass", "A"};
    struct text_nearest n = {.word = word};
    for (size_t i = 0; i < sizeof known / sizeof *known; i++)
        text_nearest_try(&n, known[i]);
    return n.best;
}

static void offers_the_nearest_and_nothing_far(void **state)
{
    (void)state;
    assert_string_equal(nearest("stok"), "stock");
    assert_string_equal(nearest("stock-volume"), "stock_volume");
    assert_string_equal(nearest("balance"), "balance_u");
    assert_null(nearest("temperature"));
    assert_null(nearest("C"));
}

static void shortens_at_a_character(void **state)
{
    (void)state;
    char shown[TEXT_SHOWN], word[200] = "";
    assert_string_equal(text_shown(shown, "short"), "short");
    for (int i = 0; i < 90; i++)
        strcat(word, "\xc3\xa4");
    assert_true(text_is_clean(text_shown(shown, word)));
    assert_string_equal(shown + strlen(shown) - 3, "...");
}

static void knows_what_is_clean(void **state)
{
    (void)state;
    assert_true(text_is_clean("M\xc3\xbcller & Co. \xe2\x82\xac"));
    assert_false(text_is_clean("a\tb"));
    assert_false(text_is_clean("a\xff"));
    assert_false(text_is_clean("a\xc2\x85"));
    assert_false(text_is_clean("a\xe2\x80\xa8"));
    assert_false(text_is_clean("a\xc3"));
}

static void gives_memory_by_the_piece(void **state)
{
    (void)state;
    struct arena *a = arena_new();
    for (size_t size = 0; size < 40000; size = size * 2 + 1) {
        unsigned char *piece = arena_take(a, size, 1);
        assert_non_null(piece);
        assert_int_equal((uintptr_t)piece % alignof(max_align_t), 0);
        for (size_t i = 0; i < size; i++)
            assert_int_equal(piece[i], 0);
        memset(piece, 0xff, size);
    }
    assert_string_equal(arena_copy(a, "abcdef", 3), "abc");
    assert_null(arena_take(a, SIZE_MAX / 2, 3));
    assert_null(arena_take(a, SIZE_MAX - 4, 1));
    arena_free(a);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(grows),
        cmocka_unit_test(counts_edits),
        cmocka_unit_test(offers_the_nearest_and_nothing_far),
        cmocka_unit_test(shortens_at_a_character),
        cmocka_unit_test(knows_what_is_clean),
        cmocka_unit_test(gives_memory_by_the_piece),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
