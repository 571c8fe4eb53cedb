"""The build sheet in a real browser: on a telephone at the bench, and printed on A4.

Contrast: W3C, Web Content Accessibility Guidelines 2.1 (2018), 1.4.3 and 1.4.11 and its definition of relative luminance.
"""

import io

import pypdf
import pytest

from browser import Browser

TELEPHONE = 390  # CSS pixels
# A4 less margins of 10 mm, at 96 pixels an inch.
A4 = round(190 / 25.4 * 96)

# Elements that reach over the right edge and are not inside something that scrolls by itself.
OVER_THE_EDGE = """[...document.querySelectorAll('body *')].filter(e => {
    if (e.getBoundingClientRect().right <= window.innerWidth + 1) return false;
    for (let p = e; p; p = p.parentElement)
        if (p.tagName === 'svg' || ['auto', 'scroll'].includes(getComputedStyle(p).overflowX)) return false;
    return true;
}).map(e => e.tagName + ': ' + e.textContent.slice(0, 60))"""

# Tables that print has no way to scroll: the printed page would lose what is past its edge.
CUT_IN_PRINT = """[...document.querySelectorAll('table, svg, pre')].filter(e => !e.ownerSVGElement).filter(e => e.scrollWidth > e.clientWidth + 1
    || e.getBoundingClientRect().right > window.innerWidth + 1).map(e => e.tagName + ': ' + e.textContent.slice(0, 80))"""

# Contrast of every run of text against what is painted behind it.
POOR_CONTRAST = """(() => {
    const rgb = text => text.match(/[\\d.]+/g).map(Number);
    const channel = c => (c /= 255) <= 0.03928 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
    const luminance = ([r, g, b]) => 0.2126 * channel(r) + 0.7152 * channel(g) + 0.0722 * channel(b);
    const behind = e => {
        for (; e; e = e.parentElement) {
            const colour = rgb(getComputedStyle(e).backgroundColor);
            if (colour.length < 4 || colour[3] > 0) return colour;
        }
        return [255, 255, 255];
    };
    const poor = [];
    const walk = document.createTreeWalker(document.body, NodeFilter.SHOW_TEXT);
    while (walk.nextNode()) {
        const e = walk.currentNode.parentElement;
        if (!walk.currentNode.textContent.trim() || ['STYLE', 'SCRIPT', 'TITLE', 'DESC'].includes(e.tagName.toUpperCase())) continue;
        const style = getComputedStyle(e), drawn = e.ownerSVGElement ? style.fill : style.color;
        const [a, b] = [luminance(rgb(drawn)), luminance(behind(e))].sort((x, y) => y - x);
        if ((a + 0.05) / (b + 0.05) < 4.5) poor.push(walk.currentNode.textContent.trim().slice(0, 40));
    }
    return poor;
})()"""


@pytest.fixture(scope="module")
def browser():
    with Browser() as running:
        yield running


@pytest.fixture(scope="module")
def checked(browser, tmp_path_factory):
    """That the checks below find what they look for: a page with every fault."""
    page = tmp_path_factory.mktemp("faults") / "faults.html"
    page.write_text("<body><p style='width: 2000px'>wide</p><p style='color: #999; background: #bbb'>faint</p>"
                    "<table style='display: block; width: 100px; overflow-x: auto'><tr><td>"
                    + "x" * 300 + "</td></tr></table><img src='https://example.invalid/a.png'><script>nothing()</script>")
    browser.open(page, TELEPHONE)
    assert browser.complaints
    assert browser.value(POOR_CONTRAST) == ["faint"]
    assert any("wide" in e for e in browser.value(OVER_THE_EDGE))
    assert any("xxx" in e for e in browser.value(CUT_IN_PRINT))


@pytest.fixture
def sheet(pack, checked):
    return pack.folder / "sheet.html"


def test_a_telephone_shows_it_whole(browser, sheet):
    browser.open(sheet, TELEPHONE)
    assert browser.complaints == []
    assert browser.value("document.documentElement.scrollWidth") <= TELEPHONE
    assert browser.value(OVER_THE_EDGE) == []
    small = browser.value("[...document.querySelectorAll('body *')].filter(e => !e.closest('svg') && "
                          "parseFloat(getComputedStyle(e).fontSize) < 13).map(e => e.tagName)")
    assert small == []


def test_it_prints_on_a4(browser, sheet):
    browser.open(sheet, A4, medium="print")
    assert browser.complaints == []
    assert browser.value(OVER_THE_EDGE) == []
    assert browser.value(CUT_IN_PRINT) == []
    printed = pypdf.PdfReader(io.BytesIO(browser.pdf()))
    assert 1 <= len(printed.pages) < 60
    for page in printed.pages:
        assert [round(float(side) / 72 * 25.4) for side in page.mediabox[2:]] == [210, 297]


def test_it_can_be_read_by_everybody(browser, sheet):
    browser.open(sheet, 1000)
    assert browser.value("document.documentElement.lang") == "en"
    levels = browser.value("[...document.querySelectorAll('h1,h2,h3,h4')].map(e => +e.tagName[1])")
    assert levels[0] == 1 and levels.count(1) == 1
    assert all(below - above <= 1 for above, below in zip(levels, levels[1:])), levels
    # Every picture has a text in its place.
    unnamed = browser.value("[...document.querySelectorAll('svg')].filter(e => !e.ownerSVGElement).filter(e => e.getAttribute('role') !== 'img' || "
                            "!(e.getAttribute('aria-label') || '').trim()).length")
    assert unnamed == 0
    assert browser.value("[...document.querySelectorAll('img:not([alt])')].length") == 0
    # Heads of tables are heads.
    assert browser.value("[...document.querySelectorAll('table')].filter(t => !t.querySelector('th')).length") == 0
    assert browser.value(POOR_CONTRAST) == []
