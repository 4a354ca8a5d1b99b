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
    streams = (sys.__stdin__, sys.__stdout__, sys.__stderr__)  # the screens are written to the last
    if not all(stream is not None and stream.isatty() for stream in streams):
        return "input and output are not a terminal"
    term = os.environ.get("TERM", "")
    if term in ("", "dumb", "unknown"):
        return f'the terminal says TERM="{term}", which cannot place text'
    for stream in (sys.__stdout__, sys.__stderr__):
        encoding = (stream.encoding or "") if stream is not None else ""
        if encoding.lower().replace("-", "").replace("_", "") != "utf8":
            return f"the terminal's text is {encoding or 'unknown'}, not UTF-8; set LC_ALL=C.UTF-8"
    return ""


def console() -> bool:
    """Whether this is a bare text console, whose font has no braille."""
    return os.environ.get("TERM", "") in ("linux", "vt100", "vt220", "ansi", "cons25")
