"""The command palette: plain sentences, and only those that can be done now."""

from __future__ import annotations

from typing import NamedTuple

from textual.command import CommandPalette, DiscoveryHit, Hit, Hits, Provider

from screener.app.words import say


class Command(NamedTuple):
    """One sentence and the action behind it."""

    sentence: str
    action: str


class Commands(Provider):
    """The commands of the screen in front."""

    @property
    def _commands(self) -> list[Command]:
        offered = getattr(self.screen, "commands", None)
        return offered() if offered else []

    async def discover(self) -> Hits:
        """All of them, before anything is typed."""
        for command in self._commands:
            yield DiscoveryHit(command.sentence, self._runner(command))

    async def search(self, query: str) -> Hits:
        """Those that fit what was typed."""
        matcher = self.matcher(query)
        for command in self._commands:
            score = matcher.match(command.sentence)
            if score > 0:
                yield Hit(score, matcher.highlight(command.sentence), self._runner(command))

    def _runner(self, command: Command):
        screen = self.screen

        async def run() -> None:
            await screen.run_action(command.action)

        return run


class Palette(CommandPalette):
    """The list of sentences, drawn with nothing a plain terminal lacks."""

    DEFAULT_CSS = """
    Palette { background: $ground; }
    Palette SearchIcon { display: none; }
    Palette > Vertical { margin-top: 1; background: $ground; }
    Palette #--input { border: none; padding: 0 1; background: $field; }
    Palette #--input.--list-visible { border: none; }
    Palette #--results { border: none; background: $ground; }
    Palette CommandList { border: none; }
    Palette LoadingIndicator { border: none; display: none; }
    """

    def __init__(self):
        super().__init__(placeholder=say("palette", "placeholder"), id="--command-palette")
