"""Files, their text, the comments and directives in it, and what the text alone shows."""

from beatwise.source.acceptances import Acceptance, acceptances_in
from beatwise.source.directives import parse_directive, pragmas_in, read_script
from beatwise.source.files import Gathered, Group, gather
from beatwise.source.read import SourceText, read_text
from beatwise.source.sites import Site, subscripts_in

__all__ = [
    "Acceptance",
    "Gathered",
    "Group",
    "Site",
    "SourceText",
    "acceptances_in",
    "gather",
    "parse_directive",
    "pragmas_in",
    "read_script",
    "read_text",
    "subscripts_in",
]
