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

# work_dir: a temporary folder in $work, removed at the end with the processes
# in $children (process groups that the script started itself).
children=()
work_dir() {
    work=$(mktemp -d "${TMPDIR:-/tmp}/inkjoule-editor.XXXXXX")
    trap clean_up EXIT
    trap 'exit 130' INT TERM HUP
}
clean_up() {
    local p
    for p in "${children[@]}"; do kill -- "-$p" 2>/dev/null || true; done
    for p in "${children[@]}"; do
        wait_for 5 group_gone "$p" || kill -9 -- "-$p" 2>/dev/null || true
    done
    declare -F end_editor >/dev/null && end_editor
    rm -rf "$work"
}
group_gone() { ! kill -0 -- "-$1"; }

# start LOG COMMAND...: in the background, in a process group of its own.
start() {
    local log=$1; shift
    setsid "$@" >"$log" 2>&1 </dev/null &
    children+=($!)
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
    export INKJOULE INKJOULE_NOTE=$work/notes/demo.joule
    mkdir -p "$work/notes"
    cp "$EDITORS/testdata/demo.joule" "$INKJOULE_NOTE"
    review "$INKJOULE_NOTE" >"$work/review.json"
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
