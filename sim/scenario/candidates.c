#include "sim/scenario/candidates.h"

#include <math.h>
#include <string.h>

#include "sim/scenario/choices.h"
#include "sim/scenario/record.h"

static bool candidates_is_single_point(const struct value *extrapolation)
{
    return extrapolation->number > SINGLE_POINT - 0.5;
}

/* Keys are digits, the last one fastest; extrapolation and weighting behind
 * it are one digit, the pairs that differ. */
static size_t candidates_radix(const struct scenario *s, size_t key)
{
    const struct choice *choice = &s->choices[key], *lines = &s->choices[s->extrapolation];
    if (key == s->extrapolation)
        return 1;
    if (key != s->extrapolation + 1)
        return choice->count;
    size_t pairs = 0;
    for (size_t i = 0; i < lines->count; i++)
        pairs += candidates_is_single_point(&lines->options[i]) ? choice->count > 0 : choice->count;
    return pairs;
}

static size_t candidates_key(const struct scenario *s, const char *key)
{
    return (size_t)(choices_find(s, key) - s->choices);
}

bool candidates_count(struct scenario *s)
{
    s->extrapolation = candidates_key(s, "extrapolation");
    s->material = candidates_key(s, "material");
    s->grade = candidates_key(s, "grade");
    s->tube = candidates_key(s, "tube");
    s->candidates = 1;
    for (size_t key = 0; key < s->keys; key++) {
        s->radix[key] = candidates_radix(s, key);
        if (!s->radix[key] || s->candidates > CANDIDATES_MAX / s->radix[key])
            return false;
        s->candidates *= s->radix[key];
    }
    return true;
}

static void candidates_split_pair(const struct scenario *s, size_t pair, size_t option[PARTS_PLAN_KEYS])
{
    const size_t extrapolation = s->extrapolation;
    const struct choice *lines = &s->choices[extrapolation];
    size_t i = 0;
    for (; i + 1 < lines->count; i++) {
        const size_t width = candidates_is_single_point(&lines->options[i]) ? 1 : s->choices[extrapolation + 1].count;
        if (pair < width)
            break;
        pair -= width;
    }
    option[extrapolation] = i;
    option[extrapolation + 1] = pair;
}

void candidates_options(const struct scenario *s, size_t index, size_t option[PARTS_PLAN_KEYS])
{
    for (size_t key = s->keys; key-- > 0;) {
        option[key] = index % s->radix[key];
        index /= s->radix[key];
    }
    candidates_split_pair(s, option[s->extrapolation + 1], option);
}

static void candidates_entry(const struct keys_row *row, const struct record *entry, struct plan *out)
{
    switch (keys_entry_kind(row)) {
    case KEYS_TUBES:
        record_compile(entry, &out->tube), out->tube.name = entry->name;
        break;
    case KEYS_BATHS:
        record_compile(entry, &out->bath), out->bath.name = entry->name;
        break;
    case KEYS_THERMOMETERS:
        record_compile(entry, &out->thermometer), out->thermometer.name = entry->name;
        break;
    case KEYS_TIMERS:
        record_compile(entry, &out->timer), out->timer.name = entry->name;
        break;
    default: /* grade and material: candidates_polymer */
        break;
    }
}

/* A grade's own hydrolysis wins over the material's, `polymer`'s over both. */
static void candidates_hydrolysis(const struct record *polymer, const struct record *grade, struct material *out)
{
    if (record_is_good(grade, "hydrolysis") && !record_value(polymer, "hydrolysis")->own)
        out->hydrolysis = record_number(grade, "hydrolysis");
    if (record_is_good(grade, "hydrolysis_u") && !record_value(polymer, "hydrolysis_u")->own)
        out->hydrolysis_u = record_number(grade, "hydrolysis_u");
}

static void candidates_kinetic(const struct record *entry, struct tube *tube)
{
    const bool flared = tube->ends == TUBE_FLARED;
    const double given = record_number(entry, flared ? "E" : "B");
    if (isfinite(given))
        tube->kinetic = given;
    else if (flared)
        tube->kinetic = tube_kinetic_flared(tube->bulb_volume_m3, tube->length_m, tube->bore_m, tube->constant_m2_s2);
    else
        tube->kinetic = tube_kinetic_square(tube->bulb_volume_m3, tube->length_m);
}

/* Grade and material by their options, and the hydrolysis that then holds. */
static void candidates_polymer(const struct scenario *s, const size_t option[PARTS_PLAN_KEYS], struct plan *out)
{
    const struct choice *materials = &s->choices[s->material];
    const struct record *grade = s->choices[s->grade].options[option[s->grade]].entry;
    const struct record *material = materials->options[option[s->material]].entry;
    record_compile(s->sections[KEYS_POLYMER], &out->material);
    if (materials->count > 1)
        record_compile(material, &out->material);
    out->material.name = material->name;
    record_compile(grade, &out->grade);
    out->grade.name = grade->name;
    candidates_hydrolysis(s->sections[KEYS_POLYMER], grade, &out->material);
    out->material.stated_eta_u = out->material.eta_u;
    out->material.stated_a_u = out->material.a_u;
    if (s->question.against_is == AGAINST_SAME_CONSTANTS)
        out->material.eta_u = out->material.a_u = 0.0;
}

bool candidates_make_chains(struct scenario *s)
{
    const size_t materials = s->choices[s->material].count, grades = s->choices[s->grade].count;
    s->chains = arena_take(s->arena, materials * grades, sizeof *s->chains);
    bool good = s->chains;
    for (size_t i = 0; good && i < materials * grades; i++) {
        size_t option[PARTS_PLAN_KEYS] = {0};
        struct plan plan = {0};
        option[s->material] = i / grades;
        option[s->grade] = i % grades;
        candidates_polymer(s, option, &plan);
        const struct material *m = &plan.material;
        const double unit = polymer_unit_kg_mol(m->hydrolysis, m->repeat_unit_kg_mol, m->ester_unit_kg_mol);
        const struct chains_shape shape = {plan.grade.distribution, plan.grade.dispersity, plan.grade.average,
                                           plan.grade.molar_mass_kg_mol / unit};
        good = chains_make(&s->chains[i], shape, m->a);
    }
    return good;
}

void candidates_plan(const struct scenario *s, size_t index, struct plan *out)
{
    size_t option[PARTS_PLAN_KEYS];
    candidates_options(s, index, option);
    memset(out, 0, sizeof *out);
    out->index = index;
    out->seed = s->run.seed;
    record_compile(s->sections[KEYS_CLEAVAGE], &out->cleavage);
    record_compile(s->sections[KEYS_SOLUTIONS], &out->solutions);
    record_compile(s->sections[KEYS_BENCH], &out->habits);
    for (size_t key = 0; key < s->keys; key++) {
        const struct value *v = &s->choices[key].options[option[key]];
        if (v->entry)
            candidates_entry(s->choices[key].row, v->entry, out);
        else
            record_store(s->choices[key].row, v, out);
    }
    if (!out->levels[CLEAVED])
        out->levels[CLEAVED] = out->levels[INTACT];
    if (!out->fillings[CLEAVED])
        out->fillings[CLEAVED] = out->fillings[INTACT];
    candidates_polymer(s, option, out);
    out->chains = &s->chains[option[s->material] * s->choices[s->grade].count + option[s->grade]];
    candidates_kinetic(s->choices[s->tube].options[option[s->tube]].entry, &out->tube);
}
