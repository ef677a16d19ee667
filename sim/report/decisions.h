/* The decisions that the choices of a plan belong to. */
#ifndef VICINAL_REPORT_DECISIONS_H
#define VICINAL_REPORT_DECISIONS_H

enum decisions { DECISIONS_GLASS, DECISIONS_REPLICATES, DECISIONS_TEMPERATURE, DECISIONS_REDUCING, DECISIONS };

/* "Grade and glass to buy", ... */
const char *decisions_name(enum decisions decision);

/* The one that a key of `plan:` belongs to. */
enum decisions decisions_of(const char *key);

/* The key in words, before its option: "bath", "top relative viscosity". */
const char *decisions_words(const char *key);

#endif
