"""A disk that remembers what was synced: from a record of file operations to every state a power cut can leave."""

from __future__ import annotations

import re
from collections.abc import Iterator
from dataclasses import dataclass, field
from pathlib import Path
from random import Random

SECTOR = 512
_CALL = re.compile(r"^(?:\d+ +)?(\w+)\((.*)\) += (-?\d+)")
_TEXT = re.compile(r'"((?:\\x[0-9a-f]{2})*)"')

State = dict[str, bytes]
"""The files there are, by name."""


@dataclass
class _File:
    synced: bytearray
    waiting: list[tuple[int, bytes | None]] = field(default_factory=list)
    """Writes as (offset, data); a cut as (length, None)."""


@dataclass
class Disk:
    """Files and names, each in the last synced state and with what came after.

    Attributes:
        told: the last step that was told as written.
    """

    folder: str
    files: list[_File] = field(default_factory=list)
    names: dict[str, int] = field(default_factory=dict)
    waiting_names: list[tuple[str, int | None]] = field(default_factory=list)
    opened: dict[int, int | str] = field(default_factory=dict)
    told: int = 0

    @classmethod
    def of(cls, folder: Path) -> Disk:
        """A disk that holds a folder as it is."""
        disk = cls(str(folder))
        for path in folder.iterdir():
            disk.names[path.name] = len(disk.files)
            disk.files.append(_File(bytearray(path.read_bytes())))
        return disk

    def current(self) -> dict[str, int]:
        """The names as a program sees them."""
        return named(self.names, self.waiting_names)

    def take(self, line: str) -> bool:
        """Follow one line of the record; whether it changed anything."""
        match = _CALL.match(line)
        if match is None:
            return False
        call, arguments, result = match[1], match[2], int(match[3])
        if result < 0:
            return False
        match call:
            case "openat":
                return self._open(_texts(arguments)[0].decode(), "O_TRUNC" in arguments, result)
            case "close":
                self.opened.pop(int(arguments), None)
                return False
            case "write" if arguments.startswith("1,"):
                self.told = int(_texts(arguments)[0])
                return False
            case "pwrite64":
                number, offset = int(arguments.split(",")[0]), int(arguments.rsplit(",", 1)[1])
                return self._wait(number, offset, _texts(arguments)[0])
            case "ftruncate":
                number, length = map(int, arguments.split(","))
                return self._wait(number, length, None)
            case "fsync" | "fdatasync":
                return self._sync(int(arguments))
            case "unlink":
                return self._unlink(_texts(arguments)[0].decode())
        return False

    def states(self, random: Random, halves: int) -> Iterator[State]:
        """What may be there after a power cut now: names up to any point, writes all, none, some, or torn."""
        for kept in range(len(self.waiting_names) + 1):
            names = named(self.names, self.waiting_names[:kept])
            for way in ("all", "none", *["half"] * halves, *["torn"] * halves):
                yield {name: self._contents(number, way, random) for name, number in names.items()}

    def _open(self, path: str, empties: bool, number: int) -> bool:
        if path == self.folder:
            self.opened[number] = "folder"
        elif path.startswith(self.folder + "/"):
            name = path[len(self.folder) + 1 :]
            known = self.current().get(name)
            if known is None:
                known = len(self.files)
                self.files.append(_File(bytearray()))
                self.waiting_names.append((name, known))
            elif empties:
                self.files[known].waiting.append((0, None))
            self.opened[number] = known
        return False

    def _wait(self, number: int, at: int, contents: bytes | None) -> bool:
        file = self.opened.get(number)
        if not isinstance(file, int):
            return False
        self.files[file].waiting.append((at, contents))
        return True

    def _sync(self, number: int) -> bool:
        file = self.opened.get(number)
        if file == "folder":
            self.names, self.waiting_names = self.current(), []
        elif isinstance(file, int):
            self.files[file].synced = bytearray(self._contents(file, "all", Random()))
            self.files[file].waiting = []
        return file is not None

    def _unlink(self, path: str) -> bool:
        name = path[len(self.folder) + 1 :]
        if not path.startswith(self.folder) or name not in self.current():
            return False
        self.waiting_names.append((name, None))
        return True

    def _contents(self, number: int, way: str, random: Random) -> bytes:
        file = self.files[number]
        contents = bytearray(file.synced)
        for at, data in file.waiting:
            if way == "none" or (way == "half" and random.random() < 0.5):
                continue
            if data is None:
                del contents[at:]
                continue
            pieces = [(at, data)]
            if way == "torn":
                starts = range(0, len(data), SECTOR)
                pieces = [(at + i, data[i : i + SECTOR]) for i in starts if random.random() < 0.5]
            for place, piece in pieces:
                contents.extend(bytes(max(0, place - len(contents))))
                contents[place : place + len(piece)] = piece
        return bytes(contents)


def named(names: dict[str, int], waiting: list[tuple[str, int | None]]) -> dict[str, int]:
    """The names after these changes."""
    result = dict(names)
    for name, number in waiting:
        if number is None:
            result.pop(name, None)
        else:
            result[name] = number
    return result


def _texts(arguments: str) -> list[bytes]:
    return [bytes.fromhex(found.replace("\\x", "")) for found in _TEXT.findall(arguments)]
