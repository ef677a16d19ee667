/* The command line and the exit status, nothing else. */
#include <errno.h>
#include <stdbool.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>

#include "sim/base/spread.h"
#include "sim/report/commands.h"

enum { DONE = COMMANDS_DONE, FAILED = COMMANDS_FAILED, WRONG = COMMANDS_WRONG };
enum { MAX_CANDIDATES = 100000 };

enum verb { PLAN, TRIAL, BUDGET, MARGIN, SHEET, KIT, CHECK, VERBS };
static const char *const verb_name[VERBS] = {"plan", "trial", "budget", "margin", "sheet", "kit", "check"};
static const char *const later_verb[] = {"reduce"};
static const char *const later_option[] = {"--with", "--pilot", "--digits", "--resume", "--self-test"};

static const char help[] =
    "vicinal: plan a head-to-head determination by capillary viscometry\n"
    "\n"
    "  vicinal plan   SCENARIO    weigh every plan, name the cheapest that resolves\n"
    "  vicinal trial  SCENARIO    one plan in depth\n"
    "  vicinal budget SCENARIO    which error source costs how much of one plan's variance\n"
    "  vicinal margin SCENARIO    how bad each condition may get before one plan fails\n"
    "  vicinal sheet  SCENARIO    one plan as a bench sheet, with a notebook to fill in\n"
    "  vicinal kit    [SCENARIO]  everything that can be chosen, and every key\n"
    "  vicinal check  SCENARIO    read and check only\n"
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
    return wrong(word, "no such command; there are plan, trial, budget, margin, sheet, kit and check");
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

/* The kit without a scenario. */
static int bare_kit(struct report_context *context)
{
    struct complaints *const complaints = complain_new();
    if (!complaints) return out_of_memory();
    struct scenario *const s = scenario_built_in(complaints);
    complain_print(complaints, stderr);
    complain_free(complaints);
    context->scenario = s;
    const int status = s ? commands_kit(context) : FAILED;
    scenario_free(s);
    return status;
}

static int do_verb(const struct usage *u, const struct report_context *context)
{
    const struct commands_options options = {u->scenario, u->quiet, u->times, u->notebooks};
    switch (u->verb) {
    case PLAN: return commands_plan(context, &options);
    case TRIAL: return commands_trial(context, &options);
    case BUDGET: return commands_budget(context, &options);
    case MARGIN: return commands_margin(context, &options);
    case SHEET: return commands_sheet(context, &options);
    case CHECK: return commands_check(context);
    default: return commands_kit(context);
    }
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
    else
        status = do_verb(u, context);
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
