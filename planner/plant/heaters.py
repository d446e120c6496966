"""Boilers, burners and chillers of the site as the dispatch sees them."""

from planner.plant.envelope import ChillerEnvelope, HeaterEnvelope
from planner.plant.fuel import GasFuel
from planner.study.sections import AbsorptionChiller, Chiller, Heater


def heater_envelope(heater: Heater, fuel: GasFuel) -> HeaterEnvelope:
    r"""A heater with its standing loss apart, so that its efficiency falls at part load.

    .. math:: F = F_0 + b Q, \quad F_0 = \frac{\sigma Q_{max}}{\eta}, \quad
              b = \frac{1 - \sigma}{\eta}

    so that at full load :math:`Q / F` is the stated efficiency :math:`\eta` (LHV) and the standing
    loss :math:`\sigma` is burnt in every hour in which the heater is kept hot.

    Parameters
    ----------
    heater : Heater
        As stated.
    fuel : GasFuel
        Turns an efficiency on HHV into one on LHV.

    Returns
    -------
    HeaterEnvelope
        Standing and further fuel.
    """
    basis = 1.0 if heater.efficiency_basis == "LHV" else fuel.hhv_over_lhv
    efficiency_lhv = heater.efficiency_frac * basis
    lost = heater.standing_loss_frac
    return HeaterEnvelope(
        name=heater.name,
        carrier=heater.serves,
        maximum_heat_kW=heater.capacity_kW,
        fuel_per_heat_lhv=(1.0 - lost) / efficiency_lhv,
        standing_fuel_lhv_kW=lost * heater.capacity_kW / efficiency_lhv,
    )


def chiller_envelopes(
    electric: Chiller | None, driven: AbsorptionChiller | None
) -> tuple[ChillerEnvelope, ...]:
    """Chillers of the site, today's first.

    Parameters
    ----------
    electric : Chiller or None
        Today's.
    driven : AbsorptionChiller or None
        The option's.

    Returns
    -------
    tuple of ChillerEnvelope
        Electric before heat-driven.
    """
    chillers = []
    if electric is not None:
        chillers.append(
            ChillerEnvelope("Electric chillers", "power", electric.capacity_kW, electric.cop)
        )
    if driven is not None:
        chillers.append(
            ChillerEnvelope("Absorption chiller", driven.drive, driven.capacity_kW, driven.cop)
        )
    return tuple(chillers)
