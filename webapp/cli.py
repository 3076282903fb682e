"""The command line. Exit status 0 when computed, 2 for bad input with the messages on standard error."""

import datetime as dt
import ipaddress
import json
import os
import sys
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import Any

import click

from loads import __version__
from loads.problems import SillheadError


def _address(_: click.Context, __: click.Parameter, value: str) -> str:
    try:
        return str(ipaddress.ip_address("127.0.0.1" if value == "localhost" else value))
    except ValueError as error:
        raise click.BadParameter("it must be an IP address such as 127.0.0.1 or 0.0.0.0") from error


@click.group(context_settings={"help_option_names": ["-h", "--help"]})
@click.version_option(__version__, prog_name="sillhead")
def main() -> None:
    """Loading checks for floodwalls and stop-log closures: a screening and planning tool."""


@contextmanager
def _messages() -> Iterator[None]:
    """Turn what is wrong with an input into messages and exit status 2."""
    try:
        yield
    except SillheadError as error:
        click.echo(str(error), err=True)
        sys.exit(2)


@main.command()
@click.argument("file", type=click.Path(path_type=Path))
@click.option("--json", "as_json", is_flag=True, help="Print JSON in SI base units instead of a table.")
@click.option(
    "--flood-side", metavar="LEVEL", help='Level in place of the one in the file, for example "105.2 ft".'
)
@click.option(
    "--protected-side", metavar="LEVEL", help='The same for the protected side; "dry" for no water.'
)
def check(file: Path, *, as_json: bool, flood_side: str | None, protected_side: str | None) -> None:
    """Compute every barrier of a scenario file."""
    from loads.assessment import assess  # noqa: PLC0415  keeps --help quick
    from loads.scenario_file import read_file, scenario_of  # noqa: PLC0415
    from webapp.answer import answer, with_levels  # noqa: PLC0415
    from webapp.text_table import table_text  # noqa: PLC0415

    typed = {"flood_side": flood_side, "protected_side": protected_side}
    with _messages():
        document = with_levels(
            read_file(file), {side: text for side, text in typed.items() if text is not None}
        )
        assessment = assess(scenario_of(document))
    if as_json:
        click.echo(json.dumps(answer(assessment, document), ensure_ascii=False, allow_nan=False, indent=1))
    else:
        click.echo(table_text(assessment, document))


@main.command()
@click.argument("file", type=click.Path(path_type=Path))
@click.option(
    "-o",
    "--output",
    type=click.Path(dir_okay=False, path_type=Path),
    required=True,
    help="PDF file to write; one of that name is replaced.",
)
def report(file: Path, output: Path) -> None:
    """Write the calculation package of a scenario file as PDF."""
    from loads.scenario_file import read_file  # noqa: PLC0415  keeps --help quick
    from webapp.package import package_pdf  # noqa: PLC0415

    with _messages():
        _write_whole(output, package_pdf(read_file(file)))
    click.echo(f"{output} written")


@main.command()
@click.argument("file", type=click.Path(path_type=Path))
@click.argument("barrier_id", metavar="ID")
@click.option(
    "-o",
    "--output",
    type=click.Path(dir_okay=False, path_type=Path),
    required=True,
    help="File to write, .pdf or .html; one of that name is replaced.",
)
@click.option(
    "--stamp",
    type=click.Choice(["actual", "exercise", "draft"]),
    default="draft",
    show_default=True,
    help="What the sheet is for; it is printed large.",
)
@click.option("--paper", type=click.Choice(["letter", "A4"]), help="By the units of the file when left out.")
@click.option(
    "--link-base", metavar="URL", help="Address of a server; the sheet then carries a link as QR code."
)
def sheet(
    file: Path, barrier_id: str, *, output: Path, stamp: str, paper: str | None, link_base: str | None
) -> None:
    """Write the field sheet of a closure, one page."""
    from loads.assessment import assess  # noqa: PLC0415  keeps --help quick
    from loads.scenario_file import read_file, scenario_of  # noqa: PLC0415
    from webapp.pdf import render  # noqa: PLC0415
    from webapp.sheet import sheet_html, sheet_job  # noqa: PLC0415
    from webapp.sheet.link import link_at  # noqa: PLC0415

    with _messages():
        if output.suffix not in (".pdf", ".html"):
            raise SillheadError(f"the file {output} must end in .pdf or .html")
        document = read_file(file)
        assessment = assess(scenario_of(document))
        link = link_at(link_base, document) if link_base else None
        options: dict[str, Any] = {
            "stamp": stamp,
            "paper": paper,
            "link": link,
            "now": dt.datetime.now(dt.UTC),
        }
        if output.suffix == ".pdf":
            content = render(sheet_job(assessment, barrier_id, document, **options))
        else:
            content = sheet_html(assessment, barrier_id, document, **options).encode()
        _write_whole(output, content)
    click.echo(f"{output} written")


def _write_whole(output: Path, content: bytes) -> None:
    """Write a file so that it is either there as a whole or as it was before."""
    unfinished = output.with_name(f".{output.name}.{os.getpid()}")
    try:
        try:
            unfinished.write_bytes(content)
            unfinished.replace(output)
        finally:
            unfinished.unlink(missing_ok=True)
    except OSError as error:
        raise SillheadError(f"the file {output} cannot be written: {error.strerror or error}") from error


@main.command()
@click.argument("file", type=click.Path(path_type=Path))
@click.option(
    "--now", "typed_now", metavar="TIME", help="Time with its zone to tell from; this machine's if left out."
)
@click.option("--json", "as_json", is_flag=True, help="Print JSON in SI base units instead of a table.")
def clock(file: Path, *, typed_now: str | None, as_json: bool) -> None:
    """Tell when to call out, start and have closed, from the forecast in a scenario file."""
    from loads.line_clock import line_clock  # noqa: PLC0415  keeps --help quick
    from loads.moments import now_of  # noqa: PLC0415
    from loads.scenario_file import read_file, scenario_of  # noqa: PLC0415
    from webapp.answer_clock import clock_answer  # noqa: PLC0415
    from webapp.clock_words import clock_text  # noqa: PLC0415

    with _messages():
        document = read_file(file)
        line = line_clock(scenario_of(document), now_of(typed_now, "--now"))
    if as_json:
        click.echo(json.dumps(clock_answer(line, document), ensure_ascii=False, allow_nan=False, indent=1))
    else:
        click.echo(clock_text(line, document))


@main.command()
def schema() -> None:
    """Print the JSON schema of the scenario format."""
    from loads.records.scenario import scenario_schema  # noqa: PLC0415  keeps --help quick

    click.echo(json.dumps(scenario_schema(), ensure_ascii=False, indent=1))


@main.command()
@click.option(
    "--address", default="127.0.0.1", show_default=True, callback=_address, help="IP address to listen on."
)
@click.option("--port", type=click.IntRange(0, 65535), help="Port; 8501 or the next free one when left out.")
@click.option(
    "--data",
    type=click.Path(file_okay=False, path_type=Path),
    envvar="SILLHEAD_DATA",
    help="Folder for stored plans.",
)
def serve(address: str, port: int | None, data: Path | None) -> None:
    """Start the web pages."""
    from webapp.server import serve as run_server  # noqa: PLC0415  brings Streamlit, which no other command needs

    run_server(address=address, port=port, data=data)


if __name__ == "__main__":
    main()
