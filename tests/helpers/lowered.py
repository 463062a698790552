"""Text in, lowered text out."""

from __future__ import annotations

from textwrap import dedent

from beatwise.frontend.program import read_program
from beatwise.frontend.show import show, show_function
from beatwise.model.kernel import Function, Program


def program(text: str, **settings: object) -> Program:
    """The program of one file called ``echo.cpp``."""
    return read_program({"echo.cpp": dedent(text).lstrip("\n")}, **settings)  # type: ignore[arg-type]


def shown(text: str, **settings: object) -> str:
    """The whole program, one line per statement."""
    return show(program(text, **settings))


def function_named(read: Program, name: str) -> Function:
    return next(one for one in read.functions.values() if one.name == name)


def body(text: str, name: str = "echo", **settings: object) -> str:
    """The statements of one function."""
    found = function_named(program(text, **settings), name)
    return dedent("\n".join(show_function(found)[1:]))


def statements(text: str, *, before: str = "") -> str:
    """What the statements become in a function with some parameters to use."""
    wrapped = f"""{before}
extern "C" void echo(int *a, int *b, float *f, long *wide, const unsigned char *bytes, int n, unsigned u) {{
{text}
}}"""
    return body(wrapped)


def lines(text: str) -> str:
    return dedent(text).strip("\n")
