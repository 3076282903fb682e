"""Whether this installation computes: the example is assessed, and both computations must agree."""

import time
from collections.abc import Mapping, Sequence

from webapp.answer import check_json
from webapp.pdf import pdf_available
from webapp.scenario_files import example_files


def ready() -> tuple[bool, dict[str, object]]:
    """Compute the first example and look at the result.

    Returns
    -------
    ready
        True when every barrier of the example was computed and its second computation agrees.
    facts
        What was computed, how long it took, what is missing; for whoever watches the server.
    """
    began = time.perf_counter()
    facts: dict[str, object] = {"pdf": pdf_available() or "available"}
    try:
        example = example_files()[0]
        problems = _problems(check_json(example.read_text(encoding="utf-8"), {}))
    except Exception as error:  # noqa: BLE001  whatever goes wrong, the answer is "not ready", with the reason
        return False, {**facts, "problems": [f"{type(error).__name__}: {error}"]}
    facts |= {"example": example.name, "seconds": round(time.perf_counter() - began, 4)}
    return not problems, {**facts, "problems": problems}


def _problems(result: Mapping[str, object]) -> list[str]:
    barriers = result.get("barriers")
    if not isinstance(barriers, Sequence) or not barriers:
        return ["the example gave no barriers"]
    return [
        f"the two computations of {b['id']} disagree" for b in barriers if b["recheck"]["agrees"] is not True
    ]
