"""Help, letters and the sentences of the command palette: the talking half of the walk screen."""

from __future__ import annotations

from screener.app.dialogs import HelpBox, Letters
from screener.app.findings import FindingsPane
from screener.app.inputs import InputPane
from screener.app.memo_pane import MemoPane
from screener.app.palette import Command
from screener.app.words import say, table


class Talk:
    """Words and overlays of the walk screen."""

    def action_help(self) -> None:
        """Help for the thing in focus, and the keys that work everywhere."""
        title, lines = self.help_now()
        keys = [("", ""), ("", say("help", "keys")), *((key, words) for key, words in self._key_help())]
        self.app.push_screen(HelpBox(title, [*lines, *keys], self.marks))

    def help_now(self) -> tuple[str, list[tuple[str, str]]]:
        """Title and lines of the help for the thing in focus."""
        pane = self.query_one(f"#{self.current}")
        if isinstance(pane, InputPane) and pane.sheet.cell and self.desk.help_of(pane.sheet.cell.path):
            return pane.label, self.desk.help_of(pane.sheet.cell.path)
        if isinstance(pane, MemoPane):
            return say("steps", "memo"), [("", pane.hint), ("", say("widgets", "preview"))]
        name = getattr(self.focused, "HELP", "") if isinstance(pane, FindingsPane) else say("widgets", "sheet")
        return say("steps", self.current), [("", name or say("widgets", "sheet"))]

    def _key_help(self):
        return table("keys").items()

    def action_letters(self) -> None:
        """A letter on every pane; the next key puts the focus there."""
        names, panes = table("panes"), []
        for widget in self.query_one(f"#{self.current}").query("*"):
            if widget.can_focus and widget.display and widget.region.area:
                name = next((names[key] for key in (widget.id, *sorted(widget.classes)) if key in names), "")
                if name:
                    panes.append((widget, name))
        self.app.push_screen(Letters(panes), lambda picked: picked.focus() if picked else None)

    def commands(self) -> list[Command]:
        """Sentences of the palette: only what can be done now."""
        offered = [("help", "help"), ("work", "work"), ("save", "save"), ("save_as", "save_as"), ("undo", "undo")]
        offered += [("redo", "redo"), ("view", "view"), ("stop", "stop"), ("letters", "letters")]
        made = [
            Command(say("palette", words), f"screen.{action}")
            for words, action in offered
            if self.check_action(action, ())
        ]
        made += [
            Command(say("palette", "go", number=i, step=say("steps", step)), f"screen.go({i})")
            for i, step in enumerate(("blend", "tank", "site", "line", "findings", "memo"), 1)
            if step != self.current
        ]
        pane = self.query_one(f"#{self.current}")
        if isinstance(pane, InputPane) and pane.check_action("fold", ()):
            made.append(Command(say("palette", "fold"), "screen.fold"))
        if self.current == "memo" and self.query_one(MemoPane).document is not None:
            made.append(Command(say("palette", "write"), "screen.write_memo"))
        made.append(Command(say("palette", "other"), "app.start"))
        return made + self.app.commands_everywhere

    def action_fold(self) -> None:
        """Open or fold the rows around the cursor from the palette."""
        self.query_one(f"#{self.current}").action_fold()

    def action_write_memo(self) -> None:
        """Write the memo from the palette."""
        self.query_one(MemoPane).action_write()
