#include "sim/bench/cost.h"

#include <math.h>
#include <stdio.h>

struct cost cost_of(const struct design *d, const struct cost_rules *rules, double clock_s, double equipment)
{
    const double hours_s = clock_s + d->preparation_s;
    return (struct cost){hours_s, hours_s / 3600.0 * rules->hour + d->polymer_kg * d->plan->grade.price_per_kg + equipment};
}

bool cost_too_dear(const struct design *d, const struct cost_rules *rules, struct cost cost, char *why, size_t size)
{
    const double hours = cost.hours_s / 3600.0, days = (double)d->days, grams = d->polymer_kg * 1e3;
    const double most_grams = rules->at_most_polymer_kg * 1e3;
    if (days > rules->at_most_days)
        snprintf(why, size, "takes %.0f days, over the %.0f allowed", days, rules->at_most_days);
    else if (hours > rules->at_most_hours)
        snprintf(why, size, "takes %.2f h, over the %.2f h allowed", hours, rules->at_most_hours);
    else if (grams > most_grams)
        snprintf(why, size, "takes %.3f g of polymer, over the %.3f g allowed", grams, most_grams);
    else if (cost.money > rules->at_most_money)
        snprintf(why, size, "costs %.0f %s, over the %.0f allowed", cost.money, rules->currency, rules->at_most_money);
    else
        return false;
    return true;
}

double cost_rounded(const struct cost_rules *rules, struct cost cost)
{
    return rules->least == LEAST_HOURS ? rint(cost.hours_s / 360.0) * 0.1 : rint(cost.money);
}
