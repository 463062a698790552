"""The command line: what the user typed to what they read, and an exit status.

0: done (sift: no finding at or above the threshold). 1: sift has such findings. 2: it could not be done, and one line
on standard error says why. 130: interrupted. 141: the reader of the output went away.
"""

from __future__ import annotations

import os
import re
import sys
from collections.abc import Callable, Mapping, Sequence
from dataclasses import replace
from pathlib import Path
from typing import TYPE_CHECKING, Any

import click

from beatwise import __version__
from beatwise.errors import BadSettings, UnknownName, UserError

if TYPE_CHECKING:
    from beatwise.memory.gauge import Pattern
    from beatwise.model.board import Board
    from beatwise.model.finding import Level
    from beatwise.report.gauge import Answer, Question
    from beatwise.report.sheet import Survey
    from beatwise.settings import Settings

DONE, FOUND, FAILED, INTERRUPTED, NO_READER = 0, 1, 2, 130, 141
EPILOG = (
    "Rates and times are estimates from the source and the board's profile; the synthesis report and the board decide."
)


def run(arguments: Sequence[str] | None = None) -> int:
    """Carry out a command line (without the program's name) and return the exit status."""
    from beatwise.report.output import complain

    try:
        typed = list(sys.argv[1:] if arguments is None else arguments)
        with commands.make_context("beatwise", typed) as context:
            status: int = commands.invoke(context)
        return status
    except click.exceptions.Exit as error:
        return error.exit_code
    except click.exceptions.NoArgsIsHelpError:
        complain(f"no command given; known are {', '.join(commands.commands)}; beatwise --help tells more")
        return FAILED
    except click.ClickException as error:
        complain(_mistyped(error))
        return FAILED
    except UserError as error:
        complain(str(error))
        return FAILED
    except BrokenPipeError:
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())  # so that the interpreter's last flush is quiet
        return NO_READER
    except KeyboardInterrupt:
        return INTERRUPTED


def _mistyped(error: click.ClickException) -> str:
    """One line that begins with the option that is wrong."""
    wrong = isinstance(error, click.BadParameter) and not isinstance(error, click.MissingParameter)
    if wrong and isinstance(error, click.BadParameter) and isinstance(error.param, click.Option):
        return (
            f"{error.param.opts[-1] if error.param.opts[-1].startswith('--') else error.param.opts[0]}: {error.message}"
        )
    return " ".join(error.format_message().split())


# ------------------------------------------------------------------------------------------------------- options


def _given(context: click.Context, option: click.Parameter, pairs: tuple[str, ...]) -> Mapping[str, int]:
    sizes: dict[str, int] = {}
    for pair in pairs:
        name, equals, value = pair.partition("=")
        if not equals or not re.fullmatch(r"[A-Za-z_][\w.:]*", name.strip()):
            raise click.BadParameter(f"{pair!r}: expected NAME=WHOLE NUMBER", context, option)
        try:
            sizes[name.strip()] = int(value, 0)
        except ValueError:
            raise click.BadParameter(f"{pair!r}: {value!r} is no whole number", context, option) from None
    return sizes


def _defined(context: click.Context, option: click.Parameter, definitions: tuple[str, ...]) -> tuple[str, ...]:
    for definition in definitions:
        if not re.match(r"[A-Za-z_]\w*(=|$)", definition):
            raise click.BadParameter(f"{definition!r}: expected NAME or NAME=VALUE", context, option)
    return definitions


PATH = click.Path(path_type=Path)
FILE = click.Path(exists=True, dir_okay=False, path_type=Path)
OUTPUT = click.Path(dir_okay=False, path_type=Path)
FORMS = click.Choice(["text", "json"])
HELP = {
    "board": "Memory profile: a name (hbm2-32ch is the default) or a TOML file.",
    "top": "Top function; else those with memory-mapped interface directives. Repeatable.",
    "given": "Value of a size that the source leaves open. Repeatable.",
    "include": "Folder to look for headers in. Repeatable.",
    "define": "Macro to define. Repeatable.",
    "directives": "External directive script. Repeatable.",
    "settings": "Settings; else beatwise.toml beside PATH or above it.",
    "as": "Format of the report.",
    "to": "Write the report there, in full or not at all.",
    "jobs": "Files analysed side by side; else one for each processor.",
    "skip-without-kernel": "Pass over named files that hold no kernel, as in a folder.",
}


def _option(name: str, metavar: str | None = None, *names: str, **how: Any) -> Callable[[Any], Any]:
    return click.option(f"--{name}", *names, metavar=metavar, help=HELP[name], **how)


READING = (
    click.argument("paths", nargs=-1, required=True, metavar="PATH...", type=PATH),
    _option("board", "NAME|FILE"),
    _option("top", "NAME", multiple=True),
    _option("given", "NAME=VALUE", multiple=True, callback=_given),
    _option("include", "DIR", multiple=True, type=PATH),
    _option("define", "NAME[=VALUE]", multiple=True, callback=_defined),
    _option("directives", "FILE", multiple=True, type=FILE),
    _option("settings", "FILE", type=FILE),
    _option("as", None, "form", type=FORMS, default="text"),
    _option("to", "FILE", type=OUTPUT),
    _option("jobs", "N", type=click.IntRange(min=1)),
    _option("skip-without-kernel", None, "only_kernels", is_flag=True),
)


def _reading(command: Callable[..., int]) -> Callable[..., int]:
    for option in reversed(READING):
        command = option(command)
    return command


# ------------------------------------------------------------------------------------------------------ commands


@click.group(epilog=EPILOG, context_settings={"help_option_names": ["-h", "--help"], "max_content_width": 100})
@click.version_option(__version__, message="beatwise %(version)s")
def commands() -> None:
    """Say for every memory access of an HLS kernel which interface it reaches, how long its contiguous runs are,
    whether they become bursts, how many GB/s that costs, and what to change."""


@commands.command(epilog=EPILOG, short_help="Findings only; for commit hooks and build servers.")
@_reading
def sift(paths: tuple[Path, ...], form: str, to: Path | None, only_kernels: bool, **options: Any) -> int:
    """Findings only; for commit hooks and build servers.

    Exit status: 0 no finding at or above the threshold (warning, unless settings say otherwise), 1 some, 2 it could not
    be done.
    """
    from beatwise.report.sheet import at_or_above

    settings = _settings(paths, **options)
    survey = _surveyed(paths, settings, only_kernels)
    counted = replace(
        survey,
        kernels=tuple(
            replace(each, findings=at_or_above(each.findings, settings.threshold)) for each in survey.kernels
        ),
    )
    if form == "json":
        _deliver_json(counted, to)
    else:
        _deliver_text(survey, to, settings.threshold)
    _tell(survey)
    if survey.failed:
        return FAILED
    return FOUND if any(each.findings for each in counted.kernels) else DONE


@commands.command(epilog=EPILOG, short_help="The full picture of each kernel.")
@_reading
def audit(paths: tuple[Path, ...], form: str, to: Path | None, only_kernels: bool, **options: Any) -> int:
    """The full picture of each kernel: what its interfaces get of what they could get, findings, accesses, streams.

    Exit status: 0 done, 2 it could not be done.
    """
    survey = _surveyed(paths, _settings(paths, **options), only_kernels)
    if form == "json":
        _deliver_json(survey, to)
    else:
        _deliver_text(survey, to)
    _tell(survey)
    return FAILED if survey.failed else DONE


@commands.command(short_help="The page of a rule, or all rules.")
@click.argument("rule", required=False)
def why(rule: str | None) -> int:
    """The page of a rule: what happens on the bus, when it matters, what to change. Without RULE: all rules."""
    from beatwise.report import manual
    from beatwise.report.output import columns, deliver
    from beatwise_rules import page, rule_names

    if rule is None:
        deliver(manual.contents({name: page(name) for name in rule_names()}, columns(sys.stdout)))
        return DONE
    if rule not in rule_names():
        raise UnknownName("rule", rule, rule_names())
    deliver(manual.page(rule, page(rule)))
    return DONE


def _run(context: click.Context, option: click.Parameter, text: str | None) -> int | str | None:
    """Bytes, or ``sequential``; nothing where the pattern decides."""
    if text is None or text == "sequential":
        return text
    if not re.fullmatch(r"[0-9]{1,15}", text) or int(text) < 1:
        raise click.BadParameter(f"{text!r}: expected a number of bytes, at least 1, or sequential", context, option)
    return int(text)


COUNT = click.IntRange(min=1, max=10**15)


@commands.command(epilog=EPILOG, short_help="What a pattern gets on a board, without source.")
@click.option("--board", metavar="NAME|FILE", default="hbm2-32ch", help=HELP["board"])
@click.option("--direction", type=click.Choice(["read", "write", "mixed"]), default="read")
@click.option("--run", metavar="BYTES|sequential", callback=_run, help="Consecutive bytes; sequential: without end.")
@click.option("--stride", metavar="BYTES", type=COUNT, help="From the start of a run to the next; else random.")
@click.option("--random", is_flag=True, help="Random places; also what --run means without --stride.")
@click.option("--width", metavar="BITS", type=COUNT, help="Of the port; else the widest that pays on the board.")
@click.option("--burst", metavar="BEATS", type=click.IntRange(1, 256), help="Longest transaction; else the board's.")
@click.option("--outstanding", metavar="N", type=COUNT, help="Transactions at a time; else the board's.")
@click.option("--channels", metavar="K", type=COUNT, default=1, help="Channels that the port reaches at random.")
@click.option("--ports", metavar="P", type=COUNT, default=1, help="Ports that share the channel; the rate is of one.")
@click.option("--clock", metavar="MHZ", type=click.FloatRange(min=0, min_open=True), help="Of the kernel.")
@click.option("--sweep", metavar="NAME=FIRST:LAST", help="Double one number, as in run=32:65536; text is a chart.")
@_option("as", None, "form", type=FORMS, default="text")
@_option("to", "FILE", type=OUTPUT)
def gauge(board: str, form: str, to: Path | None, sweep: str | None, run: int | str | None, **numbers: Any) -> int:
    """What a pattern gets on a board, without source, and which limit holds it.

    Without --run the traffic is sequential; with --stride or --random, one granule at each place. GB/s are 10^9 useful
    bytes a second of one port; mixed: its reads and writes together. Exit status: 0 done, 2 it could not be done.
    """
    from beatwise.memory import boards
    from beatwise.memory import gauge as patterns
    from beatwise.report import gauge as report
    from beatwise.report.output import columns
    from beatwise.report.terminal import capable

    profile = boards.board(board)
    if run == "sequential" and (numbers["stride"] is not None or numbers["random"]):
        raise BadSettings("run: sequential traffic has no stride and no random places")
    pattern = patterns.Pattern(run=run if isinstance(run, int) else None, **numbers)
    if run == "sequential":
        pattern = replace(pattern, channels=1)
    if sweep is None:
        text = report.gauge_text if form == "text" else report.gauge_json
        _deliver(text(_question(profile, pattern), _answer(profile, pattern)), to)
        return DONE
    name, first, last = patterns.sweep_range(sweep)
    points = [(value, _answer(profile, each)) for value, each in patterns.sweep(pattern, name, first, last)]
    question = _question(profile, patterns.numbered(pattern, name, first), swept=name)
    if form == "json":
        _deliver(report.sweep_json(question, name, points), to)
        return DONE
    ascii_only = capable(sys.stdout)[1] if to is None else False
    chart = report.sweep_text(question, name, points, width=columns(sys.stdout), ascii_only=ascii_only)
    _deliver(chart, to)
    return DONE


@commands.command(short_help="The memory profiles, and one in detail.")
@click.argument("name", required=False, metavar="[NAME|FILE]")
def boards(name: str | None) -> int:
    """The memory profiles; with NAME or FILE every fact of one, with its source."""
    from beatwise.memory import board, board_names
    from beatwise.report.boards import board_text, boards_text
    from beatwise.report.output import columns, deliver

    if name is None:
        deliver(boards_text(board(each) for each in board_names()))
    else:
        deliver(board_text(board(name), columns(sys.stdout)))
    return DONE


# --------------------------------------------------------------------------------------------------------- steps


def _answer(board: Board, pattern: Pattern) -> Answer:
    from beatwise.memory.gauge import demand
    from beatwise.memory.price import price
    from beatwise.report.gauge import Answer

    answer = price(board, demand(board, pattern))
    return Answer(
        answer.gbps, answer.limit, {str(name): gbps for name, gbps in answer.limits.items()}, answer.share_of_peak
    )


def _question(board: Board, pattern: Pattern, swept: str | None = None) -> Question:
    from beatwise.memory.gauge import words
    from beatwise.report.gauge import Question

    return Question(board.name, board.peak_gbps, words(board, pattern, swept))


def _settings(paths: Sequence[Path], settings: Path | None, **options: Any) -> Settings:
    """What the settings file says, then what the command line says."""
    from beatwise.settings import Settings, find_settings, merge, read_settings

    found = [settings] if settings else list(dict.fromkeys(map(find_settings, paths)))
    if len(found) > 1:
        files = " and ".join(str(file) if file else "none" for file in found[:2])
        raise BadSettings(
            f"the paths have different settings ({files}): survey them apart, or name one with --settings"
        )
    base = Settings()
    if found[0] is not None:
        from beatwise_rules import rule_names

        base = read_settings(found[0], trusted=settings is not None, rules=rule_names())
    return merge(base, **options)


def _surveyed(paths: Sequence[Path], settings: Settings, only_kernels: bool) -> Survey:
    from beatwise.survey import survey

    return survey(paths, settings, only_kernels=only_kernels)


def _deliver_json(survey: Survey, to: Path | None) -> None:
    from beatwise.report.json import as_json

    _deliver(as_json(survey), to)


def _deliver_text(survey: Survey, to: Path | None, threshold: Level | None = None) -> None:
    """The report as text: an audit, or with a threshold what sift shows."""
    from beatwise.report.output import columns
    from beatwise.report.terminal import audit_text, capable, sift_text

    colour, ascii_only = capable(sys.stdout) if to is None else (False, False)
    width = columns(sys.stdout)
    if threshold is not None:
        _deliver(sift_text(survey, threshold, width=width, colour=colour, ascii_only=ascii_only), to)
        return
    told_beside = to is None and sys.stdout.isatty() and sys.stderr.isatty()
    text = audit_text(survey, width=width, colour=colour, ascii_only=ascii_only, problems=not told_beside)
    _deliver(text, to)


def _deliver(text: str, to: Path | None) -> None:
    from beatwise.report.output import deliver

    try:
        deliver(text, to)
    except BrokenPipeError:
        raise
    except OSError as error:
        raise UserError(f"{to or 'standard output'}: cannot be written ({error.strerror or error})") from error


def _tell(survey: Survey) -> None:
    from beatwise.report.output import complain
    from beatwise.report.terminal import problem_line

    for problem in survey.problems:
        complain(problem_line(problem))
