"""matplotlib, imported only when a picture is asked for, without a window and without its global state."""

from __future__ import annotations

from io import BytesIO
from types import ModuleType
from typing import TYPE_CHECKING, Any

from barnwright.errors import BarnwrightError, RequestError, Violation, nearest, show

if TYPE_CHECKING:
    from matplotlib.figure import Figure

FORMATS = ("png", "pdf", "svg")

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
    "hatch.linewidth": 0.5,
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


def style() -> Any:
    """A context in which everything that is made has the style of this room, whatever the user's own is."""
    package = matplotlib()
    plain = {name: value for name, value in package.rcParamsDefault.items() if not name.startswith("backend")}
    return package.rc_context({**plain, **_STYLE})


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
    with style():
        figure.savefig(content, format=word, dpi=160, metadata=dates[word])
    return content.getvalue()
