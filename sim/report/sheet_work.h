/* The work that one plan asks for, in numbers: what is weighed, what is
 * pipetted, and the timetable. All of it is for one preparation of one
 * polymer. */
#ifndef VICINAL_REPORT_SHEET_WORK_H
#define VICINAL_REPORT_SHEET_WORK_H

#include "sim/judge/expected.h"

/* A stock: dry polymer into a flask. */
struct sheet_work_stock {
    const char *name; /* "intact", "cleaved", or "shared" by both series */
    double polymer_kg, conc_kg_m3;
    double flask_m3, tolerance_m3; /* tolerance 0: not known */
};

/* A level as it is made. In flasks: `taken_m3` of the stock made up to
 * `flask_m3`, or, when it is not diluted, the stock itself (taken 0). In the
 * tube: `taken_m3` is the charge of the stock for the top level and the solvent
 * that is added for every other, and `tube_m3` what is in the tube then. */
struct sheet_work_level {
    size_t series, level;
    double conc_kg_m3;
    bool diluted;
    double taken_m3, tube_m3;
    double flask_m3, tolerance_m3;
    double used_m3; /* what all fillings take, rinsing included */
};

/* A filling in the timetable; clock of its day. */
struct sheet_work_row {
    const struct notebook_filling *filling;
    size_t liquid; /* as in design.h */
    double begins_s, first_run_s, ends_s;
};

enum { SHEET_WORK_MOST_LEVELS = SERIES * PLAN_MAX_LEVELS };
struct sheet_work {
    const struct scenario *scenario;
    const struct plan *plan;
    struct design design;
    size_t polymers; /* 2: a second one is measured alongside */
    size_t stocks, levels, rows;
    struct sheet_work_stock stock[SERIES];
    struct sheet_work_level level[SHEET_WORK_MOST_LEVELS];
    struct sheet_work_row *row;  /* in the order of the bench */
    double aliquot_m3;           /* of a shared stock: what is cleaved; 0 else */
    double blank_m3;             /* blank solution that is needed; 0: none */
    struct expected expected[2]; /* of each polymer */
};

/* False: out of memory. A plan that cannot be carried out has its design only:
 * ask sheet_work_why. Scenario and plan must outlive it; for sheet_work_free
 * in any case. */
bool sheet_work_make(const struct scenario *s, const struct plan *plan, struct sheet_work *out);
const char *sheet_work_why(const struct sheet_work *w);
void sheet_work_free(struct sheet_work *w);

/* "water", "blank", "intact", "cleaved": what a filling is of. */
const char *sheet_work_solution(const struct notebook_filling *filling);

/* When a run of a row begins, by its number from 0; clock of the day [s]. */
double sheet_work_run_s(const struct sheet_work *w, const struct sheet_work_row *row, size_t run);

#endif
