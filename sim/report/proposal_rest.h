/* Part of the report for a proposal: assumptions, what is left out, cautions, how to reproduce it. */
#ifndef VICINAL_REPORT_PROPOSAL_REST_H
#define VICINAL_REPORT_PROPOSAL_REST_H

#include "sim/report/proposal.h"

void proposal_rest_assumptions(const struct proposal *p);
void proposal_rest_left_out(const struct proposal *p);
void proposal_rest_cautions(const struct proposal *p);
void proposal_rest_reproduce(const struct proposal *p);

#endif
