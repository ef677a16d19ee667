#include "sim/report/kit_print.h"

#include <stdlib.h>
#include <string.h>

#include "models/glassware.h"
#include "sim/base/text.h"
#include "sim/report/say.h"
#include "sim/scenario/kit.h"
#include "sim/scenario/parts.h"

enum { KIT_WIDTH = 90 };

/* Characters, not bytes. */
static size_t width_of(const char *s, size_t bytes)
{
    size_t width = 0;
    for (size_t i = 0; i < bytes; i++)
        width += ((unsigned char)s[i] & 0xc0) != 0x80;
    return width;
}

/* Words from column `at` on, the lines that follow indented to `indent`. */
static void add_wrapped(struct text *t, const char *words, size_t at, size_t indent)
{
    bool first = true;
    while (*words) {
        const size_t bytes = strcspn(words, " "), width = width_of(words, bytes);
        const bool fits = at + (first ? 0 : 1) + width <= KIT_WIDTH;
        if (!first && !fits)
            text_add(t, "\n%*s", (int)indent, "");
        text_add(t, "%s%.*s", first || !fits ? "" : " ", (int)bytes, words);
        at = first || fits ? at + (first ? 0 : 1) + width : indent + width;
        first = false;
        words += bytes + strspn(words + bytes, " ");
    }
    text_add(t, "\n");
}

/* A text padded to a column, which is then the one after it. */
static size_t add_column(struct text *t, const char *s, size_t from, size_t to)
{
    const size_t end = from + width_of(s, strlen(s));
    text_add(t, "%s%*s", s, (int)(end + 1 < to ? to - end : 1), "");
    return end + 1 < to ? to : end + 1;
}

static bool is_hidden(const struct keys_row *row)
{
    return row->kind == KEYS_NEW_NAME || (row->flags & KEYS_SILENT);
}

static void add_entry(struct text *t, const struct record *entry)
{
    text_add(t, "\n  %s\n", entry->name);
    for (size_t i = 0; i < keys_count(entry->section); i++) {
        const struct keys_row *row = keys_row(entry->section, i);
        const struct value *v = &entry->values[i];
        if (is_hidden(row) || v->state != VALUE_GOOD)
            continue;
        text_add(t, "    ");
        size_t at = add_column(t, row->key, 4, 24);
        at = add_column(t, v->text, at, 42);
        add_wrapped(t, v->source ? v->source : "yours", at, 42);
    }
}

static void add_overview(struct text *t, const struct kit *kit)
{
    text_add(t, "WHAT CAN BE CHOSEN\n\n");
    for (size_t id = KEYS_GRADES; id <= KEYS_BENCHES; id++) {
        struct text names = {0};
        for (const struct record *e = kit->first[id]; e; e = e->next)
            text_add(&names, "%s%s", e->name, e->next ? ", " : "");
        text_add(t, "  ");
        const size_t at = add_column(t, keys_stem(keys_section((enum keys_id)id)), 2, 16);
        add_wrapped(t, names.bytes ? names.bytes : "", at, 16);
        t->failed = t->failed || names.failed;
        free(names.bytes);
    }
}

static void add_flasks(struct text *t)
{
    text_add(t,
             "\nONE-MARK FLASKS  tolerance by class, ISO 1042 (from memory)\n\n        volume   class A   class B\n");
    for (size_t i = 0; i < GLASSWARE_FLASKS; i++)
        text_add(t, "  %8g mL  %5g mL  %5g mL\n", say_mL(glassware_flask_volume(i)),
                 say_mL(glassware_flask_tolerance(i, GLASS_A)), say_mL(glassware_flask_tolerance(i, GLASS_B)));
}

/* What a key takes, in a word or two; "" when that says nothing. */
static const char *takes(const struct keys_row *row, char buffer[KEYS_WORDS + KEYS_RANGE])
{
    char words[KEYS_WORDS], range[KEYS_RANGE];
    const bool number = row->kind == KEYS_QUANTITY || row->kind == KEYS_COUNT;
    buffer[0] = 0;
    if (number)
        strcpy(buffer, keys_range(row, range));
    if (number && row->words)
        strcat(buffer, ", or ");
    if (row->words)
        strcat(buffer, keys_words(row, words));
    return buffer;
}

static void add_key(struct text *t, const struct keys_row *row)
{
    char buffer[KEYS_WORDS + KEYS_RANGE];
    const char *without = row->fallback ? row->fallback : row->none;
    text_add(t, "  ");
    const size_t at = add_column(t, row->key, 2, 26);
    if (takes(row, buffer)[0])
        add_wrapped(t, buffer, add_column(t, without, at, 46), 46);
    else
        text_add(t, "%s\n", without);
    text_add(t, "      ");
    struct text words = {0};
    text_add(&words, "%s [%s]", row->help, row->source);
    add_wrapped(t, words.bytes ? words.bytes : "", 6, 6);
    t->failed = t->failed || words.failed;
    free(words.bytes);
}

/* Rows that another section has shown already are named, not repeated. */
static bool is_shared(enum keys_id id)
{
    return id == KEYS_MATERIALS || id == KEYS_BENCHES;
}

static void add_section(struct text *t, const struct keys_section *section)
{
    if (section->path[0])
        text_add(t, "\n%s: %s\n", section->path, section->help);
    if (section->id == KEYS_MATERIALS)
        text_add(t, "  name, like, and the keys of polymer from K to specific_volume\n");
    if (section->id == KEYS_BENCHES)
        text_add(t, "  name, like, and the keys of solutions and bench\n");
    for (size_t i = 0; !is_shared(section->id) && i < keys_count(section); i++) {
        if (keys_is_kit(section->id) && section->id != KEYS_GRADES && i < 2)
            continue;
        add_key(t, keys_row(section, i));
    }
}

int kit_print_text(const struct scenario *s, FILE *out)
{
    struct text t = {0};
    const struct kit *kit = scenario_kit(s);
    add_overview(&t, kit);
    for (size_t id = KEYS_GRADES; id <= KEYS_BENCHES; id++) {
        const struct keys_section *section = keys_section((enum keys_id)id);
        text_add(&t, "\n%s: %s\n", section->path, section->help);
        for (const struct record *e = kit->first[id]; e; e = e->next)
            add_entry(&t, e);
    }
    add_flasks(&t);
    text_add(&t, "\nEVERY KEY OF A SCENARIO  default, and what it may be; meaning [source]\n\n");
    for (size_t id = 0; id < KEYS_SECTIONS; id++)
        add_section(&t, keys_section((enum keys_id)id));
    const bool written = !t.failed && fputs(t.bytes, out) >= 0 && fflush(out) == 0;
    free(t.bytes);
    return written ? 0 : 1;
}

static json_t *json_entry(const struct record *entry)
{
    json_t *object = json_pack("{s:s}", "name", entry->name);
    for (size_t i = 0; object && i < keys_count(entry->section); i++) {
        const struct keys_row *row = keys_row(entry->section, i);
        const struct value *v = &entry->values[i];
        if (is_hidden(row) || v->state != VALUE_GOOD)
            continue;
        json_object_set_new(object, row->key,
                            json_pack("{s:s, s:s}", "value", v->text, "source", v->source ? v->source : "yours"));
    }
    return object;
}

static json_t *json_key(const struct keys_row *row)
{
    char range[KEYS_RANGE];
    json_t *object = json_pack("{s:s, s:s?, s:s}", "key", row->key, "default", row->fallback, "unit", row->unit);
    if (row->kind == KEYS_QUANTITY || row->kind == KEYS_COUNT)
        json_object_set_new(object, "range", json_string(keys_range(row, range)));
    json_t *options = row->words ? json_array() : NULL;
    for (const struct keys_word *w = row->words; w && w->word; w++)
        if (!w->later)
            json_array_append_new(options, json_string(w->word));
    if (options)
        json_object_set_new(object, "options", options);
    if (row->none)
        json_object_set_new(object, "without", json_string(row->none));
    json_object_set_new(object, "help", json_string(row->help));
    json_object_set_new(object, "source", json_string(row->source));
    return object;
}

static json_t *json_flasks(void)
{
    json_t *list = json_array();
    for (size_t i = 0; i < GLASSWARE_FLASKS; i++)
        json_array_append_new(list, json_pack("{s:f, s:{s:f, s:f}}", "volume_mL", say_mL(glassware_flask_volume(i)),
                                              "tolerance_mL", "A", say_mL(glassware_flask_tolerance(i, GLASS_A)), "B",
                                              say_mL(glassware_flask_tolerance(i, GLASS_B))));
    return list;
}

json_t *kit_print_json(const struct scenario *s, const char *version)
{
    const struct kit *kit = scenario_kit(s);
    json_t *root = json_pack("{s:s, s:s, s:s, s:{}, s:o, s:{}}", "program", "vicinal", "version", version, "verb",
                             "kit", "kit", "flasks", json_flasks(), "keys");
    for (size_t id = KEYS_GRADES; root && id <= KEYS_BENCHES; id++) {
        json_t *list = json_array();
        for (const struct record *e = kit->first[id]; e; e = e->next)
            json_array_append_new(list, json_entry(e));
        json_object_set_new(json_object_get(root, "kit"), keys_stem(keys_section((enum keys_id)id)), list);
    }
    for (size_t id = 0; root && id < KEYS_SECTIONS; id++) {
        const struct keys_section *section = keys_section((enum keys_id)id);
        json_t *list = json_array();
        for (size_t i = 0; i < keys_count(section); i++)
            json_array_append_new(list, json_key(keys_row(section, i)));
        json_object_set_new(json_object_get(root, "keys"), section->path[0] ? section->path : "top", list);
    }
    return root;
}
