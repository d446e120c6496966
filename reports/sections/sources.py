"""Cautions, references, and the fingerprints of everything that was read."""

from typing import Any

from reports.figures import Figures
from reports.numbers import number
from reports.results_folder import ResultsFolder
from reports.wording import has_store


def sources(results: ResultsFolder, _figures: Figures) -> dict[str, Any]:
    """Which cautions apply, what was cited, what was read."""
    options = results.facts["options"]
    taken = {line["carrier"] for line in results.facts["demand"]["carriers"]}
    return {
        "hospital": results.heading["kind"] == "hospital",
        "store": any(has_store(option) for option in options),
        "hot_gas": "hot_gas" in taken,
        "pressure": bool(taken & {"steam", "hot_water"}),
        "exports": any(option["energy"]["grid_export_kWh"] > 0.0 for option in options),
        "regimes": sorted({option["nox"]["regime_source"] for option in options}),
        "inputs": [
            (file["file"], number(file["bytes"]), _in_groups(file["sha256"]))
            for file in results.facts["inputs"]
        ],
        "version": _version(str(results.facts["flueprint_version"])),
        "made": str(results.facts["made_at_utc"])[:16].replace("T", " "),
    }


def _version(version: str) -> str:
    """A version's number, or that there is none."""
    return version if version[:1].isdigit() else f"({version})"


def _in_groups(digest: str) -> str:
    """A digest in eights, so that it can be read out and may break."""
    return " ".join(digest[i : i + 8] for i in range(0, len(digest), 8))
