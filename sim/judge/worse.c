#include "sim/judge/worse.h"

#include <math.h>
#include <string.h>

#include "sim/bench/cost.h"
#include "sim/judge/bar.h"
#include "sim/judge/trial.h"

/* One of the plans at the cap. */
struct played {
    size_t index;
    double cost, figure, se;
};

static bool is_replicate(const char *key)
{
    return strcmp(key, "fillings") == 0 || strcmp(key, "fillings_cleaved") == 0 || strcmp(key, "runs") == 0;
}

static bool differs_only_in_replicates(const struct scenario *s, size_t a, size_t b)
{
    for (size_t k = 0; k < scenario_keys(s); k++)
        if (!is_replicate(scenario_key(s, k)) && scenario_option_of(s, a, k) != scenario_option_of(s, b, k)) return false;
    return true;
}

/* Play a plan to the cap; cost below 0: it is impossible or too dear. */
static bool play(const struct scenario *s, const struct plan *plan, struct played *out)
{
    struct outcome o;
    if (!trial_run(s, plan, (struct trial_options){0}, &o, NULL)) return false;
    const bool power = scenario_question(s)->has_against;
    out->cost = o.studies == 0 ? -1.0 : cost_rounded(scenario_cost(s), (struct cost){o.at.hours_s, o.at.money});
    out->figure = power ? o.at.power : o.at.within;
    out->se = power ? o.se.power : o.se.within;
    return true;
}

static bool lower(const struct played *dear, const struct played *cheap)
{
    return cheap->figure - dear->figure > BAR_BAND * hypot(cheap->se, dear->se);
}

/* Both again with a source switched off: does the order turn, or is no more left
 * of it than one standard error? */
static bool turns(const struct scenario *s, const struct worse *pair, enum worse_cause source, bool *turned)
{
    struct played now[2];
    const size_t index[2] = {pair->cheaper, pair->dearer};
    for (int i = 0; i < 2; i++) {
        struct plan plan;
        scenario_plan(s, index[i], &plan);
        if (source == WORSE_DRIFT) plan.bath.drift_u_K_s = 0.0;
        if (source == WORSE_SPARE_RUNS) plan.habits.spare_runs = 0;
        if (source == WORSE_DAYS) plan.habits.working_day_s = 1e9;
        if (!play(s, &plan, &now[i])) return false;
    }
    *turned = now[0].figure - now[1].figure <= hypot(now[0].se, now[1].se);
    return true;
}

static bool find_cause(const struct scenario *s, struct worse *pair)
{
    bool turned = false;
    for (int cause = WORSE_DRIFT; cause < WORSE_UNKNOWN && !turned; cause++) {
        pair->cause = (enum worse_cause)cause;
        if (!turns(s, pair, pair->cause, &turned)) return false;
    }
    if (!turned) pair->cause = WORSE_UNKNOWN;
    return true;
}

/* The subject, then the others that differ from it only in replicates. */
static bool play_all(const struct scenario *s, size_t subject, struct played plan[WORSE_PLANS], size_t *plans)
{
    *plans = 0;
    for (size_t k = 0; k <= scenario_candidates(s) && *plans < WORSE_PLANS; k++) {
        const size_t i = k == 0 ? subject : k - 1;
        struct plan p;
        if ((k > 0 && i == subject) || !differs_only_in_replicates(s, subject, i)) continue;
        scenario_plan(s, i, &p);
        plan[*plans].index = i;
        if (!play(s, &p, &plan[*plans])) return false;
        *plans += plan[*plans].cost >= 0.0;
    }
    return true;
}

bool worse_find(const struct scenario *s, size_t subject, size_t room, struct worse *out, size_t *count)
{
    struct played plan[WORSE_PLANS];
    size_t plans;
    *count = 0;
    if (!play_all(s, subject, plan, &plans)) return false;
    for (size_t d = 0; d < plans && *count < room; d++) {
        const struct played *best = NULL;
        for (size_t c = 0; c < plans; c++)
            if (plan[c].cost < plan[d].cost && lower(&plan[d], &plan[c]) && (!best || plan[c].figure > best->figure)) best = &plan[c];
        if (!best) continue;
        out[*count] = (struct worse){best->index, plan[d].index, {best->figure, plan[d].figure}, WORSE_UNKNOWN};
        if (!find_cause(s, &out[(*count)++])) return false;
    }
    return true;
}
