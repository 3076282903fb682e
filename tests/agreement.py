"""How a figure is held against an expected one: tolerance from the printed digits, every comparison kept."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from decimal import Decimal

import numpy as np
from numpy.typing import NDArray

_SLACK = 1e-12


@dataclass(frozen=True)
class Printed:
    """A figure as a source prints it; half a unit of its last digit is the source's own uncertainty."""

    text: str
    value: float
    tolerance: float


def printed(text: str) -> Printed:
    """Read a figure as printed, for example "1412.64" (± 0.005) or "9.90e3" (± 50)."""
    figure = Decimal(text)
    exponent = figure.as_tuple().exponent
    if not isinstance(exponent, int):
        message = f"{text!r} is not a figure"
        raise TypeError(message)
    return Printed(text, float(figure), float(Decimal("0.5").scaleb(exponent)))


@dataclass(frozen=True, kw_only=True)
class Comparison:
    """One computed figure against one expected."""

    test: str
    what: str
    expected_text: str
    expected: float
    found: float
    tolerance: float
    tolerance_text: str

    @property
    def difference(self) -> float:
        return abs(self.found - self.expected)

    @property
    def agrees(self) -> bool:
        # worded so that a found value that is not a number disagrees
        return self.difference <= self.tolerance + _SLACK * abs(self.expected)


class Agree:
    """Assert that a figure agrees with an expected one, and keep the comparison."""

    def __init__(self, test: str, keep: Callable[[Comparison], None]) -> None:
        self._test = test
        self._keep = keep

    def __call__(
        self,
        found: float | NDArray[np.float64],
        expected: float | Printed,
        *,
        what: str,
        digits: int | None = None,
        abs: float | None = None,  # noqa: A002 - named as in pytest.approx
        rel: float | None = None,
        why: str = "",
    ) -> None:
        """Compare one figure, in the unit the source prints.

        `expected` is `printed("…")`, whose tolerance is half a unit of the last digit, or a number with
        exactly one of `digits` (significant ones), `abs` and `rel`. To widen the tolerance of a printed
        figure give `abs` or `rel` and say `why`.
        """
        tolerance, text = _tolerance(expected, digits, abs, rel, why)
        comparison = Comparison(
            test=self._test,
            what=what,
            expected_text=expected.text if isinstance(expected, Printed) else f"{expected:.12g}",
            expected=expected.value if isinstance(expected, Printed) else expected,
            found=float(np.asarray(found).item()),
            tolerance=tolerance,
            tolerance_text=text,
        )
        self._keep(comparison)
        assert comparison.agrees, (
            f"{what}: found {comparison.found:.10g}, expected {comparison.expected_text} ± {tolerance:.3g}"
        )


def _tolerance(
    expected: float | Printed, digits: int | None, absolute: float | None, relative: float | None, why: str
) -> tuple[float, str]:
    given = [choice for choice in (digits, absolute, relative) if choice is not None]
    if isinstance(expected, Printed):
        if not given:
            return expected.tolerance, f"± {expected.tolerance:.3g} (printed digits)"
        if not why:
            message = "a printed figure carries its tolerance; another one needs a reason (why=…)"
            raise ValueError(message)
    if len(given) != 1:
        message = "give exactly one of digits, abs and rel"
        raise ValueError(message)
    value = expected.value if isinstance(expected, Printed) else expected
    reason = f": {why}" if why else ""
    if digits is not None:
        last = np.floor(np.log10(np.abs(value))) - digits + 1 if value else -digits
        half_unit = 0.5 * 10.0**last
        return half_unit, f"± {half_unit:.3g} ({digits} digits){reason}"
    if relative is not None:
        return relative * np.abs(value), f"{relative:.3g} of the value{reason}"
    assert absolute is not None
    return absolute, f"± {absolute:.3g}{reason}"
