"""The PDF: sections filled into templates and set by WeasyPrint, which may open nothing else."""

import gc
import logging
import tempfile
import warnings
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import Any
from urllib.parse import unquote, urlsplit

import jinja2
from weasyprint import HTML
from weasyprint.text.fonts import FontConfiguration
from weasyprint.urls import FatalURLFetchingError, URLFetcher, URLFetcherResponse

from reports.charts.ribbon import draw_ribbon
from reports.errors import ReportError
from reports.figures import Figures, svg_url
from reports.results_folder import ResultsFolder, read_results
from reports.sections.answer import answer
from reports.sections.bills import bills
from reports.sections.certainty import certainty
from reports.sections.emissions import emissions
from reports.sections.findings import findings
from reports.sections.machine import machine
from reports.sections.method import method
from reports.sections.money import money
from reports.sections.options import options
from reports.sections.plant import plant
from reports.sections.site import site
from reports.sections.sources import sources
from reports.sections.weeks import weeks

TEMPLATES = Path(__file__).parent / "templates"

View = Callable[[ResultsFolder, Figures], dict[str, Any]]

#: Sections in the report's order; each has a template of its name.
SECTIONS: dict[str, View] = {
    "answer": answer,
    "bills": bills,
    "options": options,
    "certainty": certainty,
    "site": site,
    "plant": plant,
    "weeks": weeks,
    "money": money,
    "emissions": emissions,
    "machine": machine,
    "findings": findings,
    "method": method,
    "sources": sources,
}

#: Places that the contents name.
CONTENTS = (
    ("answer", "The answer"),
    ("bills", "The two bills"),
    ("options", "All options"),
    ("certainty", "How sure, and with the unit out"),
    ("site", "What the site needs"),
    ("plant", "What the plant does"),
    ("weeks", "A winter and a summer week"),
    ("money", "Money over the years"),
    ("emissions", "CO₂, NOx and efficiency"),
    ("machine", "The machine"),
    ("findings", "Findings and defaults"),
    ("method", "How the figures were made"),
    ("meaning", "What each number means"),
    ("cautions", "What is not settled"),
    ("sources", "Sources and inputs"),
)


def write_report(results_folder: Path, target: Path | None = None) -> Path:
    """Write the report of a results folder as PDF.

    Parameters
    ----------
    results_folder : Path
        As a plan writes it.
    target : Path, optional
        File to write; `report.pdf` in the folder by default.

    Returns
    -------
    Path
        The PDF, whole; an older one is replaced only then.

    Raises
    ------
    ReportError
        If the folder cannot be reported, or the place cannot be written.
    """
    results = read_results(Path(results_folder))
    place = Path(target) if target is not None else results.path / "report.pdf"
    _check_place(place)
    pdf = make_pdf(report_html(results))
    _write_whole(place, pdf)
    return place


def report_html(results: ResultsFolder) -> str:
    """The report as one HTML page, with its figures inside.

    Parameters
    ----------
    results : ResultsFolder
        Valid and complete.

    Returns
    -------
    str
        Every text from the study is escaped.
    """
    figures = Figures()
    views = {name: view(results, figures) for name, view in SECTIONS.items()}
    environment = jinja2.Environment(
        loader=jinja2.FileSystemLoader(TEMPLATES),
        autoescape=True,
        undefined=jinja2.StrictUndefined,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    ribbon = svg_url(draw_ribbon(results.facts["demand"]["daily_mean_heat_kW"]))
    return environment.get_template("report.html").render(
        s=views, heading=results.heading, ribbon=ribbon, order=list(SECTIONS), contents=CONTENTS
    )


def make_pdf(html: str) -> bytes:
    """Set a page of HTML that links only to what lies beside the templates.

    Parameters
    ----------
    html : str
        The page.

    Returns
    -------
    bytes
        PDF/UA-1, tagged, with its fonts inside; the same page gives the same bytes.

    Raises
    ------
    ReportError
        If anything in the page asks for a warning, or for a file elsewhere.
    """
    with _warnings_as_errors(), _collector_paused(), warnings.catch_warnings():
        # A machine without any font is fine: all fonts come with the templates.
        warnings.filterwarnings("ignore", message="No fonts configured")
        page = HTML(string=html, base_url=TEMPLATES.as_uri() + "/", url_fetcher=OwnFolder())
        pdf: bytes = page.write_pdf(pdf_variant="pdf/ua-1", font_config=FontConfiguration())
    return pdf


@contextmanager
def _collector_paused() -> Iterator[None]:
    """Let no cycles be looked for: a page is millions of objects that all live to its end.

    A quarter of the time goes otherwise, and the peak rises by a few megabytes only.
    """
    running = gc.isenabled()
    gc.disable()
    try:
        yield
    finally:
        if running:
            gc.enable()


class OwnFolder(URLFetcher):  # type: ignore[misc]  # WeasyPrint publishes no type hints
    """Opens data inside the page and files under the templates, and nothing else."""

    def __init__(self) -> None:
        super().__init__(allowed_protocols={"file", "data"}, allow_redirects=False)

    def fetch(self, url: str, headers: dict[str, str] | None = None) -> URLFetcherResponse:
        """Fetch an address, or stop the report."""
        parts = urlsplit(url)
        if parts.scheme == "data":
            return super().fetch(url, headers)
        path = Path(unquote(parts.path)).resolve()
        if parts.scheme != "file" or not path.is_relative_to(TEMPLATES.resolve()):
            raise FatalURLFetchingError(f"{url[:200]} = outside the report: must not be opened")
        return super().fetch(url, headers)


class _Collector(logging.Handler):
    """Keeps every warning."""

    def __init__(self) -> None:
        super().__init__(logging.WARNING)
        self.messages: list[str] = []

    def emit(self, record: logging.LogRecord) -> None:
        """Keep one message."""
        self.messages.append(record.getMessage())


@contextmanager
def _warnings_as_errors() -> Iterator[None]:
    """Refuse a PDF about which WeasyPrint had any doubt."""
    logger, collector = logging.getLogger("weasyprint"), _Collector()
    logger.addHandler(collector)
    try:
        yield
    except FatalURLFetchingError as error:
        raise ReportError(str(error)) from None
    finally:
        logger.removeHandler(collector)
    if collector.messages:
        raise ReportError(*(f"report.pdf = {message[:160]}" for message in collector.messages))


def _check_place(place: Path) -> None:
    """Refuse a place that cannot take a file, before the work is done."""
    if place.is_dir():
        raise ReportError(f"{place} = a folder: must be the name of a PDF file")
    if not place.parent.is_dir():
        raise ReportError(f"{place.parent} = nothing there: must be a folder that exists")


def _write_whole(place: Path, content: bytes) -> None:
    """Write under another name first, so that a file is either whole or absent."""
    try:
        with tempfile.NamedTemporaryFile(
            dir=place.parent, prefix=f".{place.name}-", delete=False
        ) as draft:
            path = Path(draft.name)
            draft.write(content)
        path.chmod(0o644)
        path.replace(place)
    except OSError as error:
        raise ReportError(f"{place} = {error.strerror}: name a place that you may write") from None
