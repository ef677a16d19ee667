#include "sim/scenario/resolve.h"

#include <stdint.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/text.h"
#include "sim/scenario/candidates.h"
#include "sim/scenario/choices.h"
#include "sim/scenario/record.h"

/* A resolving on its way; `failed` once memory ran out. */
struct resolving {
    struct arena *arena;
    const struct scenario *scenario;
    bool cut;
    size_t option[PARTS_PLAN_KEYS]; /* when cut */
    bool failed;
};

static struct document_node *resolve_add(struct resolving *v, struct document_node *parent, const char *key,
                                         enum document_kind kind)
{
    struct document_node *n = v->failed ? NULL : document_add(v->arena, parent, key);
    if (!n) {
        v->failed = true;
        return NULL;
    }
    n->kind = kind;
    return n;
}

static void resolve_add_text(struct resolving *v, struct document_node *parent, const char *key,
                             const struct keys_row *row, const char *text)
{
    double number;
    struct document_node *n = resolve_add(v, parent, key, DOCUMENT_TEXT);
    if (!n)
        return;
    const bool numeric = row->kind == KEYS_QUANTITY || row->kind == KEYS_COUNT;
    const char *rest = numeric ? units_number(text, &number) : NULL;
    n->text = text;
    n->number = rest && !*rest;
}

static void resolve_add_section(struct resolving *v, struct document_node *to, const struct record *record);

/* `owned`, always a list, and `at_most`, a section of its own. */
static void resolve_add_special(struct resolving *v, struct document_node *to, const struct keys_row *row,
                                const struct value *value)
{
    struct document_node *n = resolve_add(v, to, row->key, row->kind == KEYS_OWNED ? DOCUMENT_LIST : DOCUMENT_MAP);
    if (n && row->kind == KEYS_AT_MOST)
        resolve_add_section(v, n, v->scenario->sections[KEYS_AT_MOST_SECTION]);
    if (!n || row->kind == KEYS_AT_MOST || !value->node)
        return;
    const struct document_node *given = value->node;
    if (given->kind == DOCUMENT_TEXT && !given->null)
        resolve_add_text(v, n, NULL, row, given->text);
    for (const struct document_node *name = given->children; name; name = name->next)
        resolve_add_text(v, n, NULL, row, name->text);
}

static bool resolve_uses(const struct resolving *v, size_t key, size_t option)
{
    return !v->cut || v->option[key] == option;
}

/* With several materials their values stand with them, not in `polymer`. */
static bool resolve_is_of_materials(const struct resolving *v, const struct keys_row *row)
{
    const struct keys_section *own = keys_section(KEYS_MATERIALS);
    return choices_find(v->scenario, "material")->count > 1 &&
           (strcmp(row->key, "material") == 0 || keys_find(own, row->key) < keys_count(own));
}

/* The hydrolysis in `polymer` would win over that of a grade: where it is not
 * given there and a grade in use has its own, it stays with the material. */
static bool resolve_is_left_out(const struct resolving *v, const struct record *record, const struct keys_row *row,
                                const struct value *value)
{
    if (value->state != VALUE_GOOD && row->kind != KEYS_OWNED && row->kind != KEYS_AT_MOST)
        return true;
    if (row->flags & KEYS_SILENT)
        return true;
    if (record->section->id == KEYS_POLYMER && resolve_is_of_materials(v, row))
        return true;
    if (record->section->id != KEYS_POLYMER || value->own || strncmp(row->key, "hydrolysis", 10) != 0)
        return false;
    const struct choice *grades = choices_find(v->scenario, "grade");
    for (size_t i = 0; i < grades->count; i++)
        if (resolve_uses(v, (size_t)(grades - v->scenario->choices), i) &&
            record_is_good(grades->options[i].entry, row->key))
            return true;
    return false;
}

static void resolve_add_section(struct resolving *v, struct document_node *to, const struct record *record)
{
    for (size_t i = 0; i < keys_count(record->section); i++) {
        const struct keys_row *row = keys_row(record->section, i);
        const struct value *value = &record->values[i];
        if (resolve_is_left_out(v, record, row, value))
            continue;
        if (row->kind == KEYS_OWNED || row->kind == KEYS_AT_MOST)
            resolve_add_special(v, to, row, value);
        else
            resolve_add_text(v, to, row->key, row, value->text);
    }
}

static void resolve_add_kit(struct resolving *v, struct document_node *to)
{
    for (size_t id = KEYS_GRADES; id < KEYS_BENCHES; id++) {
        struct document_node *list = resolve_add(v, to, keys_stem(keys_section((enum keys_id)id)), DOCUMENT_LIST);
        for (size_t key = 0; list && key < v->scenario->keys; key++) {
            const struct choice *choice = &v->scenario->choices[key];
            if (choice->row->kind != KEYS_ENTRY || keys_entry_kind(choice->row) != (enum keys_id)id)
                continue;
            for (size_t i = 0; i < choice->count; i++) {
                struct document_node *entry = resolve_uses(v, key, i) ? resolve_add(v, list, NULL, DOCUMENT_MAP) : NULL;
                if (entry)
                    resolve_add_section(v, entry, choice->options[i].entry);
            }
        }
    }
}

static void resolve_add_plan(struct resolving *v, struct document_node *to)
{
    for (size_t key = 0; key < v->scenario->keys; key++) {
        const struct choice *choice = &v->scenario->choices[key];
        struct document_node *list = resolve_add(v, to, choice->row->key, DOCUMENT_LIST);
        for (size_t i = 0; list && i < choice->count; i++)
            if (resolve_uses(v, key, i))
                resolve_add_text(v, list, NULL, choice->row, choice->options[i].text);
    }
}

const struct document_node *resolve_tree(struct arena *a, const struct scenario *s, size_t index)
{
    struct resolving v = {.arena = a, .scenario = s, .cut = index != SIZE_MAX};
    struct document_node *root = arena_take(a, 1, sizeof *root);
    if (!root)
        return NULL;
    root->kind = DOCUMENT_MAP;
    if (v.cut)
        candidates_options(s, index, v.option);
    for (size_t id = 0; id < KEYS_SECTIONS; id++) {
        if (id == KEYS_AT_MOST_SECTION || (keys_is_kit((enum keys_id)id) && id != KEYS_GRADES))
            continue;
        const char *key = id == KEYS_GRADES ? "kit" : keys_section((enum keys_id)id)->path;
        struct document_node *to = id == KEYS_TOP ? root : resolve_add(&v, root, key, DOCUMENT_MAP);
        if (!to)
            break;
        if (id == KEYS_GRADES)
            resolve_add_kit(&v, to);
        else if (id == KEYS_PLAN)
            resolve_add_plan(&v, to);
        else
            resolve_add_section(&v, to, s->sections[id]);
    }
    return v.failed ? NULL : root;
}

/* May a text stand in YAML without quotes, in a list too? */
static bool resolve_is_plain(const char *text)
{
    static const char *const words[] = {"~", "null", "true", "false"};
    static const char safe[] = "abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ0123456789+-./_^*% ()";
    const size_t size = strlen(text);
    if (!size || strspn(text, safe) != size || strchr(" %*", text[0]) || text[size - 1] == ' ')
        return false;
    if (text[0] == '-' && !(text[1] >= '0' && text[1] <= '9'))
        return false;
    for (size_t i = 0; i < sizeof words / sizeof *words; i++)
        if (strcmp(words[i], text) == 0)
            return false;
    return true;
}

static void resolve_print_text(struct text *t, const char *text)
{
    if (resolve_is_plain(text)) {
        text_add(t, "%s", text);
        return;
    }
    text_add(t, "\"");
    for (const char *p = text; *p; p++)
        text_add(t, *p == '"' || *p == '\\' ? "\\%c" : "%c", *p);
    text_add(t, "\"");
}

static void resolve_print(struct text *t, const struct document_node *n, int indent);

/* A list of single values on one line, one of maps with a dash each. */
static void resolve_print_list(struct text *t, const struct document_node *list, int indent)
{
    const bool maps = list->children && list->children->kind == DOCUMENT_MAP;
    if (!maps)
        text_add(t, " [");
    else
        text_add(t, "\n");
    for (const struct document_node *n = list->children; n; n = n->next) {
        if (maps)
            text_add(t, "%*s-", indent, "");
        if (maps)
            resolve_print(t, n, indent + 2);
        else
            resolve_print_text(t, n->text);
        if (!maps && n->next)
            text_add(t, ", ");
    }
    if (!maps)
        text_add(t, "]\n");
}

static void resolve_print_map(struct text *t, const struct document_node *map, int indent, bool first_on_line)
{
    for (const struct document_node *n = map->children; n; n = n->next) {
        if (first_on_line && n == map->children)
            text_add(t, " %s:", n->key);
        else
            text_add(t, "%*s%s:", indent, "", n->key);
        resolve_print(t, n, indent + 2);
    }
}

/* What stands behind a key or a dash, line end included. */
static void resolve_print(struct text *t, const struct document_node *n, int indent)
{
    if (n->kind == DOCUMENT_TEXT) {
        text_add(t, " ");
        resolve_print_text(t, n->text);
        text_add(t, "\n");
    } else if (n->kind == DOCUMENT_LIST)
        resolve_print_list(t, n, indent);
    else if (n->count == 0)
        text_add(t, " {}\n");
    else if (n->key) {
        text_add(t, "\n");
        resolve_print_map(t, n, indent, false);
    } else
        resolve_print_map(t, n, indent, true);
}

char *resolve_yaml(const struct document_node *tree)
{
    struct text t = {0};
    text_add(&t, "# Every default written out. A value in polymer wins over that of its material.\n");
    resolve_print_map(&t, tree, 0, false);
    if (!t.failed)
        return t.bytes;
    free(t.bytes);
    return NULL;
}

static json_t *resolve_json_text(const struct document_node *n)
{
    double number = 0.0;
    if (!n->number || !units_number(n->text, &number))
        return json_string(n->text);
    const bool whole = strspn(n->text, "0123456789") == strlen(n->text) && number <= 9007199254740992.0;
    return whole ? json_integer((json_int_t)number) : json_real(number);
}

json_t *resolve_json(const struct document_node *tree)
{
    if (tree->kind == DOCUMENT_TEXT)
        return resolve_json_text(tree);
    json_t *to = tree->kind == DOCUMENT_MAP ? json_object() : json_array();
    for (const struct document_node *n = tree->children; to && n; n = n->next) {
        json_t *child = resolve_json(n);
        const int failed =
            tree->kind == DOCUMENT_MAP ? json_object_set_new(to, n->key, child) : json_array_append_new(to, child);
        if (!failed)
            continue;
        json_decref(to);
        return NULL;
    }
    return to;
}
