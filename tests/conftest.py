"""What every test may ask for: `--long`, and a share of long work that rotates from day to day."""

import os
import random
from collections.abc import Callable, Sequence
from datetime import UTC, datetime
from typing import TypeVar

import pytest

Case = TypeVar("Case")

SEED_VARIABLE = "FLUEPRINT_SEED"


def pytest_addoption(parser: pytest.Parser) -> None:
    """Add the option that brings in everything marked long."""
    parser.addoption("--long", action="store_true", help="run the long tests too, and every case")


def pytest_configure(config: pytest.Config) -> None:
    """Settle the rotation's seed once, before worker processes inherit it."""
    del config
    os.environ.setdefault(SEED_VARIABLE, datetime.now(UTC).strftime("%Y%m%d"))


def pytest_report_header(config: pytest.Config) -> str:
    """Tell how to repeat this very run."""
    share = "every case" if config.getoption("--long") else "a share of the long cases"
    return f"rotation: {SEED_VARIABLE}={os.environ[SEED_VARIABLE]} ({share})"


def pytest_collection_modifyitems(config: pytest.Config, items: list[pytest.Item]) -> None:
    """Skip what is marked long, unless it was asked for."""
    if config.getoption("--long"):
        return
    for item in items:
        if item.get_closest_marker("long"):
            item.add_marker(pytest.mark.skip(reason="long: ./start test --long"))


@pytest.fixture
def rotation(request: pytest.FixtureRequest) -> Callable[[Sequence[Case], int], list[Case]]:
    """`rotation(cases, count)`: today's draw of so many cases; all of them with --long."""
    seed = f"{os.environ[SEED_VARIABLE]} {request.node.nodeid}"
    draw = random.Random(seed)  # noqa: S311 - a draw of test cases, not a secret
    whole = request.config.getoption("--long")

    def drawn(cases: Sequence[Case], count: int) -> list[Case]:
        return list(cases) if whole else draw.sample(list(cases), min(count, len(cases)))

    return drawn
