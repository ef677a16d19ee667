#include "models/tube.h"

static const double pi = 3.14159265358979323846;

double tube_kinetic_flared(double bulb_m3, double length_m, double bore_m, double constant_m2_s2)
{
    const double V_mL = bulb_m3 * 1e6, L_mm = length_m * 1e3, d_mm = bore_m * 1e3, C_mm2_s2 = constant_m2_s2 * 1e6;
    return 1e-6 * 52.5 * V_mL * sqrt(V_mL) / (L_mm * sqrt(C_mm2_s2 * d_mm));
}

double tube_kinetic_square(double bulb_m3, double length_m)
{
    return 1.1 * bulb_m3 / (8.0 * pi * length_m);
}

double tube_constant_poiseuille(double bore_m, double head_m, double bulb_m3, double length_m)
{
    const double d2 = bore_m * bore_m;
    return pi * 9.80665 * d2 * d2 * head_m / (128.0 * bulb_m3 * length_m);
}
