"""Make `catalogue/data/names.json`: every name of the shipped substances with its key.

Run by `make catalogue`; a test compares the file with the tables, which are then read in full.
"""

from __future__ import annotations

import json
import sys

from watchglass.base.yaml import read_yaml
from watchglass.catalogue.catalogue import name_index
from watchglass.catalogue.decode import decode_substances
from watchglass.shell.shipped import DATA, substance_sources


def make() -> str:
    """Give the index's text for the tables as they stand."""
    substances = []
    for source in substance_sources():
        node, findings = read_yaml(source)
        decoded, more = decode_substances(node)
        for finding in (*findings, *more):
            place = finding.span.position()
            sys.stderr.write(
                f"{source.name}:{place.line}: {finding.code.number} {finding.message}\n"
            )
        substances += decoded
    index, findings = name_index(substances)
    for finding in findings:
        sys.stderr.write(f"{finding.message}\n")
    return json.dumps(dict(sorted(index.items())), ensure_ascii=False, indent=0) + "\n"


if __name__ == "__main__":
    (DATA / "names.json").write_text(make(), "utf-8")
