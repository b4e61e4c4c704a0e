"""The topics of ``xcol explain``."""

import csv
import io
import json
import re

import pytest

from xcol.errors import InputError
from xcol.report.explain import find, topics_csv, topics_markdown, topics_record, topics_text
from xcol.report.sheet import Sheet
from xcol.report.topics import TOPICS


@pytest.mark.parametrize("topic", TOPICS, ids=lambda topic: topic.name)
def test_a_topic_has_all_that_is_promised(topic):
    assert topic.model
    assert topic.formula
    assert topic.holds
    assert topic.sources
    assert re.search(r"\d", topic.worked())
    assert find(topic.name) == (topic,)
    for word in topic.words:
        assert find(word.upper()) == (topic,)


def test_no_two_topics_have_the_same_name_or_word():
    words = [word for topic in TOPICS for word in (topic.name, *topic.words)]
    assert len(words) == len(set(words))


def test_worked_numbers_are_the_program_s_own():
    assert "33.3" in find("inject")[0].worked()
    assert "106" in find("tube")[0].worked()
    assert "227" in find("tube")[0].worked()


def test_a_mistyped_topic_is_answered_with_the_nearest():
    with pytest.raises(InputError) as caught:
        find("colum")
    assert "explain column" in caught.value.faults[0].suggestion
    with pytest.raises(InputError):
        find("zzzz")


@pytest.mark.parametrize("ascii_only", [False, True])
def test_forms(ascii_only):
    sheet = Sheet(ascii_only=ascii_only)
    topics_text(TOPICS, sheet, in_full=True)
    text = sheet.text()
    assert max(map(len, text.splitlines())) <= 80
    assert text.isascii() or not ascii_only
    assert "?" not in text or not ascii_only
    listed = Sheet()
    topics_text(TOPICS, listed, in_full=False)
    assert all(topic.name in listed.text() for topic in TOPICS)
    assert len(json.loads(json.dumps(topics_record(TOPICS)))["topics"]) == len(TOPICS)
    assert len(list(csv.reader(io.StringIO(topics_csv(TOPICS))))) == len(TOPICS) + 1
    assert topics_markdown(TOPICS).count("# ") >= len(TOPICS)


def test_a_kind_of_part_shows_its_keys_and_which_are_still_to_come():
    sheet = Sheet()
    topics_text(find("detector"), sheet, in_full=True)
    text = sheet.text()
    for key in ("time_constant", "rise_time", "rate", "max_pressure"):
        assert key in text
    (topic,) = topics_record(find("detector"))["topics"]
    computed = {entry["key"]: entry["computed"] for entry in topic["keys"]}
    assert computed["rate"] is True
    assert computed["response"] is True
    assert computed["flow"] is False
    assert topics_record(find("pressure"))["topics"][0]["keys"] == []
