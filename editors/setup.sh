#!/usr/bin/env bash
# Installs what the tests that drive real editors need: Debian 12's editors, and
# from npm a VS Code that runs in a browser. Needs root (or sudo), Node 20, npm.
# Everything from npm goes to $INKJOULE_CACHE; a second run finds it there.
#
# Usage: editors/setup.sh [apt] [npm] [code]     (default: all three)
set -euo pipefail
cd "$(dirname "$0")"
. common/lib.sh

# Versions that were tried together. code-server 4.100.3 is the last for Node 20.
code_server=4.100.3
ripgrep=1.18.0

packages=(
    chromium fonts-dejavu-core                              # VS Code's window
    neovim vim-nox vim-ale vim-youcompleteme tmux           # on a terminal
    emacs-nox elpa-eglot
    kate xvfb openbox xdotool imagemagick dbus dbus-x11     # on an X display
    at-spi2-core python3-pyatspi libkf5syntaxhighlighting-tools                            # to read what Kate shows
    curl ca-certificates unzip
)

# Debian's packages; nothing is asked for where all are installed already.
setup_apt() {
    local missing=() p
    for p in "${packages[@]}"; do
        dpkg-query -W -f '${Status}' "$p" 2>/dev/null | grep -q 'ok installed' || missing+=("$p")
    done
    [ ${#missing[@]} -gt 0 ] || return 0
    local sudo=(); [ "$(id -u)" = 0 ] || sudo=(sudo)
    retry "${sudo[@]}" apt-get -q update
    retry "${sudo[@]}" env DEBIAN_FRONTEND=noninteractive \
        apt-get install -q -y --no-install-recommends "${missing[@]}"
}

# npm packages by the two lock files, in copies of their folders: a
# node_modules inside the repository would be walked by the Go tool.
setup_npm() {
    local folder
    for folder in vscode client; do
        local to=$INKJOULE_CACHE/$folder
        mkdir -p "$to"
        cmp -s "$folder/package-lock.json" "$to/installed-lock.json" && continue
        cp "$folder/package.json" "$folder/package-lock.json" "$to/"
        (cd "$to" && retry npm ci --no-audit --no-fund)
        cp "$to/package-lock.json" "$to/installed-lock.json"
    done
}

# code-server without the one install script that wants more than npm: its
# ripgrep is fetched from elsewhere, so the npm package that ships it is used.
setup_code() {
    local dir=$INKJOULE_CACHE/code-server-$code_server
    [ ! -e "$dir/ready" ] || return 0
    rm -rf "$dir"; mkdir -p "$dir"
    (
        cd "$dir"
        export npm_config_yes=true npm_config_audit=false npm_config_fund=false
        [ ! -e /usr/include/node/node.h ] || export npm_config_nodedir=/usr
        retry npm install --ignore-scripts --no-save \
            "code-server@$code_server" "@vscode/ripgrep-linux-$(node_arch)@$ripgrep"
        npm rebuild argon2
        cd node_modules/code-server/lib/vscode
        retry npm install --ignore-scripts --omit=dev
        npm rebuild @vscode/spdlog native-watchdog
        npm rebuild node-pty || test -f node_modules/node-pty/build/Release/pty.node
        mkdir -p node_modules/@vscode/ripgrep/bin
        cp "$dir/node_modules/@vscode/ripgrep-linux-$(node_arch)/bin/rg" node_modules/@vscode/ripgrep/bin/rg
        ln -sfn node_modules node_modules.asar
        ln -sfn code-linux.sh bin/remote-cli/code-server
        ln -sfn browser-linux.sh bin/helpers/browser.sh
    )
    ln -sfn "code-server-$code_server/node_modules/code-server/out/node/entry.js" "$INKJOULE_CACHE/code-server.js"
    touch "$dir/ready"
}

node_arch() { node -p process.arch; }

mkdir -p "$INKJOULE_CACHE"
exec 9>"$INKJOULE_CACHE/lock"; flock 9     # two runs share one cache
for part in "${@:-apt npm code}"; do
    for p in $part; do
        case $p in
        apt | npm | code)
            start=$SECONDS
            "setup_$p"      # not behind || or if: these would switch off set -e inside it
            echo "-- install ($p): $((SECONDS - start)) s" ;;
        *) die "setup.sh knows apt, npm and code, not '$p'" ;;
        esac
    done
done
