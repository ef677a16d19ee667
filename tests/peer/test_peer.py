#!/usr/bin/python3
"""The program against its NumPy peer, scenario by scenario.

    test_peer.py PROGRAM [--studies N] [--seed N] [SCENARIO.yaml ...]

Runs `PROGRAM trial FILE --json --times NOTEBOOK` on every file of scenarios/ (or on those named),
plays the same resolved scenario with the peer and its own luck, and compares. The notebook shows the
order of the bench: it must be the peer's own timetable; how a shuffled order was dealt the peer reads
there. The last line is `N passed, N failed`; status 1 when any comparison failed.

Tolerances. STAT: 4 combined standard errors; a right program fails one comparison with the chance
6.3e-5, all of the 470 such comparisons of the 25 scenarios together with at most 3 %. Both
seeds are fixed, so the answer does not change from one run to the next. ROUND: 1e-9, relative, for
what is not random.
"""

import argparse
import itertools
import json
import math
import pathlib
import subprocess
import sys
import tempfile

import peer

sys.path.insert(0, str(pathlib.Path(__file__).resolve().parent.parent / "schema"))
import validate  # noqa: E402

STANDARD_ERRORS = 4.0
ROUND = 1e-9
SCENARIOS = pathlib.Path(__file__).parent / "scenarios"

# the peer's name of a figure: its place in the outcome, the name of its standard error there
PLACES = {
    "within": ("within.share", "within"),
    "critical": ("power.critical", "critical"),
    "power": ("power.power", "power"),
    "plain_false_alarm": ("power.plain_false_alarm", "plain_false_alarm"),
}


def run_program(program, scenario, studies):
    """The result of a trial as an object, and the order of the bench in its notebook.

    Statuses 0 (done) and 3 (this plan does not resolve) are right.
    """
    with tempfile.TemporaryDirectory() as folder:
        notebook = pathlib.Path(folder) / "notebook.csv"
        command = [program, "trial", str(scenario), "--json", "--studies", str(studies)]
        command += ["--out", folder, "--times", str(notebook)]
        done = subprocess.run(command, capture_output=True, text=True, check=False)
        if done.returncode not in (0, 3):
            raise RuntimeError(f"status {done.returncode}: {done.stderr.strip()}")
        return json.loads(done.stdout), peer.read_order(notebook)


def lookup(tree, place):
    """The number at a place such as 'concentrations.intact.0'; None where there is none."""
    for name in place.split("."):
        if isinstance(tree, list):
            tree = tree[int(name)] if int(name) < len(tree) else None
        else:
            tree = tree.get(name) if isinstance(tree, dict) else None
    return float(tree) if isinstance(tree, (int, float)) else None


def compare(outcome, stochastic, nominal):
    """Rows (name, program's value or None, peer's value, tolerance), one for each comparison."""
    rows = []
    for name, (value, own_error) in stochastic.items():
        place, error_name = PLACES.get(name, (name, name))
        error = lookup(outcome.get("se", {}), error_name)
        combined = math.hypot(own_error, own_error if error is None else error)
        rows.append((place, lookup(outcome, place), value, STANDARD_ERRORS * combined + ROUND * abs(value)))
    for name, value in nominal.items():
        rows.append((name, lookup(outcome, name), value, ROUND * abs(value)))
    for series in ("intact", "cleaved"):
        levels = sum(name.startswith(f"concentrations.{series}.") for name in nominal)
        found = outcome.get("concentrations", {}).get(series)
        rows.append((f"levels, {series}", None if found is None else len(found), levels, 0.0))
    return rows


def compare_order(order, timetable):
    """Row (name, places where the program's notebook departs from the peer's timetable, 0, 0)."""
    found = [[row[:3] for row in preparation] for preparation in order]
    differ = 0
    for theirs, ours in itertools.zip_longest(found, timetable, fillvalue=[]):
        differ += sum(one != other for one, other in itertools.zip_longest(theirs, ours))
    return ("timetable, places that differ", float(differ), 0.0, 0.0)


def print_rows(rows):
    """The table of one scenario; returns how many comparisons passed."""
    print(f"  {'figure':34} {'program':>15} {'peer':>15} {'difference':>11} {'allowed':>9}")
    passed = 0
    for name, found, value, allowed in rows:
        good = found is not None and abs(found - value) <= allowed
        passed += good
        shown, difference = ("absent", "") if found is None else (f"{found:.9g}", f"{found - value:.2g}")
        print(f"  {name:34} {shown:>15} {value:15.9g} {difference:>11} {allowed:9.2g}{'' if good else '  FAILED'}")
    return passed


def main():
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("program")
    parser.add_argument("scenarios", nargs="*", type=pathlib.Path)
    parser.add_argument("--studies", type=int, default=40000)
    parser.add_argument("--seed", type=int, default=271828, help="of the peer")
    options = parser.parse_args()

    passed = failed = 0
    files = options.scenarios or sorted(SCENARIOS.glob("*.yaml"))
    if not files:
        print("no scenario found")
        failed += 1
    for scenario in files:
        print(f"{scenario.name}, {options.studies} studies each")
        try:
            result, order = run_program(options.program, scenario, options.studies)
            stochastic, nominal, timetable = peer.trial(result["scenario"], options.studies, options.seed, order)
            mistakes = validate.wrong(result)
            if mistakes:
                raise ValueError(f"not by the schema: {mistakes[:3]}")
            rows = compare(result["outcome"], stochastic, nominal) + [compare_order(order, timetable)]
        except Exception as problem:  # whatever stops a comparison is a failure, never a reason to skip
            print(f"  FAILED: {type(problem).__name__}: {problem}")
            failed += 1
            continue
        good = print_rows(rows)
        passed += good
        failed += len(rows) - good
    print(f"{passed} passed, {failed} failed")
    return 1 if failed else 0


if __name__ == "__main__":
    sys.exit(main())
