#include "sim/reduce/reduction.h"

#include <math.h>
#include <string.h>

size_t reduction_size(const struct notebook_layout *layout)
{
    return (layout->fillings + 2 * layout->days) * sizeof(double[LANES]);
}

struct reduction_times reduction_place(const struct notebook_layout *layout, void *memory)
{
    double(*const rows)[LANES] = memory;
    return (struct reduction_times){rows, rows + layout->fillings, rows + layout->fillings + layout->days};
}

/* One more value into a running mean of `count` so far. */
static void average(double mean[LANES], const double value[LANES], double count)
{
    FOR_LANES(l) mean[l] += (value[l] - mean[l]) / (count + 1.0);
}

/* Days without one of their own take the first that was measured. */
static void share(double (*mean)[LANES], size_t days)
{
    size_t first = 0;
    while (first < days && mean[first][0] == 0.0) first++;
    for (size_t d = 0; d < days && first < days; d++)
        if (mean[d][0] == 0.0) memcpy(mean[d], mean[first], sizeof mean[d]);
}

void reduction_combine(const struct assumed *a, const struct notebook *book, struct reduction_times *times)
{
    const struct notebook_layout *const layout = book->layout;
    memset(times->water_s, 0, layout->days * sizeof *times->water_s);
    memset(times->blank_s, 0, layout->days * sizeof *times->blank_s);
    for (size_t f = 0; f < layout->fillings; f++) {
        const struct notebook_filling *const filling = &layout->filling[f];
        notebook_filling_time(a, book, f, times->filling_s[f]);
        if (filling->water) average(times->water_s[filling->day], times->filling_s[f], (double)filling->number);
        if (filling->blank) average(times->blank_s[filling->day], times->filling_s[f], (double)filling->number);
    }
    share(times->water_s, layout->days);
    share(times->blank_s, layout->days);
}

LANES_WIDE void reduction_relative(const struct assumed *a, const struct analysis *how, const struct notebook *book, const struct reduction_times *times,
                        struct reduction_levels *out)
{
    const double kinetic = how->kinetic_corrected ? a->kinetic : 0.0;
    double count[SERIES][ASSUMED_MAX_LEVELS] = {{0}};
    memset(out, 0, sizeof *out);
    for (size_t f = 0; f < book->layout->fillings; f++) {
        const struct notebook_filling *const filling = &book->layout->filling[f];
        if (filling->water || filling->blank) continue;
        const double density = how->density_corrected ? a->density_ratio[filling->series][filling->level] : 1.0;
        const bool blank = a->blank_reference && filling->series == CLEAVED;
        const double *const t = times->filling_s[f], *const t0 = times->water_s[filling->day];
        double *const sum = out->relative[filling->series][filling->level];
        double reference[LANES], constant[LANES];
        count[filling->series][filling->level] += 1.0;
        FOR_LANES(l)
        {
            /* C t0 - k(t0) is nu_w itself */
            constant[l] = (a->water_m2_s + tube_kinetic(a->ends, kinetic, t0[l])) / t0[l];
            reference[l] = a->water_m2_s;
        }
        if (blank) FOR_LANES(l) reference[l] = tube_viscosity(constant[l], a->ends, kinetic, times->blank_s[filling->day][l]);
        FOR_LANES(l) sum[l] += tube_viscosity(constant[l], a->ends, kinetic, t[l]) * density / reference[l];
    }
    for (size_t s = 0; s < SERIES; s++)
        for (size_t j = 0; j < a->levels[s]; j++) FOR_LANES(l) out->relative[s][j][l] /= count[s][j];
}

static double single_point(size_t n, const double *conc, const double *relative)
{
    double sum = 0.0;
    for (size_t i = 0; i < n; i++) sum += sqrt(2.0 * (relative[i] - 1.0 - log(relative[i]))) / conc[i];
    return sum / (double)n;
}

double reduction_extrapolate(const struct analysis *how, size_t n, const double *conc, const double *relative, struct line lines[2])
{
    double weight[ASSUMED_MAX_LEVELS], y[2][ASSUMED_MAX_LEVELS];
    if (how->extrapolation == SINGLE_POINT) return single_point(n, conc, relative);
    const bool both = how->extrapolation == COMMON_INTERCEPT;
    for (size_t i = 0; i < n; i++) {
        const double reduced = (relative[i] - 1.0) / conc[i];
        weight[i] = how->weighting == WEIGHT_C_SQUARED ? conc[i] * conc[i] : 1.0;
        if (how->extrapolation == HUGGINS || both) y[0][i] = reduced;
        if (how->extrapolation == KRAEMER || both) y[both][i] = log(relative[i]) / conc[i];
        if (how->extrapolation == MARTIN) y[0][i] = log(reduced);
    }
    struct line fit[2];
    if (both)
        line_fit_common(n, conc, (const double *const[2]){y[0], y[1]}, weight, fit);
    else
        fit[0] = line_fit(n, conc, y[0], weight);
    if (lines) memcpy(lines, fit, (both ? 2 : 1) * sizeof *lines);
    return how->extrapolation == MARTIN ? exp(fit[0].intercept) : fit[0].intercept;
}

double reduction_fraction(const struct assumed *a, enum chain_statistics statistics, const double Mv_kg_mol[SERIES])
{
    if (statistics == CHAIN_CONTINUOUS)
        return a->unit_kg_mol * a->r * (1.0 / Mv_kg_mol[CLEAVED] - 1.0 / Mv_kg_mol[INTACT]) / a->head_to_head_chance;
    return scission_fraction(a->neighbours, a->head_to_head_chance, a->sums, Mv_kg_mol[INTACT] / a->unit_kg_mol, Mv_kg_mol[CLEAVED] / a->unit_kg_mol);
}

void reduction_run(const struct assumed *a, const struct analysis *how, const struct notebook *book, const struct reduction_times *times,
                   struct reduction_result *out)
{
    struct reduction_levels levels;
    reduction_relative(a, how, book, times, &levels);
    FOR_LANES(l)
    {
        double Mv[SERIES];
        bool answered = true;
        for (size_t s = 0; s < SERIES; s++) {
            double relative[ASSUMED_MAX_LEVELS];
            for (size_t j = 0; j < a->levels[s]; j++) relative[j] = levels.relative[s][j][l];
            const double intrinsic = reduction_extrapolate(how, a->levels[s], a->conc_kg_m3[s], relative, NULL);
            answered = answered && intrinsic > 0.0 && isfinite(intrinsic);
            Mv[s] = polymer_viscosity_average(a->K_m3_kg, a->a, intrinsic);
            out->intrinsic_m3_kg[s][l] = intrinsic;
            out->molar_mass_kg_mol[s][l] = Mv[s];
        }
        out->delta[l] = answered ? reduction_fraction(a, how->chain_statistics, Mv) : (double)NAN;
        if (!isfinite(out->delta[l])) out->delta[l] = (double)NAN;
    }
}
