#include "sim/scenario/zero.h"

#include <stdio.h>
#include <string.h>

#include "sim/scenario/choices.h"
#include "sim/scenario/record.h"

static bool zero_any_option(const struct scenario *s, const char *key, double above)
{
    const struct choice *choice = choices_find(s, key);
    for (size_t i = 0; i < choice->count; i++)
        if (choice->options[i].number > above)
            return true;
    return false;
}

static bool zero_any_constant_volume(const struct scenario *s)
{
    const struct choice *tubes = choices_find(s, "tube");
    for (size_t i = 0; i < tubes->count; i++)
        if (record_number(tubes->options[i].entry, "type") < 0.5)
            return true;
    return false;
}

static bool zero_any_grade_without(const struct scenario *s, const char *key)
{
    const struct choice *grades = choices_find(s, "grade");
    for (size_t i = 0; i < grades->count; i++)
        if (!record_is_good(grades->options[i].entry, key))
            return true;
    return false;
}

/* Does a source play a part in any plan of the scenario? */
static bool zero_is_used(const struct scenario *s, enum keys_id section, const char *key)
{
    const bool levels = zero_any_option(s, "levels", 1.5) || zero_any_option(s, "levels_cleaved", 1.5);
    const bool own = record_value(s->sections[KEYS_POLYMER], "hydrolysis_u")->own;
    if (section == KEYS_POLYMER && (strcmp(key, "eta_u") == 0 || strcmp(key, "a_u") == 0))
        return s->question.against_is != AGAINST_SAME_CONSTANTS;
    if (section == KEYS_POLYMER && strcmp(key, "hydrolysis_u") == 0)
        return own || zero_any_grade_without(s, key);
    if (section == KEYS_GRADES && strcmp(key, "hydrolysis_u") == 0)
        return !own;
    if (section == KEYS_SOLUTIONS && strcmp(key, "level_tolerance") == 0)
        return levels;
    if (section == KEYS_SOLUTIONS && strncmp(key, "delivery_", 9) == 0)
        return levels;
    if (section == KEYS_BENCH && strcmp(key, "charge_u") == 0)
        return zero_any_constant_volume(s);
    if (section == KEYS_THERMOMETERS && strcmp(key, "reading_u") == 0)
        return zero_any_option(s, "temperature_record", 0.5);
    return true;
}

static bool zero_add(struct scenario *s, const struct record *record, const char *key)
{
    const size_t size = strlen(record->section->path) + strlen(record->name) + strlen(key) + 3;
    const char **list = arena_take(s->arena, s->zero_count + 1, sizeof *list);
    char *path = arena_take(s->arena, size, 1);
    if (!list || !path)
        return false;
    snprintf(path, size, "%s%s%s.%s", record->section->path, record->name[0] ? "." : "", record->name, key);
    for (size_t i = 0; i < s->zero_count; i++)
        list[i] = s->zero_sources[i];
    list[s->zero_count++] = path;
    s->zero_sources = list;
    return true;
}

static bool zero_find_in(struct scenario *s, const struct record *record)
{
    for (size_t i = 0; i < keys_count(record->section); i++) {
        const struct keys_row *row = keys_row(record->section, i);
        const struct value *v = &record->values[i];
        const bool zero =
            row->flags & KEYS_SPREAD && v->state == VALUE_GOOD && !(v->number > 0.0) && !(v->number < 0.0);
        if (zero && zero_is_used(s, record->section->id, row->key) && !zero_add(s, record, row->key))
            return false;
    }
    return true;
}

bool zero_find(struct scenario *s)
{
    for (size_t id = 0; id < KEYS_SECTIONS; id++) {
        if (s->sections[id] && !zero_find_in(s, s->sections[id]))
            return false;
        for (size_t key = 0; keys_is_kit((enum keys_id)id) && id != KEYS_MATERIALS && key < s->keys; key++) {
            const struct choice *choice = &s->choices[key];
            if (choice->row->kind != KEYS_ENTRY || keys_entry_kind(choice->row) != (enum keys_id)id)
                continue;
            for (size_t i = 0; i < choice->count; i++)
                if (!zero_find_in(s, choice->options[i].entry))
                    return false;
        }
    }
    return true;
}
