#include "sim/report/json_out_margin.h"

#include <math.h>

#include "sim/report/say.h"

static void put(json_t *object, const char *key, double x)
{
    json_object_set_new(object, key, isfinite(x) ? json_real(x) : json_null());
}

static json_t *conditions(const struct margins *m)
{
    json_t *array = json_array();
    for (size_t i = 0; i < m->count; i++) {
        const struct margin *c = &m->margin[i];
        json_t *object = json_object();
        json_object_set_new(object, "key", json_string(c->key));
        json_object_set_new(object, "name", json_string(c->name));
        json_object_set_new(object, "unit", json_string(c->unit));
        json_object_set_new(object, "direction", json_string(c->up ? "up" : "down"));
        put(object, "nominal", c->nominal);
        put(object, "worst", c->worst);
        put(object, "se", c->se);
        json_object_set_new(object, "verdict", json_string(margin_verdict_text(c->verdict)));
        json_array_append_new(array, object);
    }
    return array;
}

static json_t *exchange(const struct margins *m)
{
    const struct margin_exchange *e = &m->exchange;
    const bool some = *e->replicates;
    json_t *array = json_array();
    if (!m->has_exchange)
        return array;
    json_t *object = json_object();
    json_object_set_new(object, "replicates", json_string(some ? e->replicates : "none"));
    put(object, "hours", some ? say_hours(e->hours_s) : (double)NAN);
    put(object, "money", some ? e->money : (double)NAN);
    put(object, "studies_to_pay", some ? e->studies_to_pay : (double)NAN);
    json_array_append_new(array, object);
    return array;
}

json_t *json_out_margin(const struct report_context *context, const struct margins *margins,
                        const struct warnings *warnings)
{
    json_t *object = json_out_head(context, "margin", warnings);
    if (!object || !json_out_played(object, context, &margins->outcome, false))
        return object;
    json_object_set_new(object, "margins", conditions(margins));
    json_object_set_new(object, "exchange", exchange(margins));
    return object;
}
