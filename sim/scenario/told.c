#include "sim/scenario/told.h"

#include <string.h>

#include "sim/scenario/candidates.h"
#include "sim/scenario/keys.h"
#include "sim/scenario/parts.h"
#include "sim/scenario/record.h"

/* Who listens. */
struct listener {
    void (*tell)(void *context, const struct told *value);
    void *context;
};

static void tell_value(const struct listener *to, const struct keys_row *row, const struct value *v, struct told told)
{
    const bool hidden = row->kind == KEYS_NEW_NAME || row->kind == KEYS_ENTRY || (row->flags & KEYS_SILENT);
    if (hidden || v->state != VALUE_GOOD || !v->text)
        return;
    const bool given = v->origin != DOCUMENT_KIT && v->origin != DOCUMENT_DEFAULT;
    told.key = row->key;
    told.text = v->text;
    told.help = row->help;
    told.source = v->source ? v->source : given ? NULL : row->source;
    to->tell(to->context, &told);
}

static void tell_record(const struct listener *to, const struct record *record, struct told told)
{
    for (size_t i = 0; i < keys_count(record->section); i++)
        tell_value(to, keys_row(record->section, i), &record->values[i], told);
}

/* The values of `polymer`, but for those that stand with the material, when
 * several are weighed, or with the grade. */
static void tell_polymer(const struct listener *to, const struct scenario *s, const struct record *material,
                         const struct record *grade)
{
    const struct record *polymer = s->sections[KEYS_POLYMER];
    const bool several = s->choices[s->material].count > 1;
    for (size_t i = 0; i < keys_count(polymer->section); i++) {
        const struct keys_row *row = keys_row(polymer->section, i);
        const struct value *v = &polymer->values[i];
        const bool hydrolysis = strncmp(row->key, "hydrolysis", 10) == 0;
        if (several && keys_find(material->section, row->key) < keys_count(material->section))
            v = record_value(material, row->key);
        if (hydrolysis && record_is_good(grade, row->key) && !polymer->values[i].own)
            continue; /* told with the grade */
        tell_value(to, row, v, (struct told){.section = "polymer", .entry = material->name});
    }
}

void told_plan(const struct scenario *s, size_t index, void (*tell)(void *context, const struct told *value),
               void *context)
{
    static const char *const part[] = {"grade", "tube", "bath", "thermometer", "timer"};
    const struct listener to = {tell, context};
    size_t option[PARTS_PLAN_KEYS];
    candidates_options(s, index, option);
    tell_polymer(&to, s, s->choices[s->material].options[option[s->material]].entry,
                 s->choices[s->grade].options[option[s->grade]].entry);
    tell_record(&to, s->sections[KEYS_CLEAVAGE], (struct told){.section = "cleavage", .entry = ""});
    tell_record(&to, s->sections[KEYS_SOLUTIONS], (struct told){.section = "solutions", .entry = ""});
    tell_record(&to, s->sections[KEYS_BENCH], (struct told){.section = "bench", .entry = ""});
    for (size_t p = 0; p < sizeof part / sizeof *part; p++)
        for (size_t k = 0; k < s->keys; k++) {
            const struct record *entry = s->choices[k].options[option[k]].entry;
            if (entry && strcmp(s->choices[k].row->key, part[p]) == 0)
                tell_record(&to, entry, (struct told){.section = part[p], .entry = entry->name});
        }
}
