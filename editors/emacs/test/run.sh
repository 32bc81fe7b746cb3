#!/usr/bin/env bash
# Opens a faulty note in Emacs with Eglot: what Emacs shows must be what review says.
set -euo pipefail
cd "$(dirname "$0")"
. ../../common/lib.sh
prepare
export HOME=$work LANG=C.UTF-8 LC_ALL=C.UTF-8

compiles() {
    cp ../joule-mode.el "$work/"
    emacs -Q --batch --eval '(setq byte-compile-error-on-warn t)' --eval "(byte-compile-file \"$work/joule-mode.el\")"
}
check "Emacs: joule-mode compiles without a warning" compiles
count emacs -Q --batch -L .. -l colours.el

version=$(emacs --version | sed -n '1s/GNU Emacs //p')
timeout 90 emacs -Q --batch -l init.el -l dump.el >"$work/emacs.log" 2>&1 || true
compare_dumps "Emacs $version" "$work/emacs.log"
check "Emacs: no server is left" wait_for 5 server_gone

# On the screen of a terminal: the value in the text, the findings in their list.
start_screen "emacs -nw -Q -l '$PWD/init.el' '$INKJOULE_NOTE'"
value=$(first_value)
check "Emacs on the screen: $value" wait_for 20 on_screen "$value"
send_keys M-x 'flymake-show-buffer-diagnostics' Enter
message=$(first_finding message)
check "Emacs on the screen: the finding of line $(first_finding line) in the list" wait_for 20 on_screen "${message:0:24}"
screen_shot emacs
send_keys C-x C-c
check "Emacs ends, and its server with it" wait_for 8 server_gone
finish
