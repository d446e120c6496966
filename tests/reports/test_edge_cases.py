"""Answers that are rare but real: losses, nothing found, one option, many, hostile names."""

import copy
import re
from collections.abc import Callable
from dataclasses import replace
from html import unescape
from pathlib import Path
from typing import Any

import pytest
from pypdf import PdfReader

from reports.numbers import MINUS, THIN
from reports.pdf import make_pdf, report_html
from reports.results_folder import ResultsFolder, read_results

Facts = dict[str, Any]
Spoil = Callable[[Facts], None]

HOSTILE = "<script>alert(1)</script> & \"Größe\" <b>'x'</b> {{ 7*7 }}"


@pytest.fixture(scope="module")
def usual(hospital_folder: Path) -> ResultsFolder:
    """Results that each case changes in a few records."""
    return read_results(hospital_folder)


def _changed(usual: ResultsFolder, change: Spoil) -> str:
    """HTML of changed results."""
    facts = copy.deepcopy(usual.facts)
    change(facts)
    return report_html(replace(usual, facts=facts))


def _text(html: str) -> str:
    """What a reader sees, with ordinary spaces and minus signs."""
    seen = unescape(re.sub(r"<[^>]+>", " ", html)).replace(THIN, " ").replace(MINUS, "-")
    return re.sub(r"\s+", " ", seen)


def _nothing_pays(facts: Facts) -> None:
    for option in facts["options"]:
        option["economics"].update(
            irr_real_frac=None,
            simple_payback_years=None,
            discounted_payback_years=None,
            npv_real=-2e6,
            annual_saving=-1.2e5,
            saving_share_of_bill_frac=-0.019,
        )
        option["break_even"] = {
            key: value if "tried" in key else None for key, value in option["break_even"].items()
        }
    facts["verdict"]["recommended"] = None


def _no_variant(facts: Facts) -> None:
    for option in facts["options"]:
        for variant in option["variants"]:
            variant.update(
                npv_real=None,
                annual_saving=None,
                irr_real_frac=None,
                simple_payback_years=None,
                run_hours=None,
                gap_frac=None,
                status="failed",
                note="no schedule within the time",
            )
    facts["verdict"].update(holds_in_variants=0, variants_tried=0)


def _one_option(facts: Facts) -> None:
    del facts["options"][1:]


def _one_losing_option(facts: Facts) -> None:
    _one_option(facts)
    _nothing_pays(facts)


def _never_runs(facts: Facts) -> None:
    option = facts["options"][0]
    for name, value in option["energy"].items():
        option["energy"][name] = dict.fromkeys(value, 0.0) if isinstance(value, dict) else 0.0
    option["running"] = dict.fromkeys(option["running"], 0)
    option["economics"]["capital"]["net"] = -5.0
    option["economics"]["simple_payback_years"] = 0.0


def _bare(facts: Facts) -> None:
    facts.update(findings=[], defaults=[], inputs=[])
    facts["demand"]["carriers"] = facts["demand"]["carriers"][:1]
    facts["demand"]["daily_mean_heat_kW"] = [0.0] * 365
    facts["demand"]["within_step_excess_kW"] = [0.0] * 12
    for option in facts["options"]:
        option.update(variants=[], security=[])
        empty = ("stations", "points", "paths", "recovery_heat_degC", "recovery_sink_degC")
        option["machine"].update({name: [] for name in empty})


def _all_short(facts: Facts) -> None:
    for option in facts["options"]:
        option["security"][0].update(met=False, margin_kW=-800.0)
        option["nox"].update(status="exceeded", limit_mg_per_Nm3=15.0)
        first = option["carbon"]["by_year"][0]["calendar_year"]
        option["carbon"].update(stops_year=first, lifetime_saved_t=-12.0)


def _clean_for_ever(facts: Facts) -> None:
    for option in facts["options"]:
        option["carbon"].update(
            stops_year=None, lifetime_saved_t=81234.0, break_even_grid_kg_per_kWh=None
        )
        option["efficiency"].update(
            test="none", required_overall_frac=None, required_saving_frac=None, met=None
        )


@pytest.mark.parametrize(
    ("change", "told"),
    [
        (_nothing_pays, ["Build none of them. The 4.0 MW turbine with store comes nearest; it"]),
        (_nothing_pays, ["would lose EUR 2.00 m", "no single internal rate of return"]),
        (_nothing_pays, ["never in 20 years", "-120 000 EUR", "-1.9 % of today’s bill"]),
        (_nothing_pays, ["No gas price from -80 % to +150 % would make it pay."]),
        (_no_variant, ["No variant gave an answer", "no answer: no schedule within the time"]),
        (_one_option, ["The one option pays"]),
        (_one_losing_option, ["Do not build the 4.0 MW turbine with store. It would lose"]),
        (_never_runs, ["the unit never runs", "It costs no more than what it makes needless."]),
        (_bare, ["Nothing was found that a reader must be told", "no demand to secure"]),
        (
            _all_short,
            ["Not met: grid and heaters fall short of the year’s peak of power by 800 kW"],
        ),
        (_all_short, ["none in the first year"]),
        (_all_short, ["Exceeded:", "A written NOx guarantee below 15 mg/Nm³"]),
        (_clean_for_ever, ["saved over 20 years; something in every year", "no legal test"]),
    ],
)
def test_rare_answers(usual: ResultsFolder, change: Spoil, told: list[str]) -> None:
    """Each is told in words, and no empty value of the program shows through."""
    text = _text(_changed(usual, change))

    for words in told:
        assert words in text
    assert not re.search(r"\b(None|nan|NaN|inf|True|False)\b", text)
    assert "{" not in text
    assert "-0 " not in text


def test_many_options(usual: ResultsFolder) -> None:
    """Eight options stand side by side in the order of their worth."""

    def eight(facts: Facts) -> None:
        first = facts["options"][0]
        for place in range(2, 8):
            facts["options"].append(
                copy.deepcopy(first) | {"key": f"k{place}", "name": f"No {place}"}
            )
            facts["options"][-1]["economics"]["npv_real"] = -1e5 * place

    text = _text(_changed(usual, eight))

    places = [text.index(f"No {place} EUR -") for place in range(2, 8)]
    assert places == sorted(places)
    assert "2 of 8 options pay" in text


def _hostile(facts: Facts) -> None:
    facts["heading"].update(
        site=HOSTILE * 3, place=HOSTILE, client=HOSTILE, consultant=HOSTILE, title=HOSTILE
    )
    for option in facts["options"]:
        option.update(name=('<b>&"' + "W" * 60)[:60], description=HOSTILE)
        option["machine"]["name"] = HOSTILE
        option["nox"]["regime"] = HOSTILE
    finding = {"stage": "plant", "where": HOSTILE, "what": HOSTILE * 4, "effect": HOSTILE}
    facts["findings"] = [
        finding | {"advice": HOSTILE, "severity": severity}
        for severity in ("note", "serious", "attention")
    ] * 4
    facts["defaults"] = [{"path": "option." + "x" * 80, "value": HOSTILE, "meaning": HOSTILE}] * 20
    facts["separate_supply"]["bill"]["lines"][0]["line"] = HOSTILE
    facts["tariffs"]["power_lines"] = [HOSTILE]


def test_hostile_names_stay_text(usual: ResultsFolder) -> None:
    """What a study says is printed as it is, never as markup or as a template."""
    html = _changed(usual, _hostile)

    assert "<script" not in html
    assert "<b>&" not in html
    assert "{{ 7*7 }}" in unescape(html)


@pytest.mark.slow
@pytest.mark.pdf
def test_factory_that_should_not_build(factory_folder: Path, tmp_path: Path) -> None:
    """Where nothing pays the report is whole, and endless names keep page 1 one page."""
    path = tmp_path / "factory.pdf"
    path.write_bytes(make_pdf(_changed(read_results(factory_folder), _hostile)))
    reader = PdfReader(path)
    pages = [reader.pages[place].extract_text() for place in range(5)]

    assert 10 <= len(reader.pages) <= 20
    assert "Build none of them." in pages[0]
    assert "Settle before looking again" in pages[0]
    assert "The yearly bill falls" in pages[1]
    assert "Neither option earns its capital back" in pages[2]
    assert "Drying heat" in pages[4]


def test_one_default_of_several_records_takes_one_line(usual: ResultsFolder) -> None:
    """The same field left out in two options is told once, with both places."""

    def twice(facts: Facts) -> None:
        same = {"value": "8.0", "meaning": "Approach of the drum."}
        facts["defaults"] = [
            {"path": "option[1].recovery.approach_K", **same},
            {"path": "option[2].recovery.approach_K", **same},
            {"path": "option[2].recovery.pinch_K", "value": "10.0", "meaning": "Pinch."},
        ]

    text = _text(_changed(usual, twice))

    assert "option[1, 2].recovery.approach_K 8.0 Approach of the drum." in text
    assert "option[2].recovery.pinch_K 10.0 Pinch." in text
