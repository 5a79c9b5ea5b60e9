"""The characters of a text, read one token at a time; in the place of a leg the rules are those of particle names."""

from __future__ import annotations

import math
import re
from typing import NamedTuple, NoReturn

from barnwright.errors import show
from barnwright.grammar.errors import Finding, GrammarError
from barnwright.grammar.limits import LONGEST_TEXT

_NUMBER = re.compile(r"([0-9]+\.?[0-9]*|\.[0-9]+)([eE][+-]?[0-9]+)?")
_WORD = re.compile(r"[A-Za-z_][A-Za-z_0-9]*")
_KEYWORD = re.compile(r"([A-Za-z_][A-Za-z_0-9]*)[ \t\n\r]*=(?!=)")
_OF_LEG = r"!#-&*+\--<>-~"  # all printable characters of ASCII but " ' ( ) , =
_LEG = re.compile(rf"[A-Za-z0-9_](?:[{_OF_LEG}]|\([{_OF_LEG}]*\))*")
_QUOTED = re.compile(r"\"([^\"']*)\"|'([^\"']*)'")
_SYMBOLS = ("**", "*", "/", "+", "-", "(", ")", ",", "=")


def is_word(text: str) -> bool:
    """Whether a text is one word, as names of values are."""
    return _WORD.fullmatch(text) is not None


def is_leg(text: str) -> bool:
    """Whether a text reads as one leg: a particle's name, a number, ``beam_a``."""
    return _LEG.fullmatch(text) is not None


class Token(NamedTuple):
    """``kind`` is "number", "word", "end" or the symbol itself."""

    kind: str
    text: str
    position: int


class Scanner:
    """A cursor over a text.

    Raises
    ------
    GrammarError
        For texts that are too long, and at the first character that no token starts with.
    """

    def __init__(self, text: str) -> None:
        self.text = text
        self.at = 0
        if len(text) > LONGEST_TEXT:
            self.fail(f"a text of at most {LONGEST_TEXT} characters, not {len(text)}", position=LONGEST_TEXT)

    def fail(self, expected: str, nearest: str | None = None, position: int | None = None) -> NoReturn:
        """Refuse the text at a position, by default here."""
        raise self.refusal(expected, nearest, position)

    def refusal(self, expected: str, nearest: str | None = None, position: int | None = None) -> GrammarError:
        """The error that refuses the text at a position, by default here."""
        return GrammarError(self.text, (Finding(self.at if position is None else position, expected, nearest),))

    def peek(self) -> Token:
        """The next token of an expression, not yet taken."""
        self._skip_space()
        if self.at >= len(self.text):
            return Token("end", "", self.at)
        for symbol in _SYMBOLS:
            if self.text.startswith(symbol, self.at):
                return Token(symbol, symbol, self.at)
        for kind, pattern in (("number", _NUMBER), ("word", _WORD)):
            match = pattern.match(self.text, self.at)
            if match is not None:
                return Token(kind, match[0], self.at)
        raise self._of_character()

    def take(self) -> Token:
        """The next token of an expression."""
        token = self.peek()
        self.at = token.position + len(token.text)
        return token

    def take_if(self, kind: str) -> bool:
        """Take the next token if it is of this kind."""
        if self.peek().kind != kind:
            return False
        self.take()
        return True

    def demand(self, kind: str, expected: str) -> Token:
        """Take the next token, which must be of this kind."""
        if self.peek().kind != kind:
            self.fail(expected, position=self.peek().position)
        return self.take()

    def leg(self) -> tuple[str, int]:
        """A particle name, leg number or beam, and its position."""
        self._skip_space()
        match = _LEG.match(self.text, self.at)
        if match is None:
            foreign = self.at < len(self.text) and not self.text[self.at].isascii()
            raise self._of_character() if foreign else self.refusal("a particle of the reaction")
        start, self.at = self.at, match.end()
        return match[0], start

    def keyword(self) -> Token | None:
        """A word with an equals sign behind it, both taken; None, and nothing taken, where there is none."""
        self._skip_space()
        match = _KEYWORD.match(self.text, self.at)
        if match is None:
            return None
        word = Token("word", match[1], self.at)
        self.at = match.end()
        return word

    def word_before_parenthesis(self) -> str | None:
        """The word here if a parenthesis follows it directly; nothing is taken."""
        self._skip_space()
        match = _WORD.match(self.text, self.at)
        if match is None or not self.text.startswith("(", match.end()):
            return None
        return match[0]

    def quoted(self) -> tuple[str, int]:
        """A word in quotes, and its position."""
        self._skip_space()
        match = _QUOTED.match(self.text, self.at)
        if match is None:
            self.fail("a word in quotes")
        start, self.at = self.at, match.end()
        return match[1] or match[2] or "", start

    def number(self, token: Token) -> float:
        """The value of a number token."""
        value = float(token.text)
        if not math.isfinite(value):
            self.fail("a number that is not infinite", position=token.position)
        return value

    def _skip_space(self) -> None:
        while self.at < len(self.text) and self.text[self.at] in " \t\n\r":
            self.at += 1

    def _of_character(self) -> GrammarError:
        character = self.text[self.at]
        if not character.isascii():
            return self.refusal(f"plain letters, digits and + - * / ( ); {show(character)} is U+{ord(character):04X}")
        nearest = "**" if character == "^" else None
        return self.refusal(
            f"a number, a name or one of + - * / ** ( ); {show(character)} has no meaning here", nearest
        )
