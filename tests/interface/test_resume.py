"""A sweep that is killed, stopped or cut in parts ends with the rows of an undisturbed one."""

import random
import signal
import time

import harness
from harness import BESIDE, SLOW, SWEEP

KILLS = 6
FIXED_SEED = 20


class Killed(harness.Case):
    def test_kill_at_any_moment(self):
        wanted = self.undisturbed(*SWEEP)
        store = self.path("rows.db")
        moments = random.Random(FIXED_SEED)
        for _ in range(KILLS):
            process = harness.start("rank", *SWEEP, "--threads", "1", "--store", store)
            time.sleep(moments.uniform(0.02, 0.8))
            process.kill()
            process.communicate()
        self.good("rank", *SWEEP, "--store", store)
        self.same_rows(self.rows(store), wanted)
        self.assertEqual(self.leftovers(), [])

    def test_kill_side_by_side(self):
        wanted = self.undisturbed(*BESIDE)
        store = self.path("rows.db")
        moments = random.Random(FIXED_SEED)
        for _ in range(3):
            process = harness.start("rank", *BESIDE, "--threads", "1", "--store", store)
            time.sleep(moments.uniform(0.2, 1.0))
            process.kill()
            process.communicate()
        self.good("rank", *BESIDE, "--store", store)
        self.same_rows(self.rows(store), wanted)
        self.assertEqual(self.leftovers(), [])

    def test_kill_loses_only_rows_in_flight(self):
        """What a batch wrote is there after the kill and is not computed again."""
        store, log = self.path("rows.db"), self.path("rows.db-wal")
        process = harness.start("rank", *SWEEP, "--threads", "1", "--store", store)
        written = harness.wait_until(lambda: log.exists() and log.stat().st_size > 100_000,
                                     process)
        process.kill()
        process.communicate()
        self.assertTrue(written, "the sweep is too short for this test")
        done = self.good("rank", *SWEEP, "--store", store)
        self.assertRegex(done.stderr, r"[1-9]\d* of \d+ rows are in the store already")


class Stopped(harness.Case):
    def stop(self, number):
        store, log = self.path("rows.db"), self.path("rows.db-wal")
        csv = self.path("rows.csv")
        command = ["rank", *SWEEP, "--threads", "1", "--store", store, "--csv", csv]
        process = harness.start(*command)
        self.assertTrue(harness.wait_until(
            lambda: log.exists() and log.stat().st_size > 100_000, process))
        process.send_signal(number)
        out, err = process.communicate(timeout=60)
        self.assertEqual(process.returncode, 4, err)
        self.assertRegex(err, r"stopped; \d+ of \d+ rows are done and kept in \S+rows\.db: run the "
                              "same command again to go on")
        self.assertEqual(out, "", "an unfinished ranking would mislead")
        self.assertFalse(csv.exists(), "an unfinished file would mislead")
        before = self.rows(store)
        self.good(*command)
        self.assertTrue(csv.exists())
        after = self.rows(store)
        self.assertTrue(set(before) < set(after))
        self.same_rows(after, self.undisturbed(*SWEEP))

    def test_interrupt(self):
        self.stop(signal.SIGINT)

    def test_terminate(self):
        self.stop(signal.SIGTERM)

    def test_second_signal_ends_at_once(self):
        store = self.path("rows.db")
        process = harness.start("rank", *SLOW, "--store", store)
        self.assertTrue(harness.wait_until(self.path("rows.db-wal").exists, process))
        time.sleep(0.1)
        process.send_signal(signal.SIGINT)
        time.sleep(0.1)
        process.send_signal(signal.SIGINT)
        process.communicate(timeout=60)
        self.assertIn(process.returncode, (-signal.SIGINT, 4))  # 4 when a row just ended
        self.rows(store)

    def test_time_limit(self):
        store = self.path("rows.db")
        command = ["rank", *SWEEP, "--threads", "1", "--store", store]
        limited = harness.run(*command, "--time-limit", "0.3")
        self.assertEqual(limited.returncode, 4, limited.stderr)
        self.assertIn("run the same command again to go on", limited.stderr)
        self.good(*command)
        self.same_rows(self.rows(store), self.undisturbed(*SWEEP))

    def test_without_store_says_that_rows_are_lost(self):
        limited = harness.run("rank", *SWEEP, "--threads", "1", "--time-limit", "0.05")
        self.assertEqual(limited.returncode, 4, limited.stderr)
        self.assertIn("nothing is kept", limited.stderr)
        self.assertIn("lost", limited.stderr)


class Repeated(harness.Case):
    def test_second_run_computes_nothing(self):
        store = self.path("rows.db")
        first = self.good("rank", *SWEEP, "--store", store, "--csv", self.path("a.csv"))
        rows = self.rows(store)
        second = self.good("rank", *SWEEP, "--store", store, "--csv", self.path("b.csv"))
        self.assertIn(f"{len(rows)} of {len(rows)} rows are in the store already", second.stderr)
        self.assertEqual(first.stdout, second.stdout)
        self.assertEqual(self.path("a.csv").read_bytes(), self.path("b.csv").read_bytes())
        self.same_rows(self.rows(store), rows)

    def test_parts_make_the_whole(self):
        store = self.path("rows.db")
        for part in ("1/3", "3/3", "2/3"):
            self.good("rank", *SWEEP, "--part", part, "--store", store)
        done = self.good("rank", *SWEEP, "--store", store)
        count = len(self.rows(store))
        self.assertIn(f"{count} of {count} rows are in the store already", done.stderr)
        self.same_rows(self.rows(store), self.undisturbed(*SWEEP))

    def test_same_bits_on_any_number_of_threads(self):
        stores = []
        for threads in (1, 2, 5):
            store = self.path(f"{threads}.db")
            self.good("rank", *SWEEP, "--threads", threads, "--store", store)
            stores.append(self.rows(store))
        self.same_rows(stores[0], stores[1])
        self.same_rows(stores[0], stores[2])

    def test_same_bits_side_by_side(self):
        """Threads, parts, a narrower plan and a plan around one tube give the same rows."""
        one, two = self.path("one.db"), self.path("two.db")
        self.good("rank", *BESIDE, "--threads", "1", "--store", one)
        for part in ("2/2", "1/2"):
            self.good("rank", *BESIDE, "--threads", "2", "--part", part, "--store", two)
        self.same_rows(self.rows(one), self.rows(two))
        count = len(self.rows(one))
        narrow = ["--arrangement", "parallel", "--diameter-nm", "0.7:0.76"]
        done = self.good("rank", *narrow, "--store", one)
        self.assertIn("rows are in the store already", done.stderr)
        self.assertRegex(done.stderr, r"the store holds \d+ rows of other plans or parts")
        alone = self.path("alone.db")
        self.good("rank", *narrow, "--with", "8,2", "--store", alone)
        self.assertEqual(len(set(self.rows(alone)) - set(self.rows(one))), 0)
        self.assertEqual(len(self.rows(one)), count)

    def test_neighbours_do_not_matter(self):
        """A row is the same whether it is computed alone, in a small sweep or in a large one."""
        large, small = self.path("large.db"), self.path("small.db")
        self.good("rank", *SWEEP, "--store", large)
        self.good("rank", "--inner", "7,5", "--gap-nm", "0.33:0.38", "--store", small)
        few, many = set(self.rows(small)), set(self.rows(large))
        self.assertTrue(few and len(few) < len(many))
        self.assertEqual(len(few - many), 0)


if __name__ == "__main__":
    harness.main()
