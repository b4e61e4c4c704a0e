"""A sheet of text: lines, paragraphs and tables at one width, in colour and Unicode where it may be."""

from __future__ import annotations

import io
from dataclasses import dataclass

from rich.cells import cell_len, set_cell_size
from rich.console import Console
from rich.padding import Padding
from rich.table import Table
from rich.text import Text

# What a terminal that knows only ASCII gets instead.
_ASCII = {
    "µL²": "uL2",
    "µ": "u", "μ": "u", "²": "^2", "³": "^3", "⁴": "^4", "°C": "degC", "°": " deg", "×": "x", "–": "-", "−": "-",
    "█": "#", "▌": "#", "·": "*", "σ": "sigma", "θ": "theta", "ε": "eps", "η": "eta", "π": "pi",
    "τ": "tau", "λ": "lambda", "ω": "omega", "Φ": "Phi", "Σ": "Sum", "Δ": "Delta", "ρ": "rho",
    "√": "sqrt", "≥": ">=", "≤": "<=", "≈": "~", "→": "->", "₀": "0", "₁": "1", "₂": "2", "₃": "3",
    "⁻": "-", "ν": "nu", "…": "...",
    "½": "1/2", "α": "alpha", "β": "beta", "∞": "infinity", "∫": "Int ", "ₜ": "t", "′": "'", "ⁿ": "^n",
    "±": "+-", "ψ": "psi", "φ": "phi", "⅓": "1/3",
}  # fmt: skip


def to_ascii(text: str) -> str:
    """Return the text in ASCII: symbols spelled out, anything else as '?'."""
    for symbol, plain in _ASCII.items():
        text = text.replace(symbol, plain)
    return text.encode("ascii", "replace").decode("ascii")


def fitted(text: str, width: int) -> str:
    """Return the text cut or filled to this many columns of a terminal (wide characters take two)."""
    if cell_len(text) > width:
        text = set_cell_size(text, max(width - 3, 0)).rstrip() + "..."
    return set_cell_size(text, width)


@dataclass(frozen=True)
class Grid:
    """A table as text: headers, rows, and for each column whether it is right-aligned."""

    headers: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]
    right: tuple[bool, ...]

    def without(self, header: str) -> Grid:
        """Return the table without the column of this header."""
        at = self.headers.index(header)
        headers, right, *rows = ((*row[:at], *row[at + 1 :]) for row in (self.headers, self.right, *self.rows))
        return Grid(headers, tuple(rows), right)  # type: ignore[arg-type]


@dataclass
class Sheet:
    """Lays out what is added to it, line by line; ``text()`` is all of it."""

    width: int = 80
    ascii_only: bool = False
    color: bool = False

    def __post_init__(self) -> None:
        self._out = io.StringIO()
        self._console = Console(
            file=self._out,
            width=self.width,
            color_system="standard" if self.color else None,
            force_terminal=self.color,
            highlight=False,
            markup=False,
            emoji=False,
            legacy_windows=False,
        )

    def line(self, text: str = "", style: str = "", indent: int = 0, hang: int = 0) -> None:
        """Add a paragraph, wrapped; lines after the first are indented by ``hang`` more."""
        if not hang:
            self._console.print(Padding(Text(self.spelled(text), style=style), (0, 0, 0, indent)))
            return
        for number, piece in enumerate(self._wrapped(text, style, indent, hang)):
            piece.rstrip()
            self._console.print(Padding(piece, (0, 0, 0, indent + (hang if number else 0))))

    def height(self, text: str, hang: int) -> int:
        """Return the lines that a paragraph with this ``hang`` would take."""
        return len(self._wrapped(text, "", 0, hang))

    def _wrapped(self, text: str, style: str, indent: int, hang: int) -> list[Text]:
        return list(Text(self.spelled(text), style=style).wrap(self._console, self.width - indent - hang))

    def grid(self, grid: Grid, indent: int = 0, flexible: int = 0) -> None:
        """Add a table; the ``flexible`` column is cut where the width does not suffice."""
        widths = [
            max(cell_len(self.spelled(row[index])) for row in (grid.headers, *grid.rows))
            for index in range(len(grid.headers))
        ]
        taken = indent + sum(widths) + 2 * (len(widths) - 1) - widths[flexible]
        widths[flexible] = min(widths[flexible], max(self.width - taken, 6))
        table = Table(box=None, padding=(0, 2, 0, 0), pad_edge=False, show_edge=False)
        for header, right, width in zip(grid.headers, grid.right, widths, strict=True):
            table.add_column(
                Text(self.spelled(header)),
                justify="right" if right else "left",
                width=width,
                no_wrap=True,
                overflow="crop" if self.ascii_only else "ellipsis",
                header_style="",
            )
        for row in grid.rows:
            table.add_row(*(Text(self.spelled(cell)) for cell in row))
        self._console.print(Padding(table, (0, 0, 0, indent)))

    def text(self) -> str:
        """Return the sheet as text, without blanks at the ends of lines."""
        return "".join(f"{line.rstrip()}\n" for line in self._out.getvalue().splitlines())

    def count(self) -> int:
        """Return the number of lines so far."""
        return len(self._out.getvalue().splitlines())

    def spelled(self, text: str) -> str:
        """Return the text as this sheet prints it: in ASCII where it must be."""
        return to_ascii(text) if self.ascii_only else text


def markdown(grid: Grid) -> str:
    """Return a table in Markdown."""

    def row(cells: tuple[str, ...]) -> str:
        return "| " + " | ".join(cell.replace("|", "\\|") for cell in cells) + " |"

    rule = tuple("---:" if right else "---" for right in grid.right)
    return "\n".join(row(cells) for cells in (grid.headers, rule, *grid.rows)) + "\n"
