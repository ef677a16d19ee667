#include "sim/scenario/kit.h"

#include <string.h>

#include "models/kit.h"
#include "sim/base/text.h"
#include "sim/scenario/record.h"

static struct record *kit_entry(const struct kit *kit, enum keys_id kind, const char *name)
{
    for (struct record *e = kit->first[kind]; e; e = e->next)
        if (strcmp(e->name, name) == 0)
            return e;
    return NULL;
}

const struct record *kit_find(const struct kit *kit, enum keys_id kind, const char *name)
{
    return kit_entry(kit, kind, name);
}

static void kit_refuse(const struct reading *r, const struct kit *kit, enum keys_id kind, const char *name,
                       struct place where)
{
    char shown[TEXT_SHOWN];
    struct text_nearest nearest = {.word = name};
    for (const struct record *e = kit->first[kind]; e; e = e->next)
        text_nearest_try(&nearest, e->name);
    text_shown(shown, name);
    if (nearest.best)
        complain_at(r->out, where, "no entry `%s` in %s; did you mean `%s`?", shown, keys_section(kind)->path,
                    nearest.best);
    else
        complain_at(r->out, where, "no entry `%s` in %s; `vicinal kit` lists them", shown, keys_section(kind)->path);
}

void kit_resolve(const struct reading *r, const struct kit *kit, enum keys_id kind, struct value *value)
{
    if (value->state != VALUE_GOOD)
        return;
    value->entry = kit_find(kit, kind, value->text);
    if (value->entry)
        return;
    kit_refuse(r, kit, kind, value->text, value->place);
    value->state = VALUE_BAD;
}

static void kit_append(struct kit *kit, enum keys_id kind, struct record *entry)
{
    if (kit->last[kind])
        kit->last[kind]->next = entry;
    else
        kit->first[kind] = entry;
    kit->last[kind] = entry;
}

/* Puts a changed entry where the one it changes stood. */
static void kit_replace(struct kit *kit, enum keys_id kind, struct record *entry, struct record *old)
{
    struct record **link = &kit->first[kind];
    while (*link != old)
        link = &(*link)->next;
    *link = entry;
    entry->next = old->next;
    entry->base = old;
    old->next = NULL;
    if (kit->last[kind] == old)
        kit->last[kind] = entry;
}

/* One entry as it is given, into the list. */
static void kit_add(const struct reading *r, struct kit *kit, enum keys_id kind, const struct document_node *given)
{
    struct record *entry = record_read(r, keys_section(kind), given);
    if (!entry)
        return;
    const struct value *name = record_value(entry, "name");
    if (name->state == VALUE_ABSENT && given->kind == DOCUMENT_MAP)
        complain_at(r->out, given->place, "an entry of %s needs a name", keys_section(kind)->path);
    if (name->state != VALUE_GOOD)
        return;
    entry->name = name->text;
    struct record *old = kit_entry(kit, kind, entry->name);
    const bool built_in = given->origin == DOCUMENT_KIT;
    if (given->made && !old)
        kit_refuse(r, kit, kind, entry->name, given->place);
    else if (!old)
        kit_append(kit, kind, entry);
    else if (built_in || record_value(old, "name")->origin != DOCUMENT_KIT)
        complain_at(r->out, name->place, "%s has an entry `%s` already", keys_section(kind)->path, entry->name);
    else
        kit_replace(kit, kind, entry, old);
}

static void kit_read_kind(const struct reading *r, struct kit *kit, enum keys_id kind,
                          const struct document_node *given)
{
    if (!given || (given->kind == DOCUMENT_TEXT && given->null))
        return;
    if (given->kind == DOCUMENT_MAP)
        kit_add(r, kit, kind, given);
    else if (given->kind == DOCUMENT_TEXT)
        complain_at(r->out, given->place, "%s is a list of entries, [{name: ..., ...}]", keys_section(kind)->path);
    else
        for (const struct document_node *n = given->children; n; n = n->next)
            kit_add(r, kit, kind, n);
}

static void kit_read_kinds(const struct reading *r, struct kit *kit, const struct document_node *given)
{
    char shown[TEXT_SHOWN];
    if (!given || (given->kind == DOCUMENT_TEXT && given->null))
        return;
    if (given->kind != DOCUMENT_MAP) {
        complain_at(r->out, given->place, "kit is a map of lists of entries, not %s", document_kind_text(given->kind));
        return;
    }
    for (size_t id = KEYS_GRADES; id <= KEYS_BENCHES; id++)
        kit_read_kind(r, kit, (enum keys_id)id, document_child(given, keys_stem(keys_section((enum keys_id)id))));
    for (const struct document_node *n = given->children; n; n = n->next) {
        struct text_nearest nearest = {.word = n->key};
        bool known = n->origin == DOCUMENT_KIT;
        for (size_t id = KEYS_GRADES; id <= KEYS_BENCHES; id++) {
            const char *stem = keys_stem(keys_section((enum keys_id)id));
            known = known || strcmp(stem, n->key) == 0;
            text_nearest_try(&nearest, stem);
        }
        text_shown(shown, n->key);
        if (!known && nearest.best)
            complain_at(r->out, n->key_place, "unknown key `%s` in kit; did you mean `%s`?", shown, nearest.best);
        else if (!known)
            complain_at(
                r->out, n->key_place,
                "unknown key `%s` in kit; it has grades, tubes, baths, thermometers, timers, materials and benches",
                shown);
    }
}

/* A value of the built-in kit stands beside its source, [value, source], the
 * source a key of the map `sources`. */
static void kit_sources(struct document_node *entry, const struct document_node *sources)
{
    for (struct document_node *n = entry->children; n; n = n->next) {
        const struct document_node *value = n->children;
        if (n->kind != DOCUMENT_LIST || n->count != 2 || value->kind != DOCUMENT_TEXT ||
            value->next->kind != DOCUMENT_TEXT)
            continue;
        const struct document_node *source = document_child(sources, value->next->text);
        n->kind = DOCUMENT_TEXT;
        n->text = value->text;
        n->source = source && source->kind == DOCUMENT_TEXT ? source->text : NULL;
        n->children = n->last = NULL;
        n->count = 0;
    }
}

static struct document_node *kit_built_in(const struct reading *r)
{
    static const char name[] = "kit.yaml";
    const char *bytes = (const char *)vicinal_kit_yaml;
    const struct document_input input = {bytes, vicinal_kit_yaml_size, {.file = name}, DOCUMENT_KIT};
    struct document_node *root = document_parse(r->arena, &input, r->out);
    const struct document_node *sources = document_child(root, "sources");
    for (struct document_node *kind = root ? root->children : NULL; kind; kind = kind->next)
        for (struct document_node *entry = kind->kind == DOCUMENT_LIST ? kind->children : NULL; entry;
             entry = entry->next)
            kit_sources(entry, sources);
    return root;
}

/* A coefficient for the other ends is not inherited with them. */
static void kit_drop_other_ends(struct record *tube)
{
    const double ends = record_number(tube, "ends");
    struct value *E = record_value(tube, "E"), *B = record_value(tube, "B");
    if (ends > TUBE_FLARED && !E->own)
        E->state = VALUE_ABSENT;
    if (ends <= TUBE_FLARED && !B->own)
        B->state = VALUE_ABSENT;
}

/* Fills an entry after the one it takes from; a ring of them is refused. */
static void kit_fill(const struct reading *r, struct kit *kit, enum keys_id kind, struct record *entry)
{
    if (entry->filled)
        return;
    struct value *like = record_value(entry, "like");
    if (entry->filling) {
        complain_at(r->out, like->place, "`like` goes round in a ring at `%s`", entry->name);
        like->state = VALUE_BAD;
        return;
    }
    entry->filling = true;
    struct record *parent = entry->base;
    if (like->state == VALUE_GOOD && !(parent && strcmp(like->text, entry->name) == 0)) {
        parent = kit_entry(kit, kind, like->text);
        if (!parent)
            kit_refuse(r, kit, kind, like->text, like->place);
    }
    if (parent)
        kit_fill(r, kit, kind, parent);
    record_fill(r, entry, parent);
    if (kind == KEYS_TUBES)
        kit_drop_other_ends(entry);
}

void kit_read(const struct reading *r, struct kit *kit, const struct document_node *given)
{
    kit_read_kinds(r, kit, kit_built_in(r));
    kit_read_kinds(r, kit, given);
    for (size_t id = KEYS_GRADES; id <= KEYS_BENCHES; id++)
        for (struct record *e = kit->first[id]; e; e = e->next)
            kit_fill(r, kit, (enum keys_id)id, e);
}
