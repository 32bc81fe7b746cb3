#!/usr/bin/env bash
# A repository of notes with a hook, from nothing: a commit with a stale result
# is stopped, `inkjoule fill` corrects the result, and the commit passes.
set -euo pipefail
root=$(cd "$(dirname "$0")/../.." && pwd)
work=$(mktemp -d)
trap 'rm -rf "$work"' EXIT
mkdir "$work/bin" "$work/notes"
(cd "$root" && go build -o "$work/bin/inkjoule" ./cmd/inkjoule)
export PATH="$work/bin:$PATH" GIT_CONFIG_GLOBAL=/dev/null GIT_CONFIG_SYSTEM=/dev/null
export GIT_AUTHOR_NAME=N GIT_AUTHOR_EMAIL=n@example.org GIT_COMMITTER_NAME=N GIT_COMMITTER_EMAIL=n@example.org
cd "$work/notes"
git init -q -b main
git commit -q --allow-empty -m "Begin"
printf '#!/bin/sh\nexec inkjoule review --changed HEAD\n' >.git/hooks/pre-commit
chmod +x .git/hooks/pre-commit

cat >capacitor.joule <<'NOTE'
Snubber capacitor
=================

    C = 470 nF                     per "parts list 12"
    U, static voltage = 630 V      per "specification 3"
    W, stored energy = 1/2*C*U^2 = 86.2 mJ
    Q, electric charge = C*U = __ uC
    criterion W < 0.2 J            per "design rule 4"
NOTE
git add capacitor.joule

echo '== the first commit: the stored energy is stale'
if git commit -q -m "Add the snubber"; then
    echo 'FAILED: the hook let a stale result pass'
    exit 1
fi
[ "$(git rev-list --count HEAD)" = 1 ] || { echo 'FAILED: something was committed'; exit 1; }

echo '== fill writes the results'
inkjoule fill --stale --diff . || true
inkjoule fill --stale .
grep -q '= 93.3 mJ' capacitor.joule
grep -q '= 296.1 uC' capacitor.joule

echo '== the second commit passes'
git add capacitor.joule
git commit -q -m "Add the snubber"
[ "$(git rev-list --count HEAD)" = 2 ] || { echo 'FAILED: nothing was committed'; exit 1; }

echo '== an input changes: what became of the results'
sed -i.bak 's/470 nF/680 nF/' capacitor.joule && rm capacitor.joule.bak
{ inkjoule review --against HEAD . || true; } | grep -F 'since HEAD: W = 134.9 mJ, was 93.27 mJ (factor 1.447)'
echo '1 passed, 0 failed'
