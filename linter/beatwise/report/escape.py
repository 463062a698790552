"""Names and lines of untrusted source, made safe for a terminal."""

from __future__ import annotations

import unicodedata

#: Cc control, Cf format (bidirectional marks and the like), Cs surrogates, Zl and Zp line and paragraph separators,
#: Co private use, Cn unassigned (categories of the Unicode standard, section 4.5)
UNSAFE = ("Cc", "Cf", "Cs", "Zl", "Zp", "Co", "Cn")


def printable(text: str) -> str:
    r"""The text with everything that could move the cursor, change colours or reorder the line written as an escape.

    >>> print(printable("gate\x1b[2Js\u202e"))
    gate\x1b[2Js\u202e
    """
    if text.isascii() and text.isprintable():
        return text
    return "".join(_escaped(character) for character in text)


def _escaped(character: str) -> str:
    if unicodedata.category(character) not in UNSAFE:
        return character
    code = ord(character)
    return f"\\x{code:02x}" if code < 0x100 else f"\\u{code:04x}" if code < 0x10000 else f"\\U{code:08x}"
