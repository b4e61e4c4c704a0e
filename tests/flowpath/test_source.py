"""Texts of files, and why there is none."""

import pytest

from xcol.errors import InputError
from xcol.flowpath.source import MOST_BYTES, read_text


@pytest.mark.parametrize(
    "data",
    [
        b"",
        b"  \n\t\n",
        b"\x00\x01\x02",
        b'flow = "1 \xb5L/min"\n',
        'flow = "1"'.encode("utf-16"),
        b"a" * (MOST_BYTES + 1),
    ],
)
def test_what_is_no_path_file(tmp_path, data):
    path = tmp_path / "f.toml"
    path.write_bytes(data)
    with pytest.raises(InputError) as caught:
        read_text(str(path))
    (fault,) = caught.value.faults
    assert fault.place.file == str(path)
    assert fault.read
    assert fault.expected
    assert fault.suggestion


def test_the_line_of_a_byte_that_is_not_utf_8(tmp_path):
    path = tmp_path / "f.toml"
    path.write_bytes(b'title = "a"\nflow = "1 \xb5L/min"\n')
    with pytest.raises(InputError) as caught:
        read_text(str(path))
    assert caught.value.faults[0].place.line == 2


def test_a_directory_and_a_missing_file_with_what_is_near(tmp_path):
    (tmp_path / "brewery.toml").write_text("x")
    for name, expected in ((tmp_path, "brewery.toml"), (tmp_path / "brwery.toml", "brewery.toml")):
        with pytest.raises(InputError) as caught:
            read_text(str(name))
        assert expected in caught.value.faults[0].suggestion


@pytest.mark.parametrize("name", ["a\x00b", "x" * 5000, "missing/folder/f.toml"])
def test_names_that_cannot_be(name):
    with pytest.raises(InputError):
        read_text(name)


def test_links_in_a_circle(tmp_path):
    (tmp_path / "a.toml").symlink_to(tmp_path / "b.toml")
    (tmp_path / "b.toml").symlink_to(tmp_path / "a.toml")
    with pytest.raises(InputError):
        read_text(str(tmp_path / "a.toml"))


@pytest.mark.parametrize("data", [b"a = 1\r\nb = 2\r\n", b"\xef\xbb\xbfa = 1\nb = 2\n", b"a = 1\rb = 2\r"])
def test_line_ends_and_byte_order_mark(tmp_path, data):
    path = tmp_path / "f.toml"
    path.write_bytes(data)
    assert read_text(str(path)) == "a = 1\nb = 2\n"
