"""What every test may use: the profiles of Hypothesis, the check of source markers, the fixture `agree`."""

from __future__ import annotations

import os

import pytest
from hypothesis import settings

from tests.agreement import Agree
from tests.verification import COMPARISONS, Verification

settings.register_profile("dev", max_examples=50, deadline=None)
settings.register_profile("ci", max_examples=200, deadline=None, derandomize=True)
settings.load_profile(os.environ.get("HYPOTHESIS_PROFILE", "dev"))


def pytest_addoption(parser: pytest.Parser) -> None:
    parser.addoption(
        "--write-verification",
        action="store_true",
        help="write tests/VERIFICATION.md from a passing run of all of tests/literature",
    )


def pytest_configure(config: pytest.Config) -> None:
    config.stash[COMPARISONS] = []
    config.pluginmanager.register(Verification(config), "sillhead-verification")


@pytest.fixture
def agree(request: pytest.FixtureRequest) -> Agree:
    """Assert agreement with an expected figure, and keep the comparison for tests/VERIFICATION.md."""
    return Agree(request.node.nodeid, request.config.stash[COMPARISONS].append)
