"""YAML text to a tree that knows where everything stands.

Built from the C parser's events, so depth, anchors, tags and a second document are seen before they can do harm.
Scalars stay text: the field that takes one decides what it is, as YAML 1.2 would, never as YAML 1.1 guesses.
"""

import re
from collections.abc import Iterator
from typing import Any

import yaml

from fabgen.errors import Place
from fabgen.read.source import Problems, Source
from fabgen.units import comma_error

DEEPEST = 20
"""Levels of nesting; a design needs five."""

_LOADER: Any = getattr(yaml, "CSafeLoader", yaml.SafeLoader)
_NULL = {"", "~", "null", "Null", "NULL"}
_WHOLE = re.compile(r"[+-]?[0-9]+")
_COMMA_HALF = re.compile(r"[0-9]+ ?(mm|cm|m|in|ft|\"|'|Hz|kHz|MHz|GHz|dB)?")
_INDENTED = re.compile(r"[ ]*([\t\u00a0\u2000-\u200a\u202f\u3000])")


class Scalar(str):
    """A value or key as written, with its place.

    Attributes:
        source: the file it stands in.
        line: counted from 1.
        column: counted from 1.
        width: characters on that line.
        plain: written without quotes.
        broken: already reported; nobody needs to complain again.
    """

    __slots__ = ("broken", "column", "line", "plain", "source", "width")
    source: Source
    line: int
    column: int
    width: int
    plain: bool
    broken: bool

    @classmethod
    def at(cls, text: str, source: Source, line: int, column: int, width: int = 1, plain: bool = True) -> "Scalar":
        """A scalar at a place."""
        scalar = cls(text)
        scalar.source, scalar.line, scalar.column, scalar.width = source, line, column, width
        scalar.plain, scalar.broken = plain, False
        return scalar

    @classmethod
    def absent(cls, mapping: "Map") -> "Scalar":
        """Stands for a value whose absence was reported."""
        scalar = cls.at("", mapping.source, mapping.line, mapping.column, 0)
        scalar.broken = True
        return scalar

    @property
    def empty(self) -> bool:
        """Whether YAML 1.2 reads no value here."""
        return self.plain and str(self) in _NULL

    @property
    def place(self) -> Place:
        """Where it stands."""
        return self.source.place(self.line, self.column, max(1, self.width))


class Map(dict[str, "Node"]):
    """A mapping with the place where it begins."""

    def __init__(self, source: Source, line: int, column: int, flow: bool = False) -> None:
        super().__init__()
        self.source, self.line, self.column, self.flow = source, line, column, flow

    @property
    def place(self) -> Place:
        """Where it begins."""
        return self.source.place(self.line, self.column)

    def key(self, name: str) -> Scalar | None:
        """The key of that name as written, with its place."""
        return next((key for key in self if key == name and isinstance(key, Scalar)), None)


class Seq(list["Node"]):
    """A list with the place where it begins."""

    def __init__(self, source: Source, line: int, column: int, flow: bool = False) -> None:
        super().__init__()
        self.source, self.line, self.column, self.flow = source, line, column, flow

    @property
    def place(self) -> Place:
        """Where it begins."""
        return self.source.place(self.line, self.column)


Node = Scalar | Map | Seq


class _Open:
    """A mapping or list that is not closed yet."""

    def __init__(self, node: Map | Seq) -> None:
        self.node = node
        self.key: Scalar | None = None
        self.previous: Scalar | None = None


def parse(source: Source, problems: Problems) -> Map:
    """Parse one YAML document whose top level is a mapping.

    Args:
        source: the file.
        problems: takes what is wrong; a broken value stays in the tree, marked.

    Returns:
        The top-level mapping.

    Raises:
        DesignErrors: the text is not YAML, too deep, or no mapping.
    """
    _report_indentation(source, problems)
    builder = _Builder(source, problems)
    try:
        for event in _events(source):
            builder.take(event)
    except yaml.MarkedYAMLError as error:
        _report_syntax(error, source, problems)
        problems.stop()
    root = builder.root
    if not isinstance(root, Map):
        place = root.place if root is not None and not _is_empty(root) else source.place(1, 1)
        said = "is empty" if root is None or _is_empty(root) else "does not hold keys and values at its top level"
        problems.add("D08", f"the file {said}", place, "begin with: fabgen: 1")
        problems.stop()
        raise AssertionError
    return root


def _events(source: Source) -> Iterator[Any]:
    loader = _LOADER(source.text)
    try:
        while loader.check_event():
            yield loader.get_event()
    finally:
        loader.dispose()


def _is_empty(node: Node) -> bool:
    return isinstance(node, Scalar) and node.empty


class _Builder:
    """Turns events into nodes, with a stack instead of recursion."""

    def __init__(self, source: Source, problems: Problems) -> None:
        self.source = source
        self.problems = problems
        self.root: Node | None = None
        self.stack: list[_Open] = []
        self.documents = 0

    def take(self, event: Any) -> None:
        """Take the next event."""
        kind = type(event)
        if kind is yaml.ScalarEvent:
            scalar = self._scalar(event)
            self._check_properties(event, scalar)
            self._put(scalar)
        elif kind is yaml.MappingStartEvent or kind is yaml.SequenceStartEvent:
            mark = event.start_mark
            make = Map if kind is yaml.MappingStartEvent else Seq
            node = make(self.source, mark.line + 1, mark.column + 1, bool(event.flow_style))
            self._check_properties(event, None)
            self._put(node)
            self.stack.append(_Open(node))
            if len(self.stack) > DEEPEST:
                message = f"the file nests deeper than {DEEPEST} levels"
                self.problems.add("D02", message, node.place, "a design needs five levels")
                self.problems.stop()
        elif kind is yaml.MappingEndEvent or kind is yaml.SequenceEndEvent:
            self.stack.pop()
        elif kind is yaml.AliasEvent:
            scalar = self._scalar(event)
            scalar.broken = True
            message = f"`*{event.anchor}` repeats another value; a design file spells every value out"
            self.problems.add("D04", message, scalar.place, "write the value itself")
            self._put(scalar)
        elif kind is yaml.DocumentStartEvent:
            self.documents += 1
            if self.documents == 2:
                mark = event.start_mark
                place = self.source.place(mark.line + 1, mark.column + 1, 3)
                message = "a second document begins here; a file holds one array"
                self.problems.add("D04", message, place, "put the second array in a file of its own")
                self.problems.stop()

    def _scalar(self, event: Any) -> Scalar:
        start, end = event.start_mark, event.end_mark
        text = getattr(event, "value", None)
        if text is None:
            text = f"*{event.anchor}"
        line, column = start.line + 1, start.column + 1
        same_line = end.line == start.line
        width = end.column - start.column if same_line else len(self.source.lines[start.line]) - start.column
        return Scalar.at(text, self.source, line, column, width, not getattr(event, "style", ""))

    def _check_properties(self, event: Any, scalar: Scalar | None) -> None:
        """Refuse anchors and tags."""
        mark = event.start_mark
        if event.anchor is not None:
            place = self.source.place(mark.line + 1, mark.column + 1, len(event.anchor) + 1)
            message = f"`&{event.anchor}` names a value for reuse; a design file spells every value out"
            self.problems.add("D04", message, place, "delete it")
        if event.tag is not None:
            place = self.source.place(mark.line + 1, mark.column + 1)
            message = f"the tag `{event.tag}` has no meaning here"
            self.problems.add("D04", message, place, "delete the tag and keep the value")
            if scalar is not None:
                scalar.broken = True

    def _put(self, node: Node) -> None:
        """Hang a node into the innermost open mapping or list."""
        if not self.stack:
            if self.root is None:
                self.root = node
            return
        top = self.stack[-1]
        if isinstance(top.node, Seq):
            top.node.append(node)
        elif top.key is None:
            top.key = self._as_key(node)
        else:
            self._pair(top, top.key, node)
            top.key = None

    def _as_key(self, node: Node) -> Scalar:
        if isinstance(node, Scalar):
            return node
        message = "a key must be a word, not a list or a mapping"
        self.problems.add("D08", message, node.place, "write key: value")
        key = Scalar.at("", self.source, node.line, node.column)
        key.broken = True
        return key

    def _pair(self, top: _Open, key: Scalar, node: Node) -> None:
        """Put a key and its value into a mapping, unless the key is doubled or half a decimal."""
        mapping = top.node
        assert isinstance(mapping, Map)
        before = top.previous
        if key.broken:
            return
        if key == "<<":
            message = "`<<` merges another mapping; a design file spells every value out"
            self.problems.add("D04", message, key.place, "write the keys themselves")
        elif mapping.flow and before is not None and _half_of_decimal(before, key, node):
            error = comma_error(f"{before},{key}")
            place = self.source.place(before.line, before.column, key.column + key.width - before.column)
            self.problems.add("D13", f"{error.message}; inside braces a comma ends the value", place, error.fix)
            before.broken = True
        elif key in mapping:
            first = mapping.key(key)
            assert first is not None
            message = f"`{key}` stands twice here, first in line {first.line}"
            self.problems.add("D05", message, key.place, "keep one of the two")
        else:
            mapping[key] = node
            top.previous = node if isinstance(node, Scalar) else None


def _half_of_decimal(before: Scalar, key: Scalar, node: Node) -> bool:
    """Whether `before, key` is what a flow mapping makes of a decimal comma: `{gap: 4,5 mm}`."""
    empty = isinstance(node, Scalar) and node.empty and node.width == 0
    return empty and bool(_WHOLE.fullmatch(before)) and before.line == key.line and bool(_COMMA_HALF.fullmatch(key))


def _report_indentation(source: Source, problems: Problems) -> None:
    """Refuse what looks like an indentation and is none: no-break and wide spaces, as web pages have them."""
    for number, line in enumerate(source.lines, start=1):
        if (found := _INDENTED.match(line)) and found[1] != "\t":
            place = source.place(number, found.start(1) + 1)
            problems.add("D03", f"U+{ord(found[1]):04X} in the indentation is no plain space", place, "type the spaces")
    problems.stop()


def _report_syntax(error: yaml.MarkedYAMLError, source: Source, problems: Problems) -> None:
    """Say in plain words what the parser tripped over."""
    tabs = [
        (n, found) for n, line in enumerate(source.lines, start=1) if line.strip() and (found := _INDENTED.match(line))
    ]
    for number, found in tabs:
        place = source.place(number, found.start(1) + 1)
        problems.add("D03", "a tab in the indentation; YAML takes spaces only", place, "use two spaces per level")
    if tabs:
        return
    problem, context = str(error.problem or ""), str(error.context or "")
    message, fix = _plain_words(problem, context)
    mark, noticed = error.problem_mark or error.context_mark, ""
    opened = error.context_mark
    if opened is not None and mark is not None and any(words in context for words in _POINT_AT_OPENING):
        if mark.line > opened.line:
            noticed = f", noticed in line {min(mark.line + 1, len(source.lines))}"
        mark = opened if noticed else mark
    line, column = (mark.line + 1, mark.column + 1) if mark else (1, 1)
    if line > len(source.lines):
        line, column = len(source.lines), len(source.lines[-1]) + 1
    if glued := _GLUED.match(source.lines[line - 1], column - 1):
        message, fix = "no space after the `:`", f"write {glued[1]}: {glued[2].strip()}"
    problems.add("D03", message + noticed, source.place(line, column), fix)


_GLUED = re.compile(r"([a-z_]+):([^\s:/].*)")
"""A key with its value, as in `units:mm`."""

_POINT_AT_OPENING = ("quoted scalar", "flow mapping", "flow sequence", "simple key")
"""Where the parser stops late, the place where the open bracket, quote or key begins is the better one to show."""

_SYNTAX = (
    (
        "mapping values are not allowed",
        "a `:` stands where no key can be",
        "indent alike; quote texts with a colon",
    ),
    ("while scanning a quoted scalar", "a quote is not closed", "close it on the same line"),
    (
        "did not find expected ',' or",
        "a comma or a closing bracket is missing",
        "separate values with commas and close every { with } and every [ with ]",
    ),
    ("did not find expected key", "a key does not line up with its neighbours", "indent keys of one level alike"),
    ("did not find expected '-'", "a row does not line up with its neighbours", "begin every row with `- `"),
    ("could not find expected ':'", "a key without `:`", "write key: value"),
    ("cannot start any token", "a character that cannot begin a value", "put the value in quotes"),
    ("block sequence entries are not", "a `-` stands where no row can be", "begin rows on their own line"),
    ("unknown escape character", "an unknown escape in double quotes", "use single quotes"),
)


def _plain_words(problem: str, context: str) -> tuple[str, str]:
    for words, message, fix in _SYNTAX:
        if words in problem or words in context:
            return message, fix
    return f"this is not YAML: {problem or context}", "compare with the example of `fabgen new`"
