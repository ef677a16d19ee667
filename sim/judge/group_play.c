#include "sim/judge/group_play.h"

#include <stdlib.h>
#include <string.h>

#include "sim/judge/bar.h"

/* A group at work: the plan of each member, and which of the group's analyses
 * it takes. */
struct work {
    const struct group_job *job;
    struct candidate *candidates;
    struct plan *plan;
    size_t *analysis;
    struct design design;
    struct play play;
};

static struct outcome *outcome_of_member(const struct work *w, size_t i)
{
    return &w->candidates[w->job->members[i]].outcome;
}

static bool same_analysis(const struct analysis *a, const struct analysis *b)
{
    return a->extrapolation == b->extrapolation && a->weighting == b->weighting && a->density_corrected == b->density_corrected &&
           a->kinetic_corrected == b->kinetic_corrected && a->chain_statistics == b->chain_statistics;
}

/* The number of an analysis among those played; a new one is added. */
static size_t number_of(struct play *p, const struct analysis *how)
{
    size_t a = 0;
    while (a < p->analyses && !same_analysis(&p->analysis[a], how)) a++;
    if (a == p->analyses) p->analysis[p->analyses++] = *how;
    return a;
}

/* Strike out what nominal times already show; true when something is left. */
static bool strike_out(struct work *w)
{
    bool left = false;
    for (size_t i = 0; i < w->job->count; i++) {
        struct outcome *const o = outcome_of_member(w, i);
        outcome_nominal(w->job->s, &w->plan[i], &w->design, o);
        w->analysis[i] = o->status == STATUS_UNDECIDED ? number_of(&w->play, &w->plan[i].analysis) : PLAY_MAX_ANALYSES;
        left = left || o->status == STATUS_UNDECIDED;
    }
    return left;
}

/* Mark the analyses that an undecided member still needs; true if any. */
static bool mark_active(struct work *w)
{
    bool any = false;
    memset(w->play.active, 0, sizeof w->play.active);
    for (size_t i = 0; i < w->job->count; i++)
        if (outcome_of_member(w, i)->status == STATUS_UNDECIDED) any = w->play.active[w->analysis[i]] = true;
    return any;
}

/* Looks at n0, 2 n0, 4 n0 ... up to the cap. */
static bool look(struct work *w, struct group_tally *tally)
{
    const struct scenario *const s = w->job->s;
    const size_t cap = scenario_studies(s);
    size_t n = w->job->to_cap ? cap : bar_first_look(scenario_question(s));
    while (mark_active(w) && w->play.n < cap) {
        if (n > cap) n = cap;
        tally->spent += (n - w->play.n) * w->play.fractions;
        if (!play_until(&w->play, n)) return false;
        for (size_t i = 0; i < w->job->count; i++)
            if (outcome_of_member(w, i)->status == STATUS_UNDECIDED &&
                !outcome_of(s, &w->plan[i], &w->play, w->analysis[i], outcome_of_member(w, i)))
                return false;
        n *= 2;
    }
    return true;
}

bool group_play(const struct group_job *job, struct candidate *candidates, struct group_tally *tally)
{
    struct work w = {.job = job, .candidates = candidates};
    w.plan = calloc(job->count, sizeof *w.plan);
    w.analysis = calloc(job->count, sizeof *w.analysis);
    bool ok = w.plan && w.analysis;
    for (size_t i = 0; ok && i < job->count; i++) scenario_plan(job->s, job->members[i], &w.plan[i]);
    ok = ok && design_make(&w.design, &w.plan[0], scenario_cost(job->s), scenario_question(job->s));
    if (ok) {
        play_start(&w.play, &w.design, scenario_seed(job->s));
        outcome_fractions(scenario_question(job->s), &w.play);
        if (strike_out(&w)) {
            tally->exhaustive += scenario_studies(job->s) * w.play.fractions;
            ok = look(&w, tally);
        }
        play_free(&w.play);
    }
    design_free(&w.design);
    free(w.plan);
    free(w.analysis);
    return ok;
}
