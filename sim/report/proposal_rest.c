#include "sim/report/proposal_rest.h"

#include <stdlib.h>
#include <string.h>

#include "sim/base/files.h"
#include "sim/report/markdown.h"
#include "sim/report/run_log.h"
#include "sim/scenario/told.h"

/* ---- assumptions ---- */

static const char *const laws[][2] = {
    {"Viscosity of water", "IAPWS SR6-08(2011)"},
    {"Density of water", "Tanaka et al., Metrologia 38 (2001) 301 (CIPM)"},
    {"Glass capillaries, tilt and charge", "ISO 3105; practice: ISO 1628-1, ASTM D445, D446, D4603"},
    {"Kinetic-energy term", "ISO 3105; Cannon, Manning and Bell, Anal. Chem. 32 (1960) 355"},
    {"Volumetric glassware", "ISO 1042, 385, 648; tolerances as triangular limits"},
    {"Cutting of head-to-head links", "Flory and Leutner, J. Polym. Sci. 3 (1948) 880, with exact sums over chain "
                                      "lengths"},
    {"Solutions and extrapolations", "Martin (1942); Huggins, J. Am. Chem. Soc. 64 (1942) 2716; Kraemer, Ind. Eng. "
                                     "Chem. 30 (1938) 1200; Solomon and Ciuta, J. Appl. Polym. Sci. 6 (1962) 683"},
    {"Fluctuation of the bath", "Ornstein-Uhlenbeck process, drawn exactly: Gillespie, Phys. Rev. E 54 (1996) 2084"},
    {"Uncertainty and coverage", "JCGM 100:2008 (GUM), JCGM 101:2008"},
    {"Random numbers", "PCG: O'Neill, HMC-CS-2014-0905 (2014)"},
};

/* The table of one section being written. */
struct assumptions {
    FILE *to;
    struct markdown_table table;
    char section[24], entry[96];
    bool any;
};

static void heading(struct assumptions *a, const struct told *v)
{
    char text[160];
    if (a->any)
        markdown_gap(a->to);
    snprintf(a->section, sizeof a->section, "%s", v->section);
    snprintf(a->entry, sizeof a->entry, "%s", v->entry);
    snprintf(text, sizeof text, *v->entry ? "Values: %s %.100s" : "Values: %s", v->section, v->entry);
    markdown_heading(a->to, 3, text);
    a->table = markdown_table(a->to, "lll");
    markdown_cell(&a->table, "Key and meaning");
    markdown_cell(&a->table, "Value");
    markdown_cell(&a->table, "Source");
    a->any = true;
}

static void tell(void *context, const struct told *v)
{
    struct assumptions *a = context;
    if (strncmp(v->key, "price", strlen("price")) == 0 && strcmp(v->text, "0") == 0)
        return; /* none was given */
    if (!a->any || strcmp(a->section, v->section) != 0)
        heading(a, v);
    markdown_cell_open(&a->table);
    markdown_code(a->to, v->key);
    if (*v->help) {
        fputc(' ', a->to);
        markdown_text(a->to, v->help);
    }
    markdown_cell_close(&a->table);
    markdown_cell(&a->table, "%s", v->text);
    markdown_cell(&a->table, "%s", v->source ? v->source : "given in the scenario");
}

void proposal_rest_assumptions(const struct proposal *p)
{
    struct markdown_table table = markdown_table(p->to, "ll");
    struct assumptions a = {.to = p->to};
    markdown_heading(p->to, 2, "Assumptions and their sources");
    markdown_paragraph(p->to, "A planned figure is only as good as the spreads it was given. Keys that end in _u are "
                              "standard uncertainties (k = 1), those in _tolerance limits as marked on the glass. "
                              "\"Common practice, no source\" means what it says: measure your own before money is "
                              "spent.");
    markdown_heading(p->to, 3, "Laws");
    markdown_cell(&table, "Law");
    markdown_cell(&table, "Source");
    for (size_t i = 0; i < sizeof laws / sizeof *laws; i++) {
        markdown_cell(&table, "%s", laws[i][0]);
        markdown_cell(&table, "%s", laws[i][1]);
    }
    markdown_gap(p->to);
    if (p->plan)
        told_plan(p->context->scenario, p->index, tell, &a);
    markdown_gap(p->to);
}

/* ---- what is left out ---- */

static const char *const left_out[][2] = {
    {"evaporation in the tube", "0.8 mg/h of 15 g"},
    {"buoyancy of the air", "7e-6 of the relative viscosity; 0.08 % of the concentration on weighing, inside "
                            "dry_content_u"},
    {"volumes made up at room and used at the bath's temperature",
     "0.07 % of the concentration at 25 degC, 0.56 % at 40 degC (warned about above 30 degC)"},
    {"shear thinning", "none below about 300 kg/mol at 2000 1/s (practice)"},
    {"end groups after cleavage", "1 to 2 units of 117"},
    {"ageing of the intact solution", "its leverage is 0.087: 5 % of the intrinsic viscosity is 0.4 % of the fraction"},
    {"tilt across the plane of the bulbs", "another 0.004 % of the time at 0.5 degree"},
    {"gravity, air pressure; film drainage", "cancel; constant (practice)"},
    {"K and a far below the range they were fitted in",
     "a power law fitted at 3e4 to 1e5 g/mol lies 10 to 29 % low for the cut polymer (Stockmayer-Fixman form); it "
     "cancels between polymers reduced with the same pair"},
};

void proposal_rest_left_out(const struct proposal *p)
{
    struct markdown_table table = markdown_table(p->to, "ll");
    markdown_heading(p->to, 2, "What is left out");
    markdown_paragraph(p->to, "Not in the simulation, with sizes (computed unless marked):");
    markdown_cell(&table, "Effect");
    markdown_cell(&table, "Size");
    for (size_t i = 0; i < sizeof left_out / sizeof *left_out; i++) {
        markdown_cell(&table, "%s", left_out[i][0]);
        markdown_cell(&table, "%s", left_out[i][1]);
    }
    markdown_gap(p->to);
}

/* ---- the rest ---- */

void proposal_rest_cautions(const struct proposal *p)
{
    static const char *const caution[] = {
        "Local rules, safety data sheets and licensed practice come first; nothing here replaces them.",
        "The cleaving reagent (periodate) is an oxidiser: keep it away from what burns.",
        "Poly(vinyl alcohol) is dissolved hot, on a hot plate: mind burns and boiling over.",
        "Glass is put under suction: wear eye protection, use no cracked glass, and never draw liquid up by mouth.",
    };
    markdown_heading(p->to, 2, "Cautions");
    for (size_t i = 0; i < sizeof caution / sizeof *caution; i++)
        markdown_point(p->to, "%s", caution[i]);
    markdown_gap(p->to);
}

void proposal_rest_reproduce(const struct proposal *p)
{
    const struct scenario *s = p->context->scenario;
    struct files_text name, command;
    markdown_heading(p->to, 2, "How to reproduce it");
    markdown_paragraph(p->to,
                       "Version %s of vicinal, seed %llu, at most %zu simulated studies for each plan. The scenario "
                       "with every default, and with what the command line changed, lies beside this report as "
                       "scenario.resolved.yaml; the same scenario gives the same numbers for any number of threads.",
                       p->context->version, (unsigned long long)scenario_seed(s), scenario_studies(s));
    if (!files_text_open(&name))
        return;
    fprintf(name.stream, "%s.yaml", scenario_name(s));
    bool good = files_text_close(&name) && files_text_open(&command);
    if (good) {
        fputs("vicinal plan ", command.stream);
        run_log_argument(command.stream, name.bytes);
        fprintf(command.stream, " --seed %llu --studies %zu", (unsigned long long)scenario_seed(s),
                scenario_studies(s));
        good = files_text_close(&command);
        if (good)
            markdown_code(p->to, command.bytes);
        fputs("\n\n", p->to);
        files_text_free(&command);
    }
    files_text_free(&name);
}
