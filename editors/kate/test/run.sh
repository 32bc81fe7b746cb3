#!/usr/bin/env bash
# Opens a faulty note in Kate on a virtual display: its list of diagnostics must be
# what review says, entry for entry and place for place.
set -euo pipefail
cd "$(dirname "$0")"
. ../../common/lib.sh
prepare
export HOME=$work/home LANG=C.UTF-8 XDG_RUNTIME_DIR=$work/run
unset XDG_CONFIG_HOME XDG_DATA_HOME XDG_CACHE_HOME
export INKJOULE_ARTEFACTS
mkdir -p "$INKJOULE_ARTEFACTS" "$HOME/.local/share/org.kde.syntax-highlighting/syntax" "$HOME/.config/kate/lspclient"
mkdir -m 700 "$XDG_RUNTIME_DIR"

# As ../README.md says, with the program's path put in.
cp ../joule.xml "$HOME/.local/share/org.kde.syntax-highlighting/syntax/"
sed "s#\"inkjoule\"#\"$INKJOULE\"#" ../settings.json >"$HOME/.config/kate/lspclient/settings.json"
printf '[Kate Plugins]\nlspclientplugin=true\n\n[lspclient]\nAllowedServerCommandLines=%s serve\n' "$INKJOULE" >"$HOME/.config/katerc"

colours() {
    kate-syntax-highlighter --syntax-trace=format -s Joule -f ansi colours.joule | sed 's/\x1b\[[0-9;]*[mK]//g' >"$work/colours.txt"
    diff -u colours.expect "$work/colours.txt"
}
check "Kate: colours" colours
check "Kate takes NAME.joule.md as a note too" bash -c 'cp colours.joule "$0/x.joule.md"; kate-syntax-highlighter -f html "$0/x.joule.md" | grep -q "Definition (Joule)"' "$work"

display=$(free_display)
start "$work/xvfb.log" Xvfb ":$display" -screen 0 1280x800x24 -nolisten tcp
wait_for 10 test -S "/tmp/.X11-unix/X$display"
export DISPLAY=:$display
timeout 120 dbus-run-session -- ./session.sh >"$work/session.log" 2>&1 || true
version=$(kate --version 2>/dev/null | sed -n 's/^kate //p')
compare_dumps "Kate $version" "$work/session.log"
check "Kate: no server is left" wait_for 10 server_gone
finish
