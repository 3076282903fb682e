"""The calculation package: everything a reviewing engineer needs to follow a result by hand, as one PDF."""

from webapp.package.job import package_job, package_pdf
from webapp.package.page import package_html

__all__ = ["package_html", "package_job", "package_pdf"]
