#include "sim/report/sheet_page.h"

#include "sim/report/html.h"
#include "sim/report/say.h"
#include "sim/report/sheet_before.h"
#include "sim/report/sheet_days.h"
#include "sim/report/terminal.h"

#include <stdlib.h>

static const char style[] =
    ":root{color-scheme:light}"
    "*{box-sizing:border-box}"
    "body{margin:0 auto;padding:1rem;max-width:60rem;background:#fff;color:#111;"
    "font:1rem/1.45 system-ui,\"Liberation Sans\",Arial,sans-serif;overflow-wrap:break-word}"
    "h1{font-size:1.6rem;line-height:1.2;margin:0 0 .5rem}"
    "h2{font-size:1.25rem;margin:1.8rem 0 .5rem;border-bottom:2px solid #111}"
    "h3{font-size:1.05rem;margin:1.2rem 0 .4rem}"
    "p,ul,ol{margin:.4rem 0}ul,ol{padding-left:1.4rem}li{margin:.25rem 0}"
    "table{border-collapse:collapse;width:100%;margin:.5rem 0;font-size:.94rem}"
    "caption{text-align:left;font-weight:600;padding:.2rem 0}"
    "th,td{border:1px solid #777;padding:.25rem .4rem;text-align:left;vertical-align:top}"
    "th{background:#eee}"
    "dl{display:grid;grid-template-columns:max-content 1fr;gap:.1rem .8rem;margin:.5rem 0}"
    "dt{font-weight:600}dd{margin:0;min-width:0}"
    ".planned{border-left:.4rem solid #0072b2;padding:.3rem .7rem;background:#eef5fb}"
    ".caution{border:2px solid #b33a00;padding:.2rem .8rem;margin:.8rem 0;background:#fff6ee}"
    ".caution h2{margin-top:.4rem;border:0}"
    ".blank{display:inline-block;border-bottom:1px solid #333;width:3.6rem;height:1.5em;vertical-align:bottom}"
    ".wide{width:9rem}"
    ".n,.runs li{white-space:nowrap}"
    ".runs{display:grid;grid-template-columns:repeat(auto-fill,minmax(12rem,1fr));gap:.2rem .6rem;margin:0;padding:0;"
    "list-style:none}"
    ".runs.short{grid-template-columns:repeat(auto-fill,minmax(8rem,1fr))}"
    ".runs li{margin:0}.runs .no{display:inline-block;width:2.8rem}"
    ".time .clock{width:8rem}.time .liquid{width:11rem}.time .expected{width:11rem}"
    "@media screen and (max-width:44rem){"
    "body{padding:.7rem}th,td{padding:.2rem}table{font-size:.88rem}"
    "dl{display:block}dd{margin:0 0 .3rem .8rem}"
    ".stack thead{position:absolute;width:1px;height:1px;overflow:hidden;clip-path:inset(50%)}"
    ".stack,.stack caption,.stack tbody,.stack tr,.stack td{display:block;width:auto!important}"
    ".stack tr{border:1px solid #777;margin:.6rem 0;padding:.3rem .5rem}"
    ".stack td{border:0;padding:.1rem 0}"
    ".stack td::before{content:attr(data-is) \": \";font-weight:600}"
    ".time td.runcell::before,.time td.clock::before{display:block}"
    "}"
    "@page{margin:14mm}"
    "@media print{"
    ":root{font-size:10pt}"
    "body{max-width:none;padding:0;line-height:1.35}"
    ".time .clock{width:7.2rem}.time .liquid{width:8.8rem}.time .expected{width:9.4rem}"
    ".blank{width:3.1rem}.wide{width:9rem}"
    ".runs{grid-template-columns:repeat(auto-fill,minmax(11.6rem,1fr));gap:.2rem .3rem}.runs .no{width:2.7rem}"
    "h2,h3,caption{break-after:avoid}"
    "tr,li,dl,.caution,table:not(.time){break-inside:avoid}thead{display:table-header-group}"
    ".day{break-before:page}"
    ".planned,.caution,th{print-color-adjust:exact;-webkit-print-color-adjust:exact}"
    "}";

static void open_page(FILE *to, const char *title)
{
    fputs("<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n"
          "<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n"
          "<meta http-equiv=\"Content-Security-Policy\" content=\"default-src 'none'; style-src 'unsafe-inline'; "
          "img-src data:\">\n"
          "<link rel=\"icon\" href=\"data:,\">\n<title>Bench sheet: ",
          to);
    html_text(to, title);
    fprintf(to, "</title>\n<style>%s</style>\n</head>\n<body>\n<main>\n<h1>", style);
    html_text(to, title);
    fputs("</h1>\n", to);
}

static void item(FILE *to, const char *label, const char *text)
{
    fprintf(to, "<dt>%s</dt><dd>", label);
    html_text(to, text);
    fputs("</dd>\n", to);
}

static void glass(FILE *to, const struct plan *p)
{
    char text[400];
    snprintf(text, sizeof text, "%.100s, %.20s kg/mol, of %.100s", p->grade.name,
             say_short(p->grade.molar_mass_kg_mol, 4).text, p->material.name);
    item(to, "Grade", text);
    snprintf(text, sizeof text, "%.100s, %.30s mm\302\262/s\302\262, takes %.20s", p->tube.name,
             say_number(say_mm2_s2(p->tube.constant_m2_s2)).text, say_volume(p->tube.charge_m3).text);
    item(to, "Tube", text);
    snprintf(text, sizeof text, "%.100s at %.20s \302\260C", p->bath.name,
             say_short(say_celsius(p->habits.temperature_K), 4).text);
    item(to, "Bath", text);
    snprintf(text, sizeof text, "%.100s, %s", p->thermometer.name,
             p->temperature_record ? "read in each run" : "not read during runs");
    item(to, "Thermometer", text);
    item(to, "Timer", p->timer.name);
}

static void summary(FILE *to, const struct sheet_work *w)
{
    char text[400];
    char *question = terminal_question(scenario_question(w->scenario));
    fputs("<p class=\"planned\"><strong>Planned, nothing measured.</strong> Every number on this sheet is computed "
          "from the scenario and its stated or default values; enter what you find on the lines.</p>\n<dl>\n",
          to);
    if (question) {
        snprintf(text, sizeof text, "a study that %.380s", question);
        item(to, "Meant as", text);
    }
    free(question);
    glass(to, w->plan);
    snprintf(text, sizeof text, "%.30s, %.10s h at the tube, %.10s h hands-on before it, %.10s g of dry polymer",
             say_plural(w->design.days, "day").text, say_digits(say_hours(w->design.nominal_clock_s), 3).text,
             say_digits(say_hours(w->design.preparation_s), 3).text, say_digits(say_g(w->design.polymer_kg), 3).text);
    item(to, "Takes", text);
    if (w->design.repeats > 1.0) {
        snprintf(text, sizeof text, "%.20s times: %.30s%s", say_short(w->design.repeats, 3).text,
                 say_plural(w->plan->preparations, "preparation").text,
                 w->polymers > 1 ? " of each of two polymers" : "");
        item(to, "All of it", text);
    }
    fputs("</dl>\n", to);
}

static void cautions(FILE *to)
{
    fputs("<section class=\"caution\">\n<h2>Cautions first</h2>\n<ul>\n"
          "<li>Local rules, the safety data sheets and licensed practice come first; this sheet replaces none of "
          "them.</li>\n"
          "<li><strong>Periodate is an oxidiser.</strong> Keep it from anything that burns, wear gloves and eye "
          "protection, and hand in what is spent as your place prescribes.</li>\n"
          "<li><strong>Hot plate and hot solutions</strong> burn: no unattended heating, no sealed vessels.</li>\n"
          "<li><strong>Glass under suction breaks.</strong> Look for cracks, wear eye protection, clamp the tube "
          "before drawing liquid up, and use a bulb or a filler.</li>\n"
          "<li><strong>Never pipette by mouth</strong>, and never draw liquid up the tube by mouth.</li>\n"
          "</ul>\n</section>\n",
          to);
}

static void afterwards(FILE *to, const struct report_context *context, const struct sheet_work *w,
                       const struct warnings *warnings)
{
    fputs("<h2>Afterwards</h2>\n<p>Type the times, in the order of the bench, into <code>notebook.csv</code> beside "
          "this page, which has a row for every planned run",
          to);
    fputs(w->polymers > 1 ? " of the first polymer; <code>notebook-second.csv</code> is that of the second. "
                            "The answer is the difference of the two estimates.</p>\n"
                          : ".</p>\n",
          to);
    if (warnings->count > 0) {
        fputs("<h2>What to know about this plan</h2>\n<ul>\n", to);
        for (size_t i = 0; i < warnings->count; i++) {
            fputs("<li>", to);
            html_text(to, warnings->text[i]);
            fputs("</li>\n", to);
        }
        fputs("</ul>\n", to);
    }
    fputs("<h2>Where this sheet comes from</h2>\n<p>vicinal ", to);
    html_text(to, context->version);
    fprintf(to,
            ", seed %llu; <code>vicinal sheet scenario.resolved.yaml</code> with the file beside this page gives "
            "the same numbers again.</p>\n",
            (unsigned long long)scenario_seed(w->scenario));
}

void sheet_page_print(FILE *to, const struct report_context *context, const struct sheet_work *work,
                      const struct warnings *warnings)
{
    const char *title = scenario_title(work->scenario);
    open_page(to, *title ? title : scenario_name(work->scenario));
    summary(to, work);
    cautions(to);
    sheet_before_print(to, work);
    sheet_days_print(to, work);
    afterwards(to, context, work, warnings);
    fputs("</main>\n</body>\n</html>\n", to);
}
