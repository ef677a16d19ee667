/* The report of `plan`, fit to be attached to a proposal: report.md, and the
 * same as one page, report.html. */
#ifndef VICINAL_REPORT_PROPOSAL_H
#define VICINAL_REPORT_PROPOSAL_H

#include "sim/report/figures.h"
#include "sim/report/report.h"
#include "sim/report/warnings.h"

/* What every part of it needs. `plan` and `outcome` are those of the
 * recommended plan or, when nothing resolves, of the nearest miss; NULL when
 * nothing was possible. `pen` knows which figures were drawn. */
struct proposal {
    const struct report_context *context;
    const struct report_planned *planned;
    const struct warnings *warnings;
    const struct figures_pen *pen;
    const struct plan *plan;
    const struct outcome *outcome;
    size_t index; /* of the plan */
    bool resolves;
    FILE *to;
};

/* Write both files. False: one could not be written, and `failure` says why. */
bool proposal_write(const struct report_context *context, const struct report_planned *planned,
                    const struct warnings *warnings, const struct figures_pen *pen, struct files_failure *failure);

#endif
