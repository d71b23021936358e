"""What stands on disk: noticing changes by other programs, and writing a file whole or not at all."""

from __future__ import annotations

import errno
import hashlib
import os
import tempfile
from dataclasses import dataclass
from pathlib import Path


@dataclass(frozen=True)
class DiskState:
    """Enough of a file to notice a change: a hash of its content, empty for no file. Not its time, which programs that
    copy and synchronise folders change where nothing else has."""

    digest: str = ""


def disk_state(path: Path) -> DiskState:
    """The state of a file now; a file that cannot be read counts as none."""
    try:
        return DiskState(hashlib.sha256(path.read_bytes()).hexdigest())
    except OSError:
        return DiskState()


def write_whole(path: Path, content: str | bytes) -> None:
    """Write bytes, or text as UTF-8, so that the file is there whole or as it was. Raises `OSError`.

    Needs no Qt: the command line uses it.
    """
    if isinstance(content, str):
        content = content.encode("utf-8", errors="backslashreplace")
    handle, name = tempfile.mkstemp(prefix=f".{path.name[:40]}.", suffix=".part", dir=path.parent)
    try:
        with open(handle, "wb") as stream:
            stream.write(content)
            stream.flush()
            os.fsync(stream.fileno())
        _usual_permissions(name)
        os.replace(name, path)
    except BaseException:
        Path(name).unlink(missing_ok=True)
        raise


def why_not(error: OSError, path: Path) -> str:
    """Why a file could not be written, for the end of a sentence, with what to do about it."""
    if error.errno in (errno.ENOSPC, getattr(errno, "EDQUOT", errno.ENOSPC)):
        return "the disk is full"
    if isinstance(error, PermissionError):
        if path.exists() and os.access(path.parent, os.W_OK):
            return "it is open in another program, or protected: close it there, or choose another name"
        return f"nothing may be written to the folder {path.parent}"
    if isinstance(error, FileNotFoundError):
        return f"there is no folder {path.parent}"
    return error.strerror or str(error)


def _usual_permissions(name: str) -> None:
    """A temporary file is private; what replaces a result must be as readable as any new file."""
    if os.name == "posix":
        mask = os.umask(0)
        os.umask(mask)
        os.chmod(name, 0o666 & ~mask)
