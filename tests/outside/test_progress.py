"""How far long work has come is told on a terminal, on standard error, and nowhere else."""

import os
import pty
import subprocess

import pytest

from conftest import ROOT, binary

# Enough curves that the work outlasts what is too short to tell.
LIFT = ["lift", "NACA 4412", "--re", "2e5,4e5,8e5,1e6,2e6,3e6", "--angles", "-4:12:1", "--format", "csv"]
CHECK = ["check", str(ROOT / "demo-sections/main-foil.toml")]


def on_a_terminal(arguments, environment=None):
    """Standard output and what reaches a terminal that standard error is."""
    ours, theirs = pty.openpty()
    with subprocess.Popen([binary(), *arguments], stdout=subprocess.PIPE, stderr=theirs,
                          env={**os.environ, **(environment or {})}) as process:
        os.close(theirs)
        seen = b""
        out = b""
        # The pipe is read to its end first: progress is little enough for the terminal's own store.
        out = process.stdout.read()
        try:
            while chunk := os.read(ours, 65536):
                seen += chunk
        except OSError:  # the other end is closed
            pass
        process.wait()
    os.close(ours)
    return out.decode(), seen.decode()


@pytest.mark.parametrize("arguments", [LIFT, CHECK], ids=["lift", "check"])
def test_progress_shows_on_a_terminal_alone(arguments, measured):
    out, seen = on_a_terminal(arguments, {"NO_COLOR": "1"})
    piped = subprocess.run([binary(), *arguments], capture_output=True, text=True)
    assert piped.stderr == ""
    assert piped.stdout == out
    measured("letters of progress", len(seen))
    assert "lift curves" in seen and "#" in seen
    # It writes over itself and is gone at the end; no colour, no other command to the terminal.
    assert "\x1b" not in seen and "\n" not in seen
    assert seen.endswith("\r") and seen.split("\r")[-2].strip() == ""
