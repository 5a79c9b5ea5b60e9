"""What is wrong with a text of the small language."""

from __future__ import annotations

from dataclasses import dataclass

from barnwright.errors import BarnwrightError, Violation, show


@dataclass(frozen=True, slots=True)
class Finding:
    """One finding: the column counted from 0, what was expected there, and what is nearest."""

    position: int
    expected: str
    nearest: str | None = None


class GrammarError(BarnwrightError, ValueError):
    """A text that the language does not hold; `findings` has every finding, the first one first.

    Parameters
    ----------
    text : str
    findings : tuple of Finding
    """

    def __init__(self, text: str, findings: tuple[Finding, ...]) -> None:
        self.text = text
        self.findings = findings
        super().__init__(text, findings)

    def __str__(self) -> str:
        return "\n".join(str(violation) for violation in self.violations("text"))

    def violations(self, field: str) -> tuple[Violation, ...]:
        """The findings as violations of a request's field."""
        return tuple(Violation(field, show(self.text), f.expected, f.nearest, f.position) for f in self.findings)
