"""Files that cannot be read as declared: each refused by where, what came and what to do."""

from collections.abc import Callable
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from load_profiles import ProfileError
from load_profiles.clock import SiteClock
from load_profiles.declarations import IntervalMeter, WeatherFile
from load_profiles.readers.interval_csv import read_interval_meter
from load_profiles.readers.weather_csv import read_weather
from load_profiles.row_faults import row_faults
from tests.load_profiles.known_year import Export, known_power_kW

BERLIN = SiteClock("Europe/Berlin", 2025)

METER = IntervalMeter(
    source="interval_meter",
    file="meter.csv",
    value_column="power_kW",
    quantity="mean_kW",
    interval_minutes=15,
)


def refusal(folder: Path, meter: IntervalMeter = METER) -> list[str]:
    """The lines of the refusal of the folder's meter file."""
    with pytest.raises(ProfileError) as caught:
        read_interval_meter(meter, folder=folder, site=BERLIN)
    return str(caught.value).splitlines()


def text(*lines: str) -> bytes:
    """A file of these lines."""
    return "\n".join(lines).encode()


#: What stands in the file, and the refusal in full.
BROKEN = {
    "empty": (b" \n", ["meter.csv = an empty file: must hold a header and rows of data"]),
    "binary": (
        b"time,power_kW\n\x00\x01",
        ["meter.csv = a binary file: must be delimited text; export it as CSV"],
    ),
    "workbook renamed": (
        b"PK\x03\x04rest",
        ["meter.csv = a binary file: must be delimited text; export it as CSV"],
    ),
    "UTF-16": (
        "time,power_kW\n".encode("utf-16"),
        ["meter.csv = UTF-16 text: must be UTF-8; save it as CSV UTF-8"],
    ),
    "Latin-1": (
        "time,power_kW\n2025-01-01 00:00,1\nZähler".encode("latin-1"),
        ["meter.csv row 3 = byte 0xE4: is not UTF-8; save it as CSV UTF-8"],
    ),
    "other delimiter": (
        text("time;power_kW", "2025-01-01 00:00;1"),
        [
            (
                'meter.csv row 1 = one column "time;power_kW": must hold 2 or more columns parted '
                "by a comma; is the delimiter a semicolon?"
            )
        ],
    ),
    "other headers": (
        text("Time,Power_kW,room", "2025-01-01 00:00,1,2"),
        [
            (
                'meter.csv row 1 = header: has no column "time" that stamp_column names; '
                'nearest is "Time"'
            ),
            (
                'meter.csv row 1 = header: has no column "power_kW" that value_column names; '
                'nearest is "Power_kW"'
            ),
        ],
    ),
    "header twice": (
        text("time,power_kW,power_kW", "2025-01-01 00:00,1,2"),
        ['meter.csv row 1 = "power_kW" twice: value_column must name one column'],
    ),
    "header alone": (
        text("time,power_kW"),
        ["meter.csv = a header and nothing below it: must hold rows of data"],
    ),
    "short row": (
        text("time,power_kW", "2025-01-01 00:00,1", "2025-01-01 00:15"),
        ["meter.csv row 3 = 1 column: must have 2, as the header has"],
    ),
    "text among numbers": (
        text("time,power_kW", "2025-01-01 00:00,1", "2025-01-01 00:15,fault", "2025-01-01 00:30,3"),
        [
            (
                'meter.csv row 3 = power_kW "fault": must be a number with "." as decimal mark and '
                "no thousands mark"
            )
        ],
    ),
    "infinite": (
        text("time,power_kW", "2025-01-01 00:00,inf", "2025-01-01 00:15,1"),
        [
            (
                'meter.csv row 2 = power_kW "inf": must be a number with "." as decimal mark and '
                "no thousands mark"
            )
        ],
    ),
    "other stamps": (
        text("time,power_kW", "01.01.2025 00:00,1", "2025-01-01 00:15,2"),
        ["meter.csv row 2 = 01.01.2025 00:00: must have the form %Y-%m-%d %H:%M"],
    ),
    "negative": (
        text("time,power_kW", "2025-01-01 00:00,-4.5", "2025-01-01 00:15,2"),
        [
            (
                "meter.csv row 2 = power_kW -4.5: must not be negative; is it a net meter behind "
                "generation on the site?"
            )
        ],
    ),
    "skipped hour": (
        text("time,power_kW", "2025-03-30 01:45,1", "2025-03-30 02:00,2", "2025-03-30 02:15,2"),
        [
            (
                "meter.csv row 3 = 2025-03-30 02:00: does not exist in Europe/Berlin; is the file "
                "in standard time?"
            ),
            (
                "meter.csv row 4 = 2025-03-30 02:15: does not exist in Europe/Berlin; is the file "
                "in standard time?"
            ),
        ],
    ),
    "other interval": (
        text("time,power_kW", "2025-01-01 00:00,1", "2025-01-01 00:30,2", "2025-01-01 01:00,3"),
        ["meter.csv = stamps 30 min apart: must be 15 min apart, as interval_minutes says"],
    ),
    "stamp beside the grid": (
        text("time,power_kW", *(f"2025-01-01 00:{m:02d},1" for m in (0, 15, 30, 47))),
        [
            (
                "meter.csv row 5 = a stamp beside the 15-minute grid: must begin on a full 15 "
                "minutes of standard time"
            )
        ],
    ),
    "other year": (
        text("time,power_kW", "2023-06-01 00:00,1", "2023-06-01 00:15,2"),
        ["meter.csv = 2023-06-01 00:00 to 2023-06-01 00:15: must cover 2025, the study's year"],
    ),
}


@pytest.mark.parametrize("case", BROKEN)
def test_broken_file_is_refused(tmp_path: Path, case: str) -> None:
    """Each kind of broken file gives its message, word for word."""
    content, lines = BROKEN[case]
    (tmp_path / "meter.csv").write_bytes(content)

    assert refusal(tmp_path) == lines


def test_missing_file_is_refused(tmp_path: Path) -> None:
    """A file that is not there is named with the folder it should be in."""
    folder = tmp_path / "wrenfield"
    folder.mkdir()

    assert refusal(folder) == [
        "meter.csv = no such file: must be in the folder wrenfield, beside the study file"
    ]


def test_folder_in_place_of_a_file_is_refused(tmp_path: Path) -> None:
    """A folder of the file's name is named as one."""
    (tmp_path / "meter.csv").mkdir()

    assert refusal(tmp_path) == ["meter.csv = a folder: must be a file"]


def test_very_large_file_is_refused_unread(tmp_path: Path) -> None:
    """A sparse file of 60 MB is refused by its size."""
    with (tmp_path / "meter.csv").open("wb") as file:
        file.truncate(60_000_000)

    assert refusal(tmp_path) == ["meter.csv = 60 MB: must not exceed 50 MB; is it the right file?"]


def test_point_in_decimal_comma_file_is_refused(tmp_path: Path) -> None:
    """Where the decimal mark is a comma, 1.234 is not read as a little more than one."""
    (tmp_path / "meter.csv").write_bytes(
        text("time;power_kW", "2025-01-01 00:00;1.234", "2025-01-01 00:15;2,5")
    )
    meter = METER.model_copy(update={"delimiter": ";", "decimal": ","})

    assert refusal(tmp_path, meter) == [
        (
            'meter.csv row 2 = power_kW "1.234": must be a number with "," as decimal mark and no '
            "thousands mark"
        )
    ]


def test_iso_stamp_without_offset_is_refused(tmp_path: Path) -> None:
    """ISO stamps must carry their offset; one without is named."""
    (tmp_path / "meter.csv").write_bytes(
        text("time,power_kW", "2025-01-01T00:00:00+01:00,1", "2025-01-01T00:15:00,2")
    )

    assert refusal(tmp_path, METER.model_copy(update={"stamp_format": "ISO"})) == [
        (
            "meter.csv row 3 = 2025-01-01T00:15:00: must be ISO 8601 with offset, such as "
            "2025-03-30T01:00:00+01:00"
        )
    ]


def test_local_file_declared_as_standard_is_refused(tmp_path: Path) -> None:
    """A year that repeats the October hour and skips the March hour proves the wall clock."""
    Export(header=("time", "power_kW")).write(tmp_path / "meter.csv", known_power_kW(8760 * 4))

    assert refusal(tmp_path, METER.model_copy(update={"clock": "standard"})) == [
        (
            "meter.csv = the hour of 2025-10-26 that clocks in Europe/Berlin repeat, twice: "
            'cannot be on clock = "standard"; declare clock = "local"'
        )
    ]


def test_quote_in_the_prose_above_the_header_is_passed_over(tmp_path: Path) -> None:
    """An open quote above the header does not swallow the table; rows keep their numbers."""
    rows = ["time,power_kW", "2025-01-01 00:00,1", "2025-01-01 00:15,x"]
    (tmp_path / "meter.csv").write_bytes(text('Export "A', "", *rows))

    assert refusal(tmp_path, METER.model_copy(update={"skip_rows": 2}))[0].startswith(
        'meter.csv row 5 = power_kW "x"'
    )


def test_overlapping_intervals_are_refused(tmp_path: Path) -> None:
    """A half-hour that begins 15 minutes after the last would count a quarter twice."""
    rows = [f"2025-01-01 {hour:02d}:{minute:02d},1" for hour in range(3) for minute in (0, 30)]
    (tmp_path / "meter.csv").write_bytes(text("time,power_kW", *rows, "2025-01-01 02:45,1"))

    assert refusal(tmp_path, METER.model_copy(update={"interval_minutes": 30})) == [
        (
            "meter.csv row 8 = an interval that overlaps the one before: must begin 30 min or more "
            "after it"
        )
    ]


def test_many_rows_of_a_kind_are_counted() -> None:
    """Seven rows: five by name, then the number of the others and the last row."""
    faults = row_faults("meter.csv", range(2, 9), ["x"] * 7, "must be y")

    assert [str(fault) for fault in faults[4:]] == [
        "meter.csv row 6 = x: must be y",
        "meter.csv = 2 more rows like these, to row 8: must be y",
    ]


@pytest.mark.parametrize(
    "spoil",
    [
        lambda raw: raw[: len(raw) // 2],
        lambda raw: raw.replace(b",", b"\t"),
        lambda raw: raw[::-1],
        lambda raw: b'"' + raw,
        lambda raw: raw.replace(b"\n", b""),
        lambda raw: raw.replace(b"2025", b"20x5"),
    ],
    ids=["truncated", "tabs", "backwards", "open quote", "one line", "letters in stamps"],
)
def test_spoilt_file_never_ends_in_a_traceback(
    tmp_path: Path, spoil: Callable[[bytes], bytes]
) -> None:
    """However a file is spoilt, the answer is a refusal that names it."""
    rows = [f"2025-01-0{day} {hour:02d}:00,{hour}" for day in range(1, 9) for hour in range(24)]
    (tmp_path / "meter.csv").write_bytes(spoil(text("time,power_kW", *rows)))

    assert all(line.startswith("meter.csv") for line in refusal(tmp_path))


@settings(max_examples=40, deadline=None)
@given(
    place=st.integers(0, 4000),
    length=st.integers(0, 300),
    junk=st.binary(max_size=40),
    clock=st.sampled_from(["local", "standard", "utc"]),
    marks=st.sampled_from(["start", "end"]),
)
def test_mutilated_file_is_read_or_refused(
    tmp_path_factory: pytest.TempPathFactory,
    *,
    place: int,
    length: int,
    junk: bytes,
    clock: str,
    marks: str,
) -> None:
    """Whatever bytes take the place of others, each reader reads the file or refuses it."""
    folder = tmp_path_factory.mktemp("mutilated")
    days = ("2025-03-29", "2025-03-30", "2025-10-25", "2025-10-26", "2025-12-31")
    rows = [f"{day} {hour:02d}:00,{hour}" for day in days for hour in range(24)]
    raw = text("time,power_kW", *rows)
    (folder / "meter.csv").write_bytes(raw[:place] + junk + raw[place + length :])
    layout = {"file": "meter.csv", "clock": clock, "stamp_marks": marks}
    meter = METER.model_copy(update={**layout, "interval_minutes": 60})
    column = "power_kW"
    weather = WeatherFile.model_validate(
        {**layout, "temperature_column": column, "humidity_column": column}
    )

    for read in (
        lambda: read_interval_meter(meter, folder=folder, site=BERLIN),
        lambda: read_weather(weather, folder=folder, site=BERLIN, altitude_m=0.0),
    ):
        try:
            read()
        except ProfileError as error:
            assert error.faults  # noqa: PT017 -- reading is as good an answer as a refusal
