"""From the compiler's raw locations to places in the user's own files."""

from __future__ import annotations

from bisect import bisect_right
from collections.abc import Mapping

from beatwise.frontend.libclang import MACRO_BIT, Extent, Location, TranslationUnit, library, location
from beatwise.model.place import Place


class GivenFile:
    """A file of the user: the name shown to them, and its bytes. Offsets and lengths are in bytes."""

    def __init__(self, name: str, contents: bytes) -> None:
        self.name = name
        self.contents = contents
        self.ascii = contents.isascii()
        self._starts = [0]
        start = contents.find(b"\n") + 1
        while start:
            self._starts.append(start)
            start = contents.find(b"\n", start) + 1

    def line_column(self, offset: int) -> tuple[int, int]:
        """Both from 1; the column in code points."""
        line = bisect_right(self._starts, offset)
        start = self._starts[line - 1]
        if self.ascii:
            return line, offset - start + 1
        return line, len(self.contents[start:offset].decode("utf-8", "replace")) + 1

    def line_start(self, line: int) -> int:
        return self._starts[min(max(1, line), len(self._starts)) - 1]

    def place(self, start: int, end: int) -> Place:
        line, column = self.line_column(start)
        end_line, end_column = self.line_column(max(start, end))
        return Place(self.name, line, column, end_line, end_column, start)


class Places:
    """Where things of one translation unit lie in the given files."""

    def __init__(self, unit: TranslationUnit, files: Mapping[str, GivenFile], fallback: str) -> None:
        self._files = files
        self._nowhere = files[fallback].place(0, 0)
        spans = []
        for path, file in files.items():
            base = unit.file_base(path)
            if base is not None:
                spans.append((base, base + len(file.contents), file))
        spans.sort(key=lambda span: span[0])
        self._bases = [span[0] for span in spans]
        self._spans = spans

    def _find(self, raw: int) -> tuple[GivenFile, int] | None:
        """The given file and offset of a raw location outside macros."""
        at = bisect_right(self._bases, raw) - 1
        if at < 0:
            return None
        base, end, file = self._spans[at]
        return (file, raw - base) if raw <= end else None

    def is_given(self, raw: Location) -> bool:
        """Whether a location lies in a file of the user (through macros, too)."""
        if raw.raw & MACRO_BIT:
            return location(raw, spelled=False)[0] in self._files
        return self._find(raw.raw) is not None or location(raw, spelled=False)[0] in self._files

    def stretch(self, extent: Extent) -> tuple[GivenFile, int, int] | None:
        """File, start and end of an extent written as it stands in a given file; None inside macros and elsewhere."""
        if extent.begin & MACRO_BIT or extent.end & MACRO_BIT:
            return None
        start = self._find(extent.begin)
        if start is None:
            return None
        file, offset = start
        end = offset + extent.end - extent.begin
        return (file, offset, end) if offset <= end <= len(file.contents) else None

    def text(self, extent: Extent) -> str | None:
        """The source text of an extent, where it is written as it stands."""
        found = self.stretch(extent)
        return found[0].contents[found[1] : found[2]].decode("utf-8", "replace") if found else None

    def place(self, extent: Extent) -> Place:
        """The place of an extent: inside a macro that of the expansion, for an argument of it the argument's own."""
        found = self.stretch(extent)
        if found:
            return found[0].place(found[1], found[2])
        if not extent.begin:
            return self._nowhere
        lib = library()
        start = lib.clang_getRangeStart(extent)
        name, line, _, offset = location(start, spelled=False)
        file = self._files.get(name)
        if file is None:
            return self._nowhere
        argument, argument_line, _, argument_offset = location(start, spelled=True)
        if argument == name and argument_line == line:
            offset = argument_offset
        end_name, _, _, end = location(lib.clang_getRangeEnd(extent), spelled=True)
        return file.place(offset, end if end_name == name else offset)
