"""A file of any released version opens and gives the results it gave; a change stands in DEVELOPERS.md."""

from __future__ import annotations

import json
from pathlib import Path

import pytest

from loads import __version__
from tests.lines import SCENARIOS
from tests.released import DIGITS, RELEASED, results, scenarios
from webapp.scenario_files import example_files


def same(found: float, stored: float) -> bool:
    """Whether a figure is the stored one but for its last digit, or nil beside nil."""
    return found == pytest.approx(stored, rel=2 * 10.0**-DIGITS, abs=1e-6)


@pytest.mark.parametrize("path", scenarios(), ids=lambda path: f"{path.parent.name}/{path.stem}")
def test_it_opens_and_gives_the_results_it_gave(path: Path) -> None:
    stored = json.loads(path.with_suffix(".json").read_text(encoding="utf-8"))
    found = results(path)
    assert list(found) == list(stored)
    changed = [
        f"{barrier} {name}: {found[barrier][name]!r}, was {figure!r}"
        for barrier, figures in stored.items()
        for name, figure in figures.items()
        if not same(found[barrier][name], figure)
    ]
    assert not changed, "say in DEVELOPERS.md, What changed in results, why:\n" + "\n".join(changed)


def test_a_changed_result_is_seen() -> None:
    assert same(67948.8982, 67948.89825)
    assert not same(67948.8982, 67948.8992)


def test_the_first_version_is_complete() -> None:
    assert {path.name for path in (RELEASED / "0.1.0").glob("*.toml")} >= {
        *("tannery-row.toml", "quay-street.toml", "silt-drawdown.toml", "inclined-and-curved.toml")
    }
    # 62.4 · (6.4² − 0.4²)/2 · 12 lb of the pump house shutter in N
    stored = json.loads((RELEASED / "0.1.0" / "tannery-row.json").read_text(encoding="utf-8"))
    assert same(stored["P1"]["horizontal"], 15275.52 * 4.4482216152605)


def test_every_version_is_described() -> None:
    page = (RELEASED.parents[1] / "DEVELOPERS.md").read_text(encoding="utf-8")
    changes = page.partition("## What changed in results")[2]
    for version in {path.parent.name for path in scenarios()} | {__version__}:
        assert f"\n### {version}\n" in changes


def test_released_files_are_no_examples() -> None:
    assert RELEASED not in {parent for path in (*example_files(), *SCENARIOS) for parent in path.parents}
