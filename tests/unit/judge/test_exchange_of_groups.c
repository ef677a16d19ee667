/* Exchanging the seed of one group of error sources changes the deviates of
 * that group and no other: every group, every purpose, spare runs included.
 * Source: model.md section 5, a row of whose table each slot below belongs to. */
#include "studies.h"

enum { SEED = 20260601, OTHER = 77 };
static const enum draws_group all = DRAWS_GROUPS;

/* The slots of the streams in their order, by the group that model.md gives. */
static const struct purpose {
    enum streams_purpose purpose;
    size_t slots;
    enum draws_group group[DRAWS_STUDY];
} purposes[] = {
    {STREAMS_STUDY, DRAWS_STUDY,
     {DRAWS_GROUP_PAIR, DRAWS_GROUP_PAIR, DRAWS_GROUP_CALIBRATION, DRAWS_GROUP_KINETIC, DRAWS_GROUP_OFFSET, DRAWS_GROUP_DILUTION, DRAWS_GROUP_HYDROLYSIS,
      DRAWS_GROUP_INTERACTION, DRAWS_GROUP_INTERACTION}},
    {STREAMS_POLYMER, DRAWS_POLYMER, {DRAWS_GROUP_DRY_CONTENT}},
    {STREAMS_PREPARATION, DRAWS_PREPARATION, {DRAWS_GROUP_CONVERSION}},
    {STREAMS_STOCK, DRAWS_STOCK, {DRAWS_GROUP_WEIGHING}},
    {STREAMS_LEVEL, DRAWS_LEVEL, {DRAWS_GROUP_DILUTION, DRAWS_GROUP_DILUTION}},
    {STREAMS_DAY, DRAWS_DAY, {DRAWS_GROUP_DAYS, DRAWS_GROUP_DAYS, DRAWS_GROUP_FLUCTUATION}},
};
enum { PURPOSES = sizeof purposes / sizeof *purposes, RUNS = 3, SPARE = 7 };

static const enum draws_group of_filling[DRAWS_FILLING] = {DRAWS_GROUP_TILT,     DRAWS_GROUP_CHARGE,      DRAWS_GROUP_FILLING,
                                                           DRAWS_GROUP_GRADIENT, DRAWS_GROUP_FLUCTUATION, DRAWS_GROUP_FLUCTUATION};
static const enum draws_group of_run[DRAWS_RUN] = {DRAWS_GROUP_FLUCTUATION, DRAWS_GROUP_FLUCTUATION, DRAWS_GROUP_FLUCTUATION, DRAWS_GROUP_FLUCTUATION,
                                                   DRAWS_GROUP_READING,     DRAWS_GROUP_HAND,        DRAWS_GROUP_MARKS,       DRAWS_GROUP_BUBBLES};

static struct draws_key key_of(uint64_t seed, enum draws_group group)
{
    const uint32_t bits = group == all ? (UINT32_C(1) << DRAWS_GROUPS) - 1 : UINT32_C(1) << group;
    return draws_key(seed, 48, (struct draws_exchange){OTHER, bits});
}

static struct draws_key plain_key(uint64_t seed)
{
    return draws_key(seed, 48, (struct draws_exchange){0, 0});
}

/* A slot is the other seed's where its group is exchanged, else as it was. */
static void slot_is(const double found[LANES], const double plain[LANES], const double other[LANES], bool exchanged)
{
    FOR_LANES(l) assert_true(plain[l] != other[l]);
    assert_memory_equal(found, exchanged ? other : plain, sizeof(double[LANES]));
}

static void purposes_by_group(void **state)
{
    (void)state;
    const struct draws_key plain = plain_key(SEED), other = plain_key(OTHER);
    size_t slots_of[DRAWS_GROUPS] = {0};
    for (size_t i = 0; i < PURPOSES; i++)
        for (unsigned level = 0; level < 3; level++) {
            const struct streams_place place = {.polymer = level == 2, .preparation = level, .solution = STREAMS_CLEAVED, .level = level, .filling = 1};
            double a[DRAWS_STUDY][LANES], b[DRAWS_STUDY][LANES];
            draws_normals(&plain, purposes[i].purpose, place, purposes[i].slots, a);
            draws_normals(&other, purposes[i].purpose, place, purposes[i].slots, b);
            for (int g = 0; g <= DRAWS_GROUPS; g++) {
                const struct draws_key key = key_of(SEED, (enum draws_group)g);
                double found[DRAWS_STUDY][LANES];
                draws_normals(&key, purposes[i].purpose, place, purposes[i].slots, found);
                for (size_t k = 0; k < purposes[i].slots; k++) {
                    slot_is(found[k], a[k], b[k], g == DRAWS_GROUPS || purposes[i].group[k] == (enum draws_group)g);
                    if (g < DRAWS_GROUPS) slots_of[g] += purposes[i].group[k] == (enum draws_group)g;
                }
            }
        }
    /* the groups of fillings and runs have none here, all others do */
    for (int g = 0; g < DRAWS_GROUPS; g++) assert_true((slots_of[g] > 0) == (g <= DRAWS_GROUP_FLUCTUATION));
}

/* A filling with its runs, then spare ones: in lane 2 one by one, in lane 6 at
 * a jump, in the others none. */
static void open_all(struct draws_filling *d, const struct draws_key *key)
{
    memset(d, 0, sizeof *d);
    draws_open_filling(d, key, (struct streams_place){.solution = STREAMS_INTACT, .level = 2, .filling = 1}, RUNS);
    for (size_t r = RUNS; r < SPARE; r++) draws_spare(d, 2, r);
    draws_spare(d, 6, SPARE - 1);
}

static void fillings_and_spare_runs(void **state)
{
    (void)state;
    static struct draws_filling a, b, found;
    const struct draws_key plain = plain_key(SEED), other = plain_key(OTHER);
    open_all(&a, &plain);
    open_all(&b, &other);
    for (int g = 0; g <= DRAWS_GROUPS; g++) {
        const struct draws_key key = key_of(SEED, (enum draws_group)g);
        open_all(&found, &key);
        for (size_t i = 0; i < DRAWS_FILLING; i++) slot_is(found.once[i], a.once[i], b.once[i], g == DRAWS_GROUPS || of_filling[i] == (enum draws_group)g);
        for (size_t r = 0; r < SPARE; r++)
            for (size_t i = 0; i < DRAWS_RUN; i++) {
                const bool exchanged = g == DRAWS_GROUPS || of_run[i] == (enum draws_group)g;
                if (r < RUNS) slot_is(found.run[r][i], a.run[r][i], b.run[r][i], exchanged);
                for (int l = 2; r >= RUNS && l <= 6; l += 4) {
                    assert_true(a.run[r][i][l] != b.run[r][i][l]);
                    assert_true(found.run[r][i][l] == (exchanged ? b.run[r][i][l] : a.run[r][i][l]));
                }
            }
        assert_true(found.drawn[2] == SPARE && found.drawn[6] == SPARE && found.drawn[0] == RUNS);
    }
}

/* Whole studies, with spare runs, days, a second polymer and preparations: all
 * groups exchanged are the studies of the other seed; none, those of the seed. */
static void whole_studies(void **state)
{
    (void)state;
    struct scenario *const s = studies_read("question: {expect: 1.5 %, against: 1.4 %, against_is: measured}\n"
                                            "bench: {agreement: 0.05 %, bubble_chance: 5 %, working_day: 5 h}\n"
                                            "plan: {grade: middle, preparations: 2, levels: 3, fillings: 1, tube: constant-50}\n");
    struct plan p;
    struct studies b;
    scenario_plan(s, 0, &p);
    studies_open(&b, &p, s);
    const size_t bytes = study_slot_size(&b.job);
    void *const own = malloc(bytes), *const others = malloc(bytes);
    assert_true(own && others);
    for (size_t block = 0; block < 3; block++) {
        b.job.seed = SEED;
        b.job.exchange = (struct draws_exchange){0, 0};
        study_play(block, &b.job, own, b.scratch);
        b.job.exchange = (struct draws_exchange){OTHER, 0};
        study_play(block, &b.job, b.slot, b.scratch);
        assert_memory_equal(b.slot, own, bytes);
        b.job.exchange = (struct draws_exchange){OTHER, (UINT32_C(1) << DRAWS_GROUPS) - 1};
        study_play(block, &b.job, b.slot, b.scratch);
        b.job.seed = OTHER;
        b.job.exchange = (struct draws_exchange){0, 0};
        study_play(block, &b.job, others, b.scratch);
        assert_memory_equal(b.slot, others, bytes);
        assert_memory_not_equal(b.slot, own, bytes);
        FOR_LANES(l) assert_true(study_bench_of(&b.job, own, 0)->spare_runs[l] > 0.0);
    }
    free(own);
    free(others);
    studies_close(&b);
    scenario_free(s);
}

/* Groups of which nothing is on exchange without a trace: a plan whose only
 * scatter is the filling's gives the same bits whichever other group is taken
 * from the other seed, and different ones for its own. */
static void silent_groups(void **state)
{
    (void)state;
    struct scenario *s;
    struct plan p = studies_plan("question: {expect: 1.5 %, against: 1.4 %}\nplan: {grade: middle, levels: 2, fillings: 1}\n", &s);
    struct studies b;
    struct reduction_result plain;
    p.habits.filling_u = 1e-3;
    studies_open(&b, &p, s);
    memcpy(&plain, studies_play(&b, 1, 0), sizeof plain);
    for (int g = 0; g < DRAWS_GROUPS; g++) {
        b.job.exchange = (struct draws_exchange){OTHER, UINT32_C(1) << g};
        const struct reduction_result *const found = studies_play(&b, 1, 0);
        FOR_LANES(l) assert_true((found->delta[l] == plain.delta[l]) == (g != DRAWS_GROUP_FILLING));
    }
    studies_close(&b);
    scenario_free(s);
}

int main(void)
{
    const struct CMUnitTest tests[] = {cmocka_unit_test(purposes_by_group), cmocka_unit_test(fillings_and_spare_runs), cmocka_unit_test(whole_studies),
                                       cmocka_unit_test(silent_groups)};
    return cmocka_run_group_tests(tests, NULL, NULL);
}
