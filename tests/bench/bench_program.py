"""What the program costs as a whole: time and memory of its commands, and one
study against the vectorised NumPy peer, in one run.

Usage: bench_program.py PROGRAM. Prints a table; asserts nothing.
"""

import json
import os
import pathlib
import subprocess
import sys
import tempfile
import time

HERE = pathlib.Path(__file__).resolve().parent
sys.path.insert(0, str(HERE.parent / "peer"))
import peer  # noqa: E402


def run(*command):
    """Run a command; (seconds, peak memory in MiB, its output)."""
    before = time.perf_counter()
    process = subprocess.Popen(command, stdout=subprocess.PIPE, stderr=subprocess.PIPE, text=True)
    output, _ = process.communicate()
    seconds = time.perf_counter() - before
    return seconds, output


def peak_mib(*command):
    """Peak resident memory [MiB] of a command, measured in a child of its own."""
    code = (
        "import resource, subprocess, sys;"
        "subprocess.run(sys.argv[1:], stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL);"
        "print(resource.getrusage(resource.RUSAGE_CHILDREN).ru_maxrss / 1024)"
    )
    return float(subprocess.run([sys.executable, "-c", code, *command], capture_output=True, text=True).stdout)


def main(program):
    out = tempfile.mkdtemp()
    reference = str(HERE / "reference.yaml")
    example = str(HERE.parent.parent / "scenarios" / "everyday-grade.yaml")

    _, text = run(program, "trial", reference, "--json", "--studies", "256", "--out", out)
    scenario = peer.load(json.loads(text)["scenario"])
    studies, best = 20000, float("inf")
    for seed in range(3):
        before = time.perf_counter()
        peer.simulate(scenario, [scenario.question.expect], studies, seed)
        best = min(best, time.perf_counter() - before)
    one = os.path.join(os.path.dirname(program), "tests", "bench", "bench_study")
    ours = float(run(one, "one")[1])
    theirs = best / studies * 1e6
    print(f"one study, NumPy peer            {theirs:8.3f} us   {theirs / ours:.1f} times ours ({ours:.3f} us)")

    seconds, _ = run(program, "plan", example, "--out", out, "--quiet")
    print(f"main example planned             {seconds:8.1f} s    (search at most 20 on two cores, the whole 60)")
    print(f"  its peak memory                {peak_mib(program, 'plan', example, '--out', out):8.1f} MiB  (asked: under 64)")
    recommended = os.path.join(out, "recommended.yaml")
    for verb in ("budget", "margin"):
        seconds, _ = run(program, verb, recommended, "--out", out, "--quiet")
        print(f"{verb} of the main example          {seconds:8.1f} s    (asked: at most 20)")
    print(f"trial of the reference study     {run(program, 'trial', reference, '--out', out)[0]:8.1f} s")
    print(f"  its peak memory                {peak_mib(program, 'trial', reference, '--out', out):8.1f} MiB  (asked: under 64)")


if __name__ == "__main__":
    main(sys.argv[1])
