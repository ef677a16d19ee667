#include "sim/report/json_out.h"

#include <math.h>
#include <string.h>

#include "sim/report/say.h"

/* A number, or null for what is not finite. */
static json_t *number(double x)
{
    return isfinite(x) ? json_real(x) : json_null();
}

static void put(json_t *object, const char *key, double x)
{
    json_object_set_new(object, key, number(x));
}

static void put_if(json_t *object, const char *key, double x)
{
    if (isfinite(x))
        json_object_set_new(object, key, json_real(x));
}

static json_t *interval(struct interval i)
{
    json_t *object = json_object();
    put(object, "low", i.low);
    put(object, "high", i.high);
    return object;
}

static json_t *spread(struct spread_of s)
{
    json_t *object = json_object();
    put(object, "true", s.truth);
    put(object, "mean", s.mean);
    put(object, "sd", s.sd);
    return object;
}

/* {"intact": ..., "cleaved": ...} */
static json_t *both(json_t *intact, json_t *cleaved)
{
    json_t *object = json_object();
    json_object_set_new(object, "intact", intact);
    json_object_set_new(object, "cleaved", cleaved);
    return object;
}

static json_t *levels(const struct outcome *o, int series)
{
    json_t *array = json_array();
    for (size_t j = 0; j < o->levels[series]; j++)
        json_array_append_new(array, number(o->concentration_kg_m3[series][j]));
    return array;
}

static void put_spreads(json_t *object, const struct outcome *o)
{
    json_object_set_new(object, "intrinsic_viscosity",
                        both(spread(o->intrinsic[INTACT]), spread(o->intrinsic[CLEAVED])));
    json_object_set_new(object, "molar_mass", both(spread(o->molar_mass[INTACT]), spread(o->molar_mass[CLEAVED])));
}

static void put_facts(json_t *object, const struct outcome *o)
{
    json_object_set_new(object, "concentrations", both(levels(o, INTACT), levels(o, CLEAVED)));
    json_t *flasks = json_object();
    put(flasks, "level", say_mL(o->level_flask_m3));
    put(flasks, "intact_stock", say_mL(o->stock_flask_m3[INTACT]));
    put(flasks, "cleaved_stock", say_mL(o->stock_flask_m3[CLEAVED]));
    json_object_set_new(object, "flasks_mL", flasks);
    json_object_set_new(object, "days", json_integer((json_int_t)o->days));
    put(object, "bench_hours", say_hours(o->at.clock_s));
    put(object, "hours", say_hours(o->at.hours_s));
    put(object, "polymer_g", say_g(o->polymer_kg));
    put(object, "money", o->at.money);
    json_object_set_new(object, "status", json_string(outcome_status_text(o->status)));
}

static void put_errors(json_t *object, const struct figures *se)
{
    json_t *errors = json_object();
    put_if(errors, "mean", se->mean);
    put_if(errors, "bias", se->bias);
    put_if(errors, "sd", se->sd);
    put_if(errors, "rmse", se->rmse);
    json_object_set_new(errors, "interval", interval(se->interval));
    json_object_set_new(errors, "shortest", interval(se->shortest));
    put_if(errors, "within", se->within);
    put_if(errors, "critical", se->critical);
    put_if(errors, "power", se->power);
    put_if(errors, "plain_false_alarm", se->plain_false_alarm);
    put_if(errors, "no_answer", se->no_answer);
    put_if(errors, "spare_runs", se->spare_runs);
    put_if(errors, "bench_hours", say_hours(se->clock_s));
    put_if(errors, "hours", say_hours(se->hours_s));
    put_if(errors, "money", se->money);
    json_object_set_new(object, "se", errors);
}

static void put_judged(json_t *object, const struct question *q, const struct outcome *o, bool deep)
{
    if (q->has_within) {
        json_t *within = json_object();
        put(within, "share", o->at.within);
        json_object_set_new(object, "within", within);
    }
    if (q->has_against) {
        json_t *power = json_object();
        put(power, "critical", o->at.critical);
        put(power, "power", o->at.power);
        put(power, "plain_false_alarm", o->at.plain_false_alarm);
        json_object_set_new(object, "power", power);
    }
    if (!deep)
        return;
    json_t *resolvable = json_object();
    if (q->has_against)
        put(resolvable, "against", o->resolvable_against);
    if (q->has_within)
        put(resolvable, "within", o->resolvable_within);
    json_object_set_new(object, "resolvable", resolvable);
}

json_t *json_out_outcome(const struct question *question, const struct outcome *outcome, bool deep)
{
    const struct figures *at = &outcome->at;
    json_t *object = json_object();
    if (!object)
        return NULL;
    json_object_set_new(object, "studies", json_integer((json_int_t)outcome->studies));
    put(object, "truth", outcome->truth);
    put(object, "mean", at->mean);
    put(object, "bias", at->bias);
    put(object, "sd", at->sd);
    put(object, "rmse", at->rmse);
    json_object_set_new(object, "interval", interval(at->interval));
    json_object_set_new(object, "shortest", interval(at->shortest));
    put_judged(object, question, outcome, deep);
    put(object, "no_answer", at->no_answer);
    put(object, "spare_runs", at->spare_runs);
    put_spreads(object, outcome);
    put_facts(object, outcome);
    put_errors(object, &outcome->se);
    return object;
}

json_t *json_out_head(const struct report_context *context, const char *verb, const struct warnings *warnings)
{
    const struct scenario *s = context->scenario;
    json_t *object = json_object();
    if (!object)
        return NULL;
    json_object_set_new(object, "program", json_string("vicinal"));
    json_object_set_new(object, "version", json_string(context->version));
    json_object_set_new(object, "verb", json_string(verb));
    json_object_set_new(object, "seed", json_integer((json_int_t)scenario_seed(s)));
    json_object_set_new(object, "scenario", scenario_resolved_json(s, SIZE_MAX));
    json_t *texts = json_array();
    for (size_t i = 0; i < warnings->count; i++)
        json_array_append_new(texts, json_string(warnings->text[i]));
    json_object_set_new(object, "warnings", texts);
    json_t *zeros = json_array();
    for (size_t i = 0; i < scenario_zero_sources(s); i++)
        json_array_append_new(zeros, json_string(scenario_zero_source(s, i)));
    json_object_set_new(object, "zero_sources", zeros);
    return object;
}

bool json_out_played(json_t *object, const struct report_context *context, const struct outcome *outcome, bool deep)
{
    if (outcome->studies > 0) {
        const struct question *question = scenario_question(context->scenario);
        json_object_set_new(object, "outcome", json_out_outcome(question, outcome, deep));
        return true;
    }
    json_object_set_new(object, "why", json_string(outcome->why));
    json_object_set_new(object, "status", json_string(outcome_status_text(outcome->status)));
    return false;
}

json_t *json_out_trial(const struct report_context *context, const struct outcome *outcome,
                       const struct warnings *warnings)
{
    json_t *object = json_out_head(context, "trial", warnings);
    if (!object)
        return NULL;
    json_out_played(object, context, outcome, true);
    return object;
}

json_t *json_out_check(const struct report_context *context, double seconds, const struct warnings *warnings)
{
    json_t *object = json_out_head(context, "check", warnings);
    if (!object)
        return NULL;
    const size_t count = scenario_candidates(context->scenario);
    json_object_set_new(object, "candidates", json_integer((json_int_t)count));
    put(object, "seconds", seconds);
    return object;
}
