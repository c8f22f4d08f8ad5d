"""Long work in threads that post messages: the only place where any exception is caught.

One thread works a case out at a time. When the inputs change meanwhile, the
newest are worked out next; results of a stopped run are dropped.
"""

from __future__ import annotations

import time
import traceback
from pathlib import Path

from textual import work

from screener.app.engine import Doing
from screener.app.messages import Broke, MemoBuilt, Warmed, WorkDoing, WorkDone, WorkEnded
from screener.app.words import say


def log_bug(error: Exception) -> str:
    """Write the traceback of a bug to a file and say where, in one sentence."""
    text = "".join(traceback.format_exception(error))
    file = Path.home() / ".screener" / "bug.txt"
    sentence = say("bug", "sentence", kind=type(error).__name__, what=str(error) or "-")
    try:
        file.parent.mkdir(exist_ok=True)
        file.write_text(text, encoding="utf-8")
    except OSError:
        return sentence
    return f"{sentence} {say('bug', 'file', file=file)}"


class Workers:
    """Worker half of the walk screen."""

    working = False  # a run that is still wanted
    doing = "working"  # what it spends its time on; a key of the words about results
    _token = 0  # number of the newest run
    _again = False  # inputs changed while working
    _busy = 0  # token of the run in the thread, 0 for none

    def begin(self) -> None:
        """Work the case out, now or as soon as the running thread is done."""
        if self._busy:
            self._again = True
            self.working = True
            return
        self._token += 1
        self._busy, self._again, self.working = self._token, False, True
        self.doing = "working"
        session = self.desk.session
        source = str(session.path) if session.path else ""
        self._work(self._token, session.revision, session.text.toml(), source)

    def stop(self) -> None:
        """Drop the run in hand; what was worked out before stays on the screen, marked stale."""
        self.working, self._again = False, False
        self._token += 1

    def wanted(self, token: int) -> bool:
        """Whether the result of a run is still wanted."""
        return token == self._token

    def ended(self, token: int) -> None:
        """Take note that a thread has ended; what was asked for meanwhile begins."""
        self._busy = 0
        if self._again:
            self.begin()
        elif token == self._token:
            self.working = False

    @work(thread=True, group="warm", exit_on_error=False)
    def warm(self) -> None:
        """Load what the screening needs."""
        try:
            self.desk.engine.warm()
            self.desk.load_names()
        except Exception as error:  # noqa: BLE001  the worker boundary
            self.post_message(Broke("warm", 0, log_bug(error)))
            return
        self.post_message(Warmed())

    @work(thread=True, group="work", exit_on_error=False)
    def _work(self, token: int, revision: int, text: str, source: str) -> None:
        start = time.perf_counter()
        try:
            for worked in self.desk.engine.work(text, source):
                if isinstance(worked, Doing):
                    self.post_message(WorkDoing(token, worked.what))
                    continue
                self.post_message(WorkDone(token, revision, worked, time.perf_counter() - start))
                if self._again or token != self._token:
                    break  # newer inputs wait, or nobody wants this run: the rest of it is left out
        except Exception as error:  # noqa: BLE001  the worker boundary
            self.post_message(Broke("work", token, log_bug(error)))
            return
        self.post_message(WorkEnded(token))

    @work(thread=True, group="memo", exclusive=True, exit_on_error=False)
    def build_memo(self, revision: int, screening, asked) -> None:
        """Fill the memo from a screening."""
        try:
            document = self.desk.engine.memo(screening, asked)
            markdown = self.desk.engine.markdown(document)
        except Exception as error:  # noqa: BLE001  the worker boundary
            self.post_message(Broke("memo", 0, log_bug(error)))
            return
        self.post_message(MemoBuilt(revision, document, markdown))
