/* JSON as text. */
#ifndef VICINAL_REPORT_JSON_OUT_PRINT_H
#define VICINAL_REPORT_JSON_OUT_PRINT_H

#include <jansson.h>
#include <stdio.h>

/* Print with an indent of two and a line end; every number with the fewest
 * digits that read back as the same double. */
void json_out_print(FILE *to, json_t *value);

#endif
