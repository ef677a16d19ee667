#include "sim/report/sheet_json.h"

#include <math.h>

#include "sim/report/json_out.h"
#include "sim/report/say.h"

static const char *const series_name[SERIES] = {"intact", "cleaved"};

static void put(json_t *object, const char *key, double x)
{
    json_object_set_new(object, key, isfinite(x) ? json_real(x) : json_null());
}

static void put_count(json_t *object, const char *key, size_t n)
{
    json_object_set_new(object, key, json_integer((json_int_t)n));
}

static void put_text(json_t *object, const char *key, const char *text)
{
    json_object_set_new(object, key, json_string(text));
}

static json_t *weighings(const struct sheet_work *w)
{
    json_t *array = json_array();
    for (size_t i = 0; i < w->stocks; i++) {
        const struct sheet_work_stock *s = &w->stock[i];
        json_t *object = json_object();
        put_text(object, "stock", s->name);
        put(object, "polymer_g", say_g(s->polymer_kg));
        put(object, "flask_mL", say_mL(s->flask_m3));
        put(object, "tolerance_mL", say_mL(s->tolerance_m3));
        put(object, "concentration", s->conc_kg_m3);
        json_array_append_new(array, object);
    }
    return array;
}

/* In flasks what is pipetted and made up; in the tube what goes into it. A
 * volume that does not arise is null. */
static json_t *flasks(const struct sheet_work *w)
{
    const bool in_tube = w->plan->dilution == DILUTION_IN_TUBE;
    json_t *array = json_array();
    for (size_t i = 0; i < w->levels; i++) {
        const struct sheet_work_level *l = &w->level[i];
        const bool with_blank = l->series == CLEAVED && w->plan->cleavage.blank_diluent;
        json_t *object = json_object();
        put_text(object, "solution", series_name[l->series]);
        put_count(object, "level", l->level + 1);
        put(object, "concentration", l->conc_kg_m3);
        json_object_set_new(object, "diluted", json_boolean(l->diluted));
        json_object_set_new(object, "diluent", l->diluted ? json_string(with_blank ? "blank" : "water") : json_null());
        put(object, "taken_mL", l->taken_m3 > 0.0 ? say_mL(l->taken_m3) : (double)NAN);
        put(object, "flask_mL", l->flask_m3 > 0.0 ? say_mL(l->flask_m3) : (double)NAN);
        put(object, "tolerance_mL", l->flask_m3 > 0.0 ? say_mL(l->tolerance_m3) : (double)NAN);
        put(object, "tube_mL", in_tube ? say_mL(l->tube_m3) : (double)NAN);
        json_array_append_new(array, object);
    }
    return array;
}

static json_t *expected(const struct expected_time *t)
{
    json_t *object = json_object();
    put(object, "mean", t->mean_s);
    put(object, "sd", t->sd_s);
    put(object, "low", t->low_s);
    put(object, "high", t->high_s);
    return object;
}

static json_t *row(const struct sheet_work *w, const struct sheet_work_row *r)
{
    const struct notebook_filling *f = r->filling;
    const bool water = f->water || f->blank;
    json_t *object = json_object();
    put_count(object, "day", f->day + 1);
    put(object, "begins_min", say_minutes(r->begins_s));
    put(object, "first_run_min", say_minutes(r->first_run_s));
    put(object, "ends_min", say_minutes(r->ends_s));
    put_text(object, "solution", sheet_work_solution(f));
    json_object_set_new(object, "level", water ? json_null() : json_integer((json_int_t)f->level + 1));
    put(object, "concentration", water ? (double)NAN : w->design.liquid[r->liquid].conc_kg_m3);
    put_count(object, "filling", f->number + 1);
    put_count(object, "runs", f->runs);
    json_object_set_new(object, "expected_s", expected(&w->expected[0].time[r->liquid]));
    if (w->polymers > 1)
        json_object_set_new(object, "expected_second_s", expected(&w->expected[1].time[r->liquid]));
    return object;
}

static json_t *sheet(const struct sheet_work *w)
{
    json_t *object = json_object(), *rows = json_array();
    put_count(object, "preparations", w->plan->preparations);
    put_count(object, "polymers", w->polymers);
    put_count(object, "days", w->design.days);
    put(object, "bench_hours", say_hours(w->design.nominal_clock_s));
    put(object, "preparation_hours", say_hours(w->design.preparation_s));
    put(object, "polymer_g", say_g(w->design.polymer_kg));
    put(object, "blank_mL", say_mL(w->blank_m3));
    put(object, "aliquot_mL", say_mL(w->aliquot_m3));
    json_object_set_new(object, "weighings", weighings(w));
    json_object_set_new(object, "flasks", flasks(w));
    for (size_t i = 0; i < w->rows; i++)
        json_array_append_new(rows, row(w, &w->row[i]));
    json_object_set_new(object, "timetable", rows);
    return object;
}

json_t *sheet_json_make(const struct report_context *context, const struct sheet_work *work,
                        const struct warnings *warnings)
{
    const char *why = sheet_work_why(work);
    json_t *object = json_out_head(context, "sheet", warnings);
    if (!object)
        return NULL;
    if (why) {
        put_text(object, "why", why);
        put_text(object, "status", outcome_status_text(STATUS_IMPOSSIBLE));
    } else
        json_object_set_new(object, "sheet", sheet(work));
    return object;
}
