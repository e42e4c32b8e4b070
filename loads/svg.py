"""SVG elements as text, escaped in one place. Presentation attributes only, never `style`."""

from collections.abc import Iterable, Mapping
from xml.sax.saxutils import escape, quoteattr


def element(name: str, *inside: str, words: str = "", **attributes: str | float) -> str:
    """This function will write one element: children as they are, `words` escaped, numbers with two decimals.

    An underscore in an attribute's name stands for a hyphen: `stroke_width=1`.
    """
    return _element(name, attributes, *inside, words=words)


def _element(name: str, attributes: Mapping[str, str | float], *inside: str, words: str = "") -> str:
    written = "".join(
        f" {key.replace('_', '-')}={quoteattr(value if isinstance(value, str) else short(value))}"
        for key, value in attributes.items()
    )
    held = escape(words) + "".join(inside)
    return f"<{name}{written}>{held}</{name}>" if held else f"<{name}{written}/>"


def picture(parts: Iterable[str], width: float, height: float, told: str) -> str:
    """This function will write a whole black picture; `told` says it in words to who cannot see it."""
    return element(
        "svg",
        *parts,
        xmlns="http://www.w3.org/2000/svg",
        viewBox=f"0 0 {short(width)} {short(height)}",
        role="img",
        aria_label=told,
        font_family="IBM Plex Sans, sans-serif",
        font_size=9,
        fill="#000",
    )


def line(start: tuple[float, float], end: tuple[float, float], **attributes: str | float) -> str:
    """This function will write a straight black line, 0.5 wide unless said otherwise."""
    stroke, width = attributes.pop("stroke", "#000"), attributes.pop("stroke_width", 0.5)
    ends = {"x1": start[0], "y1": start[1], "x2": end[0], "y2": end[1]}
    return _element("line", {**ends, "stroke": stroke, "stroke_width": width, **attributes})


def label(words: str, at: tuple[float, float], **attributes: str | float) -> str:
    """This function will write words with the left end of their base line at `at`, unless said otherwise."""
    return element("text", words=words, x=at[0], y=at[1], **attributes)


def corners(points: list[tuple[float, float]]) -> str:
    """This function will write points as the `points` attribute of a polygon or polyline."""
    return " ".join(f"{short(x)},{short(y)}" for x, y in points)


def short(value: float) -> str:
    """This function will write a number with at most two decimals, no exponent, no minus zero."""
    text = f"{value:.2f}".rstrip("0").rstrip(".")
    return "0" if text in {"-0", ""} else text
