# What the tests of the program have in common; sourced with the path of the
# binary in $1. They run in a folder of their own, which is removed.
set -u
case $1 in /*) program=$1 ;; *) program=$PWD/$1 ;; esac
case ${VICINAL_SERIAL-} in
"") serial= ;;
/*) serial=$VICINAL_SERIAL ;;
*) serial=$PWD/$VICINAL_SERIAL ;;
esac
project=$PWD
python=${PYTHON:-python3}
folder=$(mktemp -d "${TMPDIR:-/tmp}/vicinal-program-XXXXXX")
trap 'rm -rf "$folder"' EXIT
cd "$folder" || exit 1
passed=0
failed=0

# say WHAT COMMAND...: one test, passed when the command succeeds.
say() {
    what=$1
    shift
    if "$@"; then
        passed=$((passed + 1))
    else
        failed=$((failed + 1))
        echo "FAILED: $what"
    fi
}

# status N COMMAND...: whether it ends with that exit status; what it writes goes to out and err.
status() {
    wanted=$1
    shift
    "$@" >out 2>err </dev/null
    got=$?
    [ "$got" = "$wanted" ] || { echo "exit status $got, not $wanted: $*"; head -5 err; return 1; }
}

# same A B: two folders hold the same files, byte for byte, but for run.log and the PDFs.
same() {
    diff -rq -x run.log -x '*.pdf' "$1" "$2" && [ "$(ls "$1")" = "$(ls "$2")" ]
}

# Every answer that a test left behind must be valid by its schema.
end() {
    say "every JSON file by its schema" "$python" "$project/tests/schema/validate.py" "$folder"
    echo "$passed passed, $failed failed"
    [ "$failed" = 0 ] || exit 1
    exit 0
}

# A grid in which plans resolve, fail and are impossible; bubbles, spare runs
# and a bath that wanders keep every draw in use.
cat >grid.yaml <<'YAML'
question: {expect: 1.5 %, against: 1.38 %, within: 0.2 %, against_is: same-constants}
plan:
  grade: middle
  bath: [beaker-on-hot-plate, circulator]
  temperature_record: [none, each-run]
  timer: first-time
  levels: [1, 2]
  fillings: [1, 2]
  extrapolation: [martin, single-point]
bench: {bubble_chance: 3 %}
run: {studies: 1000}
YAML
cat >one.yaml <<'YAML'
question: {expect: 1.5 %, against: 1.3 %, within: 0.3 %, against_is: same-constants}
plan: {grade: middle, bath: insulated-beaker, timer: first-time, levels: 3}
bench: {bubble_chance: 3 %}
run: {studies: 1000}
YAML
