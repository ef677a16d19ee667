#include "sim/judge/exchange.h"

#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "sim/bench/cost.h"
#include "sim/judge/bar.h"

enum { EXCHANGE_STUDIES = 4096, MORE_FILLINGS = 6, MORE_RUNS = 4 };

bool exchange_margin(const struct scenario *s, const struct plan *plan, size_t studies, struct exchange_look *out)
{
    struct design design;
    struct play play;
    struct outcome outcome;
    const size_t cap = scenario_studies(s), n = cap < studies ? cap : studies;
    bool ok = design_make(&design, plan, scenario_cost(s), scenario_question(s));
    *out = (struct exchange_look){-1000.0, 0.0};
    if (ok && !design_why(&design, &plan->analysis)) {
        play_start(&play, &design, scenario_seed(s));
        outcome_fractions(scenario_question(s), &play);
        play.analyses = 1;
        play.analysis[0] = plan->analysis;
        play.active[0] = true;
        ok = play_until(&play, n) && outcome_of(s, plan, &play, 0, &outcome);
        /* given at the cap: brought to these studies */
        if (ok) out->margin = outcome.margin_se * sqrt((double)n / (double)cap);
        if (ok) out->figure = scenario_question(s)->has_against ? outcome.at.power : outcome.at.within;
        play_free(&play);
    }
    design_free(&design);
    return ok;
}

/* A plan with other replicates, and what it costs by nominal times. */
struct offer {
    size_t fillings, runs;
    struct cost cost;
    double least; /* in what the cheapest plan is least in */
};

static int cheaper_first(const void *a, const void *b)
{
    const struct offer *const x = a, *const y = b;
    return (x->least > y->least) - (x->least < y->least);
}

static struct plan with(const struct plan *plan, const struct offer *offer)
{
    struct plan p = *plan;
    for (size_t k = 0; k < SERIES; k++) p.fillings[k] += offer->fillings;
    p.runs += offer->runs;
    return p;
}

static bool cost_offer(const struct scenario *s, const struct plan *plan, struct offer *offer)
{
    const struct plan p = with(plan, offer);
    struct design design;
    const bool possible = p.fillings[INTACT] <= PLAN_MAX_FILLINGS && p.fillings[CLEAVED] <= PLAN_MAX_FILLINGS && p.runs <= PLAN_MAX_RUNS;
    offer->cost = (struct cost){(double)INFINITY, (double)INFINITY};
    offer->least = (double)INFINITY;
    if (!possible) return true;
    const bool ok = design_make(&design, &p, scenario_cost(s), scenario_question(s));
    if (ok && !design_why(&design, &p.analysis)) offer->cost = cost_of(&design, scenario_cost(s), design.nominal_clock_s, 0.0);
    offer->least = scenario_cost(s)->least == LEAST_HOURS ? offer->cost.hours_s : offer->cost.money;
    design_free(&design);
    return ok;
}

static void write_offer(const struct plan *plan, const struct offer *offer, const struct offer *now, struct margin_exchange *out)
{
    const struct plan p = with(plan, offer);
    char cleaved[24] = "";
    if (p.fillings[CLEAVED] != p.fillings[INTACT]) snprintf(cleaved, sizeof cleaved, " (%zu cleaved)", p.fillings[CLEAVED]);
    snprintf(out->replicates, sizeof out->replicates, "fillings %zu%s, runs %zu", p.fillings[INTACT], cleaved, p.runs);
    out->hours_s = offer->cost.hours_s - now->cost.hours_s;
    out->money = offer->cost.money - now->cost.money;
    out->studies_to_pay = out->money > 0.0 ? ceil(plan->bath.price / out->money) : (double)NAN;
}

bool exchange_find(const struct scenario *s, const struct plan *plan, struct margin_exchange *out, bool *found)
{
    struct offer offer[MORE_FILLINGS * (MORE_RUNS + 1)];
    struct plan worse = *plan;
    struct offer now = {0};
    size_t count = 0;
    struct exchange_look look;
    *found = false;
    memset(out, 0, sizeof *out);
    out->studies_to_pay = (double)NAN;
    if (!exchange_margin(s, plan, EXCHANGE_STUDIES, &look)) return false;
    if (look.margin < 0.0) return true;
    *found = true;
    worse.bath.fluctuation_K *= 2.0;
    worse.bath.drift_u_K_s *= 2.0;
    worse.bath.day_u_K *= 2.0;
    worse.bath.gradient_u_K *= 2.0;
    if (!cost_offer(s, plan, &now)) return false;
    for (size_t f = 0; f < MORE_FILLINGS; f++)
        for (size_t r = 0; r <= MORE_RUNS; r++) {
            offer[count] = (struct offer){.fillings = f, .runs = r};
            if (!cost_offer(s, plan, &offer[count++])) return false;
        }
    qsort(offer, count, sizeof *offer, cheaper_first);
    for (size_t i = 0; i < count && isfinite(offer[i].cost.hours_s); i++) {
        const struct plan p = with(&worse, &offer[i]);
        if (!exchange_margin(s, &p, EXCHANGE_STUDIES, &look)) return false;
        if (look.margin < 0.0) continue;
        write_offer(plan, &offer[i], &now, out);
        return true;
    }
    return true;
}
