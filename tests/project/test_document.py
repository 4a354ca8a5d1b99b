"""Edits on top of the text: typed text verbatim, comments kept, files whole."""

from __future__ import annotations

import re
import tomllib
from contextlib import suppress
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from actuator.errors import InputError
from actuator.project.document import Document, demo, parse, template
from actuator.project.locate import lines
from actuator.project.paths import steps_of
from actuator.project.schema import SheetField, sheet
from actuator.project.validate import validate
from tests.project.samples import PATHS, SAMPLE, SHORT, sample, short

TYPED = st.sampled_from(
    ["", "50 mm", "6 bar gauge", "0.30", "12", "-0", "1e3", "007", " 5 mm ", 'a "b" \\ c', "[1, 2]"]
)
LISTS = st.sampled_from(['[{ from = "1 mm", to = "2 mm", force = "3 N" }]', "[]", "{}", "[{", "[[1], {a = 1}]"])
TEXTS = TYPED | LISTS | st.text(max_size=30)
EDITS = st.lists(st.tuples(st.sampled_from(PATHS), TEXTS), max_size=6)


def comments(text: str) -> list[str]:
    """Comments of a document whose strings hold no number sign."""
    return re.findall(r"#.*", text)


def test_an_edit_leaves_the_rest_as_it_stands() -> None:
    edited = sample().edited("machine.actuator.bore", "63 mm").to_toml()
    assert edited == SAMPLE.replace('bore = "50 mm"', 'bore = "63 mm"')


def test_the_comment_beside_an_edited_value_stays() -> None:
    edited = sample().edited("machine.actuator.load.mass", "21 kg").to_toml()
    assert edited == SAMPLE.replace('mass = "20 kg"  ', 'mass = "21 kg"  ')


def test_numbers_stay_as_typed() -> None:
    edited = sample().edited("machine.actuator.valve.supply_b", "0.250")
    assert edited.to_toml() == SAMPLE.replace("supply_b = 0.30", "supply_b = 0.250")
    assert parse(edited.to_toml()).text("machine.actuator.valve.supply_b") == "0.250"
    assert sample().text("machine.actuator.valve.exhaust_b") == "0.30"
    assert sample().text("machine.quantity") == "1"


def test_yes_and_no_stand_without_quotes() -> None:
    path = "machine.actuator.holding.supply_check"
    edited = sample().edited(path, "true")
    assert edited.to_toml() == SAMPLE.replace("supply_check = false", "supply_check = true")
    assert edited.text(path) == parse(edited.to_toml()).text(path) == "true"
    assert sample().text(path) == "false"


def test_a_missing_table_is_made_where_people_would_write_it() -> None:
    edited = short().edited("machine.actuator.2.throttle.kind", "meter-out").to_toml()
    added = edited.removeprefix(SHORT)
    assert added == '\n[machine.actuator.throttle]\nkind = "meter-out"\n'
    compressor = short().edited("plant.compressor.1.stages", "2").to_toml().removeprefix(SHORT)
    assert compressor.strip() == "[[plant.compressor]]\nstages = 2"


def test_a_table_is_made_for_the_actuator_that_was_meant() -> None:
    document = short().edited("machine.actuator.1.throttle.kind", "none")
    again = parse(document.to_toml())
    assert again.text("machine.actuator.1.throttle.kind") == "none"
    assert again.text("machine.actuator.2.throttle.kind") == ""


def test_empty_text_leaves_the_key_out() -> None:
    document = sample().edited("machine.actuator.throttle.free_c", "")
    assert "free_c" not in document.to_toml()
    assert document.text("machine.actuator.throttle.free_c") == ""
    assert document.edited("machine.actuator.throttle.free_c", "3 dm3/(s*bar)").tree() == sample().tree()


def test_comments_stay_where_a_dotted_key_goes() -> None:
    source = SHORT.replace('bore = "50 mm"', 'bore = "50 mm" # wide enough')
    without = parse(source).edited("machine.actuator.1.valve.supply_c", "")
    assert without.to_toml() == source.replace('valve.supply_c = "2 dm3/(s*bar)"\n', "")
    forces = '[{from = "1 mm",  to = "2 mm", force = "3 N"}]'
    listed = parse(source).edited("machine.actuator.1.load.process_force", forces).to_toml()
    assert "# wide enough" in listed
    assert f"process_force = {forces}\n" in listed


def test_the_later_edit_holds_and_an_edit_of_the_whole_ends_those_of_its_parts() -> None:
    whole = "machine.1.actuator.1.load.process_force"
    document = sample().edited(whole + ".1.force", "1 N").edited(whole + ".2.force", "2 N")
    assert document.text(whole).endswith('{ force = "2 N" }]')
    document = document.edited(whole, '[{force = "5 N"}]')
    assert document.text(whole) == '[{force = "5 N"}]'
    assert list(document.edits) == [whole]
    assert document.edited(whole + ".1.to", "9 mm").text(whole) == '[{ force = "5 N", to = "9 mm" }]'


def test_an_edit_gives_another_document() -> None:
    first = sample()
    second = first.edited("title", "Other")
    assert (first.text("title"), second.text("title")) == ("Carton line, hall B", "Other")
    assert first.tree()["title"] == "Carton line, hall B"
    assert first != second
    assert second.edited("title", "Carton line, hall B").tree() == first.tree()


def test_text_that_looks_like_a_number_stays_text_in_a_name() -> None:
    document = short().edited("machine.actuator.1.name", "12")
    assert 'name = "12"' in document.to_toml()
    assert document.text("machine.actuator.1.name") == "12"


def filled(value: object) -> object:
    """A tree without its empty tables."""
    if isinstance(value, list):
        return [filled(item) for item in value]
    if not isinstance(value, dict):
        return value
    return {key: inside for key, item in value.items() if (inside := filled(item)) != {}}


def with_edits(document: Document, edits: list[tuple[str, str]]) -> Document:
    """The document with all edits that lead somewhere."""
    for path, text in edits:
        with suppress(InputError):  # a list or table was typed over, or there is no second actuator
            document = document.edited(path, text)
    return document


@settings(deadline=None, max_examples=150)
@given(st.sampled_from([sample(), short(), demo(), parse(template("us"))]), EDITS)
def test_edits_survive_the_file_with_every_value_and_comment(document: Document, edits: list[tuple[str, str]]) -> None:
    edited = with_edits(document, edits)
    again = parse(edited.to_toml())
    assert again.broken is None
    assert filled(again.tree()) == filled(edited.tree())
    for path, text in edited.edits.items():
        assert again.text(path) == edited.text(path) or text.strip()[:1] in ("[", "{")
    if all(text and text.strip()[:1] not in ("[", "{") for _, text in edits):
        kept = edited.to_toml()
        assert all(comment in kept for comment in comments(document.source))


@settings(deadline=None, max_examples=200)
@given(EDITS)
def test_no_text_in_any_field_raises(edits: list[tuple[str, str]]) -> None:
    checked = validate(with_edits(demo(), edits))
    if isinstance(checked, tuple):
        assert checked
        assert all(problem.path and problem.allowed and str(problem) for problem in checked)


NUMBERS = [row for group in sheet(1, 1) for row in group.fields if row.kind is not None]


@settings(deadline=None, max_examples=300)
@given(st.lists(st.tuples(st.sampled_from(NUMBERS), st.integers(-330, 330), st.sampled_from("19")), max_size=4))
def test_no_size_of_a_number_raises(typed: list[tuple[SheetField, int, str]]) -> None:
    edits = []
    for row, power, digit in typed:
        unit = re.sub(r"^[0-9. ]+", "", row.example)
        edits.append((row.path, f"{digit}e{power} {unit}".strip()))
    checked = validate(with_edits(short(), edits))
    assert not isinstance(checked, tuple) or checked


VALUES = st.recursive(
    st.none() | st.booleans() | st.integers() | st.floats() | st.text(max_size=5),
    lambda inner: st.lists(inner, max_size=3) | st.dictionaries(st.text(max_size=4), inner, max_size=3),
    max_leaves=6,
)


@settings(deadline=None, max_examples=200)
@given(st.sampled_from([path for path in PATHS if ".2." not in path]), VALUES, st.integers(1, 5))
def test_no_shape_of_a_document_raises(path: str, value: object, depth: int) -> None:
    """Anything TOML can hold, put anywhere into the tree, gives problems and nothing worse."""
    document = parse(SAMPLE + "\n[[plant.compressor]]\n[money]\n")
    here: object = document.tree()
    steps = steps_of(path)[: depth + 1]
    for step in steps[:-1]:
        here = here[step - 1] if isinstance(step, int) else here.setdefault(step, {})  # type: ignore[index,attr-defined]
    here[steps[-1] - 1 if isinstance(steps[-1], int) else steps[-1]] = value  # type: ignore[index]
    checked = validate(document)
    assert not isinstance(checked, tuple) or checked


@settings(deadline=None, max_examples=300)
@given(st.text(max_size=60) | st.text(alphabet='[]{}"=.#\n ab1', max_size=40))
def test_any_text_opens(text: str) -> None:
    document = parse(text)
    assert isinstance(validate(document), tuple)
    assert document.to_toml() == text
    if document.broken is None:
        assert tomllib.loads(text) == document.tree() or "nan" in text
        assert all(1 <= line <= text.count("\n") + 1 for line in lines(text).values())


def test_a_broken_document_takes_no_edit_and_keeps_its_text(tmp_path: Path) -> None:
    document = parse('format = 1\nbore = "50\n')
    with pytest.raises(InputError, match=r"line 2: document: .* is not TOML"):
        document.edited("title", "x")
    assert document.saved(tmp_path / "a.toml").source == 'format = 1\nbore = "50\n'
