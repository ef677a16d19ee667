/* The rows of `solutions` and `bench`; each table ends with a row whose
 * key is NULL. */
#ifndef VICINAL_SCENARIO_KEYS_BENCH_H
#define VICINAL_SCENARIO_KEYS_BENCH_H

#include "sim/scenario/keys.h"

extern const struct keys_row keys_bench_solutions[];
extern const struct keys_row keys_bench_like[]; /* of `bench` */
extern const struct keys_row keys_bench_rows[];

#endif
