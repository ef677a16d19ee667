#include "sim/report/terminal.h"

#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/files.h"
#include "sim/report/described.h"
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

static void item(void *context, const char *label, const char *text)
{
    page_item(context, label, "%s", text);
}

void terminal_bench(const struct page *page, const struct terminal_subject *subject)
{
    struct page to = *page;
    described_plan(subject, item, &to);
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

void terminal_end(const struct page *page, const struct report_context *context, const char *file,
                  const struct outcome *outcome, const struct warnings *warnings)
{
    terminal_warnings(page, warnings);
    page_blank(page);
    page_say(page, PAGE_PLAIN, "The numbers are in %s/%s%s.", context->folder, file,
             outcome->studies > 0 ? ", the figures beside it" : "");
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
