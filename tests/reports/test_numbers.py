"""Numbers as printed: rounding, signs, units."""

import pytest

from reports.numbers import (
    MINUS,
    THIN,
    energy,
    money,
    money_parts,
    number,
    percent,
    power,
    signed,
    signed_percent,
    significant,
    small_percent,
    unit_price,
    years,
)


@pytest.mark.parametrize(
    ("value", "decimals", "printed"),
    [
        (0.0, 0, "0"),
        (-0.4, 0, "0"),
        (-0.6, 0, f"{MINUS}1"),
        (999.5, 0, f"1{THIN}000"),
        (1234567.0, 0, f"1{THIN}234{THIN}567"),
        (-12.345, 2, f"{MINUS}12.35"),
        (1e9, 0, f"1{THIN}000{THIN}000{THIN}000"),
    ],
)
def test_number(value: float, decimals: int, printed: str) -> None:
    """Thousands stand apart by a narrow no-break space, zero never carries a sign."""
    assert number(value, decimals) == printed


@pytest.mark.parametrize(
    ("value", "printed"),
    [
        (0.0, "0"),
        (0.00012345, "0.000123"),
        (9.996, "10.0"),
        (99.96, "100"),
        (98765.4, f"98{THIN}800"),
        (-6.185, f"{MINUS}6.18"),
    ],
)
def test_significant_digits(value: float, printed: str) -> None:
    """Three digits count, also where rounding adds a place."""
    assert significant(value) == printed


def test_money_changes_unit_at_a_million() -> None:
    """Just below a million rounds into millions, never to 1 000 000."""
    assert money(999_400.0, "EUR") == f"EUR{THIN}999{THIN}000"
    assert money(999_900.0, "EUR") == f"EUR{THIN}1.00{THIN}m"
    assert money(-1_234_567.0, "£") == f"£{THIN}{MINUS}1.23{THIN}m"
    assert money(0.0, "EUR") == f"EUR{THIN}0"
    assert money_parts(-8_250.4, "GBP") == (f"{MINUS}8{THIN}250", "GBP")


def test_shares() -> None:
    """Percent signs stand off by a narrow no-break space; changes show their sign."""
    assert percent(0.1234, 1) == f"12.3{THIN}%"
    assert signed_percent(0.2) == f"+20{THIN}%"
    assert signed_percent(-0.03) == f"{MINUS}3{THIN}%"
    assert signed(0.2) == "0"
    assert small_percent(0.00001) == f"below{THIN}0.01{THIN}%"
    assert small_percent(0.00123) == f"0.12{THIN}%"


def test_units_follow_size() -> None:
    """Power and energy take the unit that keeps the number short; prices are by the MWh."""
    assert power(999.0) == f"1{THIN}000{THIN}kW"
    assert power(4_230.0) == f"4.2{THIN}MW"
    assert energy(748_000.0) == f"748{THIN}MWh"
    assert energy(25_551_000.0) == f"25.6{THIN}GWh"
    assert unit_price(0.0255, "EUR") == f"EUR{THIN}25.5 per MWh"


def test_payback_beyond_the_plan_is_none() -> None:
    """A payback that the plan's life does not reach is not printed as a number."""
    assert years(None, 20) == "not within 20 years"
    assert years(20.4, 20) == "not within 20 years"
    assert years(6.84, 20) == "6.8 years"
