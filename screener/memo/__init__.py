"""Floor 9: findings become a document, and a document becomes a file.

`build_memo` and `build_field_sheet` fill the document model from a screening;
`write_markdown` and `write_json` turn a document into text and know nothing of
physics. Names are loaded when first used, so that `screener.memo.numbers`
stays free of NumPy.
"""

from __future__ import annotations

from importlib import import_module

_WHERE = {
    "Document": "document",
    "build_memo": "memo",
    "build_field_sheet": "field_sheet",
    "write_markdown": "markdown",
    "write_json": "as_json",
    "data_digest": "digest",
}
__all__ = ["Document", "build_field_sheet", "build_memo", "data_digest", "write_json", "write_markdown"]


def __getattr__(name: str):
    if name in _WHERE:
        return getattr(import_module(f"screener.memo.{_WHERE[name]}"), name)
    raise AttributeError(f"module 'screener.memo' has no attribute {name!r}")
