#include "sim/report/terminal.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/files.h"
#include "sim/report/say.h"

char *terminal_question(const struct question *q)
{
    struct files_text text;
    if (!files_text_open(&text))
        return NULL;
    if (q->has_against)
        fprintf(text.stream, "tells %s head-to-head apart from %s (%s, %s confidence)", say_share(q->expect).text,
                say_share(q->against).text, q->sides == SIDES_TWO ? "two-sided" : "one-sided",
                say_share(q->confidence).text);
    if (q->has_against && q->has_within)
        fputs(" and ", text.stream);
    if (q->has_within)
        fprintf(text.stream, "comes within %s points of %s head-to-head", say_short(say_percent(q->within), 4).text,
                say_share(q->expect).text);
    if (files_text_close(&text))
        return text.bytes;
    files_text_free(&text);
    return NULL;
}

bool terminal_paid(const struct outcome *outcome)
{
    return outcome->at.money > 0.0;
}

/* How well a share is known: its Monte Carlo error, or, where all studies went
 * one way, how many there were. */
static struct say error_of(const struct outcome *o, double error)
{
    struct say s;
    if (error > 0.0)
        snprintf(s.text, sizeof s.text, "Monte Carlo error %.20s", say_digits(error, 2).text);
    else
        snprintf(s.text, sizeof s.text, "the same in all %.20s studies", say_count(o->studies).text);
    return s;
}

static void figures_against(const struct page *page, const struct question *q, const struct outcome *o)
{
    const double power = say_percent(o->at.power), error = say_percent(o->se.power);
    page_say(page, PAGE_PLAIN, "Power %s %% (%s), %s asked.", say_by_error(power, error).text, error_of(o, error).text,
             say_share(q->power).text);
    const bool more = q->expect > q->against;
    if (q->against_is == AGAINST_MEASURED)
        page_say(page, PAGE_BOLD, "Decide at a difference of %s points: when the first polymer's estimate less the "
                 "second's is %s that, the first holds %s.", say_points_of(o->at.critical).text,
                 more ? "above" : "below", more ? "more" : "less");
    else
        page_say(page, PAGE_BOLD, "Decide at %s: an estimate %s it is not %s but %s.", say_points(o->at.critical).text,
                 more ? "above" : "below", say_share(q->against).text, more ? "more" : "less");
    if (isfinite(o->resolvable_against))
        page_say(page, PAGE_PLAIN, "With %s power the smallest difference it tells apart is %s points: %s from %s.",
                 say_share(q->power).text, say_digits(fabs(say_percent(q->expect - o->resolvable_against)), 3).text,
                 say_share(q->expect).text, say_points(o->resolvable_against).text);
    else
        page_say(page, PAGE_PLAIN, "With %s power it tells %s apart from no %s fraction at all.",
                 say_share(q->power).text, say_share(q->expect).text, more ? "smaller" : "larger");
}

static void figures_within(const struct page *page, const struct question *q, const struct outcome *o)
{
    const double share = say_percent(o->at.within), error = say_percent(o->se.within);
    page_say(page, PAGE_PLAIN, "Within %s points of the truth in %s %% of studies (%s), %s asked.",
             say_short(say_percent(q->within), 4).text, say_by_error(share, error).text, error_of(o, error).text,
             say_share(q->confidence).text);
    if (isfinite(o->resolvable_within))
        page_say(page, PAGE_PLAIN, "In %s of studies it comes within %s points.", say_share(q->confidence).text,
                 say_digits(say_percent(o->resolvable_within), 3).text);
    else
        page_say(page, PAGE_PLAIN, "It comes within no distance at all in %s of studies: too many give no answer.",
                 say_share(q->confidence).text);
}

void terminal_figures(const struct page *page, const struct terminal_subject *subject)
{
    const struct question *q = scenario_question(subject->scenario);
    if (q->has_against)
        figures_against(page, q, subject->outcome);
    if (q->has_within)
        figures_within(page, q, subject->outcome);
}

static void glass(const struct page *page, const struct plan *p)
{
    page_item(page, "grade", "%s, %s kg/mol, of %s", p->grade.name, say_short(p->grade.molar_mass_kg_mol, 4).text,
              p->material.name);
    page_item(page, "tube", "%s, %s mm2/s2", p->tube.name, say_number(say_mm2_s2(p->tube.constant_m2_s2)).text);
    page_item(page, "bath", "%s at %s degC", p->bath.name, say_short(say_celsius(p->habits.temperature_K), 4).text);
    page_item(page, "thermometer", "%s, %s", p->thermometer.name,
              p->temperature_record ? "read in each run" : "not read during runs");
    page_item(page, "timer", "%s", p->timer.name);
}

/* A volume of a flask as "100 mL flask". */
static struct say flask(double m3)
{
    struct say s;
    snprintf(s.text, sizeof s.text, "%.40s mL flask", say_number(say_mL(m3)).text);
    return s;
}

/* Where the stock and the diluted levels are made up; the top level is the
 * stock itself. */
static void flasks(const struct page *page, const struct terminal_subject *subject, int which)
{
    const struct outcome *o = subject->outcome;
    const bool shared = subject->plan->solutions.shared_stock && which == CLEAVED;
    char stock[100], levels[100] = "";
    snprintf(stock, sizeof stock, shared ? "stock shared with the intact series" : "stock in a %s",
             flask(o->stock_flask_m3[which]).text);
    if (o->level_flask_m3 > 0.0 && o->levels[which] > 1)
        snprintf(levels, sizeof levels, ", diluted levels in a %s", flask(o->level_flask_m3).text);
    page_item(page, "", "%s%s", stock, levels);
}

static void series(const struct page *page, const struct terminal_subject *subject, int which)
{
    const struct plan *p = subject->plan;
    const struct outcome *o = subject->outcome;
    struct files_text list;
    if (!files_text_open(&list))
        return;
    for (size_t j = 0; j < o->levels[which]; j++)
        fprintf(list.stream, "%s%s", j > 0 ? ", " : "", say_digits(say_g_dL(o->concentration_kg_m3[which][j]), 3).text);
    if (files_text_close(&list)) {
        const char *name = which == INTACT ? "intact" : "cleaved";
        if (p->dilution == DILUTION_IN_TUBE)
            page_item(page, name, "%s g/dL, diluted in the tube; %s, %s at each level", list.bytes,
                      say_plural(p->fillings[which], "loading").text, say_plural(p->runs, "run").text);
        else
            page_item(page, name, "%s g/dL; %s of each, %s of each filling", list.bytes,
                      say_plural(p->fillings[which], "filling").text, say_plural(p->runs, "run").text);
        flasks(page, subject, which);
    }
    files_text_free(&list);
}

static void reduction(const struct page *page, const struct plan *p)
{
    static const char *const line[] = {"Huggins", "Kraemer", "Martin", "common intercept", "single point"};
    const struct analysis *a = &p->analysis;
    const bool single = a->extrapolation == SINGLE_POINT;
    page_item(page, "reduction", "%s%s, density %s, kinetic energy %s, %s chain statistics", line[a->extrapolation],
              single                         ? ""
              : a->weighting == WEIGHT_EQUAL ? ", equal weights"
                                             : ", weights c squared",
              a->density_corrected ? "corrected" : "neglected", a->kinetic_corrected ? "corrected" : "neglected",
              a->chain_statistics == CHAIN_DISCRETE ? "discrete" : "continuous");
}

/* What the plain study has not: an order of its own, preparations, a second
 * polymer. */
static void repeats(const struct page *page, const struct terminal_subject *subject)
{
    const struct plan *p = subject->plan;
    if (p->order == ORDER_SHUFFLED)
        page_item(page, "order", "shuffled, once for the study");
    if (p->order == ORDER_BRACKETED)
        page_item(page, "order", "half of each day's water at its end");
    if (p->preparations > 1)
        page_item(page, "preparations", "%zu, each from the balance on", p->preparations);
    if (scenario_question(subject->scenario)->against_is == AGAINST_MEASURED)
        page_item(page, "polymers", "two measured alongside, each as above");
}

void terminal_bench(const struct page *page, const struct terminal_subject *subject)
{
    const struct plan *p = subject->plan;
    const struct outcome *o = subject->outcome;
    const struct cost_rules *cost = scenario_cost(subject->scenario);
    glass(page, p);
    series(page, subject, INTACT);
    series(page, subject, CLEAVED);
    page_item(page, "water", "%s of %s, %s%s", say_plural(p->water_fillings, "filling").text,
              say_plural(p->water_runs, "run").text, p->habits.water_every_day ? "every day" : "on the first day",
              p->cleavage.blank_reference ? "; the same of the blank before the cleaved series" : "");
    repeats(page, subject);
    reduction(page, p);
    page_item(page, "takes", "%s, %s h (%s h of it at the tube), %s g of polymer", say_plural(o->days, "day").text,
              say_digits(say_hours(o->at.hours_s), 3).text, say_digits(say_hours(o->at.clock_s), 3).text,
              say_digits(say_g(o->polymer_kg), 3).text);
    if (terminal_paid(o))
        page_item(page, "costs", "%.0f %s", o->at.money, cost->currency);
}

void terminal_warnings(const struct page *page, const struct warnings *warnings)
{
    if (warnings->count == 0)
        return;
    page_blank(page);
    page_say(page, PAGE_BOLD, "Warnings");
    for (size_t i = 0; i < warnings->count; i++)
        page_point(page, warnings->text[i]);
}

void terminal_check(const struct page *page, const struct report_context *context, double seconds,
                    const struct warnings *warnings)
{
    const size_t count = scenario_candidates(context->scenario);
    page_say(page, PAGE_GOOD, "%s is right.", scenario_name(context->scenario));
    page_say(page, PAGE_PLAIN, "%s to weigh, about %s s of computing.", say_plural(count, "plan").text,
             say_digits(seconds, 2).text);
    terminal_warnings(page, warnings);
}
