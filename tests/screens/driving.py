"""Opening the app in a test, waiting for its workers, and reading its text grid."""

from __future__ import annotations

import io
from contextlib import asynccontextmanager

from rich.console import Console

from screener.app.glyphs import glyphs
from screener.app.inputs import InputPane
from screener.app.screens_app import ScreenerApp
from screener.app.walk import WalkScreen
from tests.screens.made import CASE, Playing


@asynccontextmanager
async def opened(path=None, playing=None, size=(80, 24), marks="braille"):
    """The app on a case file, worked out; yields the pilot."""
    playing = playing or Playing()
    app = ScreenerApp(playing.engine(), glyphs(marks), str(path) if path else None)
    async with app.run_test(size=size) as pilot:
        pilot.playing = playing
        await settled(pilot)
        yield pilot


async def settled(pilot, most: float = 5.0):
    """Wait until no worker has anything to do and every message was handled."""
    for _ in range(int(most / 0.02)):
        await pilot.pause(0.02)
        screen = next((s for s in pilot.app.screen_stack if isinstance(s, WalkScreen)), None)
        workers = [worker for worker in pilot.app.workers if not worker.is_finished]
        waiting = screen and screen.desk.session.stale and screen.desk.ready
        if waiting and any(pane.unfinished for pane in screen.query(InputPane)):
            waiting = False  # a share is being typed, and nothing is worked out meanwhile
        if workers or (screen and screen.working) or waiting:
            continue
        await pilot.pause()
        return
    raise AssertionError("the app did not come to rest")


async def pressed(pilot, *keys):
    """Press keys one after another and wait for what follows."""
    for key in keys:
        await pilot.press(key)
    await settled(pilot)


async def typed(pilot, text: str):
    """Type a text, letter by letter."""
    names = {" ": "space", ".": "full_stop", ",": "comma", "%": "percent_sign", "-": "minus", "/": "slash", "_": "underscore"}
    await pilot.press(*(names.get(letter, letter) for letter in text))
    await pilot.pause()


def grid(app) -> str:
    """The screen as text: what export_screenshot draws, without its drawing."""
    width, height = app.size
    console = Console(
        width=width, height=height, file=io.StringIO(), force_terminal=True, color_system="truecolor", record=True,
        legacy_windows=False,
    )  # fmt: skip
    console.print(app.screen._compositor.render_update(full=True, screen_stack=app._background_screens))
    return "\n".join(line.rstrip() for line in console.export_text().splitlines())


def walk(pilot) -> WalkScreen:
    """The walk screen of the app."""
    return next(s for s in pilot.app.screen_stack if isinstance(s, WalkScreen))


def written_case(folder, text=CASE, name="tank12.toml"):
    """A case file in a folder."""
    path = folder / name
    path.write_text(text, encoding="utf-8")
    return path


def hint(pilot) -> str:
    """Words of the hint row."""
    from screener.app.chrome import Hint

    return walk(pilot).query_one(Hint).text


def tally_words(pilot) -> str:
    """Words beside the verdicts."""
    from screener.app.chrome import Tally

    return walk(pilot).query_one(Tally).state


def keys_shown(pilot) -> list[str]:
    """Descriptions in the key row."""
    from screener.app.chrome import KeyRow

    return [words for _, words in pilot.app.screen.query_one(KeyRow)._shown()]
