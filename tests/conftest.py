"""What many tests need: the program as a user runs it, and path files to run it on."""

import importlib.util
import json
import os
import subprocess
import sys
from pathlib import Path

import pytest
from hypothesis import settings

# no time limit for one example: the first one may import what the others find imported
settings.register_profile("xcol", deadline=None)
settings.load_profile("xcol")

ROOT = Path(__file__).parent.parent
EXAMPLES = ROOT / "xcol" / "examples"

PLAIN = """\
title = "Invented"
flow = "0.5 mL/min"
viscosity = "0.9 mPa s"
path = [
  { inject = "2 uL" },
  { tube = "30 cm x 0.17 mm", name = "to column" },
  { column = "2.1 x 100 mm, 3 um", plates = 12000, total_porosity = 0.6 },
  { tube = "25 cm x 0.17 mm", name = "to cell" },
  { detector = "UV", cell = "2.5 uL", time_constant = "0.1 s", rate = "10 Hz" },
]
peaks = [
  { name = "first", k = 1, diffusion = "1.0e-9 m^2/s" },
  { name = "second", k = 4, diffusion = "7.0e-10 m^2/s" },
]
"""


@pytest.fixture
def root():
    return ROOT


@pytest.fixture(scope="session")
def script_of():
    """Return the module that a script of tests/generate/ is, by its name."""
    loaded = {}

    def script_of(name):
        if name not in loaded:
            spec = importlib.util.spec_from_file_location(
                f"generate_{name}", ROOT / "tests" / "generate" / f"{name}.py"
            )
            loaded[name] = importlib.util.module_from_spec(spec)
            sys.modules[spec.name] = loaded[name]  # where dataclasses look their module up
            spec.loader.exec_module(loaded[name])
        return loaded[name]

    return script_of


@pytest.fixture
def examples():
    return EXAMPLES


@pytest.fixture
def plain():
    """A path file that has nothing wrong with it."""
    return PLAIN


@pytest.fixture
def run(tmp_path):
    """Run the program as a user does; the working folder is a new one."""

    def run(*arguments, stdin="", **environment):
        known = {k: v for k, v in os.environ.items() if k not in ("COLUMNS", "NO_COLOR")}
        return subprocess.run(
            [sys.executable, "-m", "xcol", *map(str, arguments)],
            input=stdin.encode() if isinstance(stdin, str) else stdin,
            capture_output=True,
            cwd=tmp_path,
            env=known | {"PYTHONPATH": str(ROOT), "PYTHONIOENCODING": "utf-8"} | environment,
            timeout=120,
            check=False,
        )

    return run


@pytest.fixture
def budget_of(run):
    """Return the JSON of a path file's budget, given its text."""

    def budget_of(text):
        done = run("budget", "-", "--format", "json", stdin=text)
        assert done.returncode == 0, done.stderr.decode()
        return json.loads(done.stdout)

    return budget_of


@pytest.fixture
def faults_of():
    """Return the faults of a path file's text; there must be some."""
    from xcol.errors import InputError
    from xcol.flowpath.reader import parse

    def faults_of(text):
        with pytest.raises(InputError) as caught:
            parse(text, "file.toml")
        return caught.value.faults

    return faults_of
