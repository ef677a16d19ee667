/* Figure: how a plan's power (or share within) falls with each condition. */
#ifndef VICINAL_REPORT_FIGURE_MARGINS_H
#define VICINAL_REPORT_FIGURE_MARGINS_H

#include "sim/judge/margin.h"
#include "sim/report/figures.h"

/* A condition's room as a factor, at least 1: how many times worse (greater or
 * smaller, whichever is its bad direction) than planned it may get; infinite
 * when it is planned to be zero, or never fails; zero when it fails already. */
double figure_margins_room(const struct margin *margin);

/* The conditions, the one with the least room first. */
void figure_margins_sorted(const struct margins *margins, size_t order[MARGIN_MOST]);

/* margins.csv has every value that was looked at; drawn are the conditions with
 * the least room, both directions of one in one panel. Nothing to draw is no
 * failure. False: a CSV could not be written. */
enum { FIGURE_MARGINS_PANELS = 12 };
bool figure_margins(struct figures_pen *pen, const struct question *question, const struct margins *margins);

#endif
