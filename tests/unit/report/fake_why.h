/* A made-up budget and made-up margins. */
#ifndef VICINAL_TESTS_UNIT_REPORT_FAKE_WHY_H
#define VICINAL_TESTS_UNIT_REPORT_FAKE_WHY_H

#include "sim/judge/budget.h"
#include "sim/judge/margin.h"
#include "tests/unit/report/fake.h"

__attribute__((unused)) static struct budget fake_budget(void)
{
    struct budget b = {
        .outcome = fake_outcome(), .studies = 20000, .left_out = 0.0004, .coverage = 0.871, .coverage_se = 0.0024};
    static const struct {
        enum draws_group group;
        double share;
    } shares[] = {{DRAWS_GROUP_FILLING, 0.40},  {DRAWS_GROUP_HYDROLYSIS, 0.25},  {DRAWS_GROUP_HAND, 0.20},
                  {DRAWS_GROUP_WEIGHING, 0.08}, {DRAWS_GROUP_FLUCTUATION, 0.05}, {DRAWS_GROUP_TILT, 0.0004}};
    for (size_t i = 0; i < sizeof shares / sizeof *shares; i++)
        b.group[shares[i].group] = (struct budget_group){.first = 0.9 * shares[i].share,
                                                         .first_se = 0.006,
                                                         .total = shares[i].share,
                                                         .total_se = 0.004,
                                                         .alone_sd = b.outcome.at.sd * sqrt(shares[i].share),
                                                         .alone_sd_se = 1e-6};
    b.bias[BUDGET_DENSITY] = (struct budget_shift){3.1e-4, 2e-6};
    b.bias[BUDGET_KINETIC_ENERGY] = (struct budget_shift){-4e-4, 2e-6};
    return b;
}

__attribute__((unused)) static struct margins fake_margins(void)
{
    struct margins m = {.outcome = fake_outcome(), .count = 4, .has_exchange = true};
    m.margin[0] = (struct margin){.key = "bench.tilt_u",
                                  .name = "tilt",
                                  .unit = "degree",
                                  .up = true,
                                  .nominal = 0.5,
                                  .worst = 90,
                                  .verdict = MARGIN_WHOLE_RANGE};
    m.margin[1] = (struct margin){.key = "kit.baths.circulator.fluctuation",
                                  .name = "bath fluctuation",
                                  .unit = "K",
                                  .up = true,
                                  .nominal = 0.02,
                                  .worst = 0.05,
                                  .se = 0.001,
                                  .verdict = MARGIN_FOUND,
                                  .points = 3,
                                  .at = {0.02, 0.08, 0.05},
                                  .figure = {0.93, 0.7, 0.9}};
    m.margin[2] = (struct margin){.key = "plan.top_cleaved",
                                  .name = "top relative viscosity, cleaved",
                                  .unit = "",
                                  .up = false,
                                  .nominal = 1.4,
                                  .worst = 1.3,
                                  .se = 0.01,
                                  .verdict = MARGIN_FOUND,
                                  .points = 2,
                                  .at = {1.4, 1.2},
                                  .figure = {0.93, 0.6}};
    m.margin[3] = (struct margin){.key = "plan.top_cleaved",
                                  .name = "top relative viscosity, cleaved",
                                  .unit = "",
                                  .up = true,
                                  .nominal = 1.4,
                                  .worst = 1.9,
                                  .se = 0.02,
                                  .verdict = MARGIN_FOUND,
                                  .points = 2,
                                  .at = {1.4, 2.2},
                                  .figure = {0.93, 0.5}};
    m.exchange = (struct margin_exchange){
        .replicates = "fillings 4, runs 3", .hours_s = 5.9 * 3600, .money = 275, .studies_to_pay = 6.2};
    return m;
}

#endif
