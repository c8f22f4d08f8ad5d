"""Golden outputs: what is kept, how it is made and how it is compared.

Numbers are kept to six significant digits (JSON) or as printed (text). A
printed number may differ by one in its last digit, because the last bit of a
sum depends on the processor; words, marks and layout may not differ at all.
Digests and the residual of the solver are masked: they change with any table
and with any compiler. Remake with `python -m tests.golden.made` from the top
folder, then read the difference before committing it.
"""

from __future__ import annotations

import io
import json
import re
from contextlib import redirect_stderr, redirect_stdout
from pathlib import Path

from screener.cli import main

FOLDER = Path(__file__).resolve().parent
E10, CONDENSATE, WINTER = (
    f"examples/{name}.toml"
    for name in ("summer_e10_floating_roof", "warm_condensate_receipt", "winter_gasoline_fixed_roof")
)
COMMANDS = {
    "check_summer_e10.txt": ["check", E10, "--width", "100"],
    "check_condensate.txt": ["check", CONDENSATE, "--width", "80"],
    "check_winter_us.txt": ["check", WINTER, "--width", "120", "--units", "us"],
    "check_summer_e10.json": ["check", E10, "--json"],
    "quick_e10.txt": [
        "quick",
        "90% stock:summer gasoline base + 10% ethanol",
        "--at",
        "35degC",
        "--width",
        "100",
    ],
    "memo_winter.md": ["memo", WINTER, "-o", "memo.md", "--date", "2026-01-15"],
    "memo_condensate.json": ["memo", CONDENSATE, "-o", "memo.json", "--date", "2026-05-04"],
    "field_sheet_summer_e10.md": ["memo", E10, "-o", "memo.md", "--date", "2026-07-20", "--field-sheet"],
}
_NUMBER = re.compile(r"(?<![\w.])[-+]?\d+(?:\.\d+)?(?:e[-+]?\d+)?")
_MASKS = (
    (re.compile(r"\b[0-9a-f]{64}\b"), "<digest>"),
    (re.compile(r"(residual of any bubble point or flash: )[-+.e0-9]+"), r"\1<residual>"),
)


def output(name: str, folder: Path) -> str:
    """What the command of a golden file gives, masked. Memos go through a file in the folder."""
    argv = list(COMMANDS[name])
    written = folder / argv[3] if argv[0] == "memo" else None
    if written:
        argv[3] = str(written)
    printed = io.StringIO()
    with redirect_stdout(printed), redirect_stderr(io.StringIO()):
        main(argv)
    text = written.read_text(encoding="utf-8") if written else printed.getvalue()
    for pattern, mask in _MASKS:
        text = pattern.sub(mask, text)
    return rounded(text) if name.endswith(".json") else text


def rounded(text: str) -> str:
    """JSON with numbers to six significant digits."""
    return json.dumps(_six(json.loads(text)), indent=1, ensure_ascii=False) + "\n"


def _six(value):
    if isinstance(value, dict):
        return {key: _six(item) for key, item in value.items()}
    if isinstance(value, list):
        return [_six(item) for item in value]
    return float(f"{value:.6g}") if isinstance(value, float) else value


def differences(kept: str, made: str) -> list[str]:
    """Lines that differ in words, or in a number by more than one in the last digit kept."""
    old, new = kept.splitlines(), made.splitlines()
    found = [f"{len(old)} lines kept, {len(new)} made"] if len(old) != len(new) else []
    for i, (a, b) in enumerate(zip(old, new), 1):
        same = _words(a) == _words(b) and all(map(_close, _NUMBER.findall(a), _NUMBER.findall(b)))
        if a != b and not same:
            found.append(f"line {i}: kept {a!r}, made {b!r}")
    return found


def _words(line: str) -> str:
    return " ".join(_NUMBER.sub("#", line).split())


def _close(a: str, b: str) -> bool:
    """Equal within one of the last printed digit, and within 1e-5 where six digits were kept."""
    x, y = float(a), float(b)
    places = max((len(n.partition(".")[2].partition("e")[0]) for n in (a, b) if "e" not in n), default=0)
    last = 0.0 if "e" in a + b else 10.0**-places
    return abs(x - y) <= max(1.000001 * last, 1e-5 * abs(x))


if __name__ == "__main__":
    import tempfile

    for golden in COMMANDS:
        with tempfile.TemporaryDirectory() as scratch:
            (FOLDER / golden).write_text(output(golden, Path(scratch)), encoding="utf-8", newline="\n")
