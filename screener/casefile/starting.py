"""The commented case that a new file starts from."""

from __future__ import annotations

from screener.ground.files import data_folder


def template() -> str:
    """Text of a commented case in an invented terminal; it reads as it stands."""
    return (data_folder() / "case_template.toml").read_text(encoding="utf-8")
