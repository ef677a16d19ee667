#include "models/water.h"

#include <math.h>

double water_viscosity(double T_K)
{
    const double x = T_K / 300.0;
    return 1e-6 * (280.68 * pow(x, -1.9) + 511.45 * pow(x, -7.7) + 61.131 * pow(x, -19.6) + 0.45903 * pow(x, -40.0));
}

/* Chebyshev series at the WATER_TERMS nodes, then turned into powers by the
 * recurrence T_(n+1) = 2 u T_n - T_(n-1). */
struct water_fit water_fit_make(void)
{
    enum { N = WATER_TERMS };
    const double pi = 3.14159265358979323846;
    struct water_fit fit = {{0}};
    double series[N], before[N] = {1.0}, now[N] = {0.0, 1.0};
    for (int j = 0; j < N; j++) {
        double sum = 0.0;
        for (int k = 0; k < N; k++)
            sum += water_viscosity(294.15 + 26.0 * cos(pi * (k + 0.5) / N)) * cos(pi * j * (k + 0.5) / N);
        series[j] = sum * (j == 0 ? 1.0 : 2.0) / N;
    }
    fit.term[0] = series[0];
    for (int n = 1; n < N; n++) {
        double next[N];
        for (int i = 0; i < N; i++) {
            fit.term[i] += series[n] * now[i];
            next[i] = (i > 0 ? 2.0 * now[i - 1] : 0.0) - before[i];
        }
        for (int i = 0; i < N; i++) {
            before[i] = now[i];
            now[i] = next[i];
        }
    }
    return fit;
}
