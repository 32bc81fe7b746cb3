#!/usr/bin/env bash
# Packages the extension outside the repository: build.sh FILE.vsix
set -euo pipefail
cd "$(dirname "$0")"
. ../common/lib.sh
build=$INKJOULE_CACHE/vscode
[ -d "$build/node_modules" ] || die "run editors/setup.sh first"
rm -rf "$build/src" "$build/syntaxes" "$build/test" "$build/dist"
cp -r package.json README.md .vscodeignore language-configuration.json src syntaxes test "$build/"
cd "$build"
npm run -s package -- -o "$(realpath -m "$1")"
