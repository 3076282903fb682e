"""From a document to the print job of a field sheet."""

from __future__ import annotations

import datetime as dt

from loads.assessment import Assessment
from loads.scenario_file import Document
from webapp.package.job import created_for
from webapp.pdf import PrintJob
from webapp.sheet.page import Paper, sheet_html
from webapp.sheet.plan import Stamp


def sheet_job(
    assessment: Assessment,
    closure_id: str,
    document: Document,
    *,
    stamp: Stamp = "draft",
    link: str | None = None,
    paper: Paper | None = None,
    now: dt.datetime | None = None,
) -> PrintJob:
    """Everything the sheet of a closure is made of, for a printer here or in another process.

    Parameters and errors are those of `webapp.sheet.page.sheet_html`.

    Returns
    -------
    PrintJob
        The same for the same input.
    """
    html = sheet_html(
        assessment, closure_id, document, stamp=stamp, link=link, paper=paper, now=now
    )
    return PrintJob(html=html, created=now or created_for(assessment.scenario))
