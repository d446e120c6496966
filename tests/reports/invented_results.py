"""Invented results folders of a whole year, consistent in themselves and with no engine behind.

A plain rule stands in for the planner: the unit runs on weekdays at what the site can take. The
numbers need only agree with each other, so that a report made from them can be checked.
"""

import json
from pathlib import Path
from typing import Any

import numpy as np
import pandas as pd

from planner.results.hourly_columns import HOURLY_COLUMNS
from planner.results.records import Results

HOURS = 8760
HHV_OVER_LHV = 1.107
CO2_KG_PER_LHV_KWH = 0.2021
POWER_PRICE, LEVY, PEAK_RATE, EXPORT_PRICE = 0.141, 0.02, 9.1, 0.042
GAS_HHV, CARBON_PER_T = 0.0325, 45.0
RATE, LIFE, FIRST_YEAR = 0.065, 20, 2028
GRADES = ("steam", "hot_water", "hot_gas")
Facts = dict[str, Any]


def write_invented(
    folder: Path,
    *,
    names: tuple[str, ...] = ("4.0 MW turbine with store", "2.4 MW turbine"),
    hot_gas: bool = False,
    capital_factor: float = 1.0,
) -> Facts:
    """Write a results folder and answer its records as they stand in `results.json`."""
    folder.mkdir(parents=True, exist_ok=True)
    site = _site(hot_gas=hot_gas)
    separate = _with_plant(site, 0.0)
    frames = {"separate": separate}
    options = []
    for place, name in enumerate(names, start=1):
        key = f"option_{place}"
        frame = _with_plant(site, 4000.0 / place**0.74)
        frames[key] = frame
        options.append(_option(key, name, frame, separate, capital_factor * (0.9 + 0.35 * place)))
    facts = _results(site, separate, options)
    Results.model_validate(facts)
    rewrite(folder, facts)
    for key, frame in frames.items():
        frame[list(HOURLY_COLUMNS)].round(3).to_csv(folder / f"hourly_{key}.csv", index=False)
    rows = [{"option": o["key"], **v} for o in options for v in o["variants"]]
    pd.DataFrame(rows).to_csv(folder / "variants.csv", index=False)
    (folder / "study.toml").write_text("format = 1\n", encoding="utf-8")
    return facts


def rewrite(folder: Path, facts: Facts) -> None:
    """Write `results.json` anew, for a case that differs in a few records."""
    (folder / "results.json").write_text(json.dumps(facts), encoding="utf-8")


def _site(*, hot_gas: bool) -> pd.DataFrame:
    """Demands and weather of an invented year."""
    rng = np.random.default_rng(7)
    utc = pd.date_range("2024-12-31 23:00", periods=HOURS, freq="h", tz="UTC")
    local = utc.tz_convert("Europe/Vienna")
    hour, day = np.arange(HOURS) % 24, np.arange(HOURS) // 24
    season = np.cos(2 * np.pi * (day - 15) / 365)
    slow = np.repeat(rng.normal(0, 3, 365).cumsum() * 0.12, 24)
    slow -= slow.mean()
    ambient = 9.5 - 11 * season + 4 * np.sin(2 * np.pi * (hour - 9) / 24) + slow
    working = (local.day_of_week < 5).astype(float)
    awake = 0.5 + 0.5 * np.clip(np.sin(np.pi * (hour - 5) / 16), 0, 1)
    noise = rng.normal(1, 0.03, HOURS)
    frame = pd.DataFrame(0.0, index=range(HOURS), columns=list(HOURLY_COLUMNS))
    frame["utc_start"] = [stamp.isoformat() for stamp in utc]
    frame["local_start"] = [stamp.isoformat() for stamp in local]
    frame["ambient_degC"] = ambient
    frame["cooling_demand_kW"] = 250 * np.clip(ambient - 16, 0, None) * (0.4 + 0.6 * awake)
    frame["power_demand_kW"] = (2600 + 2400 * awake * (0.55 + 0.45 * working)) * noise
    frame["steam_demand_kW"] = (1300 + 1500 * awake * (0.4 + 0.6 * working)) * noise
    if hot_gas:
        frame["hot_gas_demand_kW"] = 5200 * working * (hour >= 6) * (hour < 22) * noise
    else:
        frame["hot_water_demand_kW"] = (900 + 420 * np.clip(17 - ambient, 0, None)) * noise
    frame["price_import_per_kWh"] = POWER_PRICE + LEVY
    return frame


def _with_plant(site: pd.DataFrame, size_kW: float) -> pd.DataFrame:
    """The year with a unit of this size on a plain rule; none where the size is zero."""
    frame = site.copy()
    day = np.arange(HOURS) // 24
    in_service = ~(((day >= 138) & (day < 147)) | ((day >= 264) & (day < 268)))
    maximum = size_kW * (1 - 0.0075 * (frame["ambient_degC"] - 15)) * in_service
    wanted = np.minimum(frame["power_demand_kW"] + 300, maximum)
    on = (wanted >= 0.6 * size_kW) & in_service & (size_kW > 0)
    on &= frame["local_start"].str.slice(11, 13).astype(int).between(5, 22)
    power = np.where(on, wanted, 0.0)
    load = np.divide(power, maximum, out=np.zeros(HOURS), where=maximum.to_numpy() > 0)
    frame["unit_on"], frame["unit_maximum_kW"], frame["unit_power_kW"] = (
        on.astype(int),
        maximum,
        power,
    )
    frame["unit_start"] = (on & ~np.r_[False, on.to_numpy()[:-1]]).astype(int)
    efficiency = 0.295 * (0.72 + 0.28 * load)
    frame["unit_fuel_lhv_kW"] = np.where(on, power / efficiency, 0.0)
    frame["start_fuel_lhv_kW"] = 800.0 * frame["unit_start"]
    heat = 0.5 * frame["unit_fuel_lhv_kW"]
    offered = {
        "hot_gas": 0.5 if site["hot_gas_demand_kW"].any() else 0.0,
        "steam": 0.42,
        "hot_water": 0.0,
    }
    offered["hot_water"] = 0.0 if offered["hot_gas"] else 1.0 - offered["steam"]
    heater_fuel = pd.Series(0.0, index=frame.index)
    for grade in GRADES:
        frame[f"unit_{grade}_kW"] = heat * offered[grade]
        frame[f"dumped_{grade}_kW"] = np.clip(
            frame[f"unit_{grade}_kW"] - frame[f"{grade}_demand_kW"], 0, None
        )
        used = frame[f"unit_{grade}_kW"] - frame[f"dumped_{grade}_kW"]
        frame[f"heater_{grade}_kW"] = frame[f"{grade}_demand_kW"] - used
        heater_fuel += frame[f"heater_{grade}_kW"] / 0.93
    if size_kW > 3000 and not offered["hot_gas"]:
        _add_store(frame)
        heater_fuel = sum(frame[f"heater_{grade}_kW"] for grade in GRADES) / 0.93
    frame["heater_fuel_lhv_kW"] = heater_fuel
    frame["electric_cooling_kW"] = frame["cooling_demand_kW"]
    frame["chiller_power_kW"] = frame["cooling_demand_kW"] / 4
    net = frame["power_demand_kW"] - power
    frame["grid_import_kW"], frame["grid_export_kW"] = np.clip(net, 0, None), np.clip(-net, 0, None)
    frame["nox_g_per_s"] = frame["unit_fuel_lhv_kW"] * 25e-3 / 3600
    return frame


def _add_store(frame: pd.DataFrame) -> None:
    """Surplus hot water into a store of 22 MWh, and out again as soon as it is wanted."""
    level, charge, discharge = 0.0, np.zeros(HOURS), np.zeros(HOURS)
    dumped = frame["dumped_hot_water_kW"].to_numpy().copy()
    heater = frame["heater_hot_water_kW"].to_numpy().copy()
    levels = np.zeros(HOURS)
    for step in range(HOURS):
        charge[step] = min(dumped[step], 22000 - level, 4000)
        discharge[step] = min(heater[step], level, 5000) if charge[step] == 0 else 0.0
        level += charge[step] - discharge[step]
        levels[step] = level
    frame["store_charge_kW"], frame["store_discharge_kW"], frame["store_level_kWh"] = (
        charge,
        discharge,
        levels,
    )
    frame["dumped_hot_water_kW"], frame["heater_hot_water_kW"] = dumped - charge, heater - discharge


def _energy(frame: pd.DataFrame) -> Facts:
    """Record `EnergyYear` of a frame."""
    total = frame.select_dtypes("number").sum()
    recovered = {grade: float(total[f"unit_{grade}_kW"]) for grade in GRADES}
    fuel = float(total["unit_fuel_lhv_kW"] + total["start_fuel_lhv_kW"])
    return {
        "power_made_kWh": float(total["unit_power_kW"]),
        "grid_import_kWh": float(total["grid_import_kW"]),
        "grid_export_kWh": float(total["grid_export_kW"]),
        "unit_fuel_lhv_kWh": fuel,
        "start_fuel_lhv_kWh": float(total["start_fuel_lhv_kW"]),
        "heater_fuel_lhv_kWh": float(total["heater_fuel_lhv_kW"]),
        "recovered_kWh": recovered,
        "dumped_kWh": {grade: float(total[f"dumped_{grade}_kW"]) for grade in GRADES},
        "heater_heat_kWh": {grade: float(total[f"heater_{grade}_kW"]) for grade in GRADES},
        "electric_cooling_kWh": float(total["electric_cooling_kW"]),
        "absorption_cooling_kWh": 0.0,
        "store_charged_kWh": float(total["store_charge_kW"]),
        "store_discharged_kWh": float(total["store_discharge_kW"]),
        "exhaust_loss_kWh": fuel - float(total["unit_power_kW"]) - sum(recovered.values()),
    }


def _bill(frame: pd.DataFrame, *, with_unit: bool) -> Facts:
    """Record `Bill` of a frame."""
    month = frame["local_start"].str.slice(5, 7)
    peaks = float(frame["grid_import_kW"].groupby(month).max().sum())
    imported = float(frame["grid_import_kW"].sum())
    gas_lhv = float(
        frame[["unit_fuel_lhv_kW", "start_fuel_lhv_kW", "heater_fuel_lhv_kW"]].to_numpy().sum()
    )
    rows = [
        ("power", "Energy", imported, "kWh", POWER_PRICE),
        ("power", "Levies", imported, "kWh", LEVY),
        ("power", "Monthly peak", peaks, "kW-month", PEAK_RATE),
        ("power", "Standing charge", 12.0, "month", 1450.0),
        ("export", "Export", float(frame["grid_export_kW"].sum()), "kWh", -EXPORT_PRICE),
        ("gas", "Commodity and transport", gas_lhv * HHV_OVER_LHV, "kWh HHV", GAS_HHV),
        ("gas", "Standing charge", 12.0, "month", 980.0),
        (
            "carbon",
            "Carbon price on gas",
            gas_lhv * CO2_KG_PER_LHV_KWH / 1e3,
            "t CO2",
            CARBON_PER_T,
        ),
        ("upkeep", "Upkeep of Boilers", 1.0, "year", 120000.0),
    ]
    if with_unit:
        rows += [
            ("upkeep", "Staff, insurance and inspection", 1.0, "year", 88000.0),
            (
                "upkeep",
                "Maintenance by power made",
                float(frame["unit_power_kW"].sum()) / 1e3,
                "MWh",
                4.6,
            ),
            ("upkeep", "Maintenance by start", float(frame["unit_start"].sum()), "start", 90.0),
            ("upkeep", "Overhaul reserve", float(frame["unit_on"].sum()), "h", 32.0),
        ]
    lines = [
        {"section": s, "line": n, "quantity": q, "quantity_unit": u, "rate": r, "amount": q * r}
        for s, n, q, u, r in rows
    ]
    return {"lines": lines, "total": sum(line["amount"] for line in lines)}


def _section(bill: Facts, *sections: str) -> float:
    """Amount of some sections of a bill."""
    return sum(line["amount"] for line in bill["lines"] if line["section"] in sections)


def _economics(separate: Facts, option: Facts, capital: float) -> Facts:
    """Record `Economics` of two bills and a capital."""
    power = _section(separate, "power", "export") - _section(option, "power", "export")
    gas = _section(separate, "gas") - _section(option, "gas")
    carbon = _section(separate, "carbon") - _section(option, "carbon")
    reserve = -next(
        line["amount"] for line in option["lines"] if line["line"] == "Overhaul reserve"
    )
    upkeep = -88000.0
    maintenance = _section(separate, "upkeep") - _section(option, "upkeep") - reserve - upkeep
    outage = -0.02 * abs(power) * 0.5
    avoided = {2: 340000.0}
    flow, cumulative, discounted_sum = [], 0.0, 0.0
    for year in range(LIFE + 1):
        running = 1.0 if year else 0.0
        parts = {
            "capital": -capital if year == 0 else 0.0,
            "avoided_capital": avoided.get(year, 0.0),
            "power_saving": running * power,
            "gas_saving": running * gas,
            "carbon_saving": running * carbon * 1.02 ** max(year - 1, 0),
            "maintenance": running * maintenance,
            "overhaul_reserve": running * reserve,
            "upkeep": running * upkeep,
            "outage_cost": running * outage,
        }
        net = sum(parts.values())
        discounted = net / (1 + RATE) ** year
        cumulative, discounted_sum = cumulative + net, discounted_sum + discounted
        flow.append(
            {
                "year": year,
                "calendar_year": FIRST_YEAR - 1 + year,
                **parts,
                "net": net,
                "discounted": discounted,
                "cumulative": cumulative,
                "cumulative_discounted": discounted_sum,
            }
        )
    saving = flow[1]["net"]
    back = [y["year"] for y in flow if y["cumulative_discounted"] >= 0]
    lines = [
        ("machine", 0.42),
        ("heat_recovery", 0.15),
        ("electrical_connection", 0.08),
        ("gas_connection_and_compression", 0.08),
        ("building_and_civil", 0.11),
        ("engineering_and_management", 0.08),
        ("contingency", 0.08),
    ]
    return {
        "annual_saving": saving,
        "saving_share_of_bill_frac": saving / separate["total"],
        "expected_outage_cost": -outage,
        "capital": {
            "lines": [{"line": n, "cost": capital * share} for n, share in lines],
            "total": capital,
            "accuracy_frac": 0.2,
            "accuracy_class": "budget estimate",
            "avoided": [{"line": "An electric chiller, year 2", "cost": 340000.0}],
            "avoided_present_value": 340000.0 / (1 + RATE) ** 2,
            "net": capital - 340000.0,
        },
        "npv_real": discounted_sum,
        "irr_real_frac": _irr([y["net"] for y in flow]),
        "simple_payback_years": (capital - 340000.0) / saving if saving > 0 else None,
        "discounted_payback_years": back[0] if back else None,
        "cash_flow": flow,
    }


def _irr(flows: list[float]) -> float | None:
    """Rate at which the flows are worth nothing, by halving."""
    low, high = -0.5, 2.0
    worth = lambda r: sum(f / (1 + r) ** y for y, f in enumerate(flows))  # noqa: E731
    if worth(low) * worth(high) > 0:
        return None
    for _ in range(80):
        middle = (low + high) / 2
        low, high = (middle, high) if worth(middle) > 0 else (low, middle)
    return low


def _option(
    key: str, name: str, frame: pd.DataFrame, separate: pd.DataFrame, factor: float
) -> Facts:
    """Record `OptionOutcome`."""
    energy, bill = _energy(frame), _bill(frame, with_unit=True)
    size = float(frame["unit_maximum_kW"].max())
    money = _economics(_bill(separate, with_unit=False), bill, 1700.0 * size * factor)
    used = {g: energy["recovered_kWh"][g] - energy["dumped_kWh"][g] for g in GRADES}
    overall = (energy["power_made_kWh"] + sum(used.values())) / energy["unit_fuel_lhv_kWh"]
    on = frame["unit_on"] > 0
    cost = bill["total"]
    zero = money["npv_real"] / (0.95 * money["capital"]["total"])  # as the variants' line has it
    return {
        "key": key,
        "name": name,
        "description": "4,000 kW gas turbine; exhaust to steam, hot water; 22 MWh hot-water store",
        "machine": _machine(size),
        "energy": energy,
        "months": _months(frame),
        "bill": bill,
        "running": {
            "run_hours": float(on.sum()),
            "starts": int(frame["unit_start"].sum()),
            "full_load_hours": energy["power_made_kWh"] / (size * 0.9),
            "mean_load_frac": 0.93,
            "power_covered_frac": 1
            - energy["grid_import_kWh"] / float(frame["power_demand_kW"].sum()),
            "heat_covered_frac": sum(used.values())
            / (sum(used.values()) + sum(energy["heater_heat_kWh"].values())),
        },
        "proof": _proof(cost, 0.0009),
        "economics": money,
        "carbon": _carbon(_energy(separate), energy),
        "nox": {
            "guarantee_ppm_15O2": 15.0,
            "guarantee_mg_per_Nm3": 30.8,
            "band_low_mg_per_Nm3": 18.5,
            "band_centre_mg_per_Nm3": 24.9,
            "band_high_mg_per_Nm3": 38.5,
            "limit_mg_per_Nm3": 50.0,
            "regime": "new gas turbine on natural gas, medium combustion plant",
            "regime_source": "Directive (EU) 2015/2193, Annex II, part 2",
            "status": "met",
            "annual_low_kg": 2900.0,
            "annual_centre_kg": 3900.0,
            "annual_high_kg": 5200.0,
            "hours_outside_guarantee": 140.0,
        },
        "efficiency": {
            "electrical_lhv_frac": energy["power_made_kWh"] / energy["unit_fuel_lhv_kWh"],
            "overall_lhv_frac": overall,
            "overall_hhv_frac": overall / HHV_OVER_LHV,
            "primary_energy_saving_frac": 0.118,
            "test": "eu_high_efficiency",
            "required_overall_frac": 0.75,
            "required_saving_frac": 0.10,
            "met": overall >= 0.75,
        },
        "security": _security(frame),
        "variants": _variants(money),
        "break_even": {
            "npv_zero_fuel_price_frac": zero,
            "npv_zero_commodity_per_hhv_kWh": 0.0255 * (1 + zero),
            "saving_zero_fuel_price_frac": 0.84,
            "saving_zero_commodity_per_hhv_kWh": 0.0469,
            "tried_from_frac": -0.8,
            "tried_to_frac": 1.5,
        },
    }


def _proof(cost: float, gap: float) -> Facts:
    """Record `DispatchProof`."""
    return {
        "control": "perfect foresight",
        "path": "months in turn, HiGHS",
        "cost_per_year": cost,
        "lower_bound_per_year": cost * (1 - gap),
        "gap_frac": gap,
        "gap_money": cost * gap,
        "exact_cost_per_year": cost - 1200.0,
        "fit_fuel_frac": -0.0004,
        "fit_heat_frac": 0.0011,
        "fit_money": -1200.0,
    }


def _months(frame: pd.DataFrame) -> list[Facts]:
    """Records `MonthFlows`."""
    month = frame["local_start"].str.slice(5, 7).astype(int)
    total, peak = (
        frame.select_dtypes("number").groupby(month).sum(),
        frame["grid_import_kW"].groupby(month).max(),
    )
    every = lambda kind, row: sum(float(row[kind.format(g)]) for g in GRADES)  # noqa: E731
    return [
        {
            "month": m,
            "power_demand_kWh": float(row["power_demand_kW"]),
            "power_made_kWh": float(row["unit_power_kW"]),
            "grid_import_kWh": float(row["grid_import_kW"]),
            "grid_export_kWh": float(row["grid_export_kW"]),
            "heat_demand_kWh": every("{}_demand_kW", row),
            "recovered_used_kWh": every("unit_{}_kW", row) - every("dumped_{}_kW", row),
            "heater_heat_kWh": every("heater_{}_kW", row),
            "dumped_kWh": every("dumped_{}_kW", row),
            "peak_import_kW": float(peak[m]),
            "run_hours": float(row["unit_on"]),
        }
        for m, row in total.iterrows()
    ]


def _carbon(separate: Facts, option: Facts) -> Facts:
    """Record `Carbon` along a falling path."""
    fuel = lambda e: e["unit_fuel_lhv_kWh"] + e["heater_fuel_lhv_kWh"]  # noqa: E731
    rows = []
    for year in range(FIRST_YEAR, FIRST_YEAR + LIFE):
        grid = float(
            np.interp(year, [2025, 2030, 2035, 2040, 2050], [0.62, 0.50, 0.40, 0.28, 0.12])
        )
        without = (fuel(separate) * CO2_KG_PER_LHV_KWH + separate["grid_import_kWh"] * grid) / 1e3
        with_it = (fuel(option) * CO2_KG_PER_LHV_KWH + option["grid_import_kWh"] * grid) / 1e3
        rows.append(
            {
                "calendar_year": year,
                "grid_kg_per_kWh": grid,
                "separate_t": without,
                "option_t": with_it,
                "saved_t": without - with_it,
            }
        )
    stops = [row["calendar_year"] for row in rows if row["saved_t"] <= 0]
    more, less = (
        fuel(option) - fuel(separate),
        separate["grid_import_kWh"] - option["grid_import_kWh"],
    )
    return {
        "fuel_kg_per_lhv_kWh": CO2_KG_PER_LHV_KWH,
        "fuel_kg_per_hhv_kWh": CO2_KG_PER_LHV_KWH / HHV_OVER_LHV,
        "basis": "average",
        "source": "invented path for this example",
        "export_credit_frac": 0.0,
        "by_year": rows,
        "lifetime_saved_t": sum(row["saved_t"] for row in rows),
        "first_year_saved_t": rows[0]["saved_t"],
        "stops_year": stops[0] if stops else None,
        "break_even_grid_kg_per_kWh": CO2_KG_PER_LHV_KWH * more / less,
    }


def _security(frame: pd.DataFrame) -> list[Facts]:
    """Records `SecurityLine`."""
    rows = []
    for carrier in ("power", "steam", "hot_water", "hot_gas", "cooling"):
        peak = float(frame[f"{carrier}_demand_kW"].max())
        if peak > 0:
            margin = 0.18 * peak
            out = None if carrier in ("power", "cooling") else margin - 0.4 * peak
            rows.append(
                {
                    "carrier": carrier,
                    "peak_kW": peak,
                    "capacity_kW": peak + margin,
                    "margin_kW": margin,
                    "margin_one_heater_out_kW": out,
                    "met": True,
                }
            )
    return rows


def _variants(money: Facts) -> list[Facts]:
    """Records `Variant`: straight lines through the base."""
    moved = [("fuel_price", f, -0.5) for f in (-0.3, -0.2, -0.1, 0.1, 0.2, 0.3)]
    for sign in (-1, 1):
        moved += [
            ("power_price", 0.1 * sign, 1.9),
            ("heat_demand", 0.1 * sign, 0.35),
            ("capital", 0.15 * sign, -1.0),
            ("boiler_efficiency", 0.03 * sign, -0.6),
        ]
    capital = money["capital"]["total"]
    rows = [_variant("as planned", "base", 0.0, money["npv_real"], money)]
    rows += [
        _variant(
            f"{factor.replace('_', ' ')} {step:+.0%}",
            factor,
            step,
            money["npv_real"] + slope * step * capital * (1.9 if factor == "fuel_price" else 1),
            money,
        )
        for factor, step, slope in moved
    ]
    rows.append(
        _variant(
            "combined bad variant", "combined_bad", 0.2, money["npv_real"] - 0.62 * capital, money
        )
    )
    return rows


def _variant(key: str, factor: str, step: float, npv: float, money: Facts) -> Facts:
    """Record `Variant`."""
    yearly = (npv - money["npv_real"]) / 11.0 + money["annual_saving"]
    return {
        "key": key,
        "factor": factor,
        "change_frac": step,
        "annual_saving": yearly,
        "npv_real": npv,
        "irr_real_frac": 0.1,
        "simple_payback_years": money["capital"]["net"] / yearly if yearly > 0 else None,
        "run_hours": 5600.0,
        "gap_frac": 0.0009,
        "status": "solved",
        "note": "",
    }


def _machine(size: float) -> Facts:
    """Record `Machine`."""
    point = lambda label, ambient, load: {  # noqa: E731
        "label": label,
        "ambient_degC": ambient,
        "load_frac": load,
        "net_power_kW": size * 0.88 * load * (1 - 0.0075 * (ambient - 15)),
        "fuel_lhv_kW": size * 0.88 * load / (0.295 * (0.72 + 0.28 * load)),
        "efficiency_lhv_frac": 0.295 * (0.72 + 0.28 * load),
        "exhaust_flow_kg_per_s": size * 0.0038,
        "exhaust_degC": 512.0 - 120.0 * (1 - load),
    }
    loads = [
        (w, t, x)
        for w, t in (("Cold", -10.0), ("ISO", 15.0), ("Hot", 35.0))
        for x in (1.0, 0.75, 0.5)
    ]
    stations = [
        ("Inlet", 15.0, 101.3),
        ("Compressor outlet", 355.0, 1100.0),
        ("Turbine inlet", 1045.0, 1056.0),
        ("Turbine outlet", 512.0, 103.8),
        ("Stack", 118.0, 101.3),
    ]
    return {
        "name": "Gas turbine, 4.0 MW class",
        "generic": True,
        "sheet_power_kW": size * 0.9,
        "sheet_efficiency_lhv_frac": 0.293,
        "sheet_exhaust_flow_kg_per_s": size * 0.0038,
        "sheet_exhaust_degC": 509.0,
        "pressure_ratio": 11.2,
        "audit_residual_frac": 0.012,
        "polytropic_efficiency": 0.868,
        "firing_degC": 1045.0,
        "gas_compressor_kW": 110.0,
        "auxiliary_kW": 60.0,
        "minimum_load_frac": 0.6,
        "stations": [
            {"station": s, "temperature_degC": t, "pressure_kPa": p, "flow_kg_per_s": 17.3}
            for s, t, p in stations
        ],
        "points": [point(f"{w}, {x:.0%}", t, x) for w, t, x in loads],
        "paths": ["steam_then_water", "water_only"],
        "fit_segments": 2,
        "recovery_heat_degC": [(0.0, 509.0), (5400.0, 190.0), (7100.0, 96.0)],
        "recovery_sink_degC": [(0.0, 180.0), (4300.0, 180.0), (5400.0, 105.0), (7100.0, 60.0)],
        "stack_degC": 96.0,
    }


def _carrier(frame: pd.DataFrame, carrier: str) -> Facts:
    """Record `CarrierDemand`."""
    values = frame[f"{carrier}_demand_kW"]
    month = frame["local_start"].str.slice(5, 7).astype(int)
    origin = {"measured": 0.991, "filled": 0.009} if carrier == "power" else {"billed": 1.0}
    return {
        "carrier": carrier,
        "annual_kWh": float(values.sum()),
        "peak_kW": float(values.max()),
        "peak_local_time": frame["local_start"][int(values.argmax())],
        "base_kW": float(values.quantile(0.1)),
        "load_factor_frac": float(values.mean() / values.max()),
        "monthly_kWh": [float(v) for v in values.groupby(month).sum()],
        "origin_frac": origin,
    }


def _results(site: pd.DataFrame, separate: pd.DataFrame, options: list[Facts]) -> Facts:
    """Record `Results`."""
    wanted = [
        c
        for c in ("power", "steam", "hot_water", "hot_gas", "cooling")
        if site[f"{c}_demand_kW"].any()
    ]
    heat = (
        sum(site[f"{grade}_demand_kW"].to_numpy() for grade in GRADES).reshape(365, 24).mean(axis=1)
    )
    best = max(options, key=lambda option: option["economics"]["npv_real"])
    pays = best["economics"]["npv_real"] > 0
    tried = [v for v in best["variants"] if v["factor"] != "base"]
    bill = _bill(separate, with_unit=False)
    return {
        "format": 1,
        "flueprint_version": "0.1.0",
        "made_at_utc": "2026-01-10T09:30:00+00:00",
        "heading": {
            "site": "Invented General Hospital",
            "place": "Nowhere",
            "kind": "hospital",
            "client": "Invented General Hospital, technical services",
            "consultant": "Example consultants",
            "title": "CHP feasibility study",
            "language": "en",
            "currency": "EUR",
            "year": 2025,
            "time_zone": "Europe/Vienna",
            "altitude_m": 340.0,
            "price_year": 2025,
            "first_operating_year": FIRST_YEAR,
            "life_years": LIFE,
            "discount_rate_real_frac": RATE,
        },
        "inputs": [
            {"file": f, "sha256": f"{n:x}" * 64, "bytes": 1000 * n}
            for n, f in enumerate(("study.toml", "weather.csv", "power.csv"), start=1)
        ],
        "defaults": [
            {
                "path": f"option[0].unit.field_{n}",
                "value": str(n),
                "meaning": "An invented field that was left out.",
            }
            for n in range(14)
        ],
        "findings": [
            {
                "stage": "profiles",
                "where": "power.csv rows 1200-1260",
                "what": "61 quarter-hours missing; filled from the same weekdays",
                "effect": "15 MWh, 0.04 % of the year",
                "advice": "",
                "severity": "note",
            },
            {
                "stage": "plant",
                "where": "2.4 MW turbine",
                "what": "the guarantee lies above the limit",
                "effect": "no permit without a lower guarantee",
                "advice": "Ask the maker for 24 ppm.",
                "severity": "serious",
            },
            {
                "stage": "market",
                "where": "power_tariff.demand",
                "what": "hourly steps hide quarter-hour peaks",
                "effect": "excess added month by month",
                "advice": "",
                "severity": "attention",
            },
        ],
        "demand": {
            "step_h": 1.0,
            "carriers": [_carrier(site, carrier) for carrier in wanted],
            "daily_mean_heat_kW": [float(v) for v in heat],
            "within_step_excess_kW": [180.0] * 12,
            "weather": {
                "mean_degC": float(site["ambient_degC"].mean()),
                "minimum_degC": float(site["ambient_degC"].min()),
                "maximum_degC": float(site["ambient_degC"].max()),
                "mean_relative_humidity_frac": 0.74,
                "mean_pressure_kPa": 97.3,
            },
        },
        "tariffs": {
            "power_lines": [
                "Day: 0.153 EUR/kWh, mon tue wed thu fri, 06:00 to 22:00",
                "Levies on import: 0.0215 EUR/kWh",
            ],
            "gas_lines": [
                "Commodity: 0.0255 EUR/kWh HHV",
                "Carbon price: 45 EUR/t CO2 on site fuel",
            ],
            "all_in_gas_per_lhv_kWh": 0.0451,
            "mean_import_per_kWh": 0.149,
            "hhv_over_lhv": HHV_OVER_LHV,
            "fuel_name": "Natural gas",
            "lhv_MJ_per_kg": 48.2,
        },
        "separate_supply": {
            "bill": bill,
            "energy": _energy(separate),
            "months": _months(separate),
            "proof": _proof(bill["total"], 0.00008),
        },
        "options": options,
        "verdict": {
            "recommended": best["key"] if pays else None,
            "best": best["key"],
            "rule": "the option with the highest net present value, if that is above zero",
            "holds_in_variants": sum((v["npv_real"] > 0) == pays for v in tried),
            "variants_tried": len(tried),
        },
        "weeks": {"winter_monday": "2025-01-20", "summer_monday": "2025-07-21"},
    }
