"""The two commands of a fresh clone, without installing anything: what is decided, and what is said."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

import pytest

from app import environment, qt_libraries, start
from app.environment import SetupFailed
from app.samples import sample_path
from tests import __main__ as tests_command


@pytest.fixture
def clone(tmp_path: Path) -> Path:
    (tmp_path / "pyproject.toml").write_text("[project]\n", "utf-8")
    return tmp_path


@pytest.fixture
def installed(clone: Path, monkeypatch: pytest.MonkeyPatch) -> list[str]:
    """Making and filling the environment, as a list of what was asked for."""
    asked: list[str] = []
    monkeypatch.setattr(environment, "runs", lambda python: python.parent.parent.exists())
    monkeypatch.setattr(
        environment, "ensure_environment", lambda root, python: python.parent.parent.mkdir(exist_ok=True)
    )
    monkeypatch.setattr(environment, "install", lambda root, python, extra: asked.append(extra))
    return asked


def test_the_second_start_installs_nothing(clone: Path, installed: list[str]) -> None:
    first = environment.prepare(clone)
    assert environment.prepare(clone) == first
    assert installed == [""]


def test_changed_dependencies_are_installed_again(clone: Path, installed: list[str]) -> None:
    environment.prepare(clone)
    (clone / "pyproject.toml").write_text('[project]\nname = "other"\n', "utf-8")
    environment.prepare(clone)
    assert installed == ["", ""]


def test_the_tests_add_what_they_need_once(clone: Path, installed: list[str]) -> None:
    environment.prepare(clone)
    environment.prepare(clone, extra="dev")
    environment.prepare(clone)
    environment.prepare(clone, extra="dev")
    assert installed == ["", "dev"]


@pytest.mark.parametrize("note", ["", "[]", "{", '{"fingerprint": 3}', '{"fingerprint": "x", "extras": 5}'])
def test_a_note_that_makes_no_sense_means_not_installed(clone: Path, installed: list[str], note: str) -> None:
    environment.environment_folder(clone).mkdir()
    (environment.environment_folder(clone) / environment.NOTE).write_text(note, "utf-8")
    environment.prepare(clone, extra="dev")
    assert installed == ["dev"]


def test_an_installation_that_broke_off_is_done_again(
    clone: Path, installed: list[str], monkeypatch: pytest.MonkeyPatch
) -> None:
    def breaks(*_: object) -> None:
        raise SetupFailed("no network")

    with monkeypatch.context() as broken:
        broken.setattr(environment, "install", breaks)
        with pytest.raises(SetupFailed):
            environment.prepare(clone)
    environment.prepare(clone)
    assert installed == [""]


def test_an_old_python_is_told_so(clone: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(sys, "version_info", (3, 10, 4))
    with pytest.raises(SetupFailed, match=r"3\.11 or later is needed; this is Python 3\.10"):
        environment.prepare(clone)


def test_an_installed_copy_is_no_clone(tmp_path: Path) -> None:
    with pytest.raises(SetupFailed, match=r"no pyproject\.toml"):
        environment.prepare(tmp_path)


def test_an_interpreter_that_is_gone_does_not_run(tmp_path: Path) -> None:
    assert not environment.runs(tmp_path / "python")
    assert environment.runs(Path(sys.executable))


def test_failing_pip_is_a_sentence(clone: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(
        environment, "pip_command", lambda python: [sys.executable, "-c", "raise SystemExit(1)"]
    )
    with pytest.raises(SetupFailed, match="pip could not install"):
        environment.install(clone, Path(sys.executable), "")


def test_no_pip_names_the_package(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(environment, "has_module", lambda name: False)
    monkeypatch.setattr(
        subprocess, "run", lambda *args, **options: subprocess.CompletedProcess(args, returncode=1)
    )
    with pytest.raises(SetupFailed, match=r"apt install python3\.\d+-venv"):
        environment.pip_command(Path(sys.executable))


@pytest.fixture
def ran(monkeypatch: pytest.MonkeyPatch) -> list[tuple[str, ...]]:
    """The commands that would be run in the environment; each ends with exit code 3."""
    commands: list[tuple[str, ...]] = []

    def run(python: Path, *arguments: str) -> int:
        commands.append(arguments)
        return 3

    monkeypatch.setattr(start, "prepare", lambda: Path(sys.executable))
    monkeypatch.setattr(start, "run", run)
    return commands


def without_display(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(sys, "platform", "linux")
    for name in ("DISPLAY", "WAYLAND_DISPLAY", "QT_QPA_PLATFORM"):
        monkeypatch.delenv(name, raising=False)


def test_without_a_display_the_check_is_printed(
    ran: list[tuple[str, ...]], monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    without_display(monkeypatch)
    assert start.main() == 0  # printed, though its exit code was that of an incomplete check
    assert [command[0] for command in ran] == ["check"]
    said = capsys.readouterr().out.strip().splitlines()
    assert said == ["No window here: there is no display. The sample's check instead:"]


def test_what_could_not_be_printed_is_no_success(
    monkeypatch: pytest.MonkeyPatch, ran: list[tuple[str, ...]]
) -> None:
    without_display(monkeypatch)
    monkeypatch.setattr(start, "run", lambda python, *arguments: 4)
    assert start.main() == 4


def test_with_a_display_the_window_opens_on_the_sample(
    ran: list[tuple[str, ...]], monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(start, "why_no_window", lambda python: "")
    start.main()
    assert ran == [("open", str(sample_path("hoist_shaft")))]


def test_a_setup_that_fails_is_a_sentence(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    def fails() -> Path:
        raise SetupFailed("Python 3.11 or later is needed.")

    monkeypatch.setattr(start, "prepare", fails)
    assert start.main() == 1
    assert capsys.readouterr().err == "Python 3.11 or later is needed.\n"


def test_a_display_that_fails_says_what_is_missing(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("DISPLAY", ":99")
    failed = subprocess.CompletedProcess([], returncode=1)
    monkeypatch.setattr(subprocess, "run", lambda *args, **options: failed)
    monkeypatch.setattr(start, "missing_packages", lambda table: ("libxcb-cursor0",))
    assert "apt install libxcb-cursor0" in start.why_no_window(Path(sys.executable))
    monkeypatch.setattr(start, "missing_packages", lambda table: ())
    assert start.why_no_window(Path(sys.executable)) == "Qt cannot reach the display."


def test_missing_libraries_are_named_by_their_packages(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(sys, "platform", "linux")
    table = {"libno-such-thing.so.7": "libnosuch7", "libc.so.6": "libc6"}
    assert qt_libraries.missing_packages(table) == ("libnosuch7",)
    monkeypatch.setattr(sys, "platform", "darwin")
    assert qt_libraries.missing_packages(table) == ()


def test_the_tests_say_which_library_they_miss(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.setattr(tests_command, "missing_packages", lambda table: ("libegl1", "libgl1"))
    assert tests_command.main([]) == 1
    assert "apt install libegl1 libgl1" in capsys.readouterr().err
