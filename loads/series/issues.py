"""From the series of a file to the issues of a forecast."""

from __future__ import annotations

from collections.abc import Sequence

from loads.series.refusals import refusal
from loads.series.series import Forecast, Issue, Series

_TRACES = ("low", "likely", "high")


def _trace_of(series: Series) -> str:
    """Which trace of its issue a series is, by the last of the words in its name that says so."""
    words = [word for word in series.name.casefold().replace(",", " ").split() if word in _TRACES]
    return words[-1] if words else "likely"


def forecast_of(found: Sequence[Series]) -> Forecast:
    """Put forecast series of one gauge together: by time of issue, and into low, likely and high.

    Parameters
    ----------
    found
        As a reader gives them; observed series are passed.

    Returns
    -------
    Forecast
        Its issues in order; without issues when nothing is a forecast.

    Raises
    ------
    ScenarioError
        Two traces for one place, a low or high trace without the others, or issues of several gauges.
    """
    groups: dict[str, dict[str, Series]] = {}
    for series in found:
        if series.kind != "forecast":
            continue
        group = groups.setdefault(str(series.issued), {})
        trace = _trace_of(series)
        if trace in group:
            raise refusal("forecast", f"has two {trace} traces of one issue: choose the gauge or the column")
        group[trace] = series
    forecast = Forecast()
    for group in groups.values():
        if set(group) == {"likely"}:
            issue = Issue(likely=group["likely"])
        elif set(group) == set(_TRACES):
            issue = Issue.entered(group["likely"], group["low"], group["high"])
        else:
            missing = ", ".join(name for name in _TRACES if name not in group)
            raise refusal(
                "forecast", f"has an issue without its {missing} trace; give all three or the likely one"
            )
        forecast = forecast.with_issue(issue)
    return forecast
