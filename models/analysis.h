/* The analyst's choices: how a notebook is turned into a fraction. */
#ifndef VICINAL_MODELS_ANALYSIS_H
#define VICINAL_MODELS_ANALYSIS_H

#include <stdbool.h>

enum { INTACT, CLEAVED, SERIES };

enum combine { COMBINE_MEAN, COMBINE_MEDIAN };
enum extrapolation { HUGGINS, KRAEMER, MARTIN, COMMON_INTERCEPT, SINGLE_POINT };
enum weighting { WEIGHT_EQUAL, WEIGHT_C_SQUARED };
enum chain_statistics { CHAIN_DISCRETE, CHAIN_CONTINUOUS };

/* What is done with one and the same notebook: plans that differ here only
 * share their bench work. */
struct analysis {
    enum extrapolation extrapolation;
    enum weighting weighting;
    bool density_corrected, kinetic_corrected;
    enum chain_statistics chain_statistics;
};

#endif
