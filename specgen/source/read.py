"""Reading one file: bytes or text to documents, and every problem on the way as a value."""

from specgen.core.diagnostic import Diagnostic, Span
from specgen.source.compose import compose
from specgen.source.document import Document
from specgen.source.text import LARGEST_FILE, control_characters, cut, decode


def read_bytes(raw: bytes, file: str) -> tuple[list[Document], list[Diagnostic]]:
    """Read the documents of a file's bytes.

    Returns
    -------
    list of Document, list of Diagnostic
        The documents that could be read, and all problems; nothing is ever raised for what a file holds.

    Examples
    --------
    >>> read_bytes(b"tag: TIC-1", "loops/a.yml")[0][0].data
    {'tag': 'TIC-1'}
    """
    text, problems = decode(raw, file)
    return ([], problems) if problems else read_text(text, file)


def read_text(text: str, file: str) -> tuple[list[Document], list[Diagnostic]]:
    r"""Read the documents of a text, each a section of `key: value` lines.

    Examples
    --------
    >>> documents, problems = read_text("tag: TIC-1\ntag: TIC-2\n---\ntag: on\n", "loops/a.yml")
    >>> [document.data for document in documents], [document.sound for document in documents]
    ([{'tag': 'TIC-1'}, {'tag': 'on'}], [False, True])
    >>> problems[0].line()
    "loops/a.yml:2:1: error Y108: 'tag' is written twice; first in line 1"
    """
    documents, problems = _documents(text, file)
    sections = []
    for document in documents:
        if isinstance(document.data, dict):
            sections.append(document)
        else:
            kind = "a list" if isinstance(document.data, list) else "text"
            told = f"{kind} stands here; a document is made of `key: value` lines"
            problems.append(Diagnostic(document.spans[()], "Y115", told, "write for example `tag: TIC-101`"))
    return sections, sorted(problems)


def read_table(text: str, file: str) -> tuple[Document | None, list[Diagnostic]]:
    """Read a text that holds one document, a list or a section, as strictly as a loop file.

    Examples
    --------
    >>> read_table("- {id: a, value: 1.5}", "data/a.yml")[0].data
    [{'id': 'a', 'value': '1.5'}]
    """
    documents, problems = _documents(text, file)
    one, more = only(documents)
    return one, sorted([*problems, *more])


def only(documents: list[Document]) -> tuple[Document | None, list[Diagnostic]]:
    """Return the first of some documents, and a problem for each further one."""
    told = "a further document stands here; this file holds one"
    more = [Diagnostic(other.spans[()], "Y119", told, "delete the --- line above it, or the document") for other in documents[1:]]
    return (documents[0] if documents else None), more


def _documents(text: str, file: str) -> tuple[list[Document], list[Diagnostic]]:
    if len(text) > LARGEST_FILE:
        return [], [Diagnostic(Span(file, 1, 1), "Y102", f"the file is larger than {LARGEST_FILE // 1024} KiB")]
    problems = control_characters(text, file)
    if problems:
        return [], problems
    pieces, problems = cut(text, file)
    documents: list[Document] = []
    index = 0
    for piece in pieces:
        found, wrong = compose(piece, file, index)
        documents += found
        problems += wrong
        index += len(found) or len(wrong)
    if not documents and not problems:
        problems.append(Diagnostic(Span(file, 1, 1), "Y105", "nothing is written in this file", "write a document, or delete the file"))
    return documents, problems
