/* A YAML document as a tree that knows where each value stands.
 *
 * Taken: one document of maps, lists and scalars.  Refused, with the place:
 * anchors and aliases, tags, several documents, keys that are no plain text,
 * a key given twice, more than DOCUMENT_DEPTH levels, more than
 * DOCUMENT_WIDTH entries side by side, more than DOCUMENT_BYTES, bytes that
 * are no UTF-8 text, a directory, an empty file. */
#ifndef VICINAL_SCENARIO_DOCUMENT_H
#define VICINAL_SCENARIO_DOCUMENT_H

#include <stdbool.h>
#include <stddef.h>

#include "sim/base/arena.h"
#include "sim/base/complain.h"

enum { DOCUMENT_DEPTH = 20, DOCUMENT_WIDTH = 1000, DOCUMENT_BYTES = 1 << 20 };

enum document_kind { DOCUMENT_TEXT, DOCUMENT_LIST, DOCUMENT_MAP };

/* Where a value comes from. */
enum document_origin { DOCUMENT_FILE, DOCUMENT_DEFAULT, DOCUMENT_SET, DOCUMENT_PICK, DOCUMENT_KIT };

/* A value, and the key it stands under when it is in a map.  Lives in the
 * arena it was read into, with its texts. */
struct document_node {
    enum document_kind kind;
    enum document_origin origin;
    struct place place, key_place;
    const char *key;    /* NULL in a list and at the root */
    const char *text;   /* of DOCUMENT_TEXT */
    bool null;          /* nothing, ~ or null, unquoted */
    bool made;          /* by --set, on its way to something inside */
    bool number;        /* of a resolved scenario: a number, for JSON */
    const char *source; /* where a value of the built-in kit comes from, else NULL */
    struct document_node *children, *last, *next;
    size_t count;
};

/* What is to be read: bytes, and the place to give all of them (a file's
 * name; or the option, and then every node has that place). */
struct document_input {
    const char *bytes;
    size_t size;
    struct place place;
    enum document_origin origin;
};

/* NULL: `out` says why. */
struct document_node *document_read(struct arena *a, const char *path, struct complaints *out);
struct document_node *document_parse(struct arena *a, const struct document_input *input, struct complaints *out);

/* The value under a key of a map; NULL when there is none, or it is no map. */
struct document_node *document_child(const struct document_node *map, const char *key);

/* A new node behind the last one of a map (key given) or list (key NULL).
 * NULL: out of memory. */
struct document_node *document_add(struct arena *a, struct document_node *parent, const char *key);

/* "a map", "a list", "a single value". */
const char *document_kind_text(enum document_kind kind);

#endif
