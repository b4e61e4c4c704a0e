"""The program as a user runs it."""

import csv
import io
import json
import os
import re
import subprocess
import sys

import pytest

from xcol.answers import likely
from xcol.cli.app import app

COMMANDS = [command.name for command in app.registered_commands]


def test_every_command_has_help_with_an_example_and_stands_in_the_readme(run, root):
    readme = (root / "README.md").read_text(encoding="utf-8")
    for command in COMMANDS:
        done = run(command, "--help")
        text = done.stdout.decode()
        assert done.returncode == 0
        assert "Example" in text
        assert f"xcol {command}" in text
        assert f"`xcol {command}" in readme
        for option in ("--format", "--output", "--force"):
            assert option in text


def test_version_help_and_no_arguments(run):
    assert re.fullmatch(rb"xcol \d+\.\d+\.\d+\r?\n", run("--version").stdout)
    assert b"Commands" in run("--help").stdout
    assert b"Commands" in run().stdout + run().stderr


def test_the_same_file_and_seed_give_the_same_text(run, examples):
    file = examples / "small-column.toml"
    first, again, other, few = (
        run("budget", file, *options).stdout for options in ((), (), ("--seed", "7"), ("--draws", "300"))
    )
    assert first == again
    assert b"likely" in first
    assert other != first
    assert few != first
    full = run("budget", file, "--full", "--seed", "7").stdout.decode()
    assert "seed 7" in full


def test_the_default_draws_and_seed_are_those_of_the_library(run, examples):
    file = examples / "brewery-narrow.toml"
    asked = run("budget", file, "--draws", str(likely.DRAWS), "--seed", str(likely.SEED)).stdout
    assert run("budget", file).stdout == asked


def test_without_intervals_nothing_is_likely(run, examples):
    file = examples / "brewery-narrow.toml"
    for options in ((), ("--full",), ("--format", "markdown")):
        done = run("budget", file, "--no-interval", *options)
        assert done.returncode == 0
        text = done.stdout.decode()
        assert "(likely" not in text
        assert "draws" not in text.replace("the draws take any curvature", "")
        assert "best-worst" in text
    record = json.loads(run("budget", file, "--no-interval", "--format", "json").stdout)
    assert record["detectors"][0]["peaks"][0]["interval_plates_kept"] is None


@pytest.mark.parametrize("options", [("--draws", "5"), ("--draws", "many"), ("--draws", "10000000"), ("--seed", "x")])
def test_draws_that_say_nothing_are_refused(run, examples, options):
    done = run("budget", examples / "brewery-narrow.toml", *options)
    assert done.returncode == 2
    assert options[0].encode() in done.stderr
    assert b"Traceback" not in done.stderr


def test_a_mistyped_command_or_option_is_answered(run):
    done = run("budgett", "x.toml")
    assert done.returncode == 2
    assert b"budget" in done.stderr
    done = run("budget", "x.toml", "--ful")
    assert done.returncode == 2
    assert b"--full" in done.stderr
    assert run("budget").returncode == 2
    assert run("budget", "x.toml", "--format", "xml").returncode == 2


@pytest.mark.parametrize("command", ["budget", "check"])
def test_every_form_of_every_example(run, examples, command):
    for file in sorted(examples.glob("*.toml")):
        for form in ("text", "json", "csv", "markdown"):
            done = run(command, file, "--format", form)
            assert done.returncode == 0, done.stderr
            assert done.stdout
            assert not done.stderr
            text = done.stdout.decode()
            if form == "json":
                assert json.loads(text)["schema"] == f"xcol.{command}/1"
            if form == "csv":
                assert len(list(csv.reader(io.StringIO(text)))) > 3
        if command == "budget":
            assert run(command, file, "--full").returncode == 0


def test_text_and_json_agree(run, examples):
    file = examples / "brewery-narrow.toml"
    text = run("budget", file, "--peak", "late").stdout.decode()
    record = json.loads(run("budget", file, "--format", "json").stdout)
    peak = record["detectors"][0]["peaks"][2]
    assert "6990" in text
    assert float(f"{peak['plates_observed']:.3g}") == 6990


def test_standard_input_and_a_pipe(run, plain):
    assert run("budget", "-", stdin=plain).returncode == 0
    done = run("budget", "-", stdin=plain.replace("0.5 mL/min", "0.5"))
    assert done.returncode == 2
    assert b"standard input" in done.stderr


def test_faults_go_to_standard_error_with_exit_2(run, tmp_path, plain):
    (tmp_path / "f.toml").write_text(plain.replace("30 cm x 0.17 mm", "30 cm x 0.17"), encoding="utf-8")
    for command in ("budget", "check"):
        done = run(command, "f.toml")
        assert done.returncode == 2
        assert not done.stdout
        text = done.stderr.decode()
        for words in ("f.toml", "line 6", "part 2", "tube", "read:", "expected:", "try:"):
            assert words in text


@pytest.mark.parametrize("make", ["missing", "directory", "empty", "binary", "large", "unreadable name"])
def test_files_that_are_no_path_files(run, tmp_path, make):
    path = tmp_path / "f.toml"
    if make == "directory":
        path.mkdir()
    elif make == "large":
        with path.open("wb") as stream:
            stream.truncate(50_000_000)
    elif make != "missing":
        path.write_bytes({"empty": b"", "binary": bytes(range(256)), "unreadable name": b""}[make])
    done = run("budget", "" if make == "unreadable name" else path)
    assert done.returncode == 2
    assert not done.stdout
    assert b"Traceback" not in done.stderr
    assert b"expected:" in done.stderr


def test_output_is_written_whole_and_never_over_a_file(run, tmp_path, plain):
    (tmp_path / "f.toml").write_text(plain, encoding="utf-8")
    assert run("budget", "f.toml", "--output", "out.txt").returncode == 0
    first = (tmp_path / "out.txt").read_text(encoding="utf-8")
    assert "µL²" in first
    assert "\x1b" not in first
    (tmp_path / "out.txt").write_text("mine", encoding="utf-8")
    done = run("budget", "f.toml", "--output", "out.txt")
    assert done.returncode == 2
    assert b"--force" in done.stderr
    assert (tmp_path / "out.txt").read_text(encoding="utf-8") == "mine"
    assert run("budget", "f.toml", "--output", "out.txt", "--force").returncode == 0
    assert (tmp_path / "out.txt").read_text(encoding="utf-8") == first
    assert sorted(entry.name for entry in tmp_path.iterdir()) == ["f.toml", "out.txt"]


def test_output_is_refused_where_it_would_do_harm(run, tmp_path, plain):
    (tmp_path / "f.toml").write_text(plain, encoding="utf-8")
    (tmp_path / "folder").mkdir()
    targets = ["f.toml", "folder", "missing/out.txt", ""]
    if hasattr(os, "mkfifo"):
        os.mkfifo(tmp_path / "pipe")
        targets.append("pipe")
    for target in targets:
        done = run("budget", "f.toml", "--output", target, "--force")
        assert done.returncode == 2, target
        assert b"Traceback" not in done.stderr
    assert (tmp_path / "f.toml").read_text(encoding="utf-8") == plain
    assert not (tmp_path / "missing").exists()


def test_a_faulty_file_writes_nothing(run, tmp_path, plain):
    (tmp_path / "f.toml").write_text(plain.replace("0.5 mL/min", "0.5"), encoding="utf-8")
    (tmp_path / "out.txt").write_text("mine", encoding="utf-8")
    assert run("budget", "f.toml", "--output", "out.txt", "--force").returncode == 2
    assert (tmp_path / "out.txt").read_text(encoding="utf-8") == "mine"


def test_output_to_a_dash_is_standard_output(run, tmp_path, plain):
    assert b"in flow order" in run("budget", "-", "--output", "-", stdin=plain).stdout
    assert not list(tmp_path.iterdir())
    done = run("budget", "-", "--output", "-", stdin=plain, PYTHONIOENCODING="ascii")
    assert b"uL2" in done.stdout
    assert b"?" not in done.stdout


@pytest.mark.parametrize("encoding", ["ascii", "latin-1", "cp1252", "cp437"])
def test_a_terminal_with_few_symbols_gets_plain_text(run, plain, encoding):
    micro = plain.replace('"Invented"', '"µ-flow, 漢字"')
    for command in ("budget", "check"):
        for form in ("text", "json", "markdown", "csv"):
            done = run(command, "-", "--format", form, stdin=micro, PYTHONIOENCODING=encoding)
            assert done.returncode == 0, done.stderr
            text = done.stdout.decode(encoding)
            if form == "text":
                assert text.isascii()
                assert "uL2" in text or command == "check"
            if form == "json":
                assert json.loads(text)["title"] == "µ-flow, 漢字"
    done = run("budget", "-", stdin="flow = “1 mL/min”\n", PYTHONIOENCODING="ascii")
    assert done.returncode == 2
    assert done.stderr.isascii()


def test_no_colour_where_there_is_no_terminal(run, examples):
    assert b"\x1b" not in run("budget", examples / "brewery-narrow.toml").stdout


def test_the_first_screen_is_24_lines_of_80_columns(run, examples):
    for file in sorted(examples.glob("*.toml")):
        lines = run("budget", file).stdout.decode().splitlines()
        assert len(lines) <= 24
        assert max(map(len, lines)) <= 80


def test_peaks_and_detectors_are_chosen_by_name_or_k(run, examples):
    file = examples / "sugar-two-detectors.toml"
    assert b"RI records" in run("budget", file).stdout
    assert b"UV records" in run("budget", file, "--detector", "uv").stdout
    narrow = examples / "brewery-narrow.toml"
    for word in ("late", "5", "k=5", "k = 5", "5.01"):
        assert b'"late", k = 5' in run("budget", narrow, "--peak", word).stdout
    for option, word in (("--peak", "nobody"), ("--peak", "7"), ("--detector", "IR")):
        done = run("budget", narrow, option, word)
        assert done.returncode == 2
        assert option.encode() in done.stderr


def test_check_shows_what_only_the_computation_finds(run, plain):
    text = plain.replace('"10 Hz"', '"1 Hz", max_pressure = "1 bar"').replace("rate", "drop = '2 bar', rate")
    flat = " ".join(run("check", "-", stdin=text).stdout.decode().split())
    assert "above its limit" in flat
    assert "data points" in flat


def test_explain(run):
    done = run("explain", "tube", "--format", "json")
    assert json.loads(done.stdout)["topics"][0]["name"] == "tube"
    assert run("explain").stdout.decode().count("\n") > 10
    done = run("explain", "tubee")
    assert done.returncode == 2
    assert b"explain tube" in done.stderr


MINE = """[[solute]]
name = "our marker"
molar_mass = "310 g/mol"
diffusion = "5.4e-10 m^2/s"
at = "25 degC"
source = "an invented notebook"
"""


def test_catalog_lists_and_searches_in_every_form(run):
    assert b"solutes" in run("catalog").stdout
    for words in (("solutes",), ("solutes", "caffeine"), ("caffeine",), ("tubing", "PEEK")):
        for form in ("text", "json", "csv", "markdown"):
            done = run("catalog", *words, "--format", form)
            assert done.returncode == 0, done.stderr
            assert done.stdout
            assert not done.stderr
    record = json.loads(run("catalog", "solutes", "caffeine", "--format", "json").stdout)
    assert record["schema"] == "xcol.catalog/1"
    assert record["catalogs"][0]["rows"][0]["source"]
    for words, key in ((("solvens", "water"), b"KIND"), (("solutes", "zzzz"), b"WORD"), (("zzzz",), b"WORD")):
        done = run("catalog", *words)
        assert done.returncode == 2
        assert key in done.stderr
        assert not done.stdout


def test_a_catalog_of_one_s_own_is_added_and_overrides_with_a_message(run, tmp_path, plain):
    (tmp_path / "mine.toml").write_text(MINE, encoding="utf-8")
    done = run("catalog", "solutes", "marker", "--catalog", "mine.toml")
    assert b"310" in done.stdout
    assert not done.stderr
    text = plain.replace('diffusion = "7.0e-10 m^2/s"', 'solute = "our marker"').replace(
        "path = [", 'mobile_phase = "water"\npath = ['
    )
    record = json.loads(run("budget", "-", "--catalog", "mine.toml", "--format", "json", stdin=text).stdout)
    assert "catalog value" in record["detectors"][0]["peaks"][1]["diffusion_from"]
    assert run("check", "-", stdin=text).returncode == 2
    (tmp_path / "mine.toml").write_text(MINE.replace("our marker", "caffeine"), encoding="utf-8")
    done = run("catalog", "solutes", "caffeine", "--catalog", "mine.toml")
    assert b"caffeine" in done.stderr
    assert b"mine.toml" in done.stderr
    assert b"an invented notebook" in done.stdout
    done = run("catalog", "--catalog", "mine.toml", "--output", "mine.toml", "--force")
    assert done.returncode == 2
    assert (tmp_path / "mine.toml").read_text(encoding="utf-8") == MINE.replace("our marker", "caffeine")


def test_a_catalog_that_the_path_file_names_is_never_written_over(run, tmp_path, plain):
    (tmp_path / "mine.toml").write_text(MINE, encoding="utf-8")
    (tmp_path / "f.toml").write_text('catalogs = ["mine.toml"]\n' + plain, encoding="utf-8")
    for command in ("budget", "check"):
        for target in ("mine.toml", "f.toml"):
            assert run(command, "f.toml", "--output", target, "--force").returncode == 2
    assert (tmp_path / "mine.toml").read_text(encoding="utf-8") == MINE


def test_catalogs_are_files(run, tmp_path, plain):
    (tmp_path / "folder").mkdir()
    (tmp_path / "empty.toml").write_text("", encoding="utf-8")
    for name in ("-", "folder", "empty.toml", "none.toml"):
        done = run("budget", "-", "--catalog", name, stdin=plain)
        assert done.returncode == 2, name
        assert b"catalog" in done.stderr
        assert b"path file" not in done.stderr


def test_a_faulty_catalog_is_named_with_its_line(run, tmp_path):
    (tmp_path / "mine.toml").write_text(MINE.replace('"310 g/mol"', "310"), encoding="utf-8")
    done = run("catalog", "--catalog", "mine.toml")
    assert done.returncode == 2
    for words in (b"mine.toml", b"line 3", b"solute 1", b"molar_mass"):
        assert words in done.stderr
    assert run("catalog", "--catalog", "none.toml").returncode == 2


def test_a_report_says_where_its_numbers_came_from(run, examples):
    flat = " ".join(run("budget", examples / "core-shell-by-name.toml", "--full").stdout.decode().split())
    for words in ("Wilke–Chang from 284 g/mol", "±26 %", "in water at 25 °C", "±3 %", "reduced plate height"):
        assert words in flat


def test_a_reader_that_goes_away_is_no_error(examples, root):
    environment = os.environ | {"PYTHONPATH": str(root), "PYTHONIOENCODING": "utf-8"}
    command = [sys.executable, "-m", "xcol", "budget", str(examples / "brewery-narrow.toml"), "--full"]
    reading, writing = os.pipe()
    os.close(reading)  # nobody is there to read, from the start
    done = subprocess.run(command, stdout=writing, stderr=subprocess.PIPE, env=environment, timeout=60, check=False)
    os.close(writing)
    assert done.returncode == 0
    assert not done.stderr


@pytest.mark.skipif(os.name == "nt", reason="a shell that closes streams")
@pytest.mark.parametrize("closing", ["<&-", ">&-"])
def test_closed_streams_are_no_traceback(examples, root, closing):
    name = "-" if closing == "<&-" else f'"{examples / "brewery-narrow.toml"}"'
    environment = os.environ | {"PYTHONPATH": str(root)}
    command = f'"{sys.executable}" -m xcol budget {name} {closing}'
    done = subprocess.run(command, shell=True, stderr=subprocess.PIPE, env=environment, timeout=60, check=False)
    assert done.returncode == 2
    assert done.stderr
    assert b"Traceback" not in done.stderr


@pytest.mark.skipif(not os.path.exists("/dev/full"), reason="no full device here")
def test_a_full_disk_is_said_to_be_one(examples, root):
    environment = os.environ | {"PYTHONPATH": str(root)}
    with open("/dev/full", "w") as full:
        done = subprocess.run(
            [sys.executable, "-m", "xcol", "budget", str(examples / "brewery-narrow.toml")],
            stdout=full, stderr=subprocess.PIPE, env=environment, timeout=60, check=False,
        )  # fmt: skip
    assert done.returncode == 2
    assert b"Traceback" not in done.stderr
    assert done.stderr


@pytest.mark.parametrize("example", ["guarded-column.toml", "core-shell-by-name.toml"])
def test_the_light_commands_stay_light(root, examples, example):
    """Neither scipy nor pint is on the path of an everyday budget."""
    code = (
        "import sys\nfrom xcol.cli import main\n"
        f"sys.argv = ['xcol', 'budget', {str(examples / example)!r}]\n"
        "try:\n    main()\nexcept SystemExit:\n    pass\n"
        "print([m for m in ('scipy', 'pint', 'matplotlib') if m in sys.modules], file=sys.stderr)\n"
    )
    environment = os.environ | {"PYTHONPATH": str(root)}
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, env=environment, timeout=60, check=False)
    assert done.stderr.decode().strip() == "[]"
