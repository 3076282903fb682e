"""From a gauge's reading to the head at a barrier, one visible link after another, and back to a reading."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import date
from typing import Literal

import numpy as np

from loads.arrays import FloatArray
from loads.chain_remarks import chain_remarks
from loads.gauge_conversion import Conversion, constant_of
from loads.quantity import Quantity
from loads.reading_chain import Computed, Given, Link, Outcome, Values, follow
from loads.records.gauge import Transfer

Sign = Literal["", "+", "−", "="]

_NONE = np.array(np.nan)
_SAME_DATUM = "gauge and barrier are both in {}"
_COMMON = "common practice, no source"


@dataclass(frozen=True, kw_only=True)
class ChainTerm:
    """One term of the line reading + zero + shift + transfer − sill = head.

    Attributes
    ----------
    sign
        What stands before it.
    link
        Symbol, meaning, value, low, high, source and date.
    mark
        What is missing, in words; empty when nothing is.
    """

    sign: Sign
    link: Link
    mark: str


@dataclass(frozen=True, kw_only=True)
class GaugeChain:
    """The whole chain from one gauge to one barrier, for n readings.

    Attributes
    ----------
    gauge, barrier
        Identifiers.
    outcome
        Every link, and the range of the head combined in two ways.
    missing
        Links without which there is no head, one sentence each.
    remarks
        What whoever reads the head must know.
    """

    gauge: str
    barrier: str
    outcome: Outcome
    missing: tuple[str, ...]
    remarks: tuple[str, ...]

    @property
    def head(self) -> FloatArray:
        """Level less sill, shape (n,); negative while the water is below it, NaN where not known. [m]."""
        return self.outcome.link("head").value

    @property
    def level(self) -> FloatArray:
        """Still-water level at the barrier, shape (n,); NaN where not known. [m]."""
        return self.outcome.link("level").value

    @property
    def terms(self) -> tuple[ChainTerm, ...]:
        """Terms of the line in order, the head last."""
        shown = [link for link in self.outcome.links if link.name != "level"]
        signs: list[Sign] = ["", *("−" if link.name == "sill" else "+" for link in shown[1:-1]), "="]
        return tuple(
            ChainTerm(sign=sign, link=link, mark=_mark(link)) for sign, link in zip(signs, shown, strict=True)
        )


@dataclass(frozen=True, kw_only=True)
class GaugeReading:
    """Readings of a gauge, n at once, with their range and where they come from.

    Attributes
    ----------
    stage, low, high
        Shape (n,); NaN for no data. [m]
    source, dated, text
        Pedigree of the reading.
    """

    stage: FloatArray
    low: FloatArray
    high: FloatArray
    source: str = ""
    dated: date | None = None
    text: str = ""

    @classmethod
    def of(cls, stage: FloatArray, source: str = "", dated: date | None = None) -> GaugeReading:
        """Readings without a stated range.

        Parameters
        ----------
        stage
            Shape (n,). [m]
        source, dated
            Pedigree.
        """
        return cls(stage=stage, low=stage, high=stage, source=source, dated=dated)


def chain_of(way: Conversion, reading: GaugeReading, sill: Quantity, datum: str) -> GaugeChain:
    """Follow the chain reading + zero + shift + transfer − sill = head [ClockPractice].

    Parameters
    ----------
    way
        From the gauge to the barrier.
    reading
        Readings of the gauge.
    sill
        Elevation of the sill or bottom, in the scenario's datum.
    datum
        Of the sill.

    Returns
    -------
    GaugeChain
        Every link with its range; the head is NaN where a link is missing.
    """
    states = len(reading.stage)
    links: list[Given | Computed] = [
        Given(
            name="reading",
            symbol="s",
            meaning="reading of the gauge",
            kind="length",
            value=reading.stage,
            low=reading.low,
            high=reading.high,
            source=reading.source,
            dated=reading.dated,
            text=reading.text,
        ),
        _entered("zero", "z_G", f"zero of the gauge, {way.gauge.datum or 'datum unknown'}", way.gauge.zero),
        _shift(way, datum),
        *_transfer(way),
        _entered("sill", "z_s", "sill", sill),
    ]
    names = [link.name for link in links]
    links.append(_sum("level", "L", "level at the barrier", [name for name in names if name != "sill"]))
    links.append(_sum("head", "h", "head on the sill", names))
    return GaugeChain(
        gauge=way.gauge.id,
        barrier=way.barrier,
        outcome=follow(links, states),
        missing=way.missing,
        remarks=chain_remarks(way, reading.stage),
    )


def _entered(name: str, symbol: str, meaning: str, entered: Quantity | None) -> Given:
    if entered is None:
        return Given(
            name=name, symbol=symbol, meaning=meaning, kind="length", value=_NONE, low=_NONE, high=_NONE
        )
    return Given(
        name=name,
        symbol=symbol,
        meaning=meaning,
        kind="length",
        value=np.array(entered.value),
        low=np.array(entered.low),
        high=np.array(entered.high),
        source=entered.source,
        dated=entered.dated,
        text=entered.text,
    )


def _shift(way: Conversion, datum: str) -> Given:
    gauge = way.gauge
    meaning = f"shift from {gauge.datum or 'datum unknown'} to {datum}"
    if gauge.datum_shift is not None or gauge.zero is None:
        return _entered("shift", "Δd", meaning, gauge.datum_shift)
    nothing = np.array(0.0)
    return Given(
        name="shift",
        symbol="Δd",
        meaning=meaning,
        kind="length",
        value=nothing,
        low=nothing,
        high=nothing,
        basis="computed",
        source=_SAME_DATUM.format(datum),
    )


def _transfer(way: Conversion) -> list[Given | Computed]:
    transfer = way.transfer
    meaning = f"level at {way.barrier} less level at the gauge"
    if transfer is None or transfer.offset is not None:
        return [_entered("transfer", "Δs", meaning, transfer.offset if transfer else None)]
    source = f"{transfer.source or 'entered without a source'}{f', {transfer.date}' if transfer.date else ''}"
    difference: Given | Computed
    if transfer.table is not None:
        difference = Computed(
            name="transfer",
            symbol="Δs",
            meaning=f"{meaning}, by a table of readings",
            kind="length",
            formula=lambda values: way.offset(values["reading"]),
            source=source,
        )
    else:
        difference = _sloped(transfer, f"{meaning}, slope × distance")
    return [difference, *_off_by(transfer)]


def _sloped(transfer: Transfer, meaning: str) -> Given:
    assert transfer.slope is not None
    assert transfer.distance_downstream is not None
    ends = (
        -transfer.slope * transfer.distance_downstream.low,
        -transfer.slope * transfer.distance_downstream.high,
    )
    return Given(
        name="transfer",
        symbol="Δs",
        meaning=meaning,
        kind="length",
        value=np.array(constant_of(transfer)),
        low=np.array(min(ends)),
        high=np.array(max(ends)),
        source=transfer.source,
        dated=transfer.date,
        text=f"−{transfer.slope:g} × {transfer.distance_downstream.text}",
    )


def _off_by(transfer: Transfer) -> list[Given | Computed]:
    uncertainty = transfer.uncertainty
    if uncertainty is None or uncertainty.value == 0:
        return []
    return [
        Given(
            name="transfer error",
            symbol="ε",
            meaning="what the transfer may be off",
            kind="length",
            value=np.array(0.0),
            low=np.array(-uncertainty.value),
            high=np.array(uncertainty.value),
            source=transfer.source,
            dated=transfer.date,
            text=f"± {uncertainty.text}",
        )
    ]


def _sum(name: str, symbol: str, meaning: str, names: list[str]) -> Computed:
    def total(values: Values) -> FloatArray:
        parts = [-values[part] if part == "sill" else values[part] for part in names]
        return np.asarray(sum(parts[1:], parts[0]), dtype=np.float64)

    return Computed(name=name, symbol=symbol, meaning=meaning, kind="length", formula=total, source=_COMMON)


def _mark(link: Link) -> str:
    if link.basis == "computed":
        return ""
    if link.name != "reading" and np.isnan(link.value).all():
        return "missing: nobody entered it"
    if np.isnan(link.value).all():
        return "no data"
    absent = [word for word, there in (("source", link.source), ("date", link.dated)) if not there]
    return f"no {' and no '.join(absent)}" if absent else ""
