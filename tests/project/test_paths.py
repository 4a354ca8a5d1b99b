"""Paths into a document, and the lines they stand in."""

from __future__ import annotations

import re
import tomllib

import pytest

from actuator.errors import InputError
from actuator.project.document import demo, parse, template
from actuator.project.locate import line_of, lines
from actuator.project.paths import canonical, steps_of
from tests.project.samples import PATHS, sample, short


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
