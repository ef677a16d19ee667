/* The report for a proposal: order, words, and that nothing typed is ever more
 * than text. */
#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <ctype.h>
#include <stdio.h>
#include <unistd.h>

#include "sim/report/markdown.h"
#include "sim/report/proposal.h"
#include "sim/report/proposal_html.h"
#include "sim/report/svg.h"
#include "tests/unit/report/fake.h"
#include "tests/unit/report/fake_why.h"

/* One report and its two files. */
struct run {
    char folder[64];
    struct scenario scenario;
    struct fake_search search;
    struct budget budget;
    struct margins margins;
    struct warnings warnings;
    struct report_planned planned;
    struct figures_pen pen;
    char *markdown, *html;
};

static int make(void **state)
{
    struct run *r = calloc(1, sizeof *r);
    strcpy(r->folder, "/tmp/vicinal-proposal-XXXXXX");
    if (!mkdtemp(r->folder))
        return -1;
    r->scenario = fake_scenario();
    fake_search(&r->scenario, &r->search);
    r->budget = fake_budget();
    r->margins = fake_margins();
    r->planned = (struct report_planned){.search = &r->search.result, .budget = &r->budget, .margins = &r->margins};
    *state = r;
    return 0;
}

static int clear(void **state)
{
    static const char *const files[] = {"report.md", "report.html", "budget.svg"};
    struct run *r = *state;
    for (size_t i = 0; i < sizeof files / sizeof *files; i++) {
        char *path = files_path(r->folder, files[i]);
        unlink(path);
        free(path);
    }
    const int left = rmdir(r->folder);
    free(r->markdown);
    free(r->html);
    free(r);
    return left;
}

static char *read_file(const struct run *r, const char *name)
{
    char *path = files_path(r->folder, name), *text = calloc(1, 1 << 21);
    FILE *from = fopen(path, "r");
    assert_non_null(from);
    assert_true(fread(text, 1, (1 << 21) - 1, from) > 0);
    fclose(from);
    free(path);
    return text;
}

static void report(struct run *r)
{
    struct files_failure failure;
    const struct report_context context = {.scenario = &r->scenario, .version = "0.1", .folder = r->folder};
    free(r->markdown);
    free(r->html);
    assert_true(proposal_write(&context, &r->planned, &r->warnings, &r->pen, &failure));
    r->markdown = read_file(r, "report.md");
    r->html = read_file(r, "report.html");
}

/* Each text is there, behind the one before it. */
static void assert_order(const char *text, const char *const *parts)
{
    for (; *parts; parts++) {
        const char *found = strstr(text, *parts);
        if (!found)
            print_error("not there, or too early: \"%s\"\n", *parts);
        assert_non_null(found);
        text = found + strlen(*parts);
    }
}

static void assert_said(const char *text, const char *part)
{
    assert_order(text, (const char *const[]){part, NULL});
}

static void assert_plain_words(const char *text)
{
    static const char *const ours[] = {"candidate", "candidates", "world", "luck", "nan", "inf", "null"};
    for (size_t i = 0; i < sizeof ours / sizeof *ours; i++)
        for (const char *p = text; (p = strstr(p, ours[i])); p++)
            if (!isalpha((unsigned char)p[-1]) && !isalpha((unsigned char)p[strlen(ours[i])])) {
                print_error("our own word \"%s\": %.60s\n", ours[i], p - 20);
                fail();
            }
}

static void sections_in_order(void **state)
{
    static const char *const sections[] = {"# A made-up study\n",
                                           "## The question\n",
                                           "## The answer\n",
                                           "## The plan\n",
                                           "## Grade and glass to buy\n",
                                           "## Replicates and concentrations\n",
                                           "## Temperature control\n",
                                           "## Error budget\n",
                                           "## Margins\n",
                                           "## Justification of the temperature control\n",
                                           "## Justification of the replicate count\n",
                                           "## Assumptions and their sources\n",
                                           "## What is left out\n",
                                           "## Cautions\n",
                                           "## How to reproduce it\n",
                                           "## All plans\n",
                                           NULL};
    struct run *r = *state;
    report(r);
    assert_order(r->markdown, sections);
    assert_plain_words(r->markdown);
    assert_said(r->markdown, "`vicinal plan made-up.yaml --seed 7 --studies 20000`");
    assert_said(r->markdown, "| `tilt_u` of the tube | 0.5 degree | given in the scenario |");
    assert_said(r->markdown, "IAPWS SR6-08");
    assert_said(r->markdown, "oxidiser");
    assert_null(strstr(r->markdown, "recommended.yaml"));
    assert_null(strstr(r->markdown, r->folder)); /* no path of this machine */
    assert_null(strstr(r->html, r->folder));
    assert_said(r->html, "<h2 id=\"s16\">All plans</h2>");
    assert_said(r->html, "<a href=\"#s16\">All plans</a>");
}

static void the_answer(void **state)
{
    struct run *r = *state;
    report(r);
    /* a number keeps to its unit by a blank that does not break */
    assert_said(r->markdown, "**It resolves: the plan below tells 1.5\xC2\xA0% head-to-head apart from 1.3\xC2\xA0%");
    assert_said(r->markdown, "a power of 93.21\xC2\xA0% (Monte Carlo error 0.27; asked: 90\xC2\xA0%)");
    assert_said(r->markdown, "2\xC2\xA0"
                             "days, 14.2\xC2\xA0h of work");
    assert_said(r->markdown, "Decide at 1.391\xC2\xA0%");
    assert_said(r->markdown, "| bath: beaker | - | - | nothing resolves |");
    assert_said(r->markdown, "| bath: circulator | 17.2 | 2 | recommended |");
    assert_said(r->markdown, "stock in a 100 mL flask");
    assert_said(r->markdown, "Nothing that was weighed resolves with bath beaker.");
    assert_said(r->markdown, "bath fluctuation up to 0.05\xC2\xA0K (planned: 0.02\xC2\xA0K)");
    assert_said(r->markdown, "Nothing that was weighed resolves with fillings 1\xC2\xA0or fillings 2.");
}

static void nothing_resolves(void **state)
{
    struct run *r = *state;
    fake_missed(&r->scenario, &r->search);
    report(r);
    assert_order(r->markdown, (const char *const[]){"## The answer", "Nothing resolves", "The nearest miss",
                                                    "The constants are the limit", "### Ways out", "same-constants",
                                                    "## The nearest miss", "## Grade and glass", "## Error budget",
                                                    "## Cautions", "come nearest", NULL});
    assert_null(strstr(r->markdown, "## Justification"));
    assert_plain_words(r->markdown);
    for (size_t i = 0; i < FAKE_PLANS; i++) {
        r->search.candidate[i].outcome = (struct outcome){.status = STATUS_IMPOSSIBLE};
        strcpy(r->search.candidate[i].outcome.why, "the | day is too short");
    }
    r->search.result.nearest_miss = SEARCH_NONE;
    r->planned.budget = NULL;
    r->planned.margins = NULL;
    report(r);
    assert_said(r->markdown, "* 24\xC2\xA0plans: impossible: the \\| day is too short");
    assert_null(strstr(r->markdown, "## The nearest miss"));
    assert_plain_words(r->markdown);
}

/* What an attacker would type, in every place where something is typed. */
static void nothing_typed_is_more_than_text(void **state)
{
    struct run *r = *state;
    char *warning[] = {"<b>b</b> *star* _low_ `tick` | [x](http://y)"};
    r->scenario.title = "<script>alert(1)</script> & &amp; # *a* | `b` \n## [l](javascript:x) ![i](http://h/i.png)";
    r->scenario.plan.thermometer.name = "</td><img src=x onerror=alert(1)>|*t*`";
    r->scenario.plan.material.name = "1. <!-- m -->";
    r->scenario.cost.currency = "<i>|";
    r->search.result.fresh.at.money = 12.0;
    r->warnings = (struct warnings){.count = 1, .text = warning};
    report(r);
    assert_said(r->markdown, "# \\<script\\>alert(1)\\</script\\> \\& \\&amp; \\# \\*a\\* \\| \\`b\\`  \\#\\# \\[l\\]");
    assert_said(r->html, "<h1>&lt;script&gt;alert(1)&lt;/script&gt; &amp; &amp;amp; # *a* | `b`  ## [l](javascript:x) "
                         "![i](http://h/i.png)</h1>");
    assert_said(r->html, "<title>&lt;script&gt;alert(1)&lt;/script&gt; &amp; &amp;amp;");
    assert_said(r->html, "&lt;b&gt;b&lt;/b&gt; *star* _low_ `tick` | [x](http://y)");
    assert_null(strstr(r->html, "<img"));
    assert_null(strstr(r->html, "<b>"));
    assert_null(strstr(r->html, "<i>"));
    assert_null(strstr(r->html, "<!-- "));
    assert_null(strstr(r->html, "href=\"http"));
    assert_null(strstr(r->html, "href=\"javascript"));
    const char *script = strstr(r->html, "<script");
    assert_non_null(script);
    assert_null(strstr(script + 1, "<script")); /* the page's own, and no other */
    size_t columns = 0;                         /* a bar in a name makes no column */
    const char *row = strstr(r->markdown, "| thermometer |");
    assert_non_null(row);
    for (const char *p = row; *p != '\n'; p++)
        columns += *p == '|' && p[-1] != '\\';
    assert_int_equal(columns, 3);
}

static char *escaped(void (*write_to)(FILE *to, const char *text), const char *text)
{
    char *out = NULL;
    size_t size = 0;
    FILE *to = open_memstream(&out, &size);
    write_to(to, text);
    fclose(to);
    return out;
}

static void paragraph(FILE *to, const char *text)
{
    markdown_paragraph(to, "%s", text);
}

static void signs(void **state)
{
    static const char *const cases[][2] = {{"1. no list", "1\\. no list\n\n"},
                                           {"- no list", "\\- no list\n\n"},
                                           {"+ no list", "\\+ no list\n\n"},
                                           {"12) no list", "12\\) no list\n\n"},
                                           {"1.5 % is", "1\\.5\xC2\xA0% is\n\n"},
                                           {"a\nb\x1B[0m", "a b \\[0m\n\n"},
                                           {"back\\slash", "back\\\\slash\n\n"},
                                           {"~x~ $y$ {z}", "\\~x\\~ \\$y\\$ \\{z\\}\n\n"},
                                           {"\xCE\xB7 > \xE2\x82\xAC", "\xCE\xB7 \\> \xE2\x82\xAC\n\n"}};
    (void)state;
    for (size_t i = 0; i < sizeof cases / sizeof *cases; i++) {
        char *out = escaped(paragraph, cases[i][0]);
        assert_string_equal(out, cases[i][1]);
        free(out);
    }
    char *code = escaped(markdown_code, "a `` b\nc");
    assert_string_equal(code, "``` a `` b c ```");
    free(code);
}

/* ---- the page ---- */

static char *page(const char *markdown, const char *folder)
{
    char *out = NULL;
    size_t size = 0;
    FILE *to = open_memstream(&out, &size);
    const struct proposal_html p = {markdown, strlen(markdown), "t", folder};
    assert_true(proposal_html_print(to, &p));
    fclose(to);
    return out;
}

static void tables_have_headers(void **state)
{
    (void)state;
    char *html =
        page("## Heads & tails\n\n| a | b |\n| --- | ---: |\n| c | `d` |\n| e | averyveryverylongword_in_it |\n", "/");
    assert_order(html, (const char *const[]){
                           "role=\"region\" tabindex=\"0\" aria-label=\"Heads &amp; tails\">", "<thead>",
                           "<th scope=\"col\">a</th>", "<th scope=\"col\" align=\"right\">b</th>", "</thead>",
                           "<th scope=\"row\">c</th>", "<td align=\"right\"><code>d</code></td>",
                           "<th scope=\"row\">e</th>", "averyveryverylon<wbr>gword_<wbr>in_<wbr>it</td>", NULL});
    free(html);
}

static void save(const struct run *r, const char *svg)
{
    char *path = files_path(r->folder, "budget.svg");
    struct files_failure failure;
    assert_true(files_write(path, svg, strlen(svg), &failure));
    free(path);
}

static void figures_are_part_of_the_page(void **state)
{
    static const char text[] = "![Says \"this\" & that](budget.svg)\n\n*The caption.*\n\nBehind.\n";
    struct run *r = *state;
    save(r, "<?xml version=\"1.0\"?>\n<svg viewBox='0 0 1 1'><title>Gnuplot</title><desc>x</desc><g id='a'/>"
            "<use xlink:href='#a'/><path id=\"b\" filter='url(#a)'/><text>id='c'</text></svg>\n");
    char *html = page(text, r->folder);
    assert_order(html, (const char *const[]){"<figure>",
                                             "<svg role=\"img\" aria-label=\"Says &quot;this&quot; &amp; that\" "
                                             "viewBox='0 0 1 1'><g id='budget-a'/>",
                                             "xlink:href='#budget-a'", "id=\"budget-b\" filter='url(#budget-a)'",
                                             "<text>id='c'</text></svg>", "<figcaption>", "The caption.",
                                             "</figcaption>", "</figure>", "Behind.", NULL});
    assert_null(strstr(html, "Gnuplot"));
    assert_null(strstr(html, "<?xml"));
    assert_null(strstr(html, "<img"));
    free(html);
}

static void figures_that_cannot_be_shown(void **state)
{
    static const char *const bad[] = {"no figure at all", "<svg><script>alert(1)</script></svg>",
                                      "<svg onload='x()'></svg>", "<svg><a href='http://h'>x</a></svg>"};
    struct run *r = *state;
    for (size_t i = 0; i < sizeof bad / sizeof *bad; i++) {
        save(r, bad[i]);
        char *html = page("![What it shows](budget.svg)\n", r->folder);
        assert_said(html, "What it shows");
        assert_null(strstr(html, "<img"));
        assert_null(strstr(html, "<svg"));
        free(html);
    }
    char *html = page("![Away](../budget.svg)\n\n![Gone](none.svg)\n\nwith ![inside](budget.svg) a line\n", r->folder);
    assert_null(strstr(html, "<svg"));
    assert_null(strstr(html, "<img"));
    free(html);
}

int main(void)
{
    const struct CMUnitTest tests[] = {
        cmocka_unit_test_setup_teardown(sections_in_order, make, clear),
        cmocka_unit_test_setup_teardown(the_answer, make, clear),
        cmocka_unit_test_setup_teardown(nothing_resolves, make, clear),
        cmocka_unit_test_setup_teardown(nothing_typed_is_more_than_text, make, clear),
        cmocka_unit_test(signs),
        cmocka_unit_test(tables_have_headers),
        cmocka_unit_test_setup_teardown(figures_are_part_of_the_page, make, clear),
        cmocka_unit_test_setup_teardown(figures_that_cannot_be_shown, make, clear),
    };
    return cmocka_run_group_tests(tests, NULL, NULL);
}
