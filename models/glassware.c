#include "models/glassware.h"

#include <math.h>

/* ISO 1042 class A, volumes and limits in mL (from memory). */
static const struct {
    double volume_mL, tolerance_mL;
} flasks[GLASSWARE_FLASKS] = {
    {10.0, 0.025}, {25.0, 0.04}, {50.0, 0.06}, {100.0, 0.10}, {200.0, 0.15}, {250.0, 0.15}, {500.0, 0.25}, {1000.0, 0.40},
};

double glassware_flask_volume(size_t i)
{
    return flasks[i].volume_mL * 1e-6;
}

double glassware_flask_tolerance(size_t i, enum glass_class glass)
{
    return flasks[i].tolerance_mL * 1e-6 * (glass == GLASS_B ? 2.0 : 1.0);
}

bool glassware_tolerance_of(double volume_m3, enum glass_class glass, double *tolerance_m3)
{
    for (size_t i = 0; i < GLASSWARE_FLASKS; i++) {
        if (fabs(glassware_flask_volume(i) - volume_m3) > 1e-6 * volume_m3) continue;
        *tolerance_m3 = glassware_flask_tolerance(i, glass);
        return true;
    }
    return false;
}

double glassware_fit(double needed_m3)
{
    for (size_t i = 0; i < GLASSWARE_FLASKS; i++)
        if (glassware_flask_volume(i) >= needed_m3 * (1.0 - 1e-12)) return glassware_flask_volume(i);
    return 0.0;
}

double glassware_standard_uncertainty(double tolerance)
{
    return tolerance / sqrt(6.0);
}
