"""The clearance of a stop in the hand. It is far too small to be drawn to scale, so a pull counts as with a
load: `FULL` pixels are the clearance itself, outward is more.
"""

from __future__ import annotations

from typing import Final

from msgspec.structs import replace

from app import edits
from app.hand.grip import Grip
from app.hand.loads import FULL
from app.units import input_text, symbol
from app.words import tr
from solver.model import Project, StopSupport, supports_of

USUAL: Final = 2e-4  # m, where no stop of the member has a clearance to go by


def stop_grip(project: Project, joint: int, number: int) -> Grip:
    """The clearance of one of a joint's supports, which is a stop."""
    at, system = project.joints[joint], project.display.unit_system
    supports = supports_of(at)
    stop = supports[number]
    assert isinstance(stop, StopSupport)  # noqa: S101 - only stops have such a handle
    rate = (stop.clearance or _largest_clearance(project) or USUAL) / FULL

    def put(value: float) -> Project:
        fresh = (*supports[:number], replace(stop, clearance=value), *supports[number + 1 :])
        return edits.hold_joint(project, joint, fresh)

    def tell(value: float) -> str:
        words = tr("Stop {sign} at joint {mark}: gap {value} {unit}")
        text, unit = input_text(value, "displacement", system), symbol("displacement", system)
        return words.format(sign="+" if stop.side == "plus" else "−", mark=at.mark, value=text, unit=unit)

    return Grip(
        name=tr("Gap of the stop at joint {mark}").format(mark=at.mark),
        quantity="displacement",
        system=system,
        value=stop.clearance,
        at=lambda pixels: stop.clearance + rate * pixels,
        put=put,
        tell=tell,
        least=0.0,
    )


def _largest_clearance(project: Project) -> float:
    stops = (s for joint in project.joints for s in supports_of(joint) if isinstance(s, StopSupport))
    return max((stop.clearance for stop in stops), default=0.0)
