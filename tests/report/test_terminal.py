"""What an engineer reads on the terminal."""

from __future__ import annotations

import io

import pytest

from beatwise.model.kernel import Problem
from beatwise.model.traffic import PortTraffic
from beatwise.report.sheet import dearest_first
from beatwise.report.terminal import audit_text, capable, problem_line, sift_text
from report.hand_made import FILE, access, finding, place, scatter, survey

AUDIT_80 = """\
━━ sector_scatter ━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━ kernels/sector_scatter.cpp:20
   on hbm2-32ch · 2 interfaces · 2 accesses · 1 finding · 1 stream

   port    0                            13.3 GB/s     now of could  width
   gates   ━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━╸┤    13.3 of 13.3    512 bit
   strong  ━╸┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┄┤     0.6 of 13.3     32 bit

     budget  8 MB in 6.97 ms a call: 1.15 GB/s, 0.25 % of the 461 GB/s of the
             board's memory.
             After all advice: 603 µs, 13.3 GB/s, 2.9 % of it.

 −12.7 GB/s  `strong` is written only when `power > floor_dbz` says so, so its
             beats cannot join into bursts.
         at  kernels/sector_scatter.cpp:32
    because  line 31 decides in every iteration of the loop at line 28 from data
             read in it
             1 beat of 4 bytes a request: 4 of 64 bytes that the channel moves
             are used
    instead  Collect the strong gates in a local buffer of 256 entries (1 KiB)
             and write it out in one run when it is full.
       then  narrow-port
       rule  guarded-access, error

   Accesses, GB/s
   line         argument  pattern     step B   run  beats  now/could  held by
     29  read   gates     sequential     +64  4096     16  13.3/13.3  channel
     32  write  strong    sequential      +4   2.5      1   0.6/13.3  requests
         kept from bursts by data-dependent-guard

   Loops, one call
   line  loop    takes  could take
     32  keep  6.67 ms      301 µs
     20  load   301 µs      301 µs

   Streams
   sorted × 8, 32 bit, depth 16: sort_gates → write_sector

Estimates from the source and the board's profile; the synthesis report and the
board decide.
"""

SIFT_80 = """\
━━ sector_scatter ━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━━ kernels/sector_scatter.cpp:20

 −12.7 GB/s  `strong` is written only when `power > floor_dbz` says so, so its
             beats cannot join into bursts.
         at  kernels/sector_scatter.cpp:32
    instead  Collect the strong gates in a local buffer of 256 entries (1 KiB)
             and write it out in one run when it is full.
       rule  guarded-access, error

1 finding at warning or above in 1 kernel.
"""


def test_the_audit_reads_like_this_at_80_columns() -> None:
    assert audit_text(survey()) == AUDIT_80


def test_sift_reads_like_this_at_80_columns() -> None:
    assert sift_text(survey(), "warning") == SIFT_80


@pytest.mark.parametrize("width", [40, 60, 80, 100, 120, 140, 200])
def test_no_line_is_wider_than_the_page(width: int) -> None:
    long = access(77, "reflectivity_after_clutter_removal", blocked=("data-dependent-guard", "interleaved"))
    kernel = scatter(accesses=(*scatter().accesses, long), findings=(finding(32, message="word " * 40),))
    text = audit_text(survey(kernel), width=width)
    assert max(map(len, text.splitlines())) <= width
    assert not any(line.endswith(" ") for line in text.splitlines())


def test_a_wide_page_sets_evidence_beside_advice_and_shows_every_column() -> None:
    text = audit_text(survey(), width=200)
    assert any("because" in line and "instead" in line for line in text.splitlines())
    assert "kept from bursts by" in next(line for line in text.splitlines() if "sizes" in line)
    assert f"{FILE}:32  write" in text


def test_a_beam_shows_what_a_port_gets_of_what_it_could_get() -> None:
    half = PortTraffic("half", ("half",), 256, (0,), 6.0, 12.0)
    line = next(line for line in audit_text(survey(scatter(interfaces=(half,)))).splitlines() if " half " in line)
    drawn, lost = line.count("━") + line.count("╸"), line.count("┄")
    assert abs(drawn - lost) <= 1 and lost > 5


def test_places_can_be_followed_at_any_width() -> None:
    deep = "stations/" * 12 + "scan.cpp"
    kernel = scatter(file=deep, findings=(finding(32, place=place(32, file=deep)),))
    assert f"{deep}:20" in audit_text(survey(kernel), width=140)
    assert f"{deep}:32" in audit_text(survey(kernel), width=140)


def test_accesses_of_several_files_are_told_apart() -> None:
    rows = (access(5, "gates"), access(5, "gates", place=place(5, file="kernels/helpers.hpp")))
    text = audit_text(survey(scatter(accesses=rows)))
    assert "in kernels/helpers.hpp" in text
    assert f"in {FILE}" in text


def test_findings_come_dearest_first_and_those_without_a_price_last() -> None:
    losses = [None, 0.5, 12.0, 3.0]
    findings = dearest_first(finding(10 + i, loss_gbps=loss) for i, loss in enumerate(losses))
    assert [each.loss_gbps for each in findings] == [12, 3, 0.5, None]


def test_what_is_said_of_several_arguments_alike_is_said_once() -> None:
    both = tuple(
        finding(line, argument=name, interface=name, message=f"`{name}` is bad (line {line}).", because=())
        for line, name in ((31, "s1"), (32, "s2"))
    )
    text = audit_text(survey(scatter(findings=both)))
    assert text.count("is bad") == 1
    assert f"likewise  {FILE}:32 `s2`" in text


def test_what_differs_in_a_number_is_said_apart() -> None:
    both = (finding(31), finding(32, loss_gbps=3.0))
    assert audit_text(survey(scatter(findings=both))).count("is written only when") == 2


def test_sift_shows_only_what_reaches_the_threshold() -> None:
    kernel = scatter(findings=(finding(32), finding(40, "assumed-size", level="note", loss_gbps=None)))
    assert "assumed-size" not in sift_text(survey(kernel), "warning")
    assert "1 below" in sift_text(survey(kernel), "warning")
    assert "assumed-size" in sift_text(survey(kernel), "note")


def test_an_accepted_finding_is_left_to_the_audit_which_gives_the_reason() -> None:
    kernel = scatter(findings=(finding(32, accepted="the list is 12 entries long"),))
    assert "guarded-access" not in sift_text(survey(kernel), "note")
    assert "1 accepted" in sift_text(survey(kernel), "note")
    assert "accepted  the list is 12 entries long" in audit_text(survey(kernel))


def test_a_clean_kernel_is_told_to_be_clean() -> None:
    assert "No finding: no rule has anything to tell here." in audit_text(survey(scatter(findings=())))
    assert sift_text(survey(scatter(findings=())), "note") == "No finding at note or above in 1 kernel.\n"


def test_problems_are_listed_where_they_are_not_told_elsewhere() -> None:
    made = survey(problems=(Problem("a.cpp", None, "gave up after 20 s"),))
    assert "a.cpp: gave up after 20 s" in audit_text(made)
    assert "gave up" not in audit_text(made, problems=False)


def test_a_port_that_no_directive_asks_for_is_said_to_be_taken() -> None:
    assert "No directive makes a port for strong" in audit_text(survey(scatter(undeclared=("strong",))))


HOSTILE = "gate\x1b[31m\x07\x9b2J\u202e[bold red]:smile:\n::error::\u2066x"


@pytest.mark.parametrize("colour", [False, True])
def test_no_name_in_the_source_can_steer_the_terminal(colour: bool) -> None:
    row = access(5, HOSTILE, reason=HOSTILE, interface=HOSTILE)
    spoilt = scatter(
        kernel=HOSTILE,
        interfaces=(PortTraffic(HOSTILE, (HOSTILE, "x"), 32, (0,), 1.0, 2.0),),
        undeclared=(HOSTILE,),
        accesses=(row,),
        findings=(finding(5, message=HOSTILE, because=(HOSTILE,), instead=HOSTILE, accepted=HOSTILE, then=(HOSTILE,)),),
    )
    made = survey(spoilt, problems=(Problem(HOSTILE, 3, HOSTILE),))
    for width in (80, 200):
        text = audit_text(made, width=width, colour=colour) + sift_text(made, "note", width=width, colour=colour)
        for harm in ("\x1b[31m\\", "\x07", "\x9b", "\u202e", "\u2066", "\n::error"):
            assert harm not in text
        assert colour == ("\x1b[" in text)
    assert "\n" not in problem_line(Problem(HOSTILE, 3, HOSTILE))


def test_markup_in_a_name_is_printed_as_it_is() -> None:
    assert "[bold red]x[/] :smile:" in audit_text(
        survey(scatter(findings=(finding(5, message="[bold red]x[/] :smile:"),)))
    )


class Screen(io.StringIO):
    """A stream that says what it is."""

    def __init__(self, terminal: bool, encoding: str) -> None:
        super().__init__()
        self.terminal, self.named = terminal, encoding

    def isatty(self) -> bool:
        return self.terminal

    @property
    def encoding(self) -> str:  # type: ignore[override]
        return self.named


@pytest.mark.parametrize(
    ("terminal", "no_color", "term", "colour"),
    [
        (True, None, "xterm", True),
        (False, None, "xterm", False),
        (True, "1", "xterm", False),
        (True, "", "xterm", True),
        (True, None, "dumb", False),
    ],
)
def test_colour_is_for_terminals_and_never_where_no_color_is_set(
    terminal: bool, no_color: str | None, term: str, colour: bool, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setenv("TERM", term)
    monkeypatch.delenv("NO_COLOR", raising=False)
    if no_color is not None:
        monkeypatch.setenv("NO_COLOR", no_color)
    assert capable(Screen(terminal, "utf-8"))[0] is colour


def test_a_terminal_that_knows_ascii_only_gets_ascii_only() -> None:
    assert capable(Screen(True, "ascii"))[1]
    assert not capable(Screen(True, "utf-8"))[1]
    text = audit_text(survey(scatter(kernel="brücke")), ascii_only=True)
    assert text.isascii()
    assert "gates   ====" in text
