"""Reference materials of logs and posts: figures with their document, edition and standing.

A limit that somebody entered always wins. A figure marked as recalled still has to be confirmed in the
document that it names; checks against it say so.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache
from typing import Literal, TypeAlias

from loads.quantity import Quantity, read_quantity

Standing: TypeAlias = Literal["published", "from memory, to be confirmed"]
Basis: TypeAlias = Literal["working stress", "strength"]


@dataclass(frozen=True, kw_only=True)
class MaterialFigure:
    """One figure of a material.

    Attributes
    ----------
    text
        As the document gives it, number and unit.
    source
        Document and how the figure follows from it.
    edition
        Edition or year.
    standing
        Seen in a document, or recalled.
    """

    text: str
    source: str
    edition: str
    standing: Standing

    def limit(self) -> Quantity:
        """The figure as a limit, with its document as the source."""
        return _limit(self)


@cache
def _limit(figure: MaterialFigure) -> Quantity:
    value, unit = read_quantity(figure.text, "stress")
    source = f"{figure.source}, {figure.edition}"
    if figure.standing != "published":
        source += f" ({figure.standing})"
    return Quantity(
        text=figure.text, kind="stress", unit=unit, value=value, low=value, high=value, source=source
    )


@dataclass(frozen=True, kw_only=True)
class Material:
    """A reference material.

    Attributes
    ----------
    name
        By which a record chooses it.
    modulus
        Modulus of elasticity.
    allowable
        Allowable stresses of working-stress design by "bending", "shear", "bearing".
    nominal
        Nominal strengths of strength design by the same names, before any resistance factor.
    note
        What whoever relies on it must know.
    """

    name: str
    modulus: MaterialFigure
    allowable: dict[str, MaterialFigure]
    nominal: dict[str, MaterialFigure]
    note: str

    def figure(self, stress: str, basis: Basis) -> MaterialFigure | None:
        """Figure for a kind of stress under a design basis; None where the table has none."""
        return (self.allowable if basis == "working stress" else self.nominal).get(stress)


def _recalled(text: str, source: str, edition: str) -> MaterialFigure:
    return MaterialFigure(text=text, source=source, edition=edition, standing="from memory, to be confirmed")


def _seen(text: str, source: str, edition: str) -> MaterialFigure:
    return MaterialFigure(text=text, source=source, edition=edition, standing="published")


_ADM, _ADM_EDITION = "Aluminum Design Manual", "2010 to 2020"
_AISC, _AISC_EDITION = "AISC Specification, allowable strength design", "2005 and later"
_NDS, _NDS_EDITION = "NDS Supplement, tables 4A and 4D", "2005 to 2018"
_EN = "EN 1993-1-1"
_HYDRAULIC = (
    "For hydraulic structures five sixths of such figures are common practice; lower the limit by hand."
)
_TIMBER = (
    "Wet service is counted, at its full reduction for every grade. Size, duration, temperature and incising "
    "are not: factors 1. The modulus is the mean."
)
_LUMBER, _BEAMS = (0.85, 0.97, 0.67, 0.9), (1.0, 1.0, 0.67, 1.0)


def _aluminium(name: str, bending: MaterialFigure, nominal: MaterialFigure, note: str) -> Material:
    modulus = _recalled("10100 ksi", _ADM, _ADM_EDITION)
    return Material(
        name=name, modulus=modulus, allowable={"bending": bending}, nominal={"bending": nominal}, note=note
    )


def _steel(name: str, yielding: str, bending: str, shear: str) -> Material:
    seen = _seen(yielding, "specified minimum yield stress, as listed in a filed calculation", "2019")
    return Material(
        name=name,
        modulus=_recalled("29000 ksi", _AISC, _AISC_EDITION),
        allowable={
            "bending": _recalled(bending, f"{_AISC}, 0.6 of the yield stress", _AISC_EDITION),
            "shear": _recalled(shear, f"{_AISC}, 0.4 of the yield stress", _AISC_EDITION),
        },
        nominal={"bending": seen},
        note=_HYDRAULIC,
    )


def _wet(dry: float, factor: float, unit: str, what: str) -> MaterialFigure:
    source = f"{_NDS}: {what} {dry:g} {unit} times the wet-service factor {factor:g}"
    return _recalled(f"{dry * factor:.6g} {unit}", source, _NDS_EDITION)


def _timber(
    name: str, dry: tuple[float, float, float, float], wet: tuple[float, float, float, float]
) -> Material:
    """Bending, shear and bearing stress in psi and modulus in ksi, each with its wet-service factor."""
    words = ("bending", "shear", "bearing across the grain")
    allowable = {word.split(" ", 1)[0]: _wet(dry[i], wet[i], "psi", word) for i, word in enumerate(words)}
    modulus = _wet(dry[3], wet[3], "ksi", "modulus")
    return Material(name=name, modulus=modulus, allowable=allowable, nominal={}, note=_TIMBER)


def _european(name: str, modulus: str, bending: str, source: str, edition: str, note: str) -> Material:
    return Material(
        name=name,
        modulus=_recalled(modulus, source, edition),
        allowable={},
        nominal={"bending": _recalled(bending, source, edition)},
        note=note,
    )


_LISTED = (
    _aluminium(
        "aluminium 6061-T6",
        _recalled("19.5 ksi", f"{_ADM}, tensile strength 38 ksi over 1.95", _ADM_EDITION),
        _seen("35 ksi", "49 CFR 178.46 table 2, least yield strength", "as stored"),
        "Not within 1 in of a weld. Editions differ from 19.5 to 27.6 ksi for compact shapes; the least is "
        "taken.",
    ),
    _aluminium(
        "aluminium 6061-T6, welded",
        _recalled("9.09 ksi", f"{_ADM}, yield strength 15 ksi beside a weld over 1.65", _ADM_EDITION),
        _recalled("15 ksi", f"{_ADM}, yield strength beside a weld", _ADM_EDITION),
        "Within 1 in of a weld.",
    ),
    _european(
        "aluminium 6082-T6",
        "70 GPa",
        "250 MPa",
        "EN 1999-1-1, extrusions up to 5 mm, 0.2 % proof strength",
        "2007",
        "No allowable stress in the table: with working stresses enter a limit. Not beside a weld.",
    ),
    _steel("steel A36", "36 ksi", "21.6 ksi", "14.4 ksi"),
    _steel("steel A992", "50 ksi", "30 ksi", "20 ksi"),
    _european(
        "steel S275",
        "210 GPa",
        "265 MPa",
        f"{_EN}, yield strength of thicknesses over 16 up to 40 mm",
        "2005",
        "No allowable stress in the table: with working stresses enter a limit. Up to 16 mm: 275 MPa.",
    ),
    _timber("Douglas fir-larch Select Structural, 2 to 4 in", (1500, 180, 625, 1900), _LUMBER),
    _timber("Douglas fir-larch No. 1, 2 to 4 in", (1000, 180, 625, 1700), _LUMBER),
    _timber("Douglas fir-larch No. 2, 2 to 4 in", (875, 180, 625, 1600), _LUMBER),
    _timber("Douglas fir-larch Select Structural, beams 5 in and more", (1600, 170, 625, 1600), _BEAMS),
    _timber("Douglas fir-larch No. 1, beams 5 in and more", (1350, 170, 625, 1600), _BEAMS),
)

MATERIALS: dict[str, Material] = {material.name: material for material in _LISTED}
"""Every reference material by its name."""
