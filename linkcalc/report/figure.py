"""Pictures as files: which formats there are, the page they are made for, and how they reach the disk."""

from __future__ import annotations

import io
from pathlib import Path
from typing import TYPE_CHECKING

from linkcalc.faults import fault
from linkcalc.files import write_whole
from linkcalc.report import style

if TYPE_CHECKING:
    from matplotlib.figure import Figure

FORMATS = ("svg", "png", "pdf")
_DPI = 200

# without these a file would carry the time it was made, and the same answer would never give the same file
_STAMPS: dict[str, dict[str, str | None]] = {
    "svg": {"Date": None},
    "png": {},
    "pdf": {"CreationDate": None, "ModDate": None},
}


def picture_format(path: Path | str) -> str:
    """The format a picture is written in, by the suffix of its file.

    Raises Faults if the suffix is none of svg, png, pdf.
    """
    suffix = Path(path).suffix.lower().removeprefix(".")
    if suffix not in FORMATS:
        what = f"a picture cannot be written as {'.' + suffix!r}" if suffix else "the file of a picture needs a suffix"
        raise fault((str(path),), what, "end it in .svg, .png or .pdf")
    return suffix


def new_figure(width: float, height: float) -> Figure:
    """An empty page of so many mm that draws without a screen."""
    from matplotlib.backends.backend_agg import FigureCanvasAgg
    from matplotlib.figure import Figure

    figure = Figure(figsize=(width * style.MM, height * style.MM), dpi=100, facecolor=style.PAPER)
    FigureCanvasAgg(figure)
    return figure


def title_line(figure: Figure, title: str, left: float) -> None:
    """The title at the head of the page, `left` mm from its edge, in smaller type if it is a long one."""
    width, height = figure.get_size_inches() / style.MM
    # a letter of bold type is about 0.62 of its size wide
    room = (width - left - 4) / 25.4 * 72 / (0.62 * max(1, len(title)))
    size = float(min(style.TITLE, max(6.0, room)))
    figure.text(left / width, 1 - 5 / height, title, fontsize=size, fontweight="bold", va="center")


def save(figure: Figure, path: Path | str) -> None:
    """Write a picture whole or not at all; the suffix says how: svg, png, pdf."""
    import matplotlib

    kind = picture_format(path)
    stream = io.BytesIO()
    with matplotlib.rc_context(style.RC):
        figure.savefig(stream, format=kind, dpi=_DPI, metadata=_STAMPS[kind])
    write_whole(Path(path), stream.getvalue())
