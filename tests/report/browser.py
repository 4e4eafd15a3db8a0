"""A browser without a window, spoken to over its debugging socket (standard library alone)."""

from __future__ import annotations

import base64
import json
import os
import shutil
import socket
import struct
import subprocess
import tempfile
import time
from pathlib import Path
from typing import Any
from urllib.parse import urlsplit
from urllib.request import urlopen

PROGRAM = shutil.which("chromium") or shutil.which("chromium-browser") or shutil.which("google-chrome")


class Browser:
    """One page of a headless browser; `events` keeps what the page reports."""

    def __init__(self) -> None:
        assert PROGRAM is not None
        self.folder = tempfile.TemporaryDirectory(ignore_cleanup_errors=True)
        flags = ["--headless", "--no-sandbox", "--disable-gpu", "--remote-debugging-port=0"]
        self.process = subprocess.Popen(
            [PROGRAM, *flags, f"--user-data-dir={self.folder.name}", "about:blank"],
            stdout=subprocess.DEVNULL,
            stderr=subprocess.DEVNULL,
        )
        port = self._port()
        with urlopen(f"http://127.0.0.1:{port}/json", timeout=20) as answer:
            page = next(x for x in json.load(answer) if x["type"] == "page")
        self.wire = _connect(page["webSocketDebuggerUrl"])
        self.count = 0
        self.events: list[dict[str, Any]] = []
        for domain in ("Page", "Runtime", "Log", "Network"):
            self.call(f"{domain}.enable")

    def _port(self) -> str:
        path = Path(self.folder.name) / "DevToolsActivePort"
        for _ in range(200):
            if path.exists() and path.read_text():
                return path.read_text().split("\n")[0]
            time.sleep(0.1)
        raise TimeoutError("the browser did not start")

    def __enter__(self) -> Browser:
        return self

    def __exit__(self, *why: object) -> None:
        self.wire.close()
        self.process.terminate()
        self.process.wait(20)
        self.folder.cleanup()

    def call(self, method: str, **params: Any) -> Any:
        """One command and its result."""
        self.count += 1
        _send(self.wire, json.dumps({"id": self.count, "method": method, "params": params}))
        while True:
            message = json.loads(_receive(self.wire))
            if message.get("id") == self.count:
                if "error" in message:
                    raise RuntimeError(f"{method}: {message['error']}")
                return message["result"]
            self.events.append(message)

    def open(self, path: Path, width: int, dark: bool = False) -> None:
        """Load a file at a window width in CSS pixels."""
        scheme = {"name": "prefers-color-scheme", "value": "dark" if dark else "light"}
        self.call(
            "Emulation.setDeviceMetricsOverride",
            width=width,
            height=900,
            deviceScaleFactor=1,
            mobile=width < 500,
        )
        self.call("Emulation.setEmulatedMedia", media="screen", features=[scheme])
        self.call("Page.navigate", url=path.as_uri())
        for _ in range(100):
            if (
                self.value("document.readyState") == "complete"
                and self.value("location.href") == path.as_uri()
            ):
                return
            time.sleep(0.05)
        raise TimeoutError(str(path))

    def value(self, expression: str) -> Any:
        """The value of an expression in the page."""
        return self.call("Runtime.evaluate", expression=expression, returnByValue=True)["result"].get("value")

    def picture(self, box: dict[str, float]) -> bytes:
        """A part of the page as PNG."""
        shot = self.call("Page.captureScreenshot", captureBeyondViewport=True, clip={**box, "scale": 1})
        return base64.b64decode(shot["data"])


def _connect(address: str) -> socket.socket:
    parts = urlsplit(address)
    wire = socket.create_connection((parts.hostname, parts.port), timeout=60)
    key = base64.b64encode(os.urandom(16)).decode()
    wire.sendall(
        f"GET {parts.path} HTTP/1.1\r\nHost: {parts.netloc}\r\nUpgrade: websocket\r\nConnection: Upgrade\r\n"
        f"Sec-WebSocket-Key: {key}\r\nSec-WebSocket-Version: 13\r\n\r\n".encode()
    )
    head = b""
    while not head.endswith(b"\r\n\r\n"):
        head += wire.recv(1)
    assert b" 101 " in head, head
    return wire


def _send(wire: socket.socket, text: str) -> None:
    """One masked text frame (RFC 6455)."""
    data = text.encode()
    size = len(data)
    head = bytes([0x81, 0x80 | size]) if size < 126 else bytes([0x81, 0xFE]) + struct.pack(">H", size)
    assert size < 1 << 16
    mask = os.urandom(4)
    wire.sendall(head + mask + bytes(c ^ mask[i % 4] for i, c in enumerate(data)))


def _receive(wire: socket.socket) -> str:
    """One message, of one or more frames."""
    out = b""
    while True:
        first, second = _read(wire, 2)
        size = second & 0x7F
        if size == 126:
            (size,) = struct.unpack(">H", _read(wire, 2))
        elif size == 127:
            (size,) = struct.unpack(">Q", _read(wire, 8))
        out += _read(wire, size)
        if first & 0x80:
            return out.decode()


def _read(wire: socket.socket, size: int) -> bytes:
    out = bytearray()
    while len(out) < size:
        chunk = wire.recv(size - len(out))
        assert chunk, "the browser hung up"
        out += chunk
    return bytes(out)
