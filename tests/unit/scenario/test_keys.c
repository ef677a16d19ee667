/* The key table against itself and against the contract of the scenario. */
#include "scenario/reading.h"

#include <math.h>

#include "sim/scenario/keys.h"
#include "sim/scenario/parts.h"
#include "sim/scenario/value.h"

/* Every default of the contract, as it is written there. */
static const char *const contract[] = {
    "question.confidence=95 %",
    "question.power=90 %",
    "question.sides=one",
    "question.against_is=stated",
    "polymer.material=pvoh-water-25C",
    "polymer.K=2.0e-4 dL/g",
    "polymer.a=0.76",
    "polymer.eta_u=5 %",
    "polymer.a_u=0.02",
    "polymer.valid_from=20 kg/mol",
    "polymer.valid_to=200 kg/mol",
    "polymer.fitted_at=25 degC",
    "polymer.calibrated_by=viscosity",
    "polymer.repeat_unit=44.05 g/mol",
    "polymer.ester_unit=86.09 g/mol",
    "polymer.hydrolysis=98.5 %",
    "polymer.hydrolysis_u=0.5 %",
    "polymer.specific_volume=0.765 mL/g",
    "polymer.temperature_coefficient=0 1/K",
    "polymer.law=martin",
    "polymer.interaction=0.45",
    "polymer.interaction_cleaved=0.45",
    "polymer.interaction_u=0.05",
    "cleavage.neighbours=excluded",
    "cleavage.conversion=98 %",
    "cleavage.conversion_u=1 %",
    "cleavage.nonspecific=0.005 %",
    "cleavage.reagent_viscosity=0.25 %",
    "cleavage.reagent_density=0.20 %",
    "cleavage.diluent=water",
    "cleavage.reference=water",
    "cleavage.correct_conversion=yes",
    "solutions.dry_content_u=0.5 %",
    "solutions.stock=separate",
    "solutions.balance_u=0.3 mg",
    "solutions.glass=A",
    "solutions.stock_volume=fit",
    "solutions.stock_tolerance=by-class",
    "solutions.level_volume=fit",
    "solutions.level_tolerance=by-class",
    "solutions.delivery_tolerance=0.03 mL",
    "solutions.delivery_u=0.01 mL",
    "bench.like=research",
    "bench.temperature=25 degC",
    "bench.room=22 degC",
    "bench.equilibrate=10 min",
    "bench.lag_time=1 min",
    "bench.clean_and_fill=8 min",
    "bench.add_and_mix=3 min",
    "bench.reset=60 s",
    "bench.rinse=3 mL",
    "bench.carry_over=0.1 %",
    "bench.filling_u=0.05 %",
    "bench.charge_u=0.03 mL",
    "bench.tilt_u=0.5 degree",
    "bench.kinetic_u=15 %",
    "bench.bubble_chance=1 %",
    "bench.bubble_delay=1 %",
    "bench.combine=mean",
    "bench.agreement=0.2 %",
    "bench.spare_runs=2",
    "bench.water_every_day=yes",
    "bench.working_day=7 h",
    "kit.grades.molar_mass=85 kg/mol",
    "kit.grades.average=viscosity",
    "kit.grades.distribution=most-probable",
    "kit.grades.price_per_gram=0",
    "kit.tubes.type=suspended-level",
    "kit.tubes.constant=0.003 mm2/s2",
    "kit.tubes.ends=flared",
    "kit.tubes.bulb_volume=5.6 mL",
    "kit.tubes.bore=0.47 mm",
    "kit.tubes.length=90 mm",
    "kit.tubes.neck_bore=3 mm",
    "kit.tubes.reservoir_bore=25 mm",
    "kit.tubes.head=130 mm",
    "kit.tubes.offset=0 mm",
    "kit.tubes.charge=15 mL",
    "kit.tubes.capacity=60 mL",
    "kit.tubes.solution_offset=0 %",
    "kit.tubes.solution_offset_u=0.02 %",
    "kit.tubes.price=0",
    "kit.baths.fluctuation=0.02 K",
    "kit.baths.correlation_time=5 min",
    "kit.baths.drift_u=0.01 K/h",
    "kit.baths.day_u=0.01 K",
    "kit.baths.gradient_u=0.01 K",
    "kit.baths.price=0",
    "kit.thermometers.calibration_u=0.05 K",
    "kit.thermometers.reading_u=0.01 K",
    "kit.thermometers.resolution=0.01 K",
    "kit.thermometers.reads=middle",
    "kit.thermometers.price=0",
    "kit.timers.hand_u=0.07 s",
    "kit.timers.resolution=0.01 s",
    "kit.timers.meniscus_u=0.1 mm",
    "kit.timers.price=0",
    "plan.tube=suspended-0c",
    "plan.bath=circulator",
    "plan.thermometer=probe",
    "plan.temperature_record=each-run",
    "plan.timer=by-hand",
    "plan.top=1.8",
    "plan.top_cleaved=1.4",
    "plan.lowest=0.4",
    "plan.levels=4",
    "plan.levels_cleaved=same",
    "plan.dilution=flasks",
    "plan.preparations=1",
    "plan.fillings=2",
    "plan.fillings_cleaved=same",
    "plan.runs=3",
    "plan.water_fillings=2",
    "plan.water_runs=3",
    "plan.order=sequential",
    "plan.extrapolation=martin",
    "plan.weighting=equal",
    "plan.density=partial-volume",
    "plan.kinetic_energy=corrected",
    "plan.chain_statistics=discrete",
    "cost.least=hours",
    "cost.currency=EUR",
    "cost.hour=0",
    "cost.owned=[]",
    "cost.at_most={}",
    "cost.weigh_and_dissolve=1.5 h",
    "cost.dilution=6 min",
    "cost.cleavage=1 h",
    "cost.dissolving_wait=3 h",
    "cost.cleavage_wait=12 h",
    "run.studies=20000",
    "run.seed=1",
};

struct fixture {
    struct reading reading;
    struct units *units;
};

static int open_keys(void **state)
{
    struct fixture *f = calloc(1, sizeof *f);
    f->units = units_new();
    f->reading = (struct reading){arena_new(), f->units, complain_new(), {0}, 0};
    *state = f;
    return 0;
}

static int close_keys(void **state)
{
    struct fixture *f = *state;
    arena_free(f->reading.arena);
    complain_free(f->reading.out);
    units_free(f->units);
    free(f);
    return 0;
}

static const struct keys_row *row_of(const char *path, size_t size)
{
    for (size_t id = 0; id < KEYS_SECTIONS; id++) {
        const struct keys_section *s = keys_section((enum keys_id)id);
        const size_t before = strlen(s->path);
        if (before >= size || strncmp(s->path, path, before) != 0 || path[before] != '.')
            continue;
        char key[64];
        snprintf(key, sizeof key, "%.*s", (int)(size - before - 1), path + before + 1);
        const size_t i = keys_find(s, key);
        if (i < keys_count(s))
            return keys_row(s, i);
    }
    return NULL;
}

static void has_the_defaults_of_the_contract(void **state)
{
    (void)state;
    for (size_t i = 0; i < sizeof contract / sizeof *contract; i++) {
        const size_t size = strcspn(contract[i], "=");
        const struct keys_row *row = row_of(contract[i], size);
        if (!row || !row->fallback || strcmp(row->fallback, contract[i] + size + 1) != 0)
            print_message("%s\n", contract[i]);
        assert_non_null(row);
        assert_non_null(row->fallback);
        assert_string_equal(row->fallback, contract[i] + size + 1);
    }
}

static void assert_row(const struct fixture *f, const struct keys_section *section, const struct keys_row *row)
{
    const bool number = row->kind == KEYS_QUANTITY || row->kind == KEYS_COUNT;
    assert_non_null(row->unit);
    assert_true(row->help && row->help[0]);
    assert_true(row->source && row->source[0]);
    assert_true(row->fallback || row->none);
    assert_true(row->kind != KEYS_CHOICE || row->words);
    assert_true(!number || row->min <= row->max);
    if (row->kind == KEYS_QUANTITY)
        assert_true(isfinite(units_si(f->units, row->dimension, row->unit, row->max)));
    if (row->kind == KEYS_COUNT)
        assert_true(row->size == 0 || row->size == sizeof(size_t));
    if (row->kind == KEYS_QUANTITY)
        assert_true(row->size == 0 || row->size == sizeof(double));
    assert_ptr_equal(keys_row(section, keys_find(section, row->key)), row);
}

/* Limits are good units, defaults lie between them, no key stands twice. */
static void is_sound(void **state)
{
    const struct fixture *f = *state;
    for (size_t id = 0; id < KEYS_SECTIONS; id++) {
        const struct keys_section *s = keys_section((enum keys_id)id);
        assert_int_equal(s->id, id);
        for (size_t i = 0; i < keys_count(s); i++) {
            const struct keys_row *row = keys_row(s, i);
            assert_row(f, s, row);
            const struct value v = value_default(&f->reading, row);
            if (v.state == VALUE_BAD)
                complain_print(f->reading.out, stdout);
            assert_int_not_equal(v.state, VALUE_BAD);
        }
        assert_null(keys_row(s, keys_count(s)));
    }
}

static void says_ranges_and_words(void **state)
{
    (void)state;
    char range[KEYS_RANGE], words[KEYS_WORDS];
    assert_string_equal(keys_range(row_of("question.expect", 15), range), "above 0 to 20 %");
    assert_string_equal(keys_range(row_of("bench.temperature", 17), range), "5 to 38 degC");
    assert_string_equal(keys_range(row_of("run.studies", 11), range), "16 to 1000000");
    assert_string_equal(keys_range(row_of("plan.preparations", 17), range), "1 to 12");
    assert_string_equal(keys_words(row_of("plan.order", 10), words), "sequential, shuffled or bracketed");
    assert_string_equal(keys_words(row_of("question.against_is", 19), words), "stated, same-constants or measured");
    assert_string_equal(keys_words(row_of("plan.extrapolation", 18), words),
                        "huggins, kraemer, martin, common-intercept or single-point");
    assert_string_equal(keys_home("fluctuation", KEYS_BENCH), "kit.baths");
    assert_null(keys_home("nothing", KEYS_BENCH));
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(has_the_defaults_of_the_contract),
        cmocka_unit_test(is_sound),
        cmocka_unit_test(says_ranges_and_words),
    };
    return cmocka_run_group_tests(tests, open_keys, close_keys);
}
