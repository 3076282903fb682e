"""Criteria of stability as data: sets by load category, each with document, edition, table and status."""

from __future__ import annotations

from dataclasses import dataclass

from loads.records.wall_parts import Category, OwnCriteria
from loads.reference import Status

_MEMORY: Status = "from memory, to be confirmed"
CATEGORIES: tuple[Category, ...] = ("usual", "unusual", "extreme")


@dataclass(frozen=True, kw_only=True)
class CriteriaSet:
    """What a document asks of a wall.

    Attributes
    ----------
    key
        How a scenario names it.
    document, edition, table
        Where it stands.
    status
        What the figures are worth as a source.
    site_information
        Class of knowledge of the site that it is for, empty where the document has none.
    sliding
        Least sliding factor by category. [–]
    compression
        Least share of the base in compression by category, 0 where the resultant need only lie within the
        base. [%]
    flotation
        Least flotation factor by category. [–]
    bearing
        Least factor on bearing resistance by category. [–]
    remark
        What whoever uses it must know.
    """

    key: str
    document: str
    edition: str
    table: str
    status: str
    site_information: str = ""
    sliding: dict[Category, float]
    compression: dict[Category, float]
    flotation: dict[Category, float]
    bearing: dict[Category, float]
    remark: str = ""

    @property
    def words(self) -> str:
        """Which set and edition is in force, in one line."""
        parts = (self.document, self.edition, self.table, self.site_information and self._site())
        return ", ".join(part for part in parts if part) + f" ({self.status})"

    def _site(self) -> str:
        return f"{self.site_information} site information"


def _by(*figures: float) -> dict[Category, float]:
    return dict(zip(CATEGORIES, figures, strict=False))


def _manual_2005(importance: str, site: str, table: str, sliding: tuple[float, ...]) -> CriteriaSet:
    return CriteriaSet(
        key=f"EM 1110-2-2100 {importance} {site}",
        document="EM 1110-2-2100",
        edition="1 December 2005",
        table=f"tables {table}, 3-4 and 3-5",
        status=_MEMORY,
        site_information=site,
        sliding=_by(*sliding),
        compression=_by(100, 75, 0),
        flotation=_by(1.3, 1.2, 1.1),
        bearing={},
        remark=f"{importance} structures; amended for flood walls by ECB 2014-24, which has expired",
    )


_SETS = (
    _manual_2005("critical", "well defined", "3-2", (1.7, 1.3, 1.1)),
    _manual_2005("critical", "ordinary", "3-2", (2.0, 1.7, 1.3)),
    _manual_2005("normal", "well defined", "3-3", (1.4, 1.2, 1.1)),
    _manual_2005("normal", "ordinary", "3-3", (1.5, 1.3, 1.1)),
    CriteriaSet(
        key="EM 1110-2-2502 1989 inland",
        document="EM 1110-2-2502",
        edition="29 September 1989",
        table="tables 4-1 and 4-3, inland flood wall on soil",
        status=_MEMORY,
        sliding=_by(1.5, 1.33),
        compression=_by(100, 75),
        flotation={},
        bearing=_by(3.0, 2.0),
        remark="usual is the design flood, unusual water to the top of the wall; the 2022 revision asks "
        "otherwise and the two must not be mixed",
    ),
    CriteriaSet(
        key="EM 1110-2-2200 1995",
        document="EM 1110-2-2200",
        edition="30 June 1995",
        table="table 4-1, gravity dams",
        status=_MEMORY,
        sliding=_by(2.0, 1.7, 1.3),
        compression=_by(100, 75, 0),
        flotation={},
        bearing={},
        remark="middle third, middle half, within the base",
    ),
)
CRITERIA: dict[str, CriteriaSet] = {item.key: item for item in _SETS}
"""Every built-in set by its key."""


def own_set(own: OwnCriteria, category: Category) -> CriteriaSet:
    """Criteria entered in a scenario as a set for one category."""

    def one(figure: float | None) -> dict[Category, float]:
        return {} if figure is None else {category: figure}

    return CriteriaSet(
        key="own",
        document=own.document,
        edition=own.edition,
        table=own.table,
        status=own.status,
        sliding=one(own.sliding),
        compression=one(own.compression),
        flotation=one(own.flotation),
        bearing=one(own.bearing),
    )
