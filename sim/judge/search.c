#include "sim/judge/search.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/bench/cost.h"
#include "sim/judge/bar.h"
#include "sim/judge/group_play.h"
#include "sim/judge/groups.h"
#include "sim/judge/trial.h"

/* At most so many candidates are taken to the cap to find the nearest miss. */
enum { SEARCH_NEAR = 8 };

/* The search as it goes on. */
struct search {
    const struct scenario *s;
    struct search_options options;
    struct search_result *r;
    bool *set_aside; /* [count] passed at first but not on fresh studies */
};

static double cost_exact(const struct scenario *s, const struct outcome *o)
{
    return scenario_cost(s)->least == LEAST_HOURS ? o->at.hours_s / 3600.0 : o->at.money;
}

static double cost_se(const struct scenario *s, const struct outcome *o)
{
    return scenario_cost(s)->least == LEAST_HOURS ? o->se.hours_s / 3600.0 : o->se.money;
}

static double cost_compared(const struct scenario *s, const struct outcome *o)
{
    return cost_rounded(scenario_cost(s), (struct cost){o->at.hours_s, o->at.money});
}

static const struct outcome *outcome_at(const struct search *x, size_t i)
{
    return &x->r->candidates[i].outcome;
}

static bool resolves(const struct search *x, size_t i)
{
    return outcome_at(x, i)->status == STATUS_RESOLVES && !x->set_aside[i];
}

/* Whether candidate i comes before j: cheaper, else the greater margin, else
 * listed first. */
static bool before(const struct search *x, size_t i, size_t j)
{
    const double ci = cost_compared(x->s, outcome_at(x, i)), cj = cost_compared(x->s, outcome_at(x, j));
    if (ci != cj) return ci < cj;
    const double mi = outcome_at(x, i)->margin_se, mj = outcome_at(x, j)->margin_se;
    return mi != mj ? mi > mj : i < j;
}

static void tell(const struct search *x, double done)
{
    if (x->options.progress) x->options.progress(x->options.context, done);
}

/* Every bench group: struck out, or played until all of it is decided. */
static bool look_at_all(struct search *x)
{
    struct groups groups;
    if (!groups_make(x->s, &groups)) return false;
    bool ok = true;
    for (size_t g = 0; ok && g < groups.count; g++) {
        const struct group_job job = {.s = x->s, .members = groups.member + groups.group[g].first, .count = groups.group[g].count,
                                      .to_cap = x->options.exhaustive};
        struct group_tally tally = {0};
        ok = group_play(&job, x->r->candidates, &tally);
        x->r->spent += tally.spent;
        x->r->exhaustive += tally.exhaustive;
        x->r->groups += tally.exhaustive > 0;
        tell(x, 0.8 * (double)(g + 1) / (double)groups.count);
    }
    groups_free(&groups);
    return ok;
}

/* Take chosen candidates to the cap, those of one group together where they
 * stand side by side. */
static bool take_to_cap(struct search *x, const size_t *chosen, size_t count)
{
    bool ok = true;
    for (size_t i = 0; ok && i < count;) {
        size_t together = 1;
        while (i + together < count && groups_same(x->s, chosen[i], chosen[i + together])) together++;
        const struct group_job job = {.s = x->s, .members = chosen + i, .count = together, .to_cap = true};
        struct group_tally tally = {0};
        ok = group_play(&job, x->r->candidates, &tally);
        x->r->spent += tally.spent;
        i += together;
    }
    return ok;
}

/* Resolving candidates that may be the cheapest once their cost is known at
 * the cap, and are not there yet; with a single contender none. Returns how
 * many were listed. */
static size_t contenders(const struct search *x, size_t *list)
{
    const double half = scenario_cost(x->s)->least == LEAST_HOURS ? 0.05 : 0.5, sure = 4.0;
    double best = INFINITY;
    size_t count = 0, all = 0;
    for (size_t i = 0; i < x->r->count; i++)
        if (resolves(x, i)) best = fmin(best, cost_exact(x->s, outcome_at(x, i)) + sure * cost_se(x->s, outcome_at(x, i)));
    for (size_t i = 0; i < x->r->count; i++) {
        const struct outcome *const o = outcome_at(x, i);
        if (!resolves(x, i) || cost_exact(x->s, o) - sure * cost_se(x->s, o) > best + 2.0 * half) continue;
        all++;
        if (o->studies < scenario_studies(x->s)) list[count++] = i;
    }
    return all > 1 ? count : 0;
}

/* The recommended plan: the cheapest that also passes on fresh studies. */
static bool recommend(struct search *x, size_t *list)
{
    for (;;) {
        for (size_t n; (n = contenders(x, list)) > 0;)
            if (!take_to_cap(x, list, n)) return false;
        long best = SEARCH_NONE;
        for (size_t i = 0; i < x->r->count; i++)
            if (resolves(x, i) && (best == SEARCH_NONE || before(x, i, (size_t)best))) best = (long)i;
        if (best == SEARCH_NONE) return true;
        struct plan plan;
        scenario_plan(x->s, (size_t)best, &plan);
        const struct trial_options fresh = {.first_study = search_fresh_study(x->s), .deep = false};
        if (!trial_run(x->s, &plan, fresh, &x->r->fresh, NULL)) return false;
        x->r->spent += scenario_studies(x->s) * (scenario_question(x->s)->has_against ? 2 : 1);
        if (x->r->fresh.status == STATUS_RESOLVES) {
            x->r->recommended = best;
            return true;
        }
        x->set_aside[best] = true;
        x->r->candidates[best].outcome.status = x->r->fresh.status == STATUS_TOO_DEAR ? STATUS_TOO_DEAR : STATUS_UNDECIDED;
    }
}

/* Candidates that were played and may be the nearest miss at the cap, best
 * first; at most SEARCH_NEAR. */
static size_t near_misses(const struct search *x, size_t *list)
{
    size_t count = 0;
    const double cap = (double)scenario_studies(x->s);
    double best = -INFINITY;
    for (size_t i = 0; i < x->r->count; i++) {
        const struct outcome *const o = outcome_at(x, i);
        if (o->studies > 0) best = fmax(best, o->margin_se - BAR_BAND * sqrt(cap / (double)o->studies - 1.0));
    }
    for (size_t i = 0; i < x->r->count; i++) {
        const struct outcome *const o = outcome_at(x, i);
        if (o->studies == 0 || o->status == STATUS_TOO_DEAR || o->margin_se + BAR_BAND * sqrt(cap / (double)o->studies - 1.0) < best) continue;
        size_t at = count < SEARCH_NEAR ? count++ : SEARCH_NEAR;
        for (; at > 0 && outcome_at(x, list[at - 1])->margin_se < o->margin_se; at--)
            if (at < SEARCH_NEAR) list[at] = list[at - 1];
        if (at < SEARCH_NEAR) list[at] = i;
    }
    return count;
}

static bool with_known_constants(struct search *x, const struct plan *plan)
{
    struct plan known = *plan;
    struct outcome outcome;
    if (plan->material.eta_u == 0.0 && plan->material.a_u == 0.0) return true; /* the bench */
    known.material.eta_u = known.material.a_u = 0.0;
    if (!trial_run(x->s, &known, (struct trial_options){0}, &outcome, NULL)) return false;
    x->r->constants_are_limit = outcome.status == STATUS_RESOLVES;
    return true;
}

static bool nearest_miss(struct search *x, size_t *list)
{
    const size_t n = near_misses(x, list);
    long best = SEARCH_NONE;
    if (n == 0) return true;
    if (!x->options.exhaustive && !take_to_cap(x, list, n)) return false;
    /* what passed but not on fresh studies stays set aside */
    for (size_t i = 0; i < n; i++)
        if (x->set_aside[list[i]] && outcome_at(x, list[i])->status == STATUS_RESOLVES) x->r->candidates[list[i]].outcome.status = STATUS_UNDECIDED;
    for (size_t i = 0; i < n; i++) {
        const struct outcome *const o = outcome_at(x, list[i]);
        const struct outcome *const b = best == SEARCH_NONE ? NULL : outcome_at(x, (size_t)best);
        if (o->status == STATUS_TOO_DEAR) continue;
        if (!b || o->margin_se > b->margin_se || (o->margin_se == b->margin_se && before(x, list[i], (size_t)best))) best = (long)list[i];
    }
    if (best == SEARCH_NONE) return true;
    struct plan plan;
    scenario_plan(x->s, (size_t)best, &plan);
    x->r->nearest_miss = best;
    if (!trial_run(x->s, &plan, (struct trial_options){.deep = true}, &x->r->nearest, NULL)) return false;
    if (x->r->nearest.status == STATUS_RESOLVES) x->r->nearest.status = STATUS_UNDECIDED;
    return with_known_constants(x, &plan);
}

/* What the recommended plan can just tell apart, on its fresh studies. */
static bool deepen(struct search *x)
{
    struct plan plan;
    const long subject = x->r->recommended != SEARCH_NONE ? x->r->recommended : x->r->nearest_miss;
    if (subject == SEARCH_NONE) return true;
    scenario_plan(x->s, (size_t)subject, &plan);
    if (!trial_too_narrow(x->s, &plan, &x->r->within_too_narrow)) return false;
    if (x->r->recommended == SEARCH_NONE) return true;
    return trial_run(x->s, &plan, (struct trial_options){.first_study = search_fresh_study(x->s), .deep = true}, &x->r->fresh, NULL);
}

static size_t choices_before(const struct scenario *s, size_t key)
{
    size_t sum = 0;
    for (size_t k = 0; k < key; k++) sum += scenario_options(s, k);
    return sum;
}

static bool choices(struct search *x)
{
    const size_t keys = scenario_keys(x->s), total = choices_before(x->s, keys);
    long *const choice = malloc((total + 1) * sizeof *choice);
    x->r->by_choice = choice;
    if (!choice) return false;
    for (size_t i = 0; i < total; i++) choice[i] = SEARCH_NONE;
    for (size_t i = 0; i < x->r->count; i++) {
        x->r->counts[outcome_at(x, i)->status]++;
        if (!resolves(x, i)) continue;
        const double cost = cost_compared(x->s, outcome_at(x, i));
        for (size_t k = 0, at = 0; k < keys; at += scenario_options(x->s, k++)) {
            long *const c = &choice[at + scenario_option_of(x->s, i, k)];
            const double other = *c == SEARCH_NONE ? (double)INFINITY : cost_compared(x->s, outcome_at(x, (size_t)*c));
            if (cost < other || (cost == other && (long)i == x->r->recommended)) *c = (long)i;
        }
    }
    return true;
}

bool search_run(const struct scenario *s, struct search_options options, struct search_result *out)
{
    memset(out, 0, sizeof *out);
    out->recommended = out->nearest_miss = SEARCH_NONE;
    out->count = scenario_candidates(s);
    out->candidates = calloc(out->count, sizeof *out->candidates);
    struct search x = {.s = s, .options = options, .r = out, .set_aside = calloc(out->count, sizeof *x.set_aside)};
    size_t *const list = malloc((out->count + SEARCH_NEAR) * sizeof *list);
    bool ok = out->candidates && x.set_aside && list && look_at_all(&x) && recommend(&x, list);
    tell(&x, 0.9);
    if (ok && out->recommended == SEARCH_NONE) ok = nearest_miss(&x, list);
    ok = ok && deepen(&x) && choices(&x);
    tell(&x, 1.0);
    free(list);
    free(x.set_aside);
    if (!ok) search_free(out);
    return ok;
}

void search_free(struct search_result *r)
{
    free(r->candidates);
    free(r->by_choice);
    r->candidates = NULL;
    r->by_choice = NULL;
}

size_t search_fresh_study(const struct scenario *s)
{
    return (scenario_studies(s) + LANES - 1) / LANES * LANES;
}

long search_choice(const struct scenario *s, const struct search_result *r, size_t key, size_t option)
{
    return r->by_choice[choices_before(s, key) + option];
}
