"""How the figures were made: equations, meanings, tariffs, proof."""

from typing import Any

from reports.figures import Figures
from reports.numbers import money, number, percent, signed_percent, small_percent, unit_price
from reports.results_folder import ResultsFolder
from reports.wording import has_store, printed


def method(results: ResultsFolder, _figures: Figures) -> dict[str, Any]:
    """Values that stand in the method's text."""
    heading, tariffs = results.heading, results.facts["tariffs"]
    option, currency = results.subject, results.currency
    proof, today = option["proof"], results.facts["separate_supply"]["proof"]
    return {
        "rate": percent(heading["discount_rate_real_frac"], 1),
        "life": heading["life_years"],
        "price_year": heading["price_year"],
        "first_year": heading["first_operating_year"],
        "step": f"{results.step_h:g}",
        "power_lines": [printed(line) for line in tariffs["power_lines"]],
        "gas_lines": [printed(line) for line in tariffs["gas_lines"]],
        "gas": f"{tariffs['fuel_name']}, LHV {number(tariffs['lhv_MJ_per_kg'], 2)} MJ/kg, "
        f"HHV/LHV {number(tariffs['hhv_over_lhv'], 4)}; all in "
        f"{unit_price(tariffs['all_in_gas_per_lhv_kWh'], currency)} (LHV) on average, "
        f"power {unit_price(tariffs['mean_import_per_kWh'], currency)}",
        "proof": [
            (
                name,
                money(p["cost_per_year"], currency),
                money(p["lower_bound_per_year"], currency),
                small_percent(p["gap_frac"]),
            )
            for name, p in (("Today", today), (option["name"], proof))
        ],
        "paths": [
            f"{name}: {p['path']}." for name, p in (("Today", today), (option["name"], proof))
        ],
        "fit": f"fuel {signed_percent(proof['fit_fuel_frac'], 2)}, heat "
        f"{signed_percent(proof['fit_heat_frac'], 2)}, "
        f"cost {money(proof['fit_money'], currency)} a year",
        "has_store": has_store(option),
        "has_hot_gas": any(
            line["carrier"] == "hot_gas" for line in results.facts["demand"]["carriers"]
        ),
        "test": option["efficiency"]["test"],
    }
