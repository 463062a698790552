"""A random loop nest that loads from one argument: its text in one of several styles, and the elements it visits.

The walk is the slow and obvious way to the truth; the text is what a practitioner could have written for it.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING, Literal

if TYPE_CHECKING:
    from collections.abc import Iterator, Mapping

Style = Literal["for", "while", "pointer", "flattened"]
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
    ``trips``: its last time around it does only what is left.
    """

    name: str
    first: int
    step: int
    trips: int
    chunk_of: str | None = None
    total: int = 0

    def values(self, counters: Mapping[str, int]) -> range:
        trips = self.trips if self.chunk_of is None else min(self.trips, self.total - counters[self.chunk_of])
        return range(self.first, self.first + trips * self.step, self.step)

    @property
    def bound(self) -> str:
        if self.chunk_of is None:
            end = self.first + self.trips * self.step
            return f"{self.name} < {end}" if self.step > 0 else f"{self.name} > {end}"
        left = f"{self.total} - {self.chunk_of}"
        return f"{self.name} < ({left} < {self.trips} ? {left} : {self.trips})"

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
class Nest:
    """Loops, outermost first, around ``sum += in[index]``. ``bits`` is the width that the index is cut to, if any."""

    loops: tuple[Loop, ...]
    index: Linear
    guard: Guard | None = None
    bits: Literal[8, 16] | None = None
    style: Style = "for"

    def walk(self) -> tuple[int, ...]:
        """The elements in the order in which they are touched."""
        return tuple(self._cut(self.index.at(counters)) for counters in self.iterations() if self._runs(counters))

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

    def _cut(self, element: int) -> int:
        return element if self.bits is None else element % 2**self.bits

    @property
    def extent(self) -> int:
        """Elements that the argument must have."""
        return max(self.walk(), default=0) + 1

    def text(self, name: str) -> str:
        """A kernel ``name(const int *in, int *out)``; the access is on the line that ends in ``// here``."""
        body = {"flattened": self._flattened, "pointer": self._walking_pointer}.get(self.style, self._nested)()
        return "\n".join(
            [
                f"void {name}(const int *in, int *out) {{",
                "#pragma HLS INTERFACE m_axi port=in bundle=from",
                "#pragma HLS INTERFACE m_axi port=out bundle=to",
                "    int sum = 0;",
                *(f"    {line}" for line in body),
                "    out[0] = sum;",
                "}",
                "",
            ]
        )

    def _load(self, at: str) -> str:
        guard = f"if ({self.guard}) " if self.guard else ""
        return f"{guard}sum += {at};  // here"

    def _nested(self) -> list[str]:
        cut = {None: "", 8: "(unsigned char)", 16: "(unsigned short)"}[self.bits]
        lines = [self._load(f"in[{cut}({self.index})]")]
        for loop in reversed(self.loops):
            inner = [f"    {line}" for line in lines]
            if self.style == "while":
                opening = [f"int {loop.name} = {loop.first};", f"while ({loop.bound}) {{"]
                lines = [*opening, *inner, f"    {loop.bump};", "}"]
            else:
                lines = [f"for (int {loop.name} = {loop.first}; {loop.bound}; {loop.bump}) {{", *inner, "}"]
        return lines

    def _walking_pointer(self) -> list[str]:
        """A pointer for each loop, which starts where that of the loop around it is, and is bumped in its own loop."""
        factors = dict(self.index.factors)
        lines = [self._load(f"*p{len(self.loops)}")]
        for depth in range(len(self.loops), 0, -1):
            loop = self.loops[depth - 1]
            bump = f"p{depth} += {factors[loop.name] * loop.step};"
            start = f"const int *p{depth} = p{depth - 1} + {factors[loop.name] * loop.first};"
            inner = [f"    {line}" for line in [*lines, bump]]
            lines = [start, f"for (int {loop.name} = {loop.first}; {loop.bound}; {loop.bump}) {{", *inner, "}"]
        return [f"const int *p0 = in + {self.index.constant};", *lines]

    def _flattened(self) -> list[str]:
        """Two loops as one, whose counters are wrapped by hand."""
        outer, inner = self.loops
        return [
            f"int {outer.name} = {outer.first}, {inner.name} = {inner.first};",
            f"for (int k = 0; k < {outer.trips * inner.trips}; k++) {{",
            f"    {self._load(f'in[{self.index}]')}",
            f"    {inner.bump};",
            f"    if ({inner.name} == {inner.first + inner.trips * inner.step}) {{",
            f"        {inner.name} = {inner.first};",
            f"        {outer.bump};",
            "    }",
            "}",
        ]
