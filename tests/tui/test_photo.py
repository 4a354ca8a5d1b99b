"""The picture for documents: well-formed, with the text of the screen, dots drawn as shapes."""

from __future__ import annotations

from pathlib import Path
from xml.etree import ElementTree

from tui.photo import take

SVG = "{http://www.w3.org/2000/svg}"


async def test_the_picture_holds_text_and_dots_of_the_screen(tmp_path: Path) -> None:
    place = tmp_path / "stroke.svg"
    await take(place, (120, 36), ["f3"])
    tree = ElementTree.fromstring(place.read_text(encoding="utf-8"))
    texts = ["".join(item.itertext()) for item in tree.iter(f"{SVG}text")]
    assert any("Pressures" in text for text in texts)
    assert not any(0x2800 <= ord(char) <= 0x28FF for text in texts for char in text)
    assert len(list(tree.iter(f"{SVG}circle"))) > 300
    for item in tree.iter(f"{SVG}text"):
        assert len(item.attrib["x"].split()) == len("".join(item.itertext()))
