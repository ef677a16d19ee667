/* How one plan fares as one or two of its conditions change: what the figures
 * draw. Fewer studies than the cap are played for each point. */
#ifndef VICINAL_JUDGE_SURVEY_H
#define VICINAL_JUDGE_SURVEY_H

#include "sim/judge/outcome.h"

enum { SURVEY_STUDIES = 2048 }; /* for each point, or the cap if that is less */

/* Power (or, when only `within` is asked, the share within) over the bath's
 * fluctuation and the fillings of each level in both series. */
enum { SURVEY_BATHS = 12, SURVEY_FILLINGS = 6 };
struct survey_map {
    double fluctuation_K[SURVEY_BATHS]; /* 0.005 to 0.5 K, logarithmic */
    double figure[SURVEY_BATHS][SURVEY_FILLINGS]; /* of 1 .. 6 fillings; NaN: impossible */
    double fluctuation_now_K;
    size_t fillings_now;
};
bool survey_map_make(const struct scenario *s, const struct plan *plan, struct survey_map *out); /* false: out of memory */

/* Share of studies that call the polymer different from `against`, over the
 * fraction that it truly holds; the plan stays that of the expected one. With
 * a second polymer alongside the first one's fraction changes. Only when
 * `against` is asked. */
enum { SURVEY_FRACTIONS = 25 };
struct survey_curve {
    double fraction[SURVEY_FRACTIONS], power[SURVEY_FRACTIONS], se[SURVEY_FRACTIONS];
};
bool survey_curve_make(const struct scenario *s, const struct plan *plan, double critical, struct survey_curve *out);

/* Standard deviation and bias of the estimate over the relative viscosity of
 * the top cleaved level, for each extrapolation; NaN where it is impossible. */
enum { SURVEY_TOPS = 9, SURVEY_EXTRAPOLATIONS = SINGLE_POINT + 1 };
struct survey_tops {
    double top[SURVEY_TOPS];
    double sd[SURVEY_TOPS][SURVEY_EXTRAPOLATIONS], bias[SURVEY_TOPS][SURVEY_EXTRAPOLATIONS];
};
bool survey_tops_make(const struct scenario *s, const struct plan *plan, struct survey_tops *out);

#endif
