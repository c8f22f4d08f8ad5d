"""Keys of one's own: a file that gives bindings other keys by their ids.

`~/.screener/keys.toml` holds lines such as `"walk.next" = "f7"`.
"""

from __future__ import annotations

import tomllib
from pathlib import Path

from screener.app.words import say


def keys_file() -> Path:
    """Where the keys of one's own are looked for."""
    return Path.home() / ".screener" / "keys.toml"


def own_keys(path: Path) -> tuple[dict[str, str], str]:
    """Keys by binding id, and what is wrong with the file ('' if nothing)."""
    try:
        found = tomllib.loads(path.read_text(encoding="utf-8"))
    except FileNotFoundError:
        return {}, ""
    except (OSError, UnicodeDecodeError, tomllib.TOMLDecodeError) as error:
        return {}, say("keymap", "unread", path=path, why=error)
    good = {name: key for name, key in found.items() if isinstance(key, str) and "." in name}
    wrong = sorted(set(found) - set(good))
    return good, say("keymap", "wrong", path=path, names=", ".join(wrong)) if wrong else ""
