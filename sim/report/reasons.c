#include "sim/report/reasons.h"

#include <math.h>
#include <stdarg.h>
#include <stdio.h>
#include <string.h>

#include "sim/report/figure_budget.h"
#include "sim/report/figure_margins.h"
#include "sim/report/say.h"

/* A share below this is not worth a word; a shift likewise, in standard
 * deviations of the estimate. */
static const double worth_a_word = 0.01, worth_a_shift = 0.05;

/* By source: what averages it out, and what else makes it smaller. */
static const struct {
    enum reasons_repeat repeat;
    bool temperature;
    const char *remedy;
} about[SOURCES] = {
    [DRAWS_GROUP_PAIR] = {REASONS_STUDY, false, "comparing with a fraction found with the same K and a"},
    [DRAWS_GROUP_CALIBRATION] = {REASONS_STUDY, true, "a thermometer with a better calibration"},
    [DRAWS_GROUP_KINETIC] = {REASONS_STUDY, false, "a tube with longer times, or its own kinetic coefficient"},
    [DRAWS_GROUP_OFFSET] = {REASONS_STUDY, false, "a tube that minds surface tension less (suspended level)"},
    [DRAWS_GROUP_DILUTION] = {REASONS_PREPARATION, false, "larger flasks, a finer pipette, or dilution by weight"},
    [DRAWS_GROUP_HYDROLYSIS] = {REASONS_STUDY, false, "a titration of the degree of hydrolysis"},
    [DRAWS_GROUP_INTERACTION] = {REASONS_STUDY, false, "more dilute solutions or another extrapolation"},
    [DRAWS_GROUP_DRY_CONTENT] = {REASONS_STUDY, false, "drying and ashing a sample of the polymer"},
    [DRAWS_GROUP_CONVERSION] = {REASONS_PREPARATION, false, "a titration of the reagent that is left"},
    [DRAWS_GROUP_WEIGHING] = {REASONS_PREPARATION, false, "a finer balance, or larger stocks"},
    [DRAWS_GROUP_DAYS] = {REASONS_DAY, true, "a bath that drifts less, or reading the temperature in each run"},
    [DRAWS_GROUP_FLUCTUATION] = {REASONS_FILLING, true, "a steadier bath, or reading the temperature in each run"},
    [DRAWS_GROUP_TILT] = {REASONS_FILLING, false, "a holder set with a plumb line, or more fillings"},
    [DRAWS_GROUP_CHARGE] = {REASONS_FILLING, false, "a suspended-level tube, which does not mind its charge"},
    [DRAWS_GROUP_FILLING] = {REASONS_FILLING, false, "filtering against dust, or more fillings"},
    [DRAWS_GROUP_GRADIENT] = {REASONS_FILLING, true, "a better stirred bath, or more fillings"},
    [DRAWS_GROUP_READING] = {REASONS_RUN, true, "a finer thermometer, or more runs"},
    [DRAWS_GROUP_HAND] = {REASONS_RUN, false, "a light gate, or more runs"},
    [DRAWS_GROUP_MARKS] = {REASONS_RUN, false, "a light gate, a tube with narrow necks, or more runs"},
    [DRAWS_GROUP_BUBBLES] = {REASONS_RUN, false, "taking the median of more runs"},
};

enum reasons_repeat reasons_repeat_of(enum draws_group group)
{
    return about[group].repeat;
}

static void add(struct reasons *to, const char *format, ...) __attribute__((format(printf, 2, 3)));
static void add(struct reasons *to, const char *format, ...)
{
    va_list arguments;
    if (to->count == REASONS_MOST)
        return;
    va_start(arguments, format);
    vsnprintf(to->text[to->count++], REASONS_SIZE, format, arguments);
    va_end(arguments);
}

/* Add to a list in words. */
static void list(char *text, size_t size, const char *word)
{
    const size_t used = strlen(text);
    snprintf(text + used, size - used, "%s%s", used == 0 ? "" : ", ", word);
}

double reasons_share(const struct budget *b, enum reasons_repeat repeat, char names[REASONS_NAMES])
{
    enum draws_group order[SOURCES];
    const size_t count = figure_budget_sorted(b, order);
    double sum = 0.0;
    for (size_t i = 0; i < count; i++)
        if (about[order[i]].repeat == repeat)
            sum += b->group[order[i]].total;
    names[0] = '\0';
    for (size_t i = 0; i < count; i++)
        if (about[order[i]].repeat == repeat && b->group[order[i]].total >= worth_a_word)
            list(names, REASONS_NAMES, sources_name(order[i]));
    return sum > 0.0 ? sum : 0.0;
}

double reasons_temperature_share(const struct budget *b)
{
    double sum = 0.0;
    for (int g = 0; g < SOURCES; g++)
        if (about[g].temperature && isfinite(b->group[g].total))
            sum += b->group[g].total;
    return sum > 0.0 ? sum : 0.0;
}

double reasons_floor_sd(const struct budget *b)
{
    double squares = 0.0;
    for (int g = 0; g < SOURCES; g++)
        if (about[g].repeat <= REASONS_PREPARATION && isfinite(b->group[g].alone_sd))
            squares += b->group[g].alone_sd * b->group[g].alone_sd;
    return fmin(sqrt(squares), b->outcome.at.sd);
}

struct reasons_sentence reasons_endless(const struct budget *b)
{
    static const double hardly = 0.95;
    const double sd = b->outcome.at.sd, left = reasons_floor_sd(b);
    struct reasons_sentence s;
    if (left > hardly * sd)
        snprintf(s.text, sizeof s.text,
                 "Endless fillings and runs would hardly lower the standard deviation of %s points.",
                 say_digits(say_percent(sd), 2).text);
    else
        snprintf(s.text, sizeof s.text,
                 "With endless fillings and runs the standard deviation would fall from %s points to about %s, no "
                 "further.",
                 say_digits(say_percent(sd), 2).text, say_digits(say_percent(left), 2).text);
    return s;
}

/* A share of the variance: "24.2 %". */
static struct say share(double fraction)
{
    struct say s;
    snprintf(s.text, sizeof s.text, "%.1f %%", say_percent(fraction > 0.0 ? fraction : 0.0));
    return s;
}

/* What to improve first. */
static void first(struct reasons *to, const struct budget *b)
{
    enum { NAMED = 3 };
    enum draws_group order[SOURCES];
    const size_t count = figure_budget_sorted(b, order);
    char others[REASONS_NAMES] = "", word[80];
    if (count == 0)
        return;
    for (size_t i = 1; i < count && i < NAMED && b->group[order[i]].total >= worth_a_word; i++) {
        snprintf(word, sizeof word, "%s (%s)", sources_name(order[i]), share(b->group[order[i]].total).text);
        list(others, sizeof others, word);
    }
    add(to, "What to improve first: %s, behind %s of the variance of the result; what helps is %s.%s%s%s",
        sources_name(order[0]), share(b->group[order[0]].total).text, about[order[0]].remedy,
        *others ? " Then come " : "", others, *others ? "." : "");
}

/* What no number of replicates can buy. */
static void floor_of(struct reasons *to, const struct budget *b)
{
    char names[REASONS_NAMES], made[REASONS_NAMES];
    const double study = reasons_share(b, REASONS_STUDY, names);
    const double preparation = reasons_share(b, REASONS_PREPARATION, made);
    if (*names)
        add(to,
            "What no number of replicates can buy: %s (%s of the variance), which stay as they are in every run, "
            "filling and preparation of the study.",
            names, share(study).text);
    else
        add(to, "Nearly all of the variance averages out over replicates.");
    if (*made)
        add(to, "What only further preparations average out: %s (%s of the variance).", made, share(preparation).text);
    add(to, "%s", reasons_endless(b).text);
}

/* The greatest shifts of the mean. */
static void shifts(struct reasons *to, const struct budget *b)
{
    enum { NAMED = 3 };
    bool taken[BUDGET_BIASES] = {false};
    char text[REASONS_NAMES] = "", word[120];
    for (int n = 0; n < NAMED; n++) {
        int most = -1;
        for (int i = 0; i < BUDGET_BIASES; i++)
            if (!taken[i] && isfinite(b->bias[i].shift) &&
                (most < 0 || fabs(b->bias[i].shift) > fabs(b->bias[most].shift)))
                most = i;
        if (most < 0 || fabs(b->bias[most].shift) < worth_a_shift * b->outcome.at.sd)
            break;
        taken[most] = true;
        snprintf(word, sizeof word, "%s %+.3f points", budget_bias_name((enum budget_bias)most),
                 say_percent(b->bias[most].shift));
        list(text, sizeof text, word);
    }
    if (*text)
        add(to, "What shifts the mean most: %s.", text);
    else
        add(to, "No correction or effect that was looked at shifts the mean by as much as a twentieth of the standard "
                "deviation.");
}

/* What the usual error bar is worth. */
static void claimed(struct reasons *to, const struct budget *b)
{
    static const double level = 0.95, near = 0.01;
    if (!isfinite(b->coverage))
        return;
    const double off = b->coverage - level, error = 2.0 * b->coverage_se;
    const bool right = fabs(off) <= (error > near ? error : near);
    add(to,
        "The 95 %% interval that an analyst claims from one notebook holds the truth in %s %% of studies (Monte "
        "Carlo error %s): %s",
        say_by_error(say_percent(b->coverage), say_percent(b->coverage_se)).text,
        say_digits(say_percent(b->coverage_se), 2).text,
        right       ? "the usual error bar is as long as it should be."
        : off < 0.0 ? "the usual error bar is too short. Quote the spread of this plan instead."
                    : "the usual error bar is longer than it need be.");
}

void reasons_budget(struct reasons *to, const struct budget *budget)
{
    if (budget->outcome.studies == 0)
        return;
    first(to, budget);
    floor_of(to, budget);
    shifts(to, budget);
    claimed(to, budget);
}

struct say reasons_value(double value, const char *unit)
{
    struct say s;
    snprintf(s.text, sizeof s.text, *unit ? "%.30s %.30s" : "%.30s", say_short(value, 3).text, unit);
    return s;
}

/* The conditions with the least room. */
static void tightest(struct reasons *to, const struct margins *m)
{
    enum { NAMED = 3 };
    size_t order[MARGIN_MOST], count = 0;
    char text[REASONS_NAMES] = "", word[200];
    figure_margins_sorted(m, order);
    for (size_t i = 0; i < m->count && count < NAMED; i++) {
        const struct margin *c = &m->margin[order[i]];
        if (c->verdict != MARGIN_FOUND)
            continue;
        snprintf(word, sizeof word, "%s %s %s (planned: %s)", c->name, c->up ? "above" : "below",
                 reasons_value(c->worst, c->unit).text, reasons_value(c->nominal, c->unit).text);
        list(text, sizeof text, word);
        count++;
    }
    if (*text)
        add(to, "It stops resolving first with %s.", text);
}

static void failing(struct reasons *to, const struct margins *m)
{
    size_t whole = 0, fails = 0;
    for (size_t i = 0; i < m->count; i++) {
        whole += m->margin[i].verdict == MARGIN_WHOLE_RANGE;
        fails += m->margin[i].verdict == MARGIN_FAILS_ALREADY;
    }
    if (fails == m->count && fails > 0)
        add(to, "It does not resolve as planned, so no condition has a margin.");
    else if (whole > 0)
        add(to, "%s of %zu conditions may take any value of the allowed range without harm.", say_count(whole).text,
            m->count);
}

static void exchange(struct reasons *to, const struct margins *m, const char *currency)
{
    const struct margin_exchange *e = &m->exchange;
    char price[80] = "", paid[120] = "";
    if (!m->has_exchange)
        return;
    if (!*e->replicates) {
        add(to, "On a bath twice as bad no number of replicates makes it resolve.");
        return;
    }
    if (fabs(say_hours(e->hours_s)) < 0.05 && fabs(e->money) < 0.5) {
        add(to, "On a bath twice as bad it still resolves as it is, with no further replicates.");
        return;
    }
    if (fabs(e->money) > 0.0)
        snprintf(price, sizeof price, " and %+.0f %.40s", e->money, currency);
    if (isfinite(e->studies_to_pay) && e->studies_to_pay > 1.0)
        snprintf(paid, sizeof paid, " The steadier bath has paid for itself after %.0f studies.",
                 ceil(e->studies_to_pay));
    else if (isfinite(e->studies_to_pay))
        snprintf(paid, sizeof paid, " The steadier bath has paid for itself with the first study.");
    add(to, "On a bath twice as bad it takes %s to resolve: %+.1f h%s for each study.%s", e->replicates,
        say_hours(e->hours_s), price, paid);
}

void reasons_margins(struct reasons *to, const struct margins *margins, const char *currency)
{
    if (margins->outcome.studies == 0)
        return;
    tightest(to, margins);
    failing(to, margins);
    exchange(to, margins, currency);
}
