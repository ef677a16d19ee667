#!/bin/sh
# Nothing is written over until the new content is whole: a run that is killed,
# or that meets a full disk, leaves under every final name either what a whole
# run writes or what was there before.
. tests/program/lib.sh "$1"

began=$(date +%s%N)
"$program" plan grid.yaml --out whole >/dev/null 2>&1
takes_ms=$((($(date +%s%N) - began) / 1000000))
say "a whole run" test -s whole/plan.json -a -s whole/candidates.csv -a -s whole/cost.svg -a -s whole/recommended.yaml
"$program" plan grid.yaml --out old --seed 9 >/dev/null 2>&1
say "another before it" sh -c '! cmp -s whole/plan.json old/plan.json'

# whole_or_old FOLDER: each file is that of the whole run, or the old one where
# there was one; run.log, the PDFs and temporary names apart. Counts the files.
whole_or_old() {
    for path in "$1"/*; do
        name=${path##*/}
        [ -e "whole/$name" ] || continue
        case $name in run.log | *.pdf) continue ;; esac
        files=$((files + 1))
        cmp -s "$path" "whole/$name" || { [ "$2" = old ] && cmp -s "$path" "old/$name"; } || { echo "half a file: $path"; return 1; }
    done
}

# Killed after a twentieth, two ... of the time it takes, in a new folder and
# over an old one in turn, until it is through.
killed=0
files=0
step=1
whole=0
while [ $step -le 100 ] && [ $whole -lt 2 ]; do
    to=killed-$step # each its own: an orphaned gnuplot may still be at work in the last
    kind=new
    mkdir $to
    [ $((step % 2)) = 0 ] && kind=old && cp old/* $to
    "$program" plan grid.yaml --out $to >/dev/null 2>&1 &
    process=$!
    after_ms=$((step * takes_ms / 20))
    sleep "$(printf '%d.%03d' $((after_ms / 1000)) $((after_ms % 1000)))"
    kill -9 $process 2>/dev/null && killed=$((killed + 1))
    wait $process 2>/dev/null && whole=$((whole + 1))
    whole_or_old $to $kind || break
    step=$((step + 1))
done
say "killed runs leave no half file" test $whole = 2 -a $files -gt 0 -a $killed -ge 5

# Files are replaced, not written into: what else hangs on the old one keeps it.
mkdir over links
cp old/* over
for name in plan.json candidates.csv recommended.yaml cost.csv cost.svg; do ln over/$name links/$name; done
"$program" plan grid.yaml --out over >/dev/null 2>&1
for name in plan.json candidates.csv recommended.yaml cost.csv cost.svg; do
    say "$name is replaced" sh -c 'cmp -s over/$1 whole/$1 && cmp -s links/$1 old/$1' - $name
done

# A disk that is full after 4 KiB of each file: status 1, and no half file.
# (A limit on the size of files, the signal for it ignored.)
rm -rf new over
cp -r old over
for to in new over; do
    (trap '' XFSZ; ulimit -f 8; exec "$program" plan grid.yaml --out $to) >out 2>err
    say "full disk: status 1" test $? = 1
    say "full disk: said so" grep -q '^vicinal: .*: .' err
    mkdir -p $to
    files=0
    say "full disk: no half file" whole_or_old $to "$([ $to = over ] && echo old || echo new)"
    say "full disk: no JSON of the new run" sh -c '! cmp -s $1/plan.json whole/plan.json' - $to
done
say "full disk: the old files are still there" test -s over/plan.json -a -s over/candidates.csv

# Output that cannot be written.
say "stdout on a full device" status 1 sh -c '"$1" trial one.yaml --out o --json >/dev/full' - "$program"
say "said so" grep -q '^vicinal: ' err
say "notebook below a file" status 1 "$program" trial one.yaml --out o --times grid.yaml/n.csv
say "said so" grep -q '^vicinal: grid.yaml' err
mkdir taken
say "notebook where a folder is" status 1 "$program" trial one.yaml --out o --times taken
say "output where a file is" status 1 "$program" trial one.yaml --out grid.yaml
say "the file is as it was" grep -q '^question:' grid.yaml
end
