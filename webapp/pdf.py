"""From HTML to PDF in this process; nothing outside the HTML itself is ever fetched."""

import datetime as dt
import logging
from dataclasses import dataclass, field
from functools import cache
from typing import TYPE_CHECKING

from loads.problems import SillheadError

if TYPE_CHECKING:
    from weasyprint.urls import URLFetcher

PANGO_PACKAGES = "libpango-1.0-0 libpangoft2-1.0-0 libharfbuzz-subset0"


class PdfError(SillheadError):
    """A PDF that cannot be made; the message is for the person who asked for it."""


@dataclass(frozen=True, kw_only=True)
class Attachment:
    """A file carried inside the PDF: its name, what it is, and its content."""

    name: str
    description: str
    content: bytes


@dataclass(frozen=True, kw_only=True)
class PrintJob:
    """Everything a PDF is made of; the same job gives the same bytes."""

    html: str
    """Whole HTML page with its style and drawings inline."""
    created: dt.datetime
    """Time printed into the metadata, with zone; part of the input, never the clock."""
    attachments: tuple[Attachment, ...] = field(default=())
    smaller: tuple[str, ...] = ()
    """The same page set smaller and smaller, each tried while the one before takes more than one sheet."""


@cache
def pdf_available() -> str | None:
    """Why no PDF can be made on this machine, or None when one can.

    Returns
    -------
    str or None
        A message that names the Debian packages to install.
    """
    try:
        import weasyprint  # noqa: F401, PLC0415  its import loads Pango, which a machine may lack
    except OSError:
        return (
            "PDF files cannot be made here because the Pango text library is missing; "
            f"on Debian or Ubuntu install it with: apt-get install {PANGO_PACKAGES}"
        )
    return None


def render(job: PrintJob) -> bytes:
    """PDF of a print job.

    Parameters
    ----------
    job
        HTML, attachments and the time that stands in the metadata.

    Returns
    -------
    bytes
        The PDF file.

    Raises
    ------
    PdfError
        When Pango is missing or the HTML is nested too deeply to be laid out.
    """
    missing = pdf_available()
    if missing is not None:
        raise PdfError(missing)
    if job.created.tzinfo is None:
        raise PdfError("the time in a PDF needs a zone")
    import weasyprint  # noqa: PLC0415  see pdf_available

    logging.getLogger("weasyprint").setLevel(logging.ERROR)
    fetcher = sealed_fetcher()
    attachments = [
        weasyprint.Attachment(
            string=attachment.content,
            name=attachment.name,
            description=attachment.description,
            created=job.created,
            modified=job.created,
            url_fetcher=fetcher,
        )
        for attachment in job.attachments
    ]
    try:
        for html in (job.html, *job.smaller):
            document = weasyprint.HTML(string=html, url_fetcher=fetcher).render(pdf_tags=True)
            if len(document.pages) == 1:
                break
        document.metadata.created = document.metadata.modified = _stamp(job.created)
        document.metadata.attachments = attachments
        content = document.write_pdf(pdf_tags=True)
    except RecursionError as error:
        raise PdfError("the document is nested too deeply to be printed") from error
    assert isinstance(content, bytes)
    return content


def _stamp(time: dt.datetime) -> str:
    return time.astimezone(dt.UTC).strftime("%Y-%m-%dT%H:%M:%SZ")


def sealed_fetcher() -> "URLFetcher":
    """Fetcher that reads what stands in the HTML itself (data: addresses) and refuses every other address."""
    from weasyprint.urls import URLFetcher  # noqa: PLC0415  see pdf_available

    return URLFetcher(allowed_protocols=["data"], allow_redirects=False)
