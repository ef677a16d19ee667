#include "sim/report/terminal_trial.h"

#include <math.h>
#include <stdlib.h>

#include "sim/report/say.h"

void terminal_trial_verdict(const struct page *page, const struct terminal_subject *subject)
{
    const struct outcome *o = subject->outcome;
    char *question = terminal_question(scenario_question(subject->scenario));
    const char *asked = question ? question : "";
    switch (o->status) {
    case STATUS_RESOLVES:
        page_say(page, PAGE_GOOD, "It resolves: this plan %s.", asked);
        break;
    case STATUS_UNDECIDED:
        page_say(page, PAGE_BAD,
                 "Too close to call, so it does not count as resolving: whether this plan %s lies within the Monte "
                 "Carlo error. More studies (--studies) decide.",
                 asked);
        break;
    case STATUS_IMPOSSIBLE:
        page_say(page, PAGE_BAD, "This plan is impossible: %s.", o->why);
        break;
    case STATUS_TOO_DEAR:
        page_say(page, PAGE_BAD, "This plan is too dear: %s.", o->why);
        break;
    case STATUS_FAILS:
    case STATUSES:
        page_say(page, PAGE_BAD, "It does not resolve what is asked: a plan that %s.", asked);
        break;
    }
    free(question);
}

static void row(const struct page *page, const char *name, double value, double error)
{
    fprintf(page->to, "  %-34s %12s %12s\n", name, say_by_error(value, error).text, say_digits(error, 2).text);
}

static void ends(const struct page *page, const char *name, struct interval at, struct interval se)
{
    const double low = say_percent(at.low), high = say_percent(at.high);
    const double low_se = say_percent(se.low), high_se = say_percent(se.high);
    fprintf(page->to, "  %-34s %12s %12s\n", name, say_by_error(low, low_se).text, say_digits(low_se, 2).text);
    fprintf(page->to, "  %-34s %12s %12s\n", "  to", say_by_error(high, high_se).text, say_digits(high_se, 2).text);
}

static void figures(const struct page *page, const struct question *q, const struct outcome *o)
{
    const struct figures *a = &o->at, *e = &o->se;
    page_blank(page);
    page_say(page, PAGE_BOLD, "Figures of %s simulated studies", say_count(o->studies).text);
    fprintf(page->to, "  %-34s %12s %12s\n", "", "", "error");
    row(page, "true fraction, %", say_percent(o->truth), (double)NAN);
    row(page, "mean of the estimates, %", say_percent(a->mean), say_percent(e->mean));
    row(page, "bias, points", say_percent(a->bias), say_percent(e->bias));
    row(page, "standard deviation, points", say_percent(a->sd), say_percent(e->sd));
    row(page, "root-mean-square error, points", say_percent(a->rmse), say_percent(e->rmse));
    ends(page, "95 % of the estimates, % from", a->interval, e->interval);
    ends(page, "shortest such interval, % from", a->shortest, e->shortest);
    if (q->has_within)
        row(page, "share within, %", say_percent(a->within), say_percent(e->within));
    if (q->has_against) {
        row(page, "critical value, %", say_percent(a->critical), say_percent(e->critical));
        row(page, "power, %", say_percent(a->power), say_percent(e->power));
        row(page, "plain false alarms, %", say_percent(a->plain_false_alarm), say_percent(e->plain_false_alarm));
    }
    row(page, "no answer, %", say_percent(a->no_answer), say_percent(e->no_answer));
    row(page, "spare runs per study", a->spare_runs, e->spare_runs);
    row(page, "hours at the tube", say_hours(a->clock_s), say_hours(e->clock_s));
}

static void spreads(const struct page *page, const struct outcome *o)
{
    static const char *const name[SERIES] = {"intact", "cleaved"};
    page_blank(page);
    page_say(page, PAGE_BOLD, "What is measured on the way");
    fprintf(page->to, "  %-34s %12s %12s %12s\n", "", "true", "mean", "sd");
    for (int s = 0; s < SERIES; s++)
        fprintf(page->to, "  intrinsic viscosity, %-7s, dL/g   %12s %12s %12s\n", name[s],
                say_digits(say_dL_g(o->intrinsic[s].truth), 4).text, say_digits(say_dL_g(o->intrinsic[s].mean), 4).text,
                say_digits(say_dL_g(o->intrinsic[s].sd), 2).text);
    for (int s = 0; s < SERIES; s++)
        fprintf(page->to, "  molar mass, %-7s, kg/mol          %12s %12s %12s\n", name[s],
                say_digits(o->molar_mass[s].truth, 4).text, say_digits(o->molar_mass[s].mean, 4).text,
                say_digits(o->molar_mass[s].sd, 2).text);
}

static void times(const struct page *page, const struct outcome *o)
{
    page_blank(page);
    page_say(page, PAGE_BOLD, "Expected times");
    fprintf(page->to, "  %-10s %14s %10s   %14s %10s\n", "level", "intact, g/dL", "s", "cleaved, g/dL", "s");
    fprintf(page->to, "  %-10s %14s %10.1f   %14s %10.1f\n", "water", "0", o->water_efflux_s, "0", o->water_efflux_s);
    const size_t most = o->levels[INTACT] > o->levels[CLEAVED] ? o->levels[INTACT] : o->levels[CLEAVED];
    for (size_t j = 0; j < most; j++) {
        fprintf(page->to, "  %-10zu", j + 1);
        for (int s = 0; s < SERIES; s++) {
            if (s > 0)
                fputs("  ", page->to);
            if (j < o->levels[s])
                fprintf(page->to, " %14s %10.1f", say_digits(say_g_dL(o->concentration_kg_m3[s][j]), 3).text,
                        o->nominal_efflux_s[s][j]);
            else
                fprintf(page->to, " %14s %10s", "", "");
        }
        fputc('\n', page->to);
    }
}

void terminal_trial(const struct page *page, const struct report_context *context, const struct report_tried *tried,
                    const struct warnings *warnings)
{
    const struct scenario *s = context->scenario;
    const struct outcome *o = tried->outcome;
    struct plan plan;
    scenario_plan(s, tried->index, &plan);
    const struct terminal_subject subject = {.scenario = s, .plan = &plan, .outcome = o, .index = tried->index};
    if (*scenario_title(s))
        page_say(page, PAGE_PLAIN, "%s", scenario_title(s));
    terminal_trial_verdict(page, &subject);
    if (o->studies > 0) {
        terminal_figures(page, &subject);
        page_blank(page);
        page_say(page, PAGE_BOLD, "The plan");
        terminal_bench(page, &subject);
        figures(page, scenario_question(s), o);
        spreads(page, o);
        times(page, o);
    }
    terminal_end(page, context, "trial.json", o, warnings);
}
