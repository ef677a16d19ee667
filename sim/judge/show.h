/* One synthetic study, shown: its notebook, and what an analyst makes of it. */
#ifndef VICINAL_JUDGE_SHOW_H
#define VICINAL_JUDGE_SHOW_H

#include "sim/judge/trial.h"

/* One synthetic study (its first preparation), by number. False: out of memory. */
bool show_example(const struct scenario *s, const struct plan *plan, size_t study, struct example *out);

/* The notebook of one synthetic study, run by run in the order of the bench,
 * preparation by preparation; of the first polymer. */
struct show_run {
    unsigned preparation; /* from 0 */
    const struct notebook_filling *filling;
    size_t run;       /* from 0 */
    double started_s; /* clock of its day */
    double time_s, read_K; /* as read; NaN: not read */
    double conc_kg_m3;     /* nominal; 0 for water */
    double nominal_s;      /* how long it takes by nominal values */
    double bath_K, liquid_K; /* the bath when it begins, the liquid's mean over it */
};
struct show_notebook {
    size_t runs;
    struct show_run *run;
    struct design design; /* what the fillings point into */
};
bool show_notebook_make(const struct scenario *s, const struct plan *plan, size_t study, struct show_notebook *out);
void show_notebook_free(struct show_notebook *n);

#endif
