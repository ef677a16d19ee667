#!/bin/sh
# The same bytes for 1, 2, 3 and 8 threads and without OpenMP, in every file but
# run.log and the PDFs and in what is printed; and from the resolved scenario.
. tests/program/lib.sh "$1"

# run NAME BINARY ARGUMENTS...: in a folder of its own, so that all names are alike.
run() {
    name=$1
    binary=$2
    shift 2
    mkdir "$name"
    (cd "$name" && cp ../*.yaml . && "$binary" "$@" >stdout 2>stderr </dev/null; echo $? >status)
}

for threads in 1 2 3 8; do
    run plan-$threads "$program" plan grid.yaml --out o --threads $threads
    run trial-$threads "$program" trial one.yaml --out o --threads $threads --times n.csv --notebooks 3
    run json-$threads "$program" plan grid.yaml --out o --threads $threads --json
done
say "plan resolves" grep -qx 0 plan-1/status
say "trial answers" grep -qx '[03]' trial-1/status
say "figures are there" test -s plan-1/o/cost.svg -a -s trial-1/o/extrapolation.csv -a -s trial-1/n-3.csv
for threads in 2 3 8; do
    for verb in plan trial json; do
        say "$verb with $threads threads" diff -rq -x run.log -x '*.pdf' $verb-1 $verb-$threads
    done
done

say "there is a program without OpenMP" test -x "$serial"
say "which is another" sh -c '! cmp -s "$1" "$2"' - "$program" "$serial"
run plan-serial "$serial" plan grid.yaml --out o
run trial-serial "$serial" trial one.yaml --out o --times n.csv --notebooks 3
for verb in plan trial; do
    say "$verb without OpenMP" diff -rq -x run.log -x '*.pdf' $verb-1 $verb-serial
done

# The resolved form runs to the same bytes, the scenario's name apart: here under the same name.
for verb in plan trial; do
    mkdir $verb-again
    name=$([ $verb = plan ] && echo grid || echo one)
    cp $verb-1/o/scenario.resolved.yaml $verb-again/$name.yaml
    (cd $verb-again && "$program" $verb $name.yaml --out o >stdout 2>stderr; echo $? >status)
    say "$verb of the resolved scenario" same $verb-1/o $verb-again/o
    say "$verb of the resolved scenario, printed" cmp $verb-1/stdout $verb-again/stdout
    say "$verb of the resolved scenario, status" cmp $verb-1/status $verb-again/status
done
say "resolved once and twice is the same" cmp plan-1/o/scenario.resolved.yaml plan-again/o/scenario.resolved.yaml

# The recommended plan is one plan that a trial takes, and resolves there.
say "trial of recommended.yaml" status 0 "$program" trial plan-1/o/recommended.yaml --out tried
say "which resolves" grep -q '"status": "resolves"' tried/trial.json
say "nothing on stderr" test ! -s err
end
