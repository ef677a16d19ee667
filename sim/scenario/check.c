#include "sim/scenario/check.h"

#include <math.h>
#include <string.h>

#include "models/glassware.h"
#include "sim/base/text.h"
#include "sim/scenario/choices.h"
#include "sim/scenario/kit.h"
#include "sim/scenario/record.h"

static void check_question(const struct reading *r, const struct record *q)
{
    const struct value *expect = record_value(q, "expect"), *against = record_value(q, "against"),
                       *within = record_value(q, "within");
    if (q->bad)
        return;
    if (expect->state == VALUE_ABSENT)
        complain_at(r->out, q->place,
                    "question.expect is missing: the head-to-head fraction the polymer is thought to have, for example "
                    "expect: 1.5 %%");
    if (against->state == VALUE_ABSENT && within->state == VALUE_ABSENT)
        complain_at(r->out, q->place,
                    "question.against and question.within are both missing: tell the fraction apart from which other, "
                    "or come within what of the truth?");
    if (fabs(expect->number - against->number) <= 1e-12)
        complain_at(r->out, against->place,
                    "`against` and `expect` are the same fraction; there is nothing to tell apart");
}

/* One value must be below another; said where one of them is given. */
static void check_below(const struct reading *r, const struct record *record, const char *low, const char *high,
                        bool or_equal)
{
    const struct value *x = record_value(record, low), *y = record_value(record, high);
    const bool broken = or_equal ? x->number > y->number : x->number >= y->number;
    if (broken && (x->own || y->own))
        complain_at(r->out, y->own ? y->place : x->place, "`%s` is %s and `%s` is %s; the first must be %s the second",
                    low, x->text, high, y->text, or_equal ? "at most" : "below");
}

static void check_tube(const struct reading *r, const struct record *tube)
{
    const struct value *E = record_value(tube, "E"), *B = record_value(tube, "B");
    const double ends = record_number(tube, "ends");
    if (E->state == VALUE_GOOD && ends > TUBE_FLARED)
        complain_at(r->out, E->place, "`E` belongs to flared ends, and those of %s are square; give B, or neither",
                    tube->name);
    if (B->state == VALUE_GOOD && ends <= TUBE_FLARED)
        complain_at(r->out, B->place, "`B` belongs to square ends, and those of %s are flared; give E, or neither",
                    tube->name);
    check_below(r, tube, "charge", "capacity", true);
    check_below(r, tube, "offset", "head", false);
}

static void check_grade(const struct reading *r, const struct record *grade)
{
    const struct value *d = record_value(grade, "dispersity"), *kind = record_value(grade, "distribution");
    const bool given = d->state == VALUE_GOOD;
    if (kind->state != VALUE_GOOD)
        return;
    switch ((enum chains_kind)kind->number) {
    case CHAINS_MOST_PROBABLE:
        if (given && fabs(d->number - 2.0) > 1e-9)
            complain_at(r->out, d->place, "`dispersity` is %s; most-probable chains have 2 and no other", d->text);
        break;
    case CHAINS_UNIFORM:
        if (given && fabs(d->number - 1.0) > 1e-9)
            complain_at(r->out, d->place, "`dispersity` is %s; uniform chains have 1 and no other", d->text);
        break;
    default:
        if (d->state == VALUE_ABSENT)
            complain_at(r->out, kind->place, "`distribution: %s` needs a `dispersity`, for example 1.8", kind->text);
        else if (given && d->number < 1.001)
            complain_at(r->out, d->place, "`dispersity` is %s; with %s it must be at least 1.001", d->text, kind->text);
        break;
    }
}

/* With several materials each brings its own values. */
static void check_materials(const struct reading *r, const struct scenario *s)
{
    const struct keys_section *own = keys_section(KEYS_MATERIALS);
    const struct record *polymer = s->sections[KEYS_POLYMER];
    if (choices_find(s, "material")->count < 2)
        return;
    for (size_t i = 0; i < keys_count(polymer->section); i++) {
        const char *key = keys_row(polymer->section, i)->key;
        if (polymer->values[i].own && strcmp(key, "material") != 0 && keys_find(own, key) < keys_count(own))
            complain_at(r->out, polymer->values[i].place,
                        "`%s` is given here, but plan.material has more than one; give it in kit.materials", key);
    }
}

static void check_kit(const struct reading *r, const struct kit *kit)
{
    for (const struct record *e = kit->first[KEYS_TUBES]; e; e = e->next)
        check_tube(r, e);
    for (const struct record *e = kit->first[KEYS_GRADES]; e; e = e->next)
        check_grade(r, e);
    for (const struct record *e = kit->first[KEYS_MATERIALS]; e; e = e->next)
        check_below(r, e, "valid_from", "valid_to", false);
}

/* A flask that is not made has no tolerance of its class. */
static void check_flask(const struct reading *r, const struct record *solutions, const char *volume,
                        const char *tolerance)
{
    const struct value *v = record_value(solutions, volume);
    double by_class;
    const bool made = !(v->number > 0.0) || glassware_tolerance_of(v->number, GLASS_A, &by_class);
    if (!made && record_number(solutions, tolerance) < 0.0)
        complain_at(r->out, v->own ? v->place : solutions->place,
                    "`%s` is %s, which no one-mark flask has (10, 25, 50, 100, 200, 250, 500, 1000 mL); give `%s` too",
                    volume, v->text, tolerance);
}

static bool check_any_above_one(const struct choice *levels)
{
    for (size_t i = 0; i < levels->count; i++)
        if (levels->options[i].number > 1.5)
            return true;
    return false;
}

static void check_levels(const struct reading *r, const struct scenario *s)
{
    const struct choice *lowest = choices_find(s, "lowest");
    if (!check_any_above_one(choices_find(s, "levels")) && !check_any_above_one(choices_find(s, "levels_cleaved")))
        return;
    for (size_t i = 0; i < lowest->count; i++)
        if (lowest->options[i].number >= 1.0)
            complain_at(r->out, lowest->options[i].place,
                        "`lowest` is %s, so that all levels have one concentration; it must be below 1 with more than "
                        "one level",
                        lowest->options[i].text);
}

static void check_owned_name(const struct reading *r, const struct kit *kit, const struct document_node *n)
{
    static const enum keys_id kinds[] = {KEYS_TUBES, KEYS_BATHS, KEYS_THERMOMETERS, KEYS_TIMERS};
    char shown[TEXT_SHOWN];
    if (n->kind != DOCUMENT_TEXT || n->null) {
        complain_at(r->out, n->place, "`owned` is a list of names");
        return;
    }
    struct text_nearest nearest = {.word = n->text};
    for (size_t i = 0; i < sizeof kinds / sizeof *kinds; i++) {
        if (kit_find(kit, kinds[i], n->text))
            return;
        for (const struct record *e = kit->first[kinds[i]]; e; e = e->next)
            text_nearest_try(&nearest, e->name);
    }
    text_shown(shown, n->text);
    if (nearest.best)
        complain_at(r->out, n->place, "`owned`: no tube, bath, thermometer or timer `%s`; did you mean `%s`?", shown,
                    nearest.best);
    else
        complain_at(r->out, n->place, "`owned`: no tube, bath, thermometer or timer `%s`; `vicinal kit` lists them",
                    shown);
}

static void check_owned(const struct reading *r, const struct scenario *s)
{
    const struct document_node *given = record_value(s->sections[KEYS_COST], "owned")->node;
    if (!given || (given->kind == DOCUMENT_TEXT && given->null))
        return;
    if (given->kind != DOCUMENT_LIST)
        check_owned_name(r, &s->kit, given);
    else
        for (const struct document_node *n = given->children; n; n = n->next)
            check_owned_name(r, &s->kit, n);
}

void check_scenario(const struct reading *r, const struct scenario *s)
{
    check_question(r, s->sections[KEYS_QUESTION]);
    check_kit(r, &s->kit);
    check_below(r, s->sections[KEYS_POLYMER], "valid_from", "valid_to", false);
    check_flask(r, s->sections[KEYS_SOLUTIONS], "stock_volume", "stock_tolerance");
    check_flask(r, s->sections[KEYS_SOLUTIONS], "level_volume", "level_tolerance");
    check_materials(r, s);
    check_levels(r, s);
    check_owned(r, s);
}
