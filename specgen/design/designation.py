"""Reference designations after IEC 81346: function aspect from the tag, product aspect within the loop."""


def designation(tag: str, product: str) -> str:
    """Return a designation; nothing is renumbered when another loop comes or goes.

    Examples
    --------
    >>> designation("TIC-101", "Q1")
    '=TIC101-Q1'
    """
    return f"={tag.replace('-', '')}-{product}"
