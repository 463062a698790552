"""Work on untrusted sources, done in worker processes: what one item does to its worker costs that item only.

A worker is a fresh interpreter that reads tasks from its standard input and writes results to its standard output, one
at a time. The kernel of the operating system enforces the limits, so that even a loop inside a C library ends: an alarm
for the time, an address-space limit for the memory. A worker that dies is replaced; the others never notice.
"""

from __future__ import annotations

import os
import pickle
import signal
import subprocess
import sys
import tempfile
from collections.abc import Callable, Iterator, Sequence
from contextlib import suppress
from dataclasses import dataclass
from importlib.util import find_spec
from pathlib import Path
from queue import SimpleQueue
from typing import IO, Any, Generic, TypeVar

Item = TypeVar("Item")
Result = TypeVar("Result")

HEADER = 8  #: bytes of the length before each message
FIT, TIRED = b"\0", b"\1"  #: sent after an answer: whether the worker had better be replaced


@dataclass(frozen=True, slots=True)
class Limits:
    """What one item may use: wall-clock seconds, and megabytes (10**6 bytes) of address space."""

    seconds: float = 20.0
    megabytes: int = 4000


@dataclass(frozen=True, slots=True)
class Done(Generic[Result]):
    """An item came through."""

    result: Result


@dataclass(frozen=True, slots=True)
class Lost:
    """An item did not come through; ``why`` is one line for the user."""

    why: str


def each(
    function: Callable[[Item], Result], items: Sequence[Item], *, limits: Limits = Limits(), jobs: int | None = None
) -> Iterator[Done[Result] | Lost]:
    """``function`` of each item, in the order of the items, however many workers share the work.

    ``function`` must be importable by name; items and results must pickle.
    """
    workers = [_Worker(limits) for _ in range(max(1, min(jobs or processors(), len(items))))] if items else []
    try:
        if len(workers) == 1:
            for item in items:
                yield workers[0].do(function, item)
        elif workers:
            yield from _shared(workers, function, items)
    finally:
        for worker in workers:
            worker.stop()


def processors() -> int:
    """How many processors this process may use."""
    return len(os.sched_getaffinity(0)) if hasattr(os, "sched_getaffinity") else os.cpu_count() or 1


def _shared(
    workers: list[_Worker], function: Callable[[Item], Result], items: Sequence[Item]
) -> Iterator[Done[Result] | Lost]:
    """One thread a worker; each takes the next free worker."""
    from concurrent.futures import ThreadPoolExecutor

    free: SimpleQueue[_Worker] = SimpleQueue()
    for worker in workers:
        free.put(worker)

    def one(item: Item) -> Done[Result] | Lost:
        worker = free.get()
        try:
            return worker.do(function, item)
        finally:
            free.put(worker)

    pool = ThreadPoolExecutor(len(workers))
    try:
        yield from pool.map(one, items)
    finally:
        for worker in workers:
            worker.stop()
        pool.shutdown(cancel_futures=True)


class _Worker:
    """The parent's side of one worker process; it starts with its first item, and again after it died."""

    def __init__(self, limits: Limits) -> None:
        self.limits = limits
        self.process: subprocess.Popen[bytes] | None = None
        self.stopped = False
        self.complaints: IO[bytes] | None = None

    def do(self, function: Callable[[Item], Result], item: Item) -> Done[Result] | Lost:
        if self.stopped:
            return Lost("stopped")
        process = self.process or self._start()
        if self.stopped:  # by another thread, just now
            process.kill()
        assert process.stdin is not None and process.stdout is not None
        try:
            _send(process.stdin, pickle.dumps((function, item)))
            answer = _receive(process.stdout)
            tired = _exactly(process.stdout, 1) == TIRED
        except (BrokenPipeError, EOFError):
            return Lost(self._obituary(process))
        if tired:
            process.kill()
            self._bury(process)
        found: Done[Result] | Lost = pickle.loads(answer)
        return found

    def stop(self) -> None:
        self.stopped = True
        if self.process is not None:
            self.process.kill()
            self._bury(self.process)

    def _start(self) -> subprocess.Popen[bytes]:
        self.complaints = tempfile.TemporaryFile()  # noqa: SIM115
        # -P: a module in the working directory, which may be an untrusted checkout, is never imported
        start = [sys.executable, "-P", "-c", "from beatwise.workers import serve; serve()"]
        self.process = subprocess.Popen(
            [*start, repr(self.limits.seconds), str(self.limits.megabytes)],
            stdin=subprocess.PIPE,
            stdout=subprocess.PIPE,
            stderr=self.complaints,
            env=os.environ | {"PYTHONPATH": os.pathsep.join(_roots())},
        )
        return self.process

    def _obituary(self, process: subprocess.Popen[bytes]) -> str:
        """Why a worker died, in one line."""
        status = process.wait()
        assert self.complaints is not None
        self.complaints.seek(0)
        said = self.complaints.read().decode(errors="replace")
        self._bury(process)
        if -status == signal.SIGALRM:
            return f"gave up after {self.limits.seconds:g} s"
        if "out of memory" in said or "bad_alloc" in said or "MemoryError" in said or -status == signal.SIGKILL:
            return f"needs more than {self.limits.megabytes} MB of memory"
        name = signal.Signals(-status).name if status < 0 else f"exit status {status}"
        return f"the analysis of this file crashed ({name})"

    def _bury(self, process: subprocess.Popen[bytes]) -> None:
        process.wait()
        for pipe in (process.stdin, process.stdout, self.complaints):
            if pipe is not None:
                with suppress(BrokenPipeError):
                    pipe.close()
        self.process = None


def _roots() -> list[str]:
    """Where a worker finds our packages, and what the user's own PYTHONPATH says."""
    ours = [spec.origin for spec in map(find_spec, ("beatwise", "beatwise_rules")) if spec and spec.origin]
    theirs = filter(None, os.environ.get("PYTHONPATH", "").split(os.pathsep))
    return list(
        dict.fromkeys([*(str(Path(origin).resolve().parents[1]) for origin in ours), *map(os.path.abspath, theirs)])
    )


# ----------------------------------------------------------------------------------------------------- the worker


def serve() -> None:
    """The worker's main loop, until its standard input ends. Arguments: seconds, megabytes."""
    import resource

    seconds, megabytes = float(sys.argv[1]), int(sys.argv[2])
    signal.signal(signal.SIGINT, signal.SIG_IGN)  # the parent decides what an interrupt means
    signal.signal(signal.SIGALRM, signal.SIG_DFL)
    for limit, most in ((resource.RLIMIT_AS, megabytes * 10**6), (resource.RLIMIT_CORE, 0)):
        with suppress(ValueError, OSError):  # not every system has this limit; the limit on time remains
            resource.setrlimit(limit, (most, resource.getrlimit(limit)[1]))
    tasks, results = sys.stdin.buffer, os.fdopen(os.dup(1), "wb")
    os.dup2(2, 1)  # whatever a library prints is not a result
    while True:
        try:
            task = _receive(tasks)
        except EOFError:
            return
        signal.setitimer(signal.ITIMER_REAL, seconds)
        answer = _answered(task, megabytes)
        signal.setitimer(signal.ITIMER_REAL, 0)
        _send(results, answer)
        results.write(TIRED if _peak_megabytes() > megabytes / 2 else FIT)
        results.flush()


def _peak_megabytes() -> float:
    """The most memory that this process ever held; a library that failed may not have given it back."""
    try:
        with open("/proc/self/status", encoding="ascii") as status:  # getrusage would count the parent's, too (execve)
            return next(int(line.split()[1]) for line in status if line.startswith("VmHWM:")) * 1024 / 1e6
    except (OSError, StopIteration):
        import resource

        return (
            resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1e6
        )  # in bytes where there is no /proc (from memory)


def _answered(task: bytes, megabytes: int) -> bytes:
    function: Callable[[Any], Any]
    try:
        function, item = pickle.loads(task)
        return pickle.dumps(Done(function(item)))
    except MemoryError:
        return pickle.dumps(Lost(f"needs more than {megabytes} MB of memory"))
    except Exception as error:
        return pickle.dumps(Lost(_mistake(error)))


def _mistake(error: Exception) -> str:
    """A mistake of ours, in one line that can be reported."""
    import traceback

    last = traceback.extract_tb(error.__traceback__)[-1]
    text = " ".join(str(error).split())[:200]
    at = "/".join(last.filename.replace(os.sep, "/").split("/")[-2:])
    return f"a mistake in beatwise itself, please report it: {type(error).__name__}: {text} (at {at}:{last.lineno})"


# ------------------------------------------------------------------------------------------------------ messages


def _send(pipe: IO[bytes], message: bytes) -> None:
    pipe.write(len(message).to_bytes(HEADER, "big") + message)
    pipe.flush()


def _receive(pipe: IO[bytes]) -> bytes:
    length = int.from_bytes(_exactly(pipe, HEADER), "big")
    return _exactly(pipe, length)


def _exactly(pipe: IO[bytes], length: int) -> bytes:
    data = pipe.read(length)
    if len(data) < length:
        raise EOFError
    return data
