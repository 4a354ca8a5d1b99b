"""Whether the terminal can show the screens; asked before anything of Textual is loaded."""

from __future__ import annotations

import os
import sys


def unfit() -> str:
    """Why the terminal will not do, in words for its user; empty where it will.

    Returns
    -------
    str
        One sentence, without a full stop.
    """
    if not (sys.__stdin__ and sys.__stdin__.isatty() and sys.__stdout__ and sys.__stdout__.isatty()):
        return "input and output are not a terminal"
    term = os.environ.get("TERM", "")
    if term in ("", "dumb", "unknown"):
        return f'the terminal says TERM="{term}", which cannot place text'
    encoding = (sys.__stdout__.encoding or "").lower().replace("-", "").replace("_", "")
    if encoding != "utf8":
        return f"the terminal's text is {sys.__stdout__.encoding}, not UTF-8; set LC_ALL=C.UTF-8"
    return ""


def console() -> bool:
    """Whether this is a bare text console, whose font has no braille."""
    return os.environ.get("TERM", "") in ("linux", "vt100", "vt220", "ansi", "cons25")
