"""Errors and warnings that both packages raise, and the search for the nearest valid name."""

from __future__ import annotations

from collections.abc import Iterable


class InputError(ValueError):
    """A value that cannot be used.

    Attributes
    ----------
    field : str
        The argument, or the path into the case file (``inlet.intensity``).
    given : str
        What was given, as text.
    accepted : str
        What is accepted, as text; may be empty when the message says it all.

    Examples
    --------
    >>> raise InputError("reynolds", "-1", "a number above 0")
    Traceback (most recent call last):
    walllaw.errors.InputError: reynolds: got -1; accepted: a number above 0
    """

    def __init__(self, field: str, given: str, accepted: str = "", hint: str = "") -> None:
        self.field = field
        self.given = given
        self.accepted = accepted
        self.hint = hint
        text = f"{field}: got {given}" if given else field
        if accepted:
            text += f"; accepted: {accepted}"
        if hint:
            text += f"; {hint}"
        super().__init__(" ".join(text.split()))

    def __reduce__(self) -> tuple[type[InputError], tuple[str, str, str, str]]:
        return type(self), (self.field, self.given, self.accepted, self.hint)


class TableError(ValueError):
    """A data table that is damaged or incomplete."""


class RangeWarning(UserWarning):
    """A correlation was used outside the range its source states."""


def _distance(a: str, b: str) -> int:
    """Edit distance in which two neighbouring letters swapped count as one edit."""
    before: list[int] = []
    previous = list(range(len(b) + 1))
    for i, x in enumerate(a, 1):
        current = [i]
        for j, y in enumerate(b, 1):
            cost = min(previous[j] + 1, current[j - 1] + 1, previous[j - 1] + (x != y))
            if i > 1 and j > 1 and x == b[j - 2] and a[i - 2] == y:
                cost = min(cost, before[j - 2] + 1)
            current.append(cost)
        before, previous = previous, current
    return previous[-1]


def nearest(name: str, names: Iterable[str]) -> str | None:
    """Return the valid name nearest to a misspelt one, or None when nothing is near.

    "Near" is an edit distance of at most a third of the longer name.

    Examples
    --------
    >>> nearest("hanland", ["haaland", "colebrook"])
    'haaland'
    >>> nearest("zzz", ["haaland"]) is None
    True
    """
    lowered = name.lower().replace("_", "-")
    best: tuple[float, str] | None = None
    for candidate in names:
        distance = _distance(lowered, candidate.lower().replace("_", "-"))
        if distance * 3 <= max(len(name), len(candidate)) and (best is None or distance < best[0]):
            best = (distance, candidate)
    return best[1] if best else None


def unknown_name(field: str, given: str, names: Iterable[str], listing: str = "") -> InputError:
    """Build the error for a name that does not exist: accepted names and the nearest one.

    Parameters
    ----------
    field : str
        What the name names (``closure``, ``flow.kind``).
    given : str
        The name that was given.
    names : iterable of str
        All valid names.
    listing : str, optional
        Where to see them all, used instead of the list when that is long.
    """
    known = list(names)
    near = nearest(given, known)
    accepted = listing if listing and len(known) > 12 else ", ".join(known)
    return InputError(field, repr(given), accepted, f"did you mean {near!r}?" if near else "")
