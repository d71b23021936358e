"""Show what the installer is at: a line per package, and where there is a terminal the megabytes as they come in."""

import os
import queue
import re
import subprocess
import sys
import threading
import time
from contextlib import suppress
from pathlib import Path
from typing import IO

_FETCHED = re.compile(
    r"\s*(?:Downloading|Using cached|Processing) (?:\S*[/\\])?"
    r"(?P<name>\S+?)-(?P<version>[0-9][^-\s]*)-\S+\.whl(?P<size> \([\d.]+ [kMG]?B\))?(?: |$)"
)
_UNPACKING = re.compile(r"Installing collected packages: (.*)")


def say(text: str) -> None:
    """Standard error, so that what the program prints stays apart; it never fails on a letter it cannot show."""
    print(text, file=sys.stderr, flush=True)


class Progress:
    """Turns the installer's lines into ours. `room` is the folder in which files grow while they are fetched."""

    def __init__(self, room: Path) -> None:
        self._room = room
        self._on_terminal = sys.stderr is not None and sys.stderr.isatty()
        self._ticking = False
        self._started = time.monotonic()
        self._all_fetched = False

    def line(self, text: str) -> None:
        shown = shown_as(text)
        if shown:
            self.end_tick()
            say(shown)
        self._all_fetched |= _UNPACKING.match(text) is not None

    def tick(self) -> None:
        """Called a few times a second while the installer says nothing."""
        if self._on_terminal:
            text = "  " if self._all_fetched else f"  {_fetched_bytes(self._room) / 1e6:.0f} MB, "
            text += f"{time.monotonic() - self._started:.0f} s"
            print(f"\r{text:40}", end="", file=sys.stderr, flush=True)
            self._ticking = True

    def end_tick(self) -> None:
        if self._ticking:
            print("\r" + " " * 40 + "\r", end="", file=sys.stderr)
            self._ticking = False


def shown_as(line: str) -> str:
    """What the user sees for a line of the installer; mostly nothing."""
    fetched = _FETCHED.match(line)
    if fetched:
        name, version, size = fetched.groups()
        return f"  fetching {name} {version}{size or ''}"
    unpacking = _UNPACKING.match(line)
    if unpacking:
        count = len(unpacking.group(1).split(","))
        return f"  unpacking {count} package{'s' if count > 1 else ''}"
    return ""


def run_shown(
    command: list[str], environment: dict[str, str], progress: Progress, lock: IO[bytes]
) -> tuple[int, str]:
    """Run `command` to its end with its progress shown. Returns its exit status and all that it said.

    The child holds `lock` too: should this process be killed, no other set-up starts while the child still writes.
    It does not outlive an interruption that this process is told of.
    """
    child = subprocess.Popen(
        command,
        env=environment,
        stdin=subprocess.DEVNULL,
        stdout=subprocess.PIPE,
        stderr=subprocess.STDOUT,
        text=True,
        encoding="utf-8",
        errors="replace",
        pass_fds=() if os.name == "nt" else (lock.fileno(),),
    )
    assert child.stdout is not None
    lines: queue.Queue[str | None] = queue.Queue()
    reader = threading.Thread(target=_read, args=(child.stdout, lines), daemon=True)
    reader.start()
    said: list[str] = []
    try:
        while (line := _next(lines, progress)) is not None:
            said.append(line)
            progress.line(line)
        return child.wait(), "\n".join(said)
    finally:
        progress.end_tick()
        if child.poll() is None:
            child.terminate()
            child.wait()
        reader.join(2)
        child.stdout.close()


def _read(stream: IO[str], lines: "queue.Queue[str | None]") -> None:
    for line in stream:
        lines.put(line.rstrip())
    lines.put(None)


def _next(lines: "queue.Queue[str | None]", progress: Progress) -> str | None:
    while True:
        try:
            return lines.get(timeout=0.3)
        except queue.Empty:
            progress.tick()


def _fetched_bytes(room: Path) -> int:
    """What lies in pip's folders for packages on their way in; what it keeps for another try is a second copy."""
    total = 0
    for place in room.glob("pip-unpack-*/*"):
        with suppress(OSError):  # gone since it was listed
            total += place.stat().st_size
    return total
