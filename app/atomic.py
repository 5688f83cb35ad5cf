"""Writing a file so that a crash or a full disk leaves the old one whole: write beside it, replace."""

from __future__ import annotations

import contextlib
import errno
import os
import secrets
import stat
from pathlib import Path


def write_bytes(path: str | os.PathLike[str], data: bytes) -> None:
    """Write `data` to `path` in one step; OSError leaves what was there. Links and permissions are kept."""
    target = Path(os.path.realpath(path))  # a link stays a link: what it points to is replaced
    old = _status_of(target)
    fresh = target.with_name(f".{secrets.token_hex(8)}.tmp")
    try:
        _write_through(fresh, data)
        if old is not None:
            _adopt(fresh, old)
        fresh.replace(target)
    except BaseException as error:
        with contextlib.suppress(OSError):
            fresh.unlink(missing_ok=True)
        if isinstance(error, OSError):
            error.filename, error.filename2 = str(target), None  # nobody asked for the file beside it
        raise
    _sync_folder(target.parent)


def _status_of(target: Path) -> os.stat_result | None:
    """What stands at the target now; PermissionError or OSError where it may not be replaced."""
    try:
        status = target.stat()
    except FileNotFoundError:
        return None
    if not stat.S_ISREG(status.st_mode):
        raise OSError(errno.EINVAL, "Not a regular file", str(target))
    if not os.access(target, os.W_OK):  # replacing asks only the folder, but a read-only file means it
        raise PermissionError(errno.EACCES, os.strerror(errno.EACCES), str(target))
    return status


def _write_through(fresh: Path, data: bytes) -> None:
    """Write a new file down to the disk, so that the replacement can never be of an empty file."""
    with fresh.open("xb") as file:
        file.write(data)
        file.flush()
        os.fsync(file.fileno())


def _adopt(fresh: Path, old: os.stat_result) -> None:
    """Owner and permissions of the file that is replaced; the owner only where we may give files away."""
    if hasattr(os, "chown"):
        with contextlib.suppress(PermissionError):
            os.chown(fresh, old.st_uid, old.st_gid)
    fresh.chmod(stat.S_IMODE(old.st_mode))


def _sync_folder(folder: Path) -> None:
    """Make the new name last as well, on systems that can open a folder."""
    with contextlib.suppress(OSError):
        handle = os.open(folder, os.O_RDONLY)
        try:
            os.fsync(handle)
        finally:
            os.close(handle)
