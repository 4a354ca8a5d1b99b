"""Text files that are either the old or the whole new one, never half of it."""

from __future__ import annotations

import os
import stat
import tempfile
from contextlib import suppress
from pathlib import Path


def write_text(path: Path, text: str) -> None:
    """Write a file in one step: temporary file in the same folder, flushed to disk, then put in place.

    Parameters
    ----------
    path : Path
        A symbolic link is followed; the mode of a file that stands there is kept.
    text : str
        Written as UTF-8, line ends as they are; bytes that were no UTF-8 when read go back as they were.

    Raises
    ------
    OSError
        Where the folder or the file cannot be written; what stood there still does.
    """
    target = path.resolve()
    descriptor, name = tempfile.mkstemp(dir=target.parent, prefix=f".{target.name[:100]}.")
    try:
        with os.fdopen(descriptor, "wb") as file:
            file.write(text.encode("utf-8", "surrogateescape"))
            file.flush()
            os.fchmod(file.fileno(), _mode(target))
            os.fsync(file.fileno())
        Path(name).replace(target)
    except BaseException:
        with suppress(OSError):
            Path(name).unlink()
        raise
    with suppress(OSError):  # some file systems cannot flush a folder
        folder = os.open(target.parent, os.O_RDONLY)
        try:
            os.fsync(folder)
        finally:
            os.close(folder)


def _mode(target: Path) -> int:
    """Permission bits of the file that stands there, or those that a plain new file would get."""
    try:
        return stat.S_IMODE(target.stat().st_mode)
    except OSError:
        mask = os.umask(0)
        os.umask(mask)
        return 0o666 & ~mask
