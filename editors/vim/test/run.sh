#!/usr/bin/env bash
# Opens a faulty note in Vim with ALE and with YouCompleteMe: what they show must be
# what review says. Usage: run.sh [syntax] [ale] [ycm]     (default: syntax and ale)
set -euo pipefail
cd "$(dirname "$0")"
. ../../common/lib.sh
prepare
export HOME=$work
screen_dump() { rm -f "$INKJOULE_DUMP"/*; start_screen "HOME='$HOME' INKJOULE_DUMP='$INKJOULE_DUMP' INKJOULE_REVIEW='$INKJOULE_REVIEW' INKJOULE='$INKJOULE' vim -u $1 '$INKJOULE_NOTE'"; }

syntax() {
    check "Vim reads its files without an error" vim_quiet
    count cat "$INKJOULE_DUMP/syntax.txt"
    cp "$INKJOULE_NOTE" "$work/notes/other.joule.md"
    check "Vim takes NAME.joule.md as a note too" test "$(filetype_of "$work/notes/other.joule.md")" = joule
}

vim_quiet() {
    local out
    out=$(timeout 30 vim -Nu NONE -n -es -V1 -S syntax.vim 2>&1 || true)
    ! grep -E 'E[0-9]+:' <<<"$out" && [ -s "$INKJOULE_DUMP/syntax.txt" ]
}

filetype_of() {
    timeout 20 vim -Nu NONE -n -es --cmd 'set rtp^=..' --cmd 'filetype plugin on' "$1" -c "call writefile([&ft], '$work/ft')" -c 'qall!' || true
    cat "$work/ft"
}

ale() {
    screen_dump ale.vim
    wait_for 60 test -e "$INKJOULE_DUMP/done" || true
    screen >"$work/screen.txt" || true
    compare_dumps "Vim + ALE" "$work/screen.txt"
    check "Vim + ALE: the note is a Joule note" grep -q '"filetype": *"joule"' "$INKJOULE_DUMP/now.json"
    screen_shot vim-ale
    leave "Vim + ALE"
}

ycm() {
    screen_dump ycm.vim
    wait_for 60 test -e "$INKJOULE_DUMP/done" || true
    screen >"$work/screen.txt" || true
    compare_dumps "Vim + YouCompleteMe" "$work/screen.txt"
    local value; value=$(first_value)
    check "Vim + YouCompleteMe on the screen: $value" wait_for 5 on_screen "$value"
    screen_shot vim-ycm
    leave "Vim + YouCompleteMe"
}

leave() {
    send_keys Escape ':qa!' Enter
    check "$1: ends, and its server with it" wait_for 8 server_gone
    end_screen
}

for part in "${@:-syntax ale}"; do
    for p in $part; do "$p"; done
done
finish
