#!/usr/bin/python3
"""The JSON of every command against its schema in this folder.

    tests/schema/test_schema.py BINARY

Each command is run on small scenarios with few studies in a folder of its own.
What it says with --json, and what stands in its file, must be valid and the
same; and every schema must refuse what is planted in a right answer: a key too
many, a key missing, a number as text.
"""
import copy
import json
import pathlib
import subprocess
import sys
import tempfile

import jsonschema

HERE = pathlib.Path(__file__).resolve().parent
LIMIT_S = 120

SAME = "question: {expect: 1.5 %, against: 1.2 %, against_is: same-constants}\n"
ONE = SAME + "plan: {grade: middle}\n"
BOTH = """title: "Two <questions>"
question: {expect: 1.5 %, against: 1.2 %, within: 0.3 %, sides: two}
plan: {grade: middle, temperature_record: none, runs: 1, preparations: 2}
bench: {tilt_u: 0 degree}
"""
WITHIN = """question: {expect: 1.5 %, within: 0.5 %}
polymer: {hydrolysis: 97 %}
kit:
  grades: [{name: mine, like: middle, distribution: log-normal, dispersity: 1.8, price_per_gram: 2}]
  tubes: [{name: ours, like: suspended-0c, E: 40 mm2 s}]
cost: {hour: 50, least: money, at_most: {hours: 60 h}}
plan: {grade: mine, tube: ours}
"""
MEASURED = """question: {expect: 1.5 %, against: 1.3 %, against_is: measured}
plan: {grade: middle, fillings: 1}
"""
IN_TUBE = """question: {expect: 1.5 %, against: 1.2 %}
cleavage: {diluent: blank, reference: blank}
plan: {grade: middle, dilution: in-tube, fillings: 1}
"""
SHARED = SAME + "solutions: {stock: shared}\nplan: {grade: middle, order: shuffled}\n"
IMPOSSIBLE = SAME + "plan: {grade: middle, dilution: in-tube, tube: constant-50}\n"
CHOICE = SAME + "plan: {grade: middle, fillings: [1, 2], tube: [suspended-0c, constant-50], dilution: [flasks, in-tube]}\n"
HOPELESS = "question: {expect: 1.5 %, against: 1.49 %}\nplan: {grade: [low, middle]}\n"
DEAR = SAME + "cost: {at_most: {polymer: 0.01 g}}\nplan: {grade: middle}\n"

# (verb, scenario, status)
RUNS = [
    ("kit", None, 0), ("kit", WITHIN, 0), ("kit", ONE, 0),
    ("check", ONE, 0), ("check", CHOICE, 0), ("check", BOTH, 0),
    ("trial", ONE, None), ("trial", BOTH, None), ("trial", WITHIN, None), ("trial", MEASURED, None),
    ("trial", IN_TUBE, None), ("trial", HOPELESS.replace("[low, middle]", "low"), 3), ("trial", IMPOSSIBLE, 3),
    ("trial", DEAR, 3),
    ("plan", CHOICE, 0), ("plan", HOPELESS, 3), ("plan", WITHIN, None), ("plan", IMPOSSIBLE, 3), ("plan", DEAR, 3),
    ("sheet", ONE, 0), ("sheet", BOTH, 0), ("sheet", WITHIN, 0), ("sheet", MEASURED, 0), ("sheet", IN_TUBE, 0),
    ("sheet", SHARED, 0), ("sheet", IMPOSSIBLE, 3),
    ("budget", ONE, 0), ("budget", WITHIN, None), ("budget", IMPOSSIBLE, 3),
    ("margin", ONE, None), ("margin", BOTH, None), ("margin", IMPOSSIBLE, 3),
]
FILED = {"plan", "trial", "budget", "margin"}  # the same object stands in VERB.json

passed = failed = 0


def check(good, what):
    global passed, failed
    if good:
        passed += 1
    else:
        failed += 1
        print("FAILED", what)


def validators():
    """One for each schema, and the schemas right themselves."""
    schemas = {path.stem: json.loads(path.read_text()) for path in sorted(HERE.glob("*.json"))}
    store = {schema["$id"]: schema for schema in schemas.values()}
    out = {}
    for name, schema in schemas.items():
        try:
            jsonschema.Draft202012Validator.check_schema(schema)
            check(True, name)
        except jsonschema.SchemaError as error:
            check(False, f"{name}.json is no schema: {error.message}")
        resolver = jsonschema.RefResolver(schema["$id"], schema, store=store)
        out[name] = jsonschema.Draft202012Validator(schema, resolver=resolver)
    return out


def mistakes(validator, value):
    errors = sorted(validator.iter_errors(value), key=lambda e: list(map(str, e.absolute_path)))
    return [f"{'/'.join(map(str, e.absolute_path)) or '(top)'}: {e.message[:200]}" for e in errors]


def spoilt(value):
    """(what, the answer with one thing wrong), in the object itself and in the last object of each list."""
    def objects(node, path):
        if isinstance(node, dict):
            yield path
            for key, child in node.items():
                yield from objects(child, path + [key])
        elif isinstance(node, list) and node:
            yield from objects(node[-1], path + [len(node) - 1])

    def at(root, path):
        for step in path:
            root = root[step]
        return root

    for path in objects(value, []):
        if path[:1] == ["scenario"] and len(path) > 1:
            continue  # its values may be text
        where = "/".join(map(str, path)) or "(top)"
        if path[:1] != ["cheapest_by_choice"] or len(path) == 1:  # below it the keys are options, which anyone may name
            bad = copy.deepcopy(value)
            at(bad, path)["planted"] = 1
            yield f"a key too many in {where}", bad
        for key, child in at(value, path).items():
            if isinstance(child, (int, float)) and not isinstance(child, bool):
                bad = copy.deepcopy(value)
                at(bad, path)[key] = str(child)
                yield f"{where}/{key} as text", bad
    for key in value:
        bad = copy.deepcopy(value)
        del bad[key]
        yield f"no {key}", bad


def run(binary, verb, scenario, status):
    name = f"{verb} {scenario.splitlines()[-1] if scenario else ''}"
    with tempfile.TemporaryDirectory() as folder:
        command = [binary, verb, "--json"]
        if scenario:
            (pathlib.Path(folder) / "scenario.yaml").write_text(scenario)
            command += ["scenario.yaml", "--studies", "256", "--out", "out"]
        done = subprocess.run(command, cwd=folder, capture_output=True, text=True, timeout=LIMIT_S, check=False)
        wanted = (0, 3) if status is None else (status,)
        if done.returncode not in wanted:
            check(False, f"{name}: status {done.returncode}, not {status}: {done.stderr}")
            return None
        try:
            answer = json.loads(done.stdout)
        except json.JSONDecodeError as error:
            check(False, f"{name}: {error}")
            return None
        written = pathlib.Path(folder) / "out" / f"{verb}.json"
        if verb in FILED:
            check(written.is_file() and written.read_text() == done.stdout, f"{name}: {verb}.json is another than stdout")
        return answer


def main():
    binary = str(pathlib.Path(sys.argv[1]).resolve())
    known = validators()
    planted = set()
    for verb, scenario, status in RUNS:
        answer = run(binary, verb, scenario, status)
        if answer is None:
            continue
        found = mistakes(known[verb], answer)
        check(not found, f"{verb}: {found[:5]}\n    of {scenario}")
        if verb not in planted and not found:
            planted.add(verb)
            for what, bad in spoilt(answer):
                check(not known[verb].is_valid(bad), f"{verb}: {what} is taken")
    print(f"{passed} passed, {failed} failed")
    return failed != 0


if __name__ == "__main__":
    sys.exit(main())
