#include "sim/scenario/change.h"

#include <string.h>

#include "sim/base/text.h"

/* One change on its way down the tree. */
struct change {
    struct arena *arena;
    struct place place;
    struct complaints *out;
};

const char *change_value(const char *text)
{
    const char *equals = strchr(text, '=');
    return equals && equals != text ? equals + 1 : NULL;
}

const char *change_option(struct arena *a, const char *option, const char *text)
{
    const char *value = change_value(text);
    const size_t size = value ? (size_t)(value - 1 - text) : strlen(text);
    const size_t before = strlen(option);
    char *whole = arena_take(a, before + size + 2, 1);
    if (!whole)
        return NULL;
    memcpy(whole, option, before);
    whole[before] = ' ';
    memcpy(whole + before + 1, text, size);
    return whole;
}

static struct document_node *change_add(const struct change *c, struct document_node *parent, const char *key)
{
    struct document_node *child = document_add(c->arena, parent, key);
    if (!child) {
        complain_memory(c->out);
        return NULL;
    }
    child->kind = DOCUMENT_MAP;
    child->origin = DOCUMENT_SET;
    child->made = true;
    child->place = child->key_place = c->place;
    return child;
}

static bool change_is_named(const struct document_node *entry, const char *name)
{
    const struct document_node *n = document_child(entry, "name");
    return n && n->kind == DOCUMENT_TEXT && strcmp(n->text, name) == 0;
}

/* The entry of a list by its name, made when missing. */
static struct document_node *change_entry(const struct change *c, struct document_node *list, const char *name)
{
    for (struct document_node *n = list->children; n; n = n->next)
        if (change_is_named(n, name))
            return n;
    struct document_node *entry = change_add(c, list, NULL);
    struct document_node *named = entry ? change_add(c, entry, "name") : NULL;
    if (!named)
        return NULL;
    named->kind = DOCUMENT_TEXT;
    named->text = name;
    return entry;
}

/* A list of one may stand without brackets: make the list. */
static bool change_list(const struct change *c, struct document_node *node)
{
    struct document_node *only = arena_take(c->arena, 1, sizeof *only);
    if (!only) {
        complain_memory(c->out);
        return false;
    }
    *only = *node;
    only->key = NULL;
    only->next = NULL;
    const bool empty = node->kind == DOCUMENT_TEXT ? node->null : node->count == 0;
    node->kind = DOCUMENT_LIST;
    node->children = node->last = empty ? NULL : only;
    node->count = !empty;
    return true;
}

static struct document_node *change_child(const struct change *c, struct document_node *map, const char *key)
{
    struct document_node *child = document_child(map, key);
    return child ? child : change_add(c, map, key);
}

/* One step down: what stands in `node` under a key or, in a list of the kit,
 * under a name. NULL: it was said why. */
static struct document_node *change_step(const struct change *c, struct document_node *node, const char *key,
                                         bool entries)
{
    char shown[TEXT_SHOWN];
    if (entries && node->kind != DOCUMENT_LIST && !change_list(c, node))
        return NULL;
    if (node->kind == DOCUMENT_TEXT && node->null)
        node->kind = DOCUMENT_MAP;
    if (!*key)
        complain_at(c->out, c->place, "an empty key in the path");
    else if (entries)
        return change_entry(c, node, key);
    else if (node->kind == DOCUMENT_MAP)
        return change_child(c, node, key);
    else
        complain_at(c->out, c->place, "`%s` is asked for inside %s%s", text_shown(shown, key),
                    document_kind_text(node->kind),
                    node->kind == DOCUMENT_LIST ? ", which is set as a whole, such as plan.fillings=[1, 2]" : "");
    return NULL;
}

/* The node that a path names; `path` is cut up on the way. */
static struct document_node *change_walk(const struct change *c, struct document_node *root, char *path)
{
    const bool kit = strncmp(path, "kit.", 4) == 0;
    struct document_node *node = root;
    for (size_t depth = 0; node && path; depth++) {
        char *rest = strchr(path, '.');
        if (rest)
            *rest++ = 0;
        node = change_step(c, node, path, kit && depth == 2);
        path = rest;
    }
    return node;
}

void change_set(struct arena *a, struct document_node *root, const char *set, struct complaints *out)
{
    const char *value = change_value(set);
    struct change c = {a, {.option = change_option(a, "--set", set)}, out};
    char *path = value ? arena_copy(a, set, (size_t)(value - 1 - set)) : NULL;
    if (!c.place.option || (value && !path)) {
        complain_memory(out);
        return;
    }
    if (!value) {
        complain_at(out, c.place, "PATH=VALUE is wanted, such as solutions.glass=B");
        return;
    }
    const struct document_input input = {value, strlen(value), c.place, DOCUMENT_SET};
    const struct document_node *given = document_parse(a, &input, out);
    struct document_node *node = given ? change_walk(&c, root, path) : NULL;
    if (!node)
        return;
    const struct document_node old = *node;
    *node = *given;
    node->key = old.key;
    node->key_place = old.made ? c.place : old.key_place;
    node->next = old.next;
}
