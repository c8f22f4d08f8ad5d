"""The command palette: plain sentences, and only those that can be done now."""

from __future__ import annotations

from typing import NamedTuple

from textual.command import DiscoveryHit, Hit, Hits, Provider


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
