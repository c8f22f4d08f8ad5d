"""What the workers say when they are done. They never touch a widget."""

from __future__ import annotations

from dataclasses import dataclass

from textual.message import Message


@dataclass
class Warmed(Message):
    """The libraries behind the screening are loaded."""


@dataclass
class WorkDoing(Message):
    """What the thread of a run spends its time on; a key of the words about results."""

    token: int
    what: str


@dataclass
class WorkDone(Message):
    """A case was worked out; `worked.full` tells whether there is more to come."""

    token: int
    revision: int
    worked: object  # Worked
    seconds: float


@dataclass
class WorkEnded(Message):
    """The thread of a run has come to its end."""

    token: int


@dataclass
class MemoBuilt(Message):
    """The memo of a revision stands ready."""

    revision: int
    document: object
    markdown: str


@dataclass
class Broke(Message):
    """A worker came upon a bug of ours."""

    what: str  # 'work', 'memo' or 'warm'
    token: int
    sentence: str
