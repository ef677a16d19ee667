/* Part of the report for a proposal: what each option of the plan costs. */
#ifndef VICINAL_REPORT_PROPOSAL_CHOICES_H
#define VICINAL_REPORT_PROPOSAL_CHOICES_H

#include "sim/report/proposal.h"
#include "sim/report/say.h"

void proposal_choices(const struct proposal *p);

/* What the cheapest plan with another option takes beyond the recommended one:
 * "+2.1 h", "+16 EUR", "no more". */
struct say proposal_choices_more(const struct proposal *p, const struct outcome *other);

#endif
