"""Published tables kept beside the tests."""

from __future__ import annotations

import csv
from pathlib import Path


def read_table(name: str) -> tuple[list[float], list[tuple[float, list[str]]]]:
    """Column heads, and rows of (first cell, other cells as printed); lines with # name the source."""
    lines = (Path(__file__).parent / name).read_text(encoding="utf-8").splitlines()
    head, *rows = csv.reader(line for line in lines if not line.startswith("#"))
    return [float(item) for item in head[1:]], [(float(row[0]), row[1:]) for row in rows]
