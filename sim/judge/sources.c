#include "sim/judge/sources.h"

#include <stddef.h>
#include <string.h>

const char *sources_name(enum draws_group group)
{
    static const char *const name[DRAWS_GROUPS] = {
        [DRAWS_GROUP_PAIR] = "K and a", [DRAWS_GROUP_CALIBRATION] = "thermometer", [DRAWS_GROUP_KINETIC] = "kinetic coefficient",
        [DRAWS_GROUP_OFFSET] = "solution offset", [DRAWS_GROUP_DILUTION] = "dilution", [DRAWS_GROUP_HYDROLYSIS] = "hydrolysis",
        [DRAWS_GROUP_INTERACTION] = "interaction", [DRAWS_GROUP_DRY_CONTENT] = "dry content", [DRAWS_GROUP_CONVERSION] = "conversion",
        [DRAWS_GROUP_WEIGHING] = "weighing", [DRAWS_GROUP_DAYS] = "bath drift and days", [DRAWS_GROUP_FLUCTUATION] = "bath fluctuation",
        [DRAWS_GROUP_TILT] = "tilt", [DRAWS_GROUP_CHARGE] = "charge", [DRAWS_GROUP_FILLING] = "filling scatter",
        [DRAWS_GROUP_GRADIENT] = "gradient", [DRAWS_GROUP_READING] = "thermometer reading", [DRAWS_GROUP_HAND] = "hand timing",
        [DRAWS_GROUP_MARKS] = "reading the marks", [DRAWS_GROUP_BUBBLES] = "bubbles"};
    return name[group];
}

/* Where a plan keeps the spreads of each group; resolutions belong to none. */
static const struct {
    enum draws_group group;
    size_t offset;
} spreads[] = {
    {DRAWS_GROUP_PAIR, offsetof(struct plan, material.eta_u)},
    {DRAWS_GROUP_PAIR, offsetof(struct plan, material.a_u)},
    {DRAWS_GROUP_CALIBRATION, offsetof(struct plan, thermometer.calibration_u_K)},
    {DRAWS_GROUP_KINETIC, offsetof(struct plan, habits.kinetic_u)},
    {DRAWS_GROUP_OFFSET, offsetof(struct plan, tube.solution_offset_u)},
    {DRAWS_GROUP_DILUTION, offsetof(struct plan, solutions.delivery_tolerance_m3)},
    {DRAWS_GROUP_DILUTION, offsetof(struct plan, solutions.delivery_u_m3)},
    {DRAWS_GROUP_DILUTION, offsetof(struct plan, solutions.level_tolerance_m3)},
    {DRAWS_GROUP_HYDROLYSIS, offsetof(struct plan, material.hydrolysis_u)},
    {DRAWS_GROUP_INTERACTION, offsetof(struct plan, material.interaction_u)},
    {DRAWS_GROUP_DRY_CONTENT, offsetof(struct plan, solutions.dry_content_u)},
    {DRAWS_GROUP_CONVERSION, offsetof(struct plan, cleavage.conversion_u)},
    {DRAWS_GROUP_WEIGHING, offsetof(struct plan, solutions.balance_u_kg)},
    {DRAWS_GROUP_WEIGHING, offsetof(struct plan, solutions.stock_tolerance_m3)},
    {DRAWS_GROUP_DAYS, offsetof(struct plan, bath.drift_u_K_s)},
    {DRAWS_GROUP_DAYS, offsetof(struct plan, bath.day_u_K)},
    {DRAWS_GROUP_FLUCTUATION, offsetof(struct plan, bath.fluctuation_K)},
    {DRAWS_GROUP_TILT, offsetof(struct plan, habits.tilt_u_rad)},
    {DRAWS_GROUP_CHARGE, offsetof(struct plan, habits.charge_u_m3)},
    {DRAWS_GROUP_FILLING, offsetof(struct plan, habits.filling_u)},
    {DRAWS_GROUP_GRADIENT, offsetof(struct plan, bath.gradient_u_K)},
    {DRAWS_GROUP_READING, offsetof(struct plan, thermometer.reading_u_K)},
    {DRAWS_GROUP_HAND, offsetof(struct plan, timer.hand_u_s)},
    {DRAWS_GROUP_MARKS, offsetof(struct plan, timer.meniscus_u_m)},
    {DRAWS_GROUP_BUBBLES, offsetof(struct plan, habits.bubble_chance)},
    {DRAWS_GROUPS, offsetof(struct plan, thermometer.resolution_K)},
    {DRAWS_GROUPS, offsetof(struct plan, timer.resolution_s)},
};

struct plan sources_alone(const struct plan *plan, enum draws_group group)
{
    struct plan out = *plan;
    const double none = 0.0;
    for (size_t i = 0; i < sizeof spreads / sizeof *spreads; i++)
        if (spreads[i].group != group || group == DRAWS_GROUPS) memcpy((unsigned char *)&out + spreads[i].offset, &none, sizeof none);
    return out;
}
