"""From the text of loop files to plain data that knows where it stands; the only place that knows YAML."""

from specgen.source.document import Data, Document, Spans, span_of
from specgen.source.excerpt import excerpt
from specgen.source.folder import Sources, read_folder
from specgen.source.read import read_bytes, read_table, read_text

__all__ = ["Data", "Document", "Sources", "Spans", "excerpt", "read_bytes", "read_folder", "read_table", "read_text", "span_of"]
