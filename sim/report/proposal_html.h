/* The report's Markdown as one page of HTML that needs nothing from outside. */
#ifndef VICINAL_REPORT_PROPOSAL_HTML_H
#define VICINAL_REPORT_PROPOSAL_HTML_H

#include <stdbool.h>
#include <stddef.h>
#include <stdio.h>

/* The page's style and script (proposal.css, proposal.js), linked into the
 * program, with a zero behind them. */
extern const unsigned char vicinal_proposal_css[], vicinal_proposal_js[];

/* Markdown, and where its figures lie. */
struct proposal_html {
    const char *markdown;
    size_t size;
    const char *title;
    const char *folder; /* an image that stands alone and whose file is an SVG here becomes part of the page */
};

/* Turned by cmark-gfm, in its safe way: HTML in the Markdown and dangerous links
 * are left out. Headings of the second level get an id and a place in the
 * contents, table headings a scope. False: out of memory. */
bool proposal_html_print(FILE *to, const struct proposal_html *page);

#endif
