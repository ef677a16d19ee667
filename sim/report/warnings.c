#include "sim/report/warnings.h"

#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "models/tube.h"
#include "models/water.h"
#include "sim/base/files.h"
#include "sim/report/say.h"

/* ASTM D445 and D446: the least efflux time. */
static const double least_efflux_s = 200.0;
/* ISO 1628-1:2021: relative viscosity at least 1.2 and below 2.0. */
static const double least_top = 1.2, most_top = 2.0;
/* How far a bath may be from the temperature of the pair. */
static const double pair_window_K = 1.0;
/* How far a tube's constant may be from its own geometry. */
static const double geometry_window = 0.15;
/* Above this the volumes made up at room temperature are spoken of. */
static const double warm_K = 303.15;

static const char *const series_name[SERIES] = {"intact", "cleaved"};

static void add(struct warnings *w, const char *format, ...) __attribute__((format(printf, 2, 3)));
static void add(struct warnings *w, const char *format, ...)
{
    va_list arguments, again;
    va_start(arguments, format);
    va_copy(again, arguments);
    const int length = vsnprintf(NULL, 0, format, arguments);
    char *text = length < 0 ? NULL : malloc((size_t)length + 1);
    if (text)
        vsnprintf(text, (size_t)length + 1, format, again);
    va_end(again);
    va_end(arguments);
    if (text && w->count == w->room) {
        const size_t room = w->room ? 2 * w->room : 16;
        char **grown = realloc(w->text, room * sizeof *grown);
        if (grown) {
            w->text = grown;
            w->room = room;
        }
    }
    if (text && w->count < w->room)
        w->text[w->count++] = text;
    else
        free(text);
}

double warnings_level_left(const struct question *question)
{
    const double left = 1.0 - question->confidence;
    return question->sides == SIDES_TWO ? left / 2.0 : left;
}

bool warnings_plain_misleads(const struct question *question, const struct outcome *outcome)
{
    return question->has_against && outcome->at.plain_false_alarm > 2.0 * warnings_level_left(question);
}

static void plain_false_alarm(struct warnings *w, const struct question *q, const struct outcome *o)
{
    if (!warnings_plain_misleads(q, o))
        return;
    add(w,
        "decide at %s, not at %s: the plan's own bias is in the first and not in the second. Who compares with %s "
        "and the scatter alone raises a false alarm in %s of studies, where %s is meant.",
        say_points(o->at.critical).text, say_share(q->against).text, say_share(q->against).text,
        say_share(o->at.plain_false_alarm).text, say_share(warnings_level_left(q)).text);
}

/* "water 179.5 s, intact level 1 195.2 s": every nominal time that is short. */
static void short_efflux(struct warnings *w, const struct plan *p, const struct outcome *o)
{
    struct files_text list;
    if (!files_text_open(&list))
        return;
    const double water = o->water_efflux_s;
    bool any = water > 0.0 && water < least_efflux_s;
    if (any)
        fprintf(list.stream, "water %.1f s", water);
    for (int s = 0; s < SERIES; s++)
        for (size_t j = 0; j < o->levels[s]; j++) {
            const double t = o->nominal_efflux_s[s][j];
            if (!(t > 0.0 && t < least_efflux_s))
                continue;
            fprintf(list.stream, "%s%s level %zu %.1f s", any ? ", " : "", series_name[s], j + 1, t);
            any = true;
        }
    if (files_text_close(&list) && any)
        add(w, "times below 200 s (ASTM D445 asks for at least 200 s) in the tube %s: %s.", p->tube.name, list.bytes);
    files_text_free(&list);
}

static void top_viscosity(struct warnings *w, const struct plan *p)
{
    for (int s = 0; s < SERIES; s++)
        if (p->top[s] < least_top || p->top[s] >= most_top)
            add(w, "the top %s solution has a relative viscosity of %s; ISO 1628-1 asks for 1.2 to below 2.0.",
                series_name[s], say_number(p->top[s]).text);
}

static void pair_range(struct warnings *w, const struct material *m, const struct outcome *o)
{
    for (int s = 0; s < SERIES; s++) {
        const double M = o->molar_mass[s].truth;
        if (!(M < m->valid_from_kg_mol || M > m->valid_to_kg_mol))
            continue;
        add(w,
            "the %s polymer (viscosity average %s kg/mol) lies outside %s to %s kg/mol, the range in which K and a "
            "of %s were fitted.",
            series_name[s], say_digits(M, 3).text, say_short(m->valid_from_kg_mol, 4).text,
            say_short(m->valid_to_kg_mol, 4).text, m->name);
    }
}

static void pair_kind(struct warnings *w, const struct plan *p)
{
    const struct material *m = &p->material;
    if (m->calibrated_by != AVERAGE_VISCOSITY)
        add(w,
            "K and a of %s were calibrated against the %s average; used as viscosity averages, as here, the molar "
            "masses are off by what the two averages differ.",
            m->name, m->calibrated_by == AVERAGE_WEIGHT ? "weight" : "number");
    if (fabs(p->habits.temperature_K - m->fitted_at_K) > pair_window_K)
        add(w, "the bath is set to %s degC, but K and a of %s were fitted at %s degC.",
            say_short(say_celsius(p->habits.temperature_K), 4).text, m->name,
            say_short(say_celsius(m->fitted_at_K), 4).text);
}

static void geometry(struct warnings *w, const struct tube *t)
{
    const double by_law = tube_constant_poiseuille(t->bore_m, t->head_m, t->bulb_volume_m3, t->length_m);
    if (!(by_law > 0.0) || fabs(t->constant_m2_s2 / by_law - 1.0) <= geometry_window)
        return;
    add(w,
        "the tube %s has the constant %s mm2/s2, but its bore, length, bulb and head give %s mm2/s2 by Poiseuille's "
        "law: one of them is wrong.",
        t->name, say_digits(say_mm2_s2(t->constant_m2_s2), 3).text, say_digits(say_mm2_s2(by_law), 3).text);
}

static void warm_volumes(struct warnings *w, const struct habits *h)
{
    if (h->temperature_K <= warm_K)
        return;
    const double share = water_density(h->room_K) / water_density(h->temperature_K) - 1.0;
    add(w,
        "solutions are made up at room temperature (%s degC) and timed at %s degC: their concentration falls by %s, "
        "which is not in the figures.",
        say_short(say_celsius(h->room_K), 4).text, say_short(say_celsius(h->temperature_K), 4).text,
        say_share(share).text);
}

static void narrow(struct warnings *w, const struct question *q, bool too_narrow)
{
    if (!q->has_within)
        return;
    if (too_narrow)
        add(w,
            "coming within %s points is asked, which is narrower than the uncertainty of K and a allows: no bench "
            "can reach it.",
            say_short(say_percent(q->within), 4).text);
    if (q->against_is == AGAINST_SAME_CONSTANTS)
        add(w,
            "the uncertainty of K and a is left out, as asked (same constants): coming within %s points is meant "
            "relative to this pair, not absolutely.",
            say_short(say_percent(q->within), 4).text);
}

static void zero_sources(struct warnings *w, const struct scenario *s)
{
    struct files_text list;
    const size_t count = scenario_zero_sources(s);
    if (count == 0 || !files_text_open(&list))
        return;
    for (size_t i = 0; i < count; i++)
        fprintf(list.stream, "%s%s", i > 0 ? ", " : "", scenario_zero_source(s, i));
    if (files_text_close(&list))
        add(w, "%s set to exactly zero, so as if %s did not exist: %s.",
            count == 1 ? "one error source is" : "these error sources are", count == 1 ? "it" : "they", list.bytes);
    files_text_free(&list);
}

/* What the blank does when the levels hold less reagent than it. */
static void blank(struct warnings *w, const struct cleavage *c)
{
    if (c->blank_reference && !c->blank_diluent)
        add(w, "the blank is the reference, but the cleaved levels are diluted with water: they hold less reagent than "
               "the blank, which over-corrects. Dilute them with the blank, or take water as the reference.");
}

/* "fillings 3, runs 5": the replicates in which a plan differs from another. */
static void name_replicates(FILE *to, const struct scenario *s, size_t index, size_t other)
{
    bool any = false;
    for (size_t k = 0; k < scenario_keys(s); k++) {
        const size_t option = scenario_option_of(s, index, k);
        if (option == scenario_option_of(s, other, k))
            continue;
        fprintf(to, "%s%s %s", any ? ", " : "", scenario_key(s, k), scenario_option(s, k, option));
        any = true;
    }
}

void warnings_add_worse(struct warnings *warnings, const struct scenario *scenario, const struct worse *worse,
                        size_t count)
{
    static const char *const cause[] = {
        [WORSE_DRIFT] = "the drift of the bath turns the order: a longer day moves further from its own water",
        [WORSE_SPARE_RUNS] = "the spare runs turn the order: with more runs to choose from, those that agree are not "
                             "those that are right",
        [WORSE_DAYS] = "the days turn the order: where one ends within a series, its levels are held against "
                       "different waters",
        [WORSE_UNKNOWN] = "neither the drift of the bath, nor the spare runs, nor the days turn the order"};
    for (size_t i = 0; i < count; i++) {
        struct files_text dear, cheap;
        if (!files_text_open(&dear))
            return;
        name_replicates(dear.stream, scenario, worse[i].dearer, worse[i].cheaper);
        const bool good = files_text_close(&dear) && files_text_open(&cheap);
        if (good) {
            name_replicates(cheap.stream, scenario, worse[i].cheaper, worse[i].dearer);
            if (files_text_close(&cheap))
                add(warnings, "more work makes it worse: with %s it reaches %s, with the cheaper %s %s; %s.",
                    dear.bytes, say_share(worse[i].figure[1]).text, cheap.bytes, say_share(worse[i].figure[0]).text,
                    cause[worse[i].cause]);
            files_text_free(&cheap);
        }
        files_text_free(&dear);
    }
}

struct warnings *warnings_collect(const struct scenario *scenario, const struct plan *plan,
                                  const struct outcome *outcome, bool within_too_narrow)
{
    struct warnings *w = calloc(1, sizeof *w);
    if (!w)
        return NULL;
    const struct question *q = scenario_question(scenario);
    const bool played = plan && outcome && outcome->studies > 0;
    if (played)
        plain_false_alarm(w, q, outcome);
    narrow(w, q, within_too_narrow);
    if (played) {
        pair_range(w, &plan->material, outcome);
        short_efflux(w, plan, outcome);
    }
    if (plan) {
        pair_kind(w, plan);
        blank(w, &plan->cleavage);
        top_viscosity(w, plan);
        geometry(w, &plan->tube);
        warm_volumes(w, &plan->habits);
    }
    zero_sources(w, scenario);
    return w;
}

void warnings_free(struct warnings *warnings)
{
    if (!warnings)
        return;
    for (size_t i = 0; i < warnings->count; i++)
        free(warnings->text[i]);
    free(warnings->text);
    free(warnings);
}
