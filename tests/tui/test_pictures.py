"""Plots of cylinders whose sides are not both filled with air, and of several in parallel."""

from __future__ import annotations

import numpy as np
import pytest

from actuator.answer import work_out
from actuator.project.document import demo
from tui.pictures import pictures
from tui.shown import View
from tui.widgets.chart import draw

STOPPER = View(answer=work_out(demo()), machine=1, actuator=1)


def test_a_side_that_takes_no_air_has_a_loop_and_no_ideal_diagram() -> None:
    found = pictures(STOPPER)
    assert [curve.name for curve in found["cap"].curves] == ["ideal", "simulated"]
    assert [curve.name for curve in found["rod"].curves] == ["simulated"]
    assert set(found["rod"].curves[0].y.round(9)) == {0.0}  # bar gauge: open to the atmosphere


@pytest.mark.parametrize("size", [(12, 4), (60, 14)])
def test_every_plot_of_a_single_acting_cylinder_can_be_drawn(size: tuple[int, int]) -> None:
    for picture in pictures(STOPPER).values():
        assert len(draw(picture, *size, "braille").rows) == size[1]


def test_the_ideal_diagram_of_several_in_parallel_is_as_large_as_their_loop() -> None:
    document = demo().edited("machine.2.actuator.2.count", "3")
    ideal, simulated = pictures(View(answer=work_out(document), machine=1, actuator=1))["cap"].curves
    # the bore's area times the stroke, and a tenth of the bore times it, three times: π/4·32²·28.2 mm³
    assert ideal.x.max() == pytest.approx(3 * np.pi / 4 * 3.2**2 * 2.82, rel=1e-9)
    assert simulated.x.max() == pytest.approx(ideal.x.max(), rel=1e-9)
