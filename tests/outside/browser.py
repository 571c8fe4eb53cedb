"""A headless Chromium, driven over its pipe by the DevTools protocol: an open standard of browsers, no library needed."""

import base64
import json
import os
import select
import shutil
import subprocess
import tempfile
import time
from pathlib import Path

PATIENCE = 60.0  # seconds
QUIET = ("--headless=new", "--no-sandbox", "--disable-gpu", "--no-first-run", "--disable-background-networking",
         "--disable-component-update", "--disable-sync", "--disable-quic", "--hide-scrollbars",
         "--remote-debugging-pipe")


class Browser:
    """One page of a browser; `with Browser() as browser`."""

    def __init__(self):
        program = shutil.which("chromium") or shutil.which("chromium-browser")
        assert program, "no chromium: install the Debian package chromium"
        self._profile = tempfile.TemporaryDirectory(ignore_cleanup_errors=True)
        out_read, out_write = os.pipe()
        in_read, in_write = os.pipe()

        # The protocol's pipe is file descriptors 3 (commands) and 4 (answers) of the browser.
        def connect():
            a, b = os.dup(in_read), os.dup(out_write)
            os.dup2(a, 3)
            os.dup2(b, 4)

        self._process = subprocess.Popen(
            [program, *QUIET, f"--user-data-dir={self._profile.name}", "about:blank"],
            stdin=subprocess.DEVNULL, stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL,
            close_fds=False, preexec_fn=connect)
        os.close(out_write)
        os.close(in_read)
        self._answers, self._commands = out_read, in_write
        self._buffer, self._count, self._session = b"", 0, None
        self.complaints: list[str] = []
        targets = self._call("Target.getTargets")["targetInfos"]
        page = next(target for target in targets if target["type"] == "page")
        self._session = self._call("Target.attachToTarget", targetId=page["targetId"], flatten=True)["sessionId"]
        for domain in ("Page", "Runtime", "Log", "Network"):
            self._call(f"{domain}.enable")

    def __enter__(self):
        return self

    def __exit__(self, *_):
        self._process.kill()
        self._process.wait()
        os.close(self._answers)
        os.close(self._commands)
        self._profile.cleanup()

    def _message(self) -> dict:
        end = time.monotonic() + PATIENCE
        while b"\0" not in self._buffer:
            ready, _, _ = select.select([self._answers], [], [], max(end - time.monotonic(), 0))
            part = os.read(self._answers, 1 << 20) if ready else b""
            assert part, "the browser says nothing"
            self._buffer += part
        message, _, self._buffer = self._buffer.partition(b"\0")
        return json.loads(message)

    def _note(self, message: dict):
        """What a page complains about, and what it asks the network for."""
        kind, about = message.get("method"), message.get("params", {})
        if kind == "Runtime.exceptionThrown":
            self.complaints.append(about["exceptionDetails"]["text"])
        elif kind == "Runtime.consoleAPICalled" and about["type"] in ("error", "warning", "assert"):
            self.complaints.append(json.dumps(about["args"]))
        elif kind == "Log.entryAdded" and about["entry"]["level"] in ("error", "warning"):
            self.complaints.append(about["entry"]["text"])
        elif kind == "Network.requestWillBeSent" and not about["request"]["url"].startswith(("file:", "data:", "about:")):
            self.complaints.append(f"asks for {about['request']['url']}")

    def _call(self, method: str, **parameters) -> dict:
        self._count += 1
        call = {"id": self._count, "method": method, "params": parameters}
        if self._session:
            call["sessionId"] = self._session
        data = json.dumps(call).encode() + b"\0"
        while data:
            data = data[os.write(self._commands, data):]
        while True:
            message = self._message()
            if message.get("id") == self._count:
                assert "error" not in message, f"{method}: {message['error']}"
                return message["result"]
            self._note(message)

    def open(self, page: Path, width: int, medium: str = "screen", height: int = 900):
        """Loads a file in a window so many CSS pixels wide, as on that medium ("screen" or "print")."""
        self.complaints.clear()
        self._call("Emulation.setDeviceMetricsOverride", width=width, height=height, deviceScaleFactor=1,
                   mobile=width < 600)
        self._call("Emulation.setEmulatedMedia", media=medium)
        self._call("Page.navigate", url=page.resolve().as_uri())
        while self.value("document.readyState + location.protocol") != "completefile:":
            time.sleep(0.02)

    def value(self, expression: str):
        """What a JavaScript expression gives, as JSON."""
        answer = self._call("Runtime.evaluate", expression=f"JSON.stringify({expression})", returnByValue=True)
        assert "exceptionDetails" not in answer, answer.get("exceptionDetails")
        text = answer["result"].get("value")
        return None if text is None else json.loads(text)

    def pdf(self) -> bytes:
        """The page as it prints on A4."""
        printed = self._call("Page.printToPDF", paperWidth=210 / 25.4, paperHeight=297 / 25.4, printBackground=False)
        return base64.b64decode(printed["data"])

    def picture(self) -> bytes:
        """The whole page as PNG."""
        return base64.b64decode(self._call("Page.captureScreenshot", captureBeyondViewport=True)["data"])
