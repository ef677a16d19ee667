#include "sim/scenario/keys_question.h"

#include "sim/scenario/parts.h"

static const struct keys_word sides[] = {{"one", SIDES_ONE, false}, {"two", SIDES_TWO, false}, {0}};
static const struct keys_word against_is[] = {
    {"stated", AGAINST_STATED, false}, {"same-constants", AGAINST_SAME_CONSTANTS, false}, {"measured", AGAINST_MEASURED, false}, {0}};

/* clang-format off */
const struct keys_row keys_question_top[] = {
    {.key = "title", .kind = KEYS_TEXT, .max = 200, .unit = "", .none = "none",
     .help = "text for the report", .source = "yours"},
    {0},
};

const struct keys_row keys_question_rows[] = {
    {.key = "expect", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 0, .max = 20,
     .flags = KEYS_ABOVE_MIN, .none = "must be given",
     .help = "head-to-head fraction the polymer is thought to have",
     .source = "yours (Flory and Leutner 1948: 1.23 % when polymerised at 25 degC, 1.95 % at 110 degC)",
     KEYS_INTO(struct question, expect)},
    {.key = "against", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 0, .max = 20,
     .none = "not asked (this or `within` must be)",
     .help = "tell it apart from this fraction", .source = "yours", KEYS_INTO(struct question, against)},
    {.key = "within", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 0, .max = 20,
     .flags = KEYS_ABOVE_MIN, .none = "not asked (this or `against` must be)",
     .help = "come within this of the truth, in points: 0.15 % is 1.35 to 1.65 % about 1.5 %", .source = "yours",
     KEYS_INTO(struct question, within)},
    {.key = "confidence", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 50, .max = 99.9,
     .fallback = "95 %",
     .help = "one minus the false-alarm rate of `against`; the share of studies that `within` must reach",
     .source = KEYS_PRACTICE, KEYS_INTO(struct question, confidence)},
    {.key = "power", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 50, .max = 99.9,
     .fallback = "90 %",
     .help = "chance of telling `expect` from `against` when it is true", .source = KEYS_PRACTICE,
     KEYS_INTO(struct question, power)},
    {.key = "sides", .kind = KEYS_CHOICE, .unit = "", .words = sides, .fallback = "one",
     .help = "one: only toward `expect`; two: both ways, what confidence leaves is halved", .source = KEYS_PRACTICE,
     KEYS_INTO(struct question, sides)},
    {.key = "against_is", .kind = KEYS_CHOICE, .unit = "", .words = against_is, .fallback = "stated",
     .help = "stated: found elsewhere; same-constants: found with the same K and a, whose uncertainty is then left "
             "out of everything", .source = "yours", KEYS_INTO(struct question, against_is)},
    {0},
};

const struct keys_row keys_question_run[] = {
    {.key = "studies", .kind = KEYS_COUNT, .unit = "", .min = 16, .max = 1000000, .fallback = "20000",
     .help = "at most so many simulated studies for each plan and fraction",
     .source = "standard error of a share of 95 %: 0.15 % (computed)", KEYS_INTO(struct run_rules, studies)},
    {.key = "seed", .kind = KEYS_COUNT, .unit = "", .min = 0, .max = 9007199254740992.0, .fallback = "1",
     .help = "another seed, other random numbers", .source = "any", KEYS_INTO(struct run_rules, seed)},
    {0},
};
