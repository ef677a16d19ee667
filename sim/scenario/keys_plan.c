#include "sim/scenario/keys_plan.h"

#include "sim/scenario/plan.h"

static const struct keys_word records[] = {{"each-run", true, false}, {"none", false, false}, {0}};
static const struct keys_word same[] = {{"same", 0, false}, {0}};
static const struct keys_word dilutions[] = {{"flasks", DILUTION_FLASKS, false}, {"in-tube", DILUTION_IN_TUBE, false}, {0}};
static const struct keys_word orders[] = {{"sequential", ORDER_SEQUENTIAL, false},
                                          {"shuffled", ORDER_SHUFFLED, false},
                                          {"bracketed", ORDER_BRACKETED, false},
                                          {0}};
static const struct keys_word extrapolations[] = {{"huggins", HUGGINS, false},
                                                  {"kraemer", KRAEMER, false},
                                                  {"martin", MARTIN, false},
                                                  {"common-intercept", COMMON_INTERCEPT, false},
                                                  {"single-point", SINGLE_POINT, false},
                                                  {0}};
static const struct keys_word weightings[] = {
    {"equal", WEIGHT_EQUAL, false}, {"c-squared", WEIGHT_C_SQUARED, false}, {0}};
static const struct keys_word densities[] = {{"partial-volume", true, false}, {"neglected", false, false}, {0}};
static const struct keys_word kinetics[] = {{"corrected", true, false}, {"neglected", false, false}, {0}};
static const struct keys_word statistics[] = {
    {"discrete", CHAIN_DISCRETE, false}, {"continuous", CHAIN_CONTINUOUS, false}, {0}};
static const struct keys_word leasts[] = {{"hours", LEAST_HOURS, false}, {"money", LEAST_MONEY, false}, {0}};

/* clang-format off */
const struct keys_row keys_plan_rows[] = {
    {.key = "material", .kind = KEYS_ENTRY, .unit = "", .none = "polymer.material",
     .help = "of kit.materials", .source = KEYS_PRACTICE},
    {.key = "grade", .kind = KEYS_ENTRY, .unit = "", .none = "must be given",
     .help = "of kit.grades", .source = "yours"},
    {.key = "tube", .kind = KEYS_ENTRY, .unit = "", .fallback = "suspended-0c",
     .help = "of kit.tubes", .source = "water takes about 300 s (computed); ASTM D445 and D446 ask for 200 s (seen)"},
    {.key = "bath", .kind = KEYS_ENTRY, .unit = "", .fallback = "circulator",
     .help = "of kit.baths", .source = KEYS_PRACTICE},
    {.key = "thermometer", .kind = KEYS_ENTRY, .unit = "", .fallback = "probe",
     .help = "of kit.thermometers", .source = KEYS_PRACTICE},
    {.key = "temperature_record", .kind = KEYS_CHOICE, .unit = "", .words = records, .fallback = "each-run",
     .help = "is the temperature written down, and each time brought to the set one", .source = KEYS_PRACTICE,
     KEYS_INTO(struct plan, temperature_record)},
    {.key = "timer", .kind = KEYS_ENTRY, .unit = "", .fallback = "by-hand",
     .help = "of kit.timers", .source = KEYS_PRACTICE},
    {.key = "top", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 1, .max = 10,
     .flags = KEYS_ABOVE_MIN, .fallback = "1.8", .hint = "water itself has 1",
     .help = "relative viscosity of the most concentrated intact solution", .source = "ISO 1628-1 (seen: 1.2 to 2.0)",
     KEYS_INTO(struct plan, top[INTACT])},
    {.key = "top_cleaved", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 1, .max = 10,
     .flags = KEYS_ABOVE_MIN, .fallback = "1.4", .hint = "water itself has 1",
     .help = "the same for the cleaved series", .source = "ISO 1628-1 (seen: 1.2 to 2.0)",
     KEYS_INTO(struct plan, top[CLEAVED])},
    {.key = "lowest", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 0, .max = 1,
     .flags = KEYS_ABOVE_MIN, .fallback = "0.4",
     .help = "concentration of the lowest level over that of the top", .source = KEYS_PRACTICE,
     KEYS_INTO(struct plan, lowest)},
    {.key = "levels", .kind = KEYS_COUNT, .unit = "", .min = 1, .max = PLAN_MAX_LEVELS, .fallback = "4",
     .help = "concentrations of each series", .source = KEYS_PRACTICE, KEYS_INTO(struct plan, levels[INTACT])},
    {.key = "levels_cleaved", .kind = KEYS_COUNT, .unit = "", .min = 1, .max = PLAN_MAX_LEVELS, .words = same,
     .fallback = "same",
     .help = "of the cleaved series", .source = KEYS_PRACTICE, KEYS_INTO(struct plan, levels[CLEAVED])},
    {.key = "dilution", .kind = KEYS_CHOICE, .unit = "", .words = dilutions, .fallback = "flasks",
     .help = "levels in flasks, or by adding solvent to the loading of a suspended-level tube", .source = KEYS_PRACTICE,
     KEYS_INTO(struct plan, dilution)},
    {.key = "preparations", .kind = KEYS_COUNT, .unit = "", .min = 1, .max = PLAN_MAX_PREPARATIONS,
     .fallback = "1",
     .help = "how often the whole study is done, from the balance on", .source = KEYS_PRACTICE,
     KEYS_INTO(struct plan, preparations)},
    {.key = "fillings", .kind = KEYS_COUNT, .unit = "", .min = 1, .max = PLAN_MAX_FILLINGS, .fallback = "2",
     .help = "of each level", .source = KEYS_PRACTICE, KEYS_INTO(struct plan, fillings[INTACT])},
    {.key = "fillings_cleaved", .kind = KEYS_COUNT, .unit = "", .min = 1, .max = PLAN_MAX_FILLINGS, .words = same,
     .fallback = "same",
     .help = "of each level of the cleaved series", .source = KEYS_PRACTICE,
     KEYS_INTO(struct plan, fillings[CLEAVED])},
    {.key = "runs", .kind = KEYS_COUNT, .unit = "", .min = 1, .max = PLAN_MAX_RUNS, .fallback = "3",
     .help = "of each filling", .source = KEYS_PRACTICE, KEYS_INTO(struct plan, runs)},
    {.key = "water_fillings", .kind = KEYS_COUNT, .unit = "", .min = 1, .max = PLAN_MAX_FILLINGS, .fallback = "2",
     .help = "of each day that has water", .source = KEYS_PRACTICE, KEYS_INTO(struct plan, water_fillings)},
    {.key = "water_runs", .kind = KEYS_COUNT, .unit = "", .min = 1, .max = PLAN_MAX_RUNS, .fallback = "3",
     .help = "of each of them", .source = KEYS_PRACTICE, KEYS_INTO(struct plan, water_runs)},
    {.key = "order", .kind = KEYS_CHOICE, .unit = "", .words = orders, .fallback = "sequential",
     .help = "of the fillings: water, intact, cleaved, each from dilute to concentrated; dealt once; or with half of "
             "each day's water at its end",
     .source = KEYS_PRACTICE, KEYS_INTO(struct plan, order)},
    {.key = "extrapolation", .kind = KEYS_CHOICE, .unit = "", .words = extrapolations, .fallback = "martin",
     .help = "how [eta] is found from the levels", .source = KEYS_PRACTICE,
     KEYS_INTO(struct plan, analysis.extrapolation)},
    {.key = "weighting", .kind = KEYS_CHOICE, .unit = "", .words = weightings, .fallback = "equal",
     .help = "of the levels in the straight line; single-point has none", .source = KEYS_PRACTICE,
     KEYS_INTO(struct plan, analysis.weighting)},
    {.key = "density", .kind = KEYS_CHOICE, .unit = "", .words = densities, .fallback = "partial-volume",
     .help = "is the density of the solution allowed for", .source = KEYS_PRACTICE,
     KEYS_INTO(struct plan, analysis.density_corrected)},
    {.key = "kinetic_energy", .kind = KEYS_CHOICE, .unit = "", .words = kinetics, .fallback = "corrected",
     .help = "is the kinetic-energy term allowed for", .source = KEYS_PRACTICE,
     KEYS_INTO(struct plan, analysis.kinetic_corrected)},
    {.key = "chain_statistics", .kind = KEYS_CHOICE, .unit = "", .words = statistics, .fallback = "discrete",
     .help = "how the fraction follows from both molar masses: exact sums, or Flory and Leutner's formula",
     .source = "exact scission (computed); Flory and Leutner 1948",
     KEYS_INTO(struct plan, analysis.chain_statistics)},
    {0},
};

#define HANDS_ON(name, text, unit_, max_, default_, into) \
    { \
        .key = name, .kind = KEYS_QUANTITY, .dimension = UNITS_TIME, .unit = unit_, .min = 0, .max = max_, \
        .fallback = default_, .help = text, .source = KEYS_PRACTICE, KEYS_INTO(struct cost_rules, into) \
    }

const struct keys_row keys_plan_cost[] = {
    {.key = "least", .kind = KEYS_CHOICE, .unit = "", .words = leasts, .fallback = "hours",
     .help = "what the cheapest plan is least in", .source = "yours", KEYS_INTO(struct cost_rules, least)},
    {.key = "currency", .kind = KEYS_TEXT, .unit = "", .max = 12, .fallback = "EUR",
     .help = "what prices are in", .source = "yours", KEYS_INTO(struct cost_rules, currency)},
    {.key = "hour", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 0, .max = 1e6,
     .fallback = "0",
     .help = "wage; the built-in kit has no prices either, so money means something only with yours",
     .source = "yours", KEYS_INTO(struct cost_rules, hour)},
    {.key = "owned", .kind = KEYS_OWNED, .unit = "", .fallback = "[]",
     .help = "names of tubes, baths, thermometers and timers whose price is not counted", .source = "yours"},
    {.key = "at_most", .kind = KEYS_AT_MOST, .unit = "", .fallback = "{}",
     .help = "limits on a plan: any of hours, days, polymer, money", .source = "yours"},
    HANDS_ON("weigh_and_dissolve", "hands-on, for each stock", "h", 100, "1.5 h", weigh_and_dissolve_s),
    HANDS_ON("dilution", "hands-on, for each level made in a flask", "min", 600, "6 min", dilution_s),
    HANDS_ON("cleavage", "hands-on, for each preparation", "h", 100, "1 h", cleavage_s),
    HANDS_ON("dissolving_wait", "unattended: for the timetable, not paid", "h", 1000, "3 h", dissolving_wait_s),
    HANDS_ON("cleavage_wait", "unattended: for the timetable, not paid", "h", 1000, "12 h", cleavage_wait_s),
    {0},
};

const struct keys_row keys_plan_at_most[] = {
    {.key = "hours", .kind = KEYS_QUANTITY, .dimension = UNITS_HOURS, .unit = "h", .min = 0, .max = 1e5,
     .flags = KEYS_ABOVE_MIN, .none = "no limit",
     .help = "of work, preparation included", .source = "yours", KEYS_INTO(struct cost_rules, at_most_hours)},
    {.key = "days", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 1, .max = 10000,
     .none = "no limit",
     .help = "at the bench", .source = "yours", KEYS_INTO(struct cost_rules, at_most_days)},
    {.key = "polymer", .kind = KEYS_QUANTITY, .dimension = UNITS_MASS, .unit = "g", .min = 0, .max = 1e6,
     .flags = KEYS_ABOVE_MIN, .none = "no limit",
     .help = "weighed in", .source = "yours", KEYS_INTO(struct cost_rules, at_most_polymer_kg)},
    {.key = "money", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 0, .max = 1e12,
     .none = "no limit",
     .help = "in cost.currency", .source = "yours", KEYS_INTO(struct cost_rules, at_most_money)},
    {0},
};
