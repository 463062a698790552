"""What the tracer hands on: the accesses of a kernel, with the loops around them and the addresses they make."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal

from beatwise.model.form import Form, Symbol
from beatwise.model.kernel import Directive, Invention, Problem
from beatwise.model.place import Place

Direction = Literal["read", "write"]


@dataclass(frozen=True, slots=True)
class Recurrence:
    """A variable that a loop carries along without a closed form: ``symbol`` begins as ``first``, then is ``next``."""

    symbol: Symbol
    first: Form
    next: Form


@dataclass(frozen=True, slots=True)
class Outcome:
    """What stands for a variable after a loop: ``form`` is what it is when the loop ends, by the loop's own symbols."""

    symbol: Symbol
    form: Form


@dataclass(frozen=True, slots=True)
class LoopInstance:
    """A loop as it runs at one place of the call tree.

    ``trips`` is how often the body runs each time the loop is entered (None: not known; it then ends by data or by
    something that could not be followed). ``number`` is ``counter.loop``.
    """

    number: int
    counter: Symbol
    place: Place
    function: str
    trips: Form | None
    kind: Literal["loop", "copy"] = "loop"  #: ``copy``: the elements of one memcpy, memset or burst request
    label: str | None = None
    tripcount: int | None = None  #: average trips that a directive states
    recurrences: tuple[Recurrence, ...] = ()
    outcomes: tuple[Outcome, ...] = ()
    until: tuple[Form, ...] = ()  #: the loop ends before the iteration that finds one of these not 0
    exits: tuple[Form, ...] = ()  #: the loop ends early in the iteration in which one of these is not 0
    data_exit: Place | None = None  #: where data decides when it ends
    data_exit_because: str | None = None  #: the data's name
    why_unknown: str | None = None  #: why the trips are not known
    pipeline: bool = False
    interval: int | None = None  #: cycles between iterations that a directive asks for
    unroll: int | None = None  #: 0: in full
    flattened: bool = False
    dataflow: bool = False
    independent: bool = False  #: a directive says that no iteration needs what another has stored


@dataclass(frozen=True, slots=True)
class Guard:
    """A condition under which an access runs: it does when ``condition`` is not 0."""

    condition: Form
    place: Place
    loops: tuple[int, ...] = ()  #: the loops it is tested in, outermost first
    leaves: bool = False  #: it holds because otherwise the loop or function would have been left
    chooses: bool = False  #: it says which of several destinations it is, and one of them it always is

    @property
    def by_data(self) -> bool:
        """Whether loaded data decides (leaving early and choosing apart: those are told of the loop, of the choice)."""
        return not self.leaves and not self.chooses and any(symbol.kind == "data" for symbol in self.condition.leaves())


@dataclass(frozen=True, slots=True)
class Choice:
    """A destination (or source) that is picked: by what, where, among which arguments or streams."""

    selector: Form
    place: Place
    alternatives: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Access:
    """One place in the source that loads from or stores to memory behind an interface, for one argument.

    ``offset`` is in bytes from the start of the argument; ``loops`` outermost first. ``part_bytes`` is how much of the
    element is used (less than ``element_bytes`` for a field, lane or bit range). ``unresolved`` is the reason when the
    place of the access could not be followed.
    """

    place: Place
    chain: tuple[Place, ...]  #: the calls that lead there, outermost first
    function: str
    argument: str
    interface: str
    direction: Direction
    element_bytes: int
    part_bytes: int
    offset: Form
    loops: tuple[LoopInstance, ...]
    guards: tuple[Guard, ...]
    order: int  #: position in the order in which the accesses of the program run
    choice: Choice | None = None
    volatile: bool = False
    manual: bool = False  #: an explicit burst request
    unresolved: str | None = None
    given_away: bool = False  #: handed to a function without a body here; the direction is what its type allows
    taken: str | None = None  #: what had to be taken for granted about it
    process: str | None = None  #: the dataflow process it runs in
    array_bytes: int | None = None  #: size of the argument, when its type or directive says it
    covers: str = ""  #: the field, lane or bit range used, for a part


@dataclass(frozen=True, slots=True)
class StreamOperation:
    """One read, write or test of a FIFO. ``stream`` names it; ``element`` its index in an array of streams."""

    place: Place
    chain: tuple[Place, ...]
    function: str
    stream: str
    operation: Literal["read", "write", "test"]
    element: Form | None
    blocking: bool
    loops: tuple[LoopInstance, ...]
    guards: tuple[Guard, ...]
    order: int
    process: str | None = None
    choice: Choice | None = None


@dataclass(frozen=True, slots=True)
class Stream:
    """A FIFO or an array of them (``count``); ``depth`` in elements."""

    name: str
    count: int
    depth: int | None
    element_bits: int
    place: Place


@dataclass(frozen=True, slots=True)
class Interface:
    """An AXI master port of the kernel. Options are None where no directive says them: the board's defaults hold."""

    name: str
    arguments: tuple[str, ...]
    place: Place
    declared: bool  #: False: no directive, each pointer a port of its own
    element_bytes: Mapping[str, int] = field(default_factory=dict)  #: by argument
    read_burst: int | None = None  #: longest burst, in beats
    write_burst: int | None = None
    read_outstanding: int | None = None
    write_outstanding: int | None = None
    latency_cycles: int | None = None
    widen_bits: int | None = None  #: widest that the port may be made automatically


@dataclass(frozen=True, slots=True)
class Trace:
    """A kernel followed from its top function."""

    kernel: str
    file: str
    place: Place
    interfaces: tuple[Interface, ...]
    accesses: tuple[Access, ...]
    streams: tuple[Stream, ...]
    operations: tuple[StreamOperation, ...]
    parameters: Mapping[str, Symbol]
    directives: tuple[Directive, ...]
    inventions: tuple[Invention, ...]
    problems: tuple[Problem, ...]
    dataflow: bool = False
