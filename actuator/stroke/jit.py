"""The kernel's functions compiled by numba from the very source that also runs as it stands.

The functions of the kernel's modules are rebound, name by name, to their jitted twins. numba's own cache looks
at one file only, so its folder is named by a hash over every source file that is bound here.
"""

from __future__ import annotations

import hashlib
import importlib.metadata
import os
import sys
import tempfile
import threading
import types
from collections.abc import Callable
from pathlib import Path
from typing import Any

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

_INLINED = (scalar, friction, states, equations, slopes)
_MODULES = (*_INLINED, layout, dopri, rodas, steppers, ledger, events, advance, cycle, batch)

Kernel = Callable[..., float]
"""The entry, :func:`actuator.stroke.batch.batch`, interpreted or compiled."""


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
    user = os.getuid()
    candidates = (
        Path(platformdirs.user_cache_dir("pneumatic-actuator-design", appauthor=False)),
        Path(tempfile.gettempdir()) / f"pneumatic-actuator-design-{user}",
    )
    for parent in candidates:
        try:
            parent.mkdir(parents=True, exist_ok=True, mode=0o700)
            if parent.stat().st_uid != user:  # what another user may have put there is never run
                continue
            folder = parent / name
            folder.mkdir(exist_ok=True, mode=0o700)
            probe = folder / f".probe-{os.getpid()}-{threading.get_ident()}"
            probe.touch()
            probe.unlink()
        except OSError:
            continue
        return folder
    return None


def ready_mark(folder: Path) -> Path:
    """File that tells that the kernel in a folder is complete."""
    return folder / "ready"


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
        ready_mark(folder).touch()
    compiled: Kernel = entry
    return compiled
