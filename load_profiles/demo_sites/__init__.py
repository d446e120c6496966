"""Two invented sites with raw files like a client's, and the seeded generator that wrote them.

In the order in which data passes through: `noise` and `clock` (`NoiseStream`, `StepClock`);
`weather` (`Weather`); `hospital` and `factory` (`SiteDemand`, the truth); `exports` (dialects and
meter faults); `hospital_sites` and `factory_sites` (`InventedSite`); `raw_files` (text of the
files); `generator` (`TrueYear`, and writing). The folders `hospital/` and `factory/` hold each
demo site's `study.toml` and files.

`python -m load_profiles.demo_sites` writes the demo's files anew, byte for byte the same.
"""

from pathlib import Path

#: Folders of the demo studies, in the order in which the demo plans them.
DEMO_FOLDERS = tuple(Path(__file__).parent / kind for kind in ("hospital", "factory"))

__all__ = ["DEMO_FOLDERS"]
