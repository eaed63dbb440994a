"""The report of a store: the page in a real browser, its files, and what is refused."""

import atexit
import functools
import json
import os
import pathlib
import re
import shutil
import sqlite3
import subprocess
import tempfile
import unittest
import xml.etree.ElementTree

import browser
import harness

LOCK = pathlib.Path(__file__).resolve().parents[2] / "src/report/web/package-lock.json"
SHARE_MISSING = "are not installed"
PAIR = "5,5@10,10"
# A title that would break out of a careless page.
TITLE = "</script><script>window.touched = 1</script> & \\\"<b>rows"
PLAN = f'title = "{TITLE}"\ninner = "5,5"\ngap_nm = [0.33, 0.36]\n'
ROWS_OF_A_LARGE_STORE = 20_000


def artefacts():
    folder = pathlib.Path(os.environ.get("GAPWRIGHT_ARTEFACTS", "."))
    folder.mkdir(parents=True, exist_ok=True)
    return folder


def multiplied(store, count):
    """Rows repeated under other keys until there are `count`."""
    with sqlite3.connect(store) as database:
        columns = [row[1] for row in database.execute("PRAGMA table_info(pairs)")][1:]
        names = ", ".join(columns)
        have = database.execute("SELECT count(*) FROM pairs").fetchone()[0]
        for copy in range(-(-count // have) - 1):
            database.execute(f"INSERT INTO pairs(key, {names}) SELECT key || '-{copy}', {names} "
                             f"FROM pairs WHERE instr(key, '-') = 0")


@functools.lru_cache(maxsize=1)
def stores():
    """The example's store and a small one, and whether the parts of a page are missing."""
    folder = pathlib.Path(tempfile.mkdtemp(prefix="gapwright-test-"))
    atexit.register(shutil.rmtree, folder, ignore_errors=True)
    example, small, plan = folder / "example.db", folder / "small.db", folder / "plan.toml"
    plan.write_text(PLAN)
    for which, store in ((harness.EXAMPLE, example), (plan, small)):
        done = harness.run("rank", which, "--store", store)
        if done.returncode != 0:
            raise AssertionError(done.stderr)
    done = harness.run("report", small, "-o", folder / "page.html")
    missing = done.returncode == 2 and SHARE_MISSING in done.stderr
    if done.returncode != 0 and not missing:
        raise AssertionError(done.stderr)
    return example, small, missing


class Report(harness.Case):
    """Stores that all tests share, and whether the parts of a page are installed."""

    @classmethod
    def setUpClass(cls):
        cls.example, cls.small, cls.missing = stores()

    def require_parts(self):
        if self.missing:
            self.skipTest("the packages of a page are not installed: npm ci in src/report/web")

    def page(self, store, *arguments):
        self.require_parts()
        page = self.path("page.html")
        self.good("report", store, "-o", page, *arguments)
        return page


class Refused(Report):
    def test_words(self):
        page = self.path("page.html")
        self.refused(["report"], "no store", "STORE.db")
        self.refused(["report", self.small], "nothing to write", "-o FILE.html")
        self.refused(["report", self.small, self.small, "-o", page], "more than one store")
        self.refused(["report", self.small, "-o", page, "-o", page], "given more than once")
        self.refused(["report", self.small, "-o", page, "--temperature-K", "300"],
                     "those of its store")
        self.assertFalse(page.exists())

    def test_store(self):
        page = self.path("page.html")
        self.refused(["report", self.path("none.db"), "-o", page], "no such store")
        self.refused(["report", self.folder, "-o", page], "is a folder")
        self.refused(["report", self.path("text.db", "words"), "-o", page], "is no store")
        empty = self.path("empty.db")
        shutil.copy(self.small, empty)
        with sqlite3.connect(empty) as database:
            database.execute("DELETE FROM pairs")
        if not self.missing:
            self.refused(["report", empty, "-o", page], "holds no rows")
        self.assertFalse(page.exists())

    def test_store_in_use(self):
        store = self.path("rows.db")
        process = harness.start("rank", *harness.SLOW, "--store", store)
        try:
            self.assertTrue(harness.wait_until(self.path("rows.db-wal").exists, process))
            self.refused(["report", store, "-o", self.path("page.html")], "in use by another run")
        finally:
            process.kill()
            process.communicate()

    def test_target(self):
        self.refused(["report", self.small, "-o", self.path("none/page.html")], "does not exist")
        self.refused(["report", self.small, "-o", self.folder], "is a folder")
        self.refused(["report", self.small, "--svg", self.path("file", "x")], "is no folder")

    def test_full_disk(self):
        self.require_parts()
        page = self.path("page.html", "before")
        self.refused(["report", self.small, "-o", page], "cannot be written",
                     preexec_fn=harness.file_limit(100_000))
        self.assertEqual(page.read_text(), "before")
        self.assertEqual(self.leftovers(), [])

    def test_pair(self):
        self.require_parts()
        page = self.path("page.html")
        self.refused(["report", self.small, "-o", page, "--pair", "5,5@12,12"],
                     "no row of (5,5)@(12,12)", "nearest")
        self.refused(["report", self.small, "-o", page, "--pair", "x"], "--pair", "'x'")
        self.refused(["report", self.small, "-o", page, "--arrangement", "parallel"],
                     "holds no parallel rows", "coaxial")
        self.assertFalse(page.exists())


class Files(Report):
    def test_valid(self):
        if not shutil.which("tidy"):
            self.skipTest("tidy is not installed")
        page = self.page(self.small)
        done = subprocess.run(["tidy", "-errors", "-quiet", page], capture_output=True, text=True,
                              check=False)
        self.assertEqual((done.returncode, done.stderr), (0, ""))

    def test_needs_nothing_else(self):
        text = re.sub(r"<script.*?</script>|<pre>.*?</pre>", "", self.page(self.small).read_text(),
                      flags=re.S)
        self.assertIsNone(re.search(r"\b(src|href)=\"(?!#)|url\(|@import", text))

    def test_json(self):
        packed = json.loads(self.good("report", self.small, "--json").stdout)
        with sqlite3.connect(self.small) as database:
            count = database.execute("SELECT count(*) FROM pairs").fetchone()[0]
        self.assertEqual(packed["count"], count)
        self.assertEqual(len(packed["columns"]["gap_nm"]["numbers"]), count)

    def test_no_host_is_pinned(self):
        self.assertNotIn("://", LOCK.read_text())

    def test_pairs_asked_for(self):
        text = self.page(self.small, "--pair", PAIR, "5,5@12,8", "--pair", "5,5@17,1").read_text()
        self.assertEqual(text.count('"pair_potential":{'), 3)

    def test_large(self):
        self.require_parts()
        store = self.path("large.db")
        shutil.copy(self.example, store)
        multiplied(store, ROWS_OF_A_LARGE_STORE)
        page = self.page(store)
        self.assertLess(page.stat().st_size, 15_000_000)
        if not browser.find():
            return
        with browser.Browser() as seen:
            seen.open(page)
            seen.wait("document.documentElement.dataset.state")
            self.assertGreater(seen.run("return document.querySelectorAll('.tabulator-row').length"), 5)
            self.assertLess(seen.run("return document.querySelectorAll('.tabulator-row').length"), 200)

    def test_figures(self):
        self.require_parts()
        if not (shutil.which("node") or shutil.which("nodejs")):
            self.refused(["report", self.small, "--svg", self.path("figures")], "Node.js")
            self.skipTest("Node.js is not installed")
        folder = self.path("figures")
        self.good("report", self.small, "--svg", folder, "--pair", PAIR)
        for name in ("map", "gap", "tubes", "bands-5_5-in-10_10", "curve-5_5-in-10_10"):
            root = xml.etree.ElementTree.parse(folder / f"{name}.svg").getroot()
            self.assertTrue(root.tag.endswith("svg"))
            self.assertNotIn("NaN", (folder / f"{name}.svg").read_text())
        curve = (folder / "curve-5_5-in-10_10.csv").read_text().splitlines()
        self.assertEqual(curve[0], "gap_nm,part,energy_eV_per_nm,pressure_GPa")
        rows = (folder / "map.csv").read_text().splitlines()
        with sqlite3.connect(self.small) as database:
            count = database.execute("SELECT count(*) FROM pairs").fetchone()[0]
        self.assertEqual(len(rows), count + 1)


@unittest.skipUnless(browser.find(), "chromium and chromedriver are not installed")
class Page(Report):
    first_pair = "return document.querySelector('.tabulator-row [tabulator-field=pair]').textContent"

    def cell(self, seen, field):
        return seen.run("return document.querySelector(`.tabulator-row "
                        "[tabulator-field=${arguments[0]}]`).textContent", field)

    def shown(self, seen):
        text = seen.run("return document.getElementById('shown').textContent")
        return int(text.split(" of ")[0].replace(",", ""))

    def wait_shown(self, seen, condition):
        seen.wait("(() => { const shown = Number(document.getElementById('shown').textContent"
                  f".split(' of ')[0].replace(/,/g, '')); return {condition}; }})()")

    def point(self, seen):
        """The middle of a point of the map, in the window."""
        return seen.run("""
            const point = [...document.querySelectorAll('#map .mark-symbol path')].at(-1);
            point.scrollIntoView({block: 'center', behavior: 'instant'});
            const box = point.getBoundingClientRect();
            return [box.x + box.width / 2, box.y + box.height / 2];""")

    def test_example(self):
        page = self.page(self.example, "--pair", "15,6@24,6")
        with browser.Browser() as seen:
            seen.open(page)
            seen.wait("document.documentElement.dataset.state === 'ready'")
            seen.screenshot(artefacts() / "wide.png")
            self.sort_and_filter(seen)
            self.hover_and_choose(seen)
            seen.size(500, 900)
            seen.run("scrollTo(0, 0)")
            seen.click("#theme")
            seen.wait("document.documentElement.dataset.theme")
            seen.screenshot(artefacts() / "narrow.png")
            self.assertLessEqual(seen.run("return document.documentElement.scrollWidth - innerWidth"),
                                 0)
            self.assertEqual(seen.messages(), [])

    def sort_and_filter(self, seen):
        self.assertEqual(self.cell(seen, "rank"), "1")
        head = ".tabulator-col[tabulator-field=gap_nm] .tabulator-col-title"
        seen.click(head)
        self.assertEqual(self.cell(seen, "gap_nm")[:5], "0.330")
        seen.click(head)
        self.assertIn(self.cell(seen, "gap_nm")[:5], ("0.379", "0.380"))
        seen.type(".tabulator-col[tabulator-field=gap_nm] input", "<0.34")
        self.wait_shown(seen, "shown < 1817")
        self.assertLess(float(self.cell(seen, "gap_nm")), 0.34)
        before = self.shown(seen)
        seen.type("#search", "11,11")
        self.wait_shown(seen, f"shown < {before}")
        self.assertIn("(11,11)", seen.run(self.first_pair))
        seen.run("const search = document.getElementById('search'); search.value = '';"
                 "search.dispatchEvent(new Event('input'));")
        self.wait_shown(seen, f"shown === {before}")

    def hover_and_choose(self, seen):
        x, y = self.point(seen)
        seen.move_to(x + 1, y)
        seen.move_to(x, y)
        seen.wait("!document.getElementById('hover').hidden")
        text = seen.run("return document.getElementById('hover').textContent")
        pair = re.search(r"\(\d+,\d+\)@\(\d+,\d+\)", text).group()
        self.assertIn("gap (nm)", text)
        seen.click_at(x, y)
        seen.wait("document.querySelector('#chosen h3')")
        self.assertEqual(seen.run("return document.querySelector('#chosen h3').textContent"), pair)

    def test_title_is_text(self):
        page = self.page(self.small)
        with browser.Browser() as seen:
            seen.open(page)
            seen.wait("document.documentElement.dataset.state")
            wanted = TITLE.replace("\\", "")
            self.assertEqual(seen.run("return document.title"), wanted)
            self.assertEqual(seen.run("return document.getElementById('title').textContent"), wanted)
            self.assertIsNone(seen.run("return window.touched || null"))


del Report  # no tests of its own


if __name__ == "__main__":
    harness.main()
