/* Text as HTML. */
#ifndef VICINAL_REPORT_HTML_H
#define VICINAL_REPORT_HTML_H

#include <stdio.h>

/* Write a text so that a browser shows it as it stands and obeys nothing in
 * it, in an element or a quoted attribute; control characters become blanks. */
void html_text(FILE *to, const char *text);

#endif
