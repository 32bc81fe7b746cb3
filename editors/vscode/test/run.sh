#!/usr/bin/env bash
# Tests the extension: its grammar, its package, and a faulty note in a real VS Code
# (code-server with Debian's chromium). Needs editors/setup.sh.
set -euo pipefail
cd "$(dirname "$0")"
. ../../common/lib.sh
prepare

package_holds() {
    local list; list=$(unzip -Z1 "$1")
    for f in dist/extension.js syntaxes/joule.tmLanguage.json language-configuration.json readme.md; do
        grep -qx "extension/$f" <<<"$list" || { echo "$f is missing"; return 1; }
    done
    ! grep -E 'src/|test/|node_modules' <<<"$list"
}

vsix=$work/inkjoule.vsix
check "VS Code: the extension packages" ../build.sh "$vsix"
check "VS Code: grammar" bash -c "cd '$INKJOULE_CACHE/vscode' && npm run -s test:grammar"
check "VS Code: the package holds the program's entry and the grammar, no sources" package_holds "$vsix"

code_server() { node "$INKJOULE_CACHE/code-server.js" --user-data-dir "$work/data" --extensions-dir "$work/ext" --config "$work/config.yaml" "$@"; }

: >"$work/config.yaml"
mkdir -p "$work/data/User" "$work/probe"
cat >"$work/data/User/settings.json" <<JSON
{"inkjoule.server.path": "$INKJOULE", "workbench.startupEditor": "none", "telemetry.telemetryLevel": "off",
 "editor.hover.delay": 100, "update.mode": "none", "extensions.autoUpdate": false, "security.workspace.trust.enabled": false,
 "workbench.colorTheme": "${INKJOULE_THEME:-Default Light Modern}"}
JSON
cp -r probe "$work/probe-extension"
(cd "$work/probe-extension" && "$INKJOULE_CACHE/vscode/node_modules/.bin/vsce" package --no-dependencies --skip-license \
    --allow-missing-repository -o "$work/probe.vsix") >"$work/vsce.log" 2>&1 || { cat "$work/vsce.log"; exit 1; }
for extension in "$vsix" "$work/probe.vsix"; do
    check "VS Code: $(basename "$extension") installs" code_server --install-extension "$extension"
done

port=$(free_port)
start "$work/code.log" node "$INKJOULE_CACHE/code-server.js" --user-data-dir "$work/data" --extensions-dir "$work/ext" --config "$work/config.yaml" \
    --auth none --bind-addr "127.0.0.1:$port" --disable-telemetry --disable-update-check --disable-workspace-trust
check "VS Code: starts" wait_for 30 curl -sf "http://127.0.0.1:$port/healthz"

# 1. As a user sees it.
mkdir -p "$INKJOULE_ARTEFACTS"
count node window.mjs "http://127.0.0.1:$port" "$work/notes" demo.joule "$INKJOULE_ARTEFACTS/vscode" "$work/review.json"
echo "      pictures: $INKJOULE_ARTEFACTS/vscode-*.png"

# 2. What VS Code holds, to the column.
cp "$INKJOULE_NOTE" "$work/probe/"
cp "$work/review.json" "$work/probe/review.json"
echo '{"note": "demo.joule", "review": "review.json"}' >"$work/probe/probe-wanted.json"
start "$work/chromium.log" "${CHROMIUM:-chromium}" --headless --no-sandbox --disable-gpu --disable-dev-shm-usage --no-first-run \
    --user-data-dir="$work/chromium" --remote-debugging-port=0 "http://127.0.0.1:$port/?folder=$work/probe"
if wait_for 60 test -s "$work/probe/probe.json"; then
    cp "$work/probe/probe.json" "$INKJOULE_ARTEFACTS/vscode-probe.json"
    count node ../../common/compare.mjs "VS Code" "$INKJOULE_NOTE" "$work/review.json" "$work/probe/probe.json"
    review "$work/probe/fixed.joule" >"$work/fixed.json"
    node -p "JSON.stringify(JSON.parse(require('fs').readFileSync('$work/probe/probe.json')).after)" >"$work/after.json"
    count node ../../common/compare.mjs "VS Code, after the fixes" "$work/probe/fixed.joule" "$work/fixed.json" "$work/after.json"
    count node features.mjs "$work/probe/probe.json" "$work/review.json"
else
    bad "VS Code: the probe answered"
    tail -5 "$work/code.log" "$work/chromium.log"
fi
finish
