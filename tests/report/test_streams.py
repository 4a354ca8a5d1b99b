"""Streams that are closed or narrow, and signals."""

from __future__ import annotations

import io
import os
import signal
import threading

import pytest

from actuator.report.equations import FLOW, MOTION, PERIODIC, POLYTROPIC, WALL
from actuator.report.figures import FIGURES
from actuator.report.streams import emit, ending_cleanly, fitted, is_unicode


def test_signs_of_every_formula_have_a_spelling_in_ascii() -> None:
    texts = [MOTION, WALL, POLYTROPIC, FLOW, PERIODIC]
    texts += [
        text for level in FIGURES.values() for item in level.values() for text in (item.formula, item.note, item.label)
    ]
    for text in texts:
        assert "\\x" not in fitted(text, "ascii"), text
        assert "\\u" not in fitted(text, "ascii"), text


@pytest.mark.parametrize(
    ("text", "encoding", "shown"),
    [
        ("F = π/4·D²", "ascii", "F = pi/4*D^2"),
        ("F = π/4·D²", "utf-8", "F = π/4·D²"),
        ("4·Bänke", "latin-1", "4·Bänke"),
        ("Bänke", "ascii", "B\\xe4nke"),
        ("file\udcff", "utf-8", "file\\udcff"),
        ("red \x1b[31m\x9b\r name\n", "utf-8", "red \\x1b[31m\\x9b\\x0d name\n"),
    ],
)
def test_text_is_fitted_to_the_encoding(text: str, encoding: str, shown: str) -> None:
    assert fitted(text, encoding) == shown


def test_a_narrow_stream_gets_what_it_can_take() -> None:
    raw = io.BytesIO()
    stream = io.TextIOWrapper(raw, encoding="ascii")
    emit("Σ q·√T\n", stream)
    assert raw.getvalue() == b"sum  q*sqrtT\n"
    assert not is_unicode(stream)


def test_a_reader_that_has_gone_is_no_error() -> None:
    reader, writer = os.pipe()
    os.close(reader)
    with os.fdopen(writer, "w", encoding="utf-8") as stream:
        emit("x" * 100_000, stream)
        emit("again", stream)


def test_termination_unwinds_with_128_plus_the_signal() -> None:
    cleaned = []

    def interrupted() -> None:
        with ending_cleanly():
            try:
                os.kill(os.getpid(), signal.SIGTERM)
                signal.sigtimedwait([signal.SIGUSR1], 5.0)
            finally:
                cleaned.append(True)

    with pytest.raises(SystemExit, match="143"):
        interrupted()
    assert cleaned
    assert signal.getsignal(signal.SIGTERM) is signal.SIG_DFL


def test_a_handler_that_stands_and_other_threads_are_left_alone() -> None:
    def own(*_: object) -> None:
        return

    former = signal.signal(signal.SIGTERM, own)
    try:
        with ending_cleanly():
            assert signal.getsignal(signal.SIGTERM) is own
    finally:
        signal.signal(signal.SIGTERM, former)
    seen: list[object] = []

    def elsewhere() -> None:
        with ending_cleanly():
            seen.append(signal.getsignal(signal.SIGHUP))

    thread = threading.Thread(target=elsewhere)
    thread.start()
    thread.join()
    assert seen == [signal.getsignal(signal.SIGHUP)]
