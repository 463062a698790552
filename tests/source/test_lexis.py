"""Comments, strings and directives: the compiler's preprocessor agrees on what is one."""

from __future__ import annotations

import re
import subprocess

from hypothesis import assume, given, settings
from hypothesis import strategies as some

from beatwise.source import pragmas_in
from beatwise.source.lexis import code_only, lexemes

PIECES = [
    *("// c ", "/* c */", "/* a\nb */", "/**/", "//\\\n", "\n", "\\\n", "\\ \n", " ", "\t"),
    *("x", "FR", "1'000", "0x1'f", "/", "*", "é", "#define A "),
    *(
        '"s // "',
        '"a\\"b"',
        '"//"',
        "'x'",
        "'\"'",
        "'\\''",
        "u'a'",
        'L"k"',
        'R"(" // \n)"',
        'u8R"t(x)" )t"',
        'LR"q(/*)q"',
    ),
    *(
        "#pragma HLS ",
        "# pragma HLS ",
        "#pragma\tHLS ",
        "#pragma HLS pipeline /* q\n r */",
        "#pragma HLS pipeline // q",
    ),
]
PRAGMA = re.compile(r"\bHLS ")


def numbered(pieces: list[str]) -> str:
    """The pieces as one text, in which every directive has a name of its own."""
    return "".join(PRAGMA.sub(f"HLS p{index} ", piece) for index, piece in enumerate(pieces)) + "\n"


@settings(max_examples=80, deadline=None)
@given(some.lists(some.sampled_from(PIECES), min_size=2, max_size=25).map(numbered))
def test_the_preprocessor_sees_the_same_pragmas(text: str) -> None:
    run = subprocess.run(
        ["g++", "-std=c++17", "-E", "-P", "-x", "c++", "-"], input=text.encode(), capture_output=True, check=False
    )
    assume(run.returncode == 0 and b"missing terminating" not in run.stderr)
    seen = re.findall(rb"^\s*#\s*pragma\s+HLS\s+(p\d+)", run.stdout, re.MULTILINE)
    assert [each.kind for each in pragmas_in(text, "echo.cpp")] == [name.decode() for name in seen]


@given(some.text(some.sampled_from("/*\"'\\\n\r#R( )éx01if")))
def test_any_text_is_read_and_keeps_its_lines(text: str) -> None:
    code = code_only(text)
    assert (len(code), code.isascii()) == (len(text), True)
    assert [index for index, sign in enumerate(code) if sign in "\n\r"] == [
        index for index, sign in enumerate(text) if sign in "\n\r"
    ]
    assert all(0 <= each.start < each.end <= len(text) for each in lexemes(text))
