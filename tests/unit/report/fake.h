/* A made-up scenario and made-up outcomes, so that reports are tested without
 * a reader and a judge. Functions of scenario.h and search.h are defined here:
 * include it once in a program. */
#ifndef VICINAL_TESTS_UNIT_REPORT_FAKE_H
#define VICINAL_TESTS_UNIT_REPORT_FAKE_H

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/judge/search.h"
#include "sim/judge/trial.h"
#include "sim/scenario/scenario.h"
#include "sim/scenario/told.h"

enum { FAKE_KEYS = 5, FAKE_PLANS = 24 };

struct scenario {
    const char *title;
    struct question question;
    struct cost_rules cost;
    struct plan plan; /* what every plan is, but for grade, fillings, bath */
    size_t zeros;
};

static const char *const fake_key[FAKE_KEYS] = {"grade", "tube", "fillings", "bath", "extrapolation"};
static const char *const fake_option[FAKE_KEYS][4] = {
    {"middle", "high"}, {"suspended-0c"}, {"1", "2", "3"}, {"beaker", "circulator"}, {"martin", "huggins"}};
static const size_t fake_options[FAKE_KEYS] = {2, 1, 3, 2, 2};

const char *scenario_name(const struct scenario *s)
{
    (void)s;
    return "made-up";
}
const char *scenario_title(const struct scenario *s)
{
    return s->title;
}
const struct question *scenario_question(const struct scenario *s)
{
    return &s->question;
}
const struct cost_rules *scenario_cost(const struct scenario *s)
{
    return &s->cost;
}
size_t scenario_studies(const struct scenario *s)
{
    (void)s;
    return 20000;
}
uint64_t scenario_seed(const struct scenario *s)
{
    (void)s;
    return 7;
}
bool scenario_owned(const struct scenario *s, const char *equipment)
{
    (void)s;
    (void)equipment;
    return false;
}
size_t scenario_candidates(const struct scenario *s)
{
    (void)s;
    return FAKE_PLANS;
}
size_t scenario_keys(const struct scenario *s)
{
    (void)s;
    return FAKE_KEYS;
}
const char *scenario_key(const struct scenario *s, size_t key)
{
    (void)s;
    return fake_key[key];
}
size_t scenario_options(const struct scenario *s, size_t key)
{
    (void)s;
    return fake_options[key];
}
const char *scenario_option(const struct scenario *s, size_t key, size_t option)
{
    (void)s;
    return fake_option[key][option];
}
size_t scenario_option_of(const struct scenario *s, size_t index, size_t key)
{
    (void)s;
    for (size_t k = FAKE_KEYS; k-- > key + 1;)
        index /= fake_options[k];
    return index % fake_options[key];
}
void scenario_plan(const struct scenario *s, size_t index, struct plan *out)
{
    *out = s->plan;
    out->index = index;
    out->grade.name = fake_option[0][scenario_option_of(s, index, 0)];
    out->fillings[INTACT] = out->fillings[CLEAVED] = 1 + scenario_option_of(s, index, 2);
    out->bath.name = fake_option[3][scenario_option_of(s, index, 3)];
    if (scenario_option_of(s, index, 4))
        out->analysis.extrapolation = HUGGINS;
}
size_t scenario_zero_sources(const struct scenario *s)
{
    return s->zeros;
}
const char *scenario_zero_source(const struct scenario *s, size_t i)
{
    (void)s;
    return i == 0 ? "bench.tilt_u" : "kit.baths.circulator.drift_u";
}
bool scenario_quantity(const struct scenario *s, const char *section, const char *key, struct scenario_quantity *out)
{
    (void)s;
    (void)section;
    (void)key;
    (void)out;
    return false;
}

char *scenario_resolved_yaml(const struct scenario *s, size_t index)
{
    (void)s;
    return strdup(index == SIZE_MAX ? "all: lists\n" : "cut: to one\n");
}
json_t *scenario_resolved_json(const struct scenario *s, size_t index)
{
    (void)index;
    return json_pack("{s:s, s:f}", "title", s->title, "expect", s->question.expect);
}
long search_choice(const struct scenario *s, const struct search_result *r, size_t key, size_t option)
{
    (void)s;
    return r->by_choice[key * 4 + option];
}

void told_plan(const struct scenario *s, size_t index, void (*tell)(void *context, const struct told *value),
               void *context)
{
    (void)s;
    (void)index;
    tell(context, &(struct told){"polymer", "pvoh|water", "a", "0.76", "the exponent", "from memory"});
    tell(context, &(struct told){"bench", "", "tilt_u", "0.5 degree", "of the tube", NULL});
}

__attribute__((unused)) static struct scenario fake_scenario(void)
{
    struct scenario s = {.title = "A made-up study"};
    s.question =
        (struct question){.expect = 0.015, .has_against = true, .against = 0.013, .confidence = 0.95, .power = 0.9};
    s.cost = (struct cost_rules){.least = LEAST_HOURS, .currency = "EUR"};
    struct plan *p = &s.plan;
    p->material = (struct material){.name = "pvoh-water-25C",
                                    .K_m3_kg = 2e-5,
                                    .a = 0.76,
                                    .valid_from_kg_mol = 20,
                                    .valid_to_kg_mol = 200,
                                    .fitted_at_K = 298.15};
    p->habits = (struct habits){.temperature_K = 298.15, .room_K = 295.15, .water_every_day = true};
    p->grade = (struct grade){.name = "middle", .molar_mass_kg_mol = 85};
    p->tube = (struct tube){.name = "suspended-0c",
                            .suspended_level = true,
                            .constant_m2_s2 = 3e-9,
                            .bulb_volume_m3 = 5.6e-6,
                            .bore_m = 0.47e-3,
                            .length_m = 0.09,
                            .head_m = 0.13};
    p->bath.name = "circulator";
    p->thermometer = (struct thermometer){.name = "probe", .resolution_K = 0.01};
    p->timer = (struct timer){.name = "by-hand", .resolution_s = 0.01};
    p->temperature_record = true;
    p->top[INTACT] = 1.8;
    p->top[CLEAVED] = 1.4;
    p->lowest = 0.4;
    p->levels[INTACT] = p->levels[CLEAVED] = 4;
    p->fillings[INTACT] = p->fillings[CLEAVED] = 2;
    p->runs = p->water_runs = 3;
    p->water_fillings = 2;
    p->analysis = (struct analysis){MARTIN, WEIGHT_EQUAL, true, true, CHAIN_DISCRETE};
    return s;
}

__attribute__((unused)) static struct outcome fake_outcome(void)
{
    struct outcome o = {.status = STATUS_RESOLVES, .studies = 20000, .truth = 0.015};
    o.at = (struct figures){.mean = 0.01502,
                            .bias = 2e-5,
                            .sd = 6.1e-4,
                            .rmse = 6.104e-4,
                            .interval = {0.01383, 0.01624},
                            .shortest = {0.01381, 0.0162},
                            .within = (double)NAN,
                            .critical = 0.01391,
                            .power = 0.9321,
                            .plain_false_alarm = 0.062,
                            .no_answer = 0,
                            .spare_runs = 3.2,
                            .clock_s = 9.1 * 3600,
                            .hours_s = 14.2 * 3600,
                            .money = 0};
    o.se = (struct figures){.mean = 4.3e-6,
                            .bias = 4.3e-6,
                            .sd = 3e-6,
                            .rmse = 3e-6,
                            .interval = {1e-5, 1e-5},
                            .shortest = {4e-5, 4e-5},
                            .within = (double)NAN,
                            .critical = 6e-6,
                            .power = 0.0027,
                            .plain_false_alarm = 0.0017,
                            .no_answer = 0,
                            .spare_runs = 0.01,
                            .clock_s = 12,
                            .hours_s = 12};
    o.resolvable_against = 0.01312;
    o.resolvable_within = (double)NAN;
    o.intrinsic[INTACT] = (struct spread_of){0.109702, 0.1098, 9e-4};
    o.intrinsic[CLEAVED] = (struct spread_of){0.013271, 0.01327, 2e-4};
    o.molar_mass[INTACT] = (struct spread_of){83.172, 83.3, 0.9};
    o.molar_mass[CLEAVED] = (struct spread_of){5.16416, 5.165, 0.1};
    o.water_efflux_s = 298.3;
    for (int s = 0; s < SERIES; s++) {
        o.levels[s] = 4;
        for (size_t j = 0; j < 4; j++) {
            const double share = 0.4 + 0.2 * (double)j;
            o.concentration_kg_m3[s][j] = share * (s == INTACT ? 5.6 : 26.0);
            o.nominal_efflux_s[s][j] = 298.3 * (1 + share * (s == INTACT ? 0.8 : 0.4));
        }
        o.stock_flask_m3[s] = 1e-4;
    }
    o.level_flask_m3 = 1e-4;
    o.days = 2;
    o.polymer_kg = 3.16e-3;
    o.margin_se = 12;
    return o;
}

/* What a search of the made-up scenario might have found. */
struct fake_search {
    struct search_result result;
    struct candidate candidate[FAKE_PLANS];
    long by_choice[FAKE_KEYS * 4];
};

__attribute__((unused)) static void fake_search(const struct scenario *s, struct fake_search *f)
{
    *f = (struct fake_search){
        .result = {.count = FAKE_PLANS, .recommended = SEARCH_NONE, .spent = 123456, .exhaustive = 960000}};
    struct search_result *r = &f->result;
    r->candidates = f->candidate;
    r->by_choice = f->by_choice;
    for (size_t i = 0; i < FAKE_KEYS * 4; i++)
        f->by_choice[i] = SEARCH_NONE;
    for (size_t i = 0; i < FAKE_PLANS; i++) {
        struct outcome *o = &f->candidate[i].outcome;
        *o = fake_outcome();
        const bool bath = scenario_option_of(s, i, 3) == 1;
        const size_t fillings = 1 + scenario_option_of(s, i, 2);
        o->at.power = 0.4 + 0.14 * (double)fillings + (bath ? 0.2 : 0.0) + (scenario_option_of(s, i, 4) ? -0.02 : 0);
        o->at.hours_s = 3600 * (8.2 + 3 * (double)fillings + (scenario_option_of(s, i, 0) ? 0.5 : 0));
        o->status = o->at.power > 0.9 ? STATUS_RESOLVES : STATUS_FAILS;
        if (scenario_option_of(s, i, 0) == 1 && fillings == 3) {
            *o = (struct outcome){.status = STATUS_IMPOSSIBLE};
            strcpy(o->why, "no flask holds 1,240 mL, \"1,000 mL\" is the largest");
        }
        r->counts[o->status]++;
        if (o->status != STATUS_RESOLVES)
            continue;
        for (size_t k = 0; k < FAKE_KEYS; k++) {
            long *best = &f->by_choice[k * 4 + scenario_option_of(s, i, k)];
            if (*best == SEARCH_NONE || o->at.hours_s < f->candidate[*best].outcome.at.hours_s)
                *best = (long)i;
        }
        if (r->recommended == SEARCH_NONE || o->at.hours_s < f->candidate[r->recommended].outcome.at.hours_s)
            r->recommended = (long)i;
    }
    r->fresh = fake_outcome();
    r->nearest = fake_outcome();
    r->nearest_miss = SEARCH_NONE;
}

/* The same, and nothing resolves. */
__attribute__((unused)) static void fake_missed(const struct scenario *s, struct fake_search *f)
{
    fake_search(s, f);
    struct search_result *r = &f->result;
    for (size_t i = 0; i < FAKE_KEYS * 4; i++)
        f->by_choice[i] = SEARCH_NONE;
    r->nearest_miss = r->recommended;
    r->recommended = SEARCH_NONE;
    r->counts[STATUS_FAILS] += r->counts[STATUS_RESOLVES];
    r->counts[STATUS_RESOLVES] = 0;
    for (size_t i = 0; i < FAKE_PLANS; i++)
        if (f->candidate[i].outcome.status == STATUS_RESOLVES)
            f->candidate[i].outcome.status = STATUS_FAILS;
    r->nearest.status = STATUS_FAILS;
    r->nearest.at.power = 0.712;
    r->nearest.resolvable_against = 0.01268;
    r->constants_are_limit = true;
}

#endif
