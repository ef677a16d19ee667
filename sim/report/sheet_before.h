/* The part of the bench sheet before day 1: weighing, dissolving, cleaving,
 * pipetting. */
#ifndef VICINAL_REPORT_SHEET_BEFORE_H
#define VICINAL_REPORT_SHEET_BEFORE_H

#include <stdio.h>

#include "sim/report/sheet_work.h"

void sheet_before_print(FILE *to, const struct sheet_work *work);

#endif
