"""How numbers read: GB/s, counts, times, with three significant digits."""

from __future__ import annotations


def rate(gbps: float) -> str:
    """GB/s with three significant digits, without needless zeros.

    >>> [rate(value) for value in (13.27, 0.6, 0.04321, 0.0, 460.8)]
    ['13.3', '0.6', '0.0432', '0', '461']
    """
    if gbps >= 100:
        return f"{gbps:.0f}"
    return f"{gbps:.3g}" if gbps >= 0.001 or gbps == 0 else "<0.001"


def loss(gbps: float) -> str:
    """GB/s that are lost: three significant digits, and no more than two after the point.

    >>> [loss(value) for value in (12.67, 0.249, 0.0432)]
    ['12.7', '0.25', '0.04']
    """
    return rate(gbps) if gbps >= 1 else f"{gbps:.2f}"


def amount(value: float | None) -> str:
    """A count: exact up to five digits, then in thousands, millions, ...; '?' where not known.

    >>> [amount(value) for value in (None, 1.0, 2.5, 99999, 1048576, 3e9)]
    ['?', '1', '2.5', '99999', '1.05M', '3G']
    """
    if value is None:
        return "?"
    if value < 100_000:
        return f"{value:.0f}" if value == int(value) else f"{value:.3g}"
    for factor, letter in ((1e12, "T"), (1e9, "G"), (1e6, "M"), (1e3, "k")):
        if value >= factor:
            return f"{value / factor:.3g}{letter}"
    return f"{value:.3g}"


def volume(size: float) -> str:
    """Bytes in decimal units, as they go with GB/s.

    >>> [volume(value) for value in (64, 20480, 12.8e6, 4.2e9)]
    ['64 B', '20.5 kB', '12.8 MB', '4.2 GB']
    """
    for factor, unit in ((1e9, "GB"), (1e6, "MB"), (1e3, "kB")):
        if size >= factor:
            return f"{size / factor:.3g} {unit}"
    return f"{size:.0f} B"


def signed(figure: str, sign: float = -1) -> str:
    """The figure with its sign; 0 has none.

    >>> signed("12.7"), signed("64", 64), signed("0", 0)
    ('−12.7', '+64', '0')
    """
    return figure if sign == 0 else f"−{figure}" if sign < 0 else f"+{figure}"


def time(seconds: float) -> str:
    """A duration in the unit that suits it.

    >>> [time(value) for value in (2.0, 0.00153, 4.2e-7)]
    ['2 s', '1.53 ms', '0.42 µs']
    """
    for factor, unit in ((1.0, "s"), (1e-3, "ms")):
        if seconds >= factor:
            return f"{seconds / factor:.3g} {unit}"
    return f"{seconds / 1e-6:.3g} µs"


def plural(count: int, one: str, many: str = "") -> str:
    """
    >>> plural(1, "finding"), plural(2, "access", "accesses")
    ('1 finding', '2 accesses')
    """
    return f"{count} {one if count == 1 else many or one + 's'}"
