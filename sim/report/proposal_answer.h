/* Part of the report for a proposal: the question, the answer, the plan. */
#ifndef VICINAL_REPORT_PROPOSAL_ANSWER_H
#define VICINAL_REPORT_PROPOSAL_ANSWER_H

#include "sim/report/proposal.h"

void proposal_answer_question(const struct proposal *p);
void proposal_answer_answer(const struct proposal *p);
void proposal_answer_plan(const struct proposal *p);

/* "power of 95.33 % (Monte Carlo error 0.20; asked: 90 %)", and the share within when that is asked. */
void proposal_answer_reached(const struct proposal *p, char *text, size_t size);

#endif
