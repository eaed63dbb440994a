"""Wrong input of every kind: one clear message, exit code 2, nothing on standard output."""

import contextlib
import shutil
import sqlite3
import subprocess
import unittest

import harness


class Labels(harness.Case):
    def test_no_tube(self):
        self.refused(["describe", "0,0"], "(0,0) is no tube", "expected")
        self.refused(["bind", "0,0@10,10"], "(0,0) is no tube")

    def test_negative_index(self):
        self.refused(["describe", "(3,-1)"], "(3,-1) has a negative index", "n >= m >= 0")
        self.refused(["describe", "-1,3"], "negative index")

    def test_semicolon(self):
        self.refused(["describe", "10;10"], "10;10", "expected", "nearest: (10,10)")

    def test_not_known(self):
        self.refused(["describe", "13-GNR"], "ribbon")
        self.refused(["describe", "graphen"], "nearest: graphene")
        self.refused(["describe", ""], "empty")

    def test_mirror_is_accepted_and_said(self):
        done = self.good("describe", "5,8")
        self.assertIn("(8,5)", done.stdout)
        self.assertIn("(5,8) is the mirror image of (8,5)", done.stderr)

    def test_walls_that_touch_or_do_not_fit(self):
        self.refused(["bind", "10,10@11,11"], "the gap", "0.2 nm", "nearest")
        self.refused(["bind", "10,10@5,5"], "rising order", "nearest: (5,5)@(10,10)")

    def test_too_wide_or_narrow(self):
        self.refused(["describe", "1,1"], "0.3 to 20 nm")
        self.refused(["describe", "300,300"], "0.3 to 20 nm")

    def test_one_bad_object_spoils_all(self):
        self.refused(["describe", "10,10", "0,0"], "(0,0) is no tube")


class CommandLine(harness.Case):
    def test_commands(self):
        self.refused([], "no command", "describe, bind, rank, table, report, check")
        self.refused(["bnd", "5,5@10,10"], "unknown command 'bnd'", "nearest: bind")
        self.refused(["bind", "describe"], "two commands")
        self.refused(["check", "10,10"], "unexpected '10,10'")

    def test_options(self):
        self.refused(["bind", "5,5@10,10", "--toleranc", "1e-3"], "unknown option '--toleranc'",
                     "nearest: --tolerance")
        self.refused(["bind", "5,5@10,10", "-x"], "unknown option '-x'")
        self.refused(["rank", "--top"], "--top: has no value")
        self.refused(["rank", "--csv", "--top", "3"], "--csv: has no value")
        self.refused(["rank", "--top", "3", "--top", "4"], "--top: given more than once")

    def test_bind_needs_walls(self):
        self.refused(["bind"], "no object", "inner@outer")
        self.refused(["bind", "10,10"], "one object", "nearest: (10,10) (10,10)")
        self.refused(["bind", "5,5", "10,10", "8,8"], "more than two objects")
        self.refused(["bind", "5,5@10,10", "--gap-nm", "1"], "--gap-nm", "two objects")
        self.refused(["bind", "10,10", "17,0", "--gap-nm", "0.1"], "--gap-nm", "0.2 to 10000")
        self.refused(["bind", "graphene"], "graphene lies below another object")
        self.refused(["rank", "/dev/null"], "nothing says which tubes")
        self.refused(["describe"], "no object")

    def test_numbers(self):
        for value in ("nan", "inf", "1e400", "x", "", "1e-4x", "0", "-1", "1"):
            self.refused(["bind", "5,5@10,10", "--tolerance", value], "--tolerance", "expected")
        for value in ("0", "-2", "1.5", "x", "99999999999999"):
            self.refused(["rank", "--inner", "5,5", "--top", value], "--top", "whole number")
            self.refused(["bind", "5,5@10,10", "--threads", value], "--threads", "whole number")
        for value in ("0", "-1", "nan"):
            self.refused(["rank", "--inner", "5,5", "--time-limit", value], "--time-limit")
        for value in ("0/2", "3/2", "1", "1/", "/2", "a/b", "1/2/3"):
            self.refused(["rank", "--inner", "5,5", "--part", value], "--part", "K/N")

    def test_conditions(self):
        bind = ["bind", "5,5@10,10"]
        self.refused([*bind, "--temperature-K", "-5"], "--temperature-K", "0 to 3000 K")
        self.refused([*bind, "--temperature-K", "3001"], "--temperature-K", "0 to 3000 K")
        self.refused([*bind, "--temperature-K", "0.001"], "--temperature-K",
                     "0, or 0.01 to 3000 K")
        self.refused([*bind, "--chemical-potential-eV", "-2.2"], "--chemical-potential-eV",
                     "-2.16 to 2.16 eV")
        self.good(*bind, "--temperature-K", "0", "--chemical-potential-eV", "0")

    def test_retarded(self):
        allowed = "two coaxial walls, inner@outer"
        self.refused(["bind", "5,5@10,10@15,15", "--retarded"], "--retarded",
                     "more than two walls", allowed)
        self.refused(["bind", "10,10", "10,10", "--retarded"], "--retarded", "parallel bodies",
                     allowed)
        self.refused(["rank", "--inner", "5,5", "--retarded"], "unknown option '--retarded'")

    def test_names_of_catalogues(self):
        bind = ["bind", "5,5@10,10"]
        self.refused([*bind, "--hopping", "nearest-neighbor"], "--hopping",
                     "nearest: nearest-neighbour")
        self.refused([*bind, "--background", "none"], "--background", "expected one of")
        self.refused([*bind, "--contact-target", "bilayer"], "--contact-target", "nearest")
        self.refused([*bind, "--catalogs", self.path("nowhere")], "is not a folder")
        self.refused([*bind, "--kernel", "avx"], "--kernel", "portable, avx2, avx512")

    def test_bad_catalogue(self):
        self.path("hopping.toml", '[[hopping]]\nname = "mine"\nhoping = 2.7\n')
        self.refused(["bind", "5,5@10,10", "--catalogs", self.folder], "hopping.toml:", "^")


class Ranges(harness.Case):
    def test_intervals(self):
        for value in ("0.6", "0.6:", "2:1", "0.6:nan", "0.1:1", "1:30", "0.6-1.2"):
            self.refused(["rank", "--diameter-nm", value], "--diameter-nm", "LOW:HIGH")
        self.refused(["rank", "--inner", "5,5", "--gap-nm", "0.1:0.3"], "--gap-nm")
        self.refused(["rank", "--index", "3.5:8"], "--index", "whole")

    def test_empty(self):
        self.refused(["rank", "--diameter-nm", "0.60:0.601"], "no tube can be the inner wall",
                     "diameter_nm 0.6:0.601")
        self.refused(["rank", "--inner", "10,10", "--gap-nm", "0.30:0.3001"],
                     "no pair has a gap within 0.3:0.3001 nm", "nearest: (10,10)@")
        self.refused(["rank", "--inner-diameter-nm", "0.7:1.0", "--outer-diameter-nm", "3:4"],
                     "no pair has a gap")

    def test_nothing_asked_for(self):
        self.refused(["rank"], "nothing says which tubes", "--diameter-nm")
        self.refused(["rank", "--kind", "metallic"], "nothing says which tubes")

    def test_words(self):
        inner = ["rank", "--inner", "10,10"]
        self.refused([*inner, "--kind", "metalic"], "--kind", "nearest: metallic")
        self.refused([*inner, "--sort", "pull_out_force"], "--sort", "nearest: pull_out_force_nN")
        self.refused([*inner, "--arrangement", "paralel"], "--arrangement", "nearest: parallel")
        self.refused(["rank", "--inner", "5,5@10,10"], "--inner", "not one tube")
        self.refused(["rank", "--outer", "graphene"], "--outer", "not one tube")


class SideBySide(harness.Case):
    PARALLEL = ["rank", "--arrangement", "parallel"]

    def test_options_of_walls(self):
        for option, value in (("--inner", "5,5"), ("--outer", "10,10"),
                              ("--inner-diameter-nm", "0.7:1"), ("--outer-diameter-nm", "0.7:1")):
            self.refused([*self.PARALLEL, "--diameter-nm", "0.6:0.7", option, value], option,
                         "says nothing of parallel pairs", "arrangement coaxial")
        self.refused(["rank", "--with", "10,10", "--diameter-nm", "0.6:0.7"], "--with",
                     "says nothing of coaxial pairs", "arrangement parallel")

    def test_gap(self):
        tubes = [*self.PARALLEL, "--diameter-nm", "0.6:0.7"]
        self.refused([*tubes, "--gap-nm", "0.3:0.4"], "--gap-nm", "one gap")
        for value in ("0.1", "nan", "1e9", "x", ""):
            self.refused([*tubes, "--gap-nm", value], "--gap-nm")
        self.refused(["rank", "--inner", "5,5", "--gap-nm", "0.34"], "--gap-nm", "LOW:HIGH")

    def test_tubes(self):
        self.refused(self.PARALLEL, "nothing says which tubes", "--with")
        self.refused([*self.PARALLEL, "--diameter-nm", "0.60:0.601"], "no tube can be in a pair",
                     "diameter_nm 0.6:0.601")
        self.refused([*self.PARALLEL, "--with", "5,5@10,10"], "--with", "not one tube")
        self.refused([*self.PARALLEL, "--with", "graphene"], "--with", "not one tube")

    def test_plan(self):
        for text, fragments in (
                ('inner = "5,5"', ["plan.toml:2", "inner says nothing of parallel", "^"]),
                ("gap_nm = [0.3, 0.4]", ["plan.toml:2", "gap_nm", "^"]),
                ("inner_diameter_nm = [0.7, 1]", ["plan.toml:2", "diameter_nm for both tubes"])):
            file = self.path("plan.toml", 'arrangement = "parallel"\n' + text + "\n")
            self.refused(["rank", file], str(file), *fragments)
        walls = self.path("walls.toml", 'inner = "5,5"\n')
        self.refused(["rank", walls, "--arrangement", "parallel"], str(walls), "key inner")

    def test_pair(self):
        store = self.path("rows.db")
        self.good("rank", "--arrangement", "parallel", "--with", "5,5", "--index", "5:5", "--store",
                  store)
        pair = ["rank", "--store", store, "--pair"]
        self.refused([*pair, "5,5 8,8"], "no row of (5,5) (8,8) at its well")
        self.refused([*pair, "5,5 5,0", "--gap-nm", "1"], "no row of (5,0) (5,5) at 1 nm")
        self.refused([*pair, "5,5 "], "is no pair")
        self.refused([*pair, "5,5 5,0 4,4"], "is no pair")
        self.refused([*pair, "5,5 x"], "x")


class Plans(harness.Case):
    def plan(self, text, *fragments):
        file = self.path("plan.toml", text)
        self.refused(["rank", file], str(file), *fragments)

    def test_unknown_key(self):
        self.plan('title = "x"\ndiametr_nm = [0.6, 1.2]\n', "plan.toml:2",
                  "unknown key 'diametr_nm'", "  diametr_nm = [0.6, 1.2]\n  ^",
                  "nearest: diameter_nm")

    def test_values(self):
        self.plan("diameter_nm = [1.6, 1.2]\n", "plan.toml:1", "^")
        self.plan('diameter_nm = "wide"\n', "plan.toml:1", "^")
        self.plan("inner = 10\n", "plan.toml:1", "^")
        self.plan('inner = "10;10"\n', "plan.toml:1", "nearest: (10,10)")
        self.plan('inner = "10,10"\ntemperature_K = -1\n', "plan.toml:2", "0 to 3000 K")
        self.plan('inner = "10,10"\ntemperature_K = 0.001\n', "plan.toml:2",
                  "0, or 0.01 to 3000 K")
        self.plan('inner = "10,10"\nchemical_potential_eV = 2.2\n', "plan.toml:2",
                  "-2.16 to 2.16 eV")
        self.plan('inner = "10,10"\ntolerance = nan\n', "plan.toml:2")
        self.plan('inner = "10,10"\nsort = "energy_mJ_per_m"\n', "nearest: energy_mJ_per_m2")
        self.plan('inner = "10,10"\nhopping = "mine"\n', "plan.toml:2", "nearest-neighbour")
        self.plan('inner = "10,10"\narrangement = "crossed"\n', "plan.toml:2", "coaxial")
        self.plan('inner = "10,10"\ntop = 0\n', "plan.toml:2")
        self.plan("index = [3.5, 8]\n", "plan.toml:1", "whole")

    def test_no_toml(self):
        self.plan("diameter_nm = [0.6, 1.2\n", "plan.toml:", "TOML")
        self.refused(["rank", self.path("nowhere.toml")], "nowhere.toml", "cannot be read")
        self.refused(["rank", self.folder], "cannot be read")
        self.refused(["rank", "a.toml", "b.toml"], "more than one plan")

    def test_walls_that_never_fit(self):
        done = harness.run("rank", self.path("p.toml", 'inner = "10,10"\nouter = "11,11"\n'))
        self.assertEqual(done.returncode, 2)
        self.assertIn("no pair has a gap", done.stderr)


class Stores(harness.Case):
    ROWS = ["--inner", "10,10", "--gap-nm", "0.33:0.36"]

    def setUp(self):
        super().setUp()
        self.store = self.path("rows.db")

    def fill(self):
        self.good("rank", *self.ROWS, "--store", self.store)

    def refuse_store(self, *fragments, extra=()):
        before = self.store.read_bytes() if self.store.is_file() else None
        self.refused(["rank", *self.ROWS, *extra, "--store", self.store], str(self.store),
                     *fragments)
        if before is not None:
            self.assertEqual(self.store.read_bytes(), before, "a refused file was changed")

    def change(self, sql):
        with contextlib.closing(sqlite3.connect(self.store)) as database, database:
            database.execute(sql)

    def test_no_store(self):
        self.store.write_text("rank,object_1\n")
        self.refuse_store("not an SQLite database")

    def test_other_database(self):
        self.change("CREATE TABLE cells(a, b)")
        self.refuse_store("no store of gapwright")

    def test_folder_and_device(self):
        self.refused(["rank", *self.ROWS, "--store", self.folder], "is a folder")
        self.refused(["rank", *self.ROWS, "--store", "/dev/full"], "is no ordinary file")
        self.refused(["rank", *self.ROWS, "--store", self.folder / "no" / "rows.db"],
                     "does not exist")

    def test_other_settings(self):
        self.fill()
        self.refuse_store("other settings", "tolerance 0.0001, now 0.001",
                          extra=["--tolerance", "1e-3"])
        self.refuse_store("other settings", "contact_target bilayer-qmc, now graphite-rpa",
                          extra=["--contact-target", "graphite-rpa"])
        self.refuse_store("hopping nearest-neighbour, now zone-folding",
                          extra=["--hopping", "zone-folding"])

    def test_other_version(self):
        self.fill()
        self.change("UPDATE store SET numerics_version = 'earlier', settings_key = 'x'")
        self.refuse_store("version of the numbers earlier, now")

    def test_other_layout(self):
        self.fill()
        self.change("PRAGMA user_version = 99")
        self.refuse_store("layout 99")

    def test_other_kernel(self):
        self.fill()
        self.change("UPDATE store SET kernel = 'other'")
        self.refuse_store("kernel other, now")

    def test_other_catalogue_values(self):
        self.fill()
        self.change("UPDATE store SET settings_key = 'x', catalog_hash = '0123456789abcdef'")
        self.refuse_store("values of the catalogues (hash) 0123456789abcdef, now")

    def test_other_range_goes_on(self):
        """Rows of another plan under the same settings are kept and said."""
        self.fill()
        done = self.good("rank", "--inner", "10,10", "--gap-nm", "0.35:0.37", "--store",
                         self.store)
        self.assertIn("rows are in the store already", done.stderr)
        self.assertIn("rows of other plans or parts: kept, not listed", done.stderr)

    def test_damaged(self):
        self.fill()
        whole = self.store.read_bytes()
        middle = len(whole) // 2 // 4096 * 4096
        self.store.write_bytes(whole[:middle] + b"\xff" * 4096 + whole[middle + 4096:])
        self.refuse_store("damaged")
        self.store.write_bytes(whole[:len(whole) // 2])
        self.refuse_store("damaged")

    def test_damaged_row(self):
        self.fill()
        self.change("UPDATE pairs SET diameter_1_nm = NULL")
        self.refused(["rank", *self.ROWS, "--store", self.store], "damaged", "row")

    def test_in_use(self):
        process = harness.start("rank", *harness.SLOW, "--store", self.store)
        try:
            self.assertTrue(harness.wait_until(self.path("rows.db-wal").exists, process))
            self.refused(["rank", *self.ROWS, "--store", self.store], "in use by another run")
            self.refused(["rank", "--pair", "5,5@10,10", "--store", self.store],
                         "in use by another run")
        finally:
            process.kill()
            process.communicate()

    def test_pair(self):
        self.fill()
        self.refused(["rank", "--pair", "5,5@10,10"], "--pair", "--store")
        self.refused(["rank", "--pair", "5,5@10,10", "--store", self.store], "no row of (5,5)@")
        self.refused(["rank", "--pair", "5,5", "--store", self.store], "is no pair")
        self.refused(["rank", "--pair", "5,5@10,10", "--store", self.path("none.db")],
                     "no such store")


class Places(harness.Case):
    """Places that cannot be written to."""
    ROWS = ["--inner", "10,10", "--gap-nm", "0.33:0.36"]

    def as_nobody(self, *arguments):
        """In a folder that the user may only read; the program is copied to where it can be run."""
        self.folder.chmod(0o755)
        program = self.folder / "gapwright"
        shutil.copy(harness.PROGRAM, program)
        place = self.folder / "place"
        place.mkdir(exist_ok=True)
        place.chmod(0o555)
        self.addCleanup(place.chmod, 0o755)
        root = harness.os.geteuid() == 0
        return subprocess.run([str(program), *map(str, arguments)], capture_output=True, text=True,
                              cwd=place, preexec_fn=harness.become_nobody if root else None)

    def test_read_only_folder(self):
        for option, name in (("--store", "rows.db"), ("--csv", "rows.csv")):
            done = self.as_nobody("rank", *self.ROWS, option, name)
            self.assertEqual(done.returncode, 2, done.stderr)
            self.assertIn(name, done.stderr)
            self.assertRegex(done.stderr, "cannot be (opened|written)")
            self.assertEqual(done.stdout, "")
        self.assertEqual(list((self.folder / "place").iterdir()), [])

    def test_read_only_store(self):
        """A finished store in a read-only folder can be read, and not gone on with."""
        self.as_nobody("--version")
        place = self.folder / "place"
        place.chmod(0o755)
        store = place / "rows.db"
        self.good("rank", *self.ROWS, "--store", store)
        store.chmod(0o444)
        done = self.as_nobody("rank", *self.ROWS, "--store", "rows.db")
        self.assertEqual(done.returncode, 2, done.stderr)
        self.assertIn("write-protected", done.stderr)
        done = self.as_nobody("rank", "--pair", "10,10@15,15", "--store", "rows.db")
        self.assertEqual(done.returncode, 0, done.stderr)

    def test_csv_place_is_checked_before_work(self):
        self.refused(["rank", *self.ROWS, "--csv", self.folder / "no" / "rows.csv"],
                     "does not exist")
        self.refused(["rank", *self.ROWS, "--csv", self.folder], "is a folder")


if __name__ == "__main__":
    harness.main()
