"""What can be done to the rows of an input step: add, remove, clear, scale, open and fold."""

from __future__ import annotations

from screener.app import edits, fields
from screener.app.folding import FOLD
from screener.app.words import say
from screener.ground.errors import InputError


class RowActions:
    """Row keys of an input pane; those that would do nothing are no keys."""

    @property
    def _is_adder(self) -> bool:
        return self.sheet.key.endswith("[+]")

    @property
    def _is_opener(self) -> bool:
        return self.sheet.key.startswith(FOLD)

    @property
    def _acts(self) -> bool:
        """Whether the row under the cursor does something instead of holding a value."""
        return self._is_adder or self._is_opener

    @property
    def _fold_here(self) -> str:
        """Name of the fold the cursor stands in; '' where nothing folds."""
        section = self.sheet.section
        return section.fold if section and FOLD + section.fold in self.sheet.keys else ""

    @property
    def _row_at(self) -> str:
        """Path of the row of a list that the cursor stands in; '' outside lists."""
        key = self.sheet.key
        return "" if self._is_adder or "]" not in key else key[: key.rindex("]") + 1]

    @property
    def _list_here(self) -> str:
        """Path of the list the cursor stands in or at the end of; '' elsewhere."""
        key = self.sheet.key
        return key[: key.rindex("[")] if "[" in key else ""

    @property
    def _part_base(self) -> str:
        return self._list_here.removesuffix(".parts") if self._list_here.endswith("parts") else ""

    def check_action(self, action: str, parameters: tuple) -> bool | None:
        """Keys that would do nothing here are not keys here."""
        if action in ("add", "remove", "clear", "scale", "fold") and self.strip.editing:
            return False
        if action == "add":
            return bool(self._list_here) and not (
                self._list_here == "site.months" and self.desk.text.rows("site.months") >= 12
            )
        if action == "remove":
            return bool(self._row_at)
        if action == "clear":
            cell = self.sheet.cell
            return bool(cell and not self._acts and self.desk.text.has(cell.path))
        if action == "fold":
            return bool(self._fold_here)
        if action == "scale":
            total = fields.share_total(self._part_base, self.desk.text) if self._part_base else None
            scaled = self.desk.text.get(f"{self._part_base}.scale") if self._part_base else None
            return scaled == "true" or (total is not None and abs(total - 100.0) > 0.05)
        return True

    def action_fold(self) -> None:
        """Open a fold and go to the first row it held, or fold it and go to the row that opens it."""
        name, opened, sheet = self._fold_here, self.desk.session.opened, self.sheet
        if name in opened:
            opened.remove(name)
            sheet.move_to(FOLD + name)
            self.update_case()
            return
        opened.add(name)
        before = set(sheet.keys)
        self.update_case()
        sheet.move_to(next((key for key in sheet.keys if key not in before), sheet.key))

    def action_add(self) -> None:
        here = self._list_here
        if here.endswith("parts"):
            self._search(f"{here}[+]", say("strip", "add_part"), "")
        else:
            self._change(say("change", "add"), lambda text: edits.add_row(text, here))
            self.sheet.go_to(f"{here}[{self.desk.text.rows(here) - 1}]")
            self._read()

    def action_remove(self) -> None:
        at = self._row_at
        self._change(say("change", "remove"), lambda text: edits.remove_row(text, at))

    def action_clear(self) -> None:
        path = self.sheet.cell.path
        self._change(path, lambda text: edits.enter(text, path, ""))

    def action_scale(self) -> None:
        base = self._part_base
        on = self.desk.text.get(f"{base}.scale") != "true"
        self._change(say("change", "scale"), lambda text: edits.scale(text, base, on))

    def _change(self, label: str, act) -> None:
        """Make a change and show it; one that is refused is told in the hint row."""
        try:
            self.desk.session.change(label, act)
        except InputError as error:
            self.point(str(error), "bad")
            return
        self.update_case()
        self.post_message(self.Changed())
