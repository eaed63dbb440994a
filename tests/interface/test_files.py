"""Files are written whole or not at all; full disks and vanished readers are noticed."""

import csv
import os
import subprocess
import unittest

import harness
from harness import SWEEP

ROWS = ["--inner", "10,10", "--gap-nm", "0.33:0.36"]


class Csv(harness.Case):
    def test_replaced_whole(self):
        file = self.path("rows.csv", "what was here before\n")
        self.good("rank", *ROWS, "--csv", file)
        lines = [line for line in file.read_text().splitlines() if not line.startswith("#")]
        rows = list(csv.DictReader(lines))
        self.assertGreater(len(rows), 10)
        self.assertEqual([row["rank"] for row in rows], [str(k + 1) for k in range(len(rows))])
        self.assertEqual(self.leftovers(), [])

    def test_full_disk_keeps_what_was_there(self):
        file = self.path("rows.csv", "what was here before\n")
        self.refused(["rank", *ROWS, "--csv", file], "rows.csv", "cannot be written",
                     output="rank ", preexec_fn=harness.file_limit(2000))
        self.assertEqual(file.read_text(), "what was here before\n")
        self.assertEqual(self.leftovers(), [])

    def test_through_a_link(self):
        target, link = self.path("target.csv", "old\n"), self.path("link.csv")
        link.symlink_to(target)
        self.good("rank", *ROWS, "--csv", link)
        self.assertTrue(link.is_symlink())
        self.assertTrue(target.read_text().startswith("# gapwright"))

    def test_permissions_are_those_of_any_new_file(self):
        file = self.path("rows.csv")
        self.good("rank", *ROWS, "--csv", file, preexec_fn=lambda: os.umask(0o027))
        self.assertEqual(file.stat().st_mode & 0o777, 0o640)

    def test_standard_output(self):
        done = self.good("rank", *ROWS, "--csv", "-")
        self.assertTrue(done.stdout.startswith("# gapwright"))

    def test_device(self):
        self.refused(["rank", *ROWS, "--csv", "/dev/full"], "/dev/full", "cannot be written",
                     output="rank ")
        self.good("rank", *ROWS, "--csv", "/dev/null")


class StandardOutput(harness.Case):
    COMMANDS = (["--version"], ["--help"], ["describe", "10,10"], ["bind", "5,5@10,10"],
                ["rank", *ROWS], ["rank", *ROWS, "--json"], ["rank", *ROWS, "--count"], ["check"])

    def test_full(self):
        for command in self.COMMANDS:
            with open("/dev/full", "w") as full:
                done = subprocess.run([harness.PROGRAM, *command], stdout=full,
                                      stderr=subprocess.PIPE, text=True)
            self.assertEqual(done.returncode, 2, command)
            self.assertIn("standard output: cannot be written: No space left", done.stderr)

    def test_closed(self):
        done = subprocess.run([harness.PROGRAM, "describe", "10,10"], stderr=subprocess.PIPE,
                              text=True, preexec_fn=lambda: os.close(1))
        self.assertEqual(done.returncode, 2)
        self.assertIn("standard output", done.stderr)

    def test_reader_gone(self):
        """As in `gapwright rank … | head`: quietly good."""
        for command in self.COMMANDS[2:]:
            read, write = os.pipe()
            os.close(read)
            done = subprocess.run([harness.PROGRAM, *command], stdout=write,
                                  stderr=subprocess.PIPE, text=True)
            os.close(write)
            self.assertEqual(done.returncode, 0, (command, done.stderr))
            self.assertNotIn("cannot be written", done.stderr)


class FullDisk(harness.Case):
    def goes_on_after(self, done, store):
        self.assertEqual(done.returncode, 2, done.stderr)
        self.assertRegex(done.stderr, "no space left on the disk|the disk refuses")
        self.assertIn(str(store), done.stderr)
        self.assertEqual(done.stdout, "")
        self.good("rank", *SWEEP, "--store", store)
        self.same_rows(self.rows(store), self.undisturbed(*SWEEP))

    def test_size_limit(self):
        for size in (0, 3000, 30_000, 200_000):
            store = self.path(f"{size}.db")
            done = harness.run("rank", *SWEEP, "--threads", "1", "--store", store,
                               preexec_fn=harness.file_limit(size))
            self.goes_on_after(done, store)

    @unittest.skipUnless(os.geteuid() == 0, "mounting needs root")
    def test_full_file_system(self):
        place = self.folder / "small"
        place.mkdir()
        mounted = subprocess.run(["mount", "-t", "tmpfs", "-o", "size=200k", "gapwright-test",
                                  place], capture_output=True)
        if mounted.returncode != 0:
            self.skipTest("mounting is not allowed here")
        self.addCleanup(subprocess.run, ["umount", place])
        store = place / "rows.db"
        done = harness.run("rank", *SWEEP, "--threads", "1", "--store", store)
        subprocess.run(["mount", "-o", "remount,size=20m", place], check=True)
        self.goes_on_after(done, store)


if __name__ == "__main__":
    harness.main()
