"""The command `flueprint`: the one module that knows cleaning, planning and showing.

Heavy libraries are imported inside commands, so that every `--help` answers at once.
"""

import shlex
import sys
import traceback
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path

import click

from planner.progress import Progress, silent

#: Exit codes, documented in README.md.
DONE, OUR_FAULT, BAD_INPUT, NO_SCHEDULE, INTERRUPTED = 0, 1, 2, 3, 130

KINDS = ("hospital", "factory")


@click.group(context_settings={"help_option_names": ["--help", "-h"]})
@click.version_option(package_name="flueprint", message="%(prog)s %(version)s")
def cli() -> None:
    """Plan combined heat and power with gas turbines: meter files in, a client's report out."""


@cli.command()
@click.argument("folder", type=click.Path(path_type=Path))
@click.option("--kind", type=click.Choice(KINDS), required=True, help="What the site is.")
def new(folder: Path, kind: str) -> None:
    """Make FOLDER with a commented starter study that runs as it is."""
    from planner.study.starter import write_starter

    study = write_starter(folder, kind)
    place = shlex.quote(str(study))
    click.echo(
        f"{study} is ready. Read its comments, put your own files in place of the starter's,"
    )
    click.echo(f"then: flueprint check {place}\n      flueprint plan {place}")


@cli.command()
@click.argument("study", type=click.Path(path_type=Path))
def check(study: Path) -> None:
    """Read STUDY and every file it names, and say what was understood."""
    from planner.check import check_study

    click.echo(check_study(study))


@cli.command()
@click.argument("study", type=click.Path(path_type=Path))
@click.option(
    "--into", type=click.Path(path_type=Path), help="Results folder; results beside STUDY."
)
@click.option("--processes", type=click.IntRange(1, 64), help="Processes; all cores.")
def plan(study: Path, into: Path | None, processes: int | None) -> None:
    """Plan STUDY and write a results folder."""
    home = study if study.is_dir() else study.parent
    folder = _planned(study, into or home / "results", processes, "plan")
    click.echo(f"\nResults: {folder}\nReport:  flueprint report {shlex.quote(str(folder))}")


@cli.command()
@click.argument("results", type=click.Path(path_type=Path))
@click.option("--into", type=click.Path(path_type=Path), help="PDF; report.pdf in RESULTS.")
def report(results: Path, into: Path | None) -> None:
    """Write the client's report of a RESULTS folder as PDF."""
    click.echo(f"Report: {_reported(results, into)}")


@cli.command()
@click.option(
    "--into",
    type=click.Path(path_type=Path),
    default=Path("demo-results"),
    show_default=True,
    help="Folder for both sites.",
)
@click.option("--site", type=click.Choice(KINDS), help="Only this one.")
@click.option("--processes", type=click.IntRange(1, 64), help="Processes; all cores.")
def demo(into: Path, site: str | None, processes: int | None) -> None:
    """Plan both invented demo sites and write their reports."""
    from planner.study.starter import demo_study

    written = []
    for kind in KINDS if site is None else (site,):
        with demo_study(kind) as study:
            folder = _planned(study, into / kind, processes, f"demo {kind}")
        written.append(_reported(folder, None))
        click.echo("")
    for pdf in written:
        click.echo(f"Report: {pdf}")


def main() -> None:
    """Run the command and leave with a documented exit code."""
    sys.exit(run(sys.argv[1:]))


def run(arguments: list[str]) -> int:
    """Run one command line; say what went wrong on the error stream.

    Parameters
    ----------
    arguments : list of str
        As typed, without the command's own name.

    Returns
    -------
    int
        Exit code.
    """
    try:
        cli(arguments, prog_name="flueprint", standalone_mode=False)
    except (KeyboardInterrupt, click.Abort):
        click.echo("interrupted: nothing half done was left", err=True)
        return INTERRUPTED
    except click.ClickException as error:
        error.show()
        return BAD_INPUT
    except Exception as error:  # noqa: BLE001 - the last place that can tell the user
        return _told(error)
    return DONE


def _told(error: Exception) -> int:
    """Tell a failure in the user's words, or as our own fault with its trace."""
    from load_profiles import ProfileError
    from planner.errors import PlannerError, SolveError
    from reports.errors import ReportError

    if isinstance(error, SolveError):
        click.echo(f"no schedule: {error}", err=True)
        return NO_SCHEDULE
    if isinstance(error, ProfileError | PlannerError | ReportError):
        click.echo(str(error), err=True)
        return BAD_INPUT
    traceback.print_exception(error)
    click.echo(
        "This is a fault of flueprint itself; please report it with the lines above.", err=True
    )
    return OUR_FAULT


def _planned(study: Path, target: Path, processes: int | None, label: str) -> Path:
    """Plan a study, show the answer on one screen and write its folder."""
    from planner.pipeline import plan as plan_study
    from planner.results.folder import check_target
    from planner.study.reading import load_study

    source = load_study(study)
    check_target(target)
    with _progress(label) as progress:
        result = plan_study(source, processes=processes, progress=progress)
    click.echo(str(result))
    return result.save(target)


def _reported(results: Path, target: Path | None) -> Path:
    """Write the PDF of a results folder."""
    from reports.pdf import write_report

    return write_report(results, target)


@contextmanager
def _progress(label: str) -> Iterator[Progress]:
    """A bar with what is being done and the time left; nothing where no one watches."""
    from rich.console import Console
    from rich.progress import BarColumn, TextColumn, TimeRemainingColumn
    from rich.progress import Progress as Bar

    console = Console(stderr=True)
    if not console.is_terminal:
        yield silent
        return
    columns = (
        TextColumn("[bold]{task.fields[label]}"),
        BarColumn(),
        TimeRemainingColumn(),
        TextColumn("{task.description}"),
    )
    with Bar(*columns, console=console, transient=True) as bar:
        task = bar.add_task("reading", total=1.0, label=label)

        def told(what: str, done_frac: float) -> None:
            bar.update(task, description=what, completed=done_frac)

        yield told


if __name__ == "__main__":
    main()
