"""The life of a case: open, edit, undo, work out, save, recover. Plain Python, no screen.

A session holds the case as text (one `CaseText`), the steps back and forward,
and the last result with the revision of the inputs it belongs to. Nothing is
lost: every change can be written beside the file, and the file itself is
replaced in one step or not at all.
"""

from __future__ import annotations

from dataclasses import dataclass
from difflib import ndiff
from pathlib import Path

from screener.app import edits
from screener.casefile.files import read_file, write_file
from screener.ground.errors import InputError

UNTITLED = "untitled.toml"
MOST_STEPS_BACK = 500


class FileChanged(Exception):
    """The file was changed by another program since it was opened."""


@dataclass(frozen=True)
class Result:
    """What was worked out, and for which revision of the inputs."""

    revision: int
    screening: object | None  # None when the case could not be read
    faults: tuple = ()  # InputError objects, each with its path
    full: bool = True  # False for the verdicts alone


@dataclass(frozen=True)
class Recovery:
    """An unsaved version left behind beside a file."""

    path: Path  # the left-behind version
    written: float  # when, seconds since the epoch
    lines: int  # lines that differ from the file


@dataclass(frozen=True)
class _Step:
    label: str
    text: object
    revision: int


class Session:
    """One open case."""

    def __init__(self, text, path: Path | None = None, *, folder: Path | None = None):
        self.text = text
        self.path = Path(path) if path else None
        self.folder = Path(folder or (self.path.parent if self.path else Path.cwd()))
        self.result: Result | None = None
        self.revision = 0
        self._revisions = 0  # highest revision handed out; never reused
        self._saved_revision = 0
        self._written_revision = 0  # revision of the version beside the file
        self._back: list[_Step] = []
        self._forward: list[_Step] = []
        self._seen = _stamp(self.path)
        self.opened: set[str] = set()  # folds of the input steps that stand open; no part of the case
        self.kept_comments = False  # whether the last save put the commented file aside

    # opening

    @classmethod
    def open(cls, path: str | Path, parse) -> Session:
        """The case in a file; `parse` turns its text into a CaseText and raises InputError."""
        path = Path(path)
        return cls(parse(read_file(path)), path)

    @classmethod
    def recovered(cls, path: Path | None, recovery: Recovery, parse) -> Session:
        """The unsaved version instead of the file; counts as changed until it is saved."""
        session = cls(parse(read_file(recovery.path)), path, folder=recovery.path.parent)
        session._saved_revision = -1
        return session

    def as_new(self, folder: Path) -> Session:
        """The same case without a file, so that saving asks for a name."""
        return Session(self.text, folder=folder)

    # changing

    def change(self, label: str, act) -> None:
        """One undoable change: `act` works on a copy of the text, which then becomes the text.

        Whatever `act` raises leaves the session as it was.
        """
        changed = self.text.copy()
        act(changed)
        if changed == self.text:
            return
        self._back.append(_Step(label, self.text, self.revision))
        del self._back[:-MOST_STEPS_BACK]
        self._forward.clear()
        self.text = changed
        self._revisions += 1
        self.revision = self._revisions

    def edit(self, path: str, value) -> None:
        """Set one value of the case; an empty text takes it away."""
        self.change(path, lambda text: edits.enter(text, path, value))

    def undo(self) -> str | None:
        """Take the last change back; its label, or None when there is none."""
        return self._swap(self._back, self._forward)

    def redo(self) -> str | None:
        """Make the change taken back last again."""
        return self._swap(self._forward, self._back)

    def _swap(self, source: list[_Step], other: list[_Step]) -> str | None:
        if not source:
            return None
        step = source.pop()
        other.append(_Step(step.label, self.text, self.revision))
        self.text, self.revision = step.text, step.revision
        return step.label

    @property
    def can_undo(self) -> bool:
        """Whether there is a change to take back."""
        return bool(self._back)

    @property
    def can_redo(self) -> bool:
        """Whether there is a change to make again."""
        return bool(self._forward)

    @property
    def dirty(self) -> bool:
        """Whether the case differs from what is in its file."""
        return self.revision != self._saved_revision

    # result

    def attach(self, result: Result) -> bool:
        """Keep a result; one of older inputs than the result held is dropped (False)."""
        if self.result is not None and result.revision != self.revision and self.result.revision == self.revision:
            return False
        self.result = result
        return True

    @property
    def stale(self) -> bool:
        """Whether the result belongs to other inputs than those on the screen."""
        return self.result is not None and self.result.revision != self.revision

    @property
    def complete(self) -> bool:
        """Whether everything is worked out for the inputs on the screen."""
        return self.result is not None and not self.stale and self.result.full

    @property
    def screening(self):
        """The last screening, stale or not; None before the first."""
        return self.result.screening if self.result else None

    # files

    @property
    def unsaved_path(self) -> Path:
        """Where the unsaved version is kept."""
        return unsaved_beside(self.path, self.folder)

    def autosave(self) -> bool:
        """Write the unsaved version beside the file; False when there is nothing new or no place to write.

        A case back at what its file holds needs none, so a version written before is removed.
        """
        if not self.dirty and self._written_revision:
            self.discard_unsaved()
        if not self.dirty or self._written_revision == self.revision:
            return False
        try:
            write_file(self.unsaved_path, self.text.toml())
        except InputError:
            return False
        self._written_revision = self.revision
        return True

    def save(self, path: str | Path | None = None, *, anyway: bool = False) -> Path:
        """Write the case to its file, whole or not at all.

        Raises FileChanged when another program wrote the file meanwhile (or a
        new name already exists) and `anyway` is not given; InputError when it
        cannot be written. Comments of the old file are not kept in the new
        one, so the old one then stays beside it as `NAME.toml.before`.
        """
        target = Path(path) if path else self.path
        if target is None:
            raise ValueError("the case has no file name yet")
        seen = self._seen if target == self.path else None
        if not anyway and _stamp(target) != seen:
            raise FileChanged(str(target))
        self.kept_comments = _has_comments(target)
        if self.kept_comments:
            write_file(before_beside(target), read_file(target))
        write_file(target, self.text.toml())
        self.discard_unsaved()
        self.path, self.folder = target, target.parent
        self._seen = _stamp(target)
        self._saved_revision = self.revision
        return target

    def discard_unsaved(self) -> None:
        """Remove the unsaved version beside the file."""
        self.unsaved_path.unlink(missing_ok=True)
        self._written_revision = 0

    def export(self, path: str | Path, text: str) -> Path:
        """Write a memo; relative names are taken from the folder of the case."""
        target = self.folder / Path(path).expanduser()
        write_file(target, text)
        return target


def unsaved_beside(path: Path | None, folder: Path) -> Path:
    """Name of the unsaved version of a file: `.NAME.toml.unsaved` in its folder."""
    name = path.name if path else UNTITLED
    return (path.parent if path else folder) / f".{name}.unsaved"


def before_beside(path: Path) -> Path:
    """Where the commented version of a file is kept once it was saved from the screens."""
    return path.with_name(f"{path.name}.before")


def left_behind(path: Path | None, folder: Path) -> Recovery | None:
    """An unsaved version that a crash left beside a file, when it differs from the file."""
    unsaved = unsaved_beside(path, folder)
    try:
        kept = read_file(unsaved).splitlines()
        written = unsaved.stat().st_mtime
        known = read_file(path).splitlines() if path else []
    except (InputError, OSError):
        return None
    lines = sum(1 for line in ndiff(known, kept) if line.startswith("+ "))
    return Recovery(unsaved, written, lines) if kept != known else None


def _has_comments(path: Path) -> bool:
    """Whether a file holds comment lines, which the program does not write."""
    try:
        return any(line.lstrip().startswith("#") for line in read_file(path).splitlines())
    except InputError:
        return False


def _stamp(path: Path | None) -> tuple[int, int] | None:
    """What tells one content of a file from another; None without a file."""
    try:
        state = path.stat() if path else None
    except OSError:
        return None
    return (state.st_mtime_ns, state.st_size) if state else None
