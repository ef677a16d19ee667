/* A scenario that has been read and found right: the question, the rules of
 * cost, and every candidate plan, compiled on demand. */
#ifndef VICINAL_SCENARIO_SCENARIO_H
#define VICINAL_SCENARIO_SCENARIO_H

#include <jansson.h>
#include <stdbool.h>
#include <stddef.h>
#include <stdint.h>

#include "sim/base/complain.h"
#include "sim/scenario/plan.h"

struct scenario;

/* Where a scenario comes from: the file and what the command line changes. */
struct scenario_request {
    const char *path;
    const char *const *sets; /* PATH=VALUE texts of --set, in order */
    size_t sets_count;
    const char *const *picks; /* KEY=OPTION texts of --pick, in order */
    size_t picks_count;
};

/* Read, change, check and resolve. Every mistake goes to `out`; NULL when
 * there was one (or memory ran out, which is said there too). */
struct scenario *scenario_read(const struct scenario_request *request, struct complaints *out);
void scenario_free(struct scenario *s);

/* What there is without any scenario: the built-in kit, for listing it only
 * (scenario_kit). NULL after a complaint. */
struct scenario *scenario_built_in(struct complaints *out);

/* Every entry one can choose from, see sim/scenario/parts.h. */
struct kit;
const struct kit *scenario_kit(const struct scenario *s);

const char *scenario_name(const struct scenario *s);  /* file name without folder and ending */
const char *scenario_title(const struct scenario *s); /* "" when none is given */
const struct question *scenario_question(const struct scenario *s);
const struct cost_rules *scenario_cost(const struct scenario *s);
size_t scenario_studies(const struct scenario *s); /* the cap */
uint64_t scenario_seed(const struct scenario *s);
bool scenario_owned(const struct scenario *s, const char *equipment);

/* Candidates: every combination of `plan:`, the key listed first varying
 * slowest; single-point ones counted once over `weighting`. */
size_t scenario_candidates(const struct scenario *s);
void scenario_plan(const struct scenario *s, size_t index, struct plan *out);

/* The choices: keys of `plan:` in the order of interface (grade, tube, ...),
 * and the options of each as written. */
size_t scenario_keys(const struct scenario *s);
const char *scenario_key(const struct scenario *s, size_t key);
size_t scenario_options(const struct scenario *s, size_t key);
const char *scenario_option(const struct scenario *s, size_t key, size_t option);
size_t scenario_option_of(const struct scenario *s, size_t index, size_t key); /* which one a candidate takes */

/* Keys of spreads set to exactly zero (full paths), in the order of the key
 * table; those of the kit entries as kit.baths.NAME.fluctuation. */
size_t scenario_zero_sources(const struct scenario *s);
const char *scenario_zero_source(const struct scenario *s, size_t i);

/* The resolved scenario: every default written out. `index` SIZE_MAX keeps
 * all lists of options; else they are cut to that candidate's. The YAML text
 * is for free(); the JSON for json_decref(). NULL: out of memory. */
char *scenario_resolved_yaml(const struct scenario *s, size_t index);
json_t *scenario_resolved_json(const struct scenario *s, size_t index);

/* A quantity among the keys, for what varies a plan: where its value stands in
 * the section's struct (plan.h), its unit, and its range in that unit. */
struct scenario_quantity {
    size_t offset;
    const char *unit;  /* "" for none, "%" for a share */
    double si;         /* one unit in SI */
    double min, max;
};

/* `section` as keys.h names it, such as "kit.baths" or "bench". False: no such
 * quantity. */
bool scenario_quantity(const struct scenario *s, const char *section, const char *key, struct scenario_quantity *out);

#endif
