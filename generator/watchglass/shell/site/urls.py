"""Which addresses may stand in a page, and how they are written there.

An address comes from an author's text and is not to be trusted: a browser runs `javascript:` and
reads past blanks and control characters to find it. What is not plainly harmless gets no link.
"""

from __future__ import annotations

import re

_SCHEME = re.compile(r"[A-Za-z][A-Za-z0-9+.\-]*:")
_OUTSIDE = frozenset(("http:", "https:", "mailto:"))
_HIDDEN = re.compile(r"[\x00-\x20\x7f-\xa0\u2028\u2029\\]")


def harmless(target: str) -> bool:
    """Tell whether an address leads to a page, a mailbox or a place of the site.

    Blanks, control characters and backslashes are refused anywhere, since browsers drop or turn
    them; so is `//host`, which takes its scheme from the page it stands in.
    """
    target = target.strip(" ")
    if not target or _HIDDEN.search(target) or target.startswith("//"):
        return False
    scheme = _SCHEME.match(target)
    return scheme is None or scheme[0].lower() in _OUTSIDE


def leads_outside(target: str) -> bool:
    """Tell whether an address has a scheme."""
    return _SCHEME.match(target) is not None


def root_of(address: str) -> str:
    """Give what leads from a page back to the edition's root: empty, or `../` for each folder.

    >>> root_of("procedures/oc-04.html")
    '../'
    """
    return "../" * address.count("/")


def resolved(target: str, root: str) -> str | None:
    """Give an address of the site as seen from a page; None where it is not harmless.

    Args:
        target: Address from the edition's root, or `#place` on the page itself.
        root: What leads from the page to the root.
    """
    spaced = target.strip(" ").replace(" ", "%20")
    if not harmless(spaced) or leads_outside(spaced):
        return None
    return spaced if spaced.startswith("#") else root + spaced
