/* YAML as a tree with places. */
#include "scenario/reading.h"

#include "sim/scenario/change.h"
#include "sim/scenario/document.h"

struct fixture {
    struct arena *arena;
    struct complaints *out;
};

static int open_document(void **state)
{
    struct fixture *f = calloc(1, sizeof *f);
    f->arena = arena_new();
    f->out = complain_new();
    *state = f;
    return 0;
}

static int close_document(void **state)
{
    struct fixture *f = *state;
    arena_free(f->arena);
    complain_free(f->out);
    free(f);
    return 0;
}

static struct document_node *parse_bytes(struct fixture *f, const char *bytes, size_t size)
{
    return document_parse(f->arena, &(struct document_input){bytes, size, {.file = "s.yaml"}, DOCUMENT_FILE}, f->out);
}

static struct document_node *parse(void **state, const char *text)
{
    return parse_bytes(*state, text, strlen(text));
}

static void assert_at(struct place p, size_t line, size_t column)
{
    assert_int_equal(p.line, line);
    assert_int_equal(p.column, column);
}

static void knows_places(void **state)
{
    const struct document_node *root = parse(state, "a: 1\nb:\n  c: [x, 'y z',\n    ~]\n  d: {e: 2}\n");
    const struct document_node *b = document_child(root, "b"), *c = document_child(b, "c"), *d = document_child(b, "d");
    assert_int_equal(root->kind, DOCUMENT_MAP);
    assert_int_equal(root->count, 2);
    assert_at(document_child(root, "a")->place, 1, 4);
    assert_at(b->key_place, 2, 1);
    assert_at(b->place, 3, 3);
    assert_int_equal(c->kind, DOCUMENT_LIST);
    assert_int_equal(c->count, 3);
    assert_string_equal(c->children->next->text, "y z");
    assert_at(c->children->next->place, 3, 10);
    assert_true(c->last->null);
    assert_at(document_child(d, "e")->place, 5, 10);
    assert_null(document_child(root, "c"));
    assert_null(document_child(c, "c"));
}

static void null_is_unquoted(void **state)
{
    const struct document_node *root = parse(state, "a:\nb: ~\nc: null\nd: ''\ne: \"null\"\nf: no\n");
    for (const char *key = "abc"; *key; key++)
        assert_true(document_child(root, (char[]){*key, 0})->null);
    for (const char *key = "def"; *key; key++)
        assert_false(document_child(root, (char[]){*key, 0})->null);
}

static void a_mark_of_byte_order_is_no_column(void **state)
{
    const struct document_node *root = parse(state, "\xef\xbb\xbf"
                                                    "a: 1\r\nb: 2\r\n");
    assert_at(document_child(root, "a")->place, 1, 4);
    assert_string_equal(document_child(root, "b")->text, "2");
}

static void assert_refused(void **state, const char *text, const char *what)
{
    struct fixture *f = *state;
    const size_t before = complain_count(f->out);
    const struct document_node *root = parse(state, text);
    if (complain_count(f->out) != before + 1)
        complain_print(f->out, stdout);
    assert_int_equal(complain_count(f->out), before + 1);
    assert_non_null(strstr(complain_text(f->out, before), what));
    (void)root;
}

static void refuses(void **state)
{
    assert_refused(state, "", "s.yaml: there is nothing in it");
    assert_refused(state, "a: &x 1\n", "s.yaml:1:4: anchors and aliases");
    assert_refused(state, "a: *x\n", "s.yaml:1:4: anchors and aliases");
    assert_refused(state, "&x a: 1\n", "anchors and aliases");
    assert_refused(state, "a: !!str 1\n", "s.yaml:1:4: tags");
    assert_refused(state, "a: ! 1\n", "tags");
    assert_refused(state, "a: !x {b: 1}\n", "tags");
    assert_refused(state, "a: 1\n---\nb: 1\n", "s.yaml:2:1: a second document");
    assert_refused(state, "? {a: 1}\n: 1\n", "s.yaml:1:3: a key is a word");
    assert_refused(state, "a: 1\nb: 2\na: 3\n", "s.yaml:3:1: `a` is given twice");
    assert_refused(state, "a: \"\\0\"\n", "s.yaml:1:4: a value with a zero byte");
    assert_refused(state, "a: [1\n", "not YAML");
    assert_refused(state, "a: \x80\n", "s.yaml:1:4: not a text file");
    assert_refused(state, "a: b\xc3\xa4\x01\n", "s.yaml:1:7: not a text file");
}

static void refuses_a_zero_byte(void **state)
{
    struct fixture *f = *state;
    assert_null(parse_bytes(f, "a: b\0c\n", 7));
    assert_int_equal(complain_count(f->out), 1);
}

/* Twenty levels stand, one more does not. */
static void refuses_the_deep(void **state)
{
    char text[64] = "";
    for (int i = 0; i < DOCUMENT_DEPTH - 1; i++)
        strcat(text, "[");
    strcat(text, "x");
    for (int i = 0; i < DOCUMENT_DEPTH - 1; i++)
        strcat(text, "]");
    assert_non_null(parse(state, text));
    char deeper[70];
    snprintf(deeper, sizeof deeper, "[%s]", text);
    assert_refused(state, deeper, "nested deeper");
}

static void refuses_the_wide(void **state)
{
    static char text[DOCUMENT_WIDTH * 3 + 10];
    strcpy(text, "[");
    for (int i = 0; i < DOCUMENT_WIDTH; i++)
        strcat(text, "x,");
    const size_t size = strlen(text);
    strcpy(text + size, "]");
    assert_non_null(parse(state, text));
    strcpy(text + size, "x]");
    assert_refused(state, text, "more entries side by side");
}

static struct document_node *change(void **state, struct document_node *root, const char *set)
{
    struct fixture *f = *state;
    change_set(f->arena, root, set, f->out);
    return root;
}

static void changes(void **state)
{
    struct fixture *f = *state;
    struct document_node *root = parse(state, "a: {b: 1}\nempty:\nkit: {baths: {name: x, k: 1}, tubes: [{name: t}]}\n");
    change(state, root, "a.b=2 K");
    change(state, root, "a.c=[1, 2]");
    change(state, root, "empty.d=3");
    change(state, root, "new.e=x=y");
    change(state, root, "kit.baths.x.k=2");
    change(state, root, "kit.baths.y.k=3");
    change(state, root, "kit.tubes.t.k=4");
    change(state, root, "kit.timers.z.k=5");
    assert_int_equal(complain_count(f->out), 0);
    const struct document_node *a = document_child(root, "a"), *b = document_child(a, "b");
    assert_string_equal(b->text, "2 K");
    assert_int_equal(b->origin, DOCUMENT_SET);
    assert_null(b->place.file);
    assert_string_equal(b->place.option, "--set a.b");
    assert_int_equal(document_child(a, "c")->count, 2);
    assert_string_equal(document_child(document_child(root, "empty"), "d")->text, "3");
    assert_string_equal(document_child(document_child(root, "new"), "e")->text, "x=y");
    const struct document_node *kit = document_child(root, "kit"), *baths = document_child(kit, "baths");
    assert_int_equal(baths->count, 2);
    assert_string_equal(document_child(baths->children, "k")->text, "2");
    assert_false(baths->children->made);
    assert_string_equal(document_child(baths->last, "name")->text, "y");
    assert_true(baths->last->made);
    assert_string_equal(document_child(document_child(kit, "tubes")->children, "k")->text, "4");
    assert_string_equal(document_child(document_child(kit, "timers")->children, "k")->text, "5");
}

static void refuses_a_change(void **state)
{
    struct fixture *f = *state;
    struct document_node *root = parse(state, "a: {b: 1, l: [1]}\n");
    static const char *const sets[] = {"a", "=1", "a.b.c=1", "a..b=1", "a.l.0=2", "a.b=", "a.b=[1"};
    for (size_t i = 0; i < sizeof sets / sizeof *sets; i++) {
        change(state, root, sets[i]);
        assert_int_equal(complain_count(f->out), i + 1);
        assert_int_equal(strncmp(complain_text(f->out, i), "--set ", 6), 0);
    }
}

#define DOCUMENT_TEST(f) cmocka_unit_test_setup_teardown(f, open_document, close_document)

int main(void)
{
    const struct CMUnitTest tests[] = {
        DOCUMENT_TEST(knows_places),
        DOCUMENT_TEST(null_is_unquoted),
        DOCUMENT_TEST(a_mark_of_byte_order_is_no_column),
        DOCUMENT_TEST(refuses),
        DOCUMENT_TEST(refuses_a_zero_byte),
        DOCUMENT_TEST(refuses_the_deep),
        DOCUMENT_TEST(refuses_the_wide),
        DOCUMENT_TEST(changes),
        DOCUMENT_TEST(refuses_a_change),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
