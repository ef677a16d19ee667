#include "sim/report/figures.h"

#include <string.h>

bool figures_open(struct files_text *csv, struct files_text *variables)
{
    if (!files_text_open(csv))
        return false;
    if (files_text_open(variables))
        return true;
    files_text_close(csv);
    files_text_free(csv);
    return false;
}

bool figures_draw(struct figures_pen *pen, const char *name, const char *script, struct files_text *csv,
                  struct files_text *variables)
{
    char file[64];
    snprintf(file, sizeof file, "%s.csv", name);
    const bool known = files_text_close(variables);
    const bool written = files_text_save(csv, pen->folder, file, &pen->failure) && known;
    if (written && pen->drawn == GNUPLOT_DRAWN) {
        const struct gnuplot_figure figure = {
            .folder = pen->folder, .name = name, .script = script, .variables = variables->bytes};
        pen->drawn = gnuplot_draw(&figure, &pen->failure);
        if (pen->drawn == GNUPLOT_DRAWN && pen->count < FIGURES_MOST)
            pen->name[pen->count++] = name;
    }
    files_text_free(variables);
    return written;
}

bool figures_drawn(const struct figures_pen *pen, const char *name)
{
    for (size_t i = 0; i < pen->count; i++)
        if (strcmp(pen->name[i], name) == 0)
            return true;
    return false;
}
