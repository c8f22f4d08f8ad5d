"""The arguments: one parser, each command with the module that runs it."""

from __future__ import annotations

import argparse
import re
import sys
from importlib import import_module

from screener import __version__
from screener.cli import streams
from screener.cli.wording import say
from screener.ground.errors import InputError


class _Parser(argparse.ArgumentParser):
    """A parser whose faults are bad input (exit code 3), and whose help is a result."""

    def error(self, message: str):
        raise InputError("", None, f"{self.prog}: {message}", f"'{self.prog} --help' shows what there is")

    def _print_message(self, message: str, file=None) -> None:
        streams.result(message)


def _later(module: str, function: str):
    """A command that imports its module only when it runs."""

    def run(arguments) -> int:
        return getattr(import_module(f"screener.cli.{module}"), function)(arguments)

    return run


def _help(key: str) -> str:
    return say("options", key).replace("%", "%%")


def _width(text: str) -> int:
    try:
        width = int(text)
    except ValueError:
        width = 0
    if width < 20:
        raise InputError("--width", text, say("faults", "width", text=text), say("faults", "width_hint"))
    return width


def _units(parser) -> None:
    parser.add_argument("--units", choices=("si", "us"), default="si", help=_help("units"))


def _layout(parser, *, units: bool = True) -> None:
    parser.add_argument("--json", action="store_true", help=_help("json"))
    parser.add_argument("--width", type=_width, default=None, metavar="COLUMNS", help=_help("width"))
    if units:
        _units(parser)


def _add_check(parser) -> None:
    parser.add_argument("cases", nargs="+", metavar="CASE.toml", help=_help("cases"))
    _layout(parser)


def _add_memo(parser) -> None:
    parser.add_argument("case", metavar="CASE.toml", help=_help("cases"))
    parser.add_argument("-o", "--output", required=True, metavar="FILE", help=_help("output"))
    for name in ("date", "author", "number"):
        parser.add_argument(f"--{name}", default=None, help=_help(name))
    parser.add_argument("--revision", default="A", help=_help("revision"))
    parser.add_argument("--status", choices=("draft", "for checking"), default="draft", help=_help("status"))
    parser.add_argument("--field-sheet", action="store_true", help=_help("field_sheet"))
    _units(parser)


def _add_quick(parser) -> None:
    parser.add_argument("blend", nargs="?", default=None, metavar="BLEND", help=_help("blend"))
    parser.add_argument("--lab", default=None, metavar="FILE.toml", help=_help("lab"))
    parser.add_argument("--at", required=True, metavar="TEMPERATURE", help=_help("at"))
    _layout(parser)


def _add_named(parser) -> None:
    parser.add_argument("name", nargs="?", default=None, metavar="NAME", help=_help("name"))
    _layout(parser)


def _add_criteria(parser) -> None:
    _layout(parser)


def _add_new(parser) -> None:
    parser.add_argument("file", metavar="FILE.toml", help=_help("new_file"))


def _add_schema(parser) -> None:
    parser.add_argument("of", nargs="?", choices=("case", "result"), default="case", help=_help("schema_of"))


# The sets of screener.app.glyphs, named here so that --help loads no screens.
GLYPHS = ("braille", "block", "ascii")


def _add_open(parser) -> None:
    parser.add_argument("case", nargs="?", default=None, metavar="CASE.toml", help=_help("cases"))
    parser.add_argument("--glyphs", choices=GLYPHS, default=None, help=_help("glyphs"))


_COMMANDS = {
    "open": (_add_open, "screens", "open_screens"),
    "check": (_add_check, "check", "check"),
    "memo": (_add_memo, "memo", "memo"),
    "quick": (_add_quick, "quick", "quick"),
    "species": (_add_named, "tables", "species"),
    "blendstocks": (_add_named, "tables", "blendstocks"),
    "criteria": (_add_criteria, "tables", "criteria"),
    "new": (_add_new, "starting", "new"),
    "schema": (_add_schema, "starting", "schema"),
}


def parser() -> argparse.ArgumentParser:
    """The whole parser."""
    top = _Parser(
        prog="screener",
        description=say("program", "about"),
        epilog=say("program", "codes"),
        formatter_class=argparse.RawDescriptionHelpFormatter,
        allow_abbrev=False,
    )
    top.add_argument("--version", action="version", version=f"screener {__version__}")
    top.set_defaults(run=_later("screens", "open_screens"), case=None, glyphs=None)
    commands = top.add_subparsers(metavar="COMMAND", parser_class=_Parser)
    for name, (add, module, function) in _COMMANDS.items():
        text = say("commands", name)
        command = commands.add_parser(
            name, help=text, description=text[0].upper() + text[1:] + ".", allow_abbrev=False
        )
        add(command)
        command.set_defaults(run=_later(module, function))
    return top


def parse(argv: list[str] | None) -> argparse.Namespace:
    """Arguments with the command to run; InputError for bad ones, SystemExit 0 after help or version."""
    return parser().parse_args(_below_zero(sys.argv[1:] if argv is None else argv))


def _below_zero(argv: list[str]) -> list[str]:
    """'--at -10degC' as '--at=-10degC': what begins with a dash and a digit is a temperature, no option."""
    joined: list[str] = []
    for word in argv:
        if joined and joined[-1] == "--at" and re.match(r"-\.?\d", word):
            joined[-1] = f"--at={word}"
        else:
            joined.append(word)
    return joined
