"""Our own headers: what a kernel may include parses, means what it should, and takes the bytes of the hardware."""

from __future__ import annotations

import string
import time
from pathlib import Path

import pytest
from clang.cindex import Index, TranslationUnit

from beatwise.frontend.complaints import HARMLESS
from beatwise.frontend.headers import FORWARDS, HEADER_FLAGS, INCLUDE_DIRECTORY, header_files

ERROR = 3
FLAGS = ["-x", "c++", "-target", "x86_64-unknown-linux-gnu", "-ferror-limit=0", *HEADER_FLAGS]
PUBLIC = sorted(path.removeprefix(f"{INCLUDE_DIRECTORY}/") for path in header_files() if "/_bw/" not in path[4:])


def parsed(text: str, *flags: str) -> TranslationUnit:
    files = [*header_files().items(), ("kernel.cpp", text)]
    return Index.create().parse("kernel.cpp", args=[*FLAGS, *(flags or ("-std=c++17",))], unsaved_files=files)


def errors(text: str, *flags: str) -> list[str]:
    return [
        f"{one.location.file}:{one.location.line}: {one.spelling}"
        for one in parsed(text, *flags).diagnostics
        if one.severity >= ERROR and not HARMLESS.search(one.spelling)
    ]


def includes(*names: str) -> str:
    return "".join(f"#include <{name}>\n" for name in names)


@pytest.mark.parametrize("name", PUBLIC)
def test_each_header_stands_alone_and_may_be_included_twice(name: str) -> None:
    assert errors(includes(name, name)) == []


@pytest.mark.parametrize("standard", ["c++14", "c++17", "c++20"])
def test_all_headers_go_together_in_each_standard(standard: str) -> None:
    assert errors(includes(*PUBLIC), f"-std={standard}") == []


def test_a_kernel_may_define_any_letter_and_the_usual_names_as_macros_before_it_includes() -> None:
    taken = [
        *string.ascii_letters,
        "DEPTH",
        "WIDTH",
        "SIZE",
        "LEN",
        "MIN",
        "MAX",
        "TYPE",
        "DTYPE",
        "ROWS",
        "COLS",
        "W1",
        "n0",
    ]
    assert errors("".join(f"#define {name} @\n" for name in taken) + includes(*PUBLIC)) == []


def test_a_forward_leads_to_a_header_that_exists() -> None:
    assert {target for target in FORWARDS.values() if f"{INCLUDE_DIRECTORY}/{target}" not in header_files()} == set()


def test_nothing_is_read_from_the_disk() -> None:
    assert "file not found" in errors("#include <linux/version.h>")[0]


def test_a_kernel_with_the_usual_headers_parses_in_a_fraction_of_a_second() -> None:
    text = includes("ap_int.h", "ap_fixed.h", "hls_stream.h", "hls_vector.h", "hls_math.h", "ap_axi_sdata.h")

    def seconds() -> float:
        start = time.perf_counter()
        parsed(text)
        return time.perf_counter() - start

    assert min(seconds() for _ in range(5)) < 0.25  # some 0.02 on an idle machine


SIZES = [
    ("ap_uint<1>", 1, 1),
    ("ap_int<8>", 1, 1),
    ("ap_uint<9>", 2, 2),
    ("ap_uint<24>", 4, 4),
    ("ap_int<33>", 8, 8),
    ("ap_uint<96>", 16, 16),
    ("ap_uint<512>", 64, 64),
    ("ap_uint<4096>", 512, 512),
    ("ac_int<48, false>", 8, 8),
    ("ap_fixed<18, 4>", 4, 4),
    ("ap_ufixed<16, 8, AP_RND, AP_SAT>", 2, 2),
    ("half", 2, 2),
    ("std::complex<float>", 8, 4),
    ("std::array<ap_uint<24>, 5>", 20, 4),
    ("hls::vector<float, 16>", 64, 64),
    ("hls::vector<float, 3>", 12, 4),
    ("hls::vector<ap_uint<8>, 24>", 24, 8),
    ("tapa::vec_t<double, 8>", 64, 64),
]


@pytest.mark.parametrize(("name", "size", "alignment"), SIZES, ids=[name for name, *_ in SIZES])
def test_a_type_takes_the_bytes_of_the_hardware(name: str, size: int, alignment: int) -> None:
    used = includes("ap_fixed.h", "ac_int.h", "hls_half.h", "hls_vector.h", "array", "complex", "tapa.h")
    assert errors(f'{used}static_assert(sizeof({name}) == {size} && alignof({name}) == {alignment}, "");') == []


def test_a_record_with_a_wide_word_is_padded_to_the_word() -> None:
    record = "struct gate { ap_uint<512> echoes; float power; };"
    assert errors(f'{includes("ap_int.h")}{record} static_assert(sizeof(gate) == 128, "");') == []


RESULTS = [
    ("u8 + u8", "ap_uint<9>"),
    ("u8 - u8", "ap_int<9>"),
    ("u8 * s16", "ap_int<24>"),
    ("s16 / u8", "ap_int<16>"),
    ("s16 % u8", "ap_int<9>"),
    ("u8 & s16", "ap_int<16>"),
    ("u8 | u8", "ap_uint<8>"),
    ("u8 << 3", "ap_uint<8>"),
    ("u8 >> u8", "ap_uint<8>"),
    ("1 << u8", "int"),
    ("u8 + 1", "ap_int<33>"),
    ("1u + u8", "ap_uint<33>"),
    ("u8 * 2.0f", "float"),
    ("-u8", "ap_int<9>"),
    ("~u8", "ap_int<9>"),
    ("u8 < s16", "bool"),
    ("f * f", "ap_fixed<32, 16>"),
    ("f + f", "ap_fixed<17, 9>"),
    ("f * 2.0", "double"),
]


@pytest.mark.parametrize(("expression", "result"), RESULTS, ids=[expression for expression, _ in RESULTS])
def test_an_operation_has_the_width_that_loses_nothing(expression: str, result: str) -> None:
    values = "extern ap_uint<8> u8; extern ap_int<16> s16; extern ap_fixed<16, 8> f;"
    check = f'static_assert(__is_same(decltype({expression}), {result}), "");'
    assert errors(includes("ap_fixed.h") + values + check) == []


USES = sorted((Path(__file__).parent / "header_uses").glob("*.cpp"))


@pytest.mark.parametrize("use", USES, ids=lambda path: path.stem)
def test_what_kernels_do_with_the_types_is_understood(use: Path) -> None:
    assert errors(includes(*PUBLIC) + use.read_text(encoding="utf-8")) == []


def test_there_are_uses() -> None:
    assert len(USES) >= 8


LARGE = "static {0} zeros[1 << 20] = {{}}; static {0} given[1 << 20] = {{{{0}}}}; static {0} unset[1 << 20];"


@pytest.mark.parametrize(
    "name", ["ap_uint<8>", "ap_fixed<16, 4>", "half", "std::complex<float>", "hls::vector<float, 4>"]
)
def test_a_large_array_costs_no_time(name: str) -> None:
    start = time.perf_counter()
    assert errors(includes("ap_fixed.h", "hls_half.h", "hls_vector.h", "complex") + LARGE.format(name)) == []
    assert time.perf_counter() - start < 1.5  # some 0.05 on an idle machine; seconds if every element is worked out


def test_the_uses_of_a_constexpr_integer_survive_although_it_has_no_value() -> None:
    unit = parsed(includes("ap_int.h") + "constexpr ap_uint<8> first = 5; int f(int *a) { return a[first]; }")
    (function,) = [one for one in unit.cursor.get_children() if one.spelling == "f"]
    assert "first" in {one.spelling for one in function.walk_preorder()}


def test_ap_int_alone_brings_what_kernels_take_for_granted() -> None:
    taken = """
        void f(ap_uint<8> *p, uint32_t n) {
            memcpy(p, p + n, 8); printf("%d", abs(-3)); std::cout << sqrt(2.0) << std::max(1, 2);
        }"""
    assert errors(includes("ap_int.h") + taken) == []
