#include "sim/report/json_out_budget.h"

#include <math.h>

static void put(json_t *object, const char *key, double x)
{
    json_object_set_new(object, key, isfinite(x) ? json_real(x) : json_null());
}

static json_t *groups(const struct budget *b)
{
    json_t *array = json_array();
    for (int i = 0; i < SOURCES; i++) {
        const struct budget_group *g = &b->group[i];
        json_t *object = json_object(), *se = json_object();
        json_object_set_new(object, "name", json_string(sources_name((enum draws_group)i)));
        put(object, "first", g->first);
        put(object, "total", g->total);
        put(object, "alone_sd", g->alone_sd);
        put(se, "first", g->first_se);
        put(se, "total", g->total_se);
        put(se, "alone_sd", g->alone_sd_se);
        json_object_set_new(object, "se", se);
        json_array_append_new(array, object);
    }
    return array;
}

static json_t *biases(const struct budget *b)
{
    json_t *array = json_array();
    for (int i = 0; i < BUDGET_BIASES; i++) {
        json_t *object = json_object();
        json_object_set_new(object, "name", json_string(budget_bias_name((enum budget_bias)i)));
        put(object, "shift", b->bias[i].shift);
        put(object, "se", b->bias[i].se);
        json_array_append_new(array, object);
    }
    return array;
}

static json_t *claimed(const struct budget *b)
{
    if (!isfinite(b->coverage))
        return json_null();
    json_t *object = json_object();
    put(object, "coverage", b->coverage);
    put(object, "se", b->coverage_se);
    return object;
}

json_t *json_out_budget(const struct report_context *context, const struct budget *budget,
                        const struct warnings *warnings)
{
    json_t *object = json_out_head(context, "budget", warnings);
    if (!object || !json_out_played(object, context, &budget->outcome, false))
        return object;
    json_object_set_new(object, "pairs", json_integer((json_int_t)budget->studies));
    put(object, "left_out", budget->left_out);
    json_object_set_new(object, "groups", groups(budget));
    json_object_set_new(object, "biases", biases(budget));
    json_object_set_new(object, "claimed", claimed(budget));
    return object;
}
