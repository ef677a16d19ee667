/* The rows of the title, `question` and `run`; each table ends with a row whose
 * key is NULL. */
#ifndef VICINAL_SCENARIO_KEYS_QUESTION_H
#define VICINAL_SCENARIO_KEYS_QUESTION_H

#include "sim/scenario/keys.h"

extern const struct keys_row keys_question_rows[];
extern const struct keys_row keys_question_top[];
extern const struct keys_row keys_question_run[];

#endif
