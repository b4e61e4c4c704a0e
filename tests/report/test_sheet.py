"""Laying out text."""

from hypothesis import given
from hypothesis import strategies as st

from xcol.report.sheet import Grid, Sheet, fitted, markdown, to_ascii


def test_ascii_keeps_the_meaning():
    assert to_ascii("µL² at 30 °C, 4σ − 1 × 2, ½") == "uL2 at 30 degC, 4sigma - 1 x 2, 1/2"
    assert to_ascii("日") == "?"


def test_a_grid_aligns_and_cuts_the_flexible_column():
    sheet = Sheet(width=40)
    sheet.grid(Grid(("name", "number"), (("a" * 60, "1"), ("b", "1000")), (False, True)), indent=2)
    lines = sheet.text().splitlines()
    assert max(map(len, lines)) <= 40
    assert lines[1].endswith("  1")
    assert lines[2].endswith("1000")


def test_markup_in_names_is_text():
    sheet = Sheet()
    sheet.line("[bold]x[/bold]")
    sheet.grid(Grid(("a",), (("[red]y",),), (False,)))
    assert "[bold]x[/bold]" in sheet.text()
    assert "[red]y" in sheet.text()


def test_colour_only_where_it_is_wanted():
    for color in (False, True):
        sheet = Sheet(color=color)
        sheet.line("x", "bold")
        assert ("\x1b[" in sheet.text()) == color


def test_paragraphs_hang():
    sheet = Sheet(width=30)
    sheet.line("word " * 20, hang=4, indent=2)
    lines = sheet.text().splitlines()
    assert lines[0].startswith("  word")
    assert all(line.startswith("      word") for line in lines[1:])
    assert max(map(len, lines)) <= 30


@given(st.text(max_size=60), st.integers(1, 40))
def test_fitted_text_has_its_width(text, width):
    from rich.cells import cell_len

    assert cell_len(fitted(text, width)) == width


def test_markdown_escapes():
    assert markdown(Grid(("a|b",), (("c|d",),), (True,))) == "| a\\|b |\n| ---: |\n| c\\|d |\n"
