"""Drawn pages: everything escaped, every link resolves, nothing asked of any other machine, headings and tables in order."""

from collections import Counter
from posixpath import dirname, join, normpath
from urllib.parse import unquote, urlsplit

import pytest

ENOUGH = 140_000  # bytes of a sheet, three plots and a schematic among them


@pytest.fixture(scope="session")
def drawn(site, read):
    return {path.relative_to(site).as_posix(): read(path.read_text(encoding="utf-8")) for path in site.rglob("*.html")}


def test_text_of_the_user_is_never_markup(files, drawn):
    page = files["loops/TIC-2.html"].decode()
    assert "&lt;script&gt;alert(&#34;service&#34;)&lt;/script&gt; &amp; co" in page
    assert '<script>alert("service")</script> & co' in drawn["loops/TIC-2.html"].text
    for name, one in drawn.items():
        scripts = [attributes for tag, attributes in one.tags if tag == "script"]
        assert all(set(attributes) == {"defer", "src"} and "assets/" in attributes["src"] for attributes in scripts), name
        assert not any(attribute.startswith("on") for _, attributes in one.tags for attribute in attributes), name


def test_every_link_resolves_to_a_file_and_every_anchor_to_a_place(site, drawn):
    for path, page in drawn.items():
        for _, link in page.links:
            parts = urlsplit(link)
            assert not parts.scheme, f"{path} links to {link}"
            assert not parts.netloc, f"{path} links to {link}"
            target = normpath(join(dirname(path), unquote(parts.path))) if parts.path else path
            assert (site / target).is_file(), f"{path} links to {link}"
            if parts.fragment:
                assert unquote(parts.fragment) in drawn[target].ids, f"{path} links to {link}"


def test_nothing_is_fetched_from_anywhere(site):
    for css in site.rglob("*.css"):
        text = css.read_text(encoding="utf-8")
        assert "url(" not in text
        assert "@import" not in text


def test_ids_are_unique_on_a_page(drawn):
    for path, page in drawn.items():
        assert [name for name, count in Counter(page.ids).items() if count > 1] == [], path


def test_every_page_has_its_landmarks_and_one_heading(drawn):
    for path, page in drawn.items():
        tags = Counter(tag for tag, _ in page.tags)
        assert tags["h1"] == 1 or path == "print.html", path
        assert tags["main"] == tags["header"] == tags["footer"] == 1, path
        assert tags["nav"] >= 1
        assert ("a", {"class": "skip", "href": "#content"}) in page.tags
        assert dict(page.tags)["html"] == {"lang": "en"}


def test_every_table_head_says_what_it_heads(drawn):
    for page in drawn.values():
        assert all(attributes.get("scope") in ("col", "row", "rowgroup") for tag, attributes in page.tags if tag == "th")


def test_every_drawing_has_its_words(drawn):
    drawings = [attributes for page in drawn.values() for tag, attributes in page.tags if tag == "svg" and attributes.get("role") == "img"]
    assert drawings
    for path, page in drawn.items():
        for tag, attributes in page.tags:
            if tag == "svg" and attributes.get("role") == "img":
                assert attributes["aria-labelledby"] in page.ids, path


def test_a_sheet_is_small(files):
    sheets = {name: len(content) for name, content in files.items() if name.startswith("loops/")}
    assert max(sheets.values()) < ENOUGH, sheets


def test_no_number_is_broken(drawn):
    for path, page in drawn.items():
        words = page.text.replace("without limit", "").split()
        assert not {"nan", "inf", "None", "-inf", "NaN"} & set(words), path


def test_own_pages_join_with_the_dossiers_head(drawn):
    page = drawn["handover.html"]
    assert "Trial <panel>" in page.text
    assert any(tag == "footer" for tag, _ in page.tags)
    assert ("a", "loops/TIC-2.html") in page.links
    assert "Handing over" in drawn["index.html"].text


def test_a_page_whose_name_is_the_dossiers_stands_aside(drawn):
    assert "About this folder" in drawn["pages/README.html"].text
    assert ("a", "../handover.html") in drawn["pages/README.html"].links
    assert "About this folder" in drawn["index.html"].text
