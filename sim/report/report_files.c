#include "sim/report/report_files.h"

#include <stdlib.h>
#include <string.h>

#include "sim/report/json_out_print.h"
#include "sim/report/run_log.h"

bool report_files_memory(struct files_failure *failure)
{
    snprintf(failure->text, sizeof failure->text, "out of memory");
    return false;
}

int report_files_failed(const struct report_context *context, const struct files_failure *failure)
{
    fprintf(context->err, "vicinal: %s\n", *failure->text ? failure->text : "out of memory");
    return 1;
}

bool report_files_scenario(const struct report_context *context, const char *name, size_t index,
                           struct files_failure *failure)
{
    char *yaml = scenario_resolved_yaml(context->scenario, index);
    char *path = yaml ? files_path(context->folder, name) : NULL;
    const bool good = path ? files_write(path, yaml, strlen(yaml), failure) : report_files_memory(failure);
    free(path);
    free(yaml);
    return good;
}

bool report_files_json(const struct report_context *context, const char *name, json_t *object,
                       struct files_failure *failure)
{
    struct files_text text;
    if (!object || !files_text_open(&text))
        return report_files_memory(failure);
    json_out_print(text.stream, object);
    return files_text_save(&text, context->folder, name, failure);
}

bool report_files_log(const struct report_context *context, struct files_failure *failure)
{
    struct files_text text;
    if (!files_text_open(&text))
        return report_files_memory(failure);
    run_log_print(text.stream, context);
    return files_text_save(&text, context->folder, "run.log", failure);
}

void report_files_drawn(const struct report_context *context, const struct figures_pen *pen)
{
    if (pen->drawn == GNUPLOT_MISSING)
        fprintf(context->err, "vicinal: no gnuplot, so no figures; their numbers are in %s\n", context->folder);
    else if (pen->drawn == GNUPLOT_FAILED)
        fprintf(context->err, "vicinal: %s\n", pen->failure.text);
}

bool report_files_flushed(const struct report_context *context, struct files_failure *failure)
{
    if (fflush(context->out) == 0 && !ferror(context->out))
        return true;
    snprintf(failure->text, sizeof failure->text, "the answer could not be written");
    return false;
}
