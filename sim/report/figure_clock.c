#include "sim/report/figure_clock.h"

#include "sim/report/gnuplot.h"
#include "sim/report/say.h"

static const char *solution_of(const struct notebook_filling *f)
{
    if (f->water)
        return "water";
    if (f->blank)
        return "blank";
    return f->series == INTACT ? "intact" : "cleaved";
}

/* The days of all preparations one after the other, each as long as its last
 * run asks. */
bool figure_clock(struct figures_pen *pen, const struct show_notebook *notebook)
{
    const double set_K = notebook->design.plan->habits.temperature_K;
    double opened_s = 0.0, end_s = 0.0;
    size_t blanks = 0;
    struct files_text csv, text;
    if (!figures_open(&csv, &text))
        return false;
    fputs("solution,clock [h],time over nominal less one [%],bath less set [K],liquid less set [K]\n", csv.stream);
    for (size_t i = 0; i < notebook->runs; i++) {
        const struct show_run *run = &notebook->run[i], *before = i > 0 ? run - 1 : run;
        if (run->filling->day != before->filling->day || run->preparation != before->preparation) {
            opened_s += end_s;
            fputc('\n', csv.stream); /* a gap in the lines */
        }
        end_s = run->started_s + run->nominal_s;
        blanks += run->filling->blank;
        fprintf(csv.stream, "%s,%s,", solution_of(run->filling),
                say_digits(say_hours(opened_s + run->started_s + 0.5 * run->nominal_s), 6).text);
        fprintf(csv.stream, "%s,", say_digits(say_percent(run->time_s / run->nominal_s - 1.0), 4).text);
        fprintf(csv.stream, "%s,", say_digits(run->bath_K - set_K, 4).text);
        fprintf(csv.stream, "%s\n", say_digits(run->liquid_K - set_K, 4).text);
    }
    gnuplot_number(text.stream, "height", 520.0);
    gnuplot_number(text.stream, "blanks", (double)blanks);
    return figures_draw(pen, "clock", "clock.gp", &csv, &text);
}
