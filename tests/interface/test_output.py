"""What the commands print: fields, JSON, tables, order."""

import contextlib
import csv
import json
import os
import pathlib
import sqlite3
import subprocess

import harness
from harness import BESIDE, EXAMPLE, SWEEP

FIELDS = """object_1 object_2 kind_1 kind_2 diameter_1_nm diameter_2_nm chiral_angle_1_deg
    chiral_angle_2_deg band_gap_1_eV band_gap_2_eV arrangement gap_nm axis_distance_nm offset_nm angle_deg
    temperature_K chemical_potential_eV medium contact_target dispersion_eV_per_nm
    contact_eV_per_nm energy_eV_per_nm dispersion_eV contact_eV energy_eV energy_mJ_per_m2
    energy_meV_per_atom pressure_dispersion_GPa pressure_GPa electronic_share_eV_per_nm
    electronic_share_eV thermal_share retardation_factor pull_out_force_nN cut_energy_eV_per_nm
    pair_potential_eV_per_nm pair_potential_eV equilibrium_gap_nm well_depth_eV_per_nm
    well_depth_eV stiffness_eV_per_nm3 stiffness_eV_per_nm2 exponent first_round_trip_eV_per_nm
    first_round_trip_eV relative_error energy_error pressure_error electronic_share_error
    equilibrium_gap_error well_depth_error status""".split()
ROWS = ["--inner", "10,10", "--gap-nm", "0.33:0.36"]


def read_csv(text):
    lines = [line for line in text.splitlines() if not line.startswith("#")]
    return list(csv.DictReader(lines))


class Describe(harness.Case):
    def test_ribbons(self):
        done = self.good("describe", "13-AGNR", "6-zgnr", "--json")
        armchair, zigzag = map(json.loads, done.stdout.splitlines())
        self.assertEqual(armchair["object"], "13-AGNR")
        self.assertEqual(armchair["atoms_per_cell"], 26)
        self.assertAlmostEqual(armchair["period_nm"], 0.426, places=6)
        # Exact diagonalisation of the model of Son, Cohen & Louie, PRL 97, 216803 (2006).
        self.assertAlmostEqual(armchair["band_gap_eV"], 0.85812, places=4)
        self.assertEqual(armchair["e11_eV"], armchair["band_gap_eV"])
        self.assertGreater(armchair["e22_eV"], armchair["e11_eV"])
        self.assertEqual(zigzag["shape"], "zigzag")
        self.assertEqual(zigzag["kind"], "semiconducting")
        self.assertIn("U = 1.94 eV", self.good("describe", "6-ZGNR").stdout)
        self.refused(["rank", "--inner", "13-AGNR"], "13-AGNR")

    def test_one_object_a_line(self):
        done = self.good("describe", "10,10", "(6,5)", "5,5@10,10", "graphene", "--json")
        armchair, chiral, walls, sheet = map(json.loads, done.stdout.splitlines())
        self.assertEqual(armchair["object"], "(10,10)")
        self.assertEqual(armchair["shape"], "armchair")
        self.assertEqual(armchair["band_gap_eV"], 0)
        self.assertEqual(chiral["atoms_per_cell"], 364)
        self.assertEqual(chiral["kind"], "semiconducting")
        self.assertEqual([wall["object"] for wall in walls["walls"]], ["(5,5)", "(10,10)"])
        self.assertAlmostEqual(walls["gaps_nm"][0], 0.339, places=5)
        self.assertEqual(sheet["band_gap_eV"], 0)

    def test_text_says_single_particle_and_response(self):
        text = self.good("describe", "9,0").stdout
        for part in ("single-particle", "curvature gap", "response", "36 atoms", "zg/nm"):
            self.assertIn(part, text)

    def test_hopping_matters(self):
        plain = json.loads(self.good("describe", "9,0", "--json").stdout)
        folded = json.loads(
            self.good("describe", "9,0", "--json", "--hopping", "zone-folding").stdout)
        self.assertGreater(plain["band_gap_eV"], 0.08)
        self.assertLess(folded["band_gap_eV"], 1e-9)


class Bind(harness.Case):
    def test_json_has_all_fields_in_order(self):
        row = json.loads(self.good("bind", "5,5@10,10", "--json").stdout)
        self.assertEqual(list(row), FIELDS)
        self.assertEqual((row["temperature_K"], row["chemical_potential_eV"]), (300, 0))
        self.assertGreater(row["thermal_share"], 0)
        cold = json.loads(self.good("bind", "5,5@10,10", "--temperature-K", "0", "--json").stdout)
        self.assertIsNone(cold["thermal_share"])
        self.assertEqual((row["object_1"], row["object_2"]), ("(5,5)", "(10,10)"))
        self.assertAlmostEqual(row["energy_eV_per_nm"],
                               row["dispersion_eV_per_nm"] + row["contact_eV_per_nm"], places=12)

    def test_text(self):
        text = self.good("bind", "5,5@10,10").stdout
        for part in ("(5,5)@(10,10)", "by geometry", "by electrons", "±", "pull", "GPa",
                     "pair potential", "status ok"):
            self.assertIn(part, text)

    def test_retarded(self):
        usual, retarded = (json.loads(self.good("bind", "5,5@10,10", "--temperature-K", "0", "--json",
                                                *flag).stdout)
                           for flag in ([], ["--retarded"]))
        self.assertIsNone(usual["retardation_factor"])
        self.assertAlmostEqual(retarded["retardation_factor"], 0.998763, delta=2e-5)
        self.assertAlmostEqual(
            retarded["dispersion_eV_per_nm"],
            usual["dispersion_eV_per_nm"] * retarded["retardation_factor"], places=12)
        self.assertEqual(retarded["contact_eV_per_nm"], usual["contact_eV_per_nm"])
        text = self.good("bind", "5,5@10,10", "--retarded").stdout
        self.assertIn("vacuum, retarded\n", text)
        self.assertIn("times the non-retarded one", text)

    def test_interfaces_of_three_walls(self):
        row = json.loads(self.good("bind", "5,5@10,10@15,15", "--json").stdout)
        self.assertEqual([cut["inside"] for cut in row["interfaces"]], ["(5,5)", "(5,5)@(10,10)"])
        self.assertIsNone(row["pressure_GPa"])
        self.assertIn("interfaces", self.good("bind", "5,5@10,10@15,15").stdout)

    def test_mirror(self):
        done = self.good("bind", "5,5@9,10", "--json")
        self.assertIn("mirror image", done.stderr)
        self.assertEqual(json.loads(done.stdout)["object_2"], "(10,9)")

    def test_contact_target(self):
        rows = [json.loads(self.good("bind", "5,5@10,10", "--json", "--contact-target",
                                     name).stdout) for name in ("bilayer-qmc", "graphite-rpa")]
        self.assertEqual(rows[0]["dispersion_eV_per_nm"], rows[1]["dispersion_eV_per_nm"])
        self.assertNotEqual(rows[0]["contact_eV_per_nm"], rows[1]["contact_eV_per_nm"])

    def test_same_bits_on_any_number_of_threads(self):
        rows = [self.good("bind", "6,5@14,7", "--json", "--threads", n).stdout for n in (1, 2, 3)]
        self.assertEqual(rows[0], rows[1])
        self.assertEqual(rows[0], rows[2])

    def test_kernels_agree(self):
        portable = json.loads(
            self.good("bind", "6,5@14,7", "--json", "--kernel", "portable").stdout)
        usual = json.loads(self.good("bind", "6,5@14,7", "--json").stdout)
        self.assertLess(abs(portable["dispersion_eV_per_nm"] / usual["dispersion_eV_per_nm"] - 1),
                        1e-5)


class Rank(harness.Case):
    def test_csv_json_and_store_hold_the_same_bits(self):
        store, file = self.path("rows.db"), self.path("rows.csv")
        done = self.good("rank", *ROWS, "--json", "--store", store, "--csv", file)
        from_json = [json.loads(line) for line in done.stdout.splitlines()]
        from_csv = read_csv(file.read_text())
        self.assertEqual(list(from_json[0]), ["rank", *FIELDS, "rank_spread"])
        self.assertEqual(list(from_csv[0]), ["rank", *FIELDS, "rank_spread"])
        with contextlib.closing(sqlite3.connect(store)) as database, database:
            database.row_factory = sqlite3.Row
            stored = {(row["object_1"], row["object_2"]): row
                      for row in database.execute("SELECT * FROM pairs")}
        self.assertEqual(len(from_json), len(stored))
        self.assertEqual(len(from_csv), len(stored))
        for a, b in zip(from_json, from_csv):
            row = stored[a["object_1"], a["object_2"]]
            for field in FIELDS:
                self.assertEqual(a[field], row[field], field)
                if isinstance(a[field], float):
                    self.assertEqual(float(b[field]), a[field], field)
                else:
                    self.assertEqual(b[field], "" if a[field] is None else str(a[field]), field)

    def test_store_tells_how_it_was_made(self):
        store = self.path("rows.db")
        self.good("rank", *ROWS, "--store", store)
        with contextlib.closing(sqlite3.connect(store)) as database, database:
            database.row_factory = sqlite3.Row
            made = database.execute("SELECT * FROM store").fetchone()
            run = database.execute("SELECT * FROM runs").fetchone()
            objects = database.execute("SELECT count(*) FROM objects").fetchone()[0]
            rows = database.execute("SELECT count(*) FROM pairs").fetchone()[0]
        version = json.loads(self.good("--version", "--json").stdout)
        self.assertEqual(made["program_version"], version["version"])
        self.assertEqual(made["numerics_version"], version["numerics_version"])
        self.assertEqual(made["catalog_hash"], version["catalog_hash"])
        self.assertEqual(made["kernel"], version["kernel"])
        self.assertEqual((made["temperature_K"], made["tolerance"]), (300, 1e-4))
        self.assertEqual((run["completed"], run["rows_computed"]), (1, rows))
        self.assertIn('inner = "(10,10)"', run["plan"])
        self.assertEqual(objects, rows + 1)

    def test_order_and_top(self):
        rows = [json.loads(line)
                for line in self.good("rank", *ROWS, "--json").stdout.splitlines()]
        energies = [row["energy_mJ_per_m2"] for row in rows]
        self.assertEqual(energies, sorted(energies))
        self.assertEqual([row["rank"] for row in rows], list(range(1, len(rows) + 1)))
        self.assertTrue(all(0 <= row["rank_spread"] < len(rows) for row in rows))
        top = self.good("rank", *ROWS, "--json", "--top", "3").stdout.splitlines()
        self.assertEqual([json.loads(line) for line in top], rows[:3])
        forces = [json.loads(line)["pull_out_force_nN"] for line in self.good(
            "rank", *ROWS, "--json", "--sort", "pull_out_force_nN").stdout.splitlines()]
        self.assertEqual(forces, sorted(forces, reverse=True))
        shares = [json.loads(line)["electronic_share_eV_per_nm"] for line in self.good(
            "rank", *ROWS, "--json", "--sort", "electronic_share_eV_per_nm").stdout.splitlines()]
        self.assertEqual(shares, sorted(shares))

    def test_rank_spread_is_that_of_runs_under_each_target(self):
        """Places from three separate runs, one a contact target."""
        places = {}
        for target in ("bilayer-qmc", "graphite-rpa", "cleavage-measured"):
            done = self.good("rank", *ROWS, "--json", "--contact-target", target)
            for line in done.stdout.splitlines():
                row = json.loads(line)
                places.setdefault((row["object_1"], row["object_2"]), []).append(
                    (row["rank"], row["rank_spread"]))
        for pair, found in places.items():
            ranks = [rank for rank, _ in found]
            for _, spread in found:
                self.assertEqual(spread, max(ranks) - min(ranks), pair)

    def test_rank_spread_of_pressure(self):
        places = {}
        for target in ("bilayer-qmc", "graphite-rpa", "cleavage-measured"):
            done = self.good("rank", *ROWS, "--json", "--contact-target", target, "--sort",
                             "pressure_GPa")
            for line in done.stdout.splitlines():
                row = json.loads(line)
                places.setdefault((row["object_1"], row["object_2"]), []).append(
                    (row["rank"], row["rank_spread"]))
        for pair, found in places.items():
            ranks = [rank for rank, _ in found]
            self.assertEqual(found[0][1], max(ranks) - min(ranks), pair)

    def test_table(self):
        done = self.good("rank", *ROWS, "--top", "4", "--sort", "band_gap_2_eV")
        lines = done.stdout.splitlines()
        self.assertEqual(len(lines), 6)
        self.assertIn("mJ/m2", lines[1])
        self.assertIn("band_gap_2_eV", lines[0])
        self.assertIn("Negative energies attract", done.stderr)
        self.assertIn("nothing is kept", done.stderr)
        self.assertNotIn("\x1b", done.stderr + done.stdout)

    def test_bar_on_a_terminal(self):
        parent, terminal = os.openpty()
        done = subprocess.run([harness.PROGRAM, "rank", *SWEEP, "--threads", "1", "--top", "1"],
                              stdout=subprocess.PIPE, stderr=terminal)
        os.close(terminal)
        shown = b""
        try:
            while chunk := os.read(parent, 4096):
                shown += chunk
        except OSError:  # how a terminal without writers ends
            pass
        os.close(parent)
        text = shown.decode()
        self.assertEqual(done.returncode, 0, text)
        self.assertRegex(text, r"\r\x1b\[K\[=* *\] \d+ of 703 rows, 0 failed, \d+/s")
        self.assertRegex(text, r"\[=+\] 703 of 703 rows, 0 failed")
        self.assertNotIn(b"\x1b", done.stdout)

    def test_flags_replace_keys_of_a_plan(self):
        plan = self.path("plan.toml", 'inner = "10,10"\ngap_nm = [0.33, 0.36]\ntop = 2\n')
        self.assertEqual(len(self.good("rank", plan, "--json").stdout.splitlines()), 2)
        wide = self.good("rank", plan, "--gap-nm", "0.31:0.38", "--top", "9999", "--json")
        rows = [json.loads(line) for line in wide.stdout.splitlines()]
        self.assertLess(min(row["gap_nm"] for row in rows), 0.33)

    def test_selection(self):
        done = self.good("rank", "--inner-diameter-nm", "0.6:0.8", "--index", "5:20", "--kind",
                         "metallic", "--gap-nm", "0.33:0.35", "--json")
        for line in done.stdout.splitlines():
            row = json.loads(line)
            self.assertEqual((row["kind_1"], row["kind_2"]), ("metallic", "metallic"))
            self.assertTrue(0.6 <= row["diameter_1_nm"] <= 0.8)
            self.assertTrue(0.33 <= row["gap_nm"] <= 0.35)
        outer = self.good("rank", "--outer", "10,10", "--gap-nm", "0.33:0.35", "--json")
        self.assertEqual({json.loads(line)["object_2"] for line in outer.stdout.splitlines()},
                         {"(10,10)"})

    def test_count(self):
        count = json.loads(self.good("rank", *SWEEP, "--count", "--json").stdout)
        store = self.path("rows.db")
        self.good("rank", *SWEEP, "--store", store)
        self.assertEqual(count["pairs"], len(self.rows(store)))
        size = store.stat().st_size
        self.assertTrue(size / 2 < count["estimated_store_bytes"] < 2 * size,
                        (size, count["estimated_store_bytes"]))
        self.assertIn("pairs of", self.good("rank", *SWEEP, "--count").stdout)

    def test_example(self):
        count = json.loads(self.good("rank", EXAMPLE, "--count", "--json").stdout)
        self.assertTrue(500 <= count["pairs"] <= 2500)
        lines = self.good("rank", EXAMPLE).stdout.splitlines()
        self.assertEqual(len(lines), 22)


class SideBySide(harness.Case):
    def test_wells_rank_by_depth(self):
        csv_file = self.path("rows.csv")
        done = self.good("rank", *BESIDE, "--csv", csv_file, "--top", "3")
        rows = read_csv(csv_file.read_text())
        depths = [float(row["well_depth_eV_per_nm"]) for row in rows]
        self.assertEqual(depths, sorted(depths, reverse=True))
        names = {(row["object_1"], row["object_2"]) for row in rows}
        self.assertEqual(len(names), len(rows))
        self.assertTrue(any(one == other for one, other in names))
        for row in rows:
            self.assertEqual(row["arrangement"], "parallel")
            self.assertEqual(row["status"], "ok")
            self.assertEqual(row["gap_nm"], row["equilibrium_gap_nm"])
            self.assertEqual(row["energy_mJ_per_m2"], "")
        for word in ("well", "stiffness", "pair pot.", "spread"):
            self.assertIn(word, done.stdout)
        self.assertIn(f"3 of {len(rows)} rows by well_depth_eV_per_nm, highest first", done.stderr)
        bound = json.loads(self.good("bind", rows[0]["object_1"], rows[0]["object_2"],
                                     "--json").stdout)
        self.assertEqual(float(rows[0]["well_depth_eV_per_nm"]), bound["well_depth_eV_per_nm"])

    def test_one_gap(self):
        lines = self.good("rank", "--arrangement", "parallel", "--with", "10,10", "--index", "5:6",
                          "--gap-nm", "0.5", "--json").stdout.splitlines()
        rows = [json.loads(line) for line in lines]
        energies = [row["energy_eV_per_nm"] for row in rows]
        self.assertEqual(energies, sorted(energies))
        for row in rows:
            self.assertEqual(row["gap_nm"], 0.5)
            self.assertEqual(row["object_2"], "(10,10)")
            self.assertIsNone(row["well_depth_eV_per_nm"])

    def test_rank_spread_of_wells_is_that_of_runs_under_each_target(self):
        places = {}
        for target in ("bilayer-qmc", "graphite-rpa", "cleavage-measured"):
            done = self.good("rank", *BESIDE, "--contact-target", target, "--json")
            for row in map(json.loads, done.stdout.splitlines()):
                places.setdefault((row["object_1"], row["object_2"]), []).append(
                    (row["rank"], row["rank_spread"]))
        for found in places.values():
            ranks = [rank for rank, _ in found]
            for _, spread in found:  # neighbours may differ by less than the estimate's 1e-5
                self.assertLessEqual(abs(spread - (max(ranks) - min(ranks))), 1)

    def test_store_and_pair(self):
        store = self.path("rows.db")
        tubes = ["--arrangement", "parallel", "--index", "5:5"]
        self.good("rank", *tubes, "--store", store)
        for pair in ("5,5 5,2", "5,2 5,5"):
            self.assertIn("(5,2) (5,5): stored and computed rows are the same",
                          self.good("rank", "--pair", pair, "--store", store).stdout)
        self.good("rank", *tubes, "--gap-nm", "1", "--store", store)
        self.good("rank", "--pair", "5,5 5,2", "--gap-nm", "1", "--store", store)
        with contextlib.closing(sqlite3.connect(store)) as database, database:
            database.execute("UPDATE pairs SET contact_eV_per_nm = contact_eV_per_nm * 1.5")
        done = harness.run("rank", "--pair", "5,5 5,2", "--store", store)
        self.assertEqual(done.returncode, 1)
        self.assertIn("contact_eV_per_nm", done.stdout)

    def test_count(self):
        done = json.loads(self.good("rank", harness.BESIDE_EXAMPLE, "--count", "--json").stdout)
        self.assertEqual(done["pairs"], done["tubes"] * (done["tubes"] + 1) // 2)
        at_gap = json.loads(self.good("rank", harness.BESIDE_EXAMPLE, "--gap-nm", "0.4", "--count",
                                      "--json").stdout)
        self.assertLess(at_gap["estimated_time_s"], done["estimated_time_s"])

    def test_example(self):
        done = self.good("rank", harness.BESIDE_EXAMPLE, "--kind", "zigzag")
        self.assertIn("(12,0) (12,0)", done.stdout)


class Pair(harness.Case):
    def test_same_and_changed(self):
        store = self.path("rows.db")
        self.good("rank", *ROWS, "--tolerance", "1e-3", "--store", store)
        pair = ["rank", "--pair", "10,10@15,15", "--store", store]
        self.assertIn("the same in all", self.good(*pair).stdout)
        self.assertTrue(json.loads(self.good(*pair, "--json").stdout)["same"])
        self.refused([*pair, "--tolerance", "1e-4"], "other settings")
        with contextlib.closing(sqlite3.connect(store)) as database, database:
            database.execute("UPDATE pairs SET contact_eV_per_nm = -1 WHERE object_2 = '(15,15)'")
        done = harness.run(*pair)
        self.assertEqual(done.returncode, 1)
        self.assertIn("contact_eV_per_nm", done.stdout)


class Failures(harness.Case):
    def test_failed_rows_are_kept_listed_and_exit_with_3(self):
        """A background without response along the normal, and with none in the plane to speak of,
        still converges; a row made to fail in the store shows how failures are told."""
        store = self.path("rows.db")
        self.good("rank", *ROWS, "--store", store)
        with contextlib.closing(sqlite3.connect(store)) as database, database:
            key = database.execute(
                "SELECT key FROM pairs WHERE object_2 = '(15,15)'").fetchone()[0]
            database.execute("UPDATE pairs SET status = 'not_converged' WHERE key = ?", (key,))
            database.execute("INSERT INTO failures VALUES(?, '(10,10)', '(15,15)',"
                             " 'not_converged', 'made to fail')", (key,))
        done = harness.run("rank", *ROWS, "--store", store)
        self.assertEqual(done.returncode, 3)
        self.assertIn("1 of", done.stderr)
        self.assertIn("(10,10)@(15,15): not_converged, made to fail", done.stderr)
        self.assertIn("not_converged", done.stdout)


    def test_no_minimum_side_by_side(self):
        tubes = ["--arrangement", "parallel", "--index", "5:5"]
        store = self.path("rows.db")
        self.good("rank", *tubes, "--store", store)
        with contextlib.closing(sqlite3.connect(store)) as database, database:
            key = database.execute("SELECT key FROM pairs WHERE object_1 = '(5,2)' AND"
                                   " object_2 = '(5,5)'").fetchone()[0]
            emptied = ", ".join(f"{field} = NULL" for field in (
                "gap_nm", "axis_distance_nm", "dispersion_eV_per_nm", "contact_eV_per_nm",
                "energy_eV_per_nm", "equilibrium_gap_nm", "well_depth_eV_per_nm"))
            database.execute(f"UPDATE pairs SET status = 'no_minimum', {emptied} WHERE key = ?",
                             (key,))
            database.execute("INSERT INTO failures VALUES(?, '(5,2)', '(5,5)', 'no_minimum',"
                             " 'made to fail')", (key,))
        done = harness.run("rank", *tubes, "--store", store)
        self.assertEqual(done.returncode, 3)
        self.assertIn("(5,2) (5,5): no_minimum, made to fail", done.stderr)
        self.assertIn("no_minimum", done.stdout.splitlines()[-1])


class Check(harness.Case):
    def test_rows(self):
        done = self.good("check", "--json")
        rows = [json.loads(line) for line in done.stdout.splitlines()]
        self.assertGreater(len(rows), 40)
        for row in rows:
            self.assertTrue(row["source"])
            if row["weight"] == "gated":
                self.assertEqual(row["verdict"], "inside", row)
        self.assertIn("gated values inside", done.stderr)

    def test_gate_outside_exits_with_1(self):
        text = (pathlib.Path(__file__).resolve().parents[2] / "catalogs" /
                "checks.toml").read_text()
        self.path("checks.toml", text.replace("value = 1.17557", "value = 1.2"))
        done = harness.run("check", "--catalogs", self.folder)
        self.assertEqual(done.returncode, 1, done.stderr)
        self.assertIn("outside", done.stdout)

    def test_unknown_quantity(self):
        self.path("checks.toml", '[[check]]\nname = "x"\nquantity = "diametre_nm"\n'
                  'object = "(5,5)"\nvalue = 1\nuncertainty = 1\nunit = "nm"\n'
                  'weight = "gated"\nsource = "s"\n')
        self.refused(["check", "--catalogs", self.folder], "diametre_nm")


class Version(harness.Case):
    def test_text_and_json(self):
        text = self.good("--version").stdout
        for part in ("gapwright ", "compiler", "kernel", "catalogues", "numbers"):
            self.assertIn(part, text)
        self.assertEqual(self.good("bind", "--version").stdout, text)
        self.assertRegex(json.loads(self.good("--version", "--json").stdout)["catalog_hash"],
                         "^[0-9a-f]{16}$")

    def test_help(self):
        for command in ([], ["describe"], ["bind"], ["rank"], ["check"]):
            self.assertIn("Usage: gapwright", self.good(*command, "--help").stdout)


if __name__ == "__main__":
    harness.main()
