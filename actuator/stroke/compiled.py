"""Which kernel runs, interpreted or compiled, and how the compiled one comes without making anyone wait."""

from __future__ import annotations

import contextlib
import gc
import importlib.util
import os
import subprocess
import sys
import threading
import time
from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path
from typing import Literal

from actuator.stroke.batch import batch
from actuator.stroke.jit import Kernel, bind, cache_folder, ready_mark

Engine = Literal["auto", "compiled", "interpreted"]

PATIENCE = 6
"""Strokes that a process computes interpreted before it begins to load the compiled kernel: loading costs more. [1]"""
PATIENT_FOR = 180.0
"""Time after which a process that began to compile is taken for dead. [s]"""
OFF = "ACTUATOR_INTERPRETED"
"""Environment variable: set to anything, the kernel runs interpreted and is never compiled."""


@dataclass(slots=True)
class _State:
    """What this process knows of the compiled kernel; changed under the lock only."""

    kernel: Kernel | None = None
    child: subprocess.Popen[bytes] | None = None
    loader: threading.Thread | None = None
    remark: str = ""
    asked: int = 0


_state = _State()
_lock = threading.Lock()


def _claim(folder: Path) -> bool:
    """Whether no other process fills this cache: the first one leaves a mark, which lapses after ``PATIENT_FOR``."""
    mark = folder / "claimed"
    try:
        with contextlib.suppress(FileNotFoundError):
            if time.time() - mark.stat().st_mtime > PATIENT_FOR:
                mark.unlink()
        mark.touch(exist_ok=False)
    except OSError:
        return False
    return True


@contextmanager
def _no_collecting() -> Iterator[None]:
    """Keep the garbage collector from the thousands of objects that come with numba, which are there to stay.

    It would walk over all of them again and again, up to 0.1 s at a time in which no other thread runs, also later.
    """
    was_on = gc.isenabled()
    gc.disable()
    try:
        yield
    finally:
        gc.freeze()
        if was_on:
            gc.enable()


def _load() -> None:
    """Bind in this process and publish the result; runs in a thread."""
    try:
        with _no_collecting():
            kernel = bind()
    except Exception as fault:  # numba may fail in many ways; the interpreted kernel answers all the same
        with _lock:
            _state.remark = f"not compiled ({type(fault).__name__}: {fault}); computed interpreted"
        return
    with _lock:
        _state.kernel = kernel


def _compile_in_child() -> subprocess.Popen[bytes] | None:
    """Start a process that fills the cache folder."""
    try:
        return subprocess.Popen(
            [sys.executable, "-c", "from actuator.stroke.jit import bind; bind()"],
            stdin=subprocess.DEVNULL,
            stdout=subprocess.DEVNULL,
            stderr=subprocess.DEVNULL,
            start_new_session=True,
        )
    except OSError:
        return None


def prepare(wait: bool = False) -> None:
    """See to it that the compiled kernel comes; returns at once unless ``wait``.

    A warm cache is loaded in a thread; a cold one is first filled by a child process. Call again to move on.
    """
    if os.environ.get(OFF):
        return
    with _lock:
        if _state.kernel is not None or _state.remark:
            return
        if _state.loader is None:
            if importlib.util.find_spec("numba") is None:
                _state.remark = "numba is not installed; computed interpreted"
                return
            folder = cache_folder()
            if folder is None and not wait:
                _state.remark = "no folder for the compiled kernel can be written; computed interpreted"
                return
            warm = folder is not None and ready_mark(folder).exists()
            if folder is not None and not warm and not wait:
                if _state.child is None:
                    if _claim(folder):
                        _state.child = _compile_in_child()
                    return
                if _state.child.poll() is None:
                    return
                if _state.child.returncode != 0:
                    _state.remark = "the compiler failed; computed interpreted"
                    return
            _state.loader = threading.Thread(target=_load, name="kernel-loader", daemon=True)
            _state.loader.start()
        loader = _state.loader
    if wait and loader is not None:
        loader.join()


def expect(strokes: int) -> None:
    """Make ready for so many strokes: past ``PATIENCE`` a warm cache is loaded first, which takes less than they do.

    Parameters
    ----------
    strokes : int
        That are about to be simulated. [1]
    """
    if strokes <= PATIENCE:
        return
    folder = cache_folder()
    prepare(wait=folder is not None and ready_mark(folder).exists())


def engine(wanted: Engine = "auto") -> tuple[Kernel, bool]:
    """Pick the kernel to call, and tell whether it is the compiled one.

    Parameters
    ----------
    wanted : {"auto", "compiled", "interpreted"}
        ``"auto"`` takes the compiled kernel once it is there, begins to load it after ``PATIENCE`` strokes and
        never waits for it; ``"compiled"`` waits.

    Returns
    -------
    tuple
        Function and flag.

    Raises
    ------
    RuntimeError
        If ``"compiled"`` is wanted and cannot be had.
    """
    if wanted == "interpreted" or (wanted == "auto" and os.environ.get(OFF)):
        return batch, False
    with _lock:
        _state.asked += 1
        patient = _state.asked <= PATIENCE
    if wanted == "compiled" or not patient:
        prepare(wait=wanted == "compiled")
    with _lock:
        if _state.kernel is not None:
            return _state.kernel, True
        if wanted == "compiled":
            raise RuntimeError(_state.remark or "the compiled kernel is switched off")
    return batch, False


def loaded() -> bool:
    """Whether strokes run compiled, and so side by side: the compiled kernel holds no lock."""
    with _lock:
        return _state.kernel is not None and not os.environ.get(OFF)


def remark() -> str:
    """Why the kernel is not compiled, or an empty text."""
    with _lock:
        return _state.remark
