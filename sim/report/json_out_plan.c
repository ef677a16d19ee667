#include "sim/report/json_out_plan.h"

#include <stdlib.h>

static json_t *index_or_null(long index)
{
    return index == SEARCH_NONE ? json_null() : json_integer((json_int_t)index);
}

static json_t *options(const struct scenario *s, size_t index)
{
    json_t *object = json_object();
    for (size_t k = 0; k < scenario_keys(s); k++) {
        const char *option = scenario_option(s, k, scenario_option_of(s, index, k));
        json_object_set_new(object, scenario_key(s, k), json_string(option));
    }
    return object;
}

static json_t *entry(const struct scenario *s, const struct search_result *r, size_t index)
{
    const struct outcome *o = &r->candidates[index].outcome;
    json_t *object = json_object();
    json_object_set_new(object, "index", json_integer((json_int_t)index));
    json_object_set_new(object, "options", options(s, index));
    if (o->studies > 0)
        json_object_set_new(object, "outcome", json_out_outcome(scenario_question(s), o, false));
    if (o->why[0] || o->studies == 0)
        json_object_set_new(object, "why", json_string(o->why));
    json_object_set_new(object, "status", json_string(outcome_status_text(o->status)));
    return object;
}

/* Mark what is named elsewhere in the object. */
static void mark(const struct scenario *s, const struct search_result *r, bool *named)
{
    if (r->recommended != SEARCH_NONE)
        named[r->recommended] = true;
    if (r->nearest_miss != SEARCH_NONE)
        named[r->nearest_miss] = true;
    for (size_t k = 0; k < scenario_keys(s); k++)
        for (size_t o = 0; o < scenario_options(s, k); o++) {
            const long index = search_choice(s, r, k, o);
            if (index != SEARCH_NONE)
                named[index] = true;
        }
}

static json_t *entries(const struct scenario *s, const struct search_result *r)
{
    bool *named = calloc(r->count ? r->count : 1, sizeof *named);
    if (!named)
        return NULL;
    json_t *array = json_array();
    mark(s, r, named);
    for (size_t i = 0; i < r->count; i++)
        if (named[i] || r->candidates[i].outcome.status == STATUS_RESOLVES)
            json_array_append_new(array, entry(s, r, i));
    free(named);
    return array;
}

static json_t *chosen(const struct question *q, long index, const struct outcome *o)
{
    if (index == SEARCH_NONE)
        return json_null();
    json_t *object = json_object();
    json_object_set_new(object, "index", json_integer((json_int_t)index));
    json_object_set_new(object, "outcome", json_out_outcome(q, o, true));
    return object;
}

static json_t *choices(const struct scenario *s, const struct search_result *r)
{
    json_t *object = json_object();
    for (size_t k = 0; k < scenario_keys(s); k++) {
        json_t *of = json_object();
        for (size_t o = 0; o < scenario_options(s, k); o++)
            json_object_set_new(of, scenario_option(s, k, o), index_or_null(search_choice(s, r, k, o)));
        json_object_set_new(object, scenario_key(s, k), of);
    }
    return object;
}

static json_t *counts(const struct search_result *r)
{
    json_t *object = json_object();
    for (int i = 0; i < STATUSES; i++)
        json_object_set_new(object, outcome_status_text((enum status)i), json_integer((json_int_t)r->counts[i]));
    return object;
}

json_t *json_out_plan(const struct report_context *context, const struct search_result *search,
                      const struct warnings *warnings)
{
    const struct scenario *s = context->scenario;
    const struct question *q = scenario_question(s);
    json_t *object = json_out_head(context, "plan", warnings);
    if (!object)
        return NULL;
    json_object_set_new(object, "candidates", entries(s, search));
    json_object_set_new(object, "recommended", chosen(q, search->recommended, &search->fresh));
    if (search->recommended == SEARCH_NONE) {
        json_t *miss = chosen(q, search->nearest_miss, &search->nearest);
        if (json_is_object(miss))
            json_object_set_new(miss, "limit", json_string(search->constants_are_limit ? "constants" : "bench"));
        json_object_set_new(object, "nearest_miss", miss);
    }
    json_object_set_new(object, "cheapest_by_choice", choices(s, search));
    json_t *spent = json_object();
    json_object_set_new(spent, "studies", json_integer((json_int_t)search->spent));
    json_object_set_new(spent, "exhaustive", json_integer((json_int_t)search->exhaustive));
    json_object_set_new(object, "spent", spent);
    json_object_set_new(object, "counts", counts(search));
    return object;
}
