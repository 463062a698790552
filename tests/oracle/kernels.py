"""The kernels that are run: the corpus, its truth in comments, and the fixtures, theirs in files of their own."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path

from oracle.observe import Observed, observe
from oracle.truth import Truth, read_truth

TESTS = Path(__file__).parents[1]
TRUTHS = TESTS / "truth_fixtures"
FIXTURES = TESTS.parent / "fixtures"


@dataclass(frozen=True, slots=True)
class Subject:
    """A kernel, and the file in which its truth stands."""

    kernel: Path
    truth_file: Path

    def __str__(self) -> str:
        return self.kernel.stem

    @property
    def truth(self) -> Truth:
        return read_truth(self.truth_file)

    def observe(self, scratch: Path) -> tuple[Observed, ...]:
        truth = self.truth
        needs = [self.truth_file.parent / truth.needs] if truth.needs else []
        return observe(self.kernel, truth.top, truth.arguments, scratch, needs)

    @property
    def options(self) -> list[str]:
        """What the analysed program is told on its command line, from the kernel's folder."""
        truth = self.truth
        given = [word for value in truth.given for word in ("--given", value)]
        script = ["--directives", truth.directives] if truth.directives else []
        return ["--top", truth.top, *given, *script]


def corpus() -> list[Subject]:
    return [Subject(kernel, kernel) for kernel in sorted((TESTS / "corpus").glob("*.cpp"))]


def fixtures() -> list[Subject]:
    return [Subject(kernel, TRUTHS / f"{kernel.stem}.truth") for kernel in sorted(FIXTURES.glob("*.cpp"))]
