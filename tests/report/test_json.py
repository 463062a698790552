"""`beatwise-audit-1` is a promise to other programs."""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any, get_args

import jsonschema
import pytest

import beatwise.report
from beatwise.model.access import Direction
from beatwise.model.finding import Level
from beatwise.model.kernel import Problem
from beatwise.model.traffic import Basis, Block, Limit, Pattern
from beatwise.report.json import as_json, document, rounded
from beatwise.report.sheet import merged
from report.hand_made import access, finding, place, scatter, survey

SCHEMA: dict[str, Any] = json.loads(
    (Path(beatwise.report.__file__).parent / "audit.schema.json").read_text(encoding="utf-8")
)


def test_the_document_follows_its_schema() -> None:
    jsonschema.Draft202012Validator.check_schema(SCHEMA)
    problems = (Problem("a.cpp", None, "gave up after 20 s"), Problem("b.cpp", 3, "expected ';'"))
    jsonschema.validate(json.loads(as_json(survey(problems=problems))), SCHEMA)


@pytest.mark.parametrize(
    ("definition", "entry"),
    [
        ("kernel", document(survey())["kernels"][0]),
        ("interface", document(survey())["kernels"][0]["interfaces"][0]),
        ("access", document(survey())["kernels"][0]["accesses"][0]),
        ("stream", document(survey())["kernels"][0]["streams"][0]),
        ("finding", document(survey())["findings"][0]),
    ],
)
def test_the_schema_describes_every_key(definition: str, entry: dict[str, Any]) -> None:
    assert list(SCHEMA["$defs"][definition]["properties"]) == list(entry)


@pytest.mark.parametrize("key", ["pattern", "stride_bytes", "now_gbps"])
def test_the_schema_misses_a_key_that_is_gone(key: str) -> None:
    spoilt = json.loads(as_json(survey()))
    del spoilt["kernels"][0]["accesses"][0][key]
    with pytest.raises(jsonschema.ValidationError, match=key):
        jsonschema.validate(spoilt, SCHEMA)


@pytest.mark.parametrize(
    ("definition", "key", "words"),
    [
        ("access", "pattern", Pattern),
        ("access", "basis", Basis),
        ("access", "limit", Limit),
        ("access", "direction", Direction),
        ("finding", "level", Level),
    ],
)
def test_the_schema_knows_every_word_of_the_model(definition: str, key: str, words: object) -> None:
    assert SCHEMA["$defs"][definition]["properties"][key]["enum"] == list(get_args(words))


def test_the_schema_knows_every_reason_against_bursts() -> None:
    assert SCHEMA["$defs"]["access"]["properties"]["blocked"]["items"]["enum"] == list(get_args(Block))


def test_one_call_like_another_is_one_entry_that_runs_twice_as_often() -> None:
    (entry,) = merged([access(5, "gates", executions=64.0), access(5, "gates", executions=64.0)])
    assert entry.executions == 128


def test_a_count_that_is_not_known_stays_unknown_when_added() -> None:
    (entry,) = merged([access(5, "gates", executions=64.0), access(5, "gates", executions=None)])
    assert entry.executions is None


def test_calls_that_were_measured_differently_stay_apart() -> None:
    rows = merged([access(5, "gates", run_elements=64.0), access(5, "gates", run_elements=8.0)])
    assert [row.run_elements for row in rows] == [64, 8]


def test_a_helper_called_with_three_arguments_gives_three_entries_on_its_line() -> None:
    rows = merged([access(5, argument) for argument in ("power", "phase", "width")])
    assert [(row.place.line, row.argument) for row in rows] == [(5, "phase"), (5, "power"), (5, "width")]


def test_entries_stand_in_the_order_of_the_source() -> None:
    made = survey(scatter(accesses=merged([access(9, "b"), access(5, "b"), access(5, "a")])))
    entries = document(made)["kernels"][0]["accesses"]
    assert [(entry["line"], entry["argument"]) for entry in entries] == [(5, "a"), (5, "b"), (9, "b")]


def test_what_is_not_known_is_null() -> None:
    row = access(5, "gates", pattern="unresolved", stride_bytes=None, run_elements=None, executions=None, reason="no")
    (entry,) = document(survey(scatter(accesses=(row,))))["kernels"][0]["accesses"]
    assert (entry["stride_bytes"], entry["run_elements"], entry["executions"]) == (None, None, None)


def test_estimates_have_four_digits_and_counts_stay_exact() -> None:
    assert rounded(13.273491) == 13.27
    assert rounded(1048576.0) == 1048576
    assert rounded(float("inf")) is None


def test_no_name_can_steer_a_terminal_that_prints_the_document() -> None:
    text = as_json(survey(scatter(findings=(finding(3, message="\x1b[2J \u202e gate \x9b", place=place(3)),))))
    assert text.isascii()
    assert "\x1b" not in text
