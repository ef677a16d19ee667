/* Part of the report for a proposal: paragraphs to paste: why this temperature control, why so many replicates. */
#ifndef VICINAL_REPORT_PROPOSAL_JUSTIFY_H
#define VICINAL_REPORT_PROPOSAL_JUSTIFY_H

#include "sim/report/proposal.h"

/* Nothing when nothing resolves. */
void proposal_justify(const struct proposal *p);

#endif
