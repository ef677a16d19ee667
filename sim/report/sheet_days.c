#include "sim/report/sheet_days.h"

#include <stdbool.h>

#include "sim/report/say.h"

/* How many lines for spare runs a filling has, at most. */
enum { SPARE_LINES = 2 };

static void how_to_fill(FILE *to, const struct sheet_work *w)
{
    const struct plan *p = w->plan;
    const struct habits *h = &p->habits;
    fprintf(to,
            "<li>The clock is that of the day: 0:00 is when the first filling begins. Set the bath to %s&nbsp;&deg;C "
            "long before; it must be steady then.</li>\n",
            say_short(say_celsius(h->temperature_K), 4).text);
    fprintf(to, "<li>A filling: clean the tube, rinse with %s, fill with %s", say_volume(h->rinse_m3).text,
            say_volume(p->tube.charge_m3).text);
    fprintf(to, " (%s), hang it upright, wait %s", say_while(h->clean_and_fill_s).text,
            say_while(h->equilibrate_s).text);
    fprintf(to, ", then the runs; drawing up again takes %s.", say_while(h->reset_s).text);
    if (p->dilution == DILUTION_IN_TUBE)
        fprintf(to, " An addition and mixing it in takes %s, then wait again %s.", say_while(h->add_and_mix_s).text,
                say_while(h->equilibrate_s).text);
    fputs("</li>\n<li>Read each mark at eye level; look for bubbles and foam before each run.", to);
    fputs(p->temperature_record ? " Read the bath in every run.</li>\n"
                                : " The plan does without the bath's temperature during runs.</li>\n",
          to);
}

static void about_water(FILE *to, const struct sheet_work *w)
{
    const struct plan *p = w->plan;
    fprintf(to, "<li><strong>Water first</strong>, %s of %s%s: its time is what all others are divided by. ",
            say_plural(p->water_fillings, "filling").text, say_plural(p->water_runs, "run").text,
            p->habits.water_every_day ? ", every day" : ", on the first day");
    fputs("Do not go on while a run of water lies outside its range: look for dust, a tilted tube, a bath or a timer "
          "that is off.",
          to);
    if (p->cleavage.blank_reference)
        fputs(" The blank does the same for the cleaved series.", to);
    if (p->order == ORDER_BRACKETED)
        fputs(" Part of the water stands at the end of the day.", to);
    fputs("</li>\n", to);
}

static void when_runs_disagree(FILE *to, const struct sheet_work *w)
{
    const struct habits *h = &w->plan->habits;
    const size_t runs = w->plan->runs;
    fprintf(to,
            "<li><strong>When runs disagree</strong>: the runs of a filling agree when they lie within %s of each "
            "other; the timetable says how many seconds that is",
            say_share(h->agreement).text);
    fputs(w->plan->temperature_record ? " (judge times brought to the set temperature). " : ". ", to);
    if (h->spare_runs > 0)
        fprintf(to,
                "While the best of them disagree, make one run more, up to %zu; the best are as many as were planned, "
                "those that lie closest together. Write down every run, also those that are left out. ",
                h->spare_runs);
    else
        fputs("There are no spare runs: note it, and go on. ", to);
    fprintf(to, "A spare run moves the rest of the day.%s The time of a filling is the %s of its best runs.</li>\n",
            runs == 1 || w->plan->water_runs == 1 ? " A single run cannot be checked like that." : "",
            h->combine == COMBINE_MEAN ? "mean" : "median");
}

static void outside_the_range(FILE *to, const struct sheet_work *w)
{
    char constant[64];
    snprintf(constant, sizeof constant, "%.40s", say_number(say_mm2_s2(w->plan->tube.constant_m2_s2)).text);
    fprintf(
        to,
        "<li><strong>Outside the range</strong> (three standard deviations of a run without a bubble, from "
        "%d simulated studies; 1 run in about 400 by chance) look for a bubble, a wrong solution, or a mark missed. "
        "All of a series off to the same side is no bubble: then the polymer's molar mass or the constants K and "
        "a are others than planned. Note it and go on.</li>\n",
        EXPECTED_STUDIES);
    fprintf(to,
            "<li>Expected times hold for a tube of %s&nbsp;mm&sup2;/s&sup2;. With the constant C of your own tube "
            "multiply them by %s/C, or better, put C into the scenario's <code>kit</code> and make the sheet "
            "again.</li>\n",
            constant, constant);
}

static void rules(FILE *to, const struct sheet_work *w)
{
    fputs("<h2>At the tube</h2>\n<ul>\n", to);
    how_to_fill(to, w);
    about_water(to, w);
    when_runs_disagree(to, w);
    outside_the_range(to, w);
    fputs("</ul>\n", to);
}

static void liquid(FILE *to, const struct sheet_work *w, const struct sheet_work_row *row)
{
    const struct notebook_filling *f = row->filling;
    const struct plan *p = w->plan;
    const struct design_liquid *q = &w->design.liquid[row->liquid];
    const bool water = f->water || f->blank, in_tube = p->dilution == DILUTION_IN_TUBE;
    fprintf(to, "<strong>%s", sheet_work_solution(f));
    if (!water)
        fprintf(to, ", level %zu", f->level + 1);
    fputs("</strong>", to);
    if (!water)
        fprintf(to, ", <span class=\"n\">%s g/dL</span>", say_digits(say_g_dL(q->conc_kg_m3), 4).text);
    if (f->added)
        fprintf(to, "<br>add %s of %s to what is in the tube", say_volume(q->added_m3).text,
                f->series == CLEAVED && p->cleavage.blank_diluent ? "blank" : "water");
    else
        fprintf(to, "<br>%s %zu of %zu%s", in_tube && !water ? "loading" : "filling", f->number + 1,
                water ? p->water_fillings : p->fillings[f->series], in_tube && !water ? ", of the stock" : "");
}

static void expected(FILE *to, const struct sheet_work *w, const struct sheet_work_row *row, size_t polymer)
{
    const struct expected_time *t = &w->expected[polymer].time[row->liquid];
    fprintf(to, "<strong class=\"n\">%.1f s</strong><br><span class=\"n\">%.1f to %.1f s</span>", t->mean_s, t->low_s,
            t->high_s);
    if (row->filling->runs > 1)
        fprintf(to, "<br><span class=\"n\">agree within %.2f s</span>", w->plan->habits.agreement * t->mean_s);
}

static void runs(FILE *to, const struct sheet_work *w, const struct sheet_work_row *row)
{
    const size_t spare = w->plan->habits.spare_runs < SPARE_LINES ? w->plan->habits.spare_runs : SPARE_LINES;
    const char *bath = w->plan->temperature_record ? " <span class=\"blank\"></span>&nbsp;&deg;C" : "";
    fprintf(to, "<ol class=\"runs%s\">", w->plan->temperature_record ? "" : " short");
    for (size_t r = 0; r < row->filling->runs; r++)
        fprintf(to, "<li><span class=\"no\">%zu:</span><span class=\"blank\"></span>&nbsp;s%s</li>", r + 1, bath);
    for (size_t r = 0; row->filling->runs > 1 && r < spare; r++)
        fprintf(to, "<li><span class=\"no\">spare:</span><span class=\"blank\"></span>&nbsp;s%s</li>", bath);
    fputs("</ol>", to);
}

static void filling(FILE *to, const struct sheet_work *w, const struct sheet_work_row *row, size_t polymer)
{
    fprintf(to, "<tr><td class=\"clock\" data-is=\"Clock\">%s %s<br>", say_clock(row->begins_s).text,
            row->filling->added ? "add" : "fill");
    fprintf(to, "%s first run<br>", say_clock(row->first_run_s).text);
    fprintf(to, "%s done</td><td class=\"liquid\" data-is=\"In the tube\">", say_clock(row->ends_s).text);
    liquid(to, w, row);
    fputs("</td><td class=\"expected\" data-is=\"Expected\">", to);
    expected(to, w, row, polymer);
    fputs("</td><td class=\"runcell\" data-is=\"Read\">", to);
    runs(to, w, row);
    fputs("</td></tr>\n", to);
}

/* Which repeat of the work a day belongs to. */
struct repeat {
    size_t polymer, preparation;
};

static size_t day(FILE *to, const struct sheet_work *w, struct repeat repeat, size_t first)
{
    const size_t number = w->row[first].filling->day;
    size_t end = first;
    while (end < w->rows && w->row[end].filling->day == number)
        end++;
    fputs("<section class=\"day\">\n<h2>", to);
    if (w->polymers > 1)
        fprintf(to, "%s polymer, ", repeat.polymer == 0 ? "First" : "Second");
    if (w->plan->preparations > 1)
        fprintf(to, "%sreparation %zu, ", w->polymers > 1 ? "p" : "P", repeat.preparation + 1);
    fprintf(to, "%say %zu of %zu</h2>\n", w->polymers > 1 || w->plan->preparations > 1 ? "d" : "D", number + 1,
            w->design.layout.days);
    fprintf(to,
            "<p>Done at %s when no spare run is needed. Date <span class=\"blank wide\"></span> Begun at <span "
            "class=\"blank\"></span></p>\n",
            say_clock(w->row[end - 1].ends_s).text);
    fputs("<table class=\"stack time\">\n<thead><tr><th scope=\"col\">Clock</th><th scope=\"col\">In the tube</th>"
          "<th scope=\"col\">Expected</th><th scope=\"col\">Read</th></tr></thead>\n<tbody>\n",
          to);
    for (size_t i = first; i < end; i++)
        filling(to, w, &w->row[i], repeat.polymer);
    fputs("</tbody>\n</table>\n</section>\n", to);
    return end;
}

void sheet_days_print(FILE *to, const struct sheet_work *work)
{
    rules(to, work);
    for (size_t polymer = 0; polymer < work->polymers; polymer++)
        for (size_t preparation = 0; preparation < work->plan->preparations; preparation++)
            for (size_t i = 0; i < work->rows;)
                i = day(to, work, (struct repeat){polymer, preparation}, i);
}
