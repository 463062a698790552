"""Facts of an affine nest by counting integer points exactly (islpy), without walking it."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

import islpy as isl

if TYPE_CHECKING:
    from generated.nests import Loop, Nest


@dataclass(frozen=True, slots=True)
class Facts:
    """``joins`` counts the iterations after which the very next one touches the next element."""

    executions: int
    footprint: int
    first: int
    last: int
    joins: int

    @property
    def run(self) -> float:
        return self.executions / (self.executions - self.joins)


def facts_of(nest: Nest) -> Facts:
    """The nest as a set of iteration numbers (from 0, one for each loop) and a map to elements."""
    names = [f"n_{loop.name}" for loop in nest.loops]
    later = [f"l_{loop.name}" for loop in nest.loops]
    domain = isl.Set(f"{{ [{', '.join(names)}] : {' and '.join(bounds(loop, nest.loops) for loop in nest.loops)} }}")
    order = " or ".join(
        "("
        + " and ".join([*(f"{later[k]} = {names[k]}" for k in range(depth)), f"{later[depth]} > {names[depth]}"])
        + ")"
        for depth in range(len(names))
    )
    pair = f"[{', '.join(names)}] -> [{', '.join(later)}]"
    after = isl.Map(f"{{ {pair} : {order} }}").intersect_domain(domain).intersect_range(domain).lexmin()
    joined = isl.Map(f"{{ {pair} : {element(nest, 'l_')} - ({element(nest, 'n_')}) = 1 }}")
    elements = isl.Map(f"{{ [{', '.join(names)}] -> [{element(nest, 'n_')}] }}").intersect_domain(domain).range()
    return Facts(
        executions=domain.count_val().to_python(),
        footprint=elements.count_val().to_python(),
        first=elements.dim_min_val(0).to_python(),
        last=elements.dim_max_val(0).to_python(),
        joins=after.intersect(joined).wrap().count_val().to_python(),
    )


def bounds(loop: Loop, loops: tuple[Loop, ...]) -> str:
    around = {other.name: other for other in loops}
    if loop.grows_with is not None:
        outer = around[loop.grows_with]
        return f"0 <= n_{loop.name} < {loop.trips + outer.first} + {outer.step}n_{outer.name}"
    own = f"0 <= n_{loop.name} < {loop.trips}"
    if loop.chunk_of is None:
        return own
    return f"{own} and n_{loop.name} < {loop.total} - {around[loop.chunk_of].step}n_{loop.chunk_of}"


def element(nest: Nest, prefix: str) -> str:
    starts = {loop.name: loop for loop in nest.loops}
    terms = [str(nest.index.constant)]
    for name, factor in nest.index.factors:
        terms.append(f"{factor * starts[name].step}{prefix}{name} + {factor * starts[name].first}")
    return " + ".join(terms).replace("+ -", "- ")
