"""The terminal, command by command: exit codes of the contract, what is printed where, and nothing lost."""

from __future__ import annotations

import errno
import json
import os
import subprocess
import sys
from collections.abc import Callable, Iterator
from pathlib import Path
from types import ModuleType

import pytest

from app import cli, commands, qt_libraries
from app.exit_codes import BROKEN_PIPE, WORST_FIRST, worst
from app.samples import names, sample_path
from app.words import LANGUAGES, use_language

ROOT = Path(__file__).resolve().parents[2]
PASSING, FAILING = str(sample_path("hoist_shaft")), str(sample_path("tie_rod"))

Change = Callable[[dict[str, object]], None]


@pytest.fixture
def edited(tmp_path: Path) -> Callable[..., str]:
    """A sample with changes to its JSON, as a file."""

    def make(change: Change, sample: str = "hoist_shaft", name: str = "edited.barwright.json") -> str:
        project = json.loads(sample_path(sample).read_bytes())
        change(project)
        file = tmp_path / name
        file.write_text(json.dumps(project), "utf-8")
        return str(file)

    return make


def without_allowables(project: dict[str, object]) -> None:
    for material in project["materials"]:  # type: ignore[attr-defined]
        del material["allowable_tension"]


def without_supports(project: dict[str, object]) -> None:
    for joint in project["joints"]:  # type: ignore[attr-defined]
        joint.pop("support", None)
    project["limits"] = {}
    project["load_cases"] = [
        case | {"joint_loads": []}
        for case in project["load_cases"]  # type: ignore[attr-defined]
    ]


def with_two_faults(project: dict[str, object]) -> None:
    project["segments"][2]["section"]["diameter"] = -0.04  # type: ignore[index]
    project["segments"][3]["lenght"] = 1.0  # type: ignore[index]


# Exit codes of `check`


def test_a_member_that_passes_ends_with_0(capsys: pytest.CaptureFixture[str]) -> None:
    assert cli.main(["check", PASSING]) == 0
    printed = capsys.readouterr()
    assert "Passes" in printed.out
    assert printed.err == ""


def test_a_member_that_fails_ends_with_1(capsys: pytest.CaptureFixture[str]) -> None:
    assert cli.main(["check", FAILING]) == 1
    assert "Does not pass" in capsys.readouterr().out


def test_a_check_not_made_ends_with_3(edited: Callable[..., str], capsys: pytest.CaptureFixture[str]) -> None:
    assert cli.main(["check", edited(without_allowables)]) == 3
    out = capsys.readouterr().out
    assert "not made" in out
    assert "enter" in out.partition("\n? ")[2]  # what to do about it


def test_a_file_with_faults_ends_with_2_and_lists_them_all(
    edited: Callable[..., str], capsys: pytest.CaptureFixture[str]
) -> None:
    assert cli.main(["check", edited(with_two_faults)]) == 2
    printed = capsys.readouterr()
    assert printed.out == ""
    assert "segments[2].section.diameter: must be greater than 0, is -0.04" in printed.err
    assert "segments[3]" in printed.err
    assert "length" in printed.err  # the nearest valid name


def test_an_unheld_member_ends_with_2_and_names_its_combinations(
    edited: Callable[..., str], capsys: pytest.CaptureFixture[str]
) -> None:
    assert cli.main(["check", edited(without_supports)]) == 2
    printed = capsys.readouterr()
    assert printed.out == ""
    assert "Cold start" in printed.err
    assert "support" in printed.err


@pytest.mark.parametrize("json_too", [[], ["--json"]])
def test_what_is_no_file_ends_with_2(
    json_too: list[str], tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    (tmp_path / "binary.barwright.json").write_bytes(b"\xff\xfe\x00")
    for name, word in [("missing.json", "no such file"), (".", "folder"), ("binary.barwright.json", "UTF-8")]:
        assert cli.main(["check", str(tmp_path / name), *json_too]) == 2
        printed = capsys.readouterr()
        assert printed.out == ""
        assert word in printed.err
        assert "Traceback" not in printed.err


def broken_solver(monkeypatch: pytest.MonkeyPatch, broken: str) -> None:
    """Our own fault for one file, as no input can provoke it."""
    real = commands.solved

    def solved(file: str) -> object:
        if file == broken:
            raise ZeroDivisionError("planted")
        return real(file)

    monkeypatch.setattr(commands, "solved", solved)


def test_a_fault_of_ours_ends_with_4_keeps_its_traceback_and_the_others_print(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    broken_solver(monkeypatch, FAILING)
    assert cli.main(["check", FAILING, PASSING, "--json"]) == 4
    printed = capsys.readouterr()
    assert len(printed.out.splitlines()) == 1
    assert "ZeroDivisionError: planted" in printed.err


def test_the_worst_of_several_counts() -> None:
    assert WORST_FIRST == (4, 2, 1, 3, 0)
    for place, code in enumerate(WORST_FIRST):
        assert worst([0, *WORST_FIRST[place:]]) == code
    assert worst([]) == 0


# What `check` prints


def test_several_files_are_a_json_line_each(
    edited: Callable[..., str], capsys: pytest.CaptureFixture[str]
) -> None:
    assert cli.main(["check", "--json", PASSING, edited(with_two_faults), FAILING]) == 2
    printed = capsys.readouterr()
    results = [json.loads(line) for line in printed.out.splitlines()]
    assert [result["verdict"] for result in results] == ["pass", "fail"]
    assert {result["format"] for result in results} == {"barwright-results"}
    assert "edited.barwright.json" in printed.err


def test_the_table_has_every_segment_and_every_combination_in_display_units(
    capsys: pytest.CaptureFixture[str],
) -> None:
    cli.main(["check", PASSING])
    out = capsys.readouterr().out
    lines = [line.split() for line in out.splitlines()]
    assert {tuple(line[:1]) for line in lines} >= {(mark,) for mark in "ABCDEFGHIJKL"}
    for words in ("Boat hoist, worm shaft", "Cold start", "Warm running", "Warm, brake snatch", "MPa", "kN"):
        assert words in out
    assert "Numerical error at most" in out
    assert "competent engineer" in out
    assert "elastic critical load" in out


def test_the_failing_segment_stands_in_the_table_with_a_failing_number(
    capsys: pytest.CaptureFixture[str],
) -> None:
    cli.main(["check", FAILING])
    row = next(line for line in capsys.readouterr().out.splitlines() if line.startswith("D "))
    assert row.split()[-1] == "1.05"


def test_reactions_add_up_with_the_loads(capsys: pytest.CaptureFixture[str]) -> None:
    """Read back from the printed table: what is printed is in balance to its own digits."""
    cli.main(["check", FAILING])
    lines = capsys.readouterr().out.splitlines()
    start = next(i for i, line in enumerate(lines) if line.startswith("Forces on the member"))
    rows = {line.split("  ")[0]: line for line in lines[start + 1 : start + 4]}
    last = {name: number(line.split("  ")[-1]) for name, line in rows.items()}
    assert last["Joint 0"] + last["Joint 8"] + last["Loads"] == pytest.approx(0.0, abs=1.5)  # three roundings


def number(cell: str) -> float:
    return float(cell.replace("−", "-").replace("\u202f", "").removesuffix(" N"))


def test_words_of_a_file_do_not_steer_the_terminal(
    edited: Callable[..., str], capsys: pytest.CaptureFixture[str]
) -> None:
    def hostile(project: dict[str, object]) -> None:
        project["title"] = "red \x1b[31m and \u202e turned \u009b2J"

    cli.main(["check", edited(hostile)])
    out = capsys.readouterr().out
    assert not {"\x1b", "\u202e", "\u009b"} & set(out)
    assert "red \ufffd[31m" in out


def test_words_of_a_file_make_no_lines_of_their_own(
    edited: Callable[..., str], capsys: pytest.CaptureFixture[str]
) -> None:
    """A verdict on a line of its own is ours alone, and a row of a table stays one line."""

    def hostile(project: dict[str, object]) -> None:
        project["title"] = "Rod\n\nPasses\n"
        project["segments"][0]["mark"] = "D\r\nD"  # type: ignore[index]
        for case in project["load_cases"]:  # type: ignore[attr-defined]
            case["segment_loads"] = [load for load in case.get("segment_loads", []) if load["segment"] != "A"]
        project["combinations"][0]["name"] = "Storm\u2028surge"  # type: ignore[index]

    assert cli.main(["check", edited(hostile, "tie_rod")]) == 1
    out = capsys.readouterr().out
    assert out.startswith("Rod Passes (edited.barwright.json)\n\nDoes not pass\n")
    assert "\nD D " in out
    assert "  Storm surge  " in out


def test_joints_that_do_not_balance_are_named_by_their_mark(
    edited: Callable[..., str], capsys: pytest.CaptureFixture[str]
) -> None:
    def hardly_held(project: dict[str, object]) -> None:
        for joint in project["joints"]:  # type: ignore[attr-defined]
            joint.pop("support", None)
            joint["mark"] = f"point {joint['mark']}"
        project["joints"][0]["support"] = {"kind": "spring", "stiffness": 1e-9}  # type: ignore[index]
        project["limits"] = {}
        force = {"joint": "point 1", "force": 1.0}
        project["load_cases"] = [{"name": "Push", "joint_loads": [force]}]
        project["combinations"] = []

    assert cli.main(["check", edited(hardly_held)]) == 2
    assert "left over at joint point" in capsys.readouterr().err


def test_several_tables_name_their_files_and_keep_apart(
    edited: Callable[..., str], capsys: pytest.CaptureFixture[str]
) -> None:
    cli.main(["check", edited(with_two_faults), PASSING, FAILING])
    out = capsys.readouterr().out
    assert out.startswith("Boat hoist, worm shaft (hoist_shaft.barwright.json)\n")
    assert "\n\nSlip gate, tie rod (tie_rod.barwright.json)\n" in out
    assert not out.endswith("\n\n")


def test_a_fault_beyond_the_files_is_4_and_never_the_1_of_a_check_that_fails(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    def broken(options: object) -> int:
        raise ZeroDivisionError("planted")

    monkeypatch.setattr(commands, "run_schema", broken)
    assert cli.main(["schema"]) == 4
    assert "ZeroDivisionError: planted" in capsys.readouterr().err


def test_an_output_that_cannot_be_written_is_a_sentence(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    def full(options: object) -> int:
        raise OSError(errno.ENOSPC, "No space left on device")

    monkeypatch.setattr(commands, "run_schema", full)
    monkeypatch.setattr(cli, "hush", lambda: None)
    assert cli.main(["schema"]) == 2
    assert capsys.readouterr().err == "The output cannot be written: No space left on device\n"


def test_several_files_open_a_window_each(monkeypatch: pytest.MonkeyPatch, tmp_path: Path) -> None:
    monkeypatch.chdir(tmp_path)
    Path("a.barwright.json").touch()
    opened: list[object] = []
    door = ModuleType("app.gui.main")
    door.run = lambda path, language: opened.append(path) or 0  # type: ignore[attr-defined]
    monkeypatch.setitem(sys.modules, "app.gui.main", door)
    monkeypatch.setattr(subprocess, "Popen", lambda command: opened.append(command[-1]))
    monkeypatch.setattr(qt_libraries, "missing_packages", lambda table: ())
    monkeypatch.setenv("QT_QPA_PLATFORM", "offscreen")
    assert cli.main(["a.barwright.json", "b.barwright.json"]) == 0
    assert opened == ["b.barwright.json", Path("a.barwright.json")]


def test_a_window_without_the_libraries_of_qt_names_them(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.setattr(qt_libraries, "missing_packages", lambda table: ("libegl1",))
    monkeypatch.setenv("QT_QPA_PLATFORM", "offscreen")
    assert cli.main([]) == 2
    assert "apt install libegl1" in capsys.readouterr().err


def run(*arguments: str, **environment: str) -> subprocess.CompletedProcess[bytes]:
    return subprocess.run(
        [sys.executable, "-m", "app", *arguments],
        cwd=ROOT,
        env=os.environ | environment,
        capture_output=True,
        check=False,
    )


@pytest.mark.parametrize("encoding", ["ascii", "latin-1"])
def test_utf8_whatever_the_locale(encoding: str) -> None:
    ran = run("check", FAILING, PYTHONIOENCODING=encoding, LC_ALL="C", PYTHONUTF8="0")
    assert ran.returncode == 1, ran.stderr
    assert "−" in ran.stdout.decode("utf-8")


def test_a_reader_who_leaves_is_no_fault() -> None:
    """`barwright schema | head -1`: neither a traceback nor a verdict's exit code."""
    code = (
        "import os, sys; r, w = os.pipe(); os.close(r); os.dup2(w, 1);"
        "from app.cli import main; sys.exit(main(['check', sys.argv[1], sys.argv[1]]))"
    )
    ran = subprocess.run([sys.executable, "-c", code, PASSING], cwd=ROOT, capture_output=True, check=False)
    assert ran.returncode == BROKEN_PIPE
    assert ran.stderr == b""


# `sheet`


@pytest.fixture
def copies(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """A folder, the current one, with copies of two samples."""
    for name in ("hoist_shaft", "tie_rod"):
        (tmp_path / f"{name}.barwright.json").write_bytes(sample_path(name).read_bytes())
    monkeypatch.chdir(tmp_path)
    return tmp_path


def test_a_sheet_lies_beside_its_project_whatever_the_verdict(copies: Path) -> None:
    assert cli.main(["sheet", "tie_rod.barwright.json"]) == 0
    assert (copies / "tie_rod.pdf").read_bytes().startswith(b"%PDF-")


def test_a_sheet_goes_where_it_is_sent(copies: Path) -> None:
    assert cli.main(["sheet", "tie_rod.barwright.json", "-o", "sheets/rod.PDF"]) == 0
    assert (copies / "sheets" / "rod.PDF").is_file()


def test_several_sheets_go_into_a_folder(copies: Path, capsys: pytest.CaptureFixture[str]) -> None:
    names = ["hoist_shaft", "tie_rod"]
    assert cli.main(["sheet", *(f"{name}.barwright.json" for name in names), "--out", "new/sheets"]) == 0
    assert sorted(path.name for path in (copies / "new" / "sheets").iterdir()) == [
        "hoist_shaft.pdf",
        "tie_rod.pdf",
    ]
    out = capsys.readouterr().out
    assert "Passes" in out
    assert "Does not pass" in out


@pytest.mark.parametrize(
    ("out", "word"),
    [
        ("both.pdf", "name a folder"),
        ("hoist_shaft.barwright.json", "left as it is"),
        ("tie_rod.barwright.json/sheets", "cannot be written"),
    ],
)
def test_a_target_that_cannot_serve_is_refused(
    copies: Path, out: str, word: str, capsys: pytest.CaptureFixture[str]
) -> None:
    before = sample_path("hoist_shaft").read_bytes()
    assert cli.main(["sheet", "hoist_shaft.barwright.json", "tie_rod.barwright.json", "-o", out]) == 2
    printed = capsys.readouterr()
    assert word in printed.err
    assert printed.out == ""
    assert (copies / "hoist_shaft.barwright.json").read_bytes() == before
    assert not list(copies.glob("**/*.pdf"))


def test_two_sheets_of_one_name_are_refused(copies: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (copies / "other").mkdir()
    (copies / "other" / "tie_rod.barwright.json").write_bytes(sample_path("tie_rod").read_bytes())
    files = ["tie_rod.barwright.json", "other/tie_rod.barwright.json"]
    assert cli.main(["sheet", *files, "-o", "sheets"]) == 2
    assert "would both write" in capsys.readouterr().err


def test_a_project_named_like_a_sheet_is_not_overwritten(
    copies: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    project = copies / "odd.pdf"
    project.write_bytes(sample_path("tie_rod").read_bytes())
    assert cli.main(["sheet", "odd.pdf"]) == 2
    assert cli.main(["sheet", "odd.pdf", "-o", str(copies / "." / "odd.pdf")]) == 2
    assert "overwrite the project" in capsys.readouterr().err
    assert project.read_bytes() == sample_path("tie_rod").read_bytes()


def test_a_bad_project_prints_no_sheet_and_the_others_do(copies: Path) -> None:
    (copies / "bad.barwright.json").write_text("{", "utf-8")
    assert cli.main(["sheet", "bad.barwright.json", "tie_rod.barwright.json"]) == 2
    assert [path.name for path in copies.glob("*.pdf")] == ["tie_rod.pdf"]


# The others


def test_the_schema_is_json_and_takes_the_samples_keys(capsys: pytest.CaptureFixture[str]) -> None:
    assert cli.main(["schema"]) == 0
    text = capsys.readouterr().out
    json.loads(text)
    assert all(f'"{key}"' in text for key in json.loads(sample_path().read_bytes()))


def test_samples_are_listed_by_title_and_copied_once(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.chdir(tmp_path)
    assert cli.main(["sample"]) == 0
    assert "Boat hoist, worm shaft" in capsys.readouterr().out
    assert cli.main(["sample", "tie_rod"]) == 0
    copied = tmp_path / "tie_rod.barwright.json"
    assert copied.read_bytes() == sample_path("tie_rod").read_bytes()
    copied.write_text("mine", "utf-8")
    assert cli.main(["sample", "tie_rod"]) == 2
    assert copied.read_text("utf-8") == "mine"
    assert "exists already" in capsys.readouterr().err


def test_an_unknown_sample_is_answered_with_the_known_ones(capsys: pytest.CaptureFixture[str]) -> None:
    assert cli.main(["sample", "crane"]) == 2
    assert "hoist_shaft, capstan_shaft, loft_column, quay_pile, tie_rod" in capsys.readouterr().err


@pytest.mark.parametrize(
    ("typed", "meant"),
    [
        ([], ["open"]),
        (["gate.barwright.json"], ["open", "gate.barwright.json"]),
        (["open", "check"], ["open", "check"]),
        (["check", "gate.barwright.json"], ["check", "gate.barwright.json"]),
        (["--version"], ["--version"]),
    ],
)
def test_the_word_open_may_be_left_out(typed: list[str], meant: list[str]) -> None:
    assert cli.with_command(typed) == meant


@pytest.mark.parametrize(
    ("typed", "sentence"),
    [
        ("chek", "There is no command or file chek; did you mean check?\n"),
        ("Schema", "There is no command or file Schema; did you mean schema?\n"),
        ("gate.barwright.json", "There is no command or file gate.barwright.json\n"),
        ("no\x1bsuch", "There is no command or file no\ufffdsuch\n"),
    ],
)
def test_a_word_that_is_neither_command_nor_file_opens_no_window(
    typed: str,
    sentence: str,
    monkeypatch: pytest.MonkeyPatch,
    tmp_path: Path,
    capsys: pytest.CaptureFixture[str],
) -> None:
    monkeypatch.chdir(tmp_path)
    monkeypatch.setattr(commands, "run_open", lambda options: pytest.fail(str(options)))
    assert cli.main([typed, "x"]) == 2
    assert capsys.readouterr() == ("", sentence)


def test_a_window_without_a_display_is_a_sentence(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.setattr(sys, "platform", "linux")
    for name in ("DISPLAY", "WAYLAND_DISPLAY", "QT_QPA_PLATFORM"):
        monkeypatch.delenv(name, raising=False)
    assert cli.main([]) == 2
    assert "no display" in capsys.readouterr().err


@pytest.mark.parametrize("command", ["", "open", "check", "sheet", "schema", "sample"])
def test_every_help_page_is_worth_reading(command: str, capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit) as end:
        cli.main([command, "--help"] if command else ["--help"])
    assert end.value.code == 0
    page = capsys.readouterr().out
    assert len(page.splitlines()) >= 5
    assert all(len(line) <= 100 for line in page.splitlines())


def test_the_version_is_the_one_of_the_package(capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit):
        cli.main(["--version"])
    name, number = capsys.readouterr().out.split()
    assert name == "barwright"
    assert all(part.isdigit() for part in number.split("."))


class TestLanguage:
    """The terminal speaks the environment's language, or the one that was asked for."""

    @pytest.fixture(autouse=True)
    def english_again(self) -> Iterator[None]:
        yield
        use_language("en")

    @pytest.mark.parametrize("asked", [["--language", "de"], ["--language=de"]])
    @pytest.mark.parametrize("behind", [True, False])
    def test_asked_for(self, asked: list[str], behind: bool, capsys: pytest.CaptureFixture[str]) -> None:
        rest = ["check", str(sample_path("tie_rod"))]
        assert cli.main([*rest, *asked] if behind else [*asked, *rest]) == 1
        said = capsys.readouterr().out
        assert "Nicht erfüllt" in said
        assert "D: 208 von 198 MPa auf Zug (1,05) bei 1380 mm, Storm surge" in said

    def test_of_the_environment(
        self, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
    ) -> None:
        monkeypatch.setenv("LANGUAGE", "de_DE")
        assert cli.main(["check", "--language=en", str(sample_path("tie_rod"))]) == 1
        assert "Does not pass" in capsys.readouterr().out
        assert cli.main(["check", "gone.json"]) == 2
        assert "keine solche Datei" in capsys.readouterr().err

    def test_of_the_help_and_of_a_slip(self, capsys: pytest.CaptureFixture[str]) -> None:
        with pytest.raises(SystemExit):
            cli.main(["check", "--help", "--language", "de"])
        assert "Aufruf: barwright check" in capsys.readouterr().out
        with pytest.raises(SystemExit):
            cli.main(["check", "--language", "de"])
        assert "Fehler: diese Argumente fehlen: DATEI" in capsys.readouterr().err

    @pytest.mark.parametrize("typed", [["--language", "tlh"], ["--language="], ["--language"]])
    def test_that_there_is_not(self, typed: list[str], capsys: pytest.CaptureFixture[str]) -> None:
        assert cli.main(["check", "x.json", *typed]) == 2
        assert "there are: en (English), de (Deutsch)" in capsys.readouterr().err

    def test_behind_two_dashes_it_is_a_file(self, capsys: pytest.CaptureFixture[str]) -> None:
        assert cli.main(["check", "--", "--language=de"]) == 2
        assert "--language=de cannot be used" in capsys.readouterr().err

    def test_the_results_file_has_none(self, capsys: pytest.CaptureFixture[str]) -> None:
        printed = []
        for code in LANGUAGES:
            cli.main(["check", "--json", "--language", code, *(str(sample_path(name)) for name in names())])
            printed.append(capsys.readouterr().out)
        assert printed[0] == printed[1] != ""

    def test_further_windows_speak_it_too(self, monkeypatch: pytest.MonkeyPatch) -> None:
        opened: list[object] = []
        door = ModuleType("app.gui.main")
        door.run = lambda path, language: opened.append(language) or 0  # type: ignore[attr-defined]
        monkeypatch.setitem(sys.modules, "app.gui.main", door)
        monkeypatch.setattr(subprocess, "Popen", lambda command: opened.append(command[-3:]))
        monkeypatch.setattr(qt_libraries, "missing_packages", lambda table: ())
        monkeypatch.setenv("QT_QPA_PLATFORM", "offscreen")
        assert cli.main(["open", "--language", "de", "a.json", "b.json"]) == 0
        assert opened == [["--language=de", "--", "b.json"], "de"]
