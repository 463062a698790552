"""A random loop nest that loads from one argument: its text in one of several styles, and the elements it visits.

The walk is the slow and obvious way to the truth; the text is what a practitioner could have written for it.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING, Literal

if TYPE_CHECKING:
    from collections.abc import Iterator, Mapping

Style = Literal["for", "while", "do", "break", "helper", "pointer", "flattened"]
CounterType = Literal["int", "unsigned", "unsigned char"]
Twist = Literal["unsigned char", "unsigned short", "%", "&", "^", "/", "min"]
ELEMENT_BYTES = 4


@dataclass(frozen=True, slots=True)
class Linear:
    """``constant`` plus a factor for each counter."""

    factors: tuple[tuple[str, int], ...]
    constant: int

    def at(self, counters: Mapping[str, int]) -> int:
        return self.constant + sum(factor * counters[name] for name, factor in self.factors)

    def __str__(self) -> str:
        terms = [name if factor == 1 else f"{factor} * {name}" for name, factor in self.factors if factor]
        return " + ".join([*terms, str(self.constant)] if self.constant or not terms else terms)


@dataclass(frozen=True, slots=True)
class Loop:
    """A counter that goes from ``first`` in steps (descending if negative) for ``trips`` iterations.

    A loop with ``chunk_of`` runs within another one, which goes through ``total`` elements in steps of this one's
    ``trips``: its last time around it does only what is left. One with ``grows_with`` does as many trips more as the
    counter of that loop says.
    """

    name: str
    first: int
    step: int
    trips: int
    chunk_of: str | None = None
    total: int = 0
    grows_with: str | None = None
    type: CounterType = "int"

    def values(self, counters: Mapping[str, int]) -> range:
        trips = self.trips
        if self.chunk_of is not None:
            trips = min(self.trips, self.total - counters[self.chunk_of])
        elif self.grows_with is not None:
            trips += counters[self.grows_with]
        return range(self.first, self.first + trips * self.step, self.step)

    @property
    def bound(self) -> str:
        if self.chunk_of is not None:
            left = f"{self.total} - {self.chunk_of}"
            return f"{self.name} < ({left} < {self.trips} ? {left} : {self.trips})"
        end = self.first + self.trips * self.step
        if self.grows_with is not None:
            return f"{self.name} < {end} + {self.step} * {self.grows_with}"
        return f"{self.name} < {end}" if self.step > 0 else f"{self.name} > {end}"

    @property
    def start(self) -> str:
        return f"{self.type} {self.name} = {self.first};"

    @property
    def bump(self) -> str:
        return {1: f"{self.name}++", -1: f"--{self.name}"}.get(self.step, f"{self.name} += {self.step}")


@dataclass(frozen=True, slots=True)
class Guard:
    """The access runs when ``what`` modulo ``modulus`` is below ``below``: decided by counters alone."""

    what: Linear
    modulus: int
    below: int

    def holds(self, counters: Mapping[str, int]) -> bool:
        return self.what.at(counters) % self.modulus < self.below

    def __str__(self) -> str:
        return f"({self.what}) % {self.modulus} < {self.below}"


@dataclass(frozen=True, slots=True)
class Bend:
    """What keeps an index from being linear: a narrowing cast, or an operation with ``value``."""

    by: Twist
    value: int = 0

    def at(self, index: int) -> int:
        match self.by:
            case "unsigned char":
                return index % 256
            case "unsigned short":
                return index % 65536
            case "%":
                return index % self.value
            case "&":
                return index & self.value
            case "^":
                return index ^ self.value
            case "/":
                return index // self.value
            case "min":
                return min(index, self.value)

    def text(self, index: Linear) -> str:
        if self.by in ("unsigned char", "unsigned short"):
            return f"({self.by})({index})"
        if self.by == "min":
            return f"({index}) < {self.value} ? ({index}) : {self.value}"
        return f"({index}) {self.by} {self.value}"


@dataclass(frozen=True, slots=True)
class Nest:
    """Loops, outermost first, around ``sum += in[index]``."""

    loops: tuple[Loop, ...]
    index: Linear
    guard: Guard | None = None
    bend: Bend | None = None
    style: Style = "for"

    def walk(self) -> tuple[int, ...]:
        """The elements in the order in which they are touched."""
        straight = (self.index.at(counters) for counters in self.iterations() if self._runs(counters))
        return tuple(straight) if self.bend is None else tuple(map(self.bend.at, straight))

    def iterations(self) -> Iterator[Mapping[str, int]]:
        def within(depth: int, counters: Mapping[str, int]) -> Iterator[Mapping[str, int]]:
            if depth == len(self.loops):
                yield counters
                return
            for value in self.loops[depth].values(counters):
                yield from within(depth + 1, {**counters, self.loops[depth].name: value})

        return within(0, {})

    def _runs(self, counters: Mapping[str, int]) -> bool:
        return self.guard is None or self.guard.holds(counters)

    @property
    def extent(self) -> int:
        """Elements that the argument must have."""
        return max(self.walk(), default=0) + 1

    def text(self, name: str) -> str:
        """A kernel ``name(const int *in, int *out)``."""
        body = {"flattened": self._flattened, "pointer": self._walking_pointer}.get(self.style, self._nested)
        if self.style == "helper":
            load = f"load_of_{name}(in, {self._subscript})"
            before = [f"static int load_of_{name}(const int *from, int at) {{", "    return from[at];", "}"]
        else:
            load, before = f"in[{self._subscript}]", []
        return "\n".join(
            [
                *before,
                f"void {name}(const int *in, int *out) {{",
                "#pragma HLS INTERFACE m_axi port=in bundle=from",
                "#pragma HLS INTERFACE m_axi port=out bundle=to",
                "    int sum = 0;",
                *(f"    {line}" for line in body(load)),
                "    out[0] = sum;",
                "}",
                "",
            ]
        )

    @property
    def _subscript(self) -> str:
        return str(self.index) if self.bend is None else self.bend.text(self.index)

    def _add(self, load: str) -> str:
        guard = f"if ({self.guard}) " if self.guard else ""
        return f"{guard}sum += {load};"

    def _nested(self, load: str) -> list[str]:
        lines = [self._add(load)]
        for loop in reversed(self.loops):
            inner = [f"    {line}" for line in lines]
            bump = f"    {loop.bump};"
            match self.style:
                case "while":
                    lines = [loop.start, f"while ({loop.bound}) {{", *inner, bump, "}"]
                case "do":
                    lines = [loop.start, "do {", *inner, bump, f"}} while ({loop.bound});"]
                case "break":
                    leave = f"    if (!({loop.bound})) break;"
                    lines = [f"for ({loop.start};) {{", leave, *inner, bump, "}"]
                case _:
                    lines = [f"for ({loop.start} {loop.bound}; {loop.bump}) {{", *inner, "}"]
        return lines

    def _walking_pointer(self, _: str) -> list[str]:
        """A pointer for each loop, which starts where that of the loop around it is, and is bumped in its own loop."""
        factors = dict(self.index.factors)
        lines = [self._add(f"*p{len(self.loops)}")]
        for depth in range(len(self.loops), 0, -1):
            loop = self.loops[depth - 1]
            bump = f"p{depth} += {factors[loop.name] * loop.step};"
            start = f"const int *p{depth} = p{depth - 1} + {factors[loop.name] * loop.first};"
            inner = [f"    {line}" for line in [*lines, bump]]
            lines = [start, f"for ({loop.start} {loop.bound}; {loop.bump}) {{", *inner, "}"]
        return [f"const int *p0 = in + {self.index.constant};", *lines]

    def _flattened(self, load: str) -> list[str]:
        """Two loops as one, whose counters are wrapped by hand."""
        outer, inner = self.loops
        return [
            f"int {outer.name} = {outer.first}, {inner.name} = {inner.first};",
            f"for (int k = 0; k < {outer.trips * inner.trips}; k++) {{",
            f"    {self._add(load)}",
            f"    {inner.bump};",
            f"    if ({inner.name} == {inner.first + inner.trips * inner.step}) {{",
            f"        {inner.name} = {inner.first};",
            f"        {outer.bump};",
            "    }",
            "}",
        ]
