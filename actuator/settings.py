"""The user's settings, and where unsaved documents are kept; both fronts read them."""

from __future__ import annotations

import hashlib
import os
import re
import tomllib
from collections.abc import Mapping
from dataclasses import dataclass, field
from pathlib import Path
from typing import cast

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
    keys : mapping of str to str
        Key by name of an action, in place of the terminal UI's own.
    remarks : tuple of str
        What in the settings file could not be used, and what holds instead.
    """

    units: System = "si"
    theme: str = ""
    keys: Mapping[str, str] = field(default_factory=dict)
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
    keys = table.get("keys", {})
    if not isinstance(keys, dict) or not all(isinstance(key, str) for key in keys.values()):
        remarks.append(f'{path}: keys must be a table of text, [keys] "edit.undo" = "ctrl+z"; none of it holds')
        keys = {}
    unknown = [key for key in table if key not in ("units", "theme", "keys")]
    remarks += [f'{path}: "{key}" is no setting; known are units, theme, keys' for key in unknown]
    return Settings(units=cast("System", units), theme=theme, keys=keys, remarks=tuple(remarks))


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
    if settings.keys:
        kept["keys"] = dict(settings.keys)
    elif "keys" in kept:
        del kept["keys"]
    path.parent.mkdir(parents=True, exist_ok=True)
    write_text(path, kept.as_string())


def drafts_folder() -> Path:
    """Folder of the drafts, in the user's state folder."""
    return Path(platformdirs.user_state_dir(APP, appauthor=False)) / "drafts"


def draft_path(key: Path | str | None) -> Path:
    """File that the unsaved text of a document is kept in.

    Parameters
    ----------
    key : Path, str or None
        Where the document has its file; or a text that tells it from others; None for a document that has no
        file, which gets a draft per process.

    Returns
    -------
    Path
        The folder need not exist yet.
    """
    if key is None:
        return drafts_folder() / f"untitled-{os.getpid()}.toml"
    whole = str(key.absolute()) if isinstance(key, Path) else key
    stem = re.sub(r"[^A-Za-z0-9_-]+", "-", Path(whole).stem)[:60] or "document"
    mark = hashlib.sha256(os.fsencode(whole)).hexdigest()[:16]
    return drafts_folder() / f"{stem}-{mark}.toml"
