"""The field sheet: one closure on one page, for people in the rain, as PDF and as one HTML file."""

from webapp.sheet.job import sheet_job
from webapp.sheet.page import PAPERS, sheet_html
from webapp.sheet.plan import STAMPS, SheetError

__all__ = ["PAPERS", "STAMPS", "SheetError", "sheet_html", "sheet_job"]
