#include "sim/report/proposal.h"

#include <stdlib.h>

#include "sim/report/markdown.h"
#include "sim/report/proposal_answer.h"
#include "sim/report/proposal_choices.h"
#include "sim/report/proposal_html.h"
#include "sim/report/proposal_justify.h"
#include "sim/report/proposal_plans.h"
#include "sim/report/proposal_rest.h"
#include "sim/report/proposal_why.h"

static const char untitled[] = "Plan of a head-to-head determination by capillary viscometry";

static const char *title(const struct report_context *context)
{
    const char *given = scenario_title(context->scenario);
    return *given ? given : untitled;
}

/* In the order in which a reviewer asks. */
static void compose(const struct proposal *p)
{
    markdown_heading(p->to, 1, title(p->context));
    proposal_answer_question(p);
    proposal_answer_answer(p);
    proposal_answer_plan(p);
    proposal_choices(p);
    proposal_why_budget(p);
    proposal_why_margins(p);
    proposal_justify(p);
    proposal_rest_assumptions(p);
    proposal_rest_left_out(p);
    proposal_rest_cautions(p);
    proposal_rest_reproduce(p);
    proposal_plans(p);
}

static bool write_page(const struct report_context *context, const struct files_text *markdown,
                       struct files_failure *failure)
{
    const struct proposal_html page = {
        .markdown = markdown->bytes, .size = markdown->size, .title = title(context), .folder = context->folder};
    struct files_text html;
    if (!files_text_open(&html))
        return false;
    const bool good = proposal_html_print(html.stream, &page);
    return files_text_save(&html, context->folder, "report.html", failure) && good;
}

bool proposal_write(const struct report_context *context, const struct report_planned *planned,
                    const struct warnings *warnings, const struct figures_pen *pen, struct files_failure *failure)
{
    const struct search_result *r = planned->search;
    const bool resolves = r->recommended != SEARCH_NONE;
    const long index = resolves ? r->recommended : r->nearest_miss;
    struct plan plan;
    struct files_text text;
    struct proposal p = {
        .context = context, .planned = planned, .warnings = warnings, .pen = pen, .resolves = resolves};
    if (index != SEARCH_NONE) {
        scenario_plan(context->scenario, (size_t)index, &plan);
        p.plan = &plan;
        p.outcome = resolves ? &r->fresh : &r->nearest;
        p.index = (size_t)index;
    }
    if (!files_text_open(&text))
        return false;
    p.to = text.stream;
    compose(&p);
    bool good = files_text_close(&text) && write_page(context, &text, failure);
    char *path = good ? files_path(context->folder, "report.md") : NULL;
    good = path && files_write(path, text.bytes, text.size, failure);
    free(path);
    files_text_free(&text);
    return good;
}
