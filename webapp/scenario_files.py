"""Where the example scenarios lie, in a source tree and in an installed program."""

from pathlib import Path

_PACKAGE = Path(__file__).parent
FIRST_EXAMPLE = "tannery-row.toml"
_PLACES = (_PACKAGE / "scenarios", _PACKAGE.parent / "scenarios")


def scenario_directory() -> Path:
    """Folder of the example scenarios.

    Returns
    -------
    Path
        The folder inside the installed program, or at the top of the source tree.

    Raises
    ------
    FileNotFoundError
        When neither is there.
    """
    for place in _PLACES:
        if place.is_dir():
            return place
    raise FileNotFoundError("the example scenarios are missing from this installation")


def example_files() -> list[Path]:
    """The example scenarios in the order in which they are offered; the first opens on a first visit.

    Returns
    -------
    list of Path
        `FIRST_EXAMPLE`, then the others by name; those of older formats (`released/`) are not examples.
    """
    return sorted(
        scenario_directory().glob("*.toml"), key=lambda path: (path.name != FIRST_EXAMPLE, path.name)
    )
