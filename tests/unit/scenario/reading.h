/* Scenarios from a string, for the tests of this room. */
#ifndef VICINAL_TESTS_READING_H
#define VICINAL_TESTS_READING_H

#include <setjmp.h>
#include <stdarg.h>
#include <stddef.h>
#include <stdint.h>

#include <cmocka.h>

#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

#include "sim/scenario/scenario.h"

#define READING_QUESTION "question: {expect: 1.5 %, against: 1.2 %}\n"
#define READING_PLAN "plan: {grade: middle}\n"
#define READING_SMALL READING_QUESTION READING_PLAN

/* A scenario, or the complaints that there were. */
struct reading_result {
    struct scenario *scenario;
    struct complaints *complaints;
};

/* One --set and one --pick; NULL for none. */
static inline struct reading_result reading_changed(const char *text, const char *set, const char *pick)
{
    char path[] = "/tmp/vicinal-scenario-XXXXXX";
    const int file = mkstemp(path);
    assert_true(file >= 0);
    assert_int_equal(write(file, text, strlen(text)), strlen(text));
    close(file);
    struct reading_result r = {NULL, complain_new()};
    const struct scenario_request request = {path, &set, set != NULL, &pick, pick != NULL};
    r.scenario = scenario_read(&request, r.complaints);
    unlink(path);
    assert_int_equal(r.scenario == NULL, complain_count(r.complaints) > 0);
    return r;
}

static inline void reading_free(struct reading_result *r)
{
    scenario_free(r->scenario);
    complain_free(r->complaints);
    *r = (struct reading_result){0};
}

/* A scenario that must be right. */
static inline struct scenario *reading_good(const char *text, const char *set, const char *pick)
{
    struct reading_result r = reading_changed(text, set, pick);
    if (!r.scenario)
        complain_print(r.complaints, stdout);
    assert_non_null(r.scenario);
    complain_free(r.complaints);
    return r.scenario;
}

/* One that must be refused for one mistake, which is said with `what` in it. */
static inline void reading_bad(const char *text, const char *set, const char *pick, const char *what)
{
    struct reading_result r = reading_changed(text, set, pick);
    if (complain_count(r.complaints) != 1)
        complain_print(r.complaints, stdout);
    assert_null(r.scenario);
    assert_int_equal(complain_count(r.complaints), 1);
    if (!strstr(complain_text(r.complaints, 0), what))
        print_message("%s\n", complain_text(r.complaints, 0));
    assert_non_null(strstr(complain_text(r.complaints, 0), what));
    reading_free(&r);
}

/* The first plan of a scenario. */
static inline struct plan reading_plan(const char *text, const char *set)
{
    struct plan plan;
    struct scenario *s = reading_good(text, set, NULL);
    scenario_plan(s, 0, &plan);
    /* names do not outlive the scenario */
    plan.material.name = plan.grade.name = plan.tube.name = plan.bath.name = plan.thermometer.name = plan.timer.name =
        NULL;
    scenario_free(s);
    return plan;
}

#endif
