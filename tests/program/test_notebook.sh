#!/bin/sh
# --times and --notebooks: the synthetic notebook in the form of the interface.
. tests/program/lib.sh "$1"

say "one notebook" status 0 "$program" trial one.yaml --out o --times first.csv --set bench.agreement='0.05 %'
say "three notebooks" status 0 "$program" trial one.yaml --out o --times many.csv --notebooks 3 --set bench.agreement='0.05 %'
say "numbered before the ending" sh -c 'test -s many-1.csv -a -s many-2.csv -a -s many-3.csv -a ! -e many.csv -a ! -e many-4.csv'
say "the first is the first" cmp first.csv many-1.csv
say "the others are others" sh -c '! cmp -s many-1.csv many-2.csv && ! cmp -s many-2.csv many-3.csv'
"$program" trial one.yaml --out o --times bare.csv --set plan.temperature_record=none --set bench.spare_runs=0 >/dev/null 2>&1
say "without a record" test -s bare.csv
say "in a folder that is there" sh -c 'mkdir sub && "$1" trial one.yaml --out o --times sub/n.csv >/dev/null && test -s sub/n.csv' - "$program"
say "ten of them" status 3 "$program" trial one.yaml --out ten --times ten.csv --notebooks 10 --studies 16 # too few to resolve
say "all ten, each another study" sh -c 'for n in ten-*.csv; do grep -v "^#" "$n" | cksum; done | sort -u | wc -l | grep -qx 10'

cat >read.py <<'PYTHON'
import csv, json, statistics
HEAD = "day,started,solution,level,concentration [g/dL],filling,run,time [s],temperature [degC],note".split(",")

def read(name):
    lines = open(name).read().splitlines()
    assert lines[0].startswith("#")
    rows = list(csv.DictReader(line for line in lines if not line.startswith("#")))
    assert list(rows[0]) == HEAD
    return rows

def minutes(clock):
    hours, minute = clock.split(":")
    return 60 * int(hours) + int(minute)

outcome = json.load(open("o/trial.json"))["outcome"]
spare = 0
for name in ("many-1.csv", "many-2.csv", "many-3.csv"):
    rows = read(name)
    order = {"water": 0, "intact": 1, "cleaved": 2}
    key = [(int(r["day"]), order[r["solution"]], int(r["level"] or 0), int(r["filling"]), int(r["run"])) for r in rows]
    assert key == sorted(key) and len(set(key)) == len(key)  # the order of the bench
    fillings = {}
    for r in rows:
        fillings.setdefault((r["day"], r["solution"], r["level"], r["filling"]), []).append(r)
    days = {r["day"] for r in rows}
    # three levels, two fillings each, of both series; water twice a day; three runs and at most two more
    assert len(fillings) == 2 * 3 * 2 + 2 * len(days) and all(3 <= len(f) <= 5 for f in fillings.values())
    assert all([int(r["run"]) for r in f] == list(range(1, len(f) + 1)) for f in fillings.values())
    spare += sum(len(f) - 3 for f in fillings.values())
    for day in days:
        started = [minutes(r["started"]) for r in rows if r["day"] == day]
        assert started == sorted(started) and started[0] == 18  # 8 min to clean and fill, 10 min to wait
        assert [r["solution"] for r in rows if r["day"] == day][:6] == ["water"] * 6
    for r in rows:
        assert (r["concentration [g/dL]"] == "") == (r["solution"] == "water")
        if r["solution"] != "water":
            expected = outcome["concentrations"][r["solution"]][int(r["level"]) - 1] / 10  # kg/m3 in g/dL
            assert abs(float(r["concentration [g/dL]"]) - expected) < 1e-6 * expected
        assert 290 < float(r["time [s]"]) < 600 and 20 < float(r["temperature [degC]"]) < 30
        assert len(r["time [s]"].split(".")[1]) == 2  # the timer's resolution, 0.01 s
    water = [float(r["time [s]"]) for r in rows if r["solution"] == "water"]
    assert abs(statistics.mean(water) / 298.3 - 1) < 0.02
assert spare > 10
bare = read("bare.csv")
assert all(r["temperature [degC]"] == "" for r in bare) and all(int(r["run"]) <= 3 for r in bare)
PYTHON
say "what is in them" "$python" read.py
end
