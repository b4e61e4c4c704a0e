"""The command line: one thin module a command; parse, call, render, exit code."""

import gc


def main() -> None:
    """Run the program, and exit with its code."""
    # a command is over before there is anything to collect: looking for it takes a twentieth of its time
    gc.disable()
    from xcol.cli.app import main as run

    run()
