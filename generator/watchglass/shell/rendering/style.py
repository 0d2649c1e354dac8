"""How printed text is dressed: colours, width, and which characters the reader's side can take."""

from __future__ import annotations

from dataclasses import dataclass

_OFF = "\x1b[0m"
_STRONG = "\x1b[1m"
_FAINT = "\x1b[2m"
_ALARM = "\x1b[1;31m"


@dataclass(frozen=True, slots=True, kw_only=True)
class Style:
    """What the renderers may use.

    Colours are few on purpose: red belongs to errors alone, everything else is bold or faint, so
    that a page of output stays calm and nothing is told by colour only.

    Attributes:
        colour: Whether escape sequences for colour may be written.
        width: Columns an excerpt of a source may fill, > 0.
        unicode: Whether characters beyond ASCII can be shown; where not, they are shown as escapes.
    """

    colour: bool = False
    width: int = 100
    unicode: bool = True

    @property
    def cut(self) -> str:
        """The sign that stands where a long line was cut."""
        return "…" if self.unicode else "..."

    def strong(self, text: str) -> str:
        """Dress text that should be read first."""
        return self._dress(_STRONG, text)

    def faint(self, text: str) -> str:
        """Dress text that is only looked up."""
        return self._dress(_FAINT, text)

    def alarm(self, text: str) -> str:
        """Dress what belongs to an error."""
        return self._dress(_ALARM, text)

    def _dress(self, start: str, text: str) -> str:
        return f"{start}{text}{_OFF}" if self.colour and text else text
