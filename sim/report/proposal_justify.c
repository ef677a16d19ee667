#include "sim/report/proposal_justify.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "models/water.h"
#include "sim/base/files.h"
#include "sim/report/decisions.h"
#include "sim/report/markdown.h"
#include "sim/report/proposal_answer.h"
#include "sim/report/proposal_choices.h"
#include "sim/report/reasons.h"
#include "sim/report/say.h"

/* ---- what other options take ---- */

/* "105 EUR more", "no more". */
static void more(const struct proposal *p, FILE *to, long index)
{
    const struct say by = proposal_choices_more(p, &p->planned->search->candidates[index].outcome);
    if (*by.text == '+' || *by.text == '-')
        fprintf(to, "%s %s", by.text + 1, *by.text == '+' ? "more" : "less");
    else
        fputs(by.text, to);
}

/* " With fillings 2 the cheapest study that resolves takes 275 EUR more, with
 * fillings 3 612 EUR more.": the other options of one key. */
static void others(const struct proposal *p, FILE *to, size_t key)
{
    const struct scenario *s = p->context->scenario;
    const char *name = decisions_words(scenario_key(s, key));
    size_t priced = 0, failing = 0;
    for (size_t o = 0; o < scenario_options(s, key); o++) {
        const long index = search_choice(s, p->planned->search, key, o);
        if (index == SEARCH_NONE || scenario_option_of(s, p->index, key) == o)
            continue;
        fprintf(to, priced++ ? ", with %s %s " : " With %s %s the cheapest study that resolves takes ", name,
                scenario_option(s, key, o));
        more(p, to, index);
    }
    fputs(priced ? "." : "", to);
    for (size_t o = 0; o < scenario_options(s, key); o++)
        if (search_choice(s, p->planned->search, key, o) == SEARCH_NONE)
            fprintf(to, "%s %s %s", failing++ ? " or" : " Nothing that was weighed resolves with", name,
                    scenario_option(s, key, o));
    fputs(failing ? "." : "", to);
}

static void all_others(const struct proposal *p, FILE *to, enum decisions decision)
{
    const struct scenario *s = p->context->scenario;
    for (size_t k = 0; k < scenario_keys(s); k++)
        if (decisions_of(scenario_key(s, k)) == decision && scenario_options(s, k) > 1)
            others(p, to, k);
}

/* What the plan reaches, as a sentence. */
static void reached(const struct proposal *p, FILE *to, const char *what)
{
    char text[300];
    proposal_answer_reached(p, text, sizeof text);
    fprintf(to, " In %s simulated studies, each from the weighing to the result, %s gives %s.",
            say_count(p->outcome->studies).text, what, text);
}

/* ---- temperature ---- */

/* By how much the kinematic viscosity of water falls for each kelvin. */
static double fall_per_kelvin(double T_K)
{
    const struct water_fit water = water_fit_make();
    const double step = 0.5;
    return (water_fit_kinematic(&water, T_K - step) - water_fit_kinematic(&water, T_K + step)) /
           water_fit_kinematic(&water, T_K);
}

static void bath(const struct plan *p, FILE *to)
{
    const struct bath *b = &p->bath;
    fprintf(to,
            " The study uses the bath %s at %s degC: fluctuation %s K (standard deviation, correlation time %s "
            "min), drift %s K/h, %s K from day to day, %s K between places in it (standard uncertainties).",
            b->name, say_short(say_celsius(p->habits.temperature_K), 4).text, say_short(b->fluctuation_K, 3).text,
            say_short(say_minutes(b->correlation_time_s), 3).text, say_short(b->drift_u_K_s * 3600.0, 3).text,
            say_short(b->day_u_K, 3).text, say_short(b->gradient_u_K, 3).text);
    if (p->temperature_record)
        fprintf(to,
                " The temperature is read in each run with the thermometer %s (calibration %s K, reading %s K), and "
                "each time is brought to the set temperature.",
                p->thermometer.name, say_short(p->thermometer.calibration_u_K, 3).text,
                say_short(p->thermometer.reading_u_K, 3).text);
    else
        fprintf(to, " The thermometer %s (calibration %s K) sets the bath; the temperature is not read during runs.",
                p->thermometer.name, say_short(p->thermometer.calibration_u_K, 3).text);
}

/* "It still resolves with a bath fluctuation up to 0.21 K, ...": of the
 * conditions that are the bath's. */
static void bath_margins(const struct proposal *p, FILE *to)
{
    const struct margins *m = p->planned->margins;
    bool any = false;
    if (!m || m->outcome.studies == 0)
        return;
    for (size_t i = 0; i < m->count; i++) {
        const struct margin *c = &m->margin[i];
        const bool ours = strncmp(c->key, "kit.baths.", 10) == 0 || strncmp(c->key, "kit.thermometers.", 17) == 0;
        if (!ours || c->verdict == MARGIN_FAILS_ALREADY)
            continue;
        fputs(any ? ", " : " All else as planned, it still resolves with: ", to);
        if (c->verdict == MARGIN_FOUND)
            fprintf(to, "%s up to %s (planned: %s)", c->name, reasons_value(c->worst, c->unit).text,
                    reasons_value(c->nominal, c->unit).text);
        else
            fprintf(to, "%s of any size in the range looked at (planned: %s)", c->name,
                    reasons_value(c->nominal, c->unit).text);
        any = true;
    }
    if (any)
        fputc('.', to);
}

/* The sentence of the exchange rate, the last of the margins'. */
static void exchange(const struct proposal *p, FILE *to)
{
    struct reasons why = {0};
    if (!p->planned->margins || !p->planned->margins->has_exchange)
        return;
    reasons_margins(&why, p->planned->margins, scenario_cost(p->context->scenario)->currency);
    if (why.count > 0)
        fprintf(to, " %s", why.text[why.count - 1]);
}

static void temperature(const struct proposal *p, FILE *to)
{
    const struct question *q = scenario_question(p->context->scenario);
    const struct budget *b = p->planned->budget;
    const double T_K = p->plan->habits.temperature_K;
    fprintf(to,
            "Efflux times follow the viscosity of water, which falls by %s %% for each kelvin at %s degC (IAPWS "
            "SR6-08)",
            say_digits(say_percent(fall_per_kelvin(T_K)), 3).text, say_short(say_celsius(T_K), 4).text);
    if (q->has_against)
        fprintf(to, ", and the fractions to be told apart, %s and %s head-to-head, are only %s points from each other",
                say_share(q->expect).text, say_share(q->against).text,
                say_short(fabs(say_percent(q->expect - q->against)), 3).text);
    fputc('.', to);
    bath(p->plan, to);
    reached(p, to, "this control");
    if (b && b->outcome.studies > 0)
        fprintf(to, " All that has to do with temperature is behind %.1f %% of the variance of the result.",
                say_percent(reasons_temperature_share(b)));
    bath_margins(p, to);
    all_others(p, to, DECISIONS_TEMPERATURE);
    exchange(p, to);
}

/* ---- replicates ---- */

static struct say times(size_t n)
{
    struct say s;
    if (n <= 2)
        snprintf(s.text, sizeof s.text, "%s", n == 1 ? "once" : "twice");
    else
        snprintf(s.text, sizeof s.text, "%zu times", n);
    return s;
}

static void fillings(const struct plan *plan, FILE *to)
{
    const bool tube = plan->dilution == DILUTION_IN_TUBE;
    fputs(tube ? "each series is loaded and diluted in the tube " : "each solution is filled into the tube ", to);
    fputs(times(plan->fillings[INTACT]).text, to);
    if (plan->fillings[CLEAVED] != plan->fillings[INTACT])
        fprintf(to, " (cleaved: %s)", times(plan->fillings[CLEAVED]).text);
    fprintf(to, ", with %s %s. ", say_plural(plan->runs, "run").text,
            tube ? "at each concentration" : "of each filling");
}

static void numbers(const struct proposal *p, FILE *to)
{
    const struct plan *plan = p->plan;
    const struct outcome *o = p->outcome;
    if (o->levels[INTACT] == o->levels[CLEAVED])
        fprintf(to, "The intact and the cleaved series have %s each; ",
                say_plural(o->levels[INTACT], "concentration").text);
    else
        fprintf(to, "The intact series has %s, the cleaved %s; ", say_plural(o->levels[INTACT], "concentration").text,
                say_count(o->levels[CLEAVED]).text);
    fillings(plan, to);
    fprintf(to, "Water gets %s of %s, %s.", say_plural(plan->water_fillings, "filling").text,
            say_plural(plan->water_runs, "run").text, plan->habits.water_every_day ? "every day" : "on the first day");
    if (plan->preparations > 1)
        fprintf(to, " All of it is done with %s from the balance on.",
                say_plural(plan->preparations, "preparation").text);
    if (o->at.spare_runs > 0.0)
        fprintf(to, " Where runs disagree by more than %s, spare ones are added, %s in a study on average.",
                say_share(plan->habits.agreement).text, say_digits(o->at.spare_runs, 2).text);
}

static void averaged(const struct budget *b, FILE *to)
{
    static const struct {
        enum reasons_repeat repeat;
        const char *what;
    } by[] = {{REASONS_RUN, "What further runs average out"},
              {REASONS_FILLING, "What further fillings average out"},
              {REASONS_DAY, "What further days average out"},
              {REASONS_PREPARATION, "What only further preparations average out"},
              {REASONS_STUDY, "What no number of replicates averages out"}};
    char names[REASONS_NAMES];
    bool any = false;
    for (size_t i = 0; i < sizeof by / sizeof *by; i++) {
        const double share = reasons_share(b, by[i].repeat, names);
        if (!*names)
            continue;
        fprintf(to, " %s (%s) is behind %.1f %%%s.", by[i].what, names, say_percent(share),
                any ? "" : " of the variance of the result");
        any = true;
    }
    fprintf(to, " %s", reasons_endless(b).text);
}

static void replicates(const struct proposal *p, FILE *to)
{
    const struct outcome *o = p->outcome;
    const struct budget *b = p->planned->budget;
    numbers(p, to);
    reached(p, to, "this number");
    all_others(p, to, DECISIONS_REPLICATES);
    if (b && b->outcome.studies > 0)
        averaged(b, to);
    fprintf(to, " The study takes %s and %s h of work, %s h of it at the tube.", say_plural(o->days, "day").text,
            say_digits(say_hours(o->at.hours_s), 3).text, say_digits(say_hours(o->at.clock_s), 3).text);
}

/* ---- both ---- */

static void section(const struct proposal *p, const char *heading, void (*write)(const struct proposal *p, FILE *to))
{
    struct files_text text;
    if (!files_text_open(&text))
        return;
    write(p, text.stream);
    if (files_text_close(&text)) {
        markdown_heading(p->to, 2, heading);
        markdown_paragraph(p->to, "%s", text.bytes);
    }
    files_text_free(&text);
}

void proposal_justify(const struct proposal *p)
{
    if (!p->resolves)
        return;
    section(p, "Justification of the temperature control", temperature);
    section(p, "Justification of the replicate count", replicates);
}
