"""The pack as a whole: its list, its fingerprint, its sheet, and that it is the same every time."""

import hashlib
import re
import shutil
import subprocess
import xml.etree.ElementTree as ElementTree
from html.parser import HTMLParser

import ezdxf

# Elements of HTML that have no end tag: HTML Living Standard, "void elements", from memory.
VOID = {"area", "base", "br", "col", "embed", "hr", "img", "input", "link", "meta", "source", "track", "wbr"}


def files_below(folder):
    return {str(p.relative_to(folder)): p.read_bytes() for p in folder.rglob("*") if p.is_file()}


def test_manifest_lists_every_file_and_no_other(pack):
    listed = [entry["path"] for entry in pack.manifest["files"]]
    assert len(listed) == len(set(listed))
    assert set(listed) | {"pack.json"} == set(files_below(pack.folder))


def test_manifest_digests(pack):
    for entry in pack.manifest["files"]:
        digest = hashlib.sha256((pack.folder / entry["path"]).read_bytes()).hexdigest()
        assert digest == entry["sha256"], entry["path"]


def test_manifest_is_what_the_build_answered(pack):
    # `out` differs: the manifest must not change with the place where the pack was built.
    def without_place(answer):
        return {key: value for key, value in answer.items() if key not in ("out", "checks")}

    assert without_place(pack.manifest) == without_place(pack.answer)
    assert pack.manifest["passed"] is True
    assert pack.manifest["design"] == pack.design.name


def test_two_builds_are_the_same_bytes(pack, run, tmp_path):
    run("build", pack.design.path, "--out", tmp_path / "again", "--format", "json")
    assert files_below(tmp_path / "again") == files_below(pack.folder)


def test_fingerprint_on_everything(pack):
    mark = pack.fingerprint
    assert re.fullmatch(r"[0-9a-f]{4}-[0-9a-f]{4}", mark)
    for path in pack.paths("dxf"):
        words = [e.dxf.text for e in ezdxf.readfile(path).modelspace().query("TEXT")]
        assert any(mark in text for text in words), path.name
    for path in pack.paths("svg"):
        assert mark in " ".join(ElementTree.parse(path).getroot().itertext()), path.name
    for path in pack.paths("stl"):
        assert mark.encode() in path.read_bytes()[:80], path.name
    for path in pack.paths("html"):
        assert mark in path.read_text(encoding="utf-8"), path.name


def test_fingerprint_on_every_printed_page(pack):
    """Sheets of two revisions come apart on the bench: each page must tell which it belongs to."""
    for path in pack.paths("pdf"):
        text = subprocess.run(["pdftotext", "-layout", path, "-"], capture_output=True, text=True, check=True).stdout
        pages = text.split("\f")[:-1]
        without = [number for number, page in enumerate(pages, 1) if pack.fingerprint not in page]
        assert without == [], f"{path.name}: pages without the fingerprint"


def test_a_changed_shape_changes_the_fingerprint(pack, run, tmp_path):
    text = pack.design.path.read_text(encoding="utf-8")
    changed, count = re.subn(r'(?m)^chord = "([\d.]+)', lambda m: f'chord = "{float(m[1]) + 0.01:.2f}', text, count=1)
    assert count == 1
    # A design may name others that lie beside it.
    shutil.copytree(pack.design.path.parent, tmp_path / "beside", ignore=shutil.ignore_patterns("pack*"))
    path = tmp_path / "beside" / pack.design.path.name
    path.write_text(changed, encoding="utf-8")
    assert run("check", path, "--format", "json")["fingerprint"] != pack.fingerprint


def test_no_trace_of_the_machine(pack):
    """Nothing of the place or the day of the build: it would differ on another machine."""
    for path in (p for p in pack.folder.rglob("*") if p.is_file()):
        data = path.read_bytes()
        for place in (str(pack.folder), str(pack.design.path.parent)):
            assert place.encode() not in data, path.name


class Tags(HTMLParser):
    """Follows the tags of a page and notes those that do not match and what they refer to."""

    def __init__(self):
        super().__init__()
        self.open, self.faults, self.references, self.ids = [], [], [], []

    def handle_starttag(self, tag, attributes):
        if tag not in VOID:
            self.open.append(tag)
        self.note(attributes)

    def handle_startendtag(self, tag, attributes):
        self.note(attributes)

    def handle_endtag(self, tag):
        if not self.open or self.open.pop() != tag:
            self.faults.append(tag)

    def note(self, attributes):
        for name, value in attributes:
            if name in ("src", "href", "xlink:href", "action", "data", "srcset", "poster"):
                self.references.append(value)
            self.references += re.findall(r"url\(([^)]*)\)", value or "")
            if name == "id":
                self.ids.append(value)


def sheet(pack) -> tuple[str, Tags]:
    text = (pack.folder / "sheet.html").read_text(encoding="utf-8")
    tags = Tags()
    tags.feed(text)
    tags.close()
    return text, tags


def test_sheet_is_whole(pack):
    text, tags = sheet(pack)
    assert text.startswith("<!DOCTYPE html>")
    assert (tags.faults, tags.open) == ([], [])
    assert len(tags.ids) == len(set(tags.ids)), "an id is used twice"


def test_sheet_fetches_nothing(pack):
    text, tags = sheet(pack)
    inside = {entry["path"] for entry in pack.manifest["files"]}
    assert [r for r in tags.references if not r.startswith("#") and r not in inside] == []
    assert "<script" not in text and "@import" not in text and "<link" not in text
    # The names of XML name spaces are no addresses: nothing is fetched from them.
    assert set(re.findall(r"https?://[^\s\"'<>]+", text)) <= {"http://www.w3.org/2000/svg"}


def test_pictures_of_the_sheet_are_well_formed(pack):
    text, _ = sheet(pack)
    pictures, depth, start = [], 0, 0
    # A page within its picture is a picture of its own.
    for tag in re.finditer(r"<svg\b|</svg>", text):
        start = tag.start() if depth == 0 else start
        depth += -1 if tag[0] == "</svg>" else 1
        if depth == 0:
            pictures.append(text[start:tag.end()])
    # The planform, every station, the lift curves, and a pressure curve for at least one section.
    assert len(pictures) >= len(pack.design.templates) + 3
    for picture in pictures:
        root = ElementTree.fromstring(picture)
        assert root.tag == "{http://www.w3.org/2000/svg}svg"
        assert len(list(root.iter())) > 3
        assert not re.search(r"\b(NaN|inf)\b", picture)


def test_sheet_names_every_other_file(pack):
    text, _ = sheet(pack)
    missing = [e["path"] for e in pack.manifest["files"] if e["kind"] != "html" and e["path"] not in text]
    assert missing == []
