"""What the checks found, and what each code means."""

from fabgen import registry
from fabgen.book.book import Book, Content

PLACE = 20


def content(book: Book) -> Content:
    """The pages of the codes that occur, each once, in order."""
    codes = sorted({finding.code for finding in book.findings})
    return {"pages": [(code, *_page(code)) for code in codes]}


def _page(code: str) -> tuple[str, list[str]]:
    """Title and paragraphs of a code's page."""
    title, _, text = (registry.code_page(code) or "").partition("\n")
    return title.strip(), [paragraph for paragraph in text.split("\n\n") if paragraph.strip()]
