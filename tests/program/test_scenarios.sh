#!/bin/sh
# Every scenario that ships is planned, with few studies: done or nothing
# resolves, not a word of complaint, every figure drawn, and what is recommended
# goes through trial, budget, margin and sheet.
. tests/program/lib.sh "$1"

# quiet COMMAND...: exit status 0 or 3 and nothing on stderr.
quiet() {
    "$@" --quiet >out 2>err </dev/null
    got=$?
    [ "$got" = 0 ] || [ "$got" = 3 ] || { echo "exit status $got: $*"; return 1; }
    [ ! -s err ] || { head -3 err; return 1; }
}

# figures DIR: each CSV of a figure with its SVG and PDF.
figures() {
    for csv in "$1"/*.csv; do
        case $csv in */candidates.csv | */notebook*.csv) continue ;; esac
        # where all conditions fail already there is no panel of margins to draw
        case $csv in */margins.csv) [ -e "$1/recommended.yaml" ] || [ -e "$1/margin.json" ] || continue ;; esac
        [ -s "${csv%.csv}.svg" ] && [ -s "${csv%.csv}.pdf" ] || { echo "not drawn: $csv"; return 1; }
    done
}

for file in "$project"/scenarios/*.yaml; do
    name=$(basename "$file" .yaml)
    studies=1000
    [ "$name" = everyday-grade ] && studies=512
    say "$name is planned" quiet "$program" plan "$file" --studies $studies --out "$name"
    say "$name: figures" figures "$name"
    say "$name: report" test -s "$name/report.html"
    [ -e "$name/recommended.yaml" ] || continue
    for verb in trial budget margin sheet; do
        say "$name: $verb" quiet "$program" $verb "$name/recommended.yaml" --out "$name-$verb"
        say "$name: figures of $verb" figures "$name-$verb"
    done
done
end
