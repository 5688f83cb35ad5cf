"""Which cell a part of the drawing shows: there and back, runs of neighbours, loads by record."""

import pytest
from msgspec.structs import replace

from app.drawing.shapes import Part
from app.hand.cells import Cell, case_share, cell_of, cells_of, loads_behind, part_at, part_of
from app.shown import Shown
from solver.model import Combination, SegmentLoad
from tests.drawn_members import busy_member

MEMBER = busy_member(5)


@pytest.mark.parametrize(
    ("part", "cell"),
    [
        (Part("length", 2), Cell("segments", 2, "length")),
        (Part("section", 1), Cell("segments", 1, "section")),
        (Part("mark", 1), Cell("segments", 1, "mark")),
        (Part("warmth", 0), Cell("segments", 0, "heat")),
        (Part("bedding", 3), Cell("segments", 3, "bedding")),
        (Part("distributed", 3), Cell("segments", 3, "load_start")),
        (Part("distributed_end", 3), Cell("segments", 3, "load_end")),
        (Part("support", 0), Cell("joints", 0, "support")),
        (Part("force", 4), Cell("joints", 4, "force")),
        (Part("movement", 4), Cell("joints", 4, "movement")),
        (Part("gravity", 0), Cell("load_cases", 1, "gravity")),
    ],
)
def test_a_part_and_its_cell_lead_to_each_other(part, cell):
    assert cell_of(part, MEMBER, 1) == cell
    assert part_of(cell, MEMBER, 1) == part


def with_loads(*loads):
    case = replace(MEMBER.load_cases[0], segment_loads=loads)
    return replace(MEMBER, load_cases=(case, *MEMBER.load_cases[1:]))


def test_a_lack_of_fit_has_its_cell_in_the_record_that_holds_it():
    project = with_loads(SegmentLoad("S0", 5.0), SegmentLoad("S1", lack_of_fit=1e-3), SegmentLoad("S1", 3.0))
    assert cell_of(Part("fit", 1), project, 0) == Cell("segment_loads", 1, "lack_of_fit")
    assert part_of(Cell("segment_loads", 1, "lack_of_fit"), project, 0) == Part("fit", 1)
    assert loads_behind(Part("distributed", 1), project, 0) == (1, 2)


def test_no_single_cell_where_several_records_hold_it_or_no_case_is_edited():
    twice = with_loads(SegmentLoad("S1", lack_of_fit=1e-3), SegmentLoad("S1", lack_of_fit=2e-3))
    assert cell_of(Part("fit", 1), twice, 0) is None
    assert loads_behind(Part("fit", 1), twice, 0) == (0, 1)
    assert cell_of(Part("gravity", 0), MEMBER, None) is None


def test_a_label_holds_the_cells_of_its_neighbours_alike():
    warm = [SegmentLoad(f"S{i}", temperature_start=20.0) for i in (1, 2, 3)]
    project = with_loads(*warm)
    assert [cell.record for cell in cells_of(Part("warmth", 1), project, 0)] == [1, 2, 3]
    assert [cell.record for cell in cells_of(Part("warmth", 3), project, 0)] == [3]
    assert [cell.record for cell in cells_of(Part("length", 1), project, 0)] == [1]


def test_the_share_of_a_case_in_what_is_shown():
    project = replace(MEMBER, combinations=(Combination("Both", {MEMBER.load_cases[0].name: 1.5}),))
    assert case_share(project, Shown("case", MEMBER.load_cases[0].name), 0) == 1.0
    assert case_share(project, Shown("combination", "Both"), 0) == 1.5
    assert case_share(project, Shown("combination", "Both"), 1) == 0.0
    assert case_share(project, Shown("envelope"), 0) == 0.0


@pytest.mark.parametrize(
    ("place", "part"),
    [
        (("segments", 2, "length"), Part("length", 2)),
        (("segments", 2, "area"), Part("segment", 2)),
        (("segments", 2, "load_start", "load_cases", 0), Part("distributed", 2)),
        (("joints", 1, "support"), Part("support", 1)),
        (("load_cases", 1, "gravity"), Part("gravity", 0)),
        (("load_cases", 0, "segment_loads", 0, "lack_of_fit"), Part("fit", 1)),
        (("load_cases", 0, "segment_loads", 9, "segment"), None),
        (("load_cases", -1, "gravity"), None),  # of the row for a load, where there is no case yet
        (("materials", 0, "name"), None),
    ],
)
def test_a_draft_s_place_leads_to_the_part_that_shows_it(place, part):
    assert part_at(place, with_loads(SegmentLoad("S1", lack_of_fit=1e-3))) == part
