/* What an effect does to the fraction when the reduction leaves it out, and
 * what is left when nothing is: the rows of checks.md section 6 through whole
 * notebooks with exact times. */
#include "reduce/book.h"
#include "reference.h"

#include "models/solution.h"

enum { LANE = 0, LEVELS = 5, ROOM = 8 };

/* The base case and what is true beside it. */
struct world {
    enum scission_neighbours neighbours;
    double fraction;
    struct scission_chance chance;
    double unit_kg_mol, xn;
    double kinetic;      /* E */
    double volume_m3_kg; /* partial specific volume; 0: solutions as dense as water */
    double slow;         /* of the solutions' times */
    double dry;          /* polymer in what was weighed */
    enum solution_law law;
};

static struct world base(void)
{
    return (struct world){.neighbours = NEIGHBOURS_INDEPENDENT,
                          .fraction = 0.015,
                          .chance = {1.0, 0.0},
                          .unit_kg_mol = 0.04405,
                          .xn = 1000.0,
                          .slow = 1.0,
                          .dry = 1.0};
}

static const double constant = 0.003e-6, k = 0.45;

static void true_viscosities(const struct world *w, const struct assumed *a, double intrinsic[SERIES])
{
    const struct scission_chains chains = scission_cut(w->neighbours, w->fraction, w->chance, w->xn);
    intrinsic[INTACT] =
        polymer_intrinsic_viscosity(a->K_m3_kg, a->a, w->unit_kg_mol * polymer_xv_of_xn(a->sums, w->xn));
    intrinsic[CLEAVED] = polymer_intrinsic_viscosity(a->K_m3_kg, a->a, w->unit_kg_mol * scission_xv(a->sums, &chains));
}

/* Five levels from a fifth of the top, relative viscosity 1.8 and 1.4 there. */
static void concentrations(const struct world *w, struct assumed *a, const double intrinsic[SERIES])
{
    const double top[SERIES] = {1.8, 1.4}, rho = water_density(a->set_K);
    for (size_t s = 0; s < SERIES; s++) {
        a->levels[s] = LEVELS;
        for (size_t j = 0; j < LEVELS; j++) {
            a->conc_kg_m3[s][j] =
                solution_coil_volume(w->law, k, top[s] - 1.0) / intrinsic[s] * (double)(j + 1) / LEVELS;
            a->density_ratio[s][j] =
                w->volume_m3_kg == 0.0 ? 1.0 : 1.0 + a->conc_kg_m3[s][j] * (1.0 - w->volume_m3_kg * rho) / rho;
        }
    }
}

/* One exact time for water and each level, reduced by someone who assumes `a`
 * and leaves the concentrations to us. */
static struct reduction_result reduce(const struct world *w, struct assumed *a, const struct analysis *how)
{
    double intrinsic[SERIES];
    true_viscosities(w, a, intrinsic);
    concentrations(w, a, intrinsic);
    a->kinetic = w->kinetic;
    struct book *const b = book_open(1);
    const double water_s = tube_efflux(constant, a->ends, w->kinetic, a->water_m2_s);
    double time_s[1 + SERIES * LEVELS] = {water_s};
    book_add(b, (struct notebook_filling){.water = true, .runs = 1});
    for (size_t s = 0; s < SERIES; s++)
        for (size_t j = 0; j < LEVELS; j++) {
            const double relative = 1.0 + solution_specific(w->law, k, intrinsic[s] * a->conc_kg_m3[s][j] * w->dry);
            const double nu = a->water_m2_s * relative / a->density_ratio[s][j];
            time_s[book_add(b, (struct notebook_filling){.series = s, .level = j, .runs = 1})] =
                tube_efflux(constant, a->ends, w->kinetic, nu) * w->slow;
        }
    book_lay(b);
    for (size_t f = 0; f < b->layout.fillings; f++)
        for (int l = 0; l < LANES; l++)
            book_enter(b, f, l, time_s[f], a->set_K);
    const struct reduction_result out = book_reduce(b, a, how);
    free(b);
    return out;
}

static double delta_of(const struct world *w, const struct analysis *how)
{
    struct polymer_sums sums;
    struct assumed a = book_base_case(&sums);
    a.neighbours = w->neighbours;
    return reduce(w, &a, how).delta[LANE];
}

static const struct analysis continuous = {.extrapolation = MARTIN,
                                           .density_corrected = true,
                                           .kinetic_corrected = true,
                                           .chain_statistics = CHAIN_CONTINUOUS};

static void hold(const char *quantity, double value)
{
    const struct reference_row row = reference_one("polymer.tsv", quantity);
    check_row(value, &row);
}

/* ---- nothing is left out ---- */

static void base_case(void **state)
{
    (void)state;
    struct polymer_sums sums;
    struct assumed a = book_base_case(&sums);
    const struct world w = base();
    const struct reduction_result out = reduce(&w, &a, &continuous);
    hold("base.eta", 10.0 * out.intrinsic_m3_kg[INTACT][LANE]);
    hold("base.eta.cut", 10.0 * out.intrinsic_m3_kg[CLEAVED][LANE]);
    hold("base.delta", out.delta[LANE]);
    check_close(out.molar_mass_kg_mol[INTACT][LANE], 83.1720596475, 1e-9, "ROUND eta_r - 1 loses a digit, 1/a");
    check_close(out.molar_mass_kg_mol[CLEAVED][LANE], 5.16416240044, 1e-10, "ROUND eta_r - 1 loses a digit, 1/a");
}

/* Everything corrected, the line that matches the law: discrete statistics
 * return the truth, continuous ones are off by what polymer.tsv says. */
static void only_the_statistics_are_left(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    const size_t n = reference_read("polymer.tsv", "cut.usual", row, ROOM);
    assert_int_equal(n, 2);
    for (size_t i = 0; i < n; i++)
        for (int law = 0; law < 2; law++) {
            char word[32];
            struct world w = base();
            w.neighbours = strcmp(reference_word(&row[i], 0, word), "excluded") == 0 ? NEIGHBOURS_EXCLUDED
                                                                                     : NEIGHBOURS_INDEPENDENT;
            w.xn = reference_argument(&row[i], 1);
            w.fraction = reference_argument(&row[i], 2);
            w.kinetic = 71e-6;
            w.volume_m3_kg = 0.765e-3;
            w.law = law ? SOLUTION_HUGGINS : SOLUTION_MARTIN;
            struct analysis how = continuous;
            how.extrapolation = law ? HUGGINS : MARTIN;
            check_row(100.0 * (delta_of(&w, &how) / w.fraction - 1.0), &row[i]);
            how.chain_statistics = CHAIN_DISCRETE;
            check_close(delta_of(&w, &how) / w.fraction, 1.0, 1e-12,
                        "ROUND eta_r - 1 loses a digit, 1.4 of it in delta");
        }
}

/* ---- something is ---- */

/* Percent of the base case that is found, at each amount of a quantity. */
static void hold_effect(const char *quantity, struct world (*with)(double amount), const struct analysis *how)
{
    struct reference_row row[ROOM];
    const struct world plain = base();
    const double whole = delta_of(&plain, &continuous);
    const size_t n = reference_read("reduction.tsv", quantity, row, ROOM);
    for (size_t i = 0; i < n; i++) {
        const struct world w = with(reference_argument(&row[i], 0));
        check_row(100.0 * (delta_of(&w, how) / whole - 1.0), &row[i]);
    }
}

static struct world moist(double amount)
{
    struct world w = base();
    w.dry = 1.0 - amount;
    return w;
}

static struct world converted(double amount)
{
    struct world w = base();
    w.chance.head_to_head = amount;
    return w;
}

static struct world nonspecific(double amount)
{
    struct world w = base();
    w.chance.other = amount;
    return w;
}

static struct world offset(double amount)
{
    struct world w = base();
    w.slow = 1.0 + 0.01 * amount;
    return w;
}

static struct world dense(double amount)
{
    struct world w = base();
    w.volume_m3_kg = 1e-3 * amount;
    return w;
}

static void moisture(void **state)
{
    (void)state;
    hold_effect("effect.moisture", moist, &continuous);
}

static void conversion(void **state)
{
    (void)state;
    hold_effect("effect.conversion", converted, &continuous);
}

/* And allowed for, it is gone: discrete statistics know X h^2. */
static void conversion_allowed_for(void **state)
{
    (void)state;
    struct world w = converted(0.9);
    struct analysis how = continuous;
    struct polymer_sums sums;
    for (int rule = 0; rule < 2; rule++) {
        struct assumed a = book_base_case(&sums);
        a.neighbours = w.neighbours = rule ? NEIGHBOURS_EXCLUDED : NEIGHBOURS_INDEPENDENT;
        a.head_to_head_chance = 0.9;
        how.chain_statistics = CHAIN_DISCRETE;
        check_close(reduce(&w, &a, &how).delta[LANE] / 0.015, 1.0, 1e-12,
                    "ROUND eta_r - 1 loses a digit, 1.4 of it in delta");
        a.head_to_head_chance = 1.0;
        const double unknown = reduce(&w, &a, &how).delta[LANE];
        if (!rule)
            check_close(unknown / 0.0135, 1.0, 1e-12, "ROUND independent linkages: as if there were fewer");
    }
}

static void nonspecific_cuts(void **state)
{
    (void)state;
    hold_effect("effect.nonspecific", nonspecific, &continuous);
}

static void solution_offset(void **state)
{
    (void)state;
    hold_effect("effect.offset", offset, &continuous);
}

static void density_left_out(void **state)
{
    (void)state;
    struct analysis how = continuous;
    how.density_corrected = false;
    hold_effect("effect.density", dense, &how);
    const struct reference_row row = reference_one("reduction.tsv", "effect.density.eta");
    const struct world w = dense(reference_argument(&row, 0));
    struct polymer_sums sums;
    struct assumed a = book_base_case(&sums);
    const double with = reduce(&w, &a, &continuous).intrinsic_m3_kg[CLEAVED][LANE],
                 without = reduce(&w, &a, &how).intrinsic_m3_kg[CLEAVED][LANE];
    check_row(10.0 * (with - without), &row);
    /* 1/rho_0 - v, but for the curvature that the density leaves */
    check_close(with - without, 1.0 / water_density(298.15) - w.volume_m3_kg, 0.01 * (with - without),
                "SERIES second order in c");
}

/* Residual acetate that the reduction knows nothing of, or only the mass of. */
static void residual_acetate(void **state)
{
    (void)state;
    const char *const quantity[] = {"effect.acetate", "effect.acetate.unit"};
    struct analysis how = continuous;
    how.chain_statistics = CHAIN_DISCRETE;
    for (int i = 0; i < 2; i++) {
        struct reference_row row[ROOM];
        const size_t n = reference_read("reduction.tsv", quantity[i], row, ROOM);
        for (size_t j = 0; j < n; j++) {
            const double h = reference_argument(&row[j], 0);
            struct polymer_sums sums;
            struct assumed a = book_base_case(&sums);
            struct world w = base();
            w.neighbours = NEIGHBOURS_EXCLUDED;
            w.chance.head_to_head = h * h;
            w.unit_kg_mol = polymer_unit_kg_mol(h, 0.04405, 0.08609);
            w.xn = polymer_xn_of_xv(&sums, 85.0 / w.unit_kg_mol);
            if (i)
                a.unit_kg_mol = w.unit_kg_mol;
            check_row(100.0 * (reduce(&w, &a, &how).delta[LANE] / 0.015 - 1.0), &row[j]);
            a.unit_kg_mol = w.unit_kg_mol; /* with all of it known nothing is lost */
            a.head_to_head_chance = h * h;
            check_close(reduce(&w, &a, &how).delta[LANE] / 0.015, 1.0, 1e-12,
                        "ROUND eta_r - 1 loses a digit, 1.4 of it in delta");
        }
    }
}

/* ---- the formula of Flory and Leutner by itself ---- */

static double formula(double K_dL_g, double a, const double intrinsic_dL_g[SERIES])
{
    const struct assumed assumed = {.a = a, .unit_kg_mol = 0.04405, .r = polymer_r(a), .head_to_head_chance = 1.0};
    double Mv[SERIES];
    for (size_t s = 0; s < SERIES; s++)
        Mv[s] = polymer_viscosity_average(0.1 * K_dL_g, a, 0.1 * intrinsic_dL_g[s]);
    return reduction_fraction(&assumed, CHAIN_CONTINUOUS, Mv);
}

static void base_viscosities(double dL_g[SERIES])
{
    struct polymer_sums sums;
    const struct assumed a = book_base_case(&sums);
    const struct world w = base();
    true_viscosities(&w, &a, dL_g);
    for (size_t s = 0; s < SERIES; s++)
        dL_g[s] *= 10.0;
}

/* One pair of intrinsic viscosities, six pairs of constants. */
static void choice_of_the_pair(void **state)
{
    (void)state;
    double intrinsic[SERIES];
    base_viscosities(intrinsic);
    struct reference_row row[ROOM];
    const size_t n = reference_read("polymer.tsv", "pair", row, ROOM);
    assert_int_equal(n, 6);
    for (size_t i = 0; i < n; i++)
        check_row(100.0 * formula(reference_argument(&row[i], 0), reference_argument(&row[i], 1), intrinsic), &row[i]);
}

/* d ln delta by difference quotients; their own error is of the order h^2. */
static void sensitivities(void **state)
{
    (void)state;
    struct reference_row row[ROOM];
    const size_t n = reference_read("polymer.tsv", "sensitivity", row, ROOM);
    assert_int_equal(n, 4);
    for (size_t i = 0; i < n; i++) {
        char word[32];
        double found[2];
        reference_word(&row[i], 0, word);
        for (int side = 0; side < 2; side++) {
            const double h = side ? 1e-5 : -1e-5;
            double intrinsic[SERIES], K = 2e-4, a = 0.76;
            base_viscosities(intrinsic);
            if (strcmp(word, "intact") == 0)
                intrinsic[INTACT] *= 1.0 + h;
            if (strcmp(word, "cleaved") == 0)
                intrinsic[CLEAVED] *= 1.0 + h;
            if (strcmp(word, "K") == 0)
                K *= 1.0 + h;
            if (strcmp(word, "a") == 0)
                a += h;
            found[side] = log(formula(K, a, intrinsic));
        }
        check_row((found[1] - found[0]) / 2e-5, &row[i]);
    }
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(base_case),
        cmocka_unit_test(only_the_statistics_are_left),
        cmocka_unit_test(moisture),
        cmocka_unit_test(conversion),
        cmocka_unit_test(conversion_allowed_for),
        cmocka_unit_test(nonspecific_cuts),
        cmocka_unit_test(solution_offset),
        cmocka_unit_test(density_left_out),
        cmocka_unit_test(residual_acetate),
        cmocka_unit_test(choice_of_the_pair),
        cmocka_unit_test(sensitivities),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
