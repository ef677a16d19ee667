#include "sim/scenario/record.h"

#include <assert.h>
#include <math.h>
#include <string.h>

#include "sim/base/text.h"
#include "sim/scenario/value.h"

void record_refuse_key(const struct reading *r, const struct keys_section *section, const struct document_node *node)
{
    char shown[TEXT_SHOWN];
    const bool top = section->id == KEYS_TOP;
    struct text_nearest nearest = {.word = node->key};
    for (size_t i = 0; i < keys_count(section); i++)
        text_nearest_try(&nearest, keys_row(section, i)->key);
    if (top)
        text_nearest_try(&nearest, "kit");
    for (size_t id = 0; top && id < KEYS_SECTIONS; id++)
        if (!strchr(keys_section((enum keys_id)id)->path, '.'))
            text_nearest_try(&nearest, keys_section((enum keys_id)id)->path);
    const char *home = keys_home(node->key, section->id), *where = top ? "a scenario" : section->path;
    text_shown(shown, node->key);
    if (nearest.best && (!home || nearest.distance < 2))
        complain_at(r->out, node->key_place, "unknown key `%s` in %s; did you mean `%s`?", shown, where, nearest.best);
    else if (home)
        complain_at(r->out, node->key_place, "unknown key `%s` in %s; it is a key of %s", shown, where, home);
    else
        complain_at(r->out, node->key_place, "unknown key `%s` in %s; `vicinal kit` lists every key", shown, where);
}

struct record *record_read(const struct reading *r, const struct keys_section *section,
                           const struct document_node *given)
{
    const size_t count = keys_count(section);
    struct record *record = arena_take(r->arena, 1, sizeof *record);
    if (record)
        record->values = arena_take(r->arena, count, sizeof *record->values);
    if (!record || !record->values) {
        complain_memory(r->out);
        return NULL;
    }
    record->section = section;
    record->name = "";
    record->place = given ? given->place : r->whole;
    for (size_t i = 0; i < count; i++)
        record->values[i].number = (double)NAN;
    if (!given || (given->kind == DOCUMENT_TEXT && given->null))
        return record;
    if (given->kind != DOCUMENT_MAP) {
        complain_at(r->out, given->place, "%s%s is a map of keys and values, not %s",
                    keys_is_kit(section->id) ? "an entry of " : "", section->path, document_kind_text(given->kind));
        record->bad = true;
        return record;
    }
    for (const struct document_node *n = given->children; n; n = n->next) {
        const size_t i = keys_find(section, n->key);
        if (i < count)
            record->values[i] = value_read(r, keys_row(section, i), n);
        else
            record_refuse_key(r, section, n);
    }
    return record;
}

static const struct value *record_by_row(const struct record *record, const struct keys_row *row)
{
    const size_t count = keys_count(record->section);
    for (size_t i = 0; i < count; i++)
        if (keys_row(record->section, i) == row)
            return &record->values[i];
    return NULL;
}

void record_fill(const struct reading *r, struct record *record, const struct record *parent)
{
    const size_t count = keys_count(record->section);
    for (size_t i = 0; i < count; i++) {
        const struct keys_row *row = keys_row(record->section, i);
        const struct value *taken = parent ? record_by_row(parent, row) : NULL;
        const struct value otherwise = taken && taken->state != VALUE_ABSENT ? *taken : value_default(r, row);
        struct value *here = &record->values[i];
        if (here->state == VALUE_ABSENT) {
            *here = otherwise;
            here->own = false;
        } else if (!here->source && here->text && otherwise.text && strcmp(here->text, otherwise.text) == 0)
            here->source = otherwise.source; /* given, but what it would be anyway */
    }
    record->filled = true;
}

struct value *record_value(const struct record *record, const char *key)
{
    const size_t i = keys_find(record->section, key);
    assert(i < keys_count(record->section));
    return &record->values[i];
}

double record_number(const struct record *record, const char *key)
{
    const struct value *v = record_value(record, key);
    return v->state == VALUE_GOOD ? v->number : (double)NAN;
}

bool record_is_good(const struct record *record, const char *key)
{
    return record_value(record, key)->state == VALUE_GOOD;
}

void record_store(const struct keys_row *row, const struct value *value, void *target)
{
    unsigned char *at = (unsigned char *)target + row->offset;
    if (!row->size || value->state != VALUE_GOOD)
        return;
    if (row->kind == KEYS_TEXT)
        memcpy(at, &value->text, sizeof value->text);
    else if (row->kind == KEYS_QUANTITY)
        memcpy(at, &value->number, sizeof value->number);
    else if (row->kind == KEYS_COUNT)
        memcpy(at, &(size_t){(size_t)value->number}, sizeof(size_t));
    else if (row->size == sizeof(bool))
        memcpy(at, &(bool){value->number > 0.5}, sizeof(bool));
    else
        memcpy(at, &(int){(int)value->number}, sizeof(int));
}

void record_compile(const struct record *record, void *target)
{
    const size_t count = keys_count(record->section);
    for (size_t i = 0; i < count; i++)
        record_store(keys_row(record->section, i), &record->values[i], target);
}
