"""What the user can get wrong.

::

    UserError          one clear line; the command line prints it and exits with status 2
    ├── BadInput       a path that cannot be analysed
    │   └── NoKernel   a path that can be read, and holds no kernel
    ├── BadSettings    a settings file, or a value given on the command line, that makes no sense
    └── UnknownName    a board, rule or top function that does not exist

What is not in this family is our own mistake and keeps its traceback.
"""

from __future__ import annotations

from collections.abc import Iterable


class UserError(Exception):
    """The message is one line that names the thing in the user's own words."""


class BadInput(UserError):
    """A path is missing, unreadable, empty, no text, or holds no kernel."""


class NoKernel(BadInput):
    """A path can be read, but nothing in it is a kernel."""


class BadSettings(UserError):
    """A settings file or a given value is wrong; the message names the file, the key and what was expected."""


class UnknownName(UserError):
    """``name`` is no ``kind``; what there is instead is said, the nearest first.

    >>> print(UnknownName("rule", "short-runs", ["short-run", "narrow-port"]))
    no rule named 'short-runs'; did you mean 'short-run'? known are narrow-port, short-run
    """

    def __init__(self, kind: str, name: str, known: Iterable[str]) -> None:
        super().__init__(kind, name, tuple(sorted(known)))

    def __str__(self) -> str:
        from difflib import get_close_matches

        kind, name, known = self.args
        nearest = get_close_matches(name, known, n=1)
        hint = f" did you mean {nearest[0]!r}?" if nearest else ""
        return f"no {kind} named {name!r}" + (f";{hint} known are {', '.join(known)}" if known else "")
