#include "sim/report/sheet_before.h"

#include "sim/report/say.h"

static const char *const series_name[SERIES] = {"intact", "cleaved"};
static const char blank[] = "<span class=\"blank\"></span>";

static const char *solvent_of(const struct sheet_work *w, size_t series)
{
    return series == CLEAVED && w->plan->cleavage.blank_diluent ? "blank" : "water";
}

static struct say grams(double kg)
{
    struct say s;
    snprintf(s.text, sizeof s.text, "%.20s g", say_digits(say_g(kg), 4).text);
    return s;
}

static struct say strength(double kg_m3)
{
    struct say s;
    snprintf(s.text, sizeof s.text, "%.20s g/dL", say_digits(say_g_dL(kg_m3), 4).text);
    return s;
}

/* "50 mL, class A, ±0.06 mL" */
static struct say flask(const struct sheet_work *w, double volume_m3, double tolerance_m3, double asked_m3)
{
    struct say s;
    const char *glass = asked_m3 >= 0.0 ? "" : w->plan->solutions.glass == GLASS_A ? ", class A" : ", class B";
    snprintf(s.text, sizeof s.text, "%.12s mL%s, \302\261%.12s mL", say_number(say_mL(volume_m3)).text, glass,
             say_short(say_mL(tolerance_m3), 3).text);
    return s;
}

static void how_often(FILE *to, const struct sheet_work *w)
{
    if (w->plan->preparations > 1)
        fprintf(to,
                "<p><strong>Everything from the balance on is done %zu times</strong>, each with its own stocks, "
                "cleavage, dilutions, fillings and days. The amounts are those of one preparation.</p>\n",
                w->plan->preparations);
    if (w->polymers > 1)
        fputs("<p><strong>Two polymers are measured alongside.</strong> All of it is done for the first and, the same "
              "again, for the second: same amounts, same flasks, same tube.</p>\n",
              to);
}

/* One step of the way to day 1. */
struct step {
    const char *what;
    double hands_s, wait_s;
};

static void step(FILE *to, struct step s, double *clock_s)
{
    fprintf(to,
            "<tr><td data-is=\"From\" class=\"n\">%s</td><td data-is=\"Step\">%s</td><td data-is=\"Hands-on\">%s</td>",
            say_clock(*clock_s).text, s.what, say_while(s.hands_s).text);
    fprintf(to, "<td data-is=\"Then waits\">%s</td></tr>\n", s.wait_s > 0.0 ? say_while(s.wait_s).text : "no");
    *clock_s += s.hands_s + s.wait_s;
}

static void steps(FILE *to, const struct sheet_work *w)
{
    const struct cost_rules *cost = scenario_cost(w->scenario);
    const bool flasks = w->plan->dilution == DILUTION_FLASKS;
    double clock_s = 0.0, diluted = 0.0;
    for (size_t i = 0; i < w->levels; i++)
        if (flasks && w->level[i].diluted)
            diluted += 1.0;
    fputs("<table class=\"stack\">\n<caption>The way to day 1, hours:minutes from its beginning</caption>\n"
          "<thead><tr><th scope=\"col\">From</th><th scope=\"col\">Step</th><th scope=\"col\">Hands-on</th>"
          "<th scope=\"col\">Then waits</th></tr></thead>\n<tbody>\n",
          to);
    step(to,
         (struct step){w->stocks > 1 ? "weigh and dissolve both stocks" : "weigh and dissolve the stock",
                       (double)w->stocks * cost->weigh_and_dissolve_s, cost->dissolving_wait_s},
         &clock_s);
    step(to, (struct step){"cleave", cost->cleavage_s, cost->cleavage_wait_s}, &clock_s);
    if (diluted > 0.0)
        step(to, (struct step){"dilute the levels", diluted * cost->dilution_s, 0.0}, &clock_s);
    fprintf(to, "</tbody>\n</table>\n<p>Day 1 may begin %s hours after the first weighing.</p>\n",
            say_clock(clock_s).text);
}

static void weighings(FILE *to, const struct sheet_work *w)
{
    const struct solutions *so = &w->plan->solutions;
    fputs("<h3>Weigh</h3>\n<table class=\"stack\">\n<thead><tr><th scope=\"col\">Stock</th><th scope=\"col\">Dry "
          "polymer</th><th scope=\"col\">Into a flask of</th><th scope=\"col\">Gives</th><th scope=\"col\">Weighed, as "
          "received</th></tr></thead>\n<tbody>\n",
          to);
    for (size_t i = 0; i < w->stocks; i++) {
        const struct sheet_work_stock *s = &w->stock[i];
        fprintf(to, "<tr><td data-is=\"Stock\">%s</td><td data-is=\"Dry polymer\"><strong>%s</strong></td>", s->name,
                grams(s->polymer_kg).text);
        fprintf(to, "<td data-is=\"Flask\">%s</td><td data-is=\"Gives\">%s</td><td data-is=\"Weighed, as received\">",
                flask(w, s->flask_m3, s->tolerance_m3, so->stock_tolerance_m3).text, strength(s->conc_kg_m3).text);
        for (double n = 0.0; n < w->design.repeats; n += 1.0)
            fprintf(to, "%s%s g", n > 0.0 ? "<br>" : "", blank);
        fputs("</td></tr>\n", to);
    }
    fputs("</tbody>\n</table>\n", to);
}

/* As received: dry mass over dry content, tabulated where it mostly lies. */
static void moisture(FILE *to, const struct sheet_work *w)
{
    static const double dry[] = {1.0, 0.98, 0.96, 0.94};
    fprintf(to,
            "<p>Grams of polymer as received are grams of dry polymer divided by its dry, ash-free share, found by "
            "drying a sample: %s&nbsp;%%. The plan takes it as known to %s (standard uncertainty).</p>\n",
            blank, say_share(w->plan->solutions.dry_content_u).text);
    fputs("<table>\n<thead><tr><th scope=\"col\">Dry share</th>", to);
    for (size_t k = 0; k < sizeof dry / sizeof *dry; k++)
        fprintf(to, "<th scope=\"col\">%s</th>", say_share(dry[k]).text);
    fputs("</tr></thead>\n<tbody>\n", to);
    for (size_t i = 0; i < w->stocks; i++) {
        fprintf(to, "<tr><th scope=\"row\">%s, g</th>", w->stock[i].name);
        for (size_t k = 0; k < sizeof dry / sizeof *dry; k++)
            fprintf(to, "<td>%s</td>", say_digits(say_g(w->stock[i].polymer_kg / dry[k]), 4).text);
        fputs("</tr>\n", to);
    }
    fputs("</tbody>\n</table>\n<p>The grams need not be met to the last digit: write down what you weighed. The "
          "concentration as made is weighed grams times dry share over the flask's volume; enter it in the "
          "notebook.</p>\n",
          to);
}

static void dissolve(FILE *to, const struct sheet_work *w)
{
    const struct habits *h = &w->plan->habits;
    fprintf(
        to,
        "<h3>Dissolve</h3>\n<p>As your procedure says (poly(vinyl alcohol) dissolves in hot water, stirred), until "
        "clear; let it stand and cool for %s, and make %s up to the mark at room temperature (%s&nbsp;&deg;C). Filter "
        "against dust before timing.</p>\n",
        say_while(scenario_cost(w->scenario)->dissolving_wait_s).text, w->stocks > 1 ? "the intact stock" : "the stock",
        say_short(say_celsius(h->room_K), 3).text);
}

static void cleave(FILE *to, const struct sheet_work *w)
{
    const struct cost_rules *cost = scenario_cost(w->scenario);
    const struct cleavage *c = &w->plan->cleavage;
    fputs("<h3>Cleave</h3>\n<p>Reagent as your procedure says. ", to);
    if (w->aliquot_m3 > 0.0)
        fprintf(to,
                "Take at least %s mL of the shared stock for it and add the reagent dry, so that the volume stays; the "
                "rest of the stock stays intact.",
                say_short(say_mL(w->aliquot_m3), 4).text);
    else
        fprintf(to,
                "It goes into the flask of the cleaved stock, which is made up to the mark with the reagent in it and "
                "then holds %s of polymer.",
                strength(w->design.flasks.stock_conc_kg_m3[CLEAVED]).text);
    fprintf(to, " Hands-on %s, then wait %s. The plan counts on a conversion of %s.</p>\n",
            say_while(cost->cleavage_s).text, say_while(cost->cleavage_wait_s).text, say_share(c->conversion).text);
    if (w->blank_m3 > 0.0)
        fprintf(to,
                "<p>Make at least %s mL of blank: water with the spent reagent at the strength of the cleaved stock, "
                "without polymer.</p>\n",
                say_short(say_mL(w->blank_m3), 4).text);
}

static struct say name_of(const struct sheet_work_level *level)
{
    struct say s;
    snprintf(s.text, sizeof s.text, "%s, level %zu", series_name[level->series], level->level + 1);
    return s;
}

static void level_in_flask(FILE *to, const struct sheet_work *w, const struct sheet_work_level *l)
{
    const double asked_m3 = w->plan->solutions.level_tolerance_m3;
    fprintf(to, "<tr><td data-is=\"Solution\" class=\"n\">%s</td><td data-is=\"Is\" class=\"n\">%s</td>",
            name_of(l).text, strength(l->conc_kg_m3).text);
    if (l->diluted)
        fprintf(
            to,
            "<td data-is=\"Pipette\"><strong>%s</strong> of the %s stock</td><td data-is=\"Into a flask of\">%s</td>"
            "<td data-is=\"Make up with\">%s</td>",
            say_volume(l->taken_m3).text, w->stocks > 1 || l->series == CLEAVED ? series_name[l->series] : "shared",
            flask(w, l->flask_m3, l->tolerance_m3, asked_m3).text, solvent_of(w, l->series));
    else
        fprintf(to, "<td data-is=\"Pipette\">nothing: the stock itself</td><td data-is=\"Into a flask of\">none</td>"
                    "<td data-is=\"Make up with\">nothing</td>");
    fprintf(to, "<td data-is=\"Fillings take\">%s</td></tr>\n", say_volume(l->used_m3).text);
}

static void in_flasks(FILE *to, const struct sheet_work *w)
{
    const struct solutions *so = &w->plan->solutions;
    fprintf(to,
            "<h3>Dilute</h3>\n<p>Always with the same pipette or burette, good to \302\261%s mL or better, and make up "
            "to the mark at room temperature.</p>\n",
            say_short(say_mL(so->delivery_tolerance_m3), 3).text);
    fputs("<table class=\"stack\">\n<thead><tr><th scope=\"col\">Solution</th><th scope=\"col\">Is</th>"
          "<th scope=\"col\">Pipette</th><th scope=\"col\">Into a flask of</th><th scope=\"col\">Make up with</th>"
          "<th scope=\"col\">Its fillings take</th></tr></thead>\n<tbody>\n",
          to);
    for (size_t i = 0; i < w->levels; i++)
        level_in_flask(to, w, &w->level[i]);
    fputs("</tbody>\n</table>\n", to);
}

static void in_tube(FILE *to, const struct sheet_work *w)
{
    fprintf(
        to,
        "<h3>Dilute in the tube, at the bench</h3>\n<p>A loading is a charge of the stock, then solvent is added to "
        "what is in the tube, from concentrated to dilute; the timetable says when. Always with the same pipette or "
        "burette, good to \302\261%s mL or better.</p>\n",
        say_short(say_mL(w->plan->solutions.delivery_tolerance_m3), 3).text);
    fputs("<table class=\"stack\">\n<thead><tr><th scope=\"col\">Solution</th><th scope=\"col\">Is</th>"
          "<th scope=\"col\">Into the tube</th><th scope=\"col\">Then in it</th></tr></thead>\n<tbody>\n",
          to);
    for (size_t s = 0; s < SERIES; s++)
        for (size_t i = w->levels; i-- > 0;) {
            const struct sheet_work_level *l = &w->level[i];
            if (l->series != s)
                continue;
            fprintf(to, "<tr><td data-is=\"Solution\" class=\"n\">%s</td><td data-is=\"Is\" class=\"n\">%s</td>",
                    name_of(l).text, strength(l->conc_kg_m3).text);
            fprintf(to,
                    "<td data-is=\"Into the tube\"><strong>%s</strong> of %s%s</td><td data-is=\"Then in "
                    "it\">%s</td></tr>\n",
                    say_volume(l->taken_m3).text, l->diluted ? solvent_of(w, s) : series_name[s],
                    l->diluted ? "" : " stock", say_volume(l->tube_m3).text);
        }
    fputs("</tbody>\n</table>\n", to);
}

void sheet_before_print(FILE *to, const struct sheet_work *work)
{
    fputs("<h2>Before day 1</h2>\n", to);
    how_often(to, work);
    steps(to, work);
    weighings(to, work);
    moisture(to, work);
    dissolve(to, work);
    cleave(to, work);
    if (work->plan->dilution == DILUTION_IN_TUBE)
        in_tube(to, work);
    else
        in_flasks(to, work);
}
