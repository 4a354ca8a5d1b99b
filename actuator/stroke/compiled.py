"""The kernel's source, run as it stands or compiled by numba; compiling never makes anyone wait.

The functions of the kernel's modules are rebound, name by name, to their jitted twins. numba's own cache looks
at one file only, so its folder is named by a hash over every source file that is bound here.
"""

from __future__ import annotations

import contextlib
import hashlib
import importlib.metadata
import importlib.util
import os
import subprocess
import sys
import tempfile
import threading
import time
import types
from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path
from typing import Any, Literal

import platformdirs

from actuator.flow import scalar
from actuator.mechanics import friction
from actuator.stroke import (
    advance,
    batch,
    cycle,
    dopri,
    equations,
    events,
    layout,
    ledger,
    rodas,
    slopes,
    states,
    steppers,
)

Engine = Literal["auto", "compiled", "interpreted"]

_INLINED = (scalar, friction, states, equations, slopes)
_MODULES = (*_INLINED, layout, dopri, rodas, steppers, ledger, events, advance, cycle, batch)
PATIENCE = 6
"""Strokes that a process computes interpreted before it begins to load the compiled kernel: loading costs more. [1]"""
PATIENT_FOR = 180.0
"""Time after which a process that began to compile is taken for dead. [s]"""
OFF = "ACTUATOR_INTERPRETED"
"""Environment variable: set to anything, the kernel runs interpreted and is never compiled."""

Kernel = Callable[..., float]
"""The entry, interpreted or compiled."""


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


def source_hash() -> str:
    """Name of the cache folder: hash over the bound sources and the versions of numba, llvmlite and numpy."""
    digest = hashlib.sha256()
    for module in (*_MODULES, sys.modules["actuator.air.gas"], sys.modules[__name__]):
        assert module.__file__ is not None
        digest.update(Path(module.__file__).read_bytes())
    assert batch.__file__ is not None
    digest.update(str(Path(batch.__file__).stat().st_mtime_ns).encode())  # numba's own stamp of the entry's file
    for package in ("numba", "llvmlite", "numpy"):
        try:
            digest.update(importlib.metadata.version(package).encode())
        except importlib.metadata.PackageNotFoundError:
            digest.update(b"none")
    digest.update(sys.version.encode())
    return digest.hexdigest()[:20]


def cache_folder() -> Path | None:
    """Folder for the compiled kernel that can be written, the user's cache or a temporary one, else None."""
    name = f"kernel-{source_hash()}"
    candidates = (
        Path(platformdirs.user_cache_dir("pneumatic-actuator-design", appauthor=False)),
        Path(tempfile.gettempdir()) / f"pneumatic-actuator-design-{os.getuid() if hasattr(os, 'getuid') else 0}",
    )
    for parent in candidates:
        try:
            folder = parent / name
            folder.mkdir(parents=True, exist_ok=True, mode=0o700)
            probe = folder / f".probe-{os.getpid()}-{threading.get_ident()}"
            probe.touch()
            probe.unlink()
        except OSError:
            continue
        return folder
    return None


def _ready_mark(folder: Path) -> Path:
    return folder / "ready"


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


def _options(function: types.FunctionType, cached: bool) -> dict[str, Any]:
    """Options for numba of one function.

    The kernel neither makes nor keeps an array, so arrays need no counting of references (``_nrt``), which would
    cost as much as the equations. The equations are inlined where they are used, except ``rates``, used a dozen
    times. Only the entry is called from Python and has a cache.
    """
    entry = function is batch.batch
    return {
        "nogil": True,
        "error_model": "numpy",
        "forceinline": sys.modules[function.__module__] in _INLINED and function is not equations.rates,
        "_nrt": False,
        "no_cpython_wrapper": not entry,
        "no_cfunc_wrapper": True,
        "cache": entry and cached,
    }


def bind() -> Kernel:
    """Jitted twin of ``batch.batch``, from the cache where it is warm; compiles where it is not.

    Returns
    -------
    callable
        Same arguments as the interpreted twin, rows as float64 arrays.
    """
    import numba

    folder = cache_folder()
    if folder is not None:
        setattr(numba.config, "CACHE_DIR", str(folder))  # noqa: B010
    # A name bound in several modules is one function: jit each once, then let every copy see the twins.
    functions: dict[str, types.FunctionType] = {}
    for module in _MODULES:
        functions |= {
            name: value
            for name, value in vars(module).items()
            if isinstance(value, types.FunctionType) and value.__module__ == module.__name__
        }
    namespaces: dict[str, dict[str, Any]] = {module.__name__: dict(vars(module)) for module in _MODULES}
    row = numba.types.Array(numba.float64, 1, "C")
    flags = numba.types.Array(numba.uint8, 1, "C")
    number = numba.float64
    table = numba.types.Array(numba.float64, 2, "C")
    signature = number(*([number] * 4), numba.boolean, row, *([table] * 8), row, row, table, flags)
    twins: dict[str, Any] = {}
    for name, function in functions.items():
        copy = types.FunctionType(
            function.__code__, namespaces[function.__module__], function.__name__, function.__defaults__
        )
        copy.__module__ = function.__module__
        copy.__qualname__ = function.__qualname__
        twins[name] = numba.njit(**_options(function, cached=folder is not None))(copy)
    for namespace in namespaces.values():
        namespace.update((name, twin) for name, twin in twins.items() if name in namespace)
    entry = twins["batch"]
    entry.compile(signature)
    entry.disable_compile()
    if folder is not None:
        _ready_mark(folder).touch()
    compiled: Kernel = entry
    return compiled


def _load() -> None:
    """Bind in this process and publish the result; runs in a thread."""
    try:
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
            [sys.executable, "-c", "from actuator.stroke.compiled import bind; bind()"],
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
            warm = folder is not None and _ready_mark(folder).exists()
            if not warm and not wait and folder is not None:
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
    prepare(wait=folder is not None and _ready_mark(folder).exists())


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
        return batch.batch, False
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
    return batch.batch, False


def loaded() -> bool:
    """Whether strokes run compiled, and so side by side: the compiled kernel holds no lock."""
    with _lock:
        return _state.kernel is not None and not os.environ.get(OFF)


def remark() -> str:
    """Why the kernel is not compiled, or an empty text."""
    with _lock:
        return _state.remark
