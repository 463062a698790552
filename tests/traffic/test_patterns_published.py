"""Strides, traffic and runs that are known from the outside, through front end, tracer and walks."""

from __future__ import annotations

import pytest

from beatwise.model.traffic import Walk
from beatwise.traffic.runs import walk
from helpers.traced import traced

#: bytes an iteration of 8-byte elements: stream.c 5.10 of McCalpin, "Memory Bandwidth and Machine Balance in Current
#: High Performance Computers", IEEE TCCA Newsletter, 1995 (no write-allocate traffic is counted)
LOOP_TRAFFIC = {
    "c[i] = a[i];": 16,
    "b[i] = 3.0 * c[i];": 16,
    "c[i] = a[i] + b[i];": 24,
    "a[i] = b[i] + 3.0 * c[i];": 24,
}


def walked(body: str, parameters: str) -> dict[tuple[str, str], list[Walk]]:
    """The walks of a kernel's accesses by argument and direction."""
    found: dict[tuple[str, str], list[Walk]] = {}
    trace = traced(f'extern "C" void sweep({parameters}) {{ {body} }}')
    for access in trace.accesses:
        found.setdefault((access.argument, access.direction), []).append(walk(access, {}))
    return found


@pytest.mark.parametrize(("statement", "bytes_moved"), LOOP_TRAFFIC.items())
def test_the_four_loops_move_what_they_are_known_to_move(statement: str, bytes_moved: int) -> None:
    body = f"for (int i = 0; i < 1000; ++i) {statement}"
    trace = traced(f'extern "C" void sweep(double *a, double *b, double *c) {{ {body} }}')
    moved = [access.part_bytes * (walk(access, {}).executions or 0) for access in trace.accesses]
    assert sum(moved) == 1000 * bytes_moved


@pytest.mark.parametrize(
    ("order", "strides"),
    [
        ("i j k", {"C": 0, "A": 1, "B": 48}),
        ("i k j", {"C": 1, "A": 0, "B": 1}),
    ],
)
def test_a_matrix_product_steps_as_its_innermost_loop_says(order: str, strides: dict[str, int]) -> None:
    """Elements: Wolf, Lam, "A Data Locality Optimizing Algorithm", PLDI 1991 (from memory)."""
    loops = " ".join(f"for (int {x} = 0; {x} < 48; ++{x})" for x in order.split())
    found = walked(
        f"{loops} C[i * 48 + j] += A[i * 48 + k] * B[k * 48 + j];", "const float *A, const float *B, float *C"
    )
    assert {name: walks[0].stride_bytes for (name, way), walks in found.items() if way == "read"} == {
        name: 4 * stride for name, stride in strides.items()
    }


def test_rows_follow_each_other_and_columns_do_not() -> None:
    """addr(i, j) = base + (i N + j) s (C language rule, from memory); a column of 1024 floats: 4096 bytes a step."""
    found = walked(
        "for (int i = 0; i < 1024; ++i) for (int j = 0; j < 1024; ++j) { a[i][j] = 0; b[j][i] = 0; }",
        "float a[1024][1024], float b[1024][1024]",
    )
    rows, columns = found["a", "write"][0], found["b", "write"][0]
    assert (rows.pattern, rows.run_elements) == ("sequential", 1024 * 1024)
    assert (columns.pattern, columns.stride_bytes, columns.run_elements) == ("strided", 4096, 1)


def test_a_guard_that_data_opens_in_half_the_cases_leaves_runs_of_two() -> None:
    """1/(1 - p) elements, independent draws with p = 1/2: the geometric law."""
    found = walked("for (int i = 0; i < 5000; ++i) if (a[i] > 3) b[i] = 1;", "const int *a, int *b")
    guarded = found["b", "write"][0]
    assert (guarded.pattern, guarded.run_elements, guarded.basis) == ("sequential", 2, "data")


@pytest.mark.parametrize(("places", "run"), [(2, 2), (4, 4 / 3), (8, 8 / 7)])
def test_a_destination_among_many_gets_runs_of_k_over_k_minus_one(places: int, run: float) -> None:
    """K/(K - 1) elements to one of K destinations that are drawn evenly: the geometric law."""
    names = [f"d{at}" for at in range(places)]
    body = f"int *to[{places}] = {{{', '.join(names)}}}; for (int i = 0; i < 5000; ++i) to[a[i] & {places - 1}][i] = 1;"
    found = walked(body, ", ".join(["const int *a", *(f"int *{name}" for name in names)]))
    for name in names:
        assert found[name, "write"][0].pattern == "steered"
        assert found[name, "write"][0].run_elements == pytest.approx(run)
