"""The recorded walk: the first sample built by hand on the window, with nothing left to wish at any step."""

from __future__ import annotations

from itertools import pairwise

from msgspec.structs import replace
from PySide6.QtGui import QImage

from app import project_file, samples
from tests.walk import shaping
from tests.walk.camera import Camera
from tests.walk.chapters import walk
from tests.walk.hands import Hands
from tests.walk.steps import Steps

BEFORE_LOADS, BEFORE_LIMIT, STABLE = "force-put-on", "limit-begun", "stability"


def test_the_hand_builds_the_first_sample(window):
    steps = Steps(window)
    walk(Hands(window), steps)  # undo names and current results are asserted at each step
    built, sample = window.document.project, samples.read_sample(samples.FIRST)
    assert window.document.snapshot.drafts == {}
    assert built == sample
    # The sample's file has a checker who is not named yet; the form writes no text that was left alone.
    assert project_file.dump(built) == project_file.dump(replace(sample, sheet=built.sheet))
    names = [step.name for step in steps.done]
    assert len(set(names)) == len(names)
    assert [step.name for step in steps.done if not step.current] == ["length-wrong"]
    seen = {step.name: step.headline for step in steps.done}
    for name in names[: names.index(BEFORE_LOADS)]:
        assert seen[name] == "Nothing checked", name
    for name in names[names.index(BEFORE_LOADS) : names.index(STABLE)]:
        allowed = ("Does not pass",) if name == BEFORE_LIMIT else ("Passes", "No check fails")
        assert seen[name].startswith(allowed), name
    for name in names[names.index(STABLE) :]:
        assert seen[name].startswith("Passes"), name
    for one, other in pairwise(steps.done):
        if one.undo != other.undo:
            assert other.undo is not None, f"{other.name} lost the undo of {one.name}"


def test_a_picture_is_taken_of_each_step(window, tmp_path):
    hands = Hands(window)
    steps = Steps(window, Camera(tmp_path, hands))
    shaping.a_new_bar(hands, steps, samples.read_sample(samples.FIRST))
    pictures = sorted(tmp_path.glob("*.png"))
    assert [path.stem[3:] for path in pictures] == [step.name for step in steps.done]
    assert all(QImage(str(path)).size() == window.size() for path in pictures)
    page = (tmp_path / "index.html").read_text("utf-8")
    assert all(path.name in page for path in pictures)
