#include "sim/report/svg.h"

#include <string.h>

#include "sim/report/html.h"

/* The elements that gnuplot draws with. */
static const char *const known[] = {"svg",      "g",       "defs",        "path",    "rect",           "circle",
                                    "use",      "polygon", "text",        "tspan",   "title",          "desc",
                                    "filter",   "feFlood", "feComposite", "pattern", "linearGradient", "stop",
                                    "clipPath", "line",    "polyline",    "ellipse"};

static bool among(const char *name, size_t length)
{
    for (size_t i = 0; i < sizeof known / sizeof *known; i++)
        if (strlen(known[i]) == length && strncmp(known[i], name, length) == 0)
            return true;
    return false;
}

static const char *find(const char *from, const char *end, const char *word)
{
    const size_t length = strlen(word);
    for (; from + length <= end; from++)
        if (memcmp(from, word, length) == 0)
            return from;
    return NULL;
}

/* Only elements that are known, and no attribute that is obeyed on an event. */
static bool harmless(const char *from, const char *end)
{
    for (const char *at = from; (at = memchr(at, '<', (size_t)(end - at)));) {
        at += at + 1 < end && at[1] == '/' ? 2 : 1;
        const char *close = memchr(at, '>', (size_t)(end - at));
        size_t length = 0;
        if (!close)
            return false;
        while (at + length < close && !strchr(" \t\r\n/", at[length]))
            length++;
        if (!among(at, length) || find(at, close, " on") || find(at, close, "\non") || find(at, close, "\ton"))
            return false;
        at = close;
    }
    return true;
}

/* The tag from `<` to behind `>`, its ids with the name before them. */
static const char *tag(FILE *to, const char *at, const char *end, const char *name)
{
    static const char *const before[] = {" id='", " id=\"", "\tid='", "href='#", "href=\"#", "url(#"};
    while (at < end && *at != '>') {
        bool found = false;
        for (size_t i = 0; i < sizeof before / sizeof *before && !found; i++) {
            const size_t length = strlen(before[i]);
            found = at + length <= end && memcmp(at, before[i], length) == 0;
            if (found) {
                fprintf(to, "%.*s%s-", (int)length, at, name);
                at += length;
            }
        }
        if (!found)
            fputc(*at++, to);
    }
    fputc('>', to);
    return at + 1;
}

/* Behind an element that is left out, or where it began when it is another. */
static const char *skip(const char *at, const char *end, const char *open, const char *close)
{
    const size_t length = strlen(open);
    if (at + length > end || memcmp(at, open, length) != 0)
        return at;
    const char *last = find(at, end, close);
    return last ? last + strlen(close) : at;
}

bool svg_inline(FILE *to, const struct svg *svg)
{
    const char *end = svg->bytes + svg->size;
    const char *at = find(svg->bytes, end, "<svg");
    if (!at || !find(at, end, "</svg>") || !harmless(at, end))
        return false;
    fputs("<svg role=\"img\" aria-label=\"", to);
    html_text(to, svg->shows);
    fputc('"', to);
    at = tag(to, at + strlen("<svg"), end, svg->name);
    while (at < end) {
        const char *next = skip(skip(at, end, "<title>", "</title>"), end, "<desc>", "</desc>");
        if (next != at)
            at = next;
        else if (*at == '<')
            at = tag(to, at, end, svg->name);
        else
            fputc(*at++, to);
    }
    return true;
}
