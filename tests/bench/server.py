#!/usr/bin/env python3
"""Times the language server beside a general-purpose one, `ruff server` from PyPI, on texts of equal length, in turns
in one run: start to the first findings, one edit to its findings, a burst of edits, requests on a text that stands
still, memory. Prints lowest and median; judges nothing.

    python3 tests/bench/server.py [--lines 100,1000,10000] [--edits 60] [--server target/release/layshaft]

Linux (memory is read from /proc). ruff is put into a virtual environment below `target/bench`; where that cannot be
done its column is left out, with a line that says so.
"""
import argparse
import json
import pathlib
import queue
import re
import statistics
import subprocess
import sys
import threading
import time

HERE = pathlib.Path(__file__).resolve().parent
TOP = HERE.parent.parent
BUILD = TOP / "target" / "bench"
RUFF = "0.17.6"
# No answer for so long: the server hangs, and the run ends.
PATIENCE = 60.0
# A person's pause before an edit or a question: the server is idle when it comes.
PAUSE = 0.02

PYTHON = '''\
"""Fan @ of the drying hall."""
from dataclasses import dataclass

FLOW_TORQUE_@ = 12.0  # works test
CASE_SPEED_@ = 960.0  # order 0417, sheet @


@dataclass
class Motor@:
    stall_torque: float = 42.5
    no_load_speed: float = 2980.0
    inertia: float = 0.0123  # rotor alone


def reached_@(motor: Motor@, reduction: float = 2.75, efficiency: float = 0.955) -> float:
    """Speed at which the motor gives what the fan asks for."""
    stall = efficiency * reduction * motor.stall_torque
    slope = stall * reduction / (motor.no_load_speed / 60)
    load = FLOW_TORQUE_@ / (CASE_SPEED_@ / 60) ** 2
    return 60 * 2 * stall / (slope + (slope * slope + 4 * load * stall) ** 0.5)


assert 800 <= reached_@(Motor@()) <= 1040, "A@-1 speed"
# the room is counted without the stair

'''


def drives():
    """The drive that the other benchmarks repeat, from their own source."""
    source = (HERE / "texts.rs").read_text()
    text = re.search(r'const DRIVE: &str = "\\\n(.*?)";\n', source, re.S).group(1)
    return text.replace('\\"', '"')


def repeated(pattern, lines):
    """As many whole drives as give at least so many lines."""
    text, number = "", 1
    while text.count("\n") < lines:
        text += pattern.replace("@", str(number))
        number += 1
    return text


class Server:
    """One process of a server and what it said."""

    def __init__(self, command, folder):
        self.started = time.perf_counter()
        self.process = subprocess.Popen(
            command, cwd=folder, stdin=subprocess.PIPE, stdout=subprocess.PIPE, stderr=subprocess.DEVNULL
        )
        self.number = 0
        # Read all the time, so that neither side ever waits with a full pipe for the other.
        self.messages = queue.SimpleQueue()
        threading.Thread(target=self.read, daemon=True).start()

    def read(self):
        """Takes messages from the pipe, with the time of their arrival; none where it is closed."""
        while True:
            length = None
            while (line := self.process.stdout.readline()).strip():
                if line.lower().startswith(b"content-length:"):
                    length = int(line.split(b":")[1])
            if length is None:
                self.messages.put(None)
                return
            self.messages.put((time.perf_counter(), self.process.stdout.read(length)))

    def send(self, message):
        body = json.dumps({"jsonrpc": "2.0", **message}).encode()
        self.process.stdin.write(b"Content-Length: %d\r\n\r\n" % len(body) + body)
        self.process.stdin.flush()

    def notify(self, method, params):
        self.send({"method": method, "params": params})

    def until(self, wanted):
        """Waits for a message that is wanted; answers what the server asks in between. Time of arrival, message."""
        while True:
            try:
                got = self.messages.get(timeout=PATIENCE)
            except queue.Empty:
                sys.exit(f"no answer for {PATIENCE:.0f} s: {self.process.args}")
            if got is None:
                sys.exit(f"the server ended: {self.process.args}")
            at, body = got
            message = json.loads(body)
            if wanted(message):
                return at, message
            if "id" in message and "method" in message:
                nothing = [None] if message["method"] == "workspace/configuration" else None
                self.send({"id": message["id"], "result": nothing})

    def ask(self, method, params):
        """Seconds to the answer of a request, and the answer."""
        self.number += 1
        number = self.number
        start = time.perf_counter()
        self.send({"id": number, "method": method, "params": params})
        at, message = self.until(lambda m: m.get("id") == number and "method" not in m)
        if "error" in message:
            sys.exit(f"{self.process.args}: {method}: {message['error']}")
        return at - start, message["result"]

    def memory(self):
        """Resident memory, MB."""
        status = pathlib.Path(f"/proc/{self.process.pid}/status").read_text()
        return int(re.search(r"VmRSS:\s*(\d+)", status).group(1)) / 1024

    def end(self):
        self.ask("shutdown", None)
        self.notify("exit", None)
        self.process.wait(timeout=PATIENCE)


class Session:
    """A server with one text open."""

    def __init__(self, side, text):
        self.side, self.text, self.version = side, text, 1
        folder = BUILD / "workspace"
        folder.mkdir(parents=True, exist_ok=True)
        self.uri = (folder / side["file"]).as_uri()
        self.server = Server(side["command"], folder)
        capabilities = {
            "general": {"positionEncodings": ["utf-16"]},
            "textDocument": {"publishDiagnostics": {"versionSupport": True}},
        }
        roots = [{"uri": folder.as_uri(), "name": "workspace"}]
        start = {"processId": None, "rootUri": folder.as_uri(), "workspaceFolders": roots, "capabilities": capabilities}
        self.answered = self.server.ask("initialize", start)
        self.ready = time.perf_counter() - self.server.started
        self.can = self.answered[1]["capabilities"]
        self.server.notify("initialized", {})
        opened = time.perf_counter()
        document = {"uri": self.uri, "languageId": side["language"], "version": 1, "text": text}
        self.server.notify("textDocument/didOpen", {"textDocument": document})
        at, _ = self.findings()
        self.opened = at - opened
        self.started = at - self.server.started

    def findings(self):
        """Waits for the findings of the newest text."""

        def newest(message):
            params = message.get("params", {})
            if message.get("method") != "textDocument/publishDiagnostics" or params["uri"] != self.uri:
                return False
            return params.get("version", self.version) == self.version

        return self.server.until(newest)

    def place(self, needle, nth=None):
        """Line and column of the middle one of all places of some words; the text is plain before them on its line."""
        all_places = [match.start() for match in re.finditer(re.escape(needle), self.text)]
        at = all_places[len(all_places) // 2 if nth is None else nth]
        line = self.text.count("\n", 0, at)
        before = self.text[self.text.rfind("\n", 0, at) + 1 : at]
        return {"line": line, "character": len(before.encode("utf-16-le")) // 2}

    def edit(self, digit):
        """Types the last digit of a number in the middle of the text anew."""
        self.version += 1
        start = self.place(self.side["number"])
        start["character"] += len(self.side["number"])
        end = {"line": start["line"], "character": start["character"] + 1}
        document = {"uri": self.uri, "version": self.version}
        change = {"range": {"start": start, "end": end}, "text": str(digit)}
        begin = time.perf_counter()
        self.server.notify("textDocument/didChange", {"textDocument": document, "contentChanges": [change]})
        return begin

    def burst(self, edits):
        """Seconds from the first of many edits to the findings of the last, and how often findings were told."""
        start = self.place(self.side["number"])
        start["character"] += len(self.side["number"])
        end = {"line": start["line"], "character": start["character"] + 1}
        begin = time.perf_counter()
        for number in range(edits):
            self.version += 1
            change = {"range": {"start": start, "end": end}, "text": str(number % 10)}
            document = {"uri": self.uri, "version": self.version}
            self.server.notify("textDocument/didChange", {"textDocument": document, "contentChanges": [change]})
        told = 0

        def newest(message):
            nonlocal told
            if message.get("method") != "textDocument/publishDiagnostics":
                return False
            told += 1
            return message["params"].get("version", self.version) == self.version

        at, _ = self.server.until(newest)
        return at - begin, told


def requests(session):
    """The questions both sides are asked: name, capability, method, parameters."""
    document = {"textDocument": {"uri": session.uri}}
    hover = session.place(session.side["hover"])
    hover["character"] += 1
    line = hover["line"]
    view = {"start": {"line": max(line - 30, 0), "character": 0}, "end": {"line": line + 30, "character": 0}}
    format_as = {"tabSize": 4, "insertSpaces": True}
    return [
        ("hover", "hoverProvider", "textDocument/hover", {**document, "position": hover}),
        ("hints of 60 lines", "inlayHintProvider", "textDocument/inlayHint", {**document, "range": view}),
        ("completion", "completionProvider", "textDocument/completion", {**document, "position": hover}),
        ("semantic tokens", "semanticTokensProvider", "textDocument/semanticTokens/full", document),
        ("formatting", "documentFormattingProvider", "textDocument/formatting", {**document, "options": format_as}),
    ]


def measure(side, lines, given, rows):
    """One side on one length; adds seconds to `rows` by name."""
    text = repeated(side["pattern"], lines)

    def add(name, value):
        rows.setdefault(name, {}).setdefault(side["name"], []).append(value)

    for _ in range(given.starts):
        session = Session(side, text)
        add("start to `initialize` answered", session.ready)
        add("start to first findings", session.started)
        add("open to first findings", session.opened)
        time.sleep(0.2)
        add("memory after open, MB", session.server.memory())
        session.server.end()
    session = Session(side, text)
    for number in range(given.edits):
        time.sleep(PAUSE)
        begin = session.edit(number % 10)
        at, _ = session.findings()
        add("one edit to its findings", at - begin)
    for name, capability, method, params in requests(session):
        if not session.can.get(capability):
            continue
        for _ in range(given.requests):
            time.sleep(PAUSE)
            add(name, session.server.ask(method, params)[0])
    spent, told = session.burst(given.burst)
    add(f"{given.burst} edits at once to the last findings", spent)
    add("findings told in the burst, times", told)
    add("memory at the end, MB", session.server.memory())
    session.server.end()


def show(lines, rows, sides):
    names = [side["name"] for side in sides]
    print()
    print(f"{f'{lines} lines':45}" + "".join(f"{name:>24}" for name in names))
    for name, by_side in rows.items():
        cells = []
        for side in names:
            values = by_side.get(side)
            plain = name.endswith((", MB", ", times"))
            shown = [] if values is None else [min(values), statistics.median(values)]
            shown = shown if plain else [1e3 * value for value in shown]
            unit = "" if plain else " ms"
            cells.append(f"{shown[0]:9.2f} ({shown[1]:8.2f}){unit:3}" if shown else "-")
        print(f"{name:45}" + "".join(f"{cell:>24}" for cell in cells))


def yardstick():
    """The path of ruff; none where it cannot be had."""
    program = BUILD / "venv" / "bin" / "ruff"
    if not program.exists():
        try:
            subprocess.run([sys.executable, "-m", "venv", BUILD / "venv"], check=True, capture_output=True)
            pip = [BUILD / "venv" / "bin" / "python", "-m", "pip", "install", "--quiet", f"ruff=={RUFF}"]
            subprocess.run(pip, check=True, capture_output=True)
        except (OSError, subprocess.CalledProcessError):
            return None
    return program


def main():
    arguments = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter)
    arguments.add_argument("--lines", default="100,1000,10000", help="lengths of the texts")
    arguments.add_argument("--starts", type=int, default=7, help="processes started for each length")
    arguments.add_argument("--edits", type=int, default=60, help="edits timed, one at a time")
    arguments.add_argument("--requests", type=int, default=25, help="requests timed of each sort")
    arguments.add_argument("--burst", type=int, default=1000, help="edits sent without waiting")
    arguments.add_argument("--server", type=pathlib.Path, help="the command; built in release form where none is named")
    given = arguments.parse_args()
    if given.server is None:
        subprocess.run(["cargo", "build", "--release", "--quiet", "-p", "layshaft"], cwd=TOP, check=True)
        given.server = TOP / "target" / "release" / "layshaft"
    BUILD.mkdir(parents=True, exist_ok=True)
    sides = [{
        "name": "layshaft", "command": [given.server.resolve(), "lsp"], "file": "bench.shaft", "language": "layshaft",
        "pattern": drives(), "number": "no_load_speed = 298", "hover": "rated_torque",
    }]
    ruff = yardstick()
    if ruff is None:
        print(f"ruff {RUFF} cannot be installed here, so its column is left out")
    else:
        sides.append({
            "name": f"ruff {RUFF}", "command": [ruff, "server"], "file": "bench.py", "language": "python",
            "pattern": PYTHON, "number": "no_load_speed: float = 298", "hover": "# rotor alone",
        })
    for lines in map(int, given.lines.split(",")):
        rows = {}
        for side in sides:
            measure(side, lines, given, rows)
        show(lines, rows, sides)
    print("\nlowest (median); on a busy machine only what stands side by side can be compared")


main()
