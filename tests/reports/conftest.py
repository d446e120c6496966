"""Invented results folders and their report, made once for all tests of this room."""

from pathlib import Path

import pytest

from reports.pdf import write_report
from tests.reports.invented_results import write_invented


@pytest.fixture(scope="session")
def hospital_folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Two options of which one is advised; steam, hot water, a store."""
    folder = tmp_path_factory.mktemp("hospital") / "results"
    write_invented(folder)
    return folder


@pytest.fixture(scope="session")
def factory_folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Two options too dear to pay; drying heat and steam."""
    folder = tmp_path_factory.mktemp("factory") / "results"
    write_invented(folder, hot_gas=True, capital_factor=1.8)
    return folder


@pytest.fixture(scope="session")
def hospital_pdf(hospital_folder: Path) -> Path:
    """The report of the hospital."""
    return write_report(hospital_folder)
