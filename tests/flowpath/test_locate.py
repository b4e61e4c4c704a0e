"""Where keys stand."""

import tomllib

from hypothesis import given
from hypothesis import strategies as st

from xcol.flowpath.locate import key_lines

TEXT = '''\
# a comment with [brackets] and = signs
title = """
several
lines"""
"quoted key" = 'x = 1'

path = [ # comment
  { inject = "20 uL", note = "a } and a ] and a # in a text" },

  { tube = "40 cm x 0.25 mm",
}, # not valid in TOML 1.0, and still no trouble here
]
a.b.c = 1
[table]
key = [[1, 2],
  [3]]
[[peaks]]
k = 1
[[peaks]]
k = 2
[peaks.more]
x = 1979-05-27
'''


def test_lines():
    lines = key_lines(TEXT)
    assert lines[("title",)] == 2
    assert lines[("quoted key",)] == 5
    assert lines[("path",)] == 7
    assert lines[("path", 0, "inject")] == lines[("path", 0, "note")] == 8
    assert lines[("path", 1)] == 10
    assert lines[("a", "b", "c")] == 13
    assert lines[("table", "key", 1)] == 16
    assert lines[("peaks", 0, "k")] == 18
    assert lines[("peaks", 1)] == 19
    assert lines[("peaks", 1, "k")] == 20
    assert lines[("peaks", 1, "more", "x")] == 22


def test_every_key_of_the_examples_is_found(examples):
    for path in examples.glob("*.toml"):
        text = path.read_text(encoding="utf-8")
        lines = key_lines(text)
        data = tomllib.loads(text)
        rows = text.splitlines()
        for kind in ("path", "peaks"):
            for index, entry in enumerate(data.get(kind, [])):
                for key in entry:
                    assert key in rows[lines[(kind, index, key)] - 1]


@given(st.text(alphabet="[]{}=,\"'#\n ab.1\\", max_size=60))
def test_any_text_ends(text):
    key_lines(text)
