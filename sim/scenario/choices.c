#include "sim/scenario/choices.h"

#include <assert.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/text.h"
#include "sim/scenario/change.h"
#include "sim/scenario/keys_polymer.h"
#include "sim/scenario/kit.h"
#include "sim/scenario/record.h"
#include "sim/scenario/value.h"

const struct choice *choices_find(const struct scenario *s, const char *key)
{
    const size_t i = keys_find(keys_section(KEYS_PLAN), key);
    assert(i < s->keys);
    return &s->choices[i];
}

static struct value *choices_reserve(const struct reading *r, struct choice *choice, size_t count)
{
    choice->options = arena_take(r->arena, count ? count : 1, sizeof *choice->options);
    if (!choice->options)
        complain_memory(r->out);
    return choice->options;
}

/* One option; a second one that means the same is refused. */
static void choices_add(const struct reading *r, const struct kit *kit, struct choice *choice,
                        const struct document_node *given)
{
    struct value v = value_read(r, choice->row, given);
    if (choice->row->kind == KEYS_ENTRY)
        kit_resolve(r, kit, keys_entry_kind(choice->row), &v);
    for (size_t i = 0; i < choice->count; i++) {
        const struct value *other = &choice->options[i];
        if (v.state != VALUE_GOOD || other->state != VALUE_GOOD || !value_same(choice->row, other, &v))
            continue;
        complain_at(r->out, v.place, "`%s` lists %s twice", choice->row->key, v.text);
        return;
    }
    choice->options[choice->count++] = v;
}

static void choices_add_default(const struct reading *r, const struct kit *kit, struct choice *choice)
{
    if (!choice->row->fallback || !choices_reserve(r, choice, 1))
        return;
    choice->options[0] = value_default(r, choice->row);
    if (choice->row->kind == KEYS_ENTRY)
        kit_resolve(r, kit, keys_entry_kind(choice->row), &choice->options[0]);
    choice->count = 1;
}

static void choices_read_key(const struct reading *r, const struct kit *kit, struct choice *choice,
                             const struct document_node *given)
{
    if (!given) {
        choices_add_default(r, kit, choice);
        return;
    }
    choice->place = given->place;
    const bool list = given->kind == DOCUMENT_LIST, empty = list ? given->count == 0 : given->null;
    if (empty)
        complain_at(r->out, given->place, "`%s` has no option; an empty list leaves no plan", choice->row->key);
    if (empty || !choices_reserve(r, choice, list ? given->count : 1))
        return;
    if (!list)
        choices_add(r, kit, choice, given);
    else
        for (const struct document_node *n = given->children; n; n = n->next)
            choices_add(r, kit, choice, n);
}

/* The material is that of `polymer` unless `plan` names one. */
static void choices_material(const struct reading *r, struct scenario *s)
{
    struct choice *choice = &s->choices[keys_find(keys_section(KEYS_PLAN), "material")];
    struct value *polymer = record_value(s->sections[KEYS_POLYMER], "material");
    const bool several = choice->count > 1;
    if (choice->count == 0) {
        if (!choices_reserve(r, choice, 1))
            return;
        choice->options[choice->count++] =
            polymer->state == VALUE_ABSENT ? value_default(r, keys_polymer_head) : *polymer;
        kit_resolve(r, &s->kit, KEYS_MATERIALS, &choice->options[0]);
    } else if (!several && polymer->own && polymer->state == VALUE_GOOD && strcmp(polymer->text, choice->options[0].text) != 0)
        complain_at(r->out, choice->options[0].place, "`material` is %s here and %s in polymer",
                    choice->options[0].text, polymer->text);
    *polymer = choice->options[0];
}

void choices_read(const struct reading *r, struct scenario *s, const struct document_node *given)
{
    const struct keys_section *section = keys_section(KEYS_PLAN);
    if (given && given->kind == DOCUMENT_TEXT && given->null)
        given = NULL;
    const bool map = !given || given->kind == DOCUMENT_MAP;
    if (!map)
        complain_at(r->out, given->place, "plan is a map of keys and options, not %s", document_kind_text(given->kind));
    s->keys = keys_count(section);
    assert(s->keys <= PARTS_PLAN_KEYS);
    for (size_t i = 0; i < s->keys; i++) {
        s->choices[i] = (struct choice){.row = keys_row(section, i), .place = r->whole};
        choices_read_key(r, &s->kit, &s->choices[i], document_child(given, s->choices[i].row->key));
    }
    for (const struct document_node *n = given && map ? given->children : NULL; n; n = n->next)
        if (keys_find(section, n->key) == s->keys)
            record_refuse_key(r, section, n);
    choices_material(r, s);
    if (map && !document_child(given, "grade"))
        complain_at(r->out, given ? given->key_place : r->whole,
                    "plan.grade is missing: which grades come into question, for example grade: [middle]");
}

/* Cuts the list to the option that `wanted` means. */
static void choices_keep(const struct reading *r, struct choice *choice, const struct document_node *wanted)
{
    char shown[TEXT_SHOWN];
    const struct value v = value_read(r, choice->row, wanted);
    if (v.state != VALUE_GOOD)
        return;
    for (size_t i = 0; i < choice->count; i++) {
        if (choice->options[i].state != VALUE_GOOD || !value_same(choice->row, &choice->options[i], &v))
            continue;
        choice->options[0] = choice->options[i];
        choice->count = 1;
        return;
    }
    struct text list = {0};
    for (size_t i = 0; i < choice->count; i++)
        text_add(&list, "%s%s", i ? ", " : "", choice->options[i].text ? choice->options[i].text : "?");
    complain_at(r->out, v.place, "`%s` is not among the options of %s: %s", text_shown(shown, v.text), choice->row->key,
                list.bytes ? list.bytes : "none");
    free(list.bytes);
}

void choices_pick(const struct reading *r, struct scenario *s, const char *pick)
{
    const char *value = change_value(pick), *option = change_option(r->arena, "--pick", pick);
    const struct place place = {.option = option};
    const char *key = value ? arena_copy(r->arena, pick, (size_t)(value - 1 - pick)) : "";
    if (!option || !key) {
        complain_memory(r->out);
        return;
    }
    if (!value) {
        complain_at(r->out, place, "KEY=OPTION is wanted, such as tube=suspended-0c");
        return;
    }
    const struct keys_section *section = keys_section(KEYS_PLAN);
    const size_t i = keys_find(section, strncmp(key, "plan.", 5) == 0 ? key + 5 : key);
    if (i == s->keys) {
        record_refuse_key(r, section, &(struct document_node){.key = key, .key_place = place});
        return;
    }
    const struct document_input input = {value, strlen(value), place, DOCUMENT_PICK};
    const struct document_node *wanted = document_parse(r->arena, &input, r->out);
    if (wanted)
        choices_keep(r, &s->choices[i], wanted);
}
