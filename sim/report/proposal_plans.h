/* Part of the report for a proposal: the table of all plans that resolve. */
#ifndef VICINAL_REPORT_PROPOSAL_PLANS_H
#define VICINAL_REPORT_PROPOSAL_PLANS_H

#include "sim/report/proposal.h"

/* At most PROPOSAL_PLANS_ROWS of them, the cheapest; when nothing resolves those
 * that come nearest. */
enum { PROPOSAL_PLANS_ROWS = 500, PROPOSAL_PLANS_NEAREST = 20 };
void proposal_plans(const struct proposal *p);

#endif
