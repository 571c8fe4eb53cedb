"""What the program is built from: licences that let it be passed on, and only what the lock file names.

Read from `cargo metadata`, which needs no network once the crates are here. Which licences go together with MIT and
Apache-2.0 in one program: common practice, no source; DEVELOPERS.md has the policy in words.
"""

import json
import re
import subprocess

from conftest import ROOT

# Each of these lets the program be passed on under its own two licences with a notice at most.
TAKEN = {"MIT", "MIT-0", "Apache-2.0", "Apache-2.0 WITH LLVM-exception", "BSD-2-Clause", "BSD-3-Clause", "ISC", "Zlib", "0BSD",
         "Unicode-3.0", "CC0-1.0", "Unlicense", "BSL-1.0", "MPL-2.0"}


def packages():
    about = subprocess.run(["rustc", "-vV"], capture_output=True, text=True, check=True).stdout
    host = re.search(r"^host: (.*)$", about, re.M)[1]
    # Crates of other systems may not be here.
    command = ["cargo", "metadata", "--format-version", "1", "--locked", "--offline", "--filter-platform", host]
    done = subprocess.run(command, cwd=ROOT, capture_output=True, text=True, check=True)
    everything = json.loads(done.stdout)
    wanted, pending = set(), [everything["resolve"]["root"]]
    nodes = {node["id"]: node for node in everything["resolve"]["nodes"]}
    while pending:
        name = pending.pop()
        if name not in wanted:
            wanted.add(name)
            # What only tests and benches use is not passed on.
            pending += [dependency["pkg"] for dependency in nodes[name]["deps"]
                        if any(kind["kind"] in (None, "build") for kind in dependency["dep_kinds"])]
    return [package for package in everything["packages"] if package["id"] in wanted]


def may_be_taken(expression: str) -> bool:
    """Whether a licence expression (SPDX) can be met: one side of each OR, both of each AND."""
    text = re.sub(r"\s*/\s*", " OR ", expression)

    def any_of(parts):
        return any(all_of(part) for part in parts)

    def all_of(part):
        return all(single.strip(" ()") in TAKEN for single in part.split(" AND "))

    # A bracket holds alternatives in all expressions met so far; anything deeper is refused.
    whole, inner = text, re.findall(r"\(([^()]*)\)", text)
    for group in inner:
        whole = whole.replace(f"({group})", "MIT" if any_of(group.split(" OR ")) else "refused")
    return any_of(whole.split(" OR "))


def test_licences_are_read_right():
    assert may_be_taken("MIT OR Apache-2.0") and may_be_taken("Zlib/MIT") and may_be_taken("(MIT OR GPL-3.0) AND Unicode-3.0")
    assert not may_be_taken("GPL-3.0") and not may_be_taken("MIT AND GPL-3.0") and not may_be_taken("(GPL-2.0) AND MIT")
    assert may_be_taken("GPL-3.0 OR MIT") and not may_be_taken("")


def test_every_licence_lets_the_program_be_passed_on():
    found = packages()
    assert len(found) > 20
    refused = {f"{package['name']} {package['version']}": package["license"] for package in found
               if not may_be_taken(package["license"] or "")}
    assert refused == {}


def test_everything_comes_from_one_registry():
    sources = {package["name"]: package["source"] for package in packages()}
    assert sources.pop("plankform") is None
    # One registry, no checkouts of branches, no folders.
    [registry] = set(sources.values())
    assert registry.startswith("registry+")
