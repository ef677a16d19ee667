#include "sim/scenario/scenario.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/scenario/candidates.h"
#include "sim/scenario/change.h"
#include "sim/scenario/check.h"
#include "sim/scenario/choices.h"
#include "sim/scenario/keys_bench.h"
#include "sim/scenario/kit.h"
#include "sim/scenario/parts.h"
#include "sim/scenario/record.h"
#include "sim/scenario/resolve.h"
#include "sim/scenario/value.h"
#include "sim/scenario/zero.h"

static const char *scenario_stem(struct arena *a, const char *path)
{
    const char *slash = strrchr(path, '/'), *name = slash ? slash + 1 : path, *point = strrchr(name, '.');
    return arena_copy(a, name, point && point != name ? (size_t)(point - name) : strlen(name));
}

/* Keys at the top that are no section, no title and no kit. */
static void scenario_check_top(const struct reading *r, const struct document_node *root)
{
    for (const struct document_node *n = root->children; n; n = n->next) {
        bool known = strcmp(n->key, "kit") == 0 || strcmp(n->key, "title") == 0;
        for (size_t id = 0; id < KEYS_SECTIONS; id++)
            known = known || strcmp(keys_section((enum keys_id)id)->path, n->key) == 0;
        if (!known)
            record_refuse_key(r, keys_section(KEYS_TOP), n);
    }
}

/* The title as a section of its own. */
static struct record *scenario_read_top(const struct reading *r, const struct document_node *root)
{
    struct document_node top = {.kind = DOCUMENT_MAP, .place = root->place};
    const struct document_node *title = document_child(root, "title");
    if (!title)
        return record_read(r, keys_section(KEYS_TOP), NULL);
    struct document_node only = *title;
    only.next = NULL;
    top.children = &only;
    return record_read(r, keys_section(KEYS_TOP), &top);
}

static bool scenario_read_sections(const struct reading *r, struct scenario *s, const struct document_node *root)
{
    for (size_t id = 0; id < KEYS_SECTIONS; id++) {
        const struct keys_section *section = keys_section((enum keys_id)id);
        if (keys_is_kit(section->id) || id == KEYS_PLAN)
            continue;
        const struct document_node *given = document_child(root, section->path);
        if (id == KEYS_AT_MOST_SECTION)
            given = document_child(document_child(root, "cost"), "at_most");
        s->sections[id] = id == KEYS_TOP ? scenario_read_top(r, root) : record_read(r, section, given);
        if (!s->sections[id])
            return false;
    }
    return true;
}

/* What is left out in the sections, from the entries they name. */
static void scenario_fill(const struct reading *r, struct scenario *s)
{
    struct value *like = record_value(s->sections[KEYS_BENCH], "like");
    if (like->state == VALUE_ABSENT)
        *like = value_default(r, keys_bench_like);
    kit_resolve(r, &s->kit, KEYS_BENCHES, like);
    const struct choice *material = choices_find(s, "material");
    if (material->count)
        *record_value(s->sections[KEYS_POLYMER], "material") = material->options[0]; /* after picks */
    record_fill(r, s->sections[KEYS_POLYMER], material->count ? material->options[0].entry : NULL);
    record_fill(r, s->sections[KEYS_SOLUTIONS], like->entry);
    record_fill(r, s->sections[KEYS_BENCH], like->entry);
    for (size_t id = 0; id < KEYS_SECTIONS; id++)
        if (s->sections[id] && !s->sections[id]->filled)
            record_fill(r, s->sections[id], NULL);
}

static void scenario_compile(struct scenario *s)
{
    s->question = (struct question){.against = (double)NAN, .within = (double)NAN};
    record_compile(s->sections[KEYS_QUESTION], &s->question);
    s->question.has_against = record_is_good(s->sections[KEYS_QUESTION], "against");
    s->question.has_within = record_is_good(s->sections[KEYS_QUESTION], "within");
    const double free = (double)INFINITY;
    s->cost = (struct cost_rules){
        .at_most_hours = free, .at_most_days = free, .at_most_polymer_kg = free, .at_most_money = free};
    record_compile(s->sections[KEYS_COST], &s->cost);
    record_compile(s->sections[KEYS_AT_MOST_SECTION], &s->cost);
    record_compile(s->sections[KEYS_RUN], &s->run);
}

/* The checked document into the scenario. */
static void scenario_take(const struct reading *r, struct scenario *s, const struct document_node *root,
                          const struct scenario_request *request)
{
    if (root->kind != DOCUMENT_MAP) {
        complain_at(r->out, root->place, "a scenario is a map of sections (question, plan, ...), not %s",
                    document_kind_text(root->kind));
        return;
    }
    scenario_check_top(r, root);
    kit_read(r, &s->kit, document_child(root, "kit"));
    if (!scenario_read_sections(r, s, root))
        return;
    choices_read(r, s, document_child(root, "plan"));
    for (size_t i = 0; i < request->picks_count; i++)
        choices_pick(r, s, request->picks[i]);
    scenario_fill(r, s);
    check_scenario(r, s);
    if (complain_count(r->out) > r->before)
        return;
    scenario_compile(s);
    if (!candidates_count(s))
        complain_at(r->out, r->whole, "plan has more than %u combinations", CANDIDATES_MAX);
    else if (!candidates_make_chains(s) || !zero_find(s))
        complain_memory(r->out);
}

/* An empty one with its memory and units. NULL after a complaint. */
static struct scenario *scenario_new(const char *path, struct complaints *out)
{
    struct scenario *s = calloc(1, sizeof *s);
    if (s)
        s->arena = arena_new();
    if (s && s->arena)
        s->name = scenario_stem(s->arena, path);
    if (s && s->name)
        s->path = arena_copy(s->arena, path, strlen(path));
    if (!s || !s->path)
        complain_memory(out);
    else
        s->units = units_new();
    if (s && s->units)
        return s;
    if (s && s->path)
        complain_at(out, (struct place){0}, "the units cannot be read: is the database of UDUNITS installed?");
    scenario_free(s);
    return NULL;
}

struct scenario *scenario_read(const struct scenario_request *request, struct complaints *out)
{
    const size_t before = complain_count(out);
    struct scenario *s = scenario_new(request->path, out);
    if (!s)
        return NULL;
    const struct reading r = {s->arena, s->units, out, {.file = s->path}, before};
    struct document_node *root = document_read(s->arena, s->path, out);
    for (size_t i = 0; root && root->kind == DOCUMENT_MAP && i < request->sets_count; i++)
        change_set(s->arena, root, request->sets[i], out);
    if (root)
        scenario_take(&r, s, root, request);
    if (complain_count(out) == before)
        return s;
    scenario_free(s);
    return NULL;
}

struct scenario *scenario_built_in(struct complaints *out)
{
    const size_t before = complain_count(out);
    struct scenario *s = scenario_new("", out);
    if (!s)
        return NULL;
    const struct reading r = {s->arena, s->units, out, {0}, before};
    kit_read(&r, &s->kit, NULL);
    if (complain_count(out) == before)
        return s;
    scenario_free(s);
    return NULL;
}

const struct kit *scenario_kit(const struct scenario *s)
{
    return &s->kit;
}

void scenario_free(struct scenario *s)
{
    if (!s)
        return;
    units_free(s->units);
    arena_free(s->arena);
    free(s);
}

const char *scenario_name(const struct scenario *s)
{
    return s->name;
}

const char *scenario_title(const struct scenario *s)
{
    const struct value *title = record_value(s->sections[KEYS_TOP], "title");
    return title->text ? title->text : "";
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
    return s->run.studies;
}

uint64_t scenario_seed(const struct scenario *s)
{
    return s->run.seed;
}

bool scenario_owned(const struct scenario *s, const char *equipment)
{
    const struct document_node *owned = record_value(s->sections[KEYS_COST], "owned")->node;
    if (!owned)
        return false;
    if (owned->kind == DOCUMENT_TEXT)
        return strcmp(owned->text, equipment) == 0;
    for (const struct document_node *n = owned->children; n; n = n->next)
        if (strcmp(n->text, equipment) == 0)
            return true;
    return false;
}

size_t scenario_candidates(const struct scenario *s)
{
    return s->candidates;
}

void scenario_plan(const struct scenario *s, size_t index, struct plan *out)
{
    candidates_plan(s, index, out);
}

size_t scenario_keys(const struct scenario *s)
{
    return s->keys;
}

const char *scenario_key(const struct scenario *s, size_t key)
{
    return s->choices[key].row->key;
}

size_t scenario_options(const struct scenario *s, size_t key)
{
    return s->choices[key].count;
}

const char *scenario_option(const struct scenario *s, size_t key, size_t option)
{
    return s->choices[key].options[option].text;
}

size_t scenario_option_of(const struct scenario *s, size_t index, size_t key)
{
    size_t option[PARTS_PLAN_KEYS];
    candidates_options(s, index, option);
    return option[key];
}

size_t scenario_zero_sources(const struct scenario *s)
{
    return s->zero_count;
}

const char *scenario_zero_source(const struct scenario *s, size_t i)
{
    return s->zero_sources[i];
}

char *scenario_resolved_yaml(const struct scenario *s, size_t index)
{
    struct arena *a = arena_new();
    const struct document_node *tree = a ? resolve_tree(a, s, index) : NULL;
    char *text = tree ? resolve_yaml(tree) : NULL;
    arena_free(a);
    return text;
}

json_t *scenario_resolved_json(const struct scenario *s, size_t index)
{
    struct arena *a = arena_new();
    const struct document_node *tree = a ? resolve_tree(a, s, index) : NULL;
    json_t *json = tree ? resolve_json(tree) : NULL;
    arena_free(a);
    return json;
}

bool scenario_quantity(const struct scenario *s, const char *section, const char *key, struct scenario_quantity *out)
{
    for (int id = 0; id < KEYS_SECTIONS; id++) {
        const struct keys_section *keys = keys_section((enum keys_id)id);
        if (!keys->path || strcmp(keys->path, section) != 0)
            continue;
        const size_t i = keys_find(keys, key);
        if (i == keys_count(keys))
            return false;
        const struct keys_row *row = keys_row(keys, i);
        if (row->kind != KEYS_QUANTITY || row->size != sizeof(double))
            return false;
        *out = (struct scenario_quantity){row->offset, row->unit, units_si(s->units, row->dimension, row->unit, 1.0),
                                          row->min, row->max};
        return true;
    }
    return false;
}
