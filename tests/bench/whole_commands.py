"""Time whole commands as processes and print medians and ratios. Run by `make bench`; no test.

Every figure is a ratio to a bare interpreter's start on the same machine in the same minute, since
seconds say more about the machine than about us. History: README.md beside this file.
"""

from __future__ import annotations

import os
import shutil
import statistics
import subprocess
import sys
import tempfile
import time
from pathlib import Path

ROOT = Path(__file__).parents[2]
SAMPLES = sorted((ROOT / "tests" / "golden" / "procedures").glob("*.md"))
TOOL = str(Path(sys.executable).parent / "watchglass")
RUNS = 9
#: Compiled modules may be kept, as they are wherever the tool is installed.
ENVIRONMENT = {k: v for k, v in os.environ.items() if k != "PYTHONDONTWRITEBYTECODE"}

#: Runs the bench alone over a separation of 50 events and prints the least seconds of 40 runs.
ONE_RUN = """
import sys, time
sys.path.insert(0, sys.argv[1])
from builders import golden, surroundings
from watchglass.run.bench.bench import run_bench
entry, around = golden("oc-04"), surroundings()
taken = []
for _ in range(40):
    start = time.perf_counter()
    run_bench(entry.procedure, entry.case.course, around.known, around.laboratory)
    taken.append(time.perf_counter() - start)
print(min(taken))
"""


def seconds(command: list[str], *, cwd: Path, runs: int = RUNS) -> float:
    """Give the median of several runs, one before them thrown away."""
    taken = []
    for _ in range(runs + 1):
        start = time.perf_counter()
        subprocess.run(command, cwd=cwd, env=ENVIRONMENT, capture_output=True, check=False)  # noqa: S603
        taken.append(time.perf_counter() - start)
    return statistics.median(taken[1:])


def make_set(folder: Path, number: int) -> Path:
    """Make a set of so many procedures from the sample ones, with codes of their own."""
    procedures = folder / "procedures"
    procedures.mkdir(parents=True)
    (folder / "laboratory.yml").write_text("name: A laboratory to measure in\n", "utf-8")
    for index in range(number):
        text = SAMPLES[index % len(SAMPLES)].read_text("utf-8")
        (procedures / f"p{index:05}.md").write_text(
            text.replace("code: ", f"code: P{index:05}-"), "utf-8"
        )
    return folder


def main() -> None:
    """Measure and print."""
    number = int(sys.argv[1]) if len(sys.argv) > 1 else 1000
    work = Path(tempfile.mkdtemp(prefix="watchglass-bench-"))
    try:
        bare = seconds([sys.executable, "-c", "pass"], cwd=work)
        many = make_set(work / "many", number)
        site = work / "site"
        shutil.copytree(ROOT / "site_demo", site, ignore=shutil.ignore_patterns("public"))
        shutil.copytree(ROOT / "procedures_src", work / "procedures_src")
        rows = [
            ("bare interpreter", bare),
            ("watchglass --help", seconds([TOOL, "--help"], cwd=work)),
            ("check one file", seconds([TOOL, "check", str(SAMPLES[-1])], cwd=work)),
            (f"check {number} procedures", seconds([TOOL, "check", str(many)], cwd=work, runs=3)),
            (
                "build the demo, both editions",
                seconds([TOOL, "build", str(site)], cwd=work, runs=3),
            ),
        ]
        for name, taken in rows:
            sys.stdout.write(f"{name:34} {taken * 1e3:9.1f} ms {taken / bare:9.1f} x bare\n")
        bench = float(
            subprocess.run(  # noqa: S603
                [sys.executable, "-c", ONE_RUN, str(ROOT / "tests")],
                env=ENVIRONMENT,
                capture_output=True,
                check=True,
            ).stdout
        )
        sys.stdout.write(f"{'the bench alone, OC-04':34} {bench * 1e3:9.2f} ms")
        sys.stdout.write(f" {bench / bare:9.2f} x bare\n")
        each = rows[3][1] / number
        sys.stdout.write(
            f"{'one of many procedures':34} {each * 1e3:9.2f} ms {each / bare:9.2f} x bare\n"
        )
    finally:
        shutil.rmtree(work)


if __name__ == "__main__":
    main()
