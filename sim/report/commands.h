/* What each command does: plays what it needs and has it reported. Each returns
 * the program's exit status. */
#ifndef VICINAL_REPORT_COMMANDS_H
#define VICINAL_REPORT_COMMANDS_H

#include "sim/report/report.h"

enum { COMMANDS_DONE = 0, COMMANDS_FAILED = 1, COMMANDS_WRONG = 2, COMMANDS_NOT_RESOLVED = 3 };

struct commands_options {
    const char *path;  /* of the scenario, for messages */
    bool quiet;        /* no progress */
    const char *times; /* trial: write synthetic notebooks here; NULL: none */
    size_t notebooks;  /* how many; 0 stands for one */
};

int commands_plan(const struct report_context *context, const struct commands_options *options);

/* Of one plan: a scenario that leaves a choice open is refused. */
int commands_trial(const struct report_context *context, const struct commands_options *options);
int commands_budget(const struct report_context *context, const struct commands_options *options);
int commands_margin(const struct report_context *context, const struct commands_options *options);
int commands_sheet(const struct report_context *context, const struct commands_options *options);

int commands_check(const struct report_context *context);
int commands_kit(const struct report_context *context);

#endif
