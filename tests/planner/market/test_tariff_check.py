"""Faults of power tariffs."""

from typing import Any

from planner.market import check_tariff, tariff_findings
from planner.study.sections import PowerTariff

DAY = {"name": "Day", "from_hour": 6, "to_hour": 22, "price_per_kWh": 0.2}
NIGHT = {"name": "Night", "from_hour": 22, "to_hour": 6, "price_per_kWh": 0.1}
WORKDAYS = ("mon", "tue", "wed", "thu", "fri")


def _tariff(*energy: dict[str, Any], **fields: Any) -> PowerTariff:
    """A tariff with the energy charges given."""
    return PowerTariff.model_validate({"energy": energy, "import_limit_kW": 1000.0, **fields})


def test_whole_tariff_has_no_fault() -> None:
    """Day and night together cover every hour once."""
    assert check_tariff(_tariff(DAY, NIGHT)) == ()


def test_gap_is_named_with_months_weekdays_and_hours() -> None:
    """Weekends from 6 to 22 in the summer half are left without a price."""
    winter = {**DAY, "months": (10, 11, 12, 1, 2, 3)}
    summer = {**DAY, "months": (4, 5, 6, 7, 8, 9), "weekdays": WORKDAYS}

    (fault,) = check_tariff(_tariff(winter, summer, NIGHT))

    assert fault.path == "power_tariff.energy"
    assert fault.came == "no price for Apr to Sep, Sat, Sun, 06:00 to 22:00"
    assert "exactly once" in fault.must


def test_overlap_names_both_charges() -> None:
    """A peak from 17 to 20 on January workdays lies on top of the day price."""
    peak = {
        "name": "Peak",
        "months": (1,),
        "weekdays": WORKDAYS,
        "from_hour": 17,
        "to_hour": 20,
        "price_per_kWh": 0.3,
    }

    (fault,) = check_tariff(_tariff(DAY, NIGHT, peak))

    assert fault.path == "power_tariff.energy[3]"
    assert fault.came == "Peak on Jan, Mon to Fri, 17:00 to 20:00"
    assert fault.must == "must not overlap energy[1], Day"


def test_export_above_import_is_refused() -> None:
    """Export at 0.13 beats the night price of 0.10 with a levy of 0.02, not the day's."""
    tariff = _tariff(
        DAY, NIGHT, levy_per_kWh=0.02, export_limit_kW=500.0, export_price_per_kWh=0.13
    )

    (fault,) = check_tariff(tariff)

    assert fault.path == "power_tariff.export_price_per_kWh"
    assert "0.12 of energy[2]" in fault.must


def test_export_price_without_export_is_harmless() -> None:
    """Where export is forbidden its price cannot matter."""
    assert check_tariff(_tariff(DAY, NIGHT, export_price_per_kWh=0.9)) == ()


def test_empty_months_are_refused() -> None:
    """A demand charge in no month would never be billed."""
    demand = ({"name": "Peak demand", "months": (), "rate_per_kW_month": 8.0},)

    (fault,) = check_tariff(_tariff(DAY, NIGHT, demand=demand))

    assert fault.path == "power_tariff.demand[1].months"


def test_all_faults_come_together() -> None:
    """A gap, an overlap and an export price are reported at once."""
    doubled = {**DAY, "from_hour": 20, "to_hour": 23}
    tariff = _tariff(DAY, doubled, export_limit_kW=1.0, export_price_per_kWh=0.25)

    faults = check_tariff(tariff)

    assert [fault.path for fault in faults] == [
        "power_tariff.energy",
        "power_tariff.energy[2]",
        "power_tariff.export_price_per_kWh",
        "power_tariff.export_price_per_kWh",
    ]


def test_interval_longer_than_a_step_is_a_finding() -> None:
    """An hour's demand metered on quarter-hour steps is billed a little too high: said so."""
    demand = ({"name": "Demand", "rate_per_kW_month": 8.0, "interval_minutes": 60},)
    tariff = _tariff(DAY, NIGHT, demand=demand)

    assert len(tariff_findings(tariff, 0.25)) == 1
    assert tariff_findings(tariff, 1.0) == ()
