"""Expectations written in a kernel's comments, and whether what was observed bears them out.

A kernel says how it is run in lines ``// truth: TOP ARGUMENT...``, the arguments in the order of the parameters::

    n=1000        a number, given to the analysed program too        n~1000    one that is not given to it
    in[4096]      memory of 4096 elements, numbers from 0 to 255     idx[64]=0..9   from 0 to 9
    s<64>         a stream that holds 64 elements at the start       row[65]=rows:2..6   sums of 2 to 6, from 0

Other fills are ``iota``, ``permutation``, ``cycle`` (each element names the next of one round) and ``zero``. The word
``quiet`` says that no finding of level warning or error is due, ``tells=RULE`` that one is, wherever; ``needs=FOLDER``
holds headers that only the run is to have, ``directives=FILE`` is a script for the analysed program; both lie beside
the file that names them or beside the kernel.

On the line of an access stands what is true of it, one ``//!`` per kind of access on the line::

    sum += a[i * pitch];  //! read a strided stride=256 tells=strided-access

Two patterns, as in ``sequential/indirect``, are both true: runs whose starts come from data. ``run=`` is in elements;
``run=data`` says that only the data of the day decide it, ``run=unknown`` that something not given to the analysed
program does. It may be left out for patterns whose run is 1 and for ``steered``, ``indirect``, ``irregular`` and
``unresolved``. ``joined`` measures all sites of the kernel on this argument and direction that are marked so as one
sequence; ``joined=NAME`` those of that name. ``guarded``, ``basis=`` and ``tells=`` cannot be seen in addresses; they
are for the comparison with the analysed program.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from typing import TYPE_CHECKING

from oracle.observe import Argument, Observed, pattern_of, run_of

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence
    from pathlib import Path

PATTERNS = frozenset(
    {"sequential", "descending", "strided", "repeated", "indirect", "steered", "irregular", "single", "unresolved"}
)
RUN_IS_ONE = frozenset({"descending", "strided", "repeated", "single"})
SEEN = RUN_IS_ONE | {"sequential"}  #: addresses alone tell these
TOLERANCE = 0.10  #: of a run, relative


@dataclass(frozen=True, slots=True)
class Expectation:
    """What is true of the accesses of one line to one argument in one direction. Any of ``patterns`` is true of them.
    ``run`` None: not stated."""

    line: int
    argument: str
    direction: str
    patterns: tuple[str, ...]
    run: float | None = None
    stride_bytes: int | None = None
    element_bytes: int | None = None
    guarded: bool = False
    joined: str | None = None
    basis: str | None = None
    tells: tuple[str, ...] = ()

    @property
    def key(self) -> tuple[int, str, str]:
        return self.line, self.argument, self.direction


@dataclass(frozen=True, slots=True)
class Truth:
    """How a kernel is run, and what is true of it."""

    top: str
    arguments: tuple[Argument, ...]
    expectations: tuple[Expectation, ...]
    quiet: bool = False
    tells: tuple[str, ...] = ()
    needs: str | None = None
    directives: str | None = None

    @property
    def given(self) -> tuple[str, ...]:
        """``NAME=VALUE`` for each number that the analysed program is told."""
        return tuple(f"{one.name}={one.value}" for one in self.arguments if one.kind == "scalar" and one.told)


def read_truth(path: Path) -> Truth:
    """Reads the comments of a kernel, or a ``.truth`` file with lines ``LINE: read a sequential run=4``."""
    words: list[str] = []
    expectations: list[Expectation] = []
    for number, line in enumerate(path.read_text().splitlines(), 1):
        if head := re.match(r"\s*// truth: (.*)", line):
            words += head[1].split()
        elif beside := re.match(r"(\d+): (.*)", line):
            expectations += expectations_of(int(beside[1]), beside[2])
        else:
            for text in line.split("//!")[1:]:
                expectations += expectations_of(number, text)
    flags = {word for word in words[1:] if re.fullmatch(r"quiet|(tells|needs|directives)=.*", word)}
    arguments = tuple(argument_of(word) for word in words[1:] if word not in flags)
    parts = [flag.partition("=") for flag in sorted(flags)]
    values = {name: tuple(value for key, _, value in parts if key == name) for name in ("tells", "needs", "directives")}
    return Truth(
        words[0],
        arguments,
        tuple(expectations),
        "quiet" in flags,
        values["tells"],
        *(next(iter(values[name]), None) for name in ("needs", "directives")),
    )


def argument_of(word: str) -> Argument:
    if scalar := re.fullmatch(r"(\w+)([=~])([-+.\w]+)", word):
        return Argument(scalar[1], "scalar", value=scalar[3], told=scalar[2] == "=")
    memory = re.fullmatch(r"(\w+)(?:\[(\d+)\]|<(\d*)>)(?:=(.*))?", word)
    if memory is None:
        raise ValueError(f"not an argument: {word}")
    kind, count = ("memory", memory[2]) if memory[2] else ("stream", memory[3] or "0")
    return Argument(memory[1], kind, count=int(count), fill=fill_of(memory[4] or "0..255"))  # type: ignore[arg-type]


def fill_of(text: str) -> tuple[str, int, int]:
    name, _, bounds = text.rpartition(":")
    if ".." not in bounds:
        return bounds, 0, 0
    low, high = bounds.split("..")
    return name or "range", int(low), int(high)


def expectations_of(line: int, text: str) -> list[Expectation]:
    direction, names, stated, *facts = text.split()
    patterns = tuple(stated.split("/"))
    if not PATTERNS.issuperset(patterns) or direction not in ("read", "write"):
        raise ValueError(f"line {line}: {text}")
    values = dict(fact.split("=", 1) for fact in facts if "=" in fact and not fact.startswith("tells="))
    flags = {fact for fact in facts if "=" not in fact}
    unknown = (flags - {"guarded", "joined"}) | (set(values) - {"run", "stride", "element", "basis", "joined"})
    if unknown:
        raise ValueError(f"line {line}: {' '.join(sorted(unknown))}")
    tells = tuple(fact.removeprefix("tells=") for fact in facts if fact.startswith("tells="))
    run = values.get("run", "1" if RUN_IS_ONE.issuperset(patterns) else None)
    if run is None and "sequential" in patterns:
        raise ValueError(f"line {line}: a sequential access needs a run")
    run = None if run in ("data", "unknown") else run
    stride, element = values.get("stride"), values.get("element")
    return [
        Expectation(
            line,
            name,
            direction,
            patterns,
            float(run) if run is not None else None,
            int(stride) if stride else None,
            int(element) if element else None,
            "guarded" in flags,
            values.get("joined", "" if "joined" in flags else None),
            values.get("basis"),
            tells,
        )
        for name in names.split(",")
    ]


def agrees(run: float, expected: float | None) -> bool:
    return expected is None or abs(run - expected) <= TOLERANCE * expected


def objections(truth: Truth, observed: Sequence[Observed]) -> list[str]:
    """A line for each observed site that no expectation describes, and for each expectation that nothing bears out."""
    found = []
    borne_out: set[Expectation] = set()
    for site in observed:
        key = (site.line, site.argument, site.direction)
        candidates = [one for one in truth.expectations if one.key == key]
        matching = [one for one in candidates if describes(one, site, joined_with(one, truth, observed))]
        borne_out.update(matching)
        if not matching:
            found.append(f"{show(site)} is not described by {candidates or 'any expectation'}")
    missing = [one for one in truth.expectations if one not in borne_out]
    return found + [f"nothing bears out {one}" for one in missing]


def describes(expectation: Expectation, site: Observed, joined: Sequence[Observed]) -> bool:
    pieces = join(joined) if joined else site.pieces
    pattern = pattern_of(pieces, site.copies)
    run = 1.0 if "repeated" in expectation.patterns else run_of(pieces, site.copies)
    if SEEN.issuperset(expectation.patterns) and pattern not in expectation.patterns:
        return False
    if expectation.element_bytes not in (None, site.element_bytes):
        return False
    if expectation.stride_bytes not in (None, site.step_bytes):
        return False
    return agrees(run, expectation.run)


def joined_with(expectation: Expectation, truth: Truth, observed: Sequence[Observed]) -> list[Observed]:
    """The sites that make one sequence with those of ``expectation``: all marked so on its argument and direction."""
    if expectation.joined is None:
        return []
    together = (expectation.joined, *expectation.key[1:])
    keys = {one.key for one in truth.expectations if (one.joined, *one.key[1:]) == together}
    return [site for site in observed if (site.line, site.argument, site.direction) in keys]


def join(sites: Sequence[Observed]) -> list[tuple[int, int]]:
    """The pieces of several sites as one sequence: the order of time, or that of the addresses within one step.

    Sites that take turns are one step of the sequence together, in whatever order the step touches them.
    """
    by_time = [
        piece for _, piece in sorted(timed for site in sites for timed in zip(site.times, site.pieces, strict=True))
    ]
    if len({site.executions for site in sites}) > 1:
        return by_time
    by_step = [piece for step in zip(*(site.pieces for site in sites), strict=True) for piece in sorted(step)]
    return max(by_time, by_step, key=run_of)


def show(site: Observed) -> str:
    way = "".join(f" via {line}" for line in site.calls)
    return (
        f"line {site.line}: {site.direction} {site.argument} {site.pattern} run={site.run:.6g} step={site.step_bytes} "
        f"element={site.element_bytes} executions={site.executions}{way}"
    )


def report(observed: Iterable[Observed]) -> str:
    """All sites, one a line: to write expectations from."""
    return "\n".join(show(site) for site in observed)
