#!/bin/sh
# --json prints one JSON object and nothing else, the one that is in the file;
# its members are those of the interface and agree with each other and with
# candidates.csv.
. tests/program/lib.sh "$1"

# whether out is one JSON object and nothing is on stderr
object() {
    "$python" -m json.tool out >/dev/null && [ "$(head -c 1 out)" = "{" ] && [ ! -s err ]
}

say "plan" status 0 "$program" plan grid.yaml --out p --json
say "one object" object
say "that of the file" cmp out p/plan.json
cp out plan.json
say "trial" status 0 "$program" trial one.yaml --out t --json
say "one object" object
say "that of the file" cmp out t/trial.json
cp out trial.json
say "check" status 0 "$program" check grid.yaml --json
say "one object" object
say "kit" status 0 "$program" kit --json
say "one object" object
say "kit of a scenario" status 0 "$program" kit grid.yaml --json
say "one object" object
say "nothing resolves" status 3 "$program" plan grid.yaml --out n --json --set question.within='0.001 %'
say "one object" object
cp out none.json
say "impossible trial" status 3 "$program" trial one.yaml --out i --json --set plan.levels=1
say "one object" object
cp out impossible.json
say "wrong input: nothing on stdout" status 2 "$program" trial one.yaml --out w --json --set plan.levels=0
say "empty" test ! -s out -a -s err -a ! -e w

cat >members.py <<'PYTHON'
import csv, json, math
FIGURES = {"studies", "truth", "mean", "bias", "sd", "rmse", "interval", "shortest", "within", "power", "no_answer", "spare_runs",
           "intrinsic_viscosity", "molar_mass", "concentrations", "flasks_mL", "days", "bench_hours", "hours", "polymer_g", "money", "status", "se"}
HEAD = {"program", "version", "verb", "seed", "scenario", "warnings", "zero_sources"}

def whole(outcome, more=frozenset()):
    assert set(outcome) >= FIGURES | more, FIGURES - set(outcome)
    assert set(outcome["power"]) == {"critical", "power", "plain_false_alarm"} and set(outcome["within"]) == {"share"}
    assert {"mean", "sd", "within", "power", "critical", "hours"} <= set(outcome["se"])
    assert math.isclose(outcome["bias"], outcome["mean"] - outcome["truth"], abs_tol=1e-12)
    assert math.isclose(outcome["rmse"] ** 2, outcome["bias"] ** 2 + outcome["sd"] ** 2 * (1 - 1 / outcome["studies"]), rel_tol=1e-9)
    assert outcome["hours"] > outcome["bench_hours"] > 1 and outcome["polymer_g"] > 0.1
    assert outcome["interval"]["low"] < outcome["mean"] < outcome["interval"]["high"]
    assert outcome["shortest"]["high"] - outcome["shortest"]["low"] <= outcome["interval"]["high"] - outcome["interval"]["low"]
    for series in ("intact", "cleaved"):
        assert outcome["concentrations"][series] == sorted(outcome["concentrations"][series])
        assert {"true", "mean", "sd"} == set(outcome["molar_mass"][series]) == set(outcome["intrinsic_viscosity"][series])

trial = json.load(open("trial.json"))
assert set(trial) == HEAD | {"outcome"} and trial["program"] == "vicinal" and trial["verb"] == "trial"
whole(trial["outcome"], {"resolvable"})
assert set(trial["outcome"]["resolvable"]) == {"against", "within"}

plan = json.load(open("plan.json"))
assert set(plan) == HEAD | {"candidates", "recommended", "cheapest_by_choice", "spent", "counts"}
rows = list(csv.DictReader(open("p/candidates.csv")))
# 2 baths, 2 records, 2 levels, 2 fillings, a line or a point: one level with a line is impossible
assert len(rows) == 32 and [int(r["index"]) for r in rows] == list(range(32))
counts = {s: sum(r["status"] == s for r in rows) for s in plan["counts"]}
assert counts == plan["counts"] and sum(counts.values()) == 32 and counts["impossible"] == 8
assert all(bool(r["why"]) == (r["status"] in ("impossible", "too dear")) for r in rows)
best = plan["recommended"]["index"]
whole(plan["recommended"]["outcome"], {"resolvable"})
assert plan["recommended"]["outcome"]["status"] == "resolves" and rows[best]["status"] == "resolves"
cheapest = min(float(r["hours [h]"]) for r in rows if r["status"] == "resolves")
assert round(float(rows[best]["hours [h]"]), 1) == round(cheapest, 1)
listed = {c["index"] for c in plan["candidates"]}
assert listed >= {int(r["index"]) for r in rows if r["status"] == "resolves"}
for c in plan["candidates"]:
    row = rows[c["index"]]
    assert c["status"] == row["status"] and all(row[key] == str(option) for key, option in c["options"].items())
for key, choices in plan["cheapest_by_choice"].items():
    for option, index in choices.items():
        resolving = [r for r in rows if r["status"] == "resolves" and r[key] == option]
        assert (index is None) == (not resolving)
        if index is not None:
            assert rows[index] in resolving and float(rows[index]["hours [h]"]) <= min(float(r["hours [h]"]) for r in resolving) + 0.1
assert 0 < plan["spent"]["studies"] and plan["spent"]["exhaustive"] % (2 * 1000) == 0

none = json.load(open("none.json"))
assert none["recommended"] is None and none["nearest_miss"]["outcome"]["status"] in ("fails", "undecided")
assert none["counts"]["resolves"] == 0 and all(i is None for c in none["cheapest_by_choice"].values() for i in c.values())
impossible = json.load(open("impossible.json"))
assert impossible["status"] == "impossible" and impossible["why"] and "outcome" not in impossible
PYTHON
say "members" "$python" members.py
end
