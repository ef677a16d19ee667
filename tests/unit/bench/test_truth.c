/* What is true in a study: concentrations as made, the pair's uncertainty, the
 * chains. One source on at a time, against the size that the law gives.
 * Source: model.md sections 1 and 5. STAT bands are 4.5 standard errors of
 * 24000 studies; a false alarm 7e-6 each, the seed fixed. */
#include "bench/sample.h"

#include "models/scission.h"

enum { STUDIES = 24000 };
static const double z = SAMPLE_Z;

/* The default plan, still; levels 1 to 4 are intact, 5 to 8 cleaved, of 0.4,
 * 0.6, 0.8 and 1 of the top; flasks of 50 and 200 mL. */
struct stage {
    struct scenario *s;
    struct plan p;
    struct design d;
    struct truth_draws draws;
    struct truth truth;
};

static struct stage *stage(void)
{
    struct stage *const g = calloc(1, sizeof *g);
    assert_non_null(g);
    g->p = still_plan(&g->s);
    return g;
}

static void laid_out(struct stage *g)
{
    design_free(&g->d);
    assert_true(design_make(&g->d, &g->p, scenario_cost(g->s), scenario_question(g->s)));
    assert_string_equal(g->d.why, "");
}

static void leave(struct stage *g)
{
    design_free(&g->d);
    scenario_free(g->s);
    free(g);
}

static void next(struct stage *g, uint64_t study)
{
    const struct draws_key key = draws_key(77, study, (struct draws_exchange){0});
    truth_draw(&g->d, &key, (struct truth_where){0, 0}, &g->draws);
    truth_of(&g->d, &g->draws, 0.015, &g->truth);
}

/* Relative error of the concentration of a level. */
static double off(const struct stage *g, size_t liquid, int lane)
{
    return g->truth.conc_kg_m3[liquid][lane] / g->d.liquid[liquid].conc_kg_m3 - 1.0;
}

/* Dry content: one for all levels of both series. Weighing: one for each
 * stock, or one for both. */
static void dry_content_and_weighing(void **state)
{
    (void)state;
    for (int kind = 0; kind < 3; kind++) {
        struct stage *const g = stage();
        struct sample sums[SERIES] = {{0}}, product = {0};
        if (kind == 0) g->p.solutions.dry_content_u = 0.005;
        if (kind > 0) g->p.solutions.stock_tolerance_m3 = 200e-6 * 0.005 * sqrt(6.0); /* 0.5 % of the stock */
        g->p.solutions.shared_stock = kind == 2;
        laid_out(g);
        still_close_to("stock", g->d.flasks.stock_m3[INTACT], 200e-6, 1e-12);
        for (uint64_t study = 0; study < STUDIES; study += LANES) {
            next(g, study);
            FOR_LANES(l)
            {
                for (size_t k = 0; k < SERIES; k++) {
                    sample_add(&sums[k], off(g, 4 + 4 * k, l));
                    for (size_t i = 1; i < 4; i++) still_near("all levels", off(g, 4 * k + i, l), off(g, 4 + 4 * k, l), 1e-14);
                }
                sample_add(&product, off(g, 4, l) * off(g, 8, l) / 0.005 / 0.005);
                if (kind != 1) still_near("both series", off(g, 4, l), off(g, 8, l), 1e-14);
            }
        }
        for (size_t k = 0; k < SERIES; k++) sample_is_normal("stock", &sums[k], 0.0, 0.005);
        if (kind == 1) still_near("independent", product.mean, 0.0, z / sqrt(product.n));
        leave(g);
    }
}

/* Dilution: the pipette is the study's, its effect goes as 1/V_j; a delivery
 * and a flask belong to the level; what is taken undiluted has none of them. */
static void dilution(void **state)
{
    (void)state;
    struct stage *const g = stage();
    struct sample sums = {0}, apart = {0};
    const double V[3] = {20e-6, 30e-6, 40e-6}; /* 0.4, 0.6, 0.8 of a 50 mL flask */
    g->p.solutions.delivery_tolerance_m3 = sqrt(6.0) * 0.03e-6;
    laid_out(g);
    still_close_to("flask", g->d.flasks.level_m3, 50e-6, 1e-12);
    for (uint64_t study = 0; study < STUDIES; study += LANES) {
        next(g, study);
        FOR_LANES(l)
        {
            sample_add(&sums, off(g, 1, l));
            for (size_t i = 0; i < 3; i++)
                for (size_t k = 0; k < SERIES; k++) still_near("as 1/V", off(g, 1 + i + 4 * k, l) * V[i], off(g, 1, l) * V[0], 1e-20);
            assert_true(g->truth.conc_kg_m3[4][l] == g->d.liquid[4].conc_kg_m3 && g->truth.conc_kg_m3[8][l] == g->d.liquid[8].conc_kg_m3);
        }
    }
    sample_is_normal("pipette", &sums, 0.0, 0.03e-6 / V[0]);
    for (int kind = 0; kind < 2; kind++) {
        g->p.solutions.delivery_tolerance_m3 = 0.0;
        g->p.solutions.delivery_u_m3 = kind == 0 ? 0.02e-6 : 0.0;
        g->p.solutions.level_tolerance_m3 = kind == 1 ? sqrt(6.0) * 0.05e-6 : 0.0;
        laid_out(g);
        struct sample level[8] = {{0}};
        memset(&apart, 0, sizeof apart);
        for (uint64_t study = 0; study < STUDIES; study += LANES) {
            next(g, study);
            FOR_LANES(l)
            {
                for (size_t i = 0; i < 8; i++) sample_add(&level[i], off(g, 1 + i, l));
                sample_add(&apart, off(g, 1, l) * off(g, 2, l) + off(g, 1, l) * off(g, 5, l)); /* another level, another series */
            }
        }
        for (size_t i = 0; i < 8; i++)
            if (i % 4 < 3) sample_is_normal(kind ? "flask" : "delivery", &level[i], 0.0, kind ? 0.05 / 50.0 : 0.02e-6 / V[i % 4]);
        for (size_t k = 0; k < SERIES; k++) assert_true(level[3 + 4 * k].m2 == 0.0);
        const double var = level[0].m2 / level[0].n;
        still_near("independent", apart.mean, 0.0, z * 1.5 * var / sqrt(apart.n)); /* root of (V0/V1)^2 + 1, at most 1.42 */
    }
    leave(g);
}

/* Intrinsic viscosity over the nominal one, from the coil volume as made. */
static double thick(const struct stage *g, size_t series, int lane)
{
    const size_t top = 4 + 4 * series;
    return g->truth.coil[top][lane] / (g->d.chains.intrinsic_m3_kg[series] * g->d.liquid[top].conc_kg_m3);
}

/* The pair knows [eta] to eta_u in the middle of its range, both polymers
 * alike; away from it a_u ln(Mv/Mc) comes on top, Mc = sqrt(20 x 200) = 63.246
 * kg/mol: 0.02 ln(85/63.246) = 0.005913, and below Mc it has the other sign. */
static void the_pair(void **state)
{
    (void)state;
    struct stage *const g = stage();
    struct sample sums = {0}, slope = {0};
    g->p.material.eta_u = 0.05;
    laid_out(g);
    for (uint64_t study = 0; study < STUDIES; study += LANES) {
        next(g, study);
        FOR_LANES(l)
        {
            sample_add(&sums, log(thick(g, INTACT, l)));
            still_near("both polymers", log(thick(g, CLEAVED, l)), log(thick(g, INTACT, l)), 1e-13);
        }
    }
    sample_is_normal("eta_u", &sums, 0.0, 0.05);
    g->p.material.eta_u = 0.0;
    g->p.material.a_u = 0.02;
    laid_out(g);
    const double lever = log(g->d.chains.Mv_kg_mol[CLEAVED] / 63.2455532) / log(85.0 / 63.2455532);
    assert_true(lever < -8.0); /* Mv' is about 5.1 kg/mol */
    for (uint64_t study = 0; study < STUDIES; study += LANES) {
        next(g, study);
        FOR_LANES(l)
        {
            sample_add(&slope, log(thick(g, INTACT, l)));
            still_near("lever", log(thick(g, CLEAVED, l)), lever * log(thick(g, INTACT, l)), 1e-9);
        }
    }
    sample_is_normal("a_u", &slope, 0.0, 0.005913);
    leave(g);
}

/* Interaction constants, each series its own; kinetic coefficient, solution
 * offset and the thermometer's error, one for the study. */
static void constants_of_the_study(void **state)
{
    (void)state;
    struct stage *const g = stage();
    struct sample k[SERIES] = {{0}}, both = {0}, kinetic = {0}, slow = {0}, calibration = {0};
    g->p.material.interaction_u = 0.05;
    g->p.habits.kinetic_u = 0.15;
    g->p.tube.solution_offset = -0.0007;
    g->p.tube.solution_offset_u = 0.0004;
    g->p.thermometer.calibration_u_K = 0.12;
    laid_out(g);
    for (uint64_t study = 0; study < STUDIES; study += LANES) {
        next(g, study);
        FOR_LANES(l)
        {
            for (size_t i = 0; i < SERIES; i++) sample_add(&k[i], g->truth.interaction[i][l] - 0.45);
            sample_add(&both, (g->truth.interaction[INTACT][l] - 0.45) * (g->truth.interaction[CLEAVED][l] - 0.45));
            sample_add(&kinetic, g->truth.kinetic[l] / g->p.tube.kinetic - 1.0);
            sample_add(&slow, g->truth.solution_slow[l] - 1.0 + 0.0007);
            sample_add(&calibration, g->truth.calibration_K[l]);
        }
    }
    for (size_t i = 0; i < SERIES; i++) sample_is_normal("interaction", &k[i], 0.0, 0.05);
    still_near("independent", both.mean, 0.0, z * 0.0025 / sqrt(both.n));
    sample_is_normal("kinetic", &kinetic, 0.0, 0.15);
    sample_is_normal("offset", &slow, 0.0, 0.0004);
    sample_is_normal("calibration", &calibration, 0.0, 0.12);
    leave(g);
}

/* Conversion and hydrolysis, reflected at 1. Cuts per linkage are delta X h^2, so that 1/[eta]'^(1/a)
 * tells them; a reflected draw equals its mirror image. ROUND: 1e-12, the
 * exact sums again. */
static void conversion_and_hydrolysis(void **state)
{
    (void)state;
    for (int kind = 0; kind < 2; kind++) {
        struct stage *const g = stage();
        const double u = 0.02, nominal = 0.99;
        size_t reflected = 0;
        *(kind ? &g->p.material.hydrolysis : &g->p.cleavage.conversion) = nominal;
        *(kind ? &g->p.material.hydrolysis_u : &g->p.cleavage.conversion_u) = u;
        laid_out(g);
        for (uint64_t study = 0; study < STUDIES; study += LANES) {
            next(g, study);
            FOR_LANES(l)
            {
                const double drawn = nominal + u * (kind ? g->draws.study[DRAWS_HYDROLYSIS][l] : g->draws.preparation[DRAWS_CONVERSION][l]);
                const double X = drawn <= 1.0 ? drawn : 1.0 - (drawn - 1.0);
                reflected += drawn > 1.0;
                if (study > 800) continue;
                const struct scission_chains cut = scission_cut(g->p.cleavage.neighbours, 0.015, (struct scission_chance){kind ? X * X : X, 0.0}, g->d.lengths.xn);
                const double unit = kind ? X * 0.04405 + (1.0 - X) * 0.08609 : g->d.chains.unit_kg_mol;
                const double expected = 2e-5 * pow(1000.0 * unit * scission_xv(&g->d.lengths.sums, &cut), 0.76) / g->d.chains.intrinsic_m3_kg[CLEAVED];
                still_close_to("[eta]'", thick(g, CLEAVED, l), expected, 1e-12);
                still_close_to("[eta]", thick(g, INTACT, l), 1.0, 1e-14);
            }
        }
        /* STAT: 30.85 % lie beyond half a standard deviation */
        still_near("reflected", (double)reflected / STUDIES, 0.30854, z * sqrt(0.30854 * 0.69146 / STUDIES));
        leave(g);
    }
}

/* TEXT: under the other fraction only the cleaved polymer is another; the
 * draws are the same. */
static void the_other_fraction(void **state)
{
    (void)state;
    struct stage *const g = stage();
    struct truth other;
    scenario_plan(g->s, 0, &g->p); /* every source on */
    laid_out(g);
    for (uint64_t study = 0; study < 80; study += LANES) {
        next(g, study);
        truth_of(&g->d, &g->draws, 0.012, &other);
        assert_memory_equal(other.conc_kg_m3, g->truth.conc_kg_m3, sizeof other.conc_kg_m3);
        assert_memory_equal(other.coil, g->truth.coil, 5 * sizeof other.coil[0]);
        assert_memory_equal(other.interaction, g->truth.interaction, sizeof other.interaction);
        assert_memory_equal(other.kinetic, g->truth.kinetic, sizeof other.kinetic);
        for (size_t i = 5; i < 9; i++) FOR_LANES(l) assert_true(other.coil[i][l] > g->truth.coil[i][l]);
    }
    leave(g);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(dry_content_and_weighing), cmocka_unit_test(dilution), cmocka_unit_test(the_pair), cmocka_unit_test(constants_of_the_study),
        cmocka_unit_test(conversion_and_hydrolysis), cmocka_unit_test(the_other_fraction),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
