"""What happens to a pack when the run that writes it is killed, when two run at once, and to the program when its input is rubbish."""

import hashlib
import json
import os
import random
import signal
import subprocess
import time
from concurrent.futures import ThreadPoolExecutor

import pytest

from conftest import ROOT, binary

DESIGN = (ROOT / "tests/outside/designs/large-fin.toml").read_text(encoding="utf-8")


def build(folder, *arguments):
    return subprocess.run([binary(), "build", "design.toml", "--out", "pack", *arguments], cwd=folder,
                          capture_output=True, text=True)


def is_whole(folder):
    """Every file that the manifest names is there, as it says, and no other."""
    manifest = json.loads((folder / "pack/pack.json").read_text(encoding="utf-8"))
    named = {file["path"]: file["sha256"] for file in manifest["files"]}
    found = {str(path.relative_to(folder / "pack")): hashlib.sha256(path.read_bytes()).hexdigest()
             for path in (folder / "pack").rglob("*") if path.is_file() and path.name != "pack.json"}
    assert found == named
    return manifest["fingerprint"]


@pytest.fixture
def folder(tmp_path):
    (tmp_path / "design.toml").write_text(DESIGN, encoding="utf-8")
    return tmp_path


def changed(folder):
    """Another design of the same name, whose pack replaces the first."""
    text = DESIGN.replace('section = "NACA 0015"', 'section = "NACA 0014"')
    assert text != DESIGN
    (folder / "design.toml").write_text(text, encoding="utf-8")


def test_a_killed_run_leaves_the_earlier_pack_or_the_new_one(folder):
    assert build(folder, "--only", "cut,print,masks").returncode in (0, 1)
    earlier = is_whole(folder)
    begun = time.monotonic()
    build(folder, "--only", "cut,print,masks")
    usual = time.monotonic() - begun
    changed(folder)
    seen, killed = set(), 0
    for step in range(24):
        process = subprocess.Popen([binary(), "build", "design.toml", "--out", "pack", "--only", "cut,print,masks"],
                                   cwd=folder, stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL)
        time.sleep(usual * (0.5 + 0.6 * step / 23))
        process.kill()
        killed += process.wait() == -signal.SIGKILL
        seen.add(is_whole(folder))
    assert killed, "no run was killed in time"
    # The next run tidies up after those that were killed.
    assert build(folder, "--only", "cut,print,masks").returncode in (0, 1)
    assert sorted(os.listdir(folder)) == ["design.toml", "pack"]
    new = is_whole(folder)
    assert new != earlier and seen <= {earlier, new}


@pytest.mark.parametrize("there", [False, True], ids=["nothing there", "a pack there"])
def test_runs_at_once_leave_one_whole_pack(folder, there):
    if there:
        build(folder, "--only", "cut")
        (folder / "pack/my notes.txt").write_text("keep this")
        changed(folder)
    with ThreadPoolExecutor(4) as pool:
        runs = list(pool.map(lambda _: build(folder, "--only", "cut,tables"), range(4)))
    assert {run.returncode for run in runs} <= {0, 1}, [run.stderr for run in runs]
    if there:
        assert (folder / "pack/my notes.txt").read_text() == "keep this"
        (folder / "pack/my notes.txt").unlink()
    is_whole(folder)
    assert sorted(os.listdir(folder)) == ["design.toml", "pack"]


def test_links_in_a_pack_lead_nowhere(folder, tmp_path_factory):
    elsewhere = tmp_path_factory.mktemp("elsewhere")
    (elsewhere / "mine.txt").write_text("mine")
    build(folder, "--only", "cut")
    (folder / "pack/shed").symlink_to(elsewhere)
    changed(folder)
    assert build(folder, "--only", "cut").returncode in (0, 1)
    assert (folder / "pack/shed").is_symlink() and os.listdir(elsewhere) == ["mine.txt"]
    # A folder of the pack that now leads elsewhere is left alone, and so is all the rest.
    cut = folder / "pack/cut"
    cut.rename(folder / "moved")
    cut.symlink_to(folder / "moved")
    before = sorted(os.listdir(folder / "moved"))
    assert build(folder, "--only", "cut").returncode in (2, 3)
    assert sorted(os.listdir(folder / "moved")) == before


def test_a_thousand_mangled_inputs_are_answered(tmp_path):
    """As `tests/mangled.rs`, but the whole program: exit status, streams, and no word of a panic."""
    dice = random.Random(20)
    awkward = ["NaN", "inf", "1e400", "-0", '"', "'''", "[[", "]", "= =", "\0", "\ufeff", "\u202e", "\r", "../", "\\", "é"]
    seeds = [("check", ".toml", DESIGN), ("check", ".toml", (ROOT / "demo-sections/main-foil.toml").read_text()),
             ("section", ".toml", (ROOT / "demo-sections/sections/scow-section.toml").read_text()),
             ("section", ".txt", (ROOT / "demo-sections/sections/old-rudder.txt").read_text())]

    def mangled(text):
        for _ in range(dice.randint(1, 4)):
            at = dice.randrange(len(text))
            match dice.randrange(4):
                case 0:
                    text = text[:at] + text[at + dice.randrange(200):]
                case 1:
                    text = text[:at] + dice.choice(awkward) + text[at:]
                case 2:
                    text = text[:at] + chr(ord(text[at]) ^ (1 << dice.randrange(7))) + text[at + 1:]
                case _:
                    text = text[:at] + text[dice.randrange(len(text)):][:100] + text[at:]
        return text or "x"

    def ask(number):
        verb, ending, text = cases[number]
        path = tmp_path / f"{number}{ending}"
        path.write_bytes(text.encode("utf-8", "replace"))
        done = subprocess.run([binary(), verb, path.name], cwd=tmp_path, capture_output=True, timeout=60)
        errors = done.stderr.decode()
        return number, done.returncode, errors, bool(done.stdout)

    cases = [(verb, ending, mangled(text)) for verb, ending, text in
             (dice.choices(seeds, [1, 1, 6, 4])[0] for _ in range(1000))]
    with ThreadPoolExecutor(2) as pool:
        answers = list(pool.map(ask, range(len(cases))))
    refused = 0
    for number, status, errors, printed in answers:
        assert status in (0, 1, 2), f"{number}: exit status {status}\n{errors}\n{cases[number][2]}"
        assert "panicked" not in errors and "RUST_BACKTRACE" not in errors
        if status == 2:
            refused += 1
            assert errors.startswith("error") and not printed, errors
    assert 300 < refused < 1000
