"""Every error this program raises on purpose.

ScreenerError
|- InputError        path, value, problem, hint       the user's case
|  |- UnknownName    name, nearest                    species, stock, criterion
|  |- UnitError      text, expected
|  `- CaseErrors     all InputErrors of a case at once
|- ShapeError        argument, got, expected          the library caller
|- OutOfRange        symbol, value, low, high, source
|- NotConverged      lanes, status, residual          raised only by .require()
`- DataError         file, line, problem              our own data is wrong: a bug

Errors are data first: the sentence is built from the fields. One sentence
says what, where, what was given and what is allowed.
"""

from __future__ import annotations

from difflib import get_close_matches


class ScreenerError(Exception):
    """Root of all errors raised on purpose."""


class InputError(ScreenerError):
    """A value in the user's case that cannot be used.

    path is the place in the case (`blend.parts[3].share`), value the text as
    given, problem the sentence, hint what is allowed.
    """

    def __init__(self, path: str, value: object, problem: str, hint: str = ""):
        self.path, self.value, self.problem, self.hint = path, value, problem, hint
        super().__init__(path, value, problem, hint)

    def __str__(self) -> str:
        text = f"{self.path}: {self.problem}" if self.path else self.problem
        return f"{text}; {self.hint}" if self.hint else text

    def at(self, path: str) -> InputError:
        """The same fault placed at another path."""
        again = self.__class__.__new__(self.__class__)
        again.__dict__.update(self.__dict__)
        again.path = path
        ScreenerError.__init__(again, *self.args)
        return again


class UnknownName(InputError):
    """A name that is in no table, with the nearest names that are."""

    def __init__(self, path: str, name: str, kind: str, known):
        self.name, self.kind = name, kind
        self.nearest = tuple(get_close_matches(name.lower(), list(known), n=3, cutoff=0.6))
        hint = f"nearest: {', '.join(self.nearest)}" if self.nearest else f"no {kind} has a name like it"
        super().__init__(path, name, f"'{name}' is not a known {kind}", hint)


class UnitError(InputError):
    """Text that is not a quantity of the expected kind."""

    def __init__(self, path: str, text: object, problem: str, expected: str):
        self.text, self.expected = text, expected
        super().__init__(path, text, problem, f"expected {expected}")


class CaseErrors(InputError):
    """All faults of one case together."""

    def __init__(self, faults):
        self.faults = tuple(faults)
        super().__init__("", None, f"{len(self.faults)} faults in the case")

    def __str__(self) -> str:
        return "\n".join(str(fault) for fault in self.faults)


class ShapeError(ScreenerError):
    """An array argument with the wrong shape or kind: a fault of the caller."""

    def __init__(self, argument: str, got: object, expected: str):
        self.argument, self.got, self.expected = argument, got, expected
        super().__init__(f"{argument}: got {got}, expected {expected}")


class OutOfRange(ScreenerError):
    """A scalar outside the range in which a method holds."""

    def __init__(self, symbol: str, value: float, low: float, high: float, source: str):
        self.symbol, self.value, self.low, self.high, self.source = symbol, value, low, high, source
        super().__init__(f"{symbol} = {value:g} lies outside {low:g} to {high:g} ({source})")


class NotConverged(ScreenerError):
    """Some lanes of a batch have no answer; raised only by .require()."""

    def __init__(self, lanes, status, residual):
        self.lanes, self.status, self.residual = lanes, status, residual
        shown = ", ".join(f"lane {i}: {s}" for i, s in list(zip(lanes, status))[:5])
        super().__init__(f"{len(lanes)} of the lanes have no answer ({shown})")


class DataError(ScreenerError):
    """A table of ours is wrong: a bug in the project, not in the case."""

    def __init__(self, file: str, line: int | None, problem: str):
        self.file, self.line, self.problem = file, line, problem
        where = f"{file}:{line}" if line else file
        super().__init__(f"{where}: {problem}")
