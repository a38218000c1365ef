"""Deciding many loops: what is remembered is taken, the rest decided, over several processes where that pays.

Loops do not depend on each other's decisions, so they may be decided anywhere and in any order; what comes back is put in the order of
the loops. A process that ends before its time, or an error in one, ends the run: no loop is ever left out in silence.
"""

import multiprocessing
import os
import signal
from collections.abc import Callable, Iterator, Sequence
from concurrent.futures import FIRST_COMPLETED, Future, ProcessPoolExecutor, wait
from concurrent.futures.process import BrokenProcessPool
from dataclasses import dataclass, replace

from specgen.catalogue.load import Catalogue
from specgen.core.diagnostic import Diagnostic
from specgen.design.cache import Cache
from specgen.design.decide import decide
from specgen.design.firmness import firmness_of
from specgen.design.outcome import Subject
from specgen.design.types import DecidedLoop
from specgen.model.loops import ReadLoop
from specgen.model.panel import Panel

Progress = Callable[[int, int], None]
Answer = tuple[DecidedLoop | None, tuple[Diagnostic, ...]]
CHUNK = 4  # loops handed over at once: a second or two of work
PAYS_FROM = 12  # loops to be decided: a process takes about two seconds to start, as long as a few loops
MOST_WORKERS = 32  # Windows waits for 61 at most


class WorkerEndedError(RuntimeError):
    """A process that decided loops ended before its time."""


@dataclass(frozen=True, slots=True)
class Task:
    """What all loops of a run are decided with."""

    panel: Panel
    catalogue: Catalogue
    firmness: bool = True

    def decided(self, read: ReadLoop) -> Answer:
        """Decide one loop, with its firmness where that is asked for."""
        loop, problems = decide(read, self.panel, self.catalogue)
        if loop is None or not self.firmness:
            return loop, problems
        return replace(loop, firmness=firmness_of(Subject(read.loop, self.panel, read.fitted), self.catalogue)), problems


def decide_all(
    loops: Sequence[ReadLoop], task: Task, cache: Cache | None = None, progress: Progress | None = None, workers: int = 1
) -> tuple[Answer, ...]:
    """Decide loops, in their order.

    Parameters
    ----------
    loops : sequence of ReadLoop
        What is to be decided.
    task : Task
        Panel, catalogue, and whether firmness is asked for.
    cache : Cache or None
        Where decisions are remembered.
    progress : callable or None
        Called with the number of loops decided and of all.
    workers : int
        Processes to decide over; 0 for as many as the machine has processors. One process is used where there are few loops.

    Returns
    -------
    tuple of (DecidedLoop or None, tuple of Diagnostic)
        As ``decide``, for each loop.

    Raises
    ------
    WorkerEndedError
        A process ended before its time.
    """
    answers: dict[int, Answer] = {}
    for index, read in enumerate(loops):
        known = cache.get(read) if cache is not None else None
        if known is not None:
            answers[index] = known, ()
    waiting = [index for index in range(len(loops)) if index not in answers]
    count = _workers(len(waiting), workers)
    each = _in_turn(loops, waiting, task) if count <= 1 else _over_processes(loops, waiting, task, count)
    if progress is not None:
        progress(len(answers), len(loops))
    for index, answer in each:
        answers[index] = answer
        if cache is not None and answer[0] is not None:
            cache.put(answer[0])
        if progress is not None:
            progress(len(answers), len(loops))
    if cache is not None:
        cache.tidy()
    return tuple(answers[index] for index in range(len(loops)))


def processors() -> int:
    """Return how many processors this process may use."""
    if hasattr(os, "sched_getaffinity"):
        return len(os.sched_getaffinity(0))
    return os.cpu_count() or 1


def _workers(count: int, wanted: int) -> int:
    if count < PAYS_FROM:
        return 1
    return min(wanted or processors(), -(-count // CHUNK), MOST_WORKERS)


def _in_turn(loops: Sequence[ReadLoop], waiting: Sequence[int], task: Task) -> Iterator[tuple[int, Answer]]:
    for index in waiting:
        yield index, task.decided(loops[index])


def _over_processes(loops: Sequence[ReadLoop], waiting: Sequence[int], task: Task, count: int) -> Iterator[tuple[int, Answer]]:
    chunks = [waiting[first : first + CHUNK] for first in range(0, len(waiting), CHUNK)]
    # spawned everywhere, as Windows does it: what works here works there
    pool = ProcessPoolExecutor(count, multiprocessing.get_context("spawn"), _begin, (task,))
    try:
        pending: dict[Future[list[Answer]], Sequence[int]] = {
            pool.submit(_decide_chunk, [loops[index] for index in chunk]): chunk for chunk in chunks
        }
        while pending:
            done, _ = wait(pending, return_when=FIRST_COMPLETED)
            for future in done:
                for index, (loop, problems) in zip(pending.pop(future), future.result(), strict=True):
                    # the loop as it was read here takes the place of its copy
                    yield index, (replace(loop, read=loops[index]) if loop is not None else None, problems)
    except BrokenProcessPool as error:
        raise WorkerEndedError("a process that decided loops ended before its time; nothing was written") from error
    finally:
        # what has not begun is not begun any more, also after Ctrl-C
        pool.shutdown(wait=True, cancel_futures=True)


_task: list[Task] = []


def _begin(task: Task) -> None:
    """Prepare a process: Ctrl-C is the first process's matter, which then begins nothing more."""
    signal.signal(signal.SIGINT, signal.SIG_IGN)
    _task[:] = [task]


def _decide_chunk(loops: Sequence[ReadLoop]) -> list[Answer]:
    answers: list[Answer] = []
    for read in loops:
        loop, problems = _task[0].decided(read)
        # what was read need not travel back
        answers.append((replace(loop, read=None) if loop is not None else None, problems))  # type: ignore[arg-type]  # put back there
    return answers
