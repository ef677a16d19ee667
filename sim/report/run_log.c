#include "sim/report/run_log.h"

#include <string.h>
#include <sys/resource.h>
#include <sys/utsname.h>
#include <time.h>
#include <unistd.h>

void run_log_argument(FILE *to, const char *text)
{
    static const char plain[] = "abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ0123456789_-+=./:,%@";
    if (*text && text[strspn(text, plain)] == '\0') {
        fputs(text, to);
        return;
    }
    fputc('\'', to);
    for (; *text; text++) {
        if (*text == '\'')
            fputs("'\\''", to);
        else
            fputc(*text, to);
    }
    fputc('\'', to);
}

static void processor(FILE *to)
{
    char line[256];
    FILE *from = fopen("/proc/cpuinfo", "r");
    while (from && fgets(line, sizeof line, from)) {
        const char *colon = strchr(line, ':');
        if (strncmp(line, "model name", 10) != 0 || !colon)
            continue;
        fprintf(to, "processor: %s", colon + 1 + strspn(colon + 1, " "));
        break;
    }
    if (from)
        fclose(from);
}

static void host(FILE *to)
{
    struct utsname system;
    if (uname(&system) == 0)
        fprintf(to, "system: %s %s %s\n", system.sysname, system.release, system.machine);
    processor(to);
    fprintf(to, "processors: %ld\n", sysconf(_SC_NPROCESSORS_ONLN));
    const double bytes = (double)sysconf(_SC_PHYS_PAGES) * (double)sysconf(_SC_PAGESIZE);
    fprintf(to, "memory: %.0f MiB\n", bytes / 1048576.0);
}

void run_log_print(FILE *to, const struct report_context *context)
{
    char when[40] = "";
    const time_t now = time(NULL);
    struct tm utc;
    struct rusage used;
    fprintf(to, "vicinal %s\ncommand:", context->version);
    for (size_t i = 0; i < context->arguments_count; i++) {
        fputc(' ', to);
        run_log_argument(to, context->arguments[i]);
    }
    fputc('\n', to);
    host(to);
    fprintf(to, "threads: %zu\n", context->threads);
    if (gmtime_r(&now, &utc))
        strftime(when, sizeof when, "%Y-%m-%dT%H:%M:%SZ", &utc);
    fprintf(to, "written: %s\n", when);
    fprintf(to, "wall time: %.2f s\n", report_clock() - context->started_s);
    if (getrusage(RUSAGE_SELF, &used) == 0)
        fprintf(to, "processor time: %.2f s\npeak memory: %.1f MiB\n",
                (double)used.ru_utime.tv_sec + 1e-6 * (double)used.ru_utime.tv_usec + (double)used.ru_stime.tv_sec +
                    1e-6 * (double)used.ru_stime.tv_usec,
                (double)used.ru_maxrss / 1024.0);
}
