/* What a read scenario is made of; for the files of this room, and for the
 * listing of all there is (sim/report/kit_print.c). */
#ifndef VICINAL_SCENARIO_PARTS_H
#define VICINAL_SCENARIO_PARTS_H

#include <stdint.h>

#include "sim/base/arena.h"
#include "sim/base/complain.h"
#include "sim/base/units.h"
#include "sim/scenario/document.h"
#include "sim/scenario/keys.h"
#include "sim/scenario/plan.h"

struct record;

enum value_state { VALUE_ABSENT, VALUE_GOOD, VALUE_BAD /* given, and a complaint was made */ };

/* One key's value, read. */
struct value {
    enum value_state state;
    enum document_origin origin;
    bool own; /* given right here, not taken from an entry or a default */
    struct place place;
    const char *text;                 /* as given */
    const char *source;               /* of the built-in kit, else NULL */
    double number;                    /* SI; a word's value; NaN unless good */
    const struct record *entry;       /* of KEYS_ENTRY, once found */
    const struct document_node *node; /* of KEYS_OWNED and KEYS_AT_MOST */
};

/* A section, or an entry of the kit: a value for every row. */
struct record {
    const struct keys_section *section;
    struct place place;
    const char *name; /* of an entry, else "" */
    struct value *values;
    struct record *next; /* entry of the same kind */
    struct record *base; /* the built-in entry of the same name that it changes */
    bool bad;            /* it was no map */
    bool filling, filled;
};

/* Every entry there is: the built-in ones, in place of those that the
 * scenario changes the changed ones, then the new ones. */
struct kit {
    struct record *first[KEYS_SECTIONS], *last[KEYS_SECTIONS];
};

/* The options of one key of `plan:`. */
struct choice {
    const struct keys_row *row;
    struct value *options;
    size_t count;
    struct place place;
};

/* What reading needs at every step. */
struct reading {
    struct arena *arena;
    const struct units *units;
    struct complaints *out;
    struct place whole; /* the file, for what is missing in it */
    size_t before;      /* complaints that were there already */
};

struct run_rules {
    size_t studies, seed;
};

enum { PARTS_PLAN_KEYS = 32 };

struct scenario {
    struct arena *arena;
    struct units *units;
    const char *name, *path;
    struct kit kit;
    struct record *sections[KEYS_SECTIONS]; /* NULL for the kit's kinds and plan */
    struct choice choices[PARTS_PLAN_KEYS];
    size_t keys, candidates;
    size_t radix[PARTS_PLAN_KEYS];     /* of each key as a digit, see candidates.c */
    size_t extrapolation, material, grade, tube; /* their places among the keys */
    struct chains *chains;                       /* of each grade, material by material */
    const char **zero_sources;
    size_t zero_count;
    struct question question;
    struct cost_rules cost;
    struct run_rules run;
};

#endif
