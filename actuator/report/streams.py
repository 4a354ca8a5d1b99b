"""The process around a view: streams that may be closed or narrow, signals that end it."""

from __future__ import annotations

import os
import signal
import threading
from collections.abc import Iterator
from contextlib import contextmanager, suppress
from types import FrameType
from typing import NoReturn, TextIO

_SPELLED = str.maketrans(
    {
        "∓": "-/+",
        "·": "*",
        "×": "x",
        "−": "-",
        "±": "+/-",
        "√": "sqrt",
        "∫": "integral ",
        "∮": "cycle integral ",
        "Σ": "sum ",
        "Δ": "d",
        "½": "1/2",
        "°": "deg",
        "≈": "~",
        "≤": "<=",
        "≥": ">=",
        "²": "^2",
        "³": "^3",
        "⁴": "^4",
        "ᶻ": "^z",
        "₀": "0",
        "₁": "1",
        "₂": "2",
        "₃": "3",
        "ᵢ": "i",
        "α": "alpha",
        "γ": "gamma",
        "δ": "delta",
        "ε": "epsilon",
        "η": "eta",
        "θ": "theta",
        "κ": "kappa",
        "λ": "lambda",
        "μ": "mu",
        "ξ": "xi",
        "π": "pi",
        "ρ": "rho",
        "σ": "sigma",
        "φ": "phi",
        "ψ": "psi",
        "ω": "omega",
    }
)
"""Signs of the formulas in ASCII."""
_CONTROLS = str.maketrans(
    {chr(code): f"\\x{code:02x}" for code in (*range(32), *range(127, 160)) if chr(code) not in "\n\t"}
)
"""Characters that would steer a terminal, which a name in a document may hold; shown as escapes."""


def encoding_of(stream: TextIO) -> str:
    """Encoding of a stream; UTF-8 where it has none."""
    return getattr(stream, "encoding", None) or "utf-8"


def is_unicode(stream: TextIO) -> bool:
    """Whether a stream takes every character."""
    return encoding_of(stream).lower().replace("-", "").replace("_", "").startswith("utf")


def fitted(text: str, encoding: str) -> str:
    """Text that an encoding can take: signs of the formulas spelled out, the rest as escapes.

    Control characters other than tabs and line ends become escapes too.

    Parameters
    ----------
    text : str
    encoding : str
        Name of a codec.

    Returns
    -------
    str
        The same text where the encoding takes all of it.
    """
    text = text.translate(_CONTROLS)
    try:
        text.encode(encoding)
    except UnicodeEncodeError:
        if not encoding.lower().startswith("utf"):
            text = text.translate(_SPELLED)
        return text.encode(encoding, "backslashreplace").decode(encoding)
    return text


def emit(text: str, stream: TextIO) -> None:
    """Write text and flush it; a reader that has gone away is no error.

    Parameters
    ----------
    text : str
    stream : TextIO
        Standard output or standard error.
    """
    try:
        stream.write(fitted(text, encoding_of(stream)))
        stream.flush()
    except BrokenPipeError:
        silence(stream)


def silence(stream: TextIO) -> None:
    """Point a stream whose reader has gone at nothing, so that closing it cannot fail."""
    with suppress(OSError, ValueError):
        sink = os.open(os.devnull, os.O_WRONLY)
        os.dup2(sink, stream.fileno())
        os.close(sink)


def _ended(number: int, _: FrameType | None) -> NoReturn:
    raise SystemExit(128 + number)


@contextmanager
def ending_cleanly() -> Iterator[None]:
    """Let a termination signal unwind, so that no temporary file stays behind."""
    if threading.current_thread() is not threading.main_thread():
        yield
        return
    numbers = [number for number in (signal.SIGTERM, signal.SIGHUP) if signal.getsignal(number) is signal.SIG_DFL]
    for number in numbers:
        signal.signal(number, _ended)
    try:
        yield
    finally:
        for number in numbers:
            signal.signal(number, signal.SIG_DFL)
