#include "sim/report/figure_claimed.h"

#include <math.h>

#include "sim/report/say.h"

/* Where the axis begins: a round number below what was found. */
static double axis_low(double coverage)
{
    const double low = 10.0 * floor((say_percent(coverage) - 2.0) / 10.0);
    return low < 0.0 ? 0.0 : low > 80.0 ? 80.0 : low;
}

bool figure_claimed(struct figures_pen *pen, const struct budget *budget)
{
    enum { HEIGHT = 150 };
    struct files_text csv, text;
    if (!isfinite(budget->coverage))
        return true;
    if (!figures_open(&csv, &text))
        return false;
    fprintf(csv.stream, "what,coverage [%%],standard error [%%]\nclaimed,95,0\nfound,%s,%s\n",
            say_digits(say_percent(budget->coverage), 6).text, say_digits(say_percent(budget->coverage_se), 3).text);
    gnuplot_number(text.stream, "low", axis_low(budget->coverage));
    gnuplot_number(text.stream, "height", HEIGHT);
    return figures_draw(pen, "claimed", "claimed.gp", &csv, &text);
}
