#include "sim/scenario/keys_polymer.h"

#include "sim/scenario/plan.h"

#define MEMORY "from memory, verify before use"

static const struct keys_word averages[] = {
    {"viscosity", AVERAGE_VISCOSITY, false}, {"number", AVERAGE_NUMBER, false}, {"weight", AVERAGE_WEIGHT, false}, {0}};
static const struct keys_word laws[] = {{"martin", SOLUTION_MARTIN, false}, {"huggins", SOLUTION_HUGGINS, false}, {0}};
static const struct keys_word neighbours[] = {
    {"excluded", NEIGHBOURS_EXCLUDED, false}, {"independent", NEIGHBOURS_INDEPENDENT, false}, {0}};
static const struct keys_word liquids[] = {{"water", false, false}, {"blank", true, false}, {0}};
static const struct keys_word yes_no[] = {{"yes", true, false}, {"no", false, false}, {0}};

/* clang-format off */
const struct keys_row keys_polymer_head[] = {
    {.key = "material", .kind = KEYS_ENTRY, .unit = "", .fallback = "pvoh-water-25C",
     .help = "an entry of kit.materials; any value given beside it wins over the entry's",
     .source = "the pair of Flory and Leutner 1948"},
    {0},
};

/* What an entry of kit.materials has, and `polymer` too. */
const struct keys_row keys_polymer_material[] = {
    {.key = "K", .kind = KEYS_QUANTITY, .dimension = UNITS_SPECIFIC_VOLUME, .unit = "dL/g", .min = 1e-7, .max = 0.1,
     .fallback = "2.0e-4 dL/g",
     .help = "[eta] = K M^a, M in g/mol", .source = "Flory and Leutner 1948, " MEMORY,
     KEYS_INTO(struct material, K_m3_kg)},
    {.key = "a", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 0.4, .max = 1.1,
     .fallback = "0.76",
     .help = "the exponent of the pair", .source = "Flory and Leutner 1948, " MEMORY, KEYS_INTO(struct material, a)},
    {.key = "eta_u", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 0, .max = 50,
     .flags = KEYS_SPREAD, .fallback = "5 %",
     .help = "relative: how well the pair knows [eta] in the middle of its range", .source = KEYS_PRACTICE,
     KEYS_INTO(struct material, eta_u)},
    {.key = "a_u", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 0, .max = 0.2,
     .flags = KEYS_SPREAD, .fallback = "0.02",
     .help = "standard uncertainty of a", .source = KEYS_PRACTICE, KEYS_INTO(struct material, a_u)},
    {.key = "valid_from", .kind = KEYS_QUANTITY, .dimension = UNITS_MOLAR_MASS, .unit = "kg/mol", .min = 0.1,
     .max = 10000, .fallback = "20 kg/mol",
     .help = "lower end of the range the pair was fitted over", .source = MEMORY,
     KEYS_INTO(struct material, valid_from_kg_mol)},
    {.key = "valid_to", .kind = KEYS_QUANTITY, .dimension = UNITS_MOLAR_MASS, .unit = "kg/mol", .min = 0.1,
     .max = 10000, .fallback = "200 kg/mol",
     .help = "upper end of it", .source = MEMORY, KEYS_INTO(struct material, valid_to_kg_mol)},
    {.key = "fitted_at", .kind = KEYS_QUANTITY, .dimension = UNITS_TEMPERATURE, .unit = "degC", .min = 0, .max = 100,
     .fallback = "25 degC",
     .help = "temperature at which the pair was fitted; a bath set elsewhere is warned about", .source = MEMORY,
     KEYS_INTO(struct material, fitted_at_K)},
    {.key = "calibrated_by", .kind = KEYS_CHOICE, .unit = "", .words = averages, .fallback = "viscosity",
     .help = "the average molar mass the pair was fitted with; another than viscosity is warned about",
     .source = MEMORY, KEYS_INTO(struct material, calibrated_by)},
    {.key = "repeat_unit", .kind = KEYS_QUANTITY, .dimension = UNITS_MOLAR_MASS, .unit = "g/mol", .min = 10,
     .max = 1000, .fallback = "44.05 g/mol",
     .help = "molar mass of the hydrolysed unit", .source = "vinyl alcohol, C2H4O, from atomic weights",
     KEYS_INTO(struct material, repeat_unit_kg_mol)},
    {.key = "ester_unit", .kind = KEYS_QUANTITY, .dimension = UNITS_MOLAR_MASS, .unit = "g/mol", .min = 10,
     .max = 1000, .fallback = "86.09 g/mol",
     .help = "molar mass of the unit that is still an ester", .source = "vinyl acetate, C4H6O2, from atomic weights",
     KEYS_INTO(struct material, ester_unit_kg_mol)},
    {.key = "hydrolysis", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 50, .max = 100,
     .fallback = "98.5 %",
     .help = "degree of hydrolysis; a grade's own wins over the material's, one given in `polymer` over both",
     .source = "fully hydrolysed grades, " KEYS_PRACTICE, KEYS_INTO(struct material, hydrolysis)},
    {.key = "hydrolysis_u", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 0, .max = 10,
     .flags = KEYS_SPREAD, .fallback = "0.5 %",
     .help = "its standard uncertainty, in points", .source = KEYS_PRACTICE,
     KEYS_INTO(struct material, hydrolysis_u)},
    {.key = "specific_volume", .kind = KEYS_QUANTITY, .dimension = UNITS_SPECIFIC_VOLUME, .unit = "mL/g", .min = 0,
     .max = 2, .fallback = "0.765 mL/g",
     .help = "partial specific volume of the polymer in solution", .source = "0.765 +- 0.01 mL/g, " MEMORY,
     KEYS_INTO(struct material, specific_volume_m3_kg)},
    {0},
};

const struct keys_row keys_polymer_rest[] = {
    {.key = "temperature_coefficient", .kind = KEYS_QUANTITY, .dimension = UNITS_PER_KELVIN, .unit = "1/K",
     .min = -0.1, .max = 0.1, .fallback = "0 1/K",
     .help = "relative change of [eta] per kelvin", .source = KEYS_PRACTICE,
     KEYS_INTO(struct material, temperature_coefficient_1_K)},
    {.key = "law", .kind = KEYS_CHOICE, .unit = "", .words = laws, .fallback = "martin",
     .help = "how the viscosity of the real solution rises with concentration", .source = KEYS_PRACTICE,
     KEYS_INTO(struct material, law)},
    {.key = "interaction", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 0, .max = 2,
     .fallback = "0.45",
     .help = "that law's constant k, before cutting", .source = "0.3 (short chains) to 0.8 (long) in water, " MEMORY,
     KEYS_INTO(struct material, interaction[INTACT])},
    {.key = "interaction_cleaved", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 0, .max = 2,
     .fallback = "0.45",
     .help = "k after cutting", .source = "0.3 (short chains) to 0.8 (long) in water, " MEMORY,
     KEYS_INTO(struct material, interaction[CLEAVED])},
    {.key = "interaction_u", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 0, .max = 0.5,
     .flags = KEYS_SPREAD, .fallback = "0.05",
     .help = "standard uncertainty of each of the two", .source = KEYS_PRACTICE,
     KEYS_INTO(struct material, interaction_u)},
    {0},
};

const struct keys_row keys_polymer_cleavage[] = {
    {.key = "neighbours", .kind = KEYS_CHOICE, .unit = "", .words = neighbours, .fallback = "excluded",
     .help = "may two linkages side by side both be head-to-head: excluded (no unit has two heads) or independent",
     .source = "structure of the chain", KEYS_INTO(struct cleavage, neighbours)},
    {.key = "conversion", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 0, .max = 100,
     .flags = KEYS_ABOVE_MIN, .fallback = "98 %",
     .help = "share of the 1,2-glycol links that are cut", .source = KEYS_PRACTICE,
     KEYS_INTO(struct cleavage, conversion)},
    {.key = "conversion_u", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 0, .max = 20,
     .flags = KEYS_SPREAD, .fallback = "1 %",
     .help = "its standard uncertainty, in points", .source = KEYS_PRACTICE,
     KEYS_INTO(struct cleavage, conversion_u)},
    {.key = "nonspecific", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 0, .max = 5,
     .fallback = "0.005 %",
     .help = "share of the other linkages that are cut", .source = KEYS_PRACTICE,
     KEYS_INTO(struct cleavage, nonspecific)},
    {.key = "reagent_viscosity", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = -5,
     .max = 20, .fallback = "0.25 %",
     .help = "relative excess over water of the spent reagent, at the strength of the cleaved stock; iodate +0.027 "
             "%, periodate +0.0065 % per mmol/L", .source = "ion coefficients, " MEMORY,
     KEYS_INTO(struct cleavage, reagent_viscosity)},
    {.key = "reagent_density", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = -5, .max = 20,
     .fallback = "0.20 %",
     .help = "the same for the density; iodate and periodate +0.0175 % per mmol/L",
     .source = "ion coefficients, " MEMORY, KEYS_INTO(struct cleavage, reagent_density)},
    {.key = "diluent", .kind = KEYS_CHOICE, .unit = "", .words = liquids, .fallback = "water",
     .help = "what the cleaved stock is diluted with; the blank holds the spent reagent, but no polymer",
     .source = KEYS_PRACTICE, KEYS_INTO(struct cleavage, blank_diluent)},
    {.key = "reference", .kind = KEYS_CHOICE, .unit = "", .words = liquids, .fallback = "water",
     .help = "whose time is t_0 of the cleaved series", .source = KEYS_PRACTICE,
     KEYS_INTO(struct cleavage, blank_reference)},
    {.key = "correct_conversion", .kind = KEYS_CHOICE, .unit = "", .words = yes_no, .fallback = "yes",
     .help = "the analyst allows for the nominal conversion and hydrolysis", .source = KEYS_PRACTICE,
     KEYS_INTO(struct cleavage, correct_conversion)},
    {0},
};
