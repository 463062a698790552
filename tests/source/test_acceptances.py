"""Acceptances: where they are found and which lines they cover."""

from __future__ import annotations

from textwrap import dedent

import pytest

from beatwise.source import acceptances_in


def accepted(text: str) -> list[str]:
    found = acceptances_in(dedent(text).lstrip("\n"), "echo.cpp")
    return [f"{each.place.line}: {each.rule} on {each.lines[0]}-{each.lines[1]}: {each.reason}" for each in found]


def test_beside_code_it_covers_that_line() -> None:
    assert accepted("""
        sum += table[code];  // beatwise accepts indirect-index: 2 KB, stays in one row
        sum += 1;
        """) == ["1: indirect-index on 1-1: 2 KB, stays in one row"]  # fmt: skip


def test_alone_it_covers_the_next_line_of_code_and_the_directives_before_it() -> None:
    assert accepted("""
        for (int i = 0; i < n; ++i) {
            // beatwise accepts strided-access: once per sweep
            // The comment goes on.

        #pragma HLS pipeline
            sum += gates[8 * i];
        }
        """) == ["2: strided-access on 3-6: once per sweep"]  # fmt: skip


def test_beside_a_directive_it_covers_that_directive() -> None:
    assert accepted("#pragma HLS interface m_axi port=a // beatwise accepts shared-port: small\nint a;\n") == [
        "1: shared-port on 1-1: small"
    ]


def test_several_rules_share_a_reason() -> None:
    assert accepted("a[i]; /* Beatwise  accepts short-run , narrow-port: set up once */") == [
        "1: short-run on 1-1: set up once",
        "1: narrow-port on 1-1: set up once",
    ]


def test_a_block_comment_may_go_over_lines() -> None:
    assert accepted("""
        /** beatwise accepts
         *  short-run: it is
         *  set up once
         */
        a[i];
        """) == ["1: short-run on 5-5: it is set up once"]  # fmt: skip


@pytest.mark.parametrize(
    ("comment", "found"),
    [
        ("// beatwise accepts short-run", "1: short-run on 1-1: None"),
        ("// beatwise accepts short-run:   ", "1: short-run on 1-1: None"),
        ("// beatwise accepts short-run because it is small", "1: short-run on 1-1: None"),
        ("// beatwise accepts no-such-rule: why", "1: no-such-rule on 1-1: why"),
        ("// beatwise accepts: why", "1:  on 1-1: why"),
        ("/// beatwise accepts short-run: a: b", "1: short-run on 1-1: a: b"),
    ],
)
def test_what_is_missing_or_unknown_is_kept_for_the_user_to_be_told(comment: str, found: str) -> None:
    assert accepted(f"a[i]; {comment}") == [found]


@pytest.mark.parametrize(
    "text",
    [
        'print("// beatwise accepts short-run: no");',
        'R"(\n// beatwise accepts short-run: no\n)";',
        "// as beatwise accepts it",
        "// beatwise acceptsshort-run: no",
        "int beatwise_accepts;",
    ],
)
def test_only_comments_that_open_with_it_accept(text: str) -> None:
    assert accepted(text) == []


def test_line_ends_do_not_matter() -> None:
    text = "// beatwise accepts short-run: small\nint x;\na[i]; // beatwise accepts narrow-port: é\n"
    assert accepted(text.replace("\n", "\r\n")) == accepted(text) == [
        "1: short-run on 2-2: small",
        "3: narrow-port on 3-3: é",
    ]  # fmt: skip


def test_at_the_end_of_a_text_it_covers_what_would_follow() -> None:
    assert accepted("// beatwise accepts short-run: small") == ["1: short-run on 2-2: small"]
