"""The oracle itself: it sees what runs, and each expectation in the corpus is borne out by running the kernel."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

import pytest

from oracle import Argument, Observed, OracleError, Subject, Truth, corpus, fixtures, objections, observe, read_truth

if TYPE_CHECKING:
    from collections.abc import Callable


@pytest.fixture(scope="module")
def scratch(tmp_path_factory: pytest.TempPathFactory) -> Path:
    return tmp_path_factory.mktemp("oracle")


@pytest.fixture
def seen(tmp_path: Path, scratch: Path) -> Callable[[str], tuple[Observed, ...]]:
    """Runs a kernel given as text; its truth lines say how."""

    def run(text: str) -> tuple[Observed, ...]:
        source = tmp_path / "kernel.cpp"
        source.write_text(text)
        truth = read_truth(source)
        return observe(source, truth.top, truth.arguments, scratch)

    return run


@pytest.mark.parametrize("subject", [*corpus(), *fixtures()], ids=str)
def test_running_the_kernel_bears_out_what_is_said_of_it(subject: Subject, scratch: Path) -> None:
    assert subject.truth.expectations
    found = objections(subject.truth, subject.observe(scratch))
    assert not found, "\n".join(found)


def test_the_corpus_is_large_enough() -> None:
    assert len(corpus()) >= 60
    assert len(fixtures()) >= 12


def test_a_fixture_is_a_file_that_a_user_could_have_written() -> None:
    for subject in fixtures():
        assert "//!" not in subject.kernel.read_text()
        assert "truth:" not in subject.kernel.read_text()


SWEEP = """\
// truth: sweep n=40 in[64] out[64]
void sweep(int n, const int *in, int *out) {
    for (int i = 0; i < n; i++)
        out[i] = in[2 * i % 64];
}
"""


@pytest.mark.parametrize(
    "claims",
    [
        "//! read in sequential run=40 //! write out sequential run=40",  # not the pattern
        "//! read in strided stride=4 //! write out sequential run=40",  # not the stride
        "//! read in strided stride=8 //! write out sequential run=48",  # not the run
        "//! read in strided stride=8 //! write out sequential run=40 element=8",  # not the element
        "//! read in strided stride=8",  # a store that is not described
        "//! read in strided //! write out sequential run=40 //! read out sequential run=40",  # an access that never is
    ],
)
def test_a_false_claim_is_objected_to(claims: str, tmp_path: Path, scratch: Path) -> None:
    source = tmp_path / "sweep.cpp"
    source.write_text(SWEEP.replace("% 64];", f"% 64];  {claims}"))
    truth = read_truth(source)
    assert objections(truth, observe(source, truth.top, truth.arguments, scratch))


def test_a_true_claim_is_not(tmp_path: Path, scratch: Path) -> None:
    source = tmp_path / "sweep.cpp"
    claims = "//! read in strided stride=8 element=4 //! write out sequential run=40"
    source.write_text(SWEEP.replace("% 64];", f"% 64];  {claims}"))
    truth = read_truth(source)
    assert objections(truth, observe(source, truth.top, truth.arguments, scratch)) == []


def test_every_address_is_seen_in_order(seen: Callable[[str], tuple[Observed, ...]]) -> None:
    read, write = seen(SWEEP)
    assert (read.line, read.argument, read.direction, read.element_bytes) == (4, "in", "read", 4)
    assert read.pieces == tuple((2 * i % 64, 1) for i in range(40))
    assert write.pieces == tuple((i, 1) for i in range(40))
    assert all(later > earlier for earlier, later in zip(read.times, read.times[1:], strict=False))


def test_calls_are_told_apart_by_the_way_there(seen: Callable[[str], tuple[Observed, ...]]) -> None:
    sites = seen("""\
// truth: top v[64]
static int get(int *v, int i) { return v[i]; }
static int both(int *v, int i) {
    return get(v, i)
        + get(v, 63 - i);
}
void top(int *v) { int s = 0; for (int i = 0; i < 64; i++) s += both(v, i); }
""")
    assert [(site.line, site.calls, site.pattern) for site in sites] == [
        (2, (7, 4), "sequential"),
        (2, (7, 5), "descending"),
    ]


def test_what_a_header_does_is_put_down_to_the_line_that_calls_it(seen: Callable[[str], tuple[Observed, ...]]) -> None:
    (read, write) = seen("""\
// truth: top in[8] out[8]
#include "ap_int.h"
void top(const ap_uint<512> *in, ap_uint<512> *out) {
    for (int i = 0; i < 8; i++)
        out[7 - i].range(63, 32) = in[i].range(31, 0);
}
""")
    assert (read.line, read.element_bytes, read.pieces) == (5, 64, tuple((i, 1) for i in range(8)))
    assert (write.line, write.pattern, write.executions) == (5, "descending", 8)


def test_a_copy_is_one_run(seen: Callable[[str], tuple[Observed, ...]]) -> None:
    (site,) = seen("""\
// truth: top in[64]
#include <cstring>
void top(const short *in) {
    short local[16];
    for (int i = 0; i < 4; i++) memcpy(local, in + 16 * i, sizeof local);
}
""")
    assert site.pieces == ((0, 16), (16, 16), (32, 16), (48, 16))
    assert site.copies
    assert site.run == 16


def test_a_store_that_the_compiler_hides_is_refused(seen: Callable[[str], tuple[Observed, ...]]) -> None:
    with pytest.raises(OracleError, match="a store was not seen"):
        seen("""\
// truth: top out[4]=zero
struct Triple { int a, b, c, d, e; };
static Triple make(int i) { return {i + 1, 2, 3, 4, 5}; }
void top(Triple *out) { for (int i = 0; i < 4; i++) out[i] = make(i); }
""")


def test_a_kernel_that_does_not_compile_says_why(seen: Callable[[str], tuple[Observed, ...]]) -> None:
    with pytest.raises(OracleError, match="no_such_name"):
        seen("// truth: top out[4]\nvoid top(int *out) { out[0] = no_such_name; }\n")


def test_arguments_are_read_from_the_comment(tmp_path: Path) -> None:
    source = tmp_path / "kernel.cpp"
    source.write_text("// truth: top n=8 m~3 in[64]\n// truth: at[9]=rows:2..6 s<4>=0..1 quiet tells=shared-port\n")
    arguments = (
        Argument("n", "scalar", value="8"),
        Argument("m", "scalar", value="3", told=False),
        Argument("in", "memory", count=64),
        Argument("at", "memory", count=9, fill=("rows", 2, 6)),
        Argument("s", "stream", count=4, fill=("range", 0, 1)),
    )
    truth = read_truth(source)
    assert truth == Truth("top", arguments, (), quiet=True, tells=("shared-port",))
    assert truth.given == ("n=8",)


@pytest.mark.parametrize(
    "comment", ["//! read in sequential", "//! reads in single", "//! read in wavy", "//! read in single runs=3"]
)
def test_a_comment_that_says_nothing_checkable_is_refused(comment: str, tmp_path: Path) -> None:
    source = tmp_path / "kernel.cpp"
    source.write_text(f"// truth: top in[4]\nint x;  {comment}\n")
    with pytest.raises(ValueError, match="line 2"):
        read_truth(source)
