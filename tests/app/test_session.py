"""The life of a case, as plain Python: nothing is lost, and a result knows which inputs it belongs to."""

from __future__ import annotations

import os

import pytest

from screener.app.session import FileChanged, Result, Session, left_behind, unsaved_beside
from screener.casefile import CaseText
from screener.ground.errors import InputError

TEXT = """[case]
title = "tank 12"

[tank]
kind = "fixed-roof"
shell_diameter = "24 m"
liquid_level = { low = "1 m", normal = "5 m", high = "9 m" }
"""


@pytest.fixture
def file(tmp_path):
    path = tmp_path / "tank12.toml"
    path.write_text(TEXT, encoding="utf-8")
    return path


@pytest.fixture
def session(file):
    return Session.open(file, CaseText.parse)


def test_an_opened_case_is_not_changed(session):
    assert not session.dirty and not session.can_undo and not session.can_redo
    assert session.text.get("tank.shell_diameter") == "24 m"


def test_edit_undo_redo(session):
    session.edit("tank.shell_diameter", "30 m")
    session.edit("tank.shell_diameter", "31 m")
    assert session.dirty
    assert session.undo() == "tank.shell_diameter"
    assert session.text.get("tank.shell_diameter") == "30 m"
    session.undo()
    assert session.text.get("tank.shell_diameter") == "24 m"
    assert not session.dirty, "back at what the file holds"
    assert session.undo() is None
    session.redo()
    assert session.redo() == "tank.shell_diameter"
    assert session.text.get("tank.shell_diameter") == "31 m"
    assert session.redo() is None


def test_an_edit_after_undo_ends_the_way_forward(session):
    session.edit("tank.shell_diameter", "30 m")
    session.undo()
    session.edit("tank.shell_diameter", "18 m")
    assert not session.can_redo


def test_entering_the_same_value_is_no_change(session):
    session.edit("tank.shell_diameter", "24 m")
    assert not session.dirty and not session.can_undo


def test_a_refused_edit_changes_nothing(session):
    with pytest.raises(InputError, match="not a known key"):
        session.edit("tank.colour", "red")
    assert not session.dirty and not session.can_undo


def test_emptying_the_last_value_of_a_table_takes_the_table_away(session):
    for name in ("low", "normal", "high"):
        session.edit(f"tank.liquid_level.{name}", "")
    assert not session.text.has("tank.liquid_level")
    assert session.text.has("tank"), "a section stays"
    for _ in range(3):
        session.undo()
    assert session.text.get("tank.liquid_level.high") == "9 m"


# results


def test_a_result_is_stale_after_an_edit_and_fresh_again_after_undo(session):
    session.attach(Result(session.revision, "screening"))
    assert not session.stale and session.screening == "screening"
    session.edit("tank.shell_diameter", "30 m")
    assert session.stale
    session.undo()
    assert not session.stale


def test_a_late_result_of_older_inputs_does_not_replace_the_fresh_one(session):
    old = session.revision
    session.edit("tank.shell_diameter", "30 m")
    assert session.attach(Result(session.revision, "new"))
    assert not session.attach(Result(old, "old"))
    assert session.screening == "new"


def test_a_result_of_older_inputs_is_kept_while_there_is_none(session):
    old = session.revision
    session.edit("tank.shell_diameter", "30 m")
    assert session.attach(Result(old, "old"))
    assert session.stale


def test_two_branches_of_edits_never_share_a_revision(session):
    session.edit("tank.shell_diameter", "30 m")
    session.attach(Result(session.revision, "thirty"))
    session.undo()
    session.edit("tank.shell_diameter", "18 m")
    assert session.stale


# saving


def test_save_writes_and_clears_the_mark(session, file):
    session.edit("tank.shell_diameter", "30 m")
    assert session.save() == file
    assert not session.dirty
    assert CaseText.parse(file.read_text(encoding="utf-8")) == session.text
    session.undo()
    assert session.dirty, "the file now holds the later value"


def test_save_keeps_the_permissions(session, file):
    os.chmod(file, 0o640)
    session._seen = (file.stat().st_mtime_ns, file.stat().st_size)
    session.edit("tank.shell_diameter", "30 m")
    session.save()
    assert file.stat().st_mode & 0o777 == 0o640


def test_a_failed_save_leaves_the_old_file(session, file, monkeypatch):
    session.edit("tank.shell_diameter", "30 m")

    def full(*_):
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(os, "replace", full)
    with pytest.raises(InputError, match="no space left"):
        session.save()
    assert file.read_text(encoding="utf-8") == TEXT
    assert session.dirty
    assert sorted(p.name for p in file.parent.iterdir()) == ["tank12.toml"], "no half-written file stays"


def test_a_file_changed_by_another_program_is_not_written_over(session, file):
    session.edit("tank.shell_diameter", "30 m")
    file.write_text(TEXT + "\n[site]\nelevation = \"35 m\"\n", encoding="utf-8")
    with pytest.raises(FileChanged, match=r"tank12\.toml"):
        session.save()
    session.save(anyway=True)
    assert "30 m" in file.read_text(encoding="utf-8")


def test_a_new_name_that_exists_is_not_written_over(session, tmp_path):
    other = tmp_path / "other.toml"
    other.write_text("[case]\n", encoding="utf-8")
    with pytest.raises(FileChanged, match=r"other\.toml"):
        session.save(other)
    assert session.save(tmp_path / "third.toml").name == "third.toml"
    assert session.path == tmp_path / "third.toml"


def test_a_case_without_a_file_needs_a_name(session, tmp_path):
    new = session.as_new(tmp_path)
    with pytest.raises(ValueError, match="no file name"):
        new.save()


def test_comments_of_the_old_file_are_put_aside(file):
    file.write_text("# measured on site\n" + TEXT, encoding="utf-8")
    session = Session.open(file, CaseText.parse)
    session.edit("tank.shell_diameter", "30 m")
    session.save()
    assert session.kept_comments
    assert "# measured on site" in (file.parent / "tank12.toml.before").read_text(encoding="utf-8")
    session.edit("tank.shell_diameter", "31 m")
    session.save()
    assert not session.kept_comments, "the second save has no comments to put aside"
    assert "# measured on site" in (file.parent / "tank12.toml.before").read_text(encoding="utf-8")


# the unsaved version


def test_autosave_and_recovery_after_a_crash(session, file):
    session.edit("tank.shell_diameter", "30 m")
    assert session.autosave()
    assert not session.autosave(), "nothing new to write"
    assert file.read_text(encoding="utf-8") == TEXT, "the file itself is untouched"
    recovery = left_behind(file, file.parent)  # what the next start finds
    assert recovery.lines == 1
    again = Session.recovered(file, recovery, CaseText.parse)
    assert again.text.get("tank.shell_diameter") == "30 m"
    assert again.dirty and again.path == file
    again.save()
    assert left_behind(file, file.parent) is None


def test_nothing_is_left_behind_by_a_saved_case(session, file):
    session.edit("tank.shell_diameter", "30 m")
    session.autosave()
    session.save()
    assert left_behind(file, file.parent) is None
    assert not unsaved_beside(file, file.parent).exists()


def test_undoing_everything_removes_the_unsaved_version(session, file):
    session.edit("tank.shell_diameter", "30 m")
    session.autosave()
    session.undo()
    assert not session.autosave()
    assert not unsaved_beside(file, file.parent).exists()


def test_a_new_case_is_kept_in_its_folder(tmp_path):
    session = Session(CaseText.parse("[tank]\n"), folder=tmp_path)
    session.edit("tank.kind", "fixed-roof")
    assert session.autosave()
    assert left_behind(None, tmp_path).lines == 2


def test_an_unreadable_unsaved_version_is_passed_over(file):
    unsaved_beside(file, file.parent).write_bytes(b"\xff\xfe\x00")
    assert left_behind(file, file.parent) is None


def test_a_folder_that_cannot_be_written_stops_nothing(session):
    session.edit("tank.shell_diameter", "30 m")
    session.path = session.path.parent / "gone" / "case.toml"
    assert not session.autosave()


# the memo


def test_the_memo_goes_beside_the_case(session, file):
    assert session.export("tank12.md", "# memo\n") == file.parent / "tank12.md"
    assert (file.parent / "tank12.md").read_text(encoding="utf-8") == "# memo\n"


def test_a_memo_that_cannot_be_written_is_told(session):
    with pytest.raises(InputError, match="cannot be written"):
        session.export("no/such/folder/memo.md", "x")
