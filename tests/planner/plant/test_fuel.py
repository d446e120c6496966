"""Gases by composition: what dilution does, and what is refused."""

import pytest

from planner.errors import StudyError
from planner.plant.fuel import GasFuel


def test_inert_gas_dilutes() -> None:
    """A tenth of nitrogen takes a tenth of the molar value and changes neither carbon nor ratio."""
    pure = GasFuel.from_composition("Methane", {"methane": 1.0})
    lean = GasFuel.from_composition("Lean gas", {"methane": 0.9, "nitrogen": 0.1})

    assert lean.lhv_kJ_per_mol == pytest.approx(0.9 * pure.lhv_kJ_per_mol, rel=1e-12)
    assert lean.co2_kg_per_lhv_kWh == pytest.approx(pure.co2_kg_per_lhv_kWh, rel=1e-12)
    assert lean.hhv_over_lhv == pytest.approx(pure.hhv_over_lhv, rel=1e-12)


def test_carbon_dioxide_of_biogas_is_emitted_too() -> None:
    """Raw biogas of 60 % methane brings two thirds as much CO2 again as it makes: by hand 5 / 3."""
    pure = GasFuel.from_composition("Methane", {"methane": 1.0})
    biogas = GasFuel.from_composition("Biogas", {"methane": 0.6, "carbon_dioxide": 0.4})

    assert biogas.co2_kg_per_lhv_kWh == pytest.approx(pure.co2_kg_per_lhv_kWh * 5 / 3, rel=1e-12)


def test_unknown_components_and_sum_together() -> None:
    """All faults at once: each unknown name with the nearest known one, and the sum."""
    with pytest.raises(StudyError) as refusal:
        GasFuel.from_composition("Gas", {"methan": 0.5, "helium": 0.2, "methane": 0.2})

    faults = {fault.path: fault for fault in refusal.value.faults}
    assert "`methane`" in faults["fuel.composition_mol_frac.methan"].must
    assert "fuel.composition_mol_frac.helium" in faults
    assert faults["fuel.composition_mol_frac"].came == "a sum of 0.90000"


@pytest.mark.parametrize("methane", [0.9998, 1.0002, float("nan")])
def test_sum_that_is_not_one(methane: float) -> None:
    """A sum off by more than a ten-thousandth is refused, and so is none at all."""
    with pytest.raises(StudyError, match="must add up to 1"):
        GasFuel.from_composition("Gas", {"methane": methane})


def test_small_rounding_of_a_sum_is_scaled_away() -> None:
    """A certificate rounded to the fifth digit is taken, scaled to one."""
    gas = GasFuel.from_composition("Gas", {"methane": 0.95, "nitrogen": 0.05005})

    assert sum(gas.composition_mol_frac.values()) == pytest.approx(1.0, rel=1e-12)
