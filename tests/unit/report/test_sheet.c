/* The bench sheet: its numbers, its page, and the rows of its notebook. */
#include "tests/unit/bench/still.h"

#include "sim/judge/show.h"
#include "sim/report/html.h"
#include "sim/report/sheet_notebook.h"
#include "sim/report/sheet_page.h"
#include "tests/unit/check.h"
#include "tests/unit/report/kept.h"

static const char same[] = "question: {expect: 1.5 %, against: 1.2 %, against_is: same-constants}\n";

/* A scenario of one plan, and its work. */
struct fixture {
    struct scenario *scenario;
    struct plan plan;
    struct sheet_work work;
};

static void open_fixture(struct fixture *f, const char *question, const char *rest)
{
    char yaml[1000];
    snprintf(yaml, sizeof yaml, "%s%s", question, rest);
    f->scenario = still_read(yaml);
    scenario_plan(f->scenario, 0, &f->plan);
    assert_true(sheet_work_make(f->scenario, &f->plan, &f->work));
}

static void close_fixture(struct fixture *f)
{
    sheet_work_free(&f->work);
    scenario_free(f->scenario);
}

/* ---- numbers ---- */

/* What is pipetted gives the level's concentration, and the stock holds it. */
static void volumes_in_flasks(const char *rest)
{
    struct fixture f;
    open_fixture(&f, same, rest);
    const struct sheet_work *w = &f.work;
    const double *stock_conc = w->design.flasks.stock_conc_kg_m3;
    double taken[SERIES] = {0}, weighed = 0.0;
    for (size_t i = 0; i < w->levels; i++) {
        const struct sheet_work_level *l = &w->level[i];
        taken[l->series] += l->diluted ? l->taken_m3 : l->used_m3;
        if (!l->diluted)
            continue;
        check_round(l->taken_m3 * stock_conc[l->series] / l->flask_m3, l->conc_kg_m3, 8);
        assert_true(l->taken_m3 < l->flask_m3 && l->used_m3 <= l->flask_m3);
        assert_true(l->tolerance_m3 > 0.0);
    }
    for (size_t i = 0; i < w->stocks; i++) {
        check_round(w->stock[i].polymer_kg, w->stock[i].conc_kg_m3 * w->stock[i].flask_m3, 4);
        assert_true((w->stocks == 1 ? taken[INTACT] + taken[CLEAVED] : taken[i]) <= w->stock[i].flask_m3);
        weighed += w->stock[i].polymer_kg;
    }
    check_round(weighed * w->design.repeats, w->design.polymer_kg, 8);
    if (w->stocks == 1)
        check_round(w->aliquot_m3, taken[CLEAVED], 8);
    else
        assert_true(w->aliquot_m3 == 0.0);
    close_fixture(&f);
}

static void volumes_add_up(void **state)
{
    (void)state;
    volumes_in_flasks("plan: {grade: middle}\n");
    volumes_in_flasks(
        "solutions: {stock: shared, glass: B}\nplan: {grade: high, preparations: 2, levels_cleaved: 3}\n");
    volumes_in_flasks("cleavage: {diluent: blank}\nplan: {grade: low, fillings: 1, lowest: 0.3, levels: 5}\n");
}

/* In the tube what was added is what is there, and c V stays. */
static void volumes_in_the_tube(void **state)
{
    (void)state;
    struct fixture f;
    open_fixture(&f, same, "plan: {grade: middle, dilution: in-tube, fillings: 2}\n");
    const struct sheet_work *w = &f.work;
    for (size_t s = 0; s < SERIES; s++) {
        double there_m3 = 0.0, polymer_kg = 0.0;
        for (size_t i = w->levels; i-- > 0;) {
            const struct sheet_work_level *l = &w->level[i];
            if (l->series != s)
                continue;
            there_m3 += l->taken_m3;
            check_round(l->tube_m3, there_m3, 16);
            if (!l->diluted)
                polymer_kg = l->conc_kg_m3 * there_m3;
            check_round(l->conc_kg_m3 * there_m3, polymer_kg, 16);
        }
    }
    close_fixture(&f);
}

/* Blank that is needed: 36 mL for the fillings of a day with cleaved levels,
 * and what its levels are made up with. */
static void blank_that_is_needed(void **state)
{
    (void)state;
    struct fixture f;
    open_fixture(&f, same, "cleavage: {reference: blank}\nbench: {working_day: 20 h}\nplan: {grade: middle}\n");
    check_round(f.work.blank_m3, 36e-6, 8);
    close_fixture(&f);
    /* 50 mL flasks, 0.4, 0.6, 0.8 of the stock: 30 + 20 + 10 mL more */
    open_fixture(&f, same,
                 "cleavage: {reference: blank, diluent: blank}\nbench: {working_day: 20 h}\nplan: {grade: middle}\n");
    check_round(f.work.blank_m3, 96e-6, 64);
    close_fixture(&f);
    open_fixture(&f, same, "plan: {grade: middle}\n");
    assert_true(f.work.blank_m3 == 0.0);
    close_fixture(&f);
}

/* The timetable is the design's: a day begins at 0:00, no gap, the nominal
 * clock in all, and, where no spare run is made, the times of a study. */
static void rows_match_the_design(void **state)
{
    (void)state;
    static const char *const plans[] = {
        "bench: {spare_runs: 0}\nplan: {grade: middle}\n",
        "bench: {spare_runs: 0}\nplan: {grade: middle, dilution: in-tube, fillings: 1}\n",
        "bench: {spare_runs: 0, working_day: 5 h}\ncleavage: {reference: blank}\n"
        "plan: {grade: middle, order: bracketed, preparations: 2}\n",
    };
    for (size_t i = 0; i < sizeof plans / sizeof *plans; i++) {
        struct fixture f;
        struct show_notebook shown;
        double all_s = 0.0;
        size_t run = 0;
        open_fixture(&f, same, plans[i]);
        const struct sheet_work *w = &f.work;
        assert_int_equal(w->rows, w->design.layout.fillings);
        assert_true(show_notebook_make(f.scenario, &f.plan, 0, &shown));
        for (size_t r = 0; r < w->rows; r++) {
            const bool opens = r == 0 || w->row[r].filling->day != w->row[r - 1].filling->day;
            assert_true(w->row[r].begins_s == (opens ? 0.0 : w->row[r - 1].ends_s));
            check_round(w->row[r].ends_s - w->row[r].begins_s, design_filling_s(&w->design, w->row[r].filling), 64);
            all_s += w->row[r].ends_s - w->row[r].begins_s;
            for (size_t k = 0; k < w->row[r].filling->runs; k++, run++) {
                check_round(sheet_work_run_s(w, &w->row[r], k), shown.run[run].started_s, 64);
                assert_int_equal(shown.run[run].filling->level, w->row[r].filling->level);
            }
        }
        assert_int_equal(run * f.plan.preparations, shown.runs);
        check_round(all_s * w->design.repeats, w->design.nominal_clock_s, 256);
        show_notebook_free(&shown);
        close_fixture(&f);
    }
}

/* ---- the page ---- */

static void escapes(void **state)
{
    (void)state;
    char *text = NULL;
    size_t size = 0;
    FILE *to = open_memstream(&text, &size);
    html_text(to, "<a href=\"x\" b='y'>&amp;\n\033[1m\177 \xC3\xA9");
    fclose(to);
    assert_string_equal(text, "&lt;a href=&quot;x&quot; b=&#39;y&#39;&gt;&amp;amp;  [1m  \xC3\xA9"); /* TEXT */
    free(text);
}

static char *page_of(struct fixture *f)
{
    char *text = NULL;
    size_t size = 0;
    struct report_context context = {.scenario = f->scenario, .version = "0.1"};
    struct warnings *warnings = warnings_collect(f->scenario, &f->plan, NULL, false);
    FILE *to = open_memstream(&text, &size);
    sheet_page_print(to, &context, &f->work, warnings);
    fclose(to);
    warnings_free(warnings);
    return text;
}

static size_t times(const char *text, const char *part)
{
    size_t n = 0;
    for (; (text = strstr(text, part)); text += strlen(part))
        n++;
    return n;
}

static void page_is_text_only(void **state)
{
    (void)state;
    struct fixture f;
    open_fixture(&f, "title: \"</title><script>alert('x')</script><img src=x> & so on\"\n",
                 "question: {expect: 1.5 %, against: 1.2 %}\nplan: {grade: middle}\n");
    char *text = page_of(&f);
    static const char *const never[] = {"<script", "<img", "http:", "https:", "url(", "@import", "</title><"};
    for (size_t i = 0; i < sizeof never / sizeof *never; i++)
        assert_null(strstr(text, never[i]));
    assert_int_equal(times(text, "src="), 2); /* title and heading */
    assert_int_equal(times(text, "&lt;script&gt;alert(&#39;x&#39;)&lt;/script&gt;"), 2);
    assert_non_null(strstr(text, "Planned, nothing measured"));
    assert_true(strstr(text, "Cautions first") < strstr(text, "Before day 1"));
    free(text);
    close_fixture(&f);
}

/* A line for each planned run, and a section for each day of each repeat. */
static void page_has_all_days(void **state)
{
    (void)state;
    struct fixture f;
    open_fixture(&f, "question: {expect: 1.5 %, against: 1.2 %, against_is: measured}\n",
                 "bench: {spare_runs: 0, working_day: 4 h}\nplan: {grade: middle, preparations: 2}\n");
    char *text = page_of(&f);
    size_t runs = 0;
    for (size_t i = 0; i < f.work.rows; i++)
        runs += f.work.row[i].filling->runs;
    assert_int_equal(times(text, "<section class=\"day\">"), f.work.design.days);
    assert_int_equal(times(text, "<li><span class=\"no\">"), 4 * runs);
    assert_int_equal(times(text, "<h2>Second polymer, preparation 2, day "), f.work.design.layout.days);
    free(text);
    close_fixture(&f);
}

/* ---- the notebook ---- */

static void notebook_has_every_run(void **state)
{
    (void)state;
    struct fixture f;
    struct files_failure failure = {""};
    char path[] = "/tmp/vicinal-notebook-XXXXXX";
    close(mkstemp(path));
    open_fixture(&f, same, "plan: {grade: middle, preparations: 2}\n");
    assert_true(sheet_notebook_write(&f.work, path, &failure));
    assert_int_equal(sheet_notebook_look(path, &failure), SHEET_NOTEBOOK_FREE);
    char *text = kept_read(path);
    assert_int_equal(times(text, "\n1,") + times(text, "\n2,"),
                     2 * (2 + 66)); /* stocks; 16 fillings of levels, 2 of water on each of 3 days, 3 runs each */
    assert_non_null(strstr(text, "\npreparation,day,started,solution,level,concentration [g/dL],filling,run,time "
                                 "[s],temperature [degC],note\n"));
    assert_non_null(strstr(
        text,
        "note\n1,,,intact-stock,,,,,,,\n1,,,cleaved-stock,,,,,,,\n1,1,0:18,water,,,1,1,,,\n1,1,0:23,water,,,1,2,,,\n"));
    assert_null(strstr(text, "Invented"));
    free(text);
    unlink(path);
    close_fixture(&f);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test(volumes_add_up),
        cmocka_unit_test(volumes_in_the_tube),
        cmocka_unit_test(blank_that_is_needed),
        cmocka_unit_test(rows_match_the_design),
        cmocka_unit_test(escapes),
        cmocka_unit_test(page_is_text_only),
        cmocka_unit_test(page_has_all_days),
        cmocka_unit_test(notebook_has_every_run),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
