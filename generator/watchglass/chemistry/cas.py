"""CAS registry numbers: their form and their check digit.

A number copied with two digits changed about is the commonest mistake in a catalogue, and the
check digit finds it. Whether the number belongs to the substance, no rule can tell.
"""

from __future__ import annotations

import re

# Expressions are compiled where they are used, and `re` keeps them: start-up is felt.
#: What such a number looks like, its check digit left aside.
FORM = r"([1-9][0-9]{1,6})-([0-9]{2})-([0-9])"


def check_digit(text: str) -> int | None:
    """Work out the check digit that a CAS number should end in.

    Source:
        The registry's published rule: the digits before the last, counted from the right, times
        1, 2, 3 ...; the sum's last digit. From memory; held against known numbers in the tests.

    Args:
        text: The whole number, as `7732-18-5`; its own last digit is not used.

    Returns:
        The digit, 0 to 9, or None where the text has not the form of a CAS number.
    """
    form = re.compile(FORM).fullmatch(text)
    if form is None:
        return None
    digits = form[1] + form[2]
    return sum(place * int(digit) for place, digit in enumerate(reversed(digits), 1)) % 10


def check_digit_holds(text: str) -> bool:
    """Tell whether a text has the form of a CAS number and ends in the right digit.

    >>> check_digit_holds("7732-18-5")
    True
    >>> check_digit_holds("7723-18-5")
    False
    """
    return check_digit(text) is not None and text[-1] == str(check_digit(text))
