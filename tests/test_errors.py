"""Errors with their place."""

from xcol.errors import Fault, InputError, Place, nearest


def test_a_place_shows_what_is_known_of_it():
    assert str(Place("a.toml", 8, 'part 2 (tube "x")', "tube")).split(", ") == [
        "a.toml", "line 8", 'part 2 (tube "x")', 'key "tube"',
    ]  # fmt: skip
    assert str(Place("a.toml")) == "a.toml"


def test_an_error_shows_all_of_its_faults_in_order():
    faults = tuple(Fault(Place("a.toml", line), f"read{line}", "expected", "try this") for line in (1, 2))
    text = str(InputError(faults))
    assert text.index("read1") < text.index("read2")
    assert text.count("expected:") == text.count("try:") == 2


def test_the_nearest_word():
    assert nearest("tempreature", ("temperature", "title")) == "temperature"
    assert nearest("xyz", ("temperature", "title")) == ""
