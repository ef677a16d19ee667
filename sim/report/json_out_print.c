#include "sim/report/json_out_print.h"

#include <stdbool.h>
#include <stdlib.h>
#include <string.h>

#include "sim/report/say.h"

static void print(FILE *to, json_t *value, int depth);

static void line(FILE *to, int depth)
{
    fprintf(to, "\n%*s", 2 * depth, "");
}

static void print_string(FILE *to, const json_t *value)
{
    char *text = json_dumps(value, JSON_ENCODE_ANY);
    fputs(text ? text : "\"\"", to);
    free(text);
}

static void print_key(FILE *to, const char *key)
{
    json_t *name = json_string(key);
    if (name)
        print_string(to, name);
    json_decref(name);
    fputs(": ", to);
}

/* Whole reals keep a point, as jansson writes them, so that they stay reals. */
static void print_real(FILE *to, double x)
{
    const struct say s = say_number(x);
    fputs(s.text, to);
    if (!strpbrk(s.text, ".e"))
        fputs(".0", to);
}

static void print_array(FILE *to, json_t *array, int depth)
{
    const size_t count = json_array_size(array);
    bool flat = true;
    for (size_t i = 0; i < count; i++)
        if (!json_is_number(json_array_get(array, i)))
            flat = false;
    fputc('[', to);
    for (size_t i = 0; i < count; i++) {
        if (i > 0)
            fputs(flat ? ", " : ",", to);
        if (!flat)
            line(to, depth + 1);
        print(to, json_array_get(array, i), depth + 1);
    }
    if (count > 0 && !flat)
        line(to, depth);
    fputc(']', to);
}

static void print_object(FILE *to, json_t *object, int depth)
{
    const char *key;
    json_t *item;
    bool first = true;
    fputc('{', to);
    json_object_foreach(object, key, item)
    {
        if (!first)
            fputc(',', to);
        first = false;
        line(to, depth + 1);
        print_key(to, key);
        print(to, item, depth + 1);
    }
    if (!first)
        line(to, depth);
    fputc('}', to);
}

static void print(FILE *to, json_t *value, int depth)
{
    if (json_is_object(value))
        print_object(to, value, depth);
    else if (json_is_array(value))
        print_array(to, value, depth);
    else if (json_is_real(value))
        print_real(to, json_real_value(value));
    else if (json_is_integer(value))
        fprintf(to, "%" JSON_INTEGER_FORMAT, json_integer_value(value));
    else if (json_is_string(value))
        print_string(to, value);
    else
        fputs(json_is_true(value) ? "true" : json_is_false(value) ? "false" : "null", to);
}

void json_out_print(FILE *to, json_t *value)
{
    print(to, value, 0);
    fputc('\n', to);
}
