"""Step 6: who and what the memo is for, its text as it will be written, and writing it."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import ClassVar

from textual.app import ComposeResult
from textual.binding import Binding
from textual.containers import Container
from textual.message import Message

from screener.app import fields
from screener.app.desk import Desk
from screener.app.engine import MemoAsked
from screener.app.glyphs import Glyphs
from screener.app.lines import Block, Lines
from screener.app.preview import document_rows
from screener.app.rows import Column, paragraph
from screener.app.sheet import Cell, Record, Section, Sheet
from screener.app.strip import EditRequested, EditStrip
from screener.app.words import say
from screener.casefile import keys as schema

STATUSES = ("draft", "for checking")
_CASE_KEYS = ("case.title", "case.reference", "case.prepared_by", "case.fuel_class")


@dataclass(frozen=True)
class MemoWords:
    """What the person says about the memo; not part of the case."""

    number: str = ""
    revision: str = "0"
    status: str = "draft"
    file: str = ""


class MemoPreview(Lines):
    """The memo as text; scrolls."""

    HELP = say("widgets", "preview")


class MemoPane(Container):
    """The memo step."""

    BINDINGS: ClassVar = [Binding("w", "write", "Write the memo", id="memo.write")]
    DEFAULT_CSS = """
    MemoPane { layout: vertical; }
    MemoPane Sheet { height: auto; max-height: 60%; }
    MemoPane.-reading Sheet { max-height: 4; }
    MemoPane MemoPreview { margin: 1 0 0 0; }
    """

    class Changed(Message):
        """A value of the case was changed here."""

    class Write(Message):
        """Write the memo to a file."""

    class Pointed(Message):
        """Words for the hint row."""

        def __init__(self, text: str, tone: str = ""):
            super().__init__()
            self.text, self.tone = text, tone

    def __init__(self, desk: Desk, marks: Glyphs, **kwargs):
        super().__init__(id="memo", **kwargs)
        self.desk, self.marks = desk, marks
        self.words = MemoWords()
        self.document = None
        self._note = ("", "")
        self.news = ""  # what was done last; stays in the hint row until the cursor moves

    def compose(self) -> ComposeResult:
        yield Sheet(self.marks, classes="sheet")
        yield MemoPreview(id="preview")
        yield EditStrip()

    @property
    def sheet(self) -> Sheet:
        """The rows above the memo."""
        return self.query_one(Sheet)

    @property
    def strip(self) -> EditStrip:
        """The row that edits."""
        return self.query_one(EditStrip)

    @property
    def number(self) -> str:
        """Number of the memo: as typed, else the reference of the case, else the name of its file."""
        session = self.desk.session
        name = session.path.stem if session.path else say("memo", "no_number")
        return self.words.number or self.desk.text.get("case.reference") or name

    @property
    def file(self) -> str:
        """Name of the file the memo goes into."""
        session = self.desk.session
        return self.words.file or (f"{session.path.stem}.md" if session.path else say("memo", "file"))

    @property
    def asked(self) -> MemoAsked:
        """What the memo says about itself."""
        author = self.desk.text.get("case.prepared_by") or ""
        return MemoAsked(self.number, self.words.revision, self.words.status, author, self.desk.text.toml())

    # showing

    def update_case(self) -> None:
        """Show the rows of the case and of the memo."""
        text, known = self.desk.text, self.desk.known
        records = []
        for path in _CASE_KEYS:
            record = fields.value_record(path, schema.key_at(path), text, known)
            records.append(Record(path, record.cells[:2], record.note, name=record.name))
        shown = {"number": self.number, "revision": self.words.revision, "status": self.words.status, "file": self.file}
        for key, value in shown.items():
            name = say("memo_rows", key)
            records.append(Record(f"memo:{key}", (Cell(name), Cell(value, f"memo:{key}")), name=name))
        columns = (Column(say("memo", "heading"), least=14), Column("", least=12))
        self.sheet.fill([Section(columns, tuple(records))])
        if not self.strip.editing:
            self._read()

    def show_document(self, document, note: str = "", tone: str = "dim") -> None:
        """A new document, or a note that stands in its place or above it."""
        self.document, self._note = document, (note, tone)
        self.query_one(MemoPreview).show(self._preview)
        self.refresh_bindings()

    def _preview(self, width: int):
        note, tone = self._note
        head = [*paragraph(self.marks.plain(note), width, tone), ()] if note else []
        rows = document_rows(self.document, width, self.marks) if self.document else []
        return head, [Block((row,)) for row in rows]

    def _read(self) -> None:
        record = self.sheet.record
        if record is not None:
            self.strip.read(self.marks.plain(record.name), self.marks.plain(record.cells[1].text))
        self.post_message(self.Pointed(self.hint))

    @property
    def hint(self) -> str:
        """What the row under the cursor means."""
        key = self.sheet.key
        if self.news:
            return self.news
        if key.startswith("memo:"):
            return say("memo_hints", key[5:])
        declared = schema.key_at(key)
        return declared.meaning if declared else ""

    def on_descendant_focus(self) -> None:
        """While the memo is read it gets the room."""
        self.set_class(self.query_one(MemoPreview).has_focus, "-reading")

    # editing

    def check_action(self, action: str, parameters: tuple) -> bool | None:
        """The memo can be written once there is one."""
        return not (action == "write" and (self.document is None or self.strip.editing))

    def action_write(self) -> None:
        self.post_message(self.Write())

    def on_lines_moved(self, event: Lines.Moved) -> None:
        event.stop()
        if event.lines is self.sheet and not self.strip.editing:
            self.news = ""
            self._read()

    def on_lines_chosen(self, event: Lines.Chosen) -> None:
        event.stop()
        self.edit()

    def on_edit_requested(self, event: EditRequested) -> None:
        event.stop()
        self.edit()

    def edit(self) -> None:
        """Edit the row under the cursor."""
        key, record = self.sheet.key, self.sheet.record
        if record is None:
            return
        memo = key.startswith("memo:")
        value = record.cells[1].text if memo else self.desk.text.get(key) or ""
        choices = STATUSES if key == "memo:status" else ()
        self.strip.edit(key, record.name, value, choices)
        self.post_message(self.Pointed(say("hint", "choices", choices=", ".join(choices)) if choices else self.hint))

    def on_edit_strip_typed(self, event: EditStrip.Typed) -> None:
        event.stop()

    def on_edit_strip_taken(self, event: EditStrip.Taken) -> None:
        event.stop()
        problem = self._take(event.purpose, event.value.strip())
        if problem:
            self.post_message(self.Pointed(problem, "bad"))
            return
        self.strip.read("", "")
        self.sheet.focus()
        self.post_message(self.Changed())
        self.update_case()
        self.sheet.action_step(1)
        self._read()

    def _take(self, purpose: str, value: str) -> str:
        """Enter a value; the problem in words, '' when it was taken."""
        if not purpose.startswith("memo:"):
            return self.desk.take(purpose, value).problem
        name = purpose[5:]
        if name == "status" and value not in STATUSES:
            return say("memo_hints", "status")
        if name == "file" and not value.endswith(".md"):
            return say("memo_hints", "file")
        self.words = replace(self.words, **{name: value})
        return ""

    def on_edit_strip_left(self, event: EditStrip.Left) -> None:
        event.stop()
        self.strip.read("", "")
        self.sheet.focus()
        self._read()
