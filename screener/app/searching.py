"""Finding a stock or a species by name: the search half of an input step."""

from __future__ import annotations

from screener.app import edits
from screener.app.lines import Block, Lines
from screener.app.rows import paragraph
from screener.app.strip import EditStrip
from screener.app.words import say


class Searching:
    """Search of an input pane: the strip takes the text, the list above it shows what fits."""

    def _search(self, purpose: str, label: str, value: str) -> None:
        self.add_class("-searching")
        self.strip.edit(purpose, label, value)
        self._show_matches("" if purpose.endswith("[+]") else value)
        self.point(say("hint", "search"))

    def _show_matches(self, typed: str) -> None:
        found = self.desk.matches(typed)
        if not self._for_a_part:
            found = [name for name in found if name.kind == "stock"]
        self._found = found
        self.query_one(".matches", Lines).show(self._match_list)

    @property
    def _for_a_part(self) -> bool:
        """Whether a part is looked for, which may be a stock or a species."""
        return "parts[" in self.strip.purpose

    def _match_list(self, width: int):
        if not self._found:
            return (), [Block(tuple(paragraph(say("hint", "no_match"), width, "bad")))]
        blocks = []
        for name in self._found:
            also = ", ".join((name.detail, *name.also[:2])) if name.also or name.detail else ""
            text = f"{name.name}  ({name.kind}{', ' + also if also else ''})"
            blocks.append(Block(tuple(paragraph(self.marks.plain(text), width)), f"{name.kind}:{name.name}"))
        return (), blocks

    def on_edit_strip_stepped(self, event: EditStrip.Stepped) -> None:
        event.stop()
        if self.has_class("-searching"):
            self.query_one(".matches", Lines).action_step(event.by)

    def _take_match(self) -> None:
        kind, _, name = self.query_one(".matches", Lines).key.partition(":")
        if not name or not self._found:
            self.point(say("hint", "no_match"), "bad")
            return
        purpose = self.strip.purpose
        self._leave()
        if "parts[" not in purpose:
            self._change(name, lambda text: edits.enter(text, purpose, name))
            return
        if not purpose.endswith("[+]"):
            at = purpose.rpartition(".")[0]
            self._change(name, lambda text: edits.rename_part(text, at, kind, name))
            self.sheet.go_to(at)
            return
        base = purpose.removesuffix(".parts[+]")
        self._change(name, lambda text: edits.add_part(text, base, kind, name))
        at = f"{base}.parts[{self.desk.text.rows(base + '.parts') - 1}].share"
        if self.sheet.go_to(at):
            self.edit()
