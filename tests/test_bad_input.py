"""Everything that can be wrong with a scenario has its sentence, and all of them come at once."""

from __future__ import annotations

import copy

import pytest

from loads.assessment import assess
from loads.problems import ScenarioError
from loads.scenario_file import parse_document, scenario_of
from tests.refused import FLUID, PLATE, SOIL, Table, of_panel, problems
from tests.scenes import assessed, filed, scene

ISO_DAY = "write year-month-day, for example 2030-03-02"
ONE_OF = 'write it with one of ft, in, m, cm, mm, for example "6 ft"'
ONE_NUMBER = 'one number with a decimal point and one unit, for example "6 ft"'


@pytest.mark.parametrize(
    ("change", "sentence"),
    [
        ({"height": "9"}, 'panel[P1].height is "9"; it needs a unit, for example "9 ft"'),
        ({"height": 9}, 'panel[P1].height is 9; it needs a unit, in quotes, for example "9 ft"'),
        (
            {"height": True},
            'panel[P1].height is True; it must be a text with a number and a unit, for example "6 ft"',
        ),
        (
            {"height": "-6 ft"},
            'panel[P1].height is "-6 ft"; it must be more than 0 ft and not more than 1000 ft',
        ),
        (
            {"height": "0 ft"},
            'panel[P1].height is "0 ft"; it must be more than 0 ft and not more than 1000 ft',
        ),
        (
            {"height": "6 psf"},
            'panel[P1].height is "6 psf"; psf is a unit of pressure, and this is a length; ' + ONE_OF,
        ),
        (
            {"height": "nan ft"},
            'panel[P1].height is "nan ft"; it must be ' + ONE_NUMBER,
        ),
        (
            {"height": "inf ft"},
            'panel[P1].height is "inf ft"; it must be ' + ONE_NUMBER,
        ),
        (
            {"height": "1e400 ft"},
            'panel[P1].height is "1e400 ft"; it is too large a number; write for example "6 ft"',
        ),
        ({"heigth": "6 ft"}, 'panel[P1].heigth is not a known key; did you mean "height"?'),
        ({"tilt": "0 deg"}, 'panel[P1].tilt is "0 deg"; it must be between 1 and 179 deg'),
        (
            {"bottom": {"low": "1 ft"}},
            'panel[P1].bottom has no "value"; write for example { value = "104.6 ft" }',
        ),
        (
            {"bottom": {"value": "1 ft", "sorce": "survey"}},
            "panel[P1].bottom has an unknown key 'sorce'; did you mean \"source\"?",
        ),
        (
            {"bottom": {"value": "1 ft", "low": "2 ft"}},
            'panel[P1].bottom is "1 ft"; it must lie between its low and its high',
        ),
        (
            {"bottom": {"value": "1 ft", "date": "2031-02-30"}},
            "panel[P1].bottom has a date that is no calendar day; " + ISO_DAY,
        ),
        (
            {"shape": "oval"},
            "panel[P1].shape is \"oval\"; it must be 'rectangle', 'trapezoid', 'circle', 'outline' or 'arc'",
        ),
        (
            {"diameter": "4 ft"},
            'panel[P1].diameter is given; it is not used by shape "rectangle"; leave it out',
        ),
        ({"shape": "circle"}, 'panel[P1].diameter is missing; shape "circle" needs it'),
        ({"name": "two\nlines"}, 'panel[P1].name is "two\nlines"; it must be one line of text'),
        ({"name": 7}, "panel[P1].name is 7; it must be a text in quotes"),
        ({"id": ""}, 'panel[0].id is ""; it must not be empty'),
        ({"limits": {"force": "0 lb"}}, 'panel[P1].limits.force is "0 lb"; it must be more than 0 lb'),
        ({"limits": {"forces": "1 lb"}}, 'panel[P1].limits.forces is not a known key; did you mean "force"?'),
    ],
)
def test_panel(change: Table, sentence: str) -> None:
    assert sentence in of_panel({**PLATE, **change})


@pytest.mark.parametrize(
    ("change", "sentence"),
    [
        (
            {"friction_angle": "62 deg"},
            'sediment[0].friction_angle is "62 deg"; it must be between 0 and 45 deg',
        ),
        ({"top": "0 ft"}, 'sediment[0].top is "0 ft"; it must lie above the bottom of the panel, "0 m"'),
        ({"top": "-1 ft"}, 'sediment[0].top is "-1 ft"; it must lie above the bottom of the panel, "0 m"'),
        ({"top": "1e300 ft"}, 'sediment[0].top is "1e300 ft"; it must be between -2000 and 30000 ft'),
        ({"fluid_unit_weight": "85 pcf"}, "water must not be counted twice"),
        (
            {"moist_unit_weight": "120 pcf"},
            'moist_unit_weight is "120 pcf"; it must not be more than the saturated',
        ),
        ({"pressure_coefficient": 0.4}, 'is not used by pressure "at rest"; leave it out'),
        ({"pressure": "entered"}, 'sediment[0].pressure_coefficient is missing; pressure "entered" needs it'),
        ({"pressure": "fluid mud"}, "sediment[0].friction_angle is given; it must be left out with pressure"),
        (
            {"pressure": "fluid mud"},
            'sediment[0].fluid_unit_weight is missing; pressure "fluid mud" needs it',
        ),
        ({"pressure": "active", "wall_friction": "30 deg"}, "must not be more than the friction angle"),
        (
            {"pressure": "active", "wall_friction": "9 deg", "cohesion": "9 psf"},
            "must be zero with wall friction: Coulomb's coefficient is for soil without cohesion",
        ),
        (
            {"overconsolidation_ratio": 0.5},
            "sediment[0].overconsolidation_ratio is 0.5; it must be at least 1",
        ),
        ({"overconsolidation_ratio": "2"}, "it must be a plain number without a unit"),
        ({"overconsolidation_ratio": float("inf")}, "sediment[0].overconsolidation_ratio is inf; it must be"),
        ({"overconsolidation_ratio": float("nan")}, "sediment[0].overconsolidation_ratio is nan; it must be"),
        ({"side": "left"}, "sediment[0].side is \"left\"; it must be 'flood' or 'protected'"),
    ],
)
def test_sediment(change: Table, sentence: str) -> None:
    found = of_panel(PLATE, {**SOIL, **change})
    assert any(sentence in problem for problem in found), found
    assert all(problem.startswith("panel[P1].") for problem in found)


def test_layers_out_of_order() -> None:
    deeper = {**SOIL, "top": "3 ft"}
    (found,) = of_panel(PLATE, SOIL, deeper)
    assert found == (
        'panel[P1].sediment[1].top is "3 ft"; it must lie below the top of the layer above it on that side, '
        '"2 ft"'
    )
    assert scenario_of(scene({**PLATE, "sediment": [SOIL, {**deeper, "side": "protected"}]}))


def test_kinds_of_layers_that_do_not_go_together() -> None:
    equivalent = {**FLUID, "pressure": "equivalent fluid"}
    (mixed,) = of_panel(PLATE, equivalent, SOIL)
    assert mixed.startswith('panel[P1].sediment[1].pressure is "at rest"; an equivalent fluid already')
    (above,) = of_panel(PLATE, {**SOIL, "top": "4 ft"}, FLUID)
    assert above.endswith("fluid mud must lie above every soil layer of its side")
    (lighter,) = of_panel(PLATE, FLUID, {**FLUID, "top": "1 ft", "fluid_unit_weight": "70 pcf"})
    assert lighter.endswith("must not be lighter than the fluid mud above it")
    (load,) = of_panel(PLATE, {**SOIL, "top": "4 ft"}, {**SOIL, "surcharge": "100 psf"})
    assert load.endswith("belongs to the uppermost layer of its side only")
    (inclined,) = of_panel({**PLATE, "tilt": "80 deg"}, {**SOIL, "pressure": "active", "cohesion": "9 psf"})
    assert inclined.endswith(
        "must be zero on an inclined face: the formula with cohesion is for a vertical one"
    )


@pytest.mark.parametrize(
    ("water", "sentence"),
    [
        ({"flood_side": "104.6"}, 'water.flood_side is "104.6"; it needs a unit, for example "104.6 ft"'),
        (
            {"flood_side": 104.6},
            'water.flood_side is 104.6; it needs a unit, in quotes, for example "104.6 ft"',
        ),
        (
            {"flood_side": float("nan")},
            'water.flood_side is nan; it needs a unit, in quotes, for example "nan ft"',
        ),
        ({"salinity": 35.0}, 'water.salinity is given; it is for fluid "sea"; leave it out or say "sea"'),
        ({"fluid": "sea", "salinity": float("nan")}, "water.salinity is nan; it must be"),
        ({"fluid": "sea", "salinity": float("inf")}, "water.salinity is inf; it must be"),
        ({"fluid": "custom"}, 'water.unit_weight is missing; fluid "custom" needs it, for example "64 pcf"'),
        (
            {"unit_weight": "62.4 pcf", "temperature": "50 degF"},
            "water.temperature is given; it would not be used, because a unit weight is entered directly",
        ),
        (
            {"fluid": "custom", "unit_weight": "70 pcf", "protected_temperature": "50 degF"},
            'water.protected_fluid is missing; with fluid "custom" on the flood side say what the',
        ),
        ({"temperature": "50 degC"}, 'water.temperature is "50 degC"; it must be between -2 and 40 degC'),
        (
            {"as_of": "yesterday"},
            "water.as_of is no date and time; write for example 2031-04-02T06:00:00-05:00",
        ),
        ({"as_of": "2031-04-02T06:00:00"}, "needs a time zone, for example 2031-04-02T06:00:00-05:00"),
        ({"as_of": 7}, "water.as_of is 7; it must be a date and time with a zone, for example"),
        ({"flod_side": "1 ft"}, 'water.flod_side is not a known key; did you mean "flood_side"?'),
        (
            {"colour": "brown"},
            "water.colour is not a known key; known keys here are flood_side, protected_side",
        ),
    ],
)
def test_water(water: Table, sentence: str) -> None:
    found = of_panel(PLATE, **water)
    assert any(sentence in problem for problem in found), found


def test_the_scenario_as_a_whole() -> None:
    whole = scene(PLATE)
    assert problems({**whole, "panel": []}) == [
        "the scenario has no barrier; add at least one, under [[panel]], [[closure]], [[wall]] or [[i_wall]]"
    ]
    assert "title is missing" in problems({name: value for name, value in whole.items() if name != "title"})
    assert 'title is ""; it must not be empty' in problems({**whole, "title": ""})
    assert 'pannel is not a known key; did you mean "panel"?' in problems({**whole, "pannel": []})
    assert 'format is "1"; it must be a whole number' in problems({**whole, "format": "1"})
    assert "format is 0; it must be at least 1" in problems({**whole, "format": 0})
    assert "format is True; it must be a whole number" in problems({**whole, "format": True})
    assert "water is 7; it must be a table" in problems({**whole, "water": 7})
    assert "near_limit is 1.0; it must be less than 1" in problems({**whole, "near_limit": 1.0})
    twins = problems(scene(PLATE, {**PLATE, "id": "P1"}, {**PLATE, "id": "P1"}))
    assert twins == ['id is "P1"; it is used 3 times; every barrier needs an id of its own']
    many = problems(scene(*[PLATE] * 501))
    assert many == ["panel is a list; it may have at most 500"]


def test_all_problems_come_at_once() -> None:
    bad = scene(
        {**PLATE, "height": "9", "widht": "3 ft"},
        {**PLATE, "id": "P1", "sediment": [{**SOIL, "friction_angle": "62 deg"}]},
        flood_side="one foot",
        temperature="50 psf",
    )
    del bad["datum"]
    kept = copy.deepcopy(bad)
    found = problems(bad)
    assert bad == kept
    for words in (
        "datum is missing",
        "water.flood_side",
        "water.temperature",
        "panel[P1].height",
        "panel[P1].widht",
        'panel[P1].sediment[0].friction_angle is "62 deg"; it must be between 0 and 45 deg',
        'id is "P1"; it is used 2 times',
    ):
        assert any(problem.startswith(words) for problem in found), words


def test_a_level_far_above_the_sill_is_accepted_with_a_remark() -> None:
    barrier = assessed(scene(PLATE, flood_side="50 m"))
    assert any("check the datum" in remark for remark in barrier.remarks)
    assert barrier.recheck.agrees.all()
    near = assessed(scene(PLATE, flood_side="5 m"))
    assert not any("check the datum" in remark for remark in near.remarks)


MARKUP = '<script>alert("1")</script> & <b>{{ 7*7 }}</b> ${x}'


def test_markup_in_every_text_is_kept_as_text() -> None:
    layer = {**SOIL, "name": MARKUP}
    panel = {**PLATE, "name": MARKUP, "note": MARKUP, "id": "<i>P</i>", "sediment": [layer]}
    document = scene(panel, flood_side="1 m")
    document |= dict.fromkeys(("title", "location", "purpose", "author", "revision", "datum"), MARKUP)
    document["water"]["flood_side"] = {"value": "1 m", "source": MARKUP}
    scenario = filed(document)
    assert scenario.title == scenario.datum == scenario.author == scenario.location == MARKUP
    assert scenario.panel[0].name == scenario.panel[0].note == MARKUP
    assert scenario.water.flood_side.source == MARKUP
    (barrier,) = assess(scenario).barriers
    assert barrier.record.id == "<i>P</i>"
    assert any(MARKUP in load.name for load in assessed(document).loads)


def test_a_formula_without_an_answer_is_a_problem_of_its_layer() -> None:
    below_the_face = {**SOIL, "top": "1 ft", "side": "protected", "pressure": "active"}
    document = scene({**PLATE, "tilt": "20 deg", "sediment": [below_the_face]})
    with pytest.raises(ScenarioError) as refusal:
        assess(filed(document))
    assert str(refusal.value).startswith("panel[P1].sediment cannot be computed: ")


def test_an_unknown_key_deep_inside_has_its_suggestion() -> None:
    text = b"""
format = 1
title = "Trial"
datum = "d"
[water]
flood_side = "1 m"
[[panel]]
id = "P1"
bottom = "0 m"
width = "1 m"
height = "1 m"
[[panel.sediment]]
side = "flood"
top = "0.5 m"
pressure = "at rest"
saturated_unit_weight = "19 kN/m3"
friction_angel = "30 deg"
"""
    found = problems(parse_document(text))
    assert 'panel[P1].sediment[0].friction_angel is not a known key; did you mean "friction_angle"?' in found
