"""`sillhead clock`: the worked closure to the minute, and a plain sentence for whatever is missing."""

from __future__ import annotations

import json
import re
from pathlib import Path
from typing import Any

import pytest

from loads.crossing import HIGHER
from tests.lines import SCENARIOS
from tests.scenes import FOOT
from tests.webapp.test_cli import computed, in_a_process, refused

LANDING = next(path for path in SCENARIOS if path.stem == "mill-landing")
ISSUED = "2031-04-02T09:10:00-05:00"


def clock(path: Path = LANDING, now: str = ISSUED) -> dict[str, Any]:
    found = json.loads(computed("clock", path, "--now", now, "--json"))
    assert isinstance(found, dict)
    return found


def closure(answer: dict[str, Any], barrier_id: str) -> dict[str, Any]:
    found = next(one for one in answer["barriers"] if one["id"] == barrier_id)
    assert isinstance(found, dict)
    return found


def trace(barrier: dict[str, Any], name: str) -> dict[str, Any]:
    found = next(one for one in barrier["timelines"] if one["trace"] == name)
    assert isinstance(found, dict)
    return found


def edited(tmp_path: Path, *changes: tuple[str, str]) -> Path:
    text = LANDING.read_text(encoding="utf-8")
    for old, new in changes:
        assert old in text
        text = text.replace(old, new)
    path = tmp_path / "edited.toml"
    path.write_text(text, encoding="utf-8")
    return path


def test_the_worked_closure_to_the_minute() -> None:
    # sill as a stage 437.40 + 0.60 − 412.70 = 25.30 ft
    # 24.7 ft at 06Z and 25.4 ft at 12Z, so T2 is 06:00Z + 6 h · 0.6/0.7
    street = closure(clock(), "C-07")
    assert street["sill_stage"] / FOOT == pytest.approx(25.30)
    likely = trace(street, "likely")
    assert likely["crest"]["stage"] / FOOT == pytest.approx(26.20)
    assert likely["crest"]["level"] / FOOT == pytest.approx(438.30)
    assert likely["crest"]["head"] / FOOT == pytest.approx(0.90)
    told = {name: likely[name]["time"]["local"] for name in ("closed_by", "start", "call_out")}
    assert told == {
        "closed_by": "06:09 CDT Thu 3 Apr 2031",
        "start": "22:39 CDT Wed 2 Apr 2031",
        "call_out": "21:09 CDT Wed 2 Apr 2031",
    }


def test_one_foot_more_moves_the_call_out_to_lunchtime() -> None:
    # the line crosses 24.30 ft at 03:00Z
    street = closure(clock(), "C-07")
    higher = trace(street, HIGHER)
    assert higher["crest"]["head"] / FOOT == pytest.approx(1.90)
    told = {name: higher[name]["time"]["local"] for name in ("closed_by", "start", "call_out")}
    assert told == {
        "closed_by": "22:00 CDT Wed 2 Apr 2031",
        "start": "14:30 CDT Wed 2 Apr 2031",
        "call_out": "13:00 CDT Wed 2 Apr 2031",
    }
    assert street["one_foot_more_call_out_earlier"] / 60 == pytest.approx(489, abs=0.5)  # 8 h 9 min


def test_every_link_of_the_chain_carries_its_value_and_source() -> None:
    chain = closure(clock(), "C-07")["chain"]
    assert [term["name"] for term in chain["terms"]] == [
        "reading",
        "zero",
        "shift",
        "transfer",
        "sill",
        "head",
    ]
    state = chain["states"].index("crest, likely")
    values = {term["name"]: term["value"][state] / FOOT for term in chain["terms"]}
    assert values == pytest.approx(
        {"reading": 26.2, "zero": 412.7, "shift": 0, "transfer": -0.6, "sill": 437.4, "head": 0.9}
    )
    zero = next(term for term in chain["terms"] if term["name"] == "zero")
    assert (zero["source"], zero["date"], zero["mark"]) == ("levelling of the gauge", "2029-10-11", "")


def test_the_table_tells_the_same_times() -> None:
    table = computed("clock", LANDING, "--now", ISSUED)
    row = next(line for line in table.splitlines() if line.lstrip().startswith("likely  "))
    cells = re.split(r" {2,}", row.strip())
    likely = trace(closure(clock(), "C-07"), "likely")
    names = ("call_out", "tell_owner", "start", "closed_by")
    assert cells[:2] == ["likely", "0.90 ft"]
    assert cells[2:6] == [likely[name]["time"]["local"] for name in names]
    assert "one foot more: call-out 8 h 9 min earlier" in table
    assert "reading 26.20 ft + zero 412.70 ft + shift 0.00 ft + transfer −0.60 ft" in table


def test_a_stale_forecast_turns_the_advice_off_and_leaves_the_times() -> None:
    fresh, stale = clock(), clock(now="2031-04-03T10:15:00-05:00")
    assert fresh["advice_off"] == []
    assert fresh["gauges"][0]["forecast_age"]["label"] == "current"
    assert stale["gauges"][0]["forecast_age"]["label"] == "stale"
    assert stale["gauges"][0]["forecast_age"]["seconds"] == pytest.approx(25 * 3600 + 300)
    assert closure(stale, "C-07")["advice"]["kind"] == "advice is off"
    assert closure(fresh, "C-07")["advice"]["kind"] != "advice is off"
    for name in ("closed_by", "start", "call_out"):
        before, after = (trace(closure(one, "C-07"), "likely")[name] for one in (fresh, stale))
        assert after["time"] == before["time"]
    assert "ADVICE IS OFF" in computed("clock", LANDING, "--now", "2031-04-03T10:15:00-05:00")
    assert "ADVICE IS OFF" not in computed("clock", LANDING, "--now", ISSUED)


def test_a_drill_longer_than_planned_moves_the_call_out_and_says_so(tmp_path: Path) -> None:
    # planned 20 min + 8 logs · 4 min = 52 min; drilled 20 + 8 · 6 = 68 min
    drilled = closure(clock(), "C-08")
    assert (drilled["install"]["planned"], drilled["install"]["seconds"]) == (52 * 60, 68 * 60)
    assert drilled["install"]["sentence"] == "the drill of 2030-06-19 makes it 16 min longer than planned"
    text = LANDING.read_text(encoding="utf-8")
    drill = text[text.index("    [[closure.clock.drill]]") : text.index('[[closure]]\nid = "C-09"')]
    planned = closure(clock(edited(tmp_path, (drill, ""))), "C-08")

    def minutes(barrier: dict[str, Any]) -> int:
        hour, minute = trace(barrier, "likely")["call_out"]["time"]["local"][:5].split(":")
        return int(hour) * 60 + int(minute)

    assert minutes(planned) - minutes(drilled) == 16


def test_a_datum_without_a_shift_is_refused(tmp_path: Path) -> None:
    path = edited(tmp_path, ('id = "G1"\nname = "Mill Landing"', 'id = "G1"\nname = "Mill Landing"'))
    text = path.read_text(encoding="utf-8")
    gauge = text.index("[[gauge]]")
    path.write_text(text[:gauge] + text[gauge:].replace('"NAVD88"', '"NGVD29"', 1), encoding="utf-8")
    assert refused("clock", path) == (
        "gauge[G1].datum_shift is missing; the gauge is in NGVD29 and the barriers are in NAVD88, and the "
        "shift from one to the other is not guessed; enter it with its source"
    )


def test_without_a_crew_there_is_no_call_out_and_no_guess(tmp_path: Path) -> None:
    text = LANDING.read_text(encoding="utf-8")
    crew = text[text.index("[[crew]]") : text.index("[[closure]]")]
    street = closure(clock(edited(tmp_path, (crew, ""))), "C-07")
    likely = trace(street, "likely")
    assert likely["start"]["time"]["local"] == "22:39 CDT Wed 2 Apr 2031"
    assert (likely["call_out"]["state"], likely["call_out"]["time"]) == ("not known", None)
    assert street["one_foot_more_call_out_earlier"] is None
    assert "no crew that can close C-07 has been entered, so no call-out can be told" in street["sentences"]


def test_a_missing_zero_leaves_the_head_unknown_and_is_marked(tmp_path: Path) -> None:
    line = next(
        line for line in LANDING.read_text(encoding="utf-8").splitlines() if line.startswith("zero = ")
    )
    street = closure(clock(edited(tmp_path, (line, ""))), "C-07")
    assert street["sill_stage"] is None
    terms = {term["name"]: term for term in street["chain"]["terms"]}
    assert terms["zero"]["mark"] == "missing: nobody entered it"
    assert set(terms["head"]["value"]) == {None}
    assert trace(street, "likely")["closed_by"]["state"] == "not known"


def test_near_the_ceiling_of_the_gauge_no_crest_is_inferred(tmp_path: Path) -> None:
    path = edited(tmp_path, ('"22.10 ft"]', '"30.60 ft"]'))
    traps = {trap["name"]: trap["sentence"] for trap in clock(path)["gauges"][0]["traps"]}
    assert "do not infer a crest" in traps["ceiling"]
    assert "jump" in traps
    assert "history" in traps
    assert clock()["gauges"][0]["traps"] == []


def test_the_plan_closes_in_order_of_the_water(tmp_path: Path) -> None:
    plan = next(one for one in clock()["plans"] if one["trace"] == "likely")
    assert plan["in_time"]
    assert [job["barrier"] for job in plan["crews"][0]["jobs"]] == ["C-09", "C-07", "C-08"]
    late = clock(edited(tmp_path, ("2031-04-02T07:00:00-05:00", "2031-04-02T21:00:00-05:00")))
    hurried = next(one for one in late["plans"] if one["trace"] == "likely")
    assert not hurried["in_time"]
    assert any("after the water is there" in sentence for sentence in hurried["sentences"])
    assert any("more crew" in sentence for sentence in hurried["sentences"])


def test_a_file_without_a_gauge_and_a_time_without_a_zone_are_refused() -> None:
    street = next(path for path in SCENARIOS if path.stem == "tannery-row")
    assert refused("clock", street).startswith("gauge is missing; the clock is told from a gauge")
    assert refused("clock", LANDING, "--now", "2031-04-02T09:10") == (
        '--now is "2031-04-02T09:10"; it needs a time zone, for example 2031-04-02T06:00:00-05:00'
    )
    assert "must be a date and time" in refused("clock", LANDING, "--now", "noon")


def test_a_real_process_tells_the_same() -> None:
    told = in_a_process("clock", LANDING, "--now", ISSUED, "--json")
    assert (told.returncode, told.stderr) == (0, "")
    assert json.loads(told.stdout) == clock()
