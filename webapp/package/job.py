"""From a document to the print job of its package: HTML, the scenario file inside it, and a fixed date."""

from __future__ import annotations

import datetime as dt
from collections.abc import Iterator

from loads import __version__
from loads.assessment import assess
from loads.document import input_digest
from loads.quantity import Quantity
from loads.records.base import Record
from loads.records.scenario import Scenario
from loads.scenario_file import Document, scenario_of, write_document
from webapp.package.page import package_html
from webapp.pdf import Attachment, PrintJob, render

FILE_NAME = "scenario.toml"
_UNDATED = dt.datetime(2000, 1, 1, tzinfo=dt.UTC)


def package_job(document: Document) -> PrintJob:
    """Everything the package of a document is made of, for a printer here or in another process.

    Parameters
    ----------
    document
        As read from a scenario file.

    Returns
    -------
    PrintJob
        The same for the same document, whenever and wherever it is made.

    Raises
    ------
    ScenarioError
        The document is no scenario, or cannot be computed.
    """
    scenario = scenario_of(document)
    html = package_html(assess(scenario), document, digest=input_digest(document), version=__version__)
    attachment = Attachment(
        name=FILE_NAME, description="Scenario file of this calculation", content=write_document(document)
    )
    return PrintJob(html=html, created=created_for(scenario), attachments=(attachment,))


def package_pdf(document: Document) -> bytes:
    """Calculation package of a document, made in this process.

    Raises
    ------
    ScenarioError
        The document is no scenario, or cannot be computed.
    PdfError
        No PDF can be made on this machine.
    """
    return render(package_job(document))


def created_for(scenario: Scenario) -> dt.datetime:
    """Time in the metadata: that of the levels, else the day of the newest source, else the year 2000.

    The clock is left out so that the same input gives the same file.
    """
    if scenario.water.as_of is not None:
        return scenario.water.as_of
    days = [quantity.dated for quantity in _quantities(scenario) if quantity.dated is not None]
    return dt.datetime.combine(max(days), dt.time(), dt.UTC) if days else _UNDATED


def _quantities(value: object) -> Iterator[Quantity]:
    if isinstance(value, Quantity):
        yield value
    elif isinstance(value, Record):
        for name in type(value).model_fields:
            yield from _quantities(getattr(value, name))
    elif isinstance(value, tuple):
        for part in value:
            yield from _quantities(part)
