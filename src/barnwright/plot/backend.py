"""matplotlib, imported only when a picture is asked for, without a window and without its global state."""

from __future__ import annotations

from io import BytesIO
from types import ModuleType
from typing import TYPE_CHECKING, Any

from barnwright.errors import BarnwrightError, RequestError, Violation, nearest, show

if TYPE_CHECKING:
    from matplotlib.figure import Figure

FORMATS = ("png", "pdf", "svg")

#: Okabe and Ito's palette for colour-blind readers ("Color Universal Design", 2008), darkest first so that it prints.
COLOURS = ("#0072B2", "#D55E00", "#009E73", "#000000", "#CC79A7", "#E69F00", "#56B4E9")
#: One line style a colour, so that a black-and-white print still tells them apart.
DASHES = ("-", (0, (5, 2)), (0, (1, 1.2)), "-.", (0, (8, 2)), (0, (3, 1, 1, 1, 1, 1)), (0, (6, 1, 1, 1)))
#: Cividis: even in lightness, and the same for the usual kinds of colour blindness.
COLOUR_MAP = "cividis"

_STYLE: dict[str, Any] = {
    "font.size": 10,
    "axes.titlesize": 10,
    "axes.linewidth": 0.8,
    "xtick.direction": "in",
    "ytick.direction": "in",
    "xtick.top": True,
    "ytick.right": True,
    "axes.formatter.limits": (-3, 4),
    "axes.formatter.use_mathtext": True,
    "mathtext.fontset": "dejavusans",
    "svg.hashsalt": "barnwright",
    "svg.fonttype": "path",
    "pdf.fonttype": 42,
}


def matplotlib() -> ModuleType:
    """The package matplotlib. Raises BarnwrightError naming the extra when it is not installed."""
    try:
        import matplotlib as package
    except ImportError as error:
        raise BarnwrightError("a picture needs matplotlib: install barnwright with its extra 'plot'") from error
    return package


def blank(panels: int) -> tuple[Figure, list[Any]]:
    """A figure with so many panels, at most two side by side, and their axes."""
    package = matplotlib()
    from matplotlib.figure import Figure

    columns = 1 if panels == 1 else 2
    rows = -(-panels // columns)
    with package.rc_context(_STYLE):
        figure = Figure(figsize=(6.4 if columns == 1 else 11.0, 4.4 * rows), layout="constrained")
        grid = figure.subplots(rows, columns, squeeze=False).ravel()
    for spare in grid[panels:]:
        spare.set_visible(False)
    return figure, list(grid[:panels])


def check_format(name: str, field: str = "format") -> str:
    """The format of a picture by a file's suffix or a word. Raises RequestError naming the nearest one."""
    word = name.rpartition(".")[2].lower()
    if word not in FORMATS:
        raise RequestError([Violation(field, show(name), "a picture: png, pdf or svg", nearest(word, FORMATS))])
    return word


def check_picture(name: str, field: str) -> None:
    """Refuse a file name that is no picture, or any where matplotlib is missing.

    Raises RequestError naming the nearest format, BarnwrightError naming the extra.
    """
    check_format(name, field)
    matplotlib()


def encode(figure: Figure, form: str) -> bytes:
    """The bytes of a picture in "png", "pdf" or "svg"; the same figure gives the same bytes (no date inside)."""
    word = check_format(form)
    dates = {"png": {"Software": None}, "pdf": {"CreationDate": None}, "svg": {"Date": None}}
    content = BytesIO()
    with matplotlib().rc_context(_STYLE):
        figure.savefig(content, format=word, dpi=160, metadata=dates[word])
    return content.getvalue()
