"""The PDF itself: pages, letters, tags, what it says, and what it may open."""

import re
from pathlib import Path
from typing import Any

import pytest
from pypdf import PdfReader

from reports.errors import ReportError
from reports.numbers import MINUS, THIN
from reports.pdf import TEMPLATES, make_pdf, write_report
from reports.results_folder import read_results

pytestmark = pytest.mark.pdf


def _plain(text: str) -> str:
    """Text on one line, with ordinary spaces and minus signs."""
    return re.sub(r"\s+", " ", text.replace(THIN, " ").replace(MINUS, "-"))


def _flat(outline: list[Any]) -> list[Any]:
    """Entries of an outline, those below others among them."""
    nested = (_flat(entry) if isinstance(entry, list) else [entry] for entry in outline)
    return [entry for entries in nested for entry in entries]


@pytest.fixture(scope="module")
def pages(hospital_pdf: Path) -> list[str]:
    """Plain text of each page."""
    return [_plain(page.extract_text()) for page in PdfReader(hospital_pdf).pages]


def test_page_count(hospital_pdf: Path) -> None:
    """A client's report has ten to twenty pages."""
    assert 10 <= len(PdfReader(hospital_pdf).pages) <= 20


def test_page_1_is_the_answer_and_page_2_the_bills(pages: list[str]) -> None:
    """The answer fills page 1 alone; what a client checks first stands on page 2."""
    assert "Build the 4.0 MW turbine with store." in pages[0]
    assert "Settle before signing" in pages[0]
    assert "line by line" in pages[1]
    assert "Settle before signing" not in pages[1]


def test_only_bundled_fonts(hospital_pdf: Path) -> None:
    """Every letter is set in a font that came with the templates, so no machine matters."""
    names = set()
    for page in PdfReader(hospital_pdf).pages:
        for font in page["/Resources"].get("/Font", {}).values():
            names.add(str(font.get_object()["/BaseFont"]).split("+")[-1])

    assert names
    assert {name.split("-")[0] for name in names} == {"Report"}, names


def test_accessible_frame(hospital_pdf: Path) -> None:
    """Title, author, language, tags and outline are there for those who cannot see the pages."""
    reader = PdfReader(hospital_pdf)
    root = reader.trailer["/Root"]

    assert reader.metadata is not None
    assert reader.metadata.title == "Invented General Hospital: CHP feasibility study"
    assert reader.metadata.author == "Example consultants"
    assert root["/Lang"] == "en"
    assert root["/MarkInfo"]["/Marked"]
    assert len(_flat(reader.outline)) > 10
    assert "pdfuaid" in root["/Metadata"].get_data().decode("utf-8")


def test_headline_figures(pages: list[str], hospital_folder: Path) -> None:
    """Page 1 prints the results' own figures, rounded here by hand from the records."""
    option = read_results(hospital_folder).option("option_1")
    money, carbon = option["economics"], option["carbon"]

    assert f"{money['annual_saving'] / 1e6:.2f} EUR m" in pages[0]
    assert f"{money['saving_share_of_bill_frac'] * 100:.1f} % of today’s bill" in pages[0]
    assert f"net present value is EUR {money['npv_real'] / 1e6:.2f} m over 20 years" in pages[0]
    assert f"internal rate of return {money['irr_real_frac'] * 100:.1f} %" in pages[0]
    assert "both real and before tax" in pages[0]
    assert f"{money['simple_payback_years']:.1f} years" in pages[0]
    assert f"discounted: in year {money['discounted_payback_years']}" in pages[0]
    assert f"ends after {carbon['stops_year'] - 1}" in pages[0].replace("- ", "")
    assert "more than today over 20 years" in pages[0]
    assert "±20 %" in pages[0]
    assert "Perfect foresight" in pages[0]


def test_both_bills_line_by_line(pages: list[str], hospital_folder: Path) -> None:
    """Every amount of both bills stands on page 2, and so does their difference."""
    results = read_results(hospital_folder)
    today = results.facts["separate_supply"]["bill"]
    then = results.option("option_1")["bill"]

    for bill in (today, then):
        for line in bill["lines"]:
            amount = f"{abs(line['amount']):,.0f}".replace(",", " ")
            assert amount in pages[1], line["line"]
        assert f"{bill['total']:,.0f}".replace(",", " ") in pages[1]
    assert f"{then['total'] - today['total']:,.0f}".replace(",", " ") in pages[1]


def test_power_of_the_year_is_the_sum_of_the_hours(pages: list[str], hospital_folder: Path) -> None:
    """The month table's last row is what the hourly file adds up to."""
    frame = read_results(hospital_folder).hourly["option_1"]
    made_MWh = float(frame["unit_power_kW"].sum()) / 1e3
    table = next(page for page in pages if "Month by month, in MWh" in page)

    assert f"{made_MWh:,.0f}".replace(",", " ") in table
    assert f"{frame['unit_on'].sum():,.0f}".replace(",", " ") in table


def test_every_input_with_its_digest(pages: list[str], hospital_folder: Path) -> None:
    """The fingerprint of every file that was read can be compared letter by letter."""
    last = pages[-1].replace(" ", "")

    for file in read_results(hospital_folder).facts["inputs"]:
        assert file["file"] in last
        assert file["sha256"] in last


def test_standards_and_meanings(pages: list[str]) -> None:
    """Cautions cite standards by number and defer to local codes; terms are defined."""
    text = " ".join(pages)

    for standard in ("ISO 21789", "IEC 60079", "EN 50549", "HSG274", "HTM 06-01", "ISO 2314"):
        assert standard in text
    assert "engineers licensed there decide" in text
    assert "Annual saving" in text
    assert "hot exhaust" in text.lower()


@pytest.mark.slow
def test_same_results_same_bytes(hospital_folder: Path, hospital_pdf: Path, tmp_path: Path) -> None:
    """Two reports of one folder are the same file, to the last byte."""
    again = write_report(hospital_folder, tmp_path / "again.pdf")

    assert again.read_bytes() == hospital_pdf.read_bytes()
    assert [path.name for path in tmp_path.iterdir()] == ["again.pdf"]


def _page(body: str) -> str:
    """A small page of HTML."""
    return f'<html lang="en"><head><title>t</title></head><body>{body}</body></html>'


@pytest.mark.parametrize(
    "address",
    [
        "http://example.org/picture.svg",
        "https://example.org/picture.svg",
        "file:///etc/hostname",
        "../pdf.py",
        "fonts/../../pdf.py",
        "ftp://example.org/picture.svg",
    ],
)
def test_nothing_outside_is_opened(address: str) -> None:
    """An address on the web or outside the templates stops the report."""
    with pytest.raises(ReportError, match="outside the report: must not be opened"):
        make_pdf(_page(f'<img src="{address}" alt="x">'))


def test_a_link_that_leads_out_is_not_followed(tmp_path: Path) -> None:
    """A file beside the templates' folder is outside, whatever its name begins with."""
    twin = TEMPLATES.parent / (TEMPLATES.name + "_twin")

    with pytest.raises(ReportError, match="must not be opened"):
        make_pdf(_page(f'<img src="{twin.as_uri()}/x.svg" alt="x">'))
    assert not list(tmp_path.iterdir())


def test_warnings_are_errors() -> None:
    """A rule that WeasyPrint does not know stops the report."""
    with pytest.raises(ReportError, match="Ignored"):
        make_pdf(_page('<p style="colour-of-hope: green">x</p>'))
