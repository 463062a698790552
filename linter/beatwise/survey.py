"""The whole program on one screen: paths and settings in, a survey of every kernel out."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING

from beatwise.errors import UnknownName
from beatwise.memory import boards
from beatwise.model.access import Trace
from beatwise.model.board import Board
from beatwise.model.finding import Facts, Finding
from beatwise.model.kernel import Directive, Problem, Program
from beatwise.model.traffic import KernelTime, PortTraffic, Traffic
from beatwise.report.sheet import Sheet, Survey, sheet
from beatwise.settings import Settings
from beatwise.workers import Done, Limits, each

if TYPE_CHECKING:
    from beatwise.source.acceptances import Acceptance


@dataclass(frozen=True, slots=True)
class KernelSurvey:
    """One kernel with all that is known about it."""

    trace: Trace
    traffic: tuple[Traffic, ...]
    ports: tuple[PortTraffic, ...]
    findings: tuple[Finding, ...]
    time: KernelTime


@dataclass(frozen=True, slots=True)
class Task:
    """One group of files to analyse together, with all that the analysis needs: it may happen in another process."""

    files: Mapping[str, str]
    includes: Mapping[str, str]
    board: Board
    script: tuple[Directive, ...]
    settings: Settings


@dataclass(frozen=True, slots=True)
class Outcome:
    """What became of a group. ``complete``: every file was read in full and a kernel was found."""

    sheets: tuple[Sheet, ...] = ()
    problems: tuple[Problem, ...] = ()
    complete: bool = False
    functions: tuple[str, ...] = ()  #: that there are, when the top function asked for is not among them
    acceptances: tuple[Acceptance, ...] = ()
    used: frozenset[Acceptance] = frozenset()


def survey(paths: Sequence[Path], settings: Settings, *, only_kernels: bool = False) -> Survey:
    """The survey of all kernels in the files and folders, in their order. UserError when it cannot be begun.

    ``only_kernels``: named files are treated like those found in a folder, passed over when they hold no kernel.
    """
    from beatwise.source.files import gather

    memory, script = boards.board(settings.board), _script(settings.directives)
    gathered = gather(
        paths, include=settings.include, tops=settings.top, ignore=settings.ignore, only_kernels=only_kernels
    )
    tasks = [Task(group.files, group.includes, memory, script, settings) for group in gathered.groups]
    limits = Limits(settings.time_limit_seconds, settings.memory_limit_mb)
    outcomes = [
        answer.result if isinstance(answer, Done) else Outcome(problems=(Problem(group.name, None, answer.why),))
        for group, answer in zip(gathered.groups, each(analyse, tasks, limits=limits, jobs=settings.jobs), strict=True)
    ]
    _check_tops(settings.top, outcomes)
    named = {group.name for group in gathered.groups} & _names(paths)
    incomplete = {group.name for group, outcome in zip(gathered.groups, outcomes, strict=True) if not outcome.complete}
    problems = [
        *gathered.problems,
        *(problem for outcome in outcomes for problem in outcome.problems),
        *_idle(outcomes),
    ]
    return Survey(
        kernels=tuple(sheet for outcome in outcomes for sheet in outcome.sheets),
        problems=tuple(dict.fromkeys(problems)),
        board=memory.name,
        failed=bool(incomplete & named) or (bool(outcomes) and len(incomplete) == len(outcomes)),
    )


def survey_texts(
    files: Mapping[str, str],
    *,
    board: str = "hbm2-32ch",
    given: Mapping[str, int] | None = None,
    top: str | None = None,
    includes: Mapping[str, str] | None = None,
    defines: Sequence[str] = (),
    script: str = "",
) -> tuple[KernelSurvey, ...]:
    """The kernels of some texts (name -> text), analysed here and now, without a worker's limits."""
    from beatwise.source.directives import read_script

    settings = Settings(given=given or {}, define=tuple(defines))
    task = Task(files, includes or {}, boards.board(board), read_script(script, "script"), settings)
    return _program(task, top)[1]


def analyse(task: Task) -> Outcome:
    """One group, from text to sheets; what a worker does."""
    from beatwise.acceptance import accepted, accepts
    from beatwise.frontend.program import NoSuchTop
    from beatwise.source.acceptances import acceptances_in

    name = next(iter(task.files))
    programs: list[tuple[Program, tuple[KernelSurvey, ...]]] = []
    functions: list[str] = []
    for top in task.settings.top or (None,):
        try:
            programs.append(_program(task, top))
        except NoSuchTop as error:
            functions += error.names
    if not programs:
        return Outcome(complete=True, functions=tuple(functions))
    kernels = [kernel for _, found in programs for kernel in found]
    unread = [problem for program, _ in programs for problem in program.problems]
    if not kernels and not unread:
        unread = [Problem(name, None, "no kernel function in it")]
    broken = {problem.file for problem in unread}
    told = [problem for each in kernels for problem in each.trace.problems if problem.file not in broken]
    texts = {**task.files, **task.includes}
    acceptances = tuple(acceptance for file, text in texts.items() for acceptance in acceptances_in(text, file))
    findings = [finding for kernel in kernels for finding in kernel.findings]
    return Outcome(
        sheets=tuple(
            sheet(each.trace, each.traffic, each.ports, accepted(each.findings, acceptances), each.time)
            for each in kernels
        ),
        problems=tuple(dict.fromkeys([*unread, *told])),  # what an error in the text entails is not told beside it
        complete=not unread,
        acceptances=acceptances,
        used=frozenset(each for each in acceptances if any(accepts(each, finding) for finding in findings)),
    )


def _program(task: Task, top: str | None) -> tuple[Program, tuple[KernelSurvey, ...]]:
    """The program below a top function, or below all that look like one, with its kernels."""
    from beatwise.frontend.program import read_program

    program = read_program(
        task.files, top=top, includes=task.includes, defines=task.settings.define, script=task.script
    )
    return program, _kernels(program, task.board, task.settings)


def _kernels(program: Program, board: Board, settings: Settings) -> tuple[KernelSurvey, ...]:
    from beatwise.trace import trace_program
    from beatwise.traffic.rates import measure
    from beatwise.traffic.time import kernel_time
    from beatwise_rules import Thresholds, ask

    limits = settings.limits
    thresholds = Thresholds(limits.error_loss, limits.warning_loss, limits.error_share)
    found = []
    for trace in trace_program(program, settings.given):
        measured = measure(trace, board, settings.given)
        time = kernel_time(trace, measured.traffic, board, settings.given)
        facts = Facts(trace, board, measured.traffic, measured.ports, settings.given, time)
        findings = ask(facts, thresholds=thresholds, levels=settings.levels)
        found.append(KernelSurvey(trace, measured.traffic, measured.ports, findings, time))
    return tuple(found)


def _script(paths: Sequence[Path]) -> tuple[Directive, ...]:
    from beatwise.source.directives import read_script
    from beatwise.source.read import read_text, shown

    return tuple(directive for path in paths for directive in read_script(read_text(path).text, shown(path)))


def _names(paths: Sequence[Path]) -> set[str]:
    from beatwise.source.read import shown

    return {shown(path) for path in paths}


def _check_tops(tops: Sequence[str], outcomes: Sequence[Outcome]) -> None:
    """A top function that is nowhere is a mistake in the command; a file that was lost might have held it."""
    if not all(outcome.complete for outcome in outcomes):
        return
    present = {sheet.kernel for outcome in outcomes for sheet in outcome.sheets}
    known = present.union(*(outcome.functions for outcome in outcomes))
    for top in tops:
        if top.rpartition("::")[2] not in present:
            raise UnknownName("top function", top, known)


def _idle(outcomes: Sequence[Outcome]) -> tuple[Problem, ...]:
    """Acceptances that do not count anywhere; a header's may count in one group and be idle in another."""
    acceptances = [acceptance for outcome in outcomes for acceptance in outcome.acceptances]
    if not acceptances:
        return ()
    from beatwise.acceptance import idle
    from beatwise_rules import rule_names

    return idle(acceptances, frozenset().union(*(outcome.used for outcome in outcomes)), rule_names())
