#!/usr/bin/env python3
"""Times `layshaft check` on one spec as a whole process, beside a bare native process and the Python script one
would write, in turns in one run. Prints medians and ratios; judges nothing.

    python3 tests/bench/process.py [--runs 40] [--spec tests/bench/fan-drive.shaft]
"""
import argparse
import importlib.util
import json
import pathlib
import statistics
import subprocess
import sys
import time

HERE = pathlib.Path(__file__).resolve().parent
TOP = HERE.parent.parent
BUILD = TOP / "target" / "bench"
BARE = 'fn main() { println!("1234.5 rpm"); }\n'


def build():
    """The command in release form, and the smallest program that prints a line."""
    subprocess.run(["cargo", "build", "--release", "--quiet", "-p", "layshaft"], cwd=TOP, check=True)
    BUILD.mkdir(parents=True, exist_ok=True)
    source = BUILD / "bare.rs"
    source.write_text(BARE)
    subprocess.run(["rustc", "-O", "-o", BUILD / "bare", source], check=True)


def once(command):
    """Wall time of one process, s. A criterion that fails is a result too: exit 1 is fine."""
    start = time.perf_counter()
    done = subprocess.run(command, cwd=TOP, stdin=subprocess.DEVNULL, stdout=subprocess.PIPE, stderr=subprocess.PIPE)
    spent = time.perf_counter() - start
    if done.returncode not in (0, 1):
        sys.exit(f"{command} ended with {done.returncode}:\n{done.stderr.decode()}{done.stdout.decode()}")
    return spent


def agree(program):
    """Both sides must solve the same drive; says by how much they differ."""
    spec = subprocess.run([program, "check", "--format", "json", HERE / "fan-drive.shaft"], stdout=subprocess.PIPE)
    shows = json.loads(spec.stdout)["specs"][0]["shows"]
    ours = [show["outcomes"][0]["value"]["si"] for show in shows]
    sys.path.insert(0, str(HERE))
    import fan_drive

    speed, power = fan_drive.plain()
    theirs = [speed * 2 * 3.141592653589793 / 60, power]
    worst = max(abs(one / other - 1) for one, other in zip(ours, theirs, strict=True))
    print(f"same drive: speed and power agree within {worst:.1e}")
    if worst > 1e-9:
        sys.exit("the two sides do not solve the same drive")


def main():
    arguments = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter)
    arguments.add_argument("--runs", type=int, default=40, help="runs of each, after one that is not counted")
    arguments.add_argument("--spec", default="tests/bench/fan-drive.shaft", help="the spec to check")
    given = arguments.parse_args()
    build()
    program = TOP / "target" / "release" / "layshaft"
    agree(program)
    script = [sys.executable, HERE / "fan_drive.py"]
    commands = {
        "bare native process": [BUILD / "bare"],
        "layshaft check": [program, "check", given.spec],
        "Python script, plain": [*script, "plain"],
    }
    missing = [name for name in ("pint", "scipy") if importlib.util.find_spec(name) is None]
    if missing:
        print(f"not installed, so the script with units is left out: {', '.join(missing)}")
    else:
        commands["Python script, pint and scipy"] = [*script, "units"]
    times = {name: [] for name in commands}
    for run in range(given.runs + 1):
        for name, command in commands.items():
            spent = once(command)
            if run > 0:
                times[name].append(spent)
    ours = statistics.median(times["layshaft check"])
    print(f"{'':32} {'median':>9} {'lowest':>9} {'times layshaft':>15}")
    for name, spent in times.items():
        median = statistics.median(spent)
        print(f"{name:32} {median * 1e3:6.2f} ms {min(spent) * 1e3:6.2f} ms {median / ours:15.2f}")


main()
