/* Volumetric glassware: the flasks that exist and what their limits mean. */
#ifndef VICINAL_MODELS_GLASSWARE_H
#define VICINAL_MODELS_GLASSWARE_H

#include <stdbool.h>
#include <stddef.h>

enum glass_class { GLASS_A, GLASS_B };

/* The one-mark volumetric flasks, smallest first.
 * Source: ISO 1042 (from memory); class B has twice the limits of class A. */
enum { GLASSWARE_FLASKS = 8 };

/* Volume [m3] of flask i, and the limit marked on it [m3]; i < GLASSWARE_FLASKS. */
double glassware_flask_volume(size_t i);
double glassware_flask_tolerance(size_t i, enum glass_class glass);

/* The limit [m3] of a one-mark flask of that volume [m3]; false, and nothing
 * written, when there is no such flask. */
bool glassware_tolerance_of(double volume_m3, enum glass_class glass, double *tolerance_m3);

/* Volume [m3] of the smallest flask that holds what is needed [m3]; 0 when
 * none does. */
double glassware_fit(double needed_m3);

/* Standard uncertainty of a limit: a/sqrt(6), a triangular distribution.
 * Source: EURACHEM/CITAC QUAM, appendix on distribution functions. */
double glassware_standard_uncertainty(double tolerance);

#endif
