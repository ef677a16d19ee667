#include "sim/scenario/keys_kit.h"

#include "sim/scenario/plan.h"

static const struct keys_word averages[] = {
    {"viscosity", AVERAGE_VISCOSITY, false}, {"weight", AVERAGE_WEIGHT, false}, {"number", AVERAGE_NUMBER, false}, {0}};
static const struct keys_word distributions[] = {
    {"most-probable", CHAINS_MOST_PROBABLE, false}, {"schulz-zimm", CHAINS_SCHULZ_ZIMM, false},
    {"log-normal", CHAINS_LOG_NORMAL, false}, {"uniform", CHAINS_UNIFORM, false}, {0}};
static const struct keys_word types[] = {{"suspended-level", true, false}, {"constant-volume", false, false}, {0}};
static const struct keys_word ends[] = {{"flared", TUBE_FLARED, false}, {"square", TUBE_SQUARE, false}, {0}};
static const struct keys_word reads[] = {
    {"mean", BATH_READS_MEAN, false}, {"middle", BATH_READS_MIDDLE, false}, {"ends", BATH_READS_ENDS, false}, {0}};

/* clang-format off */
#define PRICE(type) \
    {.key = "price", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 0, .max = 1e9, .fallback = "0", \
     .help = "in cost.currency; counted once unless owned", .source = "yours", KEYS_INTO(type, price)}

const struct keys_row keys_kit_entry[] = {
    {.key = "name", .kind = KEYS_NEW_NAME, .unit = "", .none = "must be given",
     .help = "letters, digits, - and _; of an entry that is there already: changes what is given here",
     .source = "yours"},
    {.key = "like", .kind = KEYS_ENTRY, .unit = "", .flags = KEYS_SILENT,
     .none = "the entry of the same name, if there is one",
     .help = "the entry that gives what is left out here", .source = "yours"},
    {0},
};

const struct keys_row keys_kit_grades[] = {
    {.key = "molar_mass", .kind = KEYS_QUANTITY, .dimension = UNITS_MOLAR_MASS, .unit = "kg/mol", .min = 1,
     .max = 5000, .fallback = "85 kg/mol",
     .help = "before cutting", .source = KEYS_PRACTICE, KEYS_INTO(struct grade, molar_mass_kg_mol)},
    {.key = "average", .kind = KEYS_CHOICE, .unit = "", .words = averages, .fallback = "viscosity",
     .help = "which average that is", .source = KEYS_PRACTICE, KEYS_INTO(struct grade, average)},
    {.key = "distribution", .kind = KEYS_CHOICE, .unit = "", .words = distributions, .fallback = "most-probable",
     .help = "of the chain lengths, by number", .source = "free-radical polymerisation",
     KEYS_INTO(struct grade, distribution)},
    {.key = "dispersity", .kind = KEYS_QUANTITY, .dimension = UNITS_PLAIN, .unit = "", .min = 1,
     .max = 2.5, .none = "2 (most-probable), 1 (uniform), else none",
     .help = "weight over number average", .source = "Flory and Leutner 1948: Mv/Mn = 1.89 is 2 at a = 0.76",
     KEYS_INTO(struct grade, dispersity)},
    {.key = "hydrolysis", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 50, .max = 100,
     .none = "the material's",
     .help = "where the grade has its own; one given in `polymer` wins", .source = "yours"},
    {.key = "hydrolysis_u", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 0, .max = 10,
     .flags = KEYS_SPREAD, .none = "the material's",
     .help = "its standard uncertainty, in points", .source = "yours"},
    {.key = "price_per_gram", .kind = KEYS_QUANTITY, .dimension = UNITS_PRICE_PER_GRAM, .unit = "", .min = 0,
     .max = 1e6, .fallback = "0",
     .help = "in cost.currency", .source = "yours", KEYS_INTO(struct grade, price_per_kg)},
    {0},
};

const struct keys_row keys_kit_tubes[] = {
    {.key = "type", .kind = KEYS_CHOICE, .unit = "", .words = types, .fallback = "suspended-level",
     .help = "a suspended level does not mind the charge", .source = "ISO 3105",
     KEYS_INTO(struct tube, suspended_level)},
    {.key = "constant", .kind = KEYS_QUANTITY, .dimension = UNITS_TUBE_CONSTANT, .unit = "mm2/s2", .min = 1e-5,
     .max = 100, .fallback = "0.003 mm2/s2",
     .help = "nominal tube constant", .source = "ISO 3105 size 0c (seen)", KEYS_INTO(struct tube, constant_m2_s2)},
    {.key = "ends", .kind = KEYS_CHOICE, .unit = "", .words = ends, .fallback = "flared",
     .help = "of the capillary: kinetic energy takes E/t^2 (flared) or B/t (square)", .source = "ISO 3105",
     KEYS_INTO(struct tube, ends)},
    {.key = "bulb_volume", .kind = KEYS_QUANTITY, .dimension = UNITS_VOLUME, .unit = "mL", .min = 0.1, .max = 100,
     .fallback = "5.6 mL",
     .help = "between the marks", .source = "ISO 3105 (memory)", KEYS_INTO(struct tube, bulb_volume_m3)},
    {.key = "bore", .kind = KEYS_QUANTITY, .dimension = UNITS_LENGTH, .unit = "mm", .min = 0.05, .max = 10,
     .fallback = "0.47 mm",
     .help = "inner diameter of the capillary", .source = "ISO 3105 size 0c (memory; 0.46 seen in one edition)",
     KEYS_INTO(struct tube, bore_m)},
    {.key = "length", .kind = KEYS_QUANTITY, .dimension = UNITS_LENGTH, .unit = "mm", .min = 10, .max = 1000,
     .fallback = "90 mm",
     .help = "of the capillary", .source = "ISO 3105 (memory)", KEYS_INTO(struct tube, length_m)},
    {.key = "neck_bore", .kind = KEYS_QUANTITY, .dimension = UNITS_LENGTH, .unit = "mm", .min = 0.1, .max = 20,
     .fallback = "3 mm",
     .help = "inner diameter at the marks", .source = KEYS_PRACTICE, KEYS_INTO(struct tube, neck_bore_m)},
    {.key = "reservoir_bore", .kind = KEYS_QUANTITY, .dimension = UNITS_LENGTH, .unit = "mm", .min = 1, .max = 200,
     .fallback = "25 mm",
     .help = "inner diameter of the lower reservoir", .source = "bulb radius 12.5 mm (memory)",
     KEYS_INTO(struct tube, reservoir_bore_m)},
    {.key = "head", .kind = KEYS_QUANTITY, .dimension = UNITS_LENGTH, .unit = "mm", .min = 10, .max = 1000,
     .fallback = "130 mm",
     .help = "mean height of the liquid that drives the flow", .source = "ISO 3105 (memory)",
     KEYS_INTO(struct tube, head_m)},
    {.key = "offset", .kind = KEYS_QUANTITY, .dimension = UNITS_LENGTH, .unit = "mm", .min = 0, .max = 200,
     .fallback = "0 mm",
     .help = "horizontal distance of the upper and lower bulbs", .source = "bulbs in line",
     KEYS_INTO(struct tube, offset_m)},
    {.key = "charge", .kind = KEYS_QUANTITY, .dimension = UNITS_VOLUME, .unit = "mL", .min = 0.5, .max = 200,
     .fallback = "15 mL",
     .help = "of one filling", .source = KEYS_PRACTICE, KEYS_INTO(struct tube, charge_m3)},
    {.key = "capacity", .kind = KEYS_QUANTITY, .dimension = UNITS_VOLUME, .unit = "mL", .min = 0.5, .max = 1000,
     .fallback = "60 mL",
     .help = "what the reservoir can hold", .source = KEYS_PRACTICE, KEYS_INTO(struct tube, capacity_m3)},
    {.key = "E", .kind = KEYS_QUANTITY, .dimension = UNITS_FLARED, .unit = "mm2 s", .min = 0, .max = 1e5,
     .none = "52.5 V^(3/2)/(L (C d)^(1/2))",
     .help = "kinetic-energy coefficient of flared ends, instead of the formula",
     .source = "ISO 3105; coefficient after Cannon, Manning and Bell 1960 (memory)"},
    {.key = "B", .kind = KEYS_QUANTITY, .dimension = UNITS_SQUARE, .unit = "mm2", .min = 0, .max = 1000,
     .none = "1.1 V/(8 pi L)",
     .help = "kinetic-energy coefficient of square ends, instead of the formula", .source = "ISO 3105 (memory)"},
    {.key = "solution_offset", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = -5, .max = 5,
     .fallback = "0 %",
     .help = "relative: shift of every polymer solution's time against water (surface tension, adsorbed layer)",
     .source = "hardly any in suspended-level tubes, " KEYS_PRACTICE, KEYS_INTO(struct tube, solution_offset)},
    {.key = "solution_offset_u", .kind = KEYS_QUANTITY, .dimension = UNITS_FRACTION, .unit = "%", .min = 0, .max = 5,
     .flags = KEYS_SPREAD, .fallback = "0.02 %",
     .help = "relative: its standard uncertainty", .source = KEYS_PRACTICE,
     KEYS_INTO(struct tube, solution_offset_u)},
    PRICE(struct tube),
    {0},
};

const struct keys_row keys_kit_baths[] = {
    {.key = "fluctuation", .kind = KEYS_QUANTITY, .dimension = UNITS_SPREAD, .unit = "K", .min = 0, .max = 2,
     .flags = KEYS_SPREAD, .fallback = "0.02 K",
     .help = "standard deviation of its wandering", .source = KEYS_PRACTICE, KEYS_INTO(struct bath, fluctuation_K)},
    {.key = "correlation_time", .kind = KEYS_QUANTITY, .dimension = UNITS_TIME, .unit = "s", .min = 1, .max = 36000,
     .fallback = "5 min",
     .help = "how long a wandering lasts", .source = KEYS_PRACTICE, KEYS_INTO(struct bath, correlation_time_s)},
    {.key = "drift_u", .kind = KEYS_QUANTITY, .dimension = UNITS_DRIFT, .unit = "K/h", .min = 0, .max = 5,
     .flags = KEYS_SPREAD, .fallback = "0.01 K/h",
     .help = "of each day", .source = KEYS_PRACTICE, KEYS_INTO(struct bath, drift_u_K_s)},
    {.key = "day_u", .kind = KEYS_QUANTITY, .dimension = UNITS_SPREAD, .unit = "K", .min = 0, .max = 2,
     .flags = KEYS_SPREAD, .fallback = "0.01 K",
     .help = "from day to day", .source = KEYS_PRACTICE, KEYS_INTO(struct bath, day_u_K)},
    {.key = "gradient_u", .kind = KEYS_QUANTITY, .dimension = UNITS_SPREAD, .unit = "K", .min = 0, .max = 2,
     .flags = KEYS_SPREAD, .fallback = "0.01 K",
     .help = "between thermometer and tube, from filling to filling", .source = KEYS_PRACTICE,
     KEYS_INTO(struct bath, gradient_u_K)},
    PRICE(struct bath),
    {0},
};

const struct keys_row keys_kit_thermometers[] = {
    {.key = "calibration_u", .kind = KEYS_QUANTITY, .dimension = UNITS_SPREAD, .unit = "K", .min = 0, .max = 2,
     .flags = KEYS_SPREAD, .fallback = "0.05 K",
     .help = "half of a certificate's k = 2 value", .source = KEYS_PRACTICE,
     KEYS_INTO(struct thermometer, calibration_u_K)},
    {.key = "reading_u", .kind = KEYS_QUANTITY, .dimension = UNITS_SPREAD, .unit = "K", .min = 0, .max = 2,
     .flags = KEYS_SPREAD, .fallback = "0.01 K",
     .help = "of each reading", .source = KEYS_PRACTICE, KEYS_INTO(struct thermometer, reading_u_K)},
    {.key = "resolution", .kind = KEYS_QUANTITY, .dimension = UNITS_SPREAD, .unit = "K", .min = 0, .max = 2,
     .fallback = "0.01 K",
     .help = "readings are rounded to it", .source = KEYS_PRACTICE, KEYS_INTO(struct thermometer, resolution_K)},
    {.key = "reads", .kind = KEYS_CHOICE, .unit = "", .words = reads, .fallback = "middle",
     .help = "the bath's mean over a run, its middle, or the mean of both ends", .source = KEYS_PRACTICE,
     KEYS_INTO(struct thermometer, reads)},
    PRICE(struct thermometer),
    {0},
};

const struct keys_row keys_kit_timers[] = {
    {.key = "hand_u", .kind = KEYS_QUANTITY, .dimension = UNITS_TIME, .unit = "s", .min = 0, .max = 5,
     .flags = KEYS_SPREAD, .fallback = "0.07 s",
     .help = "scatter of one press, start or stop", .source = "Am. J. Phys. 87 (2019) 110 (abstract seen)",
     KEYS_INTO(struct timer, hand_u_s)},
    {.key = "resolution", .kind = KEYS_QUANTITY, .dimension = UNITS_TIME, .unit = "s", .min = 0, .max = 10,
     .fallback = "0.01 s",
     .help = "times are rounded to it", .source = KEYS_PRACTICE, KEYS_INTO(struct timer, resolution_s)},
    {.key = "meniscus_u", .kind = KEYS_QUANTITY, .dimension = UNITS_LENGTH, .unit = "mm", .min = 0, .max = 5,
     .flags = KEYS_SPREAD, .fallback = "0.1 mm",
     .help = "how well the meniscus is found at a mark", .source = KEYS_PRACTICE,
     KEYS_INTO(struct timer, meniscus_u_m)},
    PRICE(struct timer),
    {0},
};
