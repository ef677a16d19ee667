/* Dilute polymer solutions: specific viscosity of a coil volume y = [eta] c. */
#ifndef VICINAL_MODELS_SOLUTION_H
#define VICINAL_MODELS_SOLUTION_H

#include <math.h>

enum solution_law { SOLUTION_MARTIN, SOLUTION_HUGGINS };

/* Specific viscosity eta_sp = eta/eta_solvent - 1 at y = [eta] c (both
 * without unit): y exp(k y) (Martin 1942) or y + k y^2 (Huggins, J. Am. Chem.
 * Soc. 64 (1942) 2716), k the interaction constant. */
static inline double solution_specific(enum solution_law law, double interaction, double y)
{
    return law == SOLUTION_MARTIN ? y * exp(interaction * y) : y + interaction * y * y;
}

/* The coil volume y >= 0 at which eta_sp [> 0] is reached: Newton to
 * rounding; k >= 0. */
double solution_coil_volume(enum solution_law law, double interaction, double specific);

#endif
