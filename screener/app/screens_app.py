"""The Textual application: which screen is in front, opening and leaving cases."""

from __future__ import annotations

import os
from datetime import datetime
from pathlib import Path
from typing import ClassVar

from textual.app import App
from textual.binding import Binding

from screener.app.desk import Desk
from screener.app.dialogs import Question
from screener.app.engine import Engine
from screener.app.glyphs import Glyphs
from screener.app.keymap import keys_file, own_keys
from screener.app.palette import Command, Commands, Palette
from screener.app.session import Session, left_behind
from screener.app.start import StartScreen
from screener.app.theme import DARK, LIGHT, PLAIN, THEMES
from screener.app.walk import WalkScreen
from screener.app.words import say
from screener.casefile import CaseText
from screener.ground.errors import InputError


class ScreenerApp(App):
    """Opens cases and holds what outlives one."""

    COMMANDS: ClassVar = {Commands}
    ENABLE_COMMAND_PALETTE = True
    COMMAND_PALETTE_BINDING = "ctrl+p"
    BINDINGS: ClassVar = [Binding("ctrl+q", "quit", "Quit", show=False, priority=True, id="app.quit")]
    TITLE = "Screener"

    def __init__(self, engine: Engine, marks: Glyphs, path: str | None = None):
        plain = "NO_COLOR" in os.environ
        super().__init__(ansi_color=True if plain else None)
        for theme in THEMES:
            self.register_theme(theme)
        self.theme = PLAIN.name if plain else DARK.name
        self.animation_level = "none"
        self.engine, self.marks, self.first = engine, marks, path
        self.keys_trouble = ""  # what is wrong with the file of one's own keys
        self.written: set[str] = set()  # memos written since the start

    def get_theme_variable_defaults(self) -> dict[str, str]:
        """Variables of our own that a foreign theme would lack."""
        return {name: value for name, value in DARK.variables.items()}

    def on_mount(self) -> None:
        keys, self.keys_trouble = own_keys(keys_file())
        self.set_keymap(keys)
        if self.first:
            self.open_path(Path(self.first).expanduser())
        else:
            self.push_screen(StartScreen(self.marks, self.keys_trouble))

    # opening

    def open_path(self, path: Path) -> None:
        """Open a file; when an unsaved version of it was left behind, ask which is wanted."""
        recovery = left_behind(path, path.parent)
        if recovery is None:
            self._open(lambda: Session.open(path, CaseText.parse))
            return
        when = datetime.fromtimestamp(recovery.written).strftime("%d %b %H:%M")

        def answered(answer: str | None) -> None:
            if answer == "kept":
                self._open(lambda: Session.recovered(path, recovery, CaseText.parse))
            elif answer == "file":
                self._open(lambda: Session.open(path, CaseText.parse))
            elif not self.in_front(WalkScreen):
                self._start_over()

        answers = (("kept", say("recover", "kept")), ("file", say("recover", "file")))
        self.push_screen(
            Question(say("recover", "question", name=path.name, when=when, lines=recovery.lines), answers, self.marks),
            answered,
        )

    def open_example(self, path: Path) -> None:
        """Open a shipped example as a case without a file: saving asks for a name."""
        self._open(lambda: Session.open(path, CaseText.parse).as_new(Path.cwd()))

    def open_new(self) -> None:
        """Start an empty case."""
        self._open(lambda: Session(CaseText.parse(say("new", "text")), folder=Path.cwd()))

    def _open(self, make) -> None:
        try:
            session = make()
        except InputError as error:
            self._start_over(str(error))
            return
        screen = WalkScreen(Desk(session, self.engine), self.marks)
        if isinstance(self.screen, (StartScreen, WalkScreen)):
            self.switch_screen(screen)
        else:
            self.push_screen(screen)

    def _start_over(self, note: str = "") -> None:
        screen = StartScreen(self.marks, note)
        if isinstance(self.screen, (StartScreen, WalkScreen)):
            self.switch_screen(screen)
        else:
            self.push_screen(screen)

    def in_front(self, kind: type) -> bool:
        """Whether a screen of a kind is in front."""
        return isinstance(self.screen, kind)

    # leaving

    def action_start(self) -> None:
        """Back to the choice of cases."""
        if isinstance(self.screen, WalkScreen):
            self.screen.leave(self._start_over)

    async def action_quit(self) -> None:
        """Leave; a case with changes is asked about."""
        walk = next((screen for screen in reversed(self.screen_stack) if isinstance(screen, WalkScreen)), None)
        if walk is None:
            self.exit(0)
        elif self.screen is walk:
            walk.leave(lambda: self.exit(0))

    def action_command_palette(self) -> None:
        """Show the sentences of what can be done now."""
        if not Palette.is_open(self):
            self.push_screen(Palette())

    @property
    def commands_everywhere(self) -> list[Command]:
        """Sentences that hold on every screen."""
        ground = [] if self.theme == PLAIN.name else [Command(say("palette", "theme"), "app.ground")]
        return [*ground, Command(say("palette", "quit"), "app.quit")]

    def action_ground(self) -> None:
        """Change between dark and light ground."""
        self.theme = LIGHT.name if self.theme == DARK.name else DARK.name
