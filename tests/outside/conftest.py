"""Builds each design once with the binary under test and hands its pack to the checks."""

import itertools
import json
import os
import subprocess
from dataclasses import dataclass, field
from pathlib import Path

import pytest

from design_file import Design

ROOT = Path(__file__).resolve().parents[2]
# Roles of what is cut before the laminate; everything else at a station is the finished surface.
WOOD = ("core template", "main body template", "flap template")
# Printed pieces that do not close on the finished surface.
NOT_FINISHED = (*WOOD, "core mask half", "cradle", "end rail")
SHEET = "sheet of stock"
KINDS = ("main-foil", "elevator", "strut", "fin")
# The one that is there to show what breaks.
BREAKS = ROOT / "demo-sections/strut-too-thin.toml"
FILES = sorted(f for f in (ROOT / "demo-sections").glob("*.toml") if f != BREAKS) + sorted((Path(__file__).parent / "designs").glob("*.toml"))


def binary() -> str:
    path = Path(os.environ.get("PLANKFORM", ROOT / "target/release/plankform")).resolve()
    if not path.is_file():
        pytest.exit("no plankform to check: run cargo build --release, or set PLANKFORM to the program", 2)
    return str(path)


@pytest.fixture(scope="session")
def run():
    """Runs plankform and gives what it printed; with --format json among the arguments, read."""

    def call(*arguments):
        command = [binary(), *map(str, arguments)]
        done = subprocess.run(command, capture_output=True, text=True)
        assert done.returncode == 0, f"{command}: exit status {done.returncode}\n{done.stderr}"
        return json.loads(done.stdout) if "json" in arguments else done.stdout

    return call


@dataclass
class Pack:
    design: Design
    folder: Path
    answer: dict
    manifest: dict = field(init=False)

    def __post_init__(self):
        self.manifest = json.loads((self.folder / "pack.json").read_text(encoding="utf-8"))
        self.fingerprint = self.manifest["fingerprint"]

    def paths(self, kind: str) -> list[Path]:
        """Of router files those of single pieces in release 2000; the others have lists of their own."""
        found = [self.folder / f["path"] for f in self.manifest["files"]
                 if f["kind"] == kind and f["role"] != SHEET and not f["path"].endswith("-r12.dxf")]
        assert found, f"the pack has no {kind}"
        return found

    def plates(self) -> list[Path]:
        """Printed pieces that are flat plates."""
        return [path for path in self.paths("stl") if "-cradle-" not in path.name]

    def sheets(self) -> list[Path]:
        found = [self.folder / f["path"] for f in self.manifest["files"] if f["role"] == SHEET]
        assert found, "the pack has no sheet of stock"
        return [path for path in found if not path.name.endswith("-r12.dxf")]

    def r12(self) -> list[Path]:
        return [self.folder / f["path"] for f in self.manifest["files"] if f["path"].endswith("-r12.dxf")]

    def with_role(self, role: str) -> list[tuple[float, Path]]:
        """Station and file of each with that role."""
        return [(f["station_mm"], self.folder / f["path"]) for f in self.manifest["files"] if f["role"] == role]

    def at_stations(self, kind: str) -> list[tuple]:
        """Exact shape and file of each station, in the order of the design; every station must have one."""
        files = [f for f in self.manifest["files"]
                 if f["kind"] == kind and f["station_mm"] is not None and f["role"] not in NOT_FINISHED
                 and not f["path"].endswith("-r12.dxf")]
        pairs = [(shape, [self.folder / f["path"] for f in files if abs(f["station_mm"] - shape.at) < 1e-6])
                 for shape in self.design.shapes]
        assert all(found for _, found in pairs), f"a station without a {kind}"
        assert sum(len(found) for _, found in pairs) == len(files), f"a {kind} of no station of the design"
        return pairs

    def planform(self, kind: str) -> Path:
        [path] = [self.folder / f["path"] for f in self.manifest["files"]
                  if f["kind"] == kind and f["role"] == "planform pattern" and not f["path"].endswith("-r12.dxf")]
        return path


@pytest.fixture(scope="session", params=[f"starter {kind}" for kind in KINDS] + FILES,
                ids=lambda p: p.replace(" ", "-") if isinstance(p, str) else p.stem)
def pack(request, run, tmp_path_factory) -> Pack:
    folder = tmp_path_factory.mktemp("pack")
    path = request.param
    if isinstance(path, str):
        path, kind = folder / "design.toml", path.split()[1]
        run("new", path, "--kind", kind)
    answer = run("build", path, "--out", folder / "pack", "--format", "json")
    return Pack(Design(path), folder / "pack", answer)


@pytest.fixture
def measured(request):
    """Notes a figure, so that the summary can tell how far from its limit a check passed."""
    return lambda name, value: request.node.user_properties.append((name, float(value)))


def pytest_terminal_summary(terminalreporter):
    # The figures come with the reports, so that they also come from other processes.
    found = {}
    for report in itertools.chain(*terminalreporter.stats.values()):
        if getattr(report, "when", None) == "call":
            for name, value in report.user_properties:
                found.setdefault(name, []).append(value)
    terminalreporter.section("figures measured, least to greatest")
    for name, values in sorted(found.items()):
        terminalreporter.write_line(f"{name}: {min(values):.6g} to {max(values):.6g}")
