"""Numbers and names as a sentence shows them."""

from __future__ import annotations

from collections.abc import Iterable

from beatwise.model.access import Direction, LoopInstance

IN_FULL = 4  #: a longer list of names is shortened

PASSIVE: dict[Direction, str] = {"read": "is read", "write": "is written"}


def size(nbytes: float) -> str:
    """A number of bytes.

    >>> size(1), size(1000), size(1024), size(1536), size(3 * 2**20)
    ('1 byte', '1000 bytes', '1 KiB', '1.5 KiB', '3 MiB')
    """
    if nbytes == 1:
        return "1 byte"
    for unit, name in ((2**30, "GiB"), (2**20, "MiB"), (2**10, "KiB")):
        if nbytes >= unit:
            return f"{_short(nbytes / unit)} {name}"
    return f"{_short(nbytes)} bytes"


def count(number: float, noun: str) -> str:
    """A number of things.

    >>> count(1, "element"), count(4 / 3, "element"), count(1048576, "beat")
    ('1 element', '1.33 elements', '1,048,576 beats')
    """
    return f"{_short(number)} {noun}" if number == 1 else f"{_short(number)} {noun}s"


def gbps(rate: float) -> str:
    """A rate, given in 10^9 bytes a second, with three digits.

    >>> gbps(13.27), gbps(0.598), gbps(0.0374)
    ('13.3 GB/s', '0.60 GB/s', '0.037 GB/s')
    """
    return f"{rate:.1f} GB/s" if rate >= 10 else f"{rate:.2f} GB/s" if rate >= 0.1 else f"{rate:.3f} GB/s"


def _short(number: float) -> str:
    if number == int(number):
        return f"{int(number):,}" if number >= 10_000 else str(int(number))
    return f"{number:,.1f}" if number >= 100 else f"{number:.2f}".rstrip("0").rstrip(".")


def quoted(name: str) -> str:
    """A name of the user's source."""
    return f"`{name}`"


def listed(names: Iterable[str], joint: str = "and") -> str:
    """Names of the user's source in a row; of many only the first and the last.

    >>> listed(["a"]), listed(["a", "b", "c"]), listed(["a", "b"], "or")
    ('`a`', '`a`, `b` and `c`', '`a` or `b`')
    >>> listed([f"s{n}" for n in range(8)])
    '`s0`, `s1` ... `s7`'
    """
    shown = [quoted(name) for name in dict.fromkeys(names)]
    if len(shown) > IN_FULL:
        return f"{shown[0]}, {shown[1]} ... {shown[-1]}"
    return shown[0] if len(shown) == 1 else f"{', '.join(shown[:-1])} {joint} {shown[-1]}"


def lines(numbers: Iterable[int]) -> str:
    """Lines of the source.

    >>> lines([7]), lines([9, 7, 9])
    ('line 7', 'lines 7 and 9')
    """
    shown = [str(number) for number in sorted(set(numbers))]
    return f"line {shown[0]}" if len(shown) == 1 else f"lines {', '.join(shown[:-1])} and {shown[-1]}"


def the_loop(loop: LoopInstance) -> str:
    """A loop, by its label or the name of its counter where it has one."""
    line = loop.place.line
    if loop.kind == "copy":
        return f"the copy on line {line}"
    if loop.label:
        return f"loop `{loop.label}` (line {line})"
    name = loop.counter.name
    return f"the loop over `{name}` (line {line})" if name.isidentifier() else f"the loop on line {line}"


def sentence(text: str) -> str:
    """The text with a capital first letter."""
    return text[:1].upper() + text[1:]
