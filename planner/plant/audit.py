"""The first-law audit of a data sheet: fuel less power, exhaust and losses, over fuel (LHV)."""

from load_profiles import Fault, Finding
from planner.errors import StudyError
from planner.plant.fuel import GasFuel
from planner.plant.turbine import GasTurbine, calibrate

#: Residuals within which a sheet is taken as it is, and beyond which it is refused.
USUAL_FRAC = (0.0, 0.02)
POSSIBLE_FRAC = (-0.03, 0.05)

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
    turned = calibrate(sheet.model_copy(update={"efficiency_basis": other}), fuel)
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
        One where the residual is outside 0 to +2 % of fuel.
    """
    residual = turbine.audit_residual_frac
    low, high = USUAL_FRAC
    if low <= residual <= high:
        return ()
    accepted = turbine.sheet.audit_accepted_because
    return (
        Finding(
            where=f"{option}, data sheet",
            what=f"the first-law audit leaves {residual:+.1%} of fuel (LHV), outside 0 to +2 %",
            effect="exhaust heat is uncertain by about as much of the fuel",
            advice=accepted or "Ask the maker which of the sheet's numbers are guaranteed.",
            severity="attention",
        ),
    )
