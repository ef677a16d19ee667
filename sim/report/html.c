#include "sim/report/html.h"

void html_text(FILE *to, const char *text)
{
    for (; *text; text++) {
        const unsigned char c = (unsigned char)*text;
        switch (c) {
        case '&':
            fputs("&amp;", to);
            break;
        case '<':
            fputs("&lt;", to);
            break;
        case '>':
            fputs("&gt;", to);
            break;
        case '"':
            fputs("&quot;", to);
            break;
        case '\'':
            fputs("&#39;", to);
            break;
        default:
            fputc(c < ' ' || c == 0x7F ? ' ' : c, to);
        }
    }
}
