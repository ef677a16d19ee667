/* One plan, compiled from the scenario: every value an analyst would call
 * nominal and every spread, in SI units.  Written once by candidates.c, const
 * ever after. */
#ifndef VICINAL_SCENARIO_PLAN_H
#define VICINAL_SCENARIO_PLAN_H

#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

#include "models/analysis.h"
#include "models/bath.h"
#include "models/chains.h"
#include "models/glassware.h"
#include "models/polymer.h"
#include "models/scission.h"
#include "models/solution.h"
#include "models/tube.h"

enum { PLAN_MAX_LEVELS = 12, PLAN_MAX_FILLINGS = 12, PLAN_MAX_RUNS = 12, PLAN_MAX_SPARE = 10, PLAN_MAX_PREPARATIONS = 12 };

enum sides { SIDES_ONE, SIDES_TWO };
enum against_is { AGAINST_STATED, AGAINST_SAME_CONSTANTS, AGAINST_MEASURED };
enum dilution { DILUTION_FLASKS, DILUTION_IN_TUBE };
enum order { ORDER_SEQUENTIAL, ORDER_SHUFFLED, ORDER_BRACKETED };
enum least { LEAST_HOURS, LEAST_MONEY };

/* What is asked; fractions and shares as plain numbers (0.015). */
struct question {
    double expect;
    bool has_against, has_within;
    double against, within;
    double confidence, power;
    enum sides sides;
    enum against_is against_is;
};

/* K takes M in g/mol and gives m3/kg; everything else SI. */
struct material {
    const char *name;
    double K_m3_kg, a, eta_u, a_u;
    double stated_eta_u, stated_a_u; /* as written, also where the question leaves eta_u and a_u out */
    double valid_from_kg_mol, valid_to_kg_mol, fitted_at_K;
    enum polymer_average calibrated_by;
    double repeat_unit_kg_mol, ester_unit_kg_mol;
    double hydrolysis, hydrolysis_u; /* after the order polymer, grade, material */
    double specific_volume_m3_kg, temperature_coefficient_1_K;
    enum solution_law law;
    double interaction[SERIES], interaction_u;
};

struct cleavage {
    enum scission_neighbours neighbours;
    double conversion, conversion_u, nonspecific;
    double reagent_viscosity, reagent_density;
    bool blank_diluent, blank_reference; /* else water */
    bool correct_conversion;
};

/* A volume of 0 means `fit`; a tolerance below 0 means `by-class`. */
struct solutions {
    double dry_content_u;
    bool shared_stock;
    double balance_u_kg;
    enum glass_class glass;
    double stock_volume_m3, stock_tolerance_m3;
    double level_volume_m3, level_tolerance_m3;
    double delivery_tolerance_m3, delivery_u_m3;
};

struct habits {
    double temperature_K, room_K;
    double equilibrate_s, lag_s, clean_and_fill_s, add_and_mix_s, reset_s;
    double rinse_m3, carry_over;
    double filling_u, charge_u_m3, tilt_u_rad, kinetic_u;
    double bubble_chance, bubble_delay;
    enum combine combine;
    double agreement;
    size_t spare_runs;
    bool water_every_day;
    double working_day_s;
};

struct grade {
    const char *name;
    double molar_mass_kg_mol;
    enum polymer_average average;
    enum chains_kind distribution;
    double dispersity;
    double price_per_kg;
};

struct tube {
    const char *name;
    bool suspended_level;
    enum tube_ends ends;
    double constant_m2_s2;
    double kinetic; /* E in m2 s (flared) or B in m2 (square): as given, else by the formula */
    double bulb_volume_m3, bore_m, length_m, neck_bore_m, reservoir_bore_m;
    double head_m, offset_m, charge_m3, capacity_m3;
    double solution_offset, solution_offset_u;
    double price;
};

struct bath {
    const char *name;
    double fluctuation_K, correlation_time_s, drift_u_K_s, day_u_K, gradient_u_K;
    double price;
};

struct thermometer {
    const char *name;
    double calibration_u_K, reading_u_K, resolution_K;
    enum bath_reads reads;
    double price;
};

struct timer {
    const char *name;
    double hand_u_s, resolution_s, meniscus_u_m;
    double price;
};

struct plan {
    size_t index; /* of the candidate, from 0 */
    struct material material;
    struct cleavage cleavage;
    struct solutions solutions;
    struct habits habits;
    struct grade grade;
    struct tube tube;
    struct bath bath;
    struct thermometer thermometer;
    struct timer timer;
    bool temperature_record;
    double top[SERIES]; /* relative viscosity of the top level */
    double lowest;
    size_t levels[SERIES];
    enum dilution dilution;
    size_t preparations;
    size_t fillings[SERIES]; /* in the tube: loadings */
    size_t runs, water_fillings, water_runs;
    enum order order;
    struct analysis analysis;
    const struct chains *chains; /* of the grade, for this pair; not looked at when they are most-probable */
    uint64_t seed;               /* deals a shuffled order */
};

/* What a plan may cost and how that is counted. at_most: infinity when free. */
struct cost_rules {
    enum least least;
    const char *currency;
    double hour; /* wage, per hour */
    double at_most_hours, at_most_days, at_most_polymer_kg, at_most_money;
    double weigh_and_dissolve_s, dilution_s, cleavage_s, dissolving_wait_s, cleavage_wait_s;
};

#endif
