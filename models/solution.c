#include "models/solution.h"

/* Both laws are convex and rise from 0 with slope 1, so that Newton from
 * y = eta_sp, which lies above the root, comes down to it. */
double solution_coil_volume(enum solution_law law, double interaction, double specific)
{
    double y = specific;
    for (int i = 0; i < 200; i++) {
        const double at = solution_specific(law, interaction, y);
        const double slope = law == SOLUTION_MARTIN ? (1.0 + interaction * y) * exp(interaction * y) : 1.0 + 2.0 * interaction * y;
        const double step = (at - specific) / slope;
        y -= step;
        if (fabs(step) <= 1e-15 * y) break;
    }
    return y;
}
