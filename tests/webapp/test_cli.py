"""The command line: the same answer as table and as JSON, and a plain sentence for whatever is wrong."""

from __future__ import annotations

import json
import os
import re
import subprocess
import sys
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pypdf
import pytest
from click.testing import CliRunner, Result

import webapp.package.job
from loads import __version__
from loads.document import check_code
from loads.records.scenario import scenario_schema
from tests.lines import SCENARIOS
from tests.scenes import FOOT, POUND
from webapp.cli import main
from webapp.pdf import PdfError

TANNERY = next(path for path in SCENARIOS if path.stem == "tannery-row")
CELLS = re.compile(r" {2,}")


def sillhead(*arguments: str | Path) -> Result:
    return CliRunner().invoke(main, [str(argument) for argument in arguments], prog_name="sillhead")


def computed(*arguments: str | Path) -> str:
    result = sillhead(*arguments)
    assert (result.exit_code, result.stderr) == (0, "")
    return result.stdout


def refused(*arguments: str | Path) -> str:
    """Messages of a refusal; nothing on standard output, nothing that only a programmer can read."""
    result = sillhead(*arguments)
    assert (result.exit_code, result.stdout) == (2, "")
    assert isinstance(result.exception, SystemExit)
    assert "Traceback" not in result.stderr
    return result.stderr.rstrip("\n")


def row(table: str, barrier_id: str) -> list[str]:
    return CELLS.split(next(line for line in table.splitlines() if line.startswith(f"{barrier_id}  ")))


def barrier(text: str, barrier_id: str = "P1") -> dict[str, Any]:
    found = next(item for item in json.loads(text)["barriers"] if item["id"] == barrier_id)
    assert isinstance(found, dict)
    return found


def edited(tmp_path: Path, old: str, new: str) -> Path:
    text = TANNERY.read_text(encoding="utf-8")
    assert text.count(old) == 1
    path = tmp_path / "edited.toml"
    path.write_text(text.replace(old, new), encoding="utf-8")
    return path


def test_table_and_json_say_what_a_pocket_calculator_says() -> None:
    # bottom 98.2 ft, top 104.2 ft, water at 104.6 ft, 12 ft wide, 62.4 pcf, the other side below the bottom
    over, head = 0.4, 6.4
    force = 62.4 * (head**2 - over**2) / 2 * 12
    # ∫₀⁶ γ (6.4 − y) y dy = γ (6.4·6²/2 − 6³/3)
    moment = 62.4 * (head * 6**2 / 2 - 6**3 / 3) * 12
    assert force == pytest.approx(15_275.52)
    assert moment == pytest.approx(32_348.16)

    found = barrier(computed("check", TANNERY, "--json"))
    assert found["load"]["horizontal"] == pytest.approx(force * POUND, rel=1e-12)
    assert found["load"]["moment"] == pytest.approx(moment * POUND * FOOT, rel=1e-12)
    assert found["load"]["line_of_action"] == pytest.approx((98.2 + moment / force) * FOOT, rel=1e-12)
    assert found["load"]["vertical"] == 0
    assert found["diagram"] == [
        {"z": pytest.approx(98.2 * FOOT), "pressure": pytest.approx(62.4 * head * POUND / FOOT**2)},
        {"z": pytest.approx(104.2 * FOOT), "pressure": pytest.approx(62.4 * over * POUND / FOOT**2)},
    ]

    # 15.3 kip, 32.3 kip·ft, 98.2 + 32 348/15 276 = 100.32 ft
    assert row(computed("check", TANNERY), "P1") == [
        *("P1", "Pump house shutter", "not checked", "no limit entered"),
        *("6.40 ft", "15.3 kip", "32.3 kip·ft", "100.32 ft", "none entered", "no limit entered"),
    ]


@pytest.mark.parametrize("path", SCENARIOS, ids=lambda path: path.stem)
def test_table_and_json_agree(path: Path) -> None:
    table, answer = computed("check", path), json.loads(computed("check", path, "--json"))
    factors = {"lb": POUND, "kip": 1e3 * POUND, "kN": 1e3, "N": 1.0, "lb/ft": POUND / FOOT}
    assert answer["title"] in table
    assert check_code(answer["input_digest"]) in table
    assert answer["version"] == __version__
    for item in answer["barriers"]:
        shown = row(table, item["id"])
        figures = [cell.split(" ") for cell in shown if re.fullmatch(r"−?[\d .]+ (lb|kip|kN|N|lb/ft)", cell)]
        (force,) = [float("".join(f[:-1]).replace("−", "-")) * factors[f[-1]] for f in figures]
        assert force == pytest.approx(item["load"]["horizontal"], rel=0.006)
        assert item["verdict"] in shown
        for remark in item["remarks"]:
            assert f"{item['id']}: {remark}" in table


def test_levels_can_be_given_in_place_of_the_files() -> None:
    higher = barrier(computed("check", TANNERY, "--json", "--flood-side", "103.2 ft"))
    assert higher["load"]["horizontal"] == pytest.approx(62.4 * 5**2 / 2 * 12 * POUND, rel=1e-12)
    assert higher["levels"]["flood_side"] == pytest.approx(103.2 * FOOT)
    both = barrier(
        computed("check", TANNERY, "--json", "--flood-side", "103.2 ft", "--protected-side", "100 ft 2.4 in")
    )
    expected = 62.4 * (5**2 - 2**2) / 2 * 12 * POUND
    assert both["load"]["horizontal"] == pytest.approx(expected, rel=1e-12)
    assert "protected side dry" in computed("check", TANNERY, "--protected-side", "dry")


def test_a_level_given_drops_the_time_of_the_old_one() -> None:
    assert "as of 2031-04-02T06:00:00-05:00" in computed("check", TANNERY)
    assert "no time stated" in computed("check", TANNERY, "--flood-side", "104.6 ft")


def test_nothing_that_is_shown_without_a_limit_is_called_checked() -> None:
    found = barrier(computed("check", TANNERY, "--json"))
    assert found["verdict"] == "not checked"
    assert {check["verdict"] for check in found["checks"]} == {"not checked"}
    assert {check["limit"] for check in found["checks"]} == {None}
    assert found["first_limit"] is None


def no_file(tmp_path: Path) -> Path:
    return tmp_path / "nowhere.toml"


def a_directory(tmp_path: Path) -> Path:
    return tmp_path


def binary(tmp_path: Path) -> Path:
    path = tmp_path / "picture.toml"
    path.write_bytes(b"\x89PNG\r\n\x1a\n" + bytes(range(256)))
    return path


def huge(tmp_path: Path) -> Path:
    path = tmp_path / "huge.toml"
    path.write_bytes(TANNERY.read_bytes() + b"# padding\n" * 1_000_000)
    return path


def no_toml(tmp_path: Path) -> Path:
    path = tmp_path / "letter.toml"
    path.write_text("Dear all,\nthe river rises.\n", encoding="utf-8")
    return path


def newer(tmp_path: Path) -> Path:
    return edited(tmp_path, "format = 1", "format = 2")


def test_all_that_is_wrong_is_said_at_once(tmp_path: Path) -> None:
    path = edited(tmp_path, 'height = "3 ft"', 'heigth = "3 ft"')
    text = path.read_text(encoding="utf-8").replace('"104.60 ft"', '"104.60"')
    path.write_text(text, encoding="utf-8")
    assert sorted(refused("check", path).splitlines()) == [
        'panel[P4].heigth is not a known key; did you mean "height"?',
        'water.flood_side is "104.60"; it needs a unit, for example "104.60 ft"',
    ]


FAULTS = [
    (no_file, r"the file \S+nowhere\.toml cannot be read: No such file or directory"),
    (a_directory, r"the file \S+ cannot be read: Is a directory"),
    (binary, r"the file is not UTF-8 text; save it as a plain text file"),
    (huge, r"the file is 10 00\d \d{3} bytes long; a scenario file may have at most 1 000 000"),
    (no_toml, r"the file is not a scenario file \(TOML\): .*line 1.*"),
    (newer, r"format is 2; this Sillhead reads formats up to 1; open the file with a newer one"),
]


@pytest.mark.parametrize(("made", "message"), FAULTS, ids=lambda value: getattr(value, "__name__", ""))
def test_what_is_wrong_with_a_file_is_said_in_a_sentence(
    tmp_path: Path, made: Callable[[Path], Path], message: str
) -> None:
    path = made(tmp_path)
    said = refused("check", path)
    assert re.fullmatch(message, said)
    assert refused("check", path, "--json") == said
    output = tmp_path / "package.pdf"
    assert refused("report", path, "-o", output) == said
    assert not output.exists()


@pytest.mark.parametrize(
    ("option", "typed", "message"),
    [
        (
            "--flood-side",
            "105.2",
            'water.flood_side is "105.2"; it needs a unit, for example "105.2 ft"',
        ),
        (
            "--protected-side",
            "97 psf",
            (
                'water.protected_side is "97 psf"; psf is a unit of pressure, and this is a length; '
                'write it with one of ft, in, m, cm, mm, for example "97 ft"'
            ),
        ),
    ],
)
def test_a_bad_level_is_refused(option: str, typed: str, message: str) -> None:
    assert refused("check", TANNERY, option, typed) == message


def test_the_flood_side_cannot_be_dry() -> None:
    assert refused("check", TANNERY, "--flood-side", "dry").startswith(
        'water.flood_side is "dry"; it must be'
    )


def test_a_wrong_option_is_refused_with_the_usage() -> None:
    assert "No such option" in refused("check", TANNERY, "--flood", "105.2 ft")
    assert "Missing argument 'FILE'" in refused("check")
    assert "Missing option '-o'" in refused("report", TANNERY)


def test_the_schema_is_printed_as_json() -> None:
    assert json.loads(computed("schema")) == scenario_schema()


@pytest.mark.usefixtures("pango")
def test_report_writes_the_package(tmp_path: Path) -> None:
    output = tmp_path / "package.pdf"
    output.write_bytes(b"an older one")
    assert computed("report", TANNERY, "-o", output) == f"{output} written\n"
    assert list(tmp_path.iterdir()) == [output]
    reader = pypdf.PdfReader(output)
    words = reader.pages[0].extract_text()
    digest = json.loads(computed("check", TANNERY, "--json"))["input_digest"]
    assert check_code(digest) in words
    assert "Tannery Row, spring plan" in words
    assert list(reader.attachments) == ["scenario.toml"]


@pytest.mark.usefixtures("pango")
def test_report_says_when_it_cannot_write(tmp_path: Path) -> None:
    output = tmp_path / "nowhere" / "package.pdf"
    said = refused("report", TANNERY, "-o", output)
    assert said == f"the file {output} cannot be written: No such file or directory"
    assert "is a directory" in refused("report", TANNERY, "-o", tmp_path)
    assert list(tmp_path.iterdir()) == []


def test_report_without_its_text_library_leaves_what_was_there(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    def missing(_: object) -> bytes:
        raise PdfError("the Pango text library is missing")

    monkeypatch.setattr(webapp.package.job, "render", missing)
    output = tmp_path / "package.pdf"
    output.write_bytes(b"an older one")
    assert refused("report", TANNERY, "-o", output) == "the Pango text library is missing"
    assert output.read_bytes() == b"an older one"
    assert list(tmp_path.iterdir()) == [output]


def in_a_process(*arguments: str | Path) -> subprocess.CompletedProcess[str]:
    return subprocess.run(
        [sys.executable, "-m", "webapp.cli", *map(str, arguments)],
        capture_output=True,
        text=True,
        encoding="utf-8",
        check=False,
        env={**os.environ, "PYTHONIOENCODING": "utf-8"},
    )


def test_a_real_process_ends_with_the_same_status_and_streams(tmp_path: Path) -> None:
    good = in_a_process("check", TANNERY, "--json")
    assert (good.returncode, good.stderr) == (0, "")
    assert json.loads(good.stdout) == json.loads(computed("check", TANNERY, "--json"))
    bad = in_a_process("check", no_file(tmp_path))
    assert (bad.returncode, bad.stdout) == (2, "")
    assert bad.stderr.rstrip("\n") == refused("check", no_file(tmp_path))


def test_help_names_every_command() -> None:
    told = computed("--help")
    for name, command in main.commands.items():
        assert re.search(rf"^  {name} +{re.escape(command.get_short_help_str()[:20])}", told, re.MULTILINE)
    assert computed("--version") == f"sillhead, version {__version__}\n"


MILL = next(path for path in SCENARIOS if path.stem == "mill-street")


def test_sheet_writes_one_html_file_with_stamp_and_link(tmp_path: Path) -> None:
    output = tmp_path / "sheet.html"
    output.write_text("an older one")
    told = computed(
        "sheet", MILL, "C-07", "-o", output, "--stamp", "actual", "--link-base", "https://flood.example/"
    )
    assert told == f"{output} written\n"
    html = output.read_text(encoding="utf-8")
    assert '<p class="stamp">ACTUAL</p>' in html
    assert '<div class="qr"><svg' in html
    assert "size: letter;" in html
    computed("sheet", MILL, "C-07", "-o", output, "--paper", "A4")
    html = output.read_text(encoding="utf-8")
    assert '<p class="stamp">DRAFT</p>' in html
    assert '<div class="qr">' not in html
    assert "size: A4;" in html
    assert list(tmp_path.iterdir()) == [output]


@pytest.mark.usefixtures("pango")
def test_sheet_writes_one_page_of_pdf(tmp_path: Path) -> None:
    output = tmp_path / "sheet.pdf"
    computed("sheet", MILL, "C-07", "-o", output, "--stamp", "exercise")
    (page,) = pypdf.PdfReader(output).pages
    assert "EXERCISE" in page.extract_text()


@pytest.mark.parametrize(
    ("barrier_id", "name", "message"),
    [
        ("C-07", "sheet.txt", r"the file \S+sheet\.txt must end in \.pdf or \.html"),
        ("C-9", "sheet.html", r'there is no barrier "C-9" in this scenario; closures here: C-07, C-08'),
        ("P-3", "sheet.pdf", r'"P-3" is a panel; field sheets are for closures; closures here: C-07, C-08'),
    ],
)
def test_sheet_says_what_it_cannot_make(tmp_path: Path, barrier_id: str, name: str, message: str) -> None:
    assert re.fullmatch(message, refused("sheet", MILL, barrier_id, "-o", tmp_path / name))
    assert list(tmp_path.iterdir()) == []


def test_sheet_knows_three_stamps(tmp_path: Path) -> None:
    said = refused("sheet", MILL, "C-07", "-o", tmp_path / "sheet.html", "--stamp", "final")
    assert "'final' is not one of 'actual', 'exercise', 'draft'" in said
