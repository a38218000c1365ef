"""Decisions kept from one run to the next, in ``.specgen/`` beside the dossier; deleting it costs time and nothing else.

An entry is found by a digest of everything its decision was made from (see ``digest``), so that whatever changes, the old entry is
simply not found. Its bytes are a pickle, which must never be read from a folder that somebody else may have prepared: each entry is
sealed with a key that stands in the user's own cache folder, outside the project, and is not opened unless the seal is right. A dossier
folder that was received therefore starts with nothing remembered. Where no key can be kept, or the folder cannot be written, nothing is
remembered either. What is damaged, too large or of another make is passed over.
"""

import hashlib
import hmac
import os
import pickle
import re
import secrets
import stat
import sys
import tempfile
import zlib
from collections.abc import Mapping
from contextlib import suppress
from dataclasses import replace
from functools import lru_cache
from importlib import resources
from importlib.metadata import version
from importlib.resources.abc import Traversable
from pathlib import Path

from pydantic import BaseModel

from specgen import __version__
from specgen.core.quantity import Quantity, Range
from specgen.design.types import DecidedLoop
from specgen.model.loops import ReadLoop
from specgen.model.panel import Panel

FOLDER = ".specgen"
ENDING = ".decision"
_NAME = re.compile(r"[0-9a-f]{64}\.decision\Z")
_SEAL = 32  # bytes of HMAC-SHA256
LARGEST_ENTRY = 4 * 2**20  # bytes; an entry has about 30 thousand
LARGEST_OPENED = 32 * 2**20  # bytes; what a compressed entry may become
MOST = 256 * 2**20  # bytes of all entries; the oldest are dropped beyond that
_KEY_BYTES = 32


class Cache:
    """The decisions of one project.

    Parameters
    ----------
    project : pathlib.Path
        The folder beside whose ``loops/`` the decisions are kept.
    panel, devices, firmness
        What every decision of this run depends on: the panel, the bytes of ``devices.yml``, and whether firmness is asked for.
    """

    def __init__(self, project: Path, panel: Panel, devices: bytes, *, firmness: bool) -> None:
        self._folder = project / FOLDER
        self._key = _key()
        self._common = _digest(digest_of_program(), hashlib.sha256(devices).hexdigest(), plain(panel), firmness)
        self._used: set[str] = set()

    def get(self, read: ReadLoop) -> DecidedLoop | None:
        """Return the decision of a loop, with the loop as it was read now; None where none is remembered."""
        if self._key is None:
            return None
        name = self._name(read)
        found = _opened(self._folder / name, name, self._key)
        if not isinstance(found, DecidedLoop):
            return None
        self._used.add(name)
        with suppress(OSError):
            # its time tells what was of use last
            os.utime(self._folder / name)
        return replace(found, read=read)

    def put(self, decided: DecidedLoop) -> None:
        """Remember a decision; a folder that cannot be written is no matter."""
        if self._key is None:
            return
        name = self._name(decided.read)
        # where fields stand in their files is read anew each time, and may change without the decision
        content = zlib.compress(pickle.dumps(replace(decided, read=None), protocol=5), 1)  # type: ignore[arg-type]  # see get
        with suppress(OSError):
            _write(self._folder, name, _seal(content, name, self._key) + content)
            self._used.add(name)

    def tidy(self) -> None:
        """Drop the entries that were longest of no use, once all together are too large."""
        with suppress(OSError):
            if not self._used or self._folder.is_symlink():
                return
            entries = [(path.stat().st_mtime, path.stat().st_size, path) for path in self._folder.iterdir() if _NAME.match(path.name)]
            size = sum(entry[1] for entry in entries)
            for _, own, path in sorted(entries):
                if size <= MOST:
                    return
                path.unlink()
                size -= own

    def _name(self, read: ReadLoop) -> str:
        return digest(read, self._common) + ENDING


def digest(read: ReadLoop, common: str) -> str:
    """Return the digest of what a loop's decision is made from besides ``common``.

    The loop with the written form of every quantity, which fields are written and which were taken over from which file, and what its
    recording says. An edited loop changes it for every loop that takes fields from it.
    """
    written = sorted(map(repr, read.spans))
    inherited = sorted((repr(path), read.spans[path].file) for path in read.inherited)
    fitted = None if read.fitted is None else (plain(dict(read.fitted.ranges)), repr(read.fitted.figures))
    return _digest(common, plain(read.loop), written, inherited, fitted)


@lru_cache(maxsize=1)
def digest_of_program() -> str:
    """Return a digest of specgen's own code and tables and of the libraries that its numbers come from."""
    made = hashlib.sha256()
    libraries = [f"{name} {version(name)}" for name in ("numpy", "scipy", "fluids", "pydantic", "pint")]
    made.update(repr((__version__, sys.version_info[:3], libraries)).encode())
    for name, content in sorted(_files(resources.files("specgen"), "")):
        made.update(name.encode() + b"\0" + hashlib.sha256(content).digest())
    return made.hexdigest()


def _files(folder: Traversable, at: str) -> list[tuple[str, bytes]]:
    found = []
    for entry in folder.iterdir():
        if entry.is_dir():
            if entry.name not in ("__pycache__", "site_templates"):
                found += _files(entry, f"{at}{entry.name}/")
        elif entry.name.endswith((".py", ".yml")):
            found.append((at + entry.name, entry.read_bytes().replace(b"\r\n", b"\n")))
    return found


def plain(value: object) -> object:
    """Return a model as nested tuples with every number and its written form, the same from run to run.

    Examples
    --------
    >>> plain((Quantity(1.5, "1.5 K"), Range(1.0, 2.0, "1 to 2 s"), None))
    ('1.5', '1.5 K', '1.0', '2.0', '1 to 2 s', 'None')
    """
    found: list[str] = []
    _into(found, value)
    return tuple(found)


def _into(found: list[str], value: object) -> None:
    if isinstance(value, BaseModel):
        found += [type(value).__name__, repr(sorted(value.model_fields_set))]
        for name in type(value).model_fields:
            found.append(name)
            _into(found, getattr(value, name))
    elif isinstance(value, Quantity):
        found += [repr(float(value)), value.text]
    elif isinstance(value, Range):
        found += [repr(float(value.low)), repr(float(value.high)), value.text]
    elif isinstance(value, tuple):
        for one in value:
            _into(found, one)
    elif isinstance(value, Mapping):
        for name in sorted(value):
            found.append(repr(name))
            _into(found, value[name])
    else:
        found.append(repr(value))


def _digest(*parts: object) -> str:
    return hashlib.sha256(repr(parts).encode("utf-8", "backslashreplace")).hexdigest()


def _seal(content: bytes, name: str, key: bytes) -> bytes:
    # the name is sealed with the content: an entry put under another's name is not that decision
    return hmac.digest(key, name.encode() + b"\0" + content, "sha256")


def _opened(path: Path, name: str, key: bytes) -> object:
    """Return what an entry holds, None where there is none or it is not what this user's specgen wrote."""
    try:
        with path.open("rb") as file:
            if not stat.S_ISREG(os.fstat(file.fileno()).st_mode):
                return None
            raw = file.read(LARGEST_ENTRY + 1)
    except OSError:
        return None
    seal, content = raw[:_SEAL], raw[_SEAL:]
    if len(raw) > LARGEST_ENTRY or not hmac.compare_digest(seal, _seal(content, name, key)):
        return None
    try:
        opener = zlib.decompressobj()
        opened = opener.decompress(content, LARGEST_OPENED)
        return pickle.loads(opened)  # noqa: S301  the seal is right: this user's specgen wrote it
    except Exception:  # noqa: BLE001  whatever an entry of another make raises: it is decided anew
        return None


def _write(folder: Path, name: str, content: bytes) -> None:
    """Write a file whole or not at all."""
    if folder.is_symlink():
        return
    if not folder.is_dir():
        folder.mkdir()
        (folder / ".gitignore").write_text("*\n", encoding="utf-8")
    handle, fresh = tempfile.mkstemp(prefix=".new-", dir=folder)
    try:
        with os.fdopen(handle, "wb") as file:
            file.write(content)
        Path(fresh).replace(folder / name)
    except BaseException:
        with suppress(OSError):
            Path(fresh).unlink()
        raise


def user_folder(environment: Mapping[str, str], system: str) -> Path:
    """Return where a user's own caches stand.

    Examples
    --------
    >>> user_folder({"XDG_CACHE_HOME": "/tmp/c"}, "linux").as_posix()
    '/tmp/c/specgen'
    """
    if system == "win32" and environment.get("LOCALAPPDATA"):
        return Path(environment["LOCALAPPDATA"]) / "specgen"
    if system == "darwin":
        return Path.home() / "Library" / "Caches" / "specgen"
    given = environment.get("XDG_CACHE_HOME", "")
    return (Path(given) if Path(given).is_absolute() else Path.home() / ".cache") / "specgen"


def _key() -> bytes | None:
    """Return this user's key, made on first use; None where it can be neither read nor kept."""
    try:
        path = user_folder(os.environ, sys.platform) / "key"
        known = _read_key(path)
        if known is not None:
            return known
        path.parent.mkdir(parents=True, exist_ok=True)
        handle, fresh = tempfile.mkstemp(prefix=".new-", dir=path.parent)  # readable by its owner alone
        with os.fdopen(handle, "wb") as file:
            file.write(secrets.token_bytes(_KEY_BYTES))
        Path(fresh).replace(path)
        return _read_key(path)
    except (OSError, RuntimeError):
        # no home folder, or one that cannot be written
        return None


def _read_key(path: Path) -> bytes | None:
    try:
        found = path.read_bytes()
    except FileNotFoundError:
        return None
    return found if len(found) == _KEY_BYTES else None
