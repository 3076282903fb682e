"""Files of released versions and the results they gave, written by: python -m tests.released 0.1.0."""

from __future__ import annotations

import json
import sys
from pathlib import Path
from typing import Any

from loads.assessment import assess
from loads.scenario_file import read_file, scenario_of
from tests.source import ROOT
from webapp.answer import answer

RELEASED = ROOT / "scenarios" / "released"
DIGITS = 9


def scenarios() -> list[Path]:
    """Scenario files of every released version."""
    return sorted(RELEASED.glob("*/*.toml"))


def results(path: Path) -> dict[str, dict[str, Any]]:
    """Force and moment of every barrier of a file, by its id, as the JSON of a check gives them."""
    document = read_file(path)
    told = answer(assess(scenario_of(document)), document)
    return {
        barrier["id"]: {name: _rounded(barrier["load"][name]) for name in ("horizontal", "moment")}
        for barrier in told["barriers"]
    }


def _rounded(value: float) -> float:
    return float(f"{value:.{DIGITS}g}")


def write(version: str) -> list[Path]:
    """Write the results of a version's files beside them; those that are there stay as they are."""
    written = []
    for path in sorted((RELEASED / version).glob("*.toml")):
        beside = path.with_suffix(".json")
        if not beside.exists():
            beside.write_text(json.dumps(results(path), indent=1) + "\n", encoding="utf-8")
            written.append(beside)
    return written


if __name__ == "__main__":
    for path in write(sys.argv[1]):
        sys.stdout.write(f"{path.relative_to(ROOT)}\n")
