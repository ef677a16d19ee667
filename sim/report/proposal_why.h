/* Part of the report for a proposal: error budget and margins. */
#ifndef VICINAL_REPORT_PROPOSAL_WHY_H
#define VICINAL_REPORT_PROPOSAL_WHY_H

#include "sim/report/proposal.h"

/* Nothing when there is none. */
void proposal_why_budget(const struct proposal *p);
void proposal_why_margins(const struct proposal *p);

/* The figure of the margins, which stands under the temperature control. */
void proposal_why_figure(const struct proposal *p);

#endif
