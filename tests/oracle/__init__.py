"""What a kernel really touches, seen by running it."""

from oracle.kernels import Subject, corpus, fixtures
from oracle.observe import Argument, Observed, OracleError, observe
from oracle.truth import Expectation, Truth, objections, read_truth

__all__ = [
    "Argument",
    "Expectation",
    "Observed",
    "OracleError",
    "Subject",
    "Truth",
    "corpus",
    "fixtures",
    "objections",
    "observe",
    "read_truth",
]
