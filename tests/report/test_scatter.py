"""Bands and sensitivity of an answer: the registry's figures, around the nominal, in every view."""

from __future__ import annotations

import csv
import io
import json
import subprocess
import sys
from collections.abc import Iterator

import pytest

from actuator.answer import Answer, work_out
from actuator.errors import Cancelled, Refusal
from actuator.project.document import demo
from actuator.report import scatter as room
from actuator.report.bands_view import Scatters, as_tree, chance
from actuator.report.csv_view import as_csv
from actuator.report.figures import FIGURES, At
from actuator.report.json_view import as_data, as_json
from actuator.report.scatter import Scatter, bands_of, scattered, sensitivity_of
from actuator.report.text import as_text
from actuator.scatter.bands import Band

STILL = (
    "extend.position_reached", "retract.position_reached", "rod.buckling_load", "rod.slenderness", "rod.overhang",
    "rod.sag", "rod.bearing_load", "cycle.upstream_share.compression",
)  # fmt: skip
"""Figures that none of the fields of the spread enters, whatever the cylinder, or that the end stop sets."""


@pytest.fixture(name="given", scope="module")
def _given() -> Answer:
    return work_out(demo())


@pytest.fixture(name="all_of", scope="module")
def _all_of(given: Answer) -> Scatters:
    assert given.analysis is not None
    places = [
        (number, index)
        for number, machine in enumerate(given.analysis.machines)
        for index in range(len(machine.actuators))
    ]
    return {place: bands_of(given, *place, samples=32, ledger=True, wait=True) for place in places}


def bands(scatter: Scatter) -> Iterator[tuple[str, Band]]:
    return ((key, band) for key, band in scatter.found.bands.items() if isinstance(band, Band))


@pytest.mark.parametrize("place", [(0, 0), (0, 1), (1, 0)])
def test_the_nominal_lies_within_the_bands(given: Answer, all_of: Scatters, place: tuple[int, int]) -> None:
    assert given.analysis is not None
    at = At(given.analysis, *place)
    seen = 0
    for key, band in bands(all_of[place]):
        nominal = FIGURES["actuator"][key].value(at)
        assert not isinstance(nominal, Refusal), key
        near = 2e-3 * abs(nominal) + 1e-4
        assert band.p05 - near <= nominal <= band.p95 + near, key
        assert band.p05 <= band.p50 <= band.p95
        seen += 1
    assert seen > 70


def test_every_figure_with_a_band_is_computed_anew(all_of: Scatters) -> None:
    """What does not move on any of the demo's cylinders is what cannot, or is nothing on all of them."""
    moved = {key for scatter in all_of.values() for key, band in bands(scatter) if band.p95 > band.p05}
    still = {key for scatter in all_of.values() for key, band in bands(scatter)} - moved
    nothing = {
        key for key in still if all(band.p95 == 0.0 for s in all_of.values() for k, band in bands(s) if k == key)
    }
    assert still - nothing <= set(STILL)


def test_the_ledger_s_figures_come_where_asked_for(given: Answer, all_of: Scatters) -> None:
    quick = bands_of(given, 0, 0, samples=8)
    assert set(quick.found.bands) == {figure.key for figure in scattered()}
    assert set(all_of[0, 0].found.bands) == {figure.key for figure in scattered(ledger=True)}
    assert "cycle.exergy.friction" not in quick.found.bands
    assert "cycle.exergy.friction" in all_of[0, 0].found.bands
    assert "extend.stroke_time" in quick.found.bands


def test_without_a_spread_the_bands_have_no_width() -> None:
    document = demo()
    for field in ("supply_pressure", "friction", "mass", "conductance", "delay"):
        document = document.edited(f"machine.1.actuator.1.spread.{field}", "0 bar" if field[0] == "s" else "0 %")
    given = work_out(document)
    assert given.analysis is not None
    found = bands_of(given, 0, 0, samples=8)
    for key, band in bands(found):
        nominal = FIGURES["actuator"][key].value(At(given.analysis, 0, 0))
        assert isinstance(nominal, float)
        assert band.p05 == pytest.approx(band.p95, rel=1e-12), key
        assert band.p50 == pytest.approx(nominal, rel=2e-3, abs=2e-2), key
    assert found.found.met == 1.0


def test_progress_is_told_and_the_last_is_returned(given: Answer) -> None:
    told: list[Scatter] = []
    found = bands_of(given, 0, 0, progress=told.append, samples=32)
    assert told[-1] is found
    assert [item.found.samples for item in told] == sorted(item.found.samples for item in told)


def test_it_can_be_cancelled(given: Answer) -> None:
    with pytest.raises(Cancelled, match="cancelled"):
        bands_of(given, 0, 0, lambda: True)
    with pytest.raises(Cancelled, match="cancelled"):
        sensitivity_of(given, 0, 0, "extend.end_energy", lambda: True)


def test_an_interpreted_kernel_gets_fewer_samples_and_says_so(given: Answer, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(room, "pick_engine", lambda _: (None, False))
    monkeypatch.setattr(room, "FEW", 2)
    found = bands_of(given, 1, 0)
    assert (found.engine, found.found.samples) == ("interpreted", 2)
    assert found.remarks == ("2 samples in place of 128: the kernel is not compiled, so P5 and P95 are rough",)


def test_sensitivity_of_a_figure_in_closed_form(given: Answer) -> None:
    """Theoretical force: 21 % for a tenth more bore, 5 % for 0.3 bar on 6 bar gauge."""
    assert given.analysis is not None
    force = given.analysis.machines[0].actuators[0].static.theoretical_extend
    first, second, third, *others = sensitivity_of(given, 0, 0, "static.theoretical_extend")
    assert (first.path, second.path, third.path) == ("bore", "machine.supply_pressure", "spread.supply_pressure")
    assert (first.change, third.change) == pytest.approx((0.21 * force, 0.05 * force))
    assert {step.change for step in others} == {0.0}


def test_sensitivity_of_a_simulated_figure(given: Answer) -> None:
    """Meter-out, extending: the needle that acts then moves the time, the other one does not."""
    steps = {step.path: step.change for step in sensitivity_of(given, 0, 0, "extend.stroke_time")}
    needle, other = steps["throttle.extend_c"], steps["throttle.retract_c"]
    assert isinstance(needle, float)
    assert isinstance(other, float)
    assert needle < -0.02
    assert abs(other) < 0.02 * abs(needle)
    for delay in (steps["spread.delay"], steps["valve.delay"]):
        assert delay == pytest.approx(0.003 if delay == steps["spread.delay"] else 0.0015, rel=2e-2)


def test_figures_without_a_band_have_no_sensitivity(given: Answer) -> None:
    with pytest.raises(LookupError, match=r"worst\.slow\.extend\.stroke_time has no sensitivity"):
        sensitivity_of(given, 0, 0, "worst.slow.extend.stroke_time")


def test_bands_in_json_csv_and_text_are_the_same(given: Answer, all_of: Scatters) -> None:
    assert given.analysis is not None
    data = as_data(given, scatters=all_of)
    assert json.loads(as_json(data)) == data
    rows = {
        (row["machine"], row["actuator"], row["figure"]): row
        for row in csv.DictReader(io.StringIO(as_csv(given.analysis, all_of)))
    }
    text = as_text(given, scatters=all_of)
    for number, machine in enumerate(data["machines"]):
        for index, actuator in enumerate(machine["actuators"]):
            scatter = all_of[number, index]
            assert actuator["scatter"]["samples"] == 32
            assert actuator["scatter"]["all_met"] == scatter.found.met
            for key, band in bands(scatter):
                row = rows[machine["name"], actuator["name"], key]
                expected = {"p05": band.p05, "p50": band.p50, "p95": band.p95}
                assert {name: actuator["bands"][key][name] for name in expected} == expected
                assert {name: float(row[name]) for name in expected} == expected
            assert chance(scatter).split(" (")[0] in " ".join(text.split())
    assert rows["Tray packer", "", "demand.mean"]["p05"] == ""
    assert max(len(line) for line in text.splitlines()) <= 100


def test_without_bands_the_views_do_not_speak_of_them(given: Answer) -> None:
    assert given.analysis is not None
    assert "bands" not in as_data(given)["machines"][0]["actuators"][0]
    assert "p05" not in as_csv(given.analysis)
    assert "Tolerance bands" not in as_text(given)


def test_a_figure_that_is_often_missing_is_refused_in_all_views() -> None:
    """Against a force that the low pressures do not overcome."""
    document = demo().edited("machine.1.actuator.1.load.extend_force", "640 N")
    given = work_out(document)
    assert given.analysis is not None
    found = bands_of(given, 0, 0, samples=32)
    lost = found.found.bands["extend.stroke_time"]
    assert isinstance(lost, Refusal)
    assert lost.reason.startswith("in ")
    assert as_tree(found)["bands"]["extend.stroke_time"] == {"refused": lost.reason}
    text = " ".join(as_text(given, scatters={(0, 0): found}).split())
    assert lost.reason in text
    assert found.found.met != 1.0


def test_a_document_with_problems_has_no_bands() -> None:
    broken = work_out(demo().edited("machine.1.actuator.1.bore", "fifty mm"))
    with pytest.raises(LookupError, match="the document has problems"):
        bands_of(broken, 0, 0)


def test_what_bands_need_can_be_imported_before() -> None:
    code = "import sys\nfrom actuator.report.scatter import warm_up\nprint('scipy.stats' in sys.modules)\nwarm_up()\n"
    code += "print('scipy.stats' in sys.modules)"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.split() == ["False", "True"]
