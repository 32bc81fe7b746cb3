# Sourced by the scripts of this folder: places, a retry, and the counting of checks.

EDITORS=$(cd "$(dirname "${BASH_SOURCE[0]}")/.." && pwd)
ROOT=$(dirname "$EDITORS")
: "${INKJOULE_CACHE:=${XDG_CACHE_HOME:-$HOME/.cache}/inkjoule-editors}"
: "${INKJOULE_ARTEFACTS:=${TMPDIR:-/tmp}/inkjoule-artefacts}"     # screenshots, kept outside the repository
export INKJOULE_CACHE INKJOULE_ARTEFACTS

passed=0 failed=0

die() { echo "$*" >&2; exit 2; }

# retry COMMAND...: up to three tries, for what goes over a network.
retry() {
    local n
    for n in 1 2 3; do
        "$@" && return 0
        [ $n = 3 ] || { echo "try $n failed: $*" >&2; sleep $((n * 5)); }
    done
    return 1
}

# timed TITLE COMMAND...: runs it and prints how long it took.
timed() {
    local title=$1 start=$SECONDS status=0; shift
    "$@" || status=$?
    printf -- '-- %s: %d s%s\n' "$title" $((SECONDS - start)) "$([ $status = 0 ] || echo ", FAILED ($status)")"
    return $status
}

ok() { passed=$((passed + 1)); echo "ok    $*"; }
bad() { failed=$((failed + 1)); echo "FAIL  $*"; }

# check TITLE COMMAND...: one check; what a failing command prints is shown.
check() {
    local title=$1 out; shift
    if out=$("$@" 2>&1); then ok "$title"; else bad "$title"; printf '%s\n' "$out" | sed 's/^/      /' | head -40; fi
}

# count COMMAND...: takes over the "ok" and "FAIL" lines that the command prints.
# A command that ends with another status than its lines tell is a failed check.
count() {
    local file status=0 o f
    file=$(mktemp)
    "$@" >"$file" 2>&1 || status=$?
    cat "$file"
    o=$(grep -c '^ok  ' "$file") || true
    f=$(grep -c '^FAIL  ' "$file") || true
    rm -f "$file"
    passed=$((passed + o)) failed=$((failed + f))
    [ $((o + f)) -gt 0 ] || bad "$* printed no check (status $status)"
    [ "$status" = 0 ] || [ "$f" -gt 0 ] || bad "$* ended with status $status"
}

# finish: the closing line, and the status that goes with it.
finish() {
    echo "$passed passed, $failed failed"
    [ "$failed" = 0 ] && [ "$passed" -gt 0 ]
}

# wait_for SECONDS COMMAND...: polls until the command succeeds.
wait_for() {
    local until=$((SECONDS + $1)); shift
    until "$@" >/dev/null 2>&1; do
        [ $SECONDS -lt $until ] || return 1
        sleep 0.2
    done
}

# work_dir: a temporary folder in $work. At the end of the script it is removed,
# and every process that the script started, however deep, is ended: each carries
# $INKJOULE_RUN in its environment.
work_dir() {
    work=$(mktemp -d "${TMPDIR:-/tmp}/inkjoule-editor.XXXXXX")
    export INKJOULE_RUN=$work
    trap clean_up EXIT
    trap 'exit 130' INT TERM HUP
}
clean_up() {
    end_screen
    none_started || kill $(started) 2>/dev/null || true
    wait_for 5 none_started || kill -9 $(started) 2>/dev/null || true
    rm -rf "$work" 2>/dev/null || { sleep 1; rm -rf "$work"; }
}
started() {
    (unset INKJOULE_RUN; grep -lazs "^INKJOULE_RUN=$work\$" /proc/[0-9]*/environ | sed 's#/proc/\([0-9]*\)/.*#\1#') || true
}
none_started() { [ -z "$(started)" ]; }

# start LOG COMMAND...: in the background, apart from this terminal.
start() {
    local log=$1; shift
    setsid "$@" >"$log" 2>&1 </dev/null &
}

# build_binary: the program under test, in $INKJOULE; INKJOULE_BIN names another one.
build_binary() {
    if [ -n "${INKJOULE_BIN:-}" ]; then INKJOULE=$INKJOULE_BIN; return; fi
    INKJOULE=$work/bin/inkjoule
    (cd "$ROOT" && CGO_ENABLED=0 go build -o "$INKJOULE" ./cmd/inkjoule)
}

# prepare: the program, and in $work/notes the faulty note with what review says of it.
prepare() {
    work_dir
    build_binary
    export INKJOULE INKJOULE_NOTE=$work/notes/demo.joule INKJOULE_REVIEW=$work/review.json INKJOULE_DUMP=$work/dump
    mkdir -p "$work/notes" "$INKJOULE_DUMP"
    pristine=$EDITORS/testdata/demo.joule
    cp "$pristine" "$INKJOULE_NOTE"
    review "$INKJOULE_NOTE" >"$INKJOULE_REVIEW"
}

# review NOTE: the note's findings and values; findings end with status 1, which is no failure here.
review() {
    local status=0
    (cd "$(dirname "$1")" && "$INKJOULE" review --format json "$(basename "$1")") || status=$?
    [ $status -le 1 ] || die "inkjoule review ended with status $status"
}

# free_port: a TCP port of the loopback address that nobody uses now.
free_port() {
    node -e 'const s = require("net").createServer().listen(0, "127.0.0.1", () => { console.log(s.address().port); s.close(); })'
}

# compare_dumps EDITOR LOG: holds what a script inside the editor wrote to
# $INKJOULE_DUMP (now.json; after.json and edited.joule) against review.
compare_dumps() {
    local editor=$1 log=$2
    if [ -s "$INKJOULE_DUMP/error.txt" ]; then
        bad "$editor: the script in the editor met an error"; cat "$INKJOULE_DUMP/error.txt"; return
    fi
    if [ ! -s "$INKJOULE_DUMP/now.json" ] || [ ! -s "$INKJOULE_DUMP/after.json" ]; then
        bad "$editor: the script in the editor answered"; tail -20 "$log"; return
    fi
    count node "$EDITORS/common/compare.mjs" "$editor" "$pristine" "$INKJOULE_REVIEW" "$INKJOULE_DUMP/now.json"
    check "$editor: a line was deleted" test "$(wc -l <"$INKJOULE_DUMP/edited.joule")" = $(($(wc -l <"$pristine") - 1))
    review "$INKJOULE_DUMP/edited.joule" >"$work/edited.json"
    count node "$EDITORS/common/compare.mjs" "$editor, after an edit" "$INKJOULE_DUMP/edited.joule" "$work/edited.json" "$INKJOULE_DUMP/after.json"
}

# start_screen COMMAND: in a terminal of 130 x 44 that the script can read and type into.
start_screen() {
    socket=inkjoule-$$
    tmux -L "$socket" -f /dev/null new-session -d -x 130 -y 44 "env TERM=screen-256color LANG=C.UTF-8 LC_ALL=C.UTF-8 $1"
}
send_keys() { tmux -L "$socket" send-keys "$@" 2>/dev/null || true; }
screen() { tmux -L "$socket" capture-pane -p; }
on_screen() { screen | grep -qF -- "$1"; }
# on_screen_line A B: one line of the screen holds A, and B's beginning after it.
on_screen_line() { screen | grep -F -- "$1" | grep -qF -- "${2:0:16}"; }
# screen_shot NAME: the screen as text, among the artefacts.
screen_shot() { mkdir -p "$INKJOULE_ARTEFACTS"; screen >"$INKJOULE_ARTEFACTS/$1.txt" || true; }
end_screen() {
    [ -z "${socket:-}" ] || tmux -L "$socket" kill-server 2>/dev/null || true
}

# The first value that an editor shows, the first finding's line, message and source text.
first_value() { node "$EDITORS/common/facts.mjs" "$INKJOULE_NOTE" "$INKJOULE_REVIEW" value; }
first_finding() { node "$EDITORS/common/facts.mjs" "$INKJOULE_NOTE" "$INKJOULE_REVIEW" "$1"; }

# server_gone: no language server that this script's editor started is left.
server_gone() {
    local p
    for p in $(started); do
        ! tr '\0' ' ' <"/proc/$p/cmdline" 2>/dev/null | grep -qF "$INKJOULE serve" || return 1
    done
}

# free_display: the number of an X display that nobody uses now.
free_display() {
    local n=70
    while [ -e "/tmp/.X11-unix/X$n" ] || [ -e "/tmp/.X$n-lock" ]; do n=$((n + 1)); done
    echo $n
}
