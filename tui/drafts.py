"""Drafts: unsaved documents kept in the user's state folder, so that no crash loses what was typed.

A draft is the document's own TOML below one comment line that says whose it is. While its writer runs, it
holds a lock; a draft whose lock is free was left behind.
"""

from __future__ import annotations

import contextlib
import fcntl
import json
import os
import re
import threading
import uuid
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING

from actuator.project.files import write_text
from actuator.settings import draft_path, drafts_folder

if TYPE_CHECKING:
    from actuator.project.document import Document
    from tui.session import Session

_HEAD = re.compile(r'# draft of (?P<of>"(?:[^"\\\n]|\\.)*"), lock (?P<lock>[0-9a-f]{32})\n')


@dataclass(frozen=True, slots=True, kw_only=True)
class Draft:
    """A draft in the state folder.

    Attributes
    ----------
    place : Path
        Its file.
    of : str
        Absolute path of the document; empty for one that has no file.
    lock : str
        Name of its writer's lock.
    text : str
        TOML of the document.
    written : float
        When, in seconds since 1970. [s]
    """

    place: Path
    of: str
    lock: str
    text: str
    written: float


class Drafts:
    """The drafts of one running program."""

    def __init__(self) -> None:
        self._lock = uuid.uuid4().hex
        self._held: int | None = None
        self._turn = threading.RLock()
        self._revision = -1

    def follow(self, session: Session) -> None:
        """Keep the draft of a session where something is unsaved, else take it away.

        Called from any thread; an earlier revision than one that was followed changes nothing. A draft that
        cannot be written is no reason to stop.
        """
        with self._turn, contextlib.suppress(OSError):
            if session.revision < self._revision:
                return
            self._revision = session.revision
            if session.unsaved:
                self.keep(session.document)
            else:
                self.forget(session.document)

    def end(self, session: Session) -> None:
        """Take the draft away for good: what was unsaved is saved, or was given up knowingly."""
        with self._turn:
            self._revision = session.revision + 1
            self.forget(session.document)

    def keep(self, document: Document) -> Path:
        """Write the draft of a document in one step.

        Another program's draft of the same document is never written over.

        Raises
        ------
        OSError
            Where it cannot be written.
        """
        place = self._place(document)
        place.parent.mkdir(parents=True, exist_ok=True, mode=0o700)
        self._hold()
        head = f"# draft of {json.dumps(_of(document))}, lock {self._lock}\n"
        write_text(place, head + document.to_toml())
        return place

    def forget(self, document: Document) -> None:
        """Take this program's draft of a document away."""
        with self._turn:
            for place in self._places(document):
                found = _read(place)
                if found is not None and found.lock == self._lock:
                    _remove(found.place)

    def discard(self, draft: Draft) -> None:
        """Remove a draft that was left behind."""
        _remove(draft.place)
        _remove(_lock_file(drafts_folder(), draft.lock))

    def left_behind(self, document: Document) -> Draft | None:
        """The newest draft of this document, or of any without a file, whose writer runs no more."""
        folder = drafts_folder()
        found = [_read(place) for place in folder.iterdir()] if folder.is_dir() else []
        mine = [
            draft
            for draft in found
            if draft is not None
            and draft.of == _of(document)
            and draft.lock != self._lock
            and not _held(_lock_file(folder, draft.lock))
        ]
        return max(mine, key=lambda draft: draft.written, default=None)

    def close(self) -> None:
        """Let go of the lock; drafts that are still there may be offered from here on."""
        if self._held is not None:
            os.close(self._held)
            self._held = None
            _remove(_lock_file(drafts_folder(), self._lock))

    def _places(self, document: Document) -> tuple[Path, Path]:
        of = _of(document)
        return draft_path(of or None), draft_path(f"{of or 'untitled'}#{self._lock}")

    def _place(self, document: Document) -> Path:
        usual, other = self._places(document)
        found = _read(usual)
        return usual if found is None or found.lock == self._lock else other

    def _hold(self) -> None:
        if self._held is None:
            self._held = os.open(_lock_file(drafts_folder(), self._lock), os.O_RDWR | os.O_CREAT, 0o600)
            with contextlib.suppress(OSError):  # a file system without locks: drafts are offered at once
                fcntl.flock(self._held, fcntl.LOCK_EX | fcntl.LOCK_NB)


def _of(document: Document) -> str:
    return str(document.path.absolute()) if document.path else ""


def _lock_file(folder: Path, lock: str) -> Path:
    return folder / f"{lock}.lock"


def _remove(place: Path) -> None:
    with contextlib.suppress(OSError):
        place.unlink()


def _held(lock: Path) -> bool:
    """Whether a running program holds a lock."""
    try:
        file = os.open(lock, os.O_RDWR)
    except OSError:
        return False
    try:
        fcntl.flock(file, fcntl.LOCK_EX | fcntl.LOCK_NB)
    except BlockingIOError:
        return True
    except OSError:
        return False
    finally:
        os.close(file)
    return False


def _read(place: Path) -> Draft | None:
    """A draft file; None where there is none, or it is something else."""
    if place.suffix == ".lock":
        return None
    try:
        text = place.read_bytes().decode("utf-8", "surrogateescape")
        written = place.stat().st_mtime
    except OSError:
        return None
    head = _HEAD.match(text)
    if head is None:
        return None
    of, lock = json.loads(head["of"]), head["lock"]
    return Draft(place=place, of=of, lock=lock, text=text[head.end() :], written=written)
