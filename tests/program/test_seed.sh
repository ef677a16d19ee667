#!/bin/sh
# --seed and --studies: another seed gives other figures of the same size, the
# same one the same bytes; they are the keys run.seed and run.studies.
. tests/program/lib.sh "$1"

for seed in 1 2 2; do
    rm -rf again
    [ -d seed-$seed ] && mv seed-$seed again
    say "seed $seed" status 0 "$program" trial one.yaml --out seed-$seed --seed $seed
done
say "seed 1 is the default" sh -c '"$1" trial one.yaml --out default >/dev/null && cmp default/trial.json seed-1/trial.json' - "$program"
say "the same seed, the same bytes" same seed-2 again
say "--set run.seed" status 0 "$program" trial one.yaml --out set --set run.seed=2
say "the same as --seed" same seed-2 set
say "--studies" status 0 "$program" trial one.yaml --out studies --studies 333
say "a large seed" status 0 "$program" trial one.yaml --out large --seed 9007199254740991
cat >compare.py <<'PYTHON'
import json, math
one, two, few, large = (json.load(open(f"{name}/trial.json")) for name in ("seed-1", "seed-2", "studies", "large"))
a, b = one["outcome"], two["outcome"]
assert one["seed"] == 1 and two["seed"] == 2 and large["seed"] == 9007199254740991
assert one["scenario"]["run"]["seed"] == 1 and two["scenario"]["run"]["seed"] == 2
assert few["outcome"]["studies"] == 333 and a["studies"] == 1000
for key in ("mean", "sd", "rmse", "spare_runs", "bench_hours"):
    assert a[key] != b[key], key
    # STAT: two independent figures, 4.5 standard errors; 7e-6 each, the seeds fixed
    assert abs(a[key] - b[key]) < 4.5 * math.hypot(a["se"][key], b["se"][key]), key
assert abs(a["power"]["power"] - b["power"]["power"]) < 4.5 * math.hypot(a["se"]["power"], b["se"]["power"])
for key in ("truth", "days", "polymer_g", "concentrations", "flasks_mL"):
    assert a[key] == b[key], key  # nominal: no matter of luck
PYTHON
say "figures differ as their errors say" "$python" compare.py
end
