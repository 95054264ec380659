"""A real display without a screen, a window manager on it, and a person who works it with real keys."""

from __future__ import annotations

import json
import os
import shutil
import subprocess
import sys
import time
from collections.abc import Callable, Sequence
from pathlib import Path
from threading import Event

ROOT = Path(__file__).parents[2]
TOOLS = ("Xvfb", "openbox", "xdotool")
_DEADLINE = 30.0
_LOOK_EVERY = 0.05
_SCREENSHOT = """
import sys
from PySide6.QtGui import QGuiApplication
app = QGuiApplication([])
sys.exit(not app.primaryScreen().grabWindow(0).save(sys.argv[1]))
"""


def missing_tools() -> list[str]:
    """Which of the programs a real display takes are not on this machine."""
    return [tool for tool in TOOLS if shutil.which(tool) is None]


def wait_for(what: str, look: Callable[[], object]) -> None:
    """Look until there is something, or fail saying what never came."""
    end = time.monotonic() + _DEADLINE
    while time.monotonic() < end:
        seen = look()
        if seen:
            return
        Event().wait(_LOOK_EVERY)
    raise AssertionError(f"waited {_DEADLINE:.0f} seconds for {what}; last seen: {seen!r}")


class Desk:
    """One display with everything that runs on it; all of it is ended with ``close``."""

    def __init__(self, home: Path) -> None:
        self.home = home
        self.journal = home / "share" / "dayfence" / "journal.dayfence"
        self._running: list[subprocess.Popen] = []
        read_end, write_end = os.pipe()
        server = ["Xvfb", "-displayfd", str(write_end), "-screen", "0", "1400x900x24", "-nolisten", "tcp"]
        self._start(server, {"PATH": os.environ["PATH"]}, pass_fds=(write_end,))
        os.close(write_end)
        with os.fdopen(read_end) as told:
            number = told.readline().strip()
        assert number, "the display did not start"
        self.environment = {
            "PATH": os.environ["PATH"],
            "DISPLAY": f":{number}",
            "HOME": str(home),
            "XDG_DATA_HOME": str(home / "share"),
            "XDG_CONFIG_HOME": str(home / "config"),
            "XDG_RUNTIME_DIR": str(home),
            "LANG": "C.UTF-8",
            "PYTHONPATH": str(ROOT),
        }
        self._start(["openbox"], self.environment)
        wait_for("the window manager", lambda: self._ask("get_desktop"))

    def starts_the_program(self) -> subprocess.Popen:
        program = self._start([sys.executable, "-m", "desktop"], self.environment)
        self.sees("Dayfence")
        return program

    def starts_with(self, path: Path, title: str) -> subprocess.Popen:
        program = self._start([sys.executable, "-m", "desktop", str(path)], self.environment)
        self.sees(title)
        return program

    def sees(self, title: str) -> None:
        """Wait until a window of this title has the keys."""
        wait_for(f"the window {title!r}", lambda: self._ask("getactivewindow", "getwindowname").startswith(title))

    def presses(self, *keys: str) -> None:
        self._do("key", "--delay", "20", *keys)

    def types(self, text: str) -> None:
        self._do("type", "--delay", "20", text)

    def types_days(self, values: Sequence[int]) -> None:
        """Type one value a day, each kept with Enter."""
        for value in values:
            self.types(str(value))
            self.presses("Return")

    def reviewed(self) -> dict:
        """What ``dayfence review`` says of the journal; empty while there is nothing to say."""
        command = [sys.executable, "-m", "desktop", "review", str(self.journal), "--json"]
        done = subprocess.run(
            command, cwd=self.home, env=self.environment, capture_output=True, text=True, timeout=60, check=False
        )
        return json.loads(done.stdout) if done.returncode == 0 else {}

    def waits_for_values(self, number: int) -> dict:
        """The review, once so many values are on the disk."""
        wait_for(f"{number} values on the disk", lambda: self._kept() == number)
        return self.reviewed()

    def takes_a_screenshot(self, path: Path) -> None:
        subprocess.run([sys.executable, "-c", _SCREENSHOT, path], env=self.environment, timeout=60, check=True)

    def close(self) -> None:
        for process in reversed(self._running):
            process.terminate()
            try:
                process.wait(10)
            except subprocess.TimeoutExpired:
                process.kill()
                process.wait(10)

    def _kept(self) -> int:
        return sum(stretch["observations"] for stretch in self.reviewed().get("stretches", []))

    def _start(
        self, command: list[str], environment: dict[str, str], pass_fds: tuple[int, ...] = ()
    ) -> subprocess.Popen:
        process = subprocess.Popen(
            command, env=environment, pass_fds=pass_fds, stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL
        )
        self._running.append(process)
        return process

    def _do(self, *command: str) -> None:
        subprocess.run(["xdotool", *command], env=self.environment, timeout=60, check=True)

    def _ask(self, *command: str) -> str:
        done = subprocess.run(
            ["xdotool", *command], env=self.environment, capture_output=True, text=True, timeout=60, check=False
        )
        return done.stdout.strip() if done.returncode == 0 else ""
