#!/usr/bin/python3
"""Every named choice of a scenario key is used by at least one scenario of the peer.

    test_choices.py PROGRAM

A choice counts as used when the resolved form of a scenario has it (of the kit, in the entries that
its plan names); `bench.like` is not in the resolved form and counts by the scenario's text.
The last line is `N passed, N failed`; status 1 when a choice is used by none.
"""

import json
import pathlib
import re
import subprocess
import sys
import tempfile

SCENARIOS = pathlib.Path(__file__).parent / "scenarios"

# The words between `|` in the scenario of the interface, by the key they stand beside. A choice of
# words or a number has the number's kind: `a number`. Added: yes and no, where both are allowed.
CHOICES = {
    "question.sides": "one | two",
    "question.against_is": "stated | same-constants | measured",
    "polymer.calibrated_by": "viscosity | number | weight",
    "polymer.law": "martin | huggins",
    "cleavage.neighbours": "excluded | independent",
    "cleavage.diluent": "water | blank",
    "cleavage.reference": "water | blank",
    "cleavage.correct_conversion": "yes | no",
    "solutions.stock": "separate | shared",
    "solutions.glass": "A | B",
    "bench.like": "research | teaching",
    "bench.combine": "mean | median",
    "bench.water_every_day": "yes | no",
    "kit.grades.average": "viscosity | weight | number",
    "kit.grades.distribution": "most-probable | schulz-zimm | log-normal | uniform",
    "kit.tubes.type": "suspended-level | constant-volume",
    "kit.tubes.ends": "flared | square",
    "kit.thermometers.reads": "mean | middle | ends",
    "plan.temperature_record": "each-run | none",
    "plan.levels_cleaved": "same | a number",
    "plan.fillings_cleaved": "same | a number",
    "plan.dilution": "flasks | in-tube",
    "plan.order": "sequential | shuffled | bracketed",
    "plan.extrapolation": "huggins | kraemer | martin | common-intercept | single-point",
    "plan.weighting": "equal | c-squared",
    "plan.density": "partial-volume | neglected",
    "plan.kinetic_energy": "corrected | neglected",
    "plan.chain_statistics": "discrete | continuous",
    "cost.least": "hours | money",
}


def resolve(program, scenario):
    """The resolved form of a scenario; statuses 0 (done) and 3 (this plan does not resolve) are right."""
    with tempfile.TemporaryDirectory() as folder:
        command = [program, "trial", str(scenario), "--json", "--studies", "16", "--out", folder]
        done = subprocess.run(command, capture_output=True, text=True, check=False)
    if done.returncode not in (0, 3):
        raise RuntimeError(f"status {done.returncode}: {done.stderr.strip()}")
    return json.loads(done.stdout)["scenario"]


def value_of(resolved, text, key):
    """What a scenario has for a key, as text; '' where it has nothing."""
    section, *path = key.split(".")
    if key == "bench.like":
        found = re.search(r"^bench: *\{[^}]*\blike: *([\w-]+)", text, re.MULTILINE)
        value = found[1] if found else ""
    elif section == "kit":
        kind, name = path
        chosen = resolved["plan"][kind.removesuffix("s")]
        chosen = chosen[0] if isinstance(chosen, list) else chosen
        value = next(entry for entry in resolved["kit"][kind] if entry["name"] == chosen).get(name, "")
    else:
        value = resolved[section].get(path[0], "")
        value = value[0] if isinstance(value, list) else value
    return "a number" if isinstance(value, (int, float)) else str(value)


def main():
    program = sys.argv[1]
    used, passed, failed = {}, 0, 0
    for scenario in sorted(SCENARIOS.glob("*.yaml")):
        try:
            resolved = resolve(program, scenario)
        except Exception as problem:  # a scenario that does not run uses nothing
            print(f"FAIL {scenario.name}: {problem}")
            failed += 1
            continue
        text = scenario.read_text(encoding="utf-8")
        for key in CHOICES:
            used.setdefault((key, value_of(resolved, text, key)), []).append(scenario.stem)
    for key, words in CHOICES.items():
        for word in words.split(" | "):
            users = used.pop((key, word), [])
            passed += bool(users)
            failed += not users
            print(f"{'ok  ' if users else 'FAIL'} {key}: {word}: {', '.join(users[:3]) or 'used by none'}")
    for key, word in used:  # a word that the list above does not know, so that the list grows with the program
        if word or key != "bench.like":
            print(f"FAIL {key}: {word or 'nothing'}: not in the list of choices")
            failed += 1
    print(f"{passed} passed, {failed} failed")
    return 1 if failed else 0


if __name__ == "__main__":
    sys.exit(main())
