"""Case files on disk."""

from __future__ import annotations

import os
import tempfile
from pathlib import Path

from screener.ground.errors import InputError

_LARGEST = 5_000_000  # no case file comes near this many bytes: the wrong file was named


def read_file(path: str | Path) -> str:
    """Text of a file; every way in which that can fail is an InputError."""
    try:
        if Path(path).stat().st_size > _LARGEST:
            problem = "the file is too large to be a case file"
            raise InputError(str(path), None, problem, f"up to {_LARGEST} bytes")
        return Path(path).read_bytes().decode("utf-8-sig")
    except UnicodeDecodeError as error:
        problem = f"the file is not UTF-8 text (byte {error.start})"
        raise InputError(str(path), None, problem, "save it as UTF-8") from error
    except (OSError, ValueError) as error:
        reason = getattr(error, "strerror", None) or str(error)
        raise InputError(str(path), None, f"the case file cannot be read: {reason.lower()}") from error


def write_file(path: str | Path, text: str) -> None:
    """Replace a file in one step, keeping its permissions; a failure leaves the old file as it was."""
    target = Path(path).resolve()
    try:
        handle, name = tempfile.mkstemp(prefix=f".{target.name}.", suffix=".part", dir=target.parent)
    except OSError as error:
        raise _unwritten(path, error) from error
    try:
        with os.fdopen(handle, "w", encoding="utf-8", newline="\n") as file:
            file.write(text)
            file.flush()
            os.fsync(file.fileno())
        os.chmod(name, target.stat().st_mode & 0o777 if target.exists() else 0o644)
        os.replace(name, target)
    except OSError as error:
        Path(name).unlink(missing_ok=True)
        raise _unwritten(path, error) from error


def _unwritten(path, error: OSError) -> InputError:
    reason = error.strerror or str(error)
    return InputError(str(path), None, f"the file cannot be written: {reason.lower()}")
