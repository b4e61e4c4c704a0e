"""The layout of the repository, the direction of imports, and words that must not be in it."""

import re
import subprocess
from pathlib import Path

import pytest


def modules(root):
    for path in sorted((root / "xcol").rglob("*.py")):
        yield path, path.relative_to(root / "xcol").parts[0].removesuffix(".py")


def test_the_physics_knows_no_file_format_no_terminal_and_no_units(root):
    for path, layer in modules(root):
        if layer in ("filters", "liquids"):
            text = path.read_text(encoding="utf-8")
            assert not re.search(r"\b(?:import|from) (?:tomllib|pint|rich|typer|scipy)\b", text), path


def test_no_module_is_called_by_what_says_nothing(root):
    for path, _ in modules(root):
        assert path.stem not in ("utils", "helpers", "common", "manager", "util")
        assert len(path.read_text(encoding="utf-8").splitlines()) <= 450, path


def test_the_top_level_is_what_it_should_be(root):
    if not (root / ".git").exists():
        pytest.skip("not a checkout")
    listed = subprocess.run(["git", "ls-files"], cwd=root, capture_output=True, text=True, check=True).stdout
    top = {Path(name).parts[0] for name in listed.splitlines()}
    known = {"README.md", "DEVELOPERS.md", "LICENSE", "pyproject.toml", "xcol", "tests", "catalogs"}
    assert {name for name in top if not name.startswith(".")} == known


# Modules that hold records, tables of words or constants, or that the test beside them runs whole.
WITHOUT_A_TEST_OF_THEIR_OWN = {
    "elements", "model", "estimate", "catalog_records", "catalog_kinds", "catalog_values", "composition_words",
    "liquids", "curved_table", "straight_table", "bed", "file_keys", "findings", "part_reader", "peak_reader",
    "laminar_modes", "table", "stream", "topic", "parts", "quantities", "ranges", "tolerances", "budget_tables",
    "detail_tables", "app", "output", "__main__",
}  # fmt: skip


def test_the_tests_mirror_the_package(root):
    named = {path.stem.removeprefix("test_") for path in (root / "tests").rglob("test_*.py")}
    for path, layer in modules(root):
        if path.stem != "__init__" and layer != "cli" and path.stem not in WITHOUT_A_TEST_OF_THEIR_OWN:
            assert {path.stem, path.parent.name} & named, path


def test_the_readme_shows_what_the_program_prints(root, run):
    readme = (root / "README.md").read_text(encoding="utf-8")
    shown = run("budget", root / "xcol" / "examples" / "brewery-narrow.toml").stdout.decode()
    assert shown.strip() in readme


def test_the_readme_s_path_file_is_read(root):
    from xcol.flowpath.reader import parse

    readme = (root / "README.md").read_text(encoding="utf-8")
    (text,) = re.findall(r"```toml\n(.*?)```", readme, re.S)
    assert not parse(text, "README").warnings


def test_the_readme_names_every_kind_and_key(root):
    from xcol.flowpath.file_keys import FILE_KEYS, PEAK_KEYS
    from xcol.flowpath.keys import Later
    from xcol.flowpath.kinds import KINDS

    readme = (root / "README.md").read_text(encoding="utf-8")
    keys = [key for kind in KINDS.values() for key in kind.all_keys]
    for key in (*keys, *FILE_KEYS.values(), *PEAK_KEYS.values()):
        if not isinstance(key.read, Later) and key.name != "remix":
            assert f"`{key.name}`" in readme, key.name
    assert all(f"`{kind}`" in readme for kind in KINDS)
