"""Edits on top of the text: typed text verbatim, comments kept, files whole."""

from __future__ import annotations

import os
import re
import tomllib
from contextlib import suppress
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from actuator.errors import InputError
from actuator.project.document import Document, demo, load, parse, template
from actuator.project.locate import line_of, lines
from actuator.project.paths import canonical, steps_of
from actuator.project.schema import SheetField, sheet
from actuator.project.validate import validate
from tests.project.samples import SAMPLE, SHORT, sample, short

PATHS = [row.path for actuator in (1, 2) for group in sheet(1, actuator) for row in group.fields]
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


@pytest.mark.parametrize(
    ("path", "message"),
    [
        ("machine.2.cycle_time", "there is only 1 of machine"),
        ("machine.1.actuator.3.bore", "there are only 2 of machine.1.actuator"),
        ("machine.1.actuator.bore", 'say which of machine.1.actuator by number or name: 1 "Pusher", 2 "Lift 1.5"'),
        ("machine.1.actuator.Gripper.bore", "say which of machine.1.actuator by number or name"),
        ("machine.0.name", "numbers count from 1"),
        ("machine.1.name.x", "machine.1.name holds a value, not a table"),
        ("machine..name", "is no path; write keys, numbers or quoted names with dots between"),
        ("machine.", "is no path"),
        ("", "is no path"),
        ("a b", "is no path"),
        ('machine."Packer', "is no path"),
    ],
)
def test_a_path_that_leads_nowhere_is_refused(path: str, message: str) -> None:
    with pytest.raises(InputError, match=re.escape(message)):
        short().edited(path, "x")


@pytest.mark.parametrize(
    ("path", "numbered"),
    [
        ("machine.cycle_time", "machine.1.cycle_time"),
        ("machine.Packer.cycle_time", "machine.1.cycle_time"),
        ('machine."Packer".actuator.Pusher.bore', "machine.1.actuator.1.bore"),
        ('machine.1.actuator."Lift 1.5".bore', "machine.1.actuator.2.bore"),
        ("machine.actuator.'Lift 1.5'.load.mass", "machine.1.actuator.2.load.mass"),
        (" machine . 1 . name", "machine.1.name"),
        ("machine.actuator.2.load.process_force.force", "machine.1.actuator.2.load.process_force.1.force"),
        ("plant.compressor.stages", "plant.compressor.1.stages"),
        ("site.ambient_pressure", "site.ambient_pressure"),
        ("machine", "machine"),
        ('"two words".x', '"two words".x'),
    ],
)
def test_names_and_left_out_numbers_become_numbers(path: str, numbered: str) -> None:
    assert canonical(path, short().tree()) == numbered
    assert canonical(numbered, short().tree()) == numbered


def test_a_name_that_is_also_a_key_or_a_number_is_meant_in_quotes() -> None:
    tree = {"machine": [{"name": "hours"}, {"name": "1"}]}
    assert canonical('machine."1".hours', tree) == "machine.2.hours"
    assert canonical("machine.1.hours", tree) == "machine.1.hours"
    assert canonical("machine.hours.hours", tree) == "machine.1.hours"
    assert canonical("machine.hours", {"machine": [{"name": "hours"}]}) == "machine.1.hours"
    assert canonical('machine."hours".hours', {"machine": [{"name": "hours"}]}) == "machine.1.hours"


def test_a_name_that_two_have_is_refused() -> None:
    tree = {"machine": [{"name": "A"}, {"name": "A"}]}
    with pytest.raises(InputError, match='more than one of machine has the name "A"; write a number'):
        canonical("machine.A.hours", tree)


def test_saving_is_whole_keeps_the_mode_and_leaves_nothing_else(tmp_path: Path) -> None:
    path = tmp_path / "line.toml"
    path.write_text(SAMPLE, encoding="utf-8")
    path.chmod(0o640)
    saved = load(path).edited("title", "Größe ✓").saved(path)
    assert path.read_text(encoding="utf-8") == saved.source
    assert saved.edits == {}
    assert saved.path == path
    assert load(path).text("title") == "Größe ✓"
    assert path.stat().st_mode & 0o777 == 0o640
    assert [each.name for each in tmp_path.iterdir()] == ["line.toml"]


def test_saving_through_a_link_writes_what_it_points_to(tmp_path: Path) -> None:
    path, link = tmp_path / "line.toml", tmp_path / "link.toml"
    path.write_text(SAMPLE, encoding="utf-8")
    link.symlink_to(path)
    load(link).edited("title", "Other").saved(link)
    assert link.is_symlink()
    assert load(path).text("title") == "Other"


def test_a_save_that_fails_leaves_the_old_file(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    path = tmp_path / "line.toml"
    path.write_text(SAMPLE, encoding="utf-8")

    def full(descriptor: int) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(os, "fsync", full)
    with pytest.raises(OSError, match="No space left"):
        load(path).edited("title", "Other").saved(path)
    assert path.read_text(encoding="utf-8") == SAMPLE
    assert [each.name for each in tmp_path.iterdir()] == ["line.toml"]


def test_line_ends_and_bytes_that_are_no_text_go_back_as_they_were(tmp_path: Path) -> None:
    path = tmp_path / "line.toml"
    windows = SHORT.replace("\n", "\r\n").encode()
    path.write_bytes(windows)
    load(path).edited("machine.actuator.1.bore", "63 mm").saved(path)
    assert path.read_bytes() == windows.replace(b"50 mm", b"63 mm")
    broken = b'format = 1\ntitle = "\xff"\n'
    path.write_bytes(broken)
    document = load(path)
    assert document.broken is not None
    assert (document.broken.line, document.broken.allowed) == (2, "must be UTF-8 text")
    document.saved(path)
    assert path.read_bytes() == broken


def test_a_mark_of_byte_order_is_read_over(tmp_path: Path) -> None:
    path = tmp_path / "line.toml"
    path.write_bytes(b"\xef\xbb\xbf" + SHORT.encode())
    assert load(path).tree() == short().tree()


def test_every_key_of_a_document_has_its_line() -> None:
    for document in (sample(), short(), demo(), parse(template("si"))):
        rows = document.source.splitlines()
        found = lines(document.source)
        keys = [steps for steps in found if steps and isinstance(steps[-1], str)]
        assert len(keys) > 15
        for steps in keys:
            assert str(steps[-1]) in rows[found[steps] - 1]
        for path in (path for path in PATHS if document.text(path)):
            assert path.rpartition(".")[2] in rows[line_of(document.source, steps_of(path)) - 1]


def test_lines_are_found_among_all_that_toml_allows() -> None:
    source = '''\
# comment with [brackets] and "quotes"
a = """one
two # no comment
"""   # comment
"b c".'d' = [ # list
  1, # one
  { e = "}", f = [2, 3] },
]
[t."u v"] # table
g = \'\'\'x'y''z\'\'\'
[[l]]
h = 1979-05-27 07:32:00
[[l]]
h = -inf
i = "\\"#"
j = []
[l.m]
k = { }
'''
    tomllib.loads(source)
    assert lines(source) == {
        ("a",): 2,
        ("b c",): 5,
        ("b c", "d"): 5,
        ("b c", "d", 1): 6,
        ("b c", "d", 2): 7,
        ("b c", "d", 2, "e"): 7,
        ("b c", "d", 2, "f"): 7,
        ("b c", "d", 2, "f", 1): 7,
        ("b c", "d", 2, "f", 2): 7,
        ("t", "u v"): 9,
        ("t", "u v", "g"): 10,
        ("l",): 11,
        ("l", 1): 11,
        ("l", 1, "h"): 12,
        ("l", 2): 13,
        ("l", 2, "h"): 14,
        ("l", 2, "i"): 15,
        ("l", 2, "j"): 16,
        ("l", 2, "m"): 17,
        ("l", 2, "m", "k"): 18,
    }
