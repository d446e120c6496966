"""The first-law audit of a data sheet: fuel less power, exhaust and losses, over fuel (LHV)."""

from collections.abc import Iterator

from load_profiles import Fault, Finding
from planner.errors import StudyError
from planner.plant.fuel import GasFuel
from planner.plant.turbine import GasTurbine, calibrate

#: Residuals within which a sheet is taken as it is, and beyond which it is refused.
USUAL_FRAC = (0.0, 0.02)
POSSIBLE_FRAC = (-0.03, 0.05)

#: Polytropic efficiencies of machines on the market: common practice, 0.84 to 0.89.
USUAL_POLYTROPIC = (0.80, 0.92)

#: A basis is named as the cause where taking it the other way brings the residual within this.
NAMED_WITHIN_FRAC = 0.01


def refuse_impossible_sheet(turbine: GasTurbine, fuel: GasFuel, path: str) -> None:
    """Refuse a sheet whose numbers cannot be true together.

    Parameters
    ----------
    turbine : GasTurbine
        Calibrated.
    fuel : GasFuel
        For the other calorific value.
    path : str
        Place of the sheet in the study file.

    Raises
    ------
    StudyError
        Outside -3 to +5 % of fuel, unless the study gives its reason.
    """
    residual = turbine.audit_residual_frac
    low, high = POSSIBLE_FRAC
    if low <= residual <= high or turbine.sheet.audit_accepted_because:
        return
    came = f"a first-law residual of {residual:+.1%} of fuel (LHV)"
    must = (
        f"power, efficiency, exhaust flow and exhaust temperature cannot be true together; "
        f"{_cause(turbine, fuel)}; mend the sheet, or give audit_accepted_because"
    )
    raise StudyError((Fault(path, came, must),))


def _cause(turbine: GasTurbine, fuel: GasFuel) -> str:
    """A calorific value taken for the other, where that explains the residual."""
    sheet = turbine.sheet
    other = "HHV" if sheet.efficiency_basis == "LHV" else "LHV"
    try:
        turned = calibrate(sheet.model_copy(update={"efficiency_basis": other}), fuel)
    except StudyError:
        return "the cause is unexplained"
    if abs(turned.audit_residual_frac) <= NAMED_WITHIN_FRAC:
        return (
            f"the efficiency is {other}, not {sheet.efficiency_basis}: with {other} the residual "
            f"is {turned.audit_residual_frac:+.1%}"
        )
    return "the cause is unexplained"


def audit_findings(turbine: GasTurbine, option: str) -> tuple[Finding, ...]:
    """What the audit tells a reader.

    Parameters
    ----------
    turbine : GasTurbine
        Calibrated.
    option : str
        Name of the option.

    Returns
    -------
    tuple of Finding
        One where the residual is outside 0 to +2 % of fuel, one where the cycle takes an unusual
        polytropic efficiency.
    """
    return (*_about_residual(turbine, option), *_about_cycle(turbine, option))


def _about_residual(turbine: GasTurbine, option: str) -> Iterator[Finding]:
    """Fuel less power, exhaust and losses is unusual."""
    residual = turbine.audit_residual_frac
    low, high = USUAL_FRAC
    if low <= residual <= high:
        return
    accepted = turbine.sheet.audit_accepted_because
    yield Finding(
        where=f"{option}, data sheet",
        what=f"the first-law audit leaves {residual:+.1%} of fuel (LHV), outside 0 to +2 %",
        effect="exhaust heat is uncertain by about as much of the fuel",
        advice=accepted or "Ask the maker which of the sheet's numbers are guaranteed.",
        severity="attention",
    )


def _about_cycle(turbine: GasTurbine, option: str) -> Iterator[Finding]:
    """The first law does not see the pressure ratio; the polytropic efficiency does."""
    low, high = USUAL_POLYTROPIC
    if low <= turbine.polytropic_efficiency <= high:
        return
    yield Finding(
        where=f"{option}, data sheet",
        what=f"compressor and turbine would need a polytropic efficiency of "
        f"{turbine.polytropic_efficiency:.2f}, outside {low:.2f} to {high:.2f}",
        effect="behaviour away from the sheet's condition is uncertain",
        advice="Check the pressure ratio, and that the machine has no recuperator.",
        severity="attention",
    )
