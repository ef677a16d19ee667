#include "sim/report/sheet_notebook.h"

#include <errno.h>
#include <math.h>
#include <stdlib.h>
#include <string.h>

#include "sim/report/notebook_csv.h"
#include "sim/report/say.h"

/* The columns that only a person fills in. */
static const char *const written_by_hand[] = {"time", "temperature", "concentration", "note"};
enum { HANDS = sizeof written_by_hand / sizeof *written_by_hand, MOST_COLUMNS = 32 };

/* Which columns of a heading are filled in by hand. False: no heading of a
 * notebook. */
static bool read_heading(const char *line, bool by_hand[MOST_COLUMNS])
{
    size_t found = 0;
    for (size_t column = 0; line && column < MOST_COLUMNS; column++) {
        line += strspn(line, " \t\"");
        for (size_t i = 0; i < HANDS; i++) {
            const size_t length = strlen(written_by_hand[i]);
            if (strncmp(line, written_by_hand[i], length) == 0 && strchr(" ,[\"\r\n", line[length])) {
                by_hand[column] = true;
                found++;
            }
        }
        line = strchr(line, ',');
        if (line)
            line++;
    }
    return found == HANDS;
}

/* Whether a field filled in by hand holds something, or there are more fields
 * than the heading has. */
static bool holds_something(const char *line, const bool by_hand[MOST_COLUMNS])
{
    for (size_t column = 0; line; column++) {
        const char *something = line + strspn(line, " \t\"\r\n");
        const char *comma = strchr(line, ',');
        const bool empty = *something == '\0' || something == comma;
        if (!empty && (column >= MOST_COLUMNS || by_hand[column]))
            return true;
        line = comma ? comma + 1 : NULL;
    }
    return false;
}

static enum sheet_notebook_found look(FILE *from)
{
    bool by_hand[MOST_COLUMNS] = {false}, heading = false, taken = false;
    char *line = NULL;
    size_t room = 0;
    while (!taken && getline(&line, &room, from) >= 0) {
        const char *text = strncmp(line, "\xEF\xBB\xBF", 3) == 0 ? line + 3 : line;
        if (*text == '#' || text[strspn(text, " \t\r\n")] == '\0')
            continue;
        if (heading)
            taken = holds_something(text, by_hand);
        else
            taken = !(heading = read_heading(text, by_hand));
    }
    free(line);
    return taken || !heading ? SHEET_NOTEBOOK_TAKEN : SHEET_NOTEBOOK_FREE;
}

enum sheet_notebook_found sheet_notebook_look(const char *path, struct files_failure *failure)
{
    FILE *from = fopen(path, "r");
    const bool missing = !from && (errno == ENOENT || errno == ENOTDIR);
    if (!from && !missing)
        snprintf(failure->text, sizeof failure->text, "%s: %s", path, strerror(errno));
    if (!from)
        return missing ? SHEET_NOTEBOOK_FREE : SHEET_NOTEBOOK_UNREADABLE;
    enum sheet_notebook_found found = look(from);
    if (ferror(from)) {
        snprintf(failure->text, sizeof failure->text, "%s: %s", path, strerror(errno));
        found = SHEET_NOTEBOOK_UNREADABLE;
    }
    fclose(from);
    return found;
}

static const struct notebook_row empty_row = {
    .started_s = (double)NAN, .concentration_kg_m3 = (double)NAN, .time_s = (double)NAN, .temperature_K = (double)NAN};

static size_t runs_of(const struct sheet_work *w)
{
    size_t runs = 0;
    for (size_t i = 0; i < w->rows; i++)
        runs += w->row[i].filling->runs;
    return runs;
}

/* The rows of one preparation; how many there are. */
static size_t list(const struct sheet_work *w, size_t preparation, struct notebook_row *out)
{
    static const char *const stock[SERIES] = {"intact-stock", "cleaved-stock"};
    size_t n = 0;
    for (size_t s = 0; s < SERIES; s++) {
        out[n] = empty_row;
        out[n].preparation = preparation;
        out[n++].solution = stock[s];
    }
    for (size_t i = 0; i < w->rows; i++) {
        const struct notebook_filling *f = w->row[i].filling;
        for (size_t r = 0; r < f->runs; r++) {
            out[n] = empty_row;
            out[n].preparation = preparation;
            out[n].day = f->day + 1;
            out[n].started_s = sheet_work_run_s(w, &w->row[i], r);
            out[n].solution = sheet_work_solution(f);
            out[n].level = f->water || f->blank ? 0 : f->level + 1;
            out[n].filling = f->number + 1;
            out[n++].run = r + 1;
        }
    }
    return n;
}

static bool write_rows(const struct sheet_work *w, const struct notebook_row *rows, size_t count, const char *path,
                       struct files_failure *failure)
{
    const struct plan *p = w->plan;
    const double *stock = w->design.flasks.stock_conc_kg_m3;
    char words[320], stocks[280];
    snprintf(words, sizeof words, "%.60s in %.60s, %.60s, %.60s, %.60s", p->grade.name, p->tube.name, p->bath.name,
             p->thermometer.name, p->timer.name);
    snprintf(stocks, sizeof stocks,
             "Stocks: write the concentration as made into their rows; empty means as planned (intact %.20s, cleaved "
             "%.20s g/dL). The levels follow from it.",
             say_digits(say_g_dL(stock[INTACT]), 4).text, say_digits(say_g_dL(stock[CLEAVED]), 4).text);
    const char *const remarks[] = {
        "Nothing measured yet: write the time of each run, and the temperature if it was read.",
        "A run more than planned gets a row of its own below the planned runs of its filling, with the next number.",
        stocks, NULL};
    const struct notebook_csv csv = {.title = scenario_title(w->scenario),
                                     .plan = words,
                                     .rows = rows,
                                     .count = count,
                                     .preparations = p->preparations > 1,
                                     .remarks = remarks};
    return notebook_csv_write(path, &csv, failure);
}

bool sheet_notebook_write(const struct sheet_work *work, const char *path, struct files_failure *failure)
{
    const size_t each = SERIES + runs_of(work), preparations = work->plan->preparations;
    struct notebook_row *rows = calloc(each * preparations, sizeof *rows);
    size_t count = 0;
    if (!rows) {
        snprintf(failure->text, sizeof failure->text, "%s: out of memory", path);
        return false;
    }
    for (size_t i = 0; i < preparations; i++)
        count += list(work, i + 1, rows + count);
    const bool good = write_rows(work, rows, count, path, failure);
    free(rows);
    return good;
}
