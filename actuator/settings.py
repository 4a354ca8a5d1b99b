"""The user's settings, and where unsaved documents are kept; both fronts read them."""

from __future__ import annotations

import hashlib
import os
import re
import tomllib
from dataclasses import dataclass
from pathlib import Path
from typing import Any, cast

import platformdirs

from actuator.project.files import write_text
from actuator.unit_table import System

APP = "pneumatic-actuator-design"
UNITS: tuple[System, ...] = ("si", "us")


@dataclass(frozen=True, slots=True, kw_only=True)
class Settings:
    """What the user chose.

    Attributes
    ----------
    units : {"si", "us"}
        Trade units that figures are shown in.
    theme : str
        Name of the terminal UI's theme; empty for its own choice.
    remarks : tuple of str
        What in the settings file could not be used, and what holds instead.
    """

    units: System = "si"
    theme: str = ""
    remarks: tuple[str, ...] = ()


def settings_path() -> Path:
    """File of the settings, in the user's configuration folder."""
    return Path(platformdirs.user_config_dir(APP, appauthor=False)) / "settings.toml"


def load_settings() -> Settings:
    """Read the settings; a file that is missing or broken gives the defaults, the latter with a remark.

    Returns
    -------
    Settings
    """
    path = settings_path()
    try:
        table = tomllib.loads(path.read_text(encoding="utf-8"))
    except FileNotFoundError:
        return Settings()
    except (OSError, ValueError, RecursionError) as fault:
        return Settings(remarks=(f"{path} cannot be read ({fault}); the default settings hold",))
    remarks = []
    units, theme = table.get("units", "si"), table.get("theme", "")
    if units not in UNITS:
        remarks.append(f'{path}: units = "{units}" is not known; write "si" or "us"; "si" holds')
        units = "si"
    if not isinstance(theme, str):
        remarks.append(f"{path}: theme must be text in quotes; the program's own theme holds")
        theme = ""
    remarks += [f'{path}: "{key}" is no setting; known are units, theme' for key in sorted(_unknown(table))]
    return Settings(units=cast("System", units), theme=theme, remarks=tuple(remarks))


def _unknown(table: dict[str, Any]) -> set[str]:
    return set(table) - {"units", "theme"}


def save_settings(settings: Settings) -> None:
    """Write the settings; comments and keys of other versions that stand in the file are kept.

    Raises
    ------
    OSError
        Where the file cannot be written.
    """
    import tomlkit
    from tomlkit.exceptions import TOMLKitError

    path = settings_path()
    try:
        kept = tomlkit.parse(path.read_text(encoding="utf-8"))
    except (OSError, ValueError, RecursionError, TOMLKitError):
        kept = tomlkit.document()
    kept["units"] = settings.units
    if settings.theme:
        kept["theme"] = settings.theme
    elif "theme" in kept:
        del kept["theme"]
    path.parent.mkdir(parents=True, exist_ok=True)
    write_text(path, kept.as_string())


def drafts_folder() -> Path:
    """Folder of the drafts, in the user's state folder."""
    return Path(platformdirs.user_state_dir(APP, appauthor=False)) / "drafts"


def draft_path(document_path: Path | None) -> Path:
    """File that the unsaved text of a document is kept in.

    Parameters
    ----------
    document_path : Path or None
        Where the document has its file; None for one that has none, which gets a draft per process.

    Returns
    -------
    Path
        The folder need not exist yet.
    """
    if document_path is None:
        return drafts_folder() / f"untitled-{os.getpid()}.toml"
    whole = Path(os.path.abspath(document_path))  # noqa: PTH100  # a link keeps its own draft
    stem = re.sub(r"[^A-Za-z0-9_-]+", "-", whole.stem)[:60] or "document"
    mark = hashlib.sha256(os.fsencode(whole)).hexdigest()[:16]
    return drafts_folder() / f"{stem}-{mark}.toml"
