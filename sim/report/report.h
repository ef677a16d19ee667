/* Everything that is read afterwards: the files of a command in its folder,
 * and the answer on the terminal or as JSON on stdout. */
#ifndef VICINAL_REPORT_REPORT_H
#define VICINAL_REPORT_REPORT_H

#include <stdbool.h>
#include <stddef.h>
#include <stdio.h>

#include "sim/judge/budget.h"
#include "sim/judge/margin.h"
#include "sim/judge/search.h"
#include "sim/judge/show.h"
#include "sim/judge/survey.h"
#include "sim/judge/trial.h"
#include "sim/judge/worse.h"
#include "sim/scenario/scenario.h"

/* One run of the program, as the reports need it. */
struct report_context {
    const struct scenario *scenario;
    const char *version;
    const char *folder;           /* DIR, made when it is not there; unused by check */
    FILE *out, *err;              /* the answer; messages, each "vicinal: ...\n" */
    bool json;                    /* the result on `out` as one JSON object and nothing else */
    const char *const *arguments; /* the command line */
    size_t arguments_count;
    size_t threads;
    double started_s; /* report_clock() when the run began */
};

/* A plan's search. `estimates` are those of the recommended plan or, when
 * nothing resolves, of the nearest miss; NULL: no figure of them. */
struct report_planned {
    const struct search_result *search;
    const struct estimates *estimates;
    const struct survey_map *map; /* of that plan; NULL: none */
    const struct worse *worse;    /* where more work makes it worse */
    size_t worse_count;
    const struct budget *budget;   /* of that plan; NULL: none */
    const struct margins *margins; /* of that plan; NULL: none */
};

/* One plan in depth; of an impossible one all that was played is NULL, and
 * `curve` too where `against` is not asked. */
struct report_tried {
    size_t index; /* of the plan in the scenario */
    const struct outcome *outcome;
    const struct estimates *estimates;
    const struct example *example;
    const struct show_notebook *notebook; /* of the same simulated study */
    const struct survey_curve *curve;
    const struct survey_tops *tops;
    bool within_too_narrow;
};

/* Seconds of a clock that only runs forward. */
double report_clock(void);

/* Write plan.json, candidates.csv, recommended.yaml (when something
 * resolves), scenario.resolved.yaml, run.log, the figures, report.md and
 * report.html, then answer.
 * 0, or 1 after a message when a file could not be written; without gnuplot
 * the figures are left out, their numbers not, and one line says so. */
int report_plan(const struct report_context *context, const struct report_planned *planned);

/* The same for one plan: trial.json. */
int report_trial(const struct report_context *context, const struct report_tried *tried);

/* Writes no file. `seconds`: the expected computing time. */
int report_check(const struct report_context *context, double seconds);

#endif
