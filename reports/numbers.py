"""Numbers as the report prints them; the one place where anything is rounded."""

import math

#: Narrow no-break space: between thousands, and between a number and its unit.
THIN = "\u202f"
MINUS = "\u2212"

NEVER = "never"
MILLION = 1e6
THOUSAND = 1e3
GWH_FROM_KWH = 1e6
MWH_FROM_KWH = 1e3
MW_FROM_KW = 1e3


def number(value: float, decimals: int = 0) -> str:
    """A number with its thousands apart.

    Parameters
    ----------
    value : float
        Any finite number.
    decimals : int
        Places after the point.

    Returns
    -------
    str
        With a true minus; zero has none.

    Examples
    --------
    >>> number(-1234567.8).replace(THIN, " ").replace(MINUS, "-")
    '-1 234 568'
    >>> number(-0.04, 1)
    '0.0'
    """
    text = f"{abs(value):,.{decimals}f}".replace(",", THIN)
    is_zero = not any(digit in text for digit in "123456789")
    return text if is_zero or value >= 0 else MINUS + text


def signed(value: float, decimals: int = 0) -> str:
    """A number that always shows its sign, save zero."""
    text = number(value, decimals)
    is_zero = not any(digit in text for digit in "123456789")
    return text if value < 0 or is_zero else f"+{text}"


def significant(value: float, digits: int = 3) -> str:
    """A number to so many significant digits.

    Parameters
    ----------
    value : float
        Any finite number.
    digits : int
        Digits that count.

    Returns
    -------
    str
        Never in powers of ten.

    Examples
    --------
    >>> significant(0.025534), significant(6.1849), significant(98765.4).replace(THIN, " ")
    ('0.0255', '6.18', '98 800')
    """
    if value == 0.0:
        return "0"
    rounded = float(f"{value:.{digits - 1}e}")
    place = math.floor(math.log10(abs(rounded)))
    return number(rounded, max(digits - 1 - place, 0))


def percent(fraction: float, decimals: int = 0) -> str:
    """A share of one in hundredths."""
    return f"{number(fraction * 100.0, decimals)}{THIN}%"


def signed_percent(fraction: float, decimals: int = 0) -> str:
    """A change as a share of one, in hundredths and with its sign."""
    return f"{signed(fraction * 100.0, decimals)}{THIN}%"


def small_percent(fraction: float) -> str:
    """A share that may be very small: no digits are shown that are not there."""
    hundredths = fraction * 100.0
    if abs(hundredths) < 0.005:  # noqa: PLR2004 - half of the last place printed
        return f"below{THIN}0.01{THIN}%"
    return f"{number(hundredths, 2)}{THIN}%"


def money_parts(amount: float, currency: str) -> tuple[str, str]:
    """An amount and its unit, for large print.

    Parameters
    ----------
    amount : float [currency]
        Any amount.
    currency : str
        As the study calls it.

    Returns
    -------
    tuple of str and str
        Millions from a million on, thousands below.

    Examples
    --------
    >>> money_parts(6_184_900.0, "EUR")
    ('6.18', 'EUR\u202fm')
    """
    if abs(amount) >= 0.9995 * MILLION:
        return significant(amount / MILLION), f"{currency}{THIN}m"
    if abs(amount) >= 10.0 * THOUSAND:
        return number(float(f"{amount:.2e}")), currency
    return number(amount), currency


def money(amount: float, currency: str) -> str:
    """An amount to three significant digits, currency first.

    Examples
    --------
    >>> money(-938_400.0, "EUR").replace(THIN, " ").replace(MINUS, "-")
    'EUR -938 000'
    """
    value, unit = money_parts(amount, currency)
    name, _, million = unit.partition(THIN)
    return f"{name}{THIN}{value}{THIN}{million}" if million else f"{name}{THIN}{value}"


def money_scale(largest: float) -> tuple[float, str]:
    """Divisor and word for an axis of money that reaches so far."""
    return (MILLION, "m") if abs(largest) >= MILLION else (THOUSAND, "thousand")


def energy(amount_kWh: float) -> str:
    """An energy in GWh or MWh."""
    if abs(amount_kWh) >= GWH_FROM_KWH:
        return f"{significant(amount_kWh / GWH_FROM_KWH)}{THIN}GWh"
    return f"{significant(amount_kWh / MWH_FROM_KWH)}{THIN}MWh"


def power(amount_kW: float) -> str:
    """A power in MW or kW."""
    if abs(amount_kW) >= MW_FROM_KW:
        return f"{significant(amount_kW / MW_FROM_KW, 2)}{THIN}MW"
    return f"{significant(amount_kW, 2)}{THIN}kW"


def unit_price(price_per_kWh: float, currency: str) -> str:
    """A price of energy, by the MWh, as people compare them."""
    return f"{currency}{THIN}{number(price_per_kWh * MWH_FROM_KWH, 1)} per MWh"


def years(value: float | None, life_years: int) -> str:
    """A payback in words; one that lies beyond the plan's life is none."""
    if value is None or value > life_years:
        return f"not within {life_years} years"
    return f"{number(value, 1)} years"


def count(value: float, singular: str, plural: str | None = None) -> str:
    """A number of things, in the right form."""
    word = singular if value == 1 else (plural or f"{singular}s")
    return f"{number(value)} {word}"
