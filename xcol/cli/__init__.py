"""The command line: one thin module a command; parse, call, render, exit code."""

from xcol.cli.app import main

__all__ = ["main"]
