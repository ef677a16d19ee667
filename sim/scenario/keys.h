/* Every key of a scenario: one row each, and nothing about a key elsewhere. */
#ifndef VICINAL_SCENARIO_KEYS_H
#define VICINAL_SCENARIO_KEYS_H

#include <stdbool.h>
#include <stddef.h>

#include "sim/base/units.h"

/* What a key takes. */
enum keys_kind {
    KEYS_QUANTITY, /* a number, with a unit where its dimension has one */
    KEYS_COUNT,    /* a whole number */
    KEYS_CHOICE,   /* one of its words */
    KEYS_TEXT,     /* any one line */
    KEYS_NEW_NAME, /* the name of an entry: letters, digits, - and _ */
    KEYS_ENTRY,    /* the name of an entry of the kit */
    KEYS_OWNED,    /* a list of names of equipment */
    KEYS_AT_MOST   /* a map: the section KEYS_AT_MOST_SECTION */
};

/* A word that a key takes: as a choice, or beside numbers (`fit`). */
struct keys_word {
    const char *word; /* NULL ends a list */
    int value;        /* what it is compiled to */
    bool later;       /* known, but not in this version */
};

enum {
    KEYS_ABOVE_MIN = 1, /* the limit itself is not taken */
    KEYS_SPREAD = 2,    /* an error source: named when it is exactly zero */
    KEYS_SILENT = 4     /* no part of the resolved scenario: it only says where values come from */
};

struct keys_row {
    const char *key;
    enum keys_kind kind;
    enum units_dimension dimension;
    const char *unit; /* as people write it, "" for none */
    double min, max;  /* in `unit` */
    double later_max; /* above max up to here: not in this version */
    unsigned flags;
    const struct keys_word *words; /* NULL: none */
    const char *fallback;          /* the default as one writes it; NULL: none, and `none` says what then */
    const char *none;
    const char *hint; /* said behind the range when a value is outside it; NULL: nothing */
    const char *help, *source;
    size_t offset, size; /* of the member in the section's compiled struct; size 0: none */
};

/* For the rows: the member that a key is compiled into. */
#define KEYS_INTO(type, member) .offset = offsetof(type, member), .size = sizeof(((type *)0)->member)
#define KEYS_PRACTICE "common practice, no source"

enum keys_id {
    KEYS_TOP,
    KEYS_QUESTION,
    KEYS_POLYMER,
    KEYS_CLEAVAGE,
    KEYS_SOLUTIONS,
    KEYS_BENCH,
    KEYS_GRADES, /* the kinds of the kit's entries, in their order */
    KEYS_TUBES,
    KEYS_BATHS,
    KEYS_THERMOMETERS,
    KEYS_TIMERS,
    KEYS_MATERIALS,
    KEYS_BENCHES,
    KEYS_PLAN,
    KEYS_COST,
    KEYS_AT_MOST_SECTION,
    KEYS_RUN,
    KEYS_SECTIONS
};

/* A section: its path, and its rows, in up to three parts that other sections
 * may share (a bench of the kit has the keys of `solutions` and `bench`). */
enum { KEYS_PARTS = 3 };
struct keys_section {
    enum keys_id id;
    const char *path, *help;
    const struct keys_row *parts[KEYS_PARTS];
};

/* Is it a kind of the kit's entries? */
static inline bool keys_is_kit(enum keys_id id)
{
    return id >= KEYS_GRADES && id <= KEYS_BENCHES;
}

const struct keys_section *keys_section(enum keys_id id);
size_t keys_count(const struct keys_section *s);
const struct keys_row *keys_row(const struct keys_section *s, size_t i);

/* The place of a key in its section; keys_count() when it is none of it. */
size_t keys_find(const struct keys_section *s, const char *key);

/* The section that has a key of this name, other than `not_in`, as a path;
 * NULL when none has. */
const char *keys_home(const char *key, enum keys_id not_in);

/* The last part of a section's path: "tubes" of "kit.tubes". */
const char *keys_stem(const struct keys_section *s);

/* The kind of entry a key of KEYS_ENTRY names; KEYS_SECTIONS when it is `like`
 * in an entry, which means its own kind. */
enum keys_id keys_entry_kind(const struct keys_row *row);

/* What a quantity or count may be, such as "above 0 to 20 %". Gives back
 * `buffer`. */
enum { KEYS_RANGE = 96 };
const char *keys_range(const struct keys_row *row, char buffer[KEYS_RANGE]);

/* The words of a row that this version takes, "a, b or c". */
enum { KEYS_WORDS = 160 };
const char *keys_words(const struct keys_row *row, char buffer[KEYS_WORDS]);

#endif
