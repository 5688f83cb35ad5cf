"""Where calc sheets go: beside their project, or where `--out` says; never over anything but a PDF."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path

from app.samples import SUFFIX
from app.words import tr


class UnusableTarget(Exception):  # noqa: N818 - read by a person, worded as one would say it
    """The sheets cannot go where they were asked for; the message says why."""


def sheet_name(project: Path) -> str:
    """The file name of a project's sheet: `gate.barwright.json` gives `gate.pdf`."""
    stem = project.name.removesuffix(SUFFIX)
    return f"{stem if stem != project.name else project.stem}.pdf"


def sheet_paths(projects: Sequence[Path], out: str | None) -> tuple[Path, ...]:
    """A path for each project's sheet, in order; UnusableTarget where two would meet or `out` cannot serve.

    `out` ending in .pdf is the file of one sheet, anything else a folder, made by the command if need be;
    without it each sheet lies beside its project.
    """
    targets = tuple(_sheet_path(project, out, count=len(projects)) for project in projects)
    _refuse_meeting(projects, targets)
    _refuse_overwriting(projects, targets)
    return targets


def _sheet_path(project: Path, out: str | None, *, count: int) -> Path:
    if out is None:
        return project.with_name(sheet_name(project))
    target = Path(out)
    if target.is_dir():
        return target / sheet_name(project)
    if target.suffix.lower() == ".pdf":
        return _single(target, count)
    if target.exists():
        raise UnusableTarget(
            tr("{name} is a file without the ending .pdf; it is left as it is").format(name=out)
        )
    return target / sheet_name(project)


def _single(target: Path, count: int) -> Path:
    """A file for one sheet."""
    if count > 1:
        raise UnusableTarget(
            tr("{count} sheets do not fit into one file, {name}; name a folder").format(
                count=count, name=target
            )
        )
    return target


def _refuse_meeting(projects: Sequence[Path], targets: Sequence[Path]) -> None:
    """No two sheets in one file."""
    first: dict[Path, Path] = {}
    for project, target in zip(projects, targets, strict=True):
        other = first.setdefault(target.absolute(), project)
        if other != project:
            raise UnusableTarget(
                tr("{first} and {second} would both write {name}; use two folders").format(
                    first=other, second=project, name=target
                )
            )


def _refuse_overwriting(projects: Sequence[Path], targets: Sequence[Path]) -> None:
    """No sheet over a project, not even over one whose name ends in .pdf."""
    sources = {project.resolve() for project in projects}
    for target in targets:
        if target.resolve() in sources:
            raise UnusableTarget(tr("the sheet would overwrite the project {name}").format(name=target))
