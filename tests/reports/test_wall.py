"""The wall around this room: a report needs nothing but a results folder."""

import ast
from pathlib import Path

import reports

ROOM = Path(reports.__file__).parent


def test_reports_import_no_other_room() -> None:
    """No module of reports imports planner or load_profiles."""
    for path in ROOM.rglob("*.py"):
        for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
            names = [alias.name for alias in node.names] if isinstance(node, ast.Import) else []
            if isinstance(node, ast.ImportFrom):
                names = [node.module or ""]
            for name in names:
                assert name.split(".")[0] not in {"planner", "load_profiles"}, path.name


def test_font_licences_lie_beside_the_fonts() -> None:
    """Each family's licence is there, as its terms ask."""
    fonts = ROOM / "templates" / "fonts"

    assert {path.name for path in fonts.glob("OFL-*.txt")} == {
        "OFL-SofiaSans.txt",
        "OFL-SourceSerif4.txt",
    }
    assert all(path.suffix in {".ttf", ".txt"} for path in fonts.iterdir())
