"""The kernel's scheme in plain C: compiled here, called through ctypes."""

from __future__ import annotations

import ctypes
import shutil
import subprocess
from collections.abc import Callable
from pathlib import Path
from types import ModuleType

import numpy as np
from numpy.typing import NDArray

from actuator.air import gas
from actuator.flow import scalar
from actuator.stroke import dopri, layout, rodas
from actuator.stroke.rows import Rows

Array = NDArray[np.float64]
HalfStrokes = Callable[[Rows, float], Array]
"""Half strokes of all rows at a step tolerance: time of arrival, speed there and steps, shape (cases, 3)."""

SOURCE = Path(__file__).with_name("kernel.c")


def _macros(module: ModuleType, kind: type[int] | type[float], prefix: str = "") -> list[str]:
    """A macro for each number of a module that has a name in capitals."""
    return [
        f"-D{prefix}{name}=({value!r})"
        for name, value in vars(module).items()
        if name.isupper() and not name.startswith("_") and isinstance(value, kind)
    ]


def compiler() -> str | None:
    """The C compiler of this machine, if it has one."""
    return shutil.which("cc")


def build(folder: Path) -> HalfStrokes:
    """Compile the source into ``folder``; :func:`compiler` must have found one."""
    cc = compiler()
    assert cc is not None
    library = folder / "kernel.so"
    macros = [
        *_macros(layout, int), *_macros(scalar, float), *_macros(gas, float, "AIR_"),
        *_macros(dopri, float, "DOPRI_"), *_macros(rodas, float, "RODAS_"),
    ]  # fmt: skip
    options = ["-std=gnu11", "-O3", "-march=native", "-ffp-contract=off", "-shared", "-fPIC", "-Wall", "-Werror"]
    subprocess.run([cc, *options, *macros, "-o", str(library), str(SOURCE), "-lm"], check=True)
    call = ctypes.CDLL(str(library)).half_strokes
    table = np.ctypeslib.ndpointer(np.float64, flags="C_CONTIGUOUS")
    call.argtypes = [
        ctypes.c_int, ctypes.c_double, ctypes.c_double, table, table, table, table, ctypes.c_int, table, table, table,
    ]  # fmt: skip
    call.restype = None

    def half_strokes(rows: Rows, rtol: float) -> Array:
        found = np.empty((len(rows.periods), 3))
        call(
            len(found), 1.0, rtol, rows.periods, rows.y, rows.mode, rows.par, rows.edges.shape[1], rows.edges,
            rows.forces, found,
        )  # fmt: skip
        return found

    return half_strokes
