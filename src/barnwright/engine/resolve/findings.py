"""The list into which all parts of `resolve` write, so that a request gets all its findings in one answer."""

from __future__ import annotations

from dataclasses import dataclass, field

from barnwright.errors import RequestError, Violation, show


@dataclass(slots=True)
class Findings:
    """Violations in the order in which they were found."""

    violations: list[Violation] = field(default_factory=list)

    def add(self, where: str, value: object, expected: str, nearest: str | None = None) -> None:
        """One violation; ``value`` is shown to the person as `show` has it."""
        self.violations.append(Violation(where, show(value), expected, nearest))

    def __bool__(self) -> bool:
        return bool(self.violations)

    def refuse(self) -> None:
        """Raise what was found, if anything.

        Raises
        ------
        RequestError
            With every violation.
        """
        if self.violations:
            raise RequestError(self.violations)
