"""Plants one bad file after the other in a small clean tree and sees each rule of the lint find it."""
import pathlib
import subprocess
import sys
import tempfile

LINT = pathlib.Path(__file__).with_name("lint")

CLEAN = {
    "models/water.h": "double water_density(double temperature_C);\n",
    "models/water.c": '''#include "models/water.h"
static const char *const names[] = {"{", "}"}; /* '{' exit( argv */
double water_density(double temperature_C) { return temperature_C + *names[temperature_C > 0.0]; }
''',
    "sim/base/spread.h": "int spread(int count);\n",
    "sim/base/spread.c": '''#include "sim/base/spread.h"
int spread(int count) {
    int sum = 0;
#pragma omp parallel for reduction(+ : sum)
    for (int i = 0; i < count; i++) sum += i;
    return sum; // #pragma omp
}
''',
    "sim/bench/truth.h": "struct truth { double fraction; };\n",
    "sim/bench/draws.h": "double draws_one(void);\n",
    "sim/bench/draws.c": '''#include "sim/bench/draws.h"
#include "sim/base/spread.h"
#include "sim/bench/helper.h"
double draws_one(void) { return 1.0 /* gsl_ran_gaussian */; }
''',
    "sim/bench/helper.h": '#include "sim/bench/draws.h"\n',
    "sim/reduce/notebook.h": '#include "models/water.h"\nvoid notebook_read(int a, int b, int c, int d, int (*e)(int, int));\n',
    "sim/reduce/notebook.c": '''#include "sim/reduce/notebook.h"
void notebook_read(int a, int b, int c, int d, int (*e)(int, int)) { e(a + b, c + d); }
''',
    "sim/main.c": '''#include <stdlib.h>
#include "sim/reduce/notebook.h"
int main(int argc, char **argv) { exit(argv[argc - 1] == NULL); }
''',
    "tests/lint/allow": "# none\n",
}


def lines(count, text="    x++;\n"):
    return text * count


# (what it is called, the rule that must find it, the files that are added or replaced)
PLANTED = [
    ("the wall: reduction includes the bench", "room",
     {"sim/reduce/peek.h": '#include "sim/bench/truth.h"\n'}),
    ("a model includes the simulation", "room", {"models/tube.h": '#include "sim/base/spread.h"\n'}),
    ("a model includes a library", "room", {"models/tube.h": "#include <yaml.h>\n"}),
    ("base includes a model", "room", {"sim/base/units.h": '#include "models/water.h"\n'}),
    ("the scenario includes the reduction", "room", {"sim/scenario/keys.h": '#include "sim/reduce/notebook.h"\n'}),
    ("the bench includes the judge", "room",
     {"sim/judge/search.h": "", "sim/bench/study.h": '#include "sim/judge/search.h"\n'}),
    ("the judge includes the report", "room",
     {"sim/report/page.h": "", "sim/judge/search.h": '#include "sim/report/page.h"\n'}),
    ("an include without its room", "room", {"models/tube.h": '#include "water.h"\n'}),
    ("an include by way of the parent", "room", {"sim/reduce/peek.h": '#include "../bench/truth.h"\n'}),
    ("an include of nothing", "room", {"models/tube.h": '#include "models/nothing.h"\n'}),
    ("two models include each other", "cycle",
     {"models/tube.h": '#include "models/bath.h"\n', "models/bath.h": '#include "models/tube.h"\n'}),
    ("a header includes back what its .c's header needs", "cycle",
     {"models/tube.h": "", "models/tube.c": '#include "models/tube.h"\n#include "models/bath.h"\n',
      "models/bath.h": '#include "models/tube.h"\n'}),
    ("two headers of a room include each other", "cycle",
     {"sim/bench/study.h": '#include "sim/bench/truth.h"\n', "sim/bench/truth.h": '#include "sim/bench/study.h"\n'}),
    ("a second parallel loop", "one-way", {"sim/bench/study.h": "#pragma omp parallel for\n"}),
    ("a second place that asks OpenMP", "one-way", {"sim/bench/study.h": "#include <omp.h>\n"}),
    ("a third, without the header", "one-way", {"sim/bench/study.h": "#define THREADS omp_get_max_threads()\n"}),
    ("exit outside main", "one-way", {"sim/base/units.h": "static inline void stop(void) { exit(1); }\n"}),
    ("argv outside main", "one-way", {"sim/report/log.h": "void log_write(char **argv);\n"}),
    ("a draw outside draws.c", "one-way", {"sim/bench/study.h": "#define DRAW gsl_ran_gaussian(r, 1)\n"}),
    ("rand()", "one-way", {"sim/bench/draws.h": "#define DRAW (rand() % 6)\n"}),
    ("a long file", "size", {"models/tube.h": "", "models/tube.c": lines(401, "\n")}),
    ("a long function", "size",
     {"models/tube.h": "", "models/tube.c": "static void tube_run(int x)\n{\n" + lines(58) + "}\n"}),
    ("a long function in a test", "size",
     {"tests/unit/test_x.c": "static void test_x(void **state)\n{\n" + lines(58) + "}\n"}),
    ("six parameters", "size",
     {"models/tube.h": "", "models/tube.c": "static int tube_run(int a, int b, int (*c)(int, int), int d, int e, int f) { return a; }\n"}),
    ("no header", "header", {"models/tube.c": "\n"}),
    ("a reminder", "words", {"README.md": "TO" + "DO: write this\n"}),
    ("a path of one machine", "words", {"README.md": "see /ho" + "me/me/notes\n"}),
    ("a folder beside the project", "words", {"models/tube.h": "/* see ../sha" + "red/notes */\n"}),
]

# The same, for the rules that look at object files.
COMPILED = [
    ("a global that can change", "globals", {"models/tube.h": "", "models/tube.c": "int tube_count = 1;\n"}),
    ("a static that can change", "globals",
     {"models/tube.h": "", "models/tube.c": "int tube_next(void);\nint tube_next(void) { static int n; return n++; }\n"}),
    ("one for each thread", "globals", {"models/tube.h": "", "models/tube.c": "_Thread_local int tube_count;\n"}),
    ("an exception that excepts nothing", "globals", {"tests/lint/allow": "models/water.c water_count none\n"}),
    ("a source that was not compiled", "globals", {"models/tube.h": "", "models/tube.c": None}),
    ("another file's prefix", "prefix", {"models/tube.h": "", "models/tube.c": "void water_boil(void) {}\n"}),
    ("a prefix that only begins alike", "prefix", {"models/tube.h": "", "models/tube.c": "void tubes(void) {}\n"}),
]


def lint(files, compiled):
    """The exit status and the rules that found something."""
    with tempfile.TemporaryDirectory(prefix="lint-") as folder:
        root = pathlib.Path(folder)
        tree = CLEAN | files
        for name, text in tree.items():
            (root / name).parent.mkdir(parents=True, exist_ok=True)
            (root / name).write_text(text or "")
        for name in [name for name, text in tree.items() if compiled and name.endswith(".c") and text is not None]:
            target = (root / "build" / name).with_suffix(".o")
            target.parent.mkdir(parents=True, exist_ok=True)
            subprocess.run(["gcc", "-std=c11", "-O1", "-fopenmp", f"-I{root}", "-c", root / name, "-o", target], check=True)
        command = [sys.executable, LINT, root] + ([root / "build"] if compiled else [])
        result = subprocess.run(command, capture_output=True, text=True)
        return result.returncode, result.stdout, {line.split(": ")[1] for line in result.stdout.splitlines()[:-1]}


def main():
    failed = []
    allowed = {"models/tube.h": "", "models/tube.c": "int tube_count = 1;\n",
               "tests/lint/allow": "models/tube.c tube_count because\n"}
    checks = [("clean sources", None, {}, False), ("clean objects", None, {}, True), ("an exception", None, allowed, True)]
    checks += [(*row, False) for row in PLANTED] + [(*row, True) for row in COMPILED]
    for name, rule, files, compiled in checks:
        status, output, rules = lint(files, compiled)
        expected = (1, {rule}) if rule else (0, set())
        if (status, rules) != expected:
            failed.append(name)
            print(f"{name}: expected {expected}, got status {status}:\n{output}")
    print(f"{len(checks) - len(failed)} passed, {len(failed)} failed")
    return 1 if failed else 0


if __name__ == "__main__":
    sys.exit(main())
