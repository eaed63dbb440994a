"""Running the program as a user does. Every test file is called with the program's path."""

import contextlib
import os
import pathlib
import resource
import shutil
import signal
import sqlite3
import subprocess
import sys
import tempfile
import time
import unittest

PROGRAM = None
EXAMPLE = pathlib.Path(__file__).resolve().parents[2] / "examples" / "double-wall.toml"
BESIDE_EXAMPLE = EXAMPLE.with_name("side-by-side.toml")

# A sweep of a few seconds on one thread, in several batches.
SWEEP = ["--inner-diameter-nm", "0.7:1.1", "--gap-nm", "0.33:0.38"]
# Tubes side by side, as long.
BESIDE = ["--arrangement", "parallel", "--diameter-nm", "0.7:0.85"]
# A sweep whose every row takes long.
SLOW = ["--inner", "20,20", "--tolerance", "1e-7", "--threads", "1"]
NOBODY = 65534


def main():
    """Entry of a test file: PROGRAM first, then what unittest takes."""
    global PROGRAM
    PROGRAM = str(pathlib.Path(sys.argv.pop(1)).resolve())
    unittest.main(module=sys.modules["__main__"])


def run(*arguments, **options):
    """One finished run; text output, no terminal."""
    options.setdefault("timeout", 300)
    return subprocess.run([PROGRAM, *map(str, arguments)], capture_output=True, text=True,
                          stdin=subprocess.DEVNULL, **options)


def start(*arguments, **options):
    """A run that goes on beside the test."""
    return subprocess.Popen([PROGRAM, *map(str, arguments)], stdout=subprocess.PIPE,
                            stderr=subprocess.PIPE, text=True, stdin=subprocess.DEVNULL, **options)


def wait_until(condition, process, seconds=120):
    """True once the condition holds, False when the process ended before."""
    end = time.monotonic() + seconds
    while time.monotonic() < end:
        if condition():
            return True
        if process.poll() is not None:
            return False
        time.sleep(0.002)
    raise AssertionError("waited in vain")


def file_limit(size):
    """For preexec_fn: no file may grow beyond this, like a full disk."""
    def limit():
        resource.setrlimit(resource.RLIMIT_FSIZE, (size, size))
    return limit


def become_nobody():
    """For preexec_fn: a user who may write nowhere."""
    os.setgroups([])
    os.setgid(NOBODY)
    os.setuid(NOBODY)


class Case(unittest.TestCase):
    """A test with a folder of its own."""

    def setUp(self):
        self.folder = pathlib.Path(tempfile.mkdtemp(prefix="gapwright-test-"))
        self.addCleanup(shutil.rmtree, self.folder, ignore_errors=True)

    def path(self, name, text=None):
        file = self.folder / name
        if text is not None:
            file.write_text(text)
        return file

    def good(self, *arguments, **options):
        done = run(*arguments, **options)
        self.assertEqual(done.returncode, 0, done.stderr)
        return done

    def refused(self, arguments, *fragments, code=2, output="", **options):
        """Ends with the code, says every fragment on standard error and nothing on output; where
        results come before what fails, the output begins as given."""
        done = run(*arguments, **options)
        self.assertEqual(done.returncode, code, (arguments, done.stdout, done.stderr))
        for fragment in fragments:
            self.assertIn(fragment, done.stderr, arguments)
        if output:
            self.assertTrue(done.stdout.startswith(output), arguments)
        else:
            self.assertEqual(done.stdout, "", arguments)
        return done

    def rows(self, store):
        """All rows of a store: every field, exactly; refuses a damaged store."""
        with contextlib.closing(sqlite3.connect(store)) as database:
            self.assertEqual(database.execute("PRAGMA integrity_check").fetchone(), ("ok",))
            return database.execute("SELECT * FROM pairs ORDER BY key").fetchall()

    def same_rows(self, found, wanted):
        """Without printing them all."""
        self.assertEqual(len(found), len(wanted))
        for one, other in zip(found, wanted):
            self.assertEqual(one, other)

    def undisturbed(self, *arguments):
        """Rows of the same sweep run in one go."""
        store = self.path("undisturbed.db")
        self.good("rank", *arguments, "--store", store)
        return self.rows(store)

    def leftovers(self):
        """Files nobody asked for."""
        return [file.name for file in self.folder.iterdir()
                if file.name.startswith(".") or file.name.endswith(("-wal", "-shm", "-journal"))]
