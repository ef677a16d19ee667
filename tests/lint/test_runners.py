"""The two runners must not take a failure for a pass: small programs and cases with known ends go through them."""
import pathlib
import subprocess
import sys
import tempfile

TESTS = pathlib.Path(__file__).resolve().parents[1]

# What a test program does, and the sum that tests/run must print.
PROGRAMS = [
    ("echo '3 passed, 0 failed'", "3 passed, 0 failed", 0),
    ("echo '1 passed, 2 failed'; exit 1", "1 passed, 2 failed", 1),
    ("echo '1 passed, 2 failed'", "1 passed, 2 failed", 1),
    ("echo '3 passed, 0 failed'; exit 1", "3 passed, 1 failed", 1),
    ("echo '3 passed, 0 failed'; kill -SEGV $$", "3 passed, 1 failed", 1),
    ("echo hello", "0 passed, 1 failed", 1),
    ("echo '0 passed, 0 failed'", "0 passed, 1 failed", 1),
    ("sleep 60", "0 passed, 1 failed", 1),
    ("echo '[  PASSED  ] 2 test(s).' >&2; echo '[  PASSED  ] 1 test(s).' >&2", "3 passed, 0 failed", 0),
    ("echo '[  PASSED  ] 2 test(s).'; echo ' 4 FAILED TEST(S)'; exit 4", "2 passed, 4 failed", 1),
    ("echo '[  PASSED  ] 2 test(s).'; echo '[  SKIPPED ] 1 test(s), listed below:'", "2 passed, 1 failed", 1),
    ("test \"$1\" = BINARY && echo '1 passed, 0 failed'", "1 passed, 0 failed", 0),
]

# The program of the cases prints its argument and ends with the second one.
PROGRAM = '#!/bin/sh\nprintf "$1"\nprintf "wrong\\n" >&2\n[ "$2" = 99 ] && kill -SEGV $$\ntouch made\nexit "$2"\n'

# The files of a case, and whether it must pass.
CASES = [
    ({"args": "'a\\nb\\n' 0", "stdout": "a\nb\n", "stderr": "wrong\n"}, True),
    ({"args": "'a\\nb\\n' 0", "stdout": "a\n"}, False),
    ({"args": "'a\\nb\\n' 0", "stdout": "a\nb"}, False),
    ({"args": "'a\\nb' 0", "stdout": "a\nb\n"}, False),
    ({"args": "'a\\nb\\n' 0", "stdout": "a\nb\nc\n"}, False),
    ({"args": "'a\\nb\\n' 0", "stdout": ""}, False),
    ({"args": "'a\\nb\\nc\\nb\\n' 0", "stdout": "...\nb\n"}, True),
    ({"args": "'a\\nb\\nc\\n' 0", "stdout": "...\nb\n"}, False),
    ({"args": "'a\\nb\\nc\\n' 0", "stdout": "a\n...\nc\n...\n"}, True),
    ({"args": "'a\\nb\\nc\\n' 0", "stdout": "b\n...\n"}, False),
    ({"args": "'x=1.5 s\\n' 0", "stdout": "x=* s\n"}, True),
    ({"args": "'x=1.5 m\\n' 0", "stdout": "x=* s\n"}, False),
    ({"args": "'x=1\\ny s\\n' 0", "stdout": "x=* s\n"}, False),
    ({"args": "'x\\n' 0", "stdout": ".\n"}, False),
    ({"args": "x 3", "status": "3"}, True),
    ({"args": "x 3", "status": "2"}, False),
    ({"args": "x 3", "stderr": "wrong\n"}, False),
    ({"args": "x 0", "stderr": ""}, False),
    ({"args": "x 99", "status": "139"}, False),
    ({"args": "x 0"}, False),
    ({"status": "0"}, False),
    ({"args": "x 0", "status": "0", "setup": "exit 1"}, False),
    ({"args": "x 0", "status": "0", "setup": "mkdir there", "present": "there\nma?e\n"}, True),
    ({"args": "x 0", "status": "0", "present": "there\n"}, False),
    ({"args": "x 0", "status": "0", "absent": "out\nargs\n"}, True),
    ({"args": "x 0", "status": "0", "absent": "mad*\n"}, False),
]


def script(path, text):
    path.write_text(text)
    path.chmod(0o755)
    return path


def closing(command):
    result = subprocess.run(command, capture_output=True, text=True)
    return (result.stdout.splitlines() or [""])[-1], result.returncode


def main():
    wrong = []
    with tempfile.TemporaryDirectory(prefix="runners-") as top:
        folder = pathlib.Path(top)
        for number, (text, line, status) in enumerate(PROGRAMS):
            test = script(folder / f"test_{number}.sh", f"#!/bin/sh\n{text}\n")
            got = closing([TESTS / "run", "--limit", "2", "BINARY", test])
            wrong += [f"tests/run: {text}: {got}"] if got != (line, status) else []
        program = script(folder / "program", PROGRAM)
        for number, (files, good) in enumerate(CASES):
            case = folder / f"case-{number}"
            case.mkdir()
            for name, text in files.items():
                (case / name).write_text(text)
            got = closing([TESTS / "cases/run", program, case])
            wrong += [f"tests/cases/run: {files}: {got}"] if got != (f"{good:d} passed, {not good:d} failed", 1 - good) else []
        case = folder / "case-5"
        closing([TESTS / "cases/run", program, "--update", case])
        got = closing([TESTS / "cases/run", program, case])
        wrong += [f"tests/cases/run --update: {got}"] if got != ("1 passed, 0 failed", 0) else []
    passed = len(PROGRAMS) + len(CASES) + 1 - len(wrong)
    print(*wrong, f"{passed} passed, {len(wrong)} failed", sep="\n")
    return 1 if wrong else 0


if __name__ == "__main__":
    sys.exit(main())
