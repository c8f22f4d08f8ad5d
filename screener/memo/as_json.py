"""A document as JSON: every block with its kind, every number with its SI value beside its text."""

from __future__ import annotations

import json
from dataclasses import fields, is_dataclass
from typing import get_args

from screener.memo.document import Block

SCHEMA = "screener.memo/1"
_BLOCKS = get_args(Block)


def write_json(document) -> str:
    """The document as one JSON object; same document, same bytes."""
    body = {"schema": SCHEMA, **_plain(document)}
    return json.dumps(body, indent=2, ensure_ascii=False, allow_nan=False) + "\n"


def _plain(value):
    if is_dataclass(value):
        named = {"block": type(value).__name__.lower()} if isinstance(value, _BLOCKS) else {}
        return {**named, **{field.name: _plain(getattr(value, field.name)) for field in fields(value)}}
    if isinstance(value, (tuple, list)):
        return [_plain(item) for item in value]
    return value
