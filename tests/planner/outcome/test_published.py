"""Published values: complete, in known units, and traceable to a reference."""

import pytest

from planner.data.published import published_rows
from planner.outcome.efficiency import TESTS_FILE
from planner.outcome.nox_limits import KW_PER_SIZE_UNIT, LIMITS_FILE, nox_limit
from tests.planner.market.small_study import small_study

CONFIDENCE = {"read in the source", "read in a secondary source", "from memory"}


@pytest.mark.parametrize("file", [LIMITS_FILE, TESTS_FILE])
def test_every_row_names_its_source(file: str) -> None:
    """Source, place in it, edition, and how well the value is known; the source is spelled out."""
    references = published_rows("references.csv")

    for row in published_rows(file).values():
        assert row["source"] in references
        assert row["locator"]
        assert row["edition"]
        assert row["confidence"] in CONFIDENCE


def test_limits_are_in_known_units() -> None:
    """Milligrams or parts per million at 15 % oxygen, and sizes that can be compared."""
    for row in published_rows(LIMITS_FILE).values():
        assert row["unit"].split()[0] in {"mg/Nm3", "ppmvd"}
        assert "15 % O2" in row["unit"]
        assert row["size_unit"] in KW_PER_SIZE_UNIT


@pytest.mark.parametrize(
    ("regime", "limit_mg_per_Nm3", "above_load_frac"),
    [
        ("eu_lcp_new_turbine_gas", 50.0, 0.70),
        ("eu_mcp_new_turbine_gas", 50.0, 0.70),
        ("us_kkkk_upto_50_gas", 86.2, 0.75),
        ("us_kkkk_50_to_850_gas", 51.3, 0.75),
    ],
)
def test_limits_of_the_regimes(
    regime: str, limit_mg_per_Nm3: float, above_load_frac: float
) -> None:
    """Directive 2010/75/EU, annex V, part 2, point 6; 42 ppm = 86.2; others *from memory*."""
    limit = nox_limit(small_study(emissions={"nox_regime": regime}))

    assert limit.mg_per_Nm3 == pytest.approx(limit_mg_per_Nm3, abs=0.05)
    assert limit.above_load_frac == above_load_frac
