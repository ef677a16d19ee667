#include "sim/scenario/keys.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "sim/scenario/keys_bench.h"
#include "sim/scenario/keys_kit.h"
#include "sim/scenario/keys_plan.h"
#include "sim/scenario/keys_polymer.h"
#include "sim/scenario/keys_question.h"

static const struct keys_section keys_sections[KEYS_SECTIONS] = {
    {KEYS_TOP, "", "", {keys_question_top}},
    {KEYS_QUESTION, "question", "what is asked", {keys_question_rows}},
    {KEYS_POLYMER,
     "polymer",
     "the polymer; what is not given comes from the material",
     {keys_polymer_head, keys_polymer_material, keys_polymer_rest}},
    {KEYS_CLEAVAGE, "cleavage", "the cutting of the 1,2-glycol links", {keys_polymer_cleavage}},
    {KEYS_SOLUTIONS,
     "solutions",
     "weighing and diluting; what is not given comes from bench.like",
     {keys_bench_solutions}},
    {KEYS_BENCH, "bench", "how one works; what is not given comes from bench.like", {keys_bench_like, keys_bench_rows}},
    {KEYS_GRADES, "kit.grades", "polymers to buy", {keys_kit_entry, keys_kit_grades}},
    {KEYS_TUBES, "kit.tubes", "viscometer tubes", {keys_kit_entry, keys_kit_tubes}},
    {KEYS_BATHS, "kit.baths", "temperature baths", {keys_kit_entry, keys_kit_baths}},
    {KEYS_THERMOMETERS, "kit.thermometers", "thermometers", {keys_kit_entry, keys_kit_thermometers}},
    {KEYS_TIMERS, "kit.timers", "ways to time a run", {keys_kit_entry, keys_kit_timers}},
    {KEYS_MATERIALS,
     "kit.materials",
     "polymer, solvent and temperature with a pair K and a",
     {keys_kit_entry, keys_polymer_material}},
    {KEYS_BENCHES,
     "kit.benches",
     "ways to work: defaults for solutions and bench",
     {keys_kit_entry, keys_bench_solutions, keys_bench_rows}},
    {KEYS_PLAN, "plan", "the choices: every key is a list of options, each combination one plan", {keys_plan_rows}},
    {KEYS_COST, "cost", "what a plan costs", {keys_plan_cost}},
    {KEYS_AT_MOST_SECTION, "cost.at_most", "limits on a plan; none when left out", {keys_plan_at_most}},
    {KEYS_RUN, "run", "the computation", {keys_question_run}},
};

const struct keys_section *keys_section(enum keys_id id)
{
    return &keys_sections[id];
}

/* Row i of a section, or NULL behind the last; counts the rows on the way. */
static const struct keys_row *keys_walk(const struct keys_section *s, size_t i, size_t *count)
{
    size_t seen = 0;
    for (size_t part = 0; part < KEYS_PARTS && s->parts[part]; part++)
        for (const struct keys_row *row = s->parts[part]; row->key; row++)
            if (seen++ == i)
                return row;
    if (count)
        *count = seen;
    return NULL;
}

size_t keys_count(const struct keys_section *s)
{
    size_t count = 0;
    keys_walk(s, (size_t)-1, &count);
    return count;
}

const struct keys_row *keys_row(const struct keys_section *s, size_t i)
{
    return keys_walk(s, i, NULL);
}

size_t keys_find(const struct keys_section *s, const char *key)
{
    const size_t count = keys_count(s);
    for (size_t i = 0; i < count; i++)
        if (strcmp(keys_row(s, i)->key, key) == 0)
            return i;
    return count;
}

const char *keys_home(const char *key, enum keys_id not_in)
{
    for (size_t id = 0; id < KEYS_SECTIONS; id++) {
        const struct keys_section *s = &keys_sections[id];
        if (s->id != not_in && s->path[0] && keys_find(s, key) < keys_count(s))
            return s->path;
    }
    return NULL;
}

const char *keys_stem(const struct keys_section *s)
{
    const char *point = strchr(s->path, '.');
    return point ? point + 1 : s->path;
}

enum keys_id keys_entry_kind(const struct keys_row *row)
{
    static const struct {
        const char *key;
        enum keys_id kind;
    } kinds[] = {{"material", KEYS_MATERIALS},       {"grade", KEYS_GRADES}, {"tube", KEYS_TUBES}, {"bath", KEYS_BATHS},
                 {"thermometer", KEYS_THERMOMETERS}, {"timer", KEYS_TIMERS}};
    if (row == keys_bench_like)
        return KEYS_BENCHES;
    for (size_t i = 0; i < sizeof kinds / sizeof *kinds; i++)
        if (strcmp(kinds[i].key, row->key) == 0)
            return kinds[i].kind;
    return KEYS_SECTIONS;
}

/* A limit as people write it: whole numbers in full. */
static int keys_number(char *to, size_t size, double x)
{
    return fabs(x - floor(x)) > 0.0 || fabs(x) >= 1e17 || fabs(x) < 0.5 ? snprintf(to, size, "%g", x)
                                                                        : snprintf(to, size, "%.0f", x);
}

const char *keys_range(const struct keys_row *row, char buffer[KEYS_RANGE])
{
    char min[32], max[32];
    keys_number(min, sizeof min, row->min);
    keys_number(max, sizeof max, row->max);
    const char *above = row->flags & KEYS_ABOVE_MIN ? "above " : "", *space = row->unit[0] ? " " : "";
    if (row->max > row->min)
        snprintf(buffer, KEYS_RANGE, "%s%s to %s%s%s", above, min, max, space, row->unit);
    else
        snprintf(buffer, KEYS_RANGE, "%s%s%s", min, space, row->unit);
    return buffer;
}

const char *keys_words(const struct keys_row *row, char buffer[KEYS_WORDS])
{
    size_t size = 0, left = 0;
    buffer[0] = 0;
    for (const struct keys_word *w = row->words; w && w->word; w++)
        left += !w->later;
    for (const struct keys_word *w = row->words; w && w->word; w++) {
        if (w->later)
            continue;
        left--;
        const int more = snprintf(buffer + size, KEYS_WORDS - size, "%s%s", w->word,
                                  left > 1    ? ", "
                                  : left == 1 ? " or "
                                              : "");
        if (more > 0 && size + (size_t)more < KEYS_WORDS)
            size += (size_t)more;
    }
    return buffer;
}
