"""Speed, as ratios of times of one run; nothing here asserts a time.

Run by hand, on a machine that is otherwise idle: ``python -m tests.benchmark`` prints the rows, and so does
``python -m pytest -m benchmark -s``.
"""

from __future__ import annotations

import pytest

from tests.benchmark.speed import report


@pytest.mark.benchmark
def test_ratios_to_the_yardstick_are_printed(capsys: pytest.CaptureFixture[str]) -> None:
    lines: list[str] = []
    report(lines.append)
    with capsys.disabled():
        print("", *lines, sep="\n")
    assert sum("/" in line for line in lines) >= 7
