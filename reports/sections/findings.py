"""Findings and defaults: what a reader must know about inputs and answer."""

import re
from typing import Any

from reports.figures import Figures
from reports.numbers import count
from reports.results_folder import Facts, ResultsFolder
from reports.wording import printed, upper_first

#: Place of a record in a list, inside a field's path, and what stands for several.
INDEX = re.compile(r"\[(\d+)\]")
NUMBERED = "[#]"

SEVERITIES = ("serious", "attention", "note")
STAGES = {
    "profiles": "Meters and weather",
    "plant": "Plant",
    "market": "Tariffs",
    "dispatch": "Dispatch",
    "outcome": "Outcome",
    "explore": "Variants",
}


def findings(results: ResultsFolder, _figures: Figures) -> dict[str, Any]:
    """Every finding, the gravest first, and every default used."""
    found = sorted(results.facts["findings"], key=lambda f: SEVERITIES.index(f["severity"]))
    serious = sum(f["severity"] == "serious" for f in found)
    return {
        "title": _title(len(found), serious),
        "rows": [
            {
                "severity": f["severity"],
                "stage": STAGES[f["stage"]],
                "where": f["where"],
                "what": upper_first(printed(f["what"])),
                "effect": printed(f["effect"]),
                "advice": printed(f["advice"]),
            }
            for f in found
        ],
        "defaults": _defaults(results.facts["defaults"]),
    }


def _defaults(defaults: list[Facts]) -> list[tuple[str, str, str]]:
    """Each default once: the same field of several records of a list shares a line."""
    places: dict[tuple[str, str, str], list[str]] = {}
    for default in defaults:
        field = INDEX.sub(NUMBERED, default["path"])
        found = INDEX.findall(default["path"])
        shared = (field if len(found) == 1 else default["path"], default["value"])
        places.setdefault((*shared, default["meaning"]), []).extend(found)
    return [
        (field.replace(NUMBERED, f"[{', '.join(found)}]"), value, printed(meaning))
        for (field, value, meaning), found in places.items()
    ]


def _title(total: int, serious: int) -> str:
    """How many, and how grave."""
    if not total:
        return "Nothing was found that a reader must be told"
    if not serious:
        return f"{count(total, 'finding')}, none of them serious"
    return f"{count(total, 'finding')}, {serious} serious"
