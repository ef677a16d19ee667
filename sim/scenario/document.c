#include "sim/scenario/document.h"

#include <errno.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <yaml.h>

#include "sim/base/text.h"

/* One reading; `failed` once something was refused that ends it. */
struct document_reader {
    yaml_parser_t parser;
    struct arena *arena;
    const struct document_input *input;
    struct complaints *out;
    bool failed;
};

const char *document_kind_text(enum document_kind kind)
{
    return kind == DOCUMENT_MAP ? "a map" : kind == DOCUMENT_LIST ? "a list" : "a single value";
}

struct document_node *document_child(const struct document_node *map, const char *key)
{
    if (!map || map->kind != DOCUMENT_MAP)
        return NULL;
    for (struct document_node *n = map->children; n; n = n->next)
        if (strcmp(n->key, key) == 0)
            return n;
    return NULL;
}

static void document_append(struct document_node *parent, struct document_node *child)
{
    if (parent->last)
        parent->last->next = child;
    else
        parent->children = child;
    parent->last = child;
    parent->count++;
}

struct document_node *document_add(struct arena *a, struct document_node *parent, const char *key)
{
    struct document_node *child = arena_take(a, 1, sizeof *child);
    if (!child)
        return NULL;
    child->key = key;
    document_append(parent, child);
    return child;
}

static struct place document_place(const struct document_reader *r, yaml_mark_t mark)
{
    struct place p = r->input->place;
    if (!p.file)
        return p;
    p.line = mark.line + 1;
    p.column = mark.column + 1;
    return p;
}

static void document_fail(struct document_reader *r, struct place where, const char *text)
{
    if (!r->failed)
        complain_at(r->out, where, "%s", text);
    r->failed = true;
}

static void document_fail_memory(struct document_reader *r)
{
    complain_memory(r->out);
    r->failed = true;
}

/* libyaml's own refusals. A byte that is no text has an offset only. */
static void document_fail_parser(struct document_reader *r)
{
    const yaml_parser_t *p = &r->parser;
    struct place where = document_place(r, p->problem_mark);
    if (p->error == YAML_MEMORY_ERROR) {
        document_fail_memory(r);
        return;
    }
    if (p->error != YAML_READER_ERROR) {
        if (!r->failed)
            complain_at(r->out, where, "not YAML: %s%s%s", p->problem ? p->problem : "unreadable",
                        p->context ? ", " : "", p->context ? p->context : "");
        r->failed = true;
        return;
    }
    if (where.file) {
        where.line = where.column = 1;
        for (size_t i = 0; i < p->problem_offset && i < r->input->size; i++) {
            if (r->input->bytes[i] == '\n')
                where.line++, where.column = 1;
            else
                where.column++;
        }
    }
    document_fail(r, where, "not a text file: a byte that is no UTF-8 text or a control character");
}

static bool document_next(struct document_reader *r, yaml_event_t *event)
{
    if (r->failed)
        return false;
    if (!yaml_parser_parse(&r->parser, event)) {
        document_fail_parser(r);
        return false;
    }
    const yaml_char_t *anchor = NULL, *tag = NULL;
    switch (event->type) {
    case YAML_ALIAS_EVENT:
        anchor = event->data.alias.anchor;
        break;
    case YAML_SCALAR_EVENT:
        anchor = event->data.scalar.anchor, tag = event->data.scalar.tag;
        break;
    case YAML_SEQUENCE_START_EVENT:
        anchor = event->data.sequence_start.anchor, tag = event->data.sequence_start.tag;
        break;
    case YAML_MAPPING_START_EVENT:
        anchor = event->data.mapping_start.anchor, tag = event->data.mapping_start.tag;
        break;
    default:
        break;
    }
    if (anchor)
        document_fail(r, document_place(r, event->start_mark), "anchors and aliases (& and *) are not taken");
    if (tag)
        document_fail(r, document_place(r, event->start_mark), "tags (!) are not taken");
    if (r->failed)
        yaml_event_delete(event);
    return !r->failed;
}

static bool document_fill(struct document_reader *r, struct document_node *node, const yaml_event_t *event, int depth);

static bool document_is_null(const yaml_event_t *event)
{
    const char *text = (const char *)event->data.scalar.value;
    if (event->data.scalar.style != YAML_PLAIN_SCALAR_STYLE)
        return false;
    return !*text || strcmp(text, "~") == 0 || strcmp(text, "null") == 0;
}

static bool document_fill_text(struct document_reader *r, struct document_node *node, const yaml_event_t *event)
{
    node->kind = DOCUMENT_TEXT;
    node->null = document_is_null(event);
    const char *value = (const char *)event->data.scalar.value;
    if (strlen(value) != event->data.scalar.length) {
        document_fail(r, node->place, "a value with a zero byte in it");
        return false;
    }
    node->text = arena_copy(r->arena, value, event->data.scalar.length);
    if (!node->text)
        document_fail_memory(r);
    return node->text != NULL;
}

/* A node for the event, a value that begins, at the end of `parent`. */
static bool document_take(struct document_reader *r, struct document_node *parent, const struct document_node *key,
                          const yaml_event_t *event, int depth)
{
    struct document_node *child = arena_take(r->arena, 1, sizeof *child);
    if (!child) {
        document_fail_memory(r);
        return false;
    }
    child->place = document_place(r, event->start_mark);
    child->origin = r->input->origin;
    if (key)
        child->key = key->text, child->key_place = key->place;
    if (parent->count >= DOCUMENT_WIDTH)
        document_fail(r, child->place, "more entries side by side than any scenario has");
    const struct document_node *same = key ? document_child(parent, key->text) : NULL;
    char shown[TEXT_SHOWN];
    if (same && !r->failed)
        complain_at(r->out, key->place, "`%s` is given twice", text_shown(shown, key->text));
    if (r->failed || !document_fill(r, child, event, depth))
        return false;
    if (!same)
        document_append(parent, child);
    return true;
}

static bool document_fill_list(struct document_reader *r, struct document_node *node, int depth)
{
    yaml_event_t event;
    node->kind = DOCUMENT_LIST;
    while (document_next(r, &event)) {
        const bool end = event.type == YAML_SEQUENCE_END_EVENT;
        const bool good = end || document_take(r, node, NULL, &event, depth + 1);
        yaml_event_delete(&event);
        if (end || !good)
            return good;
    }
    return false;
}

static bool document_fill_map(struct document_reader *r, struct document_node *node, int depth)
{
    yaml_event_t event;
    node->kind = DOCUMENT_MAP;
    while (document_next(r, &event)) {
        struct document_node key = {.place = document_place(r, event.start_mark)};
        const bool end = event.type == YAML_MAPPING_END_EVENT, text = event.type == YAML_SCALAR_EVENT;
        if (!end && !text)
            document_fail(r, key.place, "a key is a word, no list and no map");
        bool good = end || (text && document_fill_text(r, &key, &event));
        yaml_event_delete(&event);
        if (end || !good)
            return good;
        good = document_next(r, &event);
        if (!good)
            return false;
        good = document_take(r, node, &key, &event, depth + 1);
        yaml_event_delete(&event);
        if (!good)
            return false;
    }
    return false;
}

static bool document_fill(struct document_reader *r, struct document_node *node, const yaml_event_t *event, int depth)
{
    if (depth > DOCUMENT_DEPTH) {
        document_fail(r, node->place, "nested deeper than any scenario is");
        return false;
    }
    if (event->type == YAML_SEQUENCE_START_EVENT)
        return document_fill_list(r, node, depth);
    if (event->type == YAML_MAPPING_START_EVENT)
        return document_fill_map(r, node, depth);
    return document_fill_text(r, node, event);
}

/* The whole stream: its start, one document, its end. NULL: refused, or
 * (not failed) nothing there. */
static struct document_node *document_stream(struct document_reader *r)
{
    struct document_node *root = arena_take(r->arena, 1, sizeof *root);
    yaml_event_t event;
    bool whole = false;
    if (!root)
        document_fail_memory(r);
    while (document_next(r, &event)) {
        const struct place where = document_place(r, event.start_mark);
        const yaml_event_type_t type = event.type;
        if (type == YAML_DOCUMENT_START_EVENT && whole)
            document_fail(r, where, "a second document (---); a scenario is one");
        else if (type == YAML_SCALAR_EVENT || type == YAML_SEQUENCE_START_EVENT || type == YAML_MAPPING_START_EVENT) {
            root->place = where;
            root->origin = r->input->origin;
            whole = document_fill(r, root, &event, 1);
        }
        yaml_event_delete(&event);
        if (type == YAML_STREAM_END_EVENT)
            break;
    }
    return whole && !r->failed ? root : NULL;
}

struct document_node *document_parse(struct arena *a, const struct document_input *input, struct complaints *out)
{
    struct document_reader r = {.arena = a, .input = input, .out = out};
    if (!yaml_parser_initialize(&r.parser)) {
        complain_memory(out);
        return NULL;
    }
    yaml_parser_set_encoding(&r.parser, YAML_UTF8_ENCODING);
    const size_t mark = input->size >= 3 && memcmp(input->bytes, "\xef\xbb\xbf", 3) == 0
                            ? 3
                            : 0; /* libyaml would count it as a column */
    yaml_parser_set_input_string(&r.parser, (const unsigned char *)input->bytes + mark, input->size - mark);
    struct document_node *root = document_stream(&r);
    yaml_parser_delete(&r.parser);
    if (!root && !r.failed)
        complain_at(out, input->place, input->place.file ? "there is nothing in it" : "no value is given");
    return root;
}

struct document_node *document_read(struct arena *a, const char *path, struct complaints *out)
{
    const struct place place = {.file = path};
    FILE *file = fopen(path, "rb");
    if (!file) {
        complain_at(out, place, "cannot be read: %s", strerror(errno));
        return NULL;
    }
    char *bytes = malloc(DOCUMENT_BYTES + 1);
    struct document_node *root = NULL;
    errno = 0;
    const size_t size = bytes ? fread(bytes, 1, DOCUMENT_BYTES + 1, file) : 0;
    if (!bytes)
        complain_memory(out);
    else if (ferror(file))
        complain_at(out, place, "cannot be read: %s", strerror(errno));
    else if (size > DOCUMENT_BYTES)
        complain_at(out, place, "larger than 1 MiB, which no scenario is");
    else
        root = document_parse(a, &(struct document_input){bytes, size, place, DOCUMENT_FILE}, out);
    free(bytes);
    fclose(file);
    return root;
}
