"""A headless browser driven over WebDriver (W3C Recommendation, 2018), standard library only."""

import base64
import contextlib
import json
import os
import re
import shutil
import subprocess
import tempfile
import urllib.error
import urllib.request

ELEMENT = "element-6066-11e4-a52e-4f735466cecf"
BROWSERS = ("chromium", "chromium-browser")


def find():
    """Paths of driver and browser, or None."""
    driver = shutil.which("chromedriver")
    browser = next((path for path in map(shutil.which, BROWSERS) if path), None)
    return (driver, browser) if driver and browser else None


class Browser:
    """One session; use it in a with statement."""

    def __init__(self, width=1280, height=900, dark=False):
        driver, browser = find()
        self._home = tempfile.TemporaryDirectory(prefix="gapwright-browser-")
        self._process = subprocess.Popen(
            [driver, "--port=0", "--allowed-ips=127.0.0.1"], stdout=subprocess.PIPE, text=True,
            stderr=subprocess.DEVNULL, env={**os.environ, "HOME": self._home.name})
        self._opener = urllib.request.build_opener(urllib.request.ProxyHandler({}))
        try:
            self._session = None
            self._root = f"http://127.0.0.1:{self._port()}"
            self._start(browser, width, height, dark)
        except BaseException:
            self.__exit__()
            raise

    def _start(self, browser, width, height, dark):
        arguments = ["--headless=new", "--no-sandbox", "--disable-gpu", "--disable-dev-shm-usage",
                     "--hide-scrollbars", "--force-device-scale-factor=1",
                     f"--user-data-dir={self._home.name}/profile",
                     f"--window-size={width},{height}"]
        if dark:
            arguments.append("--force-dark-mode")
        options = {"binary": browser, "args": arguments}
        session = self._ask("POST", "/session", {"capabilities": {"alwaysMatch": {
            "browserName": "chrome", "goog:chromeOptions": options,
            "goog:loggingPrefs": {"browser": "ALL"}}}})
        self._session = f"/session/{session['sessionId']}"

    def _port(self):
        for line in self._process.stdout:
            match = re.search(r"successfully on port (\d+)", line)
            if match:
                return int(match.group(1))
        raise RuntimeError("the driver of the browser did not start")

    def __enter__(self):
        return self

    def __exit__(self, *_):
        if self._session:
            with contextlib.suppress(OSError, RuntimeError):
                self._ask("DELETE", self._session)
        self._process.terminate()
        self._process.communicate()
        with contextlib.suppress(OSError):
            self._home.cleanup()

    def _ask(self, method, path, body=None):
        data = None if body is None else json.dumps(body).encode()
        request = urllib.request.Request(self._root + path, data, method=method,
                                         headers={"Content-Type": "application/json"})
        try:
            with self._opener.open(request, timeout=180) as answer:
                return json.load(answer)["value"]
        except urllib.error.HTTPError as error:
            raise RuntimeError(json.load(error)["value"]["message"]) from None

    def post(self, path, **body):
        return self._ask("POST", self._session + path, body)

    def get(self, path):
        return self._ask("GET", self._session + path)

    def open(self, file):
        self.post("/url", url=file.resolve().as_uri())

    def run(self, script, *arguments):
        """The value that a function body returns."""
        return self.post("/execute/sync", script=script, args=list(arguments))

    def wait(self, script, seconds=150):
        """Until the expression is true; returns its value."""
        self.post("/timeouts", script=seconds * 1000)
        return self.post("/execute/async", args=[], script=f"""
            const done = arguments[arguments.length - 1];
            const look = () => {{ const value = {script}; if (value) done(value);
                                  else setTimeout(look, 20); }};
            look();""")

    def find(self, selector):
        return self.post("/element", using="css selector", value=selector)[ELEMENT]

    def click(self, selector):
        self.post(f"/element/{self.find(selector)}/click")

    def type(self, selector, text):
        self.post(f"/element/{self.find(selector)}/value", text=text)

    def move_to(self, x, y):
        """The pointer to a place of the window."""
        self._pointer([{"type": "pointerMove", "x": int(x), "y": int(y), "duration": 50}])

    def click_at(self, x, y):
        self._pointer([{"type": "pointerMove", "x": int(x), "y": int(y), "duration": 50},
                       {"type": "pointerDown", "button": 0}, {"type": "pointerUp", "button": 0}])

    def _pointer(self, actions):
        self.post("/actions", actions=[{"type": "pointer", "id": "mouse",
                                        "parameters": {"pointerType": "mouse"},
                                        "actions": actions}])

    def size(self, width, height):
        self.post("/window/rect", width=width, height=height)

    def messages(self):
        """What the console says at the level of warnings or errors."""
        return [entry["message"] for entry in self.post("/se/log", type="browser")
                if entry["level"] in ("WARNING", "SEVERE")]

    def screenshot(self, file):
        file.write_bytes(base64.b64decode(self.get("/screenshot")))
