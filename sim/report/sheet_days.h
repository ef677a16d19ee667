/* The part of the bench sheet at the tube: its rules, and day by day the
 * timetable with room for what is read. */
#ifndef VICINAL_REPORT_SHEET_DAYS_H
#define VICINAL_REPORT_SHEET_DAYS_H

#include <stdio.h>

#include "sim/report/sheet_work.h"

void sheet_days_print(FILE *to, const struct sheet_work *work);

#endif
