"""The page of a rule, and the list of rules, as `beatwise why` shows them."""

from __future__ import annotations

from collections.abc import Mapping
from textwrap import wrap


def page(rule: str, text: str) -> str:
    """A rule's page below its name.

    >>> print(page("short-run", "A run that ends early."), end="")
    short-run
    ---------
    A run that ends early.
    """
    return f"{rule}\n{'-' * len(rule)}\n{text.strip()}\n"


def contents(pages: Mapping[str, str], width: int) -> str:
    """Every rule with the first sentence of its page."""
    names = max(map(len, pages))
    lines = []
    for rule, text in pages.items():
        first = " ".join(text.strip().split("\n\n")[0].split())
        head, *rest = wrap(first, max(30, width - names - 2)) or [""]
        lines.append(f"{rule:<{names}}  {head}".rstrip())
        lines += [" " * (names + 2) + line for line in rest]
    return "\n".join(lines) + "\n"
