"""From a document to the print job of a field sheet."""

from __future__ import annotations

import datetime as dt

from loads.assessment import Assessment
from loads.scenario_file import Document
from webapp.package.job import created_for
from webapp.pdf import PrintJob
from webapp.sheet.blocks import blocks
from webapp.sheet.fit import SEEN, SIZES, type_size
from webapp.sheet.page import Paper, set_in, sheet_parts
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
    parts = sheet_parts(assessment, closure_id, document, stamp=stamp, link=link, paper=paper, now=now)
    start = type_size(blocks(parts), parts["paper"], free=SEEN)
    first, *smaller = (set_in(parts, size) for size in SIZES[SIZES.index(start) :])
    return PrintJob(html=first, created=now or created_for(assessment.scenario), smaller=tuple(smaller))
