/* Why a plan resolves or not, in plain sentences: what the budget of its errors
 * and the margins of its conditions come to. */
#ifndef VICINAL_REPORT_REASONS_H
#define VICINAL_REPORT_REASONS_H

#include "sim/judge/budget.h"
#include "sim/judge/margin.h"
#include "sim/report/say.h"

enum { REASONS_MOST = 10, REASONS_SIZE = 640 };
struct reasons {
    size_t count;
    char text[REASONS_MOST][REASONS_SIZE];
};

/* What averages a source out. */
enum reasons_repeat { REASONS_STUDY, REASONS_PREPARATION, REASONS_DAY, REASONS_FILLING, REASONS_RUN };
enum reasons_repeat reasons_repeat_of(enum draws_group group);

/* The total shares of the sources that this averages out, summed (never below
 * 0), and the names of those above 1 %, the greatest first. */
enum { REASONS_NAMES = 320 };
double reasons_share(const struct budget *budget, enum reasons_repeat repeat, char names[REASONS_NAMES]);

/* The same over the sources that have to do with temperature. */
double reasons_temperature_share(const struct budget *budget);

/* About what the standard deviation would fall to with endless fillings and
 * runs: what the sources that these do not average out cause alone. */
double reasons_floor_sd(const struct budget *budget);

/* The same as a sentence. */
struct reasons_sentence {
    char text[256];
};
struct reasons_sentence reasons_endless(const struct budget *budget);

/* Add the sentences of a budget (at most six) and of the margins (at most
 * four). A budget that was not played adds none. */
void reasons_budget(struct reasons *to, const struct budget *budget);
void reasons_margins(struct reasons *to, const struct margins *margins, const char *currency);

/* "0.08 K". */
struct say reasons_value(double value, const char *unit);

#endif
