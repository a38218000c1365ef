"""The commands: parse, call, print, exit code."""

from specgen.cli.main import main

__all__ = ["main"]
