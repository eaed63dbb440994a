"""Tables for simulations and bundles as a user makes them."""

import csv
import io
import json
import shlex
import signal
import subprocess
import time
import unittest

import harness

EXAMPLES = harness.EXAMPLE.parent
PAIR = ["table", "10,10", "17,0"]
KJ_PER_MOL_PER_EV = 96.48533212  # exact constants of the SI
NN_PER_EV_PER_NM = 0.1602176634
NN_PER_EV_NM = 0.1602176634


def columns(text):
    """Comment lines, and columns of numbers by name; None where empty."""
    lines = text.splitlines()
    comments = [line for line in lines if line.startswith("#")]
    reader = csv.DictReader(io.StringIO("\n".join(lines[len(comments):])))
    rows = [{name: float(value) if value else None for name, value in row.items()}
            for row in reader]
    return comments, rows


def cubic(rows, distance, energy="energy_eV_per_nm", force="force_eV_per_nm2"):
    """Energy between two rows, from energies and forces of both."""
    for a, b in zip(rows, rows[1:]):
        if a["distance_nm"] <= distance <= b["distance_nm"]:
            h = b["distance_nm"] - a["distance_nm"]
            t = (distance - a["distance_nm"]) / h
            return ((1 + 2 * t) * (1 - t) ** 2 * a[energy] - t * (1 - t) ** 2 * h * a[force]
                    + t * t * (3 - 2 * t) * b[energy] + t * t * (1 - t) * h * b[force])
    raise AssertionError("outside the table")


class Forms(harness.Case):
    def test_csv_returns_direct_energies(self):
        comments, rows = columns(self.good(*PAIR).stdout)
        header = "\n".join(comments)
        for word in ("(10,10) and (17,0) parallel", "temperature 300 K", "vacuum", "contact target bilayer-qmc",
                     "inner cut", "outer cut none", "well distance", "tolerance 0.0001",
                     "reading errors", "dispersion error", "without retardation"):
            self.assertIn(word, header)
        for gap in (0.25, 0.3, 0.4, 1.0, 4.0):
            row = json.loads(self.good("bind", *PAIR[1:], "--gap-nm", gap, "--json").stdout)
            found = cubic(rows, row["axis_distance_nm"])
            self.assertAlmostEqual(found, row["energy_eV_per_nm"],
                                   delta=2e-4 * abs(row["dispersion_eV_per_nm"]))
        well = json.loads(self.good("bind", *PAIR[1:], "--json").stdout)
        self.assertAlmostEqual(cubic(rows, well["axis_distance_nm"]), -well["well_depth_eV_per_nm"],
                               delta=1e-4)

    def test_json_holds_the_same_numbers(self):
        _, rows = columns(self.good(*PAIR, "--outer-cut-nm", 5).stdout)
        table = json.loads(self.good(*PAIR, "--outer-cut-nm", 5, "--json").stdout)
        for name in ("distance_nm", "gap_nm", "energy_eV_per_nm", "force_eV_per_nm2"):
            self.assertEqual(table[name], [row[name] for row in rows])
        self.assertEqual(table["outer_cut_nm"], 5)
        self.assertEqual(rows[-1], {"distance_nm": 5, "gap_nm": table["gap_nm"][-1],
                                    "energy_eV_per_nm": 0, "force_eV_per_nm2": 0,
                                    "pair_potential_eV_per_nm": rows[-1]["pair_potential_eV_per_nm"]})
        self.assertLess(rows[-1]["pair_potential_eV_per_nm"], 0)
        self.assertEqual(table["status"], "ok")

    def test_crossed_and_its_limit(self):
        done = self.good("table", "6,5", "7,5", "--crossed", "90", "--outer-cut-nm", 3)
        _, rows = columns(done.stdout)
        limit = [row for row in rows if row["angle_deg"] == 0]
        right = [row for row in rows if row["angle_deg"] == 90]
        self.assertEqual(len(limit), len(right))
        for low, high in zip(limit, right):
            self.assertIsNone(low["energy_eV"])
            self.assertEqual(high["energy_eV"], high["energy_sine_eV"])
            self.assertEqual(low["distance_nm"], high["distance_nm"])

    def test_template_in_other_units(self):
        _, rows = columns(self.good(*PAIR).stdout)
        lines = self.good(*PAIR, "--template", EXAMPLES / "columns.template").stdout.splitlines()
        self.assertTrue(lines[0].startswith("% (10,10) beside (17,0)"))
        self.assertEqual(lines[-1], f"% {len(rows)} rows")
        for line, row in zip(lines[1:-1], rows):
            gap, force, energy = map(float, line.split(";"))
            self.assertAlmostEqual(gap, row["gap_nm"], delta=1e-6)
            wanted = row["energy_eV_per_nm"] * KJ_PER_MOL_PER_EV
            self.assertAlmostEqual(energy, wanted, delta=2e-8 * abs(wanted))
            wanted = row["force_eV_per_nm2"] * NN_PER_EV_PER_NM
            self.assertAlmostEqual(force, wanted, delta=2e-8 * abs(wanted))

    def test_pair_potential_beside(self):
        """Chirality-blind values at the rows of bind; none in a liquid."""
        _, rows = columns(self.good(*PAIR).stdout)
        row = rows[len(rows) // 2]
        done = self.good("bind", *PAIR[1:], "--gap-nm", repr(row["gap_nm"]), "--json")
        self.assertAlmostEqual(row["pair_potential_eV_per_nm"] /
                               json.loads(done.stdout)["pair_potential_eV_per_nm"], 1, places=9)
        _, rows = columns(self.good(*PAIR, "--in", "water", "--inner-cut-nm", 2.5).stdout)
        self.assertIsNone(rows[0]["pair_potential_eV_per_nm"])

    def test_fields_of_another_kind(self):
        file = self.path("angle.template")
        file.write_text("[row]\n{angle deg .3f} {energy eV/nm .6e}\n")
        self.refused([*PAIR, "--template", file], ":2:", "'angle' is a field of crossed tables")

    def test_mixed_places(self):
        self.refused([*PAIR, "--csv", "a.csv", "--output", "b.csv"], "--output", "--csv")
        self.refused([*PAIR, "--csv", "a.csv", "--json"], "--csv", "--json")

    def test_files(self):
        file, other = self.path("t.csv"), self.path("t.txt")
        text = self.good(*PAIR).stdout
        self.assertEqual(self.good(*PAIR, "--csv", file).stdout, "")
        self.assertEqual(file.read_text(), text)
        self.good(*PAIR, "--csv", file, "--template", EXAMPLES / "columns.template", "--output",
                  other)
        self.assertTrue(other.read_text().endswith(" rows\n"))
        self.assertEqual(self.good(*PAIR, "--threads", 1).stdout, text)
        self.assertEqual(self.leftovers(), [])


class BadInput(harness.Case):
    def test_requests(self):
        self.refused(["table"], "0 objects", "two tubes")
        self.refused(["table", "10,10"], "1 objects", "nearest: 10,10 10,10")
        self.refused(["table", "10,10", "graphene"], "is no tube")
        self.refused(["table", "10,10", "0,0"], "(0,0) is no tube")
        self.refused([*PAIR, "--beads", "--crossed", "90"], "more than one kind")
        self.refused([*PAIR, "--spacing-nm", "0.3"], "--spacing-nm", "--beads")
        self.refused([*PAIR, "--inner-cut-nm", "1.2"], "--inner-cut-nm", "overlap", "nearest")
        self.refused([*PAIR, "--inner-cut-nm", "1.5"], "--inner-cut-nm", "gap of 0.15")
        self.refused([*PAIR, "--outer-cut-nm", "1.8"], "--outer-cut-nm", "nearest")
        for angles in ("0", "91", "30,0.5", "x", "30,,60", "", "nan", "90,90"):
            self.refused([*PAIR, "--crossed", angles], "--crossed", "expected")
        self.refused([*PAIR, "--beads", "--spacing-nm", "1.4"], "--spacing-nm", "diameter, 1.3309")
        for value in ("nan", "-1", "x", "inf"):
            for option in ("--inner-cut-nm", "--outer-cut-nm"):
                self.refused([*PAIR, option, value], option)

    def test_templates(self):
        def refused(text, *fragments):
            file = self.path("my.template", text)
            self.refused([*PAIR, "--template", file], *fragments)
        refused("[row]\n{distance} {enrgy}\n", "my.template:2", "unknown field 'enrgy'",
                "  {distance} {enrgy}\n              ^", "nearest: energy")
        refused("[row]\n{energy kJ/mol}\n", "no unit of 'energy'", "kJ/mol/nm")
        refused("[row]\n{energy 5q}\n", "is no format of energy", "^")
        refused("", "no part [row]")
        refused("[row]\n\0{energy}\n", "is no text")
        self.refused([*PAIR, "--template", self.path("none")], "cannot be read")
        self.refused([*PAIR, "--template", self.folder], "is a folder")
        self.refused([*PAIR, "--template", EXAMPLES / "columns.template", "--json"], "--json")

    def test_places(self):
        self.refused([*PAIR, "--csv", self.folder], "is a folder")
        self.refused([*PAIR, "--csv", self.folder / "no" / "t.csv"], "does not exist")
        self.refused([*PAIR, "--csv", "/dev/full"], "/dev/full", "No space left")
        with open("/dev/full", "w") as full:
            done = subprocess.run([harness.PROGRAM, *PAIR], stdout=full, stderr=subprocess.PIPE,
                                  text=True, timeout=300)
        self.assertEqual(done.returncode, 2)
        self.assertIn("standard output", done.stderr)
        file = self.path("t.csv")
        self.refused([*PAIR, "--csv", file], "t.csv", preexec_fn=harness.file_limit(1000))
        self.assertEqual(list(self.folder.iterdir()), [])

    def test_series(self):
        out = ["--output", self.path("out")]
        self.refused(["table", "--tubes", "10,10"], "--output DIR")
        self.refused(["table", "10,10", "--tubes", "10,10", *out], "stands beside --tubes")
        self.refused(["table", "--tubes", "10,10;;17,0", *out], "--tubes", "empty")
        self.refused(["table", "--tubes", "10;10", *out], "--tubes", "two indices")
        self.refused(["table", "--tubes", "0.6:0.601", *out], "no tube has a diameter")
        self.refused(["table", "--tubes", "2:1", *out], "--tubes", "LOW:HIGH")
        self.refused(["table", "--tubes", "10,10", "--csv", "x.csv", *out], "--csv")
        self.refused(["table", "--tubes", "5,5;10,10", "--inner-cut-nm", "1.0", *out],
                     "--inner-cut-nm", "(5,5) and (10,10) overlap")
        self.refused(["table", "--tubes", "10,10", "--output", self.path("no") / "folder"],
                     "cannot be made")
        self.refused(["table", "--tubes", "10,10", "--output", self.path("file", "x")],
                     "no folder")
        mine = self.path("mine")
        mine.mkdir()
        (mine / "index.csv").write_text("a,b\n")
        self.refused(["table", "--tubes", "10,10", "--output", mine], "index.csv", "no index")
        self.assertEqual((mine / "index.csv").read_text(), "a,b\n")

    def test_folder_that_cannot_be_written(self):
        locked = self.path("locked")
        locked.mkdir()
        self.folder.chmod(0o755)
        locked.chmod(0o555)
        started = time.monotonic()
        self.refused(["table", "--tubes", "0.6:2", "--output", locked], "cannot be written",
                     preexec_fn=harness.become_nobody)
        self.assertLess(time.monotonic() - started, 20)


class Series(harness.Case):
    def test_network_of_the_example(self):
        """examples/tables-network.sh as README tells it."""
        folder = self.path("network")
        subprocess.run(["sh", EXAMPLES / "tables-network.sh", harness.PROGRAM, folder], check=True,
                       capture_output=True, timeout=300)
        self.assertEqual(sorted(file.name for file in folder.iterdir()),
                         ["10-10_10-10.txt", "17-0_10-10.txt", "17-0_17-0.txt", "index.csv"])
        lines = (folder / "17-0_10-10.txt").read_text().splitlines()
        self.assertEqual(lines[0], "pair (17,0) (10,10) spacing 0.320000 cut 5.000000")
        self.assertEqual(lines[-1], f"rows {len(lines) - 2}")
        rows = [line.split() for line in lines[1:-1]]
        self.assertTrue(all(row[0::2] == ["r", "e", "f"] for row in rows))
        # Beads of one chain against those of the other return the tubes: the well of the pair.
        r, e, f = ([float(row[i]) for row in rows] for i in (1, 3, 5))
        beads = [{"distance_nm": a, "energy": b / NN_PER_EV_NM, "force": c / NN_PER_EV_NM}
                 for a, b, c in zip(r, e, f)]
        well = json.loads(self.good("bind", "10,10", "17,0", "--json").stdout)
        distance, total = well["axis_distance_nm"], 0.0
        for j in range(-15, 16):
            reach = (distance ** 2 + (0.32 * j) ** 2) ** 0.5
            if reach < 5:
                total += cubic(beads, reach, "energy", "force")
        # The switch of the cut moves it a little.
        self.assertAlmostEqual(total / 0.32, -well["well_depth_eV_per_nm"], delta=2e-3)

    def test_goes_on_and_leaves_whole_files(self):
        folder = self.path("out")
        command = ["table", "--tubes", "0.6:0.75", "--output", folder]
        process = harness.start(*command, "--threads", "1")
        self.assertTrue(harness.wait_until(lambda: (folder / "index.csv").exists(), process))
        process.send_signal(signal.SIGINT)
        _, notes = process.communicate(timeout=120)
        self.assertEqual(process.returncode, 4, notes)
        self.assertIn("run the same command again", notes)
        kept = {file.name: file.read_text() for file in folder.iterdir()}
        index = kept.pop("index.csv")
        self.assertEqual(len(index.splitlines()) - 2, len(kept))
        for text in kept.values():
            _, rows = columns(text)
            self.assertTrue(all(None not in row.values() for row in rows))
        stamps = {name: (folder / name).stat().st_mtime_ns for name in kept}
        broken = next(iter(kept))
        (folder / broken).write_text("spoiled")
        self.good(*command)
        for name, text in kept.items():
            self.assertEqual((folder / name).read_text(), text)
            if name != broken:
                self.assertEqual((folder / name).stat().st_mtime_ns, stamps[name])
        lines = (folder / "index.csv").read_text().splitlines()
        self.assertEqual(len(lines) - 2, len(list(folder.iterdir())) - 1)
        self.assertTrue(lines[1].startswith("file,object_1,object_2,"))
        # Another cut is another table.
        self.good("table", "--tubes", "0.6:0.62", "--outer-cut-nm", 3, "--output", folder)
        changed = [name for name, text in kept.items() if (folder / name).read_text() != text]
        self.assertTrue(changed)


class Readme(harness.Case):
    """What README says about tables is what happens."""

    def section(self):
        text = (EXAMPLES.parent / "README.md").read_text("utf-8")
        return text.split("## Tables for a simulation\n")[1].split("\n## ")[0]

    def test_commands(self):
        commands = [line.strip() for line in self.section().splitlines()
                    if line.startswith("    build/gapwright ")]
        self.assertGreater(len(commands), 3)
        for command in commands:
            words = shlex.split(command.split("   ")[0])[1:]
            self.good(*words, "--tolerance", "1e-3", cwd=self.folder)
        self.assertEqual(sorted(file.name for file in self.path("network").iterdir()),
                         ["10-10_10-10.csv", "17-0_10-10.csv", "17-0_17-0.csv", "index.csv"])
        self.assertTrue(self.path("pair.csv").exists())

    def test_template_and_its_fields(self):
        block = self.section().split("    # comments stand")[1].split("\n\n")[0]
        text = "\n".join(line[4:] for line in block.splitlines()[1:])
        lines = self.good(*PAIR, "--template", self.path("t", text + "\n")).stdout.splitlines()
        self.assertEqual((lines[0][:20], lines[-1]), ("% (10,10) beside (17", f"% {len(lines) - 2} rows"))
        fields = [name.strip() for line in self.section().splitlines()
                  if line.startswith("| ") and not line.startswith("| field")
                  for name in line.split("|")[1].split(",")]
        every = "[row]\n" + " ".join("{%s}" % name for name in fields) + "\n"
        self.good("table", "6,5", "7,5", "--crossed", "90", "--tolerance", "1e-3", "--template",
                  self.path("all", every))
        # The program knows no field that README does not tell.
        done = self.refused([*PAIR, "--template", self.path("no", "[row]\n{x}\n")], "one of ")
        known = done.stderr.split("one of ")[1].split("\n")[0].split(", ")
        self.assertEqual(sorted(known), sorted(fields))


class Bundles(harness.Case):
    def test_bundle(self):
        row = json.loads(self.good("bind", "10,10", "--bundle", "--json").stdout)
        self.assertAlmostEqual(row["pair_potential_lattice_constant_nm"], 1.6713, delta=1.6e-3)
        self.assertAlmostEqual(row["pair_potential_eV_per_nm"], -2.8768, delta=2.8e-3)
        self.assertLess(row["energy_eV_per_nm"], row["first_neighbours_eV_per_nm"])
        self.assertIn("lattice constant", self.good("bind", "17,0", "--bundle").stdout)

    def test_bad_bundles(self):
        self.refused(["bind", "10,10", "10,10", "--bundle"], "--bundle", "one kind")
        self.refused(["bind", "--bundle"], "--bundle", "one object")
        self.refused(["bind", "graphene", "--bundle"], "is no tube")
        self.refused(["bind", "10,10", "--bundle", "--gap-nm", "0.3"], "--gap-nm")


if __name__ == "__main__":
    harness.main()
