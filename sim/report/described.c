#include "sim/report/described.h"

#include <stdarg.h>
#include <stdlib.h>

#include "sim/base/files.h"
#include "sim/report/say.h"

/* Who listens. */
struct listener {
    void (*tell)(void *context, const char *label, const char *text);
    void *context;
};

static void item(const struct listener *to, const char *label, const char *format, ...)
    __attribute__((format(printf, 3, 4)));
static void item(const struct listener *to, const char *label, const char *format, ...)
{
    struct files_text text;
    va_list arguments;
    if (!files_text_open(&text))
        return;
    va_start(arguments, format);
    vfprintf(text.stream, format, arguments);
    va_end(arguments);
    if (files_text_close(&text))
        to->tell(to->context, label, text.bytes);
    files_text_free(&text);
}

static void glass(const struct listener *to, const struct plan *p)
{
    item(to, "grade", "%s, %s kg/mol, of %s", p->grade.name, say_short(p->grade.molar_mass_kg_mol, 4).text,
         p->material.name);
    item(to, "tube", "%s, %s mm2/s2", p->tube.name, say_number(say_mm2_s2(p->tube.constant_m2_s2)).text);
    item(to, "bath", "%s at %s degC", p->bath.name, say_short(say_celsius(p->habits.temperature_K), 4).text);
    item(to, "thermometer", "%s, %s", p->thermometer.name,
         p->temperature_record ? "read in each run" : "not read during runs");
    item(to, "timer", "%s", p->timer.name);
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
static void flasks(const struct listener *to, const struct terminal_subject *subject, int which)
{
    const struct outcome *o = subject->outcome;
    const bool shared = subject->plan->solutions.shared_stock && which == CLEAVED;
    char stock[100], levels[100] = "";
    snprintf(stock, sizeof stock, shared ? "stock shared with the intact series" : "stock in a %s",
             flask(o->stock_flask_m3[which]).text);
    if (o->level_flask_m3 > 0.0 && o->levels[which] > 1)
        snprintf(levels, sizeof levels, ", diluted levels in a %s", flask(o->level_flask_m3).text);
    item(to, "", "%s%s", stock, levels);
}

static void series(const struct listener *to, const struct terminal_subject *subject, int which)
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
            item(to, name, "%s g/dL, diluted in the tube; %s, %s at each level", list.bytes,
                 say_plural(p->fillings[which], "loading").text, say_plural(p->runs, "run").text);
        else
            item(to, name, "%s g/dL; %s of each, %s of each filling", list.bytes,
                 say_plural(p->fillings[which], "filling").text, say_plural(p->runs, "run").text);
        flasks(to, subject, which);
    }
    files_text_free(&list);
}

static void reduction(const struct listener *to, const struct plan *p)
{
    static const char *const line[] = {"Huggins", "Kraemer", "Martin", "common intercept", "single point"};
    const struct analysis *a = &p->analysis;
    const bool single = a->extrapolation == SINGLE_POINT;
    item(to, "reduction", "%s%s, density %s, kinetic energy %s, %s chain statistics", line[a->extrapolation],
         single                         ? ""
         : a->weighting == WEIGHT_EQUAL ? ", equal weights"
                                        : ", weights c squared",
         a->density_corrected ? "corrected" : "neglected", a->kinetic_corrected ? "corrected" : "neglected",
         a->chain_statistics == CHAIN_DISCRETE ? "discrete" : "continuous");
}

/* What the plain study has not: an order of its own, preparations, a second
 * polymer. */
static void repeats(const struct listener *to, const struct terminal_subject *subject)
{
    const struct plan *p = subject->plan;
    if (p->order == ORDER_SHUFFLED)
        item(to, "order", "shuffled, once for the study");
    if (p->order == ORDER_BRACKETED)
        item(to, "order", "half of each day's water at its end");
    if (p->preparations > 1)
        item(to, "preparations", "%zu, each from the balance on", p->preparations);
    if (scenario_question(subject->scenario)->against_is == AGAINST_MEASURED)
        item(to, "polymers", "two measured alongside, each as above");
}

void described_plan(const struct terminal_subject *subject,
                    void (*tell)(void *context, const char *label, const char *text), void *context)
{
    const struct listener listener = {tell, context}, *to = &listener;
    const struct plan *p = subject->plan;
    const struct outcome *o = subject->outcome;
    const struct cost_rules *cost = scenario_cost(subject->scenario);
    glass(to, p);
    series(to, subject, INTACT);
    series(to, subject, CLEAVED);
    item(to, "water", "%s of %s, %s%s", say_plural(p->water_fillings, "filling").text,
         say_plural(p->water_runs, "run").text, p->habits.water_every_day ? "every day" : "on the first day",
         p->cleavage.blank_reference ? "; the same of the blank before the cleaved series" : "");
    repeats(to, subject);
    reduction(to, p);
    item(to, "takes", "%s, %s h (%s h of it at the tube), %s g of polymer", say_plural(o->days, "day").text,
         say_digits(say_hours(o->at.hours_s), 3).text, say_digits(say_hours(o->at.clock_s), 3).text,
         say_digits(say_g(o->polymer_kg), 3).text);
    if (terminal_paid(o))
        item(to, "costs", "%.0f %s", o->at.money, cost->currency);
}
