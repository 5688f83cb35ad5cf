"""Saving in one step: whatever goes wrong, the old file is whole and nothing is left lying about."""

from __future__ import annotations

import errno
import os
import stat
import subprocess
import sys
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pytest

from app.atomic import write_bytes

OLD, NEW = b"old and whole", b"new"


@pytest.fixture
def target(tmp_path: Path) -> Path:
    path = tmp_path / "member.json"
    path.write_bytes(OLD)
    return path


def full_disk(*_args: Any, **_kwargs: Any) -> Any:
    raise OSError(errno.ENOSPC, "No space left on device")


class Interrupted(BaseException):
    """As a Ctrl-C in the middle."""


def interrupted(*_args: Any, **_kwargs: Any) -> Any:
    raise Interrupted


def fill_write(patch: pytest.MonkeyPatch, fault: Callable[..., Any]) -> None:
    """A file that opens and fails on the first byte."""
    opened = Path.open

    def opening(path: Path, *args: Any) -> Any:
        file = opened(path, *args)

        class Full:
            def __enter__(self) -> Any:
                return self

            def __exit__(self, *_: object) -> None:
                file.close()

            write = staticmethod(fault)

        return Full()

    patch.setattr(Path, "open", opening)


BREAKS: dict[str, Callable[[pytest.MonkeyPatch, Callable[..., Any]], None]] = {
    "write": fill_write,
    "sync": lambda patch, fault: patch.setattr(os, "fsync", fault),
    "permissions": lambda patch, fault: patch.setattr(Path, "chmod", fault),
    "replace": lambda patch, fault: patch.setattr(Path, "replace", fault),
}


@pytest.mark.parametrize("step", BREAKS)
@pytest.mark.parametrize(("fault", "error"), [(full_disk, OSError), (interrupted, Interrupted)])
def test_a_failure_at_any_step_leaves_the_old_file_and_no_debris(
    target: Path, step: str, fault: Callable[..., Any], error: type[BaseException]
) -> None:
    with pytest.MonkeyPatch.context() as patch:
        BREAKS[step](patch, fault)
        with pytest.raises(error):
            write_bytes(target, NEW)
    assert target.read_bytes() == OLD
    assert list(target.parent.iterdir()) == [target]


def test_a_failure_leaves_no_new_file_where_there_was_none(tmp_path: Path) -> None:
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(os, "fsync", full_disk)
        with pytest.raises(OSError, match="No space"):
            write_bytes(tmp_path / "member.json", NEW)
    assert list(tmp_path.iterdir()) == []


def test_a_crash_leaves_the_old_file(target: Path) -> None:
    """The process ends at once, as at a power cut, just before the replacement."""
    code = (
        "import os, sys; from pathlib import Path; from app.atomic import write_bytes\n"
        "Path.replace = lambda *_: os._exit(9)\n"
        "write_bytes(sys.argv[1], b'new')"
    )
    root = Path(__file__).resolve().parents[2]
    run = subprocess.run([sys.executable, "-c", code, str(target)], cwd=root, check=False)
    assert run.returncode == 9
    assert target.read_bytes() == OLD


def test_the_bytes_are_on_the_disk_before_the_name_points_to_them(target: Path) -> None:
    """And the folder after it."""
    steps: list[str] = []
    sync, replace = os.fsync, Path.replace

    def synced(handle: int) -> None:
        steps.append("folder" if stat.S_ISDIR(os.fstat(handle).st_mode) else "file")
        sync(handle)

    def replaced(path: Path, to: Path) -> Path:
        steps.append("replace")
        assert path.parent == to.parent  # only within one file system is it one step
        return replace(path, to)

    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(os, "fsync", synced)
        patch.setattr(Path, "replace", replaced)
        write_bytes(target, NEW)
    assert steps == (["file", "replace", "folder"] if os.name == "posix" else ["file", "replace"])
    assert target.read_bytes() == NEW
    assert list(target.parent.iterdir()) == [target]


def test_a_link_stays_a_link_and_its_target_is_replaced(target: Path) -> None:
    link = target.with_name("link.json")
    link.symlink_to(target.name)
    write_bytes(link, NEW)
    assert link.is_symlink()
    assert target.read_bytes() == NEW


def test_permissions_are_kept(target: Path) -> None:
    target.chmod(0o640)
    write_bytes(target, NEW)
    assert stat.S_IMODE(target.stat().st_mode) == 0o640


def test_a_new_file_has_the_permissions_of_any_new_file(tmp_path: Path) -> None:
    (tmp_path / "plain").touch()
    write_bytes(tmp_path / "member.json", NEW)
    assert (tmp_path / "member.json").stat().st_mode == (tmp_path / "plain").stat().st_mode


def test_a_file_that_may_not_be_written_is_not_replaced(target: Path) -> None:
    """Asked of the system, since the superuser may write everything."""
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(os, "access", lambda path, mode: (Path(path), mode) != (target, os.W_OK))
        with pytest.raises(PermissionError, match=r"member\.json"):
            write_bytes(target, NEW)
    assert target.read_bytes() == OLD


def test_what_is_no_file_is_not_replaced(tmp_path: Path) -> None:
    with pytest.raises(OSError, match="Not a regular file"):
        write_bytes(tmp_path, NEW)


def test_a_missing_folder_is_the_systems_own_error(tmp_path: Path) -> None:
    with pytest.raises(FileNotFoundError):
        write_bytes(tmp_path / "none" / "member.json", NEW)


def test_an_error_names_the_file_that_was_asked_for(tmp_path: Path, target: Path) -> None:
    missing = tmp_path / "none" / "member.json"
    with pytest.raises(FileNotFoundError) as caught:
        write_bytes(missing, NEW)
    assert caught.value.filename == str(missing)
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(os, "fsync", full_disk)
        with pytest.raises(OSError, match="No space") as full:
            write_bytes(target, NEW)
    assert full.value.filename == str(target)
