#include "sim/report/ways_out.h"

#include <math.h>
#include <stdio.h>
#include <string.h>

#include "sim/report/say.h"

static bool constants_in_the_way(const struct question *q, const struct search_result *r)
{
    return r->constants_are_limit || (q->has_within && r->within_too_narrow);
}

const char *ways_out_limit(const struct question *q, const struct search_result *r)
{
    if (r->constants_are_limit)
        return "The constants are the limit, not the bench: with K and a known exactly this plan would resolve.";
    if (constants_in_the_way(q, r))
        return "Both are the limit: the uncertainty of K and a alone is too wide, and even with K and a known exactly "
               "this plan would not resolve.";
    return "The bench is the limit: even with K and a known exactly this plan would not resolve.";
}

static void add(struct ways_out *out, const char *text)
{
    if (out->count < WAYS_OUT_MOST)
        snprintf(out->text[out->count++], WAYS_OUT_SIZE, "%s", text);
}

/* What the nearest miss could be asked instead, rounded to the safe side. */
static void wider_question(struct ways_out *out, const struct question *q, const struct outcome *o)
{
    char text[WAYS_OUT_SIZE];
    if (q->has_against && isfinite(o->resolvable_against)) {
        const bool more = q->expect > q->against;
        const double points = say_percent(o->resolvable_against) * 100.0;
        const double safe = (more ? floor(points) : ceil(points)) / 100.0;
        snprintf(text, sizeof text, "ask the wider question (question.against: %.2f %%)", safe);
        if (safe > 0.0)
            add(out, text);
    }
    if (q->has_within && isfinite(o->resolvable_within)) {
        const double safe = ceil(say_percent(o->resolvable_within) * 100.0) / 100.0;
        snprintf(text, sizeof text, "ask the wider question (question.within: %.2f %%)", safe);
        add(out, text);
    }
}

void ways_out_list(const struct question *q, const struct search_result *r, struct ways_out *out)
{
    const bool constants = constants_in_the_way(q, r);
    out->count = 0;
    if (constants)
        add(out, "compare with a fraction found with the same K and a, whose uncertainty cancels then "
                 "(question.against_is: same-constants)");
    if (constants && q->has_against && q->against_is == AGAINST_STATED)
        add(out, "measure a second polymer of the same grade alongside, which shares K and a "
                 "(question.against_is: measured)");
    if (!r->constants_are_limit)
        add(out, "offer more replicates, a steadier bath, a finer thermometer or another tube");
    wider_question(out, q, &r->nearest);
}

/* How often a reason was given, or 0 when it was given before plan `first`. */
static size_t given(const struct search_result *r, size_t first)
{
    size_t same = 0;
    for (size_t i = 0; i < r->count; i++)
        if (strcmp(r->candidates[i].outcome.why, r->candidates[first].outcome.why) == 0) {
            if (i < first)
                return 0;
            same++;
        }
    return same;
}

size_t ways_out_reasons(const struct search_result *r, struct ways_out_reason out[WAYS_OUT_REASONS])
{
    size_t count = 0;
    for (size_t i = 0; i < r->count && count < WAYS_OUT_REASONS; i++) {
        const struct outcome *o = &r->candidates[i].outcome;
        const size_t plans = o->why[0] ? given(r, i) : 0;
        if (plans > 0)
            out[count++] = (struct ways_out_reason){plans, o->status, o->why};
    }
    return count;
}
