/* What a reader must know before trusting a plan, as whole sentences. */
#ifndef VICINAL_REPORT_WARNINGS_H
#define VICINAL_REPORT_WARNINGS_H

#include <stdbool.h>
#include <stddef.h>

#include "sim/judge/outcome.h"
#include "sim/judge/worse.h"
#include "sim/scenario/scenario.h"

struct warnings {
    size_t count, room;
    char **text;
};

/* All warnings in a fixed order. `plan` NULL: only what the scenario alone
 * says; `outcome` NULL or of a plan that was never played: only what is known
 * before. `within_too_narrow`: as the judge found. NULL without memory. */
struct warnings *warnings_collect(const struct scenario *scenario, const struct plan *plan,
                                  const struct outcome *outcome, bool within_too_narrow);
void warnings_free(struct warnings *warnings);

/* Add where more fillings or runs make the plan worse, and what causes it. */
void warnings_add_worse(struct warnings *warnings, const struct scenario *scenario, const struct worse *worse,
                        size_t count);

/* What the asked confidence leaves to a false alarm on the side toward
 * `expect`: half of it when both sides are tested. */
double warnings_level_left(const struct question *question);

/* Whether comparing with the stated fraction itself, and not with the
 * critical value, would raise over twice as many false alarms as asked. */
bool warnings_plain_misleads(const struct question *question, const struct outcome *outcome);

#endif
