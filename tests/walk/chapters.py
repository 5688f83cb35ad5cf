"""The whole walk, chapter by chapter."""

from __future__ import annotations

from app import samples
from tests.walk import loading, looking, proving, shaping
from tests.walk.hands import Hands
from tests.walk.steps import Steps


def walk(hands: Hands, steps: Steps, *, upright: bool = False) -> None:
    """Build the first sample."""
    sample = samples.read_sample(samples.FIRST)
    shaping.a_new_bar(hands, steps, sample)
    if upright:
        hands.pick(hands.window.top_bar.layout_picker, "Upright")
        steps.end("upright", "Lay: upright", undo="Lay")
    shaping.the_first_segments(hands, steps)
    shaping.the_worm(hands, steps)
    shaping.the_hollow_end(hands, steps)
    shaping.the_far_end(hands, steps)
    shaping.the_marks_in_order(hands, steps)
    for chapter in (
        loading.materials,
        loading.bearings,
        loading.hoisting,
        loading.running_warm,
        loading.braking_and_weight,
        proving.combinations,
        proving.limits,
        proving.findings,
        proving.against_before,
        looking.results_on_the_drawing,
        looking.near_and_far,
        looking.both_ways,
    ):
        chapter(hands, steps)
