"""Fixtures of the screen tests; async tests run without a plugin."""

from __future__ import annotations

import asyncio
import inspect

import pytest

from tests.screens.driving import written_case


@pytest.hookimpl(tryfirst=True)
def pytest_pyfunc_call(pyfuncitem):
    """Run an async test to its end."""
    if not inspect.iscoroutinefunction(pyfuncitem.obj):
        return None
    wanted = inspect.signature(pyfuncitem.obj).parameters
    asyncio.run(pyfuncitem.obj(**{name: pyfuncitem.funcargs[name] for name in wanted}))
    return True


@pytest.fixture
def case_file(tmp_path):
    """A case file to open."""
    return written_case(tmp_path)


@pytest.fixture(autouse=True)
def home(tmp_path, monkeypatch):
    """Nothing is written into anybody's home, and no colour setting of the shell counts."""
    monkeypatch.setenv("HOME", str(tmp_path / "home"))
    (tmp_path / "home").mkdir()
    monkeypatch.delenv("NO_COLOR", raising=False)
