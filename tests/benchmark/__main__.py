"""Print all ratios: ``python -m tests.benchmark``."""

from __future__ import annotations

from tests.benchmark.speed import report

if __name__ == "__main__":
    report()
