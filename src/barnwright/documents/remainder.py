"""What is left of a wrong request, so that what is wrong with its physics is found in the same answer."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from dataclasses import dataclass
from typing import TYPE_CHECKING

from barnwright.errors import RequestError, Violation

if TYPE_CHECKING:
    from barnwright.documents.request import Request


@dataclass(frozen=True, slots=True)
class Remainder:
    """A request whose wrong parts are taken out or made harmless; ``taken`` has the fields of those parts."""

    request: Request
    taken: frozenset[str]

    def hides(self, field: str) -> bool:
        """Whether a finding about a field may only be a consequence of what was taken out."""
        return any(_within(field, taken) or _within(taken, field) for taken in self.taken)


def _within(field: str, section: str) -> bool:
    return field == section or field.startswith((f"{section}.", f"{section}["))


def checked(make: Callable[[], Request], check: Callable[[Request], Iterable[Violation]]) -> Request:
    """The request that ``make`` makes; where it is refused, what ``check`` finds wrong with the rest is added.

    Raises:
        RequestError: with the findings of both.
    """
    try:
        return make()
    except RequestError as error:
        left = remainder_of(error)
        if left is None:
            raise
        raise completed(error, check(left)) from None


def remainder_of(error: RequestError) -> Request | None:
    """The request that is left, or None."""
    return error.remainder.request if isinstance(error.remainder, Remainder) else None


def completed(error: RequestError, found: Iterable[Violation]) -> RequestError:
    """The error with what was found wrong with the remainder added, consequences and repetitions left away."""
    left, known = error.remainder, {violation.field for violation in error.violations}
    if not isinstance(left, Remainder):
        return error
    more = [violation for violation in found if violation.field not in known and not left.hides(violation.field)]
    return RequestError([*error.violations, *more])
