#include "sim/report/gnuplot.h"

#include <errno.h>
#include <fcntl.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>
#include <sys/wait.h>
#include <unistd.h>

#include "sim/report/plots.h"
#include "sim/report/say.h"

enum { NOT_FOUND = 127, NO_FOLDER = 126 };

void gnuplot_text(FILE *to, const char *name, const char *text)
{
    fprintf(to, "%s = '", name);
    for (; *text; text++) {
        if (*text == '\'')
            fputs("''", to);
        else
            fputc((unsigned char)*text < ' ' ? ' ' : *text, to);
    }
    fputs("'\n", to);
}

void gnuplot_number(FILE *to, const char *name, double value)
{
    fprintf(to, "%s = %s\n", name, isfinite(value) ? say_number(value).text : "NaN");
}

static const struct plots_file *script_named(const char *name)
{
    for (size_t i = 0; i < vicinal_plots_count; i++) {
        const char *slash = strrchr(vicinal_plots[i].name, '/');
        if (strcmp(slash ? slash + 1 : vicinal_plots[i].name, name) == 0)
            return &vicinal_plots[i];
    }
    return NULL;
}

/* The whole text for gnuplot: where to draw, the figure's variables, the
 * common style, the script. */
static bool compose(struct files_text *text, const struct gnuplot_figure *figure, const char *format,
                    const char *output)
{
    const struct plots_file *style = script_named("style.gp"), *script = script_named(figure->script);
    if (!style || !script || !files_text_open(text))
        return false;
    const char *slash = strrchr(output, '/');
    gnuplot_text(text->stream, "format", format);
    gnuplot_text(text->stream, "output", slash ? slash + 1 : output);
    fprintf(text->stream, "input = '%s.csv'\n", figure->name);
    fputs(figure->variables, text->stream);
    fwrite(style->bytes, 1, style->size, text->stream);
    fputc('\n', text->stream);
    fwrite(script->bytes, 1, script->size, text->stream);
    fputc('\n', text->stream);
    if (files_text_close(text))
        return true;
    files_text_free(text);
    return false;
}

/* A pipe that no other child inherits, and whose writing end never waits. */
static bool open_pipe(int ends[2])
{
    if (pipe(ends) != 0)
        return false;
    fcntl(ends[0], F_SETFD, FD_CLOEXEC);
    fcntl(ends[1], F_SETFD, FD_CLOEXEC);
    return true;
}

static void become_gnuplot(const char *folder, int in, int err)
{
    char name[] = "gnuplot", plain[] = "-d", from[] = "-";
    char *const arguments[] = {name, plain, from, NULL};
    const int none = open("/dev/null", O_WRONLY);
    if (chdir(folder) != 0 || none < 0)
        _exit(NO_FOLDER);
    if (dup2(in, 0) < 0 || dup2(none, 1) < 0 || dup2(err, 2) < 0)
        _exit(NO_FOLDER);
    execvp(name, arguments);
    _exit(NOT_FOUND);
}

/* Read all that the child says, keep the start. */
static void listen(int from, char *words, size_t room)
{
    char piece[512];
    size_t kept = 0;
    for (;;) {
        const ssize_t got = read(from, piece, sizeof piece);
        if (got < 0 && errno == EINTR)
            continue;
        if (got <= 0)
            break;
        for (ssize_t i = 0; i < got && kept + 1 < room; i++)
            if (kept > 0 || piece[i] > ' ')
                words[kept++] = piece[i] < ' ' ? ' ' : piece[i];
    }
    words[kept] = '\0';
}

/* Start gnuplot with the text waiting on its standard input; its exit status,
 * or -1. The text fits into a pipe, so nothing blocks and none is lost. */
static int run(const char *folder, const struct files_text *text, char *words, size_t room)
{
    int in[2], err[2], status = -1;
    if (!open_pipe(in))
        return -1;
    fcntl(in[1], F_SETFL, O_NONBLOCK);
    const bool waiting = write(in[1], text->bytes, text->size) == (ssize_t)text->size;
    close(in[1]);
    if (!waiting || !open_pipe(err)) {
        close(in[0]);
        return -1;
    }
    const pid_t child = fork();
    if (child == 0)
        become_gnuplot(folder, in[0], err[1]);
    close(in[0]);
    close(err[1]);
    if (child > 0) {
        listen(err[0], words, room);
        while (waitpid(child, &status, 0) < 0 && errno == EINTR)
            continue;
    }
    close(err[0]);
    return child > 0 && WIFEXITED(status) ? WEXITSTATUS(status) : -1;
}

static enum gnuplot_result draw_one(const struct gnuplot_figure *figure, const char *format,
                                    struct files_failure *failure)
{
    char words[300] = "", name[80];
    snprintf(name, sizeof name, "%s.%s", figure->name, format);
    char *path = files_path(figure->folder, name);
    char *temporary = path ? files_temporary(path) : NULL;
    struct files_text text;
    int status = -1;
    if (temporary && compose(&text, figure, format, temporary)) {
        status = run(figure->folder, &text, words, sizeof words);
        files_text_free(&text);
    }
    enum gnuplot_result result = status == NOT_FOUND ? GNUPLOT_MISSING : GNUPLOT_FAILED;
    if (status == 0) {
        if (files_adopt(temporary, path, failure))
            result = GNUPLOT_DRAWN;
    } else {
        snprintf(failure->text, sizeof failure->text, "%s: gnuplot could not draw it%s%s", name, *words ? ": " : "",
                 words);
        if (temporary)
            unlink(temporary);
    }
    free(temporary);
    free(path);
    return result;
}

enum gnuplot_result gnuplot_draw(const struct gnuplot_figure *figure, struct files_failure *failure)
{
    const enum gnuplot_result svg = draw_one(figure, "svg", failure);
    return svg == GNUPLOT_DRAWN ? draw_one(figure, "pdf", failure) : svg;
}
