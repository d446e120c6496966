"""Air pressure at the site's altitude."""

#: Sea-level pressure of the standard atmosphere [kPa]. ICAO Doc 7488.
SEA_LEVEL_PRESSURE_kPa = 101.325

#: Temperature lapse over sea-level temperature, 0.0065 K/m / 288.15 K. ICAO Doc 7488.
_LAPSE_PER_m = 2.25577e-5

#: Gravity over gas constant and lapse rate, 9.80665 / (287.053 x 0.0065). ICAO Doc 7488.
_EXPONENT = 5.25588


def standard_pressure_kPa(altitude_m: float) -> float:
    """Pressure of the standard atmosphere below the tropopause.

    Parameters
    ----------
    altitude_m : float [m]
        Geopotential altitude above mean sea level, below 11 000.

    Returns
    -------
    float [kPa]
        Static pressure.

    Notes
    -----
    Weather moves the true pressure by about ±3 % around it.

    References
    ----------
    ICAO Doc 7488, Manual of the ICAO Standard Atmosphere, troposphere.

    Examples
    --------
    >>> print(f"{standard_pressure_kPa(1000.0):.2f} kPa")
    89.87 kPa
    """
    return SEA_LEVEL_PRESSURE_kPa * float((1.0 - _LAPSE_PER_m * altitude_m) ** _EXPONENT)
