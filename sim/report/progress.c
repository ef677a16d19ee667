#include "sim/report/progress.h"

#include <stdlib.h>
#include <string.h>
#include <unistd.h>

#include "sim/report/report.h"

static const double between_s = 0.2;

void progress_start(struct progress *progress, FILE *to, bool quiet)
{
    const char *term = getenv("TERM");
    const int file = fileno(to);
    *progress = (struct progress){.to = to, .started_s = report_clock()};
    progress->last_s = progress->started_s;
    progress->shown = !quiet && file >= 0 && isatty(file) && term && strcmp(term, "dumb") != 0;
}

void progress_text(char *text, size_t size, double done, double elapsed_s)
{
    const double share = done < 0.0 ? 0.0 : done > 1.0 ? 1.0 : done;
    if (share < 0.01 || elapsed_s < 1.0) {
        snprintf(text, size, "%.0f %%", 100.0 * share);
        return;
    }
    const double left = elapsed_s * (1.0 - share) / share;
    if (left < 60.0)
        snprintf(text, size, "%.0f %%, about %.0f s left", 100.0 * share, left);
    else if (left < 3600.0)
        snprintf(text, size, "%.0f %%, about %d min %02d s left", 100.0 * share, (int)left / 60, (int)left % 60);
    else
        snprintf(text, size, "%.0f %%, about %.1f h left", 100.0 * share, left / 3600.0);
}

void progress_update(struct progress *progress, double done)
{
    if (!progress->shown)
        return;
    const double now = report_clock();
    if (now - progress->last_s < between_s)
        return;
    char text[64];
    progress_text(text, sizeof text, done, now - progress->started_s);
    fprintf(progress->to, "\r\033[K%s", text);
    fflush(progress->to);
    progress->last_s = now;
    progress->drawn = true;
}

void progress_end(struct progress *progress)
{
    if (!progress->drawn)
        return;
    fputs("\r\033[K", progress->to);
    fflush(progress->to);
    progress->drawn = false;
}
