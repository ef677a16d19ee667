/* The notebook: every run made, filling by filling, for LANES studies side by
 * side. A real notebook fills one lane. */
#ifndef VICINAL_REDUCE_NOTEBOOK_H
#define VICINAL_REDUCE_NOTEBOOK_H

#include "sim/base/lanes.h"
#include "sim/reduce/assumed.h"

enum { NOTEBOOK_MAX_RUNS = 24 }; /* of one filling, spare ones included */

/* One filling as planned: of water, of the blank, or of a level. Series, level,
 * number and day count from 0. In the tube a loading is a row of fillings, each
 * but the first made by adding solvent to what is there. */
struct notebook_filling {
    bool water, blank, added;
    size_t series, level, number, day;
    size_t runs;
};

struct notebook_layout {
    size_t fillings, days;
    size_t stride; /* runs that a filling has room for */
    const struct notebook_filling *filling;
};

struct notebook_run {
    double time_s[LANES], read_K[LANES]; /* as read; read_K only with a record */
    double at_set_s[LANES];              /* what the analyst makes of them */
};

struct notebook {
    const struct notebook_layout *layout;
    struct notebook_run *run;  /* [fillings * stride] */
    unsigned char (*made)[LANES]; /* [fillings] runs made */
};

static inline struct notebook_run *notebook_runs(const struct notebook *book, size_t filling)
{
    return book->run + filling * book->layout->stride;
}

/* Bytes that a notebook of this layout takes, and how it is laid into them. */
size_t notebook_size(const struct notebook_layout *layout);
struct notebook notebook_place(const struct notebook_layout *layout, void *memory);

/* Fill in at_set_s of a run that has been entered. */
void notebook_bring_to_set(const struct assumed *a, struct notebook_run *run);

/* The best `n` of the times of a filling in one lane: those with the smallest
 * max - min, the fastest at a tie. They are copied to best[], rising; returns
 * their max - min. 1 <= n <= runs made. */
double notebook_best(const struct notebook *book, size_t filling, int lane, double best[]);

/* Whether the best n runs of a filling agree: (max - min)/mean <= agreement.
 * One run is never checked. */
bool notebook_agrees(const struct assumed *a, const struct notebook *book, size_t filling, int lane);

/* The same for all lanes after the planned runs, when nothing is to choose. */
void notebook_agree(const struct assumed *a, const struct notebook *book, size_t filling, bool out[LANES]);

/* The time of a filling [s], lane by lane: mean or median of its best runs. */
void notebook_filling_time(const struct assumed *a, const struct notebook *book, size_t filling, double out_s[LANES]);

#endif
