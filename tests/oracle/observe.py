"""Runs a kernel under the compiler's own instrumentation and sorts what it touched by place in the source.

``g++ -fsanitize=thread`` calls a hook before every load and store; ours (``runtime/hooks.cpp``) write the address down.
The kernel is not changed: a generated ``main`` includes it and calls its top function with filled memory.

What the compiler does not instrument: a plain record that goes from memory straight into a call (``f(a[i])``) or from a
call straight into memory (``a[i] = f()``). The second is noticed and refused; a test kernel must not do the first.
"""

from __future__ import annotations

import hashlib
import os
import re
import struct
import subprocess
import threading
from bisect import bisect_right
from collections import Counter
from dataclasses import dataclass
from functools import cached_property
from itertools import pairwise
from pathlib import Path
from typing import TYPE_CHECKING, Literal

if TYPE_CHECKING:
    from collections.abc import Iterable, Sequence

HERE = Path(__file__).parent
FLAGS = (
    *("-std=c++17", "-O0", "-g", "-gdwarf-4", "-fno-builtin", "-fno-threadsafe-statics", "-fsanitize=thread"),
    *("-no-pie", "-w", f"-I{HERE / 'runtime'}", f"-I{HERE / 'headers'}"),
)
WRAPPED = "-Wl,--wrap=memcpy,--wrap=memset,--wrap=memmove"
LIMIT_SECONDS = 60  #: for a compiler or a kernel to end
EVENT = struct.Struct("=IIIHHQQ")  # struct Event of runtime/hooks.cpp

Direction = Literal["read", "write"]


class OracleError(Exception):
    """The compiler or the kernel failed; the message holds what it said."""


@dataclass(frozen=True, slots=True)
class Argument:
    """One argument of the top function, in order.

    ``kind`` is ``scalar`` (``value`` is its text), ``memory`` (``count`` elements of the innermost type) or ``stream``
    (holding ``count`` elements at the start). ``fill`` is the name of a ``Fill`` of runtime/harness.h with its bounds.
    ``told`` is False for a scalar whose value the analysed program is not to be given.
    """

    name: str
    kind: Literal["scalar", "memory", "stream"]
    value: str = ""
    count: int = 0
    fill: tuple[str, int, int] = ("range", 0, 255)
    told: bool = True


@dataclass(frozen=True)
class Observed:
    """All that one access site did to one argument. A piece is (first element, elements): longer than 1 for a copy."""

    line: int
    argument: str
    direction: Direction
    element_bytes: int
    calls: tuple[int, ...]  #: lines of the calls that lead to it, outermost first
    site: int  #: tells two accesses of one line apart
    pieces: tuple[tuple[int, int], ...]
    times: tuple[int, ...]  #: when each piece was touched: a position in the whole kernel's accesses
    copies: bool

    @property
    def executions(self) -> int:
        return len(self.pieces)

    @cached_property
    def run(self) -> float:
        return run_of(self.pieces, self.copies)

    @cached_property
    def pattern(self) -> str:
        return pattern_of(self.pieces, self.copies)

    @cached_property
    def step_bytes(self) -> int | None:
        """The most frequent step from one element to the next."""
        return None if len(self.pieces) < 2 else common_step(self.pieces)[0] * self.element_bytes


def run_of(pieces: Sequence[tuple[int, int]], copies: bool = False) -> float:
    """Mean number of consecutive ascending elements before the address first jumps; a copy is a run by itself.

    >>> run_of([(0, 1), (1, 1), (2, 1), (8, 1), (9, 1), (10, 1)])
    3.0
    >>> run_of([(0, 64), (64, 64)], copies=True)
    64.0
    """
    elements = sum(count for _, count in pieces)
    jumps = sum(copies or after[0] != before[0] + before[1] for before, after in pairwise(pieces))
    return elements / (jumps + 1)


def common_step(pieces: Sequence[tuple[int, int]]) -> tuple[int, float]:
    """The most frequent step in elements and its share of all steps; +1 wins a tie."""
    steps = Counter(after[0] - before[0] for before, after in pairwise(pieces))
    step = max(steps, key=lambda step: (steps[step], step == 1))
    return step, steps[step] / (len(pieces) - 1)


def pattern_of(pieces: Sequence[tuple[int, int]], copies: bool = False) -> str:
    """What addresses alone tell: single, sequential, descending, strided, repeated; else ``scattered``.

    >>> pattern_of([(5, 1), (4, 1), (3, 1)]), pattern_of([(0, 1), (64, 1), (128, 1), (1, 1), (65, 1), (129, 1)])
    ('descending', 'strided')
    """
    if copies and any(count > 1 for _, count in pieces):
        return "sequential"
    if len(pieces) == 1:
        return "single"
    step, share = common_step(pieces)
    if step == 1 and share >= 0.4:
        return "sequential"
    if share < 0.5:
        return "scattered"
    return {0: "repeated", -1: "descending"}.get(step, "strided")


def observe(
    source: Path, top: str, arguments: Sequence[Argument], scratch: Path, includes: Sequence[Path] = ()
) -> tuple[Observed, ...]:
    """Compiles and runs ``top`` of ``source``. What is built stays in ``scratch``, for the next time."""
    main = main_text(source, top, arguments)
    program = build(source, main, scratch, includes)
    places = line_table(program)
    code = scratch / f"{program.name}.code"
    code.write_text("".join(f"{low:x} {high:x}\n" for low, high in user_code(program, places, source.name)))
    events = scratch / f"{program.name}.events"
    done = run([str(program), str(code), str(events)])
    elements = [(name, int(size), bool(int(is_record))) for name, size, is_record in map(str.split, done.splitlines())]
    return sort_events(events.read_bytes(), elements, places)


def main_text(source: Path, top: str, arguments: Sequence[Argument]) -> str:
    """A ``main`` that makes the arguments, calls the kernel and writes the events to the file named second."""
    made, passed = [], []
    for position, argument in enumerate(arguments):
        kind = f"std::tuple_element_t<{position}, Arguments>"
        name, low, high = argument.fill
        fill = f"{argument.count}, oracle::Fill::{name}, {low}, {high}"
        match argument.kind:
            case "scalar":
                passed.append(f"static_cast<{kind}>({argument.value})")
            case "memory":
                made.append(f'auto* a{position} = oracle::buffer<{kind}>({fill}, "{argument.name}");')
                passed.append(f"oracle::pass<{kind}>(a{position})")
            case "stream":
                made.append(f"static std::remove_reference_t<{kind}> a{position};")
                made.append(f"oracle::preload(a{position}, {fill});")
                passed.append(f"a{position}")
    body = "\n    ".join(made)
    return f"""\
#include "harness.h"
#include "{source.resolve()}"
using Arguments = decltype(oracle::arguments_of(&{top}));
ORACLE_QUIET int main(int, char** argv) {{
    {body}
    oracle_start(argv[1]);
    {top}({", ".join(passed)});
    oracle_finish(argv[2]);
}}
"""


def build(source: Path, main: str, scratch: Path, includes: Sequence[Path]) -> Path:
    """The instrumented program; named by everything it is made of."""
    given = [source, *sorted(path for folder in includes for path in folder.rglob("*") if path.is_file())]
    parts = [main, *(path.read_text() for path in [*given, *own_files()])]
    program = scratch / f"{source.stem}-{hashlib.sha256(chr(0).join(parts).encode()).hexdigest()[:16]}"
    if not program.exists():
        entry = unready_name(program).with_suffix(".cpp")
        entry.write_text(main)
        folders = [f"-I{folder}" for folder in (*includes, source.parent)]
        unready = unready_name(program)
        run(["g++", *FLAGS, *folders, str(entry), str(hooks(scratch)), WRAPPED, "-o", str(unready)])
        unready.replace(program)
    return program


def hooks(scratch: Path) -> Path:
    """The compiled hooks, which must not be instrumented themselves."""
    source = HERE / "runtime" / "hooks.cpp"
    compiled = scratch / f"hooks-{hashlib.sha256(source.read_bytes()).hexdigest()[:16]}.o"
    if not compiled.exists():
        unready = unready_name(compiled)
        run(["g++", "-std=c++17", "-O2", "-fno-tree-loop-distribute-patterns", "-c", str(source), "-o", str(unready)])
        unready.replace(compiled)
    return compiled


def unready_name(file: Path) -> Path:
    """Where it is made before it is moved into place: several threads or processes may make the same file."""
    return file.with_name(f"{file.name}.{os.getpid()}.{threading.get_ident()}")


def own_files() -> list[Path]:
    return sorted([*(HERE / "runtime").iterdir(), *(HERE / "headers").iterdir()])


def run(command: Sequence[str]) -> str:
    try:
        done = subprocess.run(command, capture_output=True, text=True, timeout=LIMIT_SECONDS, check=False)
    except (OSError, subprocess.TimeoutExpired) as error:
        raise OracleError(str(error)) from error
    if done.returncode != 0:
        raise OracleError(f"{command[0]} ended with {done.returncode}: {done.stderr[:3000]}")
    return done.stdout


def line_table(program: Path) -> list[tuple[int, int, str, int]]:
    """(first address, one past the last, file, line), ascending, from the program's debug information."""
    rows: list[tuple[int, int, str, int]] = []
    last: tuple[int, str, int] | None = None
    for text in run(["readelf", "-W", "--debug-dump=decodedline", str(program)]).splitlines():
        words = text.split()
        if len(words) < 3 or not (words[2].startswith("0x") or words[1] == "-"):
            continue
        address = int(words[2], 16)
        if last and address > last[0]:
            rows.append((last[0], address, last[1], last[2]))
        last = None if words[1] == "-" else (address, words[0], int(words[1]))
    return sorted(rows)


COPIES = re.compile(r"(C[12]|aS)E(RK|O)S\d*_$")  #: mangled copy and move constructors and assignments


def user_code(program: Path, places: Sequence[tuple[int, int, str, int]], file: str) -> list[tuple[int, int]]:
    """Address ranges of the user's file. Copy constructors and assignments count as part of the place that calls them:
    the compiler writes most of them, and puts them on the line of the record."""
    copies = []
    for text in run(["readelf", "-W", "--syms", str(program)]).splitlines():
        words = text.split()
        if len(words) == 8 and words[3] == "FUNC" and COPIES.search(words[7]):
            copies.append((int(words[1], 16), int(words[1], 16) + int(words[2])))
    return [
        (low, high)
        for low, high, name, _ in places
        if name == file and not any(start <= low < end for start, end in copies)
    ]


def sort_events(
    data: bytes, elements: Sequence[tuple[str, int, bool]], places: Sequence[tuple[int, int, str, int]]
) -> tuple[Observed, ...]:
    """The events by site: the address of the access in user code, the way there, the argument and the direction."""
    (count,) = struct.unpack_from("=I", data)
    tree = list(struct.iter_unpack("=II", data[4 : 4 + 8 * count]))
    starts = [low for low, *_ in places]

    def line(pc: int) -> int:
        return places[bisect_right(starts, pc - 1) - 1][3]

    def calls(node: int) -> tuple[int, ...]:
        return () if node == 0 else (*calls(tree[node][0]), line(tree[node][1]))

    sites: dict[tuple[int, int, int, int], list[tuple[int, int, int, int]]] = {}
    for time, (pc, node, instance, buffer, kind, offset, size) in enumerate(EVENT.iter_unpack(data[4 + 8 * count :])):
        sites.setdefault((pc, node, buffer, kind), []).append((time, instance, offset, size))
    observed = []
    for (pc, node, buffer, kind), touched in sites.items():
        name, declared, is_record = elements[buffer]
        copies = bool(kind & 2)
        element = declared if copies else element_bytes(declared, is_record, touched)
        pieces, times = pieces_of(touched, element, copies)
        direction: Direction = "write" if kind & 1 else "read"
        observed.append(Observed(line(pc), name, direction, element, calls(node), pc, pieces, times, copies))
    return tuple(sorted(observed, key=lambda site: (site.line, site.argument, site.direction, site.site, site.calls)))


def element_bytes(declared: int, is_record: bool, touched: Iterable[tuple[int, int, int, int]]) -> int:
    """A part of a record is an access to the record; a number of another size was reached through a cast."""
    widest = max(size for _, _, _, size in touched)
    return declared if is_record and widest <= declared else widest


def pieces_of(
    touched: Iterable[tuple[int, int, int, int]], element: int, copies: bool
) -> tuple[tuple[tuple[int, int], ...], tuple[int, ...]]:
    """(element, count) for each access, and its time. What one call into a header does to one element is one access."""
    pieces: list[tuple[int, int]] = []
    times = []
    before = (0, -1)
    for time, instance, offset, size in touched:
        piece = (offset // element, max(1, size // element) if copies else 1)
        if instance and before == (instance, piece[0]):
            continue
        before = (instance, piece[0])
        pieces.append(piece)
        times.append(time)
    return tuple(pieces), tuple(times)
