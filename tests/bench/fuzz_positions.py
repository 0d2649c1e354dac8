"""Read made-up documents until many marks were met; print each that is not where it is said to be.

    python tests/bench/fuzz_positions.py [--marks 100000] [--seed 1]

Run by hand: it takes half a minute. The same laws run on fewer marks with the tests.
"""

from __future__ import annotations

import argparse
import sys
import time
from pathlib import Path
from random import Random

_ROOT = Path(__file__).resolve().parents[2]
sys.path[:0] = [str(_ROOT / "generator"), str(_ROOT / "tests")]

from laws.markdown_documents import Maker, faults, wrong_marks  # noqa: E402 - after the path is set


def main() -> int:
    """Run the command; give 0 where nothing was wrong."""
    parser = argparse.ArgumentParser(description=__doc__.split("\n", maxsplit=1)[0])
    parser.add_argument("--marks", type=int, default=100_000)
    parser.add_argument("--seed", type=int, default=1)
    options = parser.parse_args()
    maker = Maker(Random(options.seed))  # noqa: S311 - test material
    began = time.perf_counter()
    marks = documents = wrong = 0
    while marks < options.marks and wrong < 5:
        text = maker.document()
        documents += 1
        read, found = wrong_marks(text)
        found += faults(text)
        marks += read
        if found:
            wrong += len(found)
            print(repr(text), *found, sep="\n    ")  # noqa: T201 - a command
    seconds = time.perf_counter() - began
    print(f"{documents} documents, {marks} marks, {wrong} wrong, {seconds:.1f} s")  # noqa: T201
    return 1 if wrong else 0


if __name__ == "__main__":
    sys.exit(main())
