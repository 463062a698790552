"""Hypothesis draws loop nests of every style, small enough to walk."""

from __future__ import annotations

from dataclasses import replace

from hypothesis import strategies as st

from generated.nests import Guard, Linear, Loop, Nest, Style

NAMES = ("i", "j", "m")
FACTORS = st.one_of(st.integers(-4, 4), st.sampled_from([1, 1, 1, 8, 16, 24, 32, 100]))


@st.composite
def plain_loops(draw: st.DrawFn) -> tuple[Loop, ...]:
    depth = draw(st.integers(1, 3))
    most = (200, 24, 9)[depth - 1]
    return tuple(
        Loop(name, draw(st.integers(0, 3)), draw(st.sampled_from([1, 1, 1, 2, 3, -1, -2])), draw(st.integers(2, most)))
        for name in NAMES[:depth]
    )


@st.composite
def chunked_loops(draw: st.DrawFn) -> tuple[Loop, ...]:
    """An outer loop in steps of a chunk, an inner one over the chunk, the last of which may be short."""
    chunk, total = draw(st.integers(2, 16)), draw(st.integers(3, 100))
    outer = Loop("i", 0, chunk, -(-total // chunk))
    return outer, Loop("j", 0, 1, chunk, chunk_of="i", total=total)


@st.composite
def dense_index(draw: st.DrawFn, loops: tuple[Loop, ...]) -> Linear:
    """Each loop goes on where the one within it ends, or leaves a gap: what most kernels do."""
    factors, extent = [], 1
    for loop in reversed(loops):
        factors.append((loop.name, extent))
        extent = extent * loop.trips * abs(loop.step) + draw(st.sampled_from([0, 0, 1, 5]))
    return Linear(tuple(reversed(factors)), draw(st.integers(0, 3)))


@st.composite
def any_index(draw: st.DrawFn, loops: tuple[Loop, ...]) -> Linear:
    return Linear(tuple((loop.name, draw(FACTORS)) for loop in loops), draw(st.integers(0, 3)))


def from_zero(nest: Nest) -> Nest:
    """The same nest, moved so that no element is before the argument's start."""
    low = min(nest.index.at(counters) for counters in nest.iterations())
    return nest if low >= 0 else replace(nest, index=replace(nest.index, constant=nest.index.constant - low))


@st.composite
def affine_nests(draw: st.DrawFn) -> Nest:
    """No guard, no narrowing: every style."""
    loops = draw(st.one_of(plain_loops(), chunked_loops()))
    if loops[-1].chunk_of:
        factors = (("i", 1), ("j", draw(st.sampled_from([1, 1, 1, 2]))))
        index = Linear(factors, draw(st.integers(0, 3)))
    else:
        index = draw(st.one_of(dense_index(loops), any_index(loops)))
    styles: list[Style] = ["for", "while", "pointer"]
    if len(loops) == 2 and not loops[-1].chunk_of:
        styles.append("flattened")
    return from_zero(Nest(loops, index, style=draw(st.sampled_from(styles))))


@st.composite
def nests(draw: st.DrawFn) -> Nest:
    """Affine ones, guarded ones, and ones whose index is cut to 8 or 16 bits."""
    nest = draw(affine_nests())
    match draw(st.sampled_from(["affine", "guarded", "narrow"])):
        case "guarded":
            what = Linear(tuple((loop.name, draw(st.integers(0, 2))) for loop in nest.loops), 64)
            modulus = draw(st.integers(2, 6))
            nest = replace(nest, guard=Guard(what, modulus, draw(st.integers(1, modulus))))
        case "narrow" if nest.style in ("for", "while"):
            outer = nest.loops[0].name
            factors = tuple((name, factor + 37 * (name == outer)) for name, factor in nest.index.factors)
            nest = from_zero(replace(nest, bits=draw(st.sampled_from([8, 8, 16])), index=Linear(factors, 0)))
    return nest
