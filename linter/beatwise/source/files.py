"""From the files and folders a user names to the groups of files that are analysed together."""

from __future__ import annotations

import os
from collections.abc import Collection, Iterator, Mapping, Sequence
from dataclasses import dataclass
from fnmatch import fnmatch
from pathlib import Path

from beatwise.errors import BadInput, NoKernel
from beatwise.model.kernel import Problem
from beatwise.source.includes import Library, boundary_of, is_within
from beatwise.source.outline import Outline
from beatwise.source.read import absolute, shown

SOURCES = {".c", ".cc", ".cpp", ".cxx"}
HEADERS = {".h", ".hh", ".hpp", ".hxx"}


@dataclass(frozen=True, slots=True)
class Group:
    """The files of one kernel (or of kernels that share a file). Names are relative to the working directory where a
    file lies in it; texts have no byte order mark and their own line ends."""

    name: str  #: of the file that the group was found by
    files: Mapping[str, str]  #: name -> text of the sources to analyse, the first is ``name``
    includes: Mapping[str, str]  #: name -> text of the files they may include; none is among ``files``


@dataclass(frozen=True, slots=True)
class Gathered:
    """``problems`` are included files that exist and were not read."""

    groups: tuple[Group, ...]
    problems: tuple[Problem, ...]


def gather(
    paths: Sequence[Path],
    *,
    include: Sequence[Path] = (),
    tops: Collection[str] = (),
    ignore: Sequence[str] = (),
    only_kernels: bool = False,
) -> Gathered:
    """The groups in the order of the paths, files given by name first; in a folder its own files, then its subfolders,
    both by name.

    A file given by name is analysed as it is. In a folder the kernels are found by reading; functions named in ``tops``
    count as kernels, and files that match a pattern of ``ignore`` (on the name from the folder down) are passed over.
    BadInput when a path cannot be used or holds no kernel; ``only_kernels`` passes over those without a kernel.
    """
    library = Library(include)
    for folder in include:
        if not folder.is_dir():
            raise BadInput(f"{shown(folder)}: no such folder to include from")
    named = [absolute(path) for path in paths if not path.is_dir()]
    groups = _groups_of_files(dict.fromkeys(named), library, tops, only_kernels)
    seen = {os.path.realpath(path) for path in named}
    for path in paths:
        if path.is_dir():
            try:
                groups += _groups_in(path, library, tops, ignore, seen)
            except NoKernel:
                if not only_kernels:
                    raise
    problems = (Problem(shown(path), None, what) for path, what in sorted(library.problems.items()))
    return Gathered(tuple(groups), tuple(problems))


def _groups_of_files(
    files: Collection[Path], library: Library, tops: Collection[str], only_kernels: bool
) -> list[Group]:
    boundaries = {file: boundary_of(file.parent) for file in files}
    for file, boundary in boundaries.items():
        if file.is_symlink() and not is_within(file, boundary, hidden=True):
            raise BadInput(f"{shown(file)}: a symbolic link that leads out of its folder or repository")
        if not library.source(file).text.strip() and not only_kernels:
            raise NoKernel(f"{shown(file)}: an empty file")
    found = _Kernels(library, boundaries)
    kernels = [file for file in files if not only_kernels or found.holds_kernel(file, tops)]
    groups = found.groups(kernels)
    for file in groups:
        if not _may_hold_kernel(library.facts(file)):
            raise NoKernel(f"{shown(file)}: no kernel function in it")
    return [found.group(file, members) for file, members in groups.items()]


def _groups_in(
    folder: Path, library: Library, tops: Collection[str], ignore: Sequence[str], seen: set[str]
) -> list[Group]:
    root = absolute(folder)
    boundary = boundary_of(root)
    files = [
        file for file in _walk(root) if not any(fnmatch(file.relative_to(root).as_posix(), each) for each in ignore)
    ]
    known = any(os.path.realpath(file) in seen for file in files)
    fresh: list[Path] = []
    for file in files:
        real = os.path.realpath(file)
        if real not in seen and _is_text(file, library):
            seen.add(real)
            fresh.append(file)
    found = _Kernels(library, dict.fromkeys(fresh, boundary))
    kernels = [file for file in fresh if found.holds_kernel(file, tops)]
    kernels = kernels or [file for file in fresh if _looks_like_kernel(library.facts(file))]
    if not kernels and not known:
        raise NoKernel(f"{shown(folder)}: no kernel in this folder")
    return [found.group(file, members) for file, members in found.groups(kernels).items()]


def _walk(root: Path) -> Iterator[Path]:
    for folder, folders, names in os.walk(root):
        folders[:] = sorted(name for name in folders if not name.startswith("."))
        for name in sorted(names):
            path = Path(folder, name)
            if path.suffix.lower() in SOURCES | HEADERS and is_within(path, root):
                yield path


def _is_text(file: Path, library: Library) -> bool:
    try:
        return bool(library.source(file).text.strip())
    except BadInput:
        return False


class _Kernels:
    """Which of some files hold kernels, and what belongs to each."""

    def __init__(self, library: Library, boundaries: Mapping[Path, Path]) -> None:
        self.library = library
        self.boundaries = boundaries
        self.sources = [file for file in boundaries if file.suffix.lower() not in HEADERS]
        self._reached: dict[Path, tuple[Path, ...]] = {}
        self._definers: dict[str, list[Path]] | None = None

    def holds_kernel(self, file: Path, tops: Collection[str]) -> bool:
        """A memory-mapped interface, an ``extern "C"`` function on memory in a hardware source, or one of ``tops``."""
        facts = self.library.facts(file)
        free = [each for each in facts.definitions if each.name != "main"]
        if any(each.name in tops for each in free) or facts.memory_mapped:
            return True
        on_memory = [each for each in free if each.by_memory]
        if not on_memory:
            return False
        all_facts = [facts, *map(self.library.facts, self.reached(file))]
        macros = {name for each in all_facts for name in each.interface_macros}
        if any(name in facts.words for name in macros):
            return True
        c_names = {name for each in all_facts for name in each.declared_c}
        return any(each.hardware for each in all_facts) and any(
            each.extern_c or each.name in c_names for each in on_memory
        )

    def reached(self, file: Path) -> tuple[Path, ...]:
        """All files that a file includes."""
        if file not in self._reached:
            self._reached[file] = self.library.reached(file, self.boundaries[file])
        return self._reached[file]

    def groups(self, kernels: Collection[Path]) -> dict[Path, tuple[Path, ...]]:
        """Each kernel's file with its sources, itself first; a file in another's group has none of its own."""
        members = {file: self._linked(file) for file in kernels}
        parts = {
            file: {*sources, *(header for source in sources for header in self.reached(source))}
            for file, sources in members.items()
        }
        order = {file: index for index, file in enumerate(kernels)}

        def is_covered(file: Path) -> bool:
            return any(
                file in parts[other] and (other not in parts[file] or order[other] < order[file])
                for other in kernels
                if other != file
            )

        return {file: sources for file, sources in members.items() if not is_covered(file)}

    def group(self, file: Path, sources: Sequence[Path]) -> Group:
        """The texts of a group."""
        headers = dict.fromkeys(header for source in sources for header in self.reached(source))
        return Group(
            shown(file),
            {shown(each): self.library.source(each).text for each in sources},
            {shown(each): self.library.source(each).text for each in headers if each not in sources},
        )

    def _linked(self, file: Path) -> tuple[Path, ...]:
        """The file and the sources that define what it declares and uses, where exactly one can be meant."""
        members = [file]
        for member in members:
            for name in sorted(self._wanted(member)):
                choices = [each for each in self._definers_of(name) if each not in members]
                if name not in self._provided(members) and (choice := self._meant(name, member, choices, members)):
                    members.append(choice)
        return tuple(members)

    def _wanted(self, member: Path) -> set[str]:
        facts = self.library.facts(member)
        headers = [self.library.facts(header) for header in self.reached(member)]
        declared = {name for each in (facts, *headers) for name in each.declared}
        return {
            name
            for name in declared
            if facts.words[name] > (name in facts.declared) or any(each.words[name] > 1 for each in headers)
        }

    def _provided(self, members: Sequence[Path]) -> set[str]:
        files = {*members, *(header for member in members for header in self.reached(member))}
        return {name for file in files for name in _defined(self.library.facts(file))}

    def _meant(self, name: str, user: Path, choices: Sequence[Path], members: Sequence[Path]) -> Path | None:
        taken = {each for member in members for each in _exported(self.library.facts(member))}
        possible = [each for each in choices if not taken & _exported(self.library.facts(each))]
        if len(possible) > 1:
            headers = {user, *self.reached(user)}
            declaring = {header for header in headers if name in self.library.facts(header).declared}
            possible = [each for each in possible if declaring & {*self.reached(each)}]
        return possible[0] if len(possible) == 1 else None

    def _definers_of(self, name: str) -> Sequence[Path]:
        if self._definers is None:
            self._definers = {}
            for file in self.sources:
                for each in _defined(self.library.facts(file)):
                    self._definers.setdefault(each, []).append(file)
        return self._definers.get(name, [])


def _defined(facts: Outline) -> set[str]:
    return {each.name for each in facts.definitions if not (each.static and not each.method)} | facts.variables


def _exported(facts: Outline) -> set[tuple[str, int]]:
    """The free functions that no two linked files may both define."""
    return {
        (each.name, each.parameters) for each in facts.definitions if not (each.static or each.method or each.template)
    }


def _may_hold_kernel(facts: Outline) -> bool:
    return facts.memory_mapped or any(each.name != "main" for each in facts.definitions)


def _looks_like_kernel(facts: Outline) -> bool:
    """What passes for a kernel in a folder that has no plain one."""
    return any(
        each.by_memory and each.name != "main" and (facts.hardware or each.extern_c) for each in facts.definitions
    )
