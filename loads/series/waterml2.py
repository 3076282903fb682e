"""Reader of WaterML 2.0, as a stream; a document type, and with it every entity, is refused."""

from __future__ import annotations

import re
from collections.abc import Mapping
from xml.parsers import expat

from loads.series.collect import MOST_SERIES, Collector, finished
from loads.series.levels import (
    INSTANTANEOUS,
    PARAMETERS,
    UnreadableLevelError,
    is_no_data,
    unit_named,
)
from loads.series.refusals import THE_FILE, Faults, refusal
from loads.series.series import Series
from loads.series.stamps import UnreadableTimeError, Zone, read_stamp
from loads.series.text import check_size, label, zone_argument

_DEEPEST = 64
_LONGEST_TEXT = 10_000
_CODE = re.compile(r"(?<!\d)(\d{5})(?!\d)", re.ASCII)
_NOT_LEVELS = (
    "discharge",
    "flow",
    "precipitation",
    "rain",
    "snow",
    "temperature",
    "depth",
    "velocity",
    "wave",
)
_Attributes = Mapping[str, str]


def _local(name: str) -> str:
    return name.rpartition(" ")[2]


class _Reader:
    """The state of a reading: where we are, and what this observation has said so far."""

    def __init__(self, zone: Zone | None, unit: str | None) -> None:
        self.zone, self.unit = zone, unit
        self.faults, self.collectors, self.notes = Faults(), list[Collector](), dict[str, None]()
        self.path: list[str] = []
        self.text: list[str] = []
        self.length = 0
        self.points = 0
        self.has_series = False
        self.begin_observation()

    def begin_observation(self) -> None:
        self.said: dict[str, str] = {}
        self.collector: Collector | None = None
        self.skip = False

    def start(self, name: str, attributes: _Attributes) -> None:
        tag = _local(name)
        if self.path[-2:-1] == ["MeasurementTVP"] and self.path[-1] in ("time", "value"):
            raise refusal(f"point[{self.points}].{self.path[-1]}", "has an element inside it", tag)
        self.path.append(tag)
        self.text, self.length = [], 0
        if len(self.path) > _DEEPEST:
            raise refusal(THE_FILE, "is nested too deeply to be a series")
        own = {_local(key): value for key, value in attributes.items()}
        if tag == "OM_Observation":
            self.begin_observation()
        elif tag == "MeasurementTimeseries":
            self.has_series = True
            self.collector, self.skip = None, False
            self.said.pop("uom", None)
            self.said.pop("interpolation", None)
        elif tag in ("MeasurementTVP", "TimeValuePair"):
            self.point = {"time": "", "value": "", "nil": "", "qualifier": ""}
        elif tag == "value" and self._in_point():
            self.point["nil"] = own.get("nil", "")
        else:
            self._metadata(tag, own)

    def _in_point(self) -> bool:
        return "MeasurementTVP" in self.path

    def _metadata(self, tag: str, own: dict[str, str]) -> None:
        title, link = own.get("title", ""), own.get("href", "")
        if tag == "uom":
            stated = own.get("code") or title or link.rpartition("/")[2]
            if self._in_point() and stated != self.said.get("uom", stated):
                raise refusal(f"point[{self.points}].uom", "changes within the series", stated)
            self.said.setdefault("uom", stated)
        elif tag == "observedProperty":
            self.said["property"] = f"{title} {link}".strip()
        elif tag == "featureOfInterest":
            self.said["gauge"] = title or re.split(r"[/#=]", link)[-1]
        elif tag == "processType":
            self.said["process"] = f"{title} {link}"
        elif tag == "verticalDatum" and title:
            self.said["datum"] = title
        elif tag == "interpolationType":
            self.said["interpolation"] = title or link.rpartition("/")[2]
        elif tag == "qualifier" and self._in_point():
            self.point["qualifier"] = title

    def characters(self, text: str) -> None:
        self.length += len(text)
        if self.length > _LONGEST_TEXT:
            raise refusal(THE_FILE, "has a longer text in one element than any series needs")
        self.text.append(text)

    def end(self, name: str) -> None:
        tag, text = _local(name), "".join(self.text).strip()
        inside = self.path[-2] if len(self.path) > 1 else ""
        if tag in ("time", "value") and inside == "MeasurementTVP":
            if self.point[tag]:
                raise refusal(f"point[{self.points}].{tag}", "is given twice", text)
            self.point[tag] = text
        elif tag == "timePosition" and "resultTime" in self.path:
            self.said["issued"] = text
        elif tag == "MeasurementTVP":
            self._take()
        elif tag == "name" and "verticalDatum" in self.path and text:
            self.said["datum"] = text
        self.path.pop()
        self.text = []

    def _take(self) -> None:
        self.points += 1
        if self.skip:
            return
        if self.collector is None:
            self.collector = self._begin()
            if self.collector is None:
                self.skip = True
                return
        point, place = self.point, f"point[{self.points - 1}]"
        try:
            stamp = read_stamp(point["time"], self.zone)
            nil = point["nil"].strip() in ("true", "1")
            self.collector.add(stamp, "" if nil else point["value"], label(point["qualifier"]))
        except UnreadableTimeError as error:
            self.faults.add(f"{place}.time", str(error), point["time"])
        except UnreadableLevelError as error:
            self.faults.add(f"{place}.value", str(error), point["value"])

    def _begin(self) -> Collector | None:
        """Start a series, or give None when what is observed is not a level at an instant."""
        stated = self.said.get("property", "")
        code = _CODE.search(stated)
        parameter = PARAMETERS.get(code[1]) if code else None
        reason = self._not_a_level(stated, code[1] if code else "")
        if reason:
            self.notes[reason] = None
            return None
        unit = self._unit(parameter.unit if parameter else "")
        gauge = label(self.said.get("gauge", ""))
        name = parameter.name if parameter else (label(stated.split("http")[0]) or "water level")
        if len(self.collectors) >= MOST_SERIES:
            raise refusal(THE_FILE, f"holds more than {MOST_SERIES} series")
        made = Collector(
            name=f"{gauge} {name}".strip(), parameter=name, kind="observed", unit=unit, gauge=gauge,
            datum=label(self.said.get("datum", "")) or (parameter.datum if parameter else None),
        )  # fmt: skip
        origin = (stated + self.said.get("process", "")).casefold()
        if "forecast" in origin or "simulation" in origin:
            made.kind, made.issued = "forecast", self._issued()
        if not stated:
            made.notes.append("The file does not name what was observed; it is read as a water level.")
        interpolation = self.said.get("interpolation", "")
        if interpolation and interpolation.rstrip("/") != "Continuous":
            made.notes.append(
                f"The file states interpolation {label(interpolation)}; here lines are straight."
            )
        self.collectors.append(made)
        return made

    def _not_a_level(self, stated: str, code: str) -> str:
        plain = stated.casefold()
        statistic = plain.rpartition("statcode=")[2][:5] if "statcode=" in plain else ""
        interval = self.said.get("interpolation", "").casefold()
        if (code and code not in PARAMETERS) or any(word in plain for word in _NOT_LEVELS):
            return f"{label(stated)} is left out: not a level read here."
        if statistic not in INSTANTANEOUS or any(
            word in interval for word in ("average", "total", "statistic")
        ):
            return f"{label(stated) or 'A series'} is left out: its values hold for an interval of time."
        return ""

    def _unit(self, expected: str) -> str:
        stated = self.said.get("uom", "")
        if not stated and not self.unit:
            raise refusal("uom", "is missing; without its unit a level is not read, so state ft or m")
        try:
            unit = unit_named(stated or self.unit or "")
            asked = unit_named(self.unit) if self.unit else unit
        except UnreadableLevelError as error:
            raise refusal("uom", str(error), stated or self.unit) from None
        if unit != asked:
            raise refusal("unit", f"is not that of the file, {unit}", asked)
        if expected and unit != expected:
            raise refusal("uom", f"is not {expected}, the unit of its parameter code", unit)
        return unit

    def _issued(self) -> int | None:
        text = self.said.get("issued", "")
        try:
            stamp = read_stamp(text, self.zone)
        except UnreadableTimeError as error:
            raise refusal("resultTime", str(error), text) from None
        return None if stamp is None or is_no_data(text) else stamp.seconds


def _refuse_document_type(*_: object) -> int:
    raise refusal(
        THE_FILE, "has a document type or an entity of its own; plain WaterML has none, so it is not read"
    )


def read_waterml2(data: bytes, *, zone: str | None = None, unit: str | None = None) -> list[Series]:
    """Read levels from WaterML 2.0.

    Parameters
    ----------
    data
        The file.
    zone
        Zone of stamps that carry no offset.
    unit
        Unit of a document that states none; where it states one, the two must agree.

    Returns
    -------
    list of Series
        One for each measurement time series.

    Raises
    ------
    ScenarioError
        Not XML, a document type, too deep, no unit, a value or time that cannot be read, or no level at all.
    """
    check_size(data)
    reader = _Reader(zone_argument(zone), unit)
    parser = expat.ParserCreate(namespace_separator=" ")
    parser.buffer_text = True
    parser.StartDoctypeDeclHandler = _refuse_document_type
    parser.EntityDeclHandler = _refuse_document_type
    parser.ExternalEntityRefHandler = _refuse_document_type
    parser.StartElementHandler = reader.start
    parser.EndElementHandler = reader.end
    parser.CharacterDataHandler = reader.characters
    try:
        parser.Parse(data, True)
    except expat.ExpatError as error:
        raise refusal(
            f"line {error.lineno}", f"is not well-formed XML: {expat.ErrorString(error.code)}"
        ) from None
    except (LookupError, ValueError, UnicodeError):
        raise refusal(THE_FILE, "is in an encoding that is not read; save it as UTF-8") from None
    reader.faults.raise_any()
    if not reader.has_series:
        raise refusal(THE_FILE, "has no element MeasurementTimeseries: it is not WaterML 2.0")
    return finished(reader.collectors, list(reader.notes)[:8])
