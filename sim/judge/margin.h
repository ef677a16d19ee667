/* How bad each condition may get before a plan stops resolving. */
#ifndef VICINAL_JUDGE_MARGIN_H
#define VICINAL_JUDGE_MARGIN_H

#include "sim/judge/outcome.h"

enum margin_verdict { MARGIN_FOUND, MARGIN_WHOLE_RANGE, MARGIN_FAILS_ALREADY };
const char *margin_verdict_text(enum margin_verdict verdict); /* "margin", "whole range", "fails already" */

/* One condition in one bad direction. Values in the unit that people use. */
enum { MARGIN_POINTS = 24 };
struct margin {
    char key[96];        /* path in the scenario, such as kit.baths.circulator.fluctuation */
    const char *name;    /* in words: "bath fluctuation" */
    const char *unit;    /* "K", "%", ... "" for none */
    bool up;             /* the direction that was followed */
    double nominal, worst, se; /* worst: where it still resolves; the end of the range when verdict says so */
    enum margin_verdict verdict;
    size_t points;       /* values that were visited, in that order, and the figure at each as a plain number: power, */
    double at[MARGIN_POINTS], figure[MARGIN_POINTS]; /*   or the share within when `against` is not asked */
};

/* Replicates that make up for a bath twice as bad. */
struct margin_exchange {
    char replicates[64];  /* "fillings 3, runs 3"; "" when none offered does */
    double hours_s, money; /* more than the plan itself */
    double studies_to_pay; /* real studies after which the better bath has paid for itself; NaN: never or free */
};

enum { MARGIN_MOST = 32 };
struct margins {
    struct outcome outcome;
    size_t count;
    struct margin margin[MARGIN_MOST];
    bool has_exchange;
    struct margin_exchange exchange;
};

struct margin_options {
    void (*progress)(void *context, double done); /* NULL: none */
    void *context;
};

/* False: out of memory. An impossible plan has only its outcome's status. */
bool margin_run(const struct scenario *s, const struct plan *plan, struct margin_options options, struct margins *out);

#endif
