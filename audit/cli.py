"""The commands: thin, with the work imported only when a command runs."""

from __future__ import annotations

import sys
from datetime import date, datetime
from pathlib import Path
from typing import Annotated

import typer

from audit.refusal import Refusal

app = typer.Typer(
    name="motor-audit",
    help="Audit the motor-protection settings of a whole site over the spreadsheets that hold them.",
    no_args_is_help=True,
    add_completion=False,
    rich_markup_mode=None,
    pretty_exceptions_enable=False,
)

FleetPath = Annotated[Path, typer.Argument(metavar="FLEET", help="A folder of workbooks, or one workbook.")]
OutFolder = Annotated[Path | None, typer.Option("--out", metavar="DIR", help="Where to write; default audit-<site>.")]
RulesFolder = Annotated[
    Path | None, typer.Option("--rules", metavar="DIR", help="A folder of the site's own rules and limits.")
]


def _day(text: str | None) -> date | None:
    if text is None:
        return None
    try:
        return datetime.strptime(text, "%Y-%m-%d").date()
    except ValueError:
        raise typer.BadParameter(f"'{text}' is not a day; write it as 2026-11-30") from None


@app.command(short_help="Judge a fleet; write findings and marked workbooks.")
def audit(
    fleets: Annotated[
        list[Path], typer.Argument(metavar="FLEET...", help="A folder of workbooks, or one workbook; several sites.")
    ],
    out: OutFolder = None,
    rules: RulesFolder = None,
    pack: Annotated[list[str] | None, typer.Option("--pack", metavar="NAME", help="Bring a pack into scope.")] = None,
    fail_on: Annotated[
        str | None, typer.Option("--fail-on", metavar="SEVERITY", help="Exit 1 on findings at or above a severity.")
    ] = None,
    json_out: Annotated[
        bool, typer.Option("--json", help="Print the record on stdout, and nothing else there.")
    ] = False,
    show_all: Annotated[bool, typer.Option("--all", help="Print every finding, also long lists of like ones.")] = False,
    previous: Annotated[
        Path | None, typer.Option("--previous", metavar="RECORD", help="The record of the last audit.")
    ] = None,
    on: Annotated[str | None, typer.Option("--on", metavar="DAY", help="The day of the audit; default today.")] = None,
) -> None:
    """Read a fleet, judge every motor, print the findings and write the record and the annotated workbooks."""
    from audit.commands.audit import run_audit
    from audit.commands.sites import run_sites

    if len(fleets) > 1:
        raise typer.Exit(
            run_sites(
                fleets, out=out, rules=rules, packs=pack or [], fail_on=fail_on, as_json=json_out,
                everything=show_all, audited_on=_day(on), previous=previous,
            )
        )  # fmt: skip
    raise typer.Exit(
        run_audit(
            fleets[0], out=out, rules=rules, packs=pack or [], fail_on=fail_on, as_json=json_out, everything=show_all,
            audited_on=_day(on), previous=previous,
        )
    )  # fmt: skip


@app.command(short_help="Print the calculation sheet of a motor.")
def explain(
    fleet: FleetPath,
    tag: Annotated[str, typer.Argument(metavar="TAG", help="The motor.")],
    check: Annotated[str | None, typer.Argument(metavar="CHECK", help="One check; default all that apply.")] = None,
    rules: RulesFolder = None,
    show_all: Annotated[bool, typer.Option("--all", help="In full also what is plainly met.")] = False,
    on: Annotated[str | None, typer.Option("--on", metavar="DAY", help="The day of the audit; default today.")] = None,
) -> None:
    """Print a motor's calculation sheet: data, formulas with numbers, ranges, verdicts, sources, assumptions."""
    from audit.commands.explain import run_explain

    raise typer.Exit(run_explain(fleet, tag, check, rules=rules, audited_on=_day(on), everything=show_all))


@app.command(short_help="Compare two states of a fleet, or suppose a change.")
def compare(
    before: Annotated[Path, typer.Argument(metavar="BEFORE", help="A fleet, or the record of an audit.")],
    after: Annotated[Path | None, typer.Argument(metavar="AFTER", help="The fleet, or record, as it is now.")] = None,
    suppose: Annotated[
        list[str] | None,
        typer.Option("--set", metavar="WHAT", help="Suppose a value, e.g. bus=B2:fault_max_ka=31.5; several are fine."),
    ] = None,
    out: Annotated[
        Path | None, typer.Option("--out", metavar="DIR", help="Where to write; default compare-<site>.")
    ] = None,
    rules: RulesFolder = None,
    pack: Annotated[list[str] | None, typer.Option("--pack", metavar="NAME", help="Bring a pack into scope.")] = None,
    share: Annotated[
        float, typer.Option("--share", metavar="PCT", help="Margins and ranges count as moved beyond this share.")
    ] = 1.0,
    json_out: Annotated[bool, typer.Option("--json", help="Print the comparison on stdout as JSON.")] = False,
    show_all: Annotated[bool, typer.Option("--all", help="Print every line of long tables.")] = False,
    on: Annotated[str | None, typer.Option("--on", metavar="DAY", help="The day of the audit; default today.")] = None,
) -> None:
    """Compare two states of a fleet: what changed, which findings came and went, whom it touches, what to look at."""
    from audit.commands.compare import run_compare

    raise typer.Exit(
        run_compare(
            before, after, suppose=suppose or [], out=out, rules=rules, packs=pack or [], share_pct=share,
            as_json=json_out, everything=show_all, audited_on=_day(on),
        )
    )  # fmt: skip


@app.command(short_help="Judge the settings that a contractor left.")
def closeout(
    returned: Annotated[Path, typer.Argument(metavar="RETURNED", help="The workbook that came back, filled in.")],
    fleet: FleetPath,
    settings: Annotated[
        Path | None,
        typer.Option("--settings", metavar="NEW_EXPORT", help="Settings read from the relays after the work."),
    ] = None,
    out: Annotated[
        Path | None, typer.Option("--out", metavar="DIR", help="Where to write; default closeout-<site>.")
    ] = None,
    rules: RulesFolder = None,
    on: Annotated[str | None, typer.Option("--on", metavar="DAY", help="The day of the close-out.")] = None,
) -> None:
    """Judge what the contractor left, say what is closed and what is not; exit 1 where something is not closed."""
    from audit.commands.closeout import run_closeout

    raise typer.Exit(run_closeout(returned, fleet, settings=settings, out=out, rules=rules, on=_day(on)))


@app.command(short_help="Show how each column of the workbooks was read.")
def columns(
    fleet: FleetPath,
    save: Annotated[
        bool, typer.Option("--save", help="Write fleet.toml beside the workbooks, to be corrected.")
    ] = False,
) -> None:
    """Print how every column of the workbooks was understood, and what was left unread."""
    from audit.commands.columns import run_columns

    raise typer.Exit(run_columns(fleet, save=save))


@app.command(short_help="Write an empty intake workbook.")
def blank(folder: Annotated[Path, typer.Argument(metavar="DIR", help="Where to write it.")]) -> None:
    """Write an empty intake workbook with notes, units, drop-downs and one example row."""
    from audit.commands.blank import run_blank

    raise typer.Exit(run_blank(folder))


@app.command(short_help="List all checks, or show one in full.")
def checks(
    name: Annotated[str | None, typer.Argument(metavar="NAME", help="One check in full.")] = None,
    verify: Annotated[bool, typer.Option("--verify", help="Run every worked case.")] = False,
    json_out: Annotated[bool, typer.Option("--json", help="Print the catalogue as JSON.")] = False,
    rules: RulesFolder = None,
) -> None:
    """Print the catalogue of checks by function, or one check with its worked cases."""
    from audit.commands.checks import run_checks

    raise typer.Exit(run_checks(name, verify=verify, as_json=json_out, rules=rules))


@app.command(short_help="Write the sample fleet into a folder.")
def sample(folder: Annotated[Path, typer.Argument(metavar="DIR", help="A folder that does not exist yet.")]) -> None:
    """Put a copy of the sample fleet, an invented site with planted defects, into a folder to try the tool on."""
    from audit.commands.sample import run_sample

    raise typer.Exit(run_sample(folder))


def main() -> None:
    """Run the command line; wrong input gives one clear message on stderr and exit 2."""
    try:
        app()
    except Refusal as error:
        print(f"motor-audit: {error}", file=sys.stderr)
        raise SystemExit(2) from error
    except OSError as error:
        print(f"motor-audit: {error.filename or 'a file'}: {error.strerror or error}", file=sys.stderr)
        raise SystemExit(2) from error


if __name__ == "__main__":
    main()
