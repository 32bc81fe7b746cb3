#!/usr/bin/env bash
# Runs inside a D-Bus session and an X display of its own: Kate with the note, and
# the script that reads Kate's lists through the accessibility bus. (Kate comes
# first: it starts that bus itself, in the order that Qt wants.)
set -uo pipefail
cd "$(dirname "$0")"
openbox >/dev/null 2>&1 &
QT_ACCESSIBILITY=1 QT_LINUX_ACCESSIBILITY_ALWAYS_ON=1 kate --startanon --block "$INKJOULE_NOTE" >"$INKJOULE_DUMP/kate.log" 2>&1 &
kate=$!
sleep 2
/usr/bin/python3 look.py
kill "$kate"
