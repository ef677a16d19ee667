#include "sim/report/terminal_choices.h"

#include <math.h>
#include <string.h>

#include "sim/report/decisions.h"
#include "sim/report/say.h"
#include "sim/report/terminal.h"

/* How wide the column of options must be, over all tables. */
static int option_columns(const struct scenario *s)
{
    enum { MOST = 40 };
    int columns = 0;
    for (size_t k = 0; k < scenario_keys(s); k++)
        for (size_t o = 0; scenario_options(s, k) > 1 && o < scenario_options(s, k); o++) {
            const int width = page_width(scenario_option(s, k, o));
            if (width > columns)
                columns = width < MOST ? width : MOST;
        }
    return columns;
}

static void padded(FILE *to, const char *text, int columns)
{
    const int width = page_width(text);
    page_plain(to, text, strlen(text));
    fprintf(to, "%*s", width < columns ? columns - width : 0, "");
}

/* "14.2 h, 2 days, 310 EUR": of the cheapest plan with an option. */
static void price(FILE *to, const struct cost_rules *cost, const struct outcome *o)
{
    fprintf(to, "%8.1f h  %s", say_hours(o->at.hours_s), say_plural(o->days, "day").text);
    if (o->days == 1)
        fputc(' ', to);
    if (terminal_paid(o))
        fprintf(to, " %7.0f %s", o->at.money, cost->currency);
}

/* How much more than the recommended plan, in what the cheapest is least in:
 * the difference of the rounded values that stand in the table. */
static void difference(FILE *to, const struct cost_rules *cost, const struct outcome *o, const struct outcome *best)
{
    const bool hours = cost->least == LEAST_HOURS;
    const double more = hours ? round(10.0 * say_hours(o->at.hours_s)) - round(10.0 * say_hours(best->at.hours_s))
                              : round(o->at.money) - round(best->at.money);
    if (fabs(more) < 0.5)
        fputs("   no more", to);
    else if (hours)
        fprintf(to, "   %+.1f h", more / 10.0);
    else
        fprintf(to, "   %+.0f %s", more, cost->currency);
}

static void option_line(const struct page *page, const struct scenario *s, const struct search_result *r, size_t key,
                        size_t option)
{
    const struct cost_rules *cost = scenario_cost(s);
    const long index = search_choice(s, r, key, option);
    if (index == SEARCH_NONE) {
        fputs("    nothing resolves with it\n", page->to);
        return;
    }
    const struct outcome *best = &r->candidates[r->recommended].outcome;
    const struct outcome *o = &r->candidates[index].outcome;
    price(page->to, cost, o);
    if (scenario_option_of(s, (size_t)r->recommended, key) == option)
        fputs("   recommended", page->to);
    else
        difference(page->to, cost, o, best);
    fputc('\n', page->to);
}

static void key_lines(const struct page *page, const struct scenario *s, const struct search_result *r, size_t key)
{
    const int columns = option_columns(s);
    fprintf(page->to, "  %s\n", scenario_key(s, key));
    for (size_t o = 0; o < scenario_options(s, key); o++) {
        fputs("    ", page->to);
        padded(page->to, scenario_option(s, key, o), columns);
        option_line(page, s, r, key, o);
    }
}

void terminal_choices(const struct page *page, const struct scenario *scenario, const struct search_result *search)
{
    if (search->recommended == SEARCH_NONE)
        return;
    for (int d = 0; d < DECISIONS; d++) {
        bool headed = false;
        for (size_t k = 0; k < scenario_keys(scenario); k++) {
            if (scenario_options(scenario, k) < 2 || decisions_of(scenario_key(scenario, k)) != (enum decisions)d)
                continue;
            if (!headed) {
                page_blank(page);
                page_say(page, PAGE_BOLD, "%s", decisions_name((enum decisions)d));
            }
            headed = true;
            key_lines(page, scenario, search, k);
        }
    }
}
