"""The walk: six steps over one case, with the rows that stand around them."""

from __future__ import annotations

from typing import ClassVar

from textual.app import ComposeResult
from textual.binding import Binding
from textual.containers import Container, Vertical
from textual.screen import Screen
from textual.widgets import ContentSwitcher, Static

from screener.app.chrome import Hint, KeyRow, StepBar, Tally, TitleLine
from screener.app.desk import INPUT_STEPS, STEPS, Desk
from screener.app.findings import FindingsPane
from screener.app.glyphs import Glyphs
from screener.app.inputs import InputPane
from screener.app.lines import Lines
from screener.app.memo_pane import MemoPane
from screener.app.messages import Broke, MemoBuilt, Warmed, WorkDoing, WorkDone, WorkEnded
from screener.app.pictures import tally
from screener.app.saving import Saving
from screener.app.strip import StripInput
from screener.app.talk import Talk
from screener.app.words import say
from screener.app.workers import Workers

WAIT_BEFORE_WORK = 0.01  # seconds of calm after an edit before it is worked out
WAIT_WHILE_TYPING = 0.25  # before it is looked again whether the share of a new part is there
WAIT_BEFORE_AUTOSAVE = 1.0


class WalkScreen(Talk, Saving, Workers, Screen):
    """One case, six steps."""

    BINDINGS: ClassVar = [
        Binding("f1,question_mark", "help", "Help", id="walk.help"),
        Binding("f5,r", "work", "Work it out", id="walk.work"),
        Binding("ctrl+s", "save", "Save", id="walk.save"),
        Binding("f6,n", "step(1)", "Next step", id="walk.next"),
        Binding("v", "view", "View", id="walk.view"),
        Binding("escape", "stop", "Stop", id="walk.stop"),
        Binding("N", "step(-1)", "Step before", show=False, id="walk.before"),
        Binding("ctrl+z", "undo", "Undo", show=False, id="walk.undo"),
        Binding("ctrl+y", "redo", "Redo", show=False, id="walk.redo"),
        Binding("ctrl+g", "letters", "Letters", show=False, id="walk.letters"),
        *(Binding(str(i), f"go({i})", show=False, id=f"walk.go_{i}") for i in range(1, 7)),
    ]
    HORIZONTAL_BREAKPOINTS: ClassVar = [(0, "-tiny"), (40, "-narrow"), (120, "-wide")]
    VERTICAL_BREAKPOINTS: ClassVar = [(0, "-flat"), (14, "-low"), (20, "-short"), (34, "-tall")]
    CSS_PATH = "walk.tcss"

    def __init__(self, desk: Desk, marks: Glyphs, first: str = "blend"):
        super().__init__()
        self.desk, self.marks = desk, marks
        self.current = first
        self._calm = self._autosave = None
        self._markdown = ""
        self._trouble = ""  # a sentence that stays beside the verdicts until the next result

    def compose(self) -> ComposeResult:
        yield Static(say("walk", "too_small"), id="too-small", markup=False)
        yield TitleLine()
        with Container(id="body"):
            yield StepBar()
            with Vertical(id="main"), ContentSwitcher(initial=self.current):
                for step in INPUT_STEPS:
                    yield InputPane(step, self.desk, self.marks)
                yield FindingsPane(self.marks, id="findings")
                yield MemoPane(self.desk, self.marks)
        yield Tally()
        yield Hint()
        yield KeyRow(self.marks)

    def on_mount(self) -> None:
        self.query_one(Hint).marks = self.marks
        self.action_go(STEPS.index(self.current) + 1)
        if self.app.keys_trouble:
            self.tell(self.app.keys_trouble, "bad")
        self.call_after_refresh(self.painted)

    def painted(self) -> None:
        """The first screen stands; only now are the heavy libraries loaded."""
        self.warm()

    # showing

    def refresh_case(self) -> None:
        """Show the case as it now is in the step in front; the others follow when they come to the front."""
        if self.current != "findings":
            self.query_one(f"#{self.current}").update_case()
        self.refresh_frame()

    def refresh_frame(self) -> None:
        """Title, steps and verdict strip."""
        session, marks = self.desk.session, self.marks
        title = self.desk.text.get("case.title") or (session.path.name if session.path else say("walk", "untitled"))
        state = "changed" if session.dirty else "saved" if session.path else "new"
        self.query_one(TitleLine).tell(title, say("walk", "units"), marks)
        self.query_one(StepBar).tell(self.desk.states(), STEPS.index(self.current) + 1, say("saved", state), marks)
        words, tone = self._result_words()
        counted = tally([f.verdict for f in session.screening.findings], marks) if session.screening else ()
        self.query_one(Tally).tell(counted, words, tone)
        self.refresh_bindings()

    def _result_words(self) -> tuple[str, str]:
        """How the verdicts on the screen stand to the inputs on it."""
        session = self.desk.session
        if self._trouble:
            return self._trouble, "bad"
        if self.working:
            fresh = session.result is not None and not session.stale
            return say("result", "more" if fresh else self.doing), "dim" if fresh else "unknown"
        if session.result is None:
            return say("result", "loading" if not self.desk.ready else "none"), "dim"
        if session.stale:
            return say("result", "stale"), "near"
        if session.screening is None:
            return say("result", "faults", count=len(session.result.faults)), "bad"
        return "", ""

    def on_input_pane_pointed(self, event: InputPane.Pointed) -> None:
        if self.current == event.step:
            self.query_one(Hint).tell(event.text, event.tone)

    def on_memo_pane_pointed(self, event: MemoPane.Pointed) -> None:
        if self.current == "memo":
            self.query_one(Hint).tell(event.text, event.tone)

    def on_findings_pane_pointed(self, event: FindingsPane.Pointed) -> None:
        if self.current == "findings":
            self.query_one(Hint).tell(event.text)

    def tell(self, text: str, tone: str = "") -> None:
        """Say in the hint row what was done; it stays until the cursor moves."""
        pane = self.query_one(f"#{self.current}")
        if isinstance(pane, (InputPane, MemoPane)):
            pane.news = text
        self.query_one(Hint).tell(text, tone)

    # walking

    def action_go(self, number: int) -> None:
        self.current = STEPS[number - 1]
        self.query_one(ContentSwitcher).current = self.current
        pane = self.query_one(f"#{self.current}")
        if isinstance(pane, (InputPane, MemoPane)):
            pane.news = ""
            pane.update_case()
        main = pane.query_one("#bars" if self.current == "findings" else ".sheet", Lines)
        self.set_focus(main)  # at once: a key typed ahead belongs to the new step
        self.query_one(Hint).tell(pane.hint)
        if self.current == "memo":
            self.refresh_memo()
        self.refresh_frame()

    def action_step(self, by: int) -> None:
        self.action_go((STEPS.index(self.current) + by) % len(STEPS) + 1)

    def on_step_bar_picked(self, event: StepBar.Picked) -> None:
        self.action_go(event.number)

    def on_findings_pane_go_to(self, event: FindingsPane.GoTo) -> None:
        self.go_to(event.path)

    def go_to(self, path: str) -> None:
        """Put the cursor on an input."""
        step = self.desk.step_of(path)
        self.action_go(STEPS.index(step) + 1)
        if step != "findings":
            pane = self.query_one(f"#{step}")
            pane.go_to(path)
            self.query_one(Hint).tell(pane.hint)

    def action_view(self) -> None:
        self.query_one(FindingsPane).next_view()
        self.refresh_bindings()

    # changing

    def on_input_pane_changed(self, event: InputPane.Changed) -> None:
        self.case_changed()

    def on_memo_pane_changed(self, event: MemoPane.Changed) -> None:
        self.case_changed()
        self.refresh_memo()

    def case_changed(self) -> None:
        """After a change: results are stale, and after a moment of calm they are worked out again."""
        self._trouble = ""
        self.desk.memo_written = ""
        self.refresh_frame()
        for timer in (self._calm, self._autosave):
            if timer is not None:
                timer.stop()
        self._calm = self.set_timer(WAIT_BEFORE_WORK, self._work_if_stale)
        self._autosave = self.set_timer(WAIT_BEFORE_AUTOSAVE, self.desk.session.autosave)

    def _work_if_stale(self) -> None:
        if any(pane.unfinished for pane in self.query(InputPane)):
            self._calm = self.set_timer(WAIT_WHILE_TYPING, self._work_if_stale)
        elif self.desk.ready and (self.desk.session.stale or self.desk.session.result is None):
            self.begin()
            self.refresh_frame()

    def action_undo(self) -> None:
        self._after_swap("undone", self.desk.session.undo())

    def action_redo(self) -> None:
        self._after_swap("redone", self.desk.session.redo())

    def _after_swap(self, word: str, label: str | None) -> None:
        if label is None:
            return
        self.refresh_case()
        self.case_changed()
        self.tell(say("change", word, what=label))

    # working

    def action_work(self) -> None:
        self._trouble = ""
        self.begin()
        self.refresh_frame()

    def action_stop(self) -> None:
        self.stop()
        self.refresh_frame()
        self.tell(say("result", "stopped"))

    def on_warmed(self, event: Warmed) -> None:
        self.desk.ready = True
        self.begin()
        self.refresh_frame()

    def on_work_doing(self, event: WorkDoing) -> None:
        if self.wanted(event.token):
            self.doing = event.what
            self.refresh_frame()

    def on_work_done(self, event: WorkDone) -> None:
        if not self.wanted(event.token):
            return
        self.doing = "working"
        self.desk.attach(event.revision, event.worked)
        result = self.desk.session.result
        self.query_one(FindingsPane).show(result.screening, result.faults, full=result.full)
        self.refresh_case()
        if self.current == "findings":
            self.query_one(Hint).tell(self.query_one(FindingsPane).hint)
        if result.full:
            self.refresh_memo()

    def on_work_ended(self, event: WorkEnded) -> None:
        self.ended(event.token)
        self.refresh_frame()

    def on_broke(self, event: Broke) -> None:
        if event.what == "work":
            self.ended(event.token)
        self._trouble = event.sentence
        self.refresh_frame()

    # memo

    def refresh_memo(self) -> None:
        """Fill the memo again when it is on the screen and its inputs are worked out."""
        session, pane = self.desk.session, self.query_one(MemoPane)
        if self.current != "memo":
            return
        if session.screening is None:
            pane.show_document(None, say("memo", "nothing"))
        elif not session.complete:
            pane.show_document(None, say("memo", "stale"))
        else:
            self.build_memo(session.revision, session.screening, pane.asked)

    def on_memo_built(self, event: MemoBuilt) -> None:
        if event.revision == self.desk.session.revision:
            self._markdown = event.markdown
            self.query_one(MemoPane).show_document(event.document)

    # keys

    def check_action(self, action: str, parameters: tuple) -> bool | None:
        """Keys that would do nothing now are not keys now."""
        session = self.desk.session
        if action == "view":
            return self.current == "findings" and session.screening is not None
        if action == "stop":
            return self.working and not isinstance(self.focused, StripInput)
        if action == "undo":
            return session.can_undo
        if action == "redo":
            return session.can_redo
        if action == "save":
            return session.dirty or session.path is None
        return True
