/* The built-in kit, and how a scenario's entries stand on it. */
#include "scenario/reading.h"

#include <math.h>

#include "models/tube.h"
#include "sim/scenario/kit.h"
#include "sim/scenario/record.h"

static const struct {
    enum keys_id kind;
    const char *names[8];
} promised[] = {
    {KEYS_GRADES, {"low", "middle", "high", "middle-88"}},
    {KEYS_TUBES,
     {"suspended-0", "suspended-0c", "suspended-0a", "suspended-1", "constant-25", "constant-50", "constant-75"}},
    {KEYS_BATHS, {"beaker-on-hot-plate", "insulated-beaker", "circulator", "viscometry-bath"}},
    {KEYS_THERMOMETERS, {"probe", "pt100", "thermocouple", "glass"}},
    {KEYS_TIMERS, {"by-hand", "careful", "light-gate", "first-time"}},
    {KEYS_MATERIALS,
     {"pvoh-water-25C", "pvoh-water-25C-a63", "pvoh-water-30C-a64", "pvoh-water-30C-a64-weight", "pvoh-water-30C-a628",
      "pvoh-water-30C-a62"}},
    {KEYS_BENCHES, {"research", "teaching"}},
};

static int open_kit(void **state)
{
    struct complaints *out = complain_new();
    *state = scenario_built_in(out);
    complain_print(out, stdout);
    complain_free(out);
    return *state ? 0 : -1;
}

static int close_kit(void **state)
{
    scenario_free(*state);
    return 0;
}

static void holds_what_is_promised(void **state)
{
    for (size_t i = 0; i < sizeof promised / sizeof *promised; i++)
        for (size_t j = 0; j < 8 && promised[i].names[j]; j++)
            assert_non_null(kit_find(scenario_kit(*state), promised[i].kind, promised[i].names[j]));
}

/* A source on every value, its own in the kit or the default's; no prices. */
static void has_a_source_for_every_value(void **state)
{
    for (size_t kind = KEYS_GRADES; kind <= KEYS_BENCHES; kind++)
        for (const struct record *e = scenario_kit(*state)->first[kind]; e; e = e->next)
            for (size_t i = 0; i < keys_count(e->section); i++) {
                const struct value *v = &e->values[i];
                const char *key = keys_row(e->section, i)->key;
                const bool free = v->state == VALUE_ABSENT || strcmp(key, "name") == 0 || strcmp(key, "like") == 0;
                if (!free && !(v->source && v->source[0]))
                    print_message("%s.%s\n", e->name, key);
                assert_true(free || (v->source && v->source[0]));
                if (strncmp(key, "price", 5) == 0)
                    assert_true(fabs(v->number) <= 0.0);
            }
}

/* Poiseuille's law gives the constant of every tube from its geometry, within
 * 5 % for the heads from memory (checks of the kit), computed there. */
static void tubes_fit_poiseuille(void **state)
{
    for (const struct record *e = scenario_kit(*state)->first[KEYS_TUBES]; e; e = e->next) {
        const double by_law = tube_constant_poiseuille(record_number(e, "bore"), record_number(e, "head"),
                                                       record_number(e, "bulb_volume"), record_number(e, "length"));
        const double ratio = by_law / record_number(e, "constant");
        if (fabs(ratio - 1.0) > 0.05)
            print_message("%s: %g\n", e->name, ratio);
        assert_true(fabs(ratio - 1.0) <= 0.05);
    }
}

static struct bath bath_of(const char *kit, const char *name)
{
    char text[600];
    snprintf(text, sizeof text, "%splan: {grade: middle, bath: %s}\nkit: {baths: [%s]}\n", READING_QUESTION, name, kit);
    return reading_plan(text, NULL).bath;
}

static void assert_bath(struct bath b, double fluctuation_mK, double day_u_mK)
{
    assert_true(fabs(b.fluctuation_K * 1e3 - fluctuation_mK) < 1e-9);
    assert_true(fabs(b.day_u_K * 1e3 - day_u_mK) < 1e-9);
}

/* viscometry-bath has 10 and 5 mK, circulator 20 and 10, the defaults 20 and
 * 10, beaker-on-hot-plate 200 and 100. */
static void an_entry_takes_what_it_leaves_out(void **state)
{
    (void)state;
    assert_bath(bath_of("{name: viscometry-bath, fluctuation: 7 mK}", "viscometry-bath"), 7, 5);
    assert_bath(bath_of("{name: mine, like: viscometry-bath, day_u: 1 mK}", "mine"), 10, 1);
    assert_bath(bath_of("{name: mine, day_u: 1 mK}", "mine"), 20, 1);
    assert_bath(bath_of("{name: viscometry-bath, like: beaker-on-hot-plate, day_u: 1 mK}", "viscometry-bath"), 200, 1);
    assert_bath(bath_of("{name: viscometry-bath, like: viscometry-bath, day_u: 1 mK}", "viscometry-bath"), 10, 1);
    assert_bath(
        bath_of("{name: one, like: two}, {name: two, like: three, day_u: 3 mK}, {name: three, fluctuation: 9 mK}",
                "one"),
        9, 3);
    assert_bath(bath_of("{name: mine, like: viscometry-bath}, {name: viscometry-bath, fluctuation: 7 mK}", "mine"), 7,
                5);
}

static double kinetic_of(const char *entry)
{
    char text[600];
    snprintf(text, sizeof text, "%splan: {grade: middle, tube: mine}\nkit: {tubes: [%s]}\n", READING_QUESTION, entry);
    return reading_plan(text, NULL).tube.kinetic;
}

static void kinetic_coefficients(void **state)
{
    (void)state;
    const double flared = tube_kinetic_flared(5.6e-6, 0.09, 0.47e-3, 3e-9), square = tube_kinetic_square(5.6e-6, 0.09);
    assert_true(fabs(kinetic_of("{name: mine}") / flared - 1.0) < 1e-12);
    assert_true(fabs(kinetic_of("{name: mine, ends: square}") / square - 1.0) < 1e-12);
    assert_true(fabs(kinetic_of("{name: mine, E: 95 mm2 s}") / 95e-6 - 1.0) < 1e-12);
    assert_true(fabs(kinetic_of("{name: mine, E: 0 mm2 s}")) <= 0.0);
    assert_true(fabs(kinetic_of("{name: mine, ends: square, B: 1 mm2}") / 1e-6 - 1.0) < 1e-12);
    /* a coefficient is inherited, but not with other ends */
    assert_true(fabs(kinetic_of("{name: mine, like: other}, {name: other, E: 95 mm2 s}") / 95e-6 - 1.0) < 1e-12);
    assert_true(fabs(kinetic_of("{name: mine, like: other, ends: square}, {name: other, E: 95 mm2 s}") / square - 1.0) <
                1e-12);
}

/* A name with a slip of the pen in --set would make an entry that no plan uses. */
static void a_set_makes_no_entry(void **state)
{
    (void)state;
    reading_bad(READING_SMALL, "kit.baths.circulatr.fluctuation=1 mK", NULL,
                "--set kit.baths.circulatr.fluctuation: no entry `circulatr` in kit.baths; did you mean `circulator`?");
    scenario_free(reading_good(READING_SMALL, "kit.baths=[{name: mine}]", NULL));
    scenario_free(reading_good(READING_SMALL "kit: {baths: {name: mine}}\n", "kit.baths.mine.fluctuation=1 mK", NULL));
    assert_bath(reading_plan(READING_SMALL, "kit.baths.circulator.fluctuation=1 mK").bath, 1, 10);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(holds_what_is_promised), cmocka_unit_test(has_a_source_for_every_value),
        cmocka_unit_test(tubes_fit_poiseuille),   cmocka_unit_test(an_entry_takes_what_it_leaves_out),
        cmocka_unit_test(kinetic_coefficients),   cmocka_unit_test(a_set_makes_no_entry),
    };
    return cmocka_run_group_tests(tests, open_kit, close_kit);
}
