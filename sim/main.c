/* The command line and the exit status, nothing else. */
#include <errno.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/spread.h"
#include "sim/judge/forecast.h"
#include "sim/judge/search.h"
#include "sim/judge/show.h"
#include "sim/report/json_out_print.h"
#include "sim/report/kit_print.h"
#include "sim/report/progress.h"
#include "sim/report/report.h"
#include "sim/report/sheet.h"
#include "sim/report/times.h"

enum { DONE = 0, FAILED = 1, WRONG = 2, NOT_RESOLVED = 3 };
enum { MAX_CANDIDATES = 100000 };

enum verb { PLAN, TRIAL, SHEET, KIT, CHECK, VERBS };
static const char *const verb_name[VERBS] = {"plan", "trial", "sheet", "kit", "check"};
static const char *const later_verb[] = {"budget", "margin", "reduce"};
static const char *const later_option[] = {"--with", "--pilot", "--digits", "--resume", "--self-test"};

static const char help[] =
    "vicinal: plan a head-to-head determination by capillary viscometry\n"
    "\n"
    "  vicinal plan  SCENARIO     weigh every plan, name the cheapest that resolves\n"
    "  vicinal trial SCENARIO     one plan in depth\n"
    "  vicinal sheet SCENARIO     one plan as a bench sheet, with a notebook to fill in\n"
    "  vicinal kit   [SCENARIO]   everything that can be chosen, and every key\n"
    "  vicinal check SCENARIO     read and check only\n"
    "\n"
    "  --out DIR                  where the files go (out/NAME)\n"
    "  --json                     the result on stdout as one JSON object\n"
    "  --set PATH=VALUE           any key of the scenario, e.g.\n"
    "                             --set kit.baths.circulator.fluctuation='0.05 K'\n"
    "  --pick KEY=OPTION          close a choice of `plan:`\n"
    "  --seed N, --studies N      as run.seed and run.studies\n"
    "  --threads N                threads (all cores)\n"
    "  --times FILE               trial: also write the first study's notebook\n"
    "  --notebooks N              with --times: the first N studies\n"
    "  --yes                      go on with more than 100,000 plans\n"
    "  --quiet                    no progress\n"
    "  --help, --version\n"
    "\n"
    "Status: 0 done, 1 the run failed, 2 wrong usage or input, 3 nothing resolves.\n";

/* What the command line asks for. */
struct usage {
    enum verb verb;
    const char *scenario, *out, *times;
    const char **sets, **picks;
    size_t sets_count, picks_count;
    size_t notebooks, threads;
    bool json, yes, quiet;
    char *own[2]; /* run.seed=... and run.studies=... */
};

static bool wrong(const char *what, const char *text)
{
    fprintf(stderr, "vicinal: %s: %s\n", what, text);
    return false;
}

static bool among(const char *word, const char *const *list, size_t count)
{
    for (size_t i = 0; i < count; i++)
        if (strcmp(word, list[i]) == 0) return true;
    return false;
}

/* A whole number from 1 (or 0) to `most`. */
static bool whole(const char *option, const char *text, unsigned long long least, unsigned long long most, unsigned long long *out)
{
    char *end = NULL;
    errno = 0;
    const unsigned long long value = text[0] >= '0' && text[0] <= '9' ? strtoull(text, &end, 10) : 0;
    if (end && *end == '\0' && errno == 0 && value >= least && value <= most) {
        *out = value;
        return true;
    }
    fprintf(stderr, "vicinal: %s %s: a whole number from %llu to %llu is wanted\n", option, text, least, most);
    return false;
}

/* An option that stands for a key of the scenario. */
static bool own_set(struct usage *u, int which, const char *option, const char *text)
{
    static const char *const key[2] = {"run.seed", "run.studies"};
    unsigned long long value = 0;
    if (!whole(option, text, which == 0 ? 0 : 16, which == 0 ? 9007199254740992ULL : 1000000ULL, &value)) return false;
    free(u->own[which]);
    u->own[which] = malloc(64);
    if (!u->own[which]) return wrong(option, "out of memory");
    snprintf(u->own[which], 64, "%s=%llu", key[which], value);
    u->sets[u->sets_count++] = u->own[which];
    return true;
}

static bool take_value(struct usage *u, const char *option, const char *text)
{
    unsigned long long value = 0;
    if (strcmp(option, "--out") == 0) u->out = text;
    else if (strcmp(option, "--times") == 0) u->times = text;
    else if (strcmp(option, "--set") == 0) u->sets[u->sets_count++] = text;
    else if (strcmp(option, "--pick") == 0) u->picks[u->picks_count++] = text;
    else if (strcmp(option, "--seed") == 0) return own_set(u, 0, option, text);
    else if (strcmp(option, "--studies") == 0) return own_set(u, 1, option, text);
    else if (!whole(option, text, 1, strcmp(option, "--threads") == 0 ? 4096 : 100000, &value)) return false;
    else if (strcmp(option, "--threads") == 0) u->threads = (size_t)value;
    else u->notebooks = (size_t)value;
    return true;
}

static bool take_flag(struct usage *u, const char *option)
{
    if (strcmp(option, "--json") == 0) u->json = true;
    else if (strcmp(option, "--yes") == 0) u->yes = true;
    else if (strcmp(option, "--quiet") == 0) u->quiet = true;
    else if (among(option, later_option, sizeof later_option / sizeof *later_option)) return wrong(option, "not in this version");
    else return wrong(option, "no such option; vicinal --help lists them");
    return true;
}

static bool take_verb(struct usage *u, const char *word)
{
    for (int v = 0; v < VERBS; v++)
        if (strcmp(word, verb_name[v]) == 0) {
            u->verb = (enum verb)v;
            return true;
        }
    if (among(word, later_verb, sizeof later_verb / sizeof *later_verb)) return wrong(word, "not in this version");
    return wrong(word, "no such command; there are plan, trial, sheet, kit and check");
}

static bool consistent(const struct usage *u)
{
    const char *const name = verb_name[u->verb];
    if (!u->scenario && u->verb != KIT) return wrong(name, "which scenario? vicinal --help shows how");
    if (u->times && u->verb != TRIAL) return wrong("--times", "goes with trial");
    if (u->notebooks && !u->times) return wrong("--notebooks", "goes with --times");
    if (!u->scenario && (u->sets_count || u->picks_count)) return wrong(name, "--set and --pick need a scenario to change");
    return true;
}

static bool read_line(struct usage *u, int argc, const char *const *argv)
{
    static const char *const valued[] = {"--out", "--times", "--set", "--pick", "--seed", "--studies", "--threads", "--notebooks"};
    bool have_verb = false;
    for (int i = 1; i < argc; i++) {
        const char *const word = argv[i];
        if (among(word, valued, sizeof valued / sizeof *valued)) {
            if (i + 1 >= argc) return wrong(word, "needs a value behind it");
            if (!take_value(u, word, argv[++i])) return false;
        } else if (word[0] == '-') {
            if (!take_flag(u, word)) return false;
        } else if (!have_verb) {
            if (!take_verb(u, word)) return false;
            have_verb = true;
        } else if (u->scenario) {
            return wrong(word, "one scenario at a time");
        } else
            u->scenario = word;
    }
    if (!have_verb) return wrong("usage", "vicinal plan SCENARIO; vicinal --help shows the rest");
    return consistent(u);
}

static int out_of_memory(void)
{
    fputs("vicinal: out of memory\n", stderr);
    return FAILED;
}

static void on_progress(void *context, double done)
{
    progress_update(context, done);
}

/* What is reported of a search besides itself, about the recommended plan or
 * the nearest miss: estimates from the studies its figures come from, the
 * resolving map, and where more work makes it worse. */
struct around {
    struct estimates estimates;
    struct survey_map map;
    struct worse worse[4];
    size_t worse_count;
    bool has_map;
};

static bool look_around(const struct scenario *s, const struct search_result *r, struct around *out)
{
    const bool found = r->recommended != SEARCH_NONE;
    const long index = found ? r->recommended : r->nearest_miss;
    struct plan plan;
    struct outcome again;
    memset(out, 0, sizeof *out);
    if (index == SEARCH_NONE) return true;
    scenario_plan(s, (size_t)index, &plan);
    out->has_map = true;
    return trial_run(s, &plan, (struct trial_options){.first_study = found ? search_fresh_study(s) : 0}, &again, &out->estimates) &&
           survey_map_make(s, &plan, &out->map) &&
           worse_find(s, (size_t)index, sizeof out->worse / sizeof *out->worse, out->worse, &out->worse_count);
}

static int do_plan(const struct usage *u, const struct report_context *context)
{
    struct search_result result;
    struct around around = {0};
    struct progress progress;
    progress_start(&progress, stderr, u->quiet);
    bool ok = search_run(context->scenario, (struct search_options){.progress = on_progress, .context = &progress}, &result);
    const bool searched = ok;
    if (ok) ok = look_around(context->scenario, &result, &around);
    progress_end(&progress);
    int status = FAILED;
    if (ok) {
        const struct report_planned planned = {.search = &result, .estimates = around.estimates.n ? &around.estimates : NULL,
                                               .map = around.has_map ? &around.map : NULL, .worse = around.worse, .worse_count = around.worse_count};
        status = report_plan(context, &planned);
        if (status == DONE && result.recommended == SEARCH_NONE) status = NOT_RESOLVED;
    } else
        out_of_memory();
    trial_free_estimates(&around.estimates);
    if (searched) search_free(&result);
    return status;
}

/* A scenario that leaves a choice open is refused with the open keys named. */
static bool closed(const struct scenario *s, const char *path)
{
    char open[512] = "";
    size_t used = 0;
    for (size_t k = 0; k < scenario_keys(s); k++)
        if (scenario_options(s, k) > 1 && used < sizeof open)
            used += (size_t)snprintf(open + used, sizeof open - used, "%s%s", used ? ", " : "", scenario_key(s, k));
    if (used == 0) return true;
    fprintf(stderr, "vicinal: %s: this command speaks of one plan, but a choice is open in: %s; close it with --pick KEY=OPTION\n", path, open);
    return false;
}

/* All that is played of one plan. */
struct tried {
    struct plan plan;
    struct outcome outcome;
    struct estimates estimates;
    struct example example;
    struct show_notebook notebook;
    struct survey_curve curve;
    struct survey_tops tops;
    bool narrow, played;
};

static bool try_plan(const struct scenario *s, struct progress *progress, struct tried *t)
{
    const struct trial_options options = {.deep = true, .progress = on_progress, .context = progress};
    const bool curve = scenario_question(s)->has_against;
    memset(t, 0, sizeof *t);
    scenario_plan(s, 0, &t->plan);
    bool ok = trial_run(s, &t->plan, options, &t->outcome, &t->estimates);
    t->played = ok && t->estimates.n > 0;
    if (!t->played) return ok;
    return trial_too_narrow(s, &t->plan, &t->narrow) && show_example(s, &t->plan, 0, &t->example) &&
           show_notebook_make(s, &t->plan, 0, &t->notebook) && survey_tops_make(s, &t->plan, &t->tops) &&
           (!curve || survey_curve_make(s, &t->plan, t->outcome.at.critical, &t->curve));
}

static int do_trial(const struct usage *u, const struct report_context *context)
{
    const struct scenario *const s = context->scenario;
    struct tried t;
    struct progress progress;
    if (!closed(s, u->scenario)) return WRONG;
    progress_start(&progress, stderr, u->quiet);
    const bool ok = try_plan(s, &progress, &t);
    progress_end(&progress);
    int status = FAILED;
    if (ok) {
        struct report_tried tried = {.outcome = &t.outcome, .within_too_narrow = t.narrow};
        if (t.played) {
            tried.estimates = &t.estimates;
            tried.example = &t.example;
            tried.notebook = &t.notebook;
            tried.tops = &t.tops;
            if (scenario_question(s)->has_against) tried.curve = &t.curve;
        }
        status = report_trial(context, &tried);
        if (status == DONE && u->times) status = times_write(context, 0, u->times, u->notebooks ? u->notebooks : 1);
        if (status == DONE && t.outcome.status != STATUS_RESOLVES) status = NOT_RESOLVED;
    } else
        out_of_memory();
    show_notebook_free(&t.notebook);
    trial_free_estimates(&t.estimates);
    return status;
}

static int do_check(const struct report_context *context)
{
    double seconds = 0.0;
    if (!forecast_seconds(context->scenario, &seconds)) return out_of_memory();
    return report_check(context, seconds);
}

static int do_kit(const struct report_context *context)
{
    if (!context->json) return kit_print_text(context->scenario, stdout);
    json_t *const object = kit_print_json(context->scenario, context->version);
    if (!object) return out_of_memory();
    json_out_print(stdout, object);
    return DONE;
}

/* The kit without a scenario. */
static int bare_kit(struct report_context *context)
{
    struct complaints *const complaints = complain_new();
    if (!complaints) return out_of_memory();
    struct scenario *const s = scenario_built_in(complaints);
    complain_print(complaints, stderr);
    complain_free(complaints);
    context->scenario = s;
    const int status = s ? do_kit(context) : FAILED;
    scenario_free(s);
    return status;
}

static int with_scenario(const struct usage *u, struct report_context *context)
{
    const struct scenario_request request = {u->scenario, u->sets, u->sets_count, u->picks, u->picks_count};
    struct complaints *const complaints = complain_new();
    if (!complaints) return out_of_memory();
    struct scenario *const s = scenario_read(&request, complaints);
    complain_print(complaints, stderr);
    complain_free(complaints);
    if (!s) return WRONG;
    char folder[4096];
    snprintf(folder, sizeof folder, "out/%s", scenario_name(s));
    context->scenario = s;
    context->folder = u->out ? u->out : folder;
    int status = WRONG;
    const size_t count = scenario_candidates(s);
    if (u->verb == PLAN && count > MAX_CANDIDATES && !u->yes)
        fprintf(stderr, "vicinal: %s: %zu plans are more than %d; say --yes if that is meant\n", u->scenario, count, MAX_CANDIDATES);
    else if (u->verb == PLAN)
        status = do_plan(u, context);
    else if (u->verb == TRIAL)
        status = do_trial(u, context);
    else if (u->verb == SHEET)
        status = closed(s, u->scenario) ? sheet_write(context, 0) : WRONG;
    else if (u->verb == CHECK)
        status = do_check(context);
    else
        status = do_kit(context);
    scenario_free(s);
    return status;
}

static int run(int argc, const char *const *argv, struct usage *u)
{
    struct report_context context = {.version = VICINAL_VERSION, .out = stdout, .err = stderr, .arguments = argv, .arguments_count = (size_t)argc};
    if (!read_line(u, argc, argv)) return WRONG;
    if (u->threads) spread_set_threads((int)u->threads);
    context.json = u->json;
    context.threads = (size_t)spread_threads();
    context.started_s = report_clock();
    const int status = u->scenario ? with_scenario(u, &context) : bare_kit(&context);
    if (fflush(stdout) != 0 || ferror(stdout)) {
        fprintf(stderr, "vicinal: standard output: %s\n", strerror(errno));
        return FAILED;
    }
    return status;
}

int main(int argc, char **argv)
{
    for (int i = 1; i < argc; i++) {
        const bool asks_help = strcmp(argv[i], "--help") == 0;
        if (asks_help || strcmp(argv[i], "--version") == 0) {
            fputs(asks_help ? help : "vicinal " VICINAL_VERSION "\n", stdout);
            return fflush(stdout) == 0 ? DONE : FAILED;
        }
    }
    struct usage u = {.sets = calloc((size_t)argc + 1, sizeof *u.sets), .picks = calloc((size_t)argc + 1, sizeof *u.picks)};
    const char **const words = calloc((size_t)argc + 1, sizeof *words);
    int status = FAILED;
    if (u.sets && u.picks && words) {
        for (int i = 0; i < argc; i++) words[i] = argv[i];
        status = run(argc, (const char *const *)words, &u);
    } else
        out_of_memory();
    free(u.own[0]);
    free(u.own[1]);
    free(u.sets);
    free(u.picks);
    free(words);
    return status;
}
