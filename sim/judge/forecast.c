#include "sim/judge/forecast.h"

#include <time.h>

#include "sim/base/spread.h"
#include "sim/judge/bar.h"
#include "sim/judge/groups.h"
#include "sim/judge/outcome.h"

/* At most so many bench groups, spread over all, are tried for a possible one. */
enum { FORECAST_TRIES = 50 };

static double clock_s(void)
{
    struct timespec now = {0, 0};
    clock_gettime(CLOCK_MONOTONIC, &now);
    return (double)now.tv_sec + 1e-9 * (double)now.tv_nsec;
}

/* Time of one study under all fractions of the question, on all threads; 0
 * when the plan is impossible. */
static bool time_study(const struct scenario *s, size_t index, double *seconds)
{
    enum { STUDIES = 2048 };
    struct plan plan;
    struct design design;
    struct play play;
    *seconds = 0.0;
    scenario_plan(s, index, &plan);
    bool ok = design_make(&design, &plan, scenario_cost(s), scenario_question(s));
    if (ok && !design_why(&design, &plan.analysis)) {
        play_start(&play, &design, scenario_seed(s));
        outcome_fractions(scenario_question(s), &play);
        play.analyses = 1;
        play.analysis[0] = plan.analysis;
        play.active[0] = true;
        const double before = clock_s();
        ok = play_until(&play, STUDIES);
        *seconds = (clock_s() - before) / STUDIES;
        play_free(&play);
    }
    design_free(&design);
    return ok;
}

bool forecast_seconds(const struct scenario *s, double *seconds)
{
    struct groups groups;
    double each = 0.0;
    if (!groups_make(s, &groups)) return false;
    bool ok = true;
    const size_t stride = groups.count / FORECAST_TRIES + 1;
    for (size_t g = 0; ok && each == 0.0 && g < groups.count; g += stride) ok = time_study(s, groups.member[groups.group[g].first], &each);
    const double looks = 2.0 * (double)bar_first_look(scenario_question(s)), cap = (double)scenario_studies(s);
    const double count = (double)groups.count, deep = count < 12.0 ? count : 12.0;
    *seconds = each * (count * (looks < cap ? looks : cap) + deep * cap + 8.0 * cap);
    groups_free(&groups);
    return ok;
}
