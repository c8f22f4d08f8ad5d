"""What the screens know: the session, the last result read by path, how each step stands. Plain Python."""

from __future__ import annotations

import re
from collections.abc import Collection
from dataclasses import dataclass

from screener.app import edits, fields
from screener.app.chrome_state import StepState
from screener.app.engine import Engine, Name, Worked
from screener.app.fields import Echo, Known
from screener.app.folding import folded
from screener.app.glyphs import Glyphs, glyphs
from screener.app.judged import information
from screener.app.residuals import residual_note, residual_section
from screener.app.session import Result, Session
from screener.app.words import say, table
from screener.casefile import keys as schema
from screener.ground.errors import InputError

STEPS = ("blend", "tank", "site", "line", "findings", "memo")
INPUT_STEPS = STEPS[:4]
_NAME = r"[a-z_][a-z0-9_]*"
_PATH = re.compile(rf"\b(?:blend|tank|site|line|screening)\.{_NAME}(?:\[\d*\])?(?:\.{_NAME}(?:\[\d+\])?)*")


@dataclass(frozen=True)
class Checked:
    """What became of a text: what it is taken as, or why not."""

    echo: Echo | None = None
    problem: str = ""


def fault_sentence(fault: InputError) -> str:
    """A fault beside its row: what is wrong, and for a value that was given what is allowed."""
    given = fault.value not in (None, "")
    return "; ".join(part for part in (fault.problem, fault.hint if given else "") if part)


def paths_named(sentence: str) -> list[str]:
    """Paths of the case that a sentence names."""
    return [path for path in _PATH.findall(sentence) if schema.key_at(path)]


class Desk:
    """A session and the engine that works it out."""

    def __init__(self, session: Session, engine: Engine):
        self.session, self.engine = session, engine
        self.known = fields.NOTHING
        self.ready = False  # whether the heavy libraries are loaded
        self._names: tuple[Name, ...] = ()
        self._told: tuple[int, object | None] = (-1, None)  # revision and screening of the last full result
        self.memo_written = ""  # where the memo of these inputs was written

    @property
    def text(self):
        """The case as text."""
        return self.session.text

    # editing

    def check(self, path: str, value: str) -> Checked:
        """Whether a text can stand at a path."""
        if not value.strip():
            return Checked()
        try:
            return Checked(self.engine.check(path, value.strip()))
        except InputError as error:
            return Checked(None, fault_sentence(error))

    def take(self, path: str, value: str) -> Checked:
        """Check a text and enter it; a bad one changes nothing."""
        checked = self.check(path, value)
        if not checked.problem:
            try:
                self.session.edit(path, value)
            except InputError as error:
                return Checked(None, fault_sentence(error))
        return checked

    def load_names(self) -> None:
        """Read the names of stocks and species once."""
        self._names = self._names or self.engine.names()

    def matches(self, typed: str, most: int = 40) -> list[Name]:
        """Stocks and species whose name, synonym or number holds what was typed; best first."""
        self.load_names()
        wanted = typed.strip().lower()

        def rank(name: Name) -> int:
            own = name.name.lower()
            others = [other.lower() for other in name.also]
            if own == wanted or wanted in others:
                return 0
            if any(word.startswith(wanted) for word in (own, *re.split(r"[-\s,]+", own))):
                return 1
            if wanted in own:
                return 2
            return 3 if any(wanted in other for other in others) else 9

        ranked = [(rank(name), name.kind != "stock", len(name.name), name) for name in self._names]
        return [name for place, *_, name in sorted(ranked) if place < 9][:most]

    # results

    def attach(self, revision: int, worked: Worked) -> None:
        """Keep what was worked out; faults and echoes are kept by path."""
        if not self.session.attach(Result(revision, worked.screening, worked.faults, worked.full)):
            return
        if worked.full and worked.screening is not None:
            self._told = (revision, worked.screening)
        faults: dict[str, str] = {}
        for fault in worked.faults:
            sentence = fault_sentence(fault)
            faults[fault.path] = f"{faults[fault.path]}; {sentence}" if fault.path in faults else sentence
        echoes = worked.echoes or (self.known.echoes if worked.faults else {})
        self.known = Known(echoes, faults, frozenset(self.missing(worked.screening)))

    @staticmethod
    def missing(screening) -> set[str]:
        """Paths that findings name as not given."""
        found: set[str] = set()
        for finding in screening.findings if screening else ():
            if finding.verdict == "unknown":
                found |= set(paths_named(finding.reason))
        return found

    def sections(self, step: str, marks: Glyphs | None = None, here: Collection[str] = ()) -> list[fields.Section]:
        """Sections of an input step; below the inputs of a liquid how it meets its sheet and what it amounts to.

        `here` names the record and the value under the cursor, which are never folded away.
        """
        liquid = {"blend": "receipt", "tank": "heel"}.get(step)
        told = self._residuals(liquid, marks or glyphs("ascii")) if liquid else []
        revision, screening = self._told
        lines = information(screening, liquid) if liquid and self.session.screening else []
        if lines:
            note = say("information", "note" if revision == self.session.revision else "stale")
            told.append(fields.told(say("information", "heading"), note, lines))
        made = fields.sections(step, self.text, self.known, told)
        left = {path: fault for path, fault in self.known.faults.items() if self.step_of(path) == step}
        return folded([*made, *fields.unshown(made, self.text, left)], self.session.opened, here)

    def unfold(self, path: str) -> bool:
        """Open the fold a path belongs to; whether that changes what is shown."""
        name = fields.fold_of(path)
        if not name or name in self.session.opened:
            return False
        self.session.opened.add(name)
        return True

    def _residuals(self, liquid: str, marks: Glyphs) -> list[fields.Section]:
        """How a liquid of the last screening meets its laboratory sheet."""
        case = getattr(self.session.screening, "case", None)
        contents = getattr(getattr(case, "tank", None), "contents", None)
        blend = getattr(case if liquid == "receipt" else contents, "blend", None)
        base = fields.LAB if liquid == "receipt" else fields.HEEL_LAB
        if not getattr(blend, "figures", ()) or not self.text.has(base):
            return []
        return [residual_section(blend, base, residual_note(blend, self.session.stale), marks)]

    def refusal(self, step: str) -> str:
        """Why the laboratory sheet of a step is refused as a whole; '' where it is not."""
        base = {"blend": fields.LAB, "tank": fields.HEEL_LAB}.get(step, "")
        fault = self.known.faults.get(base, "")
        return say("residuals", "refused", why=fault) if fault else ""

    # how the steps stand

    def step_of(self, path: str) -> str:
        """The step that shows a path."""
        head = re.split(r"[.\[]", path)[0]
        return {"screening": "site", "case": "memo"}.get(head, head if head in INPUT_STEPS else "findings")

    def states(self) -> list[StepState]:
        """How each of the six steps stands."""
        made = []
        for number, step in enumerate(STEPS, 1):
            mark, words, tone = self._state(step)
            made.append(StepState(number, say("steps", step), mark, words, tone))
        return made

    def _state(self, step: str) -> tuple[str, str, str]:
        if step == "findings":
            return self._findings_state()
        if step == "memo":
            return ("+", say("state", "written"), "") if self.memo_written else ("", say("state", "draft"), "")
        bad = [path for path in self.known.faults if self.step_of(path) == step]
        if bad:
            return "!", say("state", "bad" if len(bad) > 1 else "bad_one", count=len(bad)), "beyond"
        needed = [path for path in self.known.missing if self.step_of(path) == step]
        if needed:
            return "?", say("state", "needs" if len(needed) > 1 else "needs_one", count=len(needed)), "unknown"
        if self.session.screening is None:
            return "", say("state", "not_read"), ""
        if not self.text.has(step):
            return "-", say("state", "blank"), "dim"
        return "+", say("state", "done"), ""

    def _findings_state(self) -> tuple[str, str, str]:
        if self.session.result is None:
            return "", say("state", "not_yet"), ""
        if self.session.screening is None:
            return "?", say("state", "not_possible"), "unknown"
        worst = self.session.screening.worst
        count = sum(1 for f in self.session.screening.findings if f.verdict == worst)
        mark = next(f.mark for f in self.session.screening.findings if f.verdict == worst) if count else "?"
        return mark, f"{count} {worst}", worst if worst in ("beyond", "unknown", "near") else ""

    # words

    def help_of(self, path: str) -> list[tuple[str, str]]:
        """Help for a value as label and text: meaning, how to write it, usual range, where to find it."""
        key = schema.key_at(path)
        if key is None:
            return []
        lines = [(say("help", "meaning"), key.meaning)]
        if key.example:
            lines.append((say("help", "example"), key.example))
        if key.allowed:
            lines.append((say("help", "allowed"), key.allowed))
        if key.usual:
            lines.append((say("help", "usual"), key.usual))
        if key.where:
            lines.append((say("help", "where"), key.where))
        if key.note and key.default is not None:
            lines.append((say("help", "default"), key.note))
        if extra := table("fields").get(schema.pattern(path)):
            lines.append((say("help", "note"), extra))
        lines.append((say("help", "path"), path))
        return lines

    def choices(self, path: str) -> tuple[str, ...]:
        """The values a path can take, where they are few."""
        key = schema.key_at(path)
        if key is None:
            return ()
        if key.kind == schema.MONTH:
            return edits.MONTHS
        if key.kind == schema.FLAG:
            return ("true", "false")
        if path == "screening.criteria":
            return self.engine.packs()
        return key.choices
