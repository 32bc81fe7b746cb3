"""Reads Kate's list of diagnostics as a screen reader does, and steps through it.

Writes $INKJOULE_DUMP/now.json; then deletes the line of the last finding, saves,
and writes after.json with the text in edited.joule. Kate's list names source, rule
and message; the place is read from the status bar after a click on an entry.
"""
import json
import os
import re
import shutil
import subprocess
import sys
import time

import pyatspi

DUMP = os.environ["INKJOULE_DUMP"]
NOTE = os.environ["INKJOULE_NOTE"]


def review():
    with open(os.environ["INKJOULE_REVIEW"], encoding="utf-8") as file:
        return json.load(file)["notes"][0]


def wait(seconds, condition):
    """Polls until condition() is true, and gives what it returned."""
    until = time.time() + seconds
    while True:
        try:
            value = condition()
        except Exception:  # what it looks at may vanish meanwhile
            value = None
        if value:
            return value
        if time.time() > until:
            return None
        time.sleep(0.2)


def walk(node):
    if node is None:
        return
    yield node
    for at in range(min(node.childCount, 500)):
        yield from walk(node.getChildAtIndex(at))


def kate():
    return next((a for a in pyatspi.Registry.getDesktop(0) if a.name == "kate"), None)


def find(role, name):
    return next((n for n in walk(kate()) if n.getRoleName() == role and re.fullmatch(name, n.name)), None)


def xdo(*words):
    subprocess.run(["xdotool", *map(str, words)], check=True)


def middle(node):
    box = node.queryComponent().getExtents(pyatspi.DESKTOP_COORDS)
    return box.x + box.width // 2, box.y + box.height // 2


def diagnostics_tree():
    tabs = find("page tab list", "Diagnostics")
    return next((n for n in walk(tabs.parent) if n.getRoleName() == "tree"), None)


def entries(tree):
    """The rows of the list, the file's own among them."""
    return [n for n in walk(tree) if n.getRoleName() not in ("tree", "table column header") and n.name]


FINDING = re.compile(r"\[inkjoule\] \((?P<rule>[a-z-]+)\) (?P<message>.*)", re.S)


def findings(tree):
    return [n.name for n in entries(tree) if FINDING.match(n.name)]


def cursor():
    place = find("push button", r"\d+:\d+")
    return tuple(map(int, place.name.split(":"))) if place else None


def selected(tree):
    return next((n.name for n in entries(tree) if n.getState().contains(pyatspi.STATE_SELECTED)), None)


def click(x, y):
    xdo("mousemove", x, y, "click", 1)
    time.sleep(0.6)  # or two clicks are a double click, which opens the fixes


def row_height(tree, x, top):
    """The first row is the file's; the next begins where a click selects another."""
    click(x, top + 8)
    first = selected(tree)
    for height in range(10, 60, 2):
        click(x, top + height + 2)
        if selected(tree) != first:
            return height
    raise RuntimeError("a click in the list of diagnostics selects nothing")


def step_through(tree):
    """Clicks down the list and gives (entry, line, column), one for each finding."""
    box = tree.queryComponent().getExtents(pyatspi.DESKTOP_COORDS)
    x = box.x + 140
    height = row_height(tree, x, box.y)
    steps = []
    for row in range(1, len(entries(tree))):
        click(x, int(box.y + (row + 0.5) * height))
        if FINDING.match(selected(tree)):  # else it is what to write instead, below its finding
            steps.append((selected(tree), *cursor()))
    return steps


def delete_line(line):
    """As a user does: into the text, to the line, from its beginning to the next one's."""
    click(*middle(find("text", os.path.basename(NOTE))))
    xdo("key", "ctrl+g")
    time.sleep(0.3)
    xdo("type", line)
    xdo("key", "Return")
    time.sleep(0.3)
    xdo("key", "Home", "Home", "shift+Down", "Delete")


def dump(name, steps):
    out = []
    for entry, line, column in steps:
        parts = FINDING.match(entry)
        out.append({"line": line, "column": column, "rule": parts["rule"], "message": parts["message"]})
    with open(os.path.join(DUMP, name), "w", encoding="utf-8") as file:
        json.dump({"columns": "utf-32", "diagnostics": out}, file, ensure_ascii=False, indent=1)


def shot(name):
    folder = os.environ["INKJOULE_ARTEFACTS"]
    subprocess.run(["import", "-window", "root", os.path.join(folder, name)], check=False)


def main():
    expected = review()["findings"]
    window = wait(20, lambda: subprocess.run(
        ["xdotool", "search", "--onlyvisible", "--class", "kate"], capture_output=True, text=True).stdout.split())
    xdo("windowmove", window[-1], 0, 0, "windowsize", window[-1], 1270, 770)
    wait(20, kate)
    button = wait(20, lambda: find("check box", "&?LSP"))
    time.sleep(1)
    x, y = middle(button)
    xdo("mousemove", x, y, "click", 1)
    tree = wait(10, diagnostics_tree)
    wait(20, lambda: len(findings(tree)) >= len(expected))
    time.sleep(1)
    steps = step_through(tree)
    dump("now.json", steps)
    shot("kate.png")

    delete_line(expected[-1]["line"])
    wait(15, lambda: len(findings(tree)) != len(steps))
    xdo("key", "ctrl+s")
    time.sleep(1)
    dump("after.json", step_through(tree))
    shutil.copy(NOTE, os.path.join(DUMP, "edited.joule"))


try:
    main()
except Exception as error:
    import traceback
    with open(os.path.join(DUMP, "error.txt"), "w", encoding="utf-8") as file:
        traceback.print_exc(file=file)
    shot("kate-error.png")
    sys.exit(1)
