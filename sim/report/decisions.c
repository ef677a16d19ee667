#include "sim/report/decisions.h"

#include <string.h>

static const struct {
    const char *key;
    enum decisions decision;
} belongs[] = {
    {"material", DECISIONS_GLASS},
    {"grade", DECISIONS_GLASS},
    {"tube", DECISIONS_GLASS},
    {"timer", DECISIONS_GLASS},
    {"bath", DECISIONS_TEMPERATURE},
    {"thermometer", DECISIONS_TEMPERATURE},
    {"temperature_record", DECISIONS_TEMPERATURE},
    {"extrapolation", DECISIONS_REDUCING},
    {"weighting", DECISIONS_REDUCING},
    {"density", DECISIONS_REDUCING},
    {"kinetic_energy", DECISIONS_REDUCING},
    {"chain_statistics", DECISIONS_REDUCING},
};

const char *decisions_name(enum decisions decision)
{
    static const char *const name[DECISIONS] = {"Grade and glass to buy", "Replicates and concentrations",
                                                "Temperature control", "How to reduce"};
    return name[decision];
}

/* Keys that stand in no other row are replicates and concentrations. */
enum decisions decisions_of(const char *key)
{
    for (size_t i = 0; i < sizeof belongs / sizeof *belongs; i++)
        if (strcmp(belongs[i].key, key) == 0)
            return belongs[i].decision;
    return DECISIONS_REPLICATES;
}

const char *decisions_words(const char *key)
{
    static const char *const words[][2] = {
        {"temperature_record", "a temperature record"},
        {"top", "a top relative viscosity of"},
        {"top_cleaved", "a top relative viscosity, cleaved, of"},
        {"lowest", "a lowest over top concentration of"},
        {"levels_cleaved", "levels of the cleaved series"},
        {"fillings_cleaved", "fillings of the cleaved series"},
        {"water_fillings", "fillings of water"},
        {"water_runs", "runs of water"},
        {"kinetic_energy", "kinetic energy"},
        {"chain_statistics", "chain statistics"},
    };
    for (size_t i = 0; i < sizeof words / sizeof *words; i++)
        if (strcmp(words[i][0], key) == 0)
            return words[i][1];
    return key;
}
