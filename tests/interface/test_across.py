"""Two objects side by side, across and over each other, in a liquid, and over distances."""

import json

import harness


class Case(harness.Case):
    def row(self, *arguments):
        return json.loads(self.good("bind", *arguments, "--json").stdout)


class Rows(Case):
    def test_crossed(self):
        row = self.row("10,10", "8,4", "--crossed", "60")
        self.assertEqual((row["arrangement"], row["angle_deg"]), ("crossed", 60))
        self.assertAlmostEqual(row["energy_eV"], row["dispersion_eV"] + row["contact_eV"],
                               places=12)
        self.assertAlmostEqual(row["well_depth_eV"], -row["energy_eV"], places=12)
        self.assertEqual(row["gap_nm"], row["equilibrium_gap_nm"])
        self.assertGreater(row["stiffness_eV_per_nm2"], 0)
        for field in ("dispersion_eV_per_nm", "energy_eV_per_nm", "well_depth_eV_per_nm",
                      "stiffness_eV_per_nm3", "first_round_trip_eV_per_nm"):
            self.assertIsNone(row[field], field)
        self.assertEqual(len(row["notes"]), 1)
        share = 100 * (row["dispersion_eV"] / row["first_round_trip_eV"] - 1)
        self.assertIn(f"{share:.2f} % beyond its first round trip", row["notes"][0])

    def test_over_graphene(self):
        row = self.row("10,10", "--over", "graphene")
        self.assertEqual((row["object_2"], row["kind_2"], row["arrangement"]),
                         ("graphene", "sheet", "over"))
        self.assertIsNone(row["diameter_2_nm"])
        self.assertIsNone(row["chiral_angle_2_deg"])
        self.assertAlmostEqual(row["axis_distance_nm"], row["diameter_1_nm"] / 2 + row["gap_nm"],
                               places=9)
        self.assertEqual(row["well_depth_eV_per_nm"], -row["energy_eV_per_nm"])
        self.assertNotIn("notes", row)

    def test_over_a_medium(self):
        row = self.row("5,5@10,10", "--over", "silica", "--gap-nm", "1")
        self.assertEqual((row["object_2"], row["kind_2"]), ("silica", "half-space"))
        self.assertEqual(row["energy_eV_per_nm"], row["dispersion_eV_per_nm"])
        for field in ("contact_target", "contact_eV_per_nm", "pair_potential_eV_per_nm"):
            self.assertIsNone(row[field], field)

    def test_in_a_liquid(self):
        dry = self.row("10,10", "10,10", "--gap-nm", "0.5")
        wet = self.row("10,10", "10,10", "--gap-nm", "0.5", "--in", "water")
        self.assertEqual((dry["medium"], wet["medium"]), ("vacuum", "water"))
        self.assertLess(dry["dispersion_eV_per_nm"], wet["dispersion_eV_per_nm"])
        self.assertLess(wet["dispersion_eV_per_nm"], 0)
        self.assertEqual(wet["notes"], ["the liquid is taken as a continuum",
                                        "salt is not included in the static term"])
        cold = self.row("10,10", "10,10", "--gap-nm", "0.5", "--in", "water", "--temperature-K", "0")
        self.assertEqual(cold["notes"], ["the liquid is taken as a continuum"])
        self.row("8,4", "8,4", "--gap-nm", "1", "--crossed", "90", "--in", "ethanol")
        self.row("10,10", "--over", "vacuum", "--gap-nm", "1", "--in", "water")
        self.assertEqual(self.row("10,10", "10,10", "--gap-nm", "0.5", "--in", "vacuum"), dry)

    def test_ranking_in_a_liquid(self):
        plan = self.path("plan.toml", 'arrangement = "parallel"\nindex = [9, 9]\ngap_nm = 1\n'
                                      'medium = "water"\n')
        done = self.good("rank", plan, "--json")
        rows = [json.loads(line) for line in done.stdout.splitlines()]
        self.assertEqual({row["medium"] for row in rows}, {"water"})
        energies = [row["energy_eV_per_nm"] for row in rows]
        self.assertEqual(energies, sorted(energies))
        self.assertEqual({row["rank_spread"] for row in rows}, {0})
        flags = self.good("rank", "--arrangement", "parallel", "--index", "9:9", "--gap-nm", "1",
                          "--in", "water", "--json")
        self.assertEqual(flags.stdout, done.stdout)
        single = self.row(rows[0]["object_1"], rows[0]["object_2"], "--gap-nm", "1", "--in",
                          "water")
        self.assertEqual(single["dispersion_eV_per_nm"], rows[0]["dispersion_eV_per_nm"])

    def test_parallel_is_the_default(self):
        self.assertEqual(self.row("10,10", "8,4", "--parallel"), self.row("10,10", "8,4"))

    def test_text(self):
        done = self.good("bind", "10,10", "8,4", "--crossed", "60")
        for part in ("crossed at 60 deg", "angle", "eV ±", "first round trip", "well", "eV/nm2",
                     "status ok"):
            self.assertIn(part, done.stdout)
        self.assertNotIn("eV/nm ", done.stdout)
        self.assertIn("note: crossed: the dispersion is the full form", done.stderr)
        text = self.good("bind", "10,10", "--over", "graphene").stdout
        for part in ("(10,10) over graphene", "graphene, sheet", "from the plane", "well"):
            self.assertIn(part, text)
        done = self.good("bind", "10,10", "--over", "silica", "--gap-nm", "20", "--in", "water")
        self.assertNotIn("contact", done.stdout)
        self.assertNotIn("pair potential", done.stdout)
        self.assertIn("note: non-retarded: beyond 10 nm", done.stderr)


class Ribbons(Case):
    def test_arrangements(self):
        """Face to face by default; the geometry of every arrangement by its axis distance."""
        cold = ("--temperature-K", "0")
        width = 6 * 0.142 * 3 ** 0.5 / 2  # between the edge rows of 7-AGNR
        for options, arrangement, distance in (
                ((), "stacked", 0.34), (("--coplanar",), "coplanar", 0.34 + width),
                (("--edge-on",), "edge_on", 0.34 + width / 2), (("--crossed", "60"), "crossed", 0.34)):
            row = self.row("7-AGNR", "7-AGNR", *cold, "--gap-nm", "0.34", *options)
            self.assertEqual((row["arrangement"], row["kind_1"]), (arrangement, "armchair ribbon"))
            self.assertAlmostEqual(row["axis_distance_nm"], distance, places=3, msg=arrangement)
            self.assertIsNone(row["electronic_share_eV_per_nm"])
        self.row("10,10", "7-AGNR", "--gap-nm", "0.5", *cold)
        self.row("7-AGNR", "--over", "graphene", *cold)

    def test_refusals(self):
        pair = ["bind", "7-AGNR", "7-AGNR"]
        self.refused([*pair, "--stacked", "--coplanar"], "--coplanar", "excludes --stacked")
        self.refused([*pair, "--offset-nm", "0.1", "--crossed", "90"], "--crossed", "excludes")
        self.refused(["bind", "8-AGNR", "8-AGNR"], "free carriers", "nearest: 0 K")
        self.refused(["bind", "0-AGNR", "7-AGNR"], "0-AGNR")
        self.refused(["bind", "1-ZGNR", "7-AGNR"], "1-ZGNR")
        self.refused(["bind", "7.5-AGNR", "7-AGNR"], "7.5-AGNR")
        self.refused(["bind", "200-AGNR", "7-AGNR"], "200-AGNR", "100")
        self.refused(["bind", "7-AGNR", "7-AGNR", "--in", "water"], "water")
        self.refused(["bind", "10,10", "wire:nope"], "unknown wire")


class Distances(Case):
    def rows(self, *arguments):
        lines = self.good("bind", *arguments, "--json").stdout.splitlines()
        return [json.loads(line) for line in lines]

    def test_gaps_and_fields(self):
        rows = self.rows("10,10", "10,10", "--distances", "0.4:40")
        gaps = [row["gap_nm"] for row in rows]
        self.assertEqual((gaps[0], gaps[-1], len(gaps)), (0.4, 40, 25))
        ratios = [b / a for a, b in zip(gaps, gaps[1:])]
        self.assertAlmostEqual(min(ratios), max(ratios), places=9)
        shares = [row["thermal_share"] for row in rows]
        self.assertEqual(shares, sorted(shares))
        for row in rows:
            self.assertEqual(row["status"], "ok")
        self.assertIn("non-retarded", rows[-1]["notes"][0])
        self.assertEqual(rows[7], self.row("10,10", "10,10", "--gap-nm", repr(gaps[7])))

    def test_exponent_is_the_local_slope(self):
        for arguments, field in ((("10,0", "10,0"), "dispersion_eV_per_nm"),
                                 (("8,4", "8,4", "--crossed", "90"), "dispersion_eV"),
                                 (("5,5", "5,5", "--crossed", "90", "--temperature-K", "0"),
                                  "dispersion_eV"),
                                 (("10,10", "--over", "silica"), "dispersion_eV_per_nm")):
            low, middle, high = (self.row(*arguments, "--gap-nm", gap)
                                 for gap in ("1.98", "2", "2.02"))
            distances = [row["axis_distance_nm"] for row in (low, middle, high)]
            difference = -((high[field] - low[field]) / (distances[2] - distances[0]) *
                           distances[1] / middle[field])
            self.assertAlmostEqual(middle["exponent"] / difference, 1, delta=2e-3, msg=arguments)

    def test_semiconducting_pairs_end_in_the_fifth_power(self):
        """Wires with a gap: D⁻⁵, Dobson, White & Rubio, Phys. Rev. Lett. 96, 073201 (2006)."""
        row = self.rows("10,0", "10,0", "--temperature-K", "0", "--distances", "50:500")[-1]
        self.assertAlmostEqual(row["exponent"], 5, delta=0.05)

    def test_text(self):
        done = self.good("bind", "10,10", "--over", "graphene", "--distances", "0.3:20")
        lines = done.stdout.splitlines()
        self.assertIn("(10,10) over graphene", lines[0])
        for title in ("gap", "axis distance", "dispersion", "contact", "total", "exponent"):
            self.assertIn(title, lines[2])
        self.assertIn("thermal", lines[2])
        self.assertEqual(len(lines), 2 + 2 + 25 + 1)
        self.assertIn("at a gap of 20 nm: non-retarded", done.stderr)
        text = self.good("bind", "10,10", "10,10", "--in", "water", "--distances", "1:5").stdout
        self.assertNotIn("contact", text)
        self.assertNotIn("total", text)


class BadInput(Case):
    PAIR = ("bind", "10,10", "8,4")

    def test_angles(self):
        self.refused([*self.PAIR, "--crossed", "0.5"], "--crossed", "1 to 90", "nearest: 1")
        self.refused([*self.PAIR, "--crossed", "91"], "--crossed", "1 to 90", "nearest: 90")
        for value in ("nan", "inf", "-30", "ninety", "30deg", ""):
            self.refused([*self.PAIR, "--crossed", value], "--crossed")
        self.refused(["bind", "10,10", "--crossed", "30"], "one object")
        self.refused(["bind", "5,5@10,10", "--crossed", "30"], "--crossed", "two objects")

    def test_flat_bodies(self):
        over = ["bind", "10,10", "--over"]
        self.refused([*over, "silca", "--gap-nm", "1"], "--over", "nearest: silica")
        self.refused([*over, "graphen"], "--over", "nearest: graphene")
        for word in ("13-AGNR", "10,10", "", "wire:gold"):
            self.refused([*over, word], "--over")
        self.refused(["bind", "10,10", "8,4", "--over", "graphene"], "--over", "one object")
        self.refused(["bind", "graphene", "--over", "graphene"], "graphene lies below another object")
        self.refused([*over, "vacuum", "--gap-nm", "1"], "no surface")

    def test_wells_where_no_contact_term_exists(self):
        self.refused(["bind", "10,10", "--over", "silica"], "--gap-nm",
                     "no contact term exists for (10,10) over silica")
        self.refused([*self.PAIR, "--in", "water"], "--gap-nm", "no contact term", "in water")
        self.refused([*self.PAIR, "--in", "water", "--crossed", "90"], "no contact term")

    def test_liquids(self):
        self.refused([*self.PAIR, "--gap-nm", "1", "--in", "watr"], "--in", "nearest: water")
        self.refused([*self.PAIR, "--gap-nm", "1", "--in", "silica"], "--in", "no liquid")
        self.refused(["bind", "5,5@10,10", "--in", "water"], "--in", "between its walls")
        self.refused(["bind", "10,10", "--over", "graphene", "--gap-nm", "1", "--in", "water"],
                     "--in", "graphene in water")
        self.refused(["bind", "10,10", "--over", "water", "--gap-nm", "1", "--in", "water"],
                     "no surface")
        self.refused(["rank", "--inner", "10,10", "--in", "water"], "--in", "walls in walls")
        beside = ["rank", "--arrangement", "parallel", "--index", "9:9"]
        self.refused([*beside, "--in", "water"], "--in", "no contact term", "--gap-nm")
        self.refused([*beside, "--in", "watr", "--gap-nm", "1"], "--in", "nearest: water")
        plan = self.path("plan.toml", 'arrangement = "parallel"\nindex = [9, 9]\n'
                                      'medium = "silica"\n')
        self.refused(["rank", plan], "plan.toml:3", "water", "^")

    def test_gaps(self):
        for value in ("0.1", "-1", "0", "nan", "20000"):
            self.refused([*self.PAIR, "--crossed", "90", "--gap-nm", value], "--gap-nm",
                         "0.2 to 10000")
            self.refused(["bind", "10,10", "--over", "graphene", "--gap-nm", value], "--gap-nm")
        for value in ("1", "2:1", "0.1:1", "1:nan", "1:", "1:2:3", "1:20000", "1:1"):
            self.refused([*self.PAIR, "--distances", value], "--distances", "LOW:HIGH")

    def test_options_that_exclude_each_other(self):
        self.refused([*self.PAIR, "--parallel", "--crossed", "30"], "--crossed",
                     "excludes --parallel")
        self.refused(["bind", "10,10", "--over", "graphene", "--parallel"], "--over",
                     "excludes --parallel")
        self.refused([*self.PAIR, "--gap-nm", "1", "--distances", "1:2"], "--distances",
                     "excludes --gap-nm")
        self.refused(["bind", "5,5@10,10", "--distances", "1:2"], "--distances", "two objects")


if __name__ == "__main__":
    harness.main()
