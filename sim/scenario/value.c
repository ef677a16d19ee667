#include "sim/scenario/value.h"

#include <ctype.h>
#include <math.h>
#include <string.h>

#include "sim/base/text.h"

enum { VALUE_NAME = 60 };

/* A refusal; always false. */
static bool value_refuse(const struct reading *r, const struct value *v, const struct keys_row *row, const char *text)
{
    complain_at(r->out, v->place, "`%s`: %s", row->key, text);
    return false;
}

static bool value_refuse_range(const struct reading *r, const struct value *v, const struct keys_row *row)
{
    char shown[TEXT_SHOWN], range[KEYS_RANGE];
    double number;
    const char *rest = units_number(v->text, &number);
    const bool bare = rest && !*rest && row->dimension == UNITS_FRACTION && number >= row->min && number <= row->max;
    if (bare)
        complain_at(r->out, v->place, "`%s` is %s, which is %g %%; the range is %s: write %s %%?", row->key, v->text,
                    100.0 * number, keys_range(row, range), v->text);
    else
        complain_at(r->out, v->place, "`%s` is %s; the range is %s%s%s", row->key, text_shown(shown, v->text),
                    keys_range(row, range), row->hint ? ": " : "", row->hint ? row->hint : "");
    return false;
}

static bool value_refuse_later(const struct reading *r, const struct value *v, const struct keys_row *row)
{
    char shown[TEXT_SHOWN];
    complain_at(r->out, v->place, "`%s: %s` is not in this version", row->key, text_shown(shown, v->text));
    return false;
}

/* Within the limits, but for rounding in the change of units. */
static bool value_check_range(const struct reading *r, const struct value *v, const struct keys_row *row)
{
    const double min = units_si(r->units, row->dimension, row->unit, row->min),
                 max = units_si(r->units, row->dimension, row->unit, row->max);
    const double least = min - 1e-12 * fabs(min), most = max + 1e-12 * fabs(max);
    if (!isfinite(least) || !isfinite(most))
        complain_memory(r->out); /* the table's own units are good */
    const bool above = row->flags & KEYS_ABOVE_MIN ? v->number > 2.0 * min - least : v->number >= least;
    if (above && v->number <= most)
        return true;
    if (above && row->later_max > row->max && v->number <= row->later_max)
        return value_refuse_later(r, v, row);
    return value_refuse_range(r, v, row);
}

/* The word of a row, or NULL. */
static const struct keys_word *value_word(const struct keys_row *row, const char *text)
{
    for (const struct keys_word *w = row->words; w && w->word; w++)
        if (strcmp(w->word, text) == 0)
            return w;
    return NULL;
}

static bool value_read_choice(const struct reading *r, struct value *v, const struct keys_row *row)
{
    const struct keys_word *word = value_word(row, v->text);
    if (word && word->later)
        return value_refuse_later(r, v, row);
    if (word) {
        v->number = word->value;
        return true;
    }
    char shown[TEXT_SHOWN], words[KEYS_WORDS];
    struct text_nearest nearest = {.word = v->text};
    for (const struct keys_word *w = row->words; w->word; w++)
        if (!w->later)
            text_nearest_try(&nearest, w->word);
    complain_at(r->out, v->place, "`%s` has no option `%s`; it is %s%s%s%s", row->key, text_shown(shown, v->text),
                keys_words(row, words), nearest.best ? ": did you mean `" : "", nearest.best ? nearest.best : "",
                nearest.best ? "`?" : "");
    return false;
}

static bool value_read_quantity(const struct reading *r, struct value *v, const struct keys_row *row)
{
    double sample;
    const char *example = row->fallback && units_number(row->fallback, &sample) ? row->fallback : NULL;
    struct units_why why;
    if (units_read(r->units, (struct units_want){row->dimension, row->unit, example}, v->text, &v->number, &why))
        return value_check_range(r, v, row);
    char words[KEYS_WORDS];
    if (row->words)
        complain_at(r->out, v->place, "`%s`: %s, or write %s", row->key, why.text, keys_words(row, words));
    else
        value_refuse(r, v, row, why.text);
    return false;
}

static bool value_read_count(const struct reading *r, struct value *v, const struct keys_row *row)
{
    const char *rest = units_number(v->text, &v->number);
    char shown[TEXT_SHOWN], range[KEYS_RANGE], words[KEYS_WORDS];
    if (rest && !*rest && fabs(v->number - floor(v->number)) <= 0.0)
        return value_check_range(r, v, row);
    complain_at(r->out, v->place, "`%s` is a whole number, %s%s%s; not `%s`", row->key, keys_range(row, range),
                row->words ? ", or " : "", row->words ? keys_words(row, words) : "", text_shown(shown, v->text));
    return false;
}

static bool value_read_text(const struct reading *r, const struct value *v, const struct keys_row *row)
{
    if (strlen(v->text) > (size_t)row->max)
        return value_refuse(r, v, row, "a shorter text, please");
    return text_is_clean(v->text) || value_refuse(r, v, row, "one line of text is wanted");
}

static bool value_read_name(const struct reading *r, const struct value *v, const struct keys_row *row)
{
    const size_t size = strlen(v->text);
    bool good = size > 0 && size <= VALUE_NAME && text_is_clean(v->text);
    for (const char *p = v->text; *p; p++)
        good = good && (isalnum((unsigned char)*p) || *p == '-' || *p == '_' || (unsigned char)*p >= 0x80);
    return good || value_refuse(r, v, row, "a name is made of letters, digits, - and _, at most 60 of them");
}

static bool value_read_kind(const struct reading *r, struct value *v, const struct keys_row *row)
{
    const struct keys_word *word = row->kind == KEYS_CHOICE ? NULL : value_word(row, v->text);
    if (word) {
        v->number = word->value;
        return true;
    }
    switch (row->kind) {
    case KEYS_QUANTITY:
        return value_read_quantity(r, v, row);
    case KEYS_COUNT:
        return value_read_count(r, v, row);
    case KEYS_CHOICE:
        return value_read_choice(r, v, row);
    case KEYS_TEXT:
        return value_read_text(r, v, row);
    case KEYS_NEW_NAME:
    case KEYS_ENTRY:
        return value_read_name(r, v, row);
    case KEYS_OWNED:
    case KEYS_AT_MOST:
        break;
    }
    return true;
}

struct value value_read(const struct reading *r, const struct keys_row *row, const struct document_node *given)
{
    struct value v = {.state = VALUE_BAD,
                      .origin = given->origin,
                      .own = true,
                      .place = given->place,
                      .text = given->text,
                      .source = given->source,
                      .number = (double)NAN,
                      .node = given};
    if (row->kind == KEYS_OWNED || row->kind == KEYS_AT_MOST)
        v.state = VALUE_GOOD;
    else if (given->kind != DOCUMENT_TEXT)
        complain_at(r->out, v.place, "`%s` takes a single value, not %s", row->key, document_kind_text(given->kind));
    else if (given->null)
        complain_at(r->out, v.place, "`%s` has no value; leave the key out for its default", row->key);
    else if (value_read_kind(r, &v, row))
        v.state = VALUE_GOOD;
    return v;
}

struct value value_default(const struct reading *r, const struct keys_row *row)
{
    struct value v = {.origin = DOCUMENT_DEFAULT,
                      .place = r->whole,
                      .text = row->fallback,
                      .source = row->source,
                      .number = (double)NAN};
    if (!row->fallback || row->kind == KEYS_OWNED || row->kind == KEYS_AT_MOST)
        return v;
    v.state = value_read_kind(r, &v, row) ? VALUE_GOOD : VALUE_BAD;
    return v;
}

bool value_same(const struct keys_row *row, const struct value *a, const struct value *b)
{
    if (row->kind == KEYS_TEXT || row->kind == KEYS_NEW_NAME || row->kind == KEYS_ENTRY)
        return strcmp(a->text, b->text) == 0;
    return !(a->number < b->number) && !(a->number > b->number) && isfinite(a->number) == isfinite(b->number);
}
