"""Gathering: which files are kernels, and which belong together."""

from __future__ import annotations

import subprocess
from pathlib import Path

import pytest

from beatwise.errors import BadInput
from beatwise.source import Gathered, gather

KERNEL = "void {name}(const int *gates, int *sums) {{\n#pragma HLS INTERFACE m_axi port=gates\n{body}\n}}\n"
HELPER = "int half(int x) { return x / 2; }\n"


@pytest.fixture(autouse=True)
def here(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """An empty working directory."""
    work = tmp_path / "work"
    work.mkdir()
    monkeypatch.chdir(work)
    return work


def kernel(name: str = "sweep", body: str = "sums[0] = gates[0];", before: str = "") -> str:
    return before + KERNEL.format(name=name, body=body)


def write(**files: str) -> None:
    """Files by name; ``__`` stands for ``/`` and the last ``_`` for the dot."""
    for name, text in files.items():
        place(name.replace("__", "/")[::-1].replace("_", ".", 1)[::-1], text)


def place(name: str, text: str) -> None:
    path = Path(name)
    path.parent.mkdir(parents=True, exist_ok=True)
    path.write_text(text, encoding="utf-8")


def show(gathered: Gathered) -> list[str]:
    return [
        " + ".join(group.files) + (f" | {' '.join(group.includes)}" if group.includes else "")
        for group in gathered.groups
    ]


def groups(
    *paths: str, include: tuple[str, ...] = (), tops: tuple[str, ...] = (), ignore: tuple[str, ...] = ()
) -> list[str]:
    return show(gather([*map(Path, paths)], include=[*map(Path, include)], tops=tops, ignore=ignore))


def refusal(*paths: str) -> str:
    with pytest.raises(BadInput) as error:
        gather([*map(Path, paths)])
    message = str(error.value)
    assert "\n" not in message
    return message


# ------------------------------------------------------------------------------------------------ files given by name


def test_a_file_given_by_name_is_analysed_as_it_is() -> None:
    write(plain_cpp="void plain(int *p) { *p = 0; }", other_cpp=kernel())
    assert groups("plain.cpp") == ["plain.cpp"]


def test_texts_are_those_of_the_files(here: Path) -> None:
    (here / "a.cpp").write_bytes(b"\xef\xbb\xbf" + kernel(before='#include "h.h"\r\n').encode())
    (here / "h.h").write_bytes(b"// \xe9\r\n")
    (group,) = gather([Path("a.cpp")]).groups
    assert (group.name, group.files["a.cpp"][:14], dict(group.includes)) == (
        "a.cpp",
        '#include "h.h"',
        {"h.h": "// \xe9\r\n"},
    )


@pytest.mark.parametrize(
    ("content", "said"),
    [
        (b"", "an empty file"),
        (b" \r\n", "an empty file"),
        (b"void f(int *p) {}\0", "a binary file, not C++ source"),
        (b"// nothing here\nint x;", "no kernel function in it"),
        (b"int main() { return 0; }", "no kernel function in it"),
    ],
)
def test_a_bad_file_is_one_clear_line(here: Path, content: bytes, said: str) -> None:
    (here / "bad.cpp").write_bytes(content)
    write(good_cpp=kernel())
    assert refusal("good.cpp", "bad.cpp") == f"bad.cpp: {said}"


def test_when_only_kernels_are_wanted_other_files_given_by_name_only_lend_their_functions() -> None:
    write(a_cpp=kernel(before="int half(int);\n", body="half(1);"), b_cpp=HELPER, c_cpp="int x;", d_cpp="")
    paths = [Path(name) for name in ("a.cpp", "b.cpp", "c.cpp", "d.cpp")]
    assert show(gather(paths, only_kernels=True)) == ["a.cpp + b.cpp"]
    assert show(gather(paths[1:], only_kernels=True)) == []


def test_a_missing_file_is_one_clear_line() -> None:
    assert refusal("gone.cpp") == "gone.cpp: no such file or folder"


def test_a_name_outside_the_working_directory_is_shown_in_full(here: Path) -> None:
    outside = here.parent / "out.cpp"
    place(str(outside), kernel())
    assert groups("../out.cpp") == [str(outside)]
    assert groups(str(here / "../out.cpp")) == [str(outside)]


def test_a_file_named_twice_is_analysed_once() -> None:
    write(a_cpp=kernel(), sub__b_cpp=kernel("other"))
    assert groups("a.cpp", "./a.cpp", "sub/../a.cpp", ".") == ["a.cpp", "sub/b.cpp"]


def test_a_link_out_of_its_folder_is_refused_even_by_name(here: Path) -> None:
    place(str(here.parent / "secret.cpp"), kernel())
    (here / "a.cpp").symlink_to(here.parent / "secret.cpp")
    assert refusal("a.cpp") == "a.cpp: a symbolic link that leads out of its folder or repository"


# --------------------------------------------------------------------------------------------- kernels in a folder


@pytest.mark.parametrize(
    "text",
    [
        kernel(),
        kernel().replace("HLS INTERFACE m_axi port=gates", "hls interface mode = M_AXI port=gates"),
        kernel().replace("INTERFACE m_axi", "INTERFACE \\\n  m_axi"),
        "void f(int *p) {\n_Pragma(\"HLS INTERFACE m_axi port=p\")\n}",
        "#define DO(x) _Pragma(#x)\nvoid f(int *p) { DO(HLS interface m_axi port=p) }",
        "#define PORT(x) _Pragma(\"HLS interface m_axi port=x\")\nvoid f(int *p) { PORT(p) }",
        '#include <ap_int.h>\nextern "C" void f(const ap_uint<512> *p) { }',
        '#include <ap_int.h>\n#ifdef X\nextern "C" {\n#endif\nvoid f(const int p[4]) { }\n#ifdef X\n}\n#endif',
        'extern "C" { void f(int *p); }\nvoid f(int *p) {\n#pragma HLS PIPELINE\n}',
        'extern "C" void f(hls::burst_maxi<int> p) { }',
    ],
)  # fmt: skip
def test_a_kernel_is_found_by_reading(text: str) -> None:
    write(deep__in__here_cc=text, main_cpp="int main(int argc, char **argv) { return 0; }", notes_txt=kernel())
    assert groups(".") == ["deep/in/here.cc"]


@pytest.mark.parametrize(
    "text",
    [
        HELPER,
        "// " + kernel().replace("\n", "\n// "),
        'const char *help = R"(\n' + kernel() + ')";',
        "#define PORT(x) _Pragma(\"HLS interface m_axi port=x\")\nvoid f(int *p);",
        'extern "C" void f(int *p) { }',
        "#include <ap_int.h>\nint main(int argc, char **argv) { }",
        "#pragma HLS interface\n" * 3,
        "",
    ],
)  # fmt: skip
def test_other_files_in_a_folder_are_passed_over(text: str) -> None:
    write(a_cpp=kernel(), other_cpp=text)
    assert groups(".") == ["a.cpp"]


def test_a_function_named_as_top_counts_as_a_kernel() -> None:
    write(a_cpp=kernel(), b_cpp="void plain(int *p) { *p = 0; }")
    assert groups(".", tops=("plain",)) == ["a.cpp", "b.cpp"]


def test_a_folder_without_interfaces_offers_what_looks_like_a_kernel() -> None:
    write(
        a_cpp="#include <ap_int.h>\nvoid plain(ap_uint<8> *p) { *p = 0; }",
        b_cpp='extern "C" void f(int *p) { }',
        c_cpp=HELPER,
    )
    assert groups(".") == ["a.cpp", "b.cpp"]


def test_a_folder_without_any_kernel_is_one_clear_line() -> None:
    write(empty__readme_txt="", helpers__half_cpp=HELPER)
    assert refusal("empty") == "empty: no kernel in this folder"
    assert refusal("helpers") == "helpers: no kernel in this folder"


def test_hidden_binary_large_and_ignored_files_are_passed_over(here: Path) -> None:
    write(a_cpp=kernel(), _cache__b_cpp=kernel(), old__c_cpp=kernel())
    place(".hidden/d.cpp", kernel())
    place(".e.cpp", kernel())
    (here / "f.cpp").write_bytes(kernel().encode() + b"\0")
    (here / "g.cpp").write_bytes(kernel().encode() + b" " * (4 << 20))
    assert groups(".", ignore=("old/*",)) == ["a.cpp", "_cache/b.cpp"]


def test_links_that_lead_out_of_the_folder_are_passed_over(here: Path) -> None:
    write(k__a_cpp=kernel(), k__self_cpp="x")
    place(str(here / "out/b.cpp"), kernel("b"))
    (here / "k/link.cpp").symlink_to(here / "out/b.cpp")
    (here / "k/folder").symlink_to(here / "out")
    (here / "k/twice.cpp").symlink_to(here / "k/a.cpp")
    assert groups("k") == ["k/a.cpp"]


# ---------------------------------------------------------------------------------------------------------- headers


def test_headers_are_found_by_their_includes_and_theirs() -> None:
    write(
        k__a_cpp=kernel(before='#include "types.h"\n#include <ap_int.h>\n#include "gone.h"\n'),
        k__types_h='#include "../common/sizes.hpp"\n#include "table.inc"\n',
        k__table_inc="1, 2, 3",
        common__sizes_hpp="constexpr int N = 4;",
        common__unused_h="",
    )
    assert groups(".") == ["k/a.cpp | k/types.h common/sizes.hpp k/table.inc"]


def test_headers_are_looked_for_upward_and_in_the_usual_folders() -> None:
    write(
        src__deep__a_cpp=kernel(before='#include "one.h"\n#include "src/two.h"\n#include <three.h>\n'),
        include__one_h="",
        src__two_h="",
        src__inc__three_h="",
        other__one_h="",
    )
    assert sorted(groups(".")[0].split(" | ")[1].split()) == ["include/one.h", "src/inc/three.h", "src/two.h"]


def test_a_header_beside_its_includer_comes_before_others() -> None:
    write(
        a__k_cpp=kernel(before='#include "x.h"\n'),
        a__x_h="",
        x_h="",
        b__x_h="",
        b__k_cpp=kernel(before='#include "x.h"\n'),
    )
    assert groups(".") == ["a/k.cpp | a/x.h", "b/k.cpp | b/x.h"]
    assert groups("a", include=("b",)) == ["a/k.cpp | a/x.h"]


def test_a_sibling_folder_is_no_place_for_headers() -> None:
    write(a__k_cpp=kernel(before='#include "x.h"\n'), b__x_h="")
    assert groups(".") == ["a/k.cpp"]
    assert groups("a/k.cpp", include=("b",)) == ["a/k.cpp | b/x.h"]


def test_a_macro_may_name_the_header() -> None:
    write(a_cpp=kernel(before='#define SIZES "sizes.h"\n#include SIZES\n'), sizes_h="")
    assert groups("a.cpp") == ["a.cpp | sizes.h"]


def test_nothing_outside_the_given_folders_is_read(here: Path) -> None:
    place(str(here.parent / "secret.h"), "int secret;")
    place(str(here.parent / "hidden/x.h"), "int secret;")
    place(".private/x.h", "int secret;")
    (here / "link.h").symlink_to(here.parent / "secret.h")
    names = [
        '"../secret.h"',
        f'"{here.parent}/secret.h"',
        '"/etc/passwd"',
        "</etc/passwd>",
        '"link.h"',
        '".private/x.h"',
    ]
    write(a_cpp=kernel(before="".join(f"#include {name}\n" for name in names)))
    for given in (".", "a.cpp"):
        gathered = gather([Path(given)])
        assert show(gathered) == ["a.cpp"]
        assert sorted({problem.what for problem in gathered.problems}) == [
            "included, but it lies outside the given folders, so it was not read"
        ]


def test_the_enclosing_work_tree_is_the_boundary_of_a_named_file() -> None:
    write(k__a_cpp=kernel(before='#include "../common/x.h"\n'), common__x_h="")
    assert groups("k/a.cpp") == ["k/a.cpp"]
    subprocess.run(["git", "init", "-q", "."], check=True)
    assert groups("k/a.cpp") == ["k/a.cpp | common/x.h"]


def test_a_header_that_cannot_be_read_is_told(here: Path) -> None:
    write(a_cpp=kernel(before='#include "x.h"\n'))
    (here / "x.h").write_bytes(b"\0")
    (problem,) = gather([Path("a.cpp")]).problems
    assert (problem.file, problem.what) == ("x.h", "included, but a binary file, not C++ source")


def test_headers_that_include_one_another_come_once() -> None:
    write(a_cpp=kernel(before='#include "x.h"\n'), x_h='#include "y.h"\n', y_h='#include "x.h"\n#include "a.cpp"\n')
    assert groups("a.cpp") == ["a.cpp | x.h y.h"]


def test_a_kernel_in_a_header_belongs_to_the_kernel_that_includes_it() -> None:
    write(a_cpp=kernel(before='#include "x.hpp"\n'), x_hpp=kernel("inner"), alone_hpp=kernel("alone"))
    assert groups(".") == ["a.cpp | x.hpp", "alone.hpp"]


# ---------------------------------------------------------------------------------------------------------- linking

CALLS_HALF = "int half(int x);\n"


def test_a_source_that_defines_what_the_kernel_calls_is_linked() -> None:
    write(
        a_cpp=kernel(before=CALLS_HALF, body="sums[0] = half(gates[0]);"),
        b_cpp=HELPER,
        c_cpp="int third(int x) { return x; }",
    )
    assert groups(".") == ["a.cpp + b.cpp"]


def test_linking_goes_on_from_file_to_file_and_through_headers() -> None:
    write(
        a_cpp=kernel(before='#include "h.h"\n', body="sums[0] = half(gates[0]);"),
        h_h="int half(int); int third(int); struct Filter { int run(int); }; extern const int table[4];",
        half_cpp='#include "h.h"\nint half(int x) { Filter f; return f.run(x); }',
        third_cpp='#include "h.h"\nint third(int x) { return x; }',
        filter_cpp='#include "h.h"\nint Filter::run(int x) { return table[x]; }',
        table_cpp='#include "h.h"\nextern const int table[4] = {1, 2, 3, 4};',
    )
    assert groups(".") == ["a.cpp + half.cpp + filter.cpp + table.cpp | h.h"]


def test_files_that_define_the_same_function_are_never_linked() -> None:
    for folder in ("east", "west"):
        place(f"{folder}/top.cpp", kernel(before=CALLS_HALF, body="half(1);") + HELPER)
    place("user.cpp", kernel("user", before=CALLS_HALF, body="half(1);"))
    assert groups(".") == ["user.cpp", "east/top.cpp", "west/top.cpp"]


def test_of_two_definitions_the_one_that_includes_the_declaration_is_meant() -> None:
    for folder in ("east", "west"):
        place(f"{folder}/half.h", CALLS_HALF)
        place(f"{folder}/half.cpp", '#include "half.h"\n' + HELPER)
        place(f"{folder}/top.cpp", kernel(before='#include "half.h"\n', body="half(1);"))
    assert groups(".") == ["east/top.cpp + east/half.cpp | east/half.h", "west/top.cpp + west/half.cpp | west/half.h"]


def test_a_static_function_of_another_file_is_not_meant() -> None:
    write(a_cpp=kernel(before=CALLS_HALF, body="half(1);"), b_cpp="static " + HELPER)
    assert groups(".") == ["a.cpp"]


def test_a_declaration_that_is_not_used_links_nothing() -> None:
    write(a_cpp=kernel(before=CALLS_HALF), b_cpp=HELPER)
    assert groups(".") == ["a.cpp"]


def test_files_given_by_name_are_linked_with_one_another_only() -> None:
    write(a_cpp=kernel(before=CALLS_HALF, body="half(1);"), b_cpp=HELPER, c_cpp=kernel("c"))
    assert groups("b.cpp", "a.cpp", "c.cpp") == ["a.cpp + b.cpp", "c.cpp"]
    assert groups("a.cpp") == ["a.cpp"]


def test_kernels_that_call_each_other_are_one_group() -> None:
    write(
        a_cpp=kernel("a", before="void b(const int *gates, int *sums);\n", body="b(gates, sums);"),
        b_cpp=kernel("b", before="void a(const int *gates, int *sums);\n", body="a(gates, sums);"),
    )
    assert groups(".") == ["a.cpp + b.cpp"]


def test_an_include_folder_must_exist() -> None:
    write(a_cpp=kernel())
    with pytest.raises(BadInput, match=r"^gone: no such folder to include from$"):
        gather([Path("a.cpp")], include=[Path("gone")])
