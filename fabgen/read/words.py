"""Words, texts, names and dates of a design file, each with what is allowed and an example."""

import re
from datetime import date
from typing import Any

from pydantic_core.core_schema import ValidationInfo

from fabgen.read.kind import Kind, refuse, scalar_of
from fabgen.read.nearest import suggestion
from fabgen.read.yaml_tree import Scalar


class Word(Kind):
    """One of a few words."""

    def __init__(self, *words: str) -> None:
        self.words, self.example = words, words[0]

    def read(self, value: Any, _info: ValidationInfo) -> str:
        """The word."""
        scalar = scalar_of(value, self.words[0])
        if str(scalar) not in self.words:
            refuse("D09", f"'{scalar}' is not known", suggestion(scalar, self.words))
        return str(scalar)

    def schema(self) -> dict[str, Any]:
        """The words, and what YAML makes of those that look like a number or a truth value."""
        typed = {"1": 1, "true": True, "false": False}
        return {"enum": [*self.words, *(typed[word] for word in self.words if word in typed)]}


class Text(Kind):
    """Free text on one line; white space of any kind becomes single spaces.

    Args:
        longest: number of characters.
        example: as a user would write it.
        blank: whether nothing may be written.
    """

    def __init__(self, longest: int, example: str, *, blank: bool = False) -> None:
        self.longest, self.example, self.blank = longest, example, blank

    def read(self, value: Any, _info: ValidationInfo) -> str:
        """The text."""
        if self.blank and isinstance(value, Scalar) and value.empty:
            return ""
        scalar = scalar_of(value, self.example)
        text = " ".join(scalar.split())
        if not text and not self.blank:
            refuse("D07", "has no value", f"for example {self.example}")
        if len(text) > self.longest:
            refuse("D12", f"has {len(text)} characters", f"at most {self.longest}")
        if not text.isprintable():
            bad = next(character for character in text if not character.isprintable())
            refuse("D14", f"holds U+{ord(bad):04X}, which cannot be printed", "delete that character")
        return text

    def schema(self) -> dict[str, Any]:
        """A text of limited length."""
        kinds = ["string", "null"] if self.blank else ["string", "number"]
        return {"type": kinds, "maxLength": self.longest, "examples": [self.example]}


class Name(Kind):
    """A name that becomes part of file and part names.

    Args:
        pattern: the whole name matches it.
        said: the pattern in words.
        example: as a user would write it.
        reserved: words that are taken, in lower case.
    """

    def __init__(self, pattern: str, said: str, example: str, reserved: tuple[str, ...] = ()) -> None:
        self.pattern, self.said, self.example, self.reserved = pattern, said, example, reserved

    def read(self, value: Any, _info: ValidationInfo) -> str:
        """The name as written."""
        scalar = scalar_of(value, self.example)
        if not re.fullmatch(self.pattern, scalar):
            refuse(
                "D14",
                f"'{scalar}' cannot be a name in files and on drawings",
                f"{self.said}; for example {self.example}",
            )
        if scalar.lower() in self.reserved:
            refuse("D14", f"'{scalar}' is reserved for the part of that name", f"for example {self.example}")
        return str(scalar)

    def schema(self) -> dict[str, Any]:
        """A text of that pattern."""
        return {"type": ["string", "number"], "pattern": f"^{self.pattern}$", "description": self.said}


class Date(Kind):
    """A calendar date, or nothing."""

    example = "2026-03-01"

    def read(self, value: Any, _info: ValidationInfo) -> str:
        """The date as written."""
        if isinstance(value, Scalar) and value.empty:
            return ""
        scalar = scalar_of(value, self.example)
        try:
            if not re.fullmatch("[0-9]{4}-[0-9]{2}-[0-9]{2}", scalar):
                raise ValueError
            date.fromisoformat(scalar)
        except ValueError:
            refuse("D10", f"'{scalar}' is not a date", f"year, month and day, for example {self.example}")
        return str(scalar)

    def schema(self) -> dict[str, Any]:
        """A text of that form."""
        return {"type": ["string", "null"], "format": "date", "examples": [self.example]}
