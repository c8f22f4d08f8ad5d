"""Saving, leaving and writing the memo: the file half of the walk screen."""

from __future__ import annotations

from pathlib import Path

from screener.app.dialogs import Question
from screener.app.memo_pane import MemoPane
from screener.app.naming import NameBox
from screener.app.session import FileChanged, before_beside
from screener.app.words import say
from screener.ground.errors import InputError


class Saving:
    """File actions of the walk screen."""

    def action_save(self) -> None:
        """Save under the name the case has, or ask for one."""
        self.save_then(None)

    def action_save_as(self) -> None:
        """Save under another name."""
        self._ask_name(None)

    def save_then(self, after) -> None:
        """Save, then do something; nothing follows a save that did not happen."""
        if self.desk.session.path is None:
            self._ask_name(after)
        else:
            self._write_case(None, after)

    def _ask_name(self, after) -> None:
        session = self.desk.session
        proposed = str(session.path or session.folder / "case.toml")

        def named(name: str | None) -> None:
            if name:
                path = (session.folder / Path(name).expanduser()).with_suffix(".toml")
                self._write_case(path, after)

        self.app.push_screen(NameBox(say("save", "name"), proposed, self.marks), named)

    def _write_case(self, path: Path | None, after, *, anyway: bool = False) -> None:
        session = self.desk.session
        try:
            target = session.save(path, anyway=anyway)
        except FileChanged as error:
            self._ask_over(str(error), lambda: self._write_case(path, after, anyway=True))
            return
        except InputError as error:
            self.tell(str(error), "bad")
            return
        kept = before_beside(target)
        words = say("save", "done", path=target)
        self.tell(f"{words}; {say('save', 'comments', path=kept.name)}" if session.kept_comments else words)
        self.refresh_frame()
        self.query_one(MemoPane).update_case()
        if after:
            after()

    def _ask_over(self, name: str, act) -> None:
        answers = (("no", say("save", "keep_theirs")), ("yes", say("save", "write_over")))
        self.app.push_screen(
            Question(say("save", "changed_outside", path=name), answers, self.marks),
            lambda answer: act() if answer == "yes" else None,
        )

    def leave(self, then) -> None:
        """Leave the case: at once, or after a question when there are changes."""
        session = self.desk.session
        if not session.dirty:
            session.discard_unsaved()
            then()
            return

        def answered(answer: str | None) -> None:
            if answer == "save":
                self.save_then(then)
            elif answer == "drop":
                session.discard_unsaved()
                then()

        answers = (("save", say("leave", "save")), ("drop", say("leave", "drop")), ("stay", say("leave", "stay")))
        self.app.push_screen(Question(say("leave", "question"), answers, self.marks), answered)

    # memo

    def on_memo_pane_write(self, event: MemoPane.Write) -> None:
        """Write the memo; a file of that name that we did not write is asked about."""
        pane, session = self.query_one(MemoPane), self.desk.session
        if not session.complete or pane.document is None:
            self.tell(say("memo", "stale"), "near")
            return
        target = session.folder / Path(pane.file).expanduser()
        if target.exists() and str(target) not in self.app.written:
            answers = (("no", say("memo", "keep")), ("yes", say("memo", "over")))
            self.app.push_screen(
                Question(say("memo", "exists", path=target), answers, self.marks),
                lambda answer: self._write_memo() if answer == "yes" else None,
            )
            return
        self._write_memo()

    def _write_memo(self) -> None:
        pane = self.query_one(MemoPane)
        try:
            path = self.desk.session.export(pane.file, self._markdown)
        except InputError as error:
            self.tell(str(error), "bad")
            return
        self.app.written.add(str(path))
        self.desk.memo_written = str(path)
        self.tell(say("memo", "written", path=path, size=f"{path.stat().st_size / 1000:.1f}"))
        self.refresh_frame()
