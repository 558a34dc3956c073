"""Files name no machine, no host and no unfinished work; they stand on their own."""

import re

import pytest

pytestmark = pytest.mark.house

# Identifiers that file formats prescribe; they look like addresses and nobody fetches them.
FORMAT_IDENTIFIERS = re.compile(
    r"http://www\.w3\.org/(?:2000/svg|1999/xlink|1999/xhtml|1998/Math/MathML|XML/1998/namespace|2001/xml-events)"
    r"|http://schemas\.microsoft\.com/3dmanufacturing/[\w/]+"
    r"|http://schemas\.openxmlformats\.org/[\w/-]+"
    r"|https://json-schema\.org/draft/2020-12/schema"
)
BANNED = {
    "a host": r"https?:" + r"//|\bwww\.|\b[a-z0-9-]{2,}\.(?:com|org|net|io|dev)\b",
    "a machine's path": r"(?<![\w.)\]}>*])/(?:work|tmp|root|home|opt|mnt|Users)\b(?!-)|\bshared" + r"/",
    "a package registry": r"\bpypi\b|python" + r"hosted|test" + r"pypi",
    "how the tree was made": r"tool.?library" + r"\b|\bissue" + r" #?\d|\bco-authored" + r"-by\b",
    "unfinished work": r"\bTO" + r"DO\b|\bFIX" + r"ME\b|\bXX" + r"X\b|\bNotImplemented" + r"Error\b",
}


def offences(text: str) -> list[str]:
    """Each banned word of a text, with its line."""
    wrong = []
    for number, line in enumerate(text.splitlines(), start=1):
        plain = FORMAT_IDENTIFIERS.sub("", line)
        for what, pattern in BANNED.items():
            if found := re.search(pattern, plain, re.IGNORECASE):
                wrong.append(f"{number}: {what}: {found[0]}")
    return wrong


def test_files_stand_on_their_own(texts: dict[str, str]) -> None:
    own = "tests/0_repo/test_words.py"  # the patterns are written here
    wrong = [f"{name}:{line}" for name, text in texts.items() if name != own for line in offences(text)]
    assert not wrong, "\n".join(wrong)


@pytest.mark.parametrize(
    "parts",
    [
        ("see https:", "//example.org/x"),
        ("from example", ".com"),
        ("read /t", "mp/x"),
        ("'/w", "ork/main'"),
        ("../sha", "red/notes"),
        ("uploaded to Py", "PI"),
        ("# TO", "DO later"),
        ("raise NotImplemented", "Error"),
        ("as issue", " 7 asks"),
    ],
)
def test_an_offence_is_noticed(parts: tuple[str, str]) -> None:
    """The examples are written in two parts, so that no tool that looks for such words stops at this file."""
    assert offences("".join(parts))


@pytest.mark.parametrize(
    "text",
    [
        'xmlns="http://www.w3.org/2000/svg"',
        "the frame/work of a/root of framework/rootless",
        "a shared edge",
        "fabgen.design.findings",
        "EN 1993-1-8",
    ],
)
def test_plain_text_passes(text: str) -> None:
    assert offences(text) == []
