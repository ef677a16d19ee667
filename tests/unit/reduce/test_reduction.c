/* From a notebook to the fraction: worked by hand, against NumPy on a made-up
 * notebook, and what has no answer. */
#include "reduce/book.h"
#include "reference.h"

enum { LANE = 5 };

/* Reads nothing, corrects nothing, one run a filling; a = 1 so that Mv is
 * linear: [eta] 0.01 m3/kg is 1 kg/mol. */
static struct assumed plain(struct polymer_sums *sums)
{
    polymer_sums_make(sums, 1.0);
    return (struct assumed){.agreement = 1.0,
                            .ends = TUBE_FLARED,
                            .water_m2_s = 1e-6,
                            .levels = {2, 2},
                            .conc_kg_m3 = {{10.0, 20.0}, {10.0, 20.0}},
                            .density_ratio = {{1.0, 1.0}, {1.0, 1.0}},
                            .K_m3_kg = 1e-5,
                            .a = 1.0,
                            .unit_kg_mol = 0.05,
                            .r = 2.0,
                            .neighbours = NEIGHBOURS_INDEPENDENT,
                            .head_to_head_chance = 1.0,
                            .sums = sums};
}

static const struct analysis usual = {.extrapolation = HUGGINS, .chain_statistics = CHAIN_CONTINUOUS};

/* One day: a water filling, then a filling for each level, each of one run. */
static struct book *five_fillings(double water_s, const double level_s[SERIES][2])
{
    struct book *const b = book_open(1);
    book_add(b, (struct notebook_filling){.water = true, .runs = 1});
    for (size_t s = 0; s < SERIES; s++)
        for (size_t j = 0; j < 2; j++)
            book_add(b, (struct notebook_filling){.series = s, .level = j, .runs = 1});
    book_lay(b);
    for (size_t f = 0; f < 5; f++)
        for (int l = 0; l < LANES; l++)
            book_enter(b, f, l, f == 0 ? water_s : level_s[(f - 1) / 2][(f - 1) % 2], (double)NAN);
    return b;
}

/* t0 100 s. Intact 140 and 180 s: eta_sp/c = 0.04 m3/kg twice, Mv 4 kg/mol.
 * Cleaved 120 and 140 s: 0.02, Mv' 2. delta = 0.05 2 (1/2 - 1/4) = 2.5 %.
 * Discrete, a = 1: xv = 2 xn - 1, so xn = 40.5 and 20.5, and delta =
 * (1/20.5 - 1/40.5)/(1 - 1/40.5) = 20/(20.5 39.5). */
static void by_hand(void **state)
{
    (void)state;
    struct polymer_sums sums;
    struct assumed a = plain(&sums);
    struct book *const b = five_fillings(100.0, (const double[SERIES][2]){{140.0, 180.0}, {120.0, 140.0}});
    struct reduction_result out = book_reduce(b, &a, &usual);
    const char *const why = "ROUND a few dozen operations";
    check_close(out.intrinsic_m3_kg[INTACT][LANE], 0.04, 1e-15, why);
    check_close(out.intrinsic_m3_kg[CLEAVED][LANE], 0.02, 1e-15, why);
    check_close(out.molar_mass_kg_mol[INTACT][LANE], 4.0, 1e-13, why);
    check_close(out.molar_mass_kg_mol[CLEAVED][LANE], 2.0, 1e-13, why);
    check_close(out.delta[LANE], 0.025, 1e-15, why);
    out = book_reduce(b, &a, &(struct analysis){.extrapolation = HUGGINS, .chain_statistics = CHAIN_DISCRETE});
    check_close(out.delta[LANE], 20.0 / (20.5 * 39.5), 1e-14, why);
    a.head_to_head_chance = 0.8; /* fewer links are cut than there are */
    out = book_reduce(b, &a, &usual);
    check_close(out.delta[LANE], 0.025 / 0.8, 1e-15, why);
    out = book_reduce(b, &a, &(struct analysis){.extrapolation = HUGGINS, .chain_statistics = CHAIN_DISCRETE});
    check_close(out.delta[LANE], 20.0 / (20.5 * 39.5) / 0.8, 1e-14, why);
    free(b);
}

static double relative_of(struct book *b, const struct assumed *a, const struct analysis *how, size_t series,
                          size_t level)
{
    struct reduction_levels levels;
    book_bring(b, a);
    reduction_combine(a, &b->book, &b->times);
    reduction_relative(a, how, &b->book, &b->times, &levels);
    return levels.relative[series][level][LANE];
}

/* nu_w 1 mm2/s, t0 100 s. Flared, E 100 mm2 s: k(t0) = 0.01, C = 0.0101,
 * C 200 - 100/200^2 = 2.0175. Square, B 1 mm2: 2.02 - 0.005 = 2.015. Density
 * ratio 1.01 where it is corrected. */
static void corrections_by_hand(void **state)
{
    (void)state;
    struct polymer_sums sums;
    struct assumed a = plain(&sums);
    a.density_ratio[CLEAVED][1] = 1.01;
    struct book *const b = five_fillings(100.0, (const double[SERIES][2]){{140.0, 180.0}, {120.0, 200.0}});
    const struct analysis nothing = {0}, kinetic = {.kinetic_corrected = true}, density = {.density_corrected = true},
                          both = {.kinetic_corrected = true, .density_corrected = true};
    a.kinetic = 100e-6;
    check_round(relative_of(b, &a, &nothing, CLEAVED, 1), 2.0, 8.0);
    check_round(relative_of(b, &a, &density, CLEAVED, 1), 2.02, 8.0);
    check_round(relative_of(b, &a, &kinetic, CLEAVED, 1), 2.0175, 8.0);
    check_round(relative_of(b, &a, &both, CLEAVED, 1), 2.0175 * 1.01, 8.0);
    check_round(relative_of(b, &a, &both, CLEAVED, 0), 1.212 - 100.0 / 14400.0, 8.0); /* density ratio 1 */
    a.ends = TUBE_SQUARE;
    a.kinetic = 1e-6;
    check_round(relative_of(b, &a, &kinetic, CLEAVED, 1), 2.015, 8.0);
    check_round(relative_of(b, &a, &nothing, CLEAVED, 1), 2.0, 8.0);
    free(b);
}

/* Each day has its own water, the mean of its fillings; a day without takes
 * the first day's. A level is the mean over its fillings, on whichever day. */
static void water_of_the_day(void **state)
{
    (void)state;
    struct polymer_sums sums;
    const struct assumed a = plain(&sums);
    for (int own = 0; own < 2; own++) {
        struct book *const b = book_open(2);
        const double time_s[] = {99.0, 101.0, 150.0, 125.0, 130.0, 200.0};
        book_add(b, (struct notebook_filling){.water = true, .runs = 1});
        book_add(b, (struct notebook_filling){.water = true, .number = 1, .runs = 1});
        book_add(b, (struct notebook_filling){.series = CLEAVED, .level = 1, .runs = 1});
        if (own) {
            book_add(b, (struct notebook_filling){.water = true, .day = 1, .runs = 1});
            book_add(b, (struct notebook_filling){.water = true, .day = 1, .number = 1, .runs = 1});
        }
        book_add(b, (struct notebook_filling){.series = CLEAVED, .level = 1, .number = 1, .day = 1, .runs = 1});
        book_lay(b);
        for (size_t f = 0; f < b->layout.fillings; f++)
            for (int l = 0; l < LANES; l++)
                book_enter(b, f, l, f + 1 == b->layout.fillings ? 200.0 : time_s[f], (double)NAN);
        const double second_day = own ? 127.5 : 100.0;
        check_round(relative_of(b, &a, &usual, CLEAVED, 1), 0.5 * (150.0 / 100.0 + 200.0 / second_day), 8.0);
        check_round(b->times.water_s[0][LANE], 100.0, 4.0);
        check_round(b->times.water_s[1][LANE], second_day, 4.0);
        free(b);
    }
}

/* ---- no answer ---- */

static double delta_of(const double level_s[SERIES][2], enum extrapolation extrapolation,
                       enum chain_statistics statistics)
{
    struct polymer_sums sums;
    const struct assumed a = plain(&sums);
    struct book *const b = five_fillings(100.0, level_s);
    const struct reduction_result out =
        book_reduce(b, &a, &(struct analysis){.extrapolation = extrapolation, .chain_statistics = statistics});
    free(b);
    return out.delta[LANE];
}

static void no_answer(void **state)
{
    (void)state;
    static const struct {
        double level_s[SERIES][2];
        enum extrapolation line;
    } hopeless[] = {
        {{{140.0, 180.0}, {99.0, 140.0}}, MARTIN},   /* a level quicker than water has no logarithm */
        {{{99.0, 180.0}, {120.0, 140.0}}, MARTIN},   /* nor has an intact one */
        {{{140.0, 180.0}, {100.0, 140.0}}, MARTIN},  /* as quick as water: nor zero */
        {{{140.0, 180.0}, {105.0, 140.0}}, HUGGINS}, /* 0.005 and 0.02 go through -0.01 */
        {{{140.0, 180.0}, {105.0, 140.0}}, KRAEMER}, /* 0.004879 and 0.016824 go through -0.007 */
        {{{140.0, 180.0}, {105.0, 140.0}}, COMMON_INTERCEPT},
        {{{105.0, 180.0}, {120.0, 140.0}}, HUGGINS}, /* the intact series */
        {{{140.0, 180.0}, {(double)NAN, 140.0}}, HUGGINS},
        {{{140.0, 180.0}, {(double)NAN, 140.0}}, SINGLE_POINT},
    };
    for (size_t i = 0; i < sizeof hopeless / sizeof *hopeless; i++)
        for (int statistics = 0; statistics < 2; statistics++)
            assert_true(isnan(delta_of(hopeless[i].level_s, hopeless[i].line, (enum chain_statistics)statistics)));
}

/* Mv' of 0.05 kg/mol is one unit: no 50 % of cuts gives that; the continuous
 * formula says a number all the same. 0.5 kg/mol is ten units: an answer. */
static void too_many_cuts(void **state)
{
    (void)state;
    const double units_1[SERIES][2] = {{140.0, 180.0}, {100.5, 101.0}},
                 units_10[SERIES][2] = {{140.0, 180.0}, {105.0, 110.0}};
    assert_true(isnan(delta_of(units_1, HUGGINS, CHAIN_DISCRETE)));
    check_close(delta_of(units_1, HUGGINS, CHAIN_CONTINUOUS), 0.1 * (1.0 / 0.05 - 0.25), 1e-12,
                "ROUND eta_r - 1 loses three digits");
    check_close(delta_of(units_10, HUGGINS, CHAIN_DISCRETE), (1.0 / 5.5 - 1.0 / 40.5) / (1.0 - 1.0 / 40.5), 1e-13,
                "ROUND eta_r - 1 loses a digit");
}

/* An Mv' above Mv is a number below zero, not a missing one: Mv 2, Mv' 4. */
static void fewer_cuts_than_none(void **state)
{
    (void)state;
    const double level_s[SERIES][2] = {{120.0, 140.0}, {140.0, 180.0}};
    check_close(delta_of(level_s, HUGGINS, CHAIN_CONTINUOUS), -0.025, 1e-15, "ROUND a few dozen operations");
    /* xn 20.5 to 40.5 */
    check_close(delta_of(level_s, HUGGINS, CHAIN_DISCRETE), (1.0 / 40.5 - 1.0 / 20.5) / (1.0 - 1.0 / 20.5), 1e-14,
                "ROUND a few dozen operations");
}

/* ---- a made-up notebook, tests/reference/notebook.tsv ---- */

enum { RUNS = 60, ROWS = 16 };

static void tell(const struct reference_row *row, struct notebook_filling *filling)
{
    char word[32];
    reference_word(row, 0, word);
    *filling = (struct notebook_filling){.water = strcmp(word, "water") == 0,
                                         .series = strcmp(word, "cleaved") == 0 ? CLEAVED : INTACT,
                                         .day = (size_t)reference_argument(row, 1),
                                         .level = (size_t)reference_argument(row, 2),
                                         .number = (size_t)reference_argument(row, 3),
                                         .runs = 3};
}

/* The notebook in one lane; a hundredth of a second more or less in the others. */
static struct book *made_up(void)
{
    static struct reference_row row[RUNS];
    struct book *const b = book_open(2);
    const size_t n = reference_read("notebook.tsv", "run", row, RUNS);
    size_t of[RUNS];
    struct notebook_filling last = {.runs = 0}, now;
    for (size_t i = 0; i < n; i++, last = now) {
        tell(&row[i], &now);
        const bool same = i > 0 && now.water == last.water && now.series == last.series && now.day == last.day &&
                          now.level == last.level && now.number == last.number;
        of[i] = same ? of[i - 1] : book_add(b, now);
    }
    book_lay(b);
    for (size_t i = 0; i < n; i++)
        for (int l = 0; l < LANES; l++)
            book_enter(b, of[i], l, row[i].number + 0.01 * (double)((l - LANE) * (1 + (int)i % 3)),
                       273.15 + reference_argument(&row[i], 4));
    assert_int_equal(b->layout.fillings, 16);
    return b;
}

static struct assumed analyst(struct polymer_sums *sums, enum combine combine)
{
    struct assumed a = book_base_case(sums);
    a.record = true;
    a.agreement = 0.002;
    a.combine = combine;
    a.kinetic = tube_kinetic_flared(5.6e-6, 0.090, 0.47e-3, 0.003e-6);
    a.unit_kg_mol = polymer_unit_kg_mol(0.985, 0.04405, 0.08609);
    a.head_to_head_chance = 0.98 * 0.985 * 0.985;
    for (size_t s = 0; s < SERIES; s++) {
        a.levels[s] = 3;
        for (size_t j = 0; j < 3; j++) {
            a.conc_kg_m3[s][j] = (s == INTACT ? 2.0 : 8.0) * (double)(j + 1);
            a.density_ratio[s][j] =
                1.0 + a.conc_kg_m3[s][j] * (1.0 - 0.765e-3 * water_density(298.15)) / water_density(298.15);
        }
    }
    return a;
}

static int choice(const struct reference_row *row, size_t i, const char *const *words)
{
    char word[32];
    reference_word(row, i, word);
    for (int k = 0; words[k]; k++)
        if (strcmp(words[k], word) == 0)
            return k;
    fail_msg("no choice is called %s", word);
    return 0;
}

static struct analysis analysis_of(const struct reference_row *row)
{
    static const char *const
        line[] = {"huggins", "kraemer", "martin", "common-intercept", "single-point", NULL},
        *const weight[] = {"equal", "c-squared", NULL}, *const density[] = {"neglected", "partial-volume", NULL},
        *const kinetic[] = {"neglected", "corrected", NULL}, *const statistics[] = {"discrete", "continuous", NULL};
    return (struct analysis){.extrapolation = (enum extrapolation)choice(row, 0, line),
                             .weighting = (enum weighting)choice(row, 1, weight),
                             .density_corrected = choice(row, 2, density) == 1,
                             .kinetic_corrected = choice(row, 3, kinetic) == 1,
                             .chain_statistics = (enum chain_statistics)choice(row, 4, statistics)};
}

/* Days, two fillings a level, spare runs, a temperature for every run, every
 * way of reducing: against model.md section 3 in NumPy. */
static void against_numpy(void **state)
{
    (void)state;
    static const char *const combine[] = {"mean", "median", NULL};
    struct reference_row row[ROWS];
    struct book *const b = made_up();
    const size_t n = reference_read("notebook.tsv", "delta", row, ROWS);
    assert_true(n >= 12);
    for (size_t i = 0; i < n; i++) {
        struct polymer_sums sums;
        const struct assumed a = analyst(&sums, (enum combine)choice(&row[i], 5, combine));
        const struct analysis how = analysis_of(&row[i]);
        const struct reduction_result out = book_reduce(b, &a, &how);
        check_row(out.delta[LANE], &row[i]);
        if (i > 0)
            continue;
        const struct reference_row intact = reference_one("notebook.tsv", "eta.intact"),
                                   cleaved = reference_one("notebook.tsv", "eta.cleaved");
        check_row(10.0 * out.intrinsic_m3_kg[INTACT][LANE], &intact);
        check_row(10.0 * out.intrinsic_m3_kg[CLEAVED][LANE], &cleaved);
    }
    free(b);
}

/* The bytes of a lane do not depend on the others, whatever they hold. */
static void lanes_never_mix(void **state)
{
    (void)state;
    struct polymer_sums sums;
    const struct assumed a = analyst(&sums, COMBINE_MEAN);
    const struct analysis how = {.extrapolation = MARTIN, .density_corrected = true, .kinetic_corrected = true};
    struct book *const b = made_up();
    const struct reduction_result before = book_reduce(b, &a, &how);
    for (size_t f = 0; f < b->layout.fillings; f++)
        for (int l = 0; l < LANES; l++)
            if (l != LANE) {
                if (l % 2)
                    book_enter(b, f, l, 400.0, 298.0); /* one run more */
                notebook_runs(&b->book, f)[0].time_s[l] = l % 3 ? 50.0 : (double)NAN;
            }
    const struct reduction_result after = book_reduce(b, &a, &how);
    assert_memory_equal(&after.delta[LANE], &before.delta[LANE], sizeof(double));
    assert_false(after.delta[LANE - 1] == before.delta[LANE - 1]);
    for (size_t s = 0; s < SERIES; s++)
        assert_memory_equal(&after.intrinsic_m3_kg[s][LANE], &before.intrinsic_m3_kg[s][LANE], sizeof(double));
    free(b);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(by_hand),       cmocka_unit_test(corrections_by_hand), cmocka_unit_test(water_of_the_day),
        cmocka_unit_test(no_answer),     cmocka_unit_test(too_many_cuts),       cmocka_unit_test(fewer_cuts_than_none),
        cmocka_unit_test(against_numpy), cmocka_unit_test(lanes_never_mix),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
