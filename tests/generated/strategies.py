"""Hypothesis draws loop nests of every style, small enough to walk."""

from __future__ import annotations

from dataclasses import replace

from hypothesis import strategies as st

from generated.nests import Bend, CounterType, Guard, Linear, Loop, Nest, Style

NAMES = ("i", "j", "m")
FACTORS = st.one_of(st.integers(-4, 4), st.sampled_from([1, 1, 1, 8, 16, 24, 32, 100]))


@st.composite
def plain_loops(draw: st.DrawFn) -> tuple[Loop, ...]:
    depth = draw(st.integers(1, 3))
    most = (200, 24, 9)[depth - 1]
    return tuple(draw(one_loop(name, most)) for name in NAMES[:depth])


@st.composite
def one_loop(draw: st.DrawFn, name: str, most: int) -> Loop:
    step = draw(st.sampled_from([1, 1, 1, 2, 3, -1, -2]))
    first, trips = draw(st.integers(0, 3)), draw(st.integers(2, most))
    types: list[CounterType] = ["int", "int"]
    if step > 0:
        types.append("unsigned")
        if first + trips * step < 256:
            types.append("unsigned char")
    return Loop(name, first, step, trips, type=draw(st.sampled_from(types)))


@st.composite
def growing_loops(draw: st.DrawFn) -> tuple[Loop, ...]:
    """A triangle: the inner loop does more each time."""
    outer = Loop("i", draw(st.integers(0, 3)), draw(st.integers(1, 2)), draw(st.integers(2, 20)))
    return outer, Loop("j", 0, draw(st.integers(1, 2)), draw(st.integers(1, 4)), grows_with="i")


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
    """No guard, nothing bent: every style."""
    loops = draw(st.one_of(plain_loops(), chunked_loops(), growing_loops()))
    if loops[-1].chunk_of:
        index = Linear((("i", 1), ("j", draw(st.sampled_from([1, 1, 1, 2])))), draw(st.integers(0, 3)))
    else:
        index = draw(st.one_of(dense_index(loops), any_index(loops)))
    styles: list[Style] = ["for", "while", "do", "break", "helper", "pointer"]
    if len(loops) == 2 and not (loops[-1].chunk_of or loops[-1].grows_with):
        styles.append("flattened")
    style = draw(st.sampled_from(styles))
    if style == "flattened":
        loops = tuple(replace(loop, type="int") for loop in loops)
    return from_zero(Nest(loops, index, style=style))


BENDS = st.one_of(
    st.sampled_from([Bend("unsigned char"), Bend("unsigned char"), Bend("unsigned short")]),
    st.builds(Bend, st.just("%"), st.integers(2, 100)),
    st.builds(Bend, st.just("&"), st.sampled_from([3, 7, 15, 63, 127])),
    st.builds(Bend, st.just("^"), st.sampled_from([1, 2, 4, 8, 32])),
    st.builds(Bend, st.just("/"), st.integers(2, 8)),
    st.builds(Bend, st.just("min"), st.integers(1, 100)),
)


@st.composite
def nests(draw: st.DrawFn) -> Nest:
    """Affine ones, guarded ones, and ones whose index is bent."""
    nest = draw(affine_nests())
    match draw(st.sampled_from(["affine", "guarded", "bent"])):
        case "guarded":
            what = Linear(tuple((loop.name, draw(st.integers(0, 2))) for loop in nest.loops), 1200)
            modulus = draw(st.integers(2, 6))
            nest = replace(nest, guard=Guard(what, modulus, draw(st.integers(1, modulus))))
        case "bent" if nest.style != "pointer":
            nest = replace(nest, bend=draw(BENDS))
    return nest
